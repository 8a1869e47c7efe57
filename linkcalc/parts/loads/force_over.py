"""Force over length: measured or wished for, as a table or a formula."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.parts import fields
from linkcalc.parts.contract import Size, Sketch
from linkcalc.parts.law_push import TELLS_FORCE, LawPush
from linkcalc.parts.loads.written import edges_of, law_of
from linkcalc.parts.paths.straight import drawn_length, straight
from linkcalc.words import word


@word("load", "force_over")
@dataclass(frozen=True)
class ForceOver:
    """A force between two points that hangs on their distance: plus pushes them apart."""

    force_over: tuple[str, str] = fields.names("point", "the two points")
    table: tuple[tuple[Size, Size], ...] | None = fields.rows(
        ("length", "force"), "rows of distance and force, by rising distance; smooth between them", None
    )
    formula: str | None = fields.formula("force", "length", "the force as a formula over 'length'", None)
    on: tuple[str, str] | None = fields.names("member", "the members they act on, if several carry the points", None)

    one_of = ("table", "formula")
    tells = TELLS_FORCE

    @property
    def ends(self) -> tuple[str, str]:
        return self.force_over

    def pusher(self, name: str, sketch: Sketch) -> LawPush:
        path = straight(sketch, self.force_over, self.on)
        law = law_of(sketch, self.table, self.formula, ("length", "force"), drawn_length(sketch, self.force_over))
        return LawPush(name, "force over length", law, path, edges=edges_of(law, path, sketch))
