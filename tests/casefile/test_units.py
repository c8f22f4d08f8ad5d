"""Spellings of units against SI values worked by hand.

Each expected value is arithmetic written here from a printed conversion factor, not taken from the
program. Sources:

SP811  NIST Special Publication 811 (2008), appendix B.9; factors printed to seven figures
       (read in a public transcription of the table, row by row)
exact  follows from a definition without rounding (SI prefix, 60 s, 12 in)
N      normal cubic metre of air, 0 degC and 101,325 Pa (DIN 1343); Sm3 15 degC (ISO 13443)
SCF    60 degF and 14.696 psia: common practice, no source
API    141.5/(API + 131.5) of water at 60 degF, 999.016 kg/m3 (API MPMS 11.1, quoted)
"""

import math
import subprocess
import sys

import pytest

from screener.casefile.quantities import KINDS
from screener.casefile.units import kinds, measure, quantity, registry, show, shown
from screener.ground.errors import UnitError

PSI = 6.894757e3  # SP811, psi to pascal
IN_H2O = 2.490889e2  # SP811, inch of water, conventional
MM_HG = 1.333224e2  # SP811, millimeter of mercury, conventional
IN_HG = 3.386389e3  # SP811, inch of mercury, conventional
BBL = 1.589873e-1  # SP811, barrel for petroleum, 42 US gallons
GAL = 3.785412e-3  # SP811, gallon (U.S.)
FT = 3.048e-1  # SP811, exact
LB = 4.535924e-1  # SP811, pound (avoirdupois)
BTU = 1.055056e3  # SP811, British thermal unit (IT)
KNOT = 5.144444e-1  # SP811
MILE = 1.609344e3  # SP811, exact
NORMAL_CF = (
    FT**3 * (14.696 * PSI / 101325.0) * (273.15 / ((60.0 + 459.67) / 1.8))
)  # [m3 of normal air per SCF]

# A printed factor of seven figures is off by at most 5e-7 of itself; two of them in a product 1e-6.
PRINTED, TWICE, EXACT = 6e-7, 1.2e-6, 1e-12

