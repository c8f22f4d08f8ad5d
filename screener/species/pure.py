"""Saturation of one pure substance with the Peng-Robinson equation, all temperatures at once.

Written in u = v/b, where nothing is lost at low pressure:

    P b / RT = B = 1/(u - 1) - a / ((u + d1)(u + d2)),   a = a_PR alpha / (b R T)
    ln(f b / RT) = B u - 1 - ln(u - 1) - a / (d2 - d1) ln((u + d2)/(u + d1))

with d1,2 = 1 -+ sqrt 2. Used by the fits, not by the phase equilibrium of mixtures.

Source: D.-Y. Peng, D.B. Robinson, Ind. Eng. Chem. Fundam. 15 (1976) 59-64; omega_a and
omega_b are the exact critical-point values of that equation.
"""

from __future__ import annotations

import numpy as np

from screener.ground.constants import R

OMEGA_A = 0.457235528921382  # exact root of the critical conditions of Peng and Robinson 1976, recomputed
OMEGA_B = 0.0777960739038885  # the same
STILL = 5e-16  # [-] a root that moves by less than this has arrived: two rounding errors
D1, D2 = 1.0 - np.sqrt(2.0), 1.0 + np.sqrt(2.0)
U_CRITICAL = 0.307401308698703 / OMEGA_B  # v/b at the critical point, from its exact Zc


def covolume(Tc, Pc):
    """b of the equation [m3/mol] from Tc [K] and Pc [Pa]."""
    return OMEGA_B * R * Tc / Pc


def _log_term(u):
    return np.log((u + D2) / (u + D1)) / (D2 - D1)


def _ln_fugacity(u, a, B):
    return B * u - 1.0 - np.log(u - 1.0) - a * _log_term(u)


def _pressure(u, a):
    q = (u + D1) * (u + D2)
    return 1.0 / (u - 1.0) - a / q, -1.0 / (u - 1.0) ** 2 + a * (2.0 * u + D1 + D2) / q**2


def liquid_root(a, B, steps=80):
    """Liquid u = v/b [-] for attraction a [-] and pressure B [-]; NaN where no liquid root exists."""
    half = 0.5 * (D1 + D2 - a)
    inside = half**2 - (D1 * D2 + a)
    u = np.where(inside >= 0.0, -half - np.sqrt(np.maximum(inside, 0.0)), 3.0)
    for _ in range(steps):
        p, dp = _pressure(u, a)
        step = (p - B) / dp
        new = np.where(dp < 0.0, u - step, u * 0.9)
        last, u = u, np.clip(new, 1.0 + 0.2 * (u - 1.0), 2.0 * u)
        if not np.any(np.abs(u - last) > STILL * last):
            break
    p, dp = _pressure(u, a)
    good = (np.abs(p - B) <= 1e-9 * np.maximum(B, 1e-3)) & (dp < 0.0)
    return np.where(good, u, np.nan)


def vapour_root(a, B, steps=80):
    """Vapour u = v/b [-] for attraction a [-] and pressure B [-]; NaN where no vapour root exists."""
    u = 1.0 / B
    for _ in range(steps):
        p, dp = _pressure(u, a)
        new = np.where(dp < 0.0, u - (p - B) / dp, 1.3 * u)
        last, u = u, np.clip(new, 1.0 + 0.2 * (u - 1.0), 2.0 * u)
        if not np.any(np.abs(u - last) > STILL * last):
            break
    p, dp = _pressure(u, a)
    good = (np.abs(p - B) <= 1e-9 * B) & (dp < 0.0)
    return np.where(good, u, np.nan)


def alpha_at_saturation(Tr, Pr, steps=200):
    """Alpha [-] that makes the equation saturate at reduced temperature and pressure [-], and its weight.

    The second array is d ln P / d ln alpha at saturation [-]: how much an error of alpha
    shows in the vapour pressure. NaN where the search did not end.
    """
    Tr, Pr = np.asarray(Tr, dtype=float), np.asarray(Pr, dtype=float)
    B = OMEGA_B * Pr / Tr
    a = OMEGA_A / OMEGA_B * np.exp(0.7 * (1.0 - Tr)) / Tr
    with np.errstate(all="ignore"):
        for _ in range(steps):
            liquid, vapour = liquid_root(a, B), vapour_root(a, B)
            one = ~(vapour - liquid > 1e-4 * vapour)  # only one phase exists with this attraction
            gas_like = np.where(np.isfinite(vapour), vapour, liquid) > U_CRITICAL
            gap = _ln_fugacity(liquid, a, B) - _ln_fugacity(vapour, a, B)
            slope = _log_term(vapour) - _log_term(liquid)
            step = np.where(
                one, np.where(gas_like, -0.003, 0.003) * a, np.clip(gap / slope, -0.1 * a, 0.1 * a)
            )
            a = a - step
            if np.all(np.abs(step) < 1e-13 * a):
                break
        weight = a * slope / (B * (vapour - liquid))
        good = ~one & (np.abs(gap) < 1e-9)
    return np.where(good, a * Tr * OMEGA_B / OMEGA_A, np.nan), np.where(good, weight, np.nan)


def psat_of_alpha(T, alpha, Tc, Pc, P_guess, steps=60):
    """Vapour pressure [Pa] of the equation at T [K] with the alpha [-] given; NaN without saturation."""
    T, alpha = np.asarray(T, dtype=float), np.asarray(alpha, dtype=float)
    a = OMEGA_A / OMEGA_B * alpha * Tc / T
    scale = OMEGA_B * Tc / (Pc * T)
    ln_P = np.log(np.asarray(P_guess, dtype=float))
    with np.errstate(all="ignore"):
        for _ in range(steps):
            B = np.exp(ln_P) * scale
            liquid, vapour = liquid_root(a, B), vapour_root(a, B)
            gap = _ln_fugacity(liquid, a, B) - _ln_fugacity(vapour, a, B)
            step = np.clip(gap / (B * (liquid - vapour)), -0.5, 0.5)
            ln_P = ln_P - step
            if not np.any(np.abs(step) > 1e-13):
                break
    return np.where((vapour - liquid > 1e-4 * vapour) & (np.abs(gap) < 1e-9), np.exp(ln_P), np.nan)


def liquid_volume(T, P, alpha, Tc, Pc):
    """Untranslated liquid volume [m3/mol] of the equation at T [K], P [Pa] with the alpha [-] given."""
    T = np.asarray(T, dtype=float)
    a = OMEGA_A / OMEGA_B * np.asarray(alpha, dtype=float) * Tc / T
    B = OMEGA_B * np.asarray(P, dtype=float) * Tc / (Pc * T)
    return liquid_root(a, B) * covolume(Tc, Pc)
