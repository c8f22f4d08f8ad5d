"""Isochoric cell: balances, limits, refusals."""

from __future__ import annotations

import numpy as np
import pytest

from screener.equilibrium import Fluid, bubble_pressure, bubble_temperature
from screener.ground.constants import ATMOSPHERE, T_100F, R
from screener.ground.errors import NotConverged
from screener.ground.status import Status
from screener.volatility import (
    liquid_expansion,
    ratio_temperature,
    standard_molar_volume,
    true_vapour_pressure,
    vapour_pressure_at_ratio,
)

FUEL = {
    "n-butane": 0.06, "isopentane": 0.11, "n-pentane": 0.06, "2-methylpentane": 0.08, "n-hexane": 0.05,
    "n-heptane": 0.05, "2,2,4-trimethylpentane": 0.18, "toluene": 0.14, "m-xylene": 0.13, "ethanol": 0.14,
}  # fmt: skip


@pytest.fixture(scope="module")
def fluid():
    return Fluid.of(tuple(FUEL))


@pytest.fixture(scope="module")
def z():
    return np.array(list(FUEL.values()))


def test_balances_of_the_cell(fluid, z):
    """Moles, volume and fugacities close, whatever the ratio."""
    ratio = np.array([0.2, 1.0, 4.0, 20.0, 40.0])
    cell = vapour_pressure_at_ratio(fluid, T_100F, z, ratio).require()
    feed = (1.0 - cell.beta)[:, None] * cell.x + cell.beta[:, None] * cell.y
    assert np.abs(feed - z).max() < 1e-12  # rounding
    charge = standard_molar_volume(fluid, z) * liquid_expansion(fluid, 273.65, z)
    v_V = fluid.volume(T_100F, cell.P, cell.y, "V")
    filled = cell.beta * v_V / charge + cell.expansion
    assert filled == pytest.approx(1.0 + ratio, rel=1e-8)  # ten times the tolerance on ln k
    T = np.full(ratio.shape, T_100F)
    f_L = np.log(cell.x) + fluid.ln_phi(T, cell.P, cell.x, "L")
    f_V = np.log(cell.y) + fluid.ln_phi(T, cell.P, cell.y, "V")
    assert np.abs(f_L - f_V).max() < 1e-8


def test_vapour_pressure_falls_with_ratio(fluid, z):
    T = np.repeat([273.15, 293.15, 310.93, 330.0], 3)
    ratio = np.tile([0.5, 4.0, 10.0], 4)
    P = vapour_pressure_at_ratio(fluid, T, z, ratio).require().P.reshape(4, 3)
    true = true_vapour_pressure(fluid, T[::3], z).P
    assert (np.diff(np.column_stack([true, P]), axis=1) < 0.0).all()


def test_small_ratio_tends_to_the_bubble_pressure(fluid, z):
    """Charged at the cell temperature, so that a ratio of 1e-4 does not overfill."""
    cell = vapour_pressure_at_ratio(fluid, T_100F, z, 1e-4, T_fill=T_100F).require()
    # The vapour holds about 1e-4 x 1/200 of the moles: P moves by some 1e-6.
    assert cell.P[0] == pytest.approx(bubble_pressure(fluid, T_100F, z).P[0], rel=1e-5)


def test_pure_liquid_has_one_pressure():
    fluid = Fluid.of(["n-pentane"])
    ratio = np.array([0.1, 1.0, 4.0, 50.0])
    cell = vapour_pressure_at_ratio(fluid, 310.0, [1.0], ratio).require()
    assert cell.P == pytest.approx(bubble_pressure(fluid, 310.0, [1.0]).P[0] * np.ones(4), rel=1e-9)


def test_overfilled_cells_are_refused():
    """A charge at 0 degC swells some 5 % to 37.8 degC: a vapour space of 2 % of it is gone."""
    fluid = Fluid.of(["n-pentane", "n-hexane"])
    cold = vapour_pressure_at_ratio(fluid, T_100F, [0.5, 0.5], [0.02, 0.2])
    assert list(cold.status) == [Status.NO_SOLUTION, Status.CONVERGED]
    assert np.isnan(cold.P[0])
    warm = vapour_pressure_at_ratio(fluid, T_100F, [0.5, 0.5], 0.02, T_fill=308.15)
    assert warm.ok.all()
    with pytest.raises(NotConverged, match="lane 0: no solution exists at this state"):
        cold.require()


def test_nothing_left_is_refused():
    fluid = Fluid.of(["n-pentane", "n-hexane"])
    cell = vapour_pressure_at_ratio(fluid, 330.0, [0.5, 0.5], [4.0, 2000.0])
    assert list(cell.status) == [Status.CONVERGED, Status.NO_SOLUTION]


