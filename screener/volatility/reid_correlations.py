"""True vapour pressure from Reid vapour pressure: the two published correlations.

A cross-check beside the flash, never its substitute: they know a liquid by one number, or
two, they were drawn for hydrocarbon stocks without ethanol, and their coefficients are
remembered (data/volatility/true_from_reid.csv says what supports the memory).
"""

from __future__ import annotations

from functools import lru_cache

import numpy as np

from screener.ground.constants import PSI
from screener.ground.errors import UnknownName
from screener.ground.files import read_table

EVIDENCE = "memory"  # of the coefficients, ranges and slopes of this module
DEGF = 0.0, 140.0  # [degF] span of temperature; from memory, unverified
_RANKINE = 1.8


@lru_cache(maxsize=2)
def _coefficients(stock: str) -> dict[str, float]:
    row = next(r for r in read_table("volatility/true_from_reid.csv") if r["stock"] == stock)
    return {key: float(value) for key, value in row.items() if key not in ("stock", "evidence")}


@lru_cache(maxsize=1)
def d86_slopes() -> dict[str, float]:
    """Slopes of the D86 curve at 10 % by kind of stock [K per volume fraction]; data/volatility/d86_slopes.csv."""
    return {
        r["stock"]: 100.0 * float(r["slope_degF"]) / _RANKINE for r in read_table("volatility/d86_slopes.csv")
    }


def d86_slope(stock: str) -> float:
    """Slope of the D86 curve at 10 % evaporated for a stock whose curve is not known.

    Parameters
    ----------
    stock : str
        "aviation gasoline", "motor gasoline", "light naphtha" or "naphtha".

    Returns
    -------
    float
        Slope. [K per volume fraction]

    Raises
    ------
    UnknownName
        No slope for that kind of stock.

    Source
    ------
    AP-42 chapter 7.1, from memory, unverified; data/volatility/d86_slopes.csv.
    """
    if stock not in d86_slopes():
        raise UnknownName("stock", stock, "kind of stock", d86_slopes())
    return d86_slopes()[stock]


def _true(stock, T, reid, root_slope):
    k = _coefficients(stock)
    T, reid, root_slope = np.broadcast_arrays(
        *(np.atleast_1d(np.asarray(v, dtype=float)) for v in (T, reid, root_slope))
    )
    degF, RVP = T * _RANKINE - 459.67, reid / PSI
    # half a millionth of slack, so that 20 psi turned into pascal and back stays 20 psi
    inside = (RVP >= k["RVP_low"] * (1 - 5e-7)) & (RVP <= k["RVP_high"] * (1 + 5e-7))
    inside &= (degF >= DEGF[0] - 1e-6) & (degF <= DEGF[1] + 1e-6)
    log = np.log(np.where(inside, RVP, 1.0))
    A, B = (k[f"{x}0"] + k[f"{x}1"] * root_slope + (k[f"{x}2"] + k[f"{x}3"] * root_slope) * log for x in "AB")
    ln_P = A - B / np.where(inside, _RANKINE * T, 500.0)
    return np.where(inside, PSI * np.exp(ln_P), np.nan)


def true_from_reid_refined(T, reid, *, slope) -> np.ndarray:
    """True vapour pressure of a refined petroleum stock from its Reid vapour pressure.

    Parameters
    ----------
    T : float or array, shape (n,)
        Temperature. [K]
    reid : float or array, shape (n,)
        Reid vapour pressure. [Pa]
    slope : float or array, shape (n,)
        Slope of the D86 curve at 10 % evaporated, (T15 - T5)/0.10; `d86_slope` where unknown.
        [K per volume fraction]

    Returns
    -------
    array, shape (n,)
        True vapour pressure; NaN outside the range. [Pa]

    Validity
    --------
    Reid vapour pressure 1 to 20 psi (7 to 138 kPa), 0 to 140 degF (-18 to 60 degC); no alcohol.

    Source
    ------
    AP-42 chapter 7.1 after API Publication 2517, from memory, unverified.
    """
    slope = np.asarray(slope, dtype=float)
    root = np.sqrt(np.where(slope > 0.0, slope, np.nan) * _RANKINE / 100.0)
    return _true("refined", T, reid, root)


def true_from_reid_crude(T, reid) -> np.ndarray:
    """True vapour pressure of a stabilised crude oil from its Reid vapour pressure.

    Parameters
    ----------
    T : float or array, shape (n,)
        Temperature. [K]
    reid : float or array, shape (n,)
        Reid vapour pressure. [Pa]

    Returns
    -------
    array, shape (n,)
        True vapour pressure; NaN outside the range. [Pa]

    Validity
    --------
    Reid vapour pressure 2 to 15 psi (14 to 103 kPa), 0 to 140 degF (-18 to 60 degC). Crude with
    methane or ethane has a true vapour pressure that no Reid figure tells.

    Source
    ------
    AP-42 chapter 7.1 after API Publication 2517, from memory, unverified.
    """
    return _true("crude", T, reid, 0.0)
