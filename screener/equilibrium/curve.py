"""The equations of a saturation point of given composition, everything else unknown.

The unknowns are X = (ln K_1 .. ln K_c, ln T, ln P, g_w, g_z): K = w/z of the new
phase w over the feed z, and g = ln(v/b - 1) of both phases. With volumes among
the unknowns no root of the cubic is chosen anywhere, and nothing jumps where a
root appears or vanishes. One of them held, X_s = S, Newton solves

    ln K_i + ln f_i/w_i - ln f_i/z_i = 0,    ln sum z_i K_i = 0,    Z(v) - P v / RT = 0 of both phases.

Source: Michelsen, Fluid Phase Equilib. 4 (1980) 1; volumes as unknowns: own choice.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from screener.equilibrium.incipient import weighted
from screener.equilibrium.rows import row_max

MOST_PASSES = 8  # Newton passes of a point
TIGHT = 1e-11  # residual of a point: ten times below that of any answer
SHORT = 1e-6  # last Newton step of a point: next to critical points a small residual alone says little
FARTHEST = 4.0  # longest Newton step of any unknown
DIFFERENCE = 1e-5  # of the numerical derivatives, to both sides: leaves 1e-10 of them
T_, P_, W_, Z_ = -4, -3, -2, -1  # columns of X behind the ln K


class Point(NamedTuple):
    """X (n, c+4), converged (n,), passes (n,), tangent dX/dX_s (n, c+4)."""

    X: np.ndarray
    good: np.ndarray
    passes: np.ndarray
    tangent: np.ndarray


class Curve:
    """The equations of n curves, each at its own point."""

    def __init__(self, fluid, feed):
        self.fluid, self.feed, self.present = fluid, feed, feed > 0.0

    def take(self, lanes) -> Curve:
        """Some of the curves."""
        return Curve(self.fluid, self.feed[lanes])

    def equations(self, X):
        """Residuals (n, c+3) and their derivatives (n, c+3, c+4); only the new phase depends on ln K."""
        n, width = X.shape
        T, P, z, c = np.exp(X[:, T_]), np.exp(X[:, P_]), self.feed, width - 4
        state = self.fluid.at(T)
        w, ln_sum = weighted(z, X[:, :c])
        new, old = state.mix(w), state.mix(z)
        F = np.empty((n, width - 1))
        J = np.zeros((n, width - 1, width))
        f_w, Z_w, V_w = fugacity(new, X[:, W_])
        f_z, Z_z, V_z = fugacity(old, X[:, Z_])
        F[:, :c] = np.where(self.present, X[:, :c] + f_w - f_z, X[:, :c])
        F[:, c], F[:, c + 1], F[:, c + 2] = ln_sum, Z_w - P * V_w, Z_z - P * V_z
        J[:, c + 1, P_], J[:, c + 2, P_] = -P * V_w, -P * V_z
        lane, i = np.nonzero(self.present)
        moved, one = X[lane, :c], np.arange(lane.size)
        near = state.take(lane)
        for h in (DIFFERENCE, -DIFFERENCE):
            there = self.fluid.at(T * np.exp(h))
            for column, phase, mixture, g in (
                (W_, 0, new, X[:, W_] + h), (Z_, 1, old, X[:, Z_] + h),
                (T_, 0, there.mix(w), X[:, W_]), (T_, 1, there.mix(z), X[:, Z_]),
            ):  # fmt: skip
                f, Z, V = fugacity(mixture, g)
                J[:, :c, column] += np.where(self.present, (-1.0 if phase else 1.0) * f, 0.0) / (2.0 * h)
                J[:, c + 1 + phase, column] += (Z - P * V) / (2.0 * h)
            moved[one, i] = X[lane, i] + h
            f, Z, V = fugacity(near.mix(weighted(z[lane], moved)[0]), X[lane, W_])
            J[lane, :c, i] += np.where(self.present[lane], f, 0.0) / (2.0 * h)
            J[lane, c + 1, i] += (Z - P[lane] * V) / (2.0 * h)
        J[lane, c, i] = w[lane, i]
        J[:, np.arange(c), np.arange(c)] += 1.0
        return F, J

    def newton(self, X, spec, most=MOST_PASSES) -> Point:
        """Points next to X with the variable `spec` (n,) held."""
        n, width = X.shape
        out = Point(X.copy(), np.zeros(n, dtype=bool), np.zeros(n, dtype=int), np.zeros_like(X))
        going = np.arange(n)
        for _ in range(most):
            some = self if going.size == n else self.take(going)
            with np.errstate(all="ignore"):
                F, J = some.equations(out.X[going])
            held = np.zeros((going.size, 1, width))
            held[np.arange(going.size), 0, spec[going] % width] = 1.0
            right = np.zeros((going.size, width, 2))
            right[:, :-1, 0], right[:, -1, 1] = -F, 1.0
            step = _solved(np.concatenate([J, held], axis=1), right)
            with np.errstate(invalid="ignore"):
                size = row_max(np.abs(step[:, :, 0]))
                alive = np.isfinite(step).all(axis=(1, 2)) & (size < FARTHEST)
                done = alive & (row_max(np.abs(F)) < TIGHT) & (size < SHORT)
            here = going[alive]
            out.tangent[here] = step[alive, :, 1]
            out.X[here] += step[alive, :, 0]
            out.passes[going] += 1
            out.good[going[done]] = True
            going = going[alive & ~done]
            if going.size == 0:
                break
        return out


def fugacity(mixture, g):
    """ln f_i/x_i (n, c) [ln Pa], Z (n,) [-] and v/RT (n,) [1/Pa] at g = ln(v/b - 1) (n,)."""
    d1, d2 = mixture.d
    u = 1.0 + np.exp(g)
    Z = 1.0 + np.exp(-g) - mixture.alpha * u / ((u + d1) * (u + d2))
    pull = np.log((u + d2) / (u + d1)) / (d2 - d1)
    V = mixture.b / mixture.RT
    ln_f = ((Z - 1.0) / mixture.b)[:, None] * mixture.b_i - pull[:, None] * mixture.abar
    return ln_f - (np.log(V) + g)[:, None], Z, V * u


def _solved(J, right):
    """J^-1 right, NaN where J is singular."""
    out = np.full(right.shape, np.nan)
    fine = np.isfinite(J).all(axis=(1, 2)) & np.isfinite(right).all(axis=(1, 2))
    try:
        out[fine] = np.linalg.solve(J[fine], right[fine])
    except np.linalg.LinAlgError:
        out[fine] = np.linalg.pinv(J[fine]) @ right[fine]
    return out


