"""Parts of a blend typed on one line: what is read, and what is refused with its reason."""

from __future__ import annotations

import json
import re
from dataclasses import replace

import pytest

from screener.blends import Blend
from screener.blends.measured import MeasuredPressure
from screener.cli import main
from screener.cli.quick import read_parts
from screener.cli.quick_answers import Liquid, groups
from screener.ground.errors import CaseErrors, InputError
from screener.volatility import dvpe, reid_vapour_pressure


@pytest.mark.parametrize(
    ("text", "parts"),
    [
        (
            "85% stock:summer gasoline base + 15% ethanol",
            {"stock:summer gasoline base": 0.85, "ethanol": 0.15},
        ),
        (
            "85 % stock:light naphtha+15 %species:ethanol",
            {"stock:light naphtha": 0.85, "species:ethanol": 0.15},
        ),
        ("12,5% ethanol + 87.5% 2,2,4-trimethylpentane", {"ethanol": 0.125, "2,2,4-trimethylpentane": 0.875}),
        ("100% n-butane", {"n-butane": 1.0}),
        ("n-butane", {"n-butane": 1.0}),
        ("stock:jet kerosene", {"stock:jet kerosene": 1.0}),
        ("33.3% a + 33.3% b + 33.35% c", {"a": 0.333, "b": 0.333, "c": 0.3335}),
    ],
)
def test_parts_are_read(text, parts):
    assert read_parts(text) == pytest.approx(parts, rel=1e-12)  # rounding of one division


@pytest.mark.parametrize(
    ("text", "said"),
    [
        ("", "no blend given"),
        (" + ", "no blend given"),
        ("85% a + 10% b", "the shares come to 95 %; they must come to 100 % within 0.05"),
        ("85% a + 15.06% b", "the shares come to 100.06 %"),
        ("0% a + 100% b", "blend part 1: 0 % is not a share"),
        ("120% a", "120 % is not a share"),
        ("-5% a + 105% b", "'-5% a' is not a part of a blend"),
        ("a + b", "'a' is not a part of a blend"),
        ("85% + 15% b", "'85%' is not a part of a blend"),
        ("50% a + 50% a", "a stands in the blend twice"),
        ("a 85% + 15% b", "'a 85%' is not a part of a blend"),
    ],
)
def test_what_cannot_be_read_is_refused(text, said):
    with pytest.raises(InputError, match=re.escape(said)):
        read_parts(text)


def quick(capsys, *argv) -> tuple[int, dict]:
    code = main(["quick", *argv, "--json"])
    body = json.loads(capsys.readouterr().out)
    return code, {item["id"]: item for item in body["answers"]} | {"vapour": body["first_vapour"]}


def test_a_pure_liquid_boils_at_its_boiling_point(capsys):
    """At its normal boiling point the bubble pressure is one atmosphere; 0.5 % for the fit of the curve."""
    code, found = quick(capsys, "100% toluene", "--at", "110.6degC")
    assert code == 0
    assert found["bubble_pressure"]["value"] == pytest.approx(101325.0, rel=5e-3)
    assert found["vapour"] == [{"species": "toluene", "y": 1.0, "x": 1.0}]


def test_a_flashed_blend_tells_its_vapour(capsys):
    code, found = quick(capsys, "40% n-butane + 60% toluene", "--at", "35degC")
    assert code == 2  # it boils below 0 degC, so no air-saturated sample exists and no DVPE
    assert found["DVPE"]["value"] is None
    assert 0.05 < found["vapour_fraction"]["value"] < 0.6
    assert found["vapour"][0]["species"] == "n-butane"
    assert found["vapour"][0]["y"] > 0.95
    assert sum(row["y"] for row in found["vapour"]) == pytest.approx(1.0, abs=1e-9)  # two species: all of it


def test_a_liquid_that_splits_has_the_pressure_of_both_and_no_standard_test(capsys):
    """Water and toluene hardly mix: their vapour pressures at 20 degC add up, 2.339 and 2.91 kPa, within 1 %."""
    code, found = quick(capsys, "80% water + 20% toluene", "--at", "20degC")
    assert code == 2
    assert found["bubble_pressure"]["value"] == pytest.approx(2339.0 + 2910.0, rel=0.01)
    assert "two liquids" in found["bubble_pressure"]["by"]
    assert found["DVPE"]["value"] is None and "two" in found["DVPE"]["reason"]
    assert found["density_15_degC"]["value"] > 900.0


