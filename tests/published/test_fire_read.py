"""Fire figures that were read in the source named beside each."""

from __future__ import annotations

import numpy as np
import pytest

from screener.fire import (
    blending_index,
    flash_point_at_standard_pressure,
    hazard_class,
    jet_a_window,
    limit_jones_1938,
    limiting_oxygen,
    mixture_limit,
)
from screener.fire.limits import Flammability

pytestmark = pytest.mark.published


def c(t):
    return np.asarray(t, dtype=float) + 273.15


def f(t):
    return (np.asarray(t, dtype=float) + 459.67) / 1.8


def test_index_table():
    """Blending indices at 20 to 100 degC: R.J. Patel, petroleum quality notes, 2017, a table of whole
    numbers."""
    T = [20.0, 30.0, 38.0, 50.0, 55.0, 60.0, 66.0, 80.0, 100.0]
    table = [3281, 1400, 742, 306, 216, 155, 105, 45, 15]
    # Whole numbers; above that the constants of the table carry other digits. One in a thousand is 0.01 K.
    assert blending_index(c(T)) == pytest.approx(table, rel=1e-3, abs=0.5)


def test_barometric_correction():
    """Tc = Td + 0.25 (101.3 - p): ISO 2719 clause 11.2, page of a test-equipment maker (dgaequipment.com)."""
    at = flash_point_at_standard_pressure(c(60.0), np.array([101.3, 97.3, 82.0]) * 1e3).require()
    assert at.T == pytest.approx(c([60.0, 61.0, 64.825]), abs=1e-9)  # exact arithmetic


@pytest.mark.parametrize(
    ("limits", "expected"),
    [([0.012, 0.053, 0.031], 0.02751172136637642), ([0.075, 0.15, 0.32], 0.12927551844869378)],
)
def test_le_chatelier_sample(limits, expected):
    """Vapours of 0.24, 0.61 and 0.15 %: Crowl and Louvar, Chemical Process Safety, as printed in the
    documentation of chemicals 1.5.2 (fire_mixing)."""
    assert mixture_limit([0.0024, 0.0061, 0.0015], limits)[0] == pytest.approx(expected, rel=1e-12)


@pytest.mark.parametrize(("limit", "expected"), [("LFL", 0.011899610558199915), ("UFL", 0.07572479446127219)])
def test_jones_sample(limit, expected):
    """Hexane: Crowl and Louvar, as printed in the documentation of chemicals 1.5.2."""
    # That text takes air as 1 in 4.76 oxygen, this program 0.2095: 0.3 %.
    assert limit_jones_1938("C6H14", limit) == pytest.approx(expected, rel=4e-3)


def test_jet_a_against_altitude():
    """Nestor 1967 at shepherd.caltech.edu: nine rows, and straight lines through them within 0.2 degC."""
    kft = np.arange(0.0, 45.0, 5.0)
    low = [35.0, 31.8, 28.6, 25.3, 22.1, 18.9, 15.7, 12.4, 9.2]
    high = [85.0, 79.6, 74.1, 68.7, 63.2, 57.8, 52.3, 46.9, 41.4]
    T_low, T_high = jet_a_window(kft * 304.8)
    assert T_low == pytest.approx(c(low), abs=1e-9) and T_high == pytest.approx(c(high), abs=1e-9)
    # The lines' own rounding: 0.1 degC, as their passport says.
    assert T_low == pytest.approx(c(35.0 - 0.645 * kft), abs=0.1)
    assert T_high == pytest.approx(c(85.0 - 1.09 * kft), abs=0.1)
    assert np.isnan(jet_a_window([-1.0, 13000.0])).all()


def test_limiting_oxygen_table():
    """Vol% in nitrogen and carbon dioxide: encyclopedia table (questionai.com); ASTM E2079-19 reference
    values."""
    from screener.equilibrium import Fluid

    fluid = Fluid.of(["hydrogen", "methane", "ethane", "propane", "n-butane", "isobutane", "ethylene"])
    in_nitrogen = limiting_oxygen(fluid, np.eye(7)).require()
    # The lower of both sources counts: E2079 has 4.6, 11.1, 10.7 and 8.5 (ethylene).
    assert in_nitrogen.oxygen * 100.0 == pytest.approx([4.6, 11.1, 11.0, 10.7, 12.0, 12.0, 8.5], abs=1e-9)
    in_dioxide = limiting_oxygen(fluid, np.eye(7), inert="carbon dioxide").require()
    assert in_dioxide.oxygen[:6] * 100.0 == pytest.approx([5.2, 14.5, 13.5, 14.5, 14.5, 15.0], abs=1e-9)
    assert set(in_nitrogen.evidence) == {"quoted"}


@pytest.mark.parametrize(
    ("flash", "boiling", "category"),
    [(73.0, 95.0, "category 1"), (73.0, 95.5, "category 2"), (73.4, 90.0, "category 3"),
     (140.0, 300.0, "category 3"), (140.5, 300.0, "category 4"), (199.4, 300.0, "category 4"),
     (199.9, 300.0, "not classed")],
)  # fmt: skip
def test_categories_of_1910_106(flash, boiling, category):
    """29 CFR 1910.106(a)(19)(i)-(iv), degF, as quoted on a laboratory-safety list, 8 September 2014."""
    answer = hazard_class("29 CFR 1910.106 (2012 on)", f(flash), constant=f(boiling))
    assert answer.name[0] == category and answer.evidence == "quoted"


@pytest.mark.parametrize(
    ("flash", "boiling", "category"),
    [(22.9, 35.0, "category 1"), (22.9, 35.1, "category 2"), (23.0, 30.0, "category 3"),
     (60.0, 200.0, "category 3"), (60.1, 200.0, "not classed")],
)  # fmt: skip
def test_categories_of_clp(flash, boiling, category):
    """Regulation (EC) 1272/2008 annex I table 2.6.1, read at reachlex.eu (text of 1 September 2025)."""
    assert hazard_class("EU CLP", c(flash), constant=c(boiling)).name[0] == category


@pytest.mark.parametrize(
    ("flash", "boiling", "name"),
    [(72.9, 99.0, "IA"), (72.9, 100.0, "IB"), (73.0, 99.0, "IC"), (99.9, 200.0, "IC"), (100.0, 300.0, "II"),
     (139.9, 300.0, "II"), (140.0, 300.0, "IIIA"), (199.9, 400.0, "IIIA"), (200.0, 400.0, "IIIB")],
)  # fmt: skip
def test_classes_of_nfpa_30(flash, boiling, name):
    """NFPA 30, 2003, section 1.7.3 as quoted by a university safety office (uwm.edu), degF."""
    assert hazard_class("NFPA 30 (2003 on)", f(flash), constant=f(boiling)).name[0] == name


def test_flash_points_of_alcohols_are_the_sound_ones():
    """IEC 60079-20-1: methanol 9, ethanol 12 degC. A collection in the same open tables has -31 and -13.1."""
    from screener.equilibrium import Fluid

    limits = Flammability.of(Fluid.of(["methanol", "ethanol"]))
    assert limits.flash_point == pytest.approx(c([9.0, 12.0]), abs=0.01)
    assert (limits.flash_point > c(5.0)).all()
