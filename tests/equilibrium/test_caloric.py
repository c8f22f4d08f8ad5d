"""Caloric properties as the caller sees them: statuses, lanes, fluids without heat capacities."""

from __future__ import annotations

import numpy as np
import pytest

from screener.equilibrium import Fluid, caloric, departure, heat_of_vaporisation
from screener.ground.constants import R
from screener.ground.errors import InputError, NotConverged, ShapeError
from screener.ground.status import Status

NAMES = ("n-butane", "ethanol", "toluene", "n-octane")
ENERGIES = ("H", "U", "S", "G", "Cp")


@pytest.fixture(scope="module")
def fluid():
    return Fluid.of(NAMES)


def test_lanes_equal_single_states(fluid):
    rng = np.random.default_rng(3)
    T, P, x = rng.uniform(230.0, 400.0, 40), 10.0 ** rng.uniform(3.0, 6.0, 40), rng.dirichlet(np.ones(4), 40)
    many = caloric(fluid, T, P, x, "L")
    for i in (0, 7, 39):
        one = caloric(fluid, T[i], P[i], x[i], "L")
        for name in (*ENERGIES, "v", "expansion", "compression"):
            # rounding of sums in another order
            assert getattr(many, name)[i] == pytest.approx(getattr(one, name)[0], rel=1e-11), name


def test_bad_lanes_disturb_nobody(fluid):
    x = np.tile([0.1, 0.2, 0.3, 0.4], (6, 1))
    x[1], x[2, 0] = [0.5, 0.6, 0.1, 0.1], np.nan
    T = np.array([300.0, 300.0, 300.0, np.nan, 199.9, 500.1])
    found = caloric(fluid, T, 1e5, x, "L")
    bad, out = int(Status.BAD_INPUT), int(Status.OUT_OF_RANGE)
    assert found.status.tolist() == [int(Status.CONVERGED), bad, bad, bad, out, out]
    assert np.isnan(found.H[1:]).all() and np.isnan(found.v[1:4]).all()
    assert np.isfinite(found.v[4:]).all()  # the equation of state itself has no such range
    # rounding of sums in another order
    assert found.H[0] == pytest.approx(caloric(fluid, 300.0, 1e5, x[0], "L").H[0], rel=1e-13)
    with pytest.raises(NotConverged, match="5 of the lanes"):
        found.require()


def test_range_of_the_heat_capacities(fluid):
    edges = caloric(fluid, [200.0, 500.0], 1e5, [0.1, 0.2, 0.3, 0.4], "V")
    assert edges.ok.all() and np.isfinite(edges.H).all()


def test_a_fluid_without_heat_capacities_has_departures():
    fluid = Fluid.from_constants([425.12, 540.2], [3.796e6, 2.74e6], [0.2, 0.35], [0.0581, 0.1002])
    full = caloric(fluid, 300.0, 1e5, [0.5, 0.5], "L")
    assert full.status[0] == Status.NO_PARAMETERS
    assert all(np.isnan(getattr(full, name)[0]) for name in ENERGIES)
    part = departure(fluid, 300.0, 1e5, [0.5, 0.5], "L").require()
    assert part.v[0] == full.v[0] and part.H[0] < -2e4 and part.Cp[0] > 20.0
    assert part.U[0] == pytest.approx(part.H[0] - 1e5 * part.v[0] + R * 300.0, rel=1e-14)


def test_departure_is_the_difference_from_the_ideal_gas(fluid):
    x = [0.1, 0.2, 0.3, 0.4]
    full, part = caloric(fluid, 320.0, 5e5, x, "L"), departure(fluid, 320.0, 5e5, x, "L")
    ideal = caloric(fluid, 320.0, 1e-6, x, "V")
    assert full.H[0] - part.H[0] == pytest.approx(ideal.H[0], rel=1e-10)  # 1e-6 Pa is an ideal gas
    assert full.Cp[0] - part.Cp[0] == pytest.approx(ideal.Cp[0], rel=1e-10)
    assert full.S[0] - part.S[0] == pytest.approx(ideal.S[0] - R * np.log(5e5 / 1e-6), rel=1e-10)


