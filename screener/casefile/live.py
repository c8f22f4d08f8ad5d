"""One field while it is typed: what it is taken as, or why it is refused."""

from __future__ import annotations

from screener.casefile.case_text import entered_as
from screener.casefile.keys import GAS, LATER, ROWS, TABLE, Key, key_at
from screener.casefile.quantities import KINDS
from screener.casefile.units import show
from screener.casefile.values import Tables, Taken, shipped_tables, take
from screener.ground.errors import InputError

_BAROMETER = {"Pa over barometer": "above the barometer", "Pa under barometer": "below the barometer"}


def check_text(
    path: str, text: str, *, system: str = "si", tables: Tables | None = None
) -> tuple[str, object]:
    """What a text at a path of the case is taken as, and its value in SI.

    `check_text('site.lowest_barometer', '11.1 psi')` gives ('taken as 76.53 kPa abs', 76531.8).
    An empty text gives ('', None). Raises InputError with path, value and what is allowed.
    """
    key = key_at(path)
    if key is None or key.kind in (TABLE, ROWS):
        raise InputError(path, text, f"'{path}' is no single value of the case")
    if key.kind != LATER and not text.strip():
        return "", None
    taken = take(key, entered_as(key, text, path), path, tables or _tables_for(key))
    return f"taken as {_shown(taken, system)}", taken.value


def _tables_for(key: Key) -> Tables | None:
    """The shipped tables where the key looks a name up; they are slow to load at first."""
    return shipped_tables() if key.kind in ("stock", "species", "rule packs") else None


def _shown(taken: Taken, system: str) -> str:
    key, value = taken.key, taken.value
    if key.kind in KINDS:
        text = show(value, key.kind, system)
        if key.kind == "pressure difference":
            return f"{text} {_BAROMETER.get(key.unit, '')}".rstrip()
        return f"{text} by {taken.mark}" if key.kind == "share" and taken.mark else text
    if isinstance(value, bool):
        return "yes" if value else "no"
    if key.kind == GAS and taken.extra is not None:
        return f"air-saturated at {show(taken.extra, 'temperature', system)}"
    if isinstance(value, tuple):
        return ", ".join(value)
    if isinstance(value, float):
        return f"{value:g}"
    return taken.note or str(value)
