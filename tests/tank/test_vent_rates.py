"""Vents: steps, edges, missing numbers, and that nothing is ever scaled upward."""

import numpy as np
import pytest

from screener.tank import capacity, vents, vents_older


def test_filling_counts_double_just_above_five_kilopascal():
    got = vents.outbreathing_liquid(0.1, np.array([0.0, 5000.0, 5000.1, np.nan]))
    assert got[:3] == pytest.approx([0.1, 0.1, 0.2]) and np.isnan(got[3])
    assert vents.inbreathing_liquid(0.1) == pytest.approx(0.1)
    assert np.isnan(vents.inbreathing_liquid(np.array([-0.1, np.nan]))).all()


def test_latitude_bands_and_their_edges():
    latitude = np.array([0.0, 41.99, 42.0, -42.0, 58.0, 58.01, 90.0])
    factor = vents.outbreathing_thermal(1.0, latitude) * 3600.0
    assert factor == pytest.approx([0.32, 0.32, 0.25, 0.25, 0.25, 0.20, 0.20])
    assert np.isnan(vents.outbreathing_thermal(1000.0, np.array([91.0, np.nan]))).all()


def test_inbreathing_factor_steps_with_temperature_and_volatility():
    temperature = np.array([298.14, 298.15])
    quiet = vents.inbreathing_thermal(1.0, 50.0, temperature, False) * 3600.0
    volatile = vents.inbreathing_thermal(1.0, 50.0, temperature, True) * 3600.0
    assert quiet == pytest.approx([3.0, 5.0]) and volatile == pytest.approx([5.0, 5.0])
    assert np.isnan(vents.inbreathing_thermal(1000.0, 50.0, np.nan))
    assert np.isnan(vents.inbreathing_thermal(np.array([0.0, -5.0]), 50.0, 290.0)).all()


def test_unknown_volatility_takes_the_larger_factor():
    for latitude in (30.0, 50.0, 65.0):
        unknown = vents.inbreathing_thermal(1000.0, latitude, 290.0)
        assert unknown > vents.inbreathing_thermal(1000.0, latitude, 290.0, False)


def test_tables_end_at_a_hundred_and_twenty_fahrenheit():
    assert vents.HOTTEST_VAPOUR_SPACE - 273.15 == pytest.approx(48.9, abs=0.02)
    temperature = np.array([322.0, 322.1, 322.1, np.nan])
    assert list(vents.tables_apply(temperature, [False, False, True, True])) == [True, False, True, False]


def test_flashed_vapour():
    # 1 mol/s of air at 0 degC is its own equivalent: 22.414 l/s.
    assert vents.flashed_vapour_as_air(1.0, 0.0289652, 273.15) == pytest.approx(0.0224140, abs=5e-8)
    # No vapour has no molar mass; the flow is still zero.
    assert vents.flashed_vapour_as_air(0.0, np.nan, 300.0) == 0.0
    assert np.isnan(vents.flashed_vapour_as_air(1.0, np.nan, 300.0))
    assert np.isnan(vents.flashed_vapour_as_air(-1.0, 0.06, 300.0))


def test_growth_factor():
    got = vents.growth_factor(1.0e5, np.array([0.0, 5.0e4, 1.0e5, 1.2e5]))
    assert got[:2] == pytest.approx([1.0, 2.0]) and np.isnan(got[2:]).all()


def test_capacity_is_scaled_down_only():
    got = capacity.capacity_at(0.5, 2000.0, np.array([500.0, 1000.0, 2000.0, 2001.0, np.nan]), 800.0)
    assert got[0] == 0.0
    assert got[1] == pytest.approx(0.5 * np.sqrt(0.5)) and got[2] == pytest.approx(0.5)
    assert np.isnan(got[3:]).all()
    assert np.isnan(capacity.capacity_at(0.5, np.nan, 1000.0, 800.0))


def test_capacity_without_a_rating_pressure_is_nothing():
    assert capacity.rated_capacity(0.5, 1800.0, 2, np.array([0, 1, 3])) == pytest.approx([1.0, 0.5, 0.0])
    assert np.isnan(capacity.rated_capacity(0.5, np.array([np.nan, 0.0]), 2)).all()


def test_setting_plus_accumulation():
    got = capacity.pressure_while_venting(1500.0, np.array([1800.0, 1500.0, 1400.0, np.nan]))
    assert got[:2] == pytest.approx([1800.0, 1500.0]) and np.isnan(got[2:]).all()
    assert capacity.accumulation(1500.0, 1800.0) == pytest.approx(300.0)


def test_older_thermal_rate_ends_where_the_long_table_begins():
    volume = np.array([20000.0, 20001.0]) * vents.BARREL
    got = vents_older.inbreathing_thermal_older(volume)
    assert np.isfinite(got[0]) and np.isnan(got[1])
    assert vents_older.outbreathing_thermal_older(1000.0, True) == pytest.approx(
        float(vents_older.inbreathing_thermal_older(1000.0))
    )
    assert {mark for _, mark in vents_older.older_rates().values()} == {"handbook", "quoted", "memory"}


def test_batch_equals_lane_by_lane():
    rng = np.random.default_rng(7)
    n = 30
    volume, latitude = rng.uniform(50.0, 2e4, n), rng.uniform(-80.0, 80.0, n)
    temperature, volatile = rng.uniform(280.0, 310.0, n), rng.random(n) < 0.5
    batch = vents.inbreathing_thermal(volume, latitude, temperature, volatile)
    single = [
        float(vents.inbreathing_thermal(volume[i], latitude[i], temperature[i], volatile[i]))
        for i in range(n)
    ]
    assert batch == pytest.approx(single, rel=1e-14)
