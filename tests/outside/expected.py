"""What the sources print: ``expected.toml`` as data, and the head of each model file, where the source is named."""

from __future__ import annotations

import math
import re
import tomllib
from dataclasses import dataclass
from pathlib import Path

HERE = Path(__file__).parent
HEAD_KEYS = ("source", "url", "units", "printed", "tolerance", "geometry")
EXACT = 1e-6

# Written out by hand, so that the tool's own units are checked with the rest.
SI = {
    "": 1.0,
    "N": 1.0,
    "kN": 1e3,
    "lbf": 4.4482216152605,
    "kgf": 9.80665,
    "gf": 9.80665e-3,
    "kg at 10 m/s²": 10.0,
    "N m": 1.0,
    "kN m": 1e3,
    "mm": 1e-3,
    "in": 0.0254,
    "MPa": 1e6,
    "psi": 4.4482216152605 / 0.0254**2,
    "ft/min": 0.3048 / 60,
    "m/s": 1.0,
    "h": 3600.0,
    "million turns": 1e6,
    "cm²": 1e-4,
    "cm³": 1e-6,
    "cm⁴": 1e-8,
    "deg": math.pi / 180,
}


@dataclass(frozen=True)
class Printed:
    """One printed value.

    ask     what it is, in the words of ask.py
    digits  as printed
    unit    of the digits, a key of SI
    exact   the given sizes lead to these digits without rounding
    within  a tolerance in place of the one that follows from the digits; 0 if none is needed
    case    load case, "" if the model has one only
    means   what the source calls it, where that is not plain from what is asked
    """

    ask: str
    digits: str
    unit: str
    exact: bool = False
    within: float = 0.0
    case: str = ""
    means: str = ""

    @property
    def value(self) -> float:
        return float(self.digits)

    @property
    def decimals(self) -> int:
        return len(self.digits.partition(".")[2])

    @property
    def tolerance(self) -> float:
        """In the printed unit: half a unit of the last digit, unless the entry says otherwise."""
        if self.exact:
            return EXACT * (abs(self.value) or 1.0)
        return self.within or 0.5 * 10.0**-self.decimals


def model_file(case: str) -> Path:
    return HERE / "cases" / f"{case}.toml"


def printed_values() -> dict[str, tuple[Printed, ...]]:
    """Case -> its printed values, in the order of the file."""
    tree = tomllib.loads((HERE / "expected.toml").read_text(encoding="utf-8"))
    return {case: tuple(Printed(**row) for row in body["printed"]) for case, body in tree.items()}


def head(case: str) -> dict[str, str]:
    """The comment at the top of a model file, key by key; an indented line carries the one before on."""
    found: dict[str, str] = {}
    key = ""
    for line in model_file(case).read_text(encoding="utf-8").splitlines():
        if not line.startswith("#"):
            break
        if start := re.match(r"# (\w+): (.*)", line):
            key = start[1]
            found[key] = start[2]
        else:
            found[key] += " " + line.lstrip("# ")
    return found
