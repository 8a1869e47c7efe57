"""Tables of a file <-> the mechanism, made from the fields of the dataclasses: no kind is known here by name."""

from __future__ import annotations

import difflib
from collections.abc import Callable, Mapping
from dataclasses import MISSING, Field
from typing import Any

import numpy as np

import linkcalc.parts  # noqa: F401  (enters every kind under its word)
from linkcalc.model.gather import Gather, Item
from linkcalc.model.mechanism import Mechanism, asked_by
from linkcalc.model.shapes import SHAPES, Meta, shown, unknown_key
from linkcalc.parts.fields import part_fields, required
from linkcalc.words import kinds

BROKEN: Any = object()
"""What stands for a value that cannot be read; what was wrong with it is gathered."""

_LISTED = {"construction": "x", "layer": "plate"}
"""Family -> the word of the kind that a plain list stands for: a point is [x, y], a plate [member, thickness, gap]."""


def from_tree(tree: Mapping[str, Any], gather: Gather) -> Mechanism:
    """The mechanism that tables say. What cannot be read is left out of it and goes into `gather`."""
    found: Mechanism = read_table(Mechanism, tree, (), gather, whole=False)
    return found


def to_tree(thing: Any) -> Any:
    """Tables that say a mechanism or one of its parts; what is as when left out is left out."""
    out: dict[str, Any] = {}
    for entry in part_fields(thing):
        value = getattr(thing, entry.name)
        if required(entry) or value != _default(entry):
            kind = entry.metadata["kind"]
            out |= _SPREAD[kind].write(value) if kind in _SPREAD else {key_of(type(thing), entry): _plain(value)}
    if (getattr(thing, "family", ""), getattr(thing, "word", "")) in _LISTED.items() and _leads(thing, out):
        return list(out.values())
    short: str = getattr(thing, "short", "")
    return out[short] if set(out) == {short} else out


def _leads(thing: Any, out: Mapping[str, Any]) -> bool:
    """True if the keys are the first ones of the part, so that a list without names says the same."""
    return list(out) == [key_of(type(thing), entry) for entry in part_fields(thing)][: len(out)]


def key_of(cls: type, entry: Field[Any]) -> str:
    """The key of a field in a file: its name, or what stands in for a word that Python keeps for itself."""
    key: str = getattr(cls, "keys", {}).get(entry.name, entry.name.rstrip("_"))
    return key


def _default(entry: Field[Any]) -> Any:
    return entry.default if entry.default_factory is MISSING else entry.default_factory()


def _plain(value: Any) -> Any:
    if hasattr(value, "__dataclass_fields__"):
        return to_tree(value)
    if isinstance(value, Mapping):
        return {key: _plain(one) for key, one in value.items()}
    if isinstance(value, (tuple, list)):
        return [_plain(one) for one in value]
    return value.item() if isinstance(value, np.generic) else value


def read_table(cls: type, raw: Any, item: Item, gather: Gather, *, whole: bool = True) -> Any:
    """A table as the dataclass it stands for; BROKEN if something is wrong with it, unless parts will do."""
    if not isinstance(raw, Mapping):
        if not hasattr(cls, "short"):
            gather.add(item, f"{shown(raw)} is no table", f"a table is wanted with {_keys_text(cls)}")
            return BROKEN
        raw = {cls.short: raw}
    before = len(gather.faults)
    given, known, lacking = {}, list[str](), list[Field[Any]]()
    for entry in part_fields(cls):
        keys = _keys(cls, entry)
        known += keys
        found = {key: raw[key] for key in keys if key in raw}
        value = _field(entry, found, keys, item, gather) if found else BROKEN
        if value is not BROKEN:
            given[entry.name] = value
        elif not found and required(entry):
            lacking.append(entry)
    unknown = [key for key in raw if key not in known]
    for key in unknown:
        gather.add((*item, key), *unknown_key(key, known))
    for entry in lacking:
        keys = _keys(cls, entry)
        if not any(difflib.get_close_matches(key, unknown) for key in keys):
            one = "one of " + ", ".join(map(repr, _needed(entry, keys)))
            gather.add(item, f"{one if len(keys) > 1 else repr(keys[0])} is missing", str(entry.metadata["text"]))
    _one_of(cls, given, item, gather)
    if whole and len(gather.faults) > before:
        return BROKEN
    return cls(**given)


