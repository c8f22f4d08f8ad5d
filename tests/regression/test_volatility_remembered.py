"""Volatility relations known from memory or from calculation: guards of the code, not proof."""

# Where the acceptance list of the volatility tests is met (number of the list, what is asked, test):
#  1 DVPE equations to 0.01 kPa, inverse    published/test_volatility_read: test_dvpe_of_astm_d5191 (read);
#                                           here: test_dvpe_equations, test_inverse (EPA, CARB, EN from memory)
#  2 triple expansion vector                regression/test_lab_pressures: test_triple_expansion_vector
#  3 three D5191 fluids within 0.7 kPa      here: test_reference_fluids_of_d5191 (totals from memory)
#  4 TVP > VP4 > VP10, DVPE < total, T20    regression/test_lab_ethanol: test_invariants; volatility/test_pressure_tests
#  5 annex III within 1.0 kPa, 1 to 10 %    published/test_volatility_annex_iii: test_rise_follows_the_annex;
#    and not with a wrong model             the same: test_the_annex_rejects_the_wrong_models
#  6 E10/E15/E20 alike, E85 16-30 kPa down  regression/test_lab_ethanol: test_e10_e15_e20_cannot_be_told_apart,
#                                           test_e85_lies_far_below; here: test_heavy_ethanol_shares
#  7 T20: line less flash 0 to +5 K         regression/test_lab_ethanol: test_straight_line_against_the_flash
#    pure liquid at its boiling point       volatility/test_cell: test_ratio_temperature_of_a_pure_liquid_is_its_boiling_point
#    ideal binary by hand within 0.05 K     volatility/test_ideal_pair: test_temperature_for_a_ratio
#    overfilled ratios refused              volatility/test_cell: test_ratio_temperature_refuses_small_ratios
#    boils hard at T20; judges nothing      regression/test_lab_ethanol: test_boiling_hard_at_the_ratio_20_temperature;
#                                           here: test_no_finding_is_judged_by_the_ratio_20_temperature
#  8 VLI 1250 and 936; annex III at 4.5 %   published/test_volatility_read: test_vapour_lock_index, test_annex_iii
# 12 D86 to TBP within 0.2 K                published/test_lab_interconversion: test_power_form
#    API 1994 180.82/197.30, not 184.63     regression/test_lab_interconversion: test_gap_form_with_the_exponent_of_the_procedure;
#                                           published/test_lab_interconversion: test_the_sheet_worked_with_another_exponent

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest

from screener.blends import Blend
from screener.equilibrium import Fluid
from screener.ground.constants import ZERO_CELSIUS
from screener.ground.errors import UnknownName
from screener.volatility import (
    driveability_index,
    dvpe,
    dvpe_equation,
    ratio_20_temperature_d4814,
    ratio_temperature,
)
from screener.volatility.air import AIR_AT_0C, ostwald_air

DEGF = 1.8


def kelvin(degF):
    return (degF + 459.67) / DEGF


@pytest.mark.parametrize(
    ("name", "expected"),
    [("EPA", [35.85, 54.97, 74.09, 93.21]), ("CARB", [33.95, 53.39, 72.83, 92.27]),
     ("EN 13016-1", [34.82, 54.12, 73.42, 92.72])],
)  # fmt: skip
def test_dvpe_equations(name, expected):
    X = np.array([40.0, 60.0, 80.0, 100.0]) * 1e3
    # Exact arithmetic; the table carries two decimals.
    assert dvpe_equation(name).dvpe(X) / 1e3 == pytest.approx(expected, abs=0.005)


@pytest.mark.parametrize(("name", "psi"), [("ASTM D5191", 0.548), ("EPA", 0.347), ("CARB", 0.715)])
def test_offsets_agree_with_the_psi_forms(name, psi):
    # Each form is rounded: half a unit of the last place of either, 0.0005 psi and 0.005 kPa.
    assert dvpe_equation(name).offset / 1e3 == pytest.approx(psi * 6.894757, abs=0.0005 * 6.894757 + 0.005)


@pytest.mark.parametrize("name", ["ASTM D5191", "EN 13016-1", "EPA", "CARB"])
def test_inverse(name):
    rule = dvpe_equation(name)
    X = np.linspace(20e3, 130e3, 12)
    assert rule.total(rule.dvpe(X)) == pytest.approx(X, rel=1e-14)


def test_unknown_equation():
    with pytest.raises(UnknownName, match="'ASTM D5190' is not a known vapour-pressure equation"):
        dvpe_equation("ASTM D5190")


@pytest.mark.parametrize(
    ("name", "total"), [("n-pentane", 112.8), ("2,2-dimethylbutane", 74.1), ("2,3-dimethylbutane", 57.1)]
)
def test_reference_fluids_of_d5191(name, total):
    """Remembered totals of the method's verification fluids: air model and vapour pressure together."""
    test = dvpe(Fluid.of([name]), [1.0]).require()
    # 0.7 kPa is about the method's own repeatability band for a verification fluid.
    assert test.P_total[0] / 1e3 == pytest.approx(total, abs=0.7)


