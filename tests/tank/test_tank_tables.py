"""Tables of the tank and the line against their passports: columns, ranges, source keys."""

import pytest

from screener.ground.files import data_folder, read_table, read_toml

TABLES = (
    "tank/paint",
    "tank/thermal_venting",
    "tank/older_venting",
    "tank/roof_rules",
    "line/npsh_margin",
    "line/liquid_viscosity",
)


def source_keys():
    names = [name for name in ("sources.toml", "tank/sources.toml") if (data_folder() / name).is_file()]
    return {key for name in names for key in read_toml(name)}


@pytest.mark.parametrize("name", TABLES)
def test_passport(name):
    rows, passport = read_table(f"{name}.csv"), read_toml(f"{name}.toml")
    assert {"title", "source", "source_keys", "where", "how", "licence"} <= set(passport)
    assert list(passport["columns"]) == list(rows[0])
    for column, about in passport["columns"].items():
        assert about["meaning"] and about["unit"]
        if "range" not in about:
            continue
        low, high = about["range"]
        for row in rows:
            if row[column] not in ("", "barometer"):
                assert low <= float(row[column]) <= high, (column, row)


@pytest.mark.parametrize("name", TABLES)
def test_source_keys_exist(name):
    known, passport = source_keys(), read_toml(f"{name}.toml")
    assert set(passport["source_keys"]) <= known
    assert {row["source_key"] for row in read_table(f"{name}.csv") if "source_key" in row} <= known