def test_a_pair_without_its_parameter_is_unknown():
    fluid = Fluid.of(["ethylene", "n-hexane", "toluene"])
    assert fluid.missing
    x = np.array([[0.1, 0.2, 0.7], [0.0, 0.3, 0.7]])
    found = caloric(fluid, 300.0, 1e5, x, "L")
    assert found.status.tolist() == [int(Status.NO_PARAMETERS), int(Status.CONVERGED)]
    assert np.isnan(found.H[0]) and np.isfinite(found.H[1])


def test_words_that_are_refused(fluid):
    x = [0.1, 0.2, 0.3, 0.4]
    with pytest.raises(InputError, match="'W' is not a phase"):
        caloric(fluid, 300.0, 1e5, x, "W")
    with pytest.raises(InputError, match="no caloric properties"):
        caloric(Fluid.of(NAMES, model="gamma-phi"), 300.0, 1e5, x, "L")
    with pytest.raises(ShapeError, match="composition"):
        caloric(fluid, 300.0, 1e5, [0.5, 0.5], "L")


def test_residual_is_rounding(fluid):
    T, P = np.meshgrid(np.linspace(220.0, 420.0, 9), 10.0 ** np.linspace(2.0, 6.5, 10))
    for phase in "LV":
        found = caloric(fluid, T.ravel(), P.ravel(), [0.1, 0.2, 0.3, 0.4], phase)
        assert found.residual.max() < 1e-13  # the cubic's root is polished to rounding


def test_heat_of_vaporisation_of_a_pure_species_is_clapeyrons():
    """T (v_V - v_L) dP/dT with the equation's own vapour pressure; the translation drops out of v_V - v_L."""
    from screener.equilibrium import bubble_pressure

    fluid = Fluid.of(["n-hexane"])
    T = np.array([260.0, 320.0, 400.0])
    found = heat_of_vaporisation(fluid, [1.0], T=T, beta=0.4).require()
    slope = (bubble_pressure(fluid, T + 0.01, [1.0]).P - bubble_pressure(fluid, T - 0.01, [1.0]).P) / 0.02
    dv = caloric(fluid, T, found.P, [1.0], "V").v - caloric(fluid, T, found.P, [1.0], "L").v
    # 1e-6: a central difference of 0.01 K leaves 1e-8, the bubble pressure converges to 1e-10 over 1e-4
    assert found.differential == pytest.approx(T * dv * slope, rel=1e-6)
    assert found.taken == pytest.approx(0.4 * found.differential, rel=1e-9)


def test_heat_taken_up_along_the_boiling_range(fluid):
    x, P = [0.1, 0.2, 0.3, 0.4], 101325.0
    beta = np.linspace(0.0, 1.0, 21)
    curve = heat_of_vaporisation(fluid, x, P=P, beta=beta).require()
    assert np.all(np.diff(curve.T) > 0.0) and np.all(np.diff(curve.taken) > 0.0)
    assert abs(curve.taken[0]) < 1e-4  # [J/mol] two solutions of one bubble point
    # at constant P a little more vapour takes its differential heat, and the warming of all that is there
    slope = np.gradient(curve.taken, beta)[1:-1]
    assert np.all(slope > curve.differential[1:-1])
    beta = np.array([0.4999, 0.5, 0.5001])
    at_T = heat_of_vaporisation(fluid, x, T=340.0, beta=beta).require()
    rise = (at_T.taken[2] - at_T.taken[0]) / 2e-4
    moved = (beta[2] * at_T.y[2] - beta[0] * at_T.y[0]) / 2e-4  # what turns into vapour, not quite y
    partial = [
        caloric(fluid, 340.0, at_T.P[1], part, phase).H_i[0]
        for part, phase in ((at_T.x[1], "L"), (at_T.y[1], "V"))
    ]
    # 1 %: the rest is dH/dP of both phases, v - T dv/dT times a fall of P of some bar per unit of beta
    assert rise == pytest.approx(moved @ (partial[1] - partial[0]), rel=0.01)


def test_no_heat_of_vaporisation_above_the_critical_point():
    found = heat_of_vaporisation(Fluid.of(["propane"]), [1.0], T=[300.0, 380.0])
    assert found.ok.tolist() == [True, False] and np.isnan(found.differential[1])
