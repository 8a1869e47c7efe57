"""What became of each entry of a batch. A failed entry is NaN and has a status; never one without the other."""

from __future__ import annotations

from enum import IntEnum


class Status(IntEnum):
    """Outcome of one (case, variant, pose). The text is what the answer says about it."""

    FINE = 0
    NOT_DRAWN = 1
    OUT_OF_REACH = 2
    BRANCH_LOST = 3
    DEAD_POINT = 4
    SINGULAR = 5
    JAMMED = 6
    NO_FORCE = 7
    UNSETTLED = 8
    NO_FIT = 9

    @property
    def text(self) -> str:
        return _TEXTS[self]


_TEXTS = {
    Status.FINE: "fine",
    Status.NOT_DRAWN: "this copy cannot be drawn: its arcs do not meet",
    Status.OUT_OF_REACH: "the stroke's coordinate cannot be brought there: beyond the limit of motion",
    Status.BRANCH_LOST: "the way the mechanism is assembled would have to change on the way there",
    Status.DEAD_POINT: "dead point: no finite effort or load answers here",
    Status.JAMMED: "jams: friction grows as fast as the effort, however large",
    Status.SINGULAR: "the joints do not hold the members in this pose",
    Status.UNSETTLED: "the free members find no balance there",
    Status.NO_FIT: "with these sizes joints that hold more than needed do not fit, or it is beyond the limit of motion",
    Status.NO_FORCE: "a load has no force there: it is outside the range that it is told for",
}
