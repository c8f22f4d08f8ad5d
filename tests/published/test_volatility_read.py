"""Volatility figures that were read in the source named beside each."""

from __future__ import annotations

import numpy as np
import pytest

from screener.ground.constants import ZERO_CELSIUS
from screener.volatility import dvpe_equation, ethanol_allowance, vapour_lock_index
from screener.volatility.classes import class_limits, vapour_lock_classes

pytestmark = pytest.mark.published


def test_dvpe_of_astm_d5191():
    """DVPE = 0.965 X - 3.78 kPa: eralytics.com, page on ASTM D5191."""
    rule = dvpe_equation("ASTM D5191")
    assert rule.evidence == "quoted"
    X = np.array([40.0, 60.0, 80.0, 100.0]) * 1e3
    # Exact arithmetic of the formula as printed.
    assert rule.dvpe(X) / 1e3 == pytest.approx([34.82, 54.12, 73.42, 92.72], abs=1e-9)


@pytest.mark.parametrize(
    ("kPa", "E70", "index", "source"),
    [(90.0, 0.50, 1250.0, "de.wikipedia, Vapour Lock Index, citing DIN EN 228"),
     (60.0, 0.48, 936.0, "chemie-schule.de, Vapour Lock Index")],
)  # fmt: skip
def test_vapour_lock_index(kPa, E70, index, source):
    assert vapour_lock_index(kPa * 1e3, E70) == pytest.approx(index, abs=1e-9)  # whole numbers, as printed


def test_annex_iii():
    """Directive 98/70/EC annex III as amended (gesetze.legal), with straight lines between its points."""
    excess = ethanol_allowance(np.arange(11) / 100.0) / 1e3
    assert excess == pytest.approx([0.0, 3.7, 6.0, 7.2, 7.8, 8.0, 8.0, 7.9, 7.9, 7.8, 7.8], abs=1e-9)
    assert ethanol_allowance(0.045)[0] / 1e3 == pytest.approx(7.9, abs=1e-9)  # half-way between 7.8 and 8.0
    assert np.isnan(ethanol_allowance([0.11, -0.01])).all()


def test_vapour_pressure_series_of_d4814():
    """54, 62, 69, 79, 93, 103 kPa: automotive gasoline FAQ 4.10.1 (stason.org), quoting ASTM D4814."""
    series = [c for c in class_limits() if c.standard == "ASTM D4814" and c.quantity == "vapour pressure"]
    assert [c.high for c in series] == [54, 62, 69, 79, 93, 103]
    assert {c.evidence for c in series} == {"quoted"}


@pytest.mark.parametrize(
    ("name", "low", "high", "source"),
    [("A", 45.0, 60.0, "French order of 26 January 2009, annex II (juriblio.fr)"),
     ("D", 60.0, 90.0, "French order of 26 January 2009, annex II (juriblio.fr)"),
     ("C", 50.0, 80.0, "Bulgarian product sheet quoting EN 228")],
)  # fmt: skip
def test_vapour_pressure_ranges_of_en_228(name, low, high, source):
    row = next(
        c
        for c in class_limits()
        if (c.standard, c.name, c.quantity) == ("EN 228 E5", name, "vapour pressure")
    )
    assert (row.low, row.high, row.evidence) == (low, high, "quoted")


def test_en_228_class_d1_index():
    """VLI at most 1150 in class D1: French order of 26 January 2009, annex II (juriblio.fr)."""
    row = next(
        c
        for c in class_limits()
        if (c.standard, c.name, c.quantity) == ("EN 228 E5", "D1", "vapour lock index")
    )
    assert (row.high, row.evidence) == (1150.0, "quoted")


def test_vapour_lock_protection_classes():
    """60, 56, 51, 47, 41 degC: automotive gasoline FAQ 4.10.2 (stason.org), quoting ASTM D4814."""
    lowest = [
        round(T - ZERO_CELSIUS, 9) for _, T, _, evidence in vapour_lock_classes(330.0) if evidence == "quoted"
    ]
    assert lowest == [60.0, 56.0, 51.0, 47.0, 41.0]
