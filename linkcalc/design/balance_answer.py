"""What the search for a balance returns."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.design.answer import Caveat, StrokeAnswer
from linkcalc.design.positions import Positions


@dataclass(frozen=True)
class FoundSize:
    """A size that was found, or was settled beforehand.

    value  [SI]; kind of it; open  True if it was to be found; rounded  True if it was rounded to its step
    """

    name: str
    kind: str
    value: float
    open: bool
    rounded: bool


@dataclass(frozen=True)
class FoundPart:
    """A counterweight or springs that were found.

    word    "counterweight", "spring", "gas spring"; on  the members it is on; number  how many alike
    """

    name: str
    word: str
    on: tuple[str, ...]
    number: int
    sizes: tuple[FoundSize, ...]

    def size(self, name: str) -> float:
        """[SI] KeyError with the known ones."""
        for one in self.sizes:
            if one.name == name:
                return one.value
        raise KeyError(f"no {name!r}; known: {', '.join(one.name for one in self.sizes)}")


@dataclass(frozen=True)
class Peak:
    """The largest effort over the stroke, whichever sense it has.

    value  [N] or [N m], with its sign; drive  [rad or m]
    """

    value: float
    case: str
    drive: float


@dataclass(frozen=True)
class StayTold:
    """How well it stays at an end of the stroke by itself.

    end    "start" or "end"; wanted  [N or N m] effort that it should take to leave; takes  that it takes at the least
    """

    end: str
    wanted: float
    takes: float
    case: str
    holds: bool


@dataclass(frozen=True)
class JointChange:
    """[N] the largest force of a joint over stroke and cases, before and after."""

    joint: str
    before: float
    after: float


@dataclass(frozen=True, eq=False)
class BalanceAnswer:
    """A mechanism before and after something was put in; all that is told of "after" is that of its own stroke.

    before, after   strokes of both models; after.mechanism is the model with it in
    goal            "least peak" or "least mean square"
    cases           names of the cases of the model over which it was made small
    found           what was put in
    peak_before, peak_after      the largest effort over those cases
    square_before, square_after  [N or N m] root of the mean square of the effort over those cases and even poses
    foretold        [N or N m] what the search foretold of the goal; the stroke must confirm it
    geometry        [N or N m] the least that any counterweight on these members could leave, however heavy and
                    wherever; nan where that has no answer (springs)
    exact           balanced at every pose: what is left is rounding
    starts, alike   starts of the search and how many of them ended as well as the best; 1 and 1 where all is linear
    elsewhere       some of those ended at other places: there are several answers as good
    seed            of the starts
    mass_before, mass_after  [kg] masses of all moving members and hung masses
    """

    before: StrokeAnswer
    after: StrokeAnswer
    goal: str
    cases: tuple[str, ...]
    found: tuple[FoundPart, ...]
    peak_before: Peak
    peak_after: Peak
    square_before: float
    square_after: float
    foretold: float
    geometry: float
    exact: bool
    starts: int
    alike: int
    elsewhere: bool
    seed: int
    stays: tuple[StayTold, ...]
    joints: tuple[JointChange, ...]
    mass_before: float
    mass_after: float
    positions_before: Positions
    positions_after: Positions
    caveats: tuple[Caveat, ...] = ()

    @property
    def lasting(self) -> tuple[int, ...]:
        """For each case of "after" the number of the case of "before" that it is, new or aged."""
        own = [max(len(a.mechanism.cases), 1) for a in (self.before, self.after)]
        senses = [len(a.cases) // n for a, n in zip((self.before, self.after), own, strict=True)]
        ages = own[1] // own[0]
        return tuple(
            senses[0] * (k // senses[1] // ages) + min(k % senses[1], senses[0] - 1)
            for k in range(len(self.after.cases))
        )

    @property
    def linear(self) -> bool:
        """True if there was nothing to search: the optimum is the only one."""
        return self.starts == 1

    @property
    def holds(self) -> bool:
        """True if no requirement fails and it stays where it should."""
        return self.after.holds and all(stay.holds for stay in self.stays)
