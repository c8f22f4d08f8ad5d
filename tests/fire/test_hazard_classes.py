"""Classes by flash point and boiling point, at their edges and in doubt."""

from __future__ import annotations

import numpy as np
import pytest

from screener.fire import above_flash_point, handled_as_warmer, hazard_class, hazard_systems, static_class
from screener.ground.errors import UnknownName


def c(t):
    return np.asarray(t, dtype=float) + 273.15


def names(system, flash, **more):
    return list(hazard_class(system, c(flash), **more).name)


def test_every_system_knows_its_boiling_point():
    assert len(hazard_systems()) == 5
    for system in hazard_systems():
        answer = hazard_class(system, c(40.0))
        assert answer.boiling_rule.point in ("initial", "10 %", "20 %") and answer.boiling_rule.means
        assert answer.name[0] != "unknown"  # above 23 degC no boiling point is asked for


def test_a_gasoline_near_35_degC_is_category_1_or_2():
    assert names("EU CLP", [-40.0] * 5, initial=c([29.0, 31.0, 35.0, 39.0, 41.0])) == [
        "category 1", "category 1 or 2", "category 1 or 2", "category 1 or 2", "category 2",
    ]  # fmt: skip


def test_each_text_takes_its_own_point():
    """One gasoline: initial point 33, 10 % point 52, 20 % point 60 degC."""
    points = {"initial": c(33.0), "at_10": c(52.0), "at_20": c(60.0)}
    assert names("GHS", -43.0, **points) == ["category 1 or 2"]
    assert names("29 CFR 1910.106 (2012 on)", -43.0, **points) == ["category 2"]
    assert names("29 CFR 1910.106 (before 2012)", -43.0, **points) == ["IB"]
    answer = hazard_class("NFPA 30 (2003 on)", c(-43.0), **points)
    assert answer.name[0] == "IB" and answer.boiling[0] == c(60.0)
    assert answer.boiling_rule.point == "20 %" and answer.evidence == "from memory, unverified"
    assert hazard_class("29 CFR 1910.106 (2012 on)", c(-43.0), **points).boiling[0] == c(52.0)


@pytest.mark.parametrize(
    ("flash", "ghs", "clp", "nfpa"),
    [(22.9, "category 2", "category 2", "IC"), (23.0, "category 3", "category 3", "IC"),
     (37.7, "category 3", "category 3", "IC"), (37.8, "category 3", "category 3", "II"),
     (60.0, "category 3", "category 3", "IIIA"), (60.1, "category 4", "not classed", "IIIA"),
     (93.0, "category 4", "not classed", "IIIA"), (93.1, "not classed", "not classed", "IIIA"),
     (93.4, "not classed", "not classed", "IIIB")],
)  # fmt: skip
def test_edges(flash, ghs, clp, nfpa):
    """22.9 degC is 73.2 degF and so no longer below 73 degF; 93 degC is 199.4 degF, below 200."""
    assert names("GHS", flash, constant=c(100.0)) == [ghs]
    assert names("EU CLP", flash, constant=c(100.0)) == [clp]
    assert names("NFPA 30 (2003 on)", flash, constant=c(100.0)) == [nfpa]


def test_gas_oil_by_the_note():
    assert names("EU CLP", [62.0, 75.0, 76.0], product="gas oil") == [
        "category 3 (by note 1, gas oil)", "category 3 (by note 1, gas oil)", "not classed",
    ]  # fmt: skip
    assert names("EU CLP", 62.0) == ["not classed"]


def test_doubt_of_the_flash_point():
    assert names("EU CLP", [24.0, 58.0, 40.0], constant=c(100.0), flash_doubt=3.0) == [
        "category 2 or 3", "category 3 or not classed", "category 3",
    ]  # fmt: skip


def test_what_is_missing_is_unknown():
    assert names("EU CLP", [np.nan, -40.0]) == ["unknown", "unknown"]
    assert names("EU CLP", 22.0, flash_doubt=2.0) == ["unknown"]
    with pytest.raises(UnknownName, match="'DOT' is not a known hazard class system"):
        hazard_class("DOT", 300.0)


def test_heating_rule():
    """Category 3 of 40 degC and more, category 4: within 30 degF (16.7 K) of the flash point."""
    T_flash = c([40.0, 40.0, 70.0, 30.0, 95.0])
    heated = c([24.0, 23.0, 54.0, 30.0, 95.0])
    assert list(handled_as_warmer(T_flash, heated)) == [True, False, True, False, False]


def test_storage_above_flash_point():
    assert above_flash_point(c([30.0, 70.0]), c([60.0, 60.0])) == pytest.approx([-30.0, 10.0], abs=1e-9)


def test_static_classes():
    """Gas oil; jet B and toluene; gasoline: examples of the text that quotes the scheme."""
    assert list(static_class(c([60.0, -20.0, 4.0, -43.0, np.nan]), [1e2, 20e3, 7e3, 60e3, 1e4])) == [
        "low vapour pressure", "intermediate vapour pressure", "intermediate vapour pressure",
        "high vapour pressure", "unknown",
    ]  # fmt: skip
    assert list(static_class(c(10.0), np.nan)) == ["unknown"]
