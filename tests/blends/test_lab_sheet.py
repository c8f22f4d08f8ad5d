"""A laboratory sheet is checked against itself, every fault at once."""

from __future__ import annotations

import pytest

from screener.blends import LabSheet
from screener.blends.lab_numbers import curve_slopes, numbers_of
from screener.blends.lab_sheet import reproducibility
from screener.ground.errors import CaseErrors

C = 273.15
GOOD = {
    "density_15": 742.0,
    "dvpe": 62e3,
    "distillation": ((0.1, 55 + C), (0.5, 98 + C), (0.9, 165 + C)),
    "fbp": 200 + C,
    "oxygenates": (("ethanol", 0.098),),
    "benzene": 0.008,
    "aromatics": 0.30,
    "olefins": 0.1,
}


def faults(**changed):
    with pytest.raises(CaseErrors, match=": .*; ") as caught:
        LabSheet(**(GOOD | changed))
    found = {}
    for fault in caught.value.faults:
        found[fault.path] = f"{found.get(fault.path, '')} {fault}"
    return found


def test_every_fault_at_once():
    found = faults(
        density_15=-742.0,
        dvpe=-1.0,
        benzene=1.2,
        oxygenates=(("ethanol", -0.1), ("etanol", 0.1), ("toluene", 0.1)),
        vpcr=((4.0, 310.0, -5.0),),
        tvp=((900.0, 5e4),),
        h2s=-1e-6,
    )
    assert set(found) == {
        "density_15", "dvpe", "benzene", "oxygenates[0]", "oxygenates[1]", "oxygenates[2]", "vpcr[0]", "tvp[0]",
        "h2s",
    }  # fmt: skip
    assert "is negative" in found["dvpe"] and "allowed" in found["density_15"]
    assert "ethanol" in found["oxygenates[1]"]


@pytest.mark.parametrize(
    ("changed", "path", "text"),
    [
        ({"distillation": ((0.1, 98 + C), (0.5, 55 + C))}, "distillation", "T50 (55 degC) is not above T10"),
        ({"fbp": 160 + C}, "distillation", "final boiling point (160 degC) is not above T90 (165 degC)"),
        ({"ibp": 60 + C}, "distillation", "T10 (55 degC) is not above the initial boiling point"),
        ({"aromatics": 0.9}, "oxygenates", "the shares sum to 109.8 %"),
        ({"benzene": 0.4}, "benzene", "benzene (40 %) is above all aromatics (30 %)"),
        ({"e70": 0.5, "e100": 0.4}, "e100", "E100 (40 %) is below E70 (50 %)"),
        ({"e100": 0.2}, "e100", "E100 (20 %) contradicts the distillation points"),
        ({"tvp": ((310.95, 40e3),)}, "tvp[0]", "contradicts the DVPE of 62 kPa"),
        ({"viscosity": 1e-6}, "viscosity", "needs its temperature"),
        ({"reproducibility": (("dvpe", 0.0),)}, "reproducibility[0]", "no reproducibility"),
        ({"reproducibility": (("dvp", 1.0),)}, "reproducibility[0]", "dvpe"),
        ({"density_15": float("nan")}, "density_15", "no number"),
    ],
)
def test_each_contradiction_is_named(changed, path, text):
    found = faults(**changed)
    assert text in found[path], found


def test_an_empty_sheet_is_refused():
    with pytest.raises(CaseErrors, match="the sheet holds no number"):
        LabSheet()


def test_points_may_come_in_any_order_and_as_a_table():
    sheet = LabSheet(**(GOOD | {"distillation": {0.9: 165 + C, 0.1: 55 + C}, "oxygenates": {"MTBE": 0.1}}))
    assert sheet.distillation == ((0.1, 55 + C), (0.9, 165 + C))
    assert sheet.oxygenates == (("MTBE", 0.1),)


@pytest.mark.parametrize("name", ["dvpe", "rvp", "rvpe", "vpcr", "tvp"])
def test_any_vapour_pressure_makes_it_known(name):
    value = {"vpcr": ((4.0, 310.93, 5e4),), "tvp": ((293.15, 4e4),)}.get(name, 5e4)
    assert LabSheet(**{name: value}).vapour_pressure_known
    assert not LabSheet(density_15=742.0).vapour_pressure_known


def test_reproducibility_by_hand():
    """0.01014 (62 + 124) = 1.886 kPa; 2.0 + 1.74 x 1.5 = 4.61 degC; 0.221 x 0.8^0.67 = 0.1903 vol%."""
    # the table's constant 1.257 is 0.01014 x 124 rounded to four digits
    assert reproducibility("dvpe", 62.0) == pytest.approx(0.01014 * 186.0, abs=1e-3)
    assert reproducibility("distillation", 98.0, 1.5) == pytest.approx(4.61)
    assert reproducibility("benzene", 0.8) == pytest.approx(0.1903, abs=5e-5)


def test_numbers_carry_their_reproducibility_in_si():
    own = (("density_15", 0.2), ("vpcr", 900.0))
    sheet = LabSheet(**GOOD, vpcr=((4.0, 310.93, 6e4),), reproducibility=own)
    numbers = {one.name: one for one in numbers_of(sheet)}
    assert numbers["density at 15 degC"].R == 0.2
    assert numbers["VPCR4 at 37.78 degC"].R == 900.0
    assert numbers["DVPE"].R == pytest.approx(1886.0, abs=1.0)
    assert numbers["benzene"].R == pytest.approx(0.001903, abs=5e-7)
    assert numbers["FBP"].guide and not numbers["T90"].guide
    # middle of the slopes 43 degC over 40 % and 67 degC over 40 %: equal spacing, so their mean
    assert curve_slopes(sheet)[0.5] == pytest.approx((43.0 + 67.0) / 80.0)
    assert numbers["T50"].R == pytest.approx(2.0 + 1.74 * 110.0 / 80.0)
