"""The zero-pressure function: smooth, falling, inverted exactly; and what the mixing rule promises."""

import numpy as np
import pytest

from screener.equilibrium import Fluid
from screener.equilibrium.zero_pressure import JOINT, alpha_of_q, q_and_slope


def test_value_against_the_root_of_the_equation():
    """q from the zero-pressure root found independently, at alpha where it exists."""
    alpha = np.array([7.6, 8.0, 10.0, 16.0, 40.0])
    d1, d2 = 1.0 - np.sqrt(2.0), 1.0 + np.sqrt(2.0)
    for a, q in zip(alpha, q_and_slope(alpha)[0], strict=True):
        u = np.roots([1.0, d1 + d2 - a, d1 * d2 + a]).real.min()
        expected = -1.0 - np.log(u - 1.0) - a / (d2 - d1) * np.log((u + d2) / (u + d1))
        assert q == pytest.approx(expected, rel=1e-12)


def test_value_slope_and_curvature_run_through_the_joint():
    step = 1e-4
    q, slope = q_and_slope(JOINT + step * np.array([-2.0, -1.0, 1.0, 2.0]))
    # outside differences: the curvature on both sides and across, equal to the third derivative times the step
    left, right = (slope[1] - slope[0]) / step, (slope[3] - slope[2]) / step
    across = (slope[2] - slope[1]) / (2.0 * step)
    assert left == pytest.approx(across, rel=1e-3)
    assert right == pytest.approx(across, rel=1e-3)
    assert (q[2] - q[1]) / (2.0 * step) == pytest.approx(0.5 * (slope[1] + slope[2]), rel=1e-7)


def test_strictly_falling_and_slope_is_the_derivative():
    alpha = np.linspace(-20.0, 120.0, 5001)
    q, slope = q_and_slope(alpha)
    assert (np.diff(q) < 0.0).all()
    assert (slope < 0.0).all()
    # central differences on a grid of 0.028: error is the third derivative times 1e-4
    np.testing.assert_allclose(np.gradient(q, alpha)[1:-1], slope[1:-1], rtol=2e-3)


def test_inverse():
    alpha = np.concatenate([np.linspace(-60.0, 30.0, 400), np.geomspace(30.0, 900.0, 200), [JOINT]])
    found, slope = alpha_of_q(q_and_slope(alpha)[0])
    # 1e-12: q is of the size of alpha, so its rounding moves alpha by a few eps of it
    np.testing.assert_allclose(found, alpha, rtol=1e-12, atol=1e-12)
    np.testing.assert_allclose(slope, q_and_slope(alpha)[1], rtol=1e-10)


def test_bad_lane_stays_in_its_lane():
    found, _ = alpha_of_q(np.array([-5.0, np.nan, -9.0]))
    assert np.isnan(found[1])
    assert np.isfinite(found[[0, 2]]).all()


def test_excess_gibbs_energy_is_matched_exactly_at_zero_pressure():
    names = ["n-pentane", "isooctane", "toluene", "ethanol", "water"]
    fluid = Fluid.of(names)
    rng = np.random.default_rng(7)
    T, x = rng.uniform(260.0, 340.0, 20), rng.dirichlet(np.ones(5), 20)
    P = 1e-6  # [Pa]; the liquid's own contribution P v / RT is then 1e-13
    mixed = fluid.ln_phi(T, P, x, "L")
    pure = np.stack([fluid.ln_phi(T, P, np.eye(5)[i], "L")[:, i] for i in range(5)], axis=1)
    # 1e-8: ln phi is 25 here and carries Z - B of 1e-11
    np.testing.assert_allclose(mixed - pure, fluid.ln_gamma(T, x), rtol=0.0, atol=1e-8)
