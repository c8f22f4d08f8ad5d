"""Equilibrium of liquids whose every fugacity is the computed one times a factor.

The factor is what a laboratory measured over what the equation computes (`states.measured`): K_i becomes
f K_i. A K-value is inverse to the pressure while the vapour is ideal, so every function here works at P/f
and gives a pressure back times f. The heat, the compositions and the temperature follow from the same state.

What is left out is the vapour's own non-ideality between P/f and P, and the liquid's compressibility.
Against the exact solution with scaled K (tests/states/test_scaled.py prints it) a bubble pressure
with f = 1.08 is 0.05 % high for gasoline at 0.3 bar, 0.34 % for butane and pentane at 3 bar: below a tenth of the
method spread. One function each, and nothing above this floor's `states` and `screening` calls the
unscaled one (the same tests read their imports).
"""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from screener import equilibrium, fire
from screener.ground.constants import ATMOSPHERE


def bubble_pressure(fluid, T, x, factor):
    """Bubble point at T (n,) [K] of liquids x whose fugacities carry the factor (n,) [-]; P in Pa."""
    answer = equilibrium.bubble_pressure(fluid, T, x)
    return replace(answer, P=answer.P * factor)


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
