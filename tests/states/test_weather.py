"""From a site to temperatures: which month, which day, which reading wins."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from screener.site import clear_sky_insolation
from screener.states.case import Reading
from screener.states.inputs import gather
from screener.states.weather import weather
from tests.screening.sample import MONTHS, ZERO, case, site, tank


def of(*cases):
    return weather(gather(cases))


def test_design_day_of_a_month_keeps_its_distance_to_the_hottest():
    w = of(case(), case(site=site(month="Jan")), case(site=site(month=None)))
    # Hottest month July: mean high 29.0 degC; design high 33.0 degC, so every design day is 4 K above its mean high.
    assert w.air_high - ZERO == pytest.approx([33.0, 13.0, 33.0])
    assert w.air_high - w.air_low == pytest.approx([12.0, 12.0, 12.0])
    assert list(w.month) == [7, 1, 7]


def test_the_sun_of_the_design_day_is_a_clear_sky_unless_given():
    w = of(case(), case(site=site(design_insolation=2.5e7)))
    assert w.insolation[0] == pytest.approx(clear_sky_insolation(44.0, day_of_year=196, elevation=35.0))
    assert w.insolation[1] == 2.5e7


def test_the_higher_edition_is_the_value_and_their_difference_lies_in_the_range():
    w = of(case())
    low, best, high = w.T_surface[0]
    assert best == w.editions[0].max()
    assert low <= w.editions[0].min() and high >= best + (w.editions[0].max() - w.editions[0].min())


def test_a_reading_beats_the_estimate_but_does_not_hide_it():
    w = of(case(site=site(liquid_temperature=Reading(ZERO + 24.0, "2026-07-14"))), case())
    assert w.T_surface[0, 1] == ZERO + 24.0
    assert w.T_surface[0, 2] == w.T_estimate[1, 2] > ZERO + 25.0
    hot = of(case(site=site(liquid_temperature=Reading(ZERO + 60.0, "2026-07-14"))))
    assert hot.T_surface[0] == pytest.approx([ZERO + 59.0, ZERO + 60.0, ZERO + 61.0])


def test_the_legal_temperature_is_the_highest_monthly_mean_of_the_year():
    w = of(case(), case(site=site(month="Jan")), case(site=site(months=())))
    assert w.T_legal[:2] == pytest.approx([ZERO + 23.0] * 2)
    assert np.isnan(w.T_legal[2]) and w.month_legal[2] == 0


def test_eleven_months_are_not_a_year():
    w = of(case(site=site(months=MONTHS[:11])))
    assert np.isnan(w.T_legal[0])


def test_the_lowest_barometer_given_wins_over_the_elevation():
    w = of(
        case(),
        case(site=site(lowest_barometer=None)),
        case(site=site(lowest_barometer=None, elevation=1600.0)),
    )
    assert w.barometer[0] == 97800.0
    assert w.barometer[1] < 101325.0 - 3000.0
    assert w.barometer[2] < 82000.0


def test_without_months_the_swing_is_a_range():
    known, unknown = of(case()), of(case(site=site(months=(), month=None)))
    assert np.ptp(unknown.T_surface[0]) > np.ptp(known.T_surface[0])


def test_a_buried_tank_needs_its_reading():
    buried = tank(kind="underground", shell_diameter=2.5, length=8.0, surface=None)
    without, with_ = of(
        case(tank=buried), case(tank=buried, site=site(liquid_temperature=Reading(ZERO + 14.0, "2026-07-01")))
    ).T_surface
    assert np.isnan(without).all()
    assert with_ == pytest.approx([ZERO + 13.0, ZERO + 14.0, ZERO + 15.0])


def test_paint_that_is_not_given_leaves_no_estimate():
    assert np.isnan(of(case(tank=replace(tank(), surface=None))).T_surface).all()
