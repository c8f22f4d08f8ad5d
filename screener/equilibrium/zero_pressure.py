"""Excess Gibbs energy matched exactly at zero pressure: the mixing rule of the PR-GE model.

At zero pressure the liquid root u = v/b of the Peng-Robinson equation depends
only on alpha = a / (b R T), and ln(f b / R T) equals

    q(alpha) = -1 - ln(u - 1) - alpha / (d2 - d1) ln((u + d2) / (u + d1)).

Setting the equation's excess Gibbs energy at zero pressure equal to that of
an activity model gives alpha of the mixture:

    q(alpha) = G^E/RT + sum x_i q(alpha_i) + sum x_i ln(b / b_i),   b linear
    d(n alpha)/dn_i = alpha + (ln gamma_i + q(alpha_i) + ln(b/b_i) + b_i/b - 1 - q) / q'.

The root exists down to alpha = 4 + 2 sqrt 2. Below JOINT, where light gases
lie, q goes on with continuous value, slope and curvature; its slope settles
at SLOPE_BELOW, so that q stays strictly falling and can always be inverted.

Source: Michelsen, Fluid Phase Equilib. 60 (1990) 213 (exact matching); the
continuation below JOINT is this project's own.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache

import numpy as np

from screener.equilibrium.cubic import PENG_ROBINSON
from screener.equilibrium.rows import row_sum

JOINT = 7.6  # [-] where the continuation begins; own choice, about 0.84 Tc, where q still bends little
SLOPE_BELOW = -0.30  # [-] slope of q far below the joint; own choice

_D1, _D2 = PENG_ROBINSON


def _liquid(alpha):
    """q and its slope where the zero-pressure liquid root exists. [-]"""
    k = alpha - 4.0
    gap = 4.0 / (k + np.sqrt(k * k - 8.0))  # u - 1 without cancellation
    slope = np.log((gap + (1.0 + _D2)) / (gap + (1.0 + _D1))) / (_D1 - _D2)
    return -1.0 - np.log(gap) + alpha * slope, slope


def _liquid_curvature(alpha):
    """d2q/dalpha2 where the zero-pressure liquid root exists. [-]"""
    k = alpha - 4.0
    gap = 4.0 / (k + np.sqrt(k * k - 8.0))
    product = (gap + (1.0 + _D1)) * (gap + (1.0 + _D2))
    return 1.0 / product / ((2.0 * gap + 4.0) / gap - product / gap**2)


def curvature_of_q(alpha):
    """Second derivative of the zero-pressure function.

    Parameters
    ----------
    alpha : array
        a / (b R T). [-]

    Returns
    -------
    array
        d2q/dalpha2, in the shape of alpha; continuous at JOINT. [-]

    Source
    ------
    As `q_and_slope`.
    """
    curvature = _liquid_curvature(np.maximum(alpha, JOINT))
    _, s0, rate = _joint()
    bent = (s0 - SLOPE_BELOW) * rate * np.exp(rate * np.minimum(alpha - JOINT, 0.0))
    return np.where(alpha < JOINT, bent, curvature)


@lru_cache(maxsize=1)
def _joint():
    """Value and slope of q at the joint, and the rate at which the slope settles below it. [-]"""
    value, slope = (float(v) for v in _liquid(np.array(JOINT)))
    return value, slope, float(_liquid_curvature(np.array(JOINT))) / (slope - SLOPE_BELOW)


def q_and_slope(alpha):
    """The zero-pressure function q and dq/dalpha.

    Parameters
    ----------
    alpha : array
        a / (b R T). [-]

    Returns
    -------
    tuple of array
        q and its slope, in the shape of alpha; strictly falling. [-]

    Source
    ------
    Michelsen 1990; own continuation below JOINT.
    """
    q, slope = _liquid(np.maximum(alpha, JOINT))
    below = alpha < JOINT
    if below.any():
        q0, s0, rate = _joint()
        step = np.minimum(alpha - JOINT, 0.0)
        bend = (s0 - SLOPE_BELOW) * np.expm1(rate * step)
        q = np.where(below, q0 + SLOPE_BELOW * step + bend / rate, q)
        slope = np.where(below, s0 + bend, slope)
    return q, slope


@lru_cache(maxsize=1)
def _start_table():
    """-q (rising) and alpha, for a first value of the inverse."""
    alpha = np.concatenate([np.linspace(-30.0, 20.0, 2001), np.geomspace(20.0, 500.0, 1001)[1:]])
    return -q_and_slope(alpha)[0], alpha


def alpha_of_q(q):
    """alpha at which the zero-pressure function equals q, and the slope there.

    Parameters
    ----------
    q : array, shape (n,)
        Wanted value. [-]

    Returns
    -------
    tuple of array
        alpha (n,) and dq/dalpha (n,); NaN where q is no number. [-]

    Source
    ------
    Newton's method; q is concave and falling, so it cannot leave the root once right of it.
    """
    alpha = np.interp(-q, *_start_table())
    for _ in range(12):
        value, slope = q_and_slope(alpha)
        step = (value - q) / slope
        alpha = alpha - step
        if not (np.abs(step) > 1e-7 * np.abs(alpha) + 1e-9).any():  # the next would be below round-off
            break
    return alpha, q_and_slope(alpha)[1]


@dataclass(frozen=True)
class ZeroPressure:
    """The mixing rule; excess is a model with `.at(T)` giving `.ln_gamma(x)` and `.take(lanes)`."""

    excess: object

    def at(self, T, alpha_i, b_i) -> ZeroPressureAt:
        """The temperature-only part: alpha_i (n, c) = a_i / (b_i R T)."""
        return ZeroPressureAt(self.excess.at(T), q_and_slope(alpha_i)[0] - np.log(b_i))


@dataclass(frozen=True)
class ZeroPressureAt:
    """The rule at fixed temperatures; reference (n, c) = q(alpha_i) - ln b_i."""

    excess: object
    reference: np.ndarray

    def take(self, lanes) -> ZeroPressureAt:
        """The same for some of the lanes."""
        return ZeroPressureAt(self.excess.take(lanes), self.reference[lanes])

    def ln_gamma(self, x):
        """ln gamma (n, c) [-] of the excess Gibbs energy model."""
        return self.excess.ln_gamma(x)

    def mix(self, x, b, b_i):
        """alpha (n,) [-] and abar (n, c) [-] of mixtures x (n, c) with covolume b (n,)."""
        term = self.excess.ln_gamma(x) + self.reference
        ln_b = np.log(b)
        q = row_sum(x * term) + ln_b
        alpha, slope = alpha_of_q(q)
        term += (ln_b - 1.0 - q)[:, None]
        term += b_i / b[:, None]
        term /= slope[:, None]
        term += alpha[:, None]
        return alpha, term

    def slopes(self, x, mixture, alpha_i):
        """Derivatives in T of alpha, alpha again and abar: (n,) [1/K], (n,) [1/K2], (n, c) [1/K].

        alpha_i holds the components' alpha_i (n, c) [-] and its two derivatives, mixture what `mix` gave.
        Both sides of the matching condition, derived at fixed x.
        """
        value, first, second = alpha_i
        ln_gamma_1, excess_2 = self.excess.slopes(x)
        slope_i = q_and_slope(value)[1]
        term = ln_gamma_1 + slope_i * first
        bend = curvature_of_q(value) * first**2 + slope_i * second
        q_1 = row_sum(x * term)
        q_2 = excess_2 + row_sum(x * bend)
        slope, curvature = q_and_slope(mixture.alpha)[1], curvature_of_q(mixture.alpha)
        alpha_1 = q_1 / slope
        alpha_2 = (q_2 - curvature * alpha_1**2) / slope
        away = (mixture.abar - mixture.alpha[:, None]) * (curvature * alpha_1)[:, None]
        abar_1 = alpha_1[:, None] + (term - q_1[:, None] - away) / slope[:, None]
        return alpha_1, alpha_2, abar_1
