"""Live echo of a field, help, JSON Schema and the template."""

import json
import tomllib
from pathlib import Path

import pytest

from screener.casefile import all_keys, check_text, help_text, key_at, read_case, schema, template
from screener.casefile.keys import LATER, ROWS, TABLE
from screener.ground.errors import InputError

HERE = Path(__file__).parent
EXAMPLES = sorted((HERE.parents[1] / "examples").glob("*.toml"))
BROKEN = HERE / "cases" / "broken"


@pytest.mark.parametrize(
    ("path", "text", "echo", "value"),
    [
        ("site.lowest_barometer", "11.1 psi", "taken as 76.53 kPa abs", 11.1 * 6894.757293168361),
        ("tank.vents[0].set", "6 inH2O", "taken as 1.495 kPa above the barometer", 6 * 249.08891),
        ("tank.design_vacuum", "0,25 kPa", "taken as 0.25 kPa below the barometer", 250.0),
        ("tank.vents[4].rated_out", "2400 Sm3/h", "taken as 2275 Nm3/h air", 2400 / 3600 * 273.15 / 288.15),
        ("line.suction.roughness", "0.046 mm", "taken as 0.046 mm", 4.6e-5),
        ("line.suction.fittings", "6,5", "taken as 6.5", 6.5),
        ("site.ambient.high", "100 degF", "taken as 37.8 degC", (100 + 459.67) / 1.8),
        ("blend.parts[2].share", "10 vol%", "taken as 10 % by volume", 0.1),
        ("tank.insulated", "yes", "taken as yes", True),
        ("tank.kind", "Fixed roof", "taken as fixed-roof", "fixed-roof"),
        ("site.month", "july", "taken as Jul", "Jul"),
        ("tank.vents[0].count", "2", "taken as 2", 2),
        ("blend.parts[0].species", "64-17-5", "taken as ethanol", "ethanol"),
        ("screening.criteria", "eu-94-63, us-40cfr60-kb", "taken as eu-94-63, us-40cfr60-kb",
         ("eu-94-63", "us-40cfr60-kb")),
        ("line.receipt.dissolved_gas", "air-saturated at 59 degF", "taken as air-saturated at 15 degC",
         "air-saturated"),
        ("site.liquid_temperature.read_on", "2026-07-14", "taken as 2026-07-14", "2026-07-14"),
        ("case.title", "", "", None),
    ],
)  # fmt: skip
def test_a_field_says_what_it_is_taken_as(path, text, echo, value, tables):
    got = check_text(path, text, tables=tables)
    assert got[0] == echo
    # the values are exact definitions; only rounding is left
    assert got[1] == (pytest.approx(value, rel=1e-9) if isinstance(value, float) else value)


def test_the_echo_follows_the_units_asked_for(tables):
    assert check_text("site.ambient.high", "38 degC", system="us", tables=tables)[0] == "taken as 100.4 degF"
    assert check_text("line.receipt.rate", "600 m3/h", system="us", tables=tables)[0] == "taken as 3774 bbl/h"


def test_the_paint_says_its_absorptance(tables):
    echo, text = check_text("tank.surface", "white paint, some years old", tables=tables)
    assert echo.startswith("taken as solar absorptance 0.") and text == "white paint, some years old"


@pytest.mark.parametrize(
    ("path", "text", "words"),
    [
        ("tank.shell_diameter", "24", "has no unit; expected a length such as '24 m'.*0.5 m to 130 m"),
        ("tank.shell_diameter", "2 km", "above the allowed range; allowed: 0.5 m to 130 m"),
        ("tank.insulated", "perhaps", "neither true nor false"),
        ("blend.parts[0].species", "ethanl", "nearest: ethanol"),
        ("site.weather_file", "x", "not read yet"),
        ("blend.lab", "x", "no single value"),
        ("tank", "x", "no single value"),
        ("tank.nothing", "x", "no single value"),
    ],
)
def test_a_field_that_is_refused_says_why(path, text, words, tables):
    with pytest.raises(InputError, match=words) as caught:
        check_text(path, text, tables=tables)
    assert caught.value.path == path


def test_help_for_every_key():
    for path, key in all_keys().items():
        made = help_text(path.replace("[]", "[0]"))
        assert made["meaning"] == key.meaning
        assert ("unit" in made) == (key.kind not in all_other_kinds()), path
    assert help_text("tank.shell_diameter") == {
        "meaning": "Inside diameter of the shell",
        "unit": "m, mm, cm, km, ft, in",
        "allowed": "0.5 m to 130 m",
        "usual": "5 m to 60 m",
        "where": "tank drawing",
        "example": "24 m",
    }
    assert help_text("tank.nothing") == {}


def all_other_kinds() -> set[str]:
    from screener.casefile.quantities import KINDS

    return {key.kind for key in all_keys().values()} - set(KINDS)


