"""Bubble and dew points: independent answers, hard feeds, every status, lanes apart."""

import importlib
import json
from dataclasses import replace
from pathlib import Path

import numpy as np
import pytest

from screener.equilibrium import (
    Fluid,
    bubble_pressure,
    bubble_temperature,
    dew_pressure,
    dew_temperature,
    stability,
)
from screener.equilibrium import fixed_point as engine
from screener.equilibrium.crossing import Crossings
from screener.equilibrium.second_liquid import DOUBTFUL, NOT_TESTED, SPLITS, TESTED
from screener.ground.errors import InputError, NotConverged, ShapeError
from screener.ground.status import Status

FILE = Path(__file__).parent / "data" / "fuel_bubble_points.json"
FUELS = json.loads(FILE.read_text(encoding="utf-8"))["fuels"]
FOUR = (bubble_pressure, dew_pressure, bubble_temperature, dew_temperature)


def fluid_of(fuel):
    return Fluid.from_constants(fuel["Tc"], fuel["Pc"], fuel["omega"], np.full(len(fuel["z"]), 0.1), fuel["kij"])


@pytest.fixture(scope="module")
def gasoline():
    return fluid_of(FUELS[0]), np.array(FUELS[0]["z"])


@pytest.fixture(scope="module")
def odd():
    """Methane, hexane, water (k_ij 0.5, assumed) and nitrogen, whose parameter with water is missing."""
    kij = np.zeros((4, 4))
    kij[2, :2] = kij[:2, 2] = 0.5
    fluid = Fluid.from_constants(
        [190.6, 507.6, 647.1, 126.2], [4.6e6, 3.025e6, 22.064e6, 3.4e6], [0.011, 0.30, 0.344, 0.038],
        [0.016, 0.086, 0.018, 0.028], kij,
    )  # fmt: skip
    return replace(fluid, missing=(("3", "4"),))


@pytest.mark.parametrize("fuel", FUELS, ids=[fuel["name"] for fuel in FUELS])
@pytest.mark.parametrize("function, key", [(bubble_pressure, "bubble_P"), (dew_pressure, "dew_P")])
def test_invented_fuels(fuel, function, key):
    rows = [row for row in fuel["rows"] if row[key] is not None]
    found = function(fluid_of(fuel), [row["T"] for row in rows], fuel["z"])
    assert found.ok.all() and (found.residual <= 1e-9).all()
    # the reference stopped its bisection at 1e-9 of the pressure
    assert found.P == pytest.approx(np.array([row[key] for row in rows]), rel=1e-8)


@pytest.mark.parametrize("fuel", FUELS, ids=[fuel["name"] for fuel in FUELS])
@pytest.mark.parametrize("pressure, temperature", [(bubble_pressure, bubble_temperature), (dew_pressure, dew_temperature)])
def test_temperature_and_pressure_are_inverse(fuel, pressure, temperature):
    fluid, T = fluid_of(fuel), np.array([row["T"] for row in fuel["rows"]])
    there = pressure(fluid, T, fuel["z"])
    back = temperature(fluid, there.P, fuel["z"])
    assert there.ok.all() and back.ok.all()
    # dissolved nitrogen makes the bubble pressure flat in T: ln P moves by 1e-2 per kelvin or less, so that a
    # residual of 1e-10 leaves 1e-8 K
    assert back.T == pytest.approx(T, abs=2e-8)


def test_pure_component_meets_its_vapour_pressure():
    """At saturation K = 1 and yet the phases differ: not to be taken for a trivial answer."""
    fluid = Fluid.from_constants([425.12], [3.796e6], [0.2002], [0.0581])
    T = np.array([200.0, 273.15, 300.0, 400.0])
    bubble, dew = bubble_pressure(fluid, T, [1.0]), dew_pressure(fluid, T, [1.0])
    assert bubble.ok.all() and dew.ok.all()
    assert bubble.P == pytest.approx(dew.P, rel=1e-9)
    assert bubble.K == pytest.approx(np.ones((4, 1)), abs=1e-9)
    ln_phi = [fluid.ln_phi(T, bubble.P, [1.0], kind) for kind in "LV"]
    assert ln_phi[0] == pytest.approx(ln_phi[1], abs=1e-9)  # equal Gibbs energies


