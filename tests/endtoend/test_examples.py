"""Every example and every template goes through all commands, and keeps what it requires of itself."""

from __future__ import annotations

import json
import tomllib
from pathlib import Path
from typing import Any

import pytest

from linkcalc.cli.start import kinds
from tests.endtoend.models import EXAMPLES, linkcalc


def _example(name: str, folder: Path) -> Path:
    if name in kinds():
        path = folder / f"{name}.toml"
        assert linkcalc("start", name, "--output", path).status == 0
        return path
    return next(p for p in EXAMPLES if p.stem == name.removesuffix(".toml"))


def _rubs(model: dict[str, Any]) -> bool:
    """True if something in the model has friction."""
    steps = [step for rope in model.get("ropes", {}).values() for step in rope["path"] if isinstance(step, dict)]
    losses = {"efficiency", "friction", "friction_radius", "pin_friction"}
    pins = any({"friction", "friction_radius"} & pin.keys() for pin in model.get("pins", {}).values())
    seals = any("seal_friction" in load for load in model.get("loads", {}).values())
    return "friction" in model or pins or seals or any(losses & step.keys() for step in steps)


@pytest.mark.parametrize("name", [*(p.name for p in EXAMPLES), *kinds()])
def test_it_goes_through_all_commands(name: str, tmp_path: Path) -> None:
    path = _example(name, tmp_path)
    model = tomllib.loads(path.read_text(encoding="utf-8"))

    looked = linkcalc("check", path)
    assert (looked.status, looked.err) == (0, "")
    assert model["title"] in looked.out

    answer = tmp_path / "answer.json"
    stepped = linkcalc("stroke", path, "--json", answer, "--csv", tmp_path / "answer.csv")
    assert stepped.status == 0
    tree = json.loads(answer.read_text(encoding="utf-8"))
    assert tree["holds"] is True
    assert [r["name"] for r in tree["requirements"]] == list(model.get("requirements", {}))
    cases = list(model.get("cases", {"": {}}))
    if _rubs(model):
        cases = [way for name in cases for way in ((name, f"{name} (back)") if name else ("forward", "back"))]
    assert tree["axes"]["case"] == cases
    assert all(status == 0 for case in tree["status"]["values"] for variant in case for status in variant)

    picture = tmp_path / "drawing.svg"
    drawn = linkcalc("draw", path, "--output", picture)
    assert (drawn.status, drawn.out) == (0, f"wrote {picture}\n")
    assert picture.read_text(encoding="utf-8").startswith("<?xml")
    if "stroke" in model:
        assert linkcalc("stroke", path, "--plot", tmp_path / "curves.svg").status == 0

    carried = linkcalc("pins", path, "--roses", tmp_path / "roses.svg")
    assert carried.status == 0
    assert "What each joint carries" in carried.out


def test_every_example_has_a_caution_and_a_hand_calculation() -> None:
    for path in EXAMPLES:
        text = path.read_text(encoding="utf-8")
        assert "# By hand" in text, path.name
        assert "aution" in tomllib.loads(text)["note"], path.name
