"""Step 5: gap bars, the why card that follows the chosen row, and the curve."""

from __future__ import annotations

from typing import ClassVar

from textual.app import ComposeResult
from textual.binding import Binding
from textual.containers import Container
from textual.message import Message
from textual.strip import Strip

from screener.app import judged as view
from screener.app.curve import draw
from screener.app.desk import paths_named
from screener.app.glyphs import Glyphs
from screener.app.ladder import ladder
from screener.app.lines import Block, Lines, Toned
from screener.app.pictures import gap_bars
from screener.app.rows import Row, Span, paragraph
from screener.app.words import say

VIEWS = ("bars", "curve", "why")


class CurveView(Toned, can_focus=True):
    """The curve picture; drawn again only when its data or its size change."""

    HELP = say("widgets", "curve")
    DEFAULT_CSS = "CurveView { width: 1fr; height: 1fr; }"

    def __init__(self, marks: Glyphs, **kwargs):
        super().__init__(**kwargs)
        self.marks, self.plot = marks, None
        self._rows: list[Row] = []
        self._drawn = None

    def show(self, plot) -> None:
        """A new plot, or None for none."""
        self.plot, self._drawn = plot, None
        self.refresh()

    def render_line(self, y: int) -> Strip:
        size = (self.size.width, self.size.height)
        if self._drawn != size:
            self._drawn = size
            empty = paragraph(say("findings", "no_curve"), max(1, size[0]), "dim")
            self._rows = draw(self.plot, *size, self.marks) if self.plot else empty
        return self.paint(self._rows[y] if y < len(self._rows) else (), self.size.width)


class Bars(Lines):
    """Gap bars with a cursor; page keys scroll the card below."""

    HELP = say("widgets", "bars")
    BINDINGS: ClassVar = [
        Binding("enter", "choose", "Why", id="findings.why"),
        Binding("enter", "correct", "Go to it", id="findings.go_to"),
        Binding("g", "missing", "Go to input", id="findings.missing"),
        Binding("pageup", "card(-1)", "Card up", show=False, id="findings.card_up"),
        Binding("pagedown", "card(1)", "Card down", show=False, id="findings.card_down"),
    ]

    missing = ""  # an input that the check under the cursor asks for
    faulty = False  # whether the rows are faults instead of checks

    def check_action(self, action: str, parameters: tuple) -> bool | None:
        """Enter explains a check or goes to the input a fault names."""
        if action in ("choose", "correct"):
            return bool(self.key) and (action == "correct") == self.faulty
        if action == "missing":
            return bool(self.missing) and not self.faulty
        return not (action == "card" and self.faulty)

    def action_missing(self) -> None:
        self.post_message(FindingsPane.GoTo(self.missing))

    def action_correct(self) -> None:
        self.action_choose()

    def action_card(self, by: int) -> None:
        self.screen.query_one("#why", Lines).action_page(by)


class Card(Lines):
    """The why card: a text that scrolls."""

    HELP = say("widgets", "card")
    BINDINGS: ClassVar = [Binding("escape", "back", "Back", id="card.back")]

    def action_back(self) -> None:
        self.post_message(FindingsPane.Back())


