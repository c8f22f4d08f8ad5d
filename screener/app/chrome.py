"""What stands around every step: title line, step bar, verdict strip, hint row, key row."""

from __future__ import annotations

from rich.segment import Segment
from textual import events
from textual.geometry import Size
from textual.message import Message
from textual.strip import Strip

from screener.app.chrome_state import StepState
from screener.app.glyphs import Glyphs, glyphs
from screener.app.lines import Toned
from screener.app.rows import Row, Span, columns_of, flow, pad, paragraph, row_width, wrap
from screener.app.words import say


class Rows(Toned):
    """A widget as high as its rows: a plain function of the width makes them."""

    DEFAULT_CSS = "Rows { height: auto; width: 1fr; }"

    def rows(self, width: int) -> list[Row]:
        """Rows for a width."""
        raise AssertionError(f"{type(self).__name__} has no rows")

    def get_content_height(self, container: Size, viewport: Size, width: int) -> int:
        return max(1, len(self.rows(max(1, width))))

    def render_line(self, y: int) -> Strip:
        rows = self.rows(max(1, self.size.width))
        return self.paint(rows[y] if y < len(rows) else (), self.size.width)


class TitleLine(Rows):
    """Title of the case, and words at the right end where there is room for them."""

    def __init__(self, **kwargs):
        super().__init__(**kwargs)
        self.title, self.side, self.marks = "", "", glyphs("braille")

    def tell(self, title: str, side: str, marks: Glyphs) -> None:
        """New words for the line."""
        self.title, self.side, self.marks = title, side, marks
        self.refresh(layout=True)

    def rows(self, width: int) -> list[Row]:
        title = self.marks.plain(self.title)
        right = self.marks.plain(self.side)
        if right and columns_of(title) + columns_of(right) + 4 <= width:
            return [(Span(" "), Span(pad(title, width - columns_of(right) - 2), "bold"), Span(right, "dim"))]
        return [(Span(" " + line, "bold"),) for line in wrap(title, width - 2)]


class StepBar(Rows):
    """The six steps: a strip on narrow screens, a rail with words on wide ones."""

    DEFAULT_CSS = "StepBar { height: auto; width: 1fr; }"

    class Picked(Message):
        """A step was clicked."""

        def __init__(self, number: int):
            super().__init__()
            self.number = number

    def __init__(self, **kwargs):
        super().__init__(**kwargs)
        self.states: tuple[StepState, ...] = ()
        self.current, self.saved, self.marks = 1, "", glyphs("braille")

    def tell(self, states, current: int, saved: str, marks: Glyphs) -> None:
        """New states of the steps, and whether the case is saved."""
        self.states, self.current, self.saved, self.marks = tuple(states), current, saved, marks
        self.refresh(layout=True)

    @property
    def _rail(self) -> bool:
        return self.screen.has_class("-wide")

    def rows(self, width: int) -> list[Row]:
        if self._rail:
            return [row for _, row in self._rail_rows(width)]
        rows = flow([self._span_of(state) for state in self.states], width, 1 if width < 80 else 2)
        left = width - row_width(rows[-1]) - 1
        if left > columns_of(self.saved):
            rows[-1] = (*rows[-1], Span(pad(self.saved, left, "right"), "dim"))
            return rows
        return [*rows, (Span(f" {self.saved}", "dim"),)]

    def _span_of(self, state: StepState) -> Span:
        here = state.number == self.current
        lead = self.marks.cursor if here else " "
        text = f"{lead}{state.number} {state.name} {self.marks.plain(state.mark)}".rstrip()
        return Span(text, "head" if here else state.tone)

    def _rail_rows(self, width: int) -> list[tuple[int, Row]]:
        rows: list[tuple[int, Row]] = []
        for state in self.states:
            here = state.number == self.current
            lead = self.marks.cursor if here else " "
            rows.append((state.number, (Span(f"{lead} {state.number} {state.name}", "head" if here else ""),)))
            for line in wrap(self.marks.plain(state.words), width - 6):
                rows.append((state.number, (Span("     "), Span(line, state.tone or "dim"))))
        return [*rows, (self.current, (Span(""),)), (self.current, (Span(f"  {self.saved}", "dim"),))]

    def on_click(self, event: events.Click) -> None:
        rows = self._rail_rows(self.size.width) if self._rail else []
        if rows:
            if event.y < len(rows):
                self.post_message(self.Picked(rows[event.y][0]))
            return
        at = 0
        names = {self._span_of(state): state.number for state in self.states}
        for span in self.rows(self.size.width)[event.y]:
            at += columns_of(span.text)
            if event.x < at and span in names:
                self.post_message(self.Picked(names[span]))
            if event.x < at:
                return


