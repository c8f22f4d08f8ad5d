"""Mixing rules: from composition to the reduced attraction alpha and d(n alpha)/dn_i."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.equilibrium.rows import row_sum
from screener.ground.errors import InputError, ShapeError


@dataclass(frozen=True)
class VanDerWaals:
    """a = sum x_i x_j sqrt(a_i a_j)(1 - k_ij), b linear.

    kij (c, c) is None when every pair is zero: the double sum is then a square.
    """

    kij: np.ndarray | None

    def at(self, T, alpha_i, b_i) -> VanDerWaalsAt:
        """The temperature-only part: alpha_i (n, c) = a_i / (b_i R T)."""
        root = np.sqrt(alpha_i * b_i)  # sqrt(a_i / RT)
        return VanDerWaalsAt(self.kij, root)


@dataclass(frozen=True)
class VanDerWaalsAt:
    """Van der Waals mixing at fixed temperatures; root (n, c) = sqrt(a_i / RT)."""

    kij: np.ndarray | None
    root: np.ndarray

    def take(self, lanes) -> VanDerWaalsAt:
        """The same for some of the lanes."""
        return VanDerWaalsAt(self.kij, self.root[lanes])

    def mix(self, x, b, b_i):
        """alpha (n,) [-] and abar (n, c) [-] of mixtures x (n, c) with covolume b (n,)."""
        s = x * self.root
        if self.kij is None:
            field = self.root * row_sum(s)[:, None]
        else:
            field = self.root * (row_sum(s)[:, None] - s @ self.kij)
        alpha = row_sum(x * field) / b
        field *= 2.0
        field -= alpha[:, None] * b_i
        field /= b[:, None]
        return alpha, field

    def slopes(self, x, mixture, alpha_i):
        """Derivatives in T of alpha, alpha again and abar: (n,) [1/K], (n,) [1/K2], (n, c) [1/K].

        alpha_i holds the components' alpha_i (n, c) [-] and its two derivatives, mixture what `mix` gave.
        """
        first = 0.5 * alpha_i[1] / alpha_i[0]  # of ln root
        second = 0.5 * alpha_i[2] / alpha_i[0] - first**2
        root, root_1 = self.root, self.root * first
        s, s_1, s_2 = x * root, x * root_1, x * (self.root * second)
        pull, pull_1 = self._pull(s), self._pull(s_1)
        b = mixture.b
        alpha_1 = 2.0 * row_sum(s_1 * pull) / b
        alpha_2 = 2.0 * (row_sum(s_2 * pull) + row_sum(s_1 * pull_1)) / b
        abar_1 = (2.0 * (root_1 * pull + root * pull_1) - alpha_1[:, None] * mixture.b_i) / b[:, None]
        return alpha_1, alpha_2, abar_1

    def _pull(self, s):
        """sum_j (1 - k_ij) s_j, (n, 1) where every k_ij is zero, else (n, c)."""
        total = row_sum(s)[:, None]
        return total if self.kij is None else total - s @ self.kij

    def ln_gamma(self, x):
        """NaN (n, c): this rule carries no excess Gibbs energy model."""
        return np.full_like(x, np.nan)


def interaction_matrix(kij, c: int):
    """kij as a symmetric (c, c) array with zero diagonal, or None when all are zero."""
    if kij is None:
        return None
    kij = np.asarray(kij, dtype=float)
    if kij.shape != (c, c):
        raise ShapeError("kij", kij.shape, f"({c}, {c})")
    if not np.allclose(kij, kij.T, rtol=0.0, atol=1e-12):
        raise InputError("kij", None, "kij is not symmetric", "k_ij = k_ji")
    kij = kij.copy()
    np.fill_diagonal(kij, 0.0)
    return kij if kij.any() else None