class FindingsPane(Container):
    """Bars above; card and curve side by side on wide screens, one at a time on narrow ones."""

    DEFAULT_CSS = """
    FindingsPane { layout: vertical; }
    FindingsPane #lower { layout: horizontal; height: 1fr; }
    FindingsPane #bars { height: auto; max-height: 70%; }
    FindingsPane #why { margin: 1 0 0 0; padding: 0 0 0 1; }
    FindingsPane #curve { margin: 1 0 0 0; padding: 0 0 0 1; display: none; }
    FindingsPane.-see-curve #curve { display: block; }
    FindingsPane.-see-curve #why { display: none; }
    FindingsPane.-see-curve #bars { max-height: 7; }
    FindingsPane.-see-why #bars { max-height: 5; }
    FindingsPane.-faults #lower { display: none; }
    FindingsPane.-faults #bars { height: 1fr; max-height: 100%; }
    """

    class Back(Message):
        """Leave the card for the list."""

    class GoTo(Message):
        """Go to the input a fault or a reason names."""

        def __init__(self, path: str):
            super().__init__()
            self.path = path

    class Pointed(Message):
        """The words of the hint row for the row under the cursor."""

        def __init__(self, text: str):
            super().__init__()
            self.text = text

    def __init__(self, marks: Glyphs, **kwargs):
        super().__init__(**kwargs)
        self.marks = marks
        self.items: dict[str, view.Judged] = {}
        self.screening = None
        self.faults: tuple = ()
        self.look = "bars"
        self.add_class("-see-bars")

    def compose(self) -> ComposeResult:
        yield Bars(self._no_result, gutter=self.marks.cursor, id="bars")
        with Container(id="lower"):
            yield Card(id="why")
            yield CurveView(self.marks, id="curve")

    # content

    def show(self, screening, faults=(), *, full: bool = True) -> None:
        """A new result: findings, or the faults that kept the case from being read.

        The curve of before stays until a full result brings the next one.
        """
        self.screening, self.faults = screening, tuple(faults)
        self.set_class(bool(faults) or screening is None, "-faults")
        bars = self.query_one("#bars", Bars)
        bars.faulty = bool(faults)
        if faults:
            bars.show(self._fault_list)
        elif screening is None:
            bars.show(self._no_result)
        else:
            self.items = {item.finding.id: item for item in view.judged(screening)}
            bars.show(self._bars)
            if full:
                self.query_one("#curve", CurveView).show(view.plot(screening))
            self._follow()

    def _no_result(self, width: int):
        return (), [Block(tuple(paragraph(say("findings", "none_yet"), width, "dim")))]

    def _fault_list(self, width: int):
        head = [*paragraph(say("findings", "faults", count=len(self.faults)), width, "bad"), ()]
        blocks = []
        for i, fault in enumerate(self.faults):
            blocks.append(Block(tuple(paragraph(self.marks.plain(str(fault)), width)), fault.path or f"fault {i}"))
        return head, blocks

    def _bars(self, width: int):
        heading, rows = gap_bars([item.gap for item in self.items.values()], width, self.marks)
        return [heading], [Block(tuple(block), key) for key, block in zip(self.items, rows)]

    def _card(self, width: int):
        rows: list[Row] = []
        item = self.items.get(self.query_one("#bars", Bars).key)
        if item:
            rows += view.card(item, width, self.marks)
            rows += self._ladder(item, width)
            rows += [(Span(""),), *view.reservation_rows(self.screening, width, self.marks)]
        return (), [Block((row,)) for row in rows]

    def _ladder(self, item: view.Judged, width: int) -> list[Row]:
        """The vapour ladder under the card of the vapour space, once a full result has brought it."""
        months = self.screening.curve.get("ladder", {}).get("months", ())
        if item.finding.id != "vapour-space.flammable" or not months:
            return []
        return [(Span(""),), *ladder(months, width, self.marks)]

    def _follow(self) -> None:
        """Card and hint follow the row under the cursor."""
        bars = self.query_one("#bars", Bars)
        card = self.query_one("#why", Lines)
        card.action_end(-1)
        card.show(self._card)
        item = self.items.get(bars.key)
        named = paths_named(item.finding.reason) if item and item.finding.verdict == "unknown" else []
        bars.missing = named[0] if named else ""
        bars.refresh_bindings()
        if item:
            self.post_message(self.Pointed(self._hint_of(item)))

    def _hint_of(self, item: view.Judged) -> str:
        return view.hint(item, self.screen.size.width - 2)

    @property
    def hint(self) -> str:
        """Words of the hint row."""
        bars = self.query_one("#bars", Bars)
        if self.faults:
            return say("findings", "fault_hint")
        item = self.items.get(bars.key)
        return self._hint_of(item) if item and self.screening else say("findings", "none_yet")

    # what the person does

    def on_lines_moved(self, event: Lines.Moved) -> None:
        event.stop()
        if event.lines.id == "bars" and not self.faults:
            self._follow()

    def on_lines_chosen(self, event: Lines.Chosen) -> None:
        event.stop()
        if self.faults:
            self.post_message(self.GoTo(event.key))
        elif event.lines.id == "bars":
            self.see("bars" if self.screen.has_class("-wide") else "why")
            self.query_one("#why").focus()

    def on_findings_pane_back(self, event: Back) -> None:
        event.stop()
        if self.look == "why":
            self.see("bars")
        self.query_one("#bars").focus()

    def see(self, look: str) -> None:
        """Show one of the views."""
        self.look = look
        for name in VIEWS:
            self.set_class(name == look, f"-see-{name}")

    def next_view(self) -> None:
        """The view after this one."""
        self.see(VIEWS[(VIEWS.index(self.look) + 1) % len(VIEWS)])
        if self.look != "why" or not self.query_one("#why").has_focus:
            self.query_one("#bars").focus()
