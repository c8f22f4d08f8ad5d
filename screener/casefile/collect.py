"""A nested dictionary to values by path: every value read, every fault kept, every default noted."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import replace

from screener.casefile.keys import ROWS, TABLE, Key, children
from screener.casefile.paths import join
from screener.casefile.units import short
from screener.casefile.values import Tables, Taken, entered, fault, take
from screener.ground.errors import InputError, UnknownName

_MOST_ROWS = 500  # rows in a list; a longer one is a slip of a script


class Values:
    """Values read so far by path, and the faults."""

    def __init__(self):
        self.taken: dict[str, Taken] = {}
        self.faults: list[InputError] = []
        self.row_counts: dict[str, int] = {}
        self.present: set[str] = set()  # tables that stand in the case

    def value(self, path: str):
        """Value in SI, None where it is missing or faulty."""
        found = self.taken.get(path)
        return None if found is None else found.value

    def entered(self, path: str) -> str:
        """Text as the user gave it, '' for a default."""
        found = self.taken.get(path)
        return "" if found is None else found.entered

    def rows(self, path: str) -> list[str]:
        """Paths of the rows of a list of tables."""
        return [f"{path}[{i}]" for i in range(self.row_counts.get(path, 0))]

    def annotate(self, path: str, note: str) -> None:
        """Put a note on a value, if it is there."""
        if path in self.taken:
            self.taken[path] = replace(self.taken[path], note=note)

    def complain(self, error: InputError) -> None:
        """Keep a fault."""
        self.faults.append(error)


def collect(document: Mapping, tables: Tables) -> Values:
    """Read a whole document."""
    values = Values()
    _table(values, "", "", document, tables)
    return values


def _table(values: Values, declared: str, path: str, table: Mapping, tables: Tables) -> None:
    """Read one table: its declared keys in their order, then complaints about the rest."""
    known = children(declared)
    values.present.add(path)
    for name, key in known.items():
        place = join(path, name)
        # An empty list beside what takes its place says as much as no list.
        spared = bool(key.unless) and key.unless in table and table.get(name) == []
        if name in table and not spared:
            _entry(values, key, place, table[name], tables)
        elif not key.unless or key.unless not in table:
            _absent(values, key, place, tables)
    for name in table:
        if name not in known:
            holder = f"[{declared.replace('[]', '')}]" if declared else "the case file"
            values.complain(_unknown(join(path, name), name, holder, known))


def _unknown(path: str, name: str, holder: str, known: Mapping[str, Key]) -> InputError:
    error = UnknownName(path, name[:60], f"key of {holder}", known)
    if not error.nearest:
        error.hint = f"the keys are {', '.join(known)}"
    return error


def _entry(values: Values, key: Key, path: str, value: object, tables: Tables) -> None:
    if key.kind == TABLE:
        if isinstance(value, Mapping):
            _table(values, key.path, path, value, tables)
        else:
            values.complain(fault(key, path, value, f"'{short(entered(value))}' is not a table"))
    elif key.kind == ROWS:
        _rows(values, key, path, value, tables)
    else:
        try:
            values.taken[path] = take(key, value, path, tables)
        except InputError as error:
            values.complain(error)


def _rows(values: Values, key: Key, path: str, rows: object, tables: Tables) -> None:
    if not isinstance(rows, list) or not all(isinstance(row, Mapping) for row in rows):
        values.complain(fault(key, path, rows, f"'{short(entered(rows))}' is not a list of tables"))
        return
    if len(rows) > _MOST_ROWS:
        values.complain(InputError(path, len(rows), f"{len(rows)} rows are too many", f"up to {_MOST_ROWS}"))
        return
    if key.required and not rows:
        values.complain(fault(key, path, "[]", "the list is empty"))
    values.present.add(path)
    values.row_counts[path] = len(rows)
    for i, row in enumerate(rows):
        _table(values, key.path, f"{path}[{i}]", row, tables)


def _absent(values: Values, key: Key, path: str, tables: Tables) -> None:
    """A key that is not there: a fault, a default to note, or nothing."""
    if key.required:
        example = f"for example {key.line}"
        hint = f"allowed: {key.allowed}, {example}" if key.choices else example
        problem = f"this is missing: {key.meaning[:1].lower()}{key.meaning[1:]}"
        values.complain(InputError(path, None, problem, hint))
    elif key.default is not None:
        values.taken[path] = Taken(key, path, "", key.default, note=key.note, quality="default")
    elif path == "case":
        _table(values, key.path, path, {}, tables)
