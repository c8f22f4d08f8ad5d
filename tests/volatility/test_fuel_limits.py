"""Limits of fuels beside the classes: what is in the tables and that nothing is met by no number."""

from __future__ import annotations

import math

import pytest

from screener.ground.constants import ZERO_CELSIUS
from screener.volatility import class_standards, common_limits, ethanol_fuel_classes, season_limits
from screener.volatility.classes import class_limits

PSI = 6894.757293168


def test_every_class_standard_has_its_common_limits():
    for standard in class_standards():
        what = {limit.what: limit for limit in common_limits(standard)}
        assert set(what) == {"final boiling point", "residue"}
        assert what["residue"].high == pytest.approx(0.02) and what["residue"].evidence == "quoted"
        degC = 225.0 if "D4814" in standard else 210.0
        assert what["final boiling point"].high == pytest.approx(degC + ZERO_CELSIUS)
    assert common_limits("EN 590") == ()


def test_season_limits():
    found = {(limit.where, limit.what): limit for limit in season_limits()}
    assert found["US", "summer"].high == pytest.approx(9.0 * PSI) and found["US", "summer"].evidence == "law"
    assert found["EU", "summer, before the allowance for bioethanol"].high == pytest.approx(60e3)
    assert all(
        limit.source and limit.edition and limit.evidence in ("law", "quoted") for limit in found.values()
    )


def test_ethanol_fuels():
    """D5798-15 as quoted by afdc.energy.gov: 5.5-9.0, 7.0-9.5, 8.5-12.0, 9.5-15.0 psi at 51 to 83 vol%."""

    def met(psi, ethanol):
        return [c.name for c in ethanol_fuel_classes(psi * PSI, ethanol) if c.met]

    assert met(6.0, 0.75) == ["1"] and met(8.7, 0.75) == ["1", "2", "3"] and met(14.0, 0.60) == ["4"]
    assert met(6.0, 0.50) == [] and met(6.0, 0.85) == [] and met(4.0, 0.75) == []
    assert met(math.nan, 0.75) == [] and met(6.0, math.nan) == []


def test_d4814_ranges_as_the_page_gives_them():
    """T10 50 to 70, T50 77 and 110 to 121, T90 185 to 190 degC: the ranges quoted; which class has which is memory."""
    rows = [limit for limit in class_limits() if limit.standard == "ASTM D4814"]
    by = {q: [limit for limit in rows if limit.quantity == q] for q in ("T10", "T50", "T90")}
    assert (min(x.high for x in by["T10"]), max(x.high for x in by["T10"])) == (50.0, 70.0)
    assert {x.low for x in by["T50"]} == {77.0}
    assert (min(x.high for x in by["T50"]), max(x.high for x in by["T50"])) == (110.0, 121.0)
    assert {x.high for x in by["T90"]} == {185.0, 190.0}
    assert {x.evidence for q in by.values() for x in q} == {"memory"}
