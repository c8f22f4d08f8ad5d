"""Liquid temperatures of a storage tank on a day, by two editions of one published method.

The method is chapter 7.1 of the US emission-factor handbook AP-42. The
November 2006 edition is repeated line by line in SI by French law (arrete of
3 October 2010, NOR DEVP1025848A, annex III), which was read; evidence 'law'.
The June 2020 edition is written from memory, unverified; evidence 'memory'.

Both come from a steady energy balance, so they are means over many days. Fed
with a design day they give the surface after several such days in a row.
"""

from __future__ import annotations

import numpy as np

from screener.tank.day import COVERED_FLOATING_ROOFS, Basis, day_lanes, finished

# One Btu/ft2 in J/m2 (1055.05585262 / 0.09290304, exact units) and one degree Rankine in kelvin.
BTU_PER_SQUARE_FOOT = 1055.05585262 / 0.09290304
RANKINE = 1.0 / 1.8
_PER_SUN = RANKINE / BTU_PER_SQUARE_FOOT  # turns a coefficient [R ft2/Btu] into [K m2/J]

EVIDENCE_2006 = "law"
EVIDENCE_2020 = "memory"


def bulk_temperature_2006(mean_air_temperature, solar_absorptance):
    """Liquid bulk temperature, November 2006 edition.

    Parameters
    ----------
    mean_air_temperature : float or array, shape (n,)
        Mean of the air over the period. [K]
    solar_absorptance : float or array, shape (n,)
        Mean of roof and shell. [-]

    Returns
    -------
    array, shape (n,) or ()
        T_B = T_AA + 6 alpha - 1 in degrees Rankine, turned into kelvin. [K]

    Validity
    --------
    Unheated, uninsulated tanks above ground.

    Source
    ------
    French arrete of 3 October 2010, annex III [law, read]: T_AM + 3.33 alpha - 0.55 in kelvin.
    """
    air = np.asarray(mean_air_temperature, dtype=float)
    return air + (6.0 * np.asarray(solar_absorptance, dtype=float) - 1.0) * RANKINE


def bulk_temperature_2020(mean_air_temperature, shell_absorptance, insolation):
    """Liquid bulk temperature, June 2020 edition.

    Parameters
    ----------
    mean_air_temperature : float or array, shape (n,)
        Mean of the air over the period. [K]
    shell_absorptance : float or array, shape (n,)
        Solar absorptance of the shell. [-]
    insolation : float or array, shape (n,)
        Daily total on a horizontal plane. [J/m2]

    Returns
    -------
    array, shape (n,) or ()
        T_B = T_AA + 0.003 alpha_S I (degrees Rankine, Btu/ft2), turned into kelvin. [K]

    Validity
    --------
    Unheated tanks above ground.

    Source
    ------
    AP-42 chapter 7.1, June 2020, equation 1-31 [from memory, unverified].
    """
    sun = np.asarray(shell_absorptance, dtype=float) * np.asarray(insolation, dtype=float)
    return np.asarray(mean_air_temperature, dtype=float) + 0.003 * _PER_SUN * sun


def daily_temperatures_2006(
    daily_maximum,
    daily_minimum,
    insolation,
    roof_absorptance,
    shell_absorptance,
    *,
    roof="fixed-roof",
    insulation="none",
    bulk_temperature=None,
):
    """Surface, bulk and vapour range of a day, November 2006 edition.

    Parameters
    ----------
    daily_maximum, daily_minimum : float or array, shape (n,)
        Air temperature. [K]
    insolation : float or array, shape (n,)
        Daily total on a horizontal plane. [J/m2]
    roof_absorptance, shell_absorptance : float or array, shape (n,)
        Solar absorptance; the mean of the two is used. [-]
    roof : str or array of str, shape (n,)
        Tank kind as in the case. [-]
    insulation : str or array of str, shape (n,)
        'none', 'shell' or 'full'. [-]
    bulk_temperature : float or array, shape (n,), optional
        Known liquid bulk; NaN or None lets the edition estimate it. [K]

    Returns
    -------
    DailyTemperatures

    Validity
    --------
    Uninsulated, unheated tanks. For floating roofs the edition gives the mean surface only; the swing
    of a fixed roof is then an upper bound and the lane says so.

    Source
    ------
    French arrete of 3 October 2010, annex III [law, read]; coefficients 0.44, 0.56, 0.0079, 0.72, 0.028
    in degrees Rankine and Btu/ft2, equal to the printed SI ones within their digits.
    """
    d = day_lanes(
        daily_maximum,
        daily_minimum,
        insolation,
        roof_absorptance,
        shell_absorptance,
        roof,
        insulation,
        bulk_temperature,
    )
    alpha = 0.5 * (d.roof_alpha + d.shell_alpha)
    bulk = np.where(np.isfinite(d.bulk), d.bulk, bulk_temperature_2006(d.mean, alpha))
    surface = 0.44 * d.mean + 0.56 * bulk + 0.0079 * _PER_SUN * alpha * d.sun
    swing = 0.72 * d.range + 0.028 * _PER_SUN * alpha * d.sun
    basis = np.where(
        d.basis == Basis.METHOD, np.where(d.insulation == "none", d.basis, Basis.NOT_FOR_INSULATED), d.basis
    )
    return finished("2006", EVIDENCE_2006, d, basis, bulk, surface, np.full_like(surface, np.nan), swing)


