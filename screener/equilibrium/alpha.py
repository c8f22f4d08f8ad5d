"""The temperature function of the attraction term, alpha(T) = a(T) / a(Tc)."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np


@dataclass(frozen=True)
class Soave:
    """[1 + m (1 - sqrt(T/Tc))]^2, one m per component. Soave 1972."""

    Tc: np.ndarray
    m: np.ndarray

    def __call__(self, T):
        """alpha (n, c) [-] at T (n,) [K]."""
        return (1.0 + self.m * (1.0 - np.sqrt(T[:, None] / self.Tc))) ** 2

    def slopes(self, T):
        """alpha [-], its first [1/K] and second [1/K2] derivative, each (n, c), at T (n,) [K]."""
        T = T[:, None]
        sink = self.m * np.sqrt(T / self.Tc)
        root = 1.0 + self.m - sink
        first, second = -0.5 * sink / T, 0.25 * sink / T**2
        return root**2, 2.0 * root * first, 2.0 * (first**2 + root * second)


@dataclass(frozen=True)
class Twu:
    """Five constants per component, the form of `screener.species.alpha`.

    Tr^(N(M-1)) exp(L(1 - Tr^(N M)) + s^3 (C + D s)), s = max(1 - Tr, 0). The
    first three are those of Twu, Bluck, Cunningham and Coon, Fluid Phase
    Equilibria 69 (1991) 33; C and D are this project's own.
    """

    Tc: np.ndarray
    L: np.ndarray
    M: np.ndarray
    N: np.ndarray
    C: np.ndarray
    D: np.ndarray

    def __call__(self, T):
        """alpha (n, c) [-] at T (n,) [K]."""
        Tr = T[:, None] / self.Tc
        ln_Tr = np.log(Tr)
        s = np.maximum(1.0 - Tr, 0.0)
        exponent = self.N * (self.M - 1.0) * ln_Tr - self.L * np.expm1(self.N * self.M * ln_Tr)
        return np.exp(exponent + s**3 * (self.C + self.D * s))

    def slopes(self, T):
        """alpha [-], its first [1/K] and second [1/K2] derivative, each (n, c), at T (n,) [K]."""
        alpha, T = self(T), T[:, None]
        s = np.maximum(1.0 - T / self.Tc, 0.0)
        g = self.N * self.M
        steep = self.L * g * (T / self.Tc) ** g
        power = self.N * (self.M - 1.0) - steep  # d ln alpha / d ln T of Twu's three constants
        first = power / T - s**2 * (3.0 * self.C + 4.0 * self.D * s) / self.Tc
        second = -(power + g * steep) / T**2 + s * (6.0 * self.C + 12.0 * self.D * s) / self.Tc**2
        return alpha, alpha * first, alpha * (second + first**2)


@dataclass(frozen=True)
class ByComponent:
    """One alpha function for the components of a mask (c,), another for the rest."""

    mask: np.ndarray
    chosen: object
    rest: object

    def __call__(self, T):
        """alpha (n, c) [-] at T (n,) [K]."""
        return np.where(self.mask, self.chosen(T), self.rest(T))

    def slopes(self, T):
        """alpha [-], its first [1/K] and second [1/K2] derivative, each (n, c), at T (n,) [K]."""
        pairs = zip(self.chosen.slopes(T), self.rest.slopes(T), strict=True)
        return tuple(np.where(self.mask, one, other) for one, other in pairs)


def m_of_omega(omega, eos: str):
    """Slope m of the Soave form from the acentric factor.

    Parameters
    ----------
    omega : array, shape (c,)
        Acentric factor. [-]
    eos : str
        "PR", "PR78" or "SRK".

    Returns
    -------
    array, shape (c,)
        m. [-]

    Source
    ------
    PR: Peng and Robinson 1976; PR78: Robinson and Peng 1978, its cubic form
    above omega 0.49; SRK: Soave 1972.
    """
    omega = np.asarray(omega, dtype=float)
    if eos == "SRK":
        return 0.480 + omega * (1.574 - 0.176 * omega)
    m = 0.37464 + omega * (1.54226 - 0.26992 * omega)
    if eos == "PR78":
        heavy = 0.379642 + omega * (1.48503 + omega * (-0.164423 + 0.016666 * omega))
        m = np.where(omega > 0.49, heavy, m)
    return m
