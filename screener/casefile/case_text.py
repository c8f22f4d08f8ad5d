"""A case as text: what the user typed, before anything is worked out.

The model behind the screens. It holds what the file holds, unknown and faulty
values too, so that opening and saving a file loses nothing but its comments.
"""

from __future__ import annotations

import copy
import re
from collections.abc import Mapping

from screener.casefile.keys import COUNT, FLAG, LATER, PACKS, ROWS, TABLE, Key, children, key_at
from screener.casefile.paths import join, steps
from screener.casefile.toml_text import parse_toml, toml_text
from screener.ground.errors import InputError, UnknownName

_FLAGS = {"true": True, "yes": True, "y": True, "false": False, "no": False, "n": False}


class CaseText:
    """Texts of a case by path: `get('tank.shell_diameter')` is '24 m'. Rows count from 0."""

    def __init__(self, table: Mapping | None = None):
        self._table: dict = copy.deepcopy(dict(table or {}))

    @classmethod
    def parse(cls, text: str) -> CaseText:
        """The texts of a case file; raises InputError when it is not TOML."""
        made = cls()
        made._table = parse_toml(text)
        return made

    @classmethod
    def of(cls, case) -> CaseText:
        """The texts from which a case was read; raises InputError for a case built by hand."""
        made = cls()
        for echo in case.inputs:
            if echo.quality != "default" and key_at(echo.path) is not None:
                made.set(echo.path, echo.entered)
        if not made._table:
            problem = "this case was not read from a case file, so it has no text to write"
            raise InputError("", case.title, problem, "read it with read_case, or build a CaseText")
        return made

    def __eq__(self, other: object) -> bool:
        return isinstance(other, CaseText) and self._table == other._table

    __hash__ = None  # it changes

    def __repr__(self) -> str:
        return f"CaseText({self._table!r})"

    @property
    def table(self) -> dict:
        """A copy of the nested dictionaries."""
        return copy.deepcopy(self._table)

    def copy(self) -> CaseText:
        """An independent copy."""
        return CaseText(self._table)

    def toml(self) -> str:
        """The case file."""
        return toml_text(self._table)

    def get(self, path: str) -> str | None:
        """Text of one value as entered, None where nothing is entered."""
        found = self._find(path)
        if found is None or isinstance(found, Mapping):
            return None
        if isinstance(found, bool):
            return "true" if found else "false"
        if isinstance(found, list):
            return ", ".join(str(item) for item in found) if _plain(found) else None
        return str(found)

    def has(self, path: str) -> bool:
        """Whether a value, table or row stands at a path."""
        return self._find(path) is not None

    def rows(self, path: str) -> int:
        """Number of rows of a list of tables such as 'tank.vents'; 0 where there is none."""
        found = self._find(path)
        return len(found) if isinstance(found, list) else 0

    def set(self, path: str, text: str) -> None:
        """Enter a value; an empty text takes the value away. Missing tables and the next row are made."""
        key = _value_key(path, text)
        if not str(text).strip():
            self.remove(path)
            return
        *before, name = steps(path)
        holder = self._make(before, path)
        if not isinstance(holder, dict):
            raise InputError(path, text, f"{path} is not in a table of the case")
        holder[name] = entered_as(key, str(text), path)

    def remove(self, path: str) -> None:
        """Take a value, a table or a row away; nothing happens where there is none."""
        *before, name = steps(path)
        holder = self._walk(before)
        if isinstance(name, int):
            if isinstance(holder, list) and name < len(holder):
                del holder[name]
        elif isinstance(holder, dict):
            holder.pop(name, None)

    def insert(self, path: str, row: Mapping[str, str] | None = None, at: int | None = None) -> str:
        """Put a row into a list of tables such as 'tank.vents', at the end or before row `at`; its path."""
        key = key_at(path)
        if key is None or key.kind != ROWS:
            lists = "blend.parts, tank.contents.parts, tank.vents and site.months are"
            raise InputError(path, path, f"{path} is not a list of tables", lists)
        if self._find(path) is None:
            *before, name = steps(path)
            self._make(before, path)[name] = []
        found = self._find(path)
        if not isinstance(found, list):
            raise InputError(path, path, f"{path} holds something else than a list of tables")
        place = len(found) if at is None else max(0, min(at, len(found)))
        found.insert(place, {})
        for name, text in (row or {}).items():
            self.set(join(f"{path}[{place}]", name), text)
        return f"{path}[{place}]"

    def _find(self, path: str):
        return self._walk(steps(path))

    def _walk(self, parts):
        found = self._table
        for step in parts:
            if isinstance(step, int):
                found = found[step] if isinstance(found, list) and step < len(found) else None
            else:
                found = found.get(step) if isinstance(found, Mapping) else None
        return found

    def _make(self, parts, path: str):
        """The table at a place, made where it is missing."""
        found = self._table
        for i, step in enumerate(parts):
            new: dict | list = [] if i + 1 < len(parts) and isinstance(parts[i + 1], int) else {}
            if isinstance(step, int):
                if not isinstance(found, list) or step > len(found):
                    raise InputError(path, path, f"there is no row {step} here", f"rows 0 to {len(found)}")
                if step == len(found):
                    found.append(new)
                found = found[step]
            elif isinstance(found, dict):
                found = found.setdefault(step, new)
            else:
                raise InputError(path, path, f"'{step}' is not in a table of the case")
        return found


def _plain(items: list) -> bool:
    return not any(isinstance(item, (Mapping, list)) for item in items)


def _value_key(path: str, text: object) -> Key:
    """Declaration of a path that takes one value."""
    key = key_at(path)
    if key is None:
        parent, _, name = path.rpartition(".")
        holder = key_at(parent) if parent else None
        raise UnknownName(path, name, "key of the case file", children(holder.path if holder else ""))
    if key.kind in (TABLE, ROWS):
        raise InputError(path, text, f"{path} holds several values", f"set them one by one: {path}. ...")
    if key.kind == LATER:
        raise InputError(path, text, key.problem)
    return key


def entered_as(key: Key, text: str, path: str) -> object:
    """What a file would hold: flags and counts as such, everything else as text."""
    text = text.strip()
    try:
        text.encode("utf-8")
    except UnicodeEncodeError as error:
        raise InputError(path, None, "the text holds marks that no file can hold") from error
    if key.kind == FLAG:
        return _FLAGS.get(text.lower(), text)
    if key.kind == COUNT and re.fullmatch(r"[0-9]{1,9}", text):
        return int(text)
    if key.kind == PACKS:
        return [item.strip() for item in text.split(",") if item.strip()]
    return text
