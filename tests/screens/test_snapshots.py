"""The text grid of each screen, kept as plain files that a review can read.

SCREENER_WRITE_SNAPSHOTS=1 writes them anew; look at the difference before it is committed.
"""

from __future__ import annotations

import os
from pathlib import Path

import pytest

from screener.app import start
from screener.app.rows import columns_of
from tests.screens.driving import grid, opened, pressed, typed, walk, written_case

FOLDER = Path(__file__).parent / "snapshots"
SMALL, LARGE = (80, 24), (140, 40)

# name -> (size, marks, keys); a key in angle brackets is typed as text
SCREENS = {
    "blend_80x24": (SMALL, "braille", ["1"]),
    "blend_140x40": (LARGE, "braille", ["1"]),
    "tank_80x24": (SMALL, "braille", ["2"]),
    "tank_140x40": (LARGE, "braille", ["2", "down"]),
    "site_80x24": (SMALL, "braille", ["3"]),
    "line_80x24": (SMALL, "braille", ["4"]),
    "findings_80x24": (SMALL, "braille", ["5"]),
    "findings_why_80x24": (SMALL, "braille", ["5", "down", "down", "down", "enter"]),
    "findings_curve_80x24": (SMALL, "braille", ["5", "v"]),
    "findings_curve_block_80x24": (SMALL, "block", ["5", "v"]),
    "findings_curve_ascii_80x24": (SMALL, "ascii", ["5", "v"]),
    "findings_140x40": (LARGE, "braille", ["5"]),
    "findings_ascii_140x40": (LARGE, "ascii", ["5"]),
    "memo_80x24": (SMALL, "braille", ["6"]),
    "memo_140x40": (LARGE, "braille", ["6"]),
    "bad_value_80x24": (SMALL, "braille", ["2", "down", "enter", "<24>", "enter"]),
    "search_80x24": (SMALL, "braille", ["a", "<but>"]),
    "help_80x24": (SMALL, "braille", ["3", "down", "down", "f1"]),
    "letters_140x40": (LARGE, "braille", ["5", "ctrl+g"]),
}


def compared(name: str, text: str) -> None:
    """Compare with the file kept, or write it when asked to."""
    file = FOLDER / f"{name}.txt"
    if os.environ.get("SCREENER_WRITE_SNAPSHOTS"):
        FOLDER.mkdir(exist_ok=True)
        file.write_text(text + "\n", encoding="utf-8")
    assert file.exists(), f"no snapshot {file.name}; SCREENER_WRITE_SNAPSHOTS=1 writes it"
    assert text + "\n" == file.read_text(encoding="utf-8"), f"{file.name} differs from what the screen shows"


@pytest.mark.parametrize("name", SCREENS)
async def test_the_screen_is_as_reviewed(name, case_file):
    size, marks, keys = SCREENS[name]
    async with opened(case_file, size=size, marks=marks) as pilot:
        for key in keys:
            if key.startswith("<"):
                await typed(pilot, key[1:-1])
            else:
                await pressed(pilot, key)
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
    assert {path.stem for path in FOLDER.glob("*.txt")} == {*SCREENS, "start_80x24"}


@pytest.mark.parametrize("size", [(60, 20), (80, 24), (80, 40), (120, 26), (140, 40), (200, 60)])
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
            await pressed(pilot, "down")
        for item in walk(pilot).query_one("#findings").items.values():
            for word in (*item.gap.title.split(), *item.gap.margin.split()):
                assert word in seen, word