TABLE = [
    ("24 m", "length", 24.0, EXACT, "exact"),
    ("24m", "length", 24.0, EXACT, "exact"),
    ("304 mm", "length", 0.304, EXACT, "exact"),
    ("12 in", "length", 12 * 0.0254, EXACT, "SP811"),
    ("12 inches", "length", 0.3048, EXACT, "SP811"),
    ("78.74 ft", "length", 78.74 * FT, EXACT, "SP811"),
    ("48 FT", "length", 48 * FT, EXACT, "SP811"),
    ("0,2 km", "length", 200.0, EXACT, "exact"),
    ("\u22120.4 m", "length", -0.4, EXACT, "exact, minus sign U+2212"),
    ("1e3 mm", "length", 1.0, EXACT, "exact"),
    ("450 m2", "area", 450.0, EXACT, "exact"),
    ("450 m\u00b2", "area", 450.0, EXACT, "exact"),
    ("100 ft^2", "area", 100 * FT**2, EXACT, "SP811"),
    ("5 sq in", "area", 5 * 0.0254**2, EXACT, "SP811"),
    ("2100 m3", "volume", 2100.0, EXACT, "exact"),
    ("2100 m^3", "volume", 2100.0, EXACT, "exact"),
    ("2 100 m\u00b3", "volume", 2100.0, EXACT, "exact, spaced thousands"),
    ("2\u2009100 m3", "volume", 2100.0, EXACT, "exact, thin space"),
    ("1_200 m3", "volume", 1200.0, EXACT, "exact, underscore"),
    ("1 200,5 m3", "volume", 1200.5, EXACT, "exact, decimal comma"),
    ("350 L", "volume", 0.35, EXACT, "SP811"),
    ("10 000 bbl", "volume", 1e4 * BBL, PRINTED, "SP811"),
    ("1 bbl", "volume", 42 * GAL, PRINTED, "SP811, not the 31.5 gal barrel"),
    ("500 US gal", "volume", 500 * GAL, PRINTED, "SP811"),
    ("20 cu ft", "volume", 20 * FT**3, EXACT, "SP811"),
    ("600 m3/h", "flow", 600 / 3600, EXACT, "exact"),
    ("600 m\u00b3/hr", "flow", 600 / 3600, EXACT, "exact"),
    ("1200 m3 per hour", "flow", 1200 / 3600, EXACT, "exact"),
    ("900 L/min", "flow", 0.9 / 60, EXACT, "exact"),
    ("150 l/s", "flow", 0.15, EXACT, "exact"),
    ("2000 gpm", "flow", 2000 * GAL / 60, PRINTED, "SP811"),
    ("2000 GPM", "flow", 2000 * GAL / 60, PRINTED, "SP811"),
    ("4000 bbl/h", "flow", 4000 * BBL / 3600, PRINTED, "SP811"),
    ("96000 bpd", "flow", 96000 * BBL / 86400, PRINTED, "SP811"),
    ("2400 Nm3/h air", "air flow", 2400 / 3600, EXACT, "N"),
    ("2400 Nm\u00b3/h", "air flow", 2400 / 3600, EXACT, "N"),
    ("2400 Nm3/h of air", "air flow", 2400 / 3600, EXACT, "N"),
    ("2400 Sm3/h", "air flow", 2400 / 3600 * 273.15 / 288.15, EXACT, "N"),
    ("84000 SCFH", "air flow", 84000 * NORMAL_CF / 3600, PRINTED, "SCF"),
    ("84000 scfh air", "air flow", 84000 * NORMAL_CF / 3600, PRINTED, "SCF"),
    ("1400 SCFM", "air flow", 1400 * NORMAL_CF / 60, PRINTED, "SCF"),
    ("62 kPa", "pressure", 62e3, EXACT, "exact"),
    ("11,1 kPa", "pressure", 11.1e3, EXACT, "exact, decimal comma"),
    ("11.1 psi", "pressure", 11.1 * PSI, PRINTED, "SP811"),
    ("11.1 psia", "pressure", 11.1 * PSI, PRINTED, "SP811"),
    ("0.765 bar", "pressure", 76.5e3, EXACT, "SP811"),
    ("765 mbar", "pressure", 76.5e3, EXACT, "SP811"),
    ("1.7 MPa", "pressure", 1.7e6, EXACT, "exact"),
    ("97.5 kPa", "absolute pressure", 97.5e3, EXACT, "exact"),
    ("97.5 kPa abs", "absolute pressure", 97.5e3, EXACT, "exact"),
    ("97.5 kPa(a)", "absolute pressure", 97.5e3, EXACT, "exact"),
    ("975 hPa", "absolute pressure", 97.5e3, EXACT, "exact"),
    ("0.975 bara", "absolute pressure", 97.5e3, EXACT, "SP811"),
    ("731 mmHg", "absolute pressure", 731 * MM_HG, PRINTED, "SP811"),
    ("28.8 inHg", "absolute pressure", 28.8 * IN_HG, PRINTED, "SP811"),
    ("1 atm", "absolute pressure", 101325.0, EXACT, "SP811"),
    ("14.696 psia", "absolute pressure", 14.696 * PSI, PRINTED, "SP811"),
    ("1 kgf/cm2", "absolute pressure", 9.80665e4, EXACT, "SP811, technical atmosphere"),
    ("1.5 kPa gauge", "pressure difference", 1500.0, EXACT, "exact"),
    ("1.5 kPag", "pressure difference", 1500.0, EXACT, "exact"),
    ("0.25 kPa", "pressure difference", 250.0, EXACT, "exact"),
    ("15 mbar", "pressure difference", 1500.0, EXACT, "SP811"),
    ("0.02 barg", "pressure difference", 2000.0, EXACT, "SP811"),
    ("0.03 psig", "pressure difference", 0.03 * PSI, PRINTED, "SP811"),
    ("0.5 oz/in2", "pressure difference", 0.5 * PSI / 16, PRINTED, "SP811; 16 oz to the lb"),
    ("0.5 oz/in\u00b2", "pressure difference", 0.5 * PSI / 16, PRINTED, "SP811"),
    ("4 oz/sq in", "pressure difference", 4 * PSI / 16, PRINTED, "SP811"),
    ("6 inH2O", "pressure difference", 6 * IN_H2O, PRINTED, "SP811"),
    ("6 in WC", "pressure difference", 6 * IN_H2O, PRINTED, "SP811"),
    ("25 mmH2O", "pressure difference", 25 * 9.80665, EXACT, "SP811"),
    ("32 degC", "temperature", 305.15, EXACT, "SP811"),
    ("35degC", "temperature", 308.15, EXACT, "SP811"),
    ("32 \u00b0C", "temperature", 305.15, EXACT, "SP811"),
    ("32 \u2103", "temperature", 305.15, EXACT, "SP811"),
    ("-4 deg C", "temperature", 269.15, EXACT, "SP811"),
    ("100 degF", "temperature", (100 + 459.67) / 1.8, EXACT, "SP811"),
    ("100 \u00b0F", "temperature", 310.92777777777775, EXACT, "SP811"),
    ("298.15 K", "temperature", 298.15, EXACT, "exact"),
    ("540 degR", "temperature", 300.0, EXACT, "SP811"),
    ("5 K", "temperature difference", 5.0, EXACT, "exact"),
    ("9 degF difference", "temperature difference", 5.0, EXACT, "SP811"),
    ("3 delta_degC", "temperature difference", 3.0, EXACT, "SP811"),
    ("3 \u0394\u00b0C", "temperature difference", 3.0, EXACT, "SP811"),
    ("18 delta_degF", "temperature difference", 10.0, EXACT, "SP811"),
    ("90 %", "share", 0.9, EXACT, "exact"),
    ("9.8 vol%", "share", 0.098, EXACT, "exact"),
    ("8 mol %", "share", 0.08, EXACT, "exact"),
    ("2.5 wt%", "share", 0.025, EXACT, "exact"),
    ("2.5 mass %", "share", 0.025, EXACT, "exact"),
    ("3 % v/v", "share", 0.03, EXACT, "exact"),
    ("150 ppm", "share", 1.5e-4, EXACT, "exact"),
    ("150 ppmw", "share", 1.5e-4, EXACT, "exact"),
    ("150 ppm mol", "share", 1.5e-4, EXACT, "exact"),
    ("742 kg/m^3", "density", 742.0, EXACT, "exact"),
    ("742 kg m\u207b\u00b3", "density", 742.0, EXACT, "exact"),
    ("0.742 g/cm3", "density", 742.0, EXACT, "exact"),
    ("6.19 lb/gal", "density", 6.19 * LB / GAL, TWICE, "SP811"),
    ("46.3 lb/ft3", "density", 46.3 * LB / FT**3, PRINTED, "SP811"),
    ("60 API", "density", 141.5 / 191.5 * 999.016, EXACT, "API"),
    ("10 \u00b0API", "density", 999.016, EXACT, "API: 10 degrees is water"),
    ("0.6 mPa s", "viscosity", 6e-4, EXACT, "exact"),
    ("0.6 mPa\u00b7s", "viscosity", 6e-4, EXACT, "exact"),
    ("0.6 cP", "viscosity", 6e-4, EXACT, "SP811"),
    ("0.7 cSt", "kinematic viscosity", 7e-7, EXACT, "SP811"),
    ("0.7 mm2/s", "kinematic viscosity", 7e-7, EXACT, "exact"),
    ("25 MJ/m2/day", "insolation", 25e6, EXACT, "exact"),
    ("25 MJ/(m\u00b2\u00b7day)", "insolation", 25e6, EXACT, "exact"),
    ("6.9 kWh/m2/day", "insolation", 6.9 * 3.6e6, EXACT, "SP811"),
    ("6900 Wh/m2/d", "insolation", 6900 * 3600.0, EXACT, "SP811"),
    ("2190 Btu/ft2/day", "insolation", 2190 * BTU / FT**2, PRINTED, "SP811"),
    ("2484 J/cm2/day", "insolation", 2484e4, EXACT, "exact"),
    ("41 deg", "angle", 41.0, EXACT, "exact"),
    ("41\u00b0 N", "angle", 41.0, EXACT, "exact"),
    ("33.5 deg S", "angle", -33.5, EXACT, "exact"),
    ("0.5 rad", "angle", 90 / math.pi, EXACT, "SP811: degree is pi/180 rad"),
    ("3 m/s", "speed", 3.0, EXACT, "exact"),
    ("18 km/h", "speed", 5.0, EXACT, "exact"),
    ("10 mph", "speed", 10 * MILE / 3600, EXACT, "SP811"),
    ("20 ft/s", "speed", 20 * FT, EXACT, "SP811"),
    ("12 knots", "speed", 12 * KNOT, PRINTED, "SP811"),
    ("1.5 t", "mass", 1500.0, EXACT, "SP811"),
    ("300 lb", "mass", 300 * LB, PRINTED, "SP811"),
]


