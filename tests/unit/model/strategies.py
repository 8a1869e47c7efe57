"""Random mechanisms, drawn from the fields of the dataclasses: every kind there is, filled in as its fields allow.

They have the shape of a model; nothing says that they could be built.
"""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from hypothesis import strategies as st

from linkcalc.model.mechanism import Mechanism, asked_by
from linkcalc.parts.fields import part_fields, required
from linkcalc.words import kinds

NAMES = st.sampled_from(["A", "b2", "ground", "left-hand", "P.q", 'q"', "ö", "a'b", "#", "[x]", "a=b", "true", "1"])
TEXTS = st.text(st.characters(exclude_categories=("Cs",)), max_size=12)
NUMBERS = st.one_of(st.integers(-(10**6), 10**6), st.floats(allow_nan=False, allow_infinity=False))
SIZES = st.one_of(NUMBERS, st.sampled_from(["3/8 in", "2*link", "12 N*m", 'hypot(a, b)/2 + 3"', "1e-3 m"]))

FIELDS = {
    "name": lambda _: NAMES,
    "names": lambda m: st.lists(NAMES, min_size=m["least"], max_size=m["most"] or 4).map(tuple),
    "size": lambda m: st.one_of(SIZES, st.sampled_from(m["words"])) if m["words"] else SIZES,
    "sizes": lambda _: st.tuples(SIZES, SIZES),
    "named sizes": lambda m: st.tuples(*(SIZES for _ in m["names"])),
    "places": lambda _: st.one_of(SIZES, st.lists(SIZES, min_size=1, max_size=3).map(tuple)),
    "span": lambda _: st.one_of(SIZES, st.tuples(SIZES, SIZES)),
    "own size": lambda _: SIZES,
    "tol": lambda _: st.one_of(SIZES, st.tuples(SIZES, SIZES)),
    "line": lambda _: st.one_of(SIZES, st.tuples(NAMES, NAMES)),
    "choice": lambda m: st.sampled_from(m["options"]),
    "count": lambda m: st.integers(m["least"], m["most"]),
    "arcs": lambda _: st.tuples(st.tuples(NAMES, SIZES), st.tuples(NAMES, SIZES)),
    "pairs": lambda _: st.tuples(st.tuples(NAMES, NAMES), st.tuples(NAMES, NAMES)),
    "unit": lambda m: st.sampled_from(UNITS[m["unit"]]),
    "factor": lambda _: st.floats(-1e9, 1e9),
    "factors": lambda _: st.dictionaries(NAMES, st.floats(-1e9, 1e9), max_size=2),
    "text": lambda _: TEXTS,
    "rows": lambda _: st.lists(st.tuples(SIZES, SIZES), min_size=2, max_size=4).map(tuple),
    "formula": lambda _: TEXTS,
    "part": lambda m: part(m),
    "parts": lambda m: st.lists(part(m), min_size=m["least"], max_size=4).map(tuple),
    "table": lambda m: filled(m["of"]),
    "coordinate": lambda _: part({"family": "coordinate"}),
    "named tables": lambda m: st.dictionaries(NAMES, filled(m["of"]), max_size=3),
    "named parts": lambda m: st.dictionaries(NAMES, part(m), max_size=4),
    "named texts": lambda _: st.dictionaries(NAMES, TEXTS, max_size=2),
    "joints": lambda _: st.fixed_dictionaries(
        {}, optional={w: st.dictionaries(NAMES, filled(k), min_size=1, max_size=2) for w, k in kinds("joint").items()}
    ),
}
UNITS = {
    "length": ["mm", "in", '"'], "angle": ["deg", "rad", "°"], "force": ["N", "lbf"], "mass": ["kg", "lb"],
    "moment": ["N*m", "in-lbf"], "stress": ["MPa", "psi"], "stiffness": ["N/mm", "lbf/in"],
    "acceleration": ["m/s^2", "ft/s²"], "torsion stiffness": ["N*mm/turn", "lbf*in/rad"], "pressure": ["bar", "psi"],
    "volume": ["cm^3", "in^3"], "line load": ["N/mm", "lbf/ft"],
}  # fmt: skip


def part(meta: Mapping[str, Any]) -> st.SearchStrategy[Any]:
    """Any kind of a family."""
    family = kinds(meta["family"]).values()
    if "asks" in meta:
        family = [kind for kind in family if asked_by(kind) in kind.__dataclass_fields__]
    return st.one_of([filled(kind) for kind in family])


def filled(cls: type) -> st.SearchStrategy[Any]:
    """A dataclass with its needed fields, any of the others, and exactly one of those that exclude each other."""
    one_of: tuple[str, ...] = getattr(cls, "one_of", ())
    values = {f.name: FIELDS[f.metadata["kind"]](f.metadata) for f in part_fields(cls)}
    needed = {f.name: values[f.name] for f in part_fields(cls) if required(f)}
    free = {name: v for name, v in values.items() if name not in needed and name not in one_of}
    every = st.fixed_dictionaries(needed, optional=free)
    if not one_of:
        return every.map(lambda given: cls(**given))
    chosen = st.one_of([st.fixed_dictionaries({name: values[name]}) for name in one_of])
    return st.tuples(every, chosen).map(lambda both: cls(**both[0], **both[1]))


MECHANISMS = filled(Mechanism)
