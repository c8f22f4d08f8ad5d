"""Nested dictionaries as TOML text, laid out the way a case file is read best.

Sections as [tank], the small tables inside them on one line, lists of tables
one row a line. Keys of the case file come in their declared order, others after.
"""

from __future__ import annotations

import math
import re
import tomllib
from collections.abc import Iterable, Mapping
from datetime import date, datetime, time

from screener.casefile.keys import children, key_at
from screener.casefile.paths import join
from screener.ground.errors import InputError

_BARE = re.compile(r"[A-Za-z0-9_-]+")
_ESCAPES = {"\\": "\\\\", '"': '\\"', "\b": "\\b", "\t": "\\t", "\n": "\\n", "\f": "\\f", "\r": "\\r"}


def parse_toml(text: str) -> dict:
    """The nested dictionaries of a TOML text; a fault names line and column."""
    try:
        table = tomllib.loads(text.removeprefix("\ufeff").replace("\r\n", "\n"))
        _check_whole_numbers(table, "")
        return table
    except tomllib.TOMLDecodeError as error:
        raise _not_toml(text, str(error)) from error
    except RecursionError as error:
        raise InputError("", None, "this is not a case file: its tables are nested too deeply") from error
    except ValueError as error:  # a number with thousands of digits
        raise InputError("", None, f"this is not a case file: {str(error)[:80]}") from error


def _check_whole_numbers(value: object, path: str) -> None:
    """TOML asks for 64 bits; Python would read more and then refuse to print it."""
    if isinstance(value, Mapping):
        for name, item in value.items():
            _check_whole_numbers(item, join(path, name))
    elif isinstance(value, list):
        for i, item in enumerate(value):
            _check_whole_numbers(item, f"{path}[{i}]")
    elif isinstance(value, int) and not -(2**63) <= value < 2**63:
        raise InputError(path, None, "this whole number is too long for TOML", "whole numbers hold 64 bits")


def _not_toml(text: str, message: str) -> InputError:
    found = re.search(r"\(at line (\d+), column (\d+)\)", message)
    problem = message.split(" (at ")[0]
    lines = text.splitlines()
    number = int(found[1]) if found else max(1, len(lines))
    shown = lines[number - 1].strip() if number <= len(lines) else ""
    place = f"line {number}" + (f", column {found[2]}" if found else "")
    given = f" in '{shown[:60]}'" if shown else ""
    hint = 'a case file holds [sections] and lines such as shell_diameter = "24 m"'
    return InputError(place, shown, f"this is not TOML{given}: {problem[:1].lower()}{problem[1:]}", hint)


def toml_text(table: Mapping) -> str:
    """TOML of a whole case."""
    lines: list[str] = []
    sections = [name for name in _ordered(table, "") if isinstance(table[name], Mapping)]
    for name in _ordered(table, ""):
        if name not in sections:
            lines.append(f"{_key(name)} = {_value(table[name], name)}")
    for name in sections:
        _section(lines, _key(name), join("", name), table[name])
    return "\n".join(lines).strip("\n") + "\n"


def _section(lines: list[str], header: str, path: str, table: Mapping) -> None:
    lines += ["", f"[{header}]"]
    later = []
    for name in _ordered(table, path):
        place, value = join(path, name), table[name]
        key = key_at(place)
        if key is not None and key.section and isinstance(value, Mapping):
            later.append((name, place, value))
        elif isinstance(value, list) and value and all(isinstance(row, Mapping) for row in value):
            lines.append(f"{_key(name)} = [")
            lines += [f"  {_value(row, f'{place}[0]')}," for row in value]
            lines.append("]")
        else:
            lines.append(f"{_key(name)} = {_value(value, place)}")
    for name, place, value in later:
        _section(lines, f"{header}.{_key(name)}", place, value)


def _ordered(table: Mapping, path: str) -> Iterable[str]:
    """Declared keys in their order, then the rest as they stand."""
    key = key_at(path) if path else None
    declared = children(key.path if key else "") if key or not path else {}
    return [*(name for name in declared if name in table), *(name for name in table if name not in declared)]


def _value(value: object, path: str) -> str:
    if isinstance(value, bool):
        return "true" if value else "false"
    if isinstance(value, str):
        return _string(value)
    if isinstance(value, float):
        return _float(value)
    if isinstance(value, (int, datetime, date, time)):
        return str(value) if isinstance(value, int) else value.isoformat()
    if isinstance(value, list):
        return "[" + ", ".join(_value(item, f"{path}[0]") for item in value) + "]"
    if isinstance(value, Mapping):
        inner = ", ".join(f"{_key(n)} = {_value(value[n], join(path, n))}" for n in _ordered(value, path))
        return f"{{ {inner} }}" if inner else "{}"
    problem = f"{type(value).__name__} cannot stand in a case file"
    raise InputError(path, value, problem, "text, number, list or table")


def _float(value: float) -> str:
    if math.isfinite(value):
        return repr(value)
    return "nan" if math.isnan(value) else "inf" if value > 0 else "-inf"


def _key(name: str) -> str:
    return name if _BARE.fullmatch(name) else _string(name)


def _string(text: str) -> str:
    made = []
    for mark in text:
        if mark in _ESCAPES:
            made.append(_ESCAPES[mark])
        elif ord(mark) < 0x20 or ord(mark) == 0x7F:
            made.append(f"\\u{ord(mark):04X}")
        else:
            made.append(mark)
    return '"' + "".join(made) + '"'