def _one_of(cls: type, given: Mapping[str, Any], item: Item, gather: Gather) -> None:
    choice: tuple[str, ...] = getattr(cls, "one_of", ())
    count = sum(name in given for name in choice)
    if choice and count != 1 and not gather.touches(*item):
        names = ", ".join(map(repr, choice))
        gather.add(item, f"{'none' if count == 0 else 'more than one'} of {names} is given", "exactly one is needed")


def _field(entry: Field[Any], found: Mapping[str, Any], keys: list[str], item: Item, gather: Gather) -> Any:
    kind = entry.metadata["kind"]
    if kind in _SPREAD:
        return _SPREAD[kind].read(found, entry.metadata, item, gather)
    key = keys[0]
    if kind in _NESTED:
        return _NESTED[kind](found[key], entry.metadata, (*item, key), gather)
    return gather.attempt((*item, key), lambda: SHAPES[kind](found[key], entry.metadata), BROKEN)


def _keys(cls: type, entry: Field[Any]) -> list[str]:
    kind = entry.metadata["kind"]
    return _SPREAD[kind].keys() if kind in _SPREAD else [key_of(cls, entry)]


def _keys_text(cls: type) -> str:
    return ", ".join(repr(key) for entry in part_fields(cls) for key in _keys(cls, entry))


def _part(raw: Any, meta: Meta, item: Item, gather: Gather) -> Any:
    """A part of a family, told by the one key that only its kind has."""
    family = kinds(meta["family"])
    if "asks" in meta:  # an effort must be able to be the unknown
        family = {word: kind for word, kind in family.items() if asked_by(kind) in (f.name for f in part_fields(kind))}
    listed = family.get(_LISTED.get(meta["family"], ""))
    if listed and isinstance(raw, (list, tuple)):
        names = [key_of(listed, entry) for entry in part_fields(listed)]
        least = sum(required(entry) for entry in part_fields(listed))
        if not least <= len(raw) <= len(names):
            wanted = ", ".join(names[:least]) + "".join(f"[, {name}" for name in names[least:])
            gather.add(item, f"a list of {len(raw)}", f"[{wanted}{']' * (len(names) - least)}] is wanted")
            return BROKEN
        raw = dict(zip(names, raw, strict=False))
    if isinstance(raw, str):
        short = next((kind for kind in family.values() if hasattr(kind, "short")), None)
        if short:
            return read_table(short, raw, item, gather)
    words = ", ".join(repr(word) for word in family)
    if not isinstance(raw, Mapping):
        gather.add(item, f"{shown(raw)} is no table", f"a table with one of the keys {words} is wanted")
        return BROKEN
    told = [word for word in family if word in raw]
    if len(told) == 1:
        return read_table(family[told[0]], raw, item, gather)
    if told:
        gather.add(item, f"{' and '.join(map(repr, told))} are both given", "one of them tells the kind")
        return BROKEN
    for key in raw:
        close = difflib.get_close_matches(key, family, n=1)
        if close:
            gather.add((*item, key), *unknown_key(key, list(family)))
            return BROKEN
    gather.add(item, "its kind cannot be told", f"one of the keys {words} is needed")
    return BROKEN


def _table(raw: Any, meta: Meta, item: Item, gather: Gather) -> Any:
    return read_table(meta["of"], raw, item, gather)


