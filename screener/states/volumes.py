"""Liquid volumes of the lanes that hold a composition; every other lane is NaN."""

from __future__ import annotations

import numpy as np

from screener.volatility import liquid_expansion, liquid_molar_volume, standard_density


def _known(z, T=None) -> np.ndarray:
    known = np.isfinite(z).all(axis=-1) & (z.sum(axis=-1) > 0.0)
    return known if T is None else known & np.isfinite(T)


def _spread(known, values) -> np.ndarray:
    out = np.full(known.shape, np.nan)
    out[known] = values
    return out


def expansion(fluid, T, z) -> np.ndarray:
    """Volume at T (n,) [K] over volume at 15 degC of liquids z (n, c). [-]"""
    known = _known(z, T)
    return _spread(known, liquid_expansion(fluid, T[known], z[known]) if known.any() else ())


def molar_volume(fluid, T, z) -> np.ndarray:
    """Molar volume at T (n,) [K] of liquids z (n, c). [m3/mol]"""
    known = _known(z, T)
    return _spread(known, liquid_molar_volume(fluid, T[known], z[known]) if known.any() else ())


def density_15(fluid, z) -> np.ndarray:
    """Density at 15 degC of liquids z (n, c). [kg/m3]"""
    known = _known(z)
    return _spread(known, standard_density(fluid, z[known]) if known.any() else ())
