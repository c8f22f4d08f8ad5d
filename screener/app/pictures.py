"""Gap bars: every finding against one limit post in one column.

The length of a bar is the room used, so right of the post is always bad, for
maximum, minimum and keep-out limits alike. Rows that cannot be told show
question marks and rows that do not apply show dots: an empty bar never looks
like a good one.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from screener.app.glyphs import Glyphs
from screener.app.rows import Row, Span, columns_of, pad, wrap
from screener.app.words import say

POST_SHARE = 0.77  # place of the post along the bar: leaves room for 1.3 times the limit
LEAST_BAR = 14
NARROWEST = 50  # below this the words take all the room and no bar is drawn


@dataclass(frozen=True)
class Gap:
    """One finding as the picture needs it: words, and room used as plain numbers."""

    verdict: str
    mark: str
    title: str
    used: float | None  # 0 at the reference, 1 at the limit
    low: float | None  # low end of the range, on the same scale
    high: float | None
    margin: str  # in its own unit, or words when there is none
    limit: str  # '76.0 kPa max, L1'


def cells(used: float, post: int, width: int) -> int:
    """Cells from the left that a value fills.

    Rounding never carries a value over the post: below 1 it stays left of it,
    from 1 on it shows at least one cell to the right of it.
    """
    if used < 1.0:
        return min(post, max(0, round(used * post)))
    return min(width, post + 1 + max(1, round((used - 1.0) * post)))


def bar(gap: Gap, width: int, marks: Glyphs) -> Row:
    """One bar with its post, as a row exactly `width` columns wide."""
    post = round(width * POST_SHARE)
    if gap.verdict in ("unknown", "skipped") or gap.used is None:
        return _no_bar(gap, post, width, marks)
    low = gap.used if gap.low is None else min(gap.low, gap.used)
    high = gap.used if gap.high is None else max(gap.high, gap.used)
    start, best, end = (cells(value, post, width) for value in (low, gap.used, high))
    best = max(best, 1)
    text = [" "] * width
    text[:best] = marks.fill * best
    if gap.low is not None and start < best:
        text[start:best] = marks.fill_range * (best - start)
    if end > best:
        text[best:end] = marks.thin * (end - best)
        text[end - 1] = marks.thin_end
    text[post] = marks.post_crossed if low < 1.0 <= high else marks.post
    if cells(high, post, 10 * width) > width:
        text[-1] = marks.more_right
    if gap.used < 0.0:
        text[0] = marks.more_left
    line = "".join(text)
    tone = gap.verdict if gap.verdict in ("beyond", "near") else ""
    return (Span(line[:post], tone), Span(line[post], "bold"), Span(line[post + 1 :], tone))


def _no_bar(gap: Gap, post: int, width: int, marks: Glyphs) -> Row:
    """A row without a number: question marks or dots up to the post."""
    mark, tone = (marks.skipped, "dim") if gap.verdict == "skipped" else (marks.unknown, "unknown")
    if gap.verdict not in ("unknown", "skipped"):
        mark, tone = marks.more_left + marks.more_right, "dim"
        words = wrap(say("findings", "no_scale"), post)[0]
        return (Span(pad(words, post), tone), Span(marks.post, "bold"), Span(" " * (width - post - 1)))
    dotted = "".join(mark if i % 4 == 0 else " " for i in range(post))
    return (Span(dotted, tone), Span(marks.post, "bold"), Span(" " * (width - post - 1)))


def gap_bars(gaps: Sequence[Gap], width: int, marks: Glyphs) -> tuple[Row, list[list[Row]]]:
    """Heading row and one block of rows per finding, in the order given.

    Titles and limits wrap when there is no room; the limit column appears
    only where every bar keeps at least 30 columns.
    """
    margins = [marks.plain(gap.margin) for gap in gaps]
    verdict_width = max([9, *(columns_of(f"{gap.mark} {gap.verdict}") for gap in gaps)])
    most_margin = 16 if width >= 70 else 10 if width >= NARROWEST else 8
    margin_width = max([6, *(columns_of(line) for margin in margins for line in wrap(margin, most_margin))])
    titles = [marks.plain(gap.title) for gap in gaps]
    limits = [marks.plain(gap.limit) for gap in gaps]
    least_bar = LEAST_BAR if width >= 70 else 8 if width >= NARROWEST else 0
    free = width - verdict_width - margin_width - 5  # shared by title and bar
    title_width = min(max([5, *map(columns_of, titles)]), max(8, free - (max(least_bar, free // 3) if least_bar else 0)))
    limit_width = max([5, *map(columns_of, limits)])
    left = free - title_width
    with_limit = left - limit_width - 2 >= 30
    bar_width = max(least_bar, left - (limit_width + 2 if with_limit else 0))
    if not least_bar:
        bar_width = 0
    post = round(bar_width * POST_SHARE)
    head = "room used"
    heading = pad(head, post - 2) + "limit" if post >= len(head) + 3 else "limit" if bar_width else ""
    names = [pad("verdict", verdict_width), " ", pad("check", title_width), "  ", pad(heading, bar_width), "  "]
    names.append(pad("margin", margin_width, "right"))
    if with_limit:
        names += ["  ", "limit, source"]
    blocks = []
    for gap, title, margin, limit in zip(gaps, titles, margins, limits):
        blocks.append(
            _block(gap, (title, margin, limit), (verdict_width, title_width, bar_width, margin_width), marks, with_limit)
        )
    return (Span("".join(names), "dim"),), blocks


def _block(gap, texts, widths, marks, with_limit) -> list[Row]:
    title, margin, limit = texts
    verdict_width, title_width, bar_width, margin_width = widths
    tone = gap.verdict if gap.verdict in ("beyond", "near", "unknown") else "dim" if gap.verdict == "skipped" else ""
    title_lines, margin_lines = wrap(title, title_width), wrap(margin, margin_width)
    mark = marks.room if gap.verdict == "room" else gap.mark
    rows = []
    for line in range(max(len(title_lines), len(margin_lines))):
        first = line == 0
        spans = [
            Span(pad(f"{mark} {gap.verdict}" if first else "", verdict_width), tone),
            Span(" "),
            Span(pad(title_lines[line] if line < len(title_lines) else "", title_width), "dim" if tone == "dim" else ""),
            Span("  "),
            *(bar(gap, bar_width, marks) if first and bar_width else (Span(" " * bar_width),)),
            Span("  "),
            Span(pad(margin_lines[line] if line < len(margin_lines) else "", margin_width, "right"), tone),
        ]
        if with_limit and first:
            spans += [Span("  "), Span(limit, "dim")]
        rows.append(tuple(spans))
    return rows


def tally(verdicts: Sequence[str], marks: Glyphs) -> Row:
    """The verdict strip: how many of each, worst first, unknown before near."""
    spans = []
    for verdict, mark in (("beyond", "!"), ("unknown", "?"), ("near", "~"), ("room", marks.room), ("skipped", "-")):
        count = sum(1 for item in verdicts if item == verdict)
        tone = {"beyond": "beyond", "unknown": "unknown", "near": "near", "skipped": "dim"}.get(verdict, "")
        spans.append(Span(f"{mark} {count} {verdict}", tone if count else "dim"))
    return tuple(spans)
