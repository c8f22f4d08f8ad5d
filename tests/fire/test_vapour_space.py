"""The vapour space: window, state, filling, dilution; too rich is a state, never a promise."""

from __future__ import annotations

import re

import numpy as np
import pytest

from screener.equilibrium import Fluid, bubble_pressure
from screener.fire import SpaceState, flammable_window, headspace, vapour_space
from screener.ground.constants import ATMOSPHERE, MW_AIR, R
from screener.ground.files import data_folder
from screener.ground.status import Status


def test_the_ends_of_the_window_are_the_limits(gasoline):
    fluid, z = gasoline.fluid, gasoline.z
    window = flammable_window(fluid, z, ratio=3.0, saturation=0.8).require()
    T = np.array([window.T_lower[0], window.T_upper[0]])
    space = vapour_space(fluid, T, z, ratio=3.0, saturation=0.8).require()
    # Solved to 1e-8 of the vapour.
    assert space.lower_ratio[0] == pytest.approx(1.0, abs=1e-6)
    assert space.upper_ratio[1] == pytest.approx(1.0, abs=1e-6)


def test_states_on_both_sides(gasoline):
    fluid, z = gasoline.fluid, gasoline.z
    window = flammable_window(fluid, z).require()
    T = [window.T_lower[0] - 1.0, window.T_lower[0] + 1.0, window.T_upper[0] - 1.0, window.T_upper[0] + 1.0]
    expected = [SpaceState.TOO_LEAN, SpaceState.FLAMMABLE, SpaceState.FLAMMABLE, SpaceState.TOO_RICH]
    assert list(vapour_space(fluid, T, z).state) == expected
    assert [s.label for s in SpaceState] == ["unknown", "too lean", "flammable", "too rich"]


def test_a_rich_space_passes_through_the_range_when_air_comes_in(gasoline):
    """Summer gasoline at 20 degC: rich when saturated, flammable between two degrees of dilution."""
    fluid, z = gasoline.fluid, gasoline.z
    space = vapour_space(fluid, 293.15, z).require()
    assert space.state[0] == SpaceState.TOO_RICH
    low, high = space.saturation_lower[0], space.saturation_upper[0]
    assert 0.0 < low < high < 1.0
    s = np.array([0.99 * low, 1.01 * low, 0.99 * high, 1.01 * high])
    assert list(vapour_space(fluid, 293.15, z, saturation=s).state) == [0, 1, 1, 2]


def test_a_large_space_depletes_the_liquid(e85):
    """Published by SP and NREL in words: the window moves warmer and widens with a lower fill."""
    window = flammable_window(e85.fluid, e85.z, ratio=[0.0, 1.0, 10.0, 100.0]).require()
    assert (np.diff(window.T_lower) > 0.0).all() and (np.diff(window.T_upper) > 0.0).all()
    assert window.T_upper[3] - window.T_lower[3] > window.T_upper[0] - window.T_lower[0]


def test_the_charge_balances(gasoline):
    """Each species: liquid left and vapour in the space add up to what was charged."""
    fluid, z = gasoline.fluid, gasoline.z
    ratio = np.array([0.1, 5.0, 200.0, 5000.0])
    head = headspace(fluid, 288.15, z, ratio=ratio).require()
    volume = ratio * (z @ fluid.v_15)  # of the space, per mole charged
    left = z - head.p * (volume / (R * 288.15))[:, None]
    # Rounds stop at 1e-9 of ln p.
    assert left.sum(axis=1) == pytest.approx(head.liquid, abs=1e-7)
    assert (left > -1e-7).all() and (np.diff(head.liquid) < 0.0).all()
    wet = head.liquid > 1e-6
    left = left[wet] / left[wet].sum(axis=1, keepdims=True)
    bubble = bubble_pressure(fluid, 288.15, left).require()
    # The liquid is squeezed by one atmosphere here, by its own pressure there: 0.4 %.
    assert head.p[wet].sum(axis=1) == pytest.approx(bubble.P, rel=5e-3)


def test_a_drop_in_a_large_space_evaporates():
    fluid = Fluid.of(["n-pentane", "n-hexane"])
    head = headspace(fluid, 298.15, [0.5, 0.5], ratio=1e5).require()
    assert head.liquid[0] == 0.0
    moles = 0.5 / (1e5 * ([0.5, 0.5] @ fluid.v_15))
    assert head.p[0] == pytest.approx(moles * R * 298.15, rel=1e-9)  # the ideal gas law, exactly


def test_a_boiling_liquid_leaves_no_air():
    fluid = Fluid.of(["n-butane", "n-hexane"])
    space = vapour_space(fluid, 300.0, [[0.9, 0.1], [0.01, 0.99]]).require()
    assert list(space.boils) == [True, False]
    assert space.y[0].sum() == pytest.approx(1.0, abs=1e-12)  # normalised
    assert space.state[0] == SpaceState.TOO_RICH


