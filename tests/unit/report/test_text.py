"""Tables on a terminal: aligned, never wider than asked, nothing lost when they are split."""

from linkcalc.report.blocks import Chart, Column, Drawing, Heading, Note, Table
from linkcalc.report.text import as_text


def _wide(columns: int) -> Table:
    heads = (Column("turn of handle", "deg", places=1), *(Column(f"joint {i}", "N") for i in range(columns)))
    rows = tuple((10.0 * r, *(100.0 * r + i for i in range(columns))) for r in range(4))
    return Table(heads, rows, "Over the stroke")


def test_no_line_is_wider_than_asked_and_every_column_is_there_with_its_key():
    text = as_text([_wide(20)], width=70)
    assert max(len(line) for line in text.splitlines()) <= 70
    for i in range(20):
        assert f"joint {i}" in text
    parts = text.count("turn of")
    assert parts > 1
    assert text.count(" 30.0") == parts


def test_decimal_points_stand_under_one_another():
    table = Table((Column("force", "N"),), ((1234.5,), (1.25,), (float("nan"),), (0.01234,)))
    lines = as_text([table]).splitlines()[3:]
    points = {line.index(".") for line in lines if "." in line}
    assert len(points) == 1


def test_words_are_wrapped_before_a_table_is_split():
    columns = (Column("requirement"), Column("says"), Column("worst"))
    row = ("a", "force at the upper pivot of the arm <= 1.25 kN at start", "1 N")
    text = as_text([Table(columns, (row,))], width=50)
    assert max(len(line) for line in text.splitlines()) <= 50
    assert text.count("requirement") == 1
    assert "1.25 kN at start" in " ".join(text.split())


def test_notes_wrap_under_their_label():
    text = as_text([Note("word " * 40, "Caution")], width=60)
    lines = text.splitlines()
    assert lines[0].startswith("Caution: word")
    assert all(line.startswith(" " * 9) for line in lines[1:])
    assert max(map(len, lines)) <= 60


def test_units_stand_in_heads_as_they_are_read():
    text = as_text([Table((Column("effort", "N*m"),), ((1.0,),))])
    assert "[N m]" in text


def test_every_block_has_its_text():
    table = Table((Column("a"),), ((1,),), "sums")
    blocks = [
        Heading("Press", 1),
        Heading("Forces"),
        Chart("stroke", _wide(1).columns[0], (), (), ()),  # type: ignore[arg-type]
        Drawing("arm cut free", "mm", (), "turn 3 deg", (table,)),
    ]
    text = as_text(blocks)
    assert "Press\n=====" in text
    assert "Forces\n------" in text
    assert "(chart: stroke)" in text
    assert "arm cut free\n\nturn 3 deg\n\nsums" in text


def test_a_table_without_rows_says_so():
    assert as_text([Table((Column("a"),), ())]) == "none\n"
