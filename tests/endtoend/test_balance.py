"""linkcalc balance as a stranger meets it: what it prints and writes, options, statuses, exact words of faults."""

from __future__ import annotations

import csv
import json
from pathlib import Path

import numpy as np
import pytest

from linkcalc import read, stroke
from tests.endtoend.models import EXAMPLES, linkcalc

ARM = """\
title = "Arm"
[points]
A = [0, 0]
back = [-200, 0]
G = [300, 0]
far = [900, 0]
[members]
ground = ["A", "far"]
arm = { points = ["back", "A", "G"], mass = 4, centre = "G" }
[effort]
torque_on = "arm"
[stroke]
turn = "arm"
line = ["A", "G"]
from = -40
to = 70
"""
FOUND = """\
[balance.find.bob]
mass_on = "arm"
place = { line = ["A", "back"] }
mass = [0, 20]
"""


def _model(folder: Path, text: str) -> Path:
    path = folder / "arm.toml"
    path.write_text(text, encoding="utf-8")
    return path


def test_it_finds_prints_and_writes(tmp_path: Path) -> None:
    path = _model(tmp_path, ARM + FOUND)
    files = {o: tmp_path / n for o, n in (("--json", "a.json"), ("--csv", "a.csv"), ("--plot", "a.svg"),
                                          ("--output", "b.svg"), ("--output-model", "new.toml"))}  # fmt: skip
    said = linkcalc("balance", path, *(each for option, name in files.items() for each in (option, name)))
    assert said.status == 0
    assert "Balanced at every pose: what is left of the effort is rounding." in said.out.replace("\n", " ")
    assert "6 kg" in said.out  # 4 x 300/200
    assert "secure counterweights against falling" in said.out.replace("\n         ", " ")
    tree = json.loads(files["--json"].read_text(encoding="utf-8"))
    assert tree["answer"] == "balance"
    assert tree["balanced at every pose"] is True
    (found,) = tree["found"]
    sizes = {s["size"]: s for s in found["sizes"]}
    assert sizes["mass"]["value"] == pytest.approx(6, rel=1e-9)
    assert (sizes["mass"]["unit"], sizes["from A"]["unit"]) == ("kg", "mm")
    assert tree["after"]["answer"] == tree["before"]["answer"] == "stroke"
    assert linkcalc("stroke", files["--output-model"]).status == 0
    again = stroke(read(files["--output-model"]))
    assert np.abs(again.effort).max() < 1e-9
    rows = list(csv.reader(files["--csv"].read_text(encoding="utf-8").splitlines()))
    assert rows[0] == ["case", "turn of arm [deg]", "effort before [N*m]", "effort after [N*m]",
                       "largest joint force before [N]", "largest joint force after [N]"]  # fmt: skip
    assert len(rows) == 1 + again.drive.shape[-1]
    assert all(p.read_text(encoding="utf-8").startswith("<?xml") for p in (files["--plot"], files["--output"]))


def test_options_ask_for_a_counterweight_without_a_table(tmp_path: Path) -> None:
    path = _model(tmp_path, ARM)
    said = linkcalc("balance", path, "--mass-on", "arm", "--at", "back", "--json", "-")
    tree = json.loads(said.out)
    assert tree["found"][0]["sizes"][-1]["value"] == pytest.approx(6, rel=1e-9)
    given = json.loads(linkcalc("balance", path, "--mass-on", "arm", "--mass", "10 kg", "--json", "-").out)
    # of a given mass the place is found: 4 x 300/10 behind A
    sizes = {s["size"]: s["value"] for s in given["found"][0]["sizes"]}
    assert (sizes["x"], sizes["y"]) == (pytest.approx(-120, abs=1e-6), pytest.approx(0, abs=1e-6))
    light = linkcalc(
        "balance", path, "--mass-on", "arm", "--at", "back", "--most-mass", "3", "--goal", "least mean square"
    )
    assert light.status == 0
    assert "A counterweight could balance it at every pose; bounds and steps leave the rest." in light.out.replace(
        "\n", " "
    )


