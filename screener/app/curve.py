"""Vapour pressure against temperature, with the site's range behind it.

A small renderer of our own: curve dots are foreground, the range is
background, so neither punches holes in the other. Labels stand beside their
lines instead of in a legend box.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, field
from itertools import pairwise

from screener.app.glyphs import Glyphs
from screener.app.rows import Row, Span, columns_of, pad, paragraph
from screener.app.words import say

_BRAILLE = ((0x01, 0x08), (0x02, 0x10), (0x04, 0x20), (0x40, 0x80))  # dot bits by row and column of a cell
_HALF = {1: "▀", 2: "▄", 3: "█"}
# Dots drawn and left out along a line, so that lines differ without colour.
PATTERNS = {"solid": (1, 0), "dashed": (6, 5), "dotted": (2, 4)}


@dataclass(frozen=True)
class Line:
    """One curve in the units of the axes; None breaks the line."""

    label: str
    x: Sequence[float | None]
    y: Sequence[float | None]
    pattern: str = "solid"


@dataclass(frozen=True)
class Plot:
    """Everything the picture shows, in the units of its axes."""

    title: str
    lines: tuple[Line, ...]
    x_range: tuple[float, float]
    y_range: tuple[float, float]
    band: tuple[float, float, str] | None = None  # from, to, label
    limits: tuple[tuple[float, str], ...] = ()  # value, label
    notes: tuple[str, ...] = field(default=())


def nice_step(span: float, most: int) -> float:
    """A step of 1, 2 or 5 times a power of ten that cuts span into at most `most` parts."""
    raw = span / max(1, most)
    power = 10.0 ** math.floor(math.log10(raw))
    return next(power * factor for factor in (1.0, 2.0, 5.0, 10.0) if power * factor >= raw * (1.0 - 1e-9))


def ticks(low: float, high: float, most: int) -> list[float]:
    """Round values inside an axis."""
    step = nice_step(high - low, most)
    first = math.ceil(low / step - 1e-9)
    return [k * step for k in range(first, math.floor(high / step + 1e-9) + 1)]


class _Canvas:
    """Dots of one line at the resolution of the glyph set, and text cells above them."""

    def __init__(self, width: int, height: int, kind: str):
        self.width, self.height, self.kind = width, height, kind
        self.across, self.down = {"braille": (2, 4), "half": (1, 2), "star": (1, 1)}[kind]
        self.bits = [[0] * width for _ in range(height)]

    def dot(self, x: int, y: int) -> None:
        """Set a dot, counted from the top left corner."""
        column, row = x // self.across, y // self.down
        if 0 <= column < self.width and 0 <= row < self.height:
            if self.kind == "braille":
                self.bits[row][column] |= _BRAILLE[y % 4][x % 2]
            else:
                self.bits[row][column] |= 1 << (y % self.down)

    def mark(self, column: int, row: int) -> str:
        """The character of one cell; empty when no dot is set."""
        bits = self.bits[row][column]
        if not bits:
            return ""
        return chr(0x2800 + bits) if self.kind == "braille" else _HALF[bits] if self.kind == "half" else "*"


def _trace(canvas: _Canvas, line: Line, plot: Plot) -> tuple[int, int] | None:
    """Draw one line; the last cell it touches (column, row) is returned."""
    wide, tall = canvas.width * canvas.across, canvas.height * canvas.down
    (x0, x1), (y0, y1) = plot.x_range, plot.y_range
    on, off = PATTERNS[line.pattern]
    points = [(x, y) for x, y in zip(line.x, line.y) if x is not None and y is not None]
    drawn, last, previous = 0, None, None
    for i in range(wide):
        x = x0 + (x1 - x0) * i / (wide - 1)
        y = _between(points, x)
        if y is None or not y0 <= y <= y1:
            previous = None
            continue
        j = round((y1 - y) / (y1 - y0) * (tall - 1))
        steps = [j] if previous is None else list(range(previous, j, 1 if j > previous else -1))[1:] + [j]
        for step in steps:
            if drawn % (on + off) < on:
                canvas.dot(i, step)
            drawn += 1
        previous, last = j, (i // canvas.across, j // canvas.down)
    return last


def _between(points, x: float) -> float | None:
    """Straight-line value at x; None outside the points."""
    for (xa, ya), (xb, yb) in pairwise(points):
        if xa <= x <= xb:
            return ya if xb == xa else ya + (yb - ya) * (x - xa) / (xb - xa)
    return None


def draw(plot: Plot, width: int, height: int, marks: Glyphs) -> list[Row]:
    """The picture as `height` rows of `width` columns: title, plot, axis, numbers."""
    rows = paragraph(marks.plain(plot.title), width, "dim")
    tall = height - len(rows) - 2
    y_ticks = ticks(*plot.y_range, most=max(1, tall // 3))
    numbers = [f"{value:g}" for value in y_ticks]
    left = max(map(len, numbers)) + 1
    inner = width - left - 1
    if inner < 20 or tall < 3:
        return [(Span(marks.plain(say("curve", "small")), "dim"),)]
    cells = [[[" ", ""] for _ in range(inner)] for _ in range(tall)]
    ends = _paint(cells, plot, inner, tall, marks)
    for (column, row), label in ends:
        _label(cells, marks.plain(label), column, row)
    places = {_row_of(value, plot, tall): number for value, number in zip(y_ticks, numbers)}
    for row in range(tall):
        number = places.get(row)
        lead = pad(number or "", left - 1, "right") + " " + (marks.axis_tick if number else marks.axis)
        rows.append((Span(lead, "dim"), *_merge(cells[row])))
    return rows + _x_axis(plot, left, inner, marks)


def _row_of(value: float, plot: Plot, tall: int) -> int:
    low, high = plot.y_range
    return min(tall - 1, max(0, round((high - value) / (high - low) * (tall - 1))))


def _column_of(value: float, plot: Plot, inner: int) -> int:
    low, high = plot.x_range
    return round((value - low) / (high - low) * (inner - 1))


def _paint(cells, plot: Plot, inner: int, tall: int, marks: Glyphs):
    """Fill the cells: band, limits, curves, in this order; where every line ends is returned."""
    if plot.band:
        low, high = (_column_of(v, plot, inner) for v in plot.band[:2])
        for row in range(tall):
            for column in range(max(0, low), min(inner, high + 1)):
                cells[row][column][1] = "band"
            for column in {low, high} & set(range(inner)):
                cells[row][column] = [marks.edge, "band dim"]
        _write(cells, 0, max(0, (low + high - len(plot.band[2])) // 2), marks.plain(plot.band[2]), "dim")
    for value, label in plot.limits:
        row = _row_of(value, plot, tall)
        for column in range(inner):
            if cells[row][column][0] == " ":
                cells[row][column][0] = marks.dash
    ends = []
    for line in plot.lines:
        canvas = _Canvas(inner, tall, marks.dots)
        last = _trace(canvas, line, plot)
        for row in range(tall):
            for column in range(inner):
                if mark := canvas.mark(column, row):
                    under = "band" if "band" in cells[row][column][1] else ""
                    old = cells[row][column][0]
                    if marks.dots == "braille" and "\u2800" < old <= "\u28ff":
                        mark = chr(ord(old) | ord(mark))
                    cells[row][column] = [mark, f"curve {under}".strip()]
        if last:
            ends.append((last, line.label))
    for value, label in plot.limits:
        _limit_label(cells, _row_of(value, plot, tall), f" {marks.plain(label)} ", marks)
    return ends


def _limit_label(cells, row: int, text: str, marks: Glyphs) -> None:
    """Put the number of a limit on its line, at the first place from the left that no curve takes."""
    size, free = columns_of(text), (marks.dash, " ", marks.edge)
    starts = range(1, len(cells[row]) - size)
    place = next((s for s in starts if all(mark in free for mark, _ in cells[row][s : s + size])), 1)
    _write(cells, row, place, text, "bold")


def _write(cells, row: int, column: int, text: str, tone: str) -> None:
    """Put text over the cells; what lies under it keeps its background."""
    for i, mark in enumerate(text):
        if 0 <= column + i < len(cells[row]):
            under = "band" if "band" in cells[row][column + i][1] else ""
            cells[row][column + i] = [mark, f"{tone} {under}".strip()]


def _label(cells, text: str, column: int, row: int) -> None:
    """Put a label near the end of its line, where it covers least; below the line rather than above."""
    size, inner, best = columns_of(text), len(cells[0]), None
    for away in (1, 2, 3, -1, -2, -3):
        at = row + away
        for start in range(max(0, min(column + 1, inner) - size), max(-1, column - size - 12), -1):
            if 0 <= at < len(cells):
                around = cells[at][max(0, start - 1) : start + size + 1]
                covered = sum(1 for mark, _ in around if mark != " ")
                cost = 10 * covered + 2 * abs(away) + column - start - size
                if best is None or cost < best[0]:
                    best = (cost, at, start)
    if best:
        _write(cells, best[1], best[2], text, "")


def _merge(cells) -> list[Span]:
    """Neighbouring cells of one tone as one span."""
    spans: list[Span] = []
    for mark, tone in cells:
        if spans and spans[-1].tone == tone:
            spans[-1] = Span(spans[-1].text + mark, tone)
        else:
            spans.append(Span(mark, tone))
    return spans


def _x_axis(plot: Plot, left: int, inner: int, marks: Glyphs) -> list[Row]:
    line = [marks.axis_line] * inner
    numbers = [" "] * (left + 1 + inner)
    for value in ticks(*plot.x_range, most=max(2, inner // 9)):
        column = _column_of(value, plot, inner)
        line[column] = marks.axis_line_tick
        text = f"{value:g}"
        start = min(max(0, left + 1 + column - len(text) // 2), len(numbers) - len(text))
        if all(mark == " " for mark in numbers[max(0, start - 1) : start + len(text) + 1]):
            numbers[start : start + len(text)] = text
    corner = " " * left + marks.axis_corner
    return [(Span(corner + "".join(line), "dim"),), (Span("".join(numbers), "dim"),)]
