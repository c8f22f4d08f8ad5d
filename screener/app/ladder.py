"""The vapour ladder: month rows, the fuel share of the vapour space against its flammable range."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

from screener.app.glyphs import Glyphs
from screener.app.rows import Row, Span, paragraph
from screener.app.words import say

NAME_WIDTH = 5
LEAST_BAR = 12
SCALE_OVER_UPPER = 2.0  # the picture reaches to twice the highest upper limit; what lies beyond has an arrow


def ladder(months: Sequence[Mapping], width: int, marks: Glyphs) -> list[Row]:
    """Rows of the picture and, under each month, its state in words.

    months hold month, share_cold, share_hot, LFL and UFL as mole fractions,
    and the words of both states; a month without numbers says so.
    """
    known = [m for m in months if _whole(m)]
    if not known:
        return paragraph(say("ladder", "none"), width, "dim")
    top = SCALE_OVER_UPPER * max(m["UFL"] for m in known)
    bar = max(LEAST_BAR, width - NAME_WIDTH)
    rows = [*paragraph(marks.plain(say("ladder", "title", top=f"{100.0 * top:.0f}")), width, "dim")]
    for month in months:
        name = Span(f"{month['month']:<{NAME_WIDTH}}")
        if not _whole(month):
            rows.append((name, Span(marks.unknown, "dim")))
            continue
        rows.append((name, *_bar(month, top, bar, marks)))
        words = say("ladder", "states", equilibrium=month["equilibrium"], not_saturated=month["not_saturated"])
        rows += [(Span(" " * NAME_WIDTH), *row) for row in paragraph(words, max(1, width - NAME_WIDTH), "dim")]
    return rows


def _whole(month: Mapping) -> bool:
    return all(month.get(key) is not None for key in ("share_cold", "share_hot", "LFL", "UFL"))


def _bar(month: Mapping, top: float, width: int, marks: Glyphs) -> list[Span]:
    """Cells of one month: the flammable range thin, the fuel share full, where both meet hatched."""
    low, high = sorted((month["share_cold"], month["share_hot"]))
    cells = []
    for i in range(width):
        left, right = top * i / width, top * (i + 1) / width
        fuel = right > low and left < max(high, low + top / width)
        burns = right > month["LFL"] and left < month["UFL"]
        cells.append(marks.fill_range if fuel and burns else marks.fill if fuel else marks.thin if burns else " ")
    if high > top:
        cells[-1] = marks.more_right
    return [Span("".join(cells))]
