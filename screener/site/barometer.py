"""Air pressure of a site from its elevation."""

from __future__ import annotations

import numpy as np

# How far a deep low stands below the standard atmosphere of the place [Pa].
# Common practice, no source: editable, and echoed as a default wherever it is used.
LOWEST_BAROMETER_ALLOWANCE = 4000.0
LOWEST_BAROMETER_ALLOWANCE_EVIDENCE = "common practice"

ELEVATION_RANGE = (-500.0, 6000.0)  # places where tanks stand; inside the range of the 1976 atmosphere [m]


def standard_pressure(elevation):
    """Pressure of the standard atmosphere at an elevation.

    Parameters
    ----------
    elevation : float or array, shape (n,)
        Height above mean sea level. [m]

    Returns
    -------
    array, shape (n,) or ()
        Absolute pressure; NaN outside the range of validity. [Pa]

    Validity
    --------
    -500 to 6,000 m. A mean: the weather moves the barometer by several kPa.

    Source
    ------
    U.S. Standard Atmosphere 1976, as carried by the library fluids (read in its documentation).
    """
    from fluids.atmosphere import ATMOSPHERE_1976

    elevation = np.asarray(elevation, dtype=float)
    low, high = ELEVATION_RANGE
    inside = (elevation >= low) & (elevation <= high)
    # Few different places stand behind many lanes: each elevation is looked up once.
    places, back = np.unique(np.where(inside, elevation, 0.0), return_inverse=True)
    pressure = np.array([ATMOSPHERE_1976(float(place)).P for place in places])
    return np.where(inside, pressure[back].reshape(elevation.shape), np.nan)


def lowest_barometer(elevation, allowance=LOWEST_BAROMETER_ALLOWANCE):
    """Lowest barometer to expect where none was recorded.

    Parameters
    ----------
    elevation : float or array, shape (n,)
        Height above mean sea level. [m]
    allowance : float or array, shape (n,)
        Depth of the lowest weather below the standard atmosphere. [Pa]

    Returns
    -------
    array, shape (n,) or ()
        Absolute pressure. [Pa]

    Validity
    --------
    As `standard_pressure`; the allowance is scaled by nothing and belongs to the site.

    Source
    ------
    U.S. Standard Atmosphere 1976 for the mean; the default allowance is common practice, no source.
    """
    return standard_pressure(elevation) - np.asarray(allowance, dtype=float)
