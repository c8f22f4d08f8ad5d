"""TP flash: reference answers, invented fuels, the proofs that come with every answer, honest failure."""

import importlib
import json
from dataclasses import replace
from pathlib import Path

import numpy as np
import pytest

from screener.equilibrium import Fluid, bubble_pressure, flash_tp
from screener.equilibrium import fixed_point as engine
from screener.equilibrium.second_liquid import DOUBTFUL, NOT_TESTED, TESTED, THREE_PHASES, TWO_LIQUIDS
from screener.ground.errors import InputError, NotConverged, ShapeError
from screener.ground.status import Status

DATA = Path(__file__).parent / "data"
CASES = json.loads((DATA / "flash_reference.json").read_text(encoding="utf-8"))["cases"]
FUELS = json.loads((DATA / "fuel_bubble_points.json").read_text(encoding="utf-8"))["fuels"]


def fluid_of(case, eos="PR"):
    c = len(case["z"])
    return Fluid.from_constants(
        case["Tc"], case["Pc"], case["omega"], np.full(c, 0.1), case["kij"], case.get("eos", eos)
    )


@pytest.fixture(scope="module")
def gasoline():
    return fluid_of(FUELS[0]), np.array(FUELS[0]["z"])


@pytest.fixture(scope="module")
def wet():
    """Propane, hexane and water, k_ij 0.5 assumed: two liquids below some 350 K."""
    kij = np.array([[0.0, 0.0, 0.5], [0.0, 0.0, 0.5], [0.5, 0.5, 0.0]])
    return Fluid.from_constants(
        [369.8, 507.6, 647.1], [4.25e6, 3.025e6, 22.064e6], [0.152, 0.30, 0.344], [0.044, 0.086, 0.018], kij
    )


@pytest.mark.parametrize("case", CASES, ids=[case["name"] for case in CASES])
def test_reference_answers(case):
    found = flash_tp(fluid_of(case), case["T"], case["P"], case["z"], check="full")
    if case["phases"] == 3:  # the reference knows two of the three
        assert found.status[0] == Status.LIQUID_SPLITS and found.checks[0] == THREE_PHASES
        return
    assert found.ok[0] and found.checks[0] == TESTED and found.phases[0] == case["phases"]
    if case["phases"] == 1:
        return
    # a residual of 1e-10 in ln K moves beta by 1e-10 times the stiffness of the tie line, 10 near critical points
    assert found.beta[0] == pytest.approx(case["beta"], abs=1e-9)
    assert found.x[0] == pytest.approx(np.array(case["x"]), rel=1e-8, abs=1e-12)
    assert found.y[0] == pytest.approx(np.array(case["y"]), rel=1e-8, abs=1e-12)


@pytest.mark.parametrize("fuel", FUELS, ids=[fuel["name"] for fuel in FUELS])
def test_invented_fuels(fuel):
    """Vapour fractions of a many-start solver; with water the two phases it reports may be two liquids."""
    fluid = fluid_of(fuel)
    for row in fuel["rows"]:
        for flash in row["flashes"]:
            found = flash_tp(fluid, row["T"], flash["P"], fuel["z"], check="full")
            assert found.phases[0] == flash["phases"]
            if found.status[0] == Status.LIQUID_SPLITS:
                assert found.beta[0] == 0.0 and found.checks[0] == TWO_LIQUIDS
                assert max(found.beta_W[0], 1.0 - found.beta_W[0]) == pytest.approx(flash["beta"], abs=1e-9)
            else:
                assert found.ok[0]
                assert found.beta[0] == pytest.approx(flash["beta"], abs=1e-9)  # as above


def test_every_answer_carries_its_proof(gasoline):
    fluid, z = gasoline
    found = flash_tp(fluid, [290.0, 330.0, 350.0], 1e5, z)
    assert found.ok.all() and found.phases.tolist() == [1, 2, 2]
    assert (found.residual <= 1e-9).all() and (found.balance <= 1e-15).all()
    assert (found.checks == NOT_TESTED).all() and np.isnan(found.beta_W).all() and np.isnan(found.x_W).all()
    # the residual is what it says: |ln f_V - ln f_L|, from the model and nothing else
    two = slice(1, 3)
    ln_f_L = np.log(found.x[two]) + fluid.ln_phi(found.T[two], found.P[two], found.x[two], "L")
    ln_f_V = np.log(found.y[two]) + fluid.ln_phi(found.T[two], found.P[two], found.y[two], "V")
    assert np.abs(ln_f_V - ln_f_L).max(axis=1) == pytest.approx(found.residual[two], abs=1e-12)
    assert found.K[two] == pytest.approx(found.y[two] / found.x[two], rel=1e-12)


