"""Every table has a passport, and holds to it."""

from __future__ import annotations

import csv
import re
import tomllib
from pathlib import Path

import pytest

DATA = Path(__file__).resolve().parents[2] / "data"
TABLES = sorted(path.relative_to(DATA).with_suffix("").as_posix() for path in DATA.rglob("*.csv"))
NUMBER = r"[-+]?[\d.]+([eE][-+]?\d+)?"
SPECIES_TABLES = [name for name in TABLES if name.startswith("species/")]


def rows(name):
    with (DATA / f"{name}.csv").open(encoding="utf-8", newline="") as file:
        return list(csv.DictReader(line for line in file if not line.startswith("#")))


def passport(name):
    return tomllib.loads((DATA / f"{name}.toml").read_text(encoding="utf-8"))


def source_keys():
    known = set()
    for path in DATA.rglob("sources.toml"):
        known |= set(tomllib.loads(path.read_text(encoding="utf-8")))
    return known


@pytest.mark.parametrize("name", TABLES)
def test_passport_is_complete(name):
    about = passport(name)
    assert about["title"] and about["how"] and about["licence"] and about["where"] and about["source"]
    if "source" not in about["columns"]:  # else the source is named row by row
        unknown = set(about["source_keys"]) - source_keys()
        assert not unknown, f"no such source: {unknown}"


@pytest.mark.parametrize("name", TABLES)
def test_every_column_has_meaning_and_unit(name):
    with (DATA / f"{name}.csv").open(encoding="utf-8", newline="") as file:
        header = next(csv.reader(line for line in file if not line.startswith("#")))
    columns = passport(name)["columns"]
    assert list(columns) == header
    assert all(column["meaning"] and column["unit"] for column in columns.values())


@pytest.mark.parametrize("name", TABLES)
def test_numbers_lie_in_their_range(name):
    columns = {key: about["range"] for key, about in passport(name)["columns"].items() if "range" in about}
    for line, row in enumerate(rows(name), 2):
        for key, (low, high) in columns.items():
            if re.fullmatch(NUMBER, row[key]):  # a word in a column of numbers is the table's own
                assert low <= float(row[key]) <= high, f"{name}:{line} {key} = {row[key]}"


@pytest.mark.parametrize("name", SPECIES_TABLES)
def test_a_number_has_a_range(name):
    columns = passport(name)["columns"]
    table = rows(name)
    for key in table[0]:
        values = [row[key] for row in table if row[key] != ""]
        if all(re.fullmatch(NUMBER, value) for value in values):
            assert "range" in columns[key], f"{name}: {key}"


def check_digit(cas):
    digits = cas.replace("-", "")
    return sum(i * int(d) for i, d in enumerate(reversed(digits[:-1]), 1)) % 10 == int(digits[-1])


def test_check_digit_sees_a_slip():
    assert check_digit("64-17-5") and not check_digit("64-17-6") and not check_digit("46-17-5")


@pytest.mark.parametrize("name", [*SPECIES_TABLES, "pairs/kij"])
def test_cas_numbers(name):
    for row in rows(name):
        for key in ("cas", "stands_in", "cas_i", "cas_j"):
            if key in row:
                assert re.fullmatch(r"\d{2,7}-\d\d-\d", row[key]) and check_digit(row[key]), row[key]


def test_tables_speak_of_the_same_species():
    identity = {row["cas"]: row["name"] for row in rows("species/identity")}
    assert len(identity) == len(rows("species/identity")), "a CAS number occurs twice"
    for name in ("constants", "alpha", "vapour_pressure", "translation", "liquid_density", "cp_ideal"):
        assert {row["cas"]: row["name"] for row in rows(f"species/{name}")} == identity, name
    for name in ("groups", "flammability", "exposure"):
        assert {row["cas"] for row in rows(f"species/{name}")} <= set(identity), name
        assert all(identity[row["cas"]] == row["name"] for row in rows(f"species/{name}")), name
    assert {row["stands_in"] for row in rows("species/stand_ins")} <= set(identity)
    assert not {row["cas"] for row in rows("species/outside")} & set(identity)
    assert [row["cas"] for row in rows("species/outside")] == [
        row["cas"] for row in rows("species/stand_ins")
    ]


def test_source_columns_are_keys():
    known = source_keys()
    for name in ("species/vapour_pressure", "species/liquid_density", "species/cp_ideal"):
        assert {row["source"] for row in rows(name)} <= known, name
    fire = rows("species/flammability")
    assert {row[f"{k}_source"] for row in fire for k in ("flash_point", "LFL", "UFL")} <= known | {""}
    for row in rows("species/exposure"):
        assert row["source"] in known or row["evidence"] == "from memory, unverified", row


def test_disagreement_is_named_in_the_passport():
    note = passport("species/vapour_pressure")["note"]
    for row in rows("species/vapour_pressure"):
        if row["spread"] and float(row["spread"]) > 0.03:
            assert row["name"] in note and "differs by" in row["note"], row["name"]
        if not row["spread"]:
            assert "no second curve" in row["note"], row["name"]


def test_bad_flash_points_are_not_used():
    """Rows of the open tables known to be wrong: alcohols freezing-cold, MTBE -80 degC, and their kin."""
    fire = {row["name"]: row for row in rows("species/flammability")}
    # IEC 60079-20-1 (2010): methanol 9, ethanol 12, isobutanol 28, MTBE -27 degC
    for name, celsius in {"methanol": 9, "ethanol": 12, "isobutanol": 28, "MTBE": -27}.items():
        assert float(fire[name]["flash_point"]) == pytest.approx(celsius + 273.15, abs=0.01)
        assert fire[name]["flash_point_source"] == "iec-60079-20-1"
    for name in ("1-pentene", "ethane", "methylcyclopentane", "2,3-dimethylbutane"):
        assert fire[name]["flash_point"] == "" and name in passport("species/flammability")["note"]


def test_kij_names_a_pair_once():
    seen = [frozenset((row["cas_i"], row["cas_j"])) for row in rows("pairs/kij")]
    assert len(seen) == len(set(seen)) and all(len(pair) == 2 for pair in seen)
    unused = {(row["name_i"], row["name_j"]): row for row in rows("pairs/kij") if row["used"] == "0"}
    assert ("nitrogen", "n-octane") in unused and all(row["reason"] for row in unused.values())
