"""What docs/json.md says of the JSON, held against a text: keys, axes, shapes, units. Written from the page alone."""

from __future__ import annotations

from typing import Any

TOP = [
    "schema", "answer", "title", "note", "drive", "axes", "quantities", "joints", "two-force members", "ropes", "loads",
    "members", "events", "requirements", "holds", "balances", "warnings", "cautions", "checks", "status",
]  # fmt: skip
QUANTITIES = ["drive", "effort", "load", "tare effort", "force ratio", "ideal ratio"]
RUBBING = ["frictionless effort", "efficiency"]
RATIOS = {("force", "moment"): "1/m", ("moment", "force"): "m"}
JOINT = {
    "x": "force", "y": "force", "resultant": "force", "direction": "angle", "direction from own axis": "angle",
    "moment": "moment",
}  # fmt: skip
TOLD = {
    "force": "force", "rod force": "force",
    "length": "length", "torque": "moment", "angle": "angle", "pressure": "pressure",
    "raising torque": "moment", "lowering torque": "moment",
}  # fmt: skip
EVENTS = {"largest", "smallest", "reversal", "dead point", "limit", "change point", "slack", "self-locking edge",
          "contact made", "contact lost", "snap-through", "opposite peak"}  # fmt: skip
BATCH = ["case", "variant", "pose"]
STILL = ["one", "variant", "pose"]


class Schema:
    """One answer, with the units of its model: kind of size -> unit; "number" -> ""."""

    def __init__(self, tree: dict[str, Any], units: dict[str, str]):
        self.tree, self.units = tree, {"number": "", **units}
        axes = tree["axes"]
        self.lengths = {"case": len(axes["case"]), "variant": axes["variant"], "pose": axes["pose"], "one": 1}

    def check(self, kinds: dict[str, str]) -> None:
        """kinds  of drive, effort and load in this model"""
        tree = self.tree
        self.units["ratio"] = RATIOS.get((kinds.get("load", ""), kinds.get("effort", "")), "")
        assert list(tree) == TOP
        assert (tree["schema"], tree["answer"]) == (1, "stroke")
        assert list(tree["axes"]) == ["case", "variant", "pose", "member", "joint"]
        for name, array in tree["quantities"].items():
            assert array["text"]
            kind = {"tare effort": "effort", "frictionless effort": "effort"}.get(name, name)
            kind = "ratio" if name.endswith("ratio") else kinds.get(kind, "number")
            self.array(array, kind, STILL if name == "drive" else BATCH, more=frozenset({"text"}))
        rubs, loose = "efficiency" in tree["quantities"], "steady" in tree["quantities"]
        assert sorted(tree["quantities"]) == sorted(
            QUANTITIES + (RUBBING if rubs else []) + (["steady"] if loose else [])
        )
        for side in tree["joints"]:
            assert list(side) == ["joint", "kind", "member", "copies", *JOINT]
            assert side["joint"] in tree["axes"]["joint"]
            for key, kind in JOINT.items():
                self.array(side[key], kind, BATCH)
        assert {s["joint"] for s in tree["joints"]} == set(tree["axes"]["joint"])
        for entry in tree["two-force members"]:
            assert entry["member"] in tree["axes"]["member"]
            self.array(entry["axial"], "force", BATCH)
        for entry in tree["ropes"]:
            ends = ["first tension", "last tension"] if len(entry) > 2 else []
            assert list(entry) == ["rope", "tension", *ends]
            for key in list(entry)[1:]:
                self.array(entry[key], "force", BATCH)
        for entry in tree["loads"]:
            array = {key: value for key, value in entry.items() if key not in ("load", "quantity")}
            self.array(array, TOLD[entry["quantity"]], BATCH)
        assert [entry["member"] for entry in tree["members"]] == tree["axes"]["member"]
        for entry in tree["members"]:
            for key, kind in (("x", "length"), ("y", "length"), ("turn", "angle")):
                self.array(entry[key], kind, BATCH if loose else STILL)
        self._told(kinds)
        self._status()

    def array(self, array: dict[str, Any], kind: str, axes: list[str], more: frozenset[str] = frozenset()) -> None:
        assert set(array) == {"unit", "axes", "values", *more}
        assert array["axes"] == axes
        assert array["unit"] == self.units[kind]
        self._nested(array["values"], axes)

    def _nested(self, values: Any, axes: list[str]) -> None:
        if not axes:
            assert values is None or type(values) is float
            return
        assert len(values) == self.lengths[axes[0]]
        for value in values:
            self._nested(value, axes[1:])

    def _told(self, kinds: dict[str, str]) -> None:
        for event in self.tree["events"]:
            assert list(event) == ["kind", "quantity", "case", "drive", "value", *(["felt"] if "felt" in event else [])]
            for felt in event.get("felt", []):
                assert list(felt) == ["member", "force", "direction", "direction from own axis"]
                assert felt["force"]["unit"] == self.units["force"]
                assert felt["direction"]["unit"] == felt["direction from own axis"]["unit"] == self.units["angle"]
            assert event["kind"] in EVENTS
            assert event["case"] is None or event["case"] in self.tree["axes"]["case"]
            assert event["drive"]["unit"] == self.units[kinds["drive"]]
            assert event["value"]["unit"] in self.units.values()
        for verdict in self.tree["requirements"]:
            assert list(verdict) == ["name", "text", "holds", "case", "worst", "limit", "drive"]
            assert verdict["worst"]["unit"] == verdict["limit"]["unit"]
        assert self.tree["holds"] == all(v["holds"] for v in self.tree["requirements"])
        assert all(list(w) == ["item", "text"] for key in ("warnings", "cautions") for w in self.tree[key])
        assert list(self.tree["checks"]) == ["closure", "equilibrium", "virtual work"]

    def _status(self) -> None:
        status = self.tree["status"]
        assert status["axes"] == BATCH
        codes = {code for case in status["values"] for variant in case for code in variant}
        assert {str(code) for code in codes} <= set(status["meaning"])
