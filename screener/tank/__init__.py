"""Floor 5, the tank: temperatures, paint, geometry, vents, roof-type rules. Arrays in, arrays out, SI, no verdicts."""

from screener.tank.hottest import HottestBulk, HottestSurface, hottest_bulk, hottest_surface
from screener.tank.temperatures import (
    BASIS_WORDS,
    Basis,
    DailyTemperatures,
    bulk_temperature_2006,
    bulk_temperature_2020,
    daily_temperatures_2006,
    daily_temperatures_2020,
)

__all__ = [
    "BASIS_WORDS",
    "Basis",
    "DailyTemperatures",
    "HottestBulk",
    "HottestSurface",
    "bulk_temperature_2006",
    "bulk_temperature_2020",
    "daily_temperatures_2006",
    "daily_temperatures_2020",
    "hottest_bulk",
    "hottest_surface",
]
