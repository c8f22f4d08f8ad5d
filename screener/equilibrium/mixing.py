"""Mixing rules: from composition to the reduced attraction alpha and d(n alpha)/dn_i."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

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
            field = self.root * s.sum(axis=1, keepdims=True)
        else:
            field = self.root * (s.sum(axis=1, keepdims=True) - s @ self.kij)
        alpha = np.einsum("nc,nc->n", np.broadcast_to(x, field.shape), field) / b
        abar = (2.0 * field - alpha[:, None] * b_i) / b[:, None]
        return alpha, abar

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
