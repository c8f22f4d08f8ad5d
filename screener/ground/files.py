"""Where the shipped data lie, and how a table is read."""

from __future__ import annotations

import csv
import tomllib
from functools import lru_cache
from pathlib import Path

from screener.ground.errors import DataError

_PACKAGE = Path(__file__).resolve().parent.parent


@lru_cache(maxsize=1)
def data_folder() -> Path:
    """Folder of the shipped data: inside a wheel, else beside the source."""
    for folder in (_PACKAGE / "_data", _PACKAGE.parent / "data"):
        if folder.is_dir():
            return folder
    raise DataError(str(_PACKAGE / "_data"), None, "the data folder is missing; install the package again")


def read_table(name: str) -> list[dict[str, str]]:
    """Rows of a CSV below the data folder as text; lines starting with # are skipped."""
    path = data_folder() / name
    with path.open(encoding="utf-8", newline="") as file:
        return list(csv.DictReader(line for line in file if not line.startswith("#")))


def read_toml(name: str) -> dict:
    """A TOML file below the data folder."""
    path = data_folder() / name
    try:
        return tomllib.loads(path.read_text(encoding="utf-8"))
    except tomllib.TOMLDecodeError as error:
        raise DataError(name, None, str(error)) from error
