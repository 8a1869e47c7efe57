"""The tables of a scale: what stands where, marks to be cut, sensitivity, errors."""

from __future__ import annotations

import numpy as np

from linkcalc.design.weighing.answer import Bar, WeighAnswer
from linkcalc.report.blocks import Cell, Column, Table
from linkcalc.report.numbers import places_for
from linkcalc.report.weigh.edge import MassEdge

_SHOWN = 11
_ZERO = 1e-9
_NOISE = 1e-12


def setting_table(answer: WeighAnswer, *, whole: bool = False) -> Table:
    """A row a load: places of the poises, masses on the hangers; whole: with sensitivity and errors, for CSV."""
    edge = MassEdge(answer)
    mass = edge.unit("mass")
    loads = edge.rows(answer.loads, "mass")
    columns = [Column("load", mass, places=places_for(loads, 6))]
    cells: list[list[Cell]] = [list(loads)]
    small = edge.one(_ZERO * max(abs(answer.capacity), 1e-12), "mass")

    def add(head: str, values: np.ndarray, kind: str, over: str = "", **more: object) -> None:
        columns.append(Column(head, edge.unit(kind, over), **more))  # type: ignore[arg-type]
        cells.append(list(edge.rows(values, kind, over)))

    for name, values in answer.hung.items():
        add(f"on {name}", values, "mass", zero=small)
    for name, values in answer.places.items():
        if whole or np.ptp(values) > 0:
            add(f"place of {name}", values, "length", digits=6)
    if np.any(answer.left):
        add("unbalanced", answer.left, "mass", zero=small)
    if not whole:
        return Table(tuple(columns), tuple(zip(*cells, strict=True)), "Balanced with the beam level")
    tilt = answer.tilt
    add("stiffness", tilt.stiffness, "torsion stiffness")
    columns.append(Column("stable"))
    cells.append([int(s) for s in tilt.steady])
    add("tilt a unit of load", tilt.per_load, "angle", "mass")
    add(f"way of {tilt.pointer} a unit of load", tilt.per_load * tilt.arm, "length", "mass")
    add("tilt a unit of poise place", tilt.per_place, "angle", "length")
    add("dead band, half", answer.dead_band, "mass")
    for cause in answer.causes:
        if cause.name != "friction":
            add(f"error by {cause.name}, lower", cause.low, "mass")
            add(f"error by {cause.name}, upper", cause.high, "mass")
    add("likely error", answer.likely, "mass")
    add("largest error", answer.largest, "mass")
    if answer.scatter is not None:
        add("mean of the copies", answer.scatter.mean, "mass")
        add("deviation of the copies", answer.scatter.deviation, "mass")
        add("0.135 % of the copies below", answer.scatter.low, "mass")
        add("0.135 % of the copies above", answer.scatter.high, "mass")
    if answer.accuracy is not None:
        add("largest error allowed", answer.accuracy.limit(answer.loads), "mass")
    return Table(tuple(columns), tuple(zip(*cells, strict=True)))


def marks_table(answer: WeighAnswer) -> Table:
    """Every line and notch of every bar, with the coordinates to cut it at."""
    edge = MassEdge(answer)
    length, mass = edge.unit("length"), edge.unit("mass")
    columns = (
        Column("poise"), Column("mark"), Column("load", mass), Column("place from first point", length),
        Column("spacing", length), Column("x from fulcrum", length), Column("y from fulcrum", length),
        Column("departure from even", length),
    )  # fmt: skip
    rows = tuple(
        (bar.name, "notch" if bar.notched else "line", *numbers)
        for bar in answer.bars
        for numbers in zip(
            edge.rows(bar.loads, "mass"), *(edge.rows(v, "length") for v in (bar.places, bar.spacing, bar.x, bar.y)),
            edge.rows(bar.departure, "length"), strict=True,
        )
    )  # fmt: skip
    return Table(columns, rows)


