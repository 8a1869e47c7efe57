"""Requirements: their grammar, their limits, and what they may not ask."""

from __future__ import annotations

import math

import pytest

from linkcalc.faults import Faults
from linkcalc.model.dimensions import evaluate
from linkcalc.model.read import parse
from linkcalc.model.requirements import Requirement, measures, requirement, requirements
from tests.unit.model.samples import EVERYTHING, HOLD_DOWN


@pytest.mark.parametrize(
    ("text", "parts"),
    [
        ("effort <= 150 N", ("effort", "", "", "", "<=", "150 N", "")),
        ("load>=1.2 kN at end", ("load", "", "", "", ">=", "1.2 kN", "end")),
        ("tare effort < 20", ("tare effort", "", "", "", "<", "20", "")),
        ("force ratio > 8 at start", ("force ratio", "", "", "", ">", "8", "start")),
        ("ideal ratio ≥ 8", ("ideal ratio", "", "", "", ">=", "8", "")),
        ("force at C ≤ 2 kN", ("force", "at", "C", "", "<=", "2 kN", "")),
        ("  force  at C on arm =< 2  kN at  30 deg ", ("force", "at", "C", "arm", "<=", "2 kN", "30 deg")),
        ("moment at way => 3 N*m", ("moment", "at", "way", "", ">=", "3 N*m", "")),
        ("tension in strut <= 2*limit", ("tension", "in", "strut", "", "<=", "2*limit", "")),
        ("compression in strut <= 1 kN", ("compression", "in", "strut", "", "<=", "1 kN", "")),
        ("force of return <= 40 N", ("force", "of", "return", "", "<=", "40 N", "")),
        ("pressure of effort <= 160 bar", ("pressure", "of", "effort", "", "<=", "160 bar", "")),
        ("lowering torque of jack >= 0", ("lowering torque", "of", "jack", "", ">=", "0", "")),
        ("travel of at <= 3/8 in", ("travel", "of", "at", "", "<=", "3/8 in", "")),
    ],
)
def test_the_grammar(text: str, parts: tuple[str, ...]) -> None:
    assert requirement("name", text) == Requirement("name", *parts)


@pytest.mark.parametrize(("quantity", "word"), measures())
def test_every_quantity_stands_in_the_model_file_page(quantity: str, word: str) -> None:
    from pathlib import Path

    page = (Path(__file__).parents[3] / "docs" / "model_file.md").read_text(encoding="utf-8")
    assert f"`{quantity} {word} " in page if word else f"`{quantity}`" in page


def test_limits_in_si() -> None:
    text = HOLD_DOWN.replace(
        'hand = "effort <= 400 N"',
        'a = "effort <= 400"\nb = "travel of tip <= 2*link at 120"\nc = "force ratio >= 3 at 0.5 turn"',
    )
    mechanism = parse(text)
    names = evaluate(mechanism)
    a, b, c = requirements(mechanism)
    assert (a.kind(mechanism), a.limit(mechanism, names), a.place(mechanism, names)) == ("force", 400.0, None)
    assert (b.kind(mechanism), b.limit(mechanism, names)) == ("length", pytest.approx(0.08))
    assert b.place(mechanism, names) == pytest.approx(math.radians(120))
    assert (c.kind(mechanism), c.limit(mechanism, names)) == ("number", 3.0)
    assert c.place(mechanism, names) == pytest.approx(math.pi)


def test_an_effort_that_is_a_torque_has_a_limit_of_moment() -> None:
    text = HOLD_DOWN.replace('at = "grip"\nsquare_to = ["A", "grip"]', 'torque_on = "handle"').replace("400 N", "3 N*m")
    mechanism = parse(text)
    (one,) = requirements(mechanism)
    assert (one.kind(mechanism), one.limit(mechanism, evaluate(mechanism))) == ("moment", 3.0)


FORM = '"force at C on arm <= 2 kN", "effort <= 150 N at start" or the like is wanted'


