"""Enthalpy and entropy of ideal-gas mixtures from polynomials of the heat capacity.

Each species as ideal gas at 298.15 K and 101,325 Pa has H = S = 0. With
Cp_i = sum_k a_ik T^k

    H = sum x_i int Cp_i dT,   S = sum x_i (int Cp_i / T dT - R ln x_i) - R ln(P / 101,325 Pa).
"""

from __future__ import annotations

import numpy as np

from screener.ground.constants import ATMOSPHERE, R

T_REFERENCE = 298.15  # [K] the reference state of every species, with 101,325 Pa; own choice, the usual one
T_LOW, T_HIGH = 200.0, 500.0  # [K] range of the polynomials, see data/species/cp_ideal.toml


def heat_capacity(a, T):
    """Cp (n, c) [J/(mol K)] of polynomials a (c, k) at T (n,) [K]."""
    return np.polynomial.polynomial.polyval(T, a.T).T


def enthalpy(a, T):
    """H (n, c) [J/mol] of polynomials a (c, k) at T (n,) [K]."""
    k = np.arange(1, a.shape[1] + 1)
    return (T[:, None] ** k - T_REFERENCE**k) @ (a / k).T


def entropy(a, T):
    """S (n, c) [J/(mol K)] at 101,325 Pa of polynomials a (c, k) at T (n,) [K]."""
    k = np.arange(1, a.shape[1])
    rest = (T[:, None] ** k - T_REFERENCE**k) @ (a[:, 1:] / k).T
    return np.log(T / T_REFERENCE)[:, None] * a[:, 0] + rest


def entropy_of_mixing(P, x):
    """-R (sum x_i ln x_i + ln(P / 101,325 Pa)), (n,) [J/(mol K)], at P (n,) [Pa] and x (n, c)."""
    x = np.where(x > 0.0, x, 1.0)  # x ln x goes to zero with x
    return -R * ((x * np.log(x)).sum(axis=1) + np.log(P / ATMOSPHERE))


def in_range(T):
    """Mask (n,) of the temperatures [K] the polynomials cover."""
    return (T >= T_LOW) & (T <= T_HIGH)