def bars_table(answer: WeighAnswer) -> Table:
    """A row a bar: how many marks, how far apart, what a unit of its way is worth."""
    edge = MassEdge(answer)
    length, mass = edge.unit("length"), edge.unit("mass")
    columns = (
        Column("poise"), Column("marks"), Column("first", mass), Column("last", mass), Column("at", length, 6),
        Column("to", length, 6), Column("spacing", length, 5), Column("largest departure from even", length),
        Column("worth", edge.unit("mass", "length")),
    )  # fmt: skip
    rows = tuple(_bar_row(bar, edge) for bar in answer.bars if bar.use != "zero")
    return Table(columns, rows, "Marks on the bars")


def _bar_row(bar: Bar, edge: MassEdge) -> tuple[Cell, ...]:
    if not bar.loads.size:
        return (bar.name, "none", *[None] * 6, edge.one(bar.worth, "mass", "length"))
    spacing = float(np.mean(bar.spacing[1:])) if bar.loads.size > 1 else float("nan")
    kind = "notch" if bar.notched else "line"
    return (
        bar.name, f"{bar.loads.size} {kind}{'es' if bar.notched else 's'}", edge.one(bar.loads[0], "mass"),
        edge.one(bar.loads[-1], "mass"), edge.one(bar.places[0], "length"), edge.one(bar.places[-1], "length"),
        edge.one(spacing, "length"), edge.one(bar.uneven, "length"), edge.one(bar.worth, "mass", "length"),
    )  # fmt: skip


def tilt_table(answer: WeighAnswer) -> Table:
    """How the beam tilts, at some of the loads."""
    edge, tilt = MassEdge(answer), answer.tilt
    loads = edge.rows(answer.loads, "mass")
    columns = (
        Column("load", edge.unit("mass"), places=places_for(loads, 6)),
        Column("stiffness", edge.unit("torsion stiffness")),
        Column("balance"), Column("tilt a unit of load", edge.unit("angle", "mass")),
        Column(f"way of {tilt.pointer} a unit of load", edge.unit("length", "mass")),
        Column("tilt a unit of poise place", edge.unit("angle", "length")),
        *((Column("dead band, half", edge.unit("mass")),) if np.any(answer.dead_band) else ()),
    )  # fmt: skip
    parts: list[list[Cell]] = [
        list(loads), list(edge.rows(tilt.stiffness, "torsion stiffness")), [_steady(int(s)) for s in tilt.steady],
        list(edge.rows(tilt.per_load, "angle", "mass")), list(edge.rows(tilt.per_load * tilt.arm, "length", "mass")),
        list(edge.rows(tilt.per_place, "angle", "length")),
    ]  # fmt: skip
    if np.any(answer.dead_band):
        parts.append(list(edge.rows(answer.dead_band, "mass")))
    rows = list(zip(*parts, strict=True))
    return Table(columns, tuple(rows[k] for k in _some(len(rows))), "Sensitivity")


def _steady(code: int) -> str:
    return {1: "stable", 0: "neutral", -1: "unstable"}[code]


def _some(count: int) -> list[int]:
    """Numbers of at most eleven rows, first and last among them."""
    return sorted({round(k) for k in np.linspace(0, count - 1, min(count, _SHOWN))})


