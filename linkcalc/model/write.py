"""Writing a mechanism as a model file that reads back unchanged."""

from __future__ import annotations

import json
import re
from collections.abc import Iterator, Mapping
from pathlib import Path
from typing import Any

from linkcalc.faults import fault
from linkcalc.files import write_whole
from linkcalc.model.mechanism import Mechanism
from linkcalc.model.tree import to_tree

_BARE = re.compile(r"[A-Za-z0-9_-]+")
_WIDE = 110


def write(mechanism: Mechanism, path: str | Path) -> None:
    """Write a mechanism to a model file, whole or not at all.

    Raises Faults: it cannot be written there, or it holds what a file cannot say.
    """
    write_whole(path, dumps(mechanism))


def dumps(mechanism: Mechanism) -> str:
    """A mechanism as the text of a model file; ``parse`` gives the same mechanism back.

    Raises Faults: it holds what a file cannot say.
    """
    tree: dict[str, Any] = to_tree(mechanism)
    plain = [_pair(key, value, (key,)) for key, value in tree.items() if not isinstance(value, Mapping)]
    tables = ["\n".join(_section((key,), value)) for key, value in tree.items() if isinstance(value, Mapping)]
    return "\n\n".join([*(["\n".join(plain)] if plain else []), *tables]) + "\n"


def _section(path: tuple[str, ...], table: Mapping[str, Any]) -> Iterator[str]:
    """A table under its heading; its tables on one line each, or all under headings of their own if one is long.
    All of them, since lines after a heading belong to it: the order of the file would change."""
    head = ".".join(map(_key, path))
    lines = [_pair(key, value, (*path, key)) for key, value in table.items()]
    nested = [value for value in table.values() if isinstance(value, Mapping)]
    if len(path) == 1 and nested and len(nested) == len(table) and any(map(_large, nested, lines)):
        parts = ["\n".join(_section((*path, key), value)) for key, value in table.items()]
        yield "\n\n".join(parts)
    else:
        yield f"[{head}]"
        yield from lines


def _large(table: Mapping[str, Any], line: str) -> bool:
    return len(line) > _WIDE or any(isinstance(value, Mapping) for value in table.values())


def _pair(key: str, value: Any, item: tuple[str, ...]) -> str:
    return f"{_key(key)} = {_value(value, item)}"


def _key(key: str) -> str:
    return key if _BARE.fullmatch(key) else _quoted(key)


def _value(value: Any, item: tuple[str, ...]) -> str:
    if isinstance(value, str):
        long = "\n" in value and len(item) == 1
        return (
            '"""\n' + "\n".join(_quoted(line)[1:-1] for line in value.split("\n")) + '"""' if long else _quoted(value)
        )
    if isinstance(value, (int, float)) and not isinstance(value, bool):
        return float.__repr__(value) if isinstance(value, float) else str(value)
    if isinstance(value, Mapping):
        inner = ", ".join(_pair(key, one, (*item, key)) for key, one in value.items())
        return f"{{ {inner} }}" if inner else "{}"
    if isinstance(value, list):
        return "[" + ", ".join(_value(one, item) for one in value) + "]"
    raise fault(item, f"{type(value).__name__} {value!r} cannot stand in a model file")


def _quoted(text: str) -> str:
    return json.dumps(text, ensure_ascii=False).replace("\x7f", "\\u007f")
