"""Flashes that solve for T or P, held against the flash at T and P and against each other."""

from __future__ import annotations

import numpy as np
import pytest

from screener.equilibrium import (
    Fluid,
    bubble_pressure,
    bubble_temperature,
    caloric,
    dew_pressure,
    dew_temperature,
    flash_ph,
    flash_ps,
    flash_tp,
    flash_tv,
    state_at_beta,
)
from screener.ground.errors import InputError, NotConverged, ShapeError
from screener.ground.status import Status

MIXTURES = {
    "gasoline with ethanol": (
        ["n-butane", "isopentane", "ethanol", "toluene", "n-octane"],
        [0.1, 0.2, 0.15, 0.25, 0.3],
    ),
    "pure": (["n-hexane"], [1.0]),
    "nearly pure": (["n-hexane", "isooctane"], [1.0 - 1e-7, 1e-7]),
    "close boiling": (["m-xylene", "p-xylene"], [0.4, 0.6]),
    "wide boiling": (["propane", "n-hexadecane"], [0.4, 0.6]),
    "dissolved air": (["nitrogen", "n-hexane", "n-decane"], [0.02, 0.5, 0.48]),
    "with a zero share": (["n-butane", "n-decane", "toluene"], [0.5, 0.5, 0.0]),
}
PROMISED = 1e-8


def states(name, n=30):
    """A fluid, and the flashes at n random T and P of one mixture."""
    names, z = MIXTURES[name]
    fluid, rng = Fluid.of(names), np.random.default_rng(20260711)
    T, P = rng.uniform(230.0, 450.0, n), 10.0 ** rng.uniform(3.7, 6.4, n)
    flash = flash_tp(fluid, T, P, z)
    H, S, v = np.zeros(n), np.zeros(n), np.zeros(n)
    for share, part, phase in ((1.0 - flash.beta, flash.x, "L"), (flash.beta, flash.y, "V")):
        some = np.flatnonzero(flash.ok & (share > 0.0))
        values = caloric(fluid, T[some], P[some], part[some], phase)
        H[some] += share[some] * values.H
        S[some] += share[some] * values.S
        v[some] += share[some] * values.v
    assert flash.ok.all()
    return fluid, flash, H, S, v


def holds(found, flash):
    """Every lane converged, within the promise, balanced, in equilibrium, and the T, P and beta wanted."""
    assert found.ok.all(), found.words
    assert found.miss.max() <= PROMISED
    assert found.residual.max() <= 1e-9 and found.balance.max() <= 1e-12
    # 1e-8 of RT over the smallest heat capacity is 1e-6 K; where the fraction is nearly vertical 1e-5 remain
    np.testing.assert_allclose(found.T, flash.T, rtol=0.0, atol=1e-5)
    np.testing.assert_allclose(found.P, flash.P, rtol=1e-6)
    np.testing.assert_allclose(found.beta, flash.beta, rtol=0.0, atol=1e-5)


@pytest.mark.parametrize("name", MIXTURES)
def test_enthalpy_entropy_and_volume_lead_back_to_the_state(name):
    fluid, flash, H, S, v = states(name)
    holds(flash_ph(fluid, flash.P, H, flash.z), flash)
    holds(flash_ps(fluid, flash.P, S, flash.z), flash)
    holds(flash_tv(fluid, flash.T, flash.z, density=1.0 / v), flash)
    holds(flash_tv(fluid, flash.T, flash.z, mass_density=fluid.molar_mass(flash.z) / v), flash)


@pytest.mark.parametrize("name", [name for name in MIXTURES if name != "dissolved air"])
def test_vapour_fraction_and_ratio_lead_back_to_the_state(name):
    fluid, flash, *_ = states(name)
    beta = np.linspace(0.0, 1.0, 11)
    z = flash.z[0]
    for given in ({"T": 330.0}, {"P": 101325.0}):
        found = state_at_beta(fluid, beta, z, **given).require()
        assert found.beta == pytest.approx(beta, abs=1e-9)
        assert found.miss.max() <= PROMISED and found.residual.max() <= 1e-9
        inside = slice(1, -1)
        again = flash_tp(fluid, found.T[inside], found.P[inside], z)
        spread = abs(np.log(found.P[0] / found.P[-1])) + abs(np.log(found.T[0] / found.T[-1]))
        if spread > 1e-2:  # narrower, and T and P do not tell the fraction
            assert again.beta == pytest.approx(beta[inside], abs=1e-6)
        v_V, v_L = found.v_V[inside], found.v_L[inside]
        ratio = beta[inside] * v_V / ((1.0 - beta[inside]) * v_L)
        if "T" in given:
            back = flash_tv(fluid, 330.0, z, ratio=ratio).require()
            assert back.beta == pytest.approx(beta[inside], abs=1e-7)
            assert back.P == pytest.approx(found.P[inside], rel=1e-7)