def test_acentric_factor_is_met():
    """At Tr = 0.7 the 1976 equation returns log10 Pr = -1 - omega as well as its m(omega) was fitted to it."""
    omega = np.array([0.1, 0.2, 0.3, 0.45])
    for w in omega:
        fluid = Fluid.from_constants([500.0], [3e6], [w], [0.1])
        ln_P = np.log10(bubble_pressure(fluid, 350.0, [1.0]).P[0] / 3e6)
        assert ln_P == pytest.approx(-1.0 - w, abs=0.01)


def test_lights_above_their_critical_temperature_and_traces(odd):
    """Dissolved gas from 1e-12 up, and heavy ends: found blind, and in Henry's proportion while dilute."""
    share = np.array([1e-12, 1e-10, 1e-8, 1e-6, 1e-4, 1e-2, 0.1])
    x = np.zeros((share.size, 4))
    x[:, 3], x[:, 1] = share, 1.0 - share
    found = bubble_pressure(odd, 290.0, x)
    assert found.ok.all() and (np.diff(found.P) > 0.0).all()
    henry = found.y[:3, 3] * found.P[:3] / share[:3]
    assert henry == pytest.approx(henry[0], rel=1e-6)  # shares to 1e-8 move gamma by no more than 1e-7


def test_heavy_ends_from_kerosene_to_wax():
    """Butane with hexadecane and eicosane: K from 1e2 to 1e-9 in one mixture."""
    fluid = Fluid.from_constants(
        [425.1, 617.7, 723.0, 768.0], [3.796e6, 2.11e6, 1.40e6, 1.07e6], [0.2, 0.492, 0.717, 0.907], [0.1] * 4
    )
    T = np.linspace(230.0, 400.0, 18)
    bubble, dew = bubble_pressure(fluid, T, [0.05, 0.35, 0.35, 0.25]), dew_pressure(fluid, T, [0.05, 0.35, 0.35, 0.25])
    assert bubble.ok.all() and dew.ok.all()
    assert (dew.P < 1e-2 * bubble.P).all()
    assert (np.diff(bubble.P) > 0.0).all() and (np.diff(dew.P) > 0.0).all()


def test_feed_is_on_the_edge_of_stability(gasoline):
    """At its bubble point a liquid has a trial at distance zero, just above it none."""
    fluid, z = gasoline
    P = bubble_pressure(fluid, 300.0, z).P[0]
    found = stability(fluid, 300.0, P * np.array([1.0 - 1e-6, 1.0 + 1e-6]), z)
    assert found.unstable.tolist() == [True, False] and found.stable.tolist() == [False, True]
    assert found.tpd[0] == pytest.approx(-1e-6, rel=0.05)  # d tpd / d ln P = Z_V - Z_L, 0.97 here


def test_few_steps_at_storage_conditions(gasoline):
    fluid, z = gasoline
    found = bubble_pressure(fluid, np.linspace(250.0, 330.0, 100), z)
    assert found.iterations.max() <= 7  # measured 4 to 5; a start from Wilson's K alone needs 6 to 8


def test_ethanol_blend_from_the_tables():
    """The one model for every blend, a non-ideal liquid: blind start, both branches, both directions."""
    fluid = Fluid.of(["n-butane", "isopentane", "n-hexane", "isooctane", "toluene", "ethanol"])
    z, T = [0.06, 0.16, 0.16, 0.22, 0.22, 0.18], np.linspace(250.0, 345.0, 20)
    for pressure, temperature in ((bubble_pressure, bubble_temperature), (dew_pressure, dew_temperature)):
        there = pressure(fluid, T, z, check="full")
        back = temperature(fluid, there.P, z)
        assert there.ok.all() and back.ok.all() and (there.residual <= 1e-9).all()
        assert set(there.checks) == {TESTED}
        assert back.T == pytest.approx(T, abs=1e-7)  # d ln P / dT is 0.03 per kelvin and more


