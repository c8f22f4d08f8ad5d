"""True of any flash and any saturation point: balance, equal fugacity, order and doubling of species, edges."""

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from screener.equilibrium import (
    Fluid,
    bubble_pressure,
    bubble_temperature,
    dew_pressure,
    dew_temperature,
    flash_tp,
    rachford_rice,
)

# Constants of ten species from ethane to hexadecane and two gases; Tc [K], Pc [Pa], omega [-]: Reid, Prausnitz
# and Poling, The Properties of Gases and Liquids (from memory, unverified); any values would do here.
CONSTANTS = np.array([
    [305.4, 4.88e6, 0.099], [369.8, 4.25e6, 0.152], [425.2, 3.80e6, 0.199], [469.7, 3.37e6, 0.251],
    [507.5, 3.01e6, 0.299], [562.2, 4.89e6, 0.212], [591.8, 4.10e6, 0.263], [617.7, 2.12e6, 0.489],
    [722.0, 1.41e6, 0.742], [304.1, 7.38e6, 0.239], [126.2, 3.39e6, 0.039], [568.8, 2.49e6, 0.398],
])  # fmt: skip
FEW = settings(max_examples=15, deadline=None, derandomize=True)
LANES = 12


def fluid_of(rows):
    Tc, Pc, omega = CONSTANTS[rows].T
    return Fluid.from_constants(Tc, Pc, omega, np.full(len(rows), 0.1))


@st.composite
def mixtures(draw):
    """A fluid of 2 to 8 of the species and a batch of states: compositions with zeros and traces, T, P."""
    c = draw(st.integers(2, 8))
    generator = np.random.default_rng(draw(st.integers(0, 2**32 - 1)))
    rows = generator.permutation(len(CONSTANTS))[:c]
    z = generator.dirichlet(np.full(c, 0.8), LANES)
    z[0, generator.integers(c)] = 1e-12
    z[1, generator.integers(c)] = 0.0
    z /= z.sum(axis=1, keepdims=True)
    return rows, z, generator.uniform(240.0, 400.0, LANES), 10.0 ** generator.uniform(4.0, 6.3, LANES)


def ln_f(fluid, found, x, phase):
    """ln of the fugacities over P; zero where a species is absent."""
    return np.where(x > 0.0, np.log(np.where(x > 0.0, x, 1.0)) + fluid.ln_phi(found.T, found.P, x, phase), 0.0)


@FEW
@given(mixtures())
def test_flash_balances_and_its_fugacities_are_equal(mixture):
    rows, z, T, P = mixture
    fluid = fluid_of(rows)
    found = flash_tp(fluid, T, P, z)
    assert found.ok.all()
    two = found.phases == 2
    for sides in (found.x[two], found.y[two]):
        assert sides.sum(axis=1) == pytest.approx(np.ones(two.sum()), abs=1e-13)  # some ten roundings
    whole = (1.0 - found.beta)[:, None] * np.nan_to_num(found.x) + found.beta[:, None] * np.nan_to_num(found.y)
    assert whole == pytest.approx(z, rel=1e-12, abs=1e-300)  # each species to its own scale, traces as well
    difference = ln_f(fluid, found, found.y, "V") - ln_f(fluid, found, found.x, "L")
    assert (np.abs(difference[two]) <= 1e-9).all()


@FEW
@given(mixtures())
def test_a_split_lowers_the_gibbs_energy(mixture):
    rows, z, T, P = mixture
    fluid = fluid_of(rows)
    found = flash_tp(fluid, T, P, z)
    two = found.phases == 2

    def energy(x, phase):
        return (x * ln_f(fluid, found, x, phase)).sum(axis=1)

    split = (1.0 - found.beta) * energy(np.where(two[:, None], found.x, z), "L")
    split += found.beta * energy(np.where(two[:, None], found.y, z), "V")
    whole = np.minimum(energy(z, "L"), energy(z, "V"))
    assert (split <= whole + 1e-11)[two].all()  # rounding of sums of some ten terms of order ten


@FEW
@given(mixtures())
def test_flash_of_the_liquid_is_liquid_and_of_the_vapour_is_vapour(mixture):
    rows, z, T, P = mixture
    fluid = fluid_of(rows)
    found = flash_tp(fluid, T, P, z)
    two = np.flatnonzero((found.phases == 2) & (np.abs(np.log(found.K)).max(axis=1, where=z > 0, initial=0) > 1e-2))
    if two.size == 0:
        return
    liquid = flash_tp(fluid, T[two], P[two], found.x[two] / found.x[two].sum(axis=1, keepdims=True))
    vapour = flash_tp(fluid, T[two], P[two], found.y[two] / found.y[two].sum(axis=1, keepdims=True))
    assert liquid.ok.all() and vapour.ok.all()
    # the phases lie on the edge only as exactly as their residual: ln K to 1e-10 over the steepness of
    # Rachford-Rice there, which falls to 1e-3 for nearly equal phases
    assert (liquid.beta <= 1e-6).all() and (vapour.beta >= 1.0 - 1e-6).all()


