"""A box that asks for a file name."""

from __future__ import annotations

from textual.app import ComposeResult
from textual.containers import Vertical
from textual.widgets import Static

from screener.app.chrome import KeyRow
from screener.app.dialogs import Box
from screener.app.glyphs import Glyphs
from screener.app.strip import EditStrip, StripInput


class NameBox(Box):
    """Asks for a file name; Esc gives none."""

    DEFAULT_CSS = "NameBox Static { width: 1fr; height: auto; } NameBox StripInput { width: 1fr; background: $field; margin: 1 0; }"

    def __init__(self, question: str, proposed: str, marks: Glyphs):
        super().__init__(marks)
        self.question, self.proposed = question, proposed

    def compose(self) -> ComposeResult:
        with Vertical():
            yield Static(self.question, markup=False)
            yield StripInput(value=self.proposed)
            yield KeyRow(self.marks)

    def on_mount(self) -> None:
        self.query_one(StripInput).focus()

    def on_input_submitted(self, event) -> None:
        event.stop()
        if event.value.strip():
            self.dismiss(event.value.strip())

    def on_edit_strip_left(self, event: EditStrip.Left) -> None:
        event.stop()
        self.dismiss(None)
