"""Water of a sheet beyond what its liquid dissolves: free water, which takes no light ends out of the composition."""

from __future__ import annotations

import pytest

from screener.blends import Blend, LabSheet
from screener.equilibrium import bubble_pressure, first_vapour

C = 273.15
CRUDE = {
    "density_15": 850.0,
    "rvpe": 50e3,
    "distillation": ((0.05, 70 + C), (0.1, 100 + C), (0.3, 210 + C), (0.5, 310 + C), (0.7, 420 + C)),
    "product": "crude",
}
T = 40.0 + C


@pytest.fixture(scope="module")
def crudes():
    return {water: Blend.from_lab(LabSheet(**CRUDE, water=water)) for water in (None, 5e-5, 3e-3)}


def test_a_wet_crude_keeps_its_light_ends(crudes):
    """0.3 % of water is what certificates of crude hold. The Reid pressure is met either way, so that the dry
    crude differs by the 7 kPa of water at 40 degC that stand in the measured one, and no more."""
    dry, wet = crudes[None], crudes[3e-3]
    P = [bubble_pressure(b.fluid, T, b.z).P[0] for b in (dry, wet)]
    assert abs(P[1] - P[0]) < 7.4e3  # vapour pressure of water at 40 degC, published steam tables
    settled = first_vapour(wet.fluid, T, wet.z)
    assert settled.ok[0] and settled.P[0] == pytest.approx(P[1], rel=0.02)  # just saturated at 37.8 degC
    assert all(abs(misfit) < 1.5 for misfit in wet.report.misfits.values())


def test_free_water_is_told_with_both_figures(crudes):
    wet = crudes[3e-3]
    (note,) = (line for line in wet.report.assumed if "free water" in line)
    assert "3000 ppm mass" in note and "37.8 degC" in note
    figure = wet.figure("water")
    assert figure.what == "water dissolved" and figure.value < 2e-4


def test_water_that_dissolves_stays_as_measured(crudes):
    damp = crudes[5e-5]
    assert damp.figure("water").what == "water" and damp.figure("water").value == 5e-5
    assert not any("free water" in line for line in damp.report.assumed)


def test_ethanol_takes_up_what_gasoline_leaves():
    sheet = LabSheet(dvpe=62e3, water=3e-3)
    base = Blend.of({"stock:summer gasoline base": 1.0})
    e10 = Blend.of({"stock:summer gasoline base": 0.9, "species:ethanol": 0.1})
    whats = [Blend.from_lab(sheet, recipe).figure("water").what for recipe in (base, e10)]
    assert whats == ["water dissolved", "water"]
