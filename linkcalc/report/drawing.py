"""The mechanism as a drawing to scale: one pose in full, others lighter behind it, and what acts from outside."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence

import numpy as np

from linkcalc.design.answer import StrokeAnswer
from linkcalc.faults import fault
from linkcalc.model.mechanism import GROUND
from linkcalc.parts.contract import Joint, Mark
from linkcalc.parts.pose import Poses
from linkcalc.report.blocks import Drawing, Item
from linkcalc.report.edge import Edge
from linkcalc.report.numbers import number, plain
from linkcalc.report.scene import Acts, Scene, Spot
from linkcalc.report.toothed import toothed


def draw_mechanism(
    answer: StrokeAnswer,
    *,
    poses: Sequence[int] = (0,),
    case: int = 0,
    forces: bool = True,
    joint_sizes: bool = False,
    traces: Sequence[str] | None = None,
) -> Drawing:
    """The mechanism at one or more poses.

    poses        indices of poses: the first in full, the others lighter behind it
    case         index of the load case whose forces are shown
    forces       effort, loads, weights, and what the ground does to the mechanism
    joint_sizes  the size of its force beside each joint
    traces       points whose way over the stroke is drawn; None: where effort and load act

    Raises Faults: a pose, case or point that is not there, or a pose without an answer.
    """
    scene, edge = Scene(answer), Edge(answer)
    check_pose(scene, poses, case)
    if not moves(answer):
        poses = poses[:1]
    main = scene.at(poses[0], case)
    items = [Item("path", spots) for spots in _traces(scene, case, traces)]
    for pose in poses[1:]:
        items += _bodies(scene, scene.at(pose, case), "ghost")
    items += _bodies(scene, main, "plain")
    outside = _outside(scene, poses[0], case) if forces else []
    shown = arrows(outside, edge)
    joints = scene.joints(main)
    # what the ground carries stands at its arrow already
    told = {b.joint for b in answer.bearings}
    sized = [j.name for j, _ in joints if joint_sizes and j.name in told and not (forces and 0 in j.members)]
    sizes = {j: edge.text(float(answer.joint_force(j)[case, 0, poses[0]]), "force") for j in sized}
    named = {a.name for a in outside if any(a.force)}
    for joint, mark in joints:
        items += _joint(scene, main, joint, mark, sizes, told=mark.name in named)
    items += [Item("footing", (a.spot,)) for a in outside if a.member == 0 and not a.pin and any(a.force)]
    # a spring or a cylinder is there whether its force is shown or not
    shown_pushers = [p for p, _, _ in scene.pushers(case) if forces or hasattr(p, "told")]
    items += [Item(m.shape, m.spots, m.along) for m in (p.mark(main) for p in shown_pushers)]
    items += _points(scene, main, sizes, [a.spot for a in outside])
    items += shown
    return Drawing(
        title=answer.mechanism.title or "Mechanism",
        unit=plain(edge.unit("length")),
        items=tuple(scaled(items, edge)),
        caption=caption(answer, poses, case),
    )


def moves(answer: StrokeAnswer) -> bool:
    """False if the mechanism stands in all poses, and only a load moves along it."""
    return any(np.ptp(q, axis=-1).any() for q in (answer.x, answer.y, answer.turn))


def check_pose(scene: Scene, poses: Sequence[int], case: int) -> None:
    """Raises Faults if a pose or case is not there to be drawn."""
    count, cases = scene.answer.drive.shape[-1], scene.answer.cases
    for pose in poses:
        if not 0 <= pose < count:
            raise fault(("stroke",), f"there is no pose {pose}", f"poses are numbered 0 to {count - 1}")
        if not scene.known(pose):
            raise fault(("stroke",), f"pose {pose} has no answer, so it cannot be drawn", "choose another")
    if not 0 <= case < len(cases):
        raise fault(("cases",), f"there is no case {case}", f"cases are numbered 0 to {len(cases) - 1}")


def caption(answer: StrokeAnswer, poses: Sequence[int], case: int) -> str:
    """Which pose and case it is: "turn of crank 30 deg, lighter 16 and 2 deg; case heavy"."""
    edge = Edge(answer)
    words = []
    if answer.drive_name:
        unit, places = plain(edge.unit("drive")), edge.drive_places(answer.drive)
        drives = [number(edge.one(answer.drive[0, 0, p], "drive"), places=places, trim=True) for p in poses]
        words.append(f"{answer.drive_name} {drives[0]} {unit}")
        if drives[1:]:
            words[0] += f", lighter {' and '.join(drives[1:])} {unit}"
    return "; ".join([*words, *_case(answer, case)])


def caption_at(answer: StrokeAnswer, drive: float, case: int) -> str:
    """The same for any value of the stroke."""
    edge = Edge(answer)
    words = []
    if answer.drive_name:
        value = number(edge.one(drive, "drive"), places=edge.drive_places(answer.drive), trim=True)
        words.append(f"{answer.drive_name} {value} {plain(edge.unit('drive'))}")
    return "; ".join([*words, *_case(answer, case)])


def _case(answer: StrokeAnswer, case: int) -> list[str]:
    return [f"case {answer.cases[case]}"] if answer.cases[case] else []


def scaled(items: Iterable[Item], edge: Edge) -> list[Item]:
    """The same items with their places in the file's unit of length."""
    factor = edge.one(1.0, "length")
    return [
        Item(i.shape, tuple((x * factor, y * factor) for x, y in i.spots), i.along, i.name, i.tone, i.size, i.hue)
        for i in items
    ]


