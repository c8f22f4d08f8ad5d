"""Steps 1 to 4: a sheet, the edit strip under it, and on wide screens the help of the chosen value."""

from __future__ import annotations

from typing import ClassVar

from textual.app import ComposeResult
from textual.binding import Binding
from textual.containers import Container, Vertical
from textual.message import Message

from screener.app import fields
from screener.app.chrome import SumRow
from screener.app.desk import Desk
from screener.app.glyphs import Glyphs
from screener.app.lines import Block, Lines
from screener.app.row_actions import RowActions
from screener.app.rows import Row, Span, labelled, one_line, paragraph
from screener.app.searching import Searching
from screener.app.sheet import Sheet
from screener.app.strip import EditRequested, EditStrip
from screener.app.words import say
from screener.casefile import keys as schema


class InputPane(RowActions, Searching, Container):
    """One input step."""

    BINDINGS: ClassVar = [
        Binding("a", "add", "Add", id="inputs.add"),
        Binding("d", "remove", "Remove", id="inputs.remove"),
        Binding("delete", "clear", "Clear", id="inputs.clear"),
        Binding("s", "scale", "Scale to 100", id="inputs.scale"),
        Binding("o", "fold", "Open or fold", id="inputs.fold"),
    ]
    DEFAULT_CSS = """
    InputPane { layout: horizontal; }
    InputPane .left { width: 1fr; height: 1fr; }
    InputPane .matches { height: auto; max-height: 9; display: none; margin: 1 0 0 0; }
    InputPane.-searching .matches { display: block; }
    InputPane .field-help { display: none; width: 38; margin: 0 0 0 2; }
    """

    class Changed(Message):
        """The case was changed."""

    class Pointed(Message):
        """Words for the hint row."""

        def __init__(self, step: str, text: str, tone: str):
            super().__init__()
            self.step, self.text, self.tone = step, text, tone

    def __init__(self, step: str, desk: Desk, marks: Glyphs, **kwargs):
        super().__init__(id=step, **kwargs)
        self.step, self.desk, self.marks = step, desk, marks
        self._found: list = []
        self.news = ""  # what the last edit did; stays in the hint row until the cursor moves

    def compose(self) -> ComposeResult:
        with Vertical(classes="left"):
            yield Sheet(self.marks, classes="sheet")
            yield Lines(gutter=self.marks.cursor, classes="matches")
            yield EditStrip()
            yield SumRow()
        yield Lines(classes="field-help")

    @property
    def sheet(self) -> Sheet:
        """The sheet of this step."""
        return self.query_one(Sheet)

    @property
    def strip(self) -> EditStrip:
        """The row that edits."""
        return self.query_one(EditStrip)

    def point(self, text: str, tone: str = "") -> None:
        """Put words into the hint row."""
        self.post_message(self.Pointed(self.step, text, tone))

    # showing

    def update_case(self) -> None:
        """Show the case as it now is; a value being typed stays."""
        cell = self.sheet.cell
        sections = self.desk.sections(self.step, self.marks, (self.sheet.key, cell.path if cell else ""))
        self.sheet.fill(sections, say("intro", self.step), self.desk.refusal(self.step), say("residuals", "refused_short"))
        self._tell_sum()
        if not self.strip.editing:
            self._read()

    def go_to(self, path: str) -> None:
        """Put the cursor on a value; a fold that hides it opens."""
        if not self.sheet.go_to(path) and self.desk.unfold(path):
            self.update_case()
            self.sheet.go_to(path)

    def _tell_sum(self) -> None:
        bases = {"blend": "blend", "tank": "tank.contents"}
        base = bases.get(self.step)
        if base is None or not self.desk.text.rows(f"{base}.parts"):
            self.query_one(SumRow).tell("")
            return
        total = fields.share_total(base, self.desk.text)
        scaled = self.desk.text.get(f"{base}.scale") == "true"
        if total is None:
            self.query_one(SumRow).tell(say("sum", "untold"), "dim")
        elif abs(total - 100.0) <= 0.05:
            self.query_one(SumRow).tell(say("sum", "whole", base=say("sum", base), total=f"{total:g}"), "dim")
        else:
            words = say("sum", "scaled" if scaled else "off", base=say("sum", base), total=f"{total:g}")
            self.query_one(SumRow).tell(words, "" if scaled else "bad")

    def _read(self) -> None:
        """Strip, hint and help card follow the cell under the cursor."""
        cell, record = self.sheet.cell, self.sheet.record
        if cell is None or record is None:
            self.strip.read("", "")
            self.point(self.hint)
            self.query_one(".field-help", Lines).show(self._help)
            self.refresh_bindings()
            return
        self.strip.read(self.marks.plain(self.label), self.marks.plain(self._value(cell.path)))
        self.point(self.hint)
        self.query_one(".field-help", Lines).show(self._help)
        self.refresh_bindings()

    @property
    def label(self) -> str:
        """What the cell under the cursor is, in words."""
        record = self.sheet.record
        column = self.sheet.column_name
        name = record.name if record else ""
        if self._acts:
            return name
        return f"{name}, {column}" if column and record and len(record.editable) > 1 else name

    def _value(self, path: str) -> str:
        return "" if self._acts else self.desk.text.get(path) or say("sheet", "blank")

    @property
    def hint(self) -> str:
        """Meaning and range of the value under the cursor, or its fault."""
        cell = self.sheet.cell
        if self.news or cell is None:
            return self.news or (say("hint", "told") if self.sheet.record else "")
        if self._is_opener:
            return say("hint", "fold")
        if self._is_adder:
            return say("hint", "parts_add" if cell.path.endswith("parts[+]") else "row_add")
        key = schema.key_at(cell.path)
        if key is None:
            return say("hint", "unknown_name")
        if fault := self.desk.known.faults.get(cell.path):
            return fault
        if key.kind in (schema.STOCK, schema.SPECIES):
            part = "parts[" in cell.path
            return say("hint", "part_name") if part else say("hint", "stock_name", meaning=key.meaning)
        echo = self.desk.known.echoes.get(cell.path)
        taken = say("hint", "taken", text=echo.text) if echo and not echo.default else ""
        note = echo.note if echo else ""
        parts = [key.meaning, taken, note, "" if key.choices else key.allowed]
        return one_line([part for part in parts if part], self.screen.size.width - 2)

    def _help(self, width: int):
        cell = self.sheet.cell
        rows: list[Row] = []
        lines = self.desk.help_of(cell.path) if cell and not self._acts else []
        if lines:
            rows += paragraph(self.marks.plain(self.label), width, "head") + [(Span(""),)]
        for name, text in lines:
            rows += labelled(name, self.marks.plain(text), width, 10)
        if cell and (echo := self.desk.known.echoes.get(cell.path)):
            rows += labelled(say("help", "taken"), self.marks.plain(echo.text), width, 10)
        return (), [Block((row,)) for row in rows]

    # editing

    def on_lines_moved(self, event: Lines.Moved) -> None:
        event.stop()
        if event.lines is self.sheet and not self.strip.editing:
            self.news = ""
            self._read()

    def on_lines_chosen(self, event: Lines.Chosen) -> None:
        event.stop()
        if event.lines is self.sheet:
            self.edit()
        elif self.strip.editing:
            self._take_match()

    def on_edit_requested(self, event: EditRequested) -> None:
        event.stop()
        self.edit()

    def edit(self) -> None:
        """Edit the cell under the cursor."""
        cell = self.sheet.cell
        if cell is None:
            return
        if not self._acts and schema.key_at(cell.path) is None:
            self.point(say("hint", "unknown_name"))
        elif self._is_opener:
            self.action_fold()
        elif self._is_adder:
            self.action_add()
        elif schema.key_at(cell.path).kind in (schema.STOCK, schema.SPECIES):
            self._search(cell.path, self.label, self.desk.text.get(cell.path) or "")
        else:
            self.strip.edit(cell.path, self.label, self.desk.text.get(cell.path) or "", self.desk.choices(cell.path))
            self.point(self._while_editing(cell.path))
        self.refresh_bindings()

    @property
    def unfinished(self) -> bool:
        """Whether a part was just added whose share is being typed: not a moment to work things out."""
        strip = self.strip
        return strip.editing and strip.purpose.endswith("].share") and not self.desk.text.has(strip.purpose)

    def _while_editing(self, path: str) -> str:
        key = schema.key_at(path)
        if self.desk.choices(path):
            return say("hint", "choices", choices=", ".join(self.desk.choices(path)))
        usual = say("hint", "usual", text=key.usual) if key.usual else ""
        parts = [key.meaning, say("hint", "example", text=key.example), usual]
        return one_line([part for part in parts if part], self.screen.size.width - 2)

    def on_edit_strip_typed(self, event: EditStrip.Typed) -> None:
        event.stop()
        if self.has_class("-searching"):
            self._show_matches(event.value)
            return
        if not self.desk.ready:
            return
        checked = self.desk.check(event.purpose, event.value)
        if event.value in self.strip.input.choices:
            self.point(self._while_editing(event.purpose))
        elif checked.problem:
            self.point(checked.problem, "dim")
        elif checked.echo:
            self.point(say("hint", "taken", text=checked.echo.text))
        else:
            self.point(say("hint", "emptied"))

    def on_edit_strip_taken(self, event: EditStrip.Taken) -> None:
        event.stop()
        if self.has_class("-searching"):
            self._take_match()
            return
        checked = self.desk.take(event.purpose, event.value)
        if checked.problem:
            self.point(checked.problem, "bad")
            return
        self._leave()
        self.post_message(self.Changed())
        self.update_case()
        with self.prevent(Lines.Moved):
            self.sheet.action_step(1)
        taken = checked.echo and say("hint", "entered", value=event.value.strip(), text=checked.echo.text)
        self.news = taken or ""
        self._read()

    def on_edit_strip_left(self, event: EditStrip.Left) -> None:
        event.stop()
        self._leave()
        self._read()

    def _leave(self) -> None:
        """Out of the strip, back to the sheet."""
        self.remove_class("-searching")
        self.strip.read("", "")
        self.sheet.focus()
        self.refresh_bindings()
