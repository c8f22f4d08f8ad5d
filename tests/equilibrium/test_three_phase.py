"""A vapour over two liquids: shares of phases, whole flashes, and what is left when a phase goes."""

import json
from pathlib import Path

import numpy as np
import pytest

from screener.equilibrium import Fluid, first_vapour, flash_tp, rachford_rice, stability
from screener.equilibrium.second_liquid import SPLITS, TESTED, THREE_PHASES, TWO_LIQUIDS
from screener.equilibrium.three_phase import shares_of_phases
from screener.ground.status import Status

DATA = Path(__file__).parent / "data"
CASES = json.loads((DATA / "flash_reference.json").read_text(encoding="utf-8"))["cases"]
WET_GASOLINE = json.loads((DATA / "fuel_bubble_points.json").read_text(encoding="utf-8"))["fuels"][-1]


def from_case(case, eos="PR"):
    c = len(case["z"])
    return Fluid.from_constants(
        case["Tc"], case["Pc"], case["omega"], np.full(c, 0.1), case["kij"], case.get("eos", eos)
    )


@pytest.fixture(scope="module")
def wet():
    """Propane, hexane and water, k_ij 0.5 assumed."""
    kij = np.array([[0.0, 0.0, 0.5], [0.0, 0.0, 0.5], [0.5, 0.5, 0.0]])
    return Fluid.from_constants(
        [369.8, 507.6, 647.1], [4.25e6, 3.025e6, 22.064e6], [0.152, 0.30, 0.344], [0.044, 0.086, 0.018], kij
    )


def proofs(fluid, found):
    """Largest |ln f| between phases and largest miss of the balance, from the model and nothing else."""
    highest, lowest, left = (
        np.full(found.z.shape, -np.inf),
        np.full(found.z.shape, np.inf),
        np.zeros(found.z.shape),
    )
    second = np.where(np.isfinite(found.beta_W), found.beta_W, 0.0)
    for x, kind, share in (
        (found.x, "L", 1.0 - found.beta - second), (found.y, "V", found.beta), (found.x_W, "L", second)
    ):  # fmt: skip
        there = np.isfinite(x).all(axis=1)[:, None]
        with np.errstate(divide="ignore"):
            ln_f = np.log(np.where(there, x, 1.0)) + fluid.ln_phi(
                found.T, found.P, np.where(there, x, found.z), kind
            )
        highest, lowest = (
            np.where(there, np.fmax(highest, ln_f), highest),
            np.where(there, np.fmin(lowest, ln_f), lowest),
        )
        left += np.where(there, share[:, None] * x, 0.0)
    spread = np.subtract(highest, lowest, out=np.zeros_like(left), where=found.z > 0.0)
    return spread.max(axis=1), np.abs(left - found.z).max(axis=1)


def test_shares_of_two_phases_are_those_of_rachford_and_rice():
    generator = np.random.default_rng(1)
    z = generator.dirichlet(np.ones(6), 200)
    ln_K = generator.uniform(-3.0, 3.0, (200, 6))
    expected = rachford_rice(z, np.exp(ln_K))
    inside = expected.ok & (expected.beta > 0.0) & (expected.beta < 1.0)
    absent = np.full_like(z, -50.0)  # a third phase that never pays
    beta, x = shares_of_phases(z, np.stack([0.0 * z, ln_K, absent], axis=1), np.full((200, 3), 1.0 / 3.0))
    assert inside.sum() > 50 and (beta[:, 2] == 0.0).all()
    assert beta[inside, 1] == pytest.approx(
        expected.beta[inside], abs=1e-11
    )  # flat minimum: slope 1e-14 of Q
    assert x[inside, 0] == pytest.approx(expected.x[inside], abs=1e-11)
    assert (beta[~inside] > 0.0).sum(axis=1).tolist() == [1] * int((~inside).sum())


