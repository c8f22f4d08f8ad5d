"""Hottest surface and hottest bulk of the liquid: both editions, the higher one, and their spread."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.tank.day import DailyTemperatures
from screener.tank.temperatures import (
    bulk_temperature_2006,
    bulk_temperature_2020,
    daily_temperatures_2006,
    daily_temperatures_2020,
)


@dataclass(frozen=True)
class HottestSurface:
    """Daily maximum of the liquid surface; every array has the shape of the lanes.

    low, best, high : best is the higher edition; low and high stand one edition difference
        below and above it [K]
    difference : between the editions. Where only one edition holds for the tank it is the difference
        they show for an uninsulated fixed roof in the same weather, zero where there is no daily swing [K]
    edition : '2006', '2020' or '' per lane
    evidence : mark of the edition taken, 'law', 'memory' or ''
    basis : `Basis` of the edition taken; where there is none, the reason
    one_edition : True where the other edition does not hold
    editions : both results in full
    """

    low: np.ndarray
    best: np.ndarray
    high: np.ndarray
    difference: np.ndarray
    edition: np.ndarray
    evidence: np.ndarray
    basis: np.ndarray
    one_edition: np.ndarray
    editions: tuple[DailyTemperatures, DailyTemperatures]

    @property
    def ok(self) -> np.ndarray:
        """Lanes that hold numbers."""
        return np.isfinite(self.best)


def hottest_surface(
    daily_maximum,
    daily_minimum,
    insolation,
    roof_absorptance,
    shell_absorptance,
    *,
    height_over_diameter=None,
    roof="fixed-roof",
    insulation="none",
    bulk_temperature=None,
):
    """Daily maximum of the liquid surface on a design day.

    Parameters
    ----------
    daily_maximum, daily_minimum : float or array, shape (n,)
        Air temperature of the design day. [K]
    insolation : float or array, shape (n,)
        Daily total of the design day on a horizontal plane. [J/m2]
    roof_absorptance, shell_absorptance : float or array, shape (n,)
        Solar absorptance. [-]
    height_over_diameter : float or array, shape (n,), optional
        Shell height over diameter; None or NaN takes the default form of the 2020 edition. [-]
    roof : str or array of str, shape (n,)
        Tank kind as in the case. [-]
    insulation : str or array of str, shape (n,)
        'none', 'shell' or 'full'. [-]
    bulk_temperature : float or array, shape (n,), optional
        Known liquid bulk. Without it each edition estimates the bulk from the mean of the same day,
        as if such days had lasted long enough to warm the whole tank. [K]

    Returns
    -------
    HottestSurface

    Validity
    --------
    As the editions: unheated atmospheric tanks. A layer just under a sunlit steel deck of an external
    floating roof can be hotter than any of this.

    Source
    ------
    AP-42 chapter 7.1, November 2006 (French arrete of 3 October 2010, annex III [law, read]) and
    June 2020 [from memory, unverified]. Taking the higher edition and their difference as spread
    is a rule of this program.
    """
    weather = (daily_maximum, daily_minimum, insolation, roof_absorptance, shell_absorptance)
    old = daily_temperatures_2006(
        *weather, roof=roof, insulation=insulation, bulk_temperature=bulk_temperature
    )
    new = daily_temperatures_2020(
        *weather,
        height_over_diameter=height_over_diameter,
        roof=roof,
        insulation=insulation,
        bulk_temperature=bulk_temperature,
    )
    old_top, new_top = np.broadcast_arrays(old.surface_maximum, new.surface_maximum)
    both = np.isfinite(old_top) & np.isfinite(new_top)
    take_new = np.where(both, new_top > old_top, ~np.isfinite(old_top) & np.isfinite(new_top))
    best = np.where(take_new, new_top, old_top)
    bare = _editions_apart(weather, height_over_diameter, bulk_temperature)
    swing = np.where(take_new, new.vapour_range, old.vapour_range)
    alone = np.where(swing > 0.0, bare, 0.0)
    difference = np.where(np.isfinite(best), np.where(both, np.abs(new_top - old_top), alone), np.nan)
    found = np.isfinite(best)
    edition = np.where(found, np.where(take_new, new.edition, old.edition), "")
    evidence = np.where(found, np.where(take_new, new.evidence, old.evidence), "")
    basis = np.where(take_new, new.basis, old.basis)
    # Where neither holds, the reason that lies further from an answer is told.
    basis = np.where(found, basis, np.maximum(old.basis, new.basis))
    return HottestSurface(
        best - difference,
        best,
        best + difference,
        difference,
        edition,
        evidence,
        basis,
        found & ~both,
        (old, new),
    )


def _editions_apart(weather, height_over_diameter, bulk_temperature):
    """Difference of the editions for a bare fixed roof in the same weather. [K]"""
    old = daily_temperatures_2006(*weather, bulk_temperature=bulk_temperature)
    new = daily_temperatures_2020(
        *weather, height_over_diameter=height_over_diameter, bulk_temperature=bulk_temperature
    )
    return np.abs(new.surface_maximum - old.surface_maximum)


@dataclass(frozen=True)
class HottestBulk:
    """Highest monthly bulk temperature; arrays without the month axis.

    low, best, high : best is the higher edition, low and high one edition difference away [K]
    edition : '2006', '2020' or '' per lane
    month : 0 for the first month given; -1 where there is no answer
    """

    low: np.ndarray
    best: np.ndarray
    high: np.ndarray
    edition: np.ndarray
    month: np.ndarray


def hottest_bulk(monthly_mean, roof_absorptance, shell_absorptance, monthly_insolation=None):
    """Bulk temperature of the hottest month: monthly mean air plus the solar term of each edition.

    Parameters
    ----------
    monthly_mean : array, shape (..., m)
        Mean air temperature of each month, months on the last axis. [K]
    roof_absorptance, shell_absorptance : float or array, shape (...)
        Solar absorptance. [-]
    monthly_insolation : array, shape (..., m), optional
        Mean daily total on a horizontal plane. A month without it has the 2006 term only. [J/m2]

    Returns
    -------
    HottestBulk

    Validity
    --------
    Unheated, uninsulated tanks above ground.

    Source
    ------
    T_B of AP-42 chapter 7.1, November 2006 (French arrete of 3 October 2010, annex III [law, read]) and
    June 2020 [from memory, unverified].
    """
    air = np.asarray(monthly_mean, dtype=float)
    sun = (
        np.full_like(air, np.nan)
        if monthly_insolation is None
        else np.asarray(monthly_insolation, dtype=float)
    )
    roof = np.asarray(roof_absorptance, dtype=float)[..., None]
    shell = np.asarray(shell_absorptance, dtype=float)[..., None]
    old, new = np.broadcast_arrays(
        bulk_temperature_2006(air, 0.5 * (roof + shell)), bulk_temperature_2020(air, shell, sun)
    )
    top = np.fmax(old, new)
    some = np.isfinite(top).any(axis=-1)
    month = np.argmax(np.where(np.isfinite(top), top, -np.inf), axis=-1)

    def pick(values):
        return np.take_along_axis(values, month[..., None], axis=-1)[..., 0]

    best, difference = pick(top), np.abs(np.nan_to_num(pick(new) - pick(old), nan=0.0))
    edition = np.where(some, np.where(pick(new) == best, "2020", "2006"), "")
    return HottestBulk(best - difference, best, best + difference, edition, np.where(some, month, -1))
