"""One entered value to one value in SI, or to the fault that names path, value and what is allowed."""

from __future__ import annotations

import math
import re
from collections.abc import Callable
from dataclasses import dataclass
from datetime import date, datetime
from functools import lru_cache

from screener.casefile import keys as k
from screener.casefile.keys import Key
from screener.casefile.quantities import KINDS
from screener.casefile.spellings import API
from screener.casefile.units import expected, measure, number_text, quantity, short
from screener.ground.constants import T_15C, T_60F
from screener.ground.errors import InputError, UnitError, UnknownName


@dataclass(frozen=True)
class Tables:
    """Where names of liquids are looked up and blends are made; tests put their own in."""

    species: Callable[[str], str]  # canonical name; raises UnknownName
    stock: Callable[[str], str]
    blend: Callable[..., object]  # (shares, basis=, at=) -> Blend
    packs: Callable[[], tuple[str, ...]]  # names of the rule packs
    lab: Callable[..., object]  # (sheet, start blend or None) -> Blend


@lru_cache(maxsize=1)
def shipped_tables() -> Tables:
    """The tables that come with the program."""
    from screener.blends import Blend, stock
    from screener.species import find
    from screener.tank import rule_packs

    return Tables(
        lambda name: find(name).name, lambda name: stock(name).name, Blend.of, rule_packs, Blend.from_lab
    )


@dataclass(frozen=True)
class Taken:
    """A value that was read: the text entered ('' for a default) and what was made of it."""

    key: Key
    path: str
    entered: str
    value: object  # float in SI, text, flag or tuple of texts
    mark: str = ""  # of the spelling: gauge, volume, ...
    extra: float | None = None  # temperature at which a receipt is air-saturated [K]
    note: str = ""
    quality: str = "given"


def take(key: Key, value: object, path: str, tables: Tables) -> Taken:
    """Read one value; raises InputError."""
    made = _READERS.get(key.kind, _quantity)(key, value, path, tables)
    return made if isinstance(made, Taken) else Taken(key, path, entered(value), made, quality=key.quality)


def entered(value: object) -> str:
    """Text as the user gave it."""
    if isinstance(value, bool):
        return "true" if value else "false"
    if isinstance(value, (list, tuple)):
        return ", ".join(entered(item) for item in value)
    return value.isoformat() if isinstance(value, (date, datetime)) else str(value)


def fault(key: Key, path: str, value: object, problem: str) -> InputError:
    """A fault of this key with what it allows."""
    allowed = f"allowed: {key.allowed}" if key.allowed else f'for example "{key.example}"'
    return InputError(path, value, problem, allowed)


def _quantity(key: Key, value: object, path: str, tables: Tables) -> Taken:
    try:
        if key.path.endswith(".lab.density"):
            return _density(key, value, path)
        got = measure(value, key.kind, path)
    except UnitError as error:
        more = f", {key.allowed}" if key.allowed else ""
        raise UnitError(path, error.text, error.problem, expected(key.kind) + more) from error
    _check_range(key, path, value, got.value, _bound(key.low, key.kind), _bound(key.high, key.kind))
    return Taken(key, path, entered(value), got.value, got.mark, quality=key.quality)


def _density(key: Key, value: object, path: str) -> Taken:
    """Density at 15 degC; one at 60 degF, an API gravity among them, is brought to 15 degC."""
    number, at, where = value.partition(" at ") if isinstance(value, str) else (value, "", "")
    got = measure(number, key.kind, path)
    T = quantity(where, "temperature", path) if at else (T_60F if got.mark == API else T_15C)
    if min(abs(T - T_60F), abs(T - T_15C)) > 0.01:
        problem = f"a density at '{short(where.strip())}' is not read; write it at 15 degC or 60 degF"
        raise fault(key, path, value, problem)
    _check_range(key, path, value, got.value, _bound(key.low, key.kind), _bound(key.high, key.kind))
    rho, note = got.value, ""
    if abs(T - T_60F) <= 0.01:
        from screener.volatility.volume_correction import density_60F

        rho = got.value * got.value / float(density_60F(got.value)[0])
        note = f"given at 60 degF; {rho:.5g} kg/m3 at 15 degC after API MPMS 11.1"
    return Taken(key, path, entered(value), rho, note=note, quality=key.quality)


@lru_cache(maxsize=256)
def _bound(text: str, kind: str) -> float | None:
    return quantity(text, kind) if text else None


def _check_range(key: Key, path: str, given: object, value: float, low, high) -> None:
    if low is not None and (value < low or (key.low_open and value == low)):
        signed = key.kind not in ("temperature", "angle") and value < 0.0 <= low
        problem = "is negative" if signed else "is below the allowed range"
        raise fault(key, path, given, f"{short(entered(given))} {problem}")
    if high is not None and value > high:
        raise fault(key, path, given, f"{short(entered(given))} is above the allowed range")


def _text(key: Key, value: object, path: str, tables: Tables) -> str:
    if not isinstance(value, str):
        raise fault(key, path, value, f"{short(entered(value))} is not text")
    return value.strip()


def _surface(key: Key, value: object, path: str, tables: Tables) -> Taken:
    """Free text of the paint, with the solar absorptance that will be taken from it."""
    text = _text(key, value, path, tables)
    from screener.tank import absorptance

    paint = absorptance(text)
    span = "" if paint.low == paint.high else f" ({paint.low:.2f} to {paint.high:.2f})"
    note = f"solar absorptance {paint.best:.2f}{span}, {paint.row}"
    return Taken(key, path, text, text, note=note)


