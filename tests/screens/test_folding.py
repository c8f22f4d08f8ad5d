"""Blank rows of a laboratory sheet and lines of lesser use stand behind one row, and nothing hides there."""

from __future__ import annotations

import pytest

from screener.app import fields
from screener.app.fields import Known
from screener.app.folding import FOLD, folded
from screener.app.glyphs import glyphs
from screener.app.rows import row_width
from screener.app.sheet import sheet_blocks
from screener.casefile import CaseText
from tests.screens.driving import grid, hint, keys_shown, opened, pressed, typed, walk, written_case
from tests.screens.made import CASE, SHEET_CASE
from tests.screens.test_sheets import FITTING, sheet

SHEET = '[blend]\n[blend.lab]\ndvpe = "62 kPa"\n{more}[tank]\n'


def shown(text, known=fields.NOTHING, opened=(), here=(), step="blend"):
    """Records of the laboratory sheet as they are shown, by key."""
    sections = folded(fields.sections(step, CaseText.parse(text), known), opened, here)
    return {record.key: record for section in sections if section.fold for record in section.records}


@pytest.mark.parametrize(("step", "base"), [("blend", "blend.lab"), ("tank", "tank.contents.lab")])
def test_a_sheet_without_any_value_is_one_row(step, base):
    (row,) = shown("[blend]\n[tank]\n", step=step).values()
    assert row.key == FOLD + base
    assert [cell.text for cell in row.cells] == [fields.heading(base), "none; enter opens it"]
    every = shown("[blend]\n[tank]\n", opened={base}, step=step)
    assert len(every) > 40 and f"{base}.dvpe" in every and f"{base}.vpcr[+]" in every
    assert [cell.text for cell in every[FOLD + base].cells[:2]] == ["all shown", "enter folds"]


def test_of_a_sheet_the_rows_with_a_value_are_shown_and_the_rest_is_counted():
    rows = shown(SHEET.format(more='vpcr = [{ ratio = "4" }]\n'))
    at = "blend.lab.vpcr[0]"
    names = ("blend.lab.dvpe", FOLD + "blend.lab", f"{at}.ratio", f"{at}.temperature", f"{at}.pressure", "blend.lab.vpcr[+]")
    assert tuple(rows)[: len(names)] == names, "a row somebody added is shown with what it still lacks"
    every = shown(SHEET.format(more='vpcr = [{ ratio = "4" }]\n'), opened={"blend.lab"})
    blank = [key for key in every if key not in rows and not key.endswith("[+]") and "reproducibility" not in key]
    assert rows[FOLD + "blend.lab"].cells[0].text == f"{len(blank)} blank rows"


def test_a_fault_a_default_and_a_value_asked_for_always_show():
    known = Known(
        {"blend.lab.kind": fields.Echo("refined", "default", default=True)},
        {"blend.lab.e70": "too large", "blend.lab.true_vapour_pressure": "must be rows", "blend.lab.distillation": "crossed"},
        frozenset({"blend.lab.h2s"}),
    )
    rows = shown(SHEET.format(more=""), known)
    assert {"blend.lab.kind", "blend.lab.e70", "blend.lab.true_vapour_pressure[+]", "blend.lab.h2s"} <= set(rows)
    notes = [section.note for section in folded(fields.sections("blend", CaseText.parse(SHEET.format(more="")), known), ())]
    assert "crossed" in notes, "the fault of a table without a row to show"


def test_the_row_under_the_cursor_is_not_folded_away():
    rows = shown(SHEET.format(more=""), here=("blend.lab.mtbe",))
    assert "blend.lab.mtbe" in rows and "blend.lab.etbe" not in rows


def test_reproducibilities_fold_apart_and_a_single_row_does_not():
    more = 'density = "740 kg/m3"\n'
    fold = FOLD + "blend.lab.reproducibility"
    assert [cell.text for cell in shown(SHEET.format(more=more))[fold].cells][1] == "none; enter opens it"
    stated = shown(SHEET.format(more=more + 'reproducibility = { dvpe = "1.5 kPa" }\n'))
    assert fold not in stated, "one row behind one row gains nothing"
    assert {"blend.lab.reproducibility.dvpe", "blend.lab.reproducibility.density"} <= set(stated)
    assert fold not in shown(SHEET.format(more="")), "of one number there is one row"


@pytest.mark.parametrize("marks", ["braille", "ascii"])
@pytest.mark.parametrize("width", [39, 43, 79])
@pytest.mark.parametrize("text", [CASE, SHEET_CASE])
def test_folded_rows_are_whole_at_every_width(text, width, marks):
    for step in ("blend", "tank"):
        sections = folded(fields.sections(step, CaseText.parse(text), fields.NOTHING), ())
        blocks = sheet_blocks(sections, width, glyphs(marks), ("", -1))
        assert any(block.key.startswith(FOLD) for block in blocks)
        assert all(row_width(row) <= width for block in blocks for row in block.rows)
        assert len([block for block in blocks if block.key]) < 45