def test_ends_are_bubble_and_dew_points():
    fluid, z = Fluid.of(MIXTURES["gasoline with ethanol"][0]), MIXTURES["gasoline with ethanol"][1]
    at_P = state_at_beta(fluid, [0.0, 1.0], z, P=2e5).require()
    bubble, dew = bubble_temperature(fluid, 2e5, z), dew_temperature(fluid, 2e5, z)
    assert at_P.T == pytest.approx([bubble.T[0], dew.T[0]], rel=1e-9)
    assert at_P.y[0] == pytest.approx(bubble.y[0], rel=1e-7) and at_P.x[1] == pytest.approx(
        dew.x[0], rel=1e-7
    )
    at_T = state_at_beta(fluid, [0.0, 1.0], z, T=310.0).require()
    assert at_T.P == pytest.approx(
        [bubble_pressure(fluid, 310.0, z).P[0], dew_pressure(fluid, 310.0, z).P[0]], rel=1e-9
    )
    assert flash_tv(fluid, 310.0, z, ratio=0.0).P == pytest.approx(at_T.P[:1], rel=1e-9)
    tiny = flash_tv(fluid, 310.0, z, ratio=[1e-6, 1e6]).require()  # almost full, almost dry
    assert tiny.P == pytest.approx(at_T.P, rel=1e-2)


def test_pure_component_between_liquid_and_vapour():
    """T stands at the boiling point, the fraction follows the enthalpy."""
    fluid, P = Fluid.of(["n-hexane"]), 101325.0
    Tb = bubble_temperature(fluid, P, [1.0]).T[0]
    H_L, H_V = (caloric(fluid, Tb, P, [1.0], phase).H[0] for phase in "LV")
    share = np.array([-0.1, 0.0, 1e-9, 0.25, 0.75, 1.0 - 1e-9, 1.0, 1.1])
    found = flash_ph(fluid, P, H_L + share * (H_V - H_L), [1.0]).require()
    inside = (share >= 0.0) & (share <= 1.0)
    assert found.T[inside] == pytest.approx(np.full(inside.sum(), Tb), rel=1e-9)
    # 2e-8: RT times the miss over the heat of vaporisation
    assert found.beta == pytest.approx(np.clip(share, 0.0, 1.0), abs=2e-8)
    assert found.T[0] < Tb < found.T[-1]


def test_across_the_phase_boundary_without_a_jump():
    fluid, z = Fluid.of(MIXTURES["gasoline with ethanol"][0]), MIXTURES["gasoline with ethanol"][1]
    P = 101325.0
    for at in (bubble_temperature(fluid, P, z), dew_temperature(fluid, P, z)):
        phase = "L" if at.x[0] == pytest.approx(z) else "V"
        H = caloric(fluid, at.T, P, z, phase).H[0] + np.linspace(-50.0, 50.0, 41)
        found = flash_ph(fluid, P, H, z).require()
        assert np.all(np.diff(found.T) > 0.0) and np.all(np.diff(found.beta) >= 0.0)
        assert {0, 1} & set(found.beta.astype(int)) and ((found.beta > 0.0) & (found.beta < 1.0)).any()
        # 2.5 J/mol over a heat capacity of at least 100 J/(mol K)
        assert np.abs(np.diff(found.T)).max() < 0.05


def test_throttling_and_reversible_expansion():
    """Isenthalpic: entropy rises. Isentropic: colder still. Light liquid let down to atmospheric pressure."""
    fluid, z = Fluid.of(["propane", "n-butane", "n-hexane"]), [0.3, 0.4, 0.3]
    P = 1.2e6
    start = caloric(fluid, 300.0, P, z, "L").require()
    throttled = flash_ph(fluid, 101325.0, start.H, z).require()
    expanded = flash_ps(fluid, 101325.0, start.S, z).require()
    assert throttled.S[0] > start.S[0] and expanded.H[0] < start.H[0]
    assert expanded.T[0] < throttled.T[0] < 300.0
    assert 0.0 < expanded.beta[0] < throttled.beta[0] < 1.0