@pytest.mark.parametrize(
    ("text", "kind", "by_hand", "allowed", "source"), TABLE, ids=[row[0] for row in TABLE]
)
def test_a_spelling_has_the_value_worked_by_hand(text, kind, by_hand, allowed, source):
    assert measure(text, kind).value == pytest.approx(by_hand, rel=allowed, abs=0.0)


def test_the_table_is_large_enough_and_covers_every_kind():
    assert len({row[0] for row in TABLE}) >= 80
    assert {row[1] for row in TABLE} == set(kinds())


REFUSED = [
    ("5", "length", "has no unit"),
    ("24", "length", "such as '24 m'"),
    ("", "length", "does not begin with one plain number"),
    ("   ", "length", "does not begin with one plain number"),
    ("m", "length", "does not begin with one plain number"),
    ("five m", "length", "does not begin with one plain number"),
    ("nan m", "length", "does not begin with one plain number"),
    ("inf m", "length", "does not begin with one plain number"),
    ("1e999 m", "length", "too large"),
    ("4-5 m", "length", "not a unit of length"),
    ("1.2.3 m", "length", "does not begin with one plain number"),
    ("1.200,5 m", "length", "does not begin with one plain number"),
    ("12 34 m", "length", "does not begin with one plain number"),
    ("12' 6\"", "length", "write ft or in"),
    ("24 Mm", "length", "not a unit of length"),
    ("24 furlong", "length", r"m, mm, cm, km, ft, in"),
    ("3 kPa", "length", "is a unit of pressure, not of length"),
    ("1,200 m3", "volume", "ambiguous.*1200 or 1.200"),
    ("84,000 SCFH", "air flow", "ambiguous"),
    ("100 m3/h", "air flow", "at which temperature and pressure"),
    ("100 cfm", "air flow", "write SCFM"),
    ("100 Nm3/h", "flow", "is a unit of air flow, not of flow"),
    ("100 Nm3/h nitrogen", "air flow", "not a unit of air flow"),
    ("35 C", "temperature", "coulomb.*degC"),
    ("95 F", "temperature", "farad.*degF"),
    ("540 R", "temperature", "degR"),
    ("35 deg", "temperature", "is a unit of angle, not of temperature"),
    ("35 k", "temperature", "not a unit of temperature"),
    ("-300 degC", "temperature", "below absolute zero"),
    ("-1 K", "temperature", "below absolute zero"),
    ("5 K difference", "temperature", "not a unit of temperature"),
    ("5 degC difference", "temperature", "is a unit of temperature difference"),
    ("5 degC", "temperature difference", "is a temperature; a difference is written K"),
    ("30 ton", "mass", "907, 1000 or 1016 kg"),
    ("30 tons", "mass", "t, lb"),
    ("1.5 psig", "absolute pressure", "gauge pressure where an absolute"),
    ("1.5 kPa gauge", "absolute pressure", "gauge pressure where an absolute"),
    ("101 kPa abs", "pressure difference", "absolute pressure where a difference"),
    ("14.7 psia", "pressure difference", "absolute pressure where a difference"),
    ("5 mpa", "pressure", "not a unit of pressure"),
    ("5 mPa", "pressure", "not a unit of pressure"),
    ("8 mol", "share", "vol%, mol%"),
    ("8 m", "share", "is a unit of length, not of share"),
    ("8 p", "share", "not a unit of share"),
    ("-200 API", "density", "too large"),
]


