"""Daily sun on a horizontal plane, by FAO Irrigation and Drainage Paper 56.

Allen, Pereira, Raes and Smith, Crop evapotranspiration, FAO Irrigation and
Drainage Paper 56, Rome 1998, chapter 3. Equation numbers are those of the paper.
"""

from __future__ import annotations

import numpy as np

SOLAR_CONSTANT = 0.0820e6  # [J/(m2 min)]; FAO 56, equation 21 (= 1,367 W/m2)
CLEAR_SKY_SHARE = 0.75  # share of the sun that reaches sea level under a clear sky [-]; FAO 56, equation 37
CLEAR_SKY_RISE = 2.0e-5  # growth of that share with elevation [1/m]; FAO 56, equation 37


def declination(day_of_year):
    """Solar declination.

    Parameters
    ----------
    day_of_year : int or array, shape (n,)
        1 to 366. [d]

    Returns
    -------
    array, shape (n,) or ()
        Angle, positive in the northern summer. [rad]

    Source
    ------
    FAO 56, equation 24.
    """
    return 0.409 * np.sin(2.0 * np.pi * np.asarray(day_of_year, dtype=float) / 365.0 - 1.39)


def sunset_hour_angle(latitude, day_of_year):
    """Hour angle of sunset: zero in the polar night, pi under the midnight sun.

    Parameters
    ----------
    latitude : float or array, shape (n,)
        North positive. [deg]
    day_of_year : int or array, shape (n,)
        1 to 366. [d]

    Returns
    -------
    array, shape (n,) or ()
        Angle. [rad]

    Source
    ------
    FAO 56, equation 25; held between 0 and pi beyond the polar circles.
    """
    cosine = -np.tan(np.radians(np.asarray(latitude, dtype=float))) * np.tan(declination(day_of_year))
    return np.arccos(np.clip(cosine, -1.0, 1.0))


def extraterrestrial_insolation(latitude, day_of_year):
    """Daily sun on a horizontal plane above the atmosphere.

    Parameters
    ----------
    latitude : float or array, shape (n,)
        North positive, -90 to 90. [deg]
    day_of_year : int or array, shape (n,)
        1 to 366. [d]

    Returns
    -------
    array, shape (n,) or ()
        Daily total; NaN for a latitude or day that does not exist. [J/m2]

    Validity
    --------
    Least exact above 55 degrees of latitude, where the simple declination formula shows.

    Source
    ------
    FAO 56, equations 21 to 25.
    """
    latitude = np.asarray(latitude, dtype=float)
    day = np.asarray(day_of_year, dtype=float)
    exists = (np.abs(latitude) <= 90.0) & (day >= 1.0) & (day <= 366.0)
    phi = np.radians(np.where(exists, latitude, 0.0))
    day = np.where(exists, day, 1.0)
    delta = declination(day)
    omega = sunset_hour_angle(np.degrees(phi), day)
    distance = 1.0 + 0.033 * np.cos(2.0 * np.pi * day / 365.0)  # equation 23
    # Equation 21 with a day of 24 x 60 minutes.
    total = (
        24.0
        * 60.0
        / np.pi
        * SOLAR_CONSTANT
        * distance
        * (omega * np.sin(phi) * np.sin(delta) + np.cos(phi) * np.cos(delta) * np.sin(omega))
    )
    return np.where(exists, np.maximum(total, 0.0), np.nan)


def clear_sky_insolation(latitude, *, day_of_year, elevation=0.0):
    """Daily sun on a horizontal plane at ground level under a cloudless sky.

    Parameters
    ----------
    latitude : float or array, shape (n,)
        North positive, -90 to 90. [deg]
    day_of_year : int or array, shape (n,)
        1 to 366. [d]
    elevation : float or array, shape (n,)
        Height above mean sea level. [m]

    Returns
    -------
    array, shape (n,) or ()
        Daily total; NaN outside the range of validity. [J/m2]

    Validity
    --------
    Below 6,000 m and in air of low turbidity; haze brings less.

    Source
    ------
    FAO 56, equation 37: (0.75 + 2e-5 z) of the extraterrestrial total.
    """
    elevation = np.asarray(elevation, dtype=float)
    share = np.where(elevation < 6000.0, CLEAR_SKY_SHARE + CLEAR_SKY_RISE * elevation, np.nan)
    return share * extraterrestrial_insolation(latitude, day_of_year)