def test_air_solubility_at_0C():
    """The formula gives back its own anchor for the reference oil."""
    assert ostwald_air(850.0, ZERO_CELSIUS)[0] == pytest.approx(
        AIR_AT_0C * 7.70 * 0.130, rel=2e-3
    )  # 0.300 x 3.333 is 0.9999


def test_air_solubility_table():
    """Calculated elsewhere with the same remembered formula; 700, 740, 800, 850 kg/m3 at 25 degC."""
    L = ostwald_air(np.array([700.0, 740.0, 800.0, 850.0]), ZERO_CELSIUS + 25.0)
    assert pytest.approx([0.247, 0.211, 0.159, 0.115], abs=6e-4) == L  # three decimals printed


def test_straight_line_for_ratio_20():
    """Base gasoline of 42 USC 7581(4), 8.7 psi, T10 126 and T50 219 degF, by the degF form."""
    T20 = ratio_20_temperature_d4814(8.7 * 6894.757, kelvin(126.0), kelvin(219.0))
    degF = 114.6 - 4.1 * 8.7 + 0.20 * 126.0 + 0.17 * 219.0
    # Rounded coefficients of the two forms: 0.006 + 8.7 x 0.0045 = 0.05 degF.
    assert DEGF * T20 - 459.67 == pytest.approx(degF, abs=0.06)


def test_driveability_index_in_both_units():
    """The degC form against the degF form 1.5 T10 + 3 T50 + T90 + 2.4 (vol% ethanol): 5.5 x 32 apart."""
    T10, T50, T90 = 126.0, 219.0, 327.0
    degC = driveability_index(kelvin(T10), kelvin(T50), kelvin(T90), ethanol=0.1)
    degF = 1.5 * T10 + 3.0 * T50 + T90 + 2.4 * 10.0
    # 1.33 x 1.8 = 2.394 against 2.4: 0.06 degF at 10 % ethanol.
    assert DEGF * degC + 5.5 * 32.0 == pytest.approx(degF, abs=0.07)


def test_no_finding_is_judged_by_the_ratio_20_temperature():
    """At it a gasoline boils hard already: it is printed as information and no criterion, tank or line reads it."""
    top = Path(__file__).parents[2]
    judges = [path for floor in ("tank", "line", "site", "states", "screening") for path in (top / "screener" / floor).glob("*.py")]  # fmt: skip
    users = {path.name for path in judges if any(word in path.read_text("utf-8") for word in ("ratio_temperature", "T20"))}
    assert len(judges) > 20
    assert users == {"information.py"}
    criteria = (top / "data" / "criteria" / "criteria.toml").read_text("utf-8")
    assert "V/L" not in criteria and "ratio 20" not in criteria


THIRTEEN = {
    "n-butane": 5.002, "isopentane": 10.450, "n-pentane": 4.750, "2-methylpentane": 8.550, "n-hexane": 4.750,
    "methylcyclopentane": 3.800, "n-heptane": 4.750, "2,2,4-trimethylpentane": 20.899,
    "2-methyl-2-butene": 5.700, "benzene": 0.760, "toluene": 11.400, "m-xylene": 11.400,
    "1,2,4-trimethylbenzene": 7.790,
}  # fmt: skip


@pytest.fixture(scope="module")
def gasoline():
    return Blend.of({k: v / 100.001 for k, v in THIRTEEN.items()})


def test_gasoline_of_thirteen_species(gasoline):
    """Against a calculation with original UNIFAC and ideal gas: VP4 61.7 kPa, DVPE 60.0, T20 58.0 degC."""
    test = dvpe(gasoline.fluid, gasoline.z).require()
    assert gasoline.density_15 == pytest.approx(730.5, abs=2.0)  # 730 at 15.6 degC
    # Two activity models and two sets of vapour pressures: 2 kPa.
    assert test.P_vapour[0] / 1e3 == pytest.approx(61.7, abs=2.0)
    assert test.P[0] / 1e3 == pytest.approx(60.0, abs=2.0)
    assert test.P_air[0] / 1e3 == pytest.approx(4.38, abs=0.15)  # the same air model, other volumes
    T20 = ratio_temperature(gasoline.fluid, gasoline.z, air=True).require()
    assert T20.T[0] - ZERO_CELSIUS == pytest.approx(58.0, abs=1.0)


def test_heavy_ethanol_shares(gasoline):
    """E10, E15 and E20 within 2 kPa of each other; E85 16 to 30 kPa below the base (calculated trend)."""
    shares = (0.10, 0.15, 0.20, 0.85)
    blends = [gasoline.mixed_with(Blend.of({"ethanol": 1.0}), volume=1 - s, other_volume=s) for s in shares]
    base = dvpe(gasoline.fluid, gasoline.z).P[0]
    P = np.array([dvpe(b.fluid, b.z).require().P[0] for b in blends])
    assert np.ptp(P[:3]) < 2.0e3
    assert 16.0e3 < base - P[3] < 30.0e3
