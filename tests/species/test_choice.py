"""The rules that choose a vapour-pressure curve, on made-up candidates where the answer is plain."""

from __future__ import annotations

import numpy as np
import pytest

from screener.species import library, vapour_pressure
from screener.species.library import Candidate
from screener.species.vapour_pressure import NoData, choose_vapour_pressure

TC, PC, TB = 540.0, 2.7e6, 371.5


def true(T):
    """A smooth heptane-like curve through 1 atm at TB. [Pa]"""
    return 101325.0 * np.exp(4300.0 * (1.0 / TB - 1.0 / T) + 3.0 * np.log(TB / T))


def candidate(method, low=200.0, high=530.0, off=0.0, source="poling-2001"):
    """True curve, off by a share that fades towards the boiling point."""
    return Candidate(method, source, low, high, lambda T: true(T) * (1.0 + off * (TB - T) / 100.0))


@pytest.fixture
def offer(monkeypatch):
    """Make the library offer the candidates given."""

    def choose(*candidates, **options):
        monkeypatch.setattr(library, "vapour_pressures", lambda cas: list(candidates))
        return choose_vapour_pressure("000-00-0", TC, PC, TB, **options)

    return choose


def test_first_of_equals(offer):
    found = offer(candidate("A", off=0.004), candidate("B", off=-0.004))
    assert found.method == "A" and found.spread == pytest.approx(2 * 0.004 * (TB - 250.0) / 100.0, rel=0.02)
    assert found.extension == 0.0 and found.note == ""


def test_repeats_of_one_data_set_count_once(offer):
    found = offer(candidate("A"), candidate("B", off=1e-5))
    assert found.spread is None and "no second curve within 250-350 K" in found.note


def test_lone_outlier_among_four_is_rejected(offer):
    found = offer(
        candidate("A", off=0.08), candidate("B"), candidate("C", off=0.004), candidate("D", off=-0.004)
    )
    assert found.method == "B" and "rejected A" in found.note and found.spread < 0.01


def test_disagreement_of_two_is_said_not_settled(offer):
    found = offer(candidate("A"), candidate("B", off=0.05))
    assert found.method == "A" and found.spread == pytest.approx(0.06, abs=0.002)
    assert "B differs by 6.1 %" in found.note


def test_curve_that_misses_the_boiling_point_is_rejected(offer):
    wrong = Candidate("A", "poling-2001", 200.0, 530.0, lambda T: 1.06 * true(T))
    found = offer(wrong, candidate("B"))
    assert found.method == "B" and "rejected A" in found.note


def test_reference_equation_goes_first_unless_far_from_its_peers(offer):
    peers = [candidate("B"), candidate("C", off=0.002), candidate("D", off=-0.002)]
    assert offer(*peers, candidate("H", off=0.01, source="helmholtz")).method == "H"
    assert offer(*peers, candidate("H", off=0.05, source="helmholtz")).method != "H"


def test_a_wide_curve_goes_before_a_narrow_one(offer):
    assert offer(candidate("A", low=330.0, high=380.0), candidate("B", off=0.004)).method == "B"


def test_a_hand_choice_is_said(offer):
    found = offer(candidate("A"), candidate("B", off=0.004), prefer="B")
    assert found.method == "B" and found.note.startswith("chosen by hand")


def test_continued_curve_carries_its_band(offer):
    found = offer(candidate("A", low=310.0, high=420.0))
    assert found.T_low == 200.0 and found.T_high > 420.0
    assert "no curve reaches below 300 K" in found.note and "continued below 310 K" in found.note
    # two standard deviations: at least what the blind trials miss by 60 K below a curve, 2 %
    assert 2.0 * 0.02 * (60.0 / 60.0) ** 2 <= found.extension < 0.4
    assert found.heats == ""


def test_nothing_to_choose_from(offer):
    with pytest.raises(NoData, match="no vapour-pressure curve"):
        offer()


def test_fit_holds_the_points():
    T = np.linspace(220.0, 450.0, 100)
    coefficients, error = vapour_pressure.fits.psat_coefficients(T, true(T))
    assert error < 1e-9  # the made-up curve lies in the span of the form; rounding to 13 digits is left
    assert len(coefficients) == 6