def test_single_phase_has_one_row_and_the_name_of_its_density(gasoline):
    fluid, z = gasoline
    found = flash_tp(fluid, [280.0, 500.0], 1e5, z)
    assert found.phases.tolist() == [1, 1] and found.beta.tolist() == [0.0, 1.0]
    assert found.x[0] == pytest.approx(z) and np.isnan(found.y[0]).all()
    assert found.y[1] == pytest.approx(z) and np.isnan(found.x[1]).all()
    assert (found.tpd > 0.0).all()  # the other phase was tried and lies above


def test_gas_above_its_critical_point_is_vapour():
    """Ethane and propane, 337.2 K, 740,825 Pa: a gas (Z = 0.945) that one library calls liquid."""
    fluid = Fluid.from_constants([305.3, 369.8], [4.872e6, 4.248e6], [0.0995, 0.1523], [0.030, 0.044])
    found = flash_tp(fluid, 337.2, 740825.0, [0.715, 0.285])
    assert found.ok[0] and found.beta[0] == 1.0
    assert fluid.Z(337.2, 740825.0, found.y, "V")[0] == pytest.approx(0.945, abs=5e-4)  # three digits given


def test_just_below_and_above_the_bubble_point(gasoline):
    fluid, z = gasoline
    P = bubble_pressure(fluid, 310.0, z).P
    found = flash_tp(fluid, 310.0, P[0] * np.array([1.0 - 1e-6, 1.0 + 1e-6]), z)
    assert found.ok.all() and found.phases.tolist() == [2, 1]
    assert 0.0 < found.beta[0] < 1e-5


def test_two_liquids_are_not_called_vapour_and_liquid(wet):
    found = flash_tp(wet, 300.0, 2e6, [0.05, 0.6, 0.35], check="full")
    assert found.status[0] == Status.LIQUID_SPLITS and found.checks[0] == TWO_LIQUIDS
    assert found.beta[0] == 0.0 and np.isnan(found.y).all()
    assert found.x_W[0, 2] > 0.999 and found.x[0, 2] < 0.01  # free water under hydrocarbon
    W = found.beta_W[0]
    assert (1.0 - W) * found.x[0] + W * found.x_W[0] == pytest.approx(found.z[0], abs=1e-14)
    ln_f = np.log(found.x) + wet.ln_phi(300.0, 2e6, found.x, "L")
    assert ln_f == pytest.approx(np.log(found.x_W) + wet.ln_phi(300.0, 2e6, found.x_W, "L"), abs=1e-9)


def test_without_the_full_check_the_lane_says_what_was_not_tested():
    """A trace of water in a cold gasoline: one liquid, unless the second one is looked for."""
    fuel = FUELS[-1]
    plain = flash_tp(fluid_of(fuel), 253.15, 101325.0, fuel["z"])
    full = flash_tp(fluid_of(fuel), 253.15, 101325.0, fuel["z"], check="full")
    assert plain.ok[0] and plain.phases[0] == 1 and plain.checks[0] == NOT_TESTED
    assert full.status[0] == Status.LIQUID_SPLITS and full.checks[0] == TWO_LIQUIDS


def test_dry_ethanol_and_paraffin_keep_their_answer():
    """The split the group model predicts is reported in words; with a little water it counts."""
    fluid = Fluid.of(["isooctane", "ethanol", "water"])
    T, P, z = 280.0, 2e5, np.array([[0.50, 0.50, 0.0], [0.495, 0.495, 0.01], [0.40, 0.40, 0.20]])
    plain, full = flash_tp(fluid, T, P, z), flash_tp(fluid, T, P, z, check="full")
    assert plain.ok[:2].all() and full.ok[:2].all() and full.beta[:2].tolist() == plain.beta[:2].tolist()
    assert (full.tpd[:2] < 0.0).all() and (full.checks[:2] == DOUBTFUL).all()
    assert full.status[2] == Status.LIQUID_SPLITS and full.checks[2] == TWO_LIQUIDS