@pytest.mark.parametrize(("text", "kind", "words"), REFUSED, ids=[f"{row[0]}-{row[1]}" for row in REFUSED])
def test_a_refusal_names_the_place_the_reason_and_the_accepted_spellings(text, kind, words):
    with pytest.raises(UnitError, match=words) as caught:
        quantity(text, kind, "tank.somewhere")
    assert caught.value.path == "tank.somewhere"
    assert caught.value.text == text
    assert "expected a" in str(caught.value) and KINDS[kind].example in str(caught.value)


@pytest.mark.parametrize("value", [24, 24.0, True, None, ["24 m"], {"m": 24}])
def test_what_is_not_text_is_refused(value):
    with pytest.raises(UnitError, match="has no unit; expected a length"):
        quantity(value, "length", "tank.shell_diameter")


def test_a_pressure_says_whether_it_is_gauge():
    assert quantity("62 kPa", "pressure") == (62000.0, False)
    assert quantity("62 kPa abs", "pressure") == (62000.0, False)
    assert quantity("62 kPa gauge", "pressure") == (62000.0, True)
    assert quantity("9 psig", "pressure")[1] and quantity("2 mbar(g)", "pressure")[1]


@pytest.mark.parametrize(
    ("text", "mark"),
    [
        ("5 %", ""),
        ("5 vol%", "volume"),
        ("5 mol%", "mole"),
        ("5 wt%", "mass"),
        ("5 ppm", ""),
        ("5 ppmv", "volume"),
    ],
)
def test_a_share_says_its_basis(text, mark):
    assert measure(text, "share").mark == mark


