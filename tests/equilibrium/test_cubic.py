"""Cubic roots: the hard states, both equations, bad lanes."""

import numpy as np
import pytest

from screener.equilibrium.cubic import (
    CRITICAL_VOLUME_RATIO,
    PENG_ROBINSON,
    SOAVE_REDLICH_KWONG,
    Z_of_phase,
    roots,
)

# Peng-Robinson A, B and every root above B; roots worked with mpmath at 80 digits from A and B as written.
# The last number is the relative error allowed: 1e-15 plus a unit in the last place, except next to a
# multiple root, where a rounding of eps in A or B moves a double root by sqrt(eps) = 1.5e-8 and a triple
# root by cbrt(eps) = 6e-6.
CASES = [
    ("triple root in double", 0.4572355289213822, 0.07779607390388846, [0.30740180122131256662], 6e-6),
    ("critical, B up 1e-12", 0.4572355289213822, 0.07779607390396626, [0.30744323593353261099], 6e-6),
    ("critical, A up 1e-9", 0.4572355293786178, 0.07779607390388846, [0.3069298868202891351], 6e-6),
    ("n-butane 288.15 K 101325 Pa", 0.033268320667653346, 0.003063699106387342,
     [0.0039971357997239242145, 0.023882875814892130112, 0.96905628927899660357], 1.3e-15),
    ("n-butane 288.15 K 1 Pa", 3.2833279711476286e-07, 3.023635930310725e-08,
     [3.9463619601802658014e-8, 2.2839652699885354326e-7, 0.99999970190349409624], 1.3e-15),
    ("n-hexadecane 230 K 1 Pa", 7.800970882612624e-06, 1.6504770596901816e-07,
     [1.7268550261380532065e-7, 7.2982456739100204774e-6, 0.99999236402111750716], 1.3e-15),
    ("n-hexadecane 230 K 1e-6 Pa", 7.800970882612623e-12, 1.6504770596901815e-13,
     [1.7268550267767117524e-13, 7.2981899680526204219e-12, 0.99999999999236407682], 1.3e-15),
    ("n-decane 300 K 1e-3 Pa", 1.6117643481788187e-09, 7.616838619501016e-11,
     [8.5106662606879499542e-11, 1.3743209152886412845e-9, 0.99999999846440403591], 1.3e-15),
    ("water 275 K 20 kPa", 0.0039029121345873982, 0.00016593555355959722,
     [0.00018302640535103482582, 0.003400747704073643754, 0.9962502903370157242], 1.3e-15),
    ("nitrogen 300 K 20 kPa", 0.00027966254410762486, 0.00019273302624967103, [0.99991320786351985105], 1.3e-15),
    ("methane 190.5 K 4.59 MPa", 0.45668771089577376, 0.07766653862415482, [0.32879267574996242571], 1e-10),
    ("propane 369.8 K 4.2435 MPa", 0.4566965426264355, 0.07767406481898924, [0.33272803224996337616], 1e-10),
    ("near double root", 0.25, 0.0356,
     [0.065203109618236926032, 0.15673111118109822741, 0.74246577920066484686], 1.3e-15),
    ("A 1e-8, B 1e-10", 1e-08, 1e-10,
     [1.020837856419331397e-10, 9.6979163103580689436e-9, 0.999999990099999904], 1.3e-15),
    ("A 3, B 0.9", 3.0, 0.9, [1.4717451888169554673], 1.3e-15),
]


@pytest.mark.parametrize("name, A, B, expected, allowed", CASES, ids=[case[0] for case in CASES])
def test_hard_states(name, A, B, expected, allowed):
    found = roots(A, B)
    assert bool(found.two) == (len(expected) == 3)
    assert found.Z_V == pytest.approx(expected[-1], rel=allowed)
    assert found.Z_L == pytest.approx(expected[0], rel=allowed)


