"""Limits of fuels beside the volatility classes: information about a fuel, never a judgement of a tank."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.ground.constants import PSI, ZERO_CELSIUS
from screener.ground.files import read_table

# A value as the tables print it, in SI.
_SI = {
    "kPa": lambda v: 1000.0 * v,
    "psi": lambda v: PSI * v,
    "degC": lambda v: v + ZERO_CELSIUS,
    "%": lambda v: v / 100.0,
}


@dataclass(frozen=True)
class FuelLimit:
    """One upper limit: where (standard or region), what, its value in SI, and how it is known."""

    where: str
    what: str
    high: float
    evidence: str
    source: str
    edition: str


@dataclass(frozen=True)
class EthanolFuelClass:
    """A class of ethanol fuel: span of vapour pressure [Pa], whether the fuel lies in it, and how it is known."""

    name: str
    low: float
    high: float
    met: bool
    evidence: str
    source: str


def common_limits(standard: str) -> tuple[FuelLimit, ...]:
    """Limits that are the same in every volatility class of a standard.

    Parameters
    ----------
    standard : str
        "ASTM D4814", "EN 228 E5" or "EN 228 E10".

    Returns
    -------
    tuple of FuelLimit
        Final boiling point [K] and residue [-]; empty for another standard.

    Source
    ------
    data/volatility/common_limits.csv, a source and an evidence mark per limit.
    """
    rows = [r for r in read_table("volatility/common_limits.csv") if r["standard"] == standard]
    return tuple(_limit(r["standard"], r["quantity"], r) for r in rows)


def season_limits() -> tuple[FuelLimit, ...]:
    """Legal limits of gasoline vapour pressure by season and place.

    Returns
    -------
    tuple of FuelLimit
        Vapour pressures. [Pa]

    Source
    ------
    data/volatility/season_limits.csv, a source and an evidence mark per limit.
    """
    return tuple(_limit(r["region"], r["rule"], r) for r in read_table("volatility/season_limits.csv"))


def _limit(where, what, row):
    high = _SI[row["unit"]](float(row["high"]))
    return FuelLimit(where, what, high, row["evidence"], row["source"], row["edition"])


def ethanol_fuel_classes(vapour_pressure: float, ethanol: float) -> tuple[EthanolFuelClass, ...]:
    """Volatility classes of ethanol fuel blends (ASTM D5798) against a fuel.

    Parameters
    ----------
    vapour_pressure : float
        Dry vapour pressure equivalent. [Pa]
    ethanol : float
        Volume fraction of ethanol. [-]

    Returns
    -------
    tuple of EthanolFuelClass
        One per class; a fuel outside 51 to 83 % ethanol, or a value that is no number, meets none.

    Source
    ------
    data/volatility/ethanol_fuel_classes.csv, a source and an evidence mark per class.
    """
    found = []
    for r in read_table("volatility/ethanol_fuel_classes.csv"):
        low, high = PSI * float(r["low_psi"]), PSI * float(r["high_psi"])
        rich = float(r["ethanol_low"]) <= 100.0 * ethanol <= float(r["ethanol_high"])
        met = bool(np.isfinite(vapour_pressure)) and rich and low <= vapour_pressure <= high
        found.append(EthanolFuelClass(r["class"], low, high, met, r["evidence"], r["source"]))
    return tuple(found)
