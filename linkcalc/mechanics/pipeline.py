"""The whole order of the computation, one screen: drawing -> ready -> path -> poses -> statics.

What only free members need is loaded where they are: most mechanisms have none, and start without it.
"""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from linkcalc.mechanics.balance import balance, failed
from linkcalc.mechanics.excess import no_fit
from linkcalc.mechanics.mesh import Mesh
from linkcalc.mechanics.motion import close
from linkcalc.mechanics.path import Path, lay_path, motion_range
from linkcalc.mechanics.prepare import Ready
from linkcalc.mechanics.reactions import Side, on_one, reactions
from linkcalc.mechanics.solved import Solved
from linkcalc.mechanics.state import Status
from linkcalc.parts.pose import Array, Poses


def solve_at(ready: Ready, mesh: Mesh | None, drive: Array, *, checked: bool = True) -> Solved:
    """Statics of one mechanism at some values of its drive (values); the mesh gives the guesses if it moves.

    checked  put the forces back into the equations (see ``balance``)
    """
    if ready.standing is not None:
        return solve_standing(ready, drive, checked=checked)
    if ready.loose is not None:
        from linkcalc.mechanics.loose_path import LooseMesh, solve_loose

        assert isinstance(mesh, LooseMesh)
        return solve_loose(ready, mesh, drive, checked=checked)
    coordinate = ready.chain.coordinate
    assert coordinate is not None and mesh is not None
    target = drive.reshape(1, 1, -1)
    closed = close(ready.chain, mesh.guess(drive), coordinate.hold(target), sure=1)
    return Solved(target, closed, balance(ready.chain, closed, ready.pushing, checked=checked))


def path_of(ready: Ready) -> Path:
    """The way of one mechanism through its stroke. Raises Faults where it is out of reach."""
    if ready.loose is None:
        return lay_path(ready)
    from linkcalc.mechanics.loose_path import lay_loose_path

    return lay_loose_path(ready)


def mesh_of(ready: Ready, solved: Solved) -> Mesh:
    """A mesh of the poses of a solved batch of one mechanism."""
    drive = solved.drive[0, 0]
    if ready.loose is None:
        return Mesh(drive, [solved.closed])
    from linkcalc.mechanics.loose_path import LooseMesh

    unknown = solved.balance.load if ready.pushing.load_asked else solved.balance.effort
    return LooseMesh(drive, [solved.closed], np.broadcast_to(unknown, solved.balance.status.shape)[:, 0])


def solve_standing(ready: Ready, drive: Array, *, checked: bool = True) -> Solved:
    """Statics as drawn, of one mechanism or of many copies, with what is stepped at some values (values)."""
    assert ready.standing is not None
    at, coordinate = ready.start.at, ready.chain.coordinate
    shape = (1, ready.start.fine.shape[1], drive.size)
    x, y, c, s = (
        [v if isinstance(v, float) else np.broadcast_to(v, shape) for v in q] for q in (at.x, at.y, at.c, at.s)
    )
    as_drawn = Poses(x, y, c, s, at.down, at.field)
    closed = close(ready.chain, as_drawn, None if coordinate is None else coordinate.hold(coordinate.value(as_drawn)))
    target = np.broadcast_to(drive.reshape(1, 1, -1), shape)
    closed = replace(closed, at=ready.standing.put(closed.at, target))
    solved = balance(ready.chain, closed, ready.pushing, checked=checked)
    if ready.undrawn is not None:
        solved = failed(solved, ready.undrawn, Status.NOT_DRAWN)
    return Solved(target, closed, solved)


def solve_stroke(ready: Ready, poses: int) -> tuple[Solved, Path]:
    """One mechanism over its whole stroke. Raises Faults where the stroke is out of reach."""
    path = path_of(ready)
    solved = solve_at(ready, path.mesh, path.poses(poses))
    if ready.chain.sharing is not None and not solved.closed.fine.all():
        raise no_fit(ready.drawing, ready.chain, solved.closed, solved.drive[0, 0])
    return solved, path


def reach(ready: Ready) -> tuple[float, float, float]:
    """Lower limit, drawn value and upper limit of the drive [rad or m]; nan for a limit that is not there."""
    if ready.loose is None:
        return motion_range(ready)
    from linkcalc.mechanics.loose_path import loose_range

    return loose_range(ready)


def solve_drawn(ready: Ready) -> Solved:
    """Statics in the drawing pose, of one mechanism or of many copies."""
    nothing = np.full((1, *ready.start.fine.shape[1:]), np.nan)
    solved = balance(ready.chain, ready.start, ready.pushing)
    if ready.undrawn is not None:
        solved = failed(solved, ready.undrawn, Status.NOT_DRAWN)
    return Solved(nothing, ready.start, solved)


def sides(ready: Ready, solved: Solved) -> list[Side]:
    """What every joint does to every member in a solved batch; to one plate, where a member stands for several."""
    b = solved.balance
    found = reactions(ready.chain, solved.closed.at, b, ready.pushing)
    return on_one(found, ready.plates) if max(ready.plates) > 1 else found
