"""How far a stored petroleum liquid yields to pressure, and what a full, shut-in stretch of it does when it warms."""

from __future__ import annotations

from functools import lru_cache

import numpy as np

from screener.ground.constants import PSI, T_60F
from screener.ground.files import read_table
from screener.volatility.volume_correction import DEGF_PER_K, density_60F, petroleum_expansion

STEP = 0.5  # [K] either side for the slope of the volume correction, which is smooth


@lru_cache(maxsize=1)
def _constants() -> tuple[float, float, float, float]:
    (row,) = read_table("volatility/compressibility.csv")
    return tuple(float(row[key]) for key in ("a0", "a1", "a2", "a3"))


def petroleum_compressibility(rho_15, T, product: str | None = None) -> np.ndarray:
    """Isothermal compressibility of a petroleum liquid near its vapour pressure.

    Parameters
    ----------
    rho_15 : float or array, shape (n,)
        Density at 15 degC. [kg/m3]
    T : float or array, shape (n,)
        Temperature. [K]
    product : str, optional
        "crude", or None and any refined group: by density.

    Returns
    -------
    array, shape (n,)
        -(dV/dP)/V; NaN outside the density and temperature range of the method. [1/Pa]

    Validity
    --------
    610.6 to 1163.5 kg/m3 at 60 degF, -50 to 150 degC; mixtures of hydrocarbons, not aromatics alone
    (reference equations beside it: tests/studies/liquid_expansion.md), no alcohols.

    Source
    ------
    API MPMS 11.1 (2004), constants from memory, unverified (data/volatility/compressibility.toml).
    """
    rho_15, T = np.broadcast_arrays(
        np.atleast_1d(np.asarray(rho_15, float)), np.atleast_1d(np.asarray(T, float))
    )
    a0, a1, a2, a3 = _constants()
    rho60 = density_60F(rho_15, product)
    t = 60.0 + DEGF_PER_K * (T - T_60F)  # [degF]
    with np.errstate(over="ignore"):
        F = 1e-5 * np.exp(a0 + a1 * t + (a2 + a3 * t) / rho60**2)
    inside = np.isfinite(petroleum_expansion(rho_15, T, product))
    return np.where(inside, F / PSI, np.nan)


def shut_in_pressure_rise(rho_15, T, product: str | None = None) -> np.ndarray:
    """Pressure rise per kelvin of petroleum liquid that fills a stiff, closed space.

    Parameters
    ----------
    rho_15 : float or array, shape (n,)
        Density at 15 degC. [kg/m3]
    T : float or array, shape (n,)
        Temperature. [K]
    product : str, optional
        "crude", or None and any refined group: by density.

    Returns
    -------
    array, shape (n,)
        Thermal expansion over compressibility; an upper bound, as pipes and valves give way a little.
        NaN outside the range of the method. [Pa/K]

    Validity
    --------
    As `petroleum_compressibility`, 0.5 K inside its temperature range.

    Source
    ------
    (dP/dT)_V = expansion / compressibility, textbook; both by API MPMS 11.1 (2004), constants from
    memory, unverified.
    """
    T = np.atleast_1d(np.asarray(T, float))
    up, down = (petroleum_expansion(rho_15, T + sign * STEP, product) for sign in (1.0, -1.0))
    expansion = np.log(up / down) / (2.0 * STEP)
    return expansion / petroleum_compressibility(rho_15, T, product)
