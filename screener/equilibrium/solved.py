"""The answer of a flash in which T or P was solved for, and how its rows are put together."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.equilibrium.caloric import phase_values
from screener.equilibrium.results import Flash


@dataclass(frozen=True, kw_only=True)
class SolvedFlash(Flash):
    """A Flash whose T or P was solved for, with its totals per mole of feed.

    H (n,) [J/mol] and S (n,) [J/(mol K)], NaN where the ideal-gas heat
    capacity is not known; v (n,) [m3/mol]; v_L and v_V (n,) [m3/mol], the
    volumes of the phases, NaN for an absent one; miss (n,) [-] how far the
    quantity asked for was missed: over RT for H, over R for S, else relative.
    """

    H: np.ndarray
    S: np.ndarray
    v: np.ndarray
    v_L: np.ndarray
    v_V: np.ndarray
    miss: np.ndarray


def totals(fluid, T, P, beta, beta_W, x, y, x_W):
    """H, S, v, v_L, v_V (n,) of phases together; a phase without share counts for nothing.

    Parameters
    ----------
    fluid : Fluid
        The fluid.
    T : array, shape (n,)
        Temperature. [K]
    P : array, shape (n,)
        Pressure. [Pa]
    beta : array, shape (n,)
        Vapour fraction by moles. [-]
    beta_W : array, shape (n,)
        Fraction of a second liquid, NaN without one. [-]
    x : array, shape (n, c)
        Liquid. [-]
    y : array, shape (n, c)
        Vapour. [-]
    x_W : array, shape (n, c)
        Second liquid. [-]

    Returns
    -------
    tuple of array
        H [J/mol], S [J/(mol K)], v, v_L, v_V [m3/mol].

    Source
    ------
    Sums over phases.
    """
    known = np.isfinite(T) & np.isfinite(P) & np.isfinite(beta)
    H, S, v = (np.where(known, 0.0, np.nan) for _ in range(3))
    each = {"x": np.full(T.shape, np.nan), "y": np.full(T.shape, np.nan), "x_W": np.full(T.shape, np.nan)}
    second = np.where(np.isfinite(beta_W), beta_W, 0.0)
    for name, share, part, kind in (
        ("x", 1.0 - beta - second, x, "L"),
        ("y", beta, y, "V"),
        ("x_W", second, x_W, "L"),
    ):
        some = np.flatnonzero(known & (share > 0.0))
        if some.size == 0:
            continue
        values = phase_values(fluid, T[some], P[some], part[some], kind)
        H[some] += share[some] * values.H
        S[some] += share[some] * values.S
        v[some] += share[some] * values.v
        each[name][some] = values.v
    return H, S, v, each["x"], each["y"]


def totals_of(fluid, flash):
    """The same of a Flash."""
    return totals(fluid, flash.T, flash.P, flash.beta, flash.beta_W, flash.x, flash.y, flash.x_W)