@pytest.mark.parametrize("kind", kinds())
def test_every_spelling_has_the_dimension_of_its_kind(kind):
    for spelling, meaning in KINDS[kind].spellings.items():
        there = registry().Quantity(1.0, meaning.unit).check(registry().Unit(KINDS[kind].si).dimensionality)
        assert there, f"{spelling} is read as {meaning.unit}"


@pytest.mark.parametrize("kind", kinds())
def test_what_is_shown_can_be_read_again(kind):
    start = 287.6543 if kind == "temperature" else 12345.678 if "pressure" in kind else 0.0123456
    for system in ("si", "us"):
        for plain in (True, False):
            text = show(start, kind, system, digits=12, plain=plain)
            # twelve figures were printed; a fixed number of decimals keeps fewer (temperatures: nine)
            assert measure(text, kind).value == pytest.approx(start, rel=1e-7)


@pytest.mark.parametrize(
    ("value", "kind", "system", "text"),
    [
        (101325.0, "absolute pressure", "si", "101.3 kPa abs"),
        (101325.0, "absolute pressure", "us", "14.7 psia"),
        (303.15, "temperature", "si", "30 degC"),
        (303.15, "temperature", "us", "86 degF"),
        (5.0, "temperature difference", "us", "9 degF difference"),
        (600 / 3600, "flow", "si", "600 m3/h"),
        (21346.0, "volume", "si", "21346 m3"),
        (0.0, "length", "si", "0 m"),
        (-0.00001, "temperature difference", "si", "0 K"),
        (None, "length", "si", "not known"),
        (math.nan, "length", "us", "not known"),
    ],
)
def test_shown_text(value, kind, system, text):
    assert show(value, kind, system) == text


def test_shown_number_and_unit_come_apart():
    assert shown(1500.0, "pressure difference") == (pytest.approx(1.5, rel=EXACT), "kPa")
    assert shown(None, "pressure difference") == (None, "kPa")


def test_importing_the_case_file_loads_no_pint_and_no_numpy():
    heavy = "{'pint', 'numpy', 'scipy', 'textual'}"
    code = f"import sys, screener.casefile; print(sorted({heavy} & set(sys.modules)))"
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert done.stdout.strip() == "[]"