def _parts(raw: Any, meta: Meta, item: Item, gather: Gather) -> Any:
    """Parts of a family in order; a name alone stands for the kind with a short form."""
    if not isinstance(raw, (list, tuple)) or len(raw) < meta["least"]:
        what = f"a list of {len(raw)}" if isinstance(raw, (list, tuple)) else f"{shown(raw)} is no list"
        gather.add(item, what, meta["wanted"])
        return BROKEN
    short = next((kind for kind in kinds(meta["family"]).values() if hasattr(kind, "short")), None)
    found = [
        read_table(short, one, (*item, str(k)), gather)
        if isinstance(one, str) and short
        else _part(one, {"family": meta["family"]}, (*item, str(k)), gather)
        for k, one in enumerate(raw, 1)
    ]
    return BROKEN if any(one is BROKEN for one in found) else tuple(found)


def _text(raw: Any, meta: Meta, item: Item, gather: Gather) -> Any:
    return gather.attempt(item, lambda: SHAPES["text"](raw, meta), BROKEN)


def _named(read: Callable[[Any, Meta, Item, Gather], Any]) -> Callable[[Any, Meta, Item, Gather], Any]:
    """A table of things by their own names."""

    def read_all(raw: Any, meta: Meta, item: Item, gather: Gather) -> Any:
        if not isinstance(raw, Mapping):
            gather.add(item, f"{shown(raw)} is no table", "a table is wanted, with a name for each")
            return BROKEN
        found = {}
        for name, one in raw.items():
            if not _may_name(name, bool(meta.get("blanks"))):
                gather.add(
                    (*item, name), f"{name!r} cannot be a name", "letters, digits and signs without blanks are wanted"
                )
            value = read(one, meta, (*item, name), gather)
            if value is not BROKEN:
                found[name] = value
        return found

    return read_all


def _may_name(name: str, blanks: bool) -> bool:
    return name.isprintable() and bool(name.strip()) and name == name.strip() and (blanks or " " not in name)


def _needed(entry: Field[Any], keys: list[str]) -> list[str]:
    """Of the keys of several kinds those that tell the kind."""
    return [key for key in keys if key in kinds(entry.metadata["kind"])] or keys


class _Coordinate:
    """A coordinate lies open among the keys of the stroke."""

    @staticmethod
    def keys() -> list[str]:
        return list(dict.fromkeys(key_of(k, f) for k in kinds("coordinate").values() for f in part_fields(k)))

    @staticmethod
    def read(found: Mapping[str, Any], meta: Meta, item: Item, gather: Gather) -> Any:
        return _part(found, {**meta, "family": "coordinate"}, item, gather)

    @staticmethod
    def write(value: Any) -> dict[str, Any]:
        tree: dict[str, Any] = to_tree(value)
        return tree


class _Joints:
    """Joints stand in tables of their own, named by the plural of their word."""

    @staticmethod
    def keys() -> list[str]:
        return [f"{word}s" for word in kinds("joint")]

    @staticmethod
    def read(found: Mapping[str, Any], meta: Meta, item: Item, gather: Gather) -> Any:  # noqa: ARG004
        joints: dict[str, Any] = {}
        for word, kind in kinds("joint").items():
            if f"{word}s" in found:
                read = _NESTED["named tables"](found[f"{word}s"], {"of": kind}, (*item, f"{word}s"), gather)
                joints |= {word: read} if read not in (BROKEN, {}) else {}
        return joints

    @staticmethod
    def write(value: Mapping[str, Mapping[str, Any]]) -> dict[str, Any]:
        return {f"{word}s": _plain(parts) for word, parts in value.items() if parts}


_NESTED: dict[str, Callable[[Any, Meta, Item, Gather], Any]] = {
    "table": _table,
    "part": _part,
    "parts": _parts,
    "named tables": _named(_table),
    "named parts": _named(_part),
    "named texts": _named(_text),
}
_SPREAD: dict[str, Any] = {"coordinate": _Coordinate, "joints": _Joints}