@FEW
@given(mixtures())
def test_order_of_species_does_not_matter(mixture):
    rows, z, T, P = mixture
    turn = np.roll(np.arange(len(rows)), 1)
    one, two = flash_tp(fluid_of(rows), T, P, z), flash_tp(fluid_of(rows[turn]), T, P, z[:, turn])
    # both answers carry a residual of 1e-10, magnified where the phases nearly coincide
    assert two.beta == pytest.approx(one.beta, abs=1e-7)
    assert two.x == pytest.approx(one.x[:, turn], abs=1e-7, nan_ok=True)
    one, two = bubble_pressure(fluid_of(rows), T, z), bubble_pressure(fluid_of(rows[turn]), T, z[:, turn])
    both = one.ok & two.ok & (one.P < 2e6)
    assert two.P[both] == pytest.approx(one.P[both], rel=1e-7)
    # next to critical points the residual says little about P, and the order of sums may decide a lane
    assert (one.P[one.ok & ~two.ok] > 2e6).all() and (two.P[two.ok & ~one.ok] > 2e6).all()


@FEW
@given(mixtures(), st.floats(0.05, 0.95))
def test_a_species_written_twice_is_one_species(mixture, share):
    rows, z, T, P = mixture
    more = np.append(rows, rows[0])
    doubled = np.column_stack([z, z[:, 0] * share])
    doubled[:, 0] *= 1.0 - share
    one, two = flash_tp(fluid_of(rows), T, P, z), flash_tp(fluid_of(more), T, P, doubled)
    assert two.beta == pytest.approx(one.beta, abs=1e-7)  # as above
    assert two.x[:, 0] + two.x[:, -1] == pytest.approx(one.x[:, 0], abs=1e-7, nan_ok=True)


@FEW
@given(mixtures())
def test_saturation_points_are_where_the_flash_changes(mixture):
    rows, z, T, _ = mixture
    fluid = fluid_of(rows)
    for point, below, above in ((bubble_pressure, 2, 1), (dew_pressure, 1, 2)):
        found = point(fluid, T, z)
        # far from critical points, where the edge is a clean crossing, and wider than 1e-5 (no pure species)
        clear = found.ok & (found.P < 2e6) & (found.P > 1e-3) & (z.max(axis=1) < 0.999)
        if not clear.any():
            continue
        for factor, phases in ((1.0 - 1e-5, below), (1.0 + 1e-5, above)):
            flash = flash_tp(fluid, T[clear], factor * found.P[clear], z[clear])
            assert flash.ok.all() and (flash.phases == phases).all()


@FEW
@given(mixtures())
def test_bubble_above_dew_and_temperature_inverse_to_pressure(mixture):
    rows, z, T, _ = mixture
    fluid = fluid_of(rows)
    bubble, dew = bubble_pressure(fluid, T, z), dew_pressure(fluid, T, z)
    both = bubble.ok & dew.ok
    assert (bubble.P[both] >= dew.P[both] * (1.0 - 1e-9)).all()
    for there, function in ((bubble, bubble_temperature), (dew, dew_temperature)):
        clear = there.ok & (there.P < 2e6) & (there.P > 1e-3)
        if clear.any():
            back = function(fluid, there.P[clear], z[clear])
            again = (bubble_pressure if there is bubble else dew_pressure)(fluid, back.T, z[clear])
            # the same temperature, or (dissolved gas) another one with the same pressure
            assert again.P[back.ok] == pytest.approx(there.P[clear][back.ok], rel=1e-7)
            assert back.ok.mean() > 0.9


@FEW
@given(st.integers(0, 2**32 - 1), st.integers(2, 30))
def test_rachford_rice_splits_the_feed(seed, c):
    generator = np.random.default_rng(seed)
    z = generator.dirichlet(np.full(c, 0.5), 40)
    K = np.exp(generator.normal(0.0, 10.0 ** generator.uniform(-6.0, 1.3), (40, c)))
    K[:, 0], K[:, 1] = np.maximum(K[:, 0], 1.0 + 1e-9), np.minimum(K[:, 1], 1.0 - 1e-9)
    z = np.maximum(z, 1e-12)
    found = rachford_rice(z, K)
    assert found.ok.all() and (found.x > 0.0).all() and (found.y > 0.0).all()
    assert found.y == pytest.approx(K * found.x, rel=1e-14)
    inside = ~found.negative
    whole = found.beta_L[:, None] * found.x + found.beta[:, None] * found.y
    assert whole[inside] == pytest.approx(z[inside], rel=1e-11)  # some hundred roundings of K beta against z
