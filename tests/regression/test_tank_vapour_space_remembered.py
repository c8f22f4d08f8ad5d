"""Vapour space of W1 (AP-42 chapter 7.1, November 2006, example 1, remembered) and a remembered dome."""

import pytest

from screener.tank import geometry

FOOT = 0.3048


def test_w1_outage_and_vapour_space():
    outage = geometry.roof_outage(6.0 * FOOT)
    # Printed 0.0625 ft, 4.0625 ft and 114.86 ft3: half a last digit.
    assert float(outage) / FOOT == pytest.approx(0.0625, abs=5e-7)
    volume = float(geometry.vertical_vapour_volume(6.0 * FOOT, 12.0 * FOOT, 8.0 * FOOT, outage)) / FOOT**3
    assert volume == pytest.approx(114.86, abs=0.005)
    assert volume / float(geometry.cross_section(6.0)) == pytest.approx(4.0625, abs=5e-7)


def test_dome_whose_radius_is_the_diameter():
    # Remembered 0.137 R; recomputed 0.13718.
    assert float(geometry.roof_outage(2.0, "dome")) == pytest.approx(0.13718, abs=5e-6)