def _texts(key: Key, value: object, path: str, tables: Tables) -> tuple[str, ...]:
    if not isinstance(value, list) or not all(isinstance(item, str) and item.strip() for item in value):
        raise fault(key, path, value, f"{short(entered(value))} is not a list of texts")
    return tuple(item.strip() for item in value)


def _packs(key: Key, value: object, path: str, tables: Tables) -> tuple[str, ...]:
    names = _texts(key, value, path, tables)
    for name in names:
        if name not in tables.packs():
            raise UnknownName(path, name, "rule pack", tables.packs())
    return names


def _choice(key: Key, value: object, path: str, tables: Tables) -> str:
    if isinstance(value, str):
        folded = {choice.lower().replace(" ", "-").replace("_", "-"): choice for choice in key.choices}
        found = folded.get("-".join(value.lower().replace("_", " ").replace("-", " ").split()))
        if found is not None:
            return found
    raise fault(key, path, value, f"'{short(entered(value))}' is not one of the choices")


def _flag(key: Key, value: object, path: str, tables: Tables) -> bool:
    if not isinstance(value, bool):
        raise fault(key, path, value, f"'{short(entered(value))}' is neither true nor false")
    return value


def _count(key: Key, value: object, path: str, tables: Tables) -> int:
    if isinstance(value, str) and re.fullmatch(r"\s*-?[0-9]{1,9}\s*", value):
        value = int(value)
    if isinstance(value, bool) or not isinstance(value, int):
        raise fault(key, path, value, f"'{short(entered(value))}' is not a whole number")
    _check_range(key, path, value, value, int(key.low), int(key.high))
    return value


def _number(key: Key, value: object, path: str, tables: Tables) -> float:
    number = number_text(value) if isinstance(value, str) else value
    plain = isinstance(number, (int, float)) and not isinstance(number, bool)
    if not plain or not math.isfinite(number if abs(number) < 1e300 else math.inf):
        raise fault(key, path, value, f"'{short(entered(value))}' is not a plain number")
    _check_range(key, path, value, float(number), float(key.low), float(key.high))
    return float(number)


def _date(key: Key, value: object, path: str, tables: Tables) -> str:
    if isinstance(value, date) and not isinstance(value, datetime):
        return value.isoformat()
    if isinstance(value, str) and re.fullmatch(r"[0-9]{4}-[0-9]{2}-[0-9]{2}", value.strip()):
        try:
            return date.fromisoformat(value.strip()).isoformat()
        except ValueError as error:
            raise fault(key, path, value, f"'{value}' is not a day of the calendar") from error
    raise fault(key, path, value, f"'{short(entered(value))}' is not a date written year-month-day")


def _month(key: Key, value: object, path: str, tables: Tables) -> str:
    from screener.site import month_number

    given = isinstance(value, (str, int)) and not isinstance(value, bool)
    number = month_number(value) if given else None
    if number is None:
        raise fault(key, path, value, f"'{short(entered(value))}' is not a month")
    return MONTHS[number - 1]


def _liquid(look: str, other: str):
    """Reader of a name in one of the two tables of liquids."""

    def read(key: Key, value: object, path: str, tables: Tables) -> str:
        if not isinstance(value, str) or not value.strip():
            raise fault(key, path, value, f"'{short(entered(value))}' is not the name of a {look}")
        try:
            return getattr(tables, look)(value.strip())
        except UnknownName as error:
            try:
                getattr(tables, other)(value.strip())
            except UnknownName:
                raise error.at(path) from error
            problem = f"'{value}' is not a {look}"
            raise InputError(path, value, problem, f'it is a {other}: write {other} = "{value}"') from error

    return read


def _gas(key: Key, value: object, path: str, tables: Tables) -> Taken:
    text = " ".join(value.lower().replace("-", " ").split()) if isinstance(value, str) else ""
    if text in ("none", "in blend"):
        return Taken(key, path, value.strip(), text.replace(" ", "-"))
    if text.startswith("air saturated at "):
        warm = re.split(r"\bat\b", value, maxsplit=1, flags=re.IGNORECASE)[1].strip()
        T = quantity(warm, "temperature", path)
        # Outside this range a liquid in trade is not saturated with air: common practice, no source.
        _check_range(key, path, value, T, _bound("-60 degC", "temperature"), _bound("60 degC", "temperature"))
        return Taken(key, path, value.strip(), "air-saturated", extra=T)
    raise fault(key, path, value, f"'{short(entered(value))}' does not say which gas is dissolved")


def _later(key: Key, value: object, path: str, tables: Tables):
    problem, _, hint = key.problem.partition("; ")
    raise InputError(path, short(entered(value)), problem, hint)


def _reader(key: Key, value: object, path: str, tables: Tables) -> object:
    return (_surface if key.path == "tank.surface" else _text)(key, value, path, tables)


MONTHS = ("Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec")
_READERS = {
    k.TEXT: _reader,
    k.PACKS: _packs,
    k.CHOICE: _choice,
    k.FLAG: _flag,
    k.COUNT: _count,
    k.NUMBER: _number,
    k.DATE: _date,
    k.MONTH: _month,
    k.STOCK: _liquid("stock", "species"),
    k.SPECIES: _liquid("species", "stock"),
    k.GAS: _gas,
    k.LATER: _later,
}
KNOWN_KINDS = frozenset(_READERS) | frozenset(KINDS) | {k.TABLE, k.ROWS}
