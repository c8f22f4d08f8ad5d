"""Breathing rates of the older rule, API Std 2000 5th edition (1998), kept beside the main-body method.

Only the rates that were read or quoted; the long thermal table above 20,000
barrels is not carried. Each rate and its evidence: data/tank/older_venting.csv.
"""

from __future__ import annotations

from functools import lru_cache

import numpy as np

from screener.ground.files import read_table
from screener.tank.vents import BARREL, HOUR, NORMAL_PER_STANDARD_CUBIC_FOOT


@lru_cache(maxsize=1)
def older_rates() -> dict[str, tuple[float, str]]:
    """Rate as printed and its evidence mark, by name."""
    return {
        row["key"]: (float(row["value"]), row["evidence"]) for row in read_table("tank/older_venting.csv")
    }


def _rate(key: str) -> float:
    return older_rates()[key][0]


def _normal_per_cubic_metre(key: str) -> float:
    """SCFH per bbl/h as cubic metres of normal air per cubic metre of liquid. [-]"""
    return _rate(key) * NORMAL_PER_STANDARD_CUBIC_FOOT / BARREL


def inbreathing_liquid_older(draw_rate):
    """Air drawn in while liquid leaves: 5.6 SCFH per bbl/h. draw_rate [m3/s], returns [m3/s of normal air].

    Source: API Std 2000, 5th edition, through Ludwig vol. 1, 3rd ed. [handbook].
    """
    return _normal_per_cubic_metre("liquid_out") * np.asarray(draw_rate, dtype=float)


def outbreathing_liquid_older(fill_rate, volatile):
    """Gas pushed out while liquid enters.

    Parameters
    ----------
    fill_rate : float or array, shape (n,)
        Largest rate into the tank. [m3/s]
    volatile : bool or array of bool, shape (n,)
        Flash point below 37.8 degC and boiling point below 148.9 degC. [-]

    Returns
    -------
    array, shape (n,) or ()
        12 SCFH per bbl/h for volatile liquids, else 6. [m3/s of normal air]

    Source
    ------
    API Std 2000, 5th edition, through Ludwig vol. 1, 3rd ed. [handbook].
    """
    rate = np.where(
        np.asarray(volatile, dtype=bool),
        _normal_per_cubic_metre("liquid_in_volatile"),
        _normal_per_cubic_metre("liquid_in_quiet"),
    )
    return rate * np.asarray(fill_rate, dtype=float)


def inbreathing_thermal_older(tank_volume):
    """Air drawn in while the vapour space cools: 1 SCFH per barrel of tank.

    Parameters
    ----------
    tank_volume : float or array, shape (n,)
        Whole tank. [m3]

    Returns
    -------
    array, shape (n,) or ()
        NaN above 20,000 bbl (3,180 m3), where the long table is not carried. [m3/s of normal air]

    Source
    ------
    API Std 2000, 5th edition, table 2 [quoted]; the bound of 20,000 bbl from memory, unverified.
    """
    volume = np.asarray(tank_volume, dtype=float)
    # One part in 1e9 so that a tank of exactly 20,000 bbl, converted, still counts.
    most = _rate("thermal_capacity_most") * BARREL * (1.0 + 1e-9)
    inside = (volume > 0.0) & (volume <= most)
    per_volume = _rate("thermal_in") * NORMAL_PER_STANDARD_CUBIC_FOOT / BARREL / HOUR
    return per_volume * np.where(inside, volume, np.nan)


def outbreathing_thermal_older(tank_volume, volatile):
    """Gas pushed out while the vapour space warms.

    Parameters
    ----------
    tank_volume : float or array, shape (n,)
        Whole tank. [m3]
    volatile : bool or array of bool, shape (n,)
        Flash point below 37.8 degC. [-]

    Returns
    -------
    array, shape (n,) or ()
        60 % of the in-breathing, all of it for volatile liquids; NaN above 20,000 bbl.
        [m3/s of normal air]

    Source
    ------
    API Std 2000, 5th edition: 60 % through Ludwig vol. 1, 3rd ed. [handbook]; 100 % from memory, unverified.
    """
    volatile = np.asarray(volatile, dtype=bool)
    share = np.where(volatile, _rate("thermal_out_volatile_share"), _rate("thermal_out_quiet_share"))
    return share * inbreathing_thermal_older(tank_volume)
