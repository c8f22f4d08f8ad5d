"""The water term of the excess Gibbs energy: derivatives, limits, and what it must leave alone."""

from dataclasses import replace

import numpy as np
import pytest

from screener.equilibrium import Fluid, bubble_pressure
from screener.equilibrium.zero_pressure import ZeroPressure
from screener.species import find, water_targets

NAMES = ["n-hexane", "toluene", "cyclohexane", "ethanol", "methanol", "MTBE", "water"]


@pytest.fixture(scope="module")
def fluid():
    return Fluid.of(NAMES)


def compositions(n, c=7, seed=3):
    return np.random.default_rng(seed).dirichlet(np.ones(c), n)


def term_of(fluid):
    return fluid.mixing.excess.water


def total(term, moles, T):
    """The term times the moles, extensive. [mol]"""
    N = moles.sum(axis=1)
    return N * term.term(moles / N[:, None], 1.0, 1.0 / T, 1.0)[0]


def test_ln_gamma_is_the_derivative_of_the_extensive_term(fluid):
    term, x, T, h = term_of(fluid), compositions(40), np.linspace(250.0, 330.0, 40), 1e-5
    expected = np.stack([
        (total(term, x + h * np.eye(7)[i], T) - total(term, x - h * np.eye(7)[i], T)) / (2.0 * h) for i in range(7)
    ], axis=1)  # fmt: skip
    # central differences: h^2 times a third derivative of 1/half^2, some 400
    assert term.ln_gamma(x, T) == pytest.approx(expected, abs=1e-6)


def test_slopes_in_temperature_are_derivatives(fluid):
    term, x, T, h = term_of(fluid), compositions(20), np.linspace(250.0, 330.0, 20), 1e-2
    first, second = term.slopes(x, T)
    up, down = term.ln_gamma(x, T + h), term.ln_gamma(x, T - h)
    assert first == pytest.approx((up - down) / (2.0 * h), abs=1e-9)
    g = [total(term, x, T + d) for d in (-h, 0.0, h)]
    assert second == pytest.approx((g[0] - 2.0 * g[1] + g[2]) / h**2, abs=1e-8)  # rounding 1e-16 over h^2


def test_one_composition_at_many_temperatures_and_the_other_way_round(fluid):
    term, x, T = term_of(fluid), compositions(3), np.array([260.0, 290.0, 320.0])
    many = term.ln_gamma(x[:1], T)
    assert many == pytest.approx(term.ln_gamma(np.tile(x[:1], (3, 1)), T), abs=1e-15)
    assert term.ln_gamma(x, T[:1]) == pytest.approx(term.ln_gamma(x, np.full(3, T[0])), abs=1e-15)
    assert term.slopes(x[:1], T)[0].shape == (3, 7)
    assert term.ln_gamma(x[:0], T[:1]).shape == (0, 7)


def test_infinite_dilution_meets_the_table(fluid):
    """Water in each hydrocarbon and each hydrocarbon in water, at the temperatures where the term is exact."""
    targets = water_targets(NAMES)
    for T in (273.15, 323.15):
        for i in range(3):
            dilute = np.full(7, 0.0)
            dilute[i] = 1.0
            assert fluid.ln_gamma(T, dilute)[0, 6] == pytest.approx(targets.water_in([T])[0, i], abs=1e-9)
    assert fluid.ln_gamma(298.15, np.eye(7)[6])[0, :3] == pytest.approx(targets.in_water[:3], abs=1e-9)


def test_no_water_or_no_hydrocarbon_leaves_unifac_alone(fluid):
    x = compositions(10)
    bare = replace(fluid, mixing=ZeroPressure(replace(fluid.mixing.excess, water=None)))
    for absent in ([6], [0, 1, 2]):
        y = x.copy()
        y[:, absent] = 0.0
        y /= y.sum(axis=1, keepdims=True)
        present = y > 0.0
        with_term, without = fluid.ln_gamma(300.0, y), bare.ln_gamma(300.0, y)
        assert with_term[present] == pytest.approx(without[present], abs=1e-14)
    assert Fluid.of(["n-hexane", "ethanol"]).mixing.excess.water is None
    assert Fluid.of(["ethanol", "water"]).mixing.excess.water is None


def test_a_share_of_zero_and_a_species_named_twice_change_nothing(fluid):
    x = compositions(5)
    more = Fluid.of([*NAMES, "n-decane"])
    padded = np.pad(x, ((0, 0), (0, 1)))
    assert more.ln_gamma(290.0, padded)[:, :7] == pytest.approx(fluid.ln_gamma(290.0, x), abs=1e-12)
    twice = Fluid.of([*NAMES, "water"])
    halved = padded.copy()
    halved[:, 6] = halved[:, 7] = 0.5 * padded[:, 6]
    assert twice.ln_gamma(290.0, halved)[:, :7] == pytest.approx(fluid.ln_gamma(290.0, x), abs=1e-12)


def test_a_cut_stands_between_its_families():
    aromatic, paraffin = find("toluene"), find("n-heptane")
    cut = find("cut 99.30 degC 745.00 kg/m3 A24.0 N10.0 O0.0")
    targets = water_targets([cut, aromatic, paraffin, "water", "ethanol"])
    assert targets.hydrocarbon.tolist() == [True, True, True, False, False]
    assert targets.water.tolist() == [False, False, False, True, False] and targets.alcohol[4]
    low, high = sorted((targets.g0[1], targets.g0[2]))
    assert low < targets.g0[0] < high


def test_ethers_and_dry_blends_keep_their_pressures():
    """A trace of water moves the bubble pressure by its own partial pressure, no more."""
    fluid = Fluid.of(["n-hexane", "toluene", "water"])
    dry, damp = (
        bubble_pressure(fluid, 300.0, [0.6, 0.4, 0.0]),
        bubble_pressure(fluid, 300.0, [0.6, 0.39999, 1e-5]),
    )
    assert damp.P[0] - dry.P[0] == pytest.approx(damp.P[0] * damp.y[0, 2], rel=0.01)  # 1e-5 toluene less
