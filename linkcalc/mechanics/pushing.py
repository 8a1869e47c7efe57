"""What pushes, case by case, gathered for the whole batch: the effort, the load, and all the rest."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass

import numpy as np

from linkcalc.model.parts_list import EFFORT, LOAD, Assembly
from linkcalc.parts.contract import Push, Pusher
from linkcalc.parts.pose import Mask, Poses, Value, zero

Column = list[Value]


@dataclass(frozen=True, eq=False)
class Acting:
    """A pusher with its factor in each case: float if the same in all, else (case, 1, 1)."""

    pusher: Pusher
    factor: Value


@dataclass(frozen=True, eq=False)
class Pushing:
    """Everything that pushes in a model.

    cases    names of the cases, ("",) if the model has none
    effort   the effort; of several, one for each of some cases; empty for a frame
    load     the load; empty if there is none
    rest     all other loads and weights
    down, field  direction [-] and strength [m/s2] of gravity, float or (case, 1, 1)
    sense    +1 in a case that moves along the stroke, -1 in one that moves back: float or (case, 1, 1)
    rubbing  True if something rubs: then each case comes twice
    forward  which way the drive moves along the stroke, +1 or -1; 0.0 without a stroke: the way the effort pushes
    """

    cases: tuple[str, ...]
    effort: tuple[Acting, ...]
    load: tuple[Acting, ...]
    rest: tuple[Acting, ...]
    down: tuple[Value, Value]
    field: Value
    sense: Value = 1.0
    forward: float = 1.0
    rubbing: bool = False

    @property
    def effort_asked(self) -> bool:
        """True if the effort is the unknown."""
        return any(a.pusher.size is None for a in self.effort)

    @property
    def load_asked(self) -> bool:
        """True if the load is the unknown."""
        return any(a.pusher.size is None for a in self.load)

    @property
    def all(self) -> tuple[Acting, ...]:
        return (*self.effort, *self.load, *self.rest)


def pushing(assembly: Assembly, *, rubbing: bool, forward: float) -> Pushing:
    """Gather the pushers of all cases.

    rubbing  there is friction: every case comes twice, moving along the stroke and moving back
    forward  see Pushing
    """
    cases = tuple(c for c in assembly.cases for _ in range(1 + rubbing))
    efforts: list[Acting] = []
    loads: list[Acting] = []
    rest: list[Acting] = []
    for key, pusher in assembly.pushers.items():
        if key[1] == EFFORT:
            factor = _by_case([1.0 if c.effort == key else 0.0 for c in cases])
            efforts.append(Acting(pusher, factor))
            continue
        # a load that is asked for is what it is: a factor on it would only scale the answer
        factors = [c.factors.get(key, 0.0) if pusher.size is not None else 1.0 for c in cases]
        (loads if key == ("", LOAD) else rest).append(Acting(pusher, _by_case(factors)))
    down = (_stacked([c.down[0] for c in cases]), _stacked([c.down[1] for c in cases]))
    field = _stacked([c.field for c in cases])
    used = [a for a in efforts if not (isinstance(a.factor, float) and a.factor == 0.0)]
    names = tuple(c.name for c in cases)
    sense: Value = 1.0
    if rubbing:
        names = tuple(_both_ways(n)[k % 2] for k, n in enumerate(names))
        sense = _by_case([1.0 - 2.0 * (k % 2) for k in range(len(cases))])
    return Pushing(names, tuple(used), tuple(loads), tuple(rest), down, field, sense, forward, rubbing)


def _both_ways(name: str) -> tuple[str, str]:
    """What a case is called when it moves along the stroke, and when it moves back."""
    return (name, f"{name} (back)") if name else ("forward", "back")


def strength(acting: Sequence[Acting], at: Poses) -> Value:
    """[N] or [N m] how strong the effort or load is in each case."""
    total: Value = 0.0
    for a in acting:
        total = total + _own(a, at)
    return total


def sized_pushers(
    pushing: Pushing, at: Poses, effort: Value, load: Value, seals: Sequence[Value] = ()
) -> Iterator[tuple[Acting, Value]]:
    """Every pusher with the strength it has in each case.

    seals  friction within each of them, along its push: what is left is what its pins feel
    """
    each: list[tuple[Acting, Value]] = [
        *((acting, acting.factor * effort if len(pushing.effort) > 1 else effort) for acting in pushing.effort),
        *((acting, load) for acting in pushing.load),
        *((acting, strength([acting], at)) for acting in pushing.rest),
    ]
    for k, (acting, size) in enumerate(each):
        yield acting, (size + seals[k] if seals else size)


def acts(acting: Sequence[Acting]) -> Iterator[tuple[Acting, Value]]:
    """The same of an effort or load for a strength of 1."""
    for a in acting:
        # of the factors of alternatives only "acts in this case or not" counts
        yield a, _plain(np.sign(np.abs(a.factor))) if len(acting) > 1 else 1.0


def unknown(acting: Sequence[Acting], at: Poses) -> Mask | None:
    """Where something that acts has no strength at all, because it is not told there. None: nowhere."""
    lost = [np.isnan(_own(a, at)) for a in acting if _partial(a) and a.pusher.size is not None]
    lost = [mask for mask in lost if mask.any()]
    return np.logical_or.reduce(np.broadcast_arrays(*lost)) if lost else None


def through(pushing: Pushing, joint: str, at: Poses) -> tuple[Value, Value]:
    """What all that push through a joint give it together: known [N], and so many times the unknown."""
    known: Value = 0.0
    part: Value = 0.0
    for acting, asked in (
        *((a, pushing.effort_asked) for a in pushing.effort),
        *((a, pushing.load_asked) for a in pushing.load),
        *((a, False) for a in pushing.rest),
    ):
        if getattr(acting.pusher, "through", "") == joint:
            if asked:
                part = part + present(acting)
            else:
                known = known + _own(acting, at)
    return known, part


def present(a: Acting) -> Value:
    """1 in a case that it acts in, else 0."""
    return _plain(np.sign(np.abs(a.factor)))


def seal(a: Acting) -> Value:
    """[N] friction within it, 0.0 if it has none."""
    within: Value = getattr(a.pusher, "seal", 0.0)
    return within


def _own(a: Acting, at: Poses) -> Value:
    """Strength times factor; nothing in a case that it does not act in, even where it has none."""
    strength = a.factor * a.pusher.strength(at)
    return np.where(np.equal(a.factor, 0.0), 0.0, strength) if _partial(a) else strength


def _partial(a: Acting) -> bool:
    partial: bool = getattr(a.pusher, "partial", False)
    return partial


def column(acting: Sequence[Acting], at: Poses, columns: int, *, unit: bool) -> Column:
    """What they do to the coordinates of the members: (columns) generalised forces [N] and [N m].

    unit  for a strength of 1; else for their own strength and factor
    """
    out: Column = [0.0] * columns
    for a, one in acts(acting):
        add_pushes(out, one if unit else _own(a, at), a.pusher.push(at))
    return out


def add_pushes(out: Column, size: Value, pushes: Sequence[Push]) -> None:
    """Add what some pushes of a size do to the coordinates."""
    for member, *parts in pushes:
        for which, part in enumerate(parts):
            if member and not zero(part) and not zero(size):
                k = 3 * (member - 1) + which
                out[k] = out[k] + _product(size, part)


def _product(a: Value, b: Value) -> Value:
    return b if isinstance(a, float) and a == 1.0 else a * b


def _by_case(values: Sequence[float]) -> Value:
    if len(set(values)) == 1:
        return float(values[0])
    return np.array(values, float).reshape(-1, 1, 1)


def _stacked(values: Sequence[Value]) -> Value:
    if all(isinstance(v, float) for v in values):
        return _by_case([float(v) for v in values])
    return np.concatenate(np.broadcast_arrays(*(np.reshape(v, (1, -1, 1)) for v in values)), axis=0)


def _plain(value: Value) -> Value:
    return value if np.ndim(value) else float(value)
