"""True of any mixture: H, S, G, Cp and v of a phase are one another's derivatives, to 1e-8.

Derivatives are central differences of sixth order. A value that can pass through zero
(H, S, excess enthalpy) is compared against the larger of itself and RT or R.
"""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import assume, given, settings
from hypothesis import strategies as st

from screener.equilibrium import Fluid, caloric, departure
from screener.equilibrium.ideal_gas import T_REFERENCE
from screener.equilibrium.zero_pressure import JOINT
from screener.ground.constants import ATMOSPHERE, R

POOL = (
    "propane",
    "n-butane",
    "n-hexane",
    "isooctane",
    "cyclohexane",
    "toluene",
    "o-xylene",
    "ethanol",
    "MTBE",
    "water",
    "nitrogen",
    "carbon dioxide",
    "n-hexadecane",
    "1-hexene",
)
LIQUIDS = ("n-hexane", "isooctane", "toluene", "ethanol", "methanol", "MTBE", "n-decane", "cyclohexane")
MODELS = ("PR-GE", "PR", "SRK")
CLOSE = 1e-8  # the accuracy promised


def mixtures(pool, most):
    """Names, composition, T [K] and P [Pa]."""
    return st.lists(st.sampled_from(pool), min_size=1, max_size=most, unique=True).flatmap(
        lambda names: st.tuples(
            st.just(tuple(names)),
            st.lists(st.floats(0.02, 1.0), min_size=len(names), max_size=len(names)).map(
                lambda w: np.array(w) / np.sum(w)
            ),
            st.floats(250.0, 370.0),
            st.floats(3.0, 6.0).map(lambda p: 10.0**p),
        )
    )


STEPS = np.array([-3.0, -2.0, -1.0, 1.0, 2.0, 3.0])
WEIGHTS = np.array([-1.0, 9.0, -45.0, 45.0, -9.0, 1.0]) / 60.0  # of a central difference of sixth order


def slope(values, step):
    """Derivative from values (6, ...) at the STEPS."""
    return np.tensordot(WEIGHTS, values, axes=1) / step


def smooth(fluid, T, P, x, phase):
    """Assume a state in whose neighbourhood the differences hold.

    Not within 5 K of the critical temperature of a species or 0.3 of the joint of the
    zero-pressure function, where third derivatives jump by construction; not next to the
    spinodal, where every derivative grows without bound.
    """
    state = fluid.at(T)
    alphas = np.append(state.alpha_i[0], state.mix(x).alpha)
    assume(np.abs(alphas - JOINT).min() > 0.3 and np.abs(fluid.Tc - T).min() > 5.0)
    one = departure(fluid, T, P, x, phase)
    # 1 for an ideal gas, 0.01 to 0.1 for a liquid, infinite at the spinodal
    soft = one.compression[0] * R * T / one.v[0]
    assume(abs(one.Cp[0]) < 20.0 * R and (0.0 < soft < 0.15 or 0.5 < soft < 1.5))
    # a jump of root within the differences
    far = 3.3 * pressure_step(one, P)
    near = departure(
        fluid, T + np.array([-3.0, 3.0, 0.0, 0.0]), P * (1.0 + np.array([0.0, 0.0, -far, far])), x, phase
    )
    assume(np.abs(np.log(near.v / one.v[0])).max() < 0.2)


def pressure_step(one, P):
    """Step of differences in P, as a share of it."""
    return 0.2 if one.compression[0] * P < 1e-3 else 0.03 if one.compression[0] * P < 0.01 else 0.01


def within(value, wanted, scale):
    assert np.all(np.abs(value - wanted) <= CLOSE * np.maximum(np.abs(wanted), scale)), (value, wanted)


@pytest.mark.parametrize("phase", ["L", "V"])
@pytest.mark.parametrize("model", MODELS)
@settings(max_examples=30, deadline=None, derandomize=True)
@given(case=mixtures(POOL, 5))
def test_state_functions(model, phase, case):
    names, x, T, P = case
    fluid = Fluid.of(names, model=model)
    smooth(fluid, T, P, x, phase)
    one = caloric(fluid, T, P, x, phase).require()
    H, S, G, Cp, v, RT = one.H[0], one.S[0], one.G[0], one.Cp[0], one.v[0], R * T
    within(G, H - T * S, RT)
    within(one.U[0], H - P * v, RT)

    step = 0.7
    near = caloric(fluid, T + step * STEPS, P, x, phase).require()
    within(slope(near.G, step), -S, R)
    within(slope(near.G / near.T, step) * T**2, -H, RT)
    within(slope(near.H, step), Cp, R)
    within(slope(near.S, step) * T, Cp, R)
    within(slope(near.v, step) / v, one.expansion[0], 1.0 / T)

    # a dense phase is straight in P, and its G of 1e4 J/mol rounds at 1e-12: longer steps than for a vapour
    step = P * pressure_step(one, P)
    near = caloric(fluid, T, P + step * STEPS, x, phase).require()
    within(slope(near.G, step), v, 0.0)
    within(slope(near.v, step) / v, -one.compression[0], 1.0 / P)
    within(slope(near.H, step), v * (1.0 - T * one.expansion[0]), v)


