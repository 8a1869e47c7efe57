"""A model file as text: read whole, parsed as TOML, and asked for line numbers only once something is wrong."""

from __future__ import annotations

import re
import tomllib
from functools import cached_property
from pathlib import Path
from typing import Any

from linkcalc.faults import Fault, Faults

_LARGEST = 5_000_000
_PLACE = re.compile(r"\s*\(at (?:line (\d+), column \d+|end of document)\)")
_TOKEN = re.compile(
    r"""(?P<text>\"{3}(?:[^\\]|\\.)*?\"{3,5}|'{3}.*?'{3,5}|"(?:[^"\\\n]|\\.)*"|'[^'\n]*')"""
    r"""|(?P<blank>\#[^\n]*|[^\S\n]+)|(?P<end>\n)|(?P<sign>[\[\]{},=.])|(?P<bare>[^\s\[\]{},=.\#"']+)""",
    re.DOTALL,
)


class Source:
    """The text of a model file.

    name  what messages call it
    tree  the parsed tables
    """

    def __init__(self, text: str, name: str):
        """Raises Faults: not TOML, nothing in it."""
        self.name = name
        self._text = text.replace("\r\n", "\n").removeprefix("\N{ZERO WIDTH NO-BREAK SPACE}")
        self.tree = self._parsed()

    def line(self, item: tuple[str, ...]) -> int:
        """Line of an item, or of the nearest item around it that stands in the file; 0 if none does."""
        for end in range(len(item), 0, -1):
            if item[:end] in self._lines:
                return self._lines[item[:end]]
        return 0

    def located(self, faults: list[Fault]) -> Faults:
        """The faults with file and line, in the order of the file."""
        found = [f.located(self.name, self.line(f.item)) for f in faults]
        return Faults(sorted(found, key=lambda f: f.line))

    def _parsed(self) -> dict[str, Any]:
        if not self._text.strip():
            raise Faults(Fault((), "the file is empty", "a model is wanted", self.name))
        try:
            return tomllib.loads(self._text)
        except tomllib.TOMLDecodeError as error:
            place = _PLACE.search(str(error))
            last = self._text.rstrip().count("\n") + 1
            line = int(place[1]) if place and place[1] else last
            what = _PLACE.sub("", str(error))
            raise Faults(Fault((), f"not TOML: {what[:1].lower()}{what[1:]}", "", self.name, line)) from None
        except RecursionError:
            raise Faults(Fault((), "not a model: brackets stand too deep in one another", "", self.name)) from None
        except ValueError:  # a whole number of thousands of digits
            raise Faults(Fault((), "not a model: a number is too long to be read", "", self.name)) from None

    @cached_property
    def _lines(self) -> dict[tuple[str, ...], int]:
        return _key_lines(self._text)


def open_source(path: Path) -> Source:
    """The model file at a path.

    Raises Faults: missing, a folder, unreadable, too large, not text, not TOML.
    """
    name = str(path)
    try:
        if not path.exists():
            raise Faults(Fault((), "no such file", "", name))
        if not path.is_file():
            raise Faults(Fault((), "not a file", "a model file is wanted", name))
        if path.stat().st_size > _LARGEST:
            raise Faults(Fault((), "larger than any model", f"at most {_LARGEST // 1_000_000} MB are read", name))
        data = path.read_bytes()
    except (OSError, ValueError) as error:
        if isinstance(error, Faults):
            raise
        reason = getattr(error, "strerror", None) or str(error)
        raise Faults(Fault((), f"cannot be read: {reason.lower()}", "", name)) from None
    try:
        return Source(data.decode("utf-8"), name)
    except UnicodeDecodeError as error:
        line = data.count(b"\n", 0, error.start) + 1
        raise Faults(Fault((), "not text in UTF-8", "a model is a TOML file", name, line)) from None


def _key_lines(text: str) -> dict[tuple[str, ...], int]:
    """The line where each key first stands, by its path. The text is known to be TOML."""
    lines: dict[tuple[str, ...], int] = {}
    table: tuple[str, ...] = ()
    key: list[str] = []
    open_: list[tuple[str, tuple[str, ...]]] = []  # brackets of the value being read, with the path they belong to
    mode, line = "key", 1

    def enter(around: tuple[str, ...]) -> tuple[str, ...]:
        for end in range(1, len(key) + 1):
            lines.setdefault(around + tuple(key[:end]), line)
        return around + tuple(key)

    path: tuple[str, ...] = ()
    for token in _TOKEN.finditer(text):
        kind, word = token.lastgroup, token[0]
        if kind == "end" and not open_:
            mode, key = "key", []
        elif kind in ("text", "bare") and mode in ("key", "header"):
            key.append(_unquoted(word))
        elif kind == "sign" and mode == "key":
            if word == "[":
                mode = "header"
            elif word == "=":
                mode, path = "value", enter(open_[-1][1] if open_ else table)
            elif word == "}":
                mode, path = "value", open_.pop()[1]
        elif kind == "sign" and mode == "header" and word == "]":
            table, mode = enter(()), "closed"
        elif kind == "sign" and mode == "value":
            if word in "[{":
                open_.append((word, path))
                mode, key = ("key" if word == "{" else "value"), []
            elif word in "]}":
                path = open_.pop()[1]
            elif word == "," and open_ and open_[-1][0] == "{":
                mode, key = "key", []
        line += word.count("\n")
    return lines


def _unquoted(word: str) -> str:
    return str(tomllib.loads(f"k = {word}")["k"]) if word[0] in "\"'" else word
