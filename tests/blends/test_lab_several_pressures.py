"""Several measured vapour pressures of one liquid: which one tells, and what the others do to the range."""

from __future__ import annotations

import numpy as np
import pytest

from screener.blends import Blend, LabSheet
from screener.blends.measured import MeasuredPressure, pressure_factor, told
from screener.ground.constants import T_100F
from screener.volatility import distillation_d86, true_vapour_pressure, vapour_pressure_crude

C = 273.15
RECIPE = {"n-butane": 0.03, "isopentane": 0.15, "n-hexane": 0.3, "toluene": 0.3, "n-decane": 0.22}
# Each pair contradicts itself by one to two reproducibilities, so that which one tells shows.
VPCR = ((4.0, 37.8 + C, 62e3), (0.1, 37.8 + C, 80e3))
TVP = ((20.0 + C, 36e3), (37.8 + C, 57e3))


def fitted(**numbers) -> Blend:
    recipe = Blend.of({f"species:{name}": share for name, share in RECIPE.items()})
    return Blend.from_lab(LabSheet(**numbers), recipe)


@pytest.mark.parametrize("rows", [{"vpcr": VPCR}, {"tvp": TVP}])
def test_the_order_of_rows_says_nothing(rows):
    ((name, pair),) = rows.items()
    ways = [fitted(product="crude", **{name: order}).measured for order in (pair, pair[::-1])]
    assert [m.what for m in ways[0]] == [m.what for m in ways[1]]
    factors = [pressure_factor(way) for way in ways]
    assert factors[0] == pytest.approx(factors[1], rel=1e-4)  # the two fits stop within their own tolerance
    assert abs(ways[0][0].ratio - ways[0][1].ratio) > 0.02


def test_the_smallest_vapour_space_and_then_the_highest_ratio_go_first():
    assert told(fitted(product="crude", vpcr=VPCR).measured).what.startswith("VPCR0.1")
    made = fitted(tvp=TVP).measured
    assert told(made).ratio == max(m.ratio for m in made)
    both = fitted(product="crude", vpcr=VPCR, tvp=TVP[:1], dvpe=60e3).measured
    assert [m.what[:5] for m in both] == ["true ", "VPCR0", "VPCR4", "DVPE"]


def test_the_range_reaches_every_test_that_tells():
    def one(what, ratio, doubt):
        return MeasuredPressure(what, ratio * 50e3, 37.8 + C, 50e3, ratio, doubt * 50e3, doubt)

    factor, doubt = pressure_factor([one("VPCR4", 1.0, 0.03), one("RVP", 1.2, 0.08), one("DVPE", 0.95, 0.03)])
    assert (factor, doubt) == (1.0, pytest.approx(0.2))
    assert factor * (1.0 + doubt) >= 1.2 - 1e-12
    factor, doubt = pressure_factor([one("VPCR4", 1.0, 0.03), one("DVPE", 1.01, 0.02)])
    assert np.isclose(doubt, 0.03)  # tests that agree leave the reproducibility
    factor, doubt = pressure_factor([one("VPCR4", 1.0, 0.03), one("DVPE", 3.0, 2.0)])
    assert np.isclose(doubt, 0.03)  # nor does one that tells nothing


def test_the_range_of_a_crude_reaches_gases_its_sheet_does_not_tell():
    """A crude with ethane, known by density, distillation and VPCR4: the fit has no ethane, and its bubble point
    is low by more than the 5 % that a range holds at least. The gap from the test to the bubble point covers it."""
    crude = Blend.of({"stock:medium crude with light ends": 1.0})
    curve = distillation_d86(crude.fluid, crude.z)
    points = tuple((f, float(curve.temperature(f)[0])) for f in (0.05, 0.1, 0.3, 0.5, 0.7))
    P_4 = float(vapour_pressure_crude(crude.fluid, crude.z, ratio=4.0).P[0])
    sheet = LabSheet(density_15=crude.density_15, distillation=points, vpcr=((4.0, T_100F, P_4),), product="crude")
    back = Blend.from_lab(sheet)
    factor, doubt = pressure_factor(back.measured)
    T = 30.0 + C
    true, found = (true_vapour_pressure(b.fluid, T, b.z).P[0] for b in (crude, back))
    assert factor * found * 1.05 < true < factor * found * (1.0 + doubt)
    assert isinstance(back.measured[0].gap, float)


def test_the_gap_of_a_gasoline_is_within_what_every_range_holds():
    made = fitted(dvpe=60e3).measured
    assert 0.0 < made[0].gap < 0.05  # METHOD_SPREAD of screener/states/pressures.py
