"""Viscosity of a light stock where none is given."""

from __future__ import annotations

from functools import lru_cache

import numpy as np

from screener.ground.files import read_table

EVIDENCE = "common practice"


@lru_cache(maxsize=1)
def _band():
    rows = read_table("line/liquid_viscosity.csv")
    return {
        name: np.array([float(row[name]) for row in rows]) for name in ("density_15", "low", "best", "high")
    }


def kinematic_viscosity_band(density_15):
    """Band of the kinematic viscosity of a light stock at storage temperature.

    Parameters
    ----------
    density_15 : float or array, shape (n,)
        Density at 15 degC. [kg/m3]

    Returns
    -------
    tuple of three arrays, shape (n,) or ()
        Low, best and high; NaN outside 600 to 900 kg/m3. [m2/s]

    Validity
    --------
    Stored fuels and their components at 5 to 40 degC. The high end gives the larger friction.

    Source
    ------
    Common practice, no source; the band is checked against pure liquids in the tests.
    """
    band = _band()
    density = np.asarray(density_15, dtype=float)
    inside = (density >= band["density_15"][0]) & (density <= band["density_15"][-1])
    at = np.where(inside, density, band["density_15"][0])
    return tuple(
        np.where(inside, np.exp(np.interp(at, band["density_15"], np.log(band[name]))), np.nan)
        for name in ("low", "best", "high")
    )
