"""Plain-text tables and paragraphs that fit a width. Text is wrapped, never cut."""

from __future__ import annotations

import textwrap

from screener.memo.text import columns_of, plain

_GAP = "  "
_PROSE = 14  # columns of text are narrowed down to this before numbers are wrapped


def paragraph(text: str, width: int, first: str = "", rest: str | None = None) -> list[str]:
    """Text wrapped to a width, with what stands before the first line and before the others."""
    rest = " " * len(first) if rest is None else rest
    return textwrap.wrap(
        plain(text),
        max(width, len(rest) + 10),
        initial_indent=first,
        subsequent_indent=rest,
        break_on_hyphens=False,
    )


def bullets(items, width: int) -> list[str]:
    """One wrapped line an item."""
    return [line for item in items for line in paragraph(item, width, "  * ")]


def table(head, rows, width: int, align=()) -> list[str]:
    """A table with its head, wrapped to the width; one block a row where even that is too wide."""
    cells = [[plain(cell) for cell in row] for row in (head, *rows)]
    align = tuple(align) or ("left",) * len(head)
    widths = _widths(cells, width, align)
    if widths is None:
        return blocks(cells[0], cells[1:], width)
    lines = [*_wrapped(cells[0], widths, align), _GAP.join("-" * w for w in widths)]
    for row in cells[1:]:
        lines += _wrapped(row, widths, align)
    return lines


def _longest_word(text: str) -> int:
    return max((columns_of(word) for word in text.split()), default=1)


def _widths(cells, width: int, align) -> list[int] | None:
    """Natural widths, narrowed until all fit: prose first, then the widest; None when words would have to be cut."""
    columns = list(zip(*cells))
    widths = [max(1, *(columns_of(cell) for cell in column)) for column in columns]
    least = [max(_longest_word(cell) for cell in column) for column in columns]
    room = width - len(_GAP) * (len(columns) - 1)
    while sum(widths) > room:
        spare = [w - low for w, low in zip(widths, least)]
        if max(spare) <= 0:
            return None
        prose = [side == "left" and w > _PROSE for side, w in zip(align, widths)]
        widths[max(range(len(widths)), key=lambda i: (spare[i] > 0, prose[i], widths[i]))] -= 1
    return widths


def _wrapped(row, widths, align) -> list[str]:
    parts = [textwrap.wrap(cell, w, break_on_hyphens=False) or [""] for cell, w in zip(row, widths)]
    lines = []
    for i in range(max(map(len, parts))):
        texts = [part[i] if i < len(part) else "" for part in parts]
        lines.append(_GAP.join(_padded(t, w, side) for t, w, side in zip(texts, widths, align)).rstrip())
    return lines


def _padded(text: str, width: int, side: str) -> str:
    space = " " * (width - columns_of(text))
    return space + text if side == "right" else text + space


def blocks(head, rows, width: int) -> list[str]:
    """'head: cell' lines, one block a row."""
    lines: list[str] = []
    for row in rows:
        for label, cell in zip(head, row):
            if cell:
                lines += paragraph(f"{label}: {cell}" if label else cell, width, "", "  ")
        lines.append("")
    return lines[:-1]
