"""The vapour ladder as rows of text."""

from __future__ import annotations

import pytest

from screener.app.glyphs import NAMES, glyphs
from screener.app.ladder import NAME_WIDTH, ladder
from screener.app.rows import row_width, text_of

MONTHS = (
    {"month": "Jan", "share_cold": 0.005, "share_hot": 0.010, "LFL": 0.02, "UFL": 0.08,
     "equilibrium": "too lean", "not_saturated": "too lean"},
    {"month": "Apr", "share_cold": 0.015, "share_hot": 0.050, "LFL": 0.02, "UFL": 0.08,
     "equilibrium": "flammable", "not_saturated": "flammable"},
    {"month": "Jul", "share_cold": 0.100, "share_hot": 0.400, "LFL": 0.02, "UFL": 0.08,
     "equilibrium": "too rich", "not_saturated": "passes through the flammable range"},
    {"month": "Oct", "share_cold": None, "share_hot": None, "LFL": None, "UFL": None,
     "equilibrium": "unknown", "not_saturated": "unknown"},
)  # fmt: skip


def bars(width, marks):
    texts = [text_of(row) for row in ladder(MONTHS, width, marks)]
    return {text[:3]: text[NAME_WIDTH:] for text in texts if text[:3] in {m["month"] for m in MONTHS}}


def test_the_fuel_meets_the_flammable_range_only_where_it_does():
    marks = glyphs("braille")
    # 80 cells over 0 to 16 mol %: the range 2 to 8 % spans cells 10 to 39, a cell is 0.2 %.
    found = bars(80 + NAME_WIDTH, marks)
    assert found["Jan"].index(marks.thin) == 10 and marks.fill_range not in found["Jan"]
    assert found["Apr"].count(marks.fill_range) == 15 and found["Apr"].count(marks.fill) == 3
    assert found["Jul"].index(marks.fill) == 50 and found["Jul"][-1] == marks.more_right
    assert found["Oct"] == marks.unknown


@pytest.mark.parametrize("name", NAMES)
@pytest.mark.parametrize("width", [30, 79, 120])
def test_no_row_is_wider_than_asked(name, width):
    assert max(row_width(row) for row in ladder(MONTHS, width, glyphs(name))) <= width


def test_a_year_without_numbers_says_so():
    assert "could not be worked out" in text_of(ladder(MONTHS[3:], 79, glyphs("ascii"))[0])