async def test_enter_opens_a_sheet_and_o_folds_it_from_any_of_its_rows(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "end")
        assert "more below" not in grid(pilot.app)
        assert sheet(pilot).key == FOLD + "blend.lab"
        assert "Open or fold" in keys_shown(pilot) and hint(pilot) == "enter opens or folds; o does so from any of these rows"
        await pressed(pilot, "enter")
        assert sheet(pilot).key == "blend.lab.title" and "more below" in grid(pilot.app)
        await pressed(pilot, "down", "down", "enter")
        await typed(pilot, "742 kg/m3")
        await pressed(pilot, "enter")
        assert walk(pilot).desk.text.get("blend.lab.density") == "742 kg/m3"
        await pressed(pilot, "down", "down", "o")
        assert sheet(pilot).key == FOLD + "blend.lab" and "742 kg/m3" in grid(pilot.app)
        assert "Clear" not in keys_shown(pilot) and "Remove" not in keys_shown(pilot)
        await pressed(pilot, "1", "home")
        assert "Open or fold" not in keys_shown(pilot), "the parts do not fold"
        assert "opened" not in walk(pilot).desk.text.toml()


async def test_lines_of_lesser_use_open_where_they_belong(case_file):
    async with opened(case_file) as pilot:
        sheet(pilot).move_to(FOLD + "told")
        await pressed(pilot, "enter")
        assert sheet(pilot).key == "told:1"
        assert [key for key in sheet(pilot).keys if key.startswith("told:")] == [f"told:{i}" for i in range(4)]
        await pressed(pilot, "down", "o")
        assert sheet(pilot).key == FOLD + "told"
        assert "limiting oxygen" not in grid(pilot.app)


@pytest.mark.parametrize("path", ["blend.lab.olefins", "tank.contents.lab.e150", "blend.lab.vpcr[+]", "tank.contents.lab"])
async def test_going_to_a_value_opens_what_hides_it(case_file, path):
    async with opened(case_file) as pilot:
        walk(pilot).go_to(path)
        await pressed(pilot)
        step = "blend" if path.startswith("blend") else "tank"
        assert sheet(pilot, step).cell.path.startswith(path)


async def test_a_value_cleared_on_a_folded_sheet_leaves_the_cursor_there(tmp_path):
    async with opened(written_case(tmp_path, FITTING)) as pilot:
        walk(pilot).go_to("blend.lab.density")
        sheet(pilot).move_to("blend.lab.density")
        await pressed(pilot, "delete")
        assert sheet(pilot).key == "blend.lab.density" and not walk(pilot).desk.text.has("blend.lab.density")
        await pressed(pilot, "ctrl+z")
        assert sheet(pilot).key == "blend.lab.density" and walk(pilot).desk.text.has("blend.lab.density")


async def test_the_row_that_opens_can_be_clicked(case_file):
    async with opened(case_file) as pilot:
        sheet(pilot).move_to(FOLD + "told")
        await pressed(pilot, "end", "up")
        at = next(y for y, line in enumerate(grid(pilot.app).splitlines()) if "none; enter opens it" in line)
        top = sheet(pilot).region.y
        for _ in range(2):  # the first click goes there, the second takes it
            await pilot.click("#blend Sheet", offset=(5, at - top))
            await pilot.pause()
        assert sheet(pilot).key == "blend.lab.title"


async def test_help_on_the_row_that_opens_tells_of_folding(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "end", "f1")
        assert "Blank rows of a laboratory sheet" in " ".join(grid(pilot.app).replace("│", "").split())


async def test_the_palette_opens_and_folds_where_there_is_something_to_fold(case_file):
    async with opened(case_file) as pilot:
        sentence = "open or fold the rows around the cursor"
        assert sentence not in [command.sentence for command in walk(pilot).commands()]
        await pressed(pilot, "end")
        command = next(command for command in walk(pilot).commands() if command.sentence == sentence)
        await walk(pilot).run_action(command.action)
        await pilot.pause()
        assert sheet(pilot).key == "blend.lab.title"


async def test_a_low_narrow_window_shows_the_row_under_the_cursor_whole(tmp_path):
    """44 by 14: no introduction, no second copy of the value, no sum that is 100, and four rows of the step."""
    async with opened(written_case(tmp_path, FITTING), size=(44, 14)) as pilot:
        assert "Shares come to 100" not in grid(pilot.app) and "receipt: sum" not in grid(pilot.app)
        for step in ("blend", "tank"):
            await pressed(pilot, "1" if step == "blend" else "2")
            for key in sheet(pilot, step).keys:
                sheet(pilot, step).move_to(key)
                await pilot.pause()
                await pilot.pause()  # the hint row has grown by now
                text = "".join(grid(pilot.app).split())
                assert "▸" in text.split("6Memo")[1], key
                words = [word for cell in sheet(pilot, step).record.cells[:2] for word in cell.text.split()]
                assert all(word in text for word in words if len(word) < 7), (key, words)
        strip = walk(pilot).query_one("#blend").strip
        await pressed(pilot, "1", "home", "right")
        assert not strip.display
        await pressed(pilot, "enter")
        assert strip.region.height == 1 and strip.input.value == "90 %"


async def test_a_misfit_bar_is_left_out_before_it_is_broken(tmp_path):
    async with opened(written_case(tmp_path, FITTING), size=(44, 20)) as pilot:
        sheet(pilot).move_to("fit:2")
        await pilot.pause()
        text = grid(pilot.app)
        assert "┃" not in text and "apart" not in text.replace("Apart", ""), text
        assert "VPCR4 at" in text and "+0.5" in text
        await pressed(pilot, "enter")
        assert walk(pilot).query_one("#blend").strip.input.value == "64 kPa"


async def test_what_is_searched_for_stays_in_sight_in_a_low_window(case_file):
    async with opened(case_file, size=(44, 14)) as pilot:
        await pressed(pilot, "a")
        await typed(pilot, "but")
        lines = grid(pilot.app).splitlines()
        assert any("stock or species" in line and "but" in line for line in lines), "the strip"
        assert any("field butane" in line for line in lines)
