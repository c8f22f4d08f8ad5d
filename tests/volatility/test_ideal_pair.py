"""T(V/L = 20) of an ideal pair worked by hand: Raoult's law and the ideal gas, nothing else.

The cell and the temperature search run on a stand-in fluid that is ideal by construction; the hand calculation
is a bisection written out here. They solve the same equations, so 0.05 K is generous.
"""

from __future__ import annotations

import sys
from types import SimpleNamespace

import numpy as np
import pytest

from screener.ground.constants import ATMOSPHERE, R
from screener.ground.status import Status
from screener.species import find
from screener.volatility import (
    liquid_expansion,
    ratio_temperature,
    standard_molar_volume,
    vapour_pressure_at_ratio,
)

PAIR = tuple(find(name) for name in ("n-pentane", "n-hexane"))
Z = np.array([0.4, 0.6])


def psat(T):
    """Vapour pressures (n, 2) [Pa] of the pair from their reference curves."""
    return np.stack([np.atleast_1d(one.psat(np.atleast_1d(T))) for one in PAIR], axis=-1)


class IdealAt:
    """Raoult's law and the ideal gas at fixed temperatures."""

    def __init__(self, T):
        self.T = T

    def take(self, lanes):
        return IdealAt(self.T[lanes])

    def ln_phi(self, P, x, phase):
        ln_K = np.log(psat(self.T)) - np.log(P)[:, None]
        return ln_K if phase == "L" else np.zeros_like(ln_K)

    def volume(self, P, x, phase):
        assert phase == "V"
        return R * self.T / P


class Ideal:
    """What the cell asks of a fluid."""

    c, names = 2, tuple(one.name for one in PAIR)
    MW = np.array([one.MW for one in PAIR])
    Tc, omega = np.array([one.Tc for one in PAIR]), np.array([one.omega for one in PAIR])
    v_15 = np.array([one.MW / one.rho_15 for one in PAIR])

    def at(self, T):
        return IdealAt(np.atleast_1d(T))

    def lacks(self, x):
        return np.zeros(np.atleast_2d(x).shape[0], dtype=bool)

    def wilson_K(self, T, P):
        return psat(T) / P[:, None]


def pressure_by_hand(T, ratio):
    """Pressure [Pa] in the cell at T: n_L by bisection of sum x_i = 1."""
    fluid = Ideal()
    charge = float((standard_molar_volume(fluid, Z) * liquid_expansion(fluid, 273.65, Z))[0])
    k, x = psat(T)[0] / (R * T), Z
    for _ in range(4):  # the volume of the liquid left hardly depends on what is left
        liquid = float(
            (standard_molar_volume(fluid, x / x.sum()) * liquid_expansion(fluid, T, x / x.sum()))[0]
        )
        low, high = 0.0, 1.0
        for _ in range(50):
            n_L = 0.5 * (low + high)
            x = Z / (n_L + k * ((1.0 + ratio) * charge - n_L * liquid))
            low, high = (n_L, high) if x.sum() > 1.0 else (low, n_L)
    return float((x * psat(T)[0]).sum())


@pytest.mark.parametrize("ratio", [4.0, 20.0])
def test_pressure_in_the_cell(ratio):
    for T in (300.0, 320.0, 335.0):
        found = vapour_pressure_at_ratio(Ideal(), T, Z, ratio).require().P[0]
        assert found == pytest.approx(pressure_by_hand(T, ratio), rel=1e-8)


@pytest.mark.parametrize("ratio", [4.0, 20.0, 45.0])
def test_temperature_for_a_ratio(ratio, monkeypatch):
    low, high = 300.0, 345.0
    for _ in range(23):
        middle = 0.5 * (low + high)
        low, high = (middle, high) if pressure_by_hand(middle, ratio) < ATMOSPHERE else (low, middle)
    # the search starts from a boiling point; an ideal one, roughly, does
    start = SimpleNamespace(T=np.array([322.0]), ok=np.array([True]), status=np.array([Status.CONVERGED]))
    module = sys.modules["screener.volatility.ratio_temperature"]  # the function has the same name
    monkeypatch.setattr(module, "bubble_temperature", lambda *_: start)
    T = ratio_temperature(Ideal(), Z, ratio=ratio).require().T[0]
    assert T == pytest.approx(0.5 * (low + high), abs=0.05)
    assert T == pytest.approx(0.5 * (low + high), abs=2e-5)  # and as close as 23 bisections of 45 K
