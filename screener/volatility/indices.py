"""Volatility figures that follow from vapour pressure and distillation points."""

from __future__ import annotations

import numpy as np

from screener.ground.constants import ZERO_CELSIUS


def vapour_lock_index(vapour_pressure, E70) -> np.ndarray:
    """Vapour lock index of EN 228: 10 VP + 7 E70, VP in kPa, E70 in vol%.

    Parameters
    ----------
    vapour_pressure : float or array, shape (n,)
        Dry vapour pressure equivalent. [Pa]
    E70 : float or array, shape (n,)
        Volume fraction evaporated at 70 degC. [-]

    Returns
    -------
    array, shape (n,)
        Index. [-]

    Source
    ------
    DIN EN 228 as quoted by de.wikipedia 'Vapour Lock Index' and chemie-schule.de.
    """
    return 10.0 * np.asarray(vapour_pressure, float) / 1000.0 + 7.0 * np.asarray(E70, float) * 100.0


def driveability_index(T10, T50, T90, ethanol=0.0) -> np.ndarray:
    """Driveability index of ASTM D4814, in its Celsius form.

    1.5 T10 + 3.0 T50 + T90 + 1.33 (vol% ethanol), temperatures in degC.

    Parameters
    ----------
    T10 : float or array, shape (n,)
        Temperature at 10 % evaporated. [K]
    T50 : float or array, shape (n,)
        Temperature at 50 % evaporated. [K]
    T90 : float or array, shape (n,)
        Temperature at 90 % evaporated. [K]
    ethanol : float or array, shape (n,)
        Volume fraction of ethanol. [-]

    Returns
    -------
    array, shape (n,)
        Index, in degC. [-]

    Source
    ------
    Refinery reference desk of mckinseyenergyinsights.com, quoting ASTM D4814.
    """
    t10, t50, t90 = (np.asarray(T, float) - ZERO_CELSIUS for T in (T10, T50, T90))
    return 1.5 * t10 + 3.0 * t50 + t90 + 133.0 * np.asarray(ethanol, float)


def ratio_20_temperature_d4814(vapour_pressure, T10, T50) -> np.ndarray:
    """T(V/L=20) estimated from a straight line in vapour pressure, T10 and T50; a cross-check.

    52.47 - 0.33 VP + 0.20 T10 + 0.17 T50, VP in kPa, temperatures in degC.

    Parameters
    ----------
    vapour_pressure : float or array, shape (n,)
        Dry vapour pressure equivalent. [Pa]
    T10 : float or array, shape (n,)
        Temperature at 10 % evaporated. [K]
    T50 : float or array, shape (n,)
        Temperature at 50 % evaporated. [K]

    Returns
    -------
    array, shape (n,)
        Estimate of T(V/L=20); NaN outside 40 to 110 kPa or T50 65 to 125 degC. [K]

    Validity
    --------
    Gasoline and gasoline-ether blends; not for blends with an alcohol. The limits are the
    span of the ASTM D4814 classes, rounded outwards.

    Source
    ------
    ASTM D4814 appendix, from memory, unverified; its degC and degF forms agree.
    """
    t10, t50 = np.asarray(T10, float) - ZERO_CELSIUS, np.asarray(T50, float) - ZERO_CELSIUS
    kPa = np.asarray(vapour_pressure, float) / 1000.0
    gasoline = (kPa >= 40.0) & (kPa <= 110.0) & (t50 >= 65.0) & (t50 <= 125.0)
    return np.where(gasoline, 52.47 - 0.33 * kPa + 0.20 * t10 + 0.17 * t50 + ZERO_CELSIUS, np.nan)