def test_shares_of_three_phases_meet_the_conditions_of_the_minimum():
    generator = np.random.default_rng(2)
    z = generator.dirichlet(np.ones(5), 300)
    ln_e = generator.uniform(-4.0, 4.0, (300, 3, 5))
    beta, x = shares_of_phases(z, ln_e, np.full((300, 3), 1.0 / 3.0))
    assert set((beta > 0.0).sum(axis=1)) == {1, 2, 3}  # every number of phases occurs
    e = np.exp(ln_e)
    sums = np.einsum("nc,nkc->nk", z / np.einsum("nk,nkc->nc", beta, e), e)
    assert (
        np.abs(np.where(beta > 0.0, sums - 1.0, 0.0)).max() < 1e-12
    )  # compositions of phases that exist sum to 1
    assert (sums <= 1.0 + 1e-12).all()  # those of the others to less
    assert np.abs(np.einsum("nk,nkc->nc", beta, x) - z).max() < 1e-12


def test_pressure_takes_a_wet_feed_through_its_phases(wet):
    """Vapour over water, vapour over hydrocarbon over water, hydrocarbon over water."""
    P = np.array([2e4, 3e5, 2e6])
    found = flash_tp(wet, 300.0, P, [0.3, 0.4, 0.3], check="full")
    assert found.phases.tolist() == [2, 3, 2]
    assert found.checks.tolist() == [TESTED, THREE_PHASES, TWO_LIQUIDS]
    assert found.status.tolist() == [Status.CONVERGED, Status.LIQUID_SPLITS, Status.LIQUID_SPLITS]
    assert found.x[0, 2] > 0.999 and found.x_W[1, 2] > 0.999 and found.x_W[2, 2] > 0.999  # water settles
    spread, balance = proofs(wet, found)
    assert (spread <= 1e-9).all() and spread == pytest.approx(found.residual, abs=1e-11)
    assert (balance <= 1e-14).all() and (found.balance <= 1e-14).all() and (found.tpd > -1e-8).all()
    assert found.K[1] == pytest.approx(found.y[1] / found.x[1])


def test_water_that_drops_out_of_a_gas_is_found():
    """Carbon dioxide with a little water, inside the dew line: a vapour-liquid pair starts from the feed alone."""
    fluid = Fluid.from_constants(
        [304.1, 647.1],
        [7.38e6, 22.064e6],
        [0.2239, 0.3443],
        [0.044, 0.018],
        np.array([[0.0, 0.19], [0.19, 0.0]]),
    )
    found = flash_tp(fluid, 300.0, 3e6, [0.995, 0.005], check="full")
    assert found.ok[0] and found.phases[0] == 2 and found.x[0, 1] > 0.99 and 0.99 < found.beta[0] < 1.0


def test_gasoline_on_settled_water_just_below_its_first_vapour():
    fluid = from_case(WET_GASOLINE)
    T, z = np.array([253.15, 288.15]), np.array(WET_GASOLINE["z"])
    point = first_vapour(fluid, T, z)
    found = flash_tp(fluid, T, point.P * (1.0 - 1e-5), z, check="full")
    assert found.phases.tolist() == [3, 3] and (found.beta < 1e-4).all()
    assert found.y == pytest.approx(
        point.y, abs=1e-4
    )  # 1e-5 below the point, over the slope of the vapour fraction
    assert found.beta_W == pytest.approx(point.beta_W, abs=1e-5)
    above = flash_tp(fluid, T, point.P * (1.0 + 1e-5), z, check="full")
    assert above.phases.tolist() == [2, 2] and above.checks.tolist() == [TWO_LIQUIDS, TWO_LIQUIDS]


@pytest.mark.parametrize(
    "case", [case for case in CASES if case["phases"] == 3], ids=lambda case: case["name"]
)
def test_three_phases_have_less_energy_than_the_two_of_the_reference(case):
    fluid = from_case(case)
    found = flash_tp(fluid, case["T"], case["P"], case["z"], check="full")
    assert found.phases[0] == 3 and (proofs(fluid, found)[0] <= 1e-9).all() and found.balance[0] < 1e-14

    def energy(shares, phases):
        total = 0.0
        for share, x, kind in zip(shares, phases, "LVL", strict=False):
            x = np.atleast_2d(x)
            total += share * float((x * (np.log(x) + fluid.ln_phi(case["T"], case["P"], x, kind))).sum())
        return total

    W, V = found.beta_W[0], found.beta[0]
    three = energy((1.0 - W - V, V, W), (found.x[0], found.y[0], found.x_W[0]))
    two = energy((1.0 - case["beta"], case["beta"]), (case["x"], case["y"]))
    assert three < two  # by 4e-3 and by 4e-7
    assert found.tpd[0] > -1e-8