def test_quick_lists_faults_of_blend_and_temperature(capsys):
    assert main(["quick", "50% toluen + 50% ethanol", "--at", "35"]) == 3
    said = capsys.readouterr().err
    assert "2 faults" in said
    assert "toluen" in said
    assert "--at" in said


def test_the_page_says_what_percent_means(capsys):
    assert main(["quick", "90% toluene + 10% n-pentane", "--at", "95degF", "--units", "us"]) == 0
    said = capsys.readouterr().out
    assert "percent is volume at 15 degC" in said
    assert "at 95.0 degF" in said
    assert "psi" in said and "flash point at 14.70 psi" in said and "101.3" not in said


def test_every_fault_is_listed():
    with pytest.raises(CaseErrors, match="part 1(.|\n)*part 3") as caught:
        read_parts("x + 50% a + 200% b")
    assert len(caught.value.faults) == 2


GROUPS = ["main", "vapour_pressures", "volatility", "distillations", "from_reid", "classes"]


def texts_of(body) -> dict:
    """Answers of the last group by id."""
    return {item["id"]: item for item in body["answers"] if item["group"] == "classes"}


def test_all_the_standard_tests_of_a_gasoline(capsys):
    """Relations between the tests, whatever the property tables say; pressures in Pa, shares as fractions."""
    code = main(["quick", "stock:summer gasoline base", "--at", "30degC", "--json"])
    body = json.loads(capsys.readouterr().out)
    assert code == body["exit_code"] == 0
    assert [group["id"] for group in body["groups"]] == GROUPS
    assert len({item["id"] for item in body["answers"]}) == len(body["answers"]) >= 38
    assert {item["group"] for item in body["answers"]} == set(GROUPS)
    found = {item["id"]: item["value"] for item in body["answers"]}
    X = found["total_pressure"]
    assert found["DVPE"] == pytest.approx(0.965 * X - 3780.0, rel=1e-9)  # one line, read in one place
    assert found["DVPE_EN"] == pytest.approx(found["DVPE"], rel=1e-9)
    assert found["DVPE_CARB"] < found["DVPE"] < found["DVPE_EPA"] < X
    assert found["VPCR4"] < found["VPCR_low"] < found["TVP_100F"]  # light ends leave the liquid as the vapour grows
    assert found["bubble_pressure"] < found["TVP_100F"]
    assert abs(found["Reid_dry"] - found["DVPE"]) < 5e3 and found["Reid_wet"] != found["Reid_dry"]
    curve = [found[f"D86_{name}"] for name in ("IBP", "T10", "T50", "T90", "FBP")]
    assert curve == sorted(curve)
    assert found["D86_E70"] < found["D86_E100"] < found["D86_E150"]
    assert found["D86_T10"] < found["T10"] and found["D86_E70"] > found["E70"]  # the neck sharpens the cut
    assert abs(found["T_ratio_20"] - found["T_ratio_20_line"]) < 4.0  # what the line is drawn for
    assert found["vapour_lock_index"] == pytest.approx(10 * found["DVPE"] / 1e3 + 700 * found["E70"], rel=1e-9)
    assert found["true_from_reid_refined"] < found["true_from_reid_refined_100F"]
    # the cross-check knows a fuel by two numbers: 15 % is what such fuels scatter by about the correlation
    assert found["true_from_reid_refined_100F"] == pytest.approx(found["TVP_100F"], rel=0.15)
    assert found["ethanol_allowance"] == 0.0 and found["flash_point"] < 273.15
    assert texts_of(body)["classes ASTM D5798"]["text"] == "none"
    assert texts_of(body)["classes vapour lock"]["text"]
    assert found["RVPE"] is None and found["true_from_reid_crude"] is None
    texts = texts_of(body)
    assert texts["classes ASTM D4814"]["text"] and "edition" in texts["classes ASTM D4814"]["by"]
    assert all(item["value"] is not None or item["text"] or item["reason"] for item in body["answers"])
    assert all(item["by"] or item["reason"] for item in body["answers"])


