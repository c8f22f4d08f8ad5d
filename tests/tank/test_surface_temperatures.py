"""Temperatures: kinds of tank, reasons, both editions, lanes."""

import numpy as np
import pytest

from screener.tank import (
    BASIS_WORDS,
    Basis,
    bulk_temperature_2006,
    bulk_temperature_2020,
    daily_temperatures_2006,
    daily_temperatures_2020,
    hottest_bulk,
    hottest_surface,
)

DAY = (311.0, 297.0, 27.0e6, 0.25, 0.25)
KINDS = np.array(
    [
        "fixed-roof",
        "horizontal",
        "internal-floating-roof",
        "domed-floating-roof",
        "external-floating-roof",
        "underground",
        "pressure-vessel",
    ]
)


def test_surface_ends_stand_a_quarter_of_the_range_away():
    for day in (daily_temperatures_2006(*DAY), daily_temperatures_2020(*DAY, height_over_diameter=0.6)):
        assert day.surface_maximum - day.surface_mean == pytest.approx(day.vapour_range / 4.0, rel=1e-12)
        assert day.surface_mean - day.surface_minimum == pytest.approx(day.vapour_range / 4.0, rel=1e-12)


def test_every_kind_of_tank_has_numbers_or_a_reason():
    old = daily_temperatures_2006(*DAY, roof=KINDS)
    new = daily_temperatures_2020(*DAY, roof=KINDS, height_over_diameter=0.6)
    assert list(old.basis) == [
        Basis.METHOD,
        Basis.METHOD,
        *[Basis.FLOATING_ROOF_SWING] * 3,
        Basis.BULK_NOT_GIVEN,
        Basis.NO_EQUATION,
    ]
    assert list(new.basis) == [
        Basis.METHOD,
        Basis.METHOD,
        *[Basis.FLOATING_ROOF_SWING] * 2,
        Basis.NO_EQUATION,
        Basis.BULK_NOT_GIVEN,
        Basis.NO_EQUATION,
    ]
    for day in (old, new):
        assert (np.isfinite(day.surface_maximum) == day.ok).all()
        assert (np.isfinite(day.surface_maximum) == (day.basis <= Basis.FLOATING_ROOF_SWING)).all()
    assert set(BASIS_WORDS) == set(Basis)


def test_bad_inputs_are_named_lane_by_lane():
    high = np.array([311.0, np.nan, 290.0, 400.0, 311.0, 311.0])
    alpha = np.array([0.25, 0.25, 0.25, 0.25, 1.2, 0.25])
    sun = np.array([27e6, 27e6, 27e6, 27e6, 27e6, np.nan])
    for day in (
        daily_temperatures_2006(high, 297.0, sun, alpha, 0.25),
        daily_temperatures_2020(high, 297.0, sun, alpha, 0.25),
    ):
        assert list(day.basis) == [Basis.METHOD] + [Basis.BAD_INPUT] * 5
        assert np.isnan(day.surface_maximum[1:]).all() and np.isfinite(day.surface_maximum[0])


def test_a_buried_tank_takes_its_liquid_temperature_and_has_no_swing():
    day = hottest_surface(*DAY, roof="underground", bulk_temperature=288.0)
    assert day.best == 288.0 and day.low == 288.0 and day.high == 288.0
    # Weather is not needed below ground.
    assert (
        hottest_surface(np.nan, np.nan, np.nan, 0.3, 0.3, roof="underground", bulk_temperature=288.0).best
        == 288.0
    )


def test_insulation():
    lanes = np.array(["none", "shell", "full", "wool"])
    old = daily_temperatures_2006(*DAY, insulation=lanes)
    new = daily_temperatures_2020(*DAY, insulation=lanes)
    assert list(old.basis) == [
        Basis.METHOD,
        Basis.NOT_FOR_INSULATED,
        Basis.NOT_FOR_INSULATED,
        Basis.BAD_INPUT,
    ]
    assert list(new.basis) == [Basis.METHOD] * 3 + [Basis.BAD_INPUT]
    assert new.vapour_range[2] == 0.0 and new.surface_maximum[2] == new.bulk[2] == new.vapour_mean[2]
    # The printed weights of the insulated-shell form, by hand: 0.6 x 14 K and 0.02 alpha I in kelvin.
    assert new.vapour_range[1] == pytest.approx(0.6 * 14.0 + 0.02 * 0.25 * 27.0e6 / 11356.527 / 1.8, rel=1e-6)


