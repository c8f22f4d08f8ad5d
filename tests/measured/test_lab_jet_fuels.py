"""Reference jet fuels: vapour pressure from composition, and from D86 and density, against measurement.

Edwards, AIAA 2017-0146 and AFRL-RQ-WP-TR-2020-0017 (public release): GCxGC composition by class and carbon number
(stocks of data/stocks), vapour pressure read off figures, D86, density, molar mass and aromatics (table 5). Vapour
pressures below 60 degC hold dissolved air (all three fuels show the same figure at 0 degC) and take no part.
"""

from __future__ import annotations

import numpy as np
import pytest

from screener.blends import Blend, stock
from screener.equilibrium import Fluid
from screener.ground.constants import ZERO_CELSIUS
from screener.volatility import (
    curve_at,
    distillation,
    pseudo_components,
    tbp_from_d86_daubert_1994,
    true_vapour_pressure,
)
from screener.volatility.interconversion import GAP_POINTS

FUELS = {"10264": "light jet fuel", "10325": "average jet fuel", "10289": "heavy jet fuel"}
SYNTHETIC = "isoparaffinic jet fuel"
D86 = {  # IBP, T10, T20, T50, T90, FBP [degC]
    "10264": [150.0, 164.3, 171.1, 189.7, 233.9, 256.7], "10325": [159.2, 176.8, 185.4, 205.4, 244.6, 270.5],
    "10289": [177.9, 194.2, 201.3, 219.6, 245.8, 259.5],
}  # fmt: skip
MOLAR_MASS = {"10264": 152.0, "10325": 159.0, "10289": 166.0}  # g/mol
AROMATICS = {"10264": 0.1356, "10325": 0.1853, "10289": 0.2036}  # of the mass, taken for the volume
BAND = 0.55, 1.15  # calculated over measured, as asked of this calculation


def published(name, number):
    """Temperatures [K] (None but for vapour pressures) and values in SI of the published numbers of a stock."""
    return tuple(zip(*((p.at, p.value) for p in stock(name).published if p.number == number), strict=True))


def molecules(name):
    """The fuel as its stock has it."""
    blend = Blend.of({f"stock:{name}": 1.0})
    return blend.fluid, blend.z


def cuts(fuel):
    """The fuel as cuts of its D86 curve and density."""
    measured = np.array(D86[fuel]) + ZERO_CELSIUS
    tbp = tbp_from_d86_daubert_1994(curve_at([0.0, 0.1, 0.2, 0.5, 0.9, 1.0], measured, np.array(GAP_POINTS)))[
        0
    ]
    density = published(FUELS[fuel], "density_15")[1][0]
    found = pseudo_components(np.array(GAP_POINTS), tbp, density, aromatics=AROMATICS[fuel])
    return Fluid.of(found.names), found.z


def over_measured(name, fluid, z):
    """Calculated over measured vapour pressure at the measured temperatures."""
    T, P = (np.array(column) for column in published(name, "tvp"))
    return true_vapour_pressure(fluid, T, z).require().P / P


@pytest.fixture(scope="module")
def ratios():
    """{fuel: (molecules over measured, cuts over measured)} at 60, 80, 100 and 120 degC."""
    found = {
        fuel: (over_measured(name, *molecules(name)), over_measured(name, *cuts(fuel)))
        for fuel, name in FUELS.items()
    }
    print("\ncalculated over measured vapour pressure at 60, 80, 100, 120 degC")
    for fuel, (one, two) in found.items():
        print(f"POSF {fuel}: from composition {np.round(one, 2)}, from D86 and density {np.round(two, 2)}")
    return found


@pytest.mark.parametrize("fuel", FUELS)
def test_vapour_pressure_from_composition(fuel, ratios, record_property):
    ratio = ratios[fuel][0]
    assert published(FUELS[fuel], "tvp")[0] == pytest.approx(
        ZERO_CELSIUS + np.array([60.0, 80.0, 100.0, 120.0])
    )
    record_property("calculated_over_measured", [round(float(r), 3) for r in ratio])
    assert ((ratio > BAND[0]) & (ratio < BAND[1])).all()


def test_vapour_pressure_of_the_synthetic_fuel(record_property):
    """POSF 11498 at 79, 99 and 119 degC; its pressures are printed as kPa but fit only as psi and are taken so."""
    ratio = over_measured(SYNTHETIC, *molecules(SYNTHETIC))
    record_property("calculated_over_measured", [round(float(r), 3) for r in ratio])
    assert ((ratio > BAND[0]) & (ratio < BAND[1])).all() and (np.diff(ratio) > 0.0).all()


