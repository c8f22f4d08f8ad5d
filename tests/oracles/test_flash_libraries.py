"""Flash and saturation points against thermo and CoolProp, same equation and constants, ordinary fuel states.

Hydrocarbon feeds without water: where these libraries are right (the feeds
that break them are in tests/equilibrium, against a many-start solver).
"""

import numpy as np
import pytest

from screener.equilibrium import Fluid, bubble_pressure, bubble_temperature, dew_pressure, flash_tp

NAMES = ["n-Butane", "n-Pentane", "n-Hexane", "n-Heptane", "Toluene", "n-Decane"]
Z = np.array([0.10, 0.20, 0.20, 0.20, 0.20, 0.10])
# Tc [K], Pc [Pa], omega [-], rounded; any values would do for comparing two codes
TC = [425.12, 469.7, 507.6, 540.2, 591.75, 617.7]
PC = [3.796e6, 3.370e6, 3.025e6, 2.740e6, 4.108e6, 2.110e6]
OMEGA = [0.200, 0.252, 0.301, 0.350, 0.264, 0.492]
T = np.array([250.0, 280.0, 310.0, 340.0])


@pytest.fixture(scope="module")
def thermo_flasher():
    from thermo import (
        PRMIX,
        CEOSGas,
        CEOSLiquid,
        ChemicalConstantsPackage,
        FlashVL,
        HeatCapacityGas,
        PropertyCorrelationsPackage,
    )

    c = len(TC)
    constants = ChemicalConstantsPackage(
        Tcs=TC, Pcs=PC, omegas=OMEGA, MWs=[100.0] * c, CASs=[str(i) for i in range(c)]
    )
    heat = [HeatCapacityGas(poly_fit=(50.0, 1000.0, [0.0, 0.0, 0.0, 100.0])) for _ in TC]
    correlations = PropertyCorrelationsPackage(constants, HeatCapacityGases=heat, skip_missing=True)
    parts = {"Tcs": TC, "Pcs": PC, "omegas": OMEGA, "kijs": np.zeros((c, c)).tolist()}
    gas = CEOSGas(PRMIX, parts, HeatCapacityGases=heat)
    liquid = CEOSLiquid(PRMIX, parts, HeatCapacityGases=heat)
    return FlashVL(constants, correlations, liquid=liquid, gas=gas)


@pytest.fixture(scope="module")
def ours():
    return Fluid.from_constants(TC, PC, OMEGA, np.full(len(TC), 0.1))


def test_thermo_saturation_points(ours, thermo_flasher):
    bubble, dew = bubble_pressure(ours, T, Z), dew_pressure(ours, T, Z)
    for i, t in enumerate(T):
        theirs = thermo_flasher.flash(T=t, VF=0, zs=Z.tolist())
        assert bubble.P[i] == pytest.approx(theirs.P, rel=1e-7)  # thermo stops at some 1e-8
        assert bubble.y[i] == pytest.approx(np.array(theirs.gas.zs), rel=1e-6)
        theirs = thermo_flasher.flash(T=t, VF=1, zs=Z.tolist())
        assert dew.P[i] == pytest.approx(theirs.P, rel=1e-7)
        # thermo's dew iteration leaves 2e-6 in x; ours holds equal fugacities to 1e-9
        assert dew.x[i] == pytest.approx(np.array(theirs.liquid0.zs), rel=1e-5)


def test_thermo_flash(ours, thermo_flasher):
    P = bubble_pressure(ours, T, Z).P * 0.7
    found = flash_tp(ours, T, P, Z)
    for i, t in enumerate(T):
        theirs = thermo_flasher.flash(T=t, P=P[i], zs=Z.tolist())
        # thermo ends its substitution at a sum of squares of 1e-13 or so in ln K
        assert found.beta[i] == pytest.approx(theirs.VF, rel=1e-6)
        assert found.x[i] == pytest.approx(np.array(theirs.liquid0.zs), rel=1e-6)
        assert found.y[i] == pytest.approx(np.array(theirs.gas.zs), rel=1e-6)


def test_coolprop_bubble_points():
    """CoolProp's own Peng-Robinson with its own constants, read back from it."""
    import CoolProp
    from CoolProp.CoolProp import AbstractState

    names, z = NAMES[:4], np.array([0.2, 0.3, 0.3, 0.2])
    pure = [AbstractState("PR", name) for name in names]
    fluid = Fluid.from_constants(
        [one.T_critical() for one in pure], [one.p_critical() for one in pure],
        [one.acentric_factor() for one in pure], [one.molar_mass() for one in pure],
    )  # fmt: skip
    theirs = AbstractState("PR", "&".join(names))
    theirs.set_mole_fractions(z.tolist())
    found = bubble_pressure(fluid, T, z)
    back = bubble_temperature(fluid, found.P, z)
    for i, t in enumerate(T):
        theirs.update(CoolProp.QT_INPUTS, 0.0, t)
        # CoolProp carries the critical constants of the equation to ten digits or so
        assert found.P[i] == pytest.approx(theirs.p(), rel=1e-7)
        assert back.T[i] == pytest.approx(t, abs=1e-7)