def daily_temperatures_2020(
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
    """Surface, bulk and vapour temperatures of a day, June 2020 edition.

    Parameters
    ----------
    daily_maximum, daily_minimum : float or array, shape (n,)
        Air temperature. [K]
    insolation : float or array, shape (n,)
        Daily total on a horizontal plane. [J/m2]
    roof_absorptance, shell_absorptance : float or array, shape (n,)
        Solar absorptance. [-]
    height_over_diameter : float or array, shape (n,), optional
        Shell height over diameter for the general form; None or NaN, and every horizontal tank,
        takes the default form with its rounded coefficients. [-]
    roof : str or array of str, shape (n,)
        Tank kind as in the case. [-]
    insulation : str or array of str, shape (n,)
        'none', 'shell' (bare roof) or 'full'. [-]
    bulk_temperature : float or array, shape (n,), optional
        Known liquid bulk; NaN or None lets the edition estimate it. A heated tank needs it. [K]

    Returns
    -------
    DailyTemperatures

    Validity
    --------
    Unheated tanks above ground unless the bulk is given. External floating roofs: no equation here.

    Source
    ------
    AP-42 chapter 7.1, June 2020, equations 1-6, 1-27, 1-31, 1-32 and their default, insulated and
    floating-roof forms [from memory, unverified].
    """
    d = day_lanes(
        daily_maximum,
        daily_minimum,
        insolation,
        roof_absorptance,
        shell_absorptance,
        roof,
        insulation,
        bulk_temperature,
    )
    bulk = np.where(np.isfinite(d.bulk), d.bulk, bulk_temperature_2020(d.mean, d.shell_alpha, d.sun))
    ratio = (
        np.full_like(bulk, np.nan)
        if height_over_diameter is None
        else (np.broadcast_to(np.asarray(height_over_diameter, dtype=float), bulk.shape).copy())
    )
    ratio[(d.roof == "horizontal") | ~(ratio > 0.0)] = np.nan
    surface, vapour, swing = _default_form(d, bulk)
    for mask, form in (
        (np.isfinite(ratio), _general_form(d, bulk, ratio)),
        (np.isin(d.roof, COVERED_FLOATING_ROOFS), _covered_floating_form(d, bulk)),
        (d.insulation == "shell", _insulated_shell_form(d, bulk)),
        (d.insulation == "full", (bulk, bulk, np.zeros_like(bulk))),
    ):
        surface, vapour, swing = (
            np.where(mask, new, old) for new, old in zip(form, (surface, vapour, swing))
        )
    external = (d.basis == Basis.METHOD) & (d.roof == "external-floating-roof") & (d.insulation != "full")
    basis = np.where(external, Basis.NO_EQUATION, d.basis)
    return finished("2020", EVIDENCE_2020, d, basis, bulk, surface, vapour, swing)


def _default_form(d, bulk):
    """Rounded coefficients for a shell half as high as wide."""
    alpha_sun = 0.5 * (d.roof_alpha + d.shell_alpha) * d.sun * _PER_SUN
    surface = 0.4 * d.mean + 0.6 * bulk + 0.005 * alpha_sun
    vapour = 0.7 * d.mean + 0.3 * bulk + 0.009 * alpha_sun
    return surface, vapour, 0.7 * d.range + 0.02 * alpha_sun


def _general_form(d, bulk, ratio):
    """Equations 1-27, 1-32 and 1-6."""
    ratio = np.where(np.isfinite(ratio), ratio, 0.5)
    roof_sun = d.roof_alpha * d.sun * _PER_SUN
    shell_sun = ratio * d.shell_alpha * d.sun * _PER_SUN
    long, short = 4.4 * ratio + 3.8, 2.2 * ratio + 1.9
    surface = (
        (0.5 - 0.8 / long) * d.mean
        + (0.5 + 0.8 / long) * bulk
        + (0.021 * roof_sun + 0.013 * shell_sun) / long
    )
    vapour = ((2.2 * ratio + 1.1) * d.mean + 0.8 * bulk + 0.021 * roof_sun + 0.013 * shell_sun) / short
    swing = (1.0 - 0.8 / short) * d.range + (0.042 * roof_sun + 0.026 * shell_sun) / short
    return surface, vapour, swing


def _insulated_shell_form(d, bulk):
    """Insulated shell under a bare roof."""
    roof_sun = d.roof_alpha * d.sun * _PER_SUN
    surface = 0.3 * d.mean + 0.7 * bulk + 0.005 * roof_sun
    return surface, 0.6 * d.mean + 0.4 * bulk + 0.01 * roof_sun, 0.6 * d.range + 0.02 * roof_sun


def _covered_floating_form(d, bulk):
    """Internal and domed floating roofs; the swing is that of the default fixed roof."""
    alpha_sun = 0.5 * (d.roof_alpha + d.shell_alpha) * d.sun * _PER_SUN
    surface = 0.3 * d.mean + 0.7 * bulk + 0.004 * alpha_sun
    return surface, np.full_like(surface, np.nan), _default_form(d, bulk)[2]
