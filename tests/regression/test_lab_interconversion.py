"""Interconversion and averages with remembered or corrected coefficients."""

from __future__ import annotations

import numpy as np
import pytest

from screener.ground.constants import ZERO_CELSIUS
from screener.ground.files import read_table
from screener.volatility import average_boiling_points, d86_from_d2887_daubert_1994, tbp_from_d86_daubert_1994


def test_gap_form_with_the_exponent_of_the_procedure():
    """90 and 95 %: 180.82 and 197.30 degC with 0.75497, not the 184.63 and 201.12 of a worked sheet."""
    D86 = np.array([36.5, 54.0, 77.0, 101.5, 131.0, 171.0, 186.5])
    found = tbp_from_d86_daubert_1994(D86 + ZERO_CELSIUS)[0] - ZERO_CELSIUS
    assert found == pytest.approx([-5.33, 27.53, 66.74, 101.66, 138.15, 180.82, 197.30], abs=0.01)


def test_simulated_distillation_to_d86():
    """API 3A3.2 from memory: 33.9 to 208.3 degC at 0, 10, 30, 50, 70, 90 %, calculated elsewhere from the same set."""
    SD = np.array([33.9, 64.4, 101.7, 140.6, 182.2, 208.3, np.nan])
    found = d86_from_d2887_daubert_1994(SD + ZERO_CELSIUS)[0] - ZERO_CELSIUS
    assert found[:6] == pytest.approx([69.9, 85.3, 105.3, 135.9, 175.2, 195.0], abs=0.06)  # one decimal
    assert np.isnan(found[6])


# Remembered apart from the degF sets: the same factors for temperatures in kelvin, factor 1.8^(exponent - 1).
KELVIN = {
    "d86-to-tbp": [0.1740, 2.6339, 2.2744, 2.6956, 4.1481, 5.8589],
    "d2887-to-d86": [2.13092, 0.35326, 0.19121, 0.10949, 0.08227, 0.32810],
    "d2887-to-tbp": [0.03849, 0.90427, 0.37475, 0.25088, 0.08055, 0.02175, 0.20312],
}


@pytest.mark.parametrize("conversion", KELVIN)
def test_two_memories_agree(conversion):
    rows = [r for r in read_table("volatility/distillation_gaps.csv") if r["conversion"] == conversion]
    found = [float(r["factor"]) * 1.8 ** (float(r["exponent"]) - 1.0) for r in rows if r["upper"] != r["lower"]]
    assert found == pytest.approx(KELVIN[conversion], rel=4e-4)  # four to five digits of either


def test_power_form_in_rankine():
    """The Rankine factors on a worked sheet are those in kelvin times 1.8^(1 - b)."""
    rankine = [0.9167, 0.5277, 0.7429, 0.8920, 0.8705, 0.9490, 0.8008]
    rows = read_table("volatility/distillation_power.csv")
    found = [float(r["a"]) * 1.8 ** (1.0 - float(r["b"])) for r in rows]
    assert found == pytest.approx(rankine, abs=6e-5)  # half of the fourth decimal


def test_averages_keep_their_order():
    """Mass above volume above cubic above mean above molar average, as they must for any spread of boiling points."""
    T = np.array([[330.0, 350.0, 375.0, 405.0, 445.0], [430.0, 450.0, 470.0, 495.0, 530.0]])
    found = average_boiling_points(T)
    order = np.stack([found.mass, found.volume, found.cubic, found.mean, found.molar])
    assert (np.diff(order, axis=0) < 0.0).all()
    assert np.isnan(average_boiling_points(T[:, ::-1]).mean).all()
    # MeABP is by definition the mean of the molar and the cubic average; the fits of the three agree within 1.5 K.
    assert found.mean == pytest.approx(0.5 * (found.molar + found.cubic), abs=1.5)
    assert found.watson_factor([740.0, 810.0]) == pytest.approx([11.9, 11.7], abs=0.1)
