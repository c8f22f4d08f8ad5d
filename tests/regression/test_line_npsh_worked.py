"""Our own worked NPSH example: a gasoline of 48.70 kPa at 30 degC from an open tank."""

import pytest

from screener.line import allowed_npsh_required, asked_npsh, npsh_available


def test_gasoline_at_thirty_degrees():
    available = npsh_available(101325.0, 48704.0, 716.6, 1.5, 1.2)
    # Worked by hand to two decimals: (101.325 - 48.704)/(0.7166 x 9.80665) + 0.3 = 7.79 m.
    assert available == pytest.approx(7.79, abs=0.005)
    assert allowed_npsh_required(available) == pytest.approx(6.79, abs=0.005)
    assert asked_npsh(6.79) == pytest.approx(7.79, abs=1e-12)


def test_ethanol_costs_six_tenths_of_a_metre():
    with_ethanol = npsh_available(101325.0, 53200.0, 716.6, 1.5, 1.2)
    assert npsh_available(101325.0, 48704.0, 716.6, 1.5, 1.2) - with_ethanol == pytest.approx(0.6, abs=0.05)
