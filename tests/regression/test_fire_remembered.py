"""Fire figures known from memory or from another calculation: guards of the code, not proof."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from screener.blends import Blend
from screener.equilibrium import Fluid
from screener.fire import (
    Flammability,
    flammable_window,
    flash_point,
    flash_point_by_distillation,
    vapour_space,
)
from screener.species import find


def celsius(T):
    return np.asarray(T) - 273.15


X = np.array([0.05, 0.1, 0.2, 0.3, 0.5, 0.7, 0.9, 0.95])
# First species with its flash point [degC], second likewise, flash points at X of the first: computed with
# the original UNIFAC and ideal vapour by others.
COMPUTED = [
    ("n-octane", 14.5, "ethanol", 13.0, [8.0, 5.9, 4.4, 4.1, 4.1, 3.9, 4.0, 5.3]),
    ("n-heptane", -4.0, "ethanol", 13.0, [1.3, -3.1, -6.4, -7.4, -7.6, -7.4, -7.4, -7.1]),
    ("isooctane", -8.1, "ethanol", 13.0, [-2.5, -7.4, -10.5, -11.2, -11.1, -10.8, -10.7, -10.4]),
    ("n-octane", 14.5, "1-butanol", 36.9, [27.4, 22.4, 17.4, 15.2, 13.6, 13.3, 13.3, 13.4]),
    ("n-octane", 14.5, "n-decane", 50.9, [46.2, 42.3, 36.2, 31.5, 24.6, 19.8, 16.1, 15.3]),
    ("toluene", 6.0, "n-octane", 14.5, [13.4, 12.4, 10.8, 9.6, 7.9, 6.8, 6.2, 6.1]),
    ("methanol", 10.0, "toluene", 6.0, [0.8, -0.6, -1.2, -1.2, -1.2, -0.8, 2.2, 4.7]),
    ("n-decane", 50.9, "ethanol", 13.0, [12.9, 12.9, 13.1, 13.1, 12.6, 11.7, 12.6, 16.7]),
    ("methanol", 10.0, "p-xylene", 25.0, [13.0, 9.2, 7.2, 6.9, 7.0, 6.9, 7.5, 8.3]),
    ("ethanol", 13.0, "p-xylene", 25.0, [16.1, 13.2, 11.3, 10.8, 10.4, 10.3, 11.0, 11.7]),
]  # fmt: skip


@pytest.mark.parametrize("row", COMPUTED, ids=lambda row: f"{row[0]}+{row[2]}")
def test_binary_flash_points_by_another_model(row):
    one, T_one, other, T_other, expected = row
    fluid = Fluid.of([one, other])
    own = [find(name).psat(T + 273.15) for name, T in ((one, T_one), (other, T_other))]
    limits = replace(Flammability.of(fluid), P_flash=np.array(own))
    flash = flash_point(fluid, np.stack([X, 1.0 - X], axis=1), flammability=limits).require()
    # Two UNIFACs differ by some 15 % in the vapour of dilute alcohols and hydrocarbons: 3 K.
    assert celsius(flash.T) == pytest.approx(np.array(expected), abs=3.0)


def test_octane_and_ethanol_have_a_minimum():
    """Literature has about 4 to 5 degC (remembered). The valley is flat from 0.3 to 0.9 octane: its floor
    counts."""
    fluid = Fluid.of(["n-octane", "ethanol"])
    x = np.linspace(0.0, 1.0, 51)
    flash = celsius(flash_point(fluid, np.stack([x, 1.0 - x], axis=1)).require().T)
    inside = (x >= 0.5) & (x <= 0.9)
    assert 2.0 < flash.min() < 6.0
    assert flash[inside].min() == pytest.approx(flash.min(), abs=0.3)  # flat within a tester's resolution
    assert flash.min() < min(flash[0], flash[-1]) - 5.0


@pytest.mark.parametrize(
    ("name", "low", "high"),
    [("light jet fuel", 37.0, 47.0), ("jet kerosene", 43.0, 53.0), ("heavy jet fuel", 55.0, 65.0)],
)
@pytest.mark.parametrize("method", ["liaw", "le-chatelier"])
def test_flash_points_of_reference_jet_fuels(name, low, high, method):
    """POSF 10264, 10325 and 10289: 42, 48 and 60 degC remembered; bands of 5 K."""
    blend = Blend.of({f"stock:{name}": 1.0})
    flash = flash_point(blend.fluid, blend.z, method=method).require()
    assert low < celsius(flash.T[0]) < high


@pytest.mark.parametrize(
    ("name", "lower", "upper"),
    [("ethanol", (9.0, 13.0), (39.0, 45.0)), ("methanol", (4.0, 10.0), (37.0, 45.0))],
)
def test_windows_of_alcohols(name, lower, upper):
    """Ethanol 11 to 42, methanol 7 to 41 degC: tables as remembered, and another calculation."""
    window = flammable_window(Fluid.of([name]), [1.0]).require()
    assert lower[0] < celsius(window.T_lower[0]) < lower[1]
    assert upper[0] < celsius(window.T_upper[0]) < upper[1]


G60 = {"n-butane": 5.002, "isopentane": 10.450, "n-pentane": 4.750, "2-methylpentane": 8.550, "n-hexane":
4.750, "methylcyclopentane": 3.800, "n-heptane": 4.750, "isooctane": 20.899, "2-methyl-2-butene": 5.700,
       "benzene": 0.760, "toluene": 11.400, "m-xylene": 11.400, "1,2,4-trimethylbenzene": 7.790}  # fmt: skip


def _g60(ethanol: float = 0.0) -> Blend:
    """Thirteen-species gasoline of DVPE 60 kPa, percent by volume at 60 degF; an invented composition."""
    total = sum(G60.values())
    parts = {f"species:{name}": share / total * (1.0 - ethanol) for name, share in G60.items()}
    return Blend.of({**parts, "species:ethanol": ethanol} if ethanol else parts, at="60 degF")


# Lower limits of NFPA 497 in vol% as that calculation took them; IEC 60079-20-1, which this program takes
# first, has n-butane 1.4, n-pentane 1.1 and 0.85 to 1.3 for the others.
NFPA = {"n-butane": 1.9, "isopentane": 1.4, "n-pentane": 1.5, "n-hexane": 1.1, "n-heptane": 1.0, "benzene":
1.2, "toluene": 1.1, "m-xylene": 1.1}  # fmt: skip


def test_space_over_a_sixty_kilopascal_gasoline():
    """Vapour in vol% at -40, -20, -10 and 20 degC and the window, as another model computed them."""
    blend = _g60()
    T = np.array([-40.0, -20.0, -10.0, 20.0]) + 273.15
    space = vapour_space(blend.fluid, T, blend.z).require()
    # The modified UNIFAC makes this gasoline more volatile than the original one, the more the colder.
    assert space.fuel * 100.0 == pytest.approx([2.0, 6.1, 9.8, 33.7], rel=0.12)
    assert list(space.state) == [1, 1, 2, 2]
    limits = Flammability.of(blend.fluid)
    LFL = [NFPA.get(name, 100.0 * own) / 100.0 for name, own in zip(blend.names, limits.LFL, strict=True)]
    window = flammable_window(blend.fluid, blend.z, flammability=replace(limits, LFL=np.array(LFL))).require()
    # 12 % of vapour is some 2 K.
    assert celsius([window.T_lower[0], window.T_upper[0]]) == pytest.approx([-43.0, -14.8], abs=2.5)
    own = flammable_window(blend.fluid, blend.z).require()
    assert (
        window.T_lower[0] - 5.0 < own.T_lower[0] < window.T_lower[0]
    )  # IEC is the careful set at the lean end


def test_upper_end_of_e85():
    """0 to +9 degC for bases of 60 to 70 kPa; SP measured +2 to +5 on a summer E85 (tests/measured)."""
    blend = _g60(0.85)
    window = flammable_window(blend.fluid, blend.z, ratio=[0.0, 100.0]).require()
    upper = celsius(window.T_upper)
    assert 0.0 < upper[0] < 9.0
    assert upper[1] - upper[0] == pytest.approx(10.2, abs=3.0)  # +6.4 to +16.6 in that calculation


def test_distillation_estimate_remembered():
    """T10 of 430, 442, 466, 480 K: 40.5, 49.1, 65.6, 74.7 degC, the formula worked by others."""
    flash = flash_point_by_distillation([430.0, 442.0, 466.0, 480.0]).require()
    assert celsius(flash.T) == pytest.approx([40.5, 49.1, 65.6, 74.7], abs=0.1)  # printed to a tenth


def test_benzene_over_gasoline_remembered():
    """Some 1,060 ppm of benzene over a gasoline with 1.08 mol% of it at 20 degC, by Raoult's law. The model
    lies above that by benzene's activity among paraffins, 1.6 at infinite dilution in n-heptane."""
    blend = _g60()
    at = blend.names.index("benzene")
    raoult = blend.z[at] * find("benzene").psat(293.15) / 101325.0 * 1e6
    assert raoult == pytest.approx(1060.0, rel=0.01)  # three digits
    ppm = vapour_space(blend.fluid, 293.15, blend.z).require().y[0, at] * 1e6
    assert 1.0 < ppm / raoult < 1.6
