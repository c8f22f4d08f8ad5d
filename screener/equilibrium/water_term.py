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
    """Columns A0 [-], A1 [K], E0 [-], E1 [K], W [-] and the masks water and alcohol side by side, (c, 7).

    A = A0 + A1/T and E = E0 + E1/T; a species that takes no part holds zeros.
    """

    columns: np.ndarray
    half: float

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
        return cls(np.column_stack([A0, A1, both - A0, -A1, W, water, targets.alcohol]), targets.half)

    def ln_gamma(self, x, T):
        """Its part of ln gamma (n, c) [-] at mole fractions x (n, c) and T (n,). [K]"""
        return self.term(x, 1.0, 1.0 / T, 1.0)[1]

    def slopes(self, x, T):
        """d ln gamma / dT (n, c) [1/K] and the second derivative in T of G^E/RT (n,) [1/K2] at fixed x."""
        return self.term(x, 0.0, -1.0 / T**2, 0.0)[1], self.term(x, 0.0, 2.0 / T**3, 0.0)[0]

    def term(self, x, constant, tau, wet):
        """The term g (n,) and ln gamma (n, c) = g + dg/dx_k - sum_j x_j dg/dx_j.

        Its coefficients are constant * A0 + tau * A1, the same of E, and wet * W:
        (1, 1/T, 1) gives the term itself, their derivatives in T its slopes.
        """
        sums = x @ self.columns
        if np.size(tau) > sums.shape[0] == 1:  # one composition at many temperatures
            sums = np.broadcast_to(sums, (np.size(tau), sums.shape[1]))
        x_w, s = sums[:, 5], sums[:, 6]
        f, f_1 = s / (s + self.half), self.half / (s + self.half) ** 2
        H_E = constant * sums[:, 2] + tau * sums[:, 3]
        dry = constant * sums[:, 0] + tau * sums[:, 1] + x_w * H_E
        H_W = wet * sums[:, 4]
        inner, by_dry = (1.0 - f) * dry + f * H_W, x_w * (1.0 - f)
        weight = np.empty(sums.shape)
        weight[:, 0], weight[:, 1] = by_dry * constant, by_dry * tau
        weight[:, 2], weight[:, 3] = by_dry * x_w * constant, by_dry * x_w * tau
        weight[:, 4], weight[:, 5], weight[:, 6] = (
            x_w * f * wet,
            inner + by_dry * H_E,
            x_w * f_1 * (H_W - dry),
        )
        g = x_w * inner
        slope = weight @ self.columns.T
        slope += (g - np.einsum("nk,nk->n", weight, sums))[:, None]
        return g, slope
