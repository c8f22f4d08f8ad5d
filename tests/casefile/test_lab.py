"""[blend.lab]: the numbers of a certificate to a sheet in SI, with or without parts."""

from dataclasses import fields, replace
from pathlib import Path

import pytest

from screener.blends import LabSheet
from screener.casefile import CaseText, read_case
from screener.casefile.lab import _fitted
from screener.casefile.lab_keys import OXYGENATES
from screener.ground.errors import CaseErrors, InputError
from screener.species import find

TANK = '\n[tank]\nkind = "fixed-roof"\nsurface = "white paint"\n'
SHEET = """
[blend.lab]
density = "742 kg/m^3 at 15 degC"
dvpe = "62 kPa"
distillation = { "10 %" = "55 degC", "50 %" = "98 degC", "90 %" = "165 degC", "FBP" = "200 degC" }
ethanol = "9.8 vol%"
benzene = "0.8 vol%"
"""
PARTS = '[blend]\nparts = [ { stock = "summer gasoline base", share = "90 %" }, { species = "ethanol", share = "10 %" } ]\n'


def faults(text, tables):
    with pytest.raises(CaseErrors, match="blend") as caught:
        read_case(text + TANK, tables=tables)
    return {fault.path: str(fault) for fault in caught.value.faults}


def telling(tables, answer=lambda sheet, start: start or sheet):
    """Tables whose fit writes down what it was asked for."""
    asked = []

    def fit(sheet, start):
        asked.append((sheet, start))
        return answer(sheet, start)

    return replace(tables, lab=fit), asked


def sheet_of(lines, tables):
    return read_case(f"[blend.lab]\n{lines}\n{TANK}", tables=tables).blend.sheet


def test_a_sheet_alone_is_a_blend(tables):
    case = read_case(SHEET + TANK, tables=tables)
    sheet = case.blend.sheet
    assert (sheet.density_15, sheet.dvpe, sheet.product) == (742.0, pytest.approx(62e3), "")
    assert [f for f, _ in sheet.distillation] == [0.1, 0.5, 0.9]
    assert [T for _, T in sheet.distillation] == pytest.approx([328.15, 371.15, 438.15])
    assert sheet.fbp == pytest.approx(473.15)
    assert sheet.oxygenates == (("ethanol", pytest.approx(0.098)),)
    assert sheet.benzene == pytest.approx(0.008)
    echo = {one.path: one for one in case.inputs}
    assert echo['blend.lab.distillation."50 %"'].entered == "98 degC"
    assert echo["blend.lab.dvpe"].quality == "certificate"


def test_parts_and_sheet_go_to_the_fit_together(tables):
    own, asked = telling(tables)
    read_case(PARTS + SHEET + TANK, tables=own)
    ((sheet, start),) = asked
    assert sheet.dvpe == pytest.approx(62e3)
    assert start.shares == (("stock:summer gasoline base", 0.9), ("species:ethanol", 0.1))


HEEL = """
[tank.contents]
{parts}volume = "100 m3"
temperature = "20 degC"
[tank.contents.lab]
density = "735 kg/m3"
dvpe = "61 kPa"
"""


@pytest.mark.parametrize("parts", ["", 'parts = [{ stock = "summer gasoline base", share = "100 %" }]\n'])
def test_the_heel_has_a_sheet_of_its_own(parts, tables):
    own, asked = telling(tables)
    case = read_case(SHEET + TANK + HEEL.format(parts=parts), tables=own)
    assert [sheet.density_15 for sheet, _ in asked] == [742.0, 735.0]
    assert (asked[1][1] is None) == (not parts)
    assert case.tank.contents.blend is (asked[1][1] or asked[1][0]) and case.tank.contents.volume == 100.0
    echo = {one.path: one for one in case.inputs}
    assert echo["tank.contents.lab.dvpe"].quality == "certificate"
    assert echo["tank.contents.lab.dvpe_equation"].quality == "default"
    assert "blend.at" not in echo and ("tank.contents.basis" in echo) == bool(parts)
    assert "tank.contents.lab.rvp_chamber" not in echo, "a method of a number that is not given is no input"


def test_refusals_of_both_sheets_come_at_once(tables):
    def refuse(sheet, start):
        raise InputError("lab", None, f"numbers contradict each other at {sheet.density_15:g}", "each within 3")

    own, asked = telling(tables, refuse)
    with pytest.raises(CaseErrors, match="blend") as caught:
        read_case(SHEET + TANK + HEEL.format(parts=""), tables=own)
    found = {fault.path: fault for fault in caught.value.faults}
    assert set(found) == {"blend.lab", "tank.contents.lab"} and len(asked) == 2
    assert "at 742" in found["blend.lab"].problem and "at 735" in found["tank.contents.lab"].problem


