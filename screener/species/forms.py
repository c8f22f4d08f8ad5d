"""The functional forms in which the species tables are written. Pure NumPy, no files.

Every form is linear in its coefficients except the alpha function. Temperatures
enter as t = T / 300 K so that the coefficients keep comparable sizes.
"""

from __future__ import annotations

import numpy as np

T_SCALE = 300.0  # [K] scale of the polynomial forms; our choice
PSAT_TERMS = 6


def psat_basis(T):
    """Terms of ln(P / Pa): 1, 1/t, ln t, t, t^2, t^4 with t = T / 300 K; shape (..., 6). T in [K]."""
    t = np.asarray(T, dtype=float) / T_SCALE
    return np.stack([np.ones_like(t), 1.0 / t, np.log(t), t, t * t, t**4], axis=-1)


def psat(coefficients, T):
    """Vapour pressure [Pa] at T [K] from the six coefficients of ln P."""
    return np.exp(psat_basis(T) @ np.asarray(coefficients, dtype=float))


def density_basis(T):
    """Terms of the saturated liquid density: 1, t, t^2, t^3 with t = T / 300 K; shape (..., 4). T in [K]."""
    t = np.asarray(T, dtype=float) / T_SCALE
    return np.stack([np.ones_like(t), t, t * t, t**3], axis=-1)


def alpha(Tr, L, M, N, C=0.0, D=0.0):
    """Alpha function [-] of reduced temperature Tr = T/Tc [-] with five constants [-].

    Tr^(N(M-1)) exp(L(1 - Tr^(N M))) exp(s^3 (C + D s)), s = max(1 - Tr, 0): the three
    constants of Twu et al. 1991, and below Tc a factor that leaves alpha, its first and
    its second derivative at Tc as they are. C = D = 0 where the three suffice; alcohols
    and some others need the five.

    Source: C.H. Twu, D. Bluck, J.R. Cunningham, J.E. Coon, Fluid Phase Equilibria 69 (1991)
    33-50; the factor is ours.
    """
    Tr = np.asarray(Tr, dtype=float)
    s = np.maximum(1.0 - Tr, 0.0)
    return Tr ** (N * (M - 1.0)) * np.exp(L * (1.0 - Tr ** (N * M)) + s**3 * (C + D * s))


def cp_ideal(coefficients, T):
    """Ideal-gas heat capacity [J/(mol K)] at T [K]: a0 + a1 T + a2 T^2 + a3 T^3 + a4 T^4."""
    T = np.asarray(T, dtype=float)
    return sum(a * T**k for k, a in enumerate(coefficients))