def test_the_template_reads_as_it_stands(tables):
    case = read_case(template(), tables=tables)
    tank, vent = case.tank, case.tank.vents[0]
    assert tank.levels.low < tank.levels.normal < tank.levels.high < tank.shell_height
    assert vent.set_above < vent.rated_out_at <= tank.design_overpressure
    assert vent.set_below < vent.rated_in_at <= tank.design_vacuum
    # a vent of this size passes the receipt: the air of 1.01 m3 per m3 received, both vents working
    assert vent.count * vent.rated_out > case.line.receipt.rate
    assert vent.count * vent.rated_in > case.line.draw_rate
    shell = 3.14159 / 4 * tank.shell_diameter**2 * tank.shell_height
    assert 0.0 < tank.contents.volume < shell
    suction = case.line.suction
    assert suction.nozzle_above_tank_bottom < tank.levels.low
    assert len(case.site.months) == 12 and case.criteria


def test_the_template_names_every_key_that_people_enter():
    text = template()
    spare = {
        "site.weather_file",
        "tank.contents.scale",
        "tank.contents.at",
        "tank.contents.basis",
    }
    for path, key in all_keys().items():
        if path not in spare:
            assert key.name in text, path


def _faults(node: dict, value: object, path: str = "") -> list[str]:
    """The part of JSON Schema that the case schema uses."""
    if "not" in node:
        return [path]
    kinds = {
        "object": dict,
        "array": list,
        "string": str,
        "boolean": bool,
        "integer": int,
        "number": (int, float),
    }
    types = node["type"] if isinstance(node["type"], list) else [node["type"]]
    if not any(
        isinstance(value, kinds[t]) and (t == "boolean" or not isinstance(value, bool)) for t in types
    ):
        return [path]
    found = [path] if "enum" in node and value not in node["enum"] else []
    number = isinstance(value, (int, float)) and not isinstance(value, bool)
    if number and not node.get("minimum", value) <= value <= node.get("maximum", value):
        found.append(path)
    if isinstance(value, list):
        found += [path] if len(value) < node.get("minItems", 0) else []
        return found + [
            f for i, item in enumerate(value) for f in _faults(node["items"], item, f"{path}[{i}]")
        ]
    if isinstance(value, dict):
        join = f"{path}." if path else ""
        found += [join + name for name in node.get("required", ()) if name not in value]
        ways = [way["required"][0] for way in node.get("anyOf", ())]
        found += [join + ways[0]] if ways and not any(name in value for name in ways) else []
        found += [join + name for name in value if name not in node["properties"]]
        known = {name: item for name, item in value.items() if name in node["properties"]}
        return found + [
            f for name, item in known.items() for f in _faults(node["properties"][name], item, join + name)
        ]
    return found


@pytest.mark.parametrize("file", EXAMPLES, ids=lambda file: file.stem)
def test_examples_hold_to_the_schema(file):
    assert _faults(schema(), tomllib.loads(file.read_text(encoding="utf-8"))) == []


def test_the_template_holds_to_the_schema():
    assert _faults(schema(), tomllib.loads(template())) == []


@pytest.mark.parametrize(
    ("name", "paths"),
    [
        ("missing_keys", {"blend.parts", "tank.kind", "tank.liquid_level.normal", "tank.vents[0].count",
                          "site.ambient.low", "site.liquid_temperature.read_on"}),
        ("missing_sections", {"blend", "tank"}),
        ("unknown_keys", {"tnk", "blend.parts[0].qality", "tank.shell_diametre", "tank.liquid_level.maximum",
                          "tank.vents[0].vacum_set", "site.months[0].zzz"}),
        ("not_read_yet", {"site.weather_file"}),
        ("empty_lists", {"blend.parts", "tank.contents.parts", "tank.surface"}),
        ("bare_numbers", {"tank.shell_diameter", "tank.shell_height"}),
    ],
)  # fmt: skip
def test_the_schema_sees_the_faults_of_form(name, paths):
    document = tomllib.loads((BROKEN / f"{name}.toml").read_text(encoding="utf-8"))
    assert set(_faults(schema(), document)) == paths


def test_the_schema_is_json_and_names_every_key():
    made = json.loads(json.dumps(schema()))
    assert made["$schema"].endswith("2020-12/schema")
    for path, key in all_keys().items():
        node = made
        for step in path.split("."):
            node = node["properties"][step.removesuffix("[]").strip('"')]
            node = node["items"] if step.endswith("[]") and step != path.split(".")[-1] else node
        assert key.meaning in node["description"], path
        if key.kind not in (TABLE, ROWS, LATER) and key.example:
            assert key.choices == tuple(node.get("enum", ())), path


def test_gauge_settings_say_so_in_the_schema():
    vents = schema()["properties"]["tank"]["properties"]["vents"]["items"]["properties"]
    assert "gauge by definition" in vents["set"]["description"]
    assert vents["set"]["x-allowed"] == "0 kPa to 5 MPa" and vents["set"]["x-kind"] == "pressure difference"
    assert key_at("tank.vents[3].set").unit == "Pa over barometer"
