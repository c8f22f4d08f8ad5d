"""Remembered and recomputed temperatures that guard the code; not outside proof.

W1 is example 1 of AP-42 chapter 7.1, November 2006 (a 6 ft by 12 ft cone-roof tank), remembered; its
printed figures use degrees Rankine as Fahrenheit plus 460. The 2020 figures are our own.
"""

import pytest

from screener.tank import daily_temperatures_2006, daily_temperatures_2020
from screener.tank.temperatures import BTU_PER_SQUARE_FOOT

SUN = 1568.0 * BTU_PER_SQUARE_FOOT
HIGH_F, LOW_F, ALPHA = 64.3, 36.2, 0.17


def rankine(kelvin):
    return kelvin * 1.8


def kelvin(fahrenheit, zero):
    return (fahrenheit + zero) / 1.8


def test_w1_with_the_whole_degree_zero_of_the_print():
    day = daily_temperatures_2006(kelvin(HIGH_F, 460.0), kelvin(LOW_F, 460.0), SUN, ALPHA, ALPHA)
    # 0.01 R is the last printed digit; the range and its ends are printed to 0.1 R.
    assert rankine(day.bulk) - 460.0 == pytest.approx(50.27, abs=0.01)
    assert rankine(day.surface_mean) == pytest.approx(512.36, abs=0.01)
    assert rankine(day.vapour_range) == pytest.approx(27.696, abs=0.001)
    assert rankine(day.surface_maximum) == pytest.approx(519.29, abs=0.01)
    assert rankine(day.surface_minimum) == pytest.approx(505.44, abs=0.01)


def test_w1_with_the_exact_zero():
    day = daily_temperatures_2006(kelvin(HIGH_F, 459.67), kelvin(LOW_F, 459.67), SUN, ALPHA, ALPHA)
    # By hand: 0.44 x 509.92 + 0.56 x 509.94 + 0.0079 x 0.17 x 1568 = 512.037 R, worked to three decimals.
    assert rankine(day.surface_mean) == pytest.approx(512.037, abs=0.001)
    # The SI constants of the French annex give 284.47 K and 15.39 K; theirs are rounded: 0.05 K.
    assert float(day.surface_mean) == pytest.approx(284.47, abs=0.05)
    assert float(day.vapour_range) == pytest.approx(15.39, abs=0.05)


@pytest.mark.parametrize(
    "ratio, surface, vapour, swing",
    [(None, 52.063, 52.889, 25.001), (2.0, 51.695, 52.340, 28.509)],
)
def test_2020_figures_of_our_own(ratio, surface, vapour, swing):
    day = daily_temperatures_2020(
        kelvin(HIGH_F, 459.67), kelvin(LOW_F, 459.67), SUN, ALPHA, ALPHA, height_over_diameter=ratio
    )
    # Three printed decimals: half a last digit.
    assert rankine(day.bulk) - 459.67 == pytest.approx(51.050, abs=0.0006)
    assert rankine(day.surface_mean) - 459.67 == pytest.approx(surface, abs=0.0006)
    assert rankine(day.vapour_mean) - 459.67 == pytest.approx(vapour, abs=0.0006)
    assert rankine(day.vapour_range) == pytest.approx(swing, abs=0.0006)


def test_2020_default_is_the_rounded_general_form_at_half_height():
    # Read off slope by slope at H/D = 0.5: 0.733 and 0.0183, 0.367/0.633/0.00458, 0.733/0.267/0.0092.
    def slopes(ratio):
        base = (300.0, 290.0, 0.0, 0.0, 0.0)
        cold = daily_temperatures_2020(*base, height_over_diameter=ratio, bulk_temperature=295.0)
        warm = daily_temperatures_2020(*base, height_over_diameter=ratio, bulk_temperature=296.0)
        sun = daily_temperatures_2020(
            300.0,
            290.0,
            1000.0 * BTU_PER_SQUARE_FOOT,
            1.0,
            1.0,
            height_over_diameter=ratio,
            bulk_temperature=295.0,
        )
        return (
            float(cold.vapour_range) / 10.0,
            float(sun.vapour_range - cold.vapour_range) * 1.8e-3,
            float(warm.surface_mean - cold.surface_mean),
            float(sun.surface_mean - cold.surface_mean) * 1.8e-3,
            float(warm.vapour_mean - cold.vapour_mean),
            float(sun.vapour_mean - cold.vapour_mean) * 1.8e-3,
        )

    # Half a last digit of the figures above.
    assert slopes(0.5) == pytest.approx((0.733, 0.0183, 0.633, 0.00458, 0.267, 0.0092), abs=6e-4)
    assert slopes(None) == pytest.approx((0.7, 0.02, 0.6, 0.005, 0.3, 0.009), abs=1e-9)


def test_watt_hour_coefficients():
    # Kelvin per Wh/m2 of absorbed sun, as recomputed by hand; half a last digit.
    per = 3600.0
    old = daily_temperatures_2006(300.0, 300.0, per, 1.0, 1.0, bulk_temperature=300.0)
    new = daily_temperatures_2020(300.0, 300.0, per, 1.0, 1.0, bulk_temperature=300.0)
    free = daily_temperatures_2020(300.0, 300.0, per, 1.0, 1.0)
    assert float(old.surface_mean) - 300.0 == pytest.approx(0.001391, abs=1e-6)
    assert float(old.vapour_range) == pytest.approx(0.00493, abs=5e-6)
    assert float(new.surface_mean) - 300.0 == pytest.approx(0.000881, abs=1e-6)
    assert float(new.vapour_range) == pytest.approx(0.00352, abs=5e-6)
    assert float(new.vapour_mean) - 300.0 == pytest.approx(0.001585, abs=1e-6)
    assert float(free.bulk) - 300.0 == pytest.approx(0.000528, abs=1e-6)
