"""Curves converted, inverted, interpolated: shapes, lanes, missing points."""

from __future__ import annotations

import numpy as np
import pytest

from screener import volatility
from screener.ground.constants import ZERO_CELSIUS
from screener.ground.errors import ShapeError
from screener.volatility import curve_at
from screener.volatility.interconversion import GAP_POINTS, GAP_POINTS_D2887_TBP, POWER_POINTS

PAIRS = [
    ("tbp_from_d86_riazi_daubert_1986", "d86_from_tbp_riazi_daubert_1986", POWER_POINTS),
    ("tbp_from_d86_daubert_1994", "d86_from_tbp_daubert_1994", GAP_POINTS),
    ("d86_from_d2887_daubert_1994", "d2887_from_d86_daubert_1994", GAP_POINTS),
    ("tbp_from_d2887_daubert_1994", "d2887_from_tbp_daubert_1994", GAP_POINTS_D2887_TBP),
]


def curves(points, n=40):
    """Rising curves from naphtha to gas oil. [K]"""
    rng = np.random.default_rng(4)
    start, span = rng.uniform(300.0, 440.0, n), rng.uniform(60.0, 200.0, n)
    shape = np.cumsum(
        np.diff(np.asarray(points), prepend=0.0) * rng.uniform(0.5, 1.5, (n, len(points))), axis=1
    )
    return start[:, None] + span[:, None] * shape


@pytest.mark.parametrize(("there", "back", "points"), PAIRS)
def test_inverse(there, back, points):
    T = curves(points)
    assert getattr(volatility, back)(getattr(volatility, there)(T)) == pytest.approx(T, abs=1e-7)


@pytest.mark.parametrize(("there", "back", "points"), PAIRS[1:])
def test_gap_forms_keep_a_curve_rising(there, back, points):
    for name in (there, back):
        assert (np.diff(getattr(volatility, name)(curves(points)), axis=1) > 0.0).all()


def test_true_boiling_points_spread_wider_than_d86():
    """Both methods: colder at the start, hotter at the end, and alike at the middle (within 5 K)."""
    D86 = curves(POWER_POINTS)
    power = volatility.tbp_from_d86_riazi_daubert_1986(D86)
    gap = volatility.tbp_from_d86_daubert_1994(curves(GAP_POINTS))
    assert (power[:, 0] < D86[:, 0]).all() and (power[:, 5] > D86[:, 5]).all()
    assert (gap[:, 1] < curves(GAP_POINTS)[:, 1] + 1.0).all()
    assert np.abs(power[:, 3] - D86[:, 3]).max() < 5.0


def test_missing_points_stay_missing():
    T = np.array([350.0, 360.0, np.nan, 380.0, 395.0, 415.0, 425.0])
    power = volatility.tbp_from_d86_riazi_daubert_1986(T)[0]
    assert list(np.isfinite(power)) == [True, True, False, True, True, True, True]
    gap = volatility.tbp_from_d86_daubert_1994(T)[0]
    # what lies beyond the missing point, seen from the middle, hangs on it
    assert list(np.isfinite(gap)) == [False, False, False, True, True, True, True]


def test_a_falling_curve_has_no_answer():
    T = np.array([350.0, 360.0, 370.0, 380.0, 375.0, 415.0, 425.0])
    assert np.isnan(volatility.tbp_from_d86_daubert_1994(T)[0, 4:]).all()


def test_wrong_number_of_points():
    with pytest.raises(ShapeError, match=r"\(n, 7\)"):
        volatility.tbp_from_d86_daubert_1994([350.0, 400.0])
    with pytest.raises(ShapeError, match=r"\(n, 8\)"):
        volatility.tbp_from_d2887_daubert_1994(np.full((2, 7), 400.0))


def test_lanes_are_independent():
    T = curves(GAP_POINTS, 5)
    alone = [volatility.tbp_from_d86_daubert_1994(row)[0] for row in T]
    assert volatility.tbp_from_d86_daubert_1994(T) == pytest.approx(np.array(alone), abs=1e-12)


def test_curve_at_other_points():
    f = np.array([0.0, 0.1, 0.3, 0.5, 0.7, 0.9])
    T = ZERO_CELSIUS + np.array(
        [[36.5, 54.1, 76.9, 101.5, 131.0, 171.0], [40.0, 41.0, 41.0, 90.0, 91.0, 200.0]]
    )
    assert curve_at(f, T, f) == pytest.approx(T, abs=1e-9)
    fine = curve_at(f, T, np.linspace(-0.1, 1.0, 400))
    assert (np.diff(fine, axis=1) > -1e-9).all()  # never falls, flat stretch included
    line = curve_at([0.0, 1.0], [300.0, 400.0], [-0.1, 0.25, 1.2])
    assert line[0] == pytest.approx([290.0, 325.0, 420.0], abs=1e-9)
    with pytest.raises(ShapeError, match="rising"):
        curve_at([0.0, 0.0, 1.0], [300.0, 310.0, 320.0], [0.5])