def test_dew_points_across_a_gap_of_the_liquid():
    """Methanol and hexane split; every vapour of them still has a dew point, and no drop forms before it."""
    fluid = Fluid.of(["methanol", "n-hexane"])
    y = np.linspace(0.02, 0.98, 49)
    for found in (
        dew_pressure(fluid, 300.0, np.stack([y, 1.0 - y], axis=1), check="full"),
        dew_temperature(fluid, 101325.0, np.stack([y, 1.0 - y], axis=1), check="full"),
    ):
        assert found.ok.all() and (found.tpd > -1e-8).all()


def test_full_check_names_the_second_liquid(odd):
    x = [[0.0, 0.99999, 1e-5, 0.0], [0.0, 0.9, 0.1, 0.0], [0.0, 0.2, 0.8, 0.0], [0.0, 0.001, 0.999, 0.0]]
    plain, full = bubble_pressure(odd, 300.0, x), bubble_pressure(odd, 300.0, x, check="full")
    assert plain.checks.tolist()[:2] == [NOT_TESTED, NOT_TESTED] and plain.ok[:2].all()
    assert full.checks.tolist() == [TESTED, SPLITS, SPLITS, SPLITS]
    assert full.status.tolist() == [Status.CONVERGED] + 3 * [Status.LIQUID_SPLITS]
    assert full.P[1] == plain.P[1]  # the bubble point of one liquid stands beside the warning
    assert np.isnan(full.P[2:]).all()  # none below 100 MPa


def test_bubble_point_of_a_dry_ethanol_blend_is_not_overridden():
    fluid = Fluid.of(["isooctane", "ethanol"])
    plain, full = bubble_pressure(fluid, 280.0, [0.5, 0.5]), bubble_pressure(fluid, 280.0, [0.5, 0.5], check="full")
    assert full.ok[0] and full.P[0] == plain.P[0]
    assert full.tpd[0] < 0.0 and full.checks[0] == DOUBTFUL


def test_every_status_in_one_batch(odd, monkeypatch):
    module = importlib.import_module("screener.equilibrium.points")

    def unknown(fluid, name, value, feed, bubble):
        """No envelope: next to critical points nothing else tells what is there."""
        n, c = feed.shape
        return Crossings(np.zeros(n, dtype=bool), np.full((n, c + 4), np.nan), np.full(n, int(Status.OUT_OF_STEPS)))

    near_critical = np.linspace(252.0, 325.0, 64)  # 90 % methane in hexane; critical at 254 K
    T = np.concatenate([near_critical, [300.0, 52.0, 300.0, np.nan, 300.0]])
    x = np.tile([0.9, 0.1, 0.0, 0.0], (T.size, 1))
    x[64:] = [[0, 0.7, 0.3, 0], [0, 1, 0, 0], [0, 0.5, 0.3, 0.2], [0.5, 0.5, 0, 0], [0.3, 0.7, 0, 0]]
    found = bubble_pressure(odd, T, x, check="full")
    assert found.status[64:].tolist() == [
        Status.LIQUID_SPLITS, Status.OUT_OF_RANGE, Status.NO_PARAMETERS, Status.BAD_INPUT, Status.CONVERGED
    ]  # fmt: skip
    with monkeypatch.context() as patch:
        patch.setattr(module, "crossings", unknown)
        blind = bubble_pressure(odd, T, x, check="full")
    for one in (found, blind):
        answered = one.ok | (one.status == Status.LIQUID_SPLITS)
        assert np.isnan(one.P[~answered]).all() and np.isnan(one.y[~answered]).all()
    assert set(found.status) | set(blind.status) == set(Status)
    # without the envelope nothing is claimed that it denies
    assert not (blind.ok & ~found.ok).any() and not (blind.status == Status.NO_SOLUTION).any()
    with pytest.raises(NotConverged, match="of the lanes have no answer"):
        found.require()


def test_no_bubble_point_above_the_critical_temperature(odd):
    assert bubble_pressure(odd, 600.0, [0.5, 0.5, 0.0, 0.0]).status[0] == Status.NO_SOLUTION
    assert dew_temperature(odd, 5e7, [0.5, 0.5, 0.0, 0.0]).status[0] == Status.NO_SOLUTION


