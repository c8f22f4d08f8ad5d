"""The first screen without a case: the shipped examples, a new case, a file by name."""

from __future__ import annotations

import tomllib
from pathlib import Path
from typing import ClassVar

from textual.app import ComposeResult
from textual.binding import Binding
from textual.screen import Screen

from screener.app.chrome import Hint, KeyRow, TitleLine
from screener.app.dialogs import HelpBox
from screener.app.glyphs import Glyphs
from screener.app.lines import Block, Lines
from screener.app.naming import NameBox
from screener.app.palette import Command
from screener.app.rows import Row, Span, paragraph
from screener.app.words import say, table
from screener.ground.files import data_folder


def examples() -> list[Path]:
    """Shipped example cases: inside a wheel, else beside the source."""
    data = data_folder()
    for folder in (data / "examples", data.parent / "examples"):
        if folder.is_dir():
            return sorted(folder.glob("*.toml"))
    return []


def title_of(path: Path) -> str:
    """Title in a case file; its name when it has none."""
    try:
        found = tomllib.loads(path.read_text(encoding="utf-8")).get("case", {}).get("title", "")
    except (OSError, UnicodeDecodeError, tomllib.TOMLDecodeError):
        found = ""
    return str(found) or path.name


class StartScreen(Screen):
    """What shall be opened."""

    BINDINGS: ClassVar = [
        Binding("f1,question_mark", "help", "Help", id="start.help"),
        Binding("o", "open", "Open a file", id="start.open"),
        Binding("c", "new", "New case", id="start.new"),
    ]
    DEFAULT_CSS = """
    StartScreen { background: $ground; color: $foreground; }
    StartScreen Lines { margin: 1 1 0 1; }
    """

    def __init__(self, marks: Glyphs, note: str = ""):
        super().__init__()
        self.marks, self.note = marks, note

    def compose(self) -> ComposeResult:
        yield TitleLine()
        yield Lines(self._build, gutter=self.marks.cursor, id="choices")
        yield Hint()
        yield KeyRow(self.marks)

    def on_mount(self) -> None:
        self.query_one(TitleLine).tell(say("start", "title"), "", self.marks)
        hint = self.query_one(Hint)
        hint.marks = self.marks
        hint.tell(self.note or say("start", "hint"), "bad" if self.note else "")
        self.query_one("#choices").focus()

    def _build(self, width: int):
        head: list[Row] = [*paragraph(say("start", "what"), width), (Span(""),)]
        blocks = [Block(tuple(paragraph(say("start", "examples"), width, "head")))]
        for path in examples():
            rows = paragraph(self.marks.plain(title_of(path)), width)
            blocks.append(Block((*rows, *paragraph(path.name, width, "dim", indent=2)), f"example:{path}"))
        blocks.append(Block(((Span(""),), *paragraph(say("start", "own"), width, "head"))))
        blocks.append(Block(tuple(paragraph(say("start", "new"), width)), "new"))
        blocks.append(Block(tuple(paragraph(say("start", "open"), width)), "open"))
        return head, blocks

    def on_lines_chosen(self, event: Lines.Chosen) -> None:
        kind, _, place = event.key.partition(":")
        if kind == "example":
            self.app.open_example(Path(place))
        elif kind == "new":
            self.action_new()
        else:
            self.action_open()

    def action_new(self) -> None:
        """Start a new case."""
        self.app.open_new()

    def action_open(self) -> None:
        """Ask for the name of a file."""

        def named(name: str | None) -> None:
            if name:
                self.app.open_path(Path(name).expanduser())

        self.app.push_screen(NameBox(say("start", "name"), "", self.marks), named)

    def action_help(self) -> None:
        """What this screen is for."""
        lines = [("", say("start", "what")), ("", ""), *table("keys").items()]
        self.app.push_screen(HelpBox(say("start", "title"), lines, self.marks))

    def commands(self) -> list[Command]:
        """Sentences of the palette."""
        return [
            Command(say("palette", "new"), "screen.new"),
            Command(say("palette", "open"), "screen.open"),
            *self.app.commands_everywhere,
        ]
