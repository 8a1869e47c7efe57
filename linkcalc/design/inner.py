"""What there is to tell of the inside of a member, by name."""

from __future__ import annotations

AXIAL, SHEAR, BENDING = "axial force", "shear force", "bending moment"
STRESS, MARGIN, USED = "stress", "buckling margin", "utilisation"
FORCES = (AXIAL, SHEAR, BENDING)
KINDS = {AXIAL: "force", SHEAR: "force", BENDING: "moment", STRESS: "stress", MARGIN: "number", USED: "number"}


def inner(quantity: str, member: str) -> str:
    """Name of what goes on in a member at its worst place: "largest bending moment in arm"."""
    return f"largest {quantity} in {member}" if quantity in FORCES else f"{quantity} of {member}"
