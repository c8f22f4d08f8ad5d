"""Group-contribution activity coefficients: original and modified (Dortmund) UNIFAC.

The residual part depends on a subgroup only through its surface Q and its
main group. With QN (c, M) the surface of each component summed by main group
it becomes products of small matrices, (n, c) @ (c, M) and (n, M) @ (M, M):

    Theta = x QN / (x q),   S = Theta psi,   g_m = 1 - ln S_m - sum_k psi_mk Theta_k / S_k
    ln gamma_i(residual) = sum_m QN_im (g_m - g_m of pure i)

with psi_km = exp(-(a_km + b_km T + c_km T^2) / T). Combinatorial part:

    ln gamma_i = 1 - V' + ln V' - 5 q_i (1 - V/F + ln V/F),
    V' = r_i^p / sum x r^p,  V = r_i / sum x r,  F = q_i / sum x q,

p = 3/4 in the modified form (p = 1 in the original one).

A component without groups (a dissolved gas) takes no part: the others see the
mixture as if it were not there, and its own ln gamma is zero. Fredenslund,
Jones and Prausnitz, AIChE J. 21 (1975) 1086; Gmehling, Li and Schiller,
Ind. Eng. Chem. Res. 32 (1993) 178.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np


@dataclass(frozen=True)
class Unifac:
    """Group counts folded into what the equations need.

    r, q, r_p (c,) volumes, surfaces and r^p, QN (c, M) surface by main group,
    a, b, c (M, M) interaction parameters between main groups. Only components
    with several main groups (their indices in `several`) have a residual part
    when pure; kinds (k, M) are their distinct rows of QN, kind the row of each.
    """

    r: np.ndarray
    q: np.ndarray
    r_p: np.ndarray
    QN: np.ndarray
    a: np.ndarray
    b: np.ndarray
    c: np.ndarray
    several: np.ndarray
    kinds: np.ndarray
    kind: np.ndarray

    @classmethod
    def of(cls, counts, R, Q, main, a, b=None, c=None, power: float = 0.75) -> Unifac:
        """The model from group tables.

        Parameters
        ----------
        counts : array, shape (c, G)
            How often each subgroup occurs in each component. [-]
        R : array, shape (G,)
            Subgroup volumes. [-]
        Q : array, shape (G,)
            Subgroup surfaces. [-]
        main : array, shape (G,)
            Main-group number of each subgroup.
        a : array, shape (G, G)
            Interaction parameters between subgroups. [K]
        b : array, shape (G, G), optional
            Their coefficients of T. [-]
        c : array, shape (G, G), optional
            Their coefficients of T^2. [1/K]
        power : float
            Exponent of r in V': 0.75 modified, 1 original. [-]

        Returns
        -------
        Unifac
            Interaction parameters that are NaN count as zero.

        Source
        ------
        Gmehling, Li and Schiller 1993; power 1 and b = c = 0: Fredenslund,
        Jones and Prausnitz 1975.
        """
        counts, R, Q, a = (np.asarray(v, dtype=float) for v in (counts, R, Q, a))
        b = np.zeros_like(a) if b is None else np.asarray(b, dtype=float)
        c = np.zeros_like(a) if c is None else np.asarray(c, dtype=float)
        _, first, group = np.unique(np.asarray(main), return_index=True, return_inverse=True)
        fold = np.zeros((R.size, first.size))
        fold[np.arange(R.size), group] = 1.0
        pick = np.ix_(first, first)
        r, QN = counts @ R, (counts * Q) @ fold
        several = np.flatnonzero((QN > 0.0).sum(axis=1) > 1)
        kinds, kind = np.unique(QN[several], axis=0, return_inverse=True)
        a, b, c = (np.nan_to_num(m[pick]) for m in (a, b, c))
        return cls(r, counts @ Q, r**power, QN, a, b, c, several, kinds, kind)

    def at(self, T) -> UnifacAt:
        """The temperature-only part for T (n,). [K]"""
        t = T[:, None, None]
        psi = np.exp(-(self.a / t + self.b + self.c * t))
        pure = np.zeros((T.size, self.q.size))
        if self.several.size:
            g = _group_terms(self.kinds / self.kinds.sum(axis=1, keepdims=True), psi)
            pure[:, self.several] = np.einsum("nkm,km->nk", g, self.kinds)[:, self.kind]
        return UnifacAt(self, psi, pure)


@dataclass(frozen=True)
class UnifacAt:
    """UNIFAC at fixed temperatures: psi (n, M, M) [-] and the pure-component residual terms (n, c). [-]"""

    model: Unifac
    psi: np.ndarray
    pure: np.ndarray

    def take(self, lanes) -> UnifacAt:
        """The same for some of the lanes."""
        return UnifacAt(self.model, self.psi[lanes], self.pure[lanes])

    def ln_gamma(self, x):
        """ln gamma (n, c) [-] at mole fractions x (n, c); rows need not sum to 1."""
        m = self.model
        has = m.q > 0.0
        if has.all():
            return self._of_groups(x)
        if not has.any():
            return np.zeros((max(x.shape[0], self.psi.shape[0]), has.size))
        share = x @ has.astype(float)
        # a phase of gas only: the others are seen in an even mixture of themselves
        x = np.where((share > 0.0)[:, None], x, has)
        return np.where(has, self._of_groups(x), 0.0)

    def _of_groups(self, x):
        m = self.model
        has = m.q > 0.0
        surface = x @ m.q
        theta = (x @ m.QN) / surface[:, None]
        rows = self.psi.shape[0] if x.shape[0] == 1 else x.shape[0]
        theta = np.broadcast_to(theta, (rows, theta.shape[1]))
        g = _group_terms(theta[:, None, :], self.psi)[:, 0, :]
        ln_gamma = g @ m.QN.T
        ln_gamma -= self.pure
        ln_gamma += self._combinatorial(x, surface, has)
        return ln_gamma

    def slopes(self, x, T):
        """d ln gamma / dT (n, c) [1/K] and d2(G^E/RT)/dT2 (n,) [1/K2] at x (n, c) and the T (n,) [K] of psi.

        The combinatorial part holds no T; sum_i x_i ln gamma_i of the residual part is
        -(x q) sum_m Theta_m ln S_m less the same of the pure components.
        """
        m, t = self.model, T[:, None, None]
        rate = m.a / t**2 - m.c
        psi_1 = self.psi * rate
        psi = self.psi, psi_1, psi_1 * rate - self.psi * (2.0 * m.a / t**3)
        has = m.q > 0.0
        n = max(x.shape[0], T.size)
        if not has.any():
            return np.zeros((n, has.size)), np.zeros(n)
        seen = np.where((x @ has.astype(float) > 0.0)[:, None], x, has)
        theta = (seen @ m.QN) / (seen @ m.q)[:, None]
        g_1, bend = _group_slopes(theta[:, None, :], *psi)
        ln_gamma_1, excess_2 = g_1[:, 0, :] @ m.QN.T, bend[:, 0] * (x @ m.q)
        if m.several.size:
            g_1, bend = _group_slopes(m.kinds / m.kinds.sum(axis=1, keepdims=True), *psi)
            pure_1, pure_2 = np.einsum("nkm,km->nk", g_1, m.kinds), bend * m.kinds.sum(axis=1)
            ln_gamma_1[:, m.several] -= pure_1[:, m.kind]
            excess_2 = excess_2 - (x[:, m.several] * pure_2[:, m.kind]).sum(axis=1)
        return np.where(has, ln_gamma_1, 0.0), excess_2

    def _combinatorial(self, x, surface, has):
        m = self.model
        r, q, r_p = (np.where(has, v, 1.0) for v in (m.r, m.q, m.r_p))
        mean = (x @ has.astype(float)) / (x @ m.r_p)
        V = mean[:, None] * r_p
        VF = (surface / (x @ m.r))[:, None] * (r / q)
        return 1.0 - V + np.log(V) - 5.0 * q * (1.0 - VF + np.log(VF))


def _group_terms(theta, psi):
    """g (..., M) of surface fractions theta (..., M) and psi (n, M, M)."""
    S = theta @ psi
    return 1.0 - np.log(S) - (theta / S) @ psi.swapaxes(-1, -2)


def _group_slopes(theta, psi, psi_1, psi_2):
    """dg/dT (..., M) and -sum Theta d2 ln S / dT2 (...), from psi and its derivatives (n, M, M)."""
    S, S_1, S_2 = theta @ psi, theta @ psi_1, theta @ psi_2
    share, drift = theta / S, S_1 / S
    g_1 = -drift - share @ psi_1.swapaxes(-1, -2) + (share * drift) @ psi.swapaxes(-1, -2)
    return g_1, -(theta * (S_2 / S - drift**2)).sum(axis=-1)