def test_beside_other_faults_no_fit_is_begun_but_what_a_sheet_lacks_is_told(tables):
    own, asked = telling(tables)
    tank = TANK.replace("[tank]", '[tank]\nshell_diameter = "2 km"')
    with pytest.raises(CaseErrors, match="blend|tank") as caught:
        read_case(SHEET + tank + HEEL.format(parts=""), tables=own)
    found = {fault.path: fault.problem for fault in caught.value.faults}
    assert set(found) == {"tank.shell_diameter", "tank.contents.lab"} and not asked
    assert "three points of the distillation" in found["tank.contents.lab"]


def test_a_sheet_is_fitted_once_and_a_refusal_is_remembered_too(tables):
    def refuse(sheet, start):
        raise InputError("lab", None, "numbers contradict each other", "each within 3")

    own, asked = telling(tables, refuse)
    for _ in range(2):
        with pytest.raises(CaseErrors, match="contradict each other"):
            read_case(SHEET + TANK, tables=own)
    assert len(asked) == 1 and _fitted.cache_info().maxsize


def test_parts_that_cannot_be_read_are_not_passed_over_for_the_sheet(tables):
    own, asked = telling(tables)
    for bad in ("95 %", "ten"):
        with pytest.raises(CaseErrors, match="blend.parts"):
            read_case(PARTS.replace("90 %", bad) + SHEET + TANK, tables=own)
    assert not asked


def test_an_empty_list_of_parts_beside_a_sheet_says_nothing(tables):
    own, asked = telling(tables)
    read_case("[blend]\nparts = []\n" + SHEET + TANK, tables=own)
    assert [start for _, start in asked] == [None]


def test_every_field_of_a_sheet_can_be_given(tables):
    """The case with every key has a full sheet for its heel."""
    own, asked = telling(tables)
    read_case(Path(__file__).parent / "cases" / "whole.toml", tables=own)
    sheet = asked[1][0]
    left_out = {one.name for one in fields(LabSheet) if getattr(sheet, one.name) == one.default}
    assert not left_out
    assert (sheet.title, sheet.dvpe_equation, sheet.rvp_chamber) == ("certificate 26-098", "EN 13016-1", "wet")
    assert sheet.h2s == pytest.approx(1e-5) and sheet.viscosity_T == pytest.approx(293.15)
    R = dict(sheet.reproducibility)
    assert R["density_15"] == pytest.approx(0.5) and R["tvp"] == pytest.approx(2e3) and R["MTBE"] == pytest.approx(0.005)
    assert R["fbp"] == pytest.approx(12 / 1.8) and R["h2s"] == pytest.approx(5e-6)
    assert len(R) == 25


def test_a_reproducibility_without_its_number_is_marked_not_used(tables):
    case = read_case(SHEET + 'reproducibility = { mtbe = "0.5 %", dvpe = "1.5 kPa", fbp = "5 K" }\n' + TANK, tables=tables)
    assert case.blend.sheet.reproducibility == (("dvpe", pytest.approx(1.5e3)), ("fbp", pytest.approx(5.0)))
    echo = {one.path: one for one in case.inputs}
    assert "not used" in echo["blend.lab.reproducibility.mtbe"].note


def test_without_parts_and_sheet_the_parts_are_missing(tables):
    assert "this is missing" in faults('[blend]\nbasis = "volume"\n', tables)["blend.parts"]


def test_every_fault_at_once_with_its_range(tables):
    found = faults(
        """[blend.lab]
density = "742"
dvpe = "-3 kPa"
benzene = "120 %"
aromatics = "20 mass%"
water = "80 ppm"
flash_point = "42"
distillation = { "10 %" = "98 degC", "50 %" = "55 degC", "55 %" = "99 degC" }
vpcr = [ { ratio = "0", temperature = "37.8 degC" } ]
octane = "95"
""",
        tables,
    )
    assert set(found) == {
        "blend.lab.density", "blend.lab.dvpe", "blend.lab.benzene", "blend.lab.aromatics", "blend.lab.water",
        "blend.lab.flash_point", 'blend.lab.distillation."50 %"', 'blend.lab.distillation."55 %"',
        "blend.lab.vpcr[0].ratio", "blend.lab.vpcr[0].pressure", "blend.lab.octane",
    }  # fmt: skip
    assert "has no unit" in found["blend.lab.density"] and "450 kg/m3 to 1100 kg/m3" in found["blend.lab.density"]
    assert "is negative; allowed: 0 kPa to 400 kPa" in found["blend.lab.dvpe"]
    assert "allowed: 0 % to 100 %" in found["blend.lab.benzene"]
    assert "does not count volume" in found["blend.lab.aromatics"]
    assert "does not count mass" in found["blend.lab.water"]
    assert "T50 (55 degC) is not above T10 (98 degC)" in found['blend.lab.distillation."50 %"']


