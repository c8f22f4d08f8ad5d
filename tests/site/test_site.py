"""Sun, calendar and barometer: shapes, edges, and what is out of range."""

import numpy as np
import pytest

from screener.site import (
    LOWEST_BAROMETER_ALLOWANCE,
    clear_sky_insolation,
    days_in_month,
    extraterrestrial_insolation,
    lowest_barometer,
    middle_day,
    month_number,
    standard_pressure,
    sunset_hour_angle,
)


@pytest.mark.parametrize(
    "text, number",
    [
        ("July", 7),
        ("jul", 7),
        ("Sept.", 9),
        ("12", 12),
        (" may ", 5),
        ("ma", None),
        ("13", None),
        ("summer", None),
    ],
)
def test_month_names(text, number):
    assert month_number(text) == number


def test_middle_days_lie_inside_their_month():
    month = np.arange(1, 13)
    first = np.concatenate([[1], 1 + np.cumsum(days_in_month(month))[:-1]])
    day = middle_day(month)
    assert (day == first + 14).all()
    assert days_in_month(month).sum() == 365


def test_polar_night_and_midnight_sun():
    assert extraterrestrial_insolation(80.0, 355) == 0.0
    assert sunset_hour_angle(80.0, 172) == pytest.approx(np.pi)
    # Under the midnight sun the daily mean is the constant times the sine of latitude and declination:
    # equation 21 with a sunset hour angle of pi, worked by hand to 0.1 %.
    assert extraterrestrial_insolation(80.0, 172) == pytest.approx(
        1440.0 * 0.0820e6 * 0.96745 * np.sin(np.radians(80.0)) * np.sin(0.409), rel=1e-3
    )


def test_hemispheres_mirror_but_for_the_distance_of_the_sun():
    north, south = extraterrestrial_insolation(np.array([40.0, -40.0]), np.array([172, 355]))
    # The sun is nearest in early January: 6.6 % more in the southern summer, by equation 23.
    assert south / north == pytest.approx(1.0327 / 0.9674, rel=5e-3)


def test_batch_equals_lane_by_lane():
    latitude = np.linspace(-80.0, 80.0, 9)
    day = np.arange(10, 100, 10)
    batch = clear_sky_insolation(latitude, day_of_year=day, elevation=500.0)
    single = [float(clear_sky_insolation(a, day_of_year=b, elevation=500.0)) for a, b in zip(latitude, day)]
    assert batch == pytest.approx(single, rel=1e-14)
    assert standard_pressure([0.0, 1500.0, 0.0])[1] == standard_pressure(1500.0)


def test_outside_the_range_is_nan_and_the_other_lanes_stand():
    sun = extraterrestrial_insolation(np.array([91.0, 40.0, np.nan]), np.array([100, 0, 100]))
    assert np.isnan(sun).all()
    assert np.isnan(clear_sky_insolation(40.0, day_of_year=172, elevation=7000.0))
    pressure = standard_pressure(np.array([9000.0, 100.0, np.nan]))
    assert np.isnan(pressure[[0, 2]]).all() and 1.0e5 < pressure[1] < 1.01325e5


def test_lowest_barometer_takes_the_allowance_off():
    assert lowest_barometer(35.0) == pytest.approx(
        float(standard_pressure(35.0)) - LOWEST_BAROMETER_ALLOWANCE
    )
    assert lowest_barometer(35.0, 0.0) == standard_pressure(35.0)
