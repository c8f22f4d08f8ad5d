"""Reflux and loss of the still, the D86 defaults, and evaporation from an open vessel."""

from __future__ import annotations

import numpy as np
import pytest

from screener.equilibrium import Fluid, bubble_pressure, bubble_temperature, dew_temperature
from screener.ground.constants import ATMOSPHERE
from screener.ground.status import Status
from screener.volatility import distillation, distillation_d86, dvpe, open_evaporation
from screener.volatility.distillation import D86_LOSS, D86_REFLUX
from tests.studies.splash import SHARES, Splash

NAMES = ("n-butane", "isopentane", "n-hexane", "2,2,4-trimethylpentane", "toluene", "m-xylene", "ethanol")
Z = np.array([[0.05, 0.15, 0.10, 0.25, 0.20, 0.25, 0.0], [0.04, 0.12, 0.10, 0.20, 0.18, 0.20, 0.16]])


@pytest.fixture(scope="module")
def fluid():
    return Fluid.of(NAMES)


def test_no_reflux_is_the_plain_still(fluid):
    plain, none = distillation(fluid, Z, steps=10), distillation(fluid, Z, steps=10, reflux=[0.0, 0.0])
    assert (plain.T == none.T).all() and (plain.loss == 0.0).all()


def test_first_vapour_through_the_neck_by_hand():
    """Benzene and toluene: what leaves is the vapour of an equilibrium flash of the pot's vapour, 30 % condensed.

    By hand: bisect the temperature at which a flash of the pot's vapour y leaves 30 % liquid, K from the
    program's saturation points of the condensate, which the neck takes at the pot's relative volatility:
    for this nearly ideal pair that moves the temperature by less than 0.05 K.
    """
    fluid = Fluid.of(["benzene", "toluene"])
    pot = bubble_temperature(fluid, ATMOSPHERE, [0.5, 0.5])
    y = pot.y[0]
    low, high = 0.0, 1.0  # benzene in the condensate
    for _ in range(60):
        x = 0.5 * (low + high)
        leaving = (y[0] - 0.3 * x) / 0.7
        point = bubble_temperature(fluid, ATMOSPHERE, [x, 1.0 - x])
        low, high = (low, x) if point.y[0, 0] > leaving else (x, high)
    curve = distillation(fluid, [0.5, 0.5], reflux=0.3, steps=2).require()
    assert curve.T[0, 0] == pytest.approx(point.T[0], abs=0.05)
    assert dew_temperature(fluid, ATMOSPHERE, y).T[0] > curve.T[0, 0]  # cooler than the pot's own vapour


def test_reflux_sharpens_the_cut(fluid):
    """More reflux: colder start, hotter end, and the middle of the curve steeper; the binary end is a pure species."""
    curve = distillation(fluid, Z[0], reflux=[0.0, 0.1, 0.3, 0.6], steps=20).require()
    assert (np.diff(curve.T[:, 0]) < 0.0).all()
    assert (np.diff(curve.T90) > 0.0).all()
    pure = distillation(Fluid.of(["toluene"]), [1.0], reflux=[0.0, 0.5], steps=5).require()
    assert np.ptp(pure.T) < 1e-6


def test_mass_is_kept_whatever_the_reflux(fluid):
    """The curve ends at 99 % evaporated, and reflux does not bend the volumes."""
    curve = distillation(fluid, Z[1], reflux=[0.0, 0.2, 0.8], steps=20).require()
    assert np.diff(curve.fraction, axis=1) == pytest.approx(np.full((3, 20), 0.99 / 20), rel=1e-9)


def test_loss_shifts_what_is_recovered(fluid):
    curve = distillation(fluid, Z, loss=0.02, steps=20).require()
    same = distillation(fluid, Z, steps=20).require()
    assert (curve.T == same.T).all()
    assert curve.T10 == pytest.approx(same.T10, abs=1e-12)  # by volume evaporated: no change
    assert curve.temperature_recovered(0.10) == pytest.approx(same.temperature(0.12), abs=1e-12)
    assert curve.recovered(curve.temperature(0.5)) == pytest.approx([0.48, 0.48], abs=1e-9)
    assert (curve.recovered(curve.T[:, 0]) == 0.0).all()


def test_d86_defaults(fluid):
    curve = distillation_d86(fluid, Z, steps=10).require()
    assert (curve.reflux == pytest.approx(D86_REFLUX)) and (curve.loss == pytest.approx(D86_LOSS))
    assert curve.T == pytest.approx(distillation(fluid, Z, reflux=D86_REFLUX, steps=10).T, abs=1e-12)


