"""Flammable temperatures as measured on a fuel, to set beside what is computed."""

from __future__ import annotations

from functools import lru_cache

import numpy as np

from screener.ground.constants import ZERO_CELSIUS
from screener.ground.files import read_table

KFT = 304.8  # metres in a thousand feet; exact by the international foot


@lru_cache(maxsize=1)
def _table():
    rows = read_table("fire/jet_a_window.csv")
    altitude, low, high = (np.array([float(r[k]) for r in rows]) for k in ("altitude", "T_lower", "T_upper"))
    return altitude * KFT, low + ZERO_CELSIUS, high + ZERO_CELSIUS


def jet_a_window(altitude) -> tuple[np.ndarray, np.ndarray]:
    """Temperatures between which one jet A burned in a tank one eighth full, against altitude.

    Parameters
    ----------
    altitude : float or array, shape (n,)
        Pressure altitude. [m]

    Returns
    -------
    tuple of array
        Lower and upper temperature (n,), straight lines between the rows; NaN outside 0 to
        40,000 ft. [K]

    Source
    ------
    Nestor 1967, table at shepherd.caltech.edu (data/fire/jet_a_window.csv).
    """
    altitude = np.atleast_1d(np.asarray(altitude, dtype=float))
    z, low, high = _table()
    return tuple(np.interp(altitude, z, T, left=np.nan, right=np.nan) for T in (low, high))
