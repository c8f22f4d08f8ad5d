"""The JSON object: it fits its own schema, holds no NaN, and echoes inputs in SI."""

from __future__ import annotations

import copy
import json
import math
from dataclasses import replace

import pytest

from screener.cli import main
from screener.cli.result import as_text, check_object, without_nan
from screener.ground.files import data_folder
from screener.screening.finding import Fact
from tests.cli.small_schema import faults
from tests.memo.hand_made_screening import NEAR, ROOM, UNKNOWN, made_case, made_screening

SCHEMA = json.loads((data_folder() / "schemas" / "check-1.json").read_text(encoding="utf-8"))


def result(*screenings):
    return json.loads(as_text(check_object(screenings or (made_screening(),), 1)), parse_constant=_refuse)


def _refuse(name):
    raise AssertionError(f"{name} in JSON")


def test_the_object_fits_its_schema():
    assert faults(result(), SCHEMA, SCHEMA) == []
    bare = made_screening(UNKNOWN, case=made_case(tank=replace(made_case().tank, contents=None)), curve={})
    assert faults(result(bare, made_screening(NEAR)), SCHEMA, SCHEMA) == []


@pytest.mark.parametrize(
    ("change", "said"),
    [
        (lambda body: body.pop("software"), "software is missing"),
        (lambda body: body.update(schema="other/1"), "is not 'screener.check/1'"),
        (lambda body: body["cases"][0]["findings"][0].update(verdict="fine"), "'fine' is not one of"),
        (lambda body: body["cases"][0]["findings"][0].update(value="66 kPa"), "is not number or null"),
        (lambda body: body["cases"][0]["findings"][0].update(mood="good"), "mood is not in the schema"),
        (lambda body: body["cases"][0]["liquids"].update(heel=3), "none of the choices fits"),
        (lambda body: body["cases"][0]["inputs"][0].pop("entered"), "entered is missing"),
    ],
)
def test_the_schema_can_refuse(change, said):
    body = copy.deepcopy(result())
    change(body)
    assert any(said in fault for fault in faults(body, SCHEMA, SCHEMA))


def test_nan_never_reaches_json():
    broken = replace(ROOM, low=math.nan, facts=(Fact("broken", math.inf, "Pa"),))
    body = result(made_screening(broken, curve={"T": [300.0], "P": {"receipt": [math.nan]}}))
    (finding,) = body["cases"][0]["findings"]
    assert finding["low"] is None
    assert finding["facts"][0]["value"] is None
    assert body["cases"][0]["curve"]["P"]["receipt"] == [None]
    assert without_nan({"a": (math.nan, 1.0, [math.inf])}) == {"a": [None, 1.0, [None]]}


def test_inputs_are_echoed_as_entered_and_in_si():
    echo = next(row for row in result()["cases"][0]["inputs"] if row["path"] == "tank.vents[0].set")
    assert echo == {
        "path": "tank.vents[0].set",
        "entered": "0.4 kPa gauge",
        "value": 400.0,
        "unit": "Pa over barometer",
        "quality": "given",
        "note": "",
    }


def test_liquids_carry_their_composition():
    liquids = result()["cases"][0]["liquids"]
    assert liquids["receipt"]["mole_fractions"] == {"toluene": 0.55, "isopentane": 0.25, "ethanol": 0.2}
    assert liquids["heel"]["report"]["residuals"] == [["density", 742.0, 741.6, 0.5]]


def test_schema_command_prints_it(capsys):
    assert main(["schema", "result"]) == 0
    assert json.loads(capsys.readouterr().out) == SCHEMA
