"""Group-contribution activity coefficients: the folded form, gases without groups, consistency."""

import numpy as np
import pytest

from screener.equilibrium.excess import Excess
from screener.equilibrium.unifac import Unifac
from screener.species import columns, group_tables, pair_terms

NAMES = ("n-hexane", "toluene", "o-xylene", "p-xylene", "ethanol", "MTBE", "water")


def model(names=NAMES) -> Unifac:
    table = columns(names)
    R, Q, main, a, b, c = group_tables(table.subgroups)
    return Unifac.of(table.groups, R, Q, main, a, b, c)


def plain_ln_gamma(names, T, x):
    """The equations as printed, subgroup by subgroup and with loops, for one state."""
    table = columns(names)
    R, Q, _, a, b, c = group_tables(table.subgroups)
    psi = np.exp(-(a + b * T + c * T * T) / T)

    def ln_Gamma(counts):
        theta = counts * Q / (counts * Q).sum()
        out = np.zeros(len(Q))
        for k in range(len(Q)):
            first = np.log(sum(theta[m] * psi[m, k] for m in range(len(Q))))
            second = sum(
                theta[m] * psi[k, m] / sum(theta[n] * psi[n, m] for n in range(len(Q))) for m in range(len(Q))
            )
            out[k] = Q[k] * (1.0 - first - second)
        return out

    r, q = table.groups @ R, table.groups @ Q
    V, VF = r**0.75 / (x @ r**0.75), (r / (x @ r)) / (q / (x @ q))
    combinatorial = 1.0 - V + np.log(V) - 5.0 * q * (1.0 - VF + np.log(VF))
    mixed = ln_Gamma(x @ table.groups)
    residual = [row @ (mixed - np.where(row > 0, ln_Gamma(row), 0.0)) for row in table.groups]
    return combinatorial + np.array(residual)


def test_folded_form_equals_the_printed_one():
    rng = np.random.default_rng(3)
    T, x = rng.uniform(250.0, 380.0, 10), rng.dirichlet(np.full(len(NAMES), 0.4), 10)
    found = model().at(T).ln_gamma(x)
    for n in range(10):
        # 1e-11: the same sums in another order
        np.testing.assert_allclose(found[n], plain_ln_gamma(NAMES, T[n], x[n]), rtol=1e-11, atol=1e-11)


def test_one_temperature_for_all_lanes_equals_one_each():
    rng = np.random.default_rng(4)
    x = rng.dirichlet(np.ones(len(NAMES)), 6)
    one = model().at(np.array([300.0])).ln_gamma(x)
    each = model().at(np.full(6, 300.0)).ln_gamma(x)
    np.testing.assert_allclose(one, each, rtol=1e-13, atol=1e-14)  # rounding of two forms of one product


def test_pure_components_have_no_excess():
    found = model().at(np.array([300.0])).ln_gamma(np.eye(len(NAMES)))
    np.testing.assert_allclose(np.diag(found), 0.0, atol=1e-13)  # sums of terms of order 10, cancelled


def test_ln_gamma_is_the_derivative_of_the_excess_gibbs_energy():
    names = ("n-hexane", "toluene", "ethanol", "nitrogen", "carbon dioxide")
    excess = Excess.of(model(names), *pair_terms(names)[:3]).at(np.array([300.0]))
    n = np.array([0.3, 0.2, 0.3, 0.15, 0.05])

    def total(amounts):
        x = amounts / amounts.sum()
        return amounts @ excess.ln_gamma(x[None, :])[0]

    step = 1e-6
    numeric = [(total(n + step * e) - total(n - step * e)) / (2.0 * step) for e in np.eye(5)]
    # 1e-8: central differences with eps / step = 2e-10 of rounding
    np.testing.assert_allclose(excess.ln_gamma(n[None, :])[0], numeric, rtol=0.0, atol=1e-8)


def test_a_gas_without_groups_is_not_seen_by_the_others():
    with_gas = model(("n-hexane", "ethanol", "nitrogen")).at(np.array([300.0]))
    without = model(("n-hexane", "ethanol")).at(np.array([300.0]))
    found = with_gas.ln_gamma(np.array([[0.3, 0.2, 0.5]]))[0]
    np.testing.assert_allclose(found[:2], without.ln_gamma(np.array([[0.6, 0.4]]))[0], rtol=1e-13)
    assert found[2] == 0.0


@pytest.mark.parametrize("x", [[0.0, 0.0, 1.0], [1e-300, 0.0, 1.0]])
def test_gas_alone_gives_numbers(x):
    found = model(("n-hexane", "ethanol", "nitrogen")).at(np.array([300.0])).ln_gamma(np.array([x]))
    assert np.isfinite(found).all()


def test_gases_only():
    found = model(("nitrogen", "oxygen")).at(np.array([300.0])).ln_gamma(np.array([[0.8, 0.2]]))
    assert (found == 0.0).all()
