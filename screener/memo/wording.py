"""The memo's fixed wording, kept in data/words/memo.toml."""

from __future__ import annotations

from functools import lru_cache

from screener.ground.errors import DataError
from screener.ground.files import read_toml

_FILE = "words/memo.toml"


@lru_cache(maxsize=1)
def _words() -> dict:
    return read_toml(_FILE)


def words(*path: str):
    """Text, list or table at this place of the wording file; DataError when there is none."""
    found = _words()
    for key in path:
        if not isinstance(found, dict) or key not in found:
            raise DataError(_FILE, None, f"no wording at {'.'.join(path)}")
        found = found[key]
    return found


def fill(*path: str, **values: object) -> str:
    """Text at this place with its braces filled in."""
    return words(*path).format(**values)
