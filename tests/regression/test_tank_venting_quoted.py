"""Own check values of the main-body method and conversions; the method was read only where it is quoted."""

import numpy as np
import pytest

from screener.tank.vents import (
    BARREL,
    MOLAR_VOLUME_NORMAL,
    NORMAL_PER_STANDARD_CUBIC_FOOT,
    flashed_vapour_as_air,
    fully_insulated_factor,
    inbreathing_thermal,
    outbreathing_thermal,
    partly_insulated_factor,
)
from screener.tank.vents_older import inbreathing_liquid_older, outbreathing_liquid_older

LATITUDE = np.array([30.0, 50.0, 65.0])
OUT = {
    100: (20.2, 15.8, 12.6),
    1000: (160.4, 125.3, 100.2),
    5000: (682.7, 533.4, 426.7),
    10000: (1273.9, 995.3, 796.2),
}
# Factors 6.5, 5, 4, 3, 2.5 in the order of the columns below.
IN = {
    100: (163.3, 125.6, 100.5, 75.4, 62.8),
    1000: (818.3, 629.5, 503.6, 377.7, 314.7),
    5000: (2524.6, 1942.0, 1553.6, 1165.2, 971.0),
    10000: (4101.2, 3154.8, 2523.8, 1892.9, 1577.4),
}
HOUR = 3600.0


@pytest.mark.parametrize("volume", OUT)
def test_thermal_out(volume):
    # One printed decimal.
    assert outbreathing_thermal(volume, LATITUDE) * HOUR == pytest.approx(OUT[volume], abs=0.06)


@pytest.mark.parametrize("volume", IN)
def test_thermal_in(volume):
    # Volatile and warm in the three bands: 6.5, 5, 4; quiet and cool in the two upper bands: 3, 2.5.
    warm = inbreathing_thermal(volume, LATITUDE, 300.0, True) * HOUR
    cool = inbreathing_thermal(volume, LATITUDE[1:], 290.0, False) * HOUR
    assert np.concatenate([warm, cool]) == pytest.approx(IN[volume], abs=0.06)
    assert inbreathing_thermal(volume, 30.0, 290.0, False) * HOUR == pytest.approx(4.0 * volume**0.7)


def test_insulation_factors():
    assert fully_insulated_factor(0.1, 0.05) == pytest.approx(0.1111, abs=5e-5)
    assert fully_insulated_factor(0.05, 0.04) == pytest.approx(0.1667, abs=5e-5)
    assert partly_insulated_factor(0.6, fully_insulated_factor(0.05, 0.04)) == pytest.approx(0.50, abs=5e-5)


@pytest.mark.parametrize(
    "mass, kelvin, factor", [(0.065, 288.15, 1.539), (0.058122, 288.15, 1.455), (0.086177, 293.15, 1.787)]
)
def test_air_equivalent_factor(mass, kelvin, factor):
    # Three printed decimals.
    assert flashed_vapour_as_air(1.0, mass, kelvin) / MOLAR_VOLUME_NORMAL == pytest.approx(factor, abs=6e-4)


def test_older_rates_per_cubic_metre():
    # 0.9437, 1.0111, 2.0221 recomputed; half a last digit.
    assert inbreathing_liquid_older(1.0) == pytest.approx(0.9437, abs=6e-5)
    assert outbreathing_liquid_older(1.0, np.array([False, True])) == pytest.approx(
        [1.0111, 2.0221], abs=6e-5
    )


def test_us_form_of_the_equations():
    # 1.51 Y V^0.9 and 3.08 C V^0.7 with V in ft3, recomputed 1.5096 and 3.0792.
    foot = 0.3048**3
    assert foot**0.9 / NORMAL_PER_STANDARD_CUBIC_FOOT == pytest.approx(1.5096, abs=2e-4)
    assert foot**0.7 / NORMAL_PER_STANDARD_CUBIC_FOOT == pytest.approx(3.0792, abs=3e-4)
    # 1 SCFH per barrel is 0.1685 m3 of normal air per m3 and hour.
    assert NORMAL_PER_STANDARD_CUBIC_FOOT / BARREL == pytest.approx(0.1685, abs=6e-5)
