"""Solar absorptance of a tank's surface from a free text about its paint."""

from __future__ import annotations

import re
from dataclasses import dataclass
from functools import lru_cache

from screener.ground.errors import DataError
from screener.ground.files import read_table, read_toml

TABLE = "tank/paint.csv"
WORDS = "tank/paint_words.toml"
CONDITIONS = ("new", "average", "aged")

# A rougher spelling of the same thing; applied before anything is looked up.
_SPELLINGS = (("aluminum", "aluminium"), ("gray", "grey"), ("colour", ""), ("color", ""))


@dataclass(frozen=True)
class PaintRow:
    """One colour and finish of the table; absorptances [-] and the evidence of the ends and of the middle."""

    row: str
    new: float
    average: float
    aged: float
    ends_evidence: str
    middle_evidence: str


@dataclass(frozen=True)
class Absorptance:
    """What a text about a surface was taken to mean.

    low, best, high : solar absorptance [-]
    row : row or rows of the table, joined by ' / '; 'whole table' where the text names none; 'as given'
    condition : 'new', 'average', 'aged' or '' where the text says nothing
    evidence : mark of the best value: 'law', 'memory', 'user', 'common practice'
    note : one sentence about what was taken; '' where the text said all
    known : False where the text names no colour of the table
    """

    low: float
    best: float
    high: float
    row: str
    condition: str
    evidence: str
    note: str
    known: bool


@lru_cache(maxsize=1)
def paint_table() -> dict[str, PaintRow]:
    """Rows of the paint table by name."""
    rows = {}
    for line, text in enumerate(read_table(TABLE), start=2):
        row = PaintRow(
            text["row"],
            *(float(text[name]) for name in CONDITIONS),
            text["ends_evidence"],
            text["middle_evidence"],
        )
        if not 0.0 <= row.new <= row.average <= row.aged <= 1.0:
            raise DataError(TABLE, line, f"absorptances of {row.row} do not rise from new to aged")
        rows[row.row] = row
    return rows


@lru_cache(maxsize=1)
def _phrases() -> tuple[tuple[str, tuple[str, ...]], ...]:
    """Every phrase that names a colour, longest first, with the rows it stands for."""
    words = read_toml(WORDS)
    pairs = [(phrase, (row,)) for row, phrases in words["rows"].items() for phrase in phrases]
    pairs += [(phrase, tuple(rows)) for phrase, rows in words["several"].items()]
    unknown = {row for _, rows in pairs for row in rows} - set(paint_table())
    if unknown:
        raise DataError(WORDS, None, f"rows that are not in {TABLE}: {', '.join(sorted(unknown))}")
    return tuple(sorted(pairs, key=lambda pair: -len(pair[0])))


def absorptance(text: str | None) -> Absorptance:
    """Solar absorptance from a free text such as 'white paint, some years old'.

    Parameters
    ----------
    text : str or None
        Colour, finish and condition in plain words; or 'absorptance 0.3', 'reflectance 70 %'.

    Returns
    -------
    Absorptance
        A colour without a condition spans the row from new to aged with the average as best; several
        colours span all their rows with the mean as best; a text that names no colour spans the whole
        table and says so. [-]

    Source
    ------
    French arrete of 3 October 2010, annex III [law, read] for good and poor; the average from memory.
    """
    plain = " ".join(re.sub(r"[,;/()]", " ", (text or "").lower()).split())
    for rough, fine in _SPELLINGS:
        plain = plain.replace(rough, fine)
    given = _given_number(plain)
    if given is not None:
        return Absorptance(given, given, given, "as given", "", "user", "", True)
    rows, rest = _rows_named(plain)
    condition = _condition(rest)
    if not rows:
        return _whole_table(text)
    return _from_rows(rows, condition)


def _given_number(plain: str) -> float | None:
    """A stated absorptance, or one less a stated reflectance; None without a number from 0 to 1."""
    match = re.search(
        r"\b(absorptance|absorptivity|reflectance|reflectivity)\D{0,4}(\d+(?:\.\d+)?)\s*(%?)", plain
    )
    if match is None:
        return None
    value = float(match[2]) / (100.0 if match[3] else 1.0)
    if not 0.0 <= value <= 1.0:
        return None
    return value if match[1].startswith("abs") else 1.0 - value


def _rows_named(plain: str) -> tuple[list[str], str]:
    """Rows of every colour named, in the order of the text, and the text without them."""
    found = []
    for phrase, rows in _phrases():
        pattern = rf"(?<![\w-]){re.escape(phrase)}(?![\w-])"
        match = re.search(pattern, plain)
        if match:
            found.append((match.start(), rows))
            plain = re.sub(pattern, lambda hit: " " * len(hit[0]), plain)
    names = [row for _, rows in sorted(found) for row in rows]
    return list(dict.fromkeys(names)), plain


def _condition(rest: str) -> str:
    """Condition named in the text: the worse one if several, average for 'some years old', '' for none."""
    words = read_toml(WORDS)
    tokens = rest.split()
    named = set()
    for i, token in enumerate(tokens):
        softened = token == "old" and i > 0 and tokens[i - 1] in words["soften"]["before_old"]
        for condition in CONDITIONS:
            if token in words["condition"][condition]:
                named.add("average" if softened else condition)
    return next((condition for condition in reversed(CONDITIONS) if condition in named), "")


def _from_rows(rows: list[str], condition: str) -> Absorptance:
    table = [paint_table()[row] for row in rows]
    lowest, highest = {"new": ("new", "average"), "aged": ("average", "aged")}.get(condition, ("new", "aged"))
    notes = []
    if len(rows) > 1:
        notes.append(f"the text fits {len(rows)} rows of the table: their mean taken, all of them spanned")
    if not condition:
        notes.append("no condition named: new to aged, average taken")
    marks = {
        row.middle_evidence if (condition or "average") == "average" else row.ends_evidence for row in table
    }
    return Absorptance(
        low=min(getattr(row, lowest) for row in table),
        best=sum(getattr(row, condition or "average") for row in table) / len(table),
        high=max(getattr(row, highest) for row in table),
        row=" / ".join(rows),
        condition=condition,
        evidence="memory" if "memory" in marks else marks.pop(),
        note="; ".join(notes),
        known=True,
    )


def _whole_table(text: str | None) -> Absorptance:
    table = paint_table().values()
    said = (
        f"'{text.strip()}' names no surface of the table" if (text or "").strip() else "no surface is named"
    )
    low, high = min(row.new for row in table), max(row.aged for row in table)
    return Absorptance(
        low=low,
        best=0.5 * (low + high),
        high=high,
        row="whole table",
        condition="",
        evidence="common practice",
        note=f"{said}: the whole table is spanned, its middle taken",
        known=False,
    )
