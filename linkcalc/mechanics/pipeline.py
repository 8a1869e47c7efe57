"""The whole order of the computation, one screen: drawing -> ready -> path -> poses -> statics."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from linkcalc.mechanics.balance import Balance, balance, failed
from linkcalc.mechanics.mesh import Mesh
from linkcalc.mechanics.motion import Closed, close
from linkcalc.mechanics.path import Path, lay_path
from linkcalc.mechanics.prepare import Ready
from linkcalc.mechanics.reactions import Side, reactions
from linkcalc.mechanics.state import Status
from linkcalc.parts.pose import Array


@dataclass(frozen=True, eq=False)
class Solved:
    """Closed poses with their statics; batch (case, variant, pose)."""

    drive: Array  # (1, variant, pose) [rad or m]
    closed: Closed
    balance: Balance


def solve_at(ready: Ready, mesh: Mesh, drive: Array, *, checked: bool = True) -> Solved:
    """Statics of one mechanism at some values of its drive (values); the mesh gives the guesses.

    checked  put the forces back into the equations (see ``balance``)
    """
    coordinate = ready.chain.coordinate
    assert coordinate is not None
    target = drive.reshape(1, 1, -1)
    closed = close(ready.chain, mesh.guess(drive), coordinate.hold(target), sure=1)
    return Solved(target, closed, balance(ready.chain, closed, ready.pushing, checked=checked))


def solve_stroke(ready: Ready, poses: int) -> tuple[Solved, Path]:
    """One mechanism over its whole stroke. Raises Faults where the stroke is out of reach."""
    path = lay_path(ready)
    return solve_at(ready, path.mesh, path.poses(poses)), path


def solve_drawn(ready: Ready) -> Solved:
    """Statics in the drawing pose, of one mechanism or of many copies."""
    nothing = np.full(ready.start.fine.shape, np.nan)
    solved = balance(ready.chain, ready.start, ready.pushing)
    if ready.undrawn is not None:
        solved = failed(solved, ready.undrawn, Status.NOT_DRAWN)
    return Solved(nothing, ready.start, solved)


def sides(ready: Ready, solved: Solved) -> list[Side]:
    """What every joint does to every member in a solved batch."""
    b = solved.balance
    return reactions(ready.chain, solved.closed.at, b.multipliers, b.friction, ready.pushing, b.effort, b.load)