def test_what_a_test_does_not_cover_is_unknown_with_the_reason(capsys):
    _, found = quick(capsys, "85% stock:summer gasoline base + 15% ethanol", "--at", "37.8degC")
    for key, words in (
        ("Reid_wet", "alcohol"), ("T_ratio_20_line", "alcohol"), ("true_from_reid_refined", "alcohol"),
        ("RVPE", "crude"), ("ethanol_allowance", "10 vol%"),
    ):  # fmt: skip
        assert found[key]["value"] is None and words in found[key]["reason"], key
    assert found["VPCR4"]["value"] > 0.0


def test_an_ethanol_fuel_has_its_own_classes(capsys):
    _, found = quick(capsys, "25% stock:natural gasoline + 75% ethanol", "--at", "20degC")
    assert found["classes ASTM D5798"]["text"] and found["classes ASTM D5798"]["text"] != "none"


def test_what_boils_in_the_ice_bath_has_no_sample(capsys):
    _, found = quick(capsys, "stock:field butane", "--at", "-10degC")
    for key in ("DVPE", "total_pressure", "DVPE_EPA"):
        assert found[key]["value"] is None and "boils at 0 to 1 degC" in found[key]["reason"], key
    _, found = quick(capsys, "stock:diesel", "--at", "20degC")
    assert found["DVPE"]["value"] is None and "7 to 130 kPa" in found["DVPE"]["reason"]
    assert found["total_pressure"]["value"] < 7e3


def test_a_condensate_has_its_own_figures(capsys):
    _, found = quick(capsys, "stock:condensate", "--at", "30degC")
    assert 0.5 < found["RVPE"]["value"] / found["VPCR4"]["value"] < 1.0 and "memory" in found["RVPE"]["by"]
    assert found["true_from_reid_crude"]["value"] > 0.0 and found["true_from_reid_refined"]["value"] is None
    assert found["classes ASTM D4814"]["text"] == "" and "no gasoline" in found["classes ASTM D4814"]["reason"]


def test_a_sheet_without_vapour_pressure_gives_none():
    """Every figure that is one, or is made of one, is unknown; a distillation is not."""
    known = Blend.of({"stock:summer gasoline base": 1.0})
    made = groups(Liquid(replace(known, vapour_pressure_known=False), 303.15, "si"))
    found = {item.key: item for group in made for item in group.answers}
    for key in ("bubble_pressure", "DVPE", "TVP_100F", "VPCR4", "Reid_dry", "D6378", "T_ratio_20",
                "vapour_lock_index", "vapour_fraction", "flash_point", "classes EN 228 E10"):  # fmt: skip
        assert found[key].value is None and "no vapour pressure" in found[key].why, key
    assert found["D86_T50"].value and found["density_15_degC"].value and found["driveability_index"].value


def test_a_measured_vapour_pressure_moves_every_test_of_it_and_leaves_the_air_alone():
    """8 % more vapour of its own: whole figures without air grow by 8 %, those with air by 8 % of the vapour in them."""
    known = Blend.of({"stock:summer gasoline base": 1.0})
    seen = MeasuredPressure("true vapour pressure", 1.08, 310.93, 1.0, 1.08, 0.03, 0.03)
    plain, moved = (
        {item.key: item for group in groups(Liquid(blend, 303.15, "si")) for item in group.answers}
        for blend in (known, replace(known, measured=(seen,)))
    )
    for key in ("bubble_pressure", "TVP_100F", "VPCR4", "VPCR_low"):
        assert moved[key].value == pytest.approx(1.08 * plain[key].value, rel=1e-12), key
        assert "1.080" in moved[key].by, key
    cell, gas = dvpe(known.fluid, known.z), reid_vapour_pressure(known.fluid, known.z)
    more = 0.08 * cell.P_vapour[0]
    assert moved["total_pressure"].value == pytest.approx(plain["total_pressure"].value + more, rel=1e-12)
    assert moved["DVPE_EN"].value == pytest.approx(plain["DVPE_EN"].value + 0.965 * more, rel=1e-12)
    assert moved["Reid_dry"].value == pytest.approx(plain["Reid_dry"].value + 0.08 * gas.P_vapour[0], rel=1e-12)
    assert 1.07 < moved["D6378"].value / plain["D6378"].value < 1.09
    assert moved["true_from_reid_refined"].value > 1.07 * plain["true_from_reid_refined"].value
    assert moved["T_ratio_20"].value < plain["T_ratio_20"].value


