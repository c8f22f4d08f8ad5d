"""Partial pressures over a liquid, and the vapour space it fills, lane by lane.

The liquid's fugacities come from the fluid's model at the pressure of the space; the
vapour's own non-ideality is that of the fuel vapour at its partial pressure, air taken as
ideal. So the sum of the partial pressures is the bubble pressure of the liquid.

With a vapour space of `ratio` volumes over one volume of liquid (measured at 15 degC) the
balance of each species reads x_i = z_i / (n_L + a_i V), a_i = k_i / RT concentration of
vapour per mole fraction of liquid, and sum x_i = 1 fixes the liquid left, n_L.

A liquid that would split into two is held together as one: its vapour is then an upper
bound (bubble_pressure with check="full" tells whether it splits).
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from screener.equilibrium.phase import reduced_volume
from screener.ground.constants import R

NOT_LIQUID = 8.0  # v/b above which a root is no liquid: twice the critical volume; own choice
HIGHEST_P = 3e6  # [Pa] largest pressure at which the vapour's non-ideality is asked for; own choice
ROUNDS = 40
TOLERANCE = 1e-9  # largest change of ln p between rounds


class Vapour(NamedTuple):
    """p (n, c) [Pa] partial pressures, x (n, c) [-] the liquid left, n_L (n,) [-] its moles of one
    charged."""

    p: np.ndarray
    x: np.ndarray
    n_L: np.ndarray


def volatilities(state, P, x) -> np.ndarray:
    """Partial pressure per mole fraction of liquid, k_i = p_i/x_i (n, c) [Pa]; NaN where there is no liquid.

    state is `fluid.at(T)`, P (n,) [Pa] the pressure on the liquid, x (n, c) [-].
    """
    mixture = state.mix(x)
    with np.errstate(all="ignore"):
        ln_phi, Z = mixture.ln_phi_and_Z(P, "L")
        k = np.exp(ln_phi) * P[:, None]
        k = np.where((reduced_volume(mixture, P, Z) < NOT_LIQUID)[:, None], k, np.nan)
        f = p = x * k
        for _ in range(2):
            total = p.sum(axis=1)
            y = p / total[:, None]
            ln_phi_V = state.mix(y).ln_phi(np.minimum(total, HIGHEST_P), "V")
            p = f * np.exp(-ln_phi_V)
        return k * np.exp(-ln_phi_V)


def over_liquid(fluid, T, P, z, ratio) -> Vapour:
    """Vapour over a liquid that fills a space of `ratio` times its volume.

    T (n,) [K], P (n,) [Pa], z (n, c) [-] liquid charged, ratio (n,) [-] vapour space over
    liquid volume at 15 degC, 0 for a liquid that vapour does not deplete.
    """
    state = fluid.at(T)
    if not (ratio > 0.0).any():
        k = volatilities(state, P, z)
        return Vapour(z * k, z, np.ones(T.size))
    known = np.isfinite(fluid.v_15)
    space = (
        ratio * (z @ np.where(known, fluid.v_15, 0.0)) / (R * T)
    )  # [1/Pa] volume per mole charged, over RT
    space = np.where((z[:, ~known] > 0.0).any(axis=1), np.nan, space)
    x, last, moving = z, np.zeros_like(z), np.ones(T.size, dtype=bool)
    for _ in range(ROUNDS):
        k = volatilities(state, P, x)
        n_L = _liquid_left(z, k * space[:, None])
        with np.errstate(all="ignore"):
            x = z / (n_L[:, None] + k * space[:, None])
            p = np.where((n_L == 0.0)[:, None], z / space[:, None], x * k)
            x = x / x.sum(axis=1, keepdims=True)
            ln_p = np.log(np.where(z > 0.0, p, 1.0))
        moving = (np.abs(ln_p - last) > TOLERANCE).any(axis=1)
        if not moving.any():
            break
        last = ln_p
    return Vapour(np.where(moving[:, None], np.nan, p), x, n_L)


def _liquid_left(z, a):
    """Moles of liquid left of one mole charged, 0 where all of it evaporates, NaN where a is no number.

    sum z_i/(n_L + a_i) - 1 falls and is convex in n_L, so Newton from the left never
    overshoots; a (n, c) is what one mole of liquid would send into the space. [-]
    """
    present = z > 0.0
    with np.errstate(all="ignore"):
        wet = np.where(present, z / a, 0.0).sum(axis=1) > 1.0
        n_L = np.where(wet, 1e-9, 0.0)
        for _ in range(100):
            d = n_L[:, None] + a
            f = np.where(present, z / d, 0.0).sum(axis=1) - 1.0
            step = f / np.where(present, z / d**2, 0.0).sum(axis=1)
            step = np.where(wet & np.isfinite(step), step, 0.0)
            n_L = np.clip(n_L + step, 0.0, 1.0)
            if not (np.abs(step) > 1e-13).any():
                break
    return np.where(np.isfinite(a).all(axis=1), n_L, np.nan)
