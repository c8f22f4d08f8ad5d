"""Parts of a blend typed on one line: what is read, and what is refused with its reason."""

from __future__ import annotations

import json
import re

import pytest

from screener.cli import main
from screener.cli.quick import read_parts
from screener.ground.errors import CaseErrors, InputError


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


def test_a_liquid_that_splits_has_no_single_answer(capsys):
    code, found = quick(capsys, "80% water + 20% toluene", "--at", "20degC")
    assert code == 2
    assert found["bubble_pressure"]["value"] is None
    assert "two" in found["bubble_pressure"]["reason"]
    assert found["DVPE"]["value"] is None
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
    assert "psi" in said


def test_every_fault_is_listed():
    with pytest.raises(CaseErrors, match="part 1(.|\n)*part 3") as caught:
        read_parts("x + 50% a + 200% b")
    assert len(caught.value.faults) == 2
