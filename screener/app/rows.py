"""Rows of text segments: the plain material of every table and picture.

A span is a text with a tone; a row is a tuple of spans; a block is the rows
that belong to one record. Tones are words such as 'dim' or 'beyond', several
separated by spaces; the widgets turn them into styles. Nothing here knows of
Textual, so that every layout can be tested at every width.

Text is wrapped, never cut.
"""

from __future__ import annotations

import unicodedata
from collections.abc import Sequence
from dataclasses import dataclass
from typing import NamedTuple


class Span(NamedTuple):
    """A piece of text in one tone."""

    text: str
    tone: str = ""


Row = tuple[Span, ...]


def columns_of(text: str) -> int:
    """Terminal columns a text takes."""
    if text.isascii():
        return len(text)
    return sum(
        0 if unicodedata.combining(mark) else 2 if unicodedata.east_asian_width(mark) in "WF" else 1 for mark in text
    )


def row_width(row: Row) -> int:
    """Terminal columns a row takes."""
    return sum(columns_of(span.text) for span in row)


def text_of(row: Row) -> str:
    """The row without its tones."""
    return "".join(span.text for span in row)


def pad(text: str, width: int, align: str = "left") -> str:
    """Text filled with blanks up to a width; longer text is returned whole."""
    gap = max(0, width - columns_of(text))
    return " " * gap + text if align == "right" else text + " " * gap


def _pieces(word: str, width: int) -> list[str]:
    """A word longer than a line in pieces, broken after . _ / , - where possible."""
    pieces = []
    while columns_of(word) > width:
        take, used = 0, 0
        while take < len(word) and used + columns_of(word[take]) <= width:
            used += columns_of(word[take])
            take += 1
        take = max(take, 1)
        soft = max(word.rfind(mark, 0, take) for mark in "._/,-")
        if soft > take // 2:
            take = soft + 1
        pieces.append(word[:take])
        word = word[take:]
    return [*pieces, word]


def wrap(text: str, width: int) -> list[str]:
    """Lines no wider than width that together hold every word of the text."""
    width = max(1, width)
    lines: list[str] = []
    for paragraph in text.split("\n"):
        line = ""
        for word in paragraph.split():
            for piece in _pieces(word, width):
                if not line:
                    line = piece
                elif columns_of(line) + 1 + columns_of(piece) <= width:
                    line = f"{line} {piece}"
                else:
                    lines.append(line)
                    line = piece
        lines.append(line)
    return lines


def paragraph(text: str, width: int, tone: str = "", indent: int = 0) -> list[Row]:
    """Wrapped text as rows, every row indented."""
    lead = " " * indent
    return [(Span(lead + line, tone),) for line in wrap(text, width - indent)]


def labelled(label: str, text: str, width: int, column: int, tone: str = "") -> list[Row]:
    """A label in its own column and a wrapped text beside it."""
    lines = wrap(text, width - column)
    first = (Span(pad(label, column), "dim"), Span(lines[0], tone))
    return [first, *((Span(" " * column), Span(line, tone)) for line in lines[1:])]


def one_line(parts: list[str], width: int) -> str:
    """The first part and as many more as fit whole on one line; the rest is a key press (F1) away."""
    line = parts[0] if parts else ""
    for part in dict.fromkeys(parts[1:]):
        if columns_of(f"{line} · {part}") <= width:
            line = f"{line} · {part}"
    return line


def flow(spans: Sequence[Span], width: int, gap: int) -> list[Row]:
    """Spans side by side, as many to a row as fit whole."""
    rows: list[list[Span]] = [[]]
    used = 0
    for span in spans:
        size = columns_of(span.text)
        if rows[-1] and used + gap + size > width:
            rows.append([])
            used = 0
        if rows[-1]:
            rows[-1].append(Span(" " * gap))
            used += gap
        rows[-1].append(span)
        used += size
    return [tuple(row) for row in rows]


@dataclass(frozen=True)
class Column:
    """A column of a table."""

    heading: str
    align: str = "left"
    least: int = 4  # narrower than this only where the table would not fit otherwise [columns]
    spare: int = 0  # left out where the table does not fit with it, 1 before 2; 0 never


def _wanted(columns: Sequence[Column], records: Sequence[Sequence[Span]]) -> list[int]:
    """Widths of the widest cells."""
    cells = [[columns_of(record[i].text) for record in records] for i in range(len(columns))]
    return [max([columns_of(column.heading), *cells[i]]) for i, column in enumerate(columns)]


def columns_kept(columns: Sequence[Column], records: Sequence[Sequence[Span]], width: int, gap: int) -> list[int]:
    """Places of the columns that a width has room for; spare ones are left out before a cell is squeezed."""
    wanted, places = _wanted(columns, records), list(range(len(columns)))
    for spare in sorted((columns[i].spare, i) for i in places if columns[i].spare):
        if sum(min(wanted[i], columns[i].least) for i in places) + gap * (len(places) - 1) > width:
            places.remove(spare[1])
    return places


def column_widths(columns: Sequence[Column], records: Sequence[Sequence[Span]], width: int, gap: int) -> list[int]:
    """Widths that hold the widest cell, narrowed from the widest column down to fit."""
    wanted = _wanted(columns, records)
    over = sum(wanted) + gap * (len(columns) - 1) - width
    for least in ([column.least for column in columns], [3] * len(columns)):  # the second only where it must be
        while over > 0:
            room = [size if size > least[i] else 0 for i, size in enumerate(wanted)]
            widest = max(range(len(room)), key=room.__getitem__)
            if not room[widest]:
                break
            wanted[widest] -= 1
            over -= 1
    return wanted


def record_rows(cells: Sequence[Span], widths: Sequence[int], columns: Sequence[Column], gap: int = 2) -> list[Row]:
    """One record as one or more rows; every cell wraps inside its column."""
    wrapped = [wrap(cell.text, widths[i]) for i, cell in enumerate(cells)]
    rows = []
    for line in range(max(len(lines) for lines in wrapped)):
        spans = []
        for i, cell in enumerate(cells):
            text = wrapped[i][line] if line < len(wrapped[i]) else ""
            spans.append(Span(pad(text, widths[i], columns[i].align), cell.tone))
            if i + 1 < len(cells):
                spans.append(Span(" " * gap))
        rows.append(tuple(spans))
    return rows
