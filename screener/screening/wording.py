"""Sentences of findings; the words themselves lie in data/words/findings.toml."""

from __future__ import annotations

from functools import lru_cache

from screener.ground.errors import DataError
from screener.ground.files import read_toml

_FILE = "words/findings.toml"


@lru_cache(maxsize=1)
def _words() -> dict:
    return read_toml(_FILE)


def say(group: str, key: str, **fields: object) -> str:
    """One sentence; DataError when the words or a field are missing."""
    try:
        return _words()[group][key].format(**fields)
    except KeyError as error:
        raise DataError(_FILE, None, f"{group}.{key}: {error} is missing") from error


def lines(group: str, key: str) -> tuple[str, ...]:
    """A list of phrases; empty when the group has none for this key."""
    return tuple(_words()[group].get(key, ()))
