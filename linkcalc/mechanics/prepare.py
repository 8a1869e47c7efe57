"""From a drawing to a chain that can be solved: freedoms counted and judged, the coordinate to step chosen."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING

import numpy as np

from linkcalc.faults import Fault, Faults
from linkcalc.mechanics.chain import Chain
from linkcalc.mechanics.eliminate import SMALL
from linkcalc.mechanics.excess import CURE, idle, sharing
from linkcalc.mechanics.freedom import Freedom, freedom, motion_of
from linkcalc.mechanics.limit import Place
from linkcalc.mechanics.motion import Closed, alone, close, single
from linkcalc.mechanics.plan import NoPlan
from linkcalc.mechanics.pushing import Pushing, column, pushing
from linkcalc.model.mechanism import DRAWN, LOWER, UPPER
from linkcalc.model.sketch import Drawing, drawn
from linkcalc.parts.along import Standing
from linkcalc.parts.contract import Joint
from linkcalc.parts.lines import rubless
from linkcalc.parts.pose import Mask, Poses, Value

if TYPE_CHECKING:
    from linkcalc.mechanics.loose import Loose


@dataclass(frozen=True, eq=False)
class Ready:
    """A mechanism ready to be solved.

    chain     joints, with the coordinate that is stepped, or one that is held where there is no stroke
    loose     of a mechanism with more freedoms than the drive takes; None: there are none
    unknown   what effort or load is in the start of such a mechanism
    start     the drawing pose, closed; (1, variant, 1), or plain floats where a stroke is walked through from it
    pushing   loads of all cases
    steps     True if there is a stroke
    undrawn   (1, variant, 1) True for copies of which some point cannot be drawn; None: all can
    standing  what is stepped while the mechanism stands as drawn, if that is so
    """

    drawing: Drawing
    chain: Chain
    start: Closed
    pushing: Pushing
    steps: bool
    undrawn: Mask | None = None
    loose: Loose | None = None
    unknown: Value = 0.0
    standing: Standing | None = None

    @property
    def plates(self) -> list[int]:
        """How many equal plates each member stands for, the ground first."""
        members = self.drawing.mechanism.members
        return [members[name].copies if name in members else 1 for name in self.drawing.members]

    @property
    def drive_kind(self) -> str:
        """Kind of what is stepped, "length" or "angle"; "" without a stroke."""
        stepped = self.standing or self.chain.coordinate
        return stepped.kind if self.steps and stepped is not None else ""


def prepare(drawing: Drawing, like: Ready | None = None) -> Ready:
    """Raises Faults: too many or too few freedoms, effort missing or idle, drawn in a dead point of the drive.

    like  the same mechanism with other sizes, made ready before: its plans of elimination are used again
    """
    mechanism = drawing.mechanism
    assembly = drawing.assembly()
    rubs = any(_rubs(joint) for joint in drawing.joints) or any(
        not rubless(getattr(pusher, "seal", 0.0)) for pusher in assembly.pushers.values()
    )
    loads = pushing(assembly, rubbing=rubs and mechanism.effort is not None, forward=_forward(drawing))
    at = _drawn(drawing, loads)
    moving = len(drawing.members) - 1
    if moving == 0:
        raise Faults(Fault(("members",), "only the ground is there", "name at least one member that moves"))
    coordinate = mechanism.stroke.along.coordinate(drawing) if mechanism.stroke else None
    standing: Standing | None = coordinate if mechanism.stroke and not moves(drawing) else None
    coordinate = None if standing else coordinate
    chain = Chain(moving, drawing.joints, coordinate, drawing.size)
    counted = chain.columns - chain.joint_rows
    asked = loads.effort_asked or loads.load_asked
    wanted = 1 if coordinate is not None or asked else 0
    if moves(drawing) and not asked:
        # that effort and load both have a size is a fault of the model, found before it comes here
        what = "nothing drives it: the model has no effort"
        raise Faults(Fault(("stroke",), what, "give it an [effort] without a size"))
    giving = len(chain.gives)
    shared = sharing(drawing, wanted) if counted < wanted and not giving else None
    if shared is None and (without := [*idle(drawing)]):
        raise Faults(without)
    if counted > wanted and (mechanism.free or counted - giving <= wanted):
        ready = _settled(drawing, chain, at, loads, wanted, like)
        if ready is not None and standing is not None:
            what = "the mechanism gives or has free members, which settle anew at every place of the load"
            raise Faults(Fault(("stroke", "place"), what, "hold them, or give the load a fixed place"))
        if ready is not None:
            return ready
    if counted != wanted and shared is None:
        raise Faults(_misfit(drawing, freedom(chain, at), wanted))
    if shared is not None:
        chain = Chain(moving, drawing.joints, coordinate, drawing.size, sharing=shared)
    if coordinate is None and wanted:
        way = motion_of(chain, at)
        k = int(np.argmax(np.abs(way)))
        coordinate = Place(k // 3 + 1, k % 3)
        chain = chain.driven_by(coordinate)
    if like is not None:
        chain.share_plans(like.chain)
    try:
        if moves(drawing) and chain.columns <= SMALL and drawing is drawn(mechanism):
            at = alone(at)  # no copies: the walk takes one pose at a time
        start = close(chain, at, None if coordinate is None else coordinate.hold(coordinate.value(at)))
        singular = start.factored.singular
        if singular is not None and singular.all() and freedom(chain, at).free != wanted:
            raise NoPlan([])
    except NoPlan:
        found = freedom(chain, at)
        if found.free == wanted and moves(drawing):
            raise Faults(_dead_drive(drawing)) from None
        raise Faults(_misfit(drawing, found, wanted)) from None
    if not bool(np.any(start.fine)):
        raise Faults(Fault(("points",), "the drawing pose does not close", "check the points that slots guide"))
    return Ready(drawing, chain, start, loads, mechanism.stroke is not None, _undrawn(drawing), standing=standing)


def _settled(
    drawing: Drawing, chain: Chain, at: Poses, loads: Pushing, wanted: int, like: Ready | None
) -> Ready | None:  # fmt: skip
    """A mechanism with more freedoms than the drive takes, where they settle; None where nothing makes them."""
    from linkcalc.mechanics.loose import Loose
    from linkcalc.mechanics.settle import acted_on, come_to_rest

    coordinate = chain.coordinate
    if coordinate is None and wanted:
        coordinate = _held(chain, at, loads)
    loose = Loose(chain.moving, chain.joints, coordinate, chain.size)
    if like is not None and like.loose is not None:
        loose.share_plans(like.loose)
    if drawing.variants > 1:  # copies settle each by itself, even those that are drawn alike
        at = _each(at, drawing.variants)
    target = None if coordinate is None else coordinate.value(at)
    try:
        rest = come_to_rest(loose, at, target, loads, 0.0)
    except NoPlan:
        return None
    if rest is None:
        return None
    found, places = rest
    fine = found.closed.fine
    if not fine.any() or not acted_on(loose, places, found, loads)[fine].all():
        return None
    return Ready(
        drawing, loose.chain(places), found.closed, loads, drawing.mechanism.stroke is not None, _undrawn(drawing),
        loose, found.unknown,
    )  # fmt: skip


def _each(at: Poses, variants: int) -> Poses:
    """The same poses with an entry for each copy."""
    x, y, c, s = (
        [v[0], *(np.array(np.broadcast_to(p, (1, variants, 1))) for p in v[1:])] for v in (at.x, at.y, at.c, at.s)
    )
    return Poses(x, y, c, s, at.down, at.field)


def _held(chain: Chain, at: Poses, loads: Pushing) -> Place:
    """Without a stroke the drawing pose is held by the coordinate that what is asked for pushes most."""
    asked = loads.load if loads.load_asked else loads.effort
    push = single(column(asked, at, chain.columns, unit=True)) / chain.column_size
    k = int(np.argmax(np.abs(push)))
    return Place(k // 3 + 1, k % 3)


def _rubs(joint: Joint) -> bool:
    """True if it has friction of any kind."""
    return any(not rub.always for rub in joint.rubs()) or (hasattr(joint, "drag") and joint.drag() is not None)


def _forward(drawing: Drawing) -> float:
    """Which way the drive moves along the stroke, +1 or -1; 0.0 without a stroke that moves the mechanism."""
    stroke = drawing.mechanism.stroke
    if stroke is None or not moves(drawing):
        return 0.0
    ends = {UPPER: np.inf, LOWER: -np.inf}
    value = stroke.along.coordinate(drawing).value(_drawn(drawing, None))
    start, stop = (
        ends[size] if size in ends else value if size == DRAWN else drawing.value(size, stroke.along.kind)
        for size in (stroke.start, stroke.stop)
    )
    way = np.ravel(np.subtract(stop, start))[0]
    return 1.0 if way >= 0 else -1.0


def moves(drawing: Drawing) -> bool:
    """True if there is a stroke that moves the mechanism, and not only a load along it."""
    stroke = drawing.mechanism.stroke
    return stroke is not None and not getattr(stroke.along, "stands", False)


def _undrawn(drawing: Drawing) -> Mask | None:
    missing = [np.isnan(v) for place in drawing.points.values() for v in place if not isinstance(v, float)]
    undrawn = np.logical_or.reduce(np.broadcast_arrays(*missing)) if missing else np.zeros((1, 1, 1), bool)
    return undrawn if undrawn.any() else None


def _drawn(drawing: Drawing, loads: Pushing | None) -> Poses:
    x: list[Value] = [0.0]
    y: list[Value] = [0.0]
    c: list[Value] = [1.0]
    s: list[Value] = [0.0]
    for ox, oy in drawing.origins[1:]:
        x.append(_shaped(ox))
        y.append(_shaped(oy))
        c.append(_shaped(1.0))
        s.append(_shaped(0.0))
    return Poses(x, y, c, s, loads.down, loads.field) if loads else Poses(x, y, c, s)


def _shaped(value: Value) -> Value:
    return value if np.ndim(value) == 3 else np.full((1, 1, 1), float(value))


def _misfit(drawing: Drawing, found: Freedom, wanted: int) -> list[Fault]:
    """What is wrong with the freedoms, and what to do about it."""
    faults: list[Fault] = []
    movers = [drawing.members[m] for m in found.movers]
    joints = ", ".join(found.repeated)
    driven = "the stroke" if moves(drawing) else "the effort"
    if found.special and found.counted == wanted:
        return [
            Fault(
                ("points",),
                f"the drawing pose is a special one: joints {joints} line up there and leave {_number(found.free)}",
                "draw it a little off that pose",
            )
        ]
    if found.free > wanted:
        spare = found.free - wanted
        takes = f", of which {driven} takes one" if wanted else ""
        what = f"{_number(found.free)}{takes}: {', '.join(movers)} can move"
        much = f"hold them by {spare} more: a slot, gear or rack holds 1, a pin or slide 2, a weld 3"
        cure = f"give the model an [effort], or {much}" if not wanted and spare == 1 else much
        if drawing.mechanism.free:
            what += ", and nothing that acts on them lets them settle"
        else:
            cure += "; or name in 'free' what settles where it balances"
        faults.append(Fault(("members", movers[0] if movers else "ground"), what, cure))
    if found.excess:
        what = f"held {found.excess} time{'s' if found.excess > 1 else ''} more than needed, among joints {joints}"
        faults.append(Fault(("members",), what, CURE))
    if found.free < wanted:
        faults.append(
            Fault(("members",), f"nothing can move, yet {driven} wants one degree of freedom",
                  "leave out a joint, or leave out the effort for a frame")
        )  # fmt: skip
    return faults


def _number(freedoms: int) -> str:
    return f"{freedoms} degree{'s' if freedoms != 1 else ''} of freedom"


def _dead_drive(drawing: Drawing) -> Fault:
    stroke = drawing.mechanism.stroke
    assert stroke is not None
    return Fault(
        ("stroke", stroke.along.word),
        "cannot be driven from the drawing pose, which is a dead point of this coordinate",
        "step another coordinate, or draw the mechanism off the dead point",
    )
