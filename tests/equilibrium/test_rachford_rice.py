"""Rachford-Rice: feeds that defeat solvers, feeds without a root, bad lanes."""

import json
from pathlib import Path

import numpy as np
import pytest

from screener.equilibrium import rachford_rice
from screener.equilibrium.rachford_rice import split
from screener.ground.errors import ShapeError
from screener.ground.status import Status

FILE = Path(__file__).parent / "data" / "rachford_rice_hard_cases.json"
DATA = json.loads(FILE.read_text(encoding="utf-8"))
CASES, NO_ROOT = DATA["cases"], DATA["no_root"]
EPS = np.finfo(float).eps


def check(case, beta, x, y):
    z, K = np.array(case["z"]), np.array(case["K"])
    counts = z >= 1e-290  # below that x and y leave the range of normal doubles
    # x and y follow from ratios of positive sums: a dozen roundings each, far below 1e-12
    assert x[counts] == pytest.approx(np.array(case["x"], float)[counts], rel=1e-12, abs=0.0)
    assert y[counts] == pytest.approx(np.array(case["y"], float)[counts], rel=1e-12, abs=0.0)
    # V is known only as well as K - 1 is: an eps in K moves it by eps / max|K - 1|
    V = float(case["V"])
    assert abs(beta - V) <= 1e-14 * max(1.0, abs(V)) + 4.0 * EPS / np.abs(K - 1.0).max()


def padded():
    c = max(len(case["z"]) for case in CASES)
    z, K = np.zeros((len(CASES), c)), np.full((len(CASES), c), np.nan)
    for i, case in enumerate(CASES):
        z[i, : len(case["z"])], K[i, : len(case["z"])] = case["z"], case["K"]
    return z, K


@pytest.mark.parametrize("case", CASES, ids=[case["name"] for case in CASES])
def test_hard_case(case):
    found = rachford_rice(case["z"], case["K"])
    assert found.ok[0]
    check(case, found.beta[0], found.x[0], found.y[0])


def test_all_hard_cases_in_one_call_padded_with_absent_species():
    z, K = padded()
    found = rachford_rice(z, K)
    assert found.ok.all()
    for i, case in enumerate(CASES):
        n = len(case["z"])
        check(case, found.beta[i], found.x[i, :n], found.y[i, :n])
        assert (found.x[i, n:] == 0.0).all() and (found.y[i, n:] == 0.0).all()


@pytest.mark.parametrize("case", CASES, ids=[case["name"] for case in CASES])
def test_liquid_fraction_keeps_its_digits(case):
    """1 - V where V is next to 1: known to 1e-9 of itself, from the doubles K, down to 1e-9."""
    found = rachford_rice(case["z"], case["K"])
    L = float(case["L"])
    # the sum of z misses 1 by some eps, and L carries that in full
    assert abs(found.beta_L[0] - L) <= 1e-9 * abs(L) + 8.0 * EPS / np.abs(np.array(case["K"]) - 1.0).max()


@pytest.mark.parametrize("case", CASES, ids=[case["name"] for case in CASES])
def test_from_ln_K(case):
    """K next to 1 as ln K, which expm1 turns into K - 1 without loss."""
    z, K = np.array([case["z"]]), np.array([case["K"]])
    ln_K = np.where(z > 0.0, np.log(K), 0.0)
    beta, _, x, y, _, _, found = split(z, np.exp(ln_K), np.expm1(ln_K))
    assert found[0]
    counts = z[0] >= 1e-290
    # log and exp of K = 1e30 cost ln(1e30) = 69 roundings
    assert x[0, counts] == pytest.approx(np.array(case["x"], float)[counts], rel=1e-12, abs=0.0)
    assert y[0, counts] == pytest.approx(np.array(case["y"], float)[counts], rel=1e-12, abs=0.0)
    assert np.isfinite(beta[0])


def test_few_passes():
    z, K = padded()
    passes = rachford_rice(z, K).iterations
    assert np.median(passes) <= 6 and passes.max() <= 24  # as the best convex solver on the same feeds


@pytest.mark.parametrize("case", NO_ROOT, ids=[case["name"] for case in NO_ROOT])
def test_no_root_is_said_and_not_guessed(case):
    found = rachford_rice(case["z"], case["K"])
    assert found.status[0] == Status.NO_SOLUTION
    assert np.isnan(found.beta[0]) and np.isnan(found.x).all() and np.isnan(found.y).all()


def test_negative_flash_is_labelled():
    found = rachford_rice([[0.5, 0.5], [0.5, 0.5], [0.5, 0.5]], [[4.0, 0.5], [1.2, 0.5], [4.0, 0.9]])
    # by hand: V = -(z1 e1 + z2 e2)/(e1 e2), e = K - 1
    assert found.beta == pytest.approx([1.25 / 1.5, -0.15 / 0.1, 1.45 / 0.3], rel=1e-14)
    assert found.negative.tolist() == [False, True, True]
    assert (found.x > 0.0).all() and (found.y > 0.0).all()


def test_feed_that_does_not_sum_to_one_is_solved_as_given_and_reported():
    whole = rachford_rice([0.3, 0.7], [3.0, 0.4])
    half = rachford_rice([0.15, 0.35], [3.0, 0.4])
    assert half.total[0] == pytest.approx(0.5, rel=1e-15)
    assert half.beta[0] == pytest.approx(whole.beta[0], rel=1e-14)  # the root does not depend on the sum
    assert half.x[0] == pytest.approx(0.5 * whole.x[0], rel=1e-14)


def test_bad_lanes_do_not_spoil_the_good_one():
    alone = rachford_rice([0.3, 0.7], [3.0, 0.4])
    z = [[0.3, 0.7], [np.nan, 0.7], [-0.1, 1.1], [0.3, 0.7], [0.3, 0.7], [0.0, 0.0]]
    K = [[3.0, 0.4], [3.0, 0.4], [3.0, 0.4], [np.nan, 0.4], [-3.0, 0.4], [3.0, 0.4]]
    found = rachford_rice(z, K)
    assert found.status.tolist() == [Status.CONVERGED] + 5 * [Status.BAD_INPUT]
    assert np.isnan(found.beta[1:]).all() and np.isnan(found.x[1:]).all()
    assert found.beta[0] == alone.beta[0] and (found.x[0] == alone.x[0]).all()


def test_absent_species_change_nothing():
    alone = rachford_rice([0.3, 0.7], [3.0, 0.4])
    among = rachford_rice([0.0, 0.3, 0.0, 0.7, 0.0], [1e9, 3.0, np.nan, 0.4, 1e-9])
    assert among.beta[0] == alone.beta[0]
    assert among.x[0, [1, 3]].tolist() == alone.x[0].tolist()
    assert among.x[0, [0, 2, 4]].tolist() == [0.0, 0.0, 0.0]


def test_shapes_that_do_not_fit():
    with pytest.raises(ShapeError, match=r"K: got shape \(3,\), expected one that broadcasts with z, \(2,\)"):
        rachford_rice([0.5, 0.5], [1.0, 2.0, 3.0])
