"""Water and hydrocarbons in the excess Gibbs energy: what group contributions miss.

Modified UNIFAC lets a paraffin dissolve some fifteen times the water it does,
cyclohexane a fifth of it, and lets a blend with ethanol hold less than half of
the water it does. With w water, h hydrocarbons, s the share of alcohols,

    G^E/RT += x_w sum_h x_h [(1 - f)(A_h + x_w E_h) + f W_h],   f = s / (s + half)

A_h sets the water a dry hydrocarbon dissolves, A_h + E_h the hydrocarbon that
dissolves in water: both take the activity coefficients at infinite dilution
from UNIFAC's values to those of measured solubilities. W_h replaces them where
alcohols share their hydrogen bonds with the water.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

ANCHORS = np.array([273.15, 323.15, 298.15])  # [K] A is exact at the first two, A + E at the third


@dataclass(frozen=True)
class WaterTerm:
    """Masks water and alcohol (c,); A0, E0, W [-] and A1, E1 [K] (c,), zero where a species takes no part."""

    water: np.ndarray
    alcohol: np.ndarray
    half: float
    A0: np.ndarray
    A1: np.ndarray
    E0: np.ndarray
    E1: np.ndarray
    W: np.ndarray

    @classmethod
    def of(cls, unifac, targets) -> WaterTerm | None:
        """The term of a mixture, or None where no hydrocarbon meets water.

        unifac is the group-contribution model that is corrected, targets what
        `screener.species.water_targets` gave.
        """
        hydrocarbon, water = targets.hydrocarbon, targets.water
        if not (hydrocarbon.any() and water.any()):
            return None
        c, T = water.size, ANCHORS
        pure = np.vstack([np.eye(c), water / water.sum()])
        ln_gamma = unifac.at(np.repeat(T, c + 1)).ln_gamma(np.tile(pure, (3, 1))).reshape(3, c + 1, c)
        of_water = ln_gamma[:, :c, np.flatnonzero(water)[0]]  # of a trace of water in each pure species
        A = np.where(hydrocarbon, targets.water_in(T) - of_water, 0.0)
        both = np.where(hydrocarbon, targets.in_water - ln_gamma[2, c], 0.0)  # UNIFAC's slope with T stands
        A1 = (A[1] - A[0]) / (1.0 / T[1] - 1.0 / T[0])
        A0 = A[0] - A1 / T[0]
        W = np.where(hydrocarbon, targets.wet, 0.0)
        return cls(water.astype(float), targets.alcohol.astype(float), targets.half, A0, A1, both - A0, -A1, W)

    def ln_gamma(self, x, T):
        """Its part of ln gamma (n, c) [-] at mole fractions x (n, c) and T (n,). [K]"""
        return self._partial(x, *(0.0 + c0 + c1 / T[:, None] for c0, c1 in self._pairs()), self.W)[1]

    def slopes(self, x, T):
        """d ln gamma / dT (n, c) [1/K] and the second derivative in T of G^E/RT (n,) [1/K2] at fixed x."""
        T = T[:, None]
        first = self._partial(x, *(-c1 / T**2 for _, c1 in self._pairs()), np.zeros_like(self.W))[1]
        second = self._partial(x, *(2.0 * c1 / T**3 for _, c1 in self._pairs()), np.zeros_like(self.W))[0]
        return first, second

    def _pairs(self):
        return (self.A0, self.A1), (self.E0, self.E1)

    def _partial(self, x, A, E, W):
        """The term g (n,) and ln gamma (n, c) = g + dg/dx_k - sum_j x_j dg/dx_j at coefficients (n, c)."""
        x_w, s = x @ self.water, x @ self.alcohol
        f, f_1 = s / (s + self.half), self.half / (s + self.half) ** 2
        H_A, H_E, H_W = (x * A).sum(axis=1), (x * E).sum(axis=1), x @ W
        dry = H_A + x_w * H_E
        inner = (1.0 - f) * dry + f * H_W
        by_water = inner + (1.0 - f) * x_w * H_E
        by_alcohol = x_w * f_1 * (H_W - dry)
        slope = (x_w * (1.0 - f))[:, None] * (A + x_w[:, None] * E) + (x_w * f)[:, None] * W
        slope += by_water[:, None] * self.water + by_alcohol[:, None] * self.alcohol
        g = x_w * inner
        return g, slope + (g - (x * slope).sum(axis=1))[:, None]