MIXTURES = {
    "hydrocarbons": ["propane", "n-butane", "n-hexane", "toluene", "n-decane", "water"],
    "ethanol": ["n-butane", "n-hexane", "isooctane", "toluene", "ethanol", "water"],
    "methanol": ["n-butane", "n-hexane", "cyclohexane", "toluene", "methanol", "water"],
    "gases": ["nitrogen", "carbon dioxide", "methane", "n-pentane", "n-octane", "water"],
}


@pytest.mark.parametrize("kind", MIXTURES)
def test_wet_mixtures_are_solved_or_say_that_they_are_not(kind):
    """Equal fugacity, balance, and the tangent plane of every phase by the stability test on its own."""
    fluid, n = Fluid.of(MIXTURES[kind]), 60
    generator = np.random.default_rng(len(kind))
    z = generator.dirichlet(np.full(fluid.c, 0.5), n) * (generator.random((n, fluid.c)) > 0.15)
    z[:, -1] += 1e-6
    z /= z.sum(axis=1, keepdims=True)
    T, P = generator.uniform(250.0, 380.0, n), np.exp(generator.uniform(np.log(2e4), np.log(3e6), n))
    found = flash_tp(fluid, T, P, z, check="full")
    assert (found.phases > 0).all()
    assert (
        (found.checks == SPLITS) == (found.tpd < -1e-8)
    ).sum() >= n - 3  # doubtful lanes are said in other words
    done = np.isin(found.checks, (TESTED, TWO_LIQUIDS, THREE_PHASES))
    assert done.sum() >= n - 3 and {2, 3} <= set(found.phases[done])  # at most 5 % left open or doubtful
    spread, balance = proofs(fluid, found)
    assert (spread[done & (found.phases > 1)] <= 1e-9).all() and (balance[done] <= 1e-13).all()
    for x in (found.x, found.y, found.x_W):
        some = np.flatnonzero(done & np.isfinite(x).all(axis=1))
        tested = stability(fluid, T[some], P[some], x[some] / x[some].sum(axis=1, keepdims=True))
        assert (np.nan_to_num(tested.tpd) > -1e-8).all()


def test_lane_of_a_batch_equals_the_single_run(wet):
    P = np.geomspace(2e4, 2e6, 12)
    batch = flash_tp(wet, 300.0, P, [0.3, 0.4, 0.3], check="full")
    assert set(batch.phases) == {2, 3}
    for i in range(12):
        alone = flash_tp(wet, 300.0, P[i], [0.3, 0.4, 0.3], check="full")
        for name in ("beta", "beta_W", "x", "y", "x_W"):
            # the same steps but for the order of sums; a residual of 1e-10 moves a share by 1e-9
            assert getattr(batch, name)[i] == pytest.approx(
                getattr(alone, name)[0], rel=1e-8, abs=1e-10, nan_ok=True
            )


def test_a_third_phase_that_is_not_found_leaves_the_two_and_says_so(wet, monkeypatch):
    import screener.equilibrium.three_phase as module

    honest = module.solve
    monkeypatch.setattr(module, "solve", lambda *a, **k: honest(*a, **{**k, "plain": 1, "newton": 0}))
    found = flash_tp(wet, 300.0, 3e5, [0.3, 0.4, 0.3], check="full")
    assert found.status[0] == Status.LIQUID_SPLITS and found.checks[0] == SPLITS
    assert found.phases[0] == 2 and found.tpd[0] < -1e-8 and np.isfinite(found.beta[0])