def test_d86_start_of_a_statutory_gasoline():
    """42 USC 7581(4) base gasoline: RVP 8.7 psi (60.0 kPa), T10 126 degF (52.2 degC).

    A gasoline of known molecules brought to 60 kPa: the plain still starts 8 K too hot, the default reflux
    within 3 K. Its molecules are not those of the statute's gasoline, hence 3 K.
    """
    splash = Splash(SHARES)
    z = splash.moles(splash.at_dvpe(60e3), 0.0)
    assert dvpe(splash.fluid, z).P[0] == pytest.approx(60e3, abs=50.0)
    wanted = (126.0 + 459.67) / 1.8
    assert distillation(splash.fluid, z).T10[0] - wanted > 5.0
    assert distillation_d86(splash.fluid, z).T10[0] == pytest.approx(wanted, abs=3.0)


def test_reflux_and_loss_out_of_range(fluid):
    curve = distillation(fluid, Z[[0, 0, 0, 0]], reflux=[0.1, 0.95, -0.1, np.nan], steps=5)
    assert list(curve.status) == [Status.CONVERGED, *[Status.BAD_INPUT] * 3]
    assert np.isnan(curve.T[1:]).all()
    assert distillation(fluid, Z[0], loss=0.3).status[0] == Status.BAD_INPUT


def test_lanes_with_and_without_reflux(fluid):
    together = distillation(fluid, Z[[0, 0, 1]], reflux=[0.0, 0.3, 0.3], steps=10)
    for i, (row, r) in enumerate(((0, 0.0), (0, 0.3), (1, 0.3))):
        assert together.T[i] == pytest.approx(distillation(fluid, Z[row], reflux=r, steps=10).T[0], abs=1e-7)


def test_evaporation_of_a_binary_follows_rayleigh():
    """ln(L/L0) = integral of dx/(y - x) at 300 K on a fine grid, pentane and heptane."""
    fluid = Fluid.of(["n-pentane", "n-heptane"])
    x = np.linspace(0.5, 0.05, 2001)
    y = bubble_pressure(fluid, 300.0, np.column_stack([x, 1.0 - x])).require().y[:, 0]
    slope = 1.0 / (y - x)
    left = np.exp(np.concatenate([[0.0], np.cumsum(0.5 * (slope[1:] + slope[:-1]) * np.diff(x))]))
    mass = left * (np.column_stack([x, 1.0 - x]) @ fluid.MW)
    lost = 1.0 - mass / mass[0]
    asked = np.array([0.05, 0.15, 0.30])
    found = open_evaporation(fluid, 300.0, [0.5, 0.5], asked).require()
    assert found.x[:, 0] == pytest.approx(np.interp(asked, lost, x), abs=2e-4)  # 20 steps, second order


def test_evaporation_balances_and_weathers(fluid):
    found = open_evaporation(fluid, 294.0, Z[1], [0.02, 0.10, 0.30]).require()
    assert (np.diff(found.P) < 0.0).all() and (found.P < bubble_pressure(fluid, 294.0, Z[1]).P[0]).all()
    charged = Z[1] * fluid.MW / (Z[1] @ fluid.MW)
    left = found.x * fluid.MW / (found.x @ fluid.MW)[:, None]
    total = found.lost[:, None] * found.w_lost + (1.0 - found.lost)[:, None] * left
    assert total == pytest.approx(np.tile(charged, (3, 1)), abs=1e-12)


def test_faster_vapours_leave_in_larger_shares(fluid):
    even = open_evaporation(fluid, 294.0, Z[1], 0.05).require()
    doubled = np.where(np.array(NAMES) == "ethanol", 2.0, 1.0)
    faster = open_evaporation(fluid, 294.0, Z[1], 0.05, mobility=doubled).require()
    assert 1.5 < faster.w_lost[0, -1] / even.w_lost[0, -1] < 2.0  # the rest is diluted by it
    assert open_evaporation(fluid, 294.0, Z[1], 0.05, mobility=np.full(7, 3.0)).w_lost == pytest.approx(
        even.w_lost, rel=1e-9
    )


def test_evaporation_of_bad_lanes(fluid):
    found = open_evaporation(fluid, [294.0, np.nan, 294.0, 294.0], Z[0], [0.05, 0.05, 0.99, 0.0])
    assert list(found.status) == [Status.CONVERGED, *[Status.BAD_INPUT] * 3]
    assert np.isnan(found.w_lost[1:]).all() and np.isnan(found.P[1:]).all()
