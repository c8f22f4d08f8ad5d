"""A memo document as rows of text at any width. Plain Python, no screen.

Tables that do not fit side by side are printed record by record, so that no
column is squeezed until its words fall apart.
"""

from __future__ import annotations

from screener.app.glyphs import Glyphs
from screener.app.rows import (
    Column,
    Row,
    Span,
    column_widths,
    columns_of,
    labelled,
    paragraph,
    record_rows,
    wrap,
)

_BLANK: Row = (Span(""),)


def document_rows(document, width: int, marks: Glyphs) -> list[Row]:
    """The whole document: title, control block, numbered sections."""
    rows = paragraph(marks.plain(document.title), width, "head") + [_BLANK]
    # Section 0 repeats the control block; it is printed once.
    shown = () if document.sections and document.sections[0].number == "0" else document.control
    pairs = [(marks.plain(str(name)), marks.plain(str(value))) for name, value in shown]
    column = min(max([columns_of(name) for name, _ in pairs], default=0) + 2, width // 2)
    for name, value in pairs:
        rows += _pair(name, value, width, column)
    for section in document.sections:
        rows += [_BLANK, *paragraph(marks.plain(f"{section.number}  {section.title}"), width, "head")]
        for block in section.blocks:
            rows += [_BLANK, *_block(block, width, marks)]
    return rows


def _pair(name: str, value: str, width: int, column: int) -> list[Row]:
    """A name and a value in two columns; a name wider than its column gets lines of its own."""
    if columns_of(name) < column:
        return labelled(name, value, width, column)
    return paragraph(name, width, "dim") + paragraph(value, width, indent=2)


def _block(block, width: int, marks: Glyphs) -> list[Row]:
    kind = type(block).__name__
    return _PAINTERS[kind](block, width, marks)


def _paragraph(block, width: int, marks: Glyphs) -> list[Row]:
    tone = {"plain": "", "caution": "bold", "note": "dim"}[block.kind]
    return paragraph(marks.plain(block.text), width, tone)


def _bullets(block, width: int, marks: Glyphs) -> list[Row]:
    rows: list[Row] = []
    for item in block.items:
        lines = wrap(marks.plain(item), width - 2)
        rows += [(Span(f"{'- ' if i == 0 else '  '}{line}"),) for i, line in enumerate(lines)]
    return rows


def _verdicts(block, width: int, marks: Glyphs) -> list[Row]:
    rows: list[Row] = []
    for row in block.rows:
        mark = marks.room if row.verdict == "room" else row.mark
        tone = row.verdict if row.verdict in ("beyond", "near", "unknown") else ""
        rows.append((Span(f"{mark} {row.verdict:<8}", tone), *paragraph(marks.plain(row.title), width - 10, "bold")[0]))
        rows += [
            (Span(" " * 10), *line) for line in paragraph(marks.plain(row.title), width - 10, "bold")[1:]
        ]
        rows += [(Span(" " * 10), *line) for line in paragraph(marks.plain(row.sentence), width - 10)]
    return rows


def _table(block, width: int, marks: Glyphs) -> list[Row]:
    rows = paragraph(marks.plain(block.title), width, "bold") if block.title else []
    align = block.align or ("left",) * len(block.columns)
    columns = [Column(marks.plain(name), side, least=8) for name, side in zip(block.columns, align)]
    records = [[Span(marks.plain(str(cell))) for cell in row] for row in block.rows]
    least = sum(
        min(column.least, max([columns_of(column.heading), *(columns_of(r[i].text) for r in records)]))
        for i, column in enumerate(columns)
    )
    narrowest = 14 * len(columns)
    if least + 2 * (len(columns) - 1) > width or (len(columns) > 4 and narrowest > width):
        return rows + _records(columns, records, width) + _note(block, width, marks)
    widths = column_widths(columns, records, width, 2)
    if any(column.heading for column in columns):
        rows += record_rows([Span(column.heading, "dim") for column in columns], widths, columns)
    for record in records:
        rows += record_rows(record, widths, columns)
    return rows + _note(block, width, marks)


def _records(columns, records, width: int) -> list[Row]:
    """Each record as name and value lines."""
    column = min(max(columns_of(c.heading) for c in columns) + 2, width // 3)
    rows: list[Row] = []
    for i, record in enumerate(records):
        if i:
            rows.append(_BLANK)
        for head, cell in zip(columns, record):
            if cell.text:
                rows += _pair(head.heading, cell.text, width, column)
    return rows


def _note(block, width: int, marks: Glyphs) -> list[Row]:
    return paragraph(marks.plain(block.note), width, "dim") if block.note else []


def _equation(block, width: int, marks: Glyphs) -> list[Row]:
    rows = paragraph(marks.plain(block.symbols), width, "bold", indent=2)
    rows += paragraph(marks.plain(f"= {block.numbers}"), width, indent=4)
    rows += paragraph(marks.plain(f"= {block.result}"), width, indent=4)
    return rows + (paragraph(marks.plain(block.note), width, "dim", indent=2) if block.note else [])


def _figure(block, width: int, marks: Glyphs) -> list[Row]:
    rows = paragraph(marks.plain(block.title), width, "bold")
    rows += _table(block.table, width, marks)
    return rows + paragraph(marks.plain(block.caption), width, "dim")


def _verbatim(block, width: int, marks: Glyphs) -> list[Row]:
    rows: list[Row] = []
    for line in block.text.splitlines():
        indent = len(line) - len(line.lstrip())
        rows += paragraph(line, width, "", indent=min(indent, width // 3))
    return rows


_PAINTERS = {
    "Paragraph": _paragraph,
    "Bullets": _bullets,
    "Verdicts": _verdicts,
    "Table": _table,
    "Equation": _equation,
    "Figure": _figure,
    "Verbatim": _verbatim,
}
