"""Places in a case: `tank.vents[0].set`, rows counted from 0."""

from __future__ import annotations

import re

from screener.ground.errors import InputError

_BARE = re.compile(r"[A-Za-z0-9_-]+")
_STEP = re.compile(r'(?:^|\.)(?:(?P<bare>[A-Za-z0-9_-]+)|"(?P<quoted>[^"]*)")|\[(?P<row>\d{1,6})\]')


def join(parent: str, name: str) -> str:
    """Path of a key below a table; a name that is no plain word is quoted."""
    shown = name if _BARE.fullmatch(name) else '"' + name.replace('"', "'") + '"'
    return f"{parent}.{shown}" if parent else shown


def steps(path: str) -> tuple[str | int, ...]:
    """Names and row numbers of a path: 'tank.vents[0].set' -> ('tank', 'vents', 0, 'set')."""
    found, at = [], 0
    while at < len(path):
        step = _STEP.match(path, at)
        if step is None:
            break
        found.append(int(step["row"]) if step["row"] else step["bare"] or step["quoted"])
        at = step.end()
    if at < len(path) or not found:
        raise InputError(path, path, f"'{path}' is no place in a case", "for example tank.vents[0].set")
    return tuple(found)
