"""Model files as text: what is no model file, and the lines that things stand on."""

from __future__ import annotations

import os
import tomllib
from pathlib import Path

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from linkcalc.faults import Faults
from linkcalc.model.read import read
from linkcalc.model.source import Source

TEXT = '''\
title = "a = 3 # no comment" # but = this
"quoted key" = 1
note = """
points = "no key"
[no.table]
"""
a.b.c = 1
a.b."d.e" = 'x = 1'

[members]
bar = { points = ["A", "B"], mass = 3, inner = { deep = 1 } }
long = [
  "x", # y = 3
  ["[z]"],
  { in_list = 1 },
]
[ cases . wet ]
scale = {}
[cases.wet.add.rain]
at = "A"
[[rows]]
first = 1
[[rows]]
second = 2
[last]
x = -1.5e3
y = 1979-05-27T07:32:00Z
z = \'\'\'raw = """ "\'\'\'
w = "\\"] = {"
v = ["""
q = 1""", 'r = 2']
u = 1
'''


@pytest.mark.parametrize(
    ("item", "line"),
    [
        (("title",), 1),
        (("quoted key",), 2),
        (("note",), 3),
        (("a", "b"), 7),
        (("a", "b", "c"), 7),
        (("a", "b", "d.e"), 8),
        (("members",), 10),
        (("members", "bar", "mass"), 11),
        (("members", "bar", "inner", "deep"), 11),
        (("members", "long"), 12),
        (("members", "long", "1"), 12),
        (("cases",), 17),
        (("cases", "wet", "scale"), 18),
        (("cases", "wet", "scale", "load"), 18),
        (("cases", "wet", "add"), 19),
        (("cases", "wet", "add", "rain", "at"), 20),
        (("rows",), 21),
        (("rows", "second"), 24),
        (("last", "x"), 26),
        (("last", "w"), 29),
        (("last", "u"), 32),
        (("last", "nothing"), 25),
        (("points",), 0),
        ((), 0),
    ],
)
def test_lines_of_items(item: tuple[str, ...], line: int) -> None:
    assert Source(TEXT, "m").line(item) == line
    assert Source(TEXT.replace("\n", "\r\n"), "m").line(item) == line


KEYS = st.sampled_from(["a", "b-1", '"c d"', "'e.f'", '"g\\u0041"'])
VALUES = st.recursive(
    st.sampled_from(
        ["1", "1.5", '"x"', "'y = 2'", "true", '"""\nm = 1\n"""', "'''\n[t]'''", '"\\\\"', "[\n1,\n2 # c\n]"]
    ),
    lambda inner: st.one_of(
        st.lists(inner, max_size=3).map(lambda v: "[" + ", ".join(v) + "]"),
        st.dictionaries(KEYS, inner, max_size=3).map(
            lambda d: "{" + ", ".join(f"{k} = {v}" for k, v in d.items()) + "}"
        ),
    ),
    max_leaves=6,
)


@settings(max_examples=150, deadline=None)
@given(st.dictionaries(KEYS, VALUES, min_size=1), st.dictionaries(KEYS, st.dictionaries(KEYS, VALUES), max_size=3))
def test_every_key_is_found_where_it_was_put(top: dict[str, str], tables: dict[str, dict[str, str]]) -> None:
    """Write a file line by line, remembering where each key went."""
    lines: list[str] = []
    wanted: dict[tuple[str, ...], int] = {}

    def put(text: str, *path: str) -> None:
        wanted[path] = len(lines) + 1
        lines.extend(text.split("\n"))

    def plain(key: str) -> str:
        return next(iter(tomllib.loads(f"{key} = 1")))

    for key, value in top.items():
        put(f"{key} = {value}", plain(key))
    for name, table in tables.items():
        if name in top:
            continue
        put(f"[{name}]", plain(name))
        for key, value in table.items():
            put(f"{key} = {value}  # {key} = 0", plain(name), plain(key))
    source = Source("\n".join(lines), "m")
    assert {path: source.line(path) for path in wanted} == wanted


@pytest.mark.parametrize(
    ("text", "message"),
    [
        ("", "m.toml: the file is empty; a model is wanted"),
        (" \n\n", "m.toml: the file is empty; a model is wanted"),
        ("a = 1\nb = = 2\n", "m.toml:2: not TOML: invalid value"),
        ("a = 1\n[points\n", "m.toml:2: not TOML: expected ']' at the end of a table declaration"),
        ("a = 1\na = 2\n", "m.toml:2: not TOML: cannot overwrite a value"),
        ('a = 1\n\nb = "open', 'm.toml:3: not TOML: unterminated string'),
        ("a = " + "[" * 3000, "m.toml: not a model: brackets stand too deep in one another"),
        ("a = " + "1" * 5000, "m.toml: not a model: a number is too long to be read"),
    ],
    ids=range(8),
)  # fmt: skip
def test_what_is_no_model(text: str, message: str) -> None:
    with pytest.raises(Faults) as raised:
        Source(text, "m.toml")
    assert str(raised.value) == message


def test_a_mark_of_byte_order_is_no_fault() -> None:
    assert Source("\ufeffa = 1", "m").tree == {"a": 1}


@pytest.mark.parametrize(
    ("make", "message"),
    [
        (lambda _: None, "{}: no such file"),
        (lambda p: p.mkdir(), "{}: not a file; a model file is wanted"),
        (lambda p: os.mkfifo(p), "{}: not a file; a model file is wanted"),
        (lambda p: p.write_bytes(b"a = 1\nb = '\xff\xfe'"), "{}:2: not text in UTF-8; a model is a TOML file"),
        (lambda p: p.write_bytes(bytes(range(256))), "{}:2: not text in UTF-8; a model is a TOML file"),
        (lambda p: p.write_bytes(b" " * 5_000_001), "{}: larger than any model; at most 5 MB are read"),
        (lambda p: p.touch(), "{}: the file is empty; a model is wanted"),
    ],
    ids=["missing", "folder", "pipe", "not utf-8", "binary", "large", "empty"],
)
def test_files_that_cannot_be_read(tmp_path: Path, make, message: str) -> None:  # type: ignore[no-untyped-def]
    path = tmp_path / "m.toml"
    make(path)
    with pytest.raises(Faults) as raised:
        read(path)
    assert str(raised.value) == message.format(path)


@pytest.mark.parametrize(
    ("name", "reason"), [("a\0b", "no such file"), ("x" * 300, "cannot be read: file name too long")]
)
def test_names_that_are_none(tmp_path: Path, name: str, reason: str) -> None:
    with pytest.raises(Faults) as raised:
        read(tmp_path / name)
    assert str(raised.value) == f"{tmp_path / name}: {reason}"


@pytest.mark.skipif(os.geteuid() == 0, reason="the superuser may read anything")
def test_a_file_that_may_not_be_read(tmp_path: Path) -> None:
    path = tmp_path / "m.toml"
    path.write_text("a = 1")
    path.chmod(0)
    with pytest.raises(Faults, match="cannot be read: permission denied"):
        read(path)
