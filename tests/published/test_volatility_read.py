"""Volatility figures that were read in the source named beside each."""

from __future__ import annotations

import numpy as np
import pytest

from screener.blends.lab_sheet import reproducibility
from screener.ground.constants import ZERO_CELSIUS
from screener.volatility import (
    common_limits,
    dvpe_equation,
    ethanol_allowance,
    petroleum_expansion,
    season_limits,
    vapour_lock_index,
)
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


# Annex II of the French orders of 23 December 1999 (unleaded petrol) and 26 January 2009 (95-E10): low, high.
ORDERS = {
    ("EN 228 E5", "A"): {"vapour pressure": (45, 60), "E70": (20, 48), "E100": (46, 71), "E150": (75, None)},
    ("EN 228 E5", "D"): {"vapour pressure": (60, 90), "E70": (22, 50), "E100": (46, 71), "E150": (75, None)},
    ("EN 228 E5", "D1"): {"vapour pressure": (60, 90), "E70": (22, 50), "E100": (46, 71), "E150": (75, None),
                          "vapour lock index": (None, 1150)},
    ("EN 228 E10", "A"): {"vapour pressure": (45, 60), "E70": (22, 50), "E100": (46, 72), "E150": (75, None)},
    ("EN 228 E10", "D"): {"vapour pressure": (60, 90), "E70": (24, 52), "E100": (46, 72), "E150": (75, None)},
    ("EN 228 E10", "D1"): {"vapour pressure": (60, 90), "E70": (24, 52), "E100": (46, 72), "E150": (75, None)},
}  # fmt: skip


@pytest.mark.parametrize("standard_and_class", ORDERS, ids=" ".join)
def test_classes_of_en_228_in_french_law(standard_and_class):
    """The two annexes as printed; what they print is marked quoted, all else of EN 228 is not from there."""
    rows = {c.quantity: c for c in class_limits() if (c.standard, c.name) == standard_and_class}
    for quantity, printed in ORDERS[standard_and_class].items():
        assert (rows[quantity].low, rows[quantity].high) == printed
        assert rows[quantity].evidence == "quoted" and "French order" in rows[quantity].source
    assert {q for q, c in rows.items() if "French order" in c.source} == set(ORDERS[standard_and_class])


@pytest.mark.parametrize("standard", ["EN 228 E5", "EN 228 E10"])
def test_final_boiling_point_and_residue_in_french_law(standard):
    """210 degC and 2 vol%: the same annexes."""
    what = {limit.what: limit for limit in common_limits(standard)}
    assert what["final boiling point"].high - ZERO_CELSIUS == pytest.approx(210.0)
    assert what["residue"].high == pytest.approx(0.02)


def test_vapour_pressure_range_of_class_c():
    """50 to 80 kPa: Bulgarian product sheet quoting EN 228."""
    row = next(
        c for c in class_limits() if (c.standard, c.name, c.quantity) == ("EN 228 E5", "C", "vapour pressure")
    )
    assert (row.low, row.high, row.evidence) == (50.0, 80.0, "quoted")


def test_summer_vapour_pressure_in_the_union():
    """Directive 98/70/EC, annex I as replaced by 2009/30/EC (legislation.gov.uk): 60 kPa, 70 kPa under a derogation."""
    found = sorted(limit.high / 1e3 for limit in season_limits() if limit.where == "EU")
    assert found == pytest.approx([60.0, 70.0])


def test_reproducibility_of_benzene():
    """R = 0.221 X^0.67 (ASTM D5769-20): US EPA precision form PBMS0004, OMB control number 2060-0731."""
    for percent in (0.62, 1.0, 1.3):
        assert reproducibility("benzene", percent) == pytest.approx(0.221 * percent**0.67, rel=1e-12)


def test_volume_correction_of_jet_fuel():
    """Volume correction factors to 15 degC for Jet A, 800 kg/m3 at 15 degC (table 54B), January 2016: printed to 1e-4.

    The table is of the older constants at 15 degC, this project goes through 60 degF as the 2004 edition
    does: that and half a unit of the last place make 1e-4.
    """
    printed = {-40: 1.0502, -39: 1.0493, -38: 1.0484, -37: 1.0475, -36: 1.0466, -35: 1.0457, -34: 1.0448, -33: 1.0439,
               -32: 1.0430, -31: 1.0421, -30: 1.0412, -29: 1.0403, -28: 1.0394, -27: 1.0385, -26: 1.0376, -25: 1.0367,
               -24: 1.0358, -23: 1.0349, -22: 1.0340, -21: 1.0331, -20: 1.0322}  # fmt: skip
    factor = 1.0 / petroleum_expansion(800.0, np.array(list(printed), dtype=float) + ZERO_CELSIUS)
    assert factor == pytest.approx(list(printed.values()), abs=1e-4)


def test_vapour_lock_protection_classes():
    """60, 56, 51, 47, 41 degC: automotive gasoline FAQ 4.10.2 (stason.org), quoting ASTM D4814."""
    lowest = [
        round(T - ZERO_CELSIUS, 9) for _, T, _, evidence in vapour_lock_classes(330.0) if evidence == "quoted"
    ]
    assert lowest == [60.0, 56.0, 51.0, 47.0, 41.0]
