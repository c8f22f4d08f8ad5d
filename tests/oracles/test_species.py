"""Species data against CoolProp: vapour pressure, liquid density at 15 degC, ideal-gas heat capacity."""

from __future__ import annotations

import CoolProp.CoolProp as CP
import numpy as np
import pytest

from screener.species import find, forms

FLUIDS = {
    "propane": "n-Propane", "n-butane": "n-Butane", "isobutane": "IsoButane", "n-pentane": "n-Pentane",
    "isopentane": "Isopentane", "neopentane": "Neopentane", "n-hexane": "n-Hexane", "2-methylpentane": "Isohexane",
    "n-heptane": "n-Heptane", "n-octane": "n-Octane", "n-nonane": "n-Nonane", "n-decane": "n-Decane",
    "n-undecane": "n-Undecane", "n-dodecane": "n-Dodecane", "cyclohexane": "CycloHexane",
    "cyclopentane": "Cyclopentane", "benzene": "Benzene", "toluene": "Toluene", "ethylbenzene": "EthylBenzene",
    "m-xylene": "m-Xylene", "p-xylene": "p-Xylene", "methanol": "Methanol", "ethanol": "Ethanol", "water": "Water",
    "isobutene": "IsoButene", "1-butene": "1-Butene", "cis-2-butene": "cis-2-Butene",
    "trans-2-butene": "trans-2-Butene", "propylene": "Propylene", "hydrogen sulfide": "HydrogenSulfide",
    "acetone": "Acetone", "diethyl ether": "DiethylEther",
}  # fmt: skip
GASES = {"nitrogen": "Nitrogen", "oxygen": "Oxygen", "methane": "Methane", "carbon dioxide": "CarbonDioxide",
         "ethane": "Ethane", "hydrogen": "Hydrogen"}  # fmt: skip


@pytest.mark.parametrize("name", FLUIDS)
def test_vapour_pressure(name):
    one, fluid = find(name), FLUIDS[name]
    low = max(250.0, CP.PropsSI("Tmin", fluid) + 0.1)
    T = np.linspace(low, min(350.0, 0.9 * one.Tc), 11)
    oracle = np.array([CP.PropsSI("P", "T", t, "Q", 0, fluid) for t in T])
    miss = np.abs(one.psat(T) / oracle - 1.0)
    print(f"{name:18s} mean {100 * miss.mean():.3f} % worst {100 * miss.max():.3f} %")
    # 0.25 %: the same reference equations through two fits; n-heptane rests on two different ones
    assert miss.max() < 0.0025


@pytest.mark.parametrize("name", FLUIDS)
def test_density_at_15_degrees(name):
    rho = CP.PropsSI("D", "T", 288.15, "Q", 0, FLUIDS[name])
    # 0.2 %: p-xylene and benzene rest on other sources near their melting points
    assert find(name).rho_15 == pytest.approx(rho, rel=2e-3)


@pytest.mark.parametrize("name", GASES)
def test_gases_where_they_are_subcritical(name):
    one, fluid = find(name), GASES[name]
    T = np.linspace(max(one.curve.T_low, CP.PropsSI("Tmin", fluid)) + 0.1, 0.97 * one.Tc, 11)
    oracle = np.array([CP.PropsSI("P", "T", t, "Q", 0, fluid) for t in T])
    # 0.1 %: fit of the curve
    assert np.max(np.abs(one.psat(T) / oracle - 1.0)) < 1e-3


@pytest.mark.parametrize("name", [*FLUIDS, *GASES])
def test_ideal_heat_capacity(name):
    one, fluid = find(name), (FLUIDS | GASES)[name]
    low = max(260.0, CP.PropsSI("Tmin", fluid) + 1.0)
    T = np.linspace(low, 450.0, 6)
    oracle = np.array([CP.PropsSI("CP0MOLAR", "T", t, "P", 1000.0, fluid) for t in T])
    # 2 %: different statistical sources; a few species have one of their own in each library
    assert np.max(np.abs(forms.cp_ideal(one.cp_ideal, T) / oracle - 1.0)) < 0.02