def test_known_bulk_replaces_the_estimate():
    day = daily_temperatures_2006(*DAY, bulk_temperature=np.array([np.nan, 300.0]))
    assert day.bulk[1] == 300.0
    assert day.bulk[0] == pytest.approx(float(bulk_temperature_2006(304.0, 0.25)))
    assert day.surface_mean[0] - day.surface_mean[1] == pytest.approx(0.56 * (day.bulk[0] - 300.0), rel=1e-9)


def test_hottest_surface_is_the_higher_edition_with_the_difference_both_ways():
    alpha = np.array([0.17, 0.9])
    got = hottest_surface(311.0, 297.0, 27.0e6, alpha, alpha, height_over_diameter=0.6)
    old = daily_temperatures_2006(311.0, 297.0, 27.0e6, alpha, alpha).surface_maximum
    new = daily_temperatures_2020(
        311.0, 297.0, 27.0e6, alpha, alpha, height_over_diameter=0.6
    ).surface_maximum
    assert got.best == pytest.approx(np.maximum(old, new))
    assert got.low == pytest.approx(np.minimum(old, new))
    assert got.high - got.best == pytest.approx(np.abs(old - new))
    assert list(got.edition) == ["2006" if a > b else "2020" for a, b in zip(old, new)]
    assert list(got.evidence) == ["law" if e == "2006" else "memory" for e in got.edition]
    assert not got.one_edition.any()


def test_one_edition_alone_still_carries_a_spread():
    got = hottest_surface(*DAY, roof="external-floating-roof", height_over_diameter=0.6)
    assert got.one_edition and got.edition == "2006" and got.difference > 0.0
    shell = hottest_surface(*DAY, insulation="shell")
    assert shell.one_edition and shell.edition == "2020" and shell.difference > 0.0
    full = hottest_surface(*DAY, insulation="full")
    assert full.one_edition and full.difference == 0.0


def test_no_edition_keeps_the_reason():
    got = hottest_surface(*DAY, roof=np.array(["pressure-vessel", "underground"]))
    assert not got.ok.any() and list(got.edition) == ["", ""]
    assert list(got.basis) == [Basis.NO_EQUATION, Basis.BULK_NOT_GIVEN]


def test_hotter_paint_sun_and_day_never_cool_the_surface():
    alpha = np.linspace(0.0, 1.0, 11)
    for kind in KINDS[:5]:
        for lanes in (
            hottest_surface(311.0, 297.0, 27e6, alpha, alpha, roof=kind),
            hottest_surface(311.0, 297.0, 27e6 * alpha, 0.5, 0.5, roof=kind),
            hottest_surface(300.0 + 10.0 * alpha, 297.0, 27e6, 0.5, 0.5, roof=kind),
        ):
            assert (np.diff(lanes.best) > 0.0).all(), kind


def test_hottest_bulk_finds_its_month():
    air = np.array([[280.0, 297.0, 296.9], [np.nan, np.nan, np.nan]])
    sun = np.array([10e6, 20e6, 27e6])
    got = hottest_bulk(air, 0.25, 0.9, sun)
    new = bulk_temperature_2020(air[0], 0.9, sun)
    old = bulk_temperature_2006(air[0], 0.575)
    assert got.month[0] == int(np.argmax(np.maximum(old, new))) == 2
    assert got.best[0] == pytest.approx(max(old[2], new[2]))
    assert got.high[0] - got.best[0] == pytest.approx(abs(old[2] - new[2]))
    assert got.month[1] == -1 and np.isnan(got.best[1]) and got.edition[1] == ""


def test_hottest_bulk_without_sun_uses_the_2006_term():
    got = hottest_bulk([295.0, 297.0], 0.25, 0.25)
    assert (
        got.best == pytest.approx(297.0 + (6 * 0.25 - 1) / 1.8) and got.edition == "2006" and got.month == 1
    )


def test_batch_equals_lane_by_lane():
    rng = np.random.default_rng(5)
    n = 40
    low = rng.uniform(250.0, 300.0, n)
    args = (
        low + rng.uniform(0.0, 20.0, n),
        low,
        rng.uniform(0.0, 3e7, n),
        rng.uniform(0, 1, n),
        rng.uniform(0, 1, n),
    )
    roof = KINDS[rng.integers(0, len(KINDS), n)]
    ratio = np.where(rng.random(n) < 0.3, np.nan, rng.uniform(0.2, 3.0, n))
    batch = hottest_surface(*args, roof=roof, height_over_diameter=ratio)
    for i in range(n):
        one = hottest_surface(*(a[i] for a in args), roof=roof[i], height_over_diameter=ratio[i])
        assert one.basis == batch.basis[i]
        np.testing.assert_allclose(float(one.best), batch.best[i], rtol=1e-14)
        np.testing.assert_allclose(float(one.high), batch.high[i], rtol=1e-14)
