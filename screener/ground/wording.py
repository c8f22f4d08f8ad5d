"""Sentences for people, kept in one file of data/words per place that speaks."""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache

from screener.ground.errors import DataError
from screener.ground.files import read_toml


@lru_cache(maxsize=8)
def _read(file: str) -> dict:
    return read_toml(file)


@dataclass(frozen=True)
class Words:
    """One wording file, read when first asked."""

    file: str

    def at(self, *path: str):
        """Text, list or table at a place of the file; DataError when there is none."""
        found = _read(self.file)
        for key in path:
            if not isinstance(found, dict) or key not in found:
                raise DataError(self.file, None, f"no wording at {'.'.join(path)}")
            found = found[key]
        return found

    def say(self, *path: str, **fields: object) -> str:
        """Text at a place with its braces filled in; DataError when a field is missing."""
        try:
            return self.at(*path).format(**fields)
        except KeyError as error:
            raise DataError(self.file, None, f"{'.'.join(path)}: {error} is missing") from error

    def lines(self, *path: str) -> tuple[str, ...]:
        """A list of phrases at a place."""
        return tuple(self.at(*path))

    def table(self, group: str) -> dict:
        """All texts of a group by key; empty when the file has no such group."""
        return dict(_read(self.file).get(group, {}))
