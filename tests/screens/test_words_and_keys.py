"""Help, letters, palette, key row: every word is said, and no key is dead."""

from __future__ import annotations

import ast
import re
from pathlib import Path

import pytest
from textual.binding import Binding

from screener.app import words
from screener.app.dialogs import HelpBox, Letters
from screener.app.palette import Palette
from screener.ground.errors import DataError
from tests.screens.driving import grid, hint, keys_shown, opened, pressed, typed, walk

APP = Path(words.__file__).parent
CALL = re.compile(r'say\(\s*"(\w+)",\s*"([^"]+)"')


def test_every_binding_has_an_id_of_its_own():
    import importlib

    found: dict[str, str] = {}
    for path in sorted(APP.glob("*.py")):
        module = importlib.import_module(f"screener.app.{path.stem}")
        for item in vars(module).values():
            if isinstance(item, type) and item.__module__ == module.__name__:
                for binding in vars(item).get("BINDINGS", ()):
                    assert isinstance(binding, Binding) and binding.id, f"{item.__name__}: {binding}"
                    assert binding.id not in found, binding.id
                    found[binding.id] = item.__name__
    assert len(found) > 30


def test_every_sentence_asked_for_exists():
    asked = {pair for path in APP.glob("*.py") for pair in CALL.findall(path.read_text(encoding="utf-8"))}
    assert len(asked) > 60
    for group, key in asked:
        assert key in words.table(group), f"{group}.{key}"


def test_no_sentence_stands_in_the_code():
    """A text of three words or more belongs to the wording file, so that one place holds them all."""
    bad = []
    for path in APP.glob("*.py"):
        tree = ast.parse(path.read_text(encoding="utf-8"))
        silent = {id(node.value) for node in ast.walk(tree) if isinstance(node, ast.Expr)}
        for node in ast.walk(tree):
            if isinstance(node, (ast.Raise, ast.Assert)):
                silent |= {id(child) for child in ast.walk(node)}
        for node in ast.walk(tree):
            if isinstance(node, ast.Constant) and isinstance(node.value, str) and id(node) not in silent:
                text = node.value
                if len(re.findall(r"[a-z]{2,}", text)) >= 4 and "{" not in text and " " in text and "tone-" not in text:
                    bad.append(f"{path.name}:{node.lineno}: {text[:60]}")
    assert not bad, bad


def test_a_missing_sentence_is_a_bug_of_ours():
    with pytest.raises(DataError, match=r"help\.toml: hint\.nothing"):
        words.say("hint", "nothing")


async def test_help_tells_what_the_value_is_and_where_to_find_it(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "3", "down", "down", "f1")
        assert isinstance(pilot.app.screen, HelpBox)
        text = " ".join(grid(pilot.app).replace("│", "").split())
        assert "lowest barometer" in text
        assert "not reduced to sea level" in text
        assert "usual" in text and "where" in text and "nearest weather station" in text
        await pressed(pilot, "escape")
        assert pilot.app.screen is walk(pilot)


async def test_the_question_mark_helps_as_well(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "5", "question_mark")
        assert "limit post" in grid(pilot.app)


async def test_on_wide_screens_the_help_stands_beside_the_sheet(case_file):
    async with opened(case_file, size=(140, 40)) as pilot:
        await pressed(pilot, "3", "down", "down")
        text = grid(pilot.app)
        assert "meaning" in text and "nearest weather" in text


async def test_a_letter_on_every_pane(case_file):
    async with opened(case_file, size=(140, 40)) as pilot:
        await pressed(pilot, "5", "ctrl+g")
        assert isinstance(pilot.app.screen, Letters)
        text = grid(pilot.app)
        assert "a checks" in text and "b why" in text and "c curve" in text
        await pressed(pilot, "b")
        assert pilot.app.focused.id == "why"
        await pressed(pilot, "ctrl+g", "x")
        assert pilot.app.screen is walk(pilot), "a key that is no letter of a pane goes back"


async def test_the_palette_holds_plain_sentences_and_only_valid_ones(case_file):
    async with opened(case_file) as pilot:
        sentences = [command.sentence for command in walk(pilot).commands()]
        assert "undo the last change" not in sentences, "there is none"
        assert "show the next view of the findings" not in sentences, "only where there are views"
        assert "go to step 1, Blend" not in sentences, "one is there"
        await pressed(pilot, "d")
        assert "undo the last change" in [command.sentence for command in walk(pilot).commands()]
        assert all(sentence == sentence.strip() and sentence[0].islower() for sentence in sentences)


async def test_a_sentence_of_the_palette_does_what_it_says(case_file):
    async with opened(case_file) as pilot:
        await pilot.press("ctrl+p")
        await pilot.pause(0.2)
        assert isinstance(pilot.app.screen, Palette)
        await typed(pilot, "step 3")
        await pilot.pause(0.3)
        await pilot.press("down", "enter")
        await pilot.pause(0.3)
        assert walk(pilot).current == "site"


async def test_the_key_row_shows_only_keys_that_do_something(case_file):
    async with opened(case_file) as pilot:
        assert "Save" not in keys_shown(pilot), "nothing to save"
        assert "Stop" not in keys_shown(pilot), "nothing to stop"
        assert "View" not in keys_shown(pilot)
        await pressed(pilot, "d")
        assert "Save" in keys_shown(pilot)
        await pressed(pilot, "2")
        assert "Add" not in keys_shown(pilot), "the kind of the tank is no list"
        await pressed(pilot, "5")
        assert {"Why", "View"} <= set(keys_shown(pilot))


async def test_the_key_row_is_never_cut(case_file):
    for width in (60, 80):
        async with opened(case_file, size=(width, 24)) as pilot:
            for step in "123456":
                await pressed(pilot, step)
                line = grid(pilot.app).splitlines()[-1]
                assert line.rstrip().endswith("^p commands")
                for words_shown in line.replace("^p commands", "").split("  "):
                    if words_shown.strip():
                        assert any(words_shown.strip().endswith(name) for name in keys_shown(pilot)), words_shown


async def test_every_pane_helps(case_file):
    async with opened(case_file) as pilot:
        for widget in walk(pilot).query("*"):
            if widget.can_focus:
                assert widget.HELP, widget


async def test_keys_can_be_given_by_a_file(case_file, tmp_path):
    folder = tmp_path / "home" / ".screener"
    folder.mkdir()
    (folder / "keys.toml").write_text('"walk.next" = "f7"\n"walk.help" = "h"\n', encoding="utf-8")
    async with opened(case_file) as pilot:
        await pressed(pilot, "f7")
        assert walk(pilot).current == "tank"
        await pressed(pilot, "f6", "n")
        assert walk(pilot).current == "tank", "the usual keys of that binding are free"
        await pressed(pilot, "h")
        assert isinstance(pilot.app.screen, HelpBox)


@pytest.mark.parametrize(
    ("content", "words_told"), [("next = 7", "next: not a binding id"), ("no toml", "cannot be read, so the usual keys hold")]
)
async def test_a_wrong_file_of_keys_is_told(case_file, tmp_path, content, words_told):
    folder = tmp_path / "home" / ".screener"
    folder.mkdir()
    (folder / "keys.toml").write_text(content, encoding="utf-8")
    async with opened(case_file) as pilot:
        assert words_told in hint(pilot)
        await pressed(pilot, "f6")
        assert walk(pilot).current == "tank"


async def test_dark_and_light_ground(case_file):
    async with opened(case_file) as pilot:
        dark = pilot.app.theme
        await pilot.app.run_action("app.ground")
        await pilot.pause()
        assert pilot.app.theme != dark
        assert grid(pilot.app)
