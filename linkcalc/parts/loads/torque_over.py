"""Torque over angle: measured or wished for, as a table or a formula."""

from __future__ import annotations

from dataclasses import dataclass

from linkcalc.parts import fields
from linkcalc.parts.contract import Limit, Size, Sketch
from linkcalc.parts.law_push import TELLS_TORQUE, LawPush
from linkcalc.parts.loads.torsion_spring import LOST
from linkcalc.parts.loads.written import edges_of, law_of
from linkcalc.parts.paths.turning import turning
from linkcalc.words import word


@word("load", "torque_over")
@dataclass(frozen=True)
class TorqueOver:
    """A torque on a member that hangs on its angle, counter-clockwise plus; another member takes it the other way."""

    torque_over: str = fields.name("member", "the member that is turned")
    table: tuple[tuple[Size, Size], ...] | None = fields.rows(
        ("angle", "moment"), "rows of angle and torque, by rising angle; smooth between them", None
    )
    formula: str | None = fields.formula("moment", "angle", "the torque as a formula over 'angle'", None)
    against: str = fields.name("member", "the member that takes it; angles count from its own axis", "ground")

    one_of = ("table", "formula")
    tells = TELLS_TORQUE
    gives = "moment"

    @property
    def turned(self) -> tuple[str, str]:
        return self.torque_over, self.against

    def pusher(self, name: str, sketch: Sketch) -> LawPush:
        path = turning(sketch, self.torque_over, self.against)
        law = law_of(sketch, self.table, self.formula, ("angle", "moment"), path.angle.drawn)
        edges = (*edges_of(law, path, sketch), Limit(LOST, path.room))
        return LawPush(name, "torque over angle", law, path, edges=edges)