@pytest.mark.parametrize("phase", ["L", "V"])
@pytest.mark.parametrize("model", MODELS)
@settings(max_examples=30, deadline=None, derandomize=True)
@given(case=mixtures(POOL, 5))
def test_gibbs_energy_is_the_sum_of_chemical_potentials(model, phase, case):
    """mu_i = mu_i(ideal) + RT ln phi_i - P c_i: ln phi is untranslated, c is the translation."""
    names, x, T, P = case
    fluid = Fluid.of(names, model=model)
    one = caloric(fluid, T, P, x, phase)
    pure = np.array([caloric(Fluid.of([name], model=model), T, 1e-3, [1.0], "V").G[0] for name in names])
    ideal = pure + R * T * np.log(x * P / 1e-3)  # a gas at 1 mPa is ideal within 1e-8
    mu = ideal + R * T * fluid.ln_phi(T, P, x, phase)[0] - P * fluid.at(T).shift_i[0]
    within(one.G[0], x @ mu, R * T)


@pytest.mark.parametrize("phase", ["L", "V"])
@pytest.mark.parametrize("model", MODELS)
@settings(max_examples=30, deadline=None, derandomize=True)
@given(case=mixtures(POOL, 5))
def test_partial_enthalpies(model, phase, case):
    """H_i = -R T^2 d ln phi_i / dT - P (c_i - T dc_i/dT), and x H_i adds up to H."""
    names, x, T, P = case
    fluid = Fluid.of(names, model=model)
    smooth(fluid, T, P, x, phase)
    one = departure(fluid, T, P, x, phase).require()
    within(x @ one.H_i[0], one.H[0], R * T)
    ln_phi_T = slope(fluid.ln_phi(T + 0.7 * STEPS, P, x, phase), 0.7)
    lift = P * (fluid.at(T).shift_i[0] - T * fluid.shift_1)
    within(one.H_i[0], -R * T**2 * ln_phi_T - lift, R * T)


@settings(max_examples=40, deadline=None, derandomize=True)
@given(case=mixtures(LIQUIDS, 4))
def test_heat_of_mixing_is_the_excess_enthalpy(case):
    """H of mixing of PR-GE at vanishing pressure: -R T^2 sum x_i d ln gamma_i / dT of its activity model."""
    names, x, T, _ = case
    assume(len(names) > 1)
    fluid = Fluid.of(names)
    assume(np.abs(fluid.at(T).alpha_i - JOINT).min() > 0.3)
    P = 1e-3  # P v of a liquid is then 1e-7 J/mol
    mixed = caloric(fluid, T, P, x, "L").H[0]
    pure = np.array([caloric(fluid, T, P, e, "L").H[0] for e in np.eye(x.size)])
    excess = -R * T**2 * (x @ slope(fluid.ln_gamma(T + 0.7 * STEPS, x), 0.7))
    within(mixed - x @ pure, excess, R * T)


@settings(max_examples=40, deadline=None, derandomize=True)
@given(name=st.sampled_from(POOL), T=st.floats(210.0, 490.0))
def test_reference_state(name, T):
    """Ideal gas at 298.15 K and 101,325 Pa: H = S = 0; and S of mixing is there."""
    one, two = Fluid.of([name]), Fluid.of([name, "n-octane"])
    P = 1e-6  # [Pa] an ideal gas: b / v of hexadecane at 298 K is 1e-13, its attraction a hundred times that
    here = caloric(one, T_REFERENCE, P, [1.0], "V")
    within(here.H[0], 0.0, R * T_REFERENCE)
    within(here.S[0], -R * np.log(P / ATMOSPHERE), R)
    x = np.array([0.3, 0.7])
    mixed = caloric(two, T, P, x, "V")
    parts = [caloric(two, T, P, e, "V") for e in np.eye(2)]
    within(mixed.S[0], x @ [p.S[0] for p in parts] - R * x @ np.log(x), R)
    within(mixed.H[0], x @ [p.H[0] for p in parts], R * T)


@settings(max_examples=30, deadline=None, derandomize=True)
@given(case=mixtures(POOL, 4))
def test_species_of_share_zero_and_twice_given(case):
    names, x, T, P = case
    one = caloric(Fluid.of(names), T, P, x, "L")
    more = caloric(Fluid.of([*names, "pentylbenzene"]), T, P, np.append(x, 0.0), "L")
    twice = caloric(
        Fluid.of([names[0], *names]), T, P, np.concatenate([[0.3 * x[0], 0.7 * x[0]], x[1:]]), "L"
    )
    # the entropy of mixing a species with itself is the one thing a double name changes
    itself = -R * x[0] * (0.3 * np.log(0.3) + 0.7 * np.log(0.7))
    for what, gain in (("H", 0.0), ("S", itself), ("Cp", 0.0), ("v", 0.0)):
        value = getattr(one, what)[0]
        for other, added in ((more, 0.0), (twice, gain)):
            # rounding of sums in another order
            assert getattr(other, what)[0] - added == pytest.approx(value, rel=1e-10, abs=1e-10)
