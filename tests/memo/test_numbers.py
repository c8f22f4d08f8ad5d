"""Printed numbers: each expected text was worked by hand."""

from __future__ import annotations

import math
import subprocess
import sys
from pathlib import Path

import pytest

from screener.memo import numbers

ROOT = Path(__file__).resolve().parents[2]


@pytest.mark.parametrize(
    ("value", "unit", "si", "us"),
    [
        (101325.0, "Pa", "101.3 kPa", "14.70 psi"),  # 101325 / 6894.757 = 14.696
        (66100.0, "Pa", "66.1 kPa", "9.59 psi"),  # 66.1 / 6.894757 = 9.587
        (250.0, "Pa over barometer", "0.250 kPa gauge", "0.0363 psi gauge"),
        (1500.0, "Pa over barometer", "1.50 kPa gauge", "0.218 psi gauge"),
        (310.92777777777775, "K", "37.8 degC", "100.0 degF"),
        (273.15, "K", "0.0 degC", "32.0 degF"),
        (273.11, "K", "0.0 degC", "31.9 degF"),  # -0.04 degC is printed without a minus; 31.93 degF
        (10.0, "K difference", "10.0 K", "18.0 degF difference"),
        (0.5, "m3/s air", "1800 Nm3/h air", "67186 SCFH air"),  # 1800 * 35.31467 * 288.70556 / 273.15
        (600 / 3600, "m3/s", "600 m3/h", "3774 bbl/h"),  # 600 / 0.158987295 = 3773.9
        (24.0, "m", "24.00 m", "78.74 ft"),
        (2100.0, "m3", "2100 m3", "13209 bbl"),
        (742.0, "kg/m3", "742.0 kg/m3", "46.32 lb/ft3"),
        (0.0921, "kg/mol", "92.10 g/mol", "92.10 g/mol"),
        (22.32e6, "J/m2", "22.3 MJ/m2", "1965 Btu/ft2"),  # 22.32e6 / 11356.5
        (0.0123, "-", "0.0123", "0.0123"),
        (3.2, "furlong", "3.20 furlong", "3.20 furlong"),
    ],
)
def test_value_with_unit(value, unit, si, us):
    assert numbers.quantity(value, unit, "si").text == si
    assert numbers.quantity(value, unit, "us").text == us
    assert numbers.quantity(value, unit).value == value


@pytest.mark.parametrize("value", [None, math.nan, math.inf])
def test_a_number_that_does_not_exist_is_none(value):
    shown = numbers.quantity(value, "Pa")
    assert (shown.value, shown.text) == (None, "none")
    assert numbers.span(value, 1.0, "Pa").text == "none"
    assert numbers.percent(value).text == "none"


def test_a_difference_of_temperatures_is_never_shifted():
    assert numbers.difference_unit("K") == "K difference"
    assert numbers.difference_unit("Pa over barometer") == "Pa difference"
    assert numbers.difference_unit("kg/m3") == "kg/m3"


def test_numbers_side_by_side_share_their_decimals():
    assert numbers.decimals((400.0, 2000.0, None), "Pa over barometer") == 2
    assert numbers.decimals((8.0, 97800.0), "Pa") == 1
    assert numbers.decimals((None, None), "Pa") == 1


def test_a_small_margin_never_reads_as_nothing():
    """Beyond by 4 Pa must not print as -0.0 kPa."""
    assert numbers.number(-4.0, "Pa", places=1, sign=True) == "-0.004"
    assert numbers.number(0.0, "Pa", places=1, sign=True) == "+0.0"


@pytest.mark.parametrize(
    ("share", "text"), [(0.676, "68 %"), (0.996, "99.6 %"), (0.9996, "99.96 %"), (1.0, "100 %"), (1.0004, "100 %"), (1.06, "106 %"),
     (9.99, "999 %"), (49818.0, ">999 %")]
)  # fmt: skip
def test_percent_shows_the_side_of_the_limit(share, text):
    assert numbers.percent(share).text == text


def test_inputs_and_facts_of_any_kind():
    assert str(numbers.anything("white paint")) == "white paint"
    assert str(numbers.anything(None)) == "none"
    assert str(numbers.anything(True)) == "yes"
    assert str(numbers.anything(4.6e-5, "m")) == "0.0460 mm"
    assert numbers.anything(4.6e-5, "m").unit == "m"
    assert str(numbers.anything(4.6e-5, "m", "us")) == "0.00181 in"


def test_every_unit_of_a_criterion_is_in_the_table():
    """A criterion in a unit the table does not know would be printed raw."""
    from screener.screening.criteria import criteria

    for item in criteria().values():
        assert numbers.unit_text(item.unit, "us") != item.unit or item.unit in ("-", ""), item.id


def test_numbers_load_without_numpy():
    """The first screen is painted before NumPy is there."""
    code = "import sys, screener.memo.numbers, screener.memo.text; print('numpy' in sys.modules, 'pint' in sys.modules)"
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True, cwd=ROOT)
    assert done.stdout.split() == ["False", "False"]
