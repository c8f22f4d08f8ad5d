"""Liquid volumes: which rule applies, and that nothing is counted twice."""

from __future__ import annotations

import numpy as np
import pytest

from screener.equilibrium import Fluid
from screener.ground.constants import T_15C
from screener.volatility import liquid_expansion, liquid_molar_volume, petroleum_expansion, standard_density
from screener.volatility.volume_correction import light_expansion, own_expansion

GASOLINE = ("isopentane", "n-hexane", "2,2,4-trimethylpentane", "toluene", "m-xylene", "ethanol")


def test_petroleum_liquid_goes_by_its_density():
    fluid = Fluid.of(GASOLINE)
    x = [0.2, 0.15, 0.25, 0.2, 0.2, 0.0]
    T = np.array([260.0, 288.15, 310.0, 330.0])
    assert liquid_expansion(fluid, T, x) == pytest.approx(
        petroleum_expansion(standard_density(fluid, x), T), rel=1e-14
    )


def test_ethanol_keeps_its_own_expansion():
    """Shares of the standard volume, each with its own expansion: the rule, worked out."""
    fluid = Fluid.of(GASOLINE)
    x = np.array([0.18, 0.12, 0.22, 0.18, 0.18, 0.12])
    volume = x * fluid.v_15
    rest = np.r_[x[:5], 0.0]
    share = volume[5] / volume.sum()
    expected = (1 - share) * petroleum_expansion(
        standard_density(fluid, rest / rest.sum()), 310.0
    ) + share * own_expansion("ethanol", 310.0)
    assert liquid_expansion(fluid, 310.0, x) == pytest.approx(expected, rel=1e-14)


def test_pure_ethanol():
    assert liquid_expansion(Fluid.of(["ethanol"]), 310.0, [1.0]) == pytest.approx(
        own_expansion("ethanol", 310.0)
    )


def test_light_liquids_go_species_by_species():
    fluid = Fluid.of(["isobutane", "n-butane"])
    x = np.array([0.3, 0.7])
    each = light_expansion(fluid.Tc, fluid.omega, 310.0)[0]
    volume = x * fluid.v_15
    assert liquid_expansion(fluid, 310.0, x) == pytest.approx((volume * each).sum() / volume.sum(), rel=1e-14)


def test_a_trace_of_gas_in_butane_does_not_spoil_it():
    fluid = Fluid.of(["n-butane", "methane"])
    assert liquid_expansion(fluid, 310.0, [0.999, 0.001]) == pytest.approx(
        liquid_expansion(fluid, 310.0, [1.0, 0.0]), rel=1e-3
    )
    assert np.isnan(liquid_expansion(fluid, 310.0, [0.5, 0.5])).all()


def test_base_temperature_and_range():
    fluid = Fluid.of(GASOLINE)
    x = [0.2, 0.1, 0.2, 0.2, 0.2, 0.1]
    assert liquid_expansion(fluid, T_15C, x) == pytest.approx([1.0], abs=1e-14)
    assert np.isnan(liquid_expansion(fluid, [200.0, 500.0], x)).all()


def test_constants_without_volumes_give_no_number():
    fluid = Fluid.from_constants([469.7], [3.37e6], [0.251], [0.0721])
    assert np.isnan(liquid_molar_volume(fluid, 300.0, [1.0])).all()


def test_step_where_the_rule_changes_is_small():
    """Light naphtha into butane: where one rule takes over they differ by half a percent at 40 degC.

    The petroleum correction ends at 610.6 kg/m3, and at its end it expands less than the
    butanes and pentanes it was not made for.
    """
    fluid = Fluid.of(["n-butane", "n-pentane", "n-hexane"])
    butane = np.linspace(0.0, 0.9, 181)
    x = np.column_stack([butane, 0.6 * (1 - butane), 0.4 * (1 - butane)])
    ratio = liquid_expansion(fluid, 313.15, x)
    assert np.isfinite(ratio).all()
    step = np.diff(ratio)
    assert (step > 0.0).all()  # more butane, more expansion, on both sides and across
    assert np.sort(step)[-2] < 1.5e-4 and step.max() < 5e-3