def test_hard_states_in_one_batch_equal_the_single_calls():
    A, B = np.array([case[1] for case in CASES]), np.array([case[2] for case in CASES])
    batch = roots(A, B)
    for i, (a, b) in enumerate(zip(A, B)):
        single = roots(a, b)
        assert (batch.Z_L[i], batch.Z_V[i], batch.two[i]) == (single.Z_L, single.Z_V, single.two)


@pytest.mark.parametrize("d", [PENG_ROBINSON, SOAVE_REDLICH_KWONG])
def test_roots_satisfy_the_equation_over_many_decades(d):
    generator = np.random.default_rng(20)
    B = 10.0 ** generator.uniform(-14.0, 0.0, 4000)
    A = B * 10.0 ** generator.uniform(-1.0, 2.0, 4000)
    for Z in roots(A, B, d)[:2]:
        assert (Z > B).all()
        left, right = 1.0 / (Z - B), A / ((Z + d[0] * B) * (Z + d[1] * B))
        # 1 = left - right; both sides may be 1e14, so the miss is judged against them. An error of one
        # rounding in Z is magnified by Z/(Z - B), at most some 100 here.
        assert (np.abs(left - right - 1.0) <= 1e-13 * (left + right + 1.0)).all()


@pytest.mark.parametrize("d", [PENG_ROBINSON, SOAVE_REDLICH_KWONG])
def test_count_of_roots_agrees_with_a_companion_matrix(d):
    generator = np.random.default_rng(21)
    B = 10.0 ** generator.uniform(-3.0, -0.5, 300)
    A = B * generator.uniform(2.0, 14.0, 300)
    found = roots(A, B, d)
    s, p = d[0] + d[1], d[0] * d[1]
    for i, (a, b) in enumerate(zip(A, B)):
        every = np.roots([1.0, s * b - b - 1.0, p * b * b - s * b * b - s * b + a, -(p * b**3 + p * b * b + a * b)])
        real = np.sort(every[np.abs(every.imag) < 1e-7].real)
        real = real[real > b]
        assert found.two[i] == (real.size == 3)
        assert found.Z_L[i] == pytest.approx(real[0], rel=1e-6)  # np.roots near a double root: sqrt(eps)
        assert found.Z_V[i] == pytest.approx(real[-1], rel=1e-6)


def test_phase_takes_smallest_or_largest_root():
    A, B = 0.033268320667653346, 0.003063699106387342
    assert Z_of_phase(A, B, "L") == roots(A, B).Z_L
    assert Z_of_phase(A, B, "V") == roots(A, B).Z_V


def test_bad_lanes_hold_nan_and_leave_the_others_alone():
    good = roots(0.03, 0.003)
    found = roots([np.nan, 0.03, np.inf, 0.03, 0.03], [0.003, 0.003, 0.003, -0.003, 0.0])
    assert np.isnan(found.Z_L[[0, 2, 3, 4]]).all() and np.isnan(found.Z_V[[0, 2, 3, 4]]).all()
    assert not found.two[[0, 2, 3, 4]].any()
    assert (found.Z_L[1], found.Z_V[1]) == (good.Z_L, good.Z_V)


@pytest.mark.parametrize("d", [PENG_ROBINSON, SOAVE_REDLICH_KWONG])
def test_critical_volume_ratio_is_the_triple_root(d):
    # At the critical point dP/dv = d2P/dv2 = 0. With alpha = a/(b R T), u = v/b and q = (u+d1)(u+d2) the
    # first gives alpha = q^2/(q' (u-1)^2); put into the second it leaves one equation in u.
    u = CRITICAL_VOLUME_RATIO[d]
    q = (u + d[0]) * (u + d[1])
    q1 = 2.0 * u + d[0] + d[1]
    alpha = q * q / (q1 * (u - 1.0) ** 2)
    second = 2.0 / (u - 1.0) ** 3 - alpha * (2.0 * q1 * q1 - 2.0 * q) / q**3
    assert second == pytest.approx(0.0, abs=1e-11)  # u is held to 13 digits
