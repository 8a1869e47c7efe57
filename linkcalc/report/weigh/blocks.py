"""Everything on a scale, in order."""

from __future__ import annotations

import math
from collections.abc import Iterator

from linkcalc.design.weighing.answer import WeighAnswer
from linkcalc.report.blocks import Block, Heading, Note
from linkcalc.report.weigh.edge import MassEdge
from linkcalc.report.weigh.tables import (
    asked_table,
    band_table,
    bars_table,
    corner_table,
    cure_table,
    error_table,
    setting_table,
    tilt_table,
)

_GRAVITY = "Masses balance masses: local gravity cancels, and the scale weighs alike everywhere."


def weigh_blocks(answer: WeighAnswer) -> list[Block]:
    """Balance, graduations, sensitivity, errors against the class, corner test, warnings."""
    return list(_blocks(answer))


def _blocks(answer: WeighAnswer) -> Iterator[Block]:
    mechanism = answer.mechanism
    yield Heading(mechanism.title or mechanism.source or "Scale without a title", 1)
    if mechanism.note:
        yield Note(mechanism.note)
    yield Note(_summary(answer))
    yield setting_table(answer)
    if answer.bars:
        yield bars_table(answer)
    yield tilt_table(answer)
    yield Note(_stability(answer))
    if answer.asked:
        yield asked_table(answer)
    if answer.causes:
        yield error_table(answer)
        yield Note(_zeroed(answer))
    if answer.accuracy is not None:
        yield band_table(answer)
        yield Note(answer.accuracy.source, "Source")
    if answer.corners is not None:
        yield corner_table(answer)
        yield from _cornered(answer)
    yield Note(_gravity(answer))
    for c in answer.caveats:
        yield Note(f"{c.item}: {c.text}.", "Warning")
    for c in answer.cautions:
        yield Note(f"{c.text}.", "Caution")


def _summary(answer: WeighAnswer) -> str:
    edge = MassEdge(answer)
    parts = [
        f"Beam {answer.beam} about {answer.fulcrum}, held level as drawn; it balances "
        f"{edge.text(answer.least, 'mass')} to {edge.text(answer.capacity, 'mass')}."
    ]
    if answer.case:
        parts.append(f"Case {answer.case}.")
    if answer.tare:
        parts.append(f"Tare {edge.text(answer.tare, 'mass')}, its poise at {edge.text(answer.tare_place, 'length')}.")
    if not math.isnan(answer.zero):
        parts.append(f"Empty, it balances with the zero poise at {edge.text(answer.zero, 'length')}.")
    parts += [f"A mass on {name} balances {ratio:.6g} times as much load." for name, ratio in answer.ratios.items()]
    if not math.isnan(answer.asked_load):
        parts.append(f"With the places given it balances {edge.text(answer.asked_load, 'mass', 6)}.")
    return " ".join(parts)


def _stability(answer: WeighAnswer) -> str:
    edge, tilt = MassEdge(answer), answer.tilt
    if math.isnan(tilt.unstable):
        return "The beam does not become less stable as the load grows."
    return f"The beam becomes unstable at {edge.text(tilt.unstable, 'mass', 4)}, by the heights of edges and masses."


def _zeroed(answer: WeighAnswer) -> str:
    zero = "with the empty scale set to zero on each" if answer.zeroed else "without a setting of the empty scale"
    return (
        f"Errors are indication less load, {zero}; likely together is the root of the sum of squares, friction added."
    )


def _cornered(answer: WeighAnswer) -> Iterator[Block]:
    found = answer.corners
    assert found is not None
    if found.free:
        yield Note(f"{found.member} does not turn as the beam tilts: the place of the load does not matter.")
        if found.cures:
            yield cure_table(answer)
        return
    multiples = ", ".join(f"{s.joint} {s.multiple:.6g}" for s in found.supports)
    text = f"{found.member} turns {found.turn:.4g} times as much as the beam, so the place of the load matters. "
    yield Note(text + f"A load right at its supports acts with: {multiples}; all alike would cure it.")
    if found.cures:
        yield cure_table(answer)


def _gravity(answer: WeighAnswer) -> str:
    top = float(answer.gravity[abs(answer.gravity).argmax()])
    if top == 0.0:
        return _GRAVITY
    edge = MassEdge(answer)
    return (f"Springs or forces act besides masses: 0.1 % more gravity changes the indication by "
            f"{edge.text(top, 'mass', 3)} until the empty scale is set anew.")  # fmt: skip
