"""What docs/json.md says of the answer of ``linkcalc pins``, held against a text. Written from the page alone."""

from __future__ import annotations

from typing import Any

TOP = [
    "schema", "answer", "title", "note", "drive", "axes", "poses", "time of a stroke", "goes round", "joints", "ropes",
    "foundation", "requirements", "holds", "balances", "warnings", "cautions", "checks", "status",
]  # fmt: skip
JOINT = [
    "joint", "kind", "largest", "smallest", "moment", "diameter", "members", "swings", "sizes", "reversals",
]  # fmt: skip
SWING = [
    "member", "against", "kind", "low", "high", "swing", "path", "turns back", "mean load", "path of rubbing",
    "mean speed", "largest speed",
]  # fmt: skip
SIZE = ["part", "needed", "chosen", "size", "utilisation", "why not smaller", "worst", "working"]
FOUNDATION = ["about", "resultant", "right", "left", "up", "down", "counter-clockwise", "clockwise"]


class PinsSchema:
    """One answer, with the units of its model: kind of size -> unit."""

    def __init__(self, tree: dict[str, Any], units: dict[str, str], drive: str = ""):
        """drive: kind of what is stepped"""
        self.tree, self.units, self.drive = tree, units, units.get(drive, "")

    def check(self) -> None:
        tree = self.tree
        assert list(tree) == TOP
        assert (tree["schema"], tree["answer"]) == (1, "pins")
        assert list(tree["axes"]) == ["case", "pose", "member", "joint", "copy"]
        assert tree["poses"]["unit"] == self.drive
        assert len(tree["poses"]["values"]) == tree["axes"]["pose"]
        assert tree["time of a stroke"]["unit"] == "s"
        assert [j["joint"] for j in tree["joints"]] == tree["axes"]["joint"]
        for joint in tree["joints"]:
            self._joint(joint)
        for rope in tree["ropes"]:
            assert list(rope) == ["rope", "largest", "smallest", "sizes"]
            self._peak(rope["largest"], "force")
            for size in rope["sizes"]:
                self._size(size, "force", "force")
        if tree["foundation"] is not None:
            assert list(tree["foundation"]) == FOUNDATION
            for key in FOUNDATION[1:]:
                self._peak(tree["foundation"][key], "moment" if "clock" in key else "force")

    def _joint(self, joint: dict[str, Any]) -> None:
        assert list(joint) == JOINT
        self._peak(joint["largest"], "force")
        self._peak(joint["smallest"], "force")
        if joint["moment"] is not None:
            self._peak(joint["moment"], "moment")
        for side in joint["members"]:
            assert list(side) == ["member", "largest", "rose"]
            self._peak(side["largest"], "force")
            if side["rose"] is not None:
                self._rose(side["rose"])
        speed = "ft/min" if self.units["length"] in ("in", "ft") else "m/s"
        for swing in joint["swings"]:
            assert list(swing) == SWING
            kind = {"turn": "angle", "slide": "length"}[swing["kind"]]
            for key in ("low", "high", "swing", "path"):
                assert swing[key]["unit"] == self.units[kind]
            assert swing["mean speed"]["unit"] == swing["largest speed"]["unit"] == speed
        for size in joint["sizes"]:
            self._size(size, "length", "stress")
        for turn in joint["reversals"]:
            assert list(turn) == ["of", "case", "drive"]

    def _size(self, size: dict[str, Any], kind: str, worst: str) -> None:
        assert list(size) == SIZE
        assert size["needed"]["unit"] == size["size"]["unit"] == self.units[kind]
        assert size["utilisation"] == size["working"]["utilisation"]
        assert (size["worst"] is not None) == (size["part"] in ("guide", "rope"))
        if size["worst"] is not None:
            self._peak(size["worst"], worst)

    def _peak(self, peak: dict[str, Any], kind: str) -> None:
        assert list(peak) == ["case", "copy", "drive", "value", *(["felt"] if "felt" in peak else [])]
        assert peak["value"]["unit"] == self.units[kind]
        assert peak["drive"]["unit"] == self.drive
        assert peak["case"] is None or peak["case"] in self.tree["axes"]["case"]
        for felt in peak.get("felt", []):
            assert list(felt) == ["member", "force", "direction", "direction from own axis"]

    def _rose(self, rose: dict[str, Any]) -> None:
        assert list(rose) == ["direction from own axis", "force", "sectors", "free"]
        for key, kind in (("direction from own axis", "angle"), ("force", "force")):
            assert rose[key]["axes"] == ["case", "pose"]
            assert rose[key]["unit"] == self.units[kind]
            assert len(rose[key]["values"]) == len(self.tree["axes"]["case"])
            assert {len(row) for row in rose[key]["values"]} == {self.tree["axes"]["pose"]}
        assert len(rose["sectors"]["values"]) == 36
        assert rose["free"] is None or list(rose["free"]) == ["unit", "from", "to"]
