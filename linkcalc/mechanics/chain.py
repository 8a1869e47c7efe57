"""The kinematic chain: which row and column belongs to whom, and the stacked equations of all joints.

Columns are x, y, turn of member 1, of member 2, ...; rows are those of the joints in order, then the places that are
held while free members settle, then the one of the drive. A row that gives (an elastic link, a contact) is no
constraint: its multiplier follows from its gap, and it is told at the same place among the multipliers.
"""

from __future__ import annotations

import math
from collections.abc import Iterable, Sequence
from functools import cached_property
from typing import Protocol

import numpy as np

from linkcalc.mechanics.batch import tops
from linkcalc.mechanics.eliminate import Elimination, Factors
from linkcalc.mechanics.pushing import Acting
from linkcalc.mechanics.redundancy import Sharing
from linkcalc.mechanics.shared_factors import SharedElimination
from linkcalc.parts.contract import TURN, Drag, Drive, Give, Joint, Push, Row
from linkcalc.parts.pose import Array, Mask, Poses, Value

_ROUNDING = 2e-15  # of the size of the mechanism


class Holder(Protocol):
    """What can be stepped or held: a coordinate."""

    @property
    def kind(self) -> str: ...

    def value(self, at: Poses) -> Value: ...
    def hold(self, target: Value) -> Drive: ...


