"""The excess Gibbs energy of a blend: modified UNIFAC, a pair term (dissolved gases, measured pairs), a water term.

    G^E/RT = (UNIFAC) + sum_{i<j} x_i x_j A_ij(T) + (water term),   A_ij = A0 + A1/T + A2 ln T

so that the pair term adds ln gamma_i = (A x)_i - x A x / 2. The water term is in `water_term`.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.equilibrium.unifac import Unifac, UnifacAt
from screener.equilibrium.water_term import WaterTerm


@dataclass(frozen=True)
class Excess:
    """UNIFAC, the pair term (A0 [-], A1 [K], A2 [-] symmetric (c, c), each None without one) and the water term."""

    unifac: Unifac
    A0: np.ndarray | None
    A1: np.ndarray | None
    A2: np.ndarray | None
    water: WaterTerm | None = None

    @classmethod
    def of(cls, unifac: Unifac, A0, A1, A2, water: WaterTerm | None = None) -> Excess:
        """From coefficient arrays (c, c); an array of zeros is dropped."""
        return cls(unifac, *(m if np.any(m) else None for m in (A0, A1, A2)), water)

    def at(self, T) -> ExcessAt:
        """The temperature-only part for T (n,). [K]"""
        return ExcessAt(self, self.unifac.at(T), T)


@dataclass(frozen=True)
class ExcessAt:
    """The same at fixed temperatures T (n,). [K]"""

    model: Excess
    unifac: UnifacAt
    T: np.ndarray

    def take(self, lanes) -> ExcessAt:
        """The same for some of the lanes."""
        return ExcessAt(self.model, self.unifac.take(lanes), self.T[lanes])

    def ln_gamma(self, x):
        """ln gamma (n, c) [-] at mole fractions x (n, c)."""
        ln_gamma = self.unifac.ln_gamma(x)
        T = self.T[:, None]
        for matrix, factor in ((self.model.A0, None), (self.model.A1, 1.0 / T), (self.model.A2, np.log(T))):
            if matrix is None:
                continue
            field = x @ matrix
            half = 0.5 * np.einsum("nc,nc->n", x, field)
            field -= half[:, None]
            ln_gamma = ln_gamma + (field if factor is None else factor * field)
        if self.model.water is not None:
            ln_gamma = ln_gamma + self.model.water.ln_gamma(x, self.T)
        return ln_gamma

    def slopes(self, x):
        """d ln gamma / dT (n, c) [1/K] and d2(G^E/RT)/dT2 (n,) [1/K2] at mole fractions x (n, c)."""
        ln_gamma_1, excess_2 = self.unifac.slopes(x, self.T)
        T = self.T[:, None]
        for matrix, first, second in (
            (self.model.A1, -1.0 / T**2, 2.0 / T**3), (self.model.A2, 1.0 / T, -1.0 / T**2)
        ):
            if matrix is None:
                continue
            field = x @ matrix
            half = 0.5 * np.einsum("nc,nc->n", x, field)
            ln_gamma_1 = ln_gamma_1 + first * (field - half[:, None])
            excess_2 = excess_2 + second[:, 0] * half
        if self.model.water is not None:
            first, second = self.model.water.slopes(x, self.T)
            ln_gamma_1, excess_2 = ln_gamma_1 + first, excess_2 + second
        return ln_gamma_1, excess_2
