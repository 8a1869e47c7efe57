"""Inner forces as JSON. ``docs/json.md`` describes it."""

from __future__ import annotations

from linkcalc.design.answer import SCHEMA
from linkcalc.design.diagram import Diagram
from linkcalc.design.inner import KINDS
from linkcalc.design.members import MemberForces, MembersAnswer
from linkcalc.design.peaks import Peak, Place
from linkcalc.report.edge import Edge
from linkcalc.report.json import BATCH, Tree, array_tree, laid_out, one_tree, real, stroke_tree
from linkcalc.report.sections.working import working_tree


def members_json(answer: MembersAnswer) -> str:
    """The inner forces of all members, with the stroke that they belong to."""
    edge = Edge(answer.stroke)
    tree = {
        "schema": SCHEMA,
        "answer": "members",
        "members": [
            {
                "member": m.member,
                "two-force": m.two_force,
                "worst": {
                    name: _peak(edge, peak)
                    for name, peak in zip(KINDS, (m.axial, m.shear, m.bending, m.stress, m.margin, m.used), strict=True)
                    if peak
                },
                "over the stroke": {
                    name: array_tree(edge, values, KINDS[name], BATCH) for name, values in m.over.items()
                },
                **_strength(edge, m),
                "unbalance": real(m.unbalance),
            }
            for m in answer.members
        ],
        "warnings": [{"item": c.item, "text": c.text} for c in answer.caveats],
        "stroke": stroke_tree(answer.stroke),
    }
    return laid_out(tree) + "\n"


def _strength(edge: Edge, of: MemberForces) -> Tree:
    """What it is made of, what would do, and the workings; only what the model tells."""
    units, spec = edge.units, of.spec
    tree: Tree = {}
    if spec.section is not None:
        tree["section"] = spec.section.name
    if spec.material is not None:
        tree |= {"material": spec.material.name, "factor": {"value": spec.factor, "given": spec.given}}
    if of.needed is not None:
        tree["section modulus needed"] = one_tree(edge, of.needed, "section modulus")
    named = {"strength": of.strength, "buckling": of.buckling}
    return tree | {name: working_tree(w, units) for name, w in named.items() if w is not None}


def diagram_json(found: Diagram) -> str:
    """The diagrams along one member, with what acts on it."""
    edge = Edge(found.stroke)
    tree = {
        "schema": SCHEMA,
        "answer": "diagram",
        "title": found.stroke.mechanism.title,
        "member": found.member,
        "case": found.stroke.cases[found.case] or None,
        "drive": one_tree(edge, found.drive, "drive"),
        "stretches": [
            {
                "from": s.start, "to": s.stop, "arm": s.arm,
                "along": array_tree(edge, s.along, "length", ["place"]),
                "x": array_tree(edge, s.spots[:, 0], "length", ["place"]),
                "y": array_tree(edge, s.spots[:, 1], "length", ["place"]),
                "axial force": array_tree(edge, s.axial, "force", ["place"]),
                "shear force": array_tree(edge, s.shear, "force", ["place"]),
                "bending moment": array_tree(edge, s.bending, "moment", ["place"]),
            }
            for s in found.stretches
        ],
        "acts": [
            {
                "name": a.name, "kind": a.tone, "spread": a.spread,
                "x": one_tree(edge, a.spot[0], "length"), "y": one_tree(edge, a.spot[1], "length"),
                "force x": one_tree(edge, a.force[0], "force"), "force y": one_tree(edge, a.force[1], "force"),
                "moment": one_tree(edge, a.moment, "moment"),
            }
            for a in found.acts
        ],
        "worst": {name: _peak(edge, peak) for name, peak in found.peaks.items()},
    }  # fmt: skip
    return laid_out(tree) + "\n"


def _peak(edge: Edge, peak: Peak) -> Tree:
    return {
        **one_tree(edge, peak.value, peak.kind),
        "case": peak.case or None,
        "drive": one_tree(edge, peak.drive, "drive"),
        "place": _place(edge, peak.place),
    }


def _place(edge: Edge, place: Place | None) -> Tree | None:
    if place is None:
        return None
    sizes = {"way": place.way, "along": place.along}
    return {"from": place.start, "towards": place.stop, **{k: one_tree(edge, v, "length") for k, v in sizes.items()}}
