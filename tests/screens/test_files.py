"""Opening, saving, leaving, recovering, and writing the memo."""

from __future__ import annotations

import pytest

from screener.app.dialogs import Question
from screener.app.naming import NameBox
from screener.app.session import unsaved_beside
from screener.app.start import StartScreen, examples
from screener.app.walk import WalkScreen
from tests.screens.driving import grid, hint, opened, pressed, settled, typed, walk, written_case
from tests.screens.made import CASE


async def changed(pilot, text="30 m"):
    await pressed(pilot, "2", "down", "enter")
    await typed(pilot, text)
    await pressed(pilot, "enter")


async def test_save(case_file):
    async with opened(case_file) as pilot:
        await changed(pilot)
        assert "changed" in grid(pilot.app)
        await pressed(pilot, "ctrl+s")
        assert "30 m" in case_file.read_text(encoding="utf-8")
        assert hint(pilot) == f"saved: {case_file}"
        assert "saved" in grid(pilot.app).splitlines()[1]


async def test_changes_are_kept_beside_the_file_while_one_works(case_file):
    async with opened(case_file) as pilot:
        await changed(pilot)
        await pilot.pause(1.1)
        assert "30 m" in unsaved_beside(case_file, case_file.parent).read_text(encoding="utf-8")
        assert "30 m" not in case_file.read_text(encoding="utf-8")


@pytest.mark.parametrize(("answer", "diameter"), [("kept", "30 m"), ("file", "24 m")])
async def test_after_a_crash_the_unsaved_version_is_offered(case_file, answer, diameter):
    unsaved_beside(case_file, case_file.parent).write_text(CASE.replace("24 m", "30 m"), encoding="utf-8")
    async with opened(case_file) as pilot:
        assert isinstance(pilot.app.screen, Question)
        assert "1 lines differ from the file" in " ".join(grid(pilot.app).split()).replace("│ │ ", "")
        await pressed(pilot, *([] if answer == "kept" else ["down"]), "enter")
        assert walk(pilot).desk.text.get("tank.shell_diameter") == diameter
        assert walk(pilot).desk.session.dirty is (answer == "kept")


async def test_leaving_without_changes_asks_nothing(case_file):
    async with opened(case_file) as pilot:
        await pilot.press("ctrl+q")
        await pilot.pause()
        assert pilot.app.return_value == 0


@pytest.mark.parametrize(
    ("keys", "saved", "left"),
    [(["enter"], True, True), (["down", "enter"], False, True), (["down", "down", "enter"], False, False),
     (["escape"], False, False)],
)  # fmt: skip
async def test_leaving_with_changes_asks(case_file, keys, saved, left):
    async with opened(case_file) as pilot:
        await changed(pilot)
        await pilot.press("ctrl+q")
        await pilot.pause()
        assert "There are changes that are not in the file" in grid(pilot.app)
        await pilot.press(*keys)
        await pilot.pause()
        assert ("30 m" in case_file.read_text(encoding="utf-8")) is saved
        assert (pilot.app.return_value == 0) is left
        assert unsaved_beside(case_file, case_file.parent).exists() is False or not left


async def test_a_file_written_by_another_program_is_asked_about(case_file):
    async with opened(case_file) as pilot:
        await changed(pilot)
        case_file.write_text(CASE + "# another hand\n", encoding="utf-8")
        await pressed(pilot, "ctrl+s")
        assert "another program has written it" in " ".join(grid(pilot.app).split()).replace("│ │ ", "")
        await pressed(pilot, "enter")
        assert "another hand" in case_file.read_text(encoding="utf-8"), "the first answer keeps the file"
        await pressed(pilot, "ctrl+s", "down", "enter")
        assert "30 m" in case_file.read_text(encoding="utf-8")


async def test_comments_put_aside_are_told(tmp_path):
    path = written_case(tmp_path, "# measured on site\n" + CASE)
    async with opened(path) as pilot:
        await changed(pilot)
        await pressed(pilot, "ctrl+s")
        assert "comments of the old file are kept in tank12.toml.before" in hint(pilot)


# without a case


async def test_without_a_case_examples_are_offered(tmp_path, monkeypatch):
    monkeypatch.chdir(tmp_path)
    async with opened() as pilot:
        assert isinstance(pilot.app.screen, StartScreen)
        text = grid(pilot.app)
        for path in examples():
            assert path.name in text
        await pressed(pilot, "enter")
        session = walk(pilot).desk.session
        assert session.path is None, "an example is opened as a copy"
        assert session.folder == tmp_path
        assert "no file" in grid(pilot.app)


