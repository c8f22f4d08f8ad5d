"""A composition from a laboratory sheet; all twenty round trips are in tests/studies/lab_sheets.md."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from screener.blends import Blend, LabSheet
from screener.blends.measured import BLIND, pressure_factor, told
from screener.ground.errors import InputError
from screener.volatility import dvpe, true_vapour_pressure
from tests.studies.lab_sheets import hidden

C = 273.15
GASOLINE = LabSheet(
    density_15=742.0,
    dvpe=62e3,
    distillation=((0.1, 52 + C), (0.5, 98 + C), (0.9, 165 + C)),
    fbp=200 + C,
    oxygenates=(("ethanol", 0.098),),
    benzene=0.008,
)


@pytest.fixture(scope="module")
def gasoline():
    recipe = Blend.of({"stock:summer gasoline base": 0.9, "species:ethanol": 0.1})
    return Blend.from_lab(GASOLINE, recipe)


@pytest.mark.parametrize("i", [1, 12, 17])
def test_a_hidden_recipe_comes_back(i):
    """Ethanol gasoline from a recipe that lacks species, gasoline from the sheet alone, condensate from a recipe."""
    case = hidden(i)
    assert 12 <= len(case.blend.names) <= 25
    assert case.start is None or set(case.blend.names) - set(case.start.names)
    fitted = Blend.from_lab(case.sheet, case.start)
    assert max(abs(v) for v in fitted.report.misfits.values()) < 1.0  # within reproducibility in every number
    for T in (293.15, 323.15):
        true, back = (true_vapour_pressure(b.fluid, T, b.z).P[0] for b in (case.blend, fitted))
        assert back == pytest.approx(true, rel=0.05)  # asked of the worst of twenty; the study prints all
    assert fitted.vapour_pressure_known and fitted.measured
    assert fitted.product == case.sheet.product


def test_report_holds_measured_computed_and_reproducibility(gasoline):
    rows = {name: row for name, *row in gasoline.report.residuals}
    assert set(rows) == {"density at 15 degC", "DVPE", "T10", "T50", "T90", "FBP", "ethanol", "benzene"}
    measured, computed, R = rows["DVPE"]
    assert measured == 62e3
    assert computed == pytest.approx(
        dvpe(gasoline.fluid, gasoline.z).P[0], rel=1e-6
    )  # same test, same liquid
    assert gasoline.report.misfits["DVPE"] == pytest.approx((computed - measured) / R)
    assert rows["density at 15 degC"][1] == pytest.approx(gasoline.density_15, rel=1e-9)
    told = [line for line in gasoline.report.assumed if line.startswith("laboratory sheet, DVPE")]
    shown = f"computed {computed / 1e3:.4g} kPa, {(computed - measured) / R:+.2f} of its reproducibility"
    assert told == [f"laboratory sheet, DVPE: measured 62 kPa, {shown}"]
    assert sum(gasoline.volume_fractions) == pytest.approx(1.0)
    assert gasoline.oxygenates["ethanol"] == pytest.approx(rows["ethanol"][1], rel=1e-6)


def test_measured_pressure_and_its_ratio(gasoline):
    """The ratio is that of the fuel's own vapour: air and correlation taken off alike on both sides."""
    one = gasoline.measured[0]
    test = dvpe(gasoline.fluid, gasoline.z)
    own = (62.0e3 + 3.78e3) / 0.965 - test.P_air[0]
    assert (one.what, one.value, one.T) == ("DVPE", 62e3, pytest.approx(310.928, abs=1e-3))
    assert one.ratio == pytest.approx(own / test.P_vapour[0], rel=1e-6)
    # R of the DVPE, through the slope 0.965 of its equation, over the fuel's own vapour in the cell.
    assert one.doubt == pytest.approx(one.reproducibility / 0.965 / test.P_vapour[0], rel=1e-6)
    assert one.misfit == pytest.approx(gasoline.report.misfits["DVPE"])


