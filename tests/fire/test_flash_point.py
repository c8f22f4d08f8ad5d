"""Flash points: pure species, mixtures, what a lane may hold."""

from __future__ import annotations

import numpy as np
import pytest

from screener.equilibrium import Fluid, bubble_pressure
from screener.fire import Flammability, flash_point
from screener.ground.constants import ATMOSPHERE
from screener.ground.errors import InputError, ShapeError
from screener.ground.status import Status
from screener.species import find, names

FLASHING = [name for name in names() if find(name).flash_point]


def test_a_pure_species_flashes_at_its_own_flash_point():
    """By definition of the method; what is left is the model's vapour pressure against the curve."""
    fluid = Fluid.of(FLASHING)
    flash = flash_point(fluid, np.eye(fluid.c)).require()
    tabled = np.array([find(name).flash_point for name in FLASHING])
    assert len(FLASHING) > 50
    # 0.6 K is 3 % of vapour pressure: the fit of alpha below 250 K, where the lightest flash.
    assert flash.T == pytest.approx(tabled, abs=0.6)
    assert np.abs(flash.T - tabled).mean() < 0.1
    assert (flash.estimated == 0.0).all()


@pytest.mark.parametrize("method", ["liaw", "le-chatelier"])
def test_the_vapour_there_is_that_of_the_bubble_point(method, gasoline):
    """The condition put together again from the bubble point and the limits, not from the routine."""
    fluid, z = gasoline.fluid, gasoline.z
    flash = flash_point(fluid, z, method=method).require()
    bubble = bubble_pressure(fluid, flash.T, z).require()
    p = (bubble.y * bubble.P[:, None])[0]
    limits = Flammability.of(fluid)
    need = limits.LFL * (1.0 - 0.000721 * (flash.T[0] - 298.15)) * ATMOSPHERE
    if method == "liaw":
        need = np.where(np.isfinite(limits.P_flash), limits.P_flash, need)
    # The liquid under air is squeezed by an atmosphere: 0.6 % of fugacity at -45 degC.
    assert np.sum(p / need) == pytest.approx(1.0, abs=0.01)


def test_alcohol_and_hydrocarbon_flash_below_both(octane_ethanol):
    fluid, x = octane_ethanol
    flash = flash_point(fluid, x).require().T
    assert flash.min() < min(flash[0], flash[-1]) - 5.0
    psat = np.stack([find(name).psat(np.linspace(280.0, 290.0, 201)) for name in fluid.names], axis=1)
    own = np.array([find(name).psat(find(name).flash_point) for name in fluid.names])
    raoult = [np.interp(1.0, (psat / own) @ row, np.linspace(280.0, 290.0, 201)) for row in x]
    assert min(raoult) == pytest.approx(
        min(raoult[0], raoult[-1]), abs=1e-6
    )  # an ideal liquid has no minimum


def test_water_raises_the_flash_point_and_does_not_burn():
    fluid = Fluid.of(["ethanol", "water"])
    x = np.array([1.0, 0.8, 0.5, 0.2, 0.05, 0.0])
    flash = flash_point(fluid, np.stack([x, 1.0 - x], axis=1))
    assert (np.diff(flash.T[:5]) > 0.0).all()
    assert flash.status[5] == Status.NO_SOLUTION and np.isnan(flash.T[5])


def test_a_lower_barometer_flashes_earlier():
    """Clausius and Clapeyron: dT/dP = T^2 / (h P), h from the vapour-pressure curve. ISO 2719 takes 0.25
    K/kPa for all products, more than equilibrium gives for a kerosene."""
    fluid = Fluid.of(["n-decane"])
    P = np.array([101.3e3, 97.3e3])
    T = flash_point(fluid, [1.0], P=P, method="le-chatelier").require().T
    psat = find("n-decane").psat
    h = (
        np.log(psat(T[0]) / psat(T[1])) / (1.0 / T[1] - 1.0 / T[0]) + 0.000721 * T[0] ** 2
    )  # the limit falls too
    mean = T.mean() ** 2 / (h * P.mean())
    # A mean slope over 4 kPa: second order, and the model's vapour pressure against the curve.
    assert (T[0] - T[1]) / (P[0] - P[1]) == pytest.approx(mean, rel=0.01)
    assert 0.14e-3 < mean < 0.25e-3


def test_a_species_of_share_zero_changes_nothing(octane_ethanol):
    fluid, x = octane_ethanol
    wider = Fluid.of([*fluid.names, "n-tridecane", "hydrogen sulfide", "nitrogen"])
    padded = np.concatenate([x, np.zeros((len(x), 3))], axis=1)
    # Rounding only; the solver stops at 1e-8 of the vapour, 2e-7 K.
    assert flash_point(wider, padded).T == pytest.approx(flash_point(fluid, x).T, abs=1e-6)


def test_lane_by_lane_equals_the_batch(octane_ethanol):
    fluid, x = octane_ethanol
    batch = flash_point(fluid, x, P=np.linspace(80e3, 105e3, len(x)))
    for i, P in enumerate(np.linspace(80e3, 105e3, len(x))):
        assert flash_point(fluid, x[i], P=P).T[0] == pytest.approx(batch.T[i], abs=1e-6)


def test_bad_lanes_do_not_touch_the_others(octane_ethanol):
    fluid, x = octane_ethanol
    x = x[:4].copy()
    x[1], x[2] = [np.nan, 0.5], [0.7, 0.7]
    flash = flash_point(fluid, x, P=[101325.0, 101325.0, 101325.0, -1.0])
    assert list(flash.status) == [Status.CONVERGED, *[Status.BAD_INPUT] * 3]
    assert np.isfinite(flash.T[0]) and np.isnan(flash.T[1:]).all()


def test_species_without_any_data_make_a_lane_unknown():
    fluid = Fluid.from_constants([540.0, 617.0], [2.7e6, 2.1e6], [0.35, 0.49], [0.1, 0.142])
    flash = flash_point(fluid, [[0.5, 0.5]])
    assert flash.status[0] == Status.NO_PARAMETERS and np.isnan(flash.T[0])


def test_what_rests_on_estimates_is_said():
    fluid = Fluid.of(["n-decane", "n-undecane"])
    flash = flash_point(fluid, [[1.0, 0.0], [0.5, 0.5], [0.0, 1.0]]).require()
    assert flash.estimated[0] == 0.0 and 0.1 < flash.estimated[1] < 0.5 and flash.estimated[2] == 1.0
    assert (flash.T_low[1:] < flash.T[1:]).all() and (flash.T_high[1:] > flash.T[1:]).all()
    # Equal limits, solved twice: the tolerance of the solver.
    assert flash.T_low[0] == pytest.approx(flash.T[0], abs=1e-6)


def test_faults_of_the_caller():
    fluid = Fluid.of(["n-octane", "ethanol"])
    with pytest.raises(InputError, match="'closed cup' is not a flash-point method"):
        flash_point(fluid, [0.5, 0.5], method="closed cup")
    with pytest.raises(ShapeError, match="composition"):
        flash_point(fluid, [0.5, 0.3, 0.2])
