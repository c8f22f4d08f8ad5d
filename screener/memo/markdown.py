"""A document as Markdown with pipe tables. Knows blocks and characters, no physics.

Every text is escaped, so that markup typed into a title or a note stays plain
text. Tables are padded, which keeps the file readable without a renderer.
"""

from __future__ import annotations

import re

from screener.memo.document import (
    Bullets,
    Document,
    Equation,
    Figure,
    Paragraph,
    Section,
    Table,
    Verbatim,
    Verdicts,
)
from screener.memo.text import columns_of, plain

_ALWAYS = re.compile(r"([\\`*\[\]~|$])")
_UNDERSCORE = re.compile(r"(?<![0-9A-Za-z])_|_(?![0-9A-Za-z])")
_LINE_START = re.compile(r"^([-+#=]|\d+(?=[.)]))")
_LINK = re.compile(r"://|\bwww\.|@", re.IGNORECASE)
_LINK_PARTS = {"://": "&#58;//", "www.": "www&#46;", "@": "&#64;"}  # addresses do not become links
_WIDEST_PADDED = 40  # columns wider than this are not padded; their lines would grow past reading
_VERDICT_COLUMNS = ("verdict", "finding", "in one sentence")


def write_markdown(document: Document) -> str:
    """The document as Markdown; same document, same bytes."""
    lines = [f"# {escaped(document.title)}", "", f"*{escaped(document.running_head)}*", ""]
    for section in document.sections:
        lines += _section(section)
    return "\n".join(lines).rstrip() + "\n"


def escaped(text: object) -> str:
    """Text in which every character that Markdown or HTML would act on inside a line is inert."""
    line = plain(text).replace("&", "&amp;")
    line = _ALWAYS.sub(r"\\\1", line).replace("<", "&lt;").replace(">", "&gt;")
    return _LINK.sub(lambda found: _LINK_PARTS[found[0].lower()], _UNDERSCORE.sub(r"\\_", line))


def _opening(text: object) -> str:
    """Escaped text that also starts a line: no list, heading or rule begins here."""
    return _LINE_START.sub(
        lambda found: found[1] + "\\" if found[1].isdigit() else "\\" + found[1], escaped(text)
    )


def _section(section: Section) -> list[str]:
    number = f"{section.number}. " if section.number else ""
    lines = [f"## {number}{escaped(section.title)}", ""]
    for block in section.blocks:
        lines += [*_WRITERS[type(block)](block), ""]
    return lines


def _paragraph(block: Paragraph) -> list[str]:
    text = _opening(block.text)
    if block.kind == "caution":
        return [f"> **{text}**"]
    return [f"*{text}*"] if block.kind == "note" else [text]


def _bullets(block: Bullets) -> list[str]:
    return [f"- {_opening(item)}" for item in block.items]


def _table(block: Table) -> list[str]:
    lines = [f"**{escaped(block.title)}**", ""] if block.title else []
    lines += _grid(block.columns, block.rows, block.align)
    return lines + (["", f"*{escaped(block.note)}*"] if block.note else [])


def _grid(columns, rows, align) -> list[str]:
    align = align or ("left",) * len(columns)
    table = [[escaped(cell) for cell in row] for row in (columns, *rows)]
    widths = [
        min(_WIDEST_PADDED, max(3, *(columns_of(row[i]) for row in table))) for i in range(len(columns))
    ]
    rule = ["-" * (width - 1) + ":" if side == "right" else "-" * width for width, side in zip(widths, align)]
    lines = [_row(table[0], widths, align), f"| {' | '.join(rule)} |"]
    return lines + [_row(row, widths, align) for row in table[1:]]


def _row(cells, widths, align) -> str:
    padded = []
    for cell, width, side in zip(cells, widths, align):
        space = " " * (width - columns_of(cell))
        padded.append(space + cell if side == "right" else cell + space)
    return f"| {' | '.join(padded)} |"


def _verdicts(block: Verdicts) -> list[str]:
    rows = [(f"{row.mark} {row.verdict}", row.title, row.sentence) for row in block.rows]
    return _grid(_VERDICT_COLUMNS, rows, ())


def _equation(block: Equation) -> list[str]:
    body = f"{plain(block.symbols)}\n    = {plain(block.numbers)}\n    = {plain(block.result)}"
    return _fenced(body) + (["", f"*{escaped(block.note)}*"] if block.note else [])


def _figure(block: Figure) -> list[str]:
    return [f"**{escaped(block.title)}**", "", *_table(block.table), "", f"*{escaped(block.caption)}*"]


def _verbatim(block: Verbatim) -> list[str]:
    return _fenced(block.text)


def _fenced(text: str) -> list[str]:
    """Code block whose fence is longer than any run of backticks inside."""
    longest = max((len(run) for run in re.findall(r"`+", text)), default=0)
    fence = "`" * max(3, longest + 1)
    return [fence, *text.splitlines(), fence]


_WRITERS = {
    Paragraph: _paragraph,
    Bullets: _bullets,
    Table: _table,
    Verdicts: _verdicts,
    Equation: _equation,
    Figure: _figure,
    Verbatim: _verbatim,
}