def test_compressed_liquid_and_thin_vapour_by_density():
    fluid, z = Fluid.of(["n-octane"]), [1.0]
    for P, phase in ((5e6, "L"), (200.0, "V")):
        v = caloric(fluid, 298.15, P, z, phase).v[0]
        found = flash_tv(fluid, 298.15, z, density=1.0 / v).require()
        assert found.P[0] == pytest.approx(P, rel=1e-7) and found.beta[0] == (phase == "V")


def test_lanes_equal_single_states():
    fluid, flash, H, S, v = states("gasoline with ethanol")
    for many, single in (
        (flash_ph(fluid, flash.P, H, flash.z), lambda i: flash_ph(fluid, flash.P[i], H[i], flash.z[i])),
        (flash_ps(fluid, flash.P, S, flash.z), lambda i: flash_ps(fluid, flash.P[i], S[i], flash.z[i])),
        (
            flash_tv(fluid, flash.T, flash.z, density=1 / v),
            lambda i: flash_tv(fluid, flash.T[i], flash.z[i], density=1 / v[i]),
        ),
    ):
        for i in (0, 11, 29):
            one = single(i)
            # both meet the target to 1e-8 of RT, not to the last digit
            assert many.T[i] == pytest.approx(one.T[0], rel=1e-8) and many.P[i] == pytest.approx(
                one.P[0], rel=1e-7
            )
            assert many.beta[i] == pytest.approx(one.beta[0], abs=1e-7)


def test_every_status():
    fluid = Fluid.of(["ethylene", "n-hexane", "water"])
    assert ("ethylene", "n-hexane") in fluid.missing
    z = np.array(
        [
            [0.0, 1.0, 0.0],
            [0.0, 1.0, 0.0],  # colder than 200 K
            [0.0, 1.0, 0.0],  # hotter than 500 K
            [0.0, 0.7, 0.7],  # no composition
            [0.5, 0.5, 0.0],  # a pair without its parameter
            [0.0, 0.5, 0.5],  # two liquids
            [0.0, 1.0, 0.0],  # no number
        ]
    )
    cold, hot = (caloric(fluid, T, 1e5, [0.0, 1.0, 0.0], p).H[0] for T, p in ((200.0, "L"), (500.0, "V")))
    wet = flash_tp(fluid, 290.0, 1e5, z[5], check="full")
    assert wet.status[0] == Status.LIQUID_SPLITS
    H = np.array([-2e4, cold - 100.0, hot + 100.0, 0.0, 0.0, -4.2e4, np.nan])
    found = flash_ph(fluid, 1e5, H, z, check="full")
    assert [Status(s).name for s in found.status] == [
        "CONVERGED",
        "OUT_OF_RANGE",
        "OUT_OF_RANGE",
        "BAD_INPUT",
        "NO_PARAMETERS",
        "LIQUID_SPLITS",
        "BAD_INPUT",
    ]
    lost = [1, 2, 3, 4, 6]
    assert (
        np.isnan(found.T[lost]).all() and np.isnan(found.beta[lost]).all() and np.isnan(found.x[lost]).all()
    )
    assert found.T[0] == pytest.approx(flash_ph(fluid, 1e5, -2e4, z[0]).T[0], rel=1e-10)
    with pytest.raises(NotConverged, match="outside the range of the method"):
        found.require()


def test_two_liquids_share_the_enthalpy():
    """Water under hydrocarbon: the answer is the split one, and its parts add up."""
    fluid, z = Fluid.of(["n-hexane", "toluene", "water"]), np.array([0.4, 0.3, 0.3])
    found = flash_ph(fluid, 1e5, -4.0e4, z, check="full")
    assert found.status[0] == Status.LIQUID_SPLITS and found.beta[0] == 0.0 and 0.2 < found.beta_W[0] < 0.5
    parts = [caloric(fluid, found.T, found.P, part, "L").H[0] for part in (found.x[0], found.x_W[0])]
    H = (1.0 - found.beta_W[0]) * parts[0] + found.beta_W[0] * parts[1]
    assert H == pytest.approx(-4.0e4, abs=1e-4) and found.H[0] == pytest.approx(H, abs=1e-6)


