"""Pictures: every format, every option, the words on them, and that one answer always gives the same file."""

from __future__ import annotations

import re
import xml.etree.ElementTree as ET
from pathlib import Path

import pytest

from tests.endtoend.models import CASES, CLAMP, FRAME, GUIDED, linkcalc

HEADS = {"svg": b"<?xml", "png": b"\x89PNG\r\n\x1a\n", "pdf": b"%PDF-"}


@pytest.fixture(autouse=True)
def _in_a_folder(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.chdir(tmp_path)
    Path("clamp.toml").write_text(CLAMP + CASES, encoding="utf-8")
    Path("frame.toml").write_text(FRAME, encoding="utf-8")
    Path("guided.toml").write_text(GUIDED, encoding="utf-8")


def _words(name: str) -> str:
    """All the text of an SVG picture, a line each."""
    root = ET.parse(name).getroot()
    return "\n".join("".join(e.itertext()) for e in root.iter("{http://www.w3.org/2000/svg}text"))


def test_curves_in_every_format() -> None:
    names = [f"curves.{kind}" for kind in HEADS]
    said = linkcalc("stroke", "clamp.toml", *(a for n in names for a in ("--plot", n)))
    assert (said.status, said.err) == (0, "".join(f"wrote {n}\n" for n in names))
    for kind, head in HEADS.items():
        assert Path(f"curves.{kind}").read_bytes().startswith(head)
    words = _words("curves.svg")
    for text in ("Clamp", "effort [N]", "force ratio", "turn of handle [deg]", "case heavy", "joint force"):
        assert text in words, text


def test_drawings_in_every_format_and_capital_suffixes() -> None:
    names = [f"drawing.{kind}" for kind in (*HEADS, "SVG")]
    said = linkcalc("draw", "clamp.toml", *(a for n in names for a in ("--output", n)))
    assert (said.status, said.out) == (0, "".join(f"wrote {n}\n" for n in names))
    for kind, head in HEADS.items():
        assert Path(f"drawing.{kind}").read_bytes().startswith(head)
    assert Path("drawing.SVG").read_bytes() == Path("drawing.svg").read_bytes()


def test_the_drawing_names_members_pins_and_forces() -> None:
    linkcalc("draw", "clamp.toml", "-o", "a.svg")
    words = _words("a.svg").splitlines()
    assert {"handle", "strut", "arm", "A", "B", "C", "D", "tip", "grip", "effort 105.7 N", "load 500 N"} <= set(words)
    assert any("130 deg" in w and "110 deg" in w for w in words)


def test_without_forces() -> None:
    linkcalc("draw", "clamp.toml", "-o", "a.svg", "--no-forces")
    assert " N" not in _words("a.svg")


def test_with_the_size_of_every_joint_force() -> None:
    """B and C carry the 791.6 N of the strut; see examples/hold_down.toml for the hand calculation."""
    linkcalc("draw", "clamp.toml", "-o", "a.svg", "--at", "start")
    linkcalc("draw", "clamp.toml", "-o", "b.svg", "--at", "start", "--joint-forces")
    assert "791.6" not in _words("a.svg")
    assert _words("b.svg").count("791.6") == 2


@pytest.mark.parametrize(
    ("at", "says"),
    [
        (["start"], "130 deg"),
        (["end"], "110 deg"),
        (["drawn"], "130 deg"),
        (["123.4 deg"], "123.4 deg"),
        (["0.4*300 deg"], "120 deg"),
        (["start", "120", "end"], "130 deg, lighter 120 and 110 deg"),
    ],
)
def test_poses_can_be_chosen(at: list[str], says: str) -> None:
    said = linkcalc("draw", "clamp.toml", "-o", "a.svg", *(a for pose in at for a in ("--at", pose)))
    assert (said.status, said.err) == (0, "")
    assert says in _words("a.svg")


def test_the_case_can_be_chosen() -> None:
    linkcalc("draw", "clamp.toml", "-o", "a.svg", "--case", "heavy")
    assert "load 750 N" in _words("a.svg")


def test_the_way_of_a_point() -> None:
    linkcalc("draw", "clamp.toml", "-o", "a.svg", "--trace", "C")
    linkcalc("draw", "clamp.toml", "-o", "b.svg", "--trace", "C", "--trace", "grip")
    assert len(Path("b.svg").read_bytes()) > len(Path("a.svg").read_bytes())


def test_a_member_cut_free_lists_forces_that_sum_to_nothing() -> None:
    """By hand, examples/hold_down.toml: on the arm C (774.69, -162.80), load (0, 500), D what is left."""
    linkcalc("draw", "clamp.toml", "-o", "arm.svg", "--member", "arm", "--at", "130")
    words = _words("arm.svg").splitlines()
    assert any("arm cut free" in w for w in words)
    for number in ("-774.69", "-337.20", "774.69", "-162.80", "500.00"):
        assert number in words, number
    numbers = [float(w) for w in words if re.fullmatch(r"-?\d+\.\d+", w)]
    assert numbers.count(0.0) >= 3


@pytest.mark.parametrize("model", ["frame.toml", "guided.toml"])
def test_frames_and_guides_are_drawn(model: str) -> None:
    said = linkcalc("draw", model, "-o", "a.svg", "-o", "a.png")
    assert (said.status, said.err) == (0, "")
    assert "load" in _words("a.svg")


def test_the_same_answer_gives_the_same_file() -> None:
    for name in ("a", "b"):
        linkcalc("stroke", "clamp.toml", *(x for kind in HEADS for x in ("--plot", f"{name}.{kind}")))
    for kind in HEADS:
        assert Path(f"a.{kind}").read_bytes() == Path(f"b.{kind}").read_bytes()
