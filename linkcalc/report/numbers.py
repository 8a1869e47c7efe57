"""Numbers as text for reading: so many significant digits, no exponent where a plain number does."""

from __future__ import annotations

import math

GAP = "-"
UNBOUNDED = "no bound"


def number(value: float, digits: int = 4, places: int | None = None, zero: float = 0.0, *, trim: bool = False) -> str:
    """A number for a table or a drawing; nan is a gap.

    >>> number(1234.5678), number(0.0123456), number(12.0), number(float("nan"))
    ('1235', '0.01235', '12.00', '-')

    trim  leaves out zeros at the end: for a number that stands alone

    >>> number(12.0, trim=True), number(1200.0, trim=True)
    ('12', '1200')
    """
    if trim:
        text = number(value, digits, places, zero)
        return text.rstrip("0").rstrip(".") if "." in text and "e" not in text else text
    if math.isnan(value):
        return GAP
    if math.isinf(value):
        return UNBOUNDED
    if value == 0 or abs(value) < zero:
        return "0" if places is None else f"{0.0:.{places}f}"
    if places is not None:
        return f"{value:.{places}f}".removeprefix("-") if round(value, places) == 0 else f"{value:.{places}f}"
    # the exponent after rounding: 9.9996 has one digit more before its point than after
    rounded, exponent = f"{value:.{digits - 1}e}".split("e")
    power = int(exponent)
    if digits - 1 <= power < 7:
        return f"{value:.0f}"  # figures before the point are never rounded away
    if -4 <= power < digits:
        return f"{float(f'{rounded}e{power}'):.{max(0, digits - 1 - power)}f}"
    return f"{rounded}e{power}"


def places_for(values: list[float], most: int = 4) -> int:
    """Decimal places that tell evenly stepped values apart and no more.

    >>> places_for([150.0, 149.5, 149.0]), places_for([0.0, 5.0, 10.0])
    (1, 0)
    """
    real = [v for v in values if math.isfinite(v)]
    for places in range(most):
        if all(abs(v - round(v, places)) < 1e-6 * max(1e-3, *(abs(w) for w in real)) for v in real):
            return places
    return most


def plain(unit: str) -> str:
    """A unit for reading: "N m" for "N*m"."""
    return unit.replace("*", " ")


def round_the_clock(angle: float) -> float:
    """[rad] an angle from 0 up to a whole turn; what is a whole turn but for rounding is 0.

    >>> round_the_clock(-1e-12), round_the_clock(math.pi / -2) / math.pi
    (0.0, 1.5)
    """
    turned = angle % (2 * math.pi)
    return 0.0 if 2 * math.pi - turned < 1e-9 else turned
