"""The one list widget: heading rows that stay, blocks of rows below them, a cursor on a block.

Content comes from a builder, a plain function of the width, so that the same
layout code is tested without a screen. Nothing scrolls sideways; what does
not fit below is counted in words, since a scroll bar needs colour to be seen.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from typing import ClassVar

from rich.segment import Segment
from rich.style import Style
from textual import events
from textual.binding import Binding
from textual.color import Color
from textual.geometry import Size
from textual.message import Message
from textual.strip import Strip
from textual.widget import Widget

from screener.app.rows import Row, Span, columns_of, pad, row_width
from screener.app.words import say

# Attributes of the tones that need no colour, and the theme variables of those that have one.
_ATTRIBUTES = {
    "dim": Style(dim=True),
    "bold": Style(bold=True),
    "head": Style(bold=True),
    "curve": Style(bold=True),
    "cursor": Style(bold=True),
    "cell": Style(reverse=True),
}
_COLOURS = {"near": "near", "beyond": "beyond", "bad": "beyond", "unknown": "unknown", "band": "band"}
TONES = (*_ATTRIBUTES, *_COLOURS)


@dataclass(frozen=True)
class Block:
    """The rows of one record; a block without a key cannot be chosen."""

    rows: tuple[Row, ...]
    key: str = ""


Builder = Callable[[int], tuple[Sequence[Row], Sequence[Block]]]


class Toned(Widget):
    """A widget that paints rows of spans; tones become styles of its theme."""

    _tones: dict[str, Style] | None = None  # styles by tone, until the style of the widget changes

    def notify_style_update(self) -> None:
        """Forget the styles worked out so far: the theme or a class has changed."""
        super().notify_style_update()
        self._tones = None

    def tone_style(self, tone: str) -> Style:
        """Style of a set of tone words on this widget's ground."""
        if self._tones is None:
            self._tones = {"": self.rich_style}
        if tone not in self._tones:
            style = self._tones[""]
            for word in tone.split():
                style += _ATTRIBUTES[word] if word in _ATTRIBUTES else self._coloured(word)
            self._tones[tone] = style
        return self._tones[tone]

    def _coloured(self, word: str) -> Style:
        """Style of a tone that has a colour of the theme: a ground for the band, else a foreground."""
        colour = Color.parse(self.app.theme_variables[_COLOURS[word]]).rich_color
        return Style(bgcolor=colour) if word == "band" else Style(color=colour)

    def paint(self, row: Row, width: int) -> Strip:
        """A row as a strip exactly `width` columns wide."""
        segments = [Segment(span.text, self.tone_style(span.tone)) for span in row]
        return Strip(segments, row_width(row)).adjust_cell_length(width, self.tone_style(""))


