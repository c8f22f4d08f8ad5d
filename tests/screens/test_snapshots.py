"""The text grid of each screen, kept as plain files that a review can read.

SCREENER_WRITE_SNAPSHOTS=1 writes them anew; look at the difference before it is committed.
"""

from __future__ import annotations

import os
from pathlib import Path

import pytest

from screener.app import start
from screener.app.rows import columns_of
from tests.screens.driving import grid, opened, pressed, settled, typed, walk, written_case
from tests.screens.made import SHEET_CASE

FOLDER = Path(__file__).parent / "snapshots"
SMALL, LARGE = (80, 24), (140, 40)

# Visits: size, marks, and the screens one after another, each with the keys that lead to it from
# the one before; text in angle brackets is typed.
VISITS = {
    "small": (SMALL, "braille", {
        "blend_80x24": ["1"],
        "tank_80x24": ["2"],
        "site_80x24": ["3"],
        "line_80x24": ["4"],
        "findings_80x24": ["5"],
        "findings_curve_80x24": ["v"],
        "memo_80x24": ["6"],
        "help_80x24": ["3", "down", "down", "f1"],
        "findings_why_80x24": ["escape", "5", "v", "v", "down", "down", "down", "enter"],
        "bad_value_80x24": ["2", "down", "enter", "<24>", "enter"],
        "search_80x24": ["escape", "1", "a", "<but>"],
    }),
    "large": (LARGE, "braille", {
        "blend_140x40": ["1"],
        "tank_140x40": ["2", "down"],
        "findings_140x40": ["5"],
        "letters_140x40": ["ctrl+g"],
        "memo_140x40": ["escape", "6"],
    }),
    "small open": (SMALL, "braille", {"blend_open_80x24": ["1", "end", "enter"]}),
    "small block": (SMALL, "block", {"findings_curve_block_80x24": ["5", "v"]}),
    "small ascii": (SMALL, "ascii", {"findings_curve_ascii_80x24": ["5", "v"]}),
    "large ascii": (LARGE, "ascii", {"findings_ascii_140x40": ["5"]}),
}  # fmt: skip
# The same on a case with laboratory sheets; that of the heel is refused until its DVPE is corrected.
SHEETS = {
    "refused": (SMALL, "braille", {
        "sheet_refused_80x24": ["2", "end"],
    }),
    "small": (SMALL, "braille", {
        "sheet_fit_80x24": ["1", *["down"] * 14],
        "sheet_80x24": ["1", "pagedown", "pagedown"],
        "sheet_open_80x24": ["up", "o"],
    }),
    "large": (LARGE, "braille", {"sheet_fit_140x40": ["1", *["down"] * 8]}),
    "small ascii": (SMALL, "ascii", {
        "sheet_fit_ascii_80x24": ["1", *["down"] * 14],
        "sheet_ascii_80x24": ["2", "end"],
    }),
    "low": ((44, 14), "braille", {
        "blend_44x14": ["1"],
        "sheet_fit_44x14": [*["down"] * 10],
        "lines_open_44x14": [*["down"] * 7, "enter"],
        "sheet_44x14": ["o", "end"],
    }),
}  # fmt: skip


async def test_a_window_too_small_says_so(case_file):
    async with opened(case_file, size=(30, 10)) as pilot:
        assert "This window is too small" in " ".join(grid(pilot.app).split())


def compared(name: str, text: str) -> None:
    """Compare with the file kept, or write it when asked to."""
    file = FOLDER / f"{name}.txt"
    if os.environ.get("SCREENER_WRITE_SNAPSHOTS"):
        FOLDER.mkdir(exist_ok=True)
        file.write_text(text + "\n", encoding="utf-8")
    assert file.exists(), f"no snapshot {file.name}; SCREENER_WRITE_SNAPSHOTS=1 writes it"
    assert text + "\n" == file.read_text(encoding="utf-8"), f"{file.name} differs from what the screen shows"


@pytest.mark.parametrize("visit", VISITS)
async def test_the_screens_are_as_reviewed(visit, case_file):
    await visited(VISITS[visit], case_file)


@pytest.mark.parametrize("visit", SHEETS)
async def test_the_laboratory_sheets_are_as_reviewed(visit, tmp_path):
    text = SHEET_CASE if visit == "refused" else SHEET_CASE.replace('dvpe = "20 kPa"', 'dvpe = "60 kPa"')
    await visited(SHEETS[visit], written_case(tmp_path, text))


async def visited(visit, case_file):
    """Go through the screens of a visit and compare each."""
    size, marks, screens = visit
    async with opened(case_file, size=size, marks=marks) as pilot:
        for name, keys in screens.items():
            for key in keys:
                await (typed(pilot, key[1:-1]) if key.startswith("<") else pilot.press(key))
            await settled(pilot)
            text = grid(pilot.app)
            assert len(text.splitlines()) <= size[1]
            assert all(columns_of(line) <= size[0] for line in text.splitlines())
            if marks == "ascii":
                assert text.isascii()
            compared(name, text)


async def test_the_start_screen_is_as_reviewed(tmp_path, monkeypatch):
    made = [written_case(tmp_path), written_case(tmp_path, "[case]\n", "no_title.toml")]
    monkeypatch.setattr(start, "examples", lambda: made)
    async with opened(size=SMALL) as pilot:
        compared("start_80x24", grid(pilot.app))


def test_no_snapshot_is_left_over():
    known = {name for visits in (VISITS, SHEETS) for *_, screens in visits.values() for name in screens}
    assert {path.stem for path in FOLDER.glob("*.txt")} == {"start_80x24", *known}


@pytest.mark.parametrize("size", [(40, 14), (60, 20), (80, 24), (120, 26), (200, 60)])
async def test_no_text_is_cut_at_any_size(tmp_path, size):
    """Titles, margins, sentences and the title line are all there, whole, and nothing ends in an ellipsis."""
    async with opened(written_case(tmp_path), size=size) as pilot:
        for step in "123456":
            await pressed(pilot, step)
            text = grid(pilot.app)
            assert "…" not in text and "..." not in text
            assert text.splitlines()[0].strip().startswith("Tarn Hollow, tank 12: summer blend")
        await pressed(pilot, "5")
        bars = walk(pilot).query_one("#bars")
        seen = ""
        for _ in bars.keys:
            seen += "".join(grid(pilot.app).split())
            await pilot.press("down")
        for item in walk(pilot).query_one("#findings").items.values():
            for word in (*item.gap.title.split(), *item.gap.margin.split()):
                assert word in seen, word


async def test_a_window_that_changes_its_size_looks_like_one_opened_so(case_file):
    async with opened(case_file, size=SMALL) as pilot:
        await pressed(pilot, "5")
        small = grid(pilot.app)
        await pilot.resize_terminal(*LARGE)
        await settled(pilot)
        assert grid(pilot.app) + "\n" == (FOLDER / "findings_140x40.txt").read_text(encoding="utf-8")
        await pilot.resize_terminal(*SMALL)
        await settled(pilot)
        assert grid(pilot.app) == small
