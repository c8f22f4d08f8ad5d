"""Tables as shipped: what the commands print about species, stocks and criteria."""

from __future__ import annotations

import json

import pytest

from screener.blends import stock_names
from screener.cli import main
from screener.screening.criteria import criteria
from screener.species import find, names


def printed(capsys, *argv) -> str:
    assert main([*argv, "--width", "160"]) == 0
    captured = capsys.readouterr()
    assert captured.err == ""
    return captured.out


def objects(capsys, *argv) -> dict:
    return json.loads(printed(capsys, *argv, "--json"), parse_constant=_refuse)


def _refuse(name):
    raise AssertionError(f"{name} in JSON")


def test_every_species_has_a_row(capsys):
    lines = printed(capsys, "species").split("\n\n")[0].splitlines()
    assert len(lines) == len(names()) + 2
    body = objects(capsys, "species")
    assert [row["name"] for row in body["species"]] == list(names())
    assert body["schema"] == "screener.species/1"


def test_one_species_in_full(capsys):
    text = " ".join(printed(capsys, "species", "EtOH").split())
    for said in (
        "name ethanol",
        "64-17-5",
        "46.07 g/mol",
        "normal boiling point 78.",
        "error bar of vapour pressure",
    ):
        assert said in text
    (row,) = objects(capsys, "species", "64-17-5")["species"]
    assert row["MW"] == find("ethanol").MW


def test_an_unknown_name_names_the_nearest(capsys):
    assert main(["species", "ethanole"]) == 3
    assert "nearest: ethanol" in capsys.readouterr().err
    assert main(["blendstocks", "field butan"]) == 3
    assert "nearest: field butane" in capsys.readouterr().err


def test_every_stock_has_a_row_and_a_source(capsys):
    text = printed(capsys, "blendstocks")
    assert all(f"\n{name} " in text for name in stock_names())
    assert text.count("\n  * ") >= len(stock_names())
    body = objects(capsys, "blendstocks")
    assert all(row["source"] and row["computed"]["density_15"] > 500.0 for row in body["blendstocks"])


@pytest.mark.parametrize("name", stock_names())
def test_one_stock_in_full(capsys, name):
    text = " ".join(printed(capsys, "blendstocks", name).split())
    assert f"name {name}" in text
    assert "DVPE, computed" in text
    assert "entry of the analysis" in text


def test_every_criterion_has_a_row(capsys):
    text = printed(capsys, "criteria")
    assert all(f"\n{key} " in text for key in criteria())
    assert main(["criteria", "--width", "80"]) == 0
    narrow = capsys.readouterr().out
    assert max(map(len, narrow.splitlines())) <= 80
    assert len(narrow.split("\n\n")) == len(criteria())
