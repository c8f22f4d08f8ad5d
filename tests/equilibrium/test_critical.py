"""Saturation points next to critical points: found up to them, none beyond, never two phases that are one."""

import numpy as np
import pytest

from screener.equilibrium import (
    Fluid,
    bubble_pressure,
    bubble_temperature,
    dew_pressure,
    dew_temperature,
    flash_tp,
)
from screener.equilibrium.curve import fugacity
from screener.equilibrium.envelope import envelopes
from screener.ground.status import Status

NEAR = 1.0 - np.array([1e-1, 1e-2, 1e-3, 1e-4, 1e-5, 1e-6])  # T/Tc
BUTANE = Fluid.from_constants([425.12], [3.796e6], [0.2002], [0.0581])  # rounded constants; any would do


@pytest.fixture(scope="module")
def pair():
    """Methane and hexane, rounded constants, k_ij zero."""
    return Fluid.from_constants([190.6, 507.6], [4.6e6, 3.025e6], [0.011, 0.30], [0.016, 0.086])


def ln_K(found):
    return np.abs(np.log(found.K)).max(axis=1)


def test_one_species_up_to_its_critical_point():
    T = 425.12 * np.append(NEAR, [1.0, 1.0001, 1.2])
    bubble, dew = bubble_pressure(BUTANE, T, [1.0]), dew_pressure(BUTANE, T, [1.0])
    for found in (bubble, dew):
        assert found.status.tolist() == 6 * [Status.CONVERGED] + 3 * [Status.NO_SOLUTION]
        assert (found.residual[:6] <= 1e-9).all()
    assert bubble.P[:6] == pytest.approx(dew.P[:6], rel=1e-8)  # residual 1e-10 over Z_V - Z_L, 1e-2 at the nearest
    assert (np.diff(bubble.P[:6]) > 0.0).all() and bubble.P[5] < 3.796e6
    for function in (bubble_temperature, dew_temperature):
        back = function(BUTANE, np.append(bubble.P[:6], [3.796e6, 4e6]), [1.0])
        assert back.status.tolist() == 6 * [Status.CONVERGED] + 2 * [Status.NO_SOLUTION]
        assert back.T[:6] == pytest.approx(T[:6], rel=1e-9)  # d ln P / d ln T is about 7


def test_nearly_one_species(pair):
    """A trace does not hide the way to the critical point of the rest."""
    x = np.array([[1e-8, 1.0 - 1e-8], [1.0 - 1e-8, 1e-8]])
    for share, Tc in zip(x, (507.6, 190.6)):
        found = bubble_pressure(pair, Tc * NEAR[:4], share)
        pure = bubble_pressure(pair, Tc * NEAR[:4], np.round(share))
        assert found.ok.all() and pure.ok.all()
        assert found.P == pytest.approx(pure.P, rel=1e-5)  # a gas of 1e-8 with K P of 1e7 Pa and more
        assert not bubble_pressure(pair, 1.001 * Tc, share).ok.any()


def test_bubble_line_ends_at_the_critical_point_of_the_mixture(pair):
    """90 % methane: found up to 254 K, none from there on, although the feed goes on to have a retrograde dew point."""
    T = np.linspace(240.0, 330.0, 361)
    found = bubble_pressure(pair, T, [0.9, 0.1])
    last = np.flatnonzero(found.ok).max()
    assert found.ok[: last + 1].all() and 253.5 < T[last] < 254.5
    beyond = found.status[last + 1 :]
    assert not (beyond == Status.CONVERGED).any() and (beyond == Status.NO_SOLUTION).mean() > 0.98
    # a smooth line: the second difference of ln P of steps of 0.25 K, with curvature of about 1e-4 per K2
    assert np.abs(np.diff(np.log(found.P[: last + 1]), 2)).max() < 2e-5
    apart = ln_K(found)[: last + 1]
    assert (np.diff(apart) < 0.0).all() and apart[-1] < 0.01
    # above that temperature and inside the envelope the feed still splits, with the denser phase as the new one
    flash = flash_tp(pair, [270.0, 300.0], [18.9e6, 20.0e6], [0.9, 0.1])
    assert flash.ok.all() and (flash.phases == 2).all() and (flash.beta > 0.5).all()


def test_dew_line_up_to_its_highest_temperature(pair):
    line = envelopes(pair, np.array([[0.9, 0.1]]))
    highest = np.exp(line.X[0, : line.count[0], -4].max())  # of the points solved: at most a little too low
    found = dew_pressure(pair, highest + np.array([-1e-3, 1.0]), [0.9, 0.1])
    assert found.status.tolist() == [Status.CONVERGED, Status.NO_SOLUTION]
    back = dew_temperature(pair, found.P[0], [0.9, 0.1])
    assert back.T[0] == pytest.approx(highest - 1e-3, abs=1e-6)


def test_a_gas_denser_in_moles_than_the_oil_it_leaves():
    """Nitrogen over eicosane at tens of megapascal: fewer cm3 per mole than the oil, and yet the bubble."""
    fluid = Fluid.from_constants([126.2, 768.0], [3.4e6, 1.07e6], [0.038, 0.907], [0.028, 0.282])
    found = bubble_pressure(fluid, 350.0, [[0.3, 0.7], [0.45, 0.55], [0.55, 0.45]])
    assert found.ok.all() and (np.diff(found.P) > 0.0).all() and found.P[-1] > 3e7
    volume = [fluid.volume(350.0, found.P, x, phase) for x, phase in ((found.x, "L"), (found.y, "V"))]
    assert volume[1][-1] < volume[0][-1]


def test_fugacities_from_volumes(pair):
    """ln f(T, v) at the roots of the cubic is ln phi(T, P) + ln P."""
    x, T, P = np.array([[0.3, 0.7]]), np.array([300.0]), np.array([1e6])
    mixture = pair.at(T).mix(x)
    for phase in "LV":
        ln_phi, Z = mixture.ln_phi_and_Z(P, phase)
        g = np.log(Z * mixture.RT / (P * mixture.b) - 1.0)
        ln_f, Z_of_v, v_RT = fugacity(mixture, g)
        assert ln_f == pytest.approx(ln_phi + np.log(P), abs=1e-12)  # rounding over v/b - 1
        assert Z_of_v == pytest.approx(Z, abs=1e-12) and v_RT * P == pytest.approx(Z, rel=1e-14)
