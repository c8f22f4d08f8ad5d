"""Volume of a stored liquid at one temperature against another, as the trade corrects it.

Petroleum liquids by the temperature part of API MPMS 11.1 / ASTM D1250:
alpha60 = K0/rho60^2 + K1/rho60 + K2 and V60/V(T) = exp(-alpha60 dT (1 + 0.8 alpha60 dT)),
dT from 60 degF. A base of 15 degC goes through 60 degF, as the 2004 edition
calculates it, not through the separate constants of the older 15 degC tables.
The step from ITS-90 to IPTS-68 of that edition is left out: it is worth less
than 3e-5 in volume between -50 and 100 degC.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache

import numpy as np

from screener.ground.constants import T_15C, T_60F
from screener.ground.errors import DataError, UnknownName
from screener.ground.files import read_table

REFINED = ("gasoline", "transition", "jet", "fuel-oil")  # chosen among by density
DEGF_PER_K = 1.8
T_LOW, T_HIGH = 223.15, 423.15  # -50 to 150 degC, the range of the method (from memory, unverified)


@dataclass(frozen=True)
class _Group:
    K0: float
    K1: float
    K2: float
    rho60_low: float
    rho60_high: float


@lru_cache(maxsize=1)
def _groups() -> dict[str, _Group]:
    rows = read_table("volatility/volume_correction.csv")
    keys = ("K0", "K1", "K2", "rho60_low", "rho60_high")
    return {row["product"]: _Group(*(float(row[key]) for key in keys)) for row in rows}


def products() -> tuple[str, ...]:
    """Names of the commodity groups; any refined one may be left to the density."""
    return tuple(_groups())


def lightest_density() -> float:
    """Lowest density at 60 degF that the petroleum correction covers. [kg/m3]"""
    return min(group.rho60_low for group in _groups().values())


def _alpha60(rho60: np.ndarray, product: str | None) -> np.ndarray:
    """Thermal expansion coefficient at 60 degF. [1/degF]"""
    groups = _groups()
    if product is not None and product not in groups:
        raise UnknownName("product", product, "commodity group", groups)
    if product is not None and product not in REFINED:
        chosen = [(groups[product], np.ones(rho60.shape, bool))]
    else:
        # Lighter and heavier than the table: the nearest group, reported as out of range above.
        edges = [groups[name].rho60_high for name in REFINED[:-1]]
        band = np.searchsorted(edges, rho60, side="right")
        chosen = [(groups[name], band == k) for k, name in enumerate(REFINED)]
    alpha = np.full(rho60.shape, np.nan)
    for group, mask in chosen:
        r = rho60[mask]
        alpha[mask] = group.K0 / r**2 + group.K1 / r + group.K2
    return alpha


def _to_60F(T: np.ndarray, alpha60: np.ndarray) -> np.ndarray:
    """V(60 degF)/V(T). [-]"""
    s = alpha60 * (T - T_60F) * DEGF_PER_K
    return np.exp(-s * (1.0 + 0.8 * s))


def density_60F(rho_15, product: str | None = None) -> np.ndarray:
    """Density at 60 degF of a petroleum liquid from its density at 15 degC.

    Parameters
    ----------
    rho_15 : float or array, shape (n,)
        Density at 15 degC. [kg/m3]
    product : str, optional
        Commodity group: "crude", or a refined one, which the density decides anyway.

    Returns
    -------
    array, shape (n,)
        Density at 60 degF. [kg/m3]

    Source
    ------
    API MPMS 11.1 (2004), constants from memory, unverified (data/volatility/volume_correction.toml).
    """
    rho_15 = np.atleast_1d(np.asarray(rho_15, dtype=float))
    rho60 = rho_15.copy()
    for _ in range(6):  # dT is 1 degF: each round gains three digits
        rho60 = rho_15 / _to_60F(np.float64(T_15C), _alpha60(rho60, product))
    return rho60


def petroleum_expansion(rho_15, T, product: str | None = None) -> np.ndarray:
    """Volume at T over volume at 15 degC of a petroleum liquid; 1 over the correction factor.

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
        V(T)/V(15 degC); NaN outside the density and temperature range of the method. [-]

    Validity
    --------
    610.6 to 1163.5 kg/m3 at 60 degF, -50 to 150 degC.

    Source
    ------
    API MPMS 11.1 (2004), constants from memory, unverified (data/volatility/volume_correction.toml).
    """
    rho_15, T = np.broadcast_arrays(
        np.atleast_1d(np.asarray(rho_15, float)), np.atleast_1d(np.asarray(T, float))
    )
    rho60 = density_60F(rho_15, product)
    alpha = _alpha60(rho60, product)
    ratio = _to_60F(np.float64(T_15C), alpha) / _to_60F(T, alpha)
    groups = _groups().values()
    low, high = min(g.rho60_low for g in groups), max(g.rho60_high for g in groups)
    inside = (rho60 >= low) & (rho60 <= high) & (T >= T_LOW) & (T <= T_HIGH)
    return np.where(inside, ratio, np.nan)


@lru_cache(maxsize=1)
def _own_species() -> dict[str, tuple[np.ndarray, float, float]]:
    table = {}
    for line, row in enumerate(read_table("volatility/own_volume_species.csv"), start=3):
        b = np.array([float(row[f"b{k}"]) for k in range(1, 5)])
        low, high = float(row["T_low"]), float(row["T_high"])
        if not low < T_15C < high:
            raise DataError("volatility/own_volume_species.csv", line, "range does not hold 15 degC")
        table[row["species"]] = (b, low, high)
    return table


def own_volume_species() -> tuple[str, ...]:
    """Species whose expansion has a table of its own."""
    return tuple(_own_species())


def own_expansion(name: str, T) -> np.ndarray:
    """Volume at T over volume at 15 degC of ethanol, methanol or water.

    Parameters
    ----------
    name : str
        One of `own_volume_species()`.
    T : float or array, shape (n,)
        Temperature. [K]

    Returns
    -------
    array, shape (n,)
        V(T)/V(15 degC); NaN outside the fitted range (water: its value at 0 degC below it). [-]

    Source
    ------
    Fitted to reference equations of state (data/volatility/own_volume_species.toml).
    """
    b, low, high = _own_species()[name]
    T = np.atleast_1d(np.asarray(T, float))
    # Water dissolved in a cold fuel does not freeze; its share is too small to matter.
    used = np.maximum(T, low) if name == "water" else T
    t = used - T_15C
    ratio = np.exp(t * (b[0] + t * (b[1] + t * (b[2] + t * b[3]))))
    return np.where((used >= low) & (used <= high), ratio, np.nan)


def light_expansion(Tc, omega, T) -> np.ndarray:
    """Volume at T over volume at 15 degC of saturated light hydrocarbons.

    Parameters
    ----------
    Tc : array, shape (c,)
        Critical temperatures. [K]
    omega : array, shape (c,)
        Acentric factors. [-]
    T : float or array, shape (n,)
        Temperature. [K]

    Returns
    -------
    array, shape (n, c)
        V(T)/V(15 degC) of each species; NaN at or above 0.99 of a critical temperature,
        and for a species that has no liquid at 15 degC. [-]

    Validity
    --------
    Below the critical temperature; within 0.3 % of reference equations for propane to
    n-hexane, -40 to 60 degC (tests/oracles).

    Source
    ------
    Rackett, J. Chem. Eng. Data 15 (1970) 514; Z_RA of Yamada and Gunn, J. Chem. Eng. Data
    18 (1973) 234. Constants from memory, unverified; checked against reference equations.
    """
    Tc, omega = np.asarray(Tc, float), np.asarray(omega, float)
    T = np.atleast_1d(np.asarray(T, float))[:, None]
    liquid = (T < 0.99 * Tc) & (0.99 * Tc > T_15C)
    Tr = np.where(liquid, T / Tc, 0.5)
    Tr_15 = np.where(0.99 * Tc > T_15C, T_15C / Tc, 0.5)
    z_ra = 0.29056 - 0.08775 * omega
    ratio = z_ra ** ((1.0 - Tr) ** (2.0 / 7.0) - (1.0 - Tr_15) ** (2.0 / 7.0))
    return np.where(liquid, ratio, np.nan)
