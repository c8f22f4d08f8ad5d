"""Oxygen that a vapour needs to burn, purging, and how heavy a vapour is."""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache

import numpy as np

from screener.equilibrium.results import LaneAnswer
from screener.fire.limits import Flammability
from screener.ground.constants import MW_AIR
from screener.ground.errors import InputError
from screener.ground.files import read_table
from screener.ground.status import Status

INERT_GASES = ("nitrogen", "carbon dioxide")
COUNTS_FROM = 0.01  # [-] share of the flammable vapour from which a species counts; own choice


@dataclass(frozen=True)
class OxygenRow:
    """A limiting oxygen concentration as tabled: oxygen [mole fraction], apparatus, evidence, source key."""

    name: str
    inert: str
    oxygen: float
    apparatus: str
    evidence: str
    source: str


@dataclass(frozen=True)
class LimitingOxygen(LaneAnswer):
    """Limiting oxygen of a vapour: oxygen (n,) [-]; rule (n,), the species that sets it; evidence
    (n,) of its value: "quoted", "from memory, unverified" or "estimate"."""

    oxygen: np.ndarray
    rule: np.ndarray
    evidence: np.ndarray
    status: np.ndarray
    residual: np.ndarray


@lru_cache(maxsize=1)
def oxygen_table() -> tuple[OxygenRow, ...]:
    """All tabled limiting oxygen concentrations."""
    return tuple(
        OxygenRow(
            r["name"], r["inert"], float(r["oxygen"]) / 100.0, r["apparatus"], r["evidence"], r["source"]
        )
        for r in read_table("fire/limiting_oxygen.csv")
    )


def _of_species(name: str, inert: str, guess: float) -> tuple[float, str]:
    """Lowest tabled value of a species and its evidence; without one the estimate, LFL times oxygen demand.

    A value for carbon dioxide is replaced by that for nitrogen where only the latter is
    known: it is the lower of the two.
    """
    for gas in dict.fromkeys((inert, "nitrogen")):
        rows = [row for row in oxygen_table() if (row.name, row.inert) == (name, gas)]
        if rows:
            lowest = min(rows, key=lambda row: row.oxygen)
            return lowest.oxygen, lowest.evidence
    return guess, "estimate"


def limiting_oxygen(fluid, y, *, inert: str = "nitrogen", flammability=None) -> LimitingOxygen:
    """Oxygen below which a vapour does not burn however much of it there is.

    Parameters
    ----------
    fluid : Fluid
        Species of the vapour.
    y : array, shape (c,) or (n, c)
        Vapour, any scale: only the shares of its flammable species count. [-]
    inert : str
        "nitrogen" or "carbon dioxide".
    flammability : Flammability, optional
        Limits of the species; those of the tables and the estimate when absent.

    Returns
    -------
    LimitingOxygen
        The lowest value of the species that make up at least one percent of the flammable
        vapour, the species and the evidence. [-]

    Raises
    ------
    InputError
        inert is no known gas.

    Validity
    --------
    Room temperature, atmospheric pressure. Taking the lowest species is on the careful
    side; a margin below it is the user's rule to set.

    Source
    ------
    data/fire/limiting_oxygen.csv, mark by mark; without a row LFL times the oxygen
    demand (rule of thumb of textbooks, from memory, unverified).
    """
    if inert not in INERT_GASES:
        raise InputError(
            "inert", inert, f"'{inert}' is not an inert gas of the table", f"one of {INERT_GASES}"
        )
    limits = flammability or Flammability.of(fluid)
    guess = np.where(limits.burns, limits.LFL, np.nan) * limits.oxygen
    known = [_of_species(name, inert, g) for name, g in zip(fluid.names, guess, strict=True)]
    value = np.array([v for v, _ in known])
    y = np.atleast_2d(np.asarray(y, dtype=float))
    fuel = np.where(limits.burns, y, 0.0)
    with np.errstate(all="ignore"):
        counts = fuel / fuel.sum(axis=1, keepdims=True) >= COUNTS_FROM
    lacking = (counts & ~np.isfinite(value)).any(axis=1)
    burning = counts.any(axis=1)
    status = np.where(
        burning, np.where(lacking, int(Status.NO_PARAMETERS), int(Status.CONVERGED)), int(Status.NO_SOLUTION)
    )
    status[~np.isfinite(y).all(axis=1)] = Status.BAD_INPUT
    ok = status == Status.CONVERGED
    at = np.argmin(np.where(counts, value, np.inf), axis=1)
    names, marks = np.array(fluid.names, dtype=object), np.array([mark for _, mark in known], dtype=object)
    return LimitingOxygen(
        np.where(ok, value[at], np.nan), np.where(ok, names[at], ""), np.where(ok, marks[at], ""), status,
        np.where(ok, 0.0, np.nan),
    )  # fmt: skip


def purge_volumes(start, target, *, incoming=0.0, mixing=1.0) -> np.ndarray:
    """Volumes of purge gas, counted in volumes of the space, that bring a share down by dilution.

    Parameters
    ----------
    start : float or array, shape (n,)
        Mole fraction at the start, of oxygen or of vapour. [-]
    target : float or array, shape (n,)
        Mole fraction to reach. [-]
    incoming : float or array, shape (n,)
        Mole fraction in the purge gas. [-]
    mixing : float or array, shape (n,)
        1 for a space mixed at every moment, below 1 where part of the purge gas leaves unmixed. [-]

    Returns
    -------
    array, shape (n,)
        ln((start - incoming)/(target - incoming)) / mixing; 0 where the target is already
        met; NaN where the purge gas itself does not meet it. [-]

    Validity
    --------
    No vapour from liquid left in the space: a wet tank goes on giving it off.

    Source
    ------
    Balance of a stirred volume.
    """
    start, target, incoming, mixing = np.broadcast_arrays(
        *(np.atleast_1d(np.asarray(v, dtype=float)) for v in (start, target, incoming, mixing))
    )
    with np.errstate(all="ignore"):
        n = np.log((start - incoming) / (target - incoming)) / mixing
    usable = (target > incoming) & (mixing > 0.0) & (mixing <= 1.0) & np.isfinite(start)
    return np.where(usable, np.where(start <= target, 0.0, n), np.nan)


def vapour_density_ratio(fluid, y) -> np.ndarray:
    """Density of a pure vapour over that of air at the same temperature and pressure.

    Parameters
    ----------
    fluid : Fluid
        Species of the vapour.
    y : array, shape (c,) or (n, c)
        Vapour without air, any scale. [-]

    Returns
    -------
    array, shape (n,)
        Mean molar mass over that of air. A mixture with air lies between it and 1. [-]

    Source
    ------
    Ideal gases; molar mass of air of `ground.constants`.
    """
    y = np.atleast_2d(np.asarray(y, dtype=float))
    with np.errstate(all="ignore"):
        return (y @ fluid.MW) / y.sum(axis=1) / MW_AIR