def error_table(answer: WeighAnswer) -> Table:
    """A row a cause: errors at a small, a middle and the largest load."""
    edge = MassEdge(answer)
    # the empty scale is told only where nothing else is: mostly it is set to nothing
    some = np.flatnonzero(answer.loads > 0) if np.any(answer.loads > 0) else np.arange(answer.loads.size)
    pick = sorted({int(some[0]), int(some[some.size // 2]), int(some[-1])})
    small = edge.one(_NOISE * max(abs(answer.capacity), 1e-12), "mass")
    unit = edge.unit("mass")
    columns = (
        Column("cause"), Column("from"), Column("to"),
        *(Column(f"error at {edge.text(float(answer.loads[k]), 'mass')}", unit, 4, zero=small) for k in pick),
    )  # fmt: skip
    rows: list[tuple[Cell, ...]] = []
    for c in answer.causes:
        ends = [edge.text(v, c.kind, 4) if c.kind else "" for v in (c.lower, c.upper)]
        rows.append((c.name, *ends, *(edge.one(float(c.size[k]), "mass") for k in pick)))
    rows.append(("likely together", "", "", *(edge.one(float(answer.likely[k]), "mass") for k in pick)))
    rows.append(("all at their worst", "", "", *(edge.one(float(answer.largest[k]), "mass") for k in pick)))
    if answer.scatter is not None:
        many = f"{answer.scatter.copies} copies"
        low, high = (edge.rows(v, "mass") for v in (answer.scatter.low, answer.scatter.high))
        rows.append((f"{many}, 0.135 % below", "", "", *(low[k] for k in pick)))
        rows.append((f"{many}, 0.135 % above", "", "", *(high[k] for k in pick)))
    return Table(columns, tuple(rows), "Errors of the indication")


def band_table(answer: WeighAnswer) -> Table:
    """Limits of the class, range by range."""
    edge, unit = MassEdge(answer), MassEdge(answer).unit("mass")
    shares = answer.scatter is not None
    columns = (
        Column("load over", unit), Column("up to", unit), Column("largest error allowed", unit), Column("found", unit),
        Column("at", unit), *((Column("copies within", "%"),) if shares else ()), Column("verdict"),
    )  # fmt: skip
    rows = []
    for b in answer.bands:
        told = [edge.one(v, "mass") for v in (b.low, b.high, b.limit, b.error, b.at)]
        share: tuple[Cell, ...] = ()
        if answer.scatter is not None:
            share = (100 * b.within,)
        rows.append((*told, *share, "not asked" if np.isnan(b.error) else "pass" if b.holds else "FAIL"))
    accuracy = answer.accuracy
    assert accuracy is not None
    use = "in use" if accuracy.in_use else "on verification"
    title = f"Against {accuracy.name}, interval {edge.text(accuracy.interval, 'mass')}, {use}"
    return Table(columns, tuple(rows), title)


def asked_table(answer: WeighAnswer) -> Table:
    """What the class wants to see for an extra load."""
    edge = MassEdge(answer)
    mass, length = edge.unit("mass"), edge.unit("length")
    columns = (
        Column("load", mass), Column("extra load", mass), Column(f"way of {answer.tilt.pointer}", length),
        Column("wanted", length), Column("verdict"),
    )  # fmt: skip
    rows = tuple(
        (*(edge.one(v, k) for v, k in ((a.load, "mass"), (a.extra, "mass"), (a.gives, "length"), (a.wanted, "length"))),
         "pass" if a.holds else "FAIL")
        for a in answer.asked
    )  # fmt: skip
    return Table(columns, rows, "Motion for an extra load")


def corner_table(answer: WeighAnswer) -> Table:
    """The test load at each point."""
    edge, found = MassEdge(answer), answer.corners
    assert found is not None
    unit, limited = edge.unit("mass"), answer.accuracy is not None
    columns = (
        Column("load at"), Column("multiple", digits=6),
        Column("error", unit, zero=_NOISE * edge.one(found.load, "mass")),
        *((Column("largest error allowed", unit), Column("verdict")) if limited else ()),
    )  # fmt: skip
    rows = []
    for c in found.corners:
        verdict = "pass" if abs(c.error) <= found.limit * (1 + 1e-9) else "FAIL"
        judged: tuple[Cell, ...] = (edge.one(found.limit, "mass"), verdict) if limited else ()
        rows.append((c.point, c.multiple, edge.one(c.error, "mass"), *judged))
    return Table(columns, tuple(rows), f"Corner test with {edge.text(found.load, 'mass')}")


def cure_table(answer: WeighAnswer) -> Table:
    """Dimensions that the corner error hangs on, the strongest first."""
    edge, found = MassEdge(answer), answer.corners
    assert found is not None
    length = edge.unit("length")
    columns = (
        Column("dimension"), Column("size", length, 6), Column("error a unit of it", edge.unit("mass", "length")),
        Column("size at which the place does not matter", length, 6),
        Column("error by its tolerance", edge.unit("mass")),
    )  # fmt: skip
    rows = tuple(
        (
            c.name,
            edge.one(c.size, "length"),
            edge.one(c.slope, "mass", "length"),
            edge.one(c.wanted, "length"),
            edge.one(c.by_tolerance, "mass"),
        )
        for c in sorted(found.cures, key=lambda c: -abs(c.slope))
    )
    return Table(columns, rows, "What the error at the farthest corner hangs on")
