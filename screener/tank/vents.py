"""Normal breathing of a storage tank: rates required, as air, and capacity installed.

Flows of air are normal cubic metres (0 degC, 101,325 Pa) per second. Liquid
flows are at tank temperature. The main-body method is that of ISO 28300 and
API Std 2000 (6th and 7th editions), read in published calculation notes that
quote it, not in the standards; evidence 'quoted'.
"""

from __future__ import annotations

from functools import lru_cache

import numpy as np

from screener.ground.constants import ATMOSPHERE, MW_AIR, T_60F, T_NORMAL, R
from screener.ground.errors import DataError
from screener.ground.files import read_table

EVIDENCE = "quoted"
HOUR = 3600.0
MOLAR_VOLUME_NORMAL = R * T_NORMAL / ATMOSPHERE  # ideal gas at 0 degC and 101,325 Pa [m3/mol]
VOLATILE_ABOVE = 5000.0  # true vapour pressure above which filling counts double [Pa]; ISO 28300 as quoted
VOLATILE_FACTOR = 2.0  # the same rule
WARM_STORAGE = 298.15  # 25 degC, step of the in-breathing factor [K]; ISO 28300 as quoted
# 120 degF: above it in an uninsulated vapour space the tables do not apply and the tank needs a review
# of its own; API Std 2000, 5th edition, 4.3, wording on a reseller's excerpt [handbook].
HOTTEST_VAPOUR_SPACE = (120.0 + 459.67) / 1.8

BARREL = 42.0 * 231.0 * 0.0254**3  # 42 US gallons of 231 cubic inches [m3]
NORMAL_PER_STANDARD_CUBIC_FOOT = 0.3048**3 * T_NORMAL / T_60F  # 60 degF and 14.696 psia to 0 degC [m3]


@lru_cache(maxsize=1)
def _bands():
    """Columns of the thermal table as arrays over the latitude bands."""
    rows = read_table("tank/thermal_venting.csv")
    table = {name: np.array([float(row[name]) for row in rows]) for name in rows[0] if name != "evidence"}
    if len(rows) != 3 or not (table["latitude_from"][1:] == table["latitude_to"][:-1]).all():
        raise DataError("tank/thermal_venting.csv", None, "the latitude bands are not three that join")
    return table


def _factor(name, latitude):
    """Factor of the latitude band; NaN where the latitude is unknown or impossible."""
    table = _bands()
    distance = np.abs(np.asarray(latitude, dtype=float))
    known = distance <= 90.0
    # The middle band holds both its ends: below 42, 42 to 58, above 58 degrees.
    low, high = table["latitude_to"][:2]
    band = (distance >= low).astype(int) + (distance > high)
    return np.where(known, table[name][band], np.nan)


def inbreathing_liquid(draw_rate):
    """Air drawn in while liquid leaves.

    Parameters
    ----------
    draw_rate : float or array, shape (n,)
        Largest rate out of the tank. [m3/s]

    Returns
    -------
    array, shape (n,) or ()
        V_ip = V_pe. [m3/s of normal air]

    Source
    ------
    Main-body method of ISO 28300 / API Std 2000, as quoted in published calculation notes.
    """
    rate = np.asarray(draw_rate, dtype=float)
    return np.where(rate >= 0.0, rate, np.nan)


def outbreathing_liquid(fill_rate, true_vapour_pressure):
    """Gas pushed out while liquid enters.

    Parameters
    ----------
    fill_rate : float or array, shape (n,)
        Largest rate into the tank. [m3/s]
    true_vapour_pressure : float or array, shape (n,)
        Of the liquid at its hottest. [Pa]

    Returns
    -------
    array, shape (n,) or ()
        V_op = V_pf up to 5 kPa, twice that above. [m3/s of normal air]

    Validity
    --------
    A feed below its bubble point at tank pressure; a feed above it needs `flashed_vapour_as_air` as well.

    Source
    ------
    Main-body method of ISO 28300 / API Std 2000, as quoted in published calculation notes.
    """
    rate = np.asarray(fill_rate, dtype=float)
    vapour_pressure = np.asarray(true_vapour_pressure, dtype=float)
    factor = np.where(vapour_pressure > VOLATILE_ABOVE, VOLATILE_FACTOR, 1.0)
    return np.where((rate >= 0.0) & (vapour_pressure >= 0.0), factor * rate, np.nan)


def outbreathing_thermal(tank_volume, latitude, insulation_factor=1.0):
    """Gas pushed out while the vapour space warms.

    Parameters
    ----------
    tank_volume : float or array, shape (n,)
        Whole tank, not its vapour space. [m3]
    latitude : float or array, shape (n,)
        North or south. [deg]
    insulation_factor : float or array, shape (n,)
        R_i: 1 for a bare tank. [-]

    Returns
    -------
    array, shape (n,) or ()
        V_OT = Y V^0.9 R_i. [m3/s of normal air]

    Validity
    --------
    Vapour space up to 48.9 degC where it is not insulated.

    Source
    ------
    Main-body method of ISO 28300 / API Std 2000, as quoted in published calculation notes.
    """
    volume = np.asarray(tank_volume, dtype=float)
    volume = np.where(volume > 0.0, volume, np.nan)
    return _factor("Y", latitude) * volume**0.9 * np.asarray(insulation_factor, dtype=float) / HOUR


