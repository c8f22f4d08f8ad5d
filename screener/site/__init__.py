"""Floor 5, the site: air pressure, sun and calendar. Arrays in, arrays out, SI, no verdicts."""

from screener.site.barometer import (
    LOWEST_BAROMETER_ALLOWANCE,
    lowest_barometer,
    standard_pressure,
)
from screener.site.calendar import days_in_month, middle_day, month_number
from screener.site.sun import (
    clear_sky_insolation,
    declination,
    extraterrestrial_insolation,
    sunset_hour_angle,
)

__all__ = [
    "LOWEST_BAROMETER_ALLOWANCE",
    "clear_sky_insolation",
    "days_in_month",
    "declination",
    "extraterrestrial_insolation",
    "lowest_barometer",
    "middle_day",
    "month_number",
    "standard_pressure",
    "sunset_hour_angle",
]
