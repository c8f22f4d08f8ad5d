"""Laboratory sheets on the Blend and Tank steps: fitted in the worker, shown beside the sheet, refused in place."""

from __future__ import annotations

import pytest

from screener.app.sheet import Sheet
from tests.screens.driving import (
    grid,
    hint,
    keys_shown,
    opened,
    pressed,
    settled,
    tally_words,
    typed,
    walk,
    written_case,
)
from tests.screens.made import SHEET_CASE, Playing

FITTING = SHEET_CASE.replace('dvpe = "20 kPa"', 'dvpe = "60 kPa"')


@pytest.fixture
def sheet_file(tmp_path):
    return written_case(tmp_path, FITTING)


def sheet(pilot, step="blend") -> Sheet:
    return walk(pilot).query_one(f"#{step}").sheet


async def test_the_fit_says_that_it_is_running_and_can_be_stopped(sheet_file):
    playing = Playing()
    async with opened(sheet_file, playing) as pilot:
        playing.fit.clear()
        walk(pilot).desk.take("blend.lab.dvpe", "64 kPa")
        walk(pilot).case_changed()
        for _ in range(50):
            await pilot.pause(0.02)
            if "fitting the laboratory sheet" in tally_words(pilot):
                break
        assert tally_words(pilot) == "fitting the laboratory sheet; Esc stops"
        assert "1 beyond" in grid(pilot.app), "the findings of before stay on the screen"
        await pilot.press("escape")
        await pilot.pause()
        assert "fitting" not in tally_words(pilot)
        playing.fit.set()
        await pressed(pilot, "r")
        assert "1 beyond" in grid(pilot.app) and tally_words(pilot) == ""


async def test_a_row_of_the_fit_edits_the_measured_value(sheet_file):
    async with opened(sheet_file) as pilot:
        sheet(pilot).move_to("fit:1")
        await pressed(pilot, "enter")
        assert walk(pilot).query_one("#blend").strip.input.value == "62 kPa"
        for _ in range(6):
            await pilot.press("backspace")
        await typed(pilot, "64 kPa")
        await pressed(pilot, "enter")
        assert walk(pilot).desk.text.get("blend.lab.dvpe") == "64 kPa"


async def test_every_line_that_is_told_can_be_reached(sheet_file):
    async with opened(sheet_file) as pilot:
        keys = sheet(pilot).keys
        assert [key for key in keys if key.startswith("fit:")] == [f"fit:{i}" for i in range(9)]
        assert [key for key in keys if key.startswith("told:")] == ["told:0", "told:2"], "the others are folded"
        sheet(pilot).move_to("told:0")
        await settled(pilot)
        assert hint(pilot) == "worked out from the inputs, not entered" and "Edit" not in keys_shown(pilot)
        await pressed(pilot, "enter", "delete", "d")
        assert walk(pilot).desk.session.revision == 0, "nothing there can be changed"


async def test_a_refused_sheet_is_told_in_place_and_nothing_is_lost(sheet_file):
    async with opened(sheet_file) as pilot:
        sheet(pilot).move_to("fit:1")
        walk(pilot).desk.take("blend.lab.dvpe", "20 kPa")
        walk(pilot).refresh_case()
        walk(pilot).case_changed()
        await settled(pilot)
        text = " ".join(grid(pilot.app).split())
        assert "Laboratory sheet refused, nothing is lost: numbers of the sheet contradict each other: DVPE" in text
        assert sheet(pilot).cell.path == "blend.lab.dvpe", "the cursor goes to the same number on the sheet"
        assert walk(pilot).desk.text.get("blend.lab.benzene") == "0.8 vol%"
        await pressed(pilot, "2")
        assert "refused" not in grid(pilot.app)
        await pressed(pilot, "1", "ctrl+z")
        assert "sheet refused" not in grid(pilot.app) and "◀█████┃" in grid(pilot.app), "the fit is back"


async def test_the_sheet_of_the_heel_is_refused_on_its_own_step(tmp_path):
    async with opened(written_case(tmp_path, SHEET_CASE)) as pilot:
        assert "refused" not in grid(pilot.app)
        await pressed(pilot, "2")
        assert "Laboratory sheet refused" in grid(pilot.app)
        await pressed(pilot, "5", "enter")
        assert sheet(pilot, "tank").cell.path.startswith("tank.contents.lab."), "findings lead to the sheet"


async def test_a_long_refusal_leaves_half_of_a_small_window(tmp_path):
    async with opened(written_case(tmp_path, SHEET_CASE), size=(44, 18)) as pilot:
        await pressed(pilot, "2")
        assert "step 5 says why" in " ".join(grid(pilot.app).split())
