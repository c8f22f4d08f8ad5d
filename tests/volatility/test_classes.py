"""Class tables: how a fuel is held against them, and the marks they carry."""

from __future__ import annotations

import math

import pytest

from screener.ground.constants import ZERO_CELSIUS
from screener.ground.errors import UnknownName
from screener.ground.files import read_table
from screener.volatility import class_standards, volatility_classes
from screener.volatility.classes import class_limits

SUMMER = {
    "vapour pressure": 58e3,
    "T10": 60.0 + ZERO_CELSIUS, "T50": 97.0 + ZERO_CELSIUS, "T90": 160.0 + ZERO_CELSIUS,
    "E70": 0.25, "E100": 0.53, "E150": 0.86, "vapour lock index": 755.0, "driveability index": 541.0,
}  # fmt: skip


def met(standard, values):
    return [match.name for match in volatility_classes(standard, values) if match.met]


def test_summer_gasoline():
    assert met("ASTM D4814", SUMMER) == ["A", "B", "C"]  # T10 60 degC is the limit of C; AA stops at 54 kPa
    assert met("EN 228 E5", SUMMER) == ["A", "B", "C", "C1"]


def test_what_is_missed_is_named():
    hot = SUMMER | {"vapour pressure": 95e3}
    match = volatility_classes("EN 228 E5", hot)[0]
    assert not match.met
    assert match.missed == ("vapour pressure 95.0, class 45 to 60 kPa",)


def test_missing_figures_are_listed_not_assumed():
    match = volatility_classes("ASTM D4814", {"vapour pressure": 50e3})[0]
    assert match.met and match.evidence == "quoted"
    assert match.missing == ("T10", "T50", "T90", "driveability index")
    assert not volatility_classes("ASTM D4814", {})[0].met


def test_no_number_meets_no_class():
    assert met("ASTM D4814", SUMMER | {"T50": math.nan}) == []


def test_weakest_mark_is_reported():
    assert volatility_classes("ASTM D4814", SUMMER)[0].evidence == "memory"


def test_vapour_lock_index_binds_only_the_transition_classes():
    lively = SUMMER | {"vapour pressure": 79e3, "E70": 0.45, "vapour lock index": 1105.0}
    assert "C" in met("EN 228 E5", lively) and "C1" not in met("EN 228 E5", lively)


def test_e10_grade_is_two_points_wider():
    e5 = {c.name: c for c in class_limits() if c.standard == "EN 228 E5" and c.quantity == "E70"}
    e10 = {c.name: c for c in class_limits() if c.standard == "EN 228 E10" and c.quantity == "E70"}
    assert all((e10[k].low - e5[k].low, e10[k].high - e5[k].high) == (2.0, 2.0) for k in e5)


def test_every_limit_is_marked():
    for row in read_table("volatility/classes.csv"):
        assert row["evidence"] in ("quoted", "memory")
        assert ("memory" in row["source"]) == (row["evidence"] == "memory"), row
        assert row["edition"]


def test_unknown_standard():
    assert class_standards() == ("ASTM D4814", "EN 228 E5", "EN 228 E10")
    with pytest.raises(UnknownName, match="'EN 590' is not a known class table"):
        volatility_classes("EN 590", SUMMER)
