"""The first vapour over a liquid that may be two: free water adds its vapour pressure, and no more."""

import importlib
import json
from dataclasses import replace
from pathlib import Path

import numpy as np
import pytest

from screener.equilibrium import Fluid, bubble_pressure, first_vapour
from screener.equilibrium import fixed_point as engine
from screener.equilibrium.second_liquid import SPLITS, TESTED, TWO_LIQUIDS
from screener.ground.status import Status

FUELS = json.loads((Path(__file__).parent / "data" / "fuel_bubble_points.json").read_text(encoding="utf-8"))[
    "fuels"
]
WET = FUELS[-1]


@pytest.fixture(scope="module")
def wet_gasoline():
    return Fluid.from_constants(WET["Tc"], WET["Pc"], WET["omega"], np.full(9, 0.1), WET["kij"]), np.array(
        WET["z"]
    )


@pytest.fixture(scope="module")
def gasoline():
    return Fluid.of(["n-butane", "isopentane", "n-hexane", "isooctane", "toluene", "m-xylene", "water"])


DRY = np.array([0.06, 0.14, 0.20, 0.25, 0.25, 0.10, 0.0])


def settled(water):
    z = (1.0 - water) * DRY
    z[6] = water
    return z


def test_gasoline_with_800_ppm_water_as_found_by_a_solver_of_many_starts(wet_gasoline):
    """9.3 against 6.2 kPa at 253 K, 33.0 against 29.0 kPa at 288 K, k_ij 0.5 assumed: numbers of another program."""
    fluid, z = wet_gasoline
    found = first_vapour(fluid, [253.15, 288.15], z)
    assert found.ok.all() and found.liquids.tolist() == [2, 2] and found.checks.tolist() == [TWO_LIQUIDS] * 2
    assert found.one_liquid == pytest.approx([9300.0, 33000.0], abs=50.0)  # given to 0.1 kPa
    assert found.P == pytest.approx([6200.0, 29000.0], abs=50.0)
    one = bubble_pressure(fluid, [253.15, 288.15], z, check="full")
    assert (one.status == Status.LIQUID_SPLITS).all() and one.P == pytest.approx(
        found.one_liquid
    )  # an upper bound


def test_the_point_is_the_bubble_point_of_each_of_its_liquids(wet_gasoline):
    fluid, z = wet_gasoline
    found = first_vapour(fluid, [253.15, 288.15], z)
    for x in (found.x, found.x_W):
        alone = bubble_pressure(fluid, found.T, x / x.sum(axis=1, keepdims=True))
        assert alone.P == pytest.approx(found.P, rel=1e-9) and alone.y == pytest.approx(found.y, rel=1e-7)
    assert (found.residual < 1e-9).all() and (found.balance < 1e-15).all() and (found.tpd > -1e-8).all()
    left = (1.0 - found.beta_W)[:, None] * found.x + found.beta_W[:, None] * found.x_W
    assert left == pytest.approx(np.tile(z, (2, 1)), abs=1e-15)


def test_free_water_adds_its_vapour_pressure(gasoline):
    """Hydrocarbon and water hardly dissolve in one another: pressures add, less what the little water dilutes."""
    T = np.array([253.15, 273.15, 288.15, 310.93])
    found, dry = first_vapour(gasoline, T, settled(0.2)), bubble_pressure(gasoline, T, DRY)
    assert found.ok.all() and (found.liquids == 2).all()
    water = bubble_pressure(gasoline, T, np.eye(7)[6]).P
    dissolved = found.x[:, 6]
    assert (dissolved < 3e-3).all() and (found.x_W[:, 6] > 0.999).all()
    # the water takes the place of as much hydrocarbon (dissolved, below 3e-3) and the vapour is not quite ideal (1e-3)
    assert found.P == pytest.approx(dry.P + water, rel=4e-3)


def test_how_much_water_has_settled_makes_no_difference(gasoline):
    z = np.stack([settled(w) for w in (0.01, 0.1, 0.5, 0.9)])
    found = first_vapour(gasoline, 288.15, z)
    assert found.ok.all() and (np.diff(found.beta_W) > 0.0).all()
    assert np.ptp(found.P) < 1e-4 * found.P[0]  # what hydrocarbon goes into the water is below 1e-4 of it
    assert np.isnan(found.one_liquid[3]) and (found.one_liquid[:3] > found.P[:3]).all()


