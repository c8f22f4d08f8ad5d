"""A fluid at fixed temperatures: what an iteration over pressure and composition asks again and again."""

from __future__ import annotations

from dataclasses import dataclass
from typing import NamedTuple

import numpy as np

from screener.equilibrium.eos import Mixture, attraction_at_critical
from screener.ground.constants import R


class Slopes(NamedTuple):
    """Derivatives in T of a mixture's alpha (n,) [1/K], of the same again (n,) [1/K2], of abar (n, c) [1/K], of the
    translation (n,) [m3/(mol K)]."""

    alpha_1: np.ndarray
    alpha_2: np.ndarray
    abar_1: np.ndarray
    shift_1: np.ndarray


@dataclass(frozen=True)
class AtTemperature:
    """A fluid at fixed temperatures T (n,), or one T for all lanes.

    alpha_i (n, c) = a_i / (b_i R T) [-]; b_i (c,) and the volume translation
    shift_i (n, c) [m3/mol]; mixing is the mixing rule at these temperatures.
    """

    fluid: object
    T: np.ndarray
    alpha_i: np.ndarray
    b_i: np.ndarray
    mixing: object
    shift_i: np.ndarray

    def take(self, lanes) -> AtTemperature:
        """The same for some of the lanes (indices or mask); one T for all lanes stays so."""
        if self.T.size == 1:
            return self
        return AtTemperature(
            self.fluid, self.T[lanes], self.alpha_i[lanes], self.b_i, self.mixing.take(lanes), self.shift_i[lanes]
        )

    def mix(self, x) -> Mixture:
        """Mixtures of compositions x (c,) or (n, c): what pressure does not change."""
        x = as_rows(x)
        with np.errstate(all="ignore"):
            b = x @ self.b_i
            alpha, abar = self.mixing.mix(x, b, self.b_i)
        return Mixture(self.fluid.equation.d, R * self.T, alpha, abar, b, self.b_i, x, self.shift_i)

    def slopes(self, x, mixture: Mixture) -> Slopes:
        """How the mixtures `mix(x)` change with temperature at fixed composition x (n, c)."""
        x = as_rows(x)
        equation, T = self.fluid.equation, self.T[:, None]
        k = attraction_at_critical(equation, self.fluid.Tc, self.fluid.Pc) / (self.b_i * R)
        with np.errstate(all="ignore"):
            alpha, first, second = self.fluid.alpha.slopes(self.T)
            first, second = first - alpha / T, second - 2.0 * first / T + 2.0 * alpha / T**2
            alpha_i = self.alpha_i, k / T * first, k / T * second
            return Slopes(*self.mixing.slopes(x, mixture, alpha_i), x @ self.fluid.shift_1)

    def ln_phi(self, P, x, phase: str):
        """ln phi (n, c) [-] at P (n,) [Pa] and composition x (n, c)."""
        return self.mix(x).ln_phi(as_lanes(P), phase)

    def volume(self, P, x, phase: str):
        """Translated molar volume (n,) [m3/mol] at P (n,) [Pa] and composition x (n, c)."""
        return self.mix(x).volume(as_lanes(P), phase)

    def ln_gamma(self, x):
        """ln gamma (n, c) [-] at composition x (n, c); NaN for a model without an excess Gibbs energy."""
        with np.errstate(all="ignore"):
            return self.mixing.ln_gamma(as_rows(x))


def as_lanes(value):
    """A scalar or (n,) array as float (n,)."""
    return np.atleast_1d(np.asarray(value, dtype=float))


def as_rows(x):
    """A composition (c,) or (n, c) as float (n, c)."""
    return np.atleast_2d(np.asarray(x, dtype=float))


def distinct(T):
    """Distinct temperatures and the lane index back to them, or all with None when few repeat."""
    T = as_lanes(T)
    if T.size == 1:
        return T, None
    if (T == T[0]).all():
        return T[:1], None
    values, lanes = np.unique(T, return_inverse=True)
    return (values, lanes) if values.size <= T.size // 2 else (T, None)
