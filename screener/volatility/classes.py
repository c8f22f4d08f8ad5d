"""Which volatility class a gasoline falls in: information about the fuel, never a judgement."""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache

import numpy as np

from screener.ground.constants import ZERO_CELSIUS
from screener.ground.errors import UnknownName
from screener.ground.files import read_table

# How a value in SI reads in the unit of the tables.
_SHOWN = {
    "kPa": lambda v: v / 1000.0,
    "degC": lambda v: v - ZERO_CELSIUS,
    "%": lambda v: 100.0 * v,
    "-": lambda v: v,
}
_INDEX_DEGC = ("driveability index",)  # already in degC of the index, no offset


@dataclass(frozen=True)
class ClassLimit:
    """One limit of one class. low and high in `unit`, None where there is none."""

    standard: str
    name: str
    quantity: str
    low: float | None
    high: float | None
    unit: str
    evidence: str
    source: str
    edition: str

    def shown(self, value: float) -> float:
        """A value in SI as the table's unit has it."""
        return value if self.quantity in _INDEX_DEGC else _SHOWN[self.unit](value)

    def holds(self, value: float) -> bool:
        """Whether the value [SI] lies inside; a value that is no number never does."""
        v = self.shown(value)
        above = self.low is None or v >= self.low
        return bool(np.isfinite(v)) and above and (self.high is None or v <= self.high)


@dataclass(frozen=True)
class ClassMatch:
    """The limits of one class against one fuel.

    name of the class, met: every limit whose quantity was given holds, missed:
    sentences for those that do not, missing: quantities the class limits that were not
    given, evidence: the weakest mark among the limits used ('quoted' or 'memory').
    """

    standard: str
    name: str
    met: bool
    missed: tuple[str, ...]
    missing: tuple[str, ...]
    evidence: str
    edition: str


@lru_cache(maxsize=1)
def class_limits() -> tuple[ClassLimit, ...]:
    """All limits of all classes."""

    def number(text):
        return float(text) if text else None

    return tuple(
        ClassLimit(
            r["standard"],
            r["class"],
            r["quantity"],
            number(r["low"]),
            number(r["high"]),
            r["unit"],
            r["evidence"],
            r["source"],
            r["edition"],
        )
        for r in read_table("volatility/classes.csv")
    )


def class_standards() -> tuple[str, ...]:
    """Standards and grades with a class table.

    Returns
    -------
    tuple of str
        In the order of the table.

    Source
    ------
    data/volatility/classes.csv, a source and an evidence mark per limit.
    """
    return tuple(dict.fromkeys(limit.standard for limit in class_limits()))


def volatility_classes(standard: str, values: dict[str, float]) -> tuple[ClassMatch, ...]:
    """Every class of a standard against the figures of a fuel, in the order of the table.

    Parameters
    ----------
    standard : str
        "ASTM D4814", "EN 228 E5" or "EN 228 E10".
    values : dict of str to float
        Figures in SI under the names of the table: "vapour pressure" [Pa], "T10" [K],
        "T50" [K], "T90" [K], "E70" [-], "E100" [-], "E150" [-], "vapour lock index" [-],
        "driveability index" [-]. Missing ones are listed, not assumed.

    Returns
    -------
    tuple of ClassMatch
        One per class.

    Raises
    ------
    UnknownName
        No class table has that name.

    Source
    ------
    data/volatility/classes.csv, a source and an evidence mark per limit.
    """
    if standard not in class_standards():
        raise UnknownName("standard", standard, "class table", class_standards())
    grouped: dict[str, list[ClassLimit]] = {}
    for limit in class_limits():
        if limit.standard == standard:
            grouped.setdefault(limit.name, []).append(limit)
    return tuple(_match(limits, values) for limits in grouped.values())


def _match(limits: list[ClassLimit], values: dict[str, float]) -> ClassMatch:
    used = [limit for limit in limits if limit.quantity in values]
    missed = tuple(_sentence(limit, values) for limit in used if not limit.holds(values[limit.quantity]))
    return ClassMatch(
        standard=limits[0].standard,
        name=limits[0].name,
        met=bool(used) and not missed,
        missed=missed,
        missing=tuple(limit.quantity for limit in limits if limit.quantity not in values),
        evidence="memory" if any(limit.evidence == "memory" for limit in used) else "quoted",
        edition=limits[0].edition,
    )


def _sentence(limit: ClassLimit, values: dict[str, float]) -> str:
    low, high = ("" if edge is None else f"{edge:g}" for edge in (limit.low, limit.high))
    span = f"{low} to {high}".strip()
    return f"{limit.quantity} {limit.shown(values[limit.quantity]):.1f}, class {span} {limit.unit}"


def ethanol_allowance(ethanol) -> np.ndarray:
    """Excess over 60 kPa that EU law lets petrol with bioethanol have in summer.

    Parameters
    ----------
    ethanol : float or array, shape (n,)
        Volume fraction of ethanol. [-]

    Returns
    -------
    array, shape (n,)
        Permitted excess; NaN above 10 % and below 0. [Pa]

    Source
    ------
    Directive 98/70/EC annex III as amended; straight lines between its points.
    """
    rows = read_table("volatility/ethanol_allowance.csv")
    percent = np.array([float(r["ethanol_percent"]) for r in rows])
    excess = np.array([1000.0 * float(r["excess_kPa"]) for r in rows])
    asked = 100.0 * np.atleast_1d(np.asarray(ethanol, float))
    # Rounding of a share must not push 10 % over the end of the table.
    inside = (asked >= 0.0) & (asked <= percent[-1] + 1e-9)
    return np.where(inside, np.interp(asked, percent, excess), np.nan)


def vapour_lock_classes(T_20: float) -> tuple[tuple[str, float, bool, str], ...]:
    """Vapour-lock protection classes with their lowest T(V/L=20) and whether the fuel reaches it.

    Parameters
    ----------
    T_20 : float
        Temperature at a vapour-liquid ratio of 20. [K]

    Returns
    -------
    tuple of (class, lowest temperature [K], reached, evidence)
        In the order of the table.

    Source
    ------
    data/volatility/vapour_lock_classes.csv, a source and an evidence mark per row.
    """
    return tuple(
        (
            r["class"],
            float(r["low"]) + ZERO_CELSIUS,
            bool(T_20 >= float(r["low"]) + ZERO_CELSIUS),
            r["evidence"],
        )
        for r in read_table("volatility/vapour_lock_classes.csv")
    )
