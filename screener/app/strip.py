"""The edit strip: one row under the table that edits the cell under the cursor."""

from __future__ import annotations

from collections.abc import Sequence
from typing import ClassVar

from textual import events
from textual.app import ComposeResult
from textual.binding import Binding
from textual.containers import Horizontal
from textual.message import Message
from textual.widgets import Input, Static

from screener.app.rows import columns_of
from screener.app.words import say


class StripInput(Input):
    """The input itself: up and down go through the choices, Esc leaves."""

    HELP = say("widgets", "strip")

    BINDINGS: ClassVar = [
        Binding("escape", "leave", "Leave it", id="strip.leave"),
        Binding("enter", "submit", "Take it", id="strip.take"),
        Binding("up", "choice(-1)", "Choice before", show=False, id="strip.choice_before"),
        Binding("down", "choice(1)", "Next choice", show=False, id="strip.next_choice"),
    ]

    def __init__(self, **kwargs):
        super().__init__(compact=True, select_on_focus=True, **kwargs)
        self.choices: tuple[str, ...] = ()

    def action_choice(self, by: int) -> None:
        if self.parent is not None:
            self.post_message(EditStrip.Stepped(by))
        if self.choices:
            place = self.choices.index(self.value) + by if self.value in self.choices else 0 if by > 0 else -1
            self.value = self.choices[place % len(self.choices)]
            self.cursor_position = len(self.value)

    def action_leave(self) -> None:
        self.post_message(EditStrip.Left())


class EditStrip(Horizontal):
    """Shows the cell under the cursor, or takes a new value for it."""

    DEFAULT_CSS = """
    EditStrip { height: 1; width: 1fr; padding: 0 1; }
    EditStrip > #strip-label { width: auto; text-style: dim; }
    EditStrip > #strip-value { width: 1fr; padding: 0 0 0 2; }
    EditStrip > StripInput { width: 1fr; margin: 0 0 0 2; display: none; background: $field; }
    EditStrip.-editing > StripInput { display: block; }
    EditStrip.-editing > #strip-value { display: none; }
    EditStrip.-editing > #strip-label { text-style: bold; }
    """

    class Taken(Message):
        """Enter was pressed on a value."""

        def __init__(self, purpose: str, value: str):
            super().__init__()
            self.purpose, self.value = purpose, value

    class Typed(Taken):
        """The text has changed while editing."""

    class Left(Message):
        """Esc was pressed: the old value stays."""

    class Stepped(Message):
        """Up or down was pressed in the strip."""

        def __init__(self, by: int):
            super().__init__()
            self.by = by

    def __init__(self, **kwargs):
        super().__init__(**kwargs)
        self.purpose = ""  # what the value is for: a path, or 'add', 'save'

    def compose(self) -> ComposeResult:
        yield Static("", id="strip-label", markup=False)
        yield Static("", id="strip-value", markup=False)
        yield StripInput(id="strip-input")

    @property
    def editing(self) -> bool:
        """Whether a value is being typed."""
        return self.has_class("-editing")

    @property
    def input(self) -> StripInput:
        """The field in which a value is typed."""
        return self.query_one(StripInput)

    def read(self, label: str, value: str) -> None:
        """Show a cell without editing it."""
        self.remove_class("-editing")
        self.purpose = ""
        fits = columns_of(label) + columns_of(value) + 6 <= (self.size.width or 80)
        self.query_one("#strip-label", Static).update(label)
        self.query_one("#strip-value", Static).update(value if fits else say("strip", "above"))

    def edit(self, purpose: str, label: str, value: str, choices: Sequence[str] = ()) -> None:
        """Take a new value; the old one stands in the strip, selected."""
        self.purpose = purpose
        self.query_one("#strip-label", Static).update(label)
        field = self.input
        field.choices = tuple(choices)
        self.add_class("-editing")
        with field.prevent(Input.Changed):
            field.value = value
        field.focus()
        field.action_select_all()

    def on_input_submitted(self, event: Input.Submitted) -> None:
        event.stop()
        self.post_message(self.Taken(self.purpose, event.value))

    def on_input_changed(self, event: Input.Changed) -> None:
        event.stop()
        if self.editing:
            self.post_message(self.Typed(self.purpose, event.value))

    def on_click(self, event: events.Click) -> None:
        if not self.editing:
            self.post_message(EditRequested())


class EditRequested(Message):
    """The strip was clicked: edit the cell it shows."""
