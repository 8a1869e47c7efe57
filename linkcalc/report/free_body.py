"""One member on its own: every force on it as an arrow, and a table by which its balance can be checked by hand."""

from __future__ import annotations

import math
from collections.abc import Iterator
from dataclasses import replace

import numpy as np

from linkcalc.design.answer import StrokeAnswer, plate
from linkcalc.faults import fault
from linkcalc.model.mechanism import GROUND
from linkcalc.parts.contract import Joint, Mark
from linkcalc.parts.pose import Poses
from linkcalc.report.blocks import Cell, Column, Drawing, Item, Table
from linkcalc.report.drawing import arrows, caption, check_pose, scaled
from linkcalc.report.edge import Edge
from linkcalc.report.numbers import plain
from linkcalc.report.scene import Acts, Scene
from linkcalc.report.toothed import toothed
from linkcalc.words import nearest


def free_body(answer: StrokeAnswer, member: str, *, pose: int = 0, case: int = 0) -> Drawing:
    """A member cut free in one pose of one case, with its table.

    Raises Faults: an unknown member, the ground, a pose or case that is not there or has no answer.
    """
    scene, edge = Scene(answer), Edge(answer)
    check_member(answer, member)
    check_pose(scene, (pose,), case)
    at = scene.at(pose, case)
    entry = answer.mechanism.members[member]
    items = [item for joint, mark in scene.joints(at) for item in _teeth(scene, at, member, joint, mark)]
    items += [Item("bar", scene.body(at, member), name=member, hue=list(answer.mechanism.members).index(member))]
    items += [Item("point", (scene.point(at, p, member),), name=p) for p in dict.fromkeys(entry.points)]
    items += arrows(acting_on(scene, member, pose, case), edge)
    told = [caption(answer, (pose,), case)] + [
        f"{a.name} acts on pin {a.pin} itself, not on this member"
        for a in scene.acting(pose, case)
        if a.pin in entry.points
    ]
    return Drawing(
        title=f"{answer.mechanism.title or 'Mechanism'}: {plate(member, entry.copies)} cut free",
        unit=plain(edge.unit("length")),
        items=tuple(scaled(items, edge)),
        caption="; ".join(t for t in told if t),
        tables=(free_body_table(answer, member, pose=pose, case=case),),
    )


def _teeth(scene: Scene, at: Poses, member: str, joint: Joint, mark: Mark) -> Iterator[Item]:
    """What the member has of a joint with teeth, and the place where it meets the other."""
    index = scene.sketch.member(member)
    if hasattr(joint, "place") and index in joint.members:
        yield from toothed(scene, at, joint, mark, index)
        yield Item(mark.shape, mark.spots)


def free_body_table(answer: StrokeAnswer, member: str, *, pose: int = 0, case: int = 0) -> Table:
    """What acts on a member: where (from its first point), components, moment about that point, and their sums."""
    scene, edge = Scene(answer), Edge(answer)
    check_member(answer, member)
    check_pose(scene, (pose,), case)
    first = answer.mechanism.members[member].points[0]
    x, y = scene.point(scene.at(pose, case), first, member)
    acts = acting_on(scene, member, pose, case)
    length, force, moment = (edge.unit(k) for k in ("length", "force", "moment"))
    rows: list[tuple[Cell, ...]] = [
        (
            a.name, edge.one(a.spot[0] - x, "length"), edge.one(a.spot[1] - y, "length"),
            edge.one(a.force[0], "force"), edge.one(a.force[1], "force"), edge.one(a.about(x, y), "moment"),
        )
        for a in acts
    ]  # fmt: skip
    totals = [math.fsum(float(row[k] or 0.0) for row in rows) for k in (3, 4, 5)]
    heads = ("x from " + first, "y from " + first, "Fx", "Fy", "moment about " + first)
    units = (length, length, force, force, moment)
    # like decimals in a column, so that it can be added up on paper; the two force columns share theirs
    sizes = [max(abs(float(row[k] or 0.0)) for row in rows) if rows else 0.0 for k in (1, 2, 3, 4, 5)]
    sizes[0] = sizes[1] = max(sizes[:2])
    sizes[2] = sizes[3] = max(sizes[2:4])
    # of a two-force member every moment is nothing: its figures are those of the forces' arms
    arm = float(np.hypot(*np.ptp([a.spot for a in acts], axis=0))) if acts else 0.0
    force_size = max((float(np.hypot(*a.force)) for a in acts), default=0.0)
    sizes[4] = max(sizes[4], 1e-3 * edge.one(force_size * arm, "moment"))
    columns = (
        Column(f"on {member}"),
        *(
            Column(head, unit, places=_places(size), zero=1e-9 * size)
            for head, unit, size in zip(heads, units, sizes, strict=True)
        ),
    )
    rows.append(("sum", "", "", *totals))
    return Table(columns, tuple(rows), f"Forces on {plate(member, answer.mechanism.members[member].copies)}, cut free")


def _places(size: float) -> int:
    """Decimal places that show the largest of a column to five figures."""
    return max(0, 4 - math.floor(math.log10(size))) if size > 0 else 1


def acting_on(scene: Scene, member: str, pose: int, case: int) -> list[Acts]:
    """Everything that acts on one member, or on one plate of it: joints first, then loads."""
    index = scene.sketch.member(member)
    joints = [a for a in scene.bearings(pose, case) if a.member == index]
    copies = scene.answer.mechanism.members[member].copies
    loads = [a for a in scene.acting(pose, case) if a.member == index and not a.pin]
    return joints + [
        replace(a, force=(a.force[0] / copies, a.force[1] / copies), moment=a.moment / copies) for a in loads
    ]


def check_member(answer: StrokeAnswer, member: str) -> None:
    """Raises Faults unless it is a moving member."""
    moving = [m for m in answer.mechanism.members if m != GROUND]
    if member not in moving:
        raise fault(("members", member), "there is no such member to cut free", nearest(member, moving))