def test_every_number_of_the_sheet_stays_with_the_blend(gasoline):
    rows = [(f.what, f.value, f.computed, f.reproducibility) for f in gasoline.figures]
    assert rows == list(gasoline.report.residuals)
    assert [f.misfit for f in gasoline.figures] == pytest.approx(list(gasoline.report.misfits.values()))
    assert gasoline.figure("density_15").value == 742.0
    assert gasoline.figure("distillation", 0.9).value == 165 + C
    assert gasoline.figure("distillation") is None and gasoline.figure("flash_point") is None
    assert hash(gasoline) == hash(replace(gasoline)) and gasoline == replace(gasoline)
    mixed = gasoline.mixed_with(Blend.of({"species:toluene": 1.0}), volume=1.0, other_volume=1.0)
    assert mixed.figures == ()


def test_the_test_of_a_jet_fuel_tells_no_factor():
    """R of a DVPE of 1.5 kPa is 1.27 kPa: the ratio would be noise, and the range carries R instead."""
    jet = Blend.of({"stock:jet kerosene": 1.0})
    fitted = Blend.from_lab(LabSheet(density_15=jet.density_15, dvpe=1.5e3), jet)
    (one,) = fitted.measured
    assert one.doubt > BLIND and told(fitted.measured) is None
    assert pressure_factor(fitted.measured) == (1.0, one.doubt)


def test_a_mixture_measures_nothing(gasoline):
    other = Blend.of({"species:n-butane": 1.0})
    mixed = gasoline.mixed_with(other, volume=1.0, other_volume=0.1)
    assert mixed.measured == () and mixed.vapour_pressure_known


def test_a_sheet_without_vapour_pressure_is_fitted_and_marked():
    sheet = LabSheet(
        density_15=803.0,
        distillation=((0.1, 168 + C), (0.5, 197 + C), (0.9, 239 + C)),
        flash_point=42 + C,
        aromatics=0.18,
    )
    jet = Blend.from_lab(sheet)
    assert not jet.vapour_pressure_known and jet.measured == ()
    assert any("not known" in line for line in jet.report.assumed)
    assert max(abs(v) for v in jet.report.misfits.values()) < 1.0
    mixed = jet.mixed_with(Blend.of({"species:toluene": 1.0}), volume=1.0, other_volume=1.0)
    assert not mixed.vapour_pressure_known


def test_numbers_no_liquid_has_together_are_named():
    """95 kPa of vapour pressure with nothing gone below 65 degC."""
    sheet = LabSheet(
        density_15=742.0,
        dvpe=95e3,
        distillation=((0.05, 65 + C), (0.1, 72 + C), (0.5, 105 + C), (0.9, 165 + C)),
    )
    with pytest.raises(InputError, match=r"contradict.*T5: sheet 65 degC.*DVPE: sheet 95 kPa"):
        Blend.from_lab(sheet)


def test_a_density_the_families_forbid_is_named():
    """45 % aromatics of about 870 kg/m3 leave 540 kg/m3 to the rest of a gasoline of 690."""
    sheet = LabSheet(
        density_15=690.0, distillation=((0.1, 52 + C), (0.5, 105 + C), (0.9, 165 + C)), aromatics=0.45
    )
    with pytest.raises(InputError, match="density of 690 kg/m3 contradicts distillation and families"):
        Blend.from_lab(sheet)


def test_a_bare_sheet_needs_density_and_a_curve():
    with pytest.raises(InputError, match="needs a density and three points"):
        Blend.from_lab(LabSheet(dvpe=60e3))


def test_traces_named_by_the_sheet_come_into_the_blend():
    start = Blend.of({"stock:condensate": 1.0})
    sheet = LabSheet(density_15=start.density_15, h2s=3e-5, water=1e-4, product="crude")
    fitted = Blend.from_lab(sheet, start)
    mass = dict(zip(fitted.names, fitted.w, strict=True))
    assert mass["hydrogen sulfide"] == pytest.approx(3e-5, rel=0.05)  # its reproducibility is 30 %
    assert mass["water"] == pytest.approx(1e-4, rel=0.05)
    assert np.isclose(fitted.density_15, start.density_15, atol=0.05)  # a tenth of the reproducibility
