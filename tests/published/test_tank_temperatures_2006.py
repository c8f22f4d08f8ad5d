"""November 2006 edition against the SI constants printed in French law.

Read: arrete of 3 October 2010, NOR DEVP1025848A, annex III (I in J/cm2 per day, temperatures in kelvin):
    T_LS = 0.44 T_AM + 0.56 T_LM + 0.00387 alpha I
    T_LM = T_AM + 3.33 alpha - 0.55
    dT_V = 0.72 dT_A + 0.0137 alpha I
"""

import numpy as np
import pytest

from screener.tank import bulk_temperature_2006, daily_temperatures_2006

AIR_HIGH, AIR_LOW = 305.0, 289.0
ALPHA = np.array([0.17, 0.34, 0.60, 0.97])
SUN = 2400.0e4  # 2,400 J/cm2 in J/m2


def test_bulk_constants_of_annex_iii():
    # 3.33 and 0.55 are 3.3333 and 0.5556 printed to two decimals: 0.0033 alpha + 0.0056 at most.
    printed = 297.0 + 3.33 * ALPHA - 0.55
    assert bulk_temperature_2006(297.0, ALPHA) == pytest.approx(printed, abs=0.009)


def test_surface_and_range_constants_of_annex_iii():
    mean, spread, alpha_sun = 297.0, 16.0, ALPHA * 2400.0
    day = daily_temperatures_2006(AIR_HIGH, AIR_LOW, SUN, ALPHA, ALPHA)
    printed_surface = 0.44 * mean + 0.56 * (mean + 3.33 * ALPHA - 0.55) + 0.00387 * alpha_sun
    printed_range = 0.72 * spread + 0.0137 * alpha_sun
    # The allowance of each sun constant (next test) times alpha I (at most 2,328), plus 0.56 of the bulk's.
    assert day.surface_mean == pytest.approx(printed_surface, abs=0.000006 * 2328 + 0.56 * 0.009)
    assert day.vapour_range == pytest.approx(printed_range, abs=0.00005 * 2328)


def test_the_sun_constants_separately():
    # Slope with insolation alone, so that the constants are seen without the rest. 0.0137: half a last
    # printed digit. 0.00387: the exact conversion of 0.0079 is 0.0038646, 0.14 % below the print,
    # a rounding of the law's own; 0.6 of a last digit, 0.01 K on the hottest day.
    dark = daily_temperatures_2006(AIR_HIGH, AIR_LOW, 0.0, 1.0, 1.0)
    lit = daily_temperatures_2006(AIR_HIGH, AIR_LOW, 1000.0e4, 1.0, 1.0)
    assert (lit.surface_mean - dark.surface_mean) / 1000.0 == pytest.approx(0.00387, abs=0.000006)
    assert (lit.vapour_range - dark.vapour_range) / 1000.0 == pytest.approx(0.0137, abs=0.00005)