@pytest.mark.parametrize(
    ("lines", "path", "words"),
    [
        (
            'distillation = { "10 %" = "55 degC", "90 %" = "165 degC", "FBP" = "160 degC" }',
            "blend.lab.distillation.FBP",
            "the final boiling point (160 degC) is not above T90 (165 degC)",
        ),
        ('ethanol = "60 %"\naromatics = "50 %"', "blend.lab.ethanol", "shares sum to 110 %"),
        ('benzene = "3 %"\naromatics = "2 %"', "blend.lab.benzene", "above all aromatics"),
        ('viscosity = "2 cSt"', "blend.lab.viscosity", "needs its temperature"),
        ('density = "742 kg/m3 at 20 degC"', "blend.lab.density", "write it at 15 degC or 60 degF"),
        ("", "blend.lab", "holds no number"),
        (
            'dvpe = "62 kPa"\ntrue_vapour_pressure = [ { temperature = "40 degC", pressure = "30 kPa" } ]',
            "blend.lab.true_vapour_pressure[0]",
            "contradicts the DVPE",
        ),
    ],
)
def test_contradictions_have_their_place_in_the_case(lines, path, words, tables):
    found = faults(f"[blend.lab]\n{lines}\n", tables)
    assert set(found) == {path} and words in found[path], found


def test_a_sheet_no_liquid_fits_is_a_fault_of_the_sheet(tables):
    def refuse(sheet, start):
        raise InputError("lab", None, "numbers of the sheet contradict each other: dvpe, T10", "each within 3")

    own, _ = telling(tables, refuse)
    assert "contradict each other: dvpe, T10" in faults(SHEET, own)["blend.lab"]


def test_a_bare_sheet_says_what_it_lacks_and_what_its_density_contradicts():
    lacking = '[blend.lab]\ndensity = "742 kg/m3"\n' + TANK
    with pytest.raises(CaseErrors, match="blend.lab: .*needs a density and three points"):
        read_case(lacking)
    heavy = SHEET.replace("742 kg/m^3 at 15 degC", "842 kg/m3") + 'aromatics = "5 vol%"\nolefins = "0 %"\n' + TANK
    with pytest.raises(CaseErrors, match=r"blend\.lab\.density: the density of 842 kg/m3 contradicts") as caught:
        read_case(heavy)
    assert caught.value.faults[0].value == "842 kg/m3"


def test_densities_at_60_degF_are_brought_to_15_degC(tables):
    """62 API is 141.5/193.5 x 999.016 = 730.55 kg/m3 at 60 degF; 0.556 K x 0.00125/K makes 0.5 kg/m3 of it."""
    by_api = sheet_of('density = "62 API"', tables).density_15
    # the expansion of a light gasoline is 0.0012 to 0.0013 per kelvin
    assert 730.55 + 0.555 * 730 * 0.0011 < by_api < 730.55 + 0.556 * 730 * 0.0014
    by_text = sheet_of('density = "730.55 kg/m3 at 60 degF"', tables).density_15
    assert by_text == pytest.approx(by_api, abs=0.01)  # 730.55 is rounded


def test_crude_and_its_rows(tables):
    lines = """kind = "crude"
rvpe = "50 kPa"
vpcr = [ { ratio = "4", temperature = "100 degF", pressure = "60 kPa" }, { ratio = "0.2", temperature = "37.8 degC", pressure = "70 kPa" } ]
true_vapour_pressure = [ { temperature = "20 degC", pressure = "38 kPa" } ]
water = "80 ppm mass" """
    sheet = sheet_of(lines, tables)
    assert sheet.product == "crude" and sheet.rvpe == pytest.approx(50e3)
    assert sheet.vpcr == (pytest.approx((4.0, 310.9278, 60e3)), pytest.approx((0.2, 310.95, 70e3)))
    assert sheet.tvp == (pytest.approx((293.15, 38e3)),)
    assert sheet.water == pytest.approx(8e-5)


def test_every_oxygenate_key_names_a_species_that_is_there():
    for key, name in OXYGENATES.items():
        assert find(name).name == name and find(name).family in ("alcohol", "ether"), key


def test_a_sheet_survives_being_written():
    text = CaseText.parse(PARTS + SHEET + TANK)
    again = CaseText.parse(text.toml())
    assert again == text
    again.set('blend.lab.distillation."10 %"', "54 degC")
    assert again.get('blend.lab.distillation."10 %"') == "54 degC"


def test_the_sheet_of_a_real_case_is_fitted():
    blend = read_case(PARTS + SHEET + 'reproducibility = { dvpe = "1.5 kPa" }\n' + TANK).blend
    assert next(row for row in blend.report.residuals if row[0] == "DVPE")[3] == pytest.approx(1.5e3)
    assert blend.vapour_pressure_known and blend.measured[0].what == "DVPE"
    misfits = blend.report.misfits
    # well inside the reproducibility of every method: six numbers against eighteen groups that may move
    assert len(misfits) == 8 and max(abs(v) for v in misfits.values()) < 1.0, misfits
