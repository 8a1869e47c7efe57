"""The shear force and bending moment of a pin across its plates, written out so that they can be checked by hand."""

from __future__ import annotations

from collections.abc import Callable
from functools import lru_cache

import numpy as np

from linkcalc.design.sizing.stack import Peak, PinStack
from linkcalc.design.sizing.working import Sheet, Working
from linkcalc.parts.contract import Value
from linkcalc.parts.pose import Array

PLACE = "from the free face of the first plate"
_BALANCE = "balance of the pin before the section"
_EVEN = 1e-9
_LONGEST = 480  # what the reader of formulas takes, with some room


@lru_cache(maxsize=16)
def section_forces(stack: PinStack) -> Working:
    """The plates and the largest shear and moment along the pin. None of it hangs on the diameter, so that a search for
    that writes it once.

    Symbols: t1, a1, F1x, F1y, q1, ... of the plates; z_V, V, z_M, M.
    """
    sheet = Sheet("pin across a stack of plates")
    _write_plates(sheet, stack)
    _write_forces(sheet, stack)
    return sheet.working()


def _write_plates(sheet: Sheet, stack: PinStack) -> None:
    """The plates: t and a (where each begins), its force (Fx, Fy), and the line load q at its worse face."""
    even = _even(stack)
    for k, one in enumerate(stack.plates):
        n = str(k + 1)
        sheet.given(f"t{n}", one.thickness, "length", f"thickness of plate {n}, {one.member}")
        sheet.given(f"a{n}", float(stack.starts[k]), "length", f"where plate {n} begins")
        for axis, part in zip("xy", stack.forces[k], strict=True):
            sheet.given(f"F{n}{axis}", plain(part), "force", f"force of plate {n} on the pin, along {axis}")
        if even:
            sheet.step(f"q{n}", f"hypot(F{n}x, F{n}y)/t{n}", f"line load of plate {n}", "even pressure")
        else:
            how = "largest, at one of its faces"
            sheet.found(f"q{n}", plain(stack.line_load[k]), "stiffness", f"line load of plate {n}", how, _BALANCE)


def _write_forces(sheet: Sheet, stack: PinStack) -> None:
    """V at z_V and M at z_M: the largest along the pin, each from the loads of the plates before it."""
    even = _even(stack)
    if not even:
        for k in range(len(stack.plates)):
            first = stack.middles[k] + stack.tips * (stack.starts[k] - stack.centres[k])
            for axis, part in zip("xy", first, strict=True):
                text = f"line load of plate {k + 1} along {axis} where it begins"
                sheet.found(f"w{k + 1}{axis}", plain(part), "stiffness", text, "F/T + s (z - zm)", _BALANCE)
        for axis, part in zip("xy", stack.tips, strict=True):
            sheet.found(
                f"s{axis}", plain(part), "pressure rise", f"slope of it along {axis}", "-sum(F zm)/sum(I)", _BALANCE
            )
    _largest(sheet, stack, "V", "largest shear force", "force", stack.peak_shear, _shear if even else _shear_sloped)
    _largest(
        sheet, stack, "M", "largest bending moment", "moment", stack.peak_moment, _moment if even else _moment_sloped
    )


def plain(value: Array) -> Value:
    """A number for an array without axes."""
    return float(value) if np.ndim(value) == 0 else value


def _even(stack: PinStack) -> bool:
    """True if no plate's pressure slopes."""
    thick = np.array([p.thickness for p in stack.plates]).max()
    return bool(np.abs(stack.tips).max(initial=0.0) * thick <= _EVEN * np.abs(stack.middles).max(initial=0.0))


def _largest(
    sheet: Sheet, stack: PinStack, symbol: str, text: str, kind: str, peak: Peak, term: Callable[[str, str, str], str]
) -> None:
    """z, how much of each plate lies before it, both components and their resultant."""
    z, low = f"z_{symbol}", symbol.lower()
    sheet.found(z, plain(peak.place), "length", f"where the {text.removeprefix('largest ')} is largest", PLACE)
    before = [k for k, start in enumerate(stack.starts) if np.any(peak.place > start)]
    names = [(str(k + 1), f"{low}{k + 1}") for k in before]
    parts = [" + ".join(term(n, axis, u).replace("Z", z) for n, u in names) for axis in "xy"]
    if not before or max(map(len, parts)) > _LONGEST:
        sheet.found(symbol, plain(peak.value), kind, text, "along the pin", _BALANCE)
        return
    for (n, u), k in zip(names, before, strict=True):
        reach = f"{z} - a{n}" if np.all(peak.place >= stack.starts[k]) else f"max({z} - a{n}, 0 mm)"
        sheet.step(u, f"min({reach}, t{n})", f"how much of plate {n} lies before {z}")
    for axis, formula in zip("xy", parts, strict=True):
        sheet.step(f"{symbol}{axis}", formula, f"{text}, of the forces along {axis}", _BALANCE)
    sheet.step(symbol, f"hypot({symbol}x, {symbol}y)", text)


# u of a plate n lies before the section Z


def _shear(n: str, axis: str, u: str) -> str:
    return f"F{n}{axis}*{u}/t{n}"


def _moment(n: str, axis: str, u: str) -> str:
    return f"F{n}{axis}*{u}/t{n}*(Z - a{n} - {u}/2)"


def _shear_sloped(n: str, axis: str, u: str) -> str:
    return f"w{n}{axis}*{u} + s{axis}*{u}^2/2"


def _moment_sloped(n: str, axis: str, u: str) -> str:
    return f"w{n}{axis}*{u}*(Z - a{n} - {u}/2) + s{axis}*{u}^2*((Z - a{n})/2 - {u}/3)"
