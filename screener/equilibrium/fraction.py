"""Two phases of given vapour fraction: the fixed-point problem behind flashes that solve for T or P.

With ln K_i = u_i - h_i s, where s is 1/T and h_i Wilson's slope at given P, and
s is ln P and h_i = 1 at given T, the unknown s is the root of

    ln sum z K / (1 + beta (K - 1)) - ln sum z / (1 + beta (K - 1)) = 0,

which falls strictly with s; at beta = 0 and 1 it is the bubble and the dew
point. x, y and s follow from u, and the step is u -> ln phi_L - ln phi_V + h s.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from screener.equilibrium.fixed_point import solve
from screener.equilibrium.incipient import HIGHEST_P, HIGHEST_T, LOWEST_P, LOWEST_T, step
from screener.equilibrium.phase import DENSE, reduced_volume
from screener.ground.status import Status

LARGEST = 300.0  # bound of |ln K|: keeps squares of exp in double precision
TRIVIAL = 1e-4  # [-] largest |ln K| and relative difference of volume of two phases that are one
ROUNDING = 3e-14  # [-] of ln of a sum whose terms carry u of some tens; below it there is no root to sharpen
REACH = 1.0  # longest accelerated step in ln K


class AtFraction:
    """Lanes of given vapour fraction beta (n,) and given T or P: `name`, `value` (n,); s (n,) the last root."""

    def __init__(self, fluid, name: str, value, z, beta, state=None, s=None):
        self.fluid, self.name, self.value, self.z, self.beta = fluid, name, value, z, beta
        self.present = z > 0.0
        self.state = fluid.at(value) if state is None and name == "T" else state
        self.h = np.ones(fluid.c) if name == "T" else 5.373 * (1.0 + fluid.omega) * fluid.Tc
        low, high = (LOWEST_P, HIGHEST_P) if name == "T" else (1.0 / HIGHEST_T, 1.0 / LOWEST_T)
        self.low, self.high = (np.log(low), np.log(high)) if name == "T" else (low, high)
        self.s = np.full(value.shape, np.log(1e5) if name == "T" else 1.0 / 300.0) if s is None else s

    def take(self, lanes) -> AtFraction:
        """Some of the lanes."""
        state = None if self.state is None else self.state.take(lanes)
        return AtFraction(
            self.fluid, self.name, self.value[lanes], self.z[lanes], self.beta[lanes], state, self.s[lanes]
        )

    def close(self, u):
        """T (n,) [K], P (n,) [Pa], x and y (n, c) at these u; keeps s."""
        s, low, high = self.s, np.full(self.s.shape, self.low), np.full(self.s.shape, self.high)
        for _ in range(80):
            x, y, f, slope = self._balance(u, s)
            done = ~(np.abs(f) > ROUNDING)
            if done.all():
                break
            low, high = np.where(f > 0.0, s, low), np.where(f < 0.0, s, high)
            with np.errstate(all="ignore"):
                new = s - f / slope
            new = np.where((new > low) & (new < high), new, 0.5 * (low + high))
            s = np.where(done, s, new)
        self.s = s
        other = np.exp(s) if self.name == "T" else 1.0 / s
        return (self.value, other, x, y) if self.name == "T" else (other, self.value, x, y)

    def _balance(self, u, s):
        """x and y (n, c), the function of s (n,) and its slope (n,)."""
        z, beta = self.z, self.beta[:, None]
        ln_K = np.where(self.present, np.clip(u - self.h * s[:, None], -LARGEST, LARGEST), 0.0)
        K = np.exp(ln_K)
        with np.errstate(all="ignore"):
            x = z / ((1.0 - beta) + beta * K)
            y = x * K
            sum_x, sum_y = x.sum(axis=1), y.sum(axis=1)
            f = np.log(sum_y) - np.log(sum_x)
            x, y = x / sum_x[:, None], y / sum_y[:, None]
            denominator = (1.0 - beta) + beta * K
            weight = (y * (1.0 - beta) + x * beta * K) / denominator
        return x, y, f, -(weight * self.h).sum(axis=1)

    def image(self, u):
        """ln phi_L - ln phi_V + h s."""
        T, P, x, y = self.close(u)
        state = self.fluid.at(T) if self.name == "P" else self.state
        return step(state.mix(x), state.mix(y), P, True, u, self.h * self.s[:, None])


class Fractions(NamedTuple):
    """T [K], P [Pa], beta, x, y, ln_K, u of the lanes, with status, iterations, residual and balance."""

    T: np.ndarray
    P: np.ndarray
    beta: np.ndarray
    x: np.ndarray
    y: np.ndarray
    ln_K: np.ndarray
    u: np.ndarray
    status: np.ndarray
    iterations: np.ndarray
    residual: np.ndarray
    balance: np.ndarray


def at_fraction(fluid, name: str, value, z, beta, u, s=None) -> Fractions:
    """Two phases of given vapour fraction, from a start.

    Parameters
    ----------
    fluid : Fluid
        The fluid.
    name : str
        "T" or "P": what `value` is.
    value : array, shape (n,)
        Temperature [K] or pressure [Pa].
    z : array, shape (n, c)
        Feed. [-]
    beta : array, shape (n,)
        Vapour fraction by moles, 0 to 1. [-]
    u : array, shape (n, c)
        Start: ln K + h s. [-]
    s : array, shape (n,), optional
        Start of ln P or 1/T. [-]

    Returns
    -------
    Fractions
        Lanes that did not converge, or not on two phases, hold NaN.

    Source
    ------
    Successive substitution with the phase fraction given; as `bubble_pressure`.
    """
    problem = AtFraction(fluid, name, value, z, beta, s=s)
    fixed = solve(problem, np.where(problem.present, u, 0.0), problem.present, reach=REACH)
    problem.s = problem.s if s is None else np.array(s)
    T, P, x, y = problem.close(fixed.u)
    ln_K = np.where(problem.present, fixed.u - problem.h * problem.s[:, None], 0.0)
    status = _judge(problem, fixed, T, P, x, y, ln_K)
    lost = status != Status.CONVERGED
    balance = np.abs(z - (1.0 - beta)[:, None] * x - beta[:, None] * y).max(axis=1)
    T, P = (T, np.where(lost, np.nan, P)) if name == "T" else (np.where(lost, np.nan, T), P)
    row = lost[:, None]
    return Fractions(
        T,
        P,
        beta,
        np.where(row, np.nan, x),
        np.where(row, np.nan, y),
        np.where(row, np.nan, ln_K),
        fixed.u,
        status,
        fixed.iterations,
        fixed.residual,
        np.where(lost, np.nan, balance),
    )


def _judge(problem, fixed, T, P, x, y, ln_K):
    """Status (n,) of what the iteration found, in the words of a saturation point."""
    state = problem.fluid.at(T)
    liquid, vapour = state.mix(x), state.mix(y)
    ratio = reduced_volume(liquid, P, liquid.Z(P, "L")), reduced_volume(vapour, P, vapour.Z(P, "V"))
    volume_L, volume_V = ratio[0] * liquid.b, ratio[1] * vapour.b
    with np.errstate(invalid="ignore"):
        status = np.where(fixed.converged, int(Status.CONVERGED), int(Status.OUT_OF_STEPS))
        alike = (np.abs(ln_K).max(axis=1) < TRIVIAL) & ~(np.abs(volume_V / volume_L - 1.0) > TRIVIAL)
        dense = (ratio[0] < DENSE) & (ratio[1] < DENSE)
        width = 1e-6 * (problem.high - problem.low)
        outside = ~((problem.s > problem.low + width) & (problem.s < problem.high - width))
    status = np.where(fixed.converged & (volume_V <= volume_L), int(Status.NO_SOLUTION), status)
    status = np.where(fixed.converged & dense, int(Status.LIQUID_SPLITS), status)
    status = np.where(outside, int(Status.OUT_OF_RANGE), status)
    return np.where(fixed.converged & alike, int(Status.TRIVIAL), status)


def start_of(fluid, name: str, point):
    """u (n, c) and s (n,) of saturation points (a Saturation or Flash); NaN where it did not converge."""
    h = np.ones(fluid.c) if name == "T" else 5.373 * (1.0 + fluid.omega) * fluid.Tc
    with np.errstate(all="ignore"):
        s = np.log(point.P) if name == "T" else 1.0 / point.T
        u = np.where(point.x > 0.0, np.log(point.K), 0.0) + h * s[:, None]
    return np.where(point.ok[:, None], u, np.nan), np.where(point.ok, s, np.nan)


def blind_start(fluid, name: str, value):
    """u (n, c) and s (n,) from Wilson's K at given T or P (n,), where nothing better is known."""
    if name == "T":
        return np.log(fluid.wilson_K(value, 1.0)), np.full(value.shape, np.log(1e5))
    return np.log(fluid.Pc / value[:, None]) + 5.373 * (1.0 + fluid.omega), np.full(value.shape, 1.0 / 300.0)


def between(beta, one, other):
    """A start for beta (n,) from two starts (u, s) of beta 0 and 1; from one where the other is NaN."""
    parts = []
    for a, b in zip(one, other, strict=True):
        share = beta.reshape((-1,) + (1,) * (a.ndim - 1))
        mean = (1.0 - share) * a + share * b
        parts.append(np.where(np.isfinite(mean), mean, np.where(np.isfinite(a), a, b)))
    return parts[0], parts[1]