@pytest.mark.parametrize("function", FOUR)
def test_lane_of_a_batch_equals_the_single_run_and_bad_lanes_stay_bad(gasoline, function):
    fluid, z = gasoline
    generator = np.random.default_rng(50)
    Z = generator.dirichlet(40.0 * z, 25)
    given = generator.uniform(240.0, 350.0, 25) if "pressure" in function.__name__ else generator.uniform(1e4, 5e5, 25)
    given[3], given[9], Z[14, 2], Z[20] = np.nan, -5.0, -0.2, np.nan
    batch = function(fluid, given, Z)
    bad = [3, 9, 14, 20]
    assert (batch.status[bad] == Status.BAD_INPUT).all()
    good = np.setdiff1d(np.arange(25), bad)
    assert batch.ok[good].all() and (batch.residual[good] <= 1e-9).all()
    for i in good:
        alone = function(fluid, given[i], Z[i])
        for name in ("T", "P", "x", "y", "K"):  # the same steps, but for the order of sums
            assert getattr(batch, name)[i] == pytest.approx(getattr(alone, name)[0], rel=1e-9)


@pytest.mark.parametrize("function", FOUR)
def test_composition_may_change_along_one_temperature_and_the_other_way(gasoline, function):
    fluid, z = gasoline
    value = 300.0 if "pressure" in function.__name__ else 1e5
    assert function(fluid, value, np.tile(z, (4, 1))).ok.shape == (4,)
    assert function(fluid, np.full(4, value), z).x.shape == (4, z.size)
    single = function(fluid, value, z)
    assert single.ok.shape == (1,) and single.require() is single


@pytest.mark.parametrize("function", FOUR)
def test_iteration_cap_is_said(gasoline, function, monkeypatch):
    fluid, z = gasoline
    module = importlib.import_module("screener.equilibrium.points")
    monkeypatch.setattr(module, "solve", lambda *a, **k: engine.solve(*a, **{**k, "plain": 1, "newton": 0}))
    monkeypatch.setattr(module, "FINE", 0)  # narrowed often enough the ladder alone finds the point
    monkeypatch.setattr(module, "PROMISED", -1.0)  # nor does a point of the envelope count
    found = function(fluid, 300.0 if "pressure" in function.__name__ else 1e5, z)
    assert found.status[0] == Status.OUT_OF_STEPS
    assert np.isnan(found.T[0]) or np.isnan(found.P[0])


def test_zero_shares_change_nothing(odd):
    two = Fluid.from_constants([190.6, 507.6], [4.6e6, 3.025e6], [0.011, 0.30], [0.016, 0.086])
    for function in FOUR:
        value = 300.0 if "pressure" in function.__name__ else 1e6
        one, more = function(two, value, [0.1, 0.9]), function(odd, value, [0.1, 0.9, 0.0, 0.0])
        assert more.ok[0] and more.T[0] == pytest.approx(one.T[0], rel=1e-11)
        assert more.P[0] == pytest.approx(one.P[0], rel=1e-11)
        assert more.y[0, 2:].tolist() == [0.0, 0.0] and np.isnan(more.K[0, 2:]).all()


def test_ethanol_from_none_to_a_trace_moves_nothing():
    """One model for every blend: no jump where ethanol enters."""
    names = ["n-butane", "isopentane", "n-hexane", "toluene"]
    z, T = np.array([0.1, 0.3, 0.3, 0.3]), np.array([250.0, 290.0, 330.0])
    without = bubble_pressure(Fluid.of(names), T, z)
    for share in (0.0, 1e-9):
        with_it = bubble_pressure(Fluid.of([*names, "ethanol"]), T, np.append(z * (1.0 - share), share))
        # ln gamma at infinite dilution is some 3: a share of 1e-9 moves the pressure by some 1e-8
        assert with_it.P == pytest.approx(without.P, rel=1e-10 if share == 0.0 else 1e-7)


def test_arguments_that_cannot_be_meant(gasoline):
    fluid, z = gasoline
    with pytest.raises(ShapeError, match="composition: got shape"):
        bubble_pressure(fluid, 300.0, z[:-1])
    with pytest.raises(ShapeError, match=r"lanes: got lengths \[2, 3\], expected equal lengths, or 1"):
        bubble_pressure(fluid, [300.0, 310.0], np.tile(z, (3, 1)))
    with pytest.raises(InputError, match="'thorough' is not a check; vapour-liquid or full"):
        dew_pressure(fluid, 300.0, z, check="thorough")
