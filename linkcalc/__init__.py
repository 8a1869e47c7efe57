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

import linkcalc.parts  # noqa: F401  every kind of part enters the registry of words
from linkcalc.design.stroke import stroke
from linkcalc.faults import Fault, Faults
from linkcalc.model.mechanism import Mechanism
from linkcalc.model.read import parse, read
from linkcalc.model.write import dumps, write

__all__ = ["Fault", "Faults", "Mechanism", "dumps", "parse", "read", "stroke", "write"]
