"""Hazard classes of a liquid by flash point and boiling point, each text with its own boiling point."""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache
from itertools import product as corners

import numpy as np

from screener.ground.constants import ZERO_CELSIUS
from screener.ground.errors import DataError, UnknownName
from screener.ground.files import read_table

# A computed initial boiling point this close to a cut-off leaves the category open: the guidance to CLP
# annex I 2.6.4.2.1 asks of a calculation method a mean error below 5 degC there (read in a copy of it). [K]
BOILING_DOUBT = 5.0
HEATED_WITHIN = 30.0 / 1.8  # [K] 30 degF below the flash point; 29 CFR 1910.106(a)(19)(iii)
SAME = 6  # decimals of a kelvin: 60 degC and 140 degF are one temperature
FLASH_100F = (100.0 + 459.67) / 1.8  # [K]
NOT_CLASSED = "not classed"
UNKNOWN = "unknown"


@dataclass(frozen=True)
class ClassRule:
    """One class of one text: flash and boiling point [K] from and to, None where open; _counts tells
    whether the limit itself belongs to the class."""

    system: str
    name: str
    product: str
    flash: tuple[float | None, bool, float | None, bool]
    boiling: tuple[float | None, bool, float | None, bool]
    evidence: str
    source: str


@dataclass(frozen=True)
class BoilingRule:
    """What a text takes as boiling point: point "initial", "10 %" or "20 %", in words, evidence."""

    system: str
    point: str
    means: str
    evidence: str


@dataclass(frozen=True)
class HazardClass:
    """Classes (n,) of text after one system: one class, or "category 1 or 2" where the doubt of the
    boiling or flash point leaves it open, "not classed" above the highest, "unknown" where an
    input is missing. boiling (n,) [K] the boiling point used, boiling_rule what it is;
    evidence the weaker mark of class and boiling point."""

    system: str
    name: np.ndarray
    boiling: np.ndarray
    boiling_rule: BoilingRule
    evidence: str


@lru_cache(maxsize=1)
def class_rules() -> tuple[ClassRule, ...]:
    """All classes of all texts."""
    return tuple(_rule(line, row) for line, row in enumerate(read_table("fire/hazard_classes.csv"), start=2))


def _rule(line: int, row) -> ClassRule:
    to_kelvin = {
        "degC": lambda t: t + ZERO_CELSIUS,
        "degF": lambda t: (t + 459.67) / 1.8,
    }.get(row["unit"])
    if to_kelvin is None:
        raise DataError("fire/hazard_classes.csv", line, f"unit '{row['unit']}'")

    def bound(low, low_counts, high, high_counts):
        return (
            to_kelvin(float(row[low])) if row[low] else None, row[low_counts] == "yes",
            to_kelvin(float(row[high])) if row[high] else None, row[high_counts] == "yes",
        )  # fmt: skip

    return ClassRule(
        row["system"], row["class"], row["product"],
        bound("flash_from", "from_counts", "flash_to", "to_counts"),
        bound("boiling_from", "boiling_from_counts", "boiling_to", "boiling_to_counts"),
        row["evidence"], row["source"],
    )  # fmt: skip


@lru_cache(maxsize=1)
def boiling_rules() -> dict[str, BoilingRule]:
    """What each text takes as boiling point, by system."""
    return {
        r["system"]: BoilingRule(r["system"], r["point"], r["means"], r["evidence"])
        for r in read_table("fire/boiling_points.csv")
    }


def hazard_systems() -> tuple[str, ...]:
    """Names of the texts on hazard classes.

    Returns
    -------
    tuple of str
        In the order of the table.

    Source
    ------
    data/fire/hazard_classes.csv.
    """
    return tuple(dict.fromkeys(rule.system for rule in class_rules()))


def hazard_class(
    system: str, T_flash, *, initial=np.nan, at_10=np.nan, at_20=np.nan, constant=np.nan,
    boiling_doubt: float = BOILING_DOUBT, flash_doubt: float = 0.0, product: str = "",
) -> HazardClass:  # fmt: skip
    """Hazard class of a liquid after one text.

    Parameters
    ----------
    system : str
        One of `hazard_systems()`.
    T_flash : float or array, shape (n,)
        Closed-cup flash point. [K]
    initial : float or array, shape (n,)
        Initial boiling point. [K]
    at_10 : float or array, shape (n,)
        10 % point of ASTM D86. [K]
    at_20 : float or array, shape (n,)
        20 % point of ASTM D86. [K]
    constant : float or array, shape (n,)
        Boiling point of a pure liquid: known well, so it goes before the points of a
        mixture and carries no doubt. [K]
    boiling_doubt : float
        Half width in which a boiling point of a mixture leaves the class open. [K]
    flash_doubt : float
        The same of the flash point. [K]
    product : str
        "gas oil" for the note of EU CLP on gas oils, diesel and light heating oils.

    Returns
    -------
    HazardClass
        One class or "A or B" a lane, and the boiling point that was used.

    Raises
    ------
    UnknownName
        No such system.

    Validity
    --------
    What a text says about a flash point; no legal advice.

    Source
    ------
    data/fire/hazard_classes.csv and boiling_points.csv, row by row.
    """
    if system not in boiling_rules():
        raise UnknownName("system", system, "hazard class system", boiling_rules())
    rule = boiling_rules()[system]
    points = {"initial": initial, "10 %": at_10, "20 %": at_20}
    T_flash, boiling, pure = np.broadcast_arrays(
        *(np.atleast_1d(np.asarray(v, dtype=float)) for v in (T_flash, points[rule.point], constant))
    )
    known = np.isfinite(pure)
    boiling = np.where(known, pure, boiling)
    rules = [r for r in class_rules() if r.system == system and r.product in ("", product)]
    member = np.zeros((len(rules), T_flash.size), dtype=bool)
    classed = np.ones(T_flash.size, dtype=bool)
    for df, db in corners((0.0, -flash_doubt, flash_doubt), (0.0, -boiling_doubt, boiling_doubt)):
        here = np.array([_holds(r, T_flash + df, boiling + np.where(known, 0.0, db)) for r in rules])
        member |= here
        classed &= here.any(axis=0)
    missing = ~np.isfinite(T_flash) | (_needs_boiling(rules, T_flash, flash_doubt) & ~np.isfinite(boiling))
    names = [_joined(rules, member[:, i], classed[i], missing[i]) for i in range(T_flash.size)]
    marks = {r.evidence for r in rules} | {rule.evidence}
    evidence = "quoted" if marks == {"quoted"} else "from memory, unverified"
    return HazardClass(system, np.array(names, dtype=object), boiling, rule, evidence)


