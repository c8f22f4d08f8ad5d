"""The document model: what a memo is made of, whatever file it becomes.

Cells hold text, or a `Quantity` or `Span` (SI values beside the printed text). Writers
print the text; the JSON writer keeps both. Nothing here knows physics.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import Literal

from screener.memo.numbers import Quantity, Span

Cell = str | Quantity | Span
Align = Literal["left", "right"]


@dataclass(frozen=True)
class Paragraph:
    """One paragraph; `kind` tells a writer how to set it apart."""

    text: str
    kind: Literal["plain", "caution", "note"] = "plain"


@dataclass(frozen=True)
class Bullets:
    """A list of short lines."""

    items: tuple[str, ...]


@dataclass(frozen=True)
class Table:
    """A table with a header row."""

    columns: tuple[str, ...]
    rows: tuple[tuple[Cell, ...], ...]
    align: tuple[Align, ...] = ()  # empty: all left
    title: str = ""
    note: str = ""


@dataclass(frozen=True)
class VerdictRow:
    """One finding in one line."""

    mark: str
    verdict: str
    id: str
    title: str
    sentence: str


@dataclass(frozen=True)
class Verdicts:
    """Verdict rows, worst first."""

    rows: tuple[VerdictRow, ...]


@dataclass(frozen=True)
class Equation:
    """A governing equation, the same with numbers put in, and what it gives."""

    symbols: str
    numbers: str
    result: Cell
    note: str = ""


@dataclass(frozen=True)
class Axis:
    """Axis of a figure; values of the series stay in the SI unit."""

    title: str
    unit: str
    shown_unit: str


@dataclass(frozen=True)
class Series:
    """One line of a figure, in SI; None where no value exists."""

    name: str
    x: tuple[float | None, ...]
    y: tuple[float | None, ...]


@dataclass(frozen=True)
class Mark:
    """A limit line (high is None) or a band of a figure, in SI."""

    name: str
    axis: Literal["x", "y"]
    low: float
    high: float | None = None


@dataclass(frozen=True)
class Figure:
    """A figure as data, with the table that stands for it where nothing is drawn."""

    id: str
    title: str
    caption: str
    x_axis: Axis
    y_axis: Axis
    series: tuple[Series, ...]
    marks: tuple[Mark, ...]
    table: Table


@dataclass(frozen=True)
class Verbatim:
    """Text kept letter for letter."""

    text: str


Block = Paragraph | Bullets | Table | Verdicts | Equation | Figure | Verbatim


@dataclass(frozen=True)
class Section:
    """A numbered part of the document; '0' to '14' and 'A' in a memo."""

    number: str
    title: str
    blocks: tuple[Block, ...]


@dataclass(frozen=True)
class Document:
    """A whole memo or field sheet."""

    kind: Literal["memo", "field sheet"]
    title: str
    running_head: str  # repeated on every page by writers that have pages
    control: tuple[tuple[str, Cell], ...]
    sections: tuple[Section, ...]
    language: str = field(default="en-GB")