def inbreathing_thermal(
    tank_volume, latitude, storage_temperature, more_volatile_than_hexane=True, insulation_factor=1.0
):
    """Air drawn in while the vapour space cools, in a rainstorm at worst.

    Parameters
    ----------
    tank_volume : float or array, shape (n,)
        Whole tank, not its vapour space. [m3]
    latitude : float or array, shape (n,)
        North or south. [deg]
    storage_temperature : float or array, shape (n,)
        Of the liquid. [K]
    more_volatile_than_hexane : bool or array of bool, shape (n,)
        True also where it is not known. [-]
    insulation_factor : float or array, shape (n,)
        R_i: 1 for a bare tank. [-]

    Returns
    -------
    array, shape (n,) or ()
        V_IT = C V^0.7 R_i. [m3/s of normal air]

    Validity
    --------
    Vapour space up to 48.9 degC where it is not insulated.

    Source
    ------
    Main-body method of ISO 28300 / API Std 2000, as quoted in published calculation notes.
    """
    volume = np.asarray(tank_volume, dtype=float)
    volume = np.where(volume > 0.0, volume, np.nan)
    temperature = np.asarray(storage_temperature, dtype=float)
    warm, volatile = temperature >= WARM_STORAGE, np.asarray(more_volatile_than_hexane, dtype=bool)
    factor = np.select(
        [volatile & warm, volatile & ~warm, ~volatile & warm],
        [_factor(f"C_{name}", latitude) for name in ("volatile_warm", "volatile_cool", "quiet_warm")],
        _factor("C_quiet_cool", latitude),
    )
    factor = np.where(np.isfinite(temperature), factor, np.nan)
    return factor * volume**0.7 * np.asarray(insulation_factor, dtype=float) / HOUR


def fully_insulated_factor(thickness, conductivity, inside_coefficient=4.0):
    """R_i of a tank insulated all over.

    Parameters
    ----------
    thickness : float or array, shape (n,)
        Of the insulation. [m]
    conductivity : float or array, shape (n,)
        Of the insulation. [W/m/K]
    inside_coefficient : float or array, shape (n,)
        Heat transfer inside the vapour space. [W/m2/K]

    Returns
    -------
    array, shape (n,) or ()
        R_in = 1/(1 + h l/lambda). [-]

    Source
    ------
    ISO 28300 / API Std 2000 as quoted in published calculation notes; h = 4 W/m2/K usual there.
    """
    resistance = np.asarray(inside_coefficient, dtype=float) * np.asarray(thickness, dtype=float)
    return 1.0 / (1.0 + resistance / np.asarray(conductivity, dtype=float))


def partly_insulated_factor(insulated_share, full_factor):
    """R_i of a tank insulated in part.

    Parameters
    ----------
    insulated_share : float or array, shape (n,)
        Insulated over whole surface, 0 to 1. [-]
    full_factor : float or array, shape (n,)
        R_in of `fully_insulated_factor`. [-]

    Returns
    -------
    array, shape (n,) or ()
        Share R_in + (1 - share). [-]

    Source
    ------
    ISO 28300 / API Std 2000 as quoted in published calculation notes.
    """
    share = np.asarray(insulated_share, dtype=float)
    share = np.where((share >= 0.0) & (share <= 1.0), share, np.nan)
    return share * np.asarray(full_factor, dtype=float) + 1.0 - share


def tables_apply(vapour_space_temperature, insulated=False):
    """Whether the thermal tables hold for a vapour space.

    Parameters
    ----------
    vapour_space_temperature : float or array, shape (n,)
        Hottest. [K]
    insulated : bool or array of bool, shape (n,)
        Insulated vapour space. [-]

    Returns
    -------
    array of bool, shape (n,) or ()
        False above 48.9 degC in an uninsulated vapour space, and where the temperature is unknown.

    Source
    ------
    API Std 2000, 5th edition, 4.3, wording on a reseller's excerpt.
    """
    temperature = np.asarray(vapour_space_temperature, dtype=float)
    return (temperature <= HOTTEST_VAPOUR_SPACE) | (
        np.asarray(insulated, dtype=bool) & np.isfinite(temperature)
    )


def flashed_vapour_as_air(molar_flow, molar_mass, temperature):
    """Vapour that a feed gives off, as the air that needs the same pressure drop.

    Parameters
    ----------
    molar_flow : float or array, shape (n,)
        Vapour set free, beta times the feed. [mol/s]
    molar_mass : float or array, shape (n,)
        Of the vapour. [kg/mol]
    temperature : float or array, shape (n,)
        Of the vapour at the vent. [K]

    Returns
    -------
    array, shape (n,) or ()
        n v_N sqrt(M T/(M_air 273.15 K)). [m3/s of normal air]

    Validity
    --------
    Ideal gas, small pressure drop. Zero flow gives zero whatever the vapour would be.

    Source
    ------
    First principles: equal pressure drop through the same opening.
    """
    flow = np.asarray(molar_flow, dtype=float)
    weight = np.asarray(molar_mass, dtype=float) * np.asarray(temperature, dtype=float)
    factor = np.sqrt(np.where(weight > 0.0, weight, np.nan) / (MW_AIR * T_NORMAL))
    none = flow == 0.0
    return np.where(none, 0.0, np.where(flow >= 0.0, flow, np.nan) * MOLAR_VOLUME_NORMAL * factor)


def growth_factor(barometer, vapour_pressure):
    """Growth of the gas volume as air entering or standing in the tank saturates with vapour.

    Parameters
    ----------
    barometer : float or array, shape (n,)
        Absolute. [Pa]
    vapour_pressure : float or array, shape (n,)
        Of the liquid. [Pa]

    Returns
    -------
    array, shape (n,) or ()
        P/(P - Pv); NaN at and above the boiling point, where it has no bound. [-]

    Source
    ------
    Dalton's law.
    """
    barometer = np.asarray(barometer, dtype=float)
    air = barometer - np.asarray(vapour_pressure, dtype=float)
    return barometer / np.where(air > 0.0, air, np.nan)