def test_without_anything_to_find_it_tells_where_it_balances(tmp_path: Path) -> None:
    path = _model(tmp_path, ARM.replace("to = 70", "to = 120"))
    said = linkcalc("balance", path)
    assert said.status == 0
    assert "unstable" in said.out
    assert "90.00" in said.out
    tree = json.loads(linkcalc("balance", path, "--effort", "5.88399 N*m", "--json", "-").out)
    assert tree["answer"] == "balance positions"
    # m g l cos = half of it at 60 degrees, 120 degrees is minus half
    assert [round(p["drive"]["value"], 3) for p in tree["positions"]["places"]] == [60.0]
    rows = list(csv.reader(linkcalc("balance", path, "--csv", "-").out.splitlines()))
    assert rows[0] == ["case", "turn of arm [deg]", "balance", "stiffness [N*m/deg]"]


def test_a_requirement_that_fails_with_it_in_ends_with_status_1(tmp_path: Path) -> None:
    said = linkcalc("balance", _model(tmp_path, ARM + FOUND + '[requirements]\npivot = "force at A <= 50 N"\n'))
    assert said.status == 1
    assert "FAILS" in said.out


@pytest.mark.parametrize("name", ["lamp_arm", "guard_door", "roof_hatch"])
def test_examples_are_balanced_and_hold(name: str) -> None:
    path = next(p for p in EXAMPLES if p.stem == name)
    said = linkcalc("balance", path, "--starts", "6")
    assert said.status == 0, said.err
    assert "Before and after" in said.out


BAD = [
    (
        FOUND.replace("[0, 20]", "[20, 5]"),
        "arm.toml:20: balance.find.bob.mass: from 20 kg to 5 kg is the wrong way round; [least, most] is wanted",
    ),
    (
        FOUND.replace('"arm"', '"ground"'),
        "arm.toml:18: balance.find.bob.mass_on: the ground does not move: a mass on it balances nothing; known: arm",
    ),
    (
        FOUND.replace('"arm"', '"arn"'),
        "arm.toml:18: balance.find.bob.mass_on: unknown member 'arn'; did you mean 'arm'?",
    ),
    (
        FOUND.replace('line = ["A", "back"]', 'box = ["A", "A"]'),
        "arm.toml:19: balance.find.bob.place.box: A and A are the same place: the box is empty; two "
        "opposite corners are wanted",
    ),
    (
        FOUND.replace("place =", "plase ="),
        "arm.toml:19: balance.find.bob.plase: unknown key 'plase'; did you mean 'place'?",
    ),
    (
        FOUND.replace("mass_on", "mas_on"),
        "arm.toml:18: balance.find.bob.mas_on: unknown key 'mas_on'; did you mean 'mass_on'?",
    ),
    (
        FOUND.replace("[0, 20]", "[1.2, 1.4]\nmass_step = 0.5"),
        "arm.toml:20: balance.find.bob.mass: no whole step of 0.5 kg lies within the bounds; wider "
        "bounds or a smaller step are wanted",
    ),
    (
        '[balance]\ngoal = "least"\n' + FOUND,
        "arm.toml:18: balance.goal: 'least' is not known here; one of 'least peak', 'least mean square'",
    ),
    (
        '[balance]\ncases = ["hot"]\n' + FOUND,
        "arm.toml:18: balance.cases: unknown case 'hot'; there are none",
    ),
    (
        '[balance]\nstays_at_end = "500 N*m"\n' + FOUND,
        "arm.toml:17: balance: nothing within the bounds lets it stay at the ends of its stroke as "
        "wanted; smaller margins (stays_at_start, stays_at_end) or wider bounds are wanted",
    ),
    (
        '[balance.find.coil]\nspring = ["back", "G"]\n',
        "arm.toml:18: balance.find.coil.spring: both ends are on arm: it does nothing; places on two "
        "members are wanted, each with its 'on'",
    ),
    (
        '[balance.find.coil]\nspring = ["far", { line = ["back", "far"] }]\n',
        "arm.toml:18: balance.find.coil.spring.2: it is not told which member has it; add on = MEMBER",
    ),
    (
        '[balance.find.gas]\ngas_spring = ["far", "G"]\nlength = 300\nstroke = 120\n',
        "arm.toml:17: balance.find.gas: nothing within the bounds keeps to all limits of length and "
        "place; wider places, another length, a longer stroke of a gas spring are wanted",
    ),
    (
        '[balance.find.gas]\ngas_spring = ["far", "G"]\nlength = 300\nstroke = 320\n',
        "arm.toml:20: balance.find.gas.stroke: 320 mm, not less than its length, 300 mm; less is wanted",
    ),
]