class Lines(Toned, can_focus=True):
    """Blocks of rows with a cursor."""

    HELP = say("widgets", "list")
    BINDINGS: ClassVar = [
        Binding("up", "step(-1)", "Up", show=False, id="lines.up"),
        Binding("down", "step(1)", "Down", show=False, id="lines.down"),
        Binding("pageup", "page(-1)", "Page up", show=False, id="lines.page_up"),
        Binding("pagedown", "page(1)", "Page down", show=False, id="lines.page_down"),
        Binding("home", "end(-1)", "First", show=False, id="lines.first"),
        Binding("end", "end(1)", "Last", show=False, id="lines.last"),
        Binding("enter", "choose", "Choose", show=False, id="lines.choose"),
    ]
    DEFAULT_CSS = "Lines { height: 1fr; width: 1fr; }"

    class Moved(Message):
        """The cursor stands on another block."""

        def __init__(self, lines: Lines, key: str):
            super().__init__()
            self.lines, self.key = lines, key

        @property
        def control(self) -> Lines:
            return self.lines

    class Chosen(Moved):
        """Enter was pressed, or the block under the cursor was clicked."""

    def __init__(self, builder: Builder | None = None, *, gutter: str = "", **kwargs):
        super().__init__(**kwargs)
        self._builder = builder or (lambda width: ((), ()))
        self._gutter = gutter  # mark put before the rows of the block under the cursor; '' for a plain text
        self._head: list[Row] = []
        self._blocks: list[Block] = []
        self._flat: list[tuple[int, Row]] = []  # (block number, row)
        self._laid_out_for = -1
        self._key = ""
        self._top = 0

    # content

    def show(self, builder: Builder) -> None:
        """New content; the cursor stays on its block while that block exists."""
        self._builder = builder
        self.lay_out_again()
        self.refresh(layout=True)

    def lay_out_again(self) -> None:
        """Build the rows anew at the same width."""
        self._laid_out_for = -1
        self._lay_out()
        self.refresh()

    def cursor_changed(self) -> None:
        """The cursor has moved to another block: a place for subclasses."""

    def _lay_out(self) -> None:
        width = self.size.width or 80  # before the first layout any width gives the keys
        if width == self._laid_out_for:
            return
        self._laid_out_for = width
        head, blocks = self._builder(max(1, width - columns_of(self._gutter)))
        self._head, self._blocks = list(head), list(blocks)
        self._flat = [(i, row) for i, block in enumerate(self._blocks) for row in block.rows]
        keys = self.keys
        if self._key not in keys:
            self._key = keys[0] if keys else ""
        self._keep_in_sight()

    def on_resize(self, _: events.Resize) -> None:
        self._top = 0 if self.keys else self._top  # room that was gained shows rows above again
        self.lay_out_again()

    def get_content_height(self, container: Size, viewport: Size, width: int) -> int:
        """Rows the whole content takes, for widgets of automatic height."""
        head, blocks = self._builder(max(1, width - columns_of(self._gutter)))
        return len(head) + sum(len(block.rows) for block in blocks)

    # cursor

    @property
    def keys(self) -> list[str]:
        """Keys of the blocks that can be chosen, in order."""
        return [block.key for block in self._blocks if block.key]

    @property
    def key(self) -> str:
        """Key of the block under the cursor."""
        return self._key

    def move_to(self, key: str) -> None:
        """Put the cursor on a block."""
        if key in self.keys and key != self._key:
            self._key = key
            self.cursor_changed()
            self._keep_in_sight()
            self.refresh()
            self.post_message(self.Moved(self, key))

    def action_step(self, by: int) -> None:
        keys = self.keys
        if not keys:
            self._scroll(by)
            return
        place = keys.index(self._key) + by
        if 0 <= place < len(keys):
            self.move_to(keys[place])
        else:
            self._scroll(by)

    def action_page(self, by: int) -> None:
        keys, page = self.keys, max(1, self._room - 1)
        if not keys:
            self._scroll(by * page)
            return
        place = keys.index(self._key) + by * page
        self.move_to(keys[min(len(keys) - 1, max(0, place))])

    def action_end(self, side: int) -> None:
        keys = self.keys
        if keys:
            self.move_to(keys[0 if side < 0 else -1])
        self._scroll(side * len(self._flat))

    def action_choose(self) -> None:
        if self._key:
            self.post_message(self.Chosen(self, self._key))

    # scrolling

    @property
    def _overflows(self) -> bool:
        return len(self._head) + len(self._flat) > self.size.height

    @property
    def _room(self) -> int:
        """Rows for blocks: without the heading and, when not all fits, the counting line."""
        return max(1, self.size.height - len(self._head) - (1 if self._overflows else 0))

    def _scroll(self, by: int) -> None:
        self._top = min(max(0, self._top + by), max(0, len(self._flat) - self._room))
        self.refresh()

    def _keep_in_sight(self) -> None:
        rows = [at for at, (i, _) in enumerate(self._flat) if self._key and self._blocks[i].key == self._key]
        if rows:
            first = rows[0]
            while first > 0 and not self._blocks[self._flat[first - 1][0]].key:
                first -= 1  # the heading above the first block of a group comes into sight with it
            self._top = min(self._top, first)
            if rows[-1] >= self._top + self._room:
                self._top = min(rows[0], self._block_start(rows[-1] - self._room + 1))
        self._top = min(max(0, self._top), max(0, len(self._flat) - self._room))

    def _block_start(self, at: int) -> int:
        """The first row from here on that begins a block, so that no record shows half."""
        while 0 < at < len(self._flat) and self._flat[at - 1][0] == self._flat[at][0]:
            at += 1
        return at

    def on_mouse_scroll_down(self, event: events.MouseScrollDown) -> None:
        event.stop()
        self._scroll(2)

    def on_mouse_scroll_up(self, event: events.MouseScrollUp) -> None:
        event.stop()
        self._scroll(-2)

    def on_click(self, event: events.Click) -> None:
        at = event.y - len(self._head) + self._top
        if event.y >= len(self._head) and 0 <= at < len(self._flat):
            key = self._blocks[self._flat[at][0]].key
            if key and key == self._key:
                self.action_choose()
            elif key:
                self.move_to(key)

    # painting

    def render_line(self, y: int) -> Strip:
        self._lay_out()
        width, lead = self.size.width, columns_of(self._gutter)
        blank = (Span(" " * lead),) if lead else ()
        if y < len(self._head):
            return self.paint((*blank, *self._head[y]), width)
        if self._overflows and y == self.size.height - 1:
            return self.paint((Span(pad("", lead) + self._counted(), "dim"),), width)
        at = y - len(self._head) + self._top
        if at >= len(self._flat):
            return Strip.blank(width, self.tone_style(""))
        i, row = self._flat[at]
        if lead and self._key and self._blocks[i].key == self._key:
            first = at == 0 or self._flat[at - 1][0] != i
            mark = Span(self._gutter if first else " " * lead, "cursor")
            return self.paint((mark, *self._under_cursor(row)), width)
        return self.paint((*blank, *row), width)

    def _under_cursor(self, row: Row) -> Row:
        """The row under the cursor: its texts stand out while the widget has the focus."""
        if not self.has_focus:
            return row
        return tuple(Span(span.text, f"{span.tone} cursor") for span in row)

    def _counted(self) -> str:
        """How much lies out of sight: records where there are any, else lines."""
        last = min(len(self._flat), self._top + self._room)
        above, below = self._top, len(self._flat) - last
        if self.keys:
            seen = {i for i, _ in self._flat[self._top : last]}
            above = sum(1 for i, block in enumerate(self._blocks) if block.key and i < min(seen))
            below = sum(1 for i, block in enumerate(self._blocks) if block.key and i > max(seen))
        words = [say("lines", "above", count=above)] if above else []
        words += [say("lines", "below", count=below)] if below else []
        return ", ".join(words)
