"""What may be wrong with the size of a guide or rope, and with what is required of it."""

from __future__ import annotations

import pytest

from linkcalc.faults import Faults
from linkcalc.model.read import parse
from linkcalc.model.write import dumps
from tests.endtoend.models import ROOT

GOOD = """
[points]
A = [0, 0]
B = [0, 80]
C = [150, 80]
D = [150, 0]
[members]
ground = ["A", "D"]
arm = ["A", "B"]
rod = ["B", "C"]
ram = ["C"]
[slides.way]
member = "ram"
along = 0
length = 60
width = 20
allowed_pressure = 4
[effort]
torque_on = "arm"
[load]
at = "C"
direction = 180
size = 1
[requirements]
edge = "pressure at way <= 4 MPa"
"""
HOIST = (ROOT / "examples" / "goods_hoist.toml").read_text(encoding="utf-8")
CODE = "                     # a hand hoist for goods, no people; the code for it governs"


def line(text: str, of: str) -> int:
    return text.splitlines().index(of) + 1


WAY, EDGE = line(GOOD, "[slides.way]"), line(GOOD, 'edge = "pressure at way <= 4 MPa"')


@pytest.mark.parametrize("text", [GOOD, HOIST])
def test_the_samples_have_none_and_are_written_as_they_are_read(text: str) -> None:
    assert parse(dumps(parse(text))) == parse(text)


@pytest.mark.parametrize(
    ("old", "new", "at", "says"),
    [
        ("length = 60\n", "", WAY + 3,
         "slides.way.width: it goes with 'length' only; give 'length' too, or leave it out"),
        ("width = 20\n", "", WAY + 4,
         "slides.way.allowed_pressure: it goes with 'width' only; give 'width' too, or leave it out"),
        ("length = 60\nwidth = 20\n", "", WAY + 3,
         "slides.way.allowed_pressure: it goes with 'length' and 'width' only; "
         "give 'length' and 'width' too, or leave it out"),
        ("width = 20", "width = 0", WAY + 4, "slides.way.width: 0 mm cannot stand here; more than nothing is wanted"),
        ("= 4\n[eff", '= "4 N"\n[eff', WAY + 5,
         "slides.way.allowed_pressure: 4 N is a force; a stress is wanted (e.g. 12 MPa)"),
        ("width = 20\nallowed_pressure = 4\n", "", EDGE - 2,
         "requirements.edge: the guide way has no width; the face that it bears on is wanted"),
        ("length = 60\nwidth = 20\nallowed_pressure = 4\n", "", EDGE - 3,
         "requirements.edge: the guide way has no length and no width; the face that it bears on is wanted"),
        ("at way <=", "at wy <=", EDGE,
         "requirements.edge: unknown pin, slot, slide or track 'wy'; did you mean 'way'?"),
        ("at way <=", "at way on ram <=", EDGE,
         "requirements.edge: the pressure is that of the whole guide; leave 'on ram' out"),
        ("pressure at way <= 4 MPa", "safety factor of way >= 4", EDGE,
         "requirements.edge: unknown rope 'way'; there are none"),
    ],
)  # fmt: skip
def test_of_a_guide(old: str, new: str, at: int, says: str) -> None:
    assert old in GOOD
    with pytest.raises(Faults) as found:
        parse(GOOD.replace(old, new))
    assert str(found.value) == f"model:{at}: {says}"


def test_a_slot_has_no_use_for_a_length_alone() -> None:
    slot = GOOD.partition("[slides.way]")[0].replace('ram = ["C"]\n', "") + '[slots.way]\npoint = "C"\nalong = 0\n'
    end = "[effort]" + GOOD.partition("[effort]")[2].partition("[requirements]")[0]
    assert parse(slot + end)
    with pytest.raises(Faults, match=r"slots\.way\.length: it goes with 'width' only"):
        parse(slot + "length = 30\n" + end)


@pytest.mark.parametrize(
    ("old", "new", "of", "says"),
    [
        ('breaking_load = "8 kN"\n', "", f"factor = 8{CODE}",
         "ropes.fall.factor: it goes with 'breaking_load' only; give 'breaking_load' too, or leave it out"),
        ('breaking_load = "8 kN"\n', 'breaking_load = "0 kN"\n', 'breaking_load = "0 kN"',
         "ropes.fall.breaking_load: 0 N cannot stand here; more than nothing is wanted"),
        ("factor = 8", "factor = -8", f"factor = -8{CODE}",
         "ropes.fall.factor: -8 cannot stand here; more than nothing is wanted"),
        ("factor of fall >=", "factor of fal >=", 'rope = "safety factor of fal >= 8"',
         "requirements.rope: unknown rope 'fal'; did you mean 'fall'?"),
    ],
)  # fmt: skip
def test_of_a_rope(old: str, new: str, of: str, says: str) -> None:
    assert old in HOIST
    text = HOIST.replace(old, new)
    with pytest.raises(Faults) as found:
        parse(text)
    assert str(found.value) == f"model:{line(text, of)}: {says}"


def test_no_safety_without_a_breaking_load() -> None:
    text = HOIST.replace('breaking_load = "8 kN"\n', "").replace("factor = 8 ", "# ")
    with pytest.raises(Faults) as found:
        parse(text)
    at = line(text, 'rope = "safety factor of fall >= 8"')
    wanted = "the rope fall has no breaking load; give it one: [ropes.fall] breaking_load"
    assert str(found.value) == f"model:{at}: requirements.rope: {wanted}"
