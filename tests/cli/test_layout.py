"""Tables fit their width and lose no character."""

from __future__ import annotations

import pytest

from screener.cli.check import page
from screener.cli.layout import paragraph, table
from screener.memo.text import columns_of
from tests.memo.hand_made_screening import made_screening

HEAD = ("verdict", "finding", "value")
ROWS = [
    ("! beyond", "Suction line above the bubble point", "64.3 kPa"),
    ("~ near", "Vents", "1800 Nm3/h air"),
    (". room", "", "漢字 wide"),
]


def letters(lines) -> str:
    return "".join(sorted("".join(lines).replace(" ", "").replace("-", "")))


@pytest.mark.parametrize("width", [200, 60, 45, 36, 30, 20])
def test_a_table_fits_and_keeps_every_word(width):
    lines = table(HEAD, ROWS, width, ("left", "left", "right"))
    assert max(map(columns_of, lines)) <= width
    for row in ROWS:
        for cell in row:
            for word in cell.split():
                assert any(word in line for line in lines), word


def test_columns_line_up():
    lines = table(HEAD, ROWS, 80, ("left", "left", "right"))
    assert lines[0].startswith("verdict   finding")
    assert lines[2].endswith("64.3 kPa")
    assert {columns_of(line) for line in lines[:5]} == {columns_of(lines[1])}


def test_too_narrow_for_columns_becomes_blocks():
    lines = table(HEAD, ROWS, 22)
    assert "verdict: ! beyond" in lines
    assert "value: 64.3 kPa" in lines
    assert "" in lines  # a gap between blocks


def test_paragraph_hangs():
    lines = paragraph("one two three four five six", 20, "! ")
    assert lines == ["! one two three four", "  five six"]


@pytest.mark.parametrize("system", ["si", "us"])
@pytest.mark.parametrize("width", [160, 100, 80, 60])
def test_the_page_fits_its_width(width, system):
    lines = page(made_screening(), system, width)
    assert max(map(columns_of, lines)) <= width


def test_page_says_everything_worst_first():
    text = "\n".join(page(made_screening(), "si", 160))
    order = [text.index(mark) for mark in ("! beyond", "? unknown", "~ near", ". room", "- skipped")]
    assert order == sorted(order)
    assert "1 beyond, 1 unknown, 1 near, 1 room, 1 skipped." in text
    for said in (
        "at least 66.1",
        "-1.8",
        "106 %",
        "worst: mixture at low level, hottest day, Jul, liquid surface",
        "room again with draw slower than 360 m3/h",
        "no rule pack chosen under screening.criteria",
        "Information (judged by nobody)",
        "Fuel class: T(V/L = 20) 56.0 degC; DVPE 59.8 kPa (never a judge)",
        "line.suction.roughness = 0.0460 mm (drawn steel pipe)",
        "1 of 40 states did not converge",
        "Start-up lowers the pressure further.",
    ):
        assert said in " ".join(text.split()), said
