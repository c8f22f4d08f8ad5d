"""Oxygenates in gasolines of 50, 60 and 70 kPa: the numbers beside published trends (see ethanol_sweep)."""

from __future__ import annotations

from functools import lru_cache

import numpy as np

from screener.equilibrium import Fluid
from screener.volatility import distillation, dvpe
from tests.studies.splash import SHARES, Splash

BASES = (50e3, 60e3, 70e3)  # DVPE [Pa]
OXYGENATES = ("ethanol", "methanol", "2-propanol", "tert-butanol", "1-butanol", "isobutanol", "MTBE", "ETBE")
NAMES = (*SHARES, *OXYGENATES)


@lru_cache(maxsize=1)
def fluid():
    """The base and every oxygenate."""
    return Fluid.of(NAMES)


@lru_cache(maxsize=8)
def base(target):
    """Volume shares (c,) of the base whose butane is set to a DVPE [Pa]."""
    splash = Splash(SHARES)
    found = dict(zip(splash.names, splash.at_dvpe(target), strict=True))
    return np.array([found.get(name, 0.0) for name in NAMES])


def moles(target, shares, butane=0.0):
    """Mole fractions (n, c) of a base with volume shares (n,) of oxygenates by name; butane: added to the base first."""
    columns = {name: np.atleast_1d(np.asarray(v, dtype=float)) for name, v in shares.items()}
    butane = np.atleast_1d(np.asarray(butane, dtype=float))
    n = max(v.size for v in (butane, *columns.values()))
    start = (1.0 - butane)[:, None] * base(target)
    start[:, NAMES.index("n-butane")] += butane
    volume = (1.0 - sum(columns.values()))[:, None] * start * np.ones((n, 1))
    for name, v in columns.items():
        volume[:, NAMES.index(name)] += v
    found = volume / fluid().v_15
    return found / found.sum(axis=1, keepdims=True)


def pressure(target, shares, butane=0.0):
    """DVPE (n,) [kPa]."""
    return dvpe(fluid(), moles(target, shares, butane)).P / 1e3


def rise(target, name, shares):
    """DVPE (n,) [kPa] of volume shares of one oxygenate above that of the base."""
    return pressure(target, {name: shares}) - target / 1e3


def evaporated(target, shares, at):
    """Temperatures (n, k) [K] at which the volume shares `at` (k,) have evaporated in the open still."""
    curve = distillation(fluid(), moles(target, shares)).require()
    return np.stack([curve.temperature(v) for v in at], axis=1)


def butane_for(target, shares, wanted):
    """Volume share of butane added to a base that brings its blend to a DVPE [kPa]; NaN if none up to 20 % does."""
    grid = np.linspace(0.0, 0.20, 41)
    P = pressure(target, {name: np.full(grid.size, v) for name, v in shares.items()}, grid)
    return float(np.interp(wanted, P, grid, left=np.nan, right=np.nan))
