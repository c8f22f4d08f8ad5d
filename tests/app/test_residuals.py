"""How a liquid meets its laboratory sheet: rows and bars, as plain data."""

from __future__ import annotations

from types import SimpleNamespace

import pytest

from screener.app.glyphs import glyphs
from screener.app.residuals import HALF, REFUSED, misfit_bar, residual_note, residual_section
from screener.app.rows import columns_of, row_width, text_of
from screener.app.sheet import sheet_blocks
from screener.casefile import key_at
from screener.casefile.residuals import residuals
from tests.screens.made import FITTED, SHEET_CASE

MARKS = [glyphs(name) for name in ("braille", "block", "ascii")]


@pytest.mark.parametrize("marks", MARKS, ids=lambda marks: marks.name)
def test_a_bar_reads_without_colour(marks):
    for misfit in (-9.0, -REFUSED, -0.3, 0.0, 0.3, 1.7, REFUSED, 9.0):
        bar = misfit_bar(misfit, marks)
        assert columns_of(bar) == 2 * HALF + 1 and bar[HALF] == marks.post and " " not in bar
        left, right = bar[:HALF], bar[HALF + 1 :]
        assert (set(left) == {marks.skipped}) or misfit < 0.0
        assert (set(right) == {marks.skipped}) or misfit > 0.0
    assert misfit_bar(0.0, marks).count(marks.fill) == 0
    assert misfit_bar(REFUSED, marks)[HALF + 1 :] == marks.fill * HALF
    assert misfit_bar(REFUSED + 0.1, marks)[-1] == marks.more_right
    assert misfit_bar(-REFUSED - 0.1, marks)[0] == marks.more_left
    # the longer bar never stands for the smaller misfit
    lengths = [misfit_bar(0.1 * i, marks).count(marks.fill) for i in range(31)]
    assert lengths == sorted(lengths)


def test_every_row_leads_to_the_value_it_compares():
    from screener.casefile import CaseText

    text = CaseText.parse(SHEET_CASE)
    for row in residuals(FITTED):
        path = f"blend.lab.{row.place}"
        assert key_at(path) is not None and text.get(path), path


def test_numbers_stand_in_the_units_of_the_sheet():
    section = residual_section(FITTED, "blend.lab", "", MARKS[0])
    rows = {record.name: [cell.text for cell in record.cells[1:5]] for record in section.records}
    assert rows["density at 15 degC"] == ["742.0 kg/m3", "742.0", "0.0", "0.0"]
    assert rows["DVPE"] == ["62.0 kPa", "61.1", "-0.9", "-0.5"]
    assert rows["T50"] == ["98.0 degC", "105.5", "+7.5", "+2.9"]
    assert rows["H2S"] == ["12.0 ppm mass", "12.0", "0.0", "0.0"]
    assert rows["E70"][0] == "32.0 vol %"
    tones = {record.name: record.cells[4].tone for record in section.records}
    assert tones["T50"] == "near" and tones["DVPE"] == ""


def test_a_liquid_without_a_sheet_has_no_rows():
    assert residuals(None) == () and residual_section(None, "blend.lab", "", MARKS[0]) is None


def test_the_note_says_what_vapour_pressures_are_multiplied_by():
    assert "x 1.014 (DVPE measured over computed)" in residual_note(FITTED, False)
    assert residual_note(FITTED, True).startswith("Of earlier inputs.")
    silent = SimpleNamespace(measured=(), vapour_pressure_known=False)
    assert "No vapour pressure on the sheet" in residual_note(silent, False)


@pytest.mark.parametrize("width", [38, 60, 78, 100])
@pytest.mark.parametrize("marks", MARKS, ids=lambda marks: marks.name)
def test_no_row_is_wider_than_the_screen(width, marks):
    section = residual_section(FITTED, "blend.lab", residual_note(FITTED, False), marks)
    rows = [row for block in sheet_blocks([section], width, marks, ("", -1)) for row in block.rows]
    assert max(map(row_width, rows)) <= width
    if marks.name == "ascii":
        assert all(text_of(row).isascii() for row in rows)