def _within(value, low, low_counts, high, high_counts):
    inside, value = np.ones(value.shape, dtype=bool), np.round(value, SAME)
    low, high = (None if v is None else round(v, SAME) for v in (low, high))
    if low is not None:
        inside &= (value >= low) if low_counts else (value > low)
    if high is not None:
        inside &= (value <= high) if high_counts else (value < high)
    return inside


def _holds(rule: ClassRule, flash, boiling):
    """Mask (n,) of the lanes inside a class."""
    return _within(flash, *rule.flash) & _within(boiling, *rule.boiling)


def _needs_boiling(rules, flash, doubt):
    """Mask (n,) of the lanes whose class depends on the boiling point."""
    asking = [r for r in rules if r.boiling[0] is not None or r.boiling[2] is not None]
    return np.any(
        [_within(flash - doubt, *r.flash) | _within(flash + doubt, *r.flash) for r in asking], axis=0
    )


def _joined(rules, member, classed, missing) -> str:
    """The classes of one lane in words; "category 1 or 2" rather than the word twice."""
    if missing:
        return UNKNOWN
    names = [r.name for r, is_member in zip(rules, member, strict=True) if is_member]
    if not classed:
        names.append(NOT_CLASSED)
    first = names[0]
    return " or ".join(
        [first, *(n.removeprefix("category ") if first.startswith("category") else n for n in names[1:])]
    )


def handled_as_warmer(T_flash, T) -> np.ndarray:
    """Whether a liquid is heated so near its flash point that 29 CFR 1910.106 treats it one step up.

    Parameters
    ----------
    T_flash : float or array, shape (n,)
        Closed-cup flash point. [K]
    T : float or array, shape (n,)
        Temperature it is heated to. [K]

    Returns
    -------
    array of bool, shape (n,)
        True for category 3 with a flash point of 100 degF or more, and for category 4, within
        30 degF of the flash point or above.

    Source
    ------
    29 CFR 1910.106(a)(19)(iii) and (iv), as quoted on a laboratory-safety list.
    """
    T_flash, T = np.broadcast_arrays(*(np.atleast_1d(np.asarray(v, dtype=float)) for v in (T_flash, T)))
    highest = (199.4 + 459.67) / 1.8
    with np.errstate(invalid="ignore"):
        return (T_flash >= FLASH_100F) & (T_flash <= highest) & (T >= T_flash - HEATED_WITHIN)


def above_flash_point(T, T_flash) -> np.ndarray:
    """How far a stored liquid is above its flash point.

    Parameters
    ----------
    T : float or array, shape (n,)
        Temperature of the liquid surface. [K]
    T_flash : float or array, shape (n,)
        Closed-cup flash point. [K]

    Returns
    -------
    array, shape (n,)
        T less the flash point: zero and above, the vapour space can burn. [K]

    Source
    ------
    Definition of the flash point.
    """
    return np.atleast_1d(np.asarray(T, dtype=float) - np.asarray(T_flash, dtype=float))


def static_class(T_flash, vapour_pressure) -> np.ndarray:
    """Class of a liquid for static electricity in loading.

    Parameters
    ----------
    T_flash : float or array, shape (n,)
        Closed-cup flash point. [K]
    vapour_pressure : float or array, shape (n,)
        Reid vapour pressure. [Pa]

    Returns
    -------
    array of str, shape (n,)
        "low", "intermediate" or "high vapour pressure"; "unknown" where an input is missing.

    Source
    ------
    API RP 2003 as quoted: data/fire/static_classes.csv.
    """
    T_flash, P = np.broadcast_arrays(
        *(np.atleast_1d(np.asarray(v, dtype=float)) for v in (T_flash, vapour_pressure))
    )
    found = np.full(T_flash.shape, UNKNOWN, dtype=object)
    for row in read_table("fire/static_classes.csv"):
        low, below, above, to = (
            float(row[k]) if row[k] else None
            for k in ("flash_from", "flash_below", "pressure_above", "pressure_to")
        )
        found[_within(T_flash, low, True, below, False) & _within(P, above, False, to, True)] = row["class"]
    found[~np.isfinite(T_flash)] = UNKNOWN
    return found
