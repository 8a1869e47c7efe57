"""What parts tell of themselves: sizes, limits that should hold, what can hurt. See ``contract``."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Protocol

from linkcalc.parts.pose import Poses, Value


@dataclass(frozen=True, eq=False)
class Told:
    """Something that a load can say of itself in each pose, beside its push.

    name   "force", "length", "pressure"; requirements and columns call it "length of NAME"
    kind   kind of its size
    value  from the poses, the strength it has in them [SI], and the sense of its motion: +1.0 where it moves along its
           push, -1.0 against it, 0.0 if it stands
    """

    name: str
    kind: str
    value: Callable[[Poses, Value, Value], Value]


@dataclass(frozen=True, eq=False)
class Limit:
    """Something that should hold in every pose. Where it does not, the answer warns, and says from where to where.

    text  what is so beyond it: "shorter than its shortest, 40 mm"
    room  from the poses and the strength in them, [SI]; below nothing where the limit is passed
    """

    text: str
    room: Callable[[Poses, Value], Value]


class Telling(Protocol):
    """What a pusher may have besides: see ``LawPush``. One that has not tells nothing and has no limits.

    cautions     what can hurt
    temperature  [K] at which its strength is what it says; the strength grows with the absolute temperature. None: it
                 does not
    partial      True if its strength is not a number in some poses, because there is none
    seal         [N] friction within it, whatever it pushes, against its motion
    """

    cautions: tuple[str, ...]
    temperature: float | None
    partial: bool
    seal: Value

    def told(self) -> tuple[Told, ...]: ...
    def limits(self) -> tuple[Limit, ...]: ...
