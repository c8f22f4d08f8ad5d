"""Tangent-plane test: depths against a many-start solver, honesty about what did not settle, lanes apart."""

import importlib
import json
from dataclasses import replace
from pathlib import Path

import numpy as np
import pytest

from screener.equilibrium import Fluid, stability
from screener.equilibrium import fixed_point as engine
from screener.equilibrium.results import TPD_ZERO
from screener.ground.errors import ShapeError
from screener.ground.status import Status

FILE = Path(__file__).parent / "data" / "flash_reference.json"
CASES = json.loads(FILE.read_text(encoding="utf-8"))["cases"]


def fluid_of(case):
    return Fluid.from_constants(case["Tc"], case["Pc"], case["omega"], np.ones(len(case["z"])), case["kij"], case["eos"])


@pytest.fixture(scope="module")
def water_and_hexane():
    """Two species that hardly mix: k_ij 0.5, assumed."""
    return Fluid.from_constants(
        [507.6, 647.1], [3.025e6, 22.064e6], [0.30, 0.344], [0.086, 0.018], [[0.0, 0.5], [0.5, 0.0]]
    )


@pytest.mark.parametrize("case", CASES, ids=[case["name"] for case in CASES])
def test_depth_of_the_deepest_trial(case):
    found = stability(fluid_of(case), case["T"], case["P"], case["z"])
    assert found.ok[0]
    # the reference holds 1 - sum W; tpd = -ln sum W at the same point
    depth = -np.log(1.0 - case["tm_feed"])
    if case["tm_feed"] < -1e-10:
        # both are stationary values: an error of 1e-10 in ln W is second order. The reference was carried to
        # differences that matter only in its last digits.
        assert found.tpd[0] == pytest.approx(depth, rel=1e-7)
        assert found.unstable[0] and not found.stable[0]
    else:
        assert found.stable[0] and not found.unstable[0]


def test_single_phase_has_nothing_below_it(water_and_hexane):
    found = stability(water_and_hexane, [300.0, 450.0], [1e5, 1e5], [[1.0, 0.0], [0.5, 0.5]])
    assert found.stable.all() and (found.tpd >= -TPD_ZERO).all()
    assert found.reference.tolist() == ["L", "V"]


def test_second_liquid_needs_the_pure_starts_and_is_found(water_and_hexane):
    found = stability(water_and_hexane, 300.0, 1e5, [0.7, 0.3])
    assert found.unstable[0] and found.kind[0] == "L" and found.w[0, 1] > 0.99  # free water


def test_stationary_point_satisfies_its_equation(water_and_hexane):
    z = np.array([[0.7, 0.3]])
    found = stability(water_and_hexane, 300.0, 1e5, z)
    state, P = water_and_hexane.at(300.0), np.array([1e5])
    left = np.log(found.w) + state.ln_phi(P, found.w, found.kind[0])
    right = np.log(z) + state.ln_phi(P, z, found.reference[0])
    # every species lies the same distance below the plane; residual of the iteration 1e-10
    assert left - right == pytest.approx(np.full((1, 2), found.tpd[0]), abs=3e-10)


def test_what_did_not_settle_is_not_stable(water_and_hexane, monkeypatch):
    """Cut short, the test may prove a lane unstable but never stable."""
    module = importlib.import_module("screener.equilibrium.stability")
    monkeypatch.setattr(module, "solve", lambda *a, **k: engine.solve(*a, **{**k, "plain": 1, "newton": 0}))
    found = stability(water_and_hexane, 300.0, 1e5, [[0.999999, 1e-6], [0.7, 0.3]])
    assert (found.status == Status.OUT_OF_STEPS).all()
    assert not found.stable.any()


def test_absent_species_change_nothing(water_and_hexane):
    three = Fluid.from_constants(
        [507.6, 190.6, 647.1], [3.025e6, 4.6e6, 22.064e6], [0.30, 0.01, 0.344], [0.086, 0.016, 0.018],
        [[0.0, 0.0, 0.5], [0.0, 0.0, 0.1], [0.5, 0.1, 0.0]],
    )  # fmt: skip
    two = stability(water_and_hexane, 300.0, 1e5, [0.7, 0.3])
    among = stability(three, 300.0, 1e5, [0.7, 0.0, 0.3])
    assert among.tpd[0] == pytest.approx(two.tpd[0], rel=1e-12)
    assert among.w[0, 1] == 0.0


def test_lanes_do_not_touch_each_other(water_and_hexane):
    T = np.array([300.0, np.nan, 350.0, 280.0, 450.0])
    P = np.array([1e5, 1e5, -1.0, 2e5, 1e5])
    z = np.array([[0.7, 0.3], [0.7, 0.3], [0.7, 0.3], [0.9, 0.2], [0.5, 0.5]])
    found = stability(water_and_hexane, T, P, z)
    assert found.status.tolist() == [0, Status.BAD_INPUT, Status.BAD_INPUT, Status.BAD_INPUT, 0]
    assert np.isnan(found.tpd[1:4]).all()
    for i in (0, 4):
        alone = stability(water_and_hexane, T[i], P[i], z[i])
        assert found.tpd[i] == pytest.approx(alone.tpd[0], rel=1e-9, abs=1e-12)


def test_missing_parameters_are_said(water_and_hexane):
    lacking = replace(water_and_hexane, missing=(("1", "2"),))
    found = stability(lacking, 300.0, 1e5, [[0.5, 0.5], [1.0, 0.0]])
    assert found.status.tolist() == [Status.NO_PARAMETERS, Status.CONVERGED]


def test_wrong_shape(water_and_hexane):
    with pytest.raises(ShapeError, match=r"composition: got shape \(3,\), expected \(2,\) or \(n, 2\)"):
        stability(water_and_hexane, 300.0, 1e5, [0.2, 0.3, 0.5])