def test_height_moves_the_window_down():
    fluid = Fluid.of(["n-nonane", "n-decane"])
    window = flammable_window(fluid, [0.5, 0.5], P=[101325.0, 80e3, 60e3]).require()
    assert (np.diff(window.T_lower) < 0.0).all() and (np.diff(window.T_upper) < 0.0).all()


def test_density_against_air():
    """By hand: 3 % n-hexane (86.18 g/mol) in air of 28.9652 g/mol."""
    fluid = Fluid.of(["n-hexane"])
    head = headspace(fluid, 298.15, [1.0])
    s = 0.03 / head.y[0, 0]
    space = vapour_space(fluid, 298.15, [1.0], saturation=s).require()
    # Molar mass to five digits.
    assert space.density_ratio[0] == pytest.approx(1.0 + 0.03 * (0.086175 / MW_AIR - 1.0), abs=2e-5)


def test_gases_and_water_do_not_burn():
    fluid = Fluid.of(["water", "n-decane"])
    space = vapour_space(fluid, 298.15, [1.0, 0.0]).require()
    assert space.fuel[0] == 0.0 and space.state[0] == SpaceState.TOO_LEAN
    window = flammable_window(fluid, [1.0, 0.0])
    assert window.status[0] == Status.NO_SOLUTION and np.isnan(window.T_lower[0])


def test_estimates_widen_the_range(gasoline):
    space = vapour_space(gasoline.fluid, 293.15, gasoline.z).require()
    assert 0.05 < space.estimated_lower[0] < 0.4
    for name in ("lower_ratio", "upper_ratio"):
        low, best, high = (getattr(space, name + end)[0] for end in ("_low", "", "_high"))
        assert low < best < high


def test_bad_lanes(gasoline):
    fluid, z = gasoline.fluid, gasoline.z
    space = vapour_space(
        fluid,
        [293.15, np.nan, 293.15, 293.15],
        z,
        ratio=[0.0, 0.0, -1.0, 0.0],
        saturation=[1.0, 1.0, 1.0, 1.5],
    )
    assert list(space.status) == [Status.CONVERGED, *[Status.BAD_INPUT] * 3]
    assert list(space.state[1:]) == [SpaceState.UNKNOWN] * 3 and np.isnan(space.lower_ratio[1:]).all()
    window = flammable_window(fluid, z, saturation=[0.5, 0.0, np.nan])
    assert list(window.status) == [Status.CONVERGED, Status.BAD_INPUT, Status.BAD_INPUT]
    unknown = Fluid.from_constants([540.0], [2.7e6], [0.35], [0.1])
    assert vapour_space(unknown, 300.0, [1.0]).state[0] == SpaceState.UNKNOWN


def test_batch_equals_single(e85):
    T = np.linspace(240.0, 300.0, 5)
    batch = vapour_space(e85.fluid, T, e85.z, ratio=np.linspace(0.0, 20.0, 5))
    for i in range(5):
        one = vapour_space(e85.fluid, T[i], e85.z, ratio=np.linspace(0.0, 20.0, 5)[i])
        # Rounds stop at 1e-9 of ln p, of the slowest lane in the batch.
        assert one.lower_ratio[0] == pytest.approx(batch.lower_ratio[i], rel=1e-7)


@pytest.mark.parametrize("parts", [
    {"stock:summer gasoline base": 1.0}, {"stock:winter gasoline base": 1.0},
    {"stock:summer gasoline base": 0.9, "species:ethanol": 0.1},
    {"stock:winter gasoline base": 0.2, "species:ethanol": 0.8},
    {"stock:summer gasoline base": 0.15, "species:ethanol": 0.85},
    {"stock:jet kerosene": 1.0}, {"stock:diesel": 1.0}, {"stock:condensate": 1.0},
    {"stock:denatured ethanol": 1.0},
], ids=lambda p: "+".join(k.split(":")[1] for k in p))  # fmt: skip
def test_usual_liquids_are_judged(parts):
    from screener.blends import Blend

    blend = Blend.of(parts)
    T = np.array([243.15, 263.15, 293.15, 318.15])
    space = vapour_space(blend.fluid, T, blend.z, ratio=1.0)
    assert space.ok.all() and (space.state != SpaceState.UNKNOWN).all()
    assert flammable_window(blend.fluid, blend.z).ok.all()


def test_no_word_of_the_fire_floor_promises():
    """'too rich' is a state; the tables and labels of this floor call nothing safe."""
    pattern = re.compile(r"\b(safe|safely|approved|permitted|compliant|ok|okay)\b", re.IGNORECASE)
    words = [s.label for s in SpaceState]
    for path in (data_folder() / "fire").iterdir():
        words.append(path.read_text(encoding="utf-8"))
    assert not [found.group() for text in words for found in pattern.finditer(text)]
    assert pattern.search("too rich is safe")


def test_pressure_is_atmospheric_by_default():
    fluid = Fluid.of(["ethanol"])
    assert headspace(fluid, 293.15, [1.0]).P[0] == ATMOSPHERE
