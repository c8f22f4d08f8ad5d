"""Temperatures of the liquid and the air pressure that belong to a case.

Rules, in words:

- a gauge reading of the liquid, with its date, beats the estimate; the estimate
  for the hottest day stays as an end of the range, since one reading does not
  bound a season;
- otherwise the hottest surface is the daily maximum of the published method on
  a design day, both editions worked out, the higher taken, their difference
  and the uncertainty of the paint part of the range;
- the design day of a month has that month's mean daily maximum raised by the
  distance from the hottest month's mean maximum to the site's design high, the
  month's own daily swing, and a clear sky;
- the coldest surface is the daily minimum of the published method on a cold day without
  sun, the colder edition taken; that day has the month's mean daily minimum lowered by the
  distance from the coldest month's mean minimum to the site's design low, and the month's own
  swing. Its low end is the air minimum, its high end the day's mean surface. A gauge
  reading goes before it in the same way;
- the legal temperature is the highest monthly mean of the air, of the whole year;
- the barometer is the lowest one given, else the standard atmosphere at the
  elevation less a stated allowance.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.site import clear_sky_insolation, lowest_barometer, middle_day, month_number
from screener.states.inputs import Inputs
from screener.tank import absorptance, hottest_bulk, hottest_surface

# Daily swing of the air on a hot day where no months are given: low, best, high [K].
# Common practice, no source: listed as a default wherever it is used.
SWING_UNKNOWN = (6.0, 11.0, 16.0)
READING_SPREAD = (
    1.0  # a gauge reading of a tank's liquid is taken to within this [K]; common practice, no source
)


@dataclass(frozen=True)
class Weather:
    """Arrays over n cases; edges are low, best, high.

    barometer (n,) [Pa]; T_surface (n, 3) hottest surface [K]; T_estimate (n, 3)
    the same without the gauge reading [K]; T_bulk (n, 3) bulk in the hottest month
    [K]; T_legal (n,) highest monthly mean [K]; T_space (n,) hottest vapour space
    [K]; month (n,) number of the month judged, 0 if none; month_cold (n,) that of the coldest
    surface; month_legal (n,) the month of T_legal, 0 if none; editions (n, 2) the surface by each edition [K]; absorptance
    (n, 3) [-]; air_high, air_low (n,) [K] and insolation (n,) [J/m2] of the design day;
    air_coldest (n,) [K] air minimum of the cold day.
    """

    barometer: np.ndarray
    T_surface: np.ndarray
    T_estimate: np.ndarray
    T_bulk: np.ndarray
    T_cold: np.ndarray
    T_legal: np.ndarray
    T_space: np.ndarray
    month: np.ndarray
    month_cold: np.ndarray
    month_legal: np.ndarray
    editions: np.ndarray
    absorptance: np.ndarray
    air_high: np.ndarray
    air_low: np.ndarray
    insolation: np.ndarray
    air_coldest: np.ndarray


def _barometer(inputs: Inputs) -> np.ndarray:
    given = inputs["lowest_barometer"]
    return np.where(np.isnan(given), lowest_barometer(inputs["elevation"]), given)


def _pick(table: np.ndarray, month: np.ndarray) -> np.ndarray:
    """Value of the month (1 to 12) of each case; NaN where there is no month."""
    picked = table[np.arange(len(month)), np.maximum(month, 1) - 1]
    return np.where(month > 0, picked, np.nan)


def _hottest(table: np.ndarray) -> np.ndarray:
    """Number of the month with the highest value, 0 where a month is missing."""
    whole = np.isfinite(table).all(axis=1)
    return np.where(whole, np.argmax(np.where(np.isfinite(table), table, -np.inf), axis=1) + 1, 0)


def _design_day(inputs: Inputs, month: np.ndarray, hottest: np.ndarray):
    """Air maximum and minimum (n, 3) and insolation (n,) of the design day of the month."""
    highs, lows = inputs.months["mean_high"], inputs.months["mean_low"]
    rise = inputs["ambient_high"] - _pick(highs, hottest)
    high = np.where(month > 0, _pick(highs, month) + rise, inputs["ambient_high"])
    known = (_pick(highs, month) - _pick(lows, month))[:, None]
    swing = np.where(np.isfinite(known), known, np.array(SWING_UNKNOWN)[None, ::-1])
    clear = clear_sky_insolation(
        inputs["latitude"],
        day_of_year=_design_day_number(inputs, month),
        elevation=np.where(np.isnan(inputs["elevation"]), 0.0, inputs["elevation"]),
    )
    insolation = np.where(np.isnan(inputs["design_insolation"]), clear, inputs["design_insolation"])
    # A small swing keeps the nights warm: it belongs to the hot edge.
    return high[:, None] * np.ones(3), high[:, None] - swing, insolation


def _cold_day(inputs: Inputs, month: np.ndarray, coldest: np.ndarray):
    """Air maximum (n, 3) and minimum (n,) of the cold day of the month, or of the year where there is none."""
    highs, lows = inputs.months["mean_high"], inputs.months["mean_low"]
    fall = _pick(lows, coldest) - inputs["ambient_low"]
    low = np.where(month > 0, _pick(lows, month) - fall, inputs["ambient_low"])
    known = (_pick(highs, month) - _pick(lows, month))[:, None]
    # A small swing keeps the day cold, but the night warm: the low end is the air minimum itself.
    return low[:, None] + np.where(np.isfinite(known), known, np.array(SWING_UNKNOWN)[None, :]), low


def _coldest_surface(inputs, kinds, insulation, alpha, month, coldest):
    """Coldest surface (n, 3) with its range, and the air minimum (n,) of that day. [K]"""
    high, low = _cold_day(inputs, month, coldest)
    buried = (kinds == "underground") & np.isfinite(inputs["reading"])
    day = hottest_surface(
        high, low[:, None] * np.ones(3), np.zeros_like(high), alpha, alpha,
        height_over_diameter=(inputs["shell_height"] / inputs["shell_diameter"])[:, None],
        roof=kinds[:, None],
        insulation=insulation[:, None],
        bulk_temperature=np.where(buried, inputs["reading"], np.nan)[:, None],
    )  # fmt: skip
    old, new = (edition.surface_minimum[:, 1] for edition in day.editions)
    best = np.fmin(old, new)
    mean = np.fmax(*(edition.surface_mean[:, 1] for edition in day.editions))
    return np.stack([np.fmin(low, best) + 0.0 * best, best, np.fmax(mean, best)], axis=1), low


def _design_day_number(inputs: Inputs, month: np.ndarray) -> np.ndarray:
    """Day of the year: the middle of the month, or midsummer of the hemisphere where no month is known."""
    midsummer = np.where(inputs["latitude"] >= 0.0, 6, 12)
    return middle_day(np.where(month > 0, month, midsummer))


def _tank_columns(inputs: Inputs):
    """Roof kind, insulation and absorptance (n, 3) as arrays."""
    kinds = np.array([case.tank.kind for case in inputs.cases])
    # The case says that a tank is insulated, not how: a bare roof over an insulated shell is the hotter form.
    insulation = np.array(["shell" if case.tank.insulated else "none" for case in inputs.cases])
    found = {text: absorptance(text) for text in {case.tank.surface for case in inputs.cases} if text}
    nothing = (np.nan, np.nan, np.nan)
    rows = [
        (found[c.tank.surface].low, found[c.tank.surface].best, found[c.tank.surface].high)
        if c.tank.surface
        else nothing
        for c in inputs.cases
    ]
    alpha = np.array(rows)
    # Paint does not matter where no sun reaches the liquid.
    shaded = kinds == "underground"
    return kinds, insulation, np.where(shaded[:, None], 0.5, alpha)


def _surface(inputs, kinds, insulation, alpha, high, low, sun):
    """Hottest surface by both editions, lanes (n, 3) for the low, best and high paint and air."""
    buried = (kinds == "underground") & np.isfinite(inputs["reading"])
    return hottest_surface(
        high, low, sun[:, None], alpha, alpha,
        height_over_diameter=(inputs["shell_height"] / inputs["shell_diameter"])[:, None],
        roof=kinds[:, None],
        insulation=insulation[:, None],
        bulk_temperature=np.where(buried, inputs["reading"], np.nan)[:, None],
    )  # fmt: skip


def _read(inputs, estimate, end: int, widen) -> np.ndarray:
    """A gauge reading (n, 3) with the estimate as one end of its range, the estimate (n, 3) where none is."""
    reading = inputs["reading"][:, None] + np.array([-READING_SPREAD, 0.0, READING_SPREAD])
    read = np.isfinite(reading[:, 1])
    surface = np.where(read[:, None], reading, estimate)
    surface[:, end] = np.where(read, widen(surface[:, end], estimate[:, end]), surface[:, end])
    return surface


def _vapour_space(hottest) -> np.ndarray:
    """Hottest vapour space (n,): daily mean plus half the daily range, the higher edition.

    The 2006 edition has no mean vapour temperature; its liquid surface stands in.
    """
    tops = []
    for day in hottest.editions:
        mean = np.where(np.isnan(day.vapour_mean), day.surface_mean, day.vapour_mean)
        tops.append(np.broadcast_to(mean + day.vapour_range / 2.0, hottest.best.shape)[:, 1])
    return np.fmax(*tops)


def weather(inputs: Inputs) -> Weather:
    """Temperatures and air pressure of every case."""
    asked = [case.site.month and month_number(case.site.month) for case in inputs.cases]
    hottest = _hottest(inputs.months["mean_high"])
    month = np.array([a or h for a, h in zip(asked, hottest)]) * (hottest > 0)
    month_legal = _hottest(inputs.months["mean"])
    high, low, sun = _design_day(inputs, month, hottest)
    kinds, insulation, alpha = _tank_columns(inputs)
    hot = _surface(inputs, kinds, insulation, alpha, high, low, sun)
    estimate = np.stack([hot.low[:, 0], hot.best[:, 1], hot.high[:, 2]], axis=1)
    bulk = hottest_bulk(
        inputs.months["mean"][:, None, :], alpha, alpha, inputs.months["insolation"][:, None, :]
    )
    coldest = _hottest(-inputs.months["mean_low"])
    month_cold = np.array([a or c for a, c in zip(asked, coldest)]) * (coldest > 0)
    cold, air_coldest = _coldest_surface(inputs, kinds, insulation, alpha, month_cold, coldest)
    given = inputs["vapour_space_temperature"]
    return Weather(
        barometer=_barometer(inputs),
        T_surface=_read(inputs, estimate, 2, np.fmax),
        T_estimate=estimate,
        T_bulk=np.stack([bulk.low[:, 0], bulk.best[:, 1], bulk.high[:, 2]], axis=1),
        T_cold=_read(inputs, cold, 0, np.fmin),
        T_legal=_pick(inputs.months["mean"], month_legal),
        T_space=np.where(np.isnan(given), _vapour_space(hot), given),
        month=month,
        month_cold=month_cold,
        month_legal=month_legal,
        editions=np.stack([day.surface_maximum[:, 1] for day in hot.editions], axis=1),
        absorptance=alpha,
        air_high=high[:, 1],
        air_low=low[:, 1],
        insolation=sun,
        air_coldest=air_coldest,
    )
