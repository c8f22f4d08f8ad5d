"""Thermal expansion of liquids against CoolProp's reference equations."""

from __future__ import annotations

import CoolProp.CoolProp as CP
import numpy as np
import pytest

from screener.ground.constants import T_15C
from screener.volatility import petroleum_expansion
from screener.volatility.volume_correction import light_expansion, own_expansion

T = np.linspace(233.15, 333.15, 11)


def reference(fluid, T=T):
    base = CP.PropsSI("D", "T", T_15C, "Q", 0, fluid)
    return np.array([base / CP.PropsSI("D", "T", t, "Q", 0, fluid) for t in T])


@pytest.mark.parametrize("fluid", ["Propane", "IsoButane", "n-Butane", "1-Butene", "Isopentane", "n-Pentane"])
def test_light_hydrocarbons(fluid):
    ours = light_expansion([CP.PropsSI("Tcrit", fluid)], [CP.PropsSI("acentric", fluid)], T)[:, 0]
    assert ours == pytest.approx(reference(fluid), rel=3e-3)  # the correlation's own scatter


@pytest.mark.parametrize("name", ["ethanol", "methanol"])
def test_alcohols(name):
    assert own_expansion(name, T) == pytest.approx(reference(name.capitalize()), rel=3e-4)  # error of the fit


def test_water():
    warm = np.linspace(274.0, 333.0, 8)
    assert own_expansion("water", warm) == pytest.approx(reference("Water", warm), rel=3e-4)


@pytest.mark.parametrize(
    ("fluid", "sign"), [("n-Hexane", 1), ("n-Octane", 1), ("n-Decane", 1), ("Toluene", -1)]
)
def test_petroleum_correction_on_pure_hydrocarbons(fluid, sign):
    """A correlation by density for mixed stocks, tried on pure paraffins and on toluene.

    Normal paraffins are light for their boiling point and expand less than a gasoline of
    their density, toluene is as heavy as diesel and expands more: within 1.4 % of the
    volume over 0 to 60 degC, on the known side. A mixed fuel holds both.
    """
    warm = np.linspace(273.15, 333.15, 7)
    rho_15 = CP.PropsSI("D", "T", T_15C, "Q", 0, fluid)
    error = petroleum_expansion(rho_15, warm) / reference(fluid, warm) - 1.0
    assert np.abs(error).max() < 0.014
    assert sign * error[-1] > 0.002
