"""What a designer must not miss, found in the answer itself: dead points near by, change points, failed poses."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from typing import Any

import numpy as np

from linkcalc.design.answer import Caveat, Event
from linkcalc.design.curves import Curves
from linkcalc.design.events import SLACK
from linkcalc.design.limits import limits
from linkcalc.design.places import place
from linkcalc.design.unusual import unusual
from linkcalc.mechanics.balance import part_of_motion
from linkcalc.mechanics.path import Path
from linkcalc.mechanics.state import Status
from linkcalc.parts.pose import Array, Mask

_NOTHING = 1e-9  # of the largest force: no push, but rounding
_AT = 1e-8  # speed of load or effort over the fastest in the mechanism: a dead point
_NEAR = 0.05  # the same: the rigid answer is doubtful if, besides, the speed is falling to nothing
_ROUNDING = 1e-9  # of the size of the mechanism: a distance that is kept
_REACH = 0.1  # of the stroke: a dead point no farther than this beyond an end counts as close


def caveats(curves: Curves, path: Path | None, events: Sequence[Event]) -> tuple[Caveat, ...]:
    """All warnings of a solved stroke."""
    return (
        *_dead(curves, events),
        *_slack(curves, events),
        *_off_track(curves),
        *_out_of_mesh(curves),
        *_passed(curves, path),
        *_shared(curves),
        *_held(curves, events),
        *_free(curves, events),
        *_several(curves),
        *limits(curves),
        *unusual(curves.survey.ready.drawing),
        *_failed(curves),
    )


def _dead(curves: Curves, events: Sequence[Event]) -> Iterator[Caveat]:
    ready = curves.survey.ready
    if ready.chain.coordinate is None:
        return
    p = ready.pushing
    if p.effort_asked and not p.load and not p.rest:
        yield Caveat("effort", "nothing loads this mechanism, so there is nothing for the effort to hold")
    effort, load = part_of_motion(ready.chain, curves.shown.solved.closed, ready.pushing)
    texts = {
        "effort": "no effort however large holds the load there, and forces grow without bound near it",
        "load": "the force ratio grows without bound; stretch, clearances and friction set the real force",
    }
    asked = {"effort": ready.pushing.effort_asked, "load": bool(ready.pushing.load)}
    for name, part in (("effort", effort), ("load", load)):
        if not asked[name]:
            continue
        if np.max(part) < _AT and ready.steps:
            yield Caveat(
                name,
                f"the {name} has no lever arm anywhere in the stroke: it cannot move the mechanism, nor be moved by it",
            )
            continue
        inside = [e.drive for e in events if e.kind == "dead point" and e.quantity == name]
        least = np.min(part, axis=(0, 1))
        if inside:
            where = ", ".join(place(curves.survey.ready, d) for d in dict.fromkeys(inside))
            yield Caveat(name, f"dead point of the {name} at {where}: {texts[name]}")
        for k in sorted({0, least.size - 1, int(np.argmin(least))}):
            told = any(abs(d - curves.drive[k]) <= 1e-6 * np.ptp(curves.drive) for d in inside)
            if not told and (least[k] < _AT or (least[k] < _NEAR and not inside and _ahead(least, k))):
                where = f" at {place(curves.survey.ready, float(curves.drive[k]))}" if ready.steps else ""
                much = "at" if least[k] < _AT else "close to"
                yield Caveat(name, f"the pose{where} is {much} a dead point of the {name}: {texts[name]}")


def _slack(curves: Curves, events: Sequence[Event]) -> Iterator[Caveat]:
    """Ropes that would have to push."""
    cases = curves.survey.ready.pushing.cases
    for rope in curves.survey.ropes:
        samples = curves.samples(f"tension of {rope}")
        for k, case in enumerate(cases):
            if not np.any(samples[k] < -_NOTHING * curves.largest_force):
                continue
            where = [
                place(curves.survey.ready, e.drive)
                for e in events
                if (e.kind, e.quantity, e.case) == (SLACK, rope, case)
            ]
            told = f"slack from {' and '.join(where)} on" if len(where) == 1 else f"slack between {' and '.join(where)}"
            if not where:
                told = "slack throughout" if np.all(samples[k] < 0) else "slack at some poses"
            of_case = f" in case {case}" if case else ""
            yield Caveat(rope, f"the rope is {told}{of_case}: it cannot push; the answer there is not that of a rope")


def _off_track(curves: Curves) -> Iterator[Caveat]:
    """Points beyond the ends of the curve that guides them."""
    chain = curves.survey.ready.chain
    tracks: list[Any] = [joint for joint in chain.joints if hasattr(joint, "span")]
    for joint in tracks:
        travel = np.ravel(np.broadcast_to(joint.travel(curves.shown.solved.closed.at), (1, 1, curves.drive.size)))
        long, slack = float(np.ravel(joint.span)[0]), 1e-9 * chain.size
        off = np.nonzero((travel < -slack) | (travel > long + slack))[0]
        if off.size:
            ends = (place(curves.survey.ready, float(curves.drive[k])) for k in (off[0], off[-1]))
            where = " and ".join(dict.fromkeys(ends))
            yield Caveat(joint.name, f"its point is beyond an end of the track at {where}: the curve is only drawn on")


def _out_of_mesh(curves: Curves) -> Iterator[Caveat]:
    """Gears whose centres do not keep their distance."""
    chain = curves.survey.ready.chain
    for joint in (joint for joint in chain.joints if hasattr(joint, "astray")):
        off = np.ravel(np.broadcast_to(joint.astray(curves.shown.solved.closed.at), (1, 1, curves.drive.size)))
        off = np.where(np.isfinite(off), off, 0.0)
        k = int(np.argmax(np.abs(off)))
        if abs(off[k]) > _ROUNDING * chain.size:
            far = curves.survey.ready.drawing.shown(abs(float(off[k])))
            way = "out of mesh" if off[k] > 0 else "into each other"
            where = place(curves.survey.ready, float(curves.drive[k]))
            much = f"by {far} at {where}, the most of its computed poses"
            yield Caveat(joint.name, f"its teeth come {way} {much}: the centres do not keep their distance")


def _ahead(part: Array, k: int) -> bool:
    """True if the speed runs to zero a little beyond the end of the stroke where it is least."""
    last = part.size - 1
    if last < 1 or k not in (0, last):
        return False
    fall = part[1] - part[0] if k == 0 else part[last - 1] - part[last]
    return bool(fall > 0 and part[k] / fall <= _REACH * last)


def _passed(curves: Curves, path: Path | None) -> Iterator[Caveat]:
    for a, b in path.passed if path else ():
        where = f"{place(curves.survey.ready, a)} and {place(curves.survey.ready, b)}"
        yield Caveat(
            "stroke",
            f"between {where} the stroke passes a change point: the mechanism could also go on another way from there",
        )


def _shared(curves: Curves) -> Iterator[Caveat]:
    """Joints among which forces are shared."""
    sharing = curves.survey.ready.chain.sharing
    if sharing is None:
        return
    times = "once" if sharing.excess == 1 else f"{sharing.excess} times"
    by = "by the stiffness given" if sharing.given else "as if all were equally stiff"
    yield Caveat(
        ", ".join(sharing.names),
        f"held {times} more than needed: forces are shared among these joints {by}; tolerances, clearances and the "
        "give of the members decide the real shares",
    )


def _held(curves: Curves, events: Sequence[Event]) -> Iterator[Caveat]:
    """Where friction holds the mechanism without any effort: none moves it on and none lets it back."""
    pushing = curves.survey.ready.pushing
    if not pushing.rubbing or not pushing.effort_asked:
        return
    effort = curves.samples("effort")
    for case in range(0, len(pushing.cases), 2):
        with np.errstate(invalid="ignore"):
            holds = effort[case] * effort[case + 1] < 0
        names = pushing.cases[case : case + 2]
        edges = [e.drive for e in events if e.kind == "self-locking edge" and e.case in ("", *names)]
        of = f", case {names[0]}" if len(pushing.cases) > 2 else ""
        for start, stop in _runs(holds):
            ends = [_edge(curves, edges, k, step) for k, step in ((start, -1), (stop, 1))]
            where = "in the drawing pose"
            if curves.survey.ready.steps:
                where = f"from {place(curves.survey.ready, ends[0])} to {place(curves.survey.ready, ends[1])}"
            yield Caveat(
                "effort",
                f"holds by itself {where}{of}: friction alone keeps the load; an effort the other way lets it back",
            )


def _several(curves: Curves) -> Iterator[Caveat]:
    """Where the equations of friction have another solution."""
    ready, several = curves.survey.ready, curves.shown.solved.balance.several
    if several is None:
        return
    for case, name in enumerate(ready.pushing.cases):
        for start, stop in _runs(np.broadcast_to(several, curves.shown.solved.balance.status.shape)[case, 0]):
            where = "in the drawing pose"
            if ready.steps:
                first, last = (place(ready, float(curves.drive[k])) for k in (start, stop))
                where = f"from {first} to {last}" if start < stop else f"at {first}"
            yield Caveat(
                "effort",
                f"friction has more than one answer {where}, case {name}: the one told hangs together with that "
                "without friction; in the other the mechanism is wedged",
            )


def _runs(holds: Mask) -> list[tuple[int, int]]:
    """First and last of each row of neighbours that are True."""
    change = np.flatnonzero(np.diff(np.concatenate([[False], holds, [False]]).astype(int)))
    return [(int(a), int(b) - 1) for a, b in zip(change[::2], change[1::2], strict=True)]


def _edge(curves: Curves, edges: Sequence[float], k: int, step: int) -> float:
    """The exact edge between a pose and its neighbour, or the pose where the stroke ends there."""
    if 0 <= k + step < curves.drive.size:
        low, high = sorted((curves.drive[k], curves.drive[k + step]))
        inside = [e for e in edges if low <= e <= high]
        if inside:
            return inside[0]
    return float(curves.drive[k])


def _free(curves: Curves, events: Sequence[Event]) -> Iterator[Caveat]:
    """Members that settle by themselves: which, and whether they would stay there."""
    ready = curves.survey.ready
    steady = curves.shown.solved.closed.steady
    if steady is None:
        return
    cases, free = ready.pushing.cases, ready.drawing.mechanism.free
    if free:
        yield Caveat(", ".join(free), "nothing drives it: it is shown where it settles in balance" if len(free) == 1
                     else "nothing drives them: they are shown where they settle in balance")  # fmt: skip
    for value, text in ((-1, "unstable: the least push lets it fall to another"),
                        (0, "neutral: it stays wherever it is put")):  # fmt: skip
        for case, of in enumerate(cases):
            poses = np.flatnonzero((steady[case] == value).any(axis=0))
            if poses.size:
                all_along = poses.size == steady.shape[2]
                ends = dict.fromkeys(place(ready, float(curves.drive[k])) for k in (poses[0], poses[-1]))
                where = (
                    "" if all_along else f" from {' to '.join(ends)}" if len(ends) > 1 else f" at {next(iter(ends))}"
                )
                yield Caveat("stroke", f"the balance is {text}{where}{f' (case {of})' if of else ''}")
    for e in events:
        if e.kind == "snap-through":
            of = f" (case {e.case})" if e.case else ""
            yield Caveat(
                "stroke", f"it snaps through at {place(ready, e.drive)}{of}: its balance ends there and {e.quantity} "
                "jumps to another; what it hits, and the energy let loose, are not calculated",
            )  # fmt: skip


def _failed(curves: Curves) -> Iterator[Caveat]:
    status = curves.shown.solved.balance.status
    for code in sorted(set(status.ravel().tolist())):
        if code == Status.FINE:
            continue
        poses = sorted({int(k) for k in np.nonzero(status == code)[2]})
        where = ", ".join(place(curves.survey.ready, float(curves.drive[k])) for k in poses[:3]) + (
            " ..." if len(poses) > 3 else ""
        )
        yield Caveat("stroke", f"{len(poses)} pose{'s' if len(poses) > 1 else ''} without an answer ({where}): "
                     + Status(code).text)  # fmt: skip