async def test_a_new_case_says_what_it_needs_first(tmp_path, monkeypatch):
    monkeypatch.chdir(tmp_path)
    async with opened() as pilot:
        await pressed(pilot, "c")
        text = grid(pilot.app)
        assert "new case" in text and "add a part" in text
        assert "this is missing: what the receipt is made of" in text


async def test_a_case_without_a_file_asks_for_its_name_when_saved(tmp_path, monkeypatch):
    monkeypatch.chdir(tmp_path)
    async with opened() as pilot:
        await pressed(pilot, "c", "ctrl+s")
        assert isinstance(pilot.app.screen, NameBox)
        pilot.app.screen.query_one("StripInput").value = "mine"
        await pressed(pilot, "enter")
        assert (tmp_path / "mine.toml").exists()
        assert not walk(pilot).desk.session.dirty


async def test_a_file_is_opened_by_its_name(case_file):
    async with opened() as pilot:
        await pressed(pilot, "o")
        pilot.app.screen.query_one("StripInput").value = str(case_file)
        await pressed(pilot, "enter")
        assert walk(pilot).desk.session.path == case_file


@pytest.mark.parametrize(("content", "words"), [("no = [toml", "this is not TOML"), (None, "cannot be read")])
async def test_a_file_that_cannot_be_read_leads_back_to_the_start(tmp_path, content, words):
    path = tmp_path / "bad.toml"
    if content:
        path.write_text(content, encoding="utf-8")
    async with opened(path) as pilot:
        assert isinstance(pilot.app.screen, StartScreen)
        assert words in " ".join(grid(pilot.app).split())


async def test_another_case_can_be_opened_from_the_palette(case_file):
    async with opened(case_file) as pilot:
        await pilot.app.screen.run_action("app.start")
        await pilot.pause()
        assert isinstance(pilot.app.screen, StartScreen)
        assert not any(isinstance(screen, WalkScreen) for screen in pilot.app.screen_stack)


# the memo


async def test_the_memo_is_shown_and_written(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "6")
        assert "Screening memo: tank 12" in grid(pilot.app)
        await pressed(pilot, "w")
        memo = case_file.parent / "tank12.md"
        assert memo.read_text(encoding="utf-8") == "# Screening memo: tank 12\n\nTH-12-07 · draft\n"
        assert hint(pilot).startswith(f"written: {memo}")
        await pressed(pilot, "w")
        assert not isinstance(pilot.app.screen, Question), "our own file is written again without a question"


async def test_a_file_that_is_there_already_is_asked_about(case_file):
    memo = case_file.parent / "tank12.md"
    memo.write_text("mine", encoding="utf-8")
    async with opened(case_file) as pilot:
        await pressed(pilot, "6", "w", "enter")
        assert memo.read_text(encoding="utf-8") == "mine"
        await pressed(pilot, "w", "down", "enter")
        assert memo.read_text(encoding="utf-8").startswith("# Screening memo")


async def test_the_memo_says_of_itself_what_was_typed(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "6")
        sheet = walk(pilot).query_one("#memo").sheet
        sheet.move_to("memo:status")
        await pressed(pilot, "enter", "down")
        assert walk(pilot).query_one("#memo").strip.input.value == "for checking"
        await pressed(pilot, "enter", "w")
        assert "TH-12-07 · for checking" in (case_file.parent / "tank12.md").read_text(encoding="utf-8")


async def test_checked_is_not_a_status_of_the_program(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "6")
        walk(pilot).query_one("#memo").sheet.move_to("memo:status")
        await pressed(pilot, "enter")
        await typed(pilot, "checked")
        await pressed(pilot, "enter")
        assert walk(pilot).query_one("#memo").strip.editing
        assert "draft or for checking" in hint(pilot)


async def test_no_memo_is_written_of_stale_results(case_file):
    async with opened(case_file) as pilot:
        pilot.playing.gate.clear()
        walk(pilot).desk.session.edit("tank.shell_diameter", "30 m")
        await pilot.press("6", "w")
        await pilot.pause(0.1)
        assert not (case_file.parent / "tank12.md").exists()
        assert "The inputs have changed" in grid(pilot.app)
        pilot.playing.gate.set()
        await pressed(pilot, "r", "w")
        await settled(pilot)
        assert (case_file.parent / "tank12.md").exists()
