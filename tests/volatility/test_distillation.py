"""Open still: against the closed Rayleigh equation, balances, convergence in steps."""

from __future__ import annotations

import numpy as np
import pytest

from screener.equilibrium import Fluid, bubble_temperature
from screener.ground.constants import ATMOSPHERE
from screener.ground.status import Status
from screener.volatility import distillation

NAMES = ("n-butane", "isopentane", "n-hexane", "2,2,4-trimethylpentane", "toluene", "m-xylene", "ethanol")
Z = np.array([[0.05, 0.15, 0.10, 0.25, 0.20, 0.25, 0.0], [0.04, 0.12, 0.10, 0.20, 0.18, 0.20, 0.16]])


@pytest.fixture(scope="module")
def fluid():
    return Fluid.of(NAMES)


def test_binary_follows_rayleigh():
    """ln(L/L0) = integral of dx/(y - x) from bubble points on a fine grid, for benzene and toluene."""
    fluid = Fluid.of(["benzene", "toluene"])
    x0 = 0.6
    x = np.linspace(x0, 0.05, 2001)
    point = bubble_temperature(fluid, ATMOSPHERE, np.column_stack([x, 1.0 - x])).require()
    slope = 1.0 / (point.y[:, 0] - x)
    left = np.exp(np.concatenate([[0.0], np.cumsum(0.5 * (slope[1:] + slope[:-1]) * np.diff(x))]))
    volume = left * (np.column_stack([x, 1.0 - x]) @ fluid.v_15)
    expected = 1.0 - volume / volume[0]
    curve = distillation(fluid, [x0, 1.0 - x0])
    asked = curve.fraction[0][(curve.fraction[0] > 0.0) & (curve.fraction[0] < expected.max())]
    T = np.interp(asked, expected, point.T)
    got = np.array([curve.temperature(f)[0] for f in asked])
    assert np.abs(got - T).max() < 0.02  # 50 steps, second order; the curve spans 25 K


def test_steps_have_converged(fluid):
    coarse, fine = distillation(fluid, Z), distillation(fluid, Z, steps=200)
    for name in ("T10", "T50", "T90"):
        # Straight lines between 50 points of a curve that bends most where a species runs out.
        assert getattr(coarse, name) == pytest.approx(getattr(fine, name), abs=0.15)
    for name in ("E70", "E100"):
        assert getattr(coarse, name) == pytest.approx(getattr(fine, name), abs=2e-3)


def test_curve_starts_at_the_bubble_point_and_rises(fluid):
    curve = distillation(fluid, Z).require()
    assert curve.T[:, 0] == pytest.approx(bubble_temperature(fluid, ATMOSPHERE, Z).T, abs=1e-9)
    assert (np.diff(curve.T, axis=1) > -1e-6).all()
    assert (np.diff(curve.fraction, axis=1) > 0.0).all()
    assert curve.fraction[:, -1] == pytest.approx([0.99, 0.99], abs=1e-9)


def test_temperature_and_evaporated_are_inverse(fluid):
    curve = distillation(fluid, Z)
    for f in (0.05, 0.3, 0.7):
        assert curve.evaporated(curve.temperature(f)) == pytest.approx([f, f], abs=1e-12)
    assert (curve.evaporated(200.0) == 0.0).all()
    assert np.isnan(curve.temperature(0.995)).all()


def test_ethanol_makes_a_plateau(fluid):
    """Ethanol's azeotropes hold the middle of the curve down: T50 falls, E70 grows."""
    splashed = 0.8 * Z[0] + 0.2 * np.eye(7)[6]
    curve = distillation(fluid, [Z[0], splashed])
    assert curve.T50[1] < curve.T50[0] - 5.0
    assert curve.E100[1] > curve.E100[0] + 0.05


def test_pure_liquid_boils_flat():
    curve = distillation(Fluid.of(["toluene"]), [1.0]).require()
    assert np.ptp(curve.T) < 1e-6


def test_lanes_are_independent(fluid):
    bad = np.array([Z[0], [0.5] * 7, Z[1]])
    curve = distillation(fluid, bad)
    assert list(curve.status) == [Status.CONVERGED, Status.BAD_INPUT, Status.CONVERGED]
    assert np.isnan(curve.T[1]).all() and np.isnan(curve.E70[1])
    alone = distillation(fluid, Z[1])
    assert curve.T[2] == pytest.approx(alone.T[0], rel=1e-9)


def test_unknown_volumes_give_no_curve():
    fluid = Fluid.from_constants([469.7, 507.6], [3.37e6, 3.02e6], [0.251, 0.301], [0.0721, 0.0862])
    assert list(distillation(fluid, [0.5, 0.5]).status) == [Status.NO_PARAMETERS]
