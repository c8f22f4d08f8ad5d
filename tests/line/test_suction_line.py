"""Suction line: hand sums, limits, reasons, lanes; viscosity band against pure liquids."""

import numpy as np
import pytest

from screener.ground.errors import UnknownName
from screener.line import (
    PLACES,
    REASON_WORDS,
    Reason,
    allowed_npsh_required,
    asked_npsh,
    friction_factor,
    kinematic_viscosity_band,
    npsh_available,
    npsh_margins,
    suction_profile,
)

LINE = {
    "surface_pressure": 97000.0,
    "liquid_level": 1.2,
    "rate": 0.125,
    "density": 720.0,
    "kinematic_viscosity": 6e-7,
    "line_length": 180.0,
    "line_bore": 0.304,
    "pump_height": 0.4,
    "nozzle_height": 0.3,
    "highest_point": 0.9,
    "fittings": 4.0,
}


def line(**changes):
    return suction_profile(**{**LINE, **changes})


def test_against_a_sum_by_hand():
    got = line(entrance_loss=0.5, roughness=2e-4)
    v = 0.125 / (np.pi / 4 * 0.304**2)
    f = float(friction_factor(v * 0.304 / 6e-7, 2e-4 / 0.304))
    head = v**2 / (2 * 9.80665)
    loss = (f * 180.0 / 0.304 + 4.5) * head
    assert got.velocity == pytest.approx([v]) and got.friction_head == pytest.approx([loss])
    expected = 97000.0 + 720.0 * 9.80665 * np.array([0.9 - 1.5 * head, 0.3 - head - loss, 0.8 - head - loss])
    assert got.pressure[0] == pytest.approx(expected, rel=1e-12)
    assert PLACES[int(got.lowest_place[0])] == "highest point"
    assert got.lowest_pressure == pytest.approx(expected[1:2])


def test_npsh_and_pressure_tell_the_same_story():
    got = line()
    available = npsh_available(97000.0, 60000.0, 720.0, got.static_head, got.friction_head)
    inlet = (got.pressure[:, 2] - 60000.0) / (720.0 * 9.80665) + got.velocity_head
    assert available == pytest.approx(inlet, rel=1e-12)


def test_a_line_at_rest_shows_heights_only():
    got = line(rate=0.0)
    assert got.friction_head == 0.0 and got.ok
    assert got.pressure[0] == pytest.approx(97000.0 + 720.0 * 9.80665 * np.array([0.9, 0.3, 0.8]))


def test_no_high_point_is_left_out_and_a_line_going_down_is_lowest_at_the_nozzle():
    got = line(highest_point=np.nan, pump_height=-6.0)
    assert np.isnan(got.pressure[0, 1]) and got.ok
    assert PLACES[int(got.lowest_place[0])] == "nozzle"


def test_reasons_lane_by_lane():
    got = line(
        liquid_level=np.array([1.2, 0.2, np.nan, 1.2, 1.2, 1.2]),
        line_bore=np.array([0.304, 0.304, 0.304, 0.0, 0.304, 0.002]),
        rate=np.array([0.1, 0.1, 0.1, 0.1, -0.1, 0.1]),
    )
    assert list(got.reason) == [Reason.PROFILE, Reason.NOZZLE_UNCOVERED] + [Reason.BAD_INPUT] * 4
    assert np.isfinite(got.lowest_pressure[0]) and np.isnan(got.lowest_pressure[1:]).all()
    assert (got.lowest_place[1:] == -1).all() and set(REASON_WORDS) == set(Reason)


def test_more_flow_length_bends_and_viscosity_never_raise_the_pressure():
    for name, values in (
        ("rate", np.linspace(0.0, 0.4, 60)),
        ("line_length", np.linspace(0.0, 900.0, 20)),
        ("fittings", np.linspace(0.0, 30.0, 20)),
        # Turbulent throughout: between turbulent and laminar flow friction falls with viscosity.
        ("kinematic_viscosity", np.geomspace(2e-7, 9e-5, 100)),
        ("roughness", np.linspace(0.0, 1e-3, 20)),
    ):
        assert (np.diff(line(**{name: values}).pressure[:, 2]) < 0.0).all(), name


def test_friction_factor_joins_its_two_limits():
    # Laminar 64/Re; turbulent within 2 % of Colebrook, solved here by fixed-point iteration.
    assert friction_factor(500.0, 0.0) == pytest.approx(64.0 / 500.0, rel=1e-3)
    reynolds, rough = np.array([1e5, 1e6, 1e7]), 5e-4
    inverse = np.full(3, 7.0)
    for _ in range(60):
        inverse = -2.0 * np.log10(rough / 3.7 + 2.51 / reynolds * inverse)
    assert friction_factor(reynolds, rough) == pytest.approx(1.0 / inverse**2, rel=0.02)
    assert np.isnan(friction_factor(np.array([0.0, -1.0, np.nan, 1e5]), np.array([0.0, 0.0, 0.0, 0.2]))).all()


def test_batch_equals_lane_by_lane():
    rng = np.random.default_rng(11)
    n = 25
    lanes = {
        "liquid_level": rng.uniform(0.5, 14.0, n),
        "rate": rng.uniform(0.0, 0.3, n),
        "line_bore": rng.uniform(0.15, 0.5, n),
        "highest_point": np.where(rng.random(n) < 0.5, np.nan, 1.5),
    }
    batch = line(**lanes)
    for i in range(n):
        one = line(**{name: value[i] for name, value in lanes.items()})
        np.testing.assert_allclose(one.pressure[0], batch.pressure[i], rtol=1e-14)
        assert one.lowest_place[0] == batch.lowest_place[i]


def test_margin_rule():
    # Below 10 m the metre rules, above it the tenth.
    assert asked_npsh(np.array([3.5, 10.0, 20.0])) == pytest.approx([4.5, 11.0, 22.0])
    required = np.linspace(0.0, 30.0, 13)
    for service in npsh_margins():
        assert allowed_npsh_required(asked_npsh(required, service), service) == pytest.approx(
            required, abs=1e-12
        )
        assert npsh_margins()[service].evidence == "quoted"
    assert np.isnan(asked_npsh(-1.0))
    with pytest.raises(UnknownName, match="pump service"):
        asked_npsh(3.0, "beer")


def test_viscosity_band_holds_pure_liquids():
    from CoolProp.CoolProp import PropsSI

    liquids = (
        "n-Pentane",
        "n-Hexane",
        "n-Heptane",
        "n-Octane",
        "n-Nonane",
        "n-Decane",
        "n-Dodecane",
        "Toluene",
        "Benzene",
        "CycloHexane",
        "Ethanol",
    )
    for name in liquids:
        density = PropsSI("D", "T", 288.15, "P", 2e5, name)
        low, _, high = kinematic_viscosity_band(density)
        for T in (288.15, 313.15):
            nu = PropsSI("V", "T", T, "P", 2e5, name) / PropsSI("D", "T", T, "P", 2e5, name)
            assert low <= nu <= high, (name, T, nu, low, high)


def test_viscosity_band_ends():
    low, best, high = kinematic_viscosity_band(np.array([590.0, 600.0, 745.0, 900.0, 901.0, np.nan]))
    assert np.isnan(best[[0, 4, 5]]).all() and np.isfinite(best[1:4]).all()
    assert (low[1:4] < best[1:4]).all() and (best[1:4] < high[1:4]).all()