def test_three_phases_share_the_enthalpy():
    """Steam distillation: two liquids and their vapour, T nearly still while all the water boils off."""
    fluid, z = Fluid.of(["n-hexane", "toluene", "water"]), np.array([0.4, 0.3, 0.3])
    H = np.linspace(-2.9e4, -8.0e3, 7)
    found = flash_ph(fluid, 1e5, H, z, check="full")
    assert (found.status == Status.LIQUID_SPLITS).all() and (found.phases == 3).all()
    assert found.miss.max() <= PROMISED and found.balance.max() <= 1e-9
    assert np.all(np.diff(found.beta) > 0.0) and np.all(np.diff(found.beta_W) < 0.0)
    assert np.all(np.diff(found.T) > 0.0) and found.T[-1] - found.T[0] < 6.0
    share = (1.0 - found.beta - found.beta_W, found.beta, found.beta_W)
    parts = zip(share, (found.x, found.y, found.x_W), "LVL", strict=True)
    total = sum(amount * caloric(fluid, found.T, found.P, part, phase).H for amount, part, phase in parts)
    assert total == pytest.approx(H, abs=1e-3)  # 1e-8 of RT


def test_beyond_the_critical_point():
    fluid, z = Fluid.of(["propane", "n-butane"]), [0.5, 0.5]
    T, P = np.array([420.0, 470.0, 300.0]), np.array([8e6, 8e6, 2e7])
    flash = flash_tp(fluid, T, P, z).require()
    phase = np.where(flash.beta > 0.5, "V", "L")
    H = np.array([caloric(fluid, T[i], P[i], z, str(phase[i])).H[0] for i in range(3)])
    assert flash_ph(fluid, P, H, z).require().T == pytest.approx(T, abs=1e-5)


def test_a_fraction_that_falls_before_it_rises():
    """Nitrogen dissolves better in warm oil: several temperatures share a fraction, one of them is found."""
    fluid, z = Fluid.of(["nitrogen", "n-hexane", "n-decane"]), [0.159, 0.533, 0.308]
    found = state_at_beta(fluid, [0.158, 0.17, 0.5], z, P=1.947e5).require()
    assert flash_tp(fluid, found.T, found.P, z).beta == pytest.approx(found.beta, abs=1e-7)
    assert found.T[2] > found.T[1]


def test_nothing_at_the_edge_without_a_saturation_point():
    found = state_at_beta(Fluid.of(["propane"]), [0.0, 0.5, 1.0], [1.0], T=380.0)
    assert not found.ok.any() and np.isnan(found.P).all()
    assert found.status[0] == Status.NO_SOLUTION


def test_fluids_without_heat_capacities():
    fluid = Fluid.from_constants([425.12, 540.2], [3.796e6, 2.74e6], [0.2, 0.35], [0.0581, 0.1002])
    assert flash_ph(fluid, 1e5, 0.0, [0.5, 0.5]).status[0] == Status.NO_PARAMETERS
    state = state_at_beta(fluid, 0.5, [0.5, 0.5], T=320.0).require()  # needs none
    assert np.isnan(state.H[0]) and state.v[0] > 0.0
    assert flash_tv(fluid, 320.0, [0.5, 0.5], density=1.0 / state.v).beta[0] == pytest.approx(0.5, abs=1e-7)


def test_words_and_shapes_that_are_refused():
    fluid = Fluid.of(["n-butane", "n-hexane"])
    with pytest.raises(InputError, match="2 measures of the volume"):
        flash_tv(fluid, 300.0, [0.5, 0.5], ratio=1.0, density=1.0)
    with pytest.raises(InputError, match="0 measures of the volume"):
        flash_tv(fluid, 300.0, [0.5, 0.5])
    with pytest.raises(InputError, match="one of T and P"):
        state_at_beta(fluid, 0.5, [0.5, 0.5])
    with pytest.raises(InputError, match="'half' is not a check"):
        flash_ph(fluid, 1e5, 0.0, [0.5, 0.5], check="half")
    with pytest.raises(InputError, match="no caloric properties"):
        flash_ph(Fluid.of(["n-butane"], model="gamma-phi"), 1e5, 0.0, [1.0])
    with pytest.raises(ShapeError, match="composition"):
        flash_ph(fluid, 1e5, 0.0, [1.0])
    with pytest.raises(ShapeError, match="composition"):
        flash_tv(fluid, 300.0, [1.0], mass_density=700.0)
    with pytest.raises(ShapeError, match="lanes"):
        flash_ph(fluid, [1e5, 2e5], [0.0, 0.0, 0.0], [0.5, 0.5])
    bad = [flash_tv(fluid, 300.0, [0.5, 0.5], ratio=-1.0), flash_tv(fluid, 300.0, [0.5, 0.5], density=0.0),
           state_at_beta(fluid, 1.5, [0.5, 0.5], T=300.0)]  # fmt: skip
    assert [one.status[0] for one in bad] == [Status.BAD_INPUT] * 3