@pytest.mark.parametrize(("more", "says"), BAD, ids=[says.split(": ")[1] + str(k) for k, (_, says) in enumerate(BAD)])
def test_bad_bounds_are_told(more: str, says: str, tmp_path: Path) -> None:
    said = linkcalc("balance", _model(tmp_path, ARM + more))
    assert (said.status, said.out) == (2, "")
    assert said.err.replace(f"{tmp_path}/", "") == says + "\n"


def test_a_member_that_does_not_move_is_told(tmp_path: Path) -> None:
    text = ARM.replace('ground = ["A", "far"]', 'ground = ["A", "far"]\nstill = ["far", "farther", "A2"]').replace(
        "[points]", "[points]\nfarther = [950, 50]\nA2 = [980, 0]").replace("[effort]", '[welds.bolted]\nat = "far"\n'
        'members = ["still", "ground"]\n[effort]')  # fmt: skip
    said = linkcalc("balance", _model(tmp_path, text), "--mass-on", "still", "--at", "farther")
    assert said.status == 2
    assert "nothing that is put there does work over the stroke: still does not move so" in said.err
    assert "another member or place is wanted: arm" in said.err


@pytest.mark.parametrize(
    ("old", "new", "says"),
    [
        ("[stroke]\nturn = \"arm\"\nline = [\"A\", \"G\"]\nfrom = -40\nto = 70\n", "",
         "stroke: the model has no stroke to be balanced over; give it a [stroke]"),
        ("torque_on = \"arm\"\n", "torque_on = \"arm\"\nsize = 3\n[load]\nat = \"G\"\ndirection = 0\n",
         "effort: it has a size, and the load is what is asked for; leave its size out"),
    ],
)  # fmt: skip
def test_a_model_with_nothing_to_balance_is_told(old: str, new: str, says: str, tmp_path: Path) -> None:
    assert ARM.count(old) == 1
    said = linkcalc("balance", _model(tmp_path, ARM.replace(old, new) + FOUND))
    assert (said.status, said.out) == (2, "")
    assert says in said.err


@pytest.mark.parametrize(
    ("options", "says"),
    [
        (("--at", "G"), "--at: it goes with --mass-on; add --mass-on MEMBER"),
        (("--mass-on", "arn"), "--mass-on: unknown member 'arn'; did you mean 'arm'?"),
        (("--mass-on", "ground"), "--mass-on: the ground does not move; known: arm"),
        (("--mass-on", "arm", "--at", "far"), "--at: arm does not carry 'far'; known: A, G, back"),
        (("--mass-on", "arm", "--mass", "3 mm"), "--mass: 3 mm is a length; a mass is wanted (e.g. 12 kg)"),
        (("--mass-on", "arm", "--mass", "3", "--most-mass", "4"),
         "--most-mass: the mass is given by --mass; one of the two is wanted"),
        (("--goal", "leest peak"), "--goal: unknown goal 'leest peak'; did you mean 'least peak'?"),
        (("--starts", "0"), "--starts: 0 starts; from 1 to 1000 are wanted"),
        (("--seed", "-1"), "--seed: -1 is less than nothing; a whole number from 0 on is wanted"),
        (("--output-model", "x.toml"),
         "--output-model: the model does not say what may be put in; give it [balance.find.NAME], or add --mass-on"
         " MEMBER"),
        (("--effort", "3 mm"), "--effort: 3 mm is a length; a moment is wanted (e.g. 12 N*m)"),
        (("--json", "-", "--csv", "-"), "--json and --csv: both cannot be printed; give one of them a file"),
    ],
)  # fmt: skip
def test_options_that_do_not_fit_are_told(options: tuple[str, ...], says: str, tmp_path: Path) -> None:
    said = linkcalc("balance", _model(tmp_path, ARM), *options)
    assert (said.status, said.out, said.err) == (2, "", says + "\n")
