"""Venting figures printed in a handbook.

Read: Ludwig, Applied Process Design for Chemical and Petrochemical Plants, vol. 1, 3rd ed.:
p. 475 (a benzene tank of 26,000 US gallons, filled at 21,000 gal/h, emptied at 250 gpm), rows of the
thermal table for 21,000 and 42,000 gal, and table 7-16 (gravity and temperature factors).
The book takes 371 SCFH of thermal out-breathing from the column for a flash point of 100 degF or above,
though benzene flashes below; the check below does as the book does.
"""

import numpy as np
import pytest

from screener.ground.constants import MW_AIR, T_NORMAL
from screener.tank.vents import MOLAR_VOLUME_NORMAL, NORMAL_PER_STANDARD_CUBIC_FOOT, flashed_vapour_as_air
from screener.tank.vents_older import (
    inbreathing_liquid_older,
    inbreathing_thermal_older,
    outbreathing_liquid_older,
    outbreathing_thermal_older,
)

GALLON = 231 * 0.0254**3


def scfh(normal):
    """m3/s of normal air as SCFH."""
    return float(normal) * 3600.0 / NORMAL_PER_STANDARD_CUBIC_FOOT


def test_benzene_tank_out_breathing():
    assert scfh(outbreathing_liquid_older(21000 * GALLON / 3600, True)) == pytest.approx(6000.0, rel=1e-9)
    # Printed whole: half a unit. 26,000/42 x 0.6 = 371.4.
    assert scfh(outbreathing_thermal_older(26000 * GALLON, False)) == pytest.approx(371.0, abs=0.5)


def test_benzene_tank_in_breathing():
    liquid = scfh(inbreathing_liquid_older(250 * 60 * GALLON / 3600))
    thermal = scfh(inbreathing_thermal_older(26000 * GALLON))
    # Printed 2,000 + 619 = 2,619: half a unit each.
    assert liquid == pytest.approx(2000.0, abs=0.5)
    assert thermal == pytest.approx(619.0, abs=0.5)
    assert liquid + thermal == pytest.approx(2619.0, abs=0.5)


@pytest.mark.parametrize("gallons, into, out", [(21000, 500, 300), (42000, 1000, 600)])
def test_rows_of_the_thermal_table(gallons, into, out):
    assert scfh(inbreathing_thermal_older(gallons * GALLON)) == pytest.approx(into, rel=1e-9)
    assert scfh(outbreathing_thermal_older(gallons * GALLON, False)) == pytest.approx(out, rel=1e-9)


def test_gravity_factor():
    # Table 7-16: 1.64 for a gravity of 2.69; half a last digit.
    factor = flashed_vapour_as_air(1.0, 2.69 * MW_AIR, T_NORMAL) / MOLAR_VOLUME_NORMAL
    assert factor == pytest.approx(1.64, abs=0.005)


@pytest.mark.parametrize(
    "fahrenheit, factor",
    [(5, 1.0575), (70, 0.9905), (110, 0.9551), (160, 0.9158), (240, 0.8619), (300, 0.8272)],
)
def test_temperature_factor(fahrenheit, factor):
    # Table 7-16 gives the capacity relative to 60 degF, with 460 for the zero: the inverse of the growth of
    # the air equivalent. Four printed decimals and a zero of 460 instead of 459.67 (2e-5): 1e-4.
    ratio = flashed_vapour_as_air(1.0, MW_AIR, 520.0 / 1.8) / flashed_vapour_as_air(
        1.0, MW_AIR, (fahrenheit + 460.0) / 1.8
    )
    assert ratio == pytest.approx(factor, abs=1e-4)


def test_liquid_rate_of_the_chicago_code():
    # Chicago code 15-24-190 [read]: 560 cubic feet per hour for 4,200 gallons per hour.
    assert scfh(inbreathing_liquid_older(np.float64(4200 * GALLON / 3600))) == pytest.approx(560.0, rel=1e-9)