class Chain:
    """Joints between moving members, and at most one coordinate that is driven.

    moving      number of moving members
    rubs        (number of the joint, its friction or the like) of every joint that rubs
    drags       the same of every rope that loses on its pulleys
    toothed     True if some joint is known but for whole teeth or turns
    size        [m] size of the mechanism: what lengths are compared with
    holds       coordinates that are held besides the drive, while free members settle
    sharing     how joints share forces, if they hold more often than needed
    first_row   number of the first multiplier of each joint
    joint_rows  how many rows of joints are constraints
    row_joint   number of the joint of each of those
    gives       (number of the joint, number of its row, its law) of every row that gives
    """

    def __init__(
        self, moving: int, joints: Sequence[Joint], coordinate: Holder | None, size: float,
        holds: Sequence[Holder] = (), sharing: Sharing | None = None,
    ):  # fmt: skip
        self.sharing = sharing
        self.moving, self.joints, self.coordinate, self.size = moving, tuple(joints), coordinate, size
        self.holds = tuple(holds)
        self.columns = 3 * moving
        self.first_row: list[int] = []
        self.row_joint: list[int] = []
        self._kept: list[bool] = []
        gives: list[tuple[int, int, Give]] = []
        angular: list[bool] = []
        for k, joint in enumerate(self.joints):
            self.first_row.append(len(self._kept))
            laws = joint.gives if hasattr(joint, "gives") else (None,) * len(joint.angular)
            for i, (law, turns) in enumerate(zip(laws, joint.angular, strict=True)):
                self._kept.append(law is None)
                if law is None:
                    angular.append(turns)
                    self.row_joint.append(k)
                else:
                    gives.append((k, i, law))
        self.gives = tuple(gives)
        self._partly = {k for k, _, _ in gives}
        self.joint_rows = len(angular)
        self.rubs = tuple((k, rub) for k, joint in enumerate(self.joints) for rub in joint.rubs())
        dragging = ((k, joint.drag()) for k, joint in enumerate(self.joints) if hasattr(joint, "drag"))
        self.drags: tuple[tuple[int, Drag], ...] = tuple((k, drag) for k, drag in dragging if drag is not None)
        self.toothed = any(hasattr(joint, "grain") for joint in self.joints)
        angular.extend(hold.kind == "angle" for hold in self.holds)
        if coordinate is not None:
            angular.append(coordinate.kind == "angle")
        self.rows = len(angular)
        self.row_size = np.where(angular, size, 1.0)
        self.column_size = np.where(np.arange(self.columns) % 3 == TURN, size, 1.0)
        self.sizes: list[float] = self.column_size.tolist()
        self._gap_size = (self.row_size / size).tolist()
        self._gather: list[list[int]] | None = None
        self._elimination: Elimination | None = None
        self._shared: SharedElimination | None = None

    def driven_by(self, coordinate: Holder) -> Chain:
        """The same joints with another coordinate that is driven."""
        return Chain(self.moving, self.joints, coordinate, self.size, sharing=self.sharing)

    def equations(self, at: Poses, drive: Drive | None, held: Sequence[Drive] = ()) -> tuple[list[Value], list[Value]]:
        """Gaps, one a row, zero when it holds [m] or [rad]; and the entries of the Jacobian, at ``places``."""
        gaps: list[Value] = []
        rows: list[Row] = []
        for k, joint in enumerate(self.joints):
            if k in self._partly:
                kept = self._kept[self.first_row[k] : self.first_row[k] + len(joint.angular)]
                gaps.extend(gap for gap, keep in zip(joint.gap(at), kept, strict=True) if keep)
                rows.extend(row for row, keep in zip(joint.slope(at), kept, strict=True) if keep)
            else:
                gaps.extend(joint.gap(at))
                rows.extend(joint.slope(at))
        for one in held if drive is None else (*held, drive):
            gaps.append(one.gap(at))
            rows.append(one.slope(at))
        return gaps, self._entries(rows)

    def given(self, at: Poses, floor: float = 0.0) -> tuple[list[Value], list[Push]]:
        """Multipliers of the rows that give, and what they do to the members.

        floor  [N] what is no larger is nothing
        """
        multipliers: list[Value] = []
        pushes: list[Push] = []
        for k, i, law in self.gives:
            joint = self.joints[k]
            m = law.force(joint.gap(at)[i])
            if floor:
                m = np.where(np.abs(m) <= floor, 0.0, m)
            multipliers.append(m)
            for member, which, value in joint.slope(at)[i]:
                parts: list[Value] = [0.0, 0.0, 0.0]
                parts[which] = m * value
                pushes.append((member, *parts))  # type: ignore[arg-type]
        return multipliers, pushes

    @cached_property
    def floor(self) -> float:
        """[N] what forces of rows that give are known to: rounding of the places times their stiffness."""
        return max((_ROUNDING * float(np.max(law.stiffness)) * self.size for _, _, law in self.gives), default=0.0)

    def whole(self, solved: Sequence[Value], given: Sequence[Value]) -> list[Value]:
        """Multipliers of all rows of the joints, those that give among them; then those of holds and drive."""
        if not self.gives:
            return list(solved)
        left, extra = iter(solved), iter(given)
        return [next(left) if kept else next(extra) for kept in self._kept] + list(left)

    def _entries(self, rows: Sequence[Row]) -> list[Value]:
        flat = [value for row in rows for member, _, value in row if member]
        if self._gather is None:
            self._lay_out(rows)
            assert self._gather is not None
        return [flat[g[0]] if len(g) == 1 else sum((flat[k] for k in g[1:]), flat[g[0]]) for g in self._gather]

    def _lay_out(self, rows: Sequence[Row]) -> None:
        """Which flat values make up which entry: two of one row at one column add up."""
        at: dict[tuple[int, int], list[int]] = {}
        k = 0
        for i, row in enumerate(rows):
            for member, which, _ in row:
                if member:
                    at.setdefault((i, 3 * (member - 1) + which), []).append(k)
                    k += 1
        self.places = list(at)
        self._gather = list(at.values())

    def worst(self, gaps: Sequence[Value], live: Mask | None = None) -> float:
        """Largest gap of a batch over the size of the mechanism; inf if one is not a number."""
        if live is not None:
            each = self.worst_each(gaps)
            return float(np.max(each[np.broadcast_to(live, each.shape)], initial=0.0))
        parts = [t * size for t, size in zip(tops(gaps), self._gap_size, strict=True)]
        return max(parts) if all(p == p for p in parts) else math.inf

    def worst_each(self, gaps: Sequence[Value]) -> Array:
        """(1, variant, pose) largest gap of each pose over the size of the mechanism; inf for NaN."""
        worst: Value = np.zeros((1, 1, 1))
        for gap, size in zip(gaps, self._gap_size, strict=True):
            worst = np.maximum(worst, np.abs(gap) * size)
        out: Array = np.where(np.isfinite(worst), worst, np.inf)
        return out

    def factor(self, entries: Sequence[Value], at: Poses, *, lone: bool) -> Factors:
        """Factors of the square Jacobian. Raises NoPlan where it is singular throughout.

        lone  the entries are those of one pose, in plain floats
        """
        if self.sharing is not None:
            if self._shared is None:
                self._shared = SharedElimination(self.places, self.row_size, self.column_size)
            return self._shared.factor(entries, self.sharing.places(at), lone=lone)
        if self._elimination is None:
            self._elimination = Elimination(self.columns, self.places, self.row_size, self.column_size)
        return self._elimination.factor(entries, lone=lone)

    def share_plans(self, other: Chain) -> None:
        """Use the plans of a chain of the same joints with other sizes."""
        if other.columns == self.columns and other.rows == self.rows and (other._elimination or other._shared):
            self.places, self._gather, self._elimination = other.places, other._gather, other._elimination
            self._shared = other._shared

    def dense(self, entries: Sequence[Value]) -> Array:
        """(rows, columns) Jacobian of the first pose of a batch, rows and columns scaled to pure numbers."""
        out = np.zeros((self.rows, self.columns))
        for (i, j), e in zip(self.places, entries, strict=True):
            out[i, j] = float(np.asarray(e).flat[0])
        scaled: Array = out * self.row_size[:, None] / self.column_size
        return scaled


def pins_strained(chain: Chain, at: Poses, sized: Iterable[tuple[Acting, Value]]) -> list[Value]:
    """What pushers strain by acting on pins themselves, to follow the generalised forces; empty if none are shared."""
    if chain.sharing is None:
        return []
    on = [(p, size, q) for a, size in sized for p, q in zip(a.pusher.on_pins, a.pusher.push(at), strict=True) if p]
    return chain.sharing.beside(at, on)
