"""Crude and condensate: VPCR, its refusals, the Reid equivalent, and the wet Reid chamber."""

from __future__ import annotations

import numpy as np
import pytest

from screener.equilibrium import Fluid, bubble_pressure
from screener.ground.constants import ATMOSPHERE, T_100F
from screener.ground.errors import UnknownName
from screener.ground.status import Status
from screener.species import cut, find
from screener.volatility import (
    ostwald_air,
    reid_equivalent_crude,
    reid_vapour_pressure,
    vapour_pressure_at_ratio,
    vapour_pressure_crude,
)
from screener.volatility.crude_pressure import rvpe_factors

HEAVY = [cut(T, rho).name for T, rho in ((400.0, 760.0), (480.0, 810.0), (570.0, 860.0), (800.0, 950.0))]
NAMES = ("ethane", "propane", "n-butane", "isopentane", "n-pentane", "n-hexane", *HEAVY)
Z = np.array([0.003, 0.012, 0.03, 0.03, 0.035, 0.06, 0.20, 0.22, 0.21, 0.20])


@pytest.fixture(scope="module")
def fluid():
    return Fluid.of(NAMES)


def test_falls_with_ratio_from_the_bubble_pressure(fluid):
    ratio = [0.02, 0.1, 0.5, 1.0, 4.0]
    found = vapour_pressure_crude(fluid, Z, ratio=ratio, T_fill=308.15).require()
    assert (np.diff(found.P) < 0.0).all()
    bubble = bubble_pressure(fluid, T_100F, Z).P[0]
    assert found.P[0] == pytest.approx(bubble, rel=5e-3) and found.P[0] < bubble
    assert found.P[-1] < 0.9 * bubble  # ethane goes into the vapour space: a Reid figure does not tell TVP


def test_overfilled_cells_are_refused(fluid):
    """A charge metered at 0 degC swells by some 3 % to 37.8 degC and fills a cell of 2 % vapour space."""
    cold = vapour_pressure_crude(fluid, Z, ratio=0.02, T_fill=273.15)
    assert cold.status[0] == Status.NO_SOLUTION and np.isnan(cold.P[0])
    assert vapour_pressure_crude(fluid, Z, ratio=0.02, T_fill=310.0).ok.all()


def test_no_air_is_added(fluid):
    found = vapour_pressure_crude(fluid, Z, ratio=4.0).require()
    assert found.cell.P_air[0] == 0.0 and found.P[0] == found.cell.P[0]


def test_any_ratio_and_temperature_and_the_scope(fluid):
    found = vapour_pressure_crude(
        fluid, Z, ratio=[4.0, 10.0, 4.0, 0.5], T=[T_100F, T_100F, 323.15, 290.0]
    ).require()
    assert list(found.in_scope) == [True, False, False, False]
    assert found.P[2] > found.P[0] > found.P[1]
    heavy = vapour_pressure_crude(fluid, np.r_[np.zeros(6), Z[6:] / Z[6:].sum()], ratio=4.0)
    assert heavy.ok[0] and not heavy.in_scope[0]  # below 25 kPa


def test_reid_equivalent(fluid):
    P = vapour_pressure_crude(fluid, Z, ratio=4.0).P
    for sample, row in rvpe_factors().items():
        assert row.evidence == "memory"
        assert reid_equivalent_crude(P, sample=sample) == pytest.approx(row.factor * P, rel=1e-14)
    with pytest.raises(UnknownName, match="'bucket' is not a known way of sampling"):
        reid_equivalent_crude(P, sample="bucket")


def test_wet_and_dry_chamber_differ_little(fluid):
    """The water vapour of a wet chamber stands before and after; what changes is that only air is squeezed.

    By hand for a crude that swells by 3.5 %: the vapour space shrinks from 4 to 3.965 of the charge, less what air
    dissolves (coefficient 0.1 of 1.035): 6.56 kPa of water less 6.56 x 4/(3.965 + 0.10) = 6.45 is +0.1 kPa.
    """
    dry = reid_vapour_pressure(fluid, Z, product="crude").require()
    wet = reid_vapour_pressure(fluid, Z, chamber="wet", product="crude").require()
    assert 0.0 < wet.P[0] - dry.P[0] < 0.4e3
    assert wet.P_vapour[0] == dry.P_vapour[0]
    assert wet.P_total[0] - ATMOSPHERE == pytest.approx(wet.P[0], rel=1e-9)
    assert "D323" in wet.method and "D4953" in dry.method


def test_wet_chamber_balance_by_hand():
    """One species: air of sample and chamber, water and fuel, put together without the program's own sum."""
    fluid = Fluid.of(["n-heptane"])
    wet = reid_vapour_pressure(fluid, [1.0], chamber="wet").require()
    dry = reid_vapour_pressure(fluid, [1.0]).require()
    water = find("water").psat(T_100F)
    # dry: brought + 4 atm/N, wet: brought + 4 (atm - water)/N + water, with one and the same N
    N = 4.0 * water / (water - (wet.P_air[0] - dry.P_air[0]))
    cell = vapour_pressure_at_ratio(fluid, T_100F, [1.0], 4.0).require()
    dissolved = ostwald_air(find("n-heptane").rho_15, T_100F)[0] * cell.expansion[0]
    assert N == pytest.approx(5.0 - cell.expansion[0] + dissolved, rel=1e-9)
    assert 6.4e3 < water < 6.7e3  # 6.56 kPa at 37.8 degC


def test_an_alcohol_has_no_wet_reading():
    fluid = Fluid.of(["n-hexane", "toluene", "ethanol"])
    found = reid_vapour_pressure(fluid, [[0.7, 0.3, 0.0], [0.6, 0.25, 0.15]], chamber="wet")
    assert list(found.status) == [Status.CONVERGED, Status.OUT_OF_RANGE] and np.isnan(found.P[1])
    assert reid_vapour_pressure(fluid, [0.6, 0.25, 0.15]).ok.all()
    with pytest.raises(UnknownName, match="'damp' is not a known Reid chamber"):
        reid_vapour_pressure(fluid, [0.6, 0.25, 0.15], chamber="damp")
