"""Capacity of the vents installed. Pressures here are differences from the barometer."""

from __future__ import annotations

import numpy as np


def capacity_at(capacity, rated_above_barometer, wanted_above_barometer, set_above_barometer):
    """Capacity of a vent at a pressure below the one it is rated at.

    Parameters
    ----------
    capacity : float or array, shape (n,)
        At the rating pressure. [m3/s of normal air]
    rated_above_barometer : float or array, shape (n,)
        Overpressure, or vacuum as a positive number, of the rating. [Pa]
    wanted_above_barometer : float or array, shape (n,)
        Overpressure or vacuum asked about. [Pa]
    set_above_barometer : float or array, shape (n,)
        Opening overpressure or vacuum. [Pa]

    Returns
    -------
    array, shape (n,) or ()
        Capacity times sqrt(wanted/rated); zero below the setting; NaN above the rating pressure and where
        a number is missing. [m3/s of normal air]

    Validity
    --------
    Caution: a vent near its setting is only partly lifted, so the square root is an upper bound there.
    The figure is for information; the capacity at its rating pressure is what is judged. Never scaled up.

    Source
    ------
    Incompressible flow through a fixed opening.
    """
    capacity, rated, wanted, setting = (
        np.asarray(value, dtype=float)
        for value in (capacity, rated_above_barometer, wanted_above_barometer, set_above_barometer)
    )
    stated = (capacity >= 0.0) & (rated > 0.0) & (setting >= 0.0) & (wanted >= 0.0) & (wanted <= rated)
    share = np.sqrt(np.where(stated, wanted, np.nan) / np.where(rated > 0.0, rated, np.nan))
    return np.where(stated & (wanted < setting), 0.0, capacity * share)


def rated_capacity(capacity, rated_above_barometer, count, out_of_service=0):
    """Capacity of a group of like vents that is to be judged.

    Parameters
    ----------
    capacity : float or array, shape (n,)
        Of one vent. [m3/s of normal air]
    rated_above_barometer : float or array, shape (n,)
        Overpressure or vacuum of the rating. [Pa]
    count, out_of_service : int or array, shape (n,)
        Vents fitted, and how many of them are shut. [-]

    Returns
    -------
    array, shape (n,) or ()
        NaN where the rating pressure is unknown: such a capacity says nothing. [m3/s of normal air]

    Source
    ------
    Rule of this program.
    """
    capacity, rated = np.asarray(capacity, dtype=float), np.asarray(rated_above_barometer, dtype=float)
    working = np.maximum(np.asarray(count, dtype=float) - np.asarray(out_of_service, dtype=float), 0.0)
    return np.where((rated > 0.0) & (capacity >= 0.0), capacity * working, np.nan)


def pressure_while_venting(set_above_barometer, rated_above_barometer):
    """Setting plus accumulation: the tank pressure at which the vents pass their rated capacity.

    Parameters
    ----------
    set_above_barometer : float or array, shape (n,)
        Opening overpressure, or vacuum as a positive number. [Pa]
    rated_above_barometer : float or array, shape (n,)
        Overpressure or vacuum of the rating. [Pa]

    Returns
    -------
    array, shape (n,) or ()
        The rating pressure; NaN where it is unknown or lies below the setting. [Pa]

    Source
    ------
    Definition: accumulation is what the pressure rises above the setting at full flow.
    """
    setting, rated = (
        np.asarray(set_above_barometer, dtype=float),
        np.asarray(rated_above_barometer, dtype=float),
    )
    return np.where((setting >= 0.0) & (rated >= setting), rated, np.nan)


def accumulation(set_above_barometer, rated_above_barometer):
    """Rise of the pressure above the setting at rated capacity. All in [Pa]; NaN where unknown."""
    return pressure_while_venting(set_above_barometer, rated_above_barometer) - np.asarray(
        set_above_barometer, dtype=float
    )
