"""Every key of the case file, declared once.

Reading, faults, the JSON Schema, the commented template's test, the echo of
inputs and the help beside a field are all driven by this table. Paths are
written `tank.vents[].set`; in a case the rows count from 0: `tank.vents[0].set`.

The allowed ranges catch slips of the pen and of the unit (a tank of 2 km). They
are no limits of any method or rule: common practice, no source. So are the
usual ranges, which only help.
"""

from __future__ import annotations

import re
from dataclasses import dataclass
from functools import lru_cache

# Kinds of value that are not quantities with a unit.
TABLE, ROWS = "table", "rows"
TEXT, CHOICE, FLAG, COUNT, NUMBER = "text", "choice", "flag", "count", "number"
DATE, MONTH, STOCK, SPECIES, GAS = "date", "month", "stock", "species", "dissolved gas"
PACKS, LATER = "rule packs", "later"


@dataclass(frozen=True)
class Key:
    """One key of the case file.

    kind is a kind of quantity of `screener.casefile.quantities` or one of the words above; for
    the kind 'later' the problem says why the key is refused today. unit is what the echo calls
    the SI value. low and high are texts with units; low_open excludes the lower end itself.
    """

    path: str
    kind: str
    meaning: str
    example: str = ""
    where: str = ""  # where to find it on site
    usual: str = ""
    low: str = ""
    high: str = ""
    low_open: bool = False
    unit: str = ""
    choices: tuple[str, ...] = ()
    required: bool = False
    unless: str = ""  # name of a key beside it that takes the place of this required one
    default: object = None
    note: str = ""  # what the default means and why it was taken
    quality: str = "given"
    section: bool = False  # written as [tank.contents], not as an inline table
    problem: str = ""  # of a key that is known and refused

    @property
    def name(self) -> str:
        """Last part of the path: 'set'."""
        return self.path.rpartition(".")[2].removesuffix("[]").strip('"')

    @property
    def parent(self) -> str:
        """Path of the table that holds the key: 'tank.vents[]'; '' at the top."""
        return self.path.rpartition(".")[0]

    @property
    def label(self) -> str:
        """Name in words: 'shell diameter'."""
        return self.name.replace("_", " ")

    @property
    def line(self) -> str:
        """The key as it may stand in a file: 'shell_diameter = "24 m"'."""
        if not self.example:
            return f"[{self.path}]"
        bare = self.kind in (TABLE, ROWS, PACKS, FLAG, COUNT)
        name = self.path.rpartition(".")[2].removesuffix("[]")
        return f"{name} = {self.example}" if bare else f'{name} = "{self.example}"'

    @property
    def allowed(self) -> str:
        """The allowed values in words: '0.5 m to 130 m'."""
        if self.choices:
            return "one of " + ", ".join(self.choices)
        if self.low and self.high:
            return f"above {self.low}, up to {self.high}" if self.low_open else f"{self.low} to {self.high}"
        return _ALLOWED.get(self.kind, "")


_ALLOWED = {
    TEXT: "text in quotes",
    PACKS: 'a list of rule packs such as ["us-40cfr60-kb"]',
    FLAG: "true or false",
    DATE: "a date such as 2026-07-14",
    MONTH: "a month such as Jul",
    STOCK: "the name of a blendstock",
    SPECIES: "the name, synonym or CAS number of a species",
    GAS: "none, in blend, or air-saturated at 15 degC",
    TABLE: "a table such as { ... }",
    ROWS: "a list of tables such as [ { ... } ]",
}


@lru_cache(maxsize=1)
def all_keys() -> dict[str, Key]:
    """All keys by path, in the order in which they are written."""
    from screener.casefile.key_table import KEYS

    return {key.path: key for key in KEYS}


@lru_cache(maxsize=1)
def _children() -> dict[str, dict[str, Key]]:
    made: dict[str, dict[str, Key]] = {}
    for key in all_keys().values():
        made.setdefault(key.parent, {})[key.name] = key
    return made


def children(parent: str) -> dict[str, Key]:
    """Keys directly below a table, by name; of a list of tables with its [], of the top with ''."""
    return _children().get(parent, {})


def pattern(path: str) -> str:
    """Path of the declaration of a concrete path: 'tank.vents[2].set' -> 'tank.vents[].set'."""
    return re.sub(r"\[\d+\]", "[]", path)


def key_at(path: str) -> Key | None:
    """Declaration of a concrete path, None for a path that is no key."""
    plain = pattern(path)
    return all_keys().get(plain) or all_keys().get(plain.removesuffix("[]") + "[]")


@lru_cache(maxsize=1)
def _places() -> dict[str, int]:
    return {path: place for place, path in enumerate(all_keys())}


def order(path: str) -> tuple[int, ...]:
    """Sorting key that puts concrete paths into the order of the file: rows one after another.

    A path that is no key stands behind the table that holds it.
    """
    known = path
    while known and key_at(known) is None:
        known = known.rpartition(".")[0]
    if not known:
        return (len(_places()),)
    plain = pattern(known)
    rows = [int(row) for row in re.findall(r"\[(\d+)\]", known)]
    if not rows:
        return (_places()[key_at(known).path],)
    return (_places()[plain[: plain.index("[]") + 2]], *rows, _places()[key_at(known).path])
