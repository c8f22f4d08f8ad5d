"""Compressibility of petroleum and the pressure of a shut-in liquid against reference equations of pure liquids."""

from __future__ import annotations

import numpy as np
import pytest

from screener.volatility import petroleum_compressibility, shut_in_pressure_rise
from tests.studies.liquid_expansion import PETROLEUM, shut_in

PARAFFINS = ("n-pentane", "n-hexane", "n-octane", "n-decane")


@pytest.mark.parametrize("name", PARAFFINS)
def test_paraffins_are_as_stiff_as_the_standard_says(name):
    """10 %: the standard is a correlation of petroleum, of which single paraffins are not quite one."""
    (compression, rise), (found, found_rise) = shut_in(name)
    assert found == pytest.approx(compression, rel=0.10)
    assert found_rise == pytest.approx(rise, rel=0.10)


@pytest.mark.parametrize("name", PETROLEUM)
def test_pressure_rise_of_every_hydrocarbon(name):
    """10 %: a ring compound expands less and yields less than a fuel of its density, which cancels."""
    (_, rise), (_, found) = shut_in(name)
    assert found == pytest.approx(rise, rel=0.10)


def test_lighter_and_warmer_yields_more():
    rho, T = np.array([650.0, 740.0, 840.0]), np.array([260.0, 290.0, 320.0])
    table = petroleum_compressibility(rho[:, None].repeat(3, 1).ravel(), np.tile(T, 3)).reshape(3, 3)
    assert (np.diff(table, axis=0) < 0.0).all() and (np.diff(table, axis=1) > 0.0).all()


def test_outside_the_method_there_is_no_number():
    for rho, T in ((550.0, 290.0), (1300.0, 290.0), (740.0, 200.0), (740.0, 450.0), (np.nan, 290.0)):
        assert np.isnan(petroleum_compressibility(rho, T)).all()
        assert np.isnan(shut_in_pressure_rise(rho, T)).all()


def test_lanes_do_not_touch_each_other():
    rho, T = np.array([740.0, np.nan, 820.0]), np.array([300.0, 300.0, 280.0])
    together = shut_in_pressure_rise(rho, T)
    assert together[0] == shut_in_pressure_rise(740.0, 300.0)[0]
    assert together[2] == shut_in_pressure_rise(820.0, 280.0)[0]
    assert np.isnan(together[1])