class Tally(Rows):
    """Verdict strip: counts worst first, and whether they belong to the inputs on the screen."""

    def __init__(self, **kwargs):
        super().__init__(**kwargs)
        self.counted: Row = ()
        self.state, self.tone = "", ""

    def tell(self, counted: Row, state: str, tone: str = "") -> None:
        """New counts and the words beside them."""
        self.counted, self.state, self.tone = counted, state, tone
        self.refresh(layout=True)

    def rows(self, width: int) -> list[Row]:
        tone = self.tone or "dim"
        words: list[Row] = [(Span(" " + line, tone),) for line in wrap(self.state, width - 2)] if self.state else []
        if not self.counted:
            return words
        lead = [(Span(" "), *row) for row in flow(self.counted, width - 2, 3)]
        gap = width - row_width(lead[-1]) - columns_of(self.state) - 1
        if words and gap >= 2:
            return [*lead[:-1], (*lead[-1], Span(" " * gap), Span(self.state, tone))]
        return lead + words


class Hint(Rows):
    """What the thing in focus means or what just happened, whole, however long."""

    def __init__(self, **kwargs):
        super().__init__(**kwargs)
        self.text, self.tone, self.marks = "", "", glyphs("braille")

    def tell(self, text: str, tone: str = "") -> None:
        """New words."""
        if (text, tone) != (self.text, self.tone):
            self.text, self.tone = text, tone
            self.refresh(layout=True)

    def rows(self, width: int) -> list[Row]:
        return [(Span(" " + line, self.tone),) for line in wrap(self.marks.plain(self.text), width - 2)]


class SumRow(Rows):
    """A line under the sheet: the sum of the shares."""

    DEFAULT_CSS = "SumRow.-empty { display: none; }"

    def __init__(self, **kwargs):
        super().__init__(**kwargs)
        self.text, self.tone = "", ""

    def tell(self, text: str, tone: str = "") -> None:
        """New words."""
        self.text, self.tone = text, tone
        self.set_class(not text, "-empty")
        self.set_class(tone == "dim", "-calm")  # nothing to do about it
        self.refresh(layout=True)

    def rows(self, width: int) -> list[Row]:
        return [(Span(" "), *row) for row in paragraph(self.text, width - 2, self.tone)]


_SHOWN = {
    "enter": "⏎", "escape": "Esc", "question_mark": "?", "up": "↑", "down": "↓", "left": "←", "right": "→",
    "delete": "Del", "space": "space",
}  # fmt: skip


def key_name(key: str) -> str:
    """How a key is written in the key row."""
    key = key.split(",")[0]
    if key in _SHOWN:
        return _SHOWN[key]
    if key.startswith("ctrl+"):
        return "^" + key[5:]
    return key.upper() if key[0] == "f" and key[1:].isdigit() else key


class KeyRow(Toned):
    """The keys that do something here; those that do not fit whole are left to the palette."""

    DEFAULT_CSS = "KeyRow { height: 1; width: 1fr; dock: bottom; }"

    def __init__(self, marks: Glyphs | None = None, **kwargs):
        super().__init__(**kwargs)
        self.marks = marks or glyphs("braille")
        self._places: list[tuple[int, int, str]] = []  # from, to, key

    def on_mount(self) -> None:
        self.screen.bindings_updated_signal.subscribe(self, lambda _: self.refresh())

    def _shown(self) -> list[tuple[str, str]]:
        seen, shown = set(), []
        for key, active in self.screen.active_bindings.items():
            binding = active.binding
            shown_here = binding.show or binding.action.endswith("command_palette")
            if shown_here and active.enabled and binding.action not in seen and binding.description:
                seen.add(binding.action)
                shown.append((key, binding.description))
        return shown

    def render_line(self, y: int) -> Strip:
        width, at = self.size.width, 1
        pairs = self._shown()
        last = next((pair for pair in pairs if pair[0] == "ctrl+p"), None)
        pairs = [pair for pair in pairs if pair is not last]
        last = (last[0], say("walk", "palette")) if last else None
        spans: list[Span] = [Span(" ")]
        self._places = []
        keep = columns_of(self._text(*last)) + 1 if last else 0
        for key, words in pairs:
            text = self._text(key, words)
            if at + columns_of(text) + 2 + keep > width:
                continue
            spans += [Span(self.marks.plain(key_name(key)), "bold"), Span(f" {words}", "dim"), Span("  ")]
            self._places.append((at, at + columns_of(text), key))
            at += columns_of(text) + 2
        if last:
            start = width - keep
            spans += [Span(" " * (start - at)), Span(key_name(last[0]), "bold"), Span(f" {last[1]} ", "dim")]
            self._places.append((start, width, last[0]))
        return Strip([Segment(s.text, self.tone_style(s.tone)) for s in spans]).adjust_cell_length(
            width, self.tone_style("")
        )

    def _text(self, key: str, words: str) -> str:
        return f"{self.marks.plain(key_name(key))} {words}"

    async def on_click(self, event: events.Click) -> None:
        for start, end, key in self._places:
            if start <= event.x < end:
                active = self.screen.active_bindings.get(key)
                if active:
                    await self.app.run_action(active.binding.action, active.node)
