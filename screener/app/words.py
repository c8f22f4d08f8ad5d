"""Every sentence of the screens; the words themselves lie in data/words/help.toml."""

from __future__ import annotations

from functools import lru_cache

from screener.ground.errors import DataError
from screener.ground.files import read_toml

_FILE = "words/help.toml"


@lru_cache(maxsize=1)
def _words() -> dict:
    return read_toml(_FILE)


def say(group: str, key: str, **fields: object) -> str:
    """One sentence with its fields filled in; DataError when words or field are missing."""
    try:
        return _words()[group][key].format(**fields)
    except KeyError as error:
        raise DataError(_FILE, None, f"{group}.{key}: {error} is missing") from error


def table(group: str) -> dict:
    """All sentences of a group, by key."""
    return dict(_words().get(group, {}))
