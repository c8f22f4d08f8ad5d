"""Months and days of the year."""

from __future__ import annotations

import numpy as np

_MONTHS = (
    "january",
    "february",
    "march",
    "april",
    "may",
    "june",
    "july",
    "august",
    "september",
    "october",
    "november",
    "december",
)
_DAYS = np.array([31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31])


def month_number(name: str) -> int | None:
    """Number of a month (1 to 12) from its English name, its first three letters or its number, else None."""
    text = str(name).strip().lower().rstrip(".")
    if text.isdecimal():
        return int(text) if 1 <= int(text) <= 12 else None
    if len(text) < 3:
        return None
    return next((i + 1 for i, month in enumerate(_MONTHS) if month.startswith(text)), None)


def days_in_month(month):
    """Days of a month in a common year. month : int or array, 1 to 12. [-] Returns days. [d]"""
    return _DAYS[np.asarray(month, dtype=int) - 1]


def middle_day(month):
    """Day of the year at the middle of a month, the day that stands for the month's sun.

    Parameters
    ----------
    month : int or array, shape (n,)
        1 for January to 12 for December. [-]

    Returns
    -------
    array of int, shape (n,) or ()
        Day of the year, 1 for 1 January. [d]

    Source
    ------
    FAO Irrigation and Drainage Paper 56 takes the 15th of the month (its example for
    Rio de Janeiro uses day 135 for May).
    """
    month = np.asarray(month, dtype=int)
    before = np.concatenate([[0], np.cumsum(_DAYS)[:-1]])
    return before[month - 1] + 15