def test_air_is_that_of_one_atmosphere_unless_given(fluid, z):
    own = vapour_pressure_at_ratio(fluid, T_100F, z, 4.0, air=True).require()
    given = ATMOSPHERE - bubble_pressure(fluid, 273.65, z).P
    same = vapour_pressure_at_ratio(fluid, T_100F, z, 4.0, air=True, P_air_0=given).require()
    assert own.P_air == pytest.approx(same.P_air, rel=1e-12) and own.P_air[0] > 3e3
    assert own.P_total == pytest.approx(own.P + own.P_air, rel=1e-15)
    assert vapour_pressure_at_ratio(fluid, T_100F, z, 4.0).P_air[0] == 0.0


def test_bad_lanes_leave_the_others_alone(fluid, z):
    Z = np.array([z, np.r_[0.5, z[1:]], z])
    cell = vapour_pressure_at_ratio(fluid, [310.0, 310.0, np.nan], Z, 4.0)
    assert list(cell.status) == [Status.CONVERGED, Status.BAD_INPUT, Status.BAD_INPUT]
    assert cell.P[0] == vapour_pressure_at_ratio(fluid, 310.0, z, 4.0).P[0]


def test_batch_equals_lane_by_lane(fluid):
    rng = np.random.default_rng(5)
    Z = rng.dirichlet(np.ones(fluid.c), 12)
    T, ratio = rng.uniform(280.0, 325.0, 12), rng.uniform(0.2, 20.0, 12)
    together = vapour_pressure_at_ratio(fluid, T, Z, ratio)
    alone = [vapour_pressure_at_ratio(fluid, T[i], Z[i], ratio[i]) for i in range(12)]
    assert together.ok.all()
    assert together.P == pytest.approx(np.array([a.P[0] for a in alone]), rel=1e-9)


def test_absent_species_change_nothing(fluid, z):
    wide = Fluid.of((*FUEL, "n-decane", "methanol"))
    P = vapour_pressure_at_ratio(wide, T_100F, np.r_[z, 0.0, 0.0], 4.0).require().P[0]
    assert P == pytest.approx(vapour_pressure_at_ratio(fluid, T_100F, z, 4.0).P[0], rel=1e-9)


@pytest.mark.parametrize("name", ["n-pentane", "isopentane", "n-hexane", "ethanol", "toluene"])
def test_ratio_temperature_of_a_pure_liquid_is_its_boiling_point(name):
    fluid = Fluid.of([name])
    ratio = np.array([1.0, 8.0, 20.0, 75.0])
    T = ratio_temperature(fluid, [1.0], ratio=ratio).require().T
    # 0.05 K is asked; the cell and the bubble point solve one and the same equation.
    assert T == pytest.approx(bubble_temperature(fluid, ATMOSPHERE, [1.0]).T[0] * np.ones(4), abs=1e-5)


def test_ratio_temperature_of_a_hand_worked_pair():
    """Pentane and hexane as an ideal liquid under an ideal gas, by bisection from the same vapour pressures.

    What separates the two: vapour non-ideality (about 3 % in the pressure of each) and
    the small excess of the pair. 3 % of one atmosphere is 0.9 K.
    """
    fluid = Fluid.of(["n-pentane", "n-hexane"])
    z, ratio = np.array([0.4, 0.6]), 20.0
    charge = float(standard_molar_volume(fluid, z)[0] * liquid_expansion(fluid, 273.65, z)[0])

    def misfit(T):
        psat = fluid.psat(T)[0]
        low, high = 0.0, 1.0
        for _ in range(60):  # n_L from the volume of vapour n_V R T / P
            n_L = 0.5 * (low + high)
            V_V = (1.0 + ratio) * charge - n_L * float(
                standard_molar_volume(fluid, z)[0] * liquid_expansion(fluid, T, z)[0]
            )
            x = z / (n_L + psat * V_V / (R * T))
            low, high = (n_L, high) if x.sum() > 1.0 else (low, n_L)
        return float((x * psat).sum()) - ATMOSPHERE

    low, high = 300.0, 345.0
    for _ in range(50):
        middle = 0.5 * (low + high)
        low, high = (middle, high) if misfit(middle) < 0.0 else (low, middle)
    T = ratio_temperature(fluid, z, ratio=ratio).require().T[0]
    assert T == pytest.approx(0.5 * (low + high), abs=0.9)


def test_ratio_temperature_refuses_small_ratios(fluid, z):
    answer = ratio_temperature(fluid, z, ratio=[0.05, 20.0])
    assert list(answer.status) == [Status.NO_SOLUTION, Status.CONVERGED]


def test_ratio_temperature_rises_with_ratio_and_falls_with_air(fluid, z):
    dry = ratio_temperature(fluid, z, ratio=[4.0, 10.0, 20.0, 40.0]).require().T
    assert (np.diff(dry) > 0.0).all()
    aired = ratio_temperature(fluid, z, ratio=20.0, air=True).require().T[0]
    assert 0.05 < dry[2] - aired < 0.8  # calculated elsewhere: 0.2 to 0.5 K
