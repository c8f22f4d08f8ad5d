"""What lies over a screen for a moment: help, a question, letters on the panes."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from typing import ClassVar

from textual import events
from textual.app import ComposeResult
from textual.binding import Binding
from textual.containers import Vertical
from textual.screen import ModalScreen
from textual.widgets import Static

from screener.app.chrome import KeyRow
from screener.app.glyphs import Glyphs
from screener.app.lines import Block, Lines
from screener.app.rows import Row, Span, labelled, paragraph

LETTERS = "abcdefghijklmoprstuvwxyz"


class Box(ModalScreen):
    """A framed box in the middle of the screen."""

    DEFAULT_CSS = """
    Box { align: center middle; background: $ground; }
    Box > Vertical { width: 76; max-width: 96%; height: auto; background: $ground; border: round $foreground; padding: 0 1; }
    Box.-ascii > Vertical { border: ascii $foreground; }
    Box Lines { height: 8; }
    Box KeyRow { dock: none; }
    """

    def __init__(self, marks: Glyphs, **kwargs):
        super().__init__(**kwargs)
        self.marks = marks
        self.set_class(marks.name == "ascii", "-ascii")

    def on_resize(self) -> None:
        """A list in the box is as high as its content, and no higher than the screen lets it be."""
        for lines in self.query(Lines):
            content = lines.get_content_height(self.size, self.size, lines.size.width or self.size.width - 8)
            lines.styles.height = min(content, max(4, self.size.height - 6))


class HelpBox(Box):
    """Help for the thing in focus: label and text, whole."""

    BINDINGS: ClassVar = [Binding("escape,f1,question_mark,enter", "close", "Close", id="help.close", key_display="Esc")]

    def __init__(self, title: str, lines: Sequence[tuple[str, str]], marks: Glyphs):
        super().__init__(marks)
        self.heading, self.lines = title, tuple(lines)

    def compose(self) -> ComposeResult:
        with Vertical():
            yield Lines(self._build)
            yield KeyRow(self.marks)

    def _build(self, width: int):
        column = min(max([len(name) for name, _ in self.lines], default=0) + 2, width // 3)
        rows: list[Row] = [*paragraph(self.marks.plain(self.heading), width, "head"), (Span(""),)]
        for name, text in self.lines:
            if name:
                rows += labelled(name, self.marks.plain(text), width, column)
            else:
                rows += paragraph(self.marks.plain(text), width)
        return (), [Block((row,)) for row in rows]

    def action_close(self) -> None:
        self.dismiss()


class Question(Box):
    """A question with its answers as lines; Esc takes none of them."""

    BINDINGS: ClassVar = [
        Binding("enter", "answer", "Take it", id="question.take"),
        Binding("escape", "cancel", "Go back", id="question.back"),
    ]

    def __init__(self, question: str, answers: Sequence[tuple[str, str]], marks: Glyphs):
        super().__init__(marks)
        self.question, self.answers = question, tuple(answers)

    def compose(self) -> ComposeResult:
        with Vertical():
            yield Lines(self._build, gutter=self.marks.cursor)
            yield KeyRow(self.marks)

    def _build(self, width: int):
        head = [*paragraph(self.marks.plain(self.question), width), (Span(""),)]
        return head, [Block(tuple(paragraph(text, width)), key) for key, text in self.answers]

    def on_lines_chosen(self, event: Lines.Chosen) -> None:
        self.dismiss(event.key)

    def action_answer(self) -> None:
        self.dismiss(self.query_one(Lines).key)

    def action_cancel(self) -> None:
        self.dismiss(None)


class Letters(ModalScreen):
    """One letter on every pane; the next key puts the focus there."""

    DEFAULT_CSS = """
    Letters { background: transparent; layers: base; }
    Letters Static { width: auto; height: 1; position: absolute; text-style: reverse bold; }
    """

    def __init__(self, panes: Sequence[tuple[object, str]]):
        super().__init__()
        self.panes = dict(zip(LETTERS, panes))

    def compose(self) -> ComposeResult:
        for letter, (widget, name) in self.panes.items():
            mark = Static(f" {letter} {name} ", markup=False)
            mark.styles.offset = widget.region.offset
            yield mark

    def on_key(self, event: events.Key) -> None:
        event.stop()
        pane = self.panes.get(event.key)
        self.dismiss(pane[0] if pane else None)


def focus_on(widget) -> Callable[[object], None]:
    """What to do with the pane that was picked."""

    def act(picked) -> None:
        (picked or widget).focus()

    return act
