"""Friction and NPSH against printed figures.

Read: The Practical Pumping Handbook, p. 82, 'Sample NPSHA calculation' (water at 140 degF, 340 US gpm,
25 ft of 6 in pipe, two gate valves, two elbows); the documentation of the library fluids 1.3.
"""

import numpy as np
import pytest

from screener.ground.constants import GRAVITY
from screener.line import friction_factor, npsh_available, suction_profile

FOOT = 0.3048
GPM = 231 * 0.0254**3 / 60
BORE = 6.065 * 0.0254  # 6 in schedule 40
PSI = 6894.757


def sample_line(length, fittings):
    """The line of the sample; water at 60 degF (1.13e-6 m2/s) and commercial steel of 0.00015 ft taken."""
    return suction_profile(
        101325.0,
        10.0,
        340 * GPM,
        999.0,
        1.13e-6,
        length,
        BORE,
        0.0,
        fittings=fittings,
        roughness=0.00015 * FOOT,
        entrance_loss=0.0,
    )


def test_churchill_of_the_library_page():
    # Churchill_1977(1E5, 1E-4) as printed in the documentation.
    assert friction_factor(1e5, 1e-4) == pytest.approx(0.018462624566280075, rel=1e-12)


def test_velocity_head_and_fittings_of_the_sample():
    line = sample_line(0.0, 0.11 * 2)
    # Printed 0.222 ft, 0.049 ft for two valves of K 0.11 and 0.129 ft for two elbows of K 0.29: half a digit.
    assert line.velocity_head / FOOT == pytest.approx([0.222], abs=0.0006)
    assert line.friction_head / FOOT == pytest.approx([0.049], abs=0.0006)
    assert sample_line(0.0, 0.29 * 2).friction_head / FOOT == pytest.approx([0.129], abs=0.0006)


def test_pipe_friction_of_the_sample():
    # Printed 0.806 ft per 100 ft. The table names neither its water nor its formula: 3 %, the spread
    # between friction formulas at this Reynolds number.
    assert sample_line(100.0 * FOOT, 0.0).friction_head / FOOT == pytest.approx([0.806], rel=0.03)


def test_heads_of_the_sample():
    # 14.7 psia and 2.889 psia of water of gravity 0.985, printed 34.474 ft and 6.775 ft with 2.31 ft/psi,
    # which is 62.34 lb/ft3: the difference to 0.02 ft.
    density = 0.985 * 144.0 / 2.31 * 0.45359237 / FOOT**3
    head = npsh_available(14.7 * PSI, 2.889 * PSI, density, 0.0, 0.0) / FOOT
    assert head == pytest.approx(34.474 - 6.775, abs=0.02)
    assert np.float64(14.7 * PSI / density / GRAVITY / FOOT) == pytest.approx(34.474, abs=0.02)
