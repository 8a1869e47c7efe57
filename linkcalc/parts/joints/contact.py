"""Contact: a point of one member that may come against a face of another, a workpiece or a stop, which gives a little.

It pushes only, square to the face; where the point stands off the face there is no force.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, replace

import numpy as np

from linkcalc.faults import fault
from linkcalc.parts import fields
from linkcalc.parts.contract import Mark, Poses, Row, Size, Sketch, Value
from linkcalc.parts.gives import OneSided
from linkcalc.parts.joints.slot import SlotJoint
from linkcalc.parts.law_push import sure
from linkcalc.parts.lines import Line, guide
from linkcalc.words import word

LEFT, RIGHT = "left", "right"
_FACE = 0.04  # of the drawing: half the length of a face


@word("joint", "contact")
@dataclass(frozen=True)
class Contact:
    """A point that comes against a face: force square to it, pushing only, by how far the face is pressed in."""

    point: str = fields.name("point", "the point that comes against the face")
    along: Line = fields.line("the face: two points, or an angle from the x axis as drawn, with 'gap' or 'preload'")
    stiffness: Size = fields.size("stiffness", "of the contact: force over how far it is pressed in", sign="plus")
    side: str | None = fields.choice((LEFT, RIGHT), "the free side of the face; else that on which it is drawn", None)
    gap: Size | None = fields.size("length", "room in the drawing pose; else as drawn", None)
    preload: Size | None = fields.size("force", "force in the drawing pose", None, sign="plus")
    on: str = fields.name("member", "the member that has the face", "ground")
    of: str | None = fields.name("member", "the member that the point belongs to, if several carry it", None)
    friction: Size | None = fields.friction("of the contact")

    def joints(self, name: str, sketch: Sketch) -> Iterator[ContactJoint]:
        alone = self.of is not None or len(sketch.carriers(self.point)) < 2
        line = guide(sketch, self.along, self.on, self.point)
        stiffness = sketch.value(self.stiffness, "stiffness")
        mu = 0.0 if self.friction is None else sketch.value(self.friction, "number")
        joint = ContactJoint(name, sketch.site(self.point, self.of), line, "" if alone else self.point, mu,
                             stiffness=stiffness)  # fmt: skip
        (drawn,) = SlotJoint.gap(joint, sketch.drawn)
        sense = self._sense(drawn, sketch)
        room = sense * drawn
        if self.gap is not None and self.preload is not None:
            raise fault(("preload",), "a gap and a preload", "one of the two is wanted")
        if self.gap is not None:
            room = sketch.value(self.gap, "length")
        elif self.preload is not None:
            room = -sketch.value(self.preload, "force") / stiffness
        yield replace(joint, sense=sense, face=sense * drawn - room, half=_FACE * sketch.size)

    def _sense(self, drawn: Value, sketch: Sketch) -> float:
        """+1 if the free side is the left one. Raises Faults: the drawing does not tell."""
        if self.side is not None:
            return 1.0 if self.side == LEFT else -1.0
        if sure(np.abs(drawn) <= 1e-9 * sketch.size):
            line = "the face" if not isinstance(self.along, tuple) else " ".join(("the line", *self.along))
            raise fault(
                (),
                f"{self.point} is drawn on {line}",
                f"side = {LEFT!r} or {RIGHT!r} of it is wanted: where it is free",
            )
        return 1.0 if sure(drawn > 0) else -1.0


@dataclass(frozen=True, eq=False)
class ContactJoint(SlotJoint):
    """The row of a contact; gap = how far the point is off the face [m], below nothing where it presses.

    sense      +1 where the free side is to the left of the line, -1 to the right
    face       [m] how far the face stands from the line, towards the free side
    stiffness  [N/m]
    half       [m] half the length that the face is drawn with
    """

    sense: float = 1.0
    face: Value = 0.0
    stiffness: Value = 0.0
    half: float = 0.0
    word = "contact"

    @property
    def gives(self) -> tuple[OneSided]:
        return (OneSided(self.stiffness),)

    def gap(self, at: Poses) -> tuple[Value]:
        (left,) = SlotJoint.gap(self, at)
        return (self.sense * left - self.face,)

    def slope(self, at: Poses) -> tuple[Row]:
        (row,) = SlotJoint.slope(self, at)
        return (tuple((member, which, self.sense * value) for member, which, value in row),)

    def mark(self, at: Poses) -> Mark:
        """The point, and the face as it stands when nothing presses it, its free side to the left of the line."""
        mark = SlotJoint.mark(self, at)
        (x, y), (tx, ty) = mark.spots[0], (self.sense * part for part in mark.along)
        room = float(np.ravel(self.gap(at)[0])[0])
        foot = (x + room * ty, y - room * tx)
        ends = tuple((foot[0] + k * self.half * tx, foot[1] + k * self.half * ty) for k in (-1, 1))
        return Mark("contact", mark.spots, (tx, ty), self.name, line=ends)