@pytest.mark.parametrize(
    ("text", "message"),
    [
        ("effort", f"'effort' is no requirement; {FORM}"),
        ("effort <=", f"'effort <=' is no requirement; {FORM}"),
        ("effort" + " " * 600 + "<= 1 N", f"'effort{' ' * 39}...' is no requirement; {FORM}"),
        (" <= 1 N", f"' <= 1 N' is no requirement; {FORM}"),
        ("effort <= 1 N <= 2 N", f"'effort <= 1 N <= 2 N' is no requirement; {FORM}"),
        ("efort <= 1 N", "unknown quantity 'efort' in 'efort <= 1 N'; did you mean 'effort' or 'tare effort'?"),
        (
            "tear effort <= 1 N",
            "unknown quantity 'tear effort' in 'tear effort <= 1 N'; did you mean 'tare effort' or 'effort'?",
        ),
        ("effort on arm <= 1 N", "'effort on arm' is no quantity; 'effort' alone is wanted"),
        (
            "force in A <= 1 N",
            "'force in A' is no quantity; 'force at NAME' or 'force of NAME' or 'force at NAME on MEMBER' is wanted",
        ),
        (
            "tension at strut <= 1 N",
            "'tension at strut' is no quantity; 'tension in NAME' or 'tension of NAME' is wanted",
        ),
        (
            "tension in strut on arm <= 1 N",
            "'tension in strut on arm' is no quantity; 'tension in NAME' or 'tension of NAME' is wanted",
        ),
        ("effort <= 3 mm", "3 mm is a length; a force is wanted (e.g. 12 N)"),
        ("effort <= 3*lnk", "unknown name 'lnk' in '3*lnk'; did you mean 'link'?"),
        ("force ratio >= 2 N", "2 N is a force; a plain number is wanted (e.g. 0.5)"),
        ("effort <= 3 N at 5 mm", "5 mm is a length; an angle is wanted (e.g. 12 deg)"),
        ("effort <= 3 N at strat", "'strat' is no place in the stroke; did you mean 'start'?"),
        ("force at Q <= 1 N", "unknown joint 'Q'; known: A, B, C, D"),
        ("force at grip <= 1 N", "unknown joint 'grip'; known: A, B, C, D"),
        ("force at A on strut <= 1 N", "'A' does not join 'strut'; it joins ground, handle"),
        ("force at A on strt <= 1 N", "unknown member 'strt'; did you mean 'strut'?"),
        ("moment at A <= 1 N*m", "'A' takes no moment; there are none"),
        ("tension in strt <= 1 N", "unknown member 'strt'; did you mean 'strut'?"),
        ("tension in ground <= 1 N", "unknown member 'ground'; known: arm, handle, strut"),
        ("travel of tp <= 1 mm", "unknown point, slot, slide or track 'tp'; did you mean 'tip'?"),
    ],
)
def test_what_may_not_be_asked(text: str, message: str) -> None:
    with pytest.raises(Faults) as raised:
        parse(HOLD_DOWN.replace("effort <= 400 N", text), "m")
    assert str(raised.value).partition("requirements.hand: ")[2] == message


@pytest.mark.parametrize(
    ("text", "message"),
    [
        ("moment at guide <= 1 N*m", "'guide' takes no moment; known: root, way"),
        ("travel of root <= 1 mm", "'root' has no travel; a point, slot, slide or track is wanted"),
        ("force at way on bar <= 1 N", "'way' does not join 'bar'; it joins block, ground"),
    ],
)
def test_what_may_not_be_asked_of_slots_and_welds(text: str, message: str) -> None:
    with pytest.raises(Faults) as raised:
        parse(EVERYTHING.replace("effort <= 40", text), "m")
    assert str(raised.value).partition("requirements.pull is light: ")[2] == message


@pytest.mark.parametrize(
    ("text", "message"),
    [
        ("effort <= 1 N", "the model has no effort; give it an [effort]"),
        ("tare effort <= 1 N", "the model has no effort; give it an [effort]"),
        ("load <= 1 N", "the model has no load; give it a [load]"),
        ("force ratio <= 1", "the model has no effort; give it an [effort]"),
        ("force at A <= 1 N at start", "the model has no stroke for 'at start'; give it a [stroke], or leave that out"),
    ],
)
def test_a_frame_has_neither_effort_nor_stroke(text: str, message: str) -> None:
    frame = '[points]\nA = [0, 0]\nB = [1, 0]\n[members]\nground = ["A"]\nbar = ["A", "B"]\n[requirements]\nr = '
    with pytest.raises(Faults) as raised:
        parse(f'{frame}"{text}"', "m")
    assert str(raised.value) == f"m:8: requirements.r: {message}"
