"""Laboratory pressures resting on remembered or calculated values: guards of the code, not proof."""

from __future__ import annotations

import numpy as np
import pytest

from screener.ground.constants import T_100F
from screener.volatility import (
    d86_slope,
    ratio_20_temperature_d4814,
    reid_equivalent_crude,
    triple_expansion,
    true_from_reid_crude,
    true_from_reid_refined,
)
from screener.volatility.reid_correlations import _coefficients

PSI = 6894.757293168


def kelvin(degF):
    return (np.asarray(degF, dtype=float) + 459.67) / 1.8


def test_triple_expansion_vector():
    """Built from a vapour pressure of 55 kPa and air p = 8/(V + 0.12) kPa at V = 1, 2, 4."""
    found = triple_expansion([1.0, 2.0, 4.0], np.array([62.142857, 58.773585, 56.941748]) * 1e3).require()
    assert found.P[0] / 1e3 == pytest.approx(55.0, abs=1e-5)  # six decimals are given
    assert found.P_air[0] / 1e3 == pytest.approx(1.941748, abs=1e-5)
    assert found.DVPE[0] / 1e3 == pytest.approx(55.0 - 1.005, abs=1e-5)
    small = triple_expansion([1.0, 2.0, 4.0], found.readings, container="250 mL")
    assert small.DVPE[0] / 1e3 == pytest.approx(55.0 - 0.751, abs=1e-5)


def test_reid_equivalent_of_crude():
    assert reid_equivalent_crude([40e3, 60e3]) == pytest.approx([33.36e3, 50.04e3], abs=1e-6)
    assert reid_equivalent_crude(40e3, sample="open container") == pytest.approx([36.6e3], abs=1e-6)


# True vapour pressure [psia] at 40, 50, 60, 70, 80, 90, 100 degF by the remembered correlation, calculated elsewhere.
GASOLINES = {
    7.0: [2.28, 2.83, 3.48, 4.26, 5.16, 6.21, 7.43], 7.8: [2.59, 3.20, 3.93, 4.79, 5.79, 6.95, 8.29],
    9.0: [3.06, 3.77, 4.61, 5.59, 6.74, 8.06, 9.58], 10.0: [3.46, 4.26, 5.19, 6.27, 7.53, 8.99, 10.66],
    11.5: [4.08, 4.99, 6.06, 7.30, 8.74, 10.39, 12.28], 13.0: [4.71, 5.74, 6.95, 8.34, 9.95, 11.80, 13.90],
    15.0: [5.57, 6.76, 8.15, 9.75, 11.59, 13.69, 16.07],
}  # fmt: skip


@pytest.mark.parametrize("RVP", GASOLINES)
def test_true_from_reid_of_gasolines(RVP):
    T = kelvin([40, 50, 60, 70, 80, 90, 100])
    found = true_from_reid_refined(T, RVP * PSI, slope=d86_slope("motor gasoline")) / PSI
    assert found == pytest.approx(GASOLINES[RVP], abs=6e-3)  # two decimals


@pytest.mark.parametrize(("RVP", "A", "B"), [(7.0, 11.833, 5500.6), (10.0, 11.724, 5237.3), (13.0, 11.644, 5043.6)])
def test_constants_of_the_tabulated_gasolines(RVP, A, B):
    """P = exp(A - B/R): the remembered table of A and B comes back to its last digit, slope 3."""
    k, log, root = _coefficients("refined"), np.log(RVP), np.sqrt(3.0)
    assert k["A0"] + k["A1"] * root + (k["A2"] + k["A3"] * root) * log == pytest.approx(A, abs=6e-4)
    assert k["B0"] + k["B1"] * root + (k["B2"] + k["B3"] * root) * log == pytest.approx(B, abs=0.06)


def test_forms_with_decimal_and_natural_logarithm_agree():
    """Remembered apart, with log10: 0.7553, 413.0, 2.013, 2416 (refined), 2.227, 2799 (crude)."""
    refined, crude = _coefficients("refined"), _coefficients("crude")
    ten = np.log(10.0)
    pairs = [(0.7553, refined["A3"]), (413.0, refined["B3"]), (2.013, -refined["A2"]), (2416.0, -refined["B2"]),
             (2.227, -crude["A2"]), (2799.0, -crude["B2"])]  # fmt: skip
    for decimal, natural in pairs:
        assert decimal / ten == pytest.approx(natural, rel=6e-4)  # four digits of either


def test_true_from_reid_of_crude_is_above_the_reid_pressure():
    """At 100 degF a crude's true vapour pressure exceeds its Reid one, the more the more volatile it is."""
    RVP = np.array([3.0, 5.0, 7.0, 10.0])
    gap = true_from_reid_crude(T_100F, RVP * PSI) / PSI - RVP
    assert ((gap > 0.0) & (gap < 4.0)).all() and (np.diff(gap) > 0.0).all()


def test_outside_their_range_there_is_no_number():
    T = kelvin([-10.0, 60.0, 60.0, 60.0, 150.0])
    RVP = np.array([8.0, 0.5, 8.0, 21.0, 8.0]) * PSI
    assert list(np.isfinite(true_from_reid_refined(T, RVP, slope=d86_slope("motor gasoline")))) == [
        False, False, True, False, False,
    ]  # fmt: skip
    assert list(np.isfinite(true_from_reid_crude(T, np.array([8, 1, 8, 16, 8]) * PSI))) == [
        False, False, True, False, False,
    ]  # fmt: skip
    assert np.isnan(true_from_reid_refined(kelvin(60.0), 8.0 * PSI, slope=-1.0)).all()
    assert true_from_reid_refined(kelvin([0.0, 140.0]), [PSI, 20.0 * PSI], slope=166.7).min() > 0.0


def test_straight_line_of_a_statutory_gasoline():
    """42 USC 7581(4) base gasoline: RVP 8.7 psi, T10 126, T50 219 degF give T20 = 60.8 degC by either form."""
    T20 = ratio_20_temperature_d4814(8.7 * PSI, kelvin(126.0), kelvin(219.0))
    assert T20 - 273.15 == pytest.approx(60.8, abs=0.06)