SHEET = """[lab]
title = "certificate 26-114"
density = "742 kg/m3"
dvpe = "62 kPa"
distillation = { "10 %" = "55 degC", "50 %" = "98 degC", "90 %" = "165 degC" }
ethanol = "9.8 vol%"
"""


def written(tmp_path, text, name="sheet.toml"):
    file = tmp_path / name
    file.write_text(text, encoding="utf-8")
    return str(file)


def test_quick_takes_a_sheet_and_the_recipe_it_is_corrected_from(tmp_path, capsys):
    argv = ["quick", "90% stock:summer gasoline base + 10% ethanol", "--lab", written(tmp_path, SHEET), "--at", "20degC"]
    assert main([*argv, "--json"]) == 0
    body = json.loads(capsys.readouterr().out)
    found = {item["id"]: item for item in body["answers"]}
    assert found["DVPE"]["value"] == pytest.approx(62e3) and found["DVPE"]["by"].startswith("measured")
    assert found["D86_T50"]["value"] == pytest.approx(371.15) and found["D86_T50"]["by"].startswith("measured")
    assert found["T50"]["by"].startswith("open still")
    assert [row["key"] for row in body["sheet"]] == ["density_15", "dvpe", "distillation", "distillation",
                                                      "distillation", "ethanol"]  # fmt: skip
    assert all(abs(row["misfit"]) < 1.0 for row in body["sheet"])  # six numbers, and more groups that may move
    assert main(argv) == 0  # the fit is kept, so this one costs nothing
    page = capsys.readouterr().out
    assert page.startswith("certificate 26-114 at 20.0 degC")
    assert re.search(r"^DVPE +62\.0 kPa +6\d\.\d kPa +[-+]\d\.\d+ kPa +[-+]0\.\d\d$", page, re.MULTILINE), page


def test_faults_of_a_sheet_have_their_place_in_its_file(tmp_path, capsys):
    bad = SHEET.replace("742 kg/m3", "742").replace('"98 degC"', '"48 degC"') + 'h2s = "20 ppm"\n'
    assert main(["quick", "--lab", written(tmp_path, bad), "--at", "20"]) == 3
    said = capsys.readouterr().err
    assert "4 faults" in said and "--at" in said
    assert "lab.density: '742' has no unit" in said
    assert 'lab.distillation."50 %": T50 (48 degC) is not above T10 (55 degC)' in said
    assert "lab.h2s" in said and "blend.lab" not in said


@pytest.mark.parametrize(
    ("text", "said"),
    [
        ("[tank]\n", "holds no laboratory sheet; a [lab] table with the keys of [blend.lab]"),
        (SHEET + "[tank]\n", "beside [lab] stands [tank]"),
        ("[lab\n", "this is not TOML"),
        ('[blend]\nparts = [{ species = "toluene", share = "100 %" }]\n' + SHEET.replace("[lab]", "[blend.lab]"),
         "the parts are given twice"),
    ],
)  # fmt: skip
def test_a_file_without_a_sheet_is_refused(text, said, tmp_path, capsys):
    assert main(["quick", "toluene", "--lab", written(tmp_path, text), "--at", "20degC"]) == 3
    assert said in capsys.readouterr().err


def test_the_sheet_of_a_case_file_is_read_without_the_rest_of_the_case(tmp_path, capsys):
    text = SHEET.replace("[lab]", "[blend.lab]").replace('dvpe = "62 kPa"', 'dvpe = "-62 kPa"')
    assert main(["quick", "--lab", written(tmp_path, text + "[tank]\n"), "--at", "20degC"]) == 3
    said = capsys.readouterr().err
    assert "1 fault in the input" in said and "blend.lab.dvpe" in said


def test_quick_needs_a_blend_or_a_sheet(capsys):
    assert main(["quick", "--at", "20degC"]) == 3
    assert "no blend given" in capsys.readouterr().err
