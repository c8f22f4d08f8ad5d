"""A sheet: sections of records, each record a line of cells, some of them editable.

The plain half (`Cell`, `Record`, `Section`, `sheet_blocks`) lays out; the
widget adds the cursor. Sections of different shape stand in one sheet: label
and value, parts of a blend, months.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import ClassVar

from textual import events
from textual.binding import Binding

from screener.app.glyphs import Glyphs
from screener.app.lines import Block, Lines
from screener.app.rows import (
    Column,
    Row,
    Span,
    column_widths,
    columns_kept,
    columns_of,
    paragraph,
    record_rows,
)
from screener.app.words import say

GAP = 2


@dataclass(frozen=True)
class Cell:
    """One cell; a path makes it editable."""

    text: str
    path: str = ""
    tone: str = ""


@dataclass(frozen=True)
class Record:
    """One line of a section. `note` is printed below it, whole."""

    key: str
    cells: tuple[Cell, ...]
    note: str = ""
    note_tone: str = "bad"
    name: str = ""  # what the record is about, for the edit strip
    folds: bool = False  # whether it stands behind the row that opens its section
    adds: bool = False  # whether it is the line that adds a row

    @property
    def editable(self) -> list[int]:
        """Places of the cells that can be edited."""
        return [i for i, cell in enumerate(self.cells) if cell.path]


@dataclass(frozen=True)
class Section:
    """Records of one shape under one heading."""

    columns: tuple[Column, ...]  # the heading of the first is the name of the section
    records: tuple[Record, ...]
    note: str = ""
    note_tone: str = "dim"
    fold: str = ""  # name under which it folds, shared by sections that fold together; '' never
    rest: str = "rows"  # what its folded records are called: 'rows' that are blank, 'lines' that are told


def sheet_blocks(sections: Sequence[Section], width: int, marks: Glyphs, at: tuple[str, int]) -> list[Block]:
    """Blocks of a sheet; `at` is the key of the record and the place of the cell under the cursor."""
    blocks: list[Block] = []
    for number, section in enumerate(sections):
        places, columns, widths = laid_out(section, width, marks)
        heads = [Span(marks.plain(column.heading), "dim" if i else "head") for i, column in enumerate(columns)]
        rows: list[Row] = [(Span(""),)] if number else []
        if any(column.heading for column in columns):
            rows += record_rows(heads, widths, columns, GAP)
        if section.note:
            rows += paragraph(marks.plain(section.note), width, section.note_tone)
        blocks.append(Block(tuple(rows)))
        for record in section.records:
            blocks.append(_record_block(record, places, columns, widths, width, marks, at))
    return blocks


def laid_out(section: Section, width: int, marks: Glyphs) -> tuple[list[int], list[Column], list[int]]:
    """Places of the columns a section shows at a width, the columns, and how wide each is."""
    cells = [[Span(marks.plain(cell.text)) for cell in record.cells] for record in section.records]
    places = columns_kept(section.columns, cells, width, GAP)
    columns = [section.columns[i] for i in places]
    return places, columns, column_widths(columns, [[row[i] for i in places] for row in cells], width, GAP)


def _record_block(record: Record, places, columns, widths, width: int, marks: Glyphs, at) -> Block:
    spans = []
    for i in places:
        cell = record.cells[i]
        tone = f"{cell.tone} cell" if (record.key, i) == at and cell.path else cell.tone
        spans.append(Span(marks.plain(cell.text), tone))
    rows = record_rows(spans, widths, columns, GAP)
    if record.note:
        rows += paragraph(marks.plain(record.note), width, record.note_tone, indent=2)
    return Block(tuple(rows), record.key)


class Sheet(Lines):
    """Sections with a cursor on a cell."""

    HELP = say("widgets", "sheet")
    BINDINGS: ClassVar = [
        Binding("enter", "choose", "Edit", id="sheet.edit"),
        Binding("left", "side(-1)", "Cell left", show=False, id="sheet.left"),
        Binding("right", "side(1)", "Cell right", show=False, id="sheet.right"),
    ]

    def __init__(self, marks: Glyphs, **kwargs):
        super().__init__(gutter=marks.cursor, **kwargs)
        self.marks = marks
        self.sections: tuple[Section, ...] = ()
        self.intro = self.warning = self.short = ""
        self._side = 0  # among the editable cells of the record

    def fill(self, sections: Sequence[Section], intro: str = "", warning: str = "", short: str = "") -> None:
        """New content; the cursor stays on its cell, or goes to another cell of the same value.

        A warning takes the place of the introduction and stays in sight; its short form where it would
        take more than half of the rows.
        """
        path = self.cell.path if self.cell else ""
        key = self.key
        self.sections = tuple(sections)
        self.intro, self.warning, self.short = intro, warning, short
        self.show(self._build)
        if path and key not in self.keys:
            self.go_to(path)

    def _build(self, width: int):
        words, tone = (self.warning, "bad") if self.warning else (self.intro, "dim")
        head = paragraph(self.marks.plain(words), width, tone) if words else []
        if self.warning and self.short and 2 * len(head) > max(1, self.size.height):
            head = paragraph(self.marks.plain(self.short), width, tone)
        if not self.warning and 4 * len(head) > self.size.height > 0:
            head = []  # an introduction that takes more than a quarter of a low window is in the way
        return head, sheet_blocks(self.sections, width, self.marks, self.at)

    def cursor_changed(self) -> None:
        """The cell under the cursor is drawn apart, so the rows are built again."""
        self.lay_out_again()

    @property
    def record(self) -> Record | None:
        """The record under the cursor."""
        found = (record for section in self.sections for record in section.records)
        return next((record for record in found if record.key and record.key == self.key), None)

    @property
    def section(self) -> Section | None:
        """The section under the cursor."""
        return next((s for s in self.sections if any(r.key and r.key == self.key for r in s.records)), None)

    @property
    def at(self) -> tuple[str, int]:
        """Record key and cell place under the cursor."""
        record = self.record
        if record is None or not record.editable:
            return (self.key, -1)
        return (self.key, record.editable[min(self._side, len(record.editable) - 1)])

    @property
    def cell(self) -> Cell | None:
        """The editable cell under the cursor."""
        record, place = self.record, self.at[1]
        return record.cells[place] if record and place >= 0 else None

    @property
    def column_name(self) -> str:
        """Heading of the column under the cursor."""
        place = self.at[1]
        for section in self.sections:
            if self.record in section.records and place > 0:
                return section.columns[place].heading
        return ""

    def go_to(self, path: str) -> bool:
        """Put the cursor on the cell of a path, or on the first cell below it."""
        for exact in (True, False):
            for section in self.sections:
                for record in section.records:
                    for side, place in enumerate(record.editable):
                        known = record.cells[place].path
                        if known == path if exact else known.startswith(path) or path.startswith(known + "."):
                            self._side = side
                            self.move_to(record.key)
                            self.lay_out_again()
                            return True
        return False

    def check_action(self, action: str, parameters: tuple) -> bool | None:
        """Enter is no key where there is nothing to edit."""
        return action != "choose" or self.record is None or self.cell is not None

    def action_side(self, by: int) -> None:
        record = self.record
        if record and record.editable:
            last = len(record.editable) - 1
            self._side = min(last, max(0, min(self._side, last) + by))
            self.lay_out_again()
            self.post_message(self.Moved(self, self.key))

    def on_click(self, event: events.Click) -> None:
        event.prevent_default()  # the list's own click knows no cells
        before, record = self.key, None
        at = event.y - len(self._head) + self._top
        if event.y >= len(self._head) and 0 <= at < len(self._flat):
            key = self._blocks[self._flat[at][0]].key
            record = next((r for s in self.sections for r in s.records if r.key == key), None)
        if record is None:
            return
        side = self._side_at(record, event.x - columns_of(self.marks.cursor))
        same = record.key == before and side == self._side
        self._side = side
        if same:
            self.action_choose()
        else:
            self.move_to(record.key)
            self.lay_out_again()
            self.post_message(self.Moved(self, self.key))

    def _side_at(self, record: Record, x: int) -> int:
        """Which editable cell of a record lies nearest to a column of the screen."""
        section = next(s for s in self.sections if record in s.records)
        places, _, widths = laid_out(section, max(1, self.size.width - 1), self.marks)
        starts = {place: sum(widths[:i]) + GAP * i for i, place in enumerate(places)}
        return max((side for side, place in enumerate(record.editable) if starts[place] <= x), default=0)
