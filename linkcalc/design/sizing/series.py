"""Series of usual sizes, from the tables of the package."""

from __future__ import annotations

from fractions import Fraction

from linkcalc import data

Series = tuple[tuple[float, str], ...]
_MM, _INCH = 1e-3, 0.0254


def clevis_pins(*, inch: bool = False) -> Series:
    """Diameters of clevis pins, rising: ([m], what it is called). ISO 2340 and 2341, or inch sizes."""
    if inch:
        names = data.table("sizes.toml")["clevis_pins_inch"]["inch"]
        return tuple((float(sum(Fraction(part) for part in name.split())) * _INCH, f"{name} in") for name in names)
    return _mm("clevis_pins")


def bush_bores() -> tuple[tuple[float, float], ...]:
    """Bores and outside diameters of plain bushes [m], rising: ISO 3547-1."""
    return tuple((bore * _MM, outside * _MM) for bore, outside in data.table("sizes.toml")["bushes"]["mm"])


def bush_lengths() -> Series:
    """Usual lengths of plain bushes, rising."""
    return _mm("bush_lengths")


def source(name: str) -> str:
    """Whose series it is: "clevis_pins", "clevis_pins_inch", "bushes", "bush_lengths"."""
    text: str = data.table("sizes.toml")[name]["source"]
    return text


def _mm(name: str) -> Series:
    return tuple((size * _MM, f"{size:g} mm") for size in data.table("sizes.toml")[name]["mm"])
