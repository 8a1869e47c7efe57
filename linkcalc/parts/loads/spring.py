"""Spring: a coil between two points, in tension, in compression, or in both."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.faults import fault
from linkcalc.parts import fields
from linkcalc.parts.contract import Limit, Size, Sketch, Value
from linkcalc.parts.law_push import TELLS_FORCE, LawPush, between, nominal, sure
from linkcalc.parts.laws.linear import BOTH, COMPRESSION, TENSION, Linear
from linkcalc.parts.paths.straight import Straight, drawn_length, straight
from linkcalc.words import word


@word("load", "spring")
@dataclass(frozen=True)
class Spring:
    """A coil spring between two points: force = rate (free length - length), plus pushes them apart.

    With a free length of 0 it pulls with its whole length, as one whose free length is hidden by a cable and pulley.
    """

    spring: tuple[str, str] = fields.names("point", "the two points it is hooked to")
    rate: Size = fields.size("stiffness", "force for each length it is stretched or pressed", sign="plus")
    free_length: Size | None = fields.size("length", "length without force", None, sign="not minus")
    preload: Size | None = fields.size("force", "force in the drawing pose: plus pushes apart, minus draws", None)
    acts: str = fields.choice((BOTH, TENSION, COMPRESSION), "which way it can act", BOTH)
    shortest: Size | None = fields.size("length", "length it must not go below", None, sign="plus")
    longest: Size | None = fields.size("length", "length it must not go beyond", None, sign="plus")
    on: tuple[str, str] | None = fields.names("member", "the members they are on, if several carry the points", None)

    one_of = ("free_length", "preload")
    tells = TELLS_FORCE

    @property
    def ends(self) -> tuple[str, str]:
        return self.spring

    def pusher(self, name: str, sketch: Sketch) -> LawPush:
        rate = sketch.value(self.rate, "stiffness")
        lengths = (None if v is None else sketch.value(v, "length") for v in (self.shortest, self.longest))
        shortest, longest = lengths
        drawn = drawn_length(sketch, self.spring)
        if self.preload is not None:
            preload = sketch.value(self.preload, "force")
            self._check_preload(preload, drawn, shortest, longest, sketch)
            free = drawn + preload / rate
        else:
            assert self.free_length is not None  # one of the two is there
            free = sketch.value(self.free_length, "length")
        _check_lengths(free, shortest, longest, sketch)
        path = straight(sketch, self.spring, self.on)
        edges = (*between(path, sketch, shortest, longest, "its"), *_slack(self.acts, path, free))
        return LawPush(name, "spring", Linear(rate, free, self.acts), path, edges=edges, cautions=(_CAUTION,))

    def _check_preload(
        self, preload: Value, drawn: Value, shortest: Value | None, longest: Value | None, sketch: Sketch
    ) -> None:
        """Raises Faults: a preload of the wrong sense, or at a length that the spring has not."""
        if (self.acts == TENSION and sure(preload > 0)) or (self.acts == COMPRESSION and sure(preload < 0)):
            wanted = "minus draws together" if self.acts == TENSION else "plus pushes apart"
            what = f"a preload of {sketch.shown(nominal(preload), 'force')} in a spring that acts in {self.acts} only"
            raise fault(("preload",), what, wanted)
        for bound, short in ((shortest, True), (longest, False)):
            if bound is not None and sure(drawn < bound if short else drawn > bound):
                beyond = "shorter than its shortest" if short else "longer than its longest"
                what = f"drawn {sketch.shown(nominal(drawn))} long, {beyond}, {sketch.shown(nominal(bound))}"
                raise fault(("preload",), what, "a preload is told at a length that the spring can have")


_CAUTION = "a loaded spring flies apart when it is let go: take the load off it before a pin or hook is loosened"


def _check_lengths(free: Value, shortest: Value | None, longest: Value | None, sketch: Sketch) -> None:
    """Raises Faults: lengths in the wrong order."""
    if shortest is not None and longest is not None and sure(longest <= shortest):
        texts = [sketch.shown(nominal(v)) for v in (longest, shortest)]
        raise fault(("longest",), f"{texts[0]}, not longer than the shortest, {texts[1]}", "a longer one is wanted")
    if shortest is not None and sure(free < shortest * (1 - 1e-9)):
        texts = [sketch.shown(nominal(v)) for v in (free, shortest)]
        raise fault(("shortest",), f"{texts[1]}, but without force it is {texts[0]} long", "a shorter one is wanted")


def _slack(acts: str, path: Straight, free: Value) -> tuple[Limit, ...]:
    """A spring that acts one way only should not lose its load."""
    if acts == BOTH:
        return ()
    if acts == TENSION:
        return (Limit("slack", lambda at, _: path.value(at) - free),)
    return (Limit("loose between its seats", lambda at, _: free - path.value(at)),)
