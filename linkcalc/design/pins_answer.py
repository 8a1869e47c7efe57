"""What ``pins`` returns: what every joint carries at its worst, how it turns, what stands on the ground. SI."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING

from linkcalc.design.answer import Felt, StrokeAnswer
from linkcalc.parts.pose import Array

if TYPE_CHECKING:  # most questions take no sizes
    from linkcalc.design.sizing.stack import PinStack
    from linkcalc.design.sizing.working import Choice, Working

GUIDE, ROPE = "guide", "rope"
"""Parts that are no part of a pin."""


@dataclass(frozen=True)
class Peak:
    """A largest or smallest value over the whole stroke and all cases, found exactly.

    value    SI; nan if there is none, infinite at a dead point
    case     name of its load case
    drive    [rad or m] where it is; nan without a stroke
    variant  number of the copy that it is of; None: the mechanism as drawn
    felt     of a joint's force what each of its members feels there
    """

    value: float
    case: str
    drive: float
    variant: int | None = None
    felt: tuple[Felt, ...] = ()


@dataclass(frozen=True, eq=False)
class Rose:
    """Where the force of a joint on one member points, from the member's own axis, in all cases and poses.

    The joint presses that way on the member's bore, so the same angle is where bore and pin touch.

    direction  (case, pose) [rad] counter-clockwise plus; nan where there is no force
    force      (case, pose) [N]
    sectors    (36) [N] the largest force into each ten degrees, the first from -5 to 5
    free       [rad] widest sector that no force points into: from its first angle counter-clockwise to its second, the
               first within 0 and one turn; None if there is no force at all
    """

    direction: Array
    force: Array
    sectors: Array
    free: tuple[float, float] | None

    @property
    def free_angle(self) -> float:
        """[rad] how wide the free sector is; 0 without one."""
        return self.free[1] - self.free[0] if self.free else 0.0


@dataclass(frozen=True, eq=False)
class SideLoad:
    """What a joint does to one member.

    largest  its own worst, which of three members on a pin need not be that of the joint
    rose     None for the pin itself, which has no axis
    """

    member: str
    largest: Peak
    rose: Rose | None


@dataclass(frozen=True)
class Swing:
    """How one member of a joint moves against another over the stroke, one way.

    kind       "angle" where it turns, "length" where it slides
    low, high  [rad or m] from the drawing pose
    path       [rad or m] the whole way, turning back counted
    turns      [rad or m] values of the stroke where it turns back
    fastest    [-, rad/m, m/rad] largest speed for a unit speed of the stroke, and where
    mean_load  [N] root-mean-cube of the force over the way, the worst case; there and back where it rubs
    mean_case  name of that case
    way        [m] path of rubbing: half the diameter times the path; the path where it slides; nan without a diameter
    speed      [m/s] largest speed of rubbing; nan without a rate
    mean_speed [m/s] way over the time of a stroke
    """

    member: str
    against: str
    kind: str
    low: float
    high: float
    path: float
    turns: tuple[float, ...]
    fastest: float
    fastest_at: float
    mean_load: float
    mean_case: str
    way: float
    speed: float
    mean_speed: float

    @property
    def reach(self) -> float:
        """[rad or m] from one extreme to the other."""
        return self.high - self.low


@dataclass(frozen=True)
class Reversal:
    """A pose where what a joint carries turns round: a two-force member from pull to push, a guide from side to side.

    of  the two-force member, or the guide; case  "" where it is the same in all
    """

    of: str
    case: str
    drive: float


@dataclass(frozen=True, eq=False)
class Sized:
    """A part of a joint under what it must carry.

    item      "pin", "bush", "bearing", "eye of arm", "guide", "rope"
    required  [m] the smallest size that would do (of a guide its length); of a rope the breaking load [N]; None where
              sizes come from a list only, or are not looked for
    chosen    what it is called where one was chosen: "16 mm", a designation; "" if its size is given, or none does
    size      [m] diameter of a pin, length of a bush or guide; [N] breaking load of a rope; nan otherwise
    working   the calculation; choice  how it was chosen, None for a given size
    stack     of a pin with a stack: its plates and what they do to it in the pose that uses it most; else None
    kind      of required and size: "length" or "force"
    worst     of a guide its edge pressure [Pa], of a rope its tension [N], in the pose that the sheet is of; else None
    """

    item: str
    required: float | None
    chosen: str
    size: float
    working: Working
    choice: Choice | None
    stack: PinStack | None = None
    kind: str = "length"
    worst: Peak | None = None

    @property
    def utilisation(self) -> float:
        """[-] used part of what is allowed."""
        return float(self.working.utilisation)


@dataclass(frozen=True, eq=False)
class JointLoad:
    """What one joint carries over the whole stroke and all cases.

    word      "pin", "slot", "slide", "weld", "track", "rope"
    largest, smallest  [N] of the force; of several members the largest that any feels
    moment    [N m] largest moment, with its sign; None where the joint takes none
    diameter  [m] of a pin, if it is known
    sized     the parts of a pin, or a guide whose face is told; empty otherwise, and where the force has no bound
    """

    joint: str
    word: str
    largest: Peak
    smallest: Peak
    moment: Peak | None
    sides: tuple[SideLoad, ...]
    swings: tuple[Swing, ...]
    reversals: tuple[Reversal, ...]
    diameter: float
    sized: tuple[Sized, ...] = ()

    @property
    def swing(self) -> Swing | None:
        """The widest turn of its members; None for what does not turn."""
        turning = [s for s in self.swings if s.kind == "angle"]
        return max(turning, key=lambda s: s.reach) if turning else None


@dataclass(frozen=True)
class RopeLoad:
    """Largest and smallest tension of a rope [N].

    sized  the rope against its breaking load, if that is told
    """

    rope: str
    largest: Peak
    smallest: Peak
    sized: tuple[Sized, ...] = ()


@dataclass(frozen=True)
class Footing:
    """What the mechanism does to its foundation: all forces on the ground together.

    about  [m] the point that moments are taken about, ground axes
    force  [N] the largest resultant, with its direction
    right, left, up, down  [N] largest parts of the resultant; below nothing where it never goes that way
    left_turning, right_turning  [N m] largest overturning moments about the point, counter-clockwise and clockwise
    """

    about: tuple[float, float]
    force: Peak
    right: Peak
    left: Peak
    up: Peak
    down: Peak
    left_turning: Peak
    right_turning: Peak


@dataclass(frozen=True, eq=False)
class PinsAnswer:
    """What every pin, slot, slide, weld and rope must carry.

    stroke    poses, forces, verdicts, warnings of the mechanism as drawn
    joints    in the order of the stroke's
    time      [s] of one stroke, one way; nan if no rate was stated
    rounds    True if the stroke goes once or more all the way round and does not come back
    variants  how many copies with other sizes were looked at
    """

    stroke: StrokeAnswer
    joints: tuple[JointLoad, ...]
    ropes: tuple[RopeLoad, ...]
    footing: Footing | None
    time: float
    rounds: bool
    variants: int

    @property
    def sized(self) -> dict[str, tuple[Sized, ...]]:
        """Joint or rope -> its parts under what they must carry, of those that have any."""
        every = {j.joint: j.sized for j in self.joints} | {r.rope: r.sized for r in self.ropes}
        return {name: sized for name, sized in every.items() if sized}

    @property
    def holds(self) -> bool:
        """True if no requirement fails, and at least one pose has an answer."""
        return self.stroke.holds

    def joint(self, name: str) -> JointLoad:
        """The joint of that name; KeyError with the known ones."""
        for joint in self.joints:
            if joint.joint == name:
                return joint
        raise KeyError(f"no joint {name}; known: {', '.join(j.joint for j in self.joints)}")
