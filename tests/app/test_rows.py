"""Wrapping and columns: nothing is lost, nothing is wider than it may be."""

from __future__ import annotations

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from screener.app.rows import (
    Column,
    Span,
    column_widths,
    columns_of,
    flow,
    labelled,
    one_line,
    paragraph,
    record_rows,
    row_width,
    text_of,
    wrap,
)

words = st.lists(st.text(st.characters(codec="utf-8", categories=["L", "N", "P"]), min_size=1, max_size=30), max_size=12)


@settings(max_examples=60, deadline=None)
@given(words, st.integers(4, 60))
def test_wrapping_keeps_every_letter(texts, width):
    lines = wrap(" ".join(texts), width)
    assert "".join("".join(lines).split()) == "".join("".join(texts).split())


@settings(max_examples=60, deadline=None)
@given(words, st.integers(4, 60))
def test_no_line_is_wider_than_asked(texts, width):
    assert all(columns_of(line) <= width for line in wrap(" ".join(texts), width))


def test_wide_and_combining_marks_are_counted_in_columns():
    assert columns_of("kPa") == 3
    assert columns_of("油罐") == 4  # two columns each
    assert columns_of("e\u0301") == 1  # an accent takes no column of its own


def test_a_path_breaks_behind_its_marks():
    assert wrap("line.suction.npsh_required", 14) == ["line.suction.", "npsh_required"]


def test_empty_text_is_one_empty_line():
    assert wrap("", 10) == [""]


def test_labelled_keeps_its_column():
    rows = [text_of(row) for row in labelled("limit", "at most 76.6 kPa, read in law", 24, 8)]
    assert rows == ["limit   at most 76.6", "        kPa, read in law"]


def test_paragraph_is_indented_on_every_line():
    assert [text_of(row) for row in paragraph("one two three", 8, indent=2)] == ["  one", "  two", "  three"]


@pytest.mark.parametrize(
    ("width", "line"),
    [(40, "meaning · taken as 24 m · 0.5 m to 130 m"), (24, "meaning · taken as 24 m"), (8, "meaning")],
)
def test_one_line_leaves_out_whole_parts(width, line):
    assert one_line(["meaning", "taken as 24 m", "0.5 m to 130 m"], width) == line


COLUMNS = (Column("check", least=8), Column("value", "right", least=5), Column("note", least=6))
RECORDS = [
    [Span("Boiling at the liquid surface"), Span("72.1 kPa"), Span("hottest day of the year")],
    [Span("Net positive suction head"), Span("3.9 m"), Span("")],
]


@pytest.mark.parametrize("width", [30, 40, 60, 90])
def test_a_table_fits_and_keeps_every_cell(width):
    widths = column_widths(COLUMNS, RECORDS, width, 2)
    assert sum(widths) + 4 <= width
    for record in RECORDS:
        rows = record_rows(record, widths, COLUMNS)
        assert {row_width(row) for row in rows} == {sum(widths) + 4}
        joined = "".join("".join(text_of(row) for row in rows).split())
        for cell in record:
            for word in cell.text.split():
                assert word in joined or len(word) > min(widths)


@pytest.mark.parametrize(("width", "rows"), [(80, 1), (20, 2), (9, 3)])
def test_what_flows_stays_whole(width, rows):
    flowed = flow([Span("1 Blend"), Span("2 Tank"), Span("3 Site")], width, 2)
    assert len(flowed) == rows
    assert all(row_width(row) <= width for row in flowed)
    assert " ".join("".join(text_of(row) for row in flowed).split("  ")).count("Tank") == 1


def test_a_table_with_room_is_as_wide_as_its_cells():
    assert column_widths(COLUMNS, RECORDS, 200, 2) == [29, 8, 23]
