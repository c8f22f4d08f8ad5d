"""Equilibrium of liquids whose every fugacity is the computed one times a factor.

The factor is what a laboratory measured over what the equation computes (`states.measured`): K_i becomes
f K_i. A K-value is inverse to the pressure while the vapour is ideal, so every function here works at P/f
and gives a pressure back times f. The heat, the compositions and the temperature follow from the same state.

Exact for an ideal vapour. The factor is one of pressures, so a bubble pressure times f is the
measured pressure itself at the temperature of the test; scaled K, solved exactly, go a little beyond it, by
what the vapour's non-ideality changes between P/f and P. With f = 1.08 that is 0.09 % of a bubble pressure of
0.23 bar (gasoline) and 0.81 % of one of 3.2 bar (butane and isopentane at 40 degC; tests/states/test_scaled.py
prints both), beside a method spread of 5 %. In a vapour space it is the liquid's v (P - P/f)/RT, 0.05 %.

One function each, and nothing else in `states`, `screening` or `memo` calls the unscaled one: the same tests read
their imports.
"""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from screener import equilibrium, fire
from screener.ground.constants import ATMOSPHERE


def bubble_pressure(fluid, T, x, factor):
    """Bubble point at T (n,) [K] of liquids x whose fugacities carry the factor (n,) [-]; P in Pa.

    Water that the liquid does not hold has settled: it adds its own vapour pressure and no more.
    """
    answer = _settled(fluid, equilibrium.bubble_pressure(fluid, T, x))
    return replace(answer, P=answer.P * factor)


def _settled(fluid, one):
    """Bubble points with free water apart, where one liquid would hold water at more than its own pressure.

    Where the two liquids are not found the lane keeps the point of the liquid held together, an upper bound.
    """
    if "water" not in fluid.names:
        return one
    own = equilibrium.bubble_pressure(equilibrium.Fluid.of(["water"]), one.T, [1.0]).P
    wet = np.flatnonzero(one.ok & (one.y[:, fluid.names.index("water")] * one.P > own))
    if not wet.size:
        return one
    two = equilibrium.first_vapour(fluid, one.T[wet], one.x[wet])
    found = two.ok & (two.liquids == 2)
    wet = wet[found]
    P, y, residual = one.P.copy(), one.y.copy(), one.residual.copy()
    P[wet], y[wet], residual[wet] = two.P[found], two.y[found], two.residual[found]
    return replace(one, P=P, y=y, residual=residual)


def bubble_temperature(fluid, P, x, factor):
    """Temperature at which liquids x with the factor (n,) [-] boil at P (n,) [Pa]."""
    return equilibrium.bubble_temperature(fluid, np.asarray(P) / factor, x)


def flash_tp(fluid, T, P, z, factor):
    """Flash at T (n,) [K] and P (n,) [Pa] with the factor (n,) [-]; the P of the answer is the scaled one."""
    return equilibrium.flash_tp(fluid, T, P / factor, z)


def flash_from_liquid(fluid, T, P, z, factor, P_flash):
    """Flash at P_flash (n, m) [Pa] with the enthalpy of the liquid z at T (n,) [K] and P (n,) [Pa].

    factor (n,) [-]. Gives the answer for n*m lanes, the second axis fastest, and whether the feed
    had an enthalpy (n,).
    """
    m = P_flash.shape[1]
    feed = equilibrium.caloric(fluid, T, P / factor, z, "L")
    scaled = (P_flash / factor[:, None]).ravel()
    return equilibrium.flash_ph(fluid, scaled, np.repeat(feed.H, m), np.repeat(z, m, axis=0)), feed.ok


def vapour_space(fluid, T, x, factor, *, P=ATMOSPHERE, ratio=0.0):
    """Vapour space at P (n,) [Pa] over liquids x with the factor (n,) [-].

    Its partial pressures over P are those of the unscaled liquid over P/f, and so is what the liquid
    loses to a space of ratio (n,) [-] where that is f times as large.
    """
    return fire.vapour_space(fluid, T, x, P=P / np.asarray(factor), ratio=np.asarray(ratio) * factor)


def headspace(fluid, T, x, factor, *, P=ATMOSPHERE):
    """Shares y (n, c) [-] of the vapour at P (n,) [Pa] over liquids x with the factor (n,) [-]."""
    return fire.headspace(fluid, T, x, P=P / np.asarray(factor)).y


def flash_point(fluid, x, factor, *, P=ATMOSPHERE, method="liaw"):
    """Computed flash point at P (n,) [Pa] of liquids x with the factor (n,) [-]."""
    return fire.flash_point(fluid, x, P=P / np.asarray(factor), method=method)


def flammable_window(fluid, x, factor, *, P=ATMOSPHERE, ratio=0.0):
    """Temperatures between which the space at P (n,) [Pa] over liquids x with the factor (n,) [-] is flammable."""
    return fire.flammable_window(fluid, x, P=P / np.asarray(factor), ratio=np.asarray(ratio) * factor)
