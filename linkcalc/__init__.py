"""linkcalc: statics of levers, clamps, toggles, linkages and weighing beams over the whole stroke and every load case.

>>> from linkcalc import parse, stroke
>>> lever = parse('''
... [points]
... A = [0, 0]
... grip = [300, 0]
... hook = [-100, 0]
... [members]
... ground = ["A"]
... lever = ["hook", "A", "grip"]
... [effort]
... at = "grip"
... direction = -90
... [load]
... at = "hook"
... direction = -90
... size = 600
... ''')
>>> answer = stroke(lever)
>>> float(answer.effort.round(6)[0, 0, 0]), float(answer.force_ratio.round(6)[0, 0, 0])
(200.0, 3.0)
"""

from __future__ import annotations

from importlib import import_module
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from linkcalc.design.balance import balance
    from linkcalc.design.check import check_model
    from linkcalc.design.copies import copies
    from linkcalc.design.members import members
    from linkcalc.design.pins import pins
    from linkcalc.design.positions import balance_positions
    from linkcalc.design.stroke import stroke
    from linkcalc.design.weigh import weigh
    from linkcalc.faults import Fault, Faults
    from linkcalc.model.mechanism import Mechanism
    from linkcalc.model.read import parse, read
    from linkcalc.model.write import dumps, write

__all__ = [
    "Fault",
    "Faults",
    "Mechanism",
    "balance",
    "balance_positions",
    "check_model",
    "copies",
    "dumps",
    "members",
    "parse",
    "pins",
    "read",
    "stroke",
    "weigh",
    "write",
]

# loaded when first asked for: a command starts with what it needs
_HOMES = {
    "balance": "linkcalc.design.balance",
    "balance_positions": "linkcalc.design.positions",
    "check_model": "linkcalc.design.check",
    "copies": "linkcalc.design.copies",
    "members": "linkcalc.design.members",
    "pins": "linkcalc.design.pins",
    "stroke": "linkcalc.design.stroke",
    "weigh": "linkcalc.design.weigh",
    "Fault": "linkcalc.faults",
    "Faults": "linkcalc.faults",
    "Mechanism": "linkcalc.model.mechanism",
    "parse": "linkcalc.model.read",
    "read": "linkcalc.model.read",
    "dumps": "linkcalc.model.write",
    "write": "linkcalc.model.write",
}


def __getattr__(name: str) -> Any:
    if name not in _HOMES:
        raise AttributeError(f"module 'linkcalc' has no attribute {name!r}")
    found = globals()[name] = getattr(import_module(_HOMES[name]), name)
    return found


def __dir__() -> list[str]:
    return sorted(__all__)
