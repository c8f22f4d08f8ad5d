"""One digest of the property data, so that a memo says which numbers it rests on."""

from __future__ import annotations

import hashlib
from functools import lru_cache

from screener.ground.files import data_folder

_LEFT_OUT = frozenset({"words", "examples", "schemas", "made_by"})  # nothing a number depends on


@lru_cache(maxsize=1)
def data_digest() -> str:
    """SHA-256 over name and content of every data table and passport, in order of name."""
    folder = data_folder()
    total = hashlib.sha256()
    for path in sorted(folder.rglob("*"), key=lambda path: path.relative_to(folder).as_posix()):
        name = path.relative_to(folder)
        if (
            path.suffix in (".csv", ".toml")
            and name.parts[0] not in _LEFT_OUT
            and "made_by" not in name.parts
        ):
            total.update(name.as_posix().encode())
            total.update(hashlib.sha256(path.read_bytes()).digest())
    return total.hexdigest()
