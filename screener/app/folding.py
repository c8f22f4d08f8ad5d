"""Folding: rows of a sheet that hold nothing yet, or little, stand behind one row that enter opens. Plain data.

Sections that carry the same name fold together. A row folds only when its maker says so, which it never does of
a value, a fault or a value asked for; the row under the cursor stays until the cursor has left it.
"""

from __future__ import annotations

from collections.abc import Collection, Sequence
from dataclasses import replace
from itertools import groupby

from screener.app.rows import Column
from screener.app.sheet import Cell, Record, Section
from screener.app.words import say

FOLD = "fold:"  # before the name of a fold: key and path of the row that opens it
FEWEST = 2  # rows worth folding; one row behind one row gains nothing


def folded(sections: Sequence[Section], opened: Collection[str], here: Collection[str] = ()) -> list[Section]:
    """The sections as they are shown; `opened` names the folds that stand open, `here` the rows that stay."""
    made: list[Section] = []
    for name, group in groupby(sections, key=lambda section: section.fold):
        group = list(group)
        folding = sum(record.folds for section in group for record in section.records)
        if not name or folding < FEWEST:
            made += group
        elif name in opened:
            made += [_with_row(group[0], name, say("fold", "all"), say("fold", "close")), *group[1:]]
        else:
            made += _closed(name, group, here)
    return made


def _closed(name: str, group: Sequence[Section], here: Collection[str]) -> list[Section]:
    """The rows that stay, and one row for all others."""
    first, *others = (
        replace(section, records=tuple(r for r in section.records if not r.folds or r.key in here)) for section in group
    )
    others = [section for section in others if section.records or section.note]
    if not (others or first.records or first.note):
        return [_only_row(name, first.columns[0].heading)]
    left = sum(r.folds and r.key not in here and not r.adds for section in group for r in section.records)
    label = say("fold", first.rest if left != 1 else f"{first.rest}_one", count=left)
    return [_with_row(first, name, label, say("fold", "open")), *others]


def _with_row(section: Section, name: str, label: str, words: str) -> Section:
    """A section with the row that opens or folds at its end."""
    blank = (Cell(""),) * (len(section.columns) - 2)
    cells = (Cell(label, tone="dim"), Cell(words, FOLD + name, "dim"), *blank)
    row = Record(FOLD + name, cells, name=f"{section.columns[0].heading}: {label}")
    return replace(section, records=(*section.records, row))


def _only_row(name: str, title: str) -> Section:
    """Sections of which nothing is left, as one row without a heading."""
    cells = (Cell(title, tone="head"), Cell(say("fold", "none"), FOLD + name, "dim"))
    return Section((Column("", least=18), Column("", least=12)), (Record(FOLD + name, cells, name=title),), fold=name)