def arrows(acts: Iterable[Acts], edge: Edge) -> list[Item]:
    """An arrow for each force, a bent arrow for each couple, with name and size; the ground's share is not drawn."""
    acts = [a for a in acts if a.member or a.pin]
    largest = max((float(np.hypot(*a.force)) for a in acts), default=0.0)
    items = []
    for a in acts:
        size = float(np.hypot(*a.force))
        if size > 1e-9 * largest:
            along = (a.force[0] / size, a.force[1] / size)
            text = f"{a.name} {edge.text(size, 'force')}"
            items.append(Item("arrow", (a.spot,), along, text, a.tone, size / largest))
        if abs(edge.one(a.moment, "moment")) > edge.zero("moment"):
            text = f"{a.name} {edge.text(abs(a.moment), 'moment')}"
            items.append(Item("couple", (a.spot,), (float(np.sign(a.moment)), 0.0), text, a.tone))
    return items


def _bodies(scene: Scene, at: Poses, tone: str) -> list[Item]:
    """Every member along its path, and a thin stem to each point that lies beside it."""
    items = []
    for hue, (name, member) in enumerate(scene.answer.mechanism.members.items()):
        if name == GROUND:
            continue
        body = scene.body(at, name)
        items.append(Item("bar", body, name=name if tone == "plain" else "", tone=tone, hue=hue))
        for point in member.points:
            spot = scene.point(at, point, name)
            foot = _foot(spot, body)
            if np.hypot(spot[0] - foot[0], spot[1] - foot[1]) > 1e-6 * scene.sketch.size:
                items.insert(-1, Item("stem", (foot, spot), tone=tone))
    return items


def _foot(spot: Spot, body: Sequence[Spot]) -> Spot:
    """The nearest place on a line of several pieces."""
    p = np.array(spot)
    feet = [np.array(body[0])]
    for a, b in zip(np.array(body), np.array(body[1:]).reshape(-1, 2), strict=False):
        span = float((b - a) @ (b - a))
        part = float(np.clip((p - a) @ (b - a) / span, 0, 1)) if span else 0.0
        feet.append(a + part * (b - a))
    best = min(feet, key=lambda f: float((p - f) @ (p - f)))
    return float(best[0]), float(best[1])