def test_a_liquid_that_is_one_keeps_its_bubble_point(gasoline):
    z = np.stack([DRY, settled(5e-5), settled(0.9999999)])
    found, plain = first_vapour(gasoline, 288.15, z), bubble_pressure(gasoline, 288.15, z)
    assert found.liquids.tolist() == [1, 1, 1] and found.checks.tolist() == [TESTED] * 3
    assert (
        found.P == pytest.approx(plain.P, rel=1e-12)
        and np.isnan(found.beta_W).all()
        and np.isnan(found.x_W).all()
    )


def test_nothing_jumps_where_the_second_liquid_goes(gasoline):
    """Around the share of water that saturates the gasoline the two bubble points meet."""
    T = 288.15
    share = first_vapour(gasoline, T, settled(0.01)).x[0, 6]
    found = first_vapour(gasoline, T, [settled(share * f) for f in (0.999, 1.001)])
    assert found.liquids.tolist() == [1, 2] and found.beta_W[1] < 1e-5
    assert found.P[1] == pytest.approx(found.P[0], rel=1e-4)


@pytest.mark.parametrize(
    ("names", "excess"),
    [
        (["n-butane", "n-hexane", "toluene", "ethanol", "water"], 0.0),  # water settles: an upper bound
        (["n-pentane", "n-decane", "toluene", "methanol"], 0.03),  # 2.2 % was the most in 290 such feeds
    ],
)
def test_how_far_the_number_for_one_liquid_is_a_bound(names, excess):
    """Held together, settled water would push with more than its own pressure; methanol may also only dilute."""
    fluid, n = Fluid.of(names), 50
    generator = np.random.default_rng(8)
    z, T = generator.dirichlet(np.ones(fluid.c), n), generator.uniform(255.0, 330.0, n)
    found = first_vapour(fluid, T, z)
    assert found.ok.all() and {1, 2} == set(found.liquids)
    two = (found.liquids == 2) & np.isfinite(found.one_liquid)
    assert two.sum() >= 15 and (found.P[two] < (1.0 + excess) * found.one_liquid[two]).all()
    assert (found.residual < 1e-9).all() and (found.balance < 1e-14).all()


def test_every_status_in_one_batch(gasoline, monkeypatch):
    z = np.stack([settled(0.2), DRY, DRY, DRY * 2.0, DRY])
    T = np.array([288.15, 288.15, 700.0, 288.15, np.nan])
    found = first_vapour(gasoline, T, z)
    bad = Status.BAD_INPUT
    assert found.status.tolist() == [Status.CONVERGED, Status.CONVERGED, Status.NO_SOLUTION, bad, bad]
    assert np.isnan(found.P[2:]).all() and found.liquids.tolist() == [2, 1, 0, 0, 0]
    lacking = replace(gasoline, missing=(("n-butane", "water"),))
    assert first_vapour(lacking, T[:2], z[:2]).status.tolist() == [Status.NO_PARAMETERS, Status.CONVERGED]
    module = importlib.import_module("screener.equilibrium.first_vapour")
    monkeypatch.setattr(module, "solve", lambda *a, **k: engine.solve(*a, **{**k, "plain": 1, "newton": 0}))
    lost = first_vapour(gasoline, T[:1], z[:1])  # it splits, and the point of the two was not found
    assert lost.status[0] == Status.LIQUID_SPLITS and lost.checks[0] == SPLITS and np.isnan(lost.P[0])
    assert lost.one_liquid[0] == pytest.approx(found.one_liquid[0], rel=1e-12) and lost.liquids[0] == 0


def test_lane_of_a_batch_equals_the_single_run(gasoline):
    z = np.stack([settled(w) for w in (0.0, 1e-5, 1e-3, 0.2, 0.8)])
    T = np.array([260.0, 275.0, 290.0, 300.0, 310.0])
    batch = first_vapour(gasoline, T, z)
    for i in range(5):
        alone = first_vapour(gasoline, T[i], z[i])
        assert batch.P[i] == pytest.approx(alone.P[0], rel=1e-9)  # the same steps, but for the order of sums
        assert batch.liquids[i] == alone.liquids[0]
