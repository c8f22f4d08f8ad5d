"""Wording of the command line, kept in data/words/cli.toml."""

from __future__ import annotations

from functools import lru_cache

from screener.ground.errors import DataError
from screener.ground.files import read_toml

_FILE = "words/cli.toml"


@lru_cache(maxsize=1)
def _words() -> dict:
    return read_toml(_FILE)


def say(group: str, key: str, **fields: object) -> str:
    """One text with its fields filled in; DataError when the words or a field are missing."""
    try:
        return _words()[group][key].format(**fields)
    except KeyError as error:
        raise DataError(_FILE, None, f"{group}.{key}: {error} is missing") from error


def columns(group: str, key: str) -> tuple[str, ...]:
    """Column heads of a table."""
    try:
        return tuple(_words()[group][key])
    except KeyError as error:
        raise DataError(_FILE, None, f"{group}.{key}: {error} is missing") from error