def _joint(scene: Scene, at: Poses, joint: Joint, mark: Mark, sizes: Mapping[str, str], *, told: bool) -> list[Item]:
    """The joint's own shape, and what carries it: the line it is guided along, or a footing on the ground."""
    grounded = "ground" if 0 in joint.members else "plain"
    # a pin is named by its point, and written there; a name at an arrow need not be written twice
    name = "" if told or mark.name in scene.sketch.points else _with_size(mark.name, sizes)
    items = list(toothed(scene, at, joint, mark)) if hasattr(joint, "place") else []
    items += [Item(f"round of {mark.shape}", _ring(x, y, r)) for x, y, r in mark.rounds]
    if mark.line:
        items.append(Item(f"line of {mark.shape}", mark.line, tone=grounded))
    items.append(Item(mark.shape, mark.spots, mark.along, name, grounded))
    if hasattr(joint, "contacts"):
        ends = (c for c in joint.contacts(at) if c.site.member == 0)
        items[:0] = [Item("footing", (scene.place(at, c.site),)) for c in ends]
    elif mark.line:
        pass  # it stands on its own line
    elif any(mark.along):
        items.insert(0, Item("guide", _reach(scene, joint, mark, at), mark.along, tone=grounded))
    elif 0 in joint.members:
        items.insert(0, Item("footing", mark.spots))
    return items


def _ring(x: float, y: float, r: float) -> tuple[Spot, ...]:
    """A circle by its centre and four places on it."""
    return (x, y), (x + r, y), (x, y + r), (x - r, y), (x, y - r)


def _outside(scene: Scene, pose: int, case: int) -> list[Acts]:
    return [*scene.acting(pose, case), *scene.hauling(pose, case), *_ground(scene, pose, case)]


def _reach(scene: Scene, joint: Joint, mark: Mark, here: Poses) -> tuple[Spot, Spot]:
    """Both ends of a guide: as far as the joint travels over the stroke, seen from the member that has the guide."""
    carrier = joint.members[-1]

    def travel(at: Poses) -> float:
        (x, y), (u, v) = joint.mark(at).spots[0], joint.mark(at).along
        return (x - float(at.x[carrier])) * u + (y - float(at.y[carrier])) * v

    poses = [p for p in range(scene.answer.drive.shape[-1]) if scene.known(p)]
    way = [travel(scene.at(p)) - travel(here) for p in poses]
    (x, y), (u, v) = mark.spots[0], mark.along
    return (x + u * min(way), y + v * min(way)), (x + u * max(way), y + v * max(way))


def _with_size(name: str, sizes: Mapping[str, str]) -> str:
    return f"{name}\n{sizes[name]}" if name in sizes else name


def _points(scene: Scene, at: Poses, sizes: Mapping[str, str], loaded: Sequence[Spot]) -> list[Item]:
    """Names of the points that members carry, each once; of the ground's own those where something acts."""
    found: dict[str, Item] = {}
    jointed = {mark.name for _, mark in scene.joints(at)}
    near = 1e-9 * scene.sketch.size
    for name, member in scene.answer.mechanism.members.items():
        for point in member.points:
            x, y = scene.point(at, point, name)
            acted = any(np.hypot(x - u, y - v) < near for u, v in loaded)
            if name != GROUND or point in jointed or acted:
                found.setdefault(point, Item("point", ((x, y),), name=_with_size(point, sizes)))
    return list(found.values())


def _ground(scene: Scene, pose: int, case: int) -> list[Acts]:
    """What the ground does to the mechanism at each joint: the other side of what it feels."""
    return [
        Acts(a.name, a.tone, -1, "", a.spot, (-a.force[0], -a.force[1]), -a.moment)
        for a in scene.bearings(pose, case)
        if a.member == 0
    ]


def _traces(scene: Scene, case: int, points: Sequence[str] | None) -> list[tuple[Spot, ...]]:
    """Ways of points over the whole stroke, as far as they move at all."""
    places = [scene.at(p, case) for p in range(scene.answer.drive.shape[-1]) if scene.known(p)]
    if points is None:
        ways = [
            tuple(pusher.mark(at).spots[k] for at in places)
            for pusher, tone, _ in scene.pushers(case)
            if tone in ("effort", "load")
            for k in range(len(pusher.mark(places[0]).spots))
        ]
    else:
        for name in points:
            scene.sketch.point(name)
        carriers = {name: scene.sketch.hub(name) for name in points}
        ways = [tuple(scene.point(at, name, member) for at in places) for name, member in carriers.items()]
    small = 1e-6 * scene.sketch.size
    return [w for w in ways if float(np.ptp(np.array(w), axis=0).max()) > small]
