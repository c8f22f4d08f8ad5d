"""Tables of volatility and stocks against their passports: columns, ranges, source keys."""

from __future__ import annotations

import pytest

from screener.ground.files import data_folder, read_table, read_toml

VOLATILITY = (
    "volume_correction", "own_volume_species", "dvpe_equations",
    "classes", "vapour_lock_classes", "ethanol_allowance",
    "distillation_power", "distillation_gaps", "d6378_bias", "rvpe_factors", "true_from_reid", "d86_slopes",
    "common_limits", "season_limits", "ethanol_fuel_classes", "reproducibility", "compressibility",
)  # fmt: skip
TABLES = (
    *(f"volatility/{name}" for name in VOLATILITY),
    *sorted(f"stocks/{path.stem}" for path in (data_folder() / "stocks").glob("*.csv")),
)


def test_no_table_is_left_out():
    found = {f"volatility/{path.stem}" for path in (data_folder() / "volatility").glob("*.csv")}
    assert found == {name for name in TABLES if name.startswith("volatility/")}


@pytest.mark.parametrize("name", TABLES)
def test_passport(name):
    rows, passport = read_table(f"{name}.csv"), read_toml(f"{name}.toml")
    assert {"title", "source", "source_keys", "where", "how", "licence"} <= set(passport)
    assert list(passport["columns"]) == list(rows[0])
    for column, about in passport["columns"].items():
        assert about["meaning"] and about["unit"]
        numbers = [row[column] for row in rows if _number(row[column])]
        if "range" in about:
            low, high = about["range"]
            assert numbers and all(low <= float(value) <= high for value in numbers), column
        elif column not in ("class", "cas"):
            assert not numbers, f"{column} holds numbers and has no range"


@pytest.mark.parametrize("name", TABLES)
def test_source_keys_exist(name):
    known = set(read_toml("volatility/sources.toml")) | set(read_toml("stocks/sources.toml"))
    keys = read_toml(f"{name}.toml")["source_keys"]
    assert set(keys) <= known
    assert keys or "invented" in read_toml(f"{name}.toml")["source"]


def test_every_source_is_used():
    used = {key for name in TABLES for key in read_toml(f"{name}.toml")["source_keys"]}
    assert used == set(read_toml("volatility/sources.toml")) | set(read_toml("stocks/sources.toml"))


def _number(text: str) -> bool:
    try:
        float(text)
    except ValueError:
        return False
    return True