def test_zero_shares_change_nothing(gasoline):
    fluid, z = gasoline
    more = replace(
        fluid, names=(*fluid.names, "x"), MW=np.append(fluid.MW, 0.1), Tc=np.append(fluid.Tc, 900.0),
        Pc=np.append(fluid.Pc, 1e6), omega=np.append(fluid.omega, 1.2), shift_0=np.append(fluid.shift_0, 0.0),
        shift_1=np.append(fluid.shift_1, 0.0), v_15=np.append(fluid.v_15, np.nan),
        alpha=replace(fluid.alpha, Tc=np.append(fluid.Tc, 900.0), m=np.append(fluid.alpha.m, 1.5)),
        mixing=replace(fluid.mixing, kij=np.pad(fluid.mixing.kij, ((0, 1), (0, 1)))),
    )  # fmt: skip
    one, two = flash_tp(fluid, 330.0, 1e5, z), flash_tp(more, 330.0, 1e5, np.append(z, 0.0))
    assert two.ok[0] and two.beta[0] == pytest.approx(one.beta[0], rel=1e-12)
    assert two.x[0, -1] == two.y[0, -1] == 0.0 and np.isnan(two.K[0, -1])


def test_traces_keep_their_relative_accuracy(gasoline):
    """Shares of 1e-12: a trace follows Henry's law, K independent of its share."""
    fluid, z = gasoline
    trace = z.copy()
    trace[0], trace[3] = 1e-12, 1e-12
    trace /= trace.sum()
    one, two = flash_tp(fluid, 340.0, 1e5, trace), flash_tp(fluid, 340.0, 1e5, _scaled(trace, 0, 1e-3))
    assert one.ok[0] and two.ok[0]
    assert two.K[0] == pytest.approx(one.K[0], rel=1e-9)
    balance = (1.0 - one.beta) * one.x[0] + one.beta * one.y[0]
    assert balance == pytest.approx(trace, rel=1e-12)


def _scaled(z, i, factor):
    z = z.copy()
    z[i] *= factor
    return z / z.sum()


def test_lane_of_a_batch_equals_the_single_run_and_bad_lanes_stay_bad(gasoline):
    fluid, z = gasoline
    generator = np.random.default_rng(40)
    Z = generator.dirichlet(50.0 * z, 40)
    T, P = generator.uniform(260.0, 420.0, 40), generator.uniform(2e4, 5e5, 40)
    T[3], P[7], Z[11, 0] = np.nan, -1.0, 0.5
    batch = flash_tp(fluid, T, P, Z)
    bad = [3, 7, 11]
    assert (batch.status[bad] == Status.BAD_INPUT).all() and np.isnan(batch.beta[bad]).all()
    good = np.setdiff1d(np.arange(40), bad)
    assert batch.ok[good].all() and set(batch.phases[good]) == {1, 2}
    for i in good:
        alone = flash_tp(fluid, T[i], P[i], Z[i])
        for name in ("beta", "x", "y", "residual"):  # the same steps, but for the order of sums
            got, expected = getattr(batch, name)[i], getattr(alone, name)[0]
            assert got == pytest.approx(expected, rel=1e-9, abs=1e-12, nan_ok=True)


def test_iteration_cap_is_said(gasoline, monkeypatch):
    fluid, z = gasoline
    for name in ("flash", "stability"):
        module = importlib.import_module(f"screener.equilibrium.{name}")
        monkeypatch.setattr(module, "solve", lambda *a, **k: engine.solve(*a, **{**k, "plain": 1, "newton": 0}))
    found = flash_tp(fluid, 330.0, 1e5, z)
    assert found.status[0] == Status.OUT_OF_STEPS and np.isnan(found.beta[0]) and found.phases[0] == 0
    with pytest.raises(NotConverged, match=r"1 of the lanes have no answer \(lane 0: did not converge"):
        found.require()


def test_missing_parameters_are_said(gasoline):
    fluid, z = gasoline
    lacking = replace(fluid, missing=((fluid.names[0], fluid.names[1]),))
    found = flash_tp(lacking, 330.0, 1e5, [z, _scaled(z, 0, 0.0)])
    assert found.status.tolist() == [Status.NO_PARAMETERS, Status.CONVERGED]


def test_arguments_that_cannot_be_meant(gasoline):
    fluid, z = gasoline
    with pytest.raises(ShapeError, match="composition: got shape"):
        flash_tp(fluid, 330.0, 1e5, z[:-1])
    with pytest.raises(InputError, match="'thorough' is not a check; vapour-liquid or full"):
        flash_tp(fluid, 330.0, 1e5, z, check="thorough")
    assert flash_tp(fluid, 330.0, 1e5, z).require().beta.shape == (1,)