@pytest.mark.parametrize(("fuel", "least"), [("10264", BAND[0]), ("10325", BAND[0]), ("10289", 0.45)])
def test_vapour_pressure_from_d86_and_density(fuel, least, ratios, record_property):
    """Six points and a density in place of sixty bins.

    POSF 10289 falls out of the band at 60 and 80 degC (0.48, 0.50): its own readings do not lie on one curve, see
    `test_readings_of_the_heavy_fuel_do_not_lie_on_one_curve`.
    """
    ratio = ratios[fuel][1]
    record_property("calculated_over_measured", [round(float(r), 3) for r in ratio])
    assert ((ratio > least) & (ratio < BAND[1])).all()


def heats(name):
    """Heat of vaporisation [kJ/mol] between neighbouring measured vapour pressures."""
    T, P = (np.array(column) for column in published(name, "tvp"))
    return -8.314462618e-3 * np.diff(np.log(P)) / np.diff(1.0 / T)


def test_readings_of_the_heavy_fuel_do_not_lie_on_one_curve():
    """The heat of vaporisation falls slowly with temperature; between readings of POSF 10289 it jumps by 10 kJ/mol."""
    for fuel in ("10264", "10325"):
        assert np.ptp(heats(FUELS[fuel])) < 2.0  # a reading error of 2 % moves it by 1.6 kJ/mol
    heavy = heats(FUELS["10289"])
    assert heavy[0] - heavy[1] > 8.0 and heavy[2] - heavy[1] > 8.0


def test_the_gap_shrinks_with_temperature(ratios):
    """What dissolved air and light traces add to a measurement matters less the hotter it is."""
    for fuel in ("10264", "10325"):
        assert (np.diff(ratios[fuel][0]) > 0.0).all() and (np.diff(ratios[fuel][1]) > 0.0).all()


@pytest.mark.parametrize("fuel", FUELS)
def test_cuts_agree_with_composition(fuel, ratios):
    """Two roads to one vapour pressure, from 60 bins and from six D86 points.

    The conversion of 1994 gives true boiling points 0 to 6 K above those of the composition between 10 and 50 %; 6 K of
    a curve that rises 4.5 % a kelvin at 60 degC are 27 %. It never lies above.
    """
    one, two = ratios[fuel]
    assert ((two / one > 0.73) & (two / one < 1.0)).all()


@pytest.mark.parametrize("fuel", FUELS)
def test_molar_mass(fuel):
    """Printed molar masses: through Twu 1984 from D86 and density within 3 %, from the bins as printed (to 1 g/mol)."""
    fluid, z = cuts(fuel)
    assert 1e3 * (z @ fluid.MW) == pytest.approx(MOLAR_MASS[fuel], rel=0.03)
    fluid, z = molecules(FUELS[fuel])
    assert 1e3 * (z @ fluid.MW) == pytest.approx(MOLAR_MASS[fuel], abs=0.6)


def test_d86_curves_with_reflux(record_property):
    """T50 less T10: the plain still is 5 to 9 K short, reflux of 0.1 closes part of it, 0.3 all but 2 K.

    The curves themselves lie 6 to 10 K high; that of a fuel of two known molecules lies 7 K high.
    """
    short = {}
    for fuel, name in FUELS.items():
        fluid, z = molecules(name)
        curve = distillation(fluid, z, reflux=[0.0, 0.1, 0.3], steps=25).require()
        measured = D86[fuel][3] - D86[fuel][1]
        short[fuel] = measured - (curve.T50 - curve.T10)
        off = curve.T50 - ZERO_CELSIUS - D86[fuel][3]
        assert ((off > 0.0) & (off < 12.0)).all(), (fuel, off)
        print(
            f"POSF {fuel}: T50 - T10 measured {measured:.1f}, short by {np.round(short[fuel], 1)} K; T50 high by {off[0]:.1f} K"
        )
    record_property("short_by_K", {fuel: [round(float(v), 1) for v in row] for fuel, row in short.items()})
    gap = np.array(list(short.values()))
    assert (gap[:, 0] > 4.0).all()
    assert (np.diff(np.abs(gap), axis=1) < 0.0).all() and (np.abs(gap[:, 2]) < 2.5).all()
