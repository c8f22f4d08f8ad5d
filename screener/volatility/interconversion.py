"""From one distillation curve to another: ASTM D86, ASTM D2887 and true boiling point.

A curve is its temperatures at the points of the method, lanes first. Points not known
are NaN, and whatever hangs on them is NaN. Coefficients with their evidence are in
data/volatility/distillation_power.csv and distillation_gaps.csv. D86 readings are taken
as they are: the correction for cracking above 246 degC is not applied.
"""

from __future__ import annotations

from functools import lru_cache

import numpy as np

from screener.ground.constants import ZERO_CELSIUS
from screener.ground.errors import ShapeError
from screener.ground.files import read_table

POWER_POINTS = (0.0, 0.10, 0.30, 0.50, 0.70, 0.90, 0.95)  # fractions evaporated of the power form
GAP_POINTS = (0.0, 0.10, 0.30, 0.50, 0.70, 0.90, 1.0)  # of D86 <-> TBP and D2887 <-> D86 by gaps
GAP_POINTS_D2887_TBP = (0.05, 0.10, 0.30, 0.50, 0.70, 0.90, 0.95, 1.0)  # of D2887 <-> TBP
_DEGF = 1.8  # degF per kelvin


def _degF(T):
    return (T - ZERO_CELSIUS) * _DEGF + 32.0


def _kelvin(F):
    return (F - 32.0) / _DEGF + ZERO_CELSIUS


def _rows(T, points):
    T = np.atleast_2d(np.asarray(T, dtype=float))
    if T.ndim != 2 or T.shape[-1] != len(points):
        raise ShapeError("T", f"shape {T.shape}", f"(n, {len(points)}), at {points}")
    return T


@lru_cache(maxsize=1)
def _power():
    rows = {
        float(r["percent"]) / 100.0: (float(r["a"]), float(r["b"]))
        for r in read_table("volatility/distillation_power.csv")
    }
    return np.array([rows[point] for point in POWER_POINTS]).T


def tbp_from_d86_riazi_daubert_1986(T) -> np.ndarray:
    """True boiling point curve from an ASTM D86 curve, power form.

    Parameters
    ----------
    T : array, shape (7,) or (n, 7)
        D86 temperatures at `POWER_POINTS`: 0, 10, 30, 50, 70, 90, 95 vol%. [K]

    Returns
    -------
    array, shape (n, 7)
        True boiling points at the same points. [K]

    Source
    ------
    Riazi and Daubert 1986, coefficients quoted; data/volatility/distillation_power.csv.
    """
    a, b = _power()
    return a * _rows(T, POWER_POINTS) ** b


def d86_from_tbp_riazi_daubert_1986(T) -> np.ndarray:
    """ASTM D86 curve from a true boiling point curve, power form; inverse of the way there.

    Parameters
    ----------
    T : array, shape (7,) or (n, 7)
        True boiling points at `POWER_POINTS`. [K]

    Returns
    -------
    array, shape (n, 7)
        D86 temperatures at the same points. [K]

    Source
    ------
    Riazi and Daubert 1986, coefficients quoted; data/volatility/distillation_power.csv.
    """
    a, b = _power()
    return (_rows(T, POWER_POINTS) / a) ** (1.0 / b)


@lru_cache(maxsize=8)
def _gaps(conversion: str):
    """Middle (factor, exponent) and {(lower, upper): (factor, exponent)} of a conversion."""
    rows = [r for r in read_table("volatility/distillation_gaps.csv") if r["conversion"] == conversion]
    table = {
        (float(r["lower"]) / 100.0, float(r["upper"]) / 100.0): (float(r["factor"]), float(r["exponent"]))
        for r in rows
    }
    return table.pop((0.5, 0.5)), table


def _walk(T, points, conversion, inverse):
    """Convert the middle, then add converted gaps outwards on both sides."""
    (factor, exponent), stretches = _gaps(conversion)
    F = _degF(_rows(T, points))
    middle = points.index(0.5)
    answer = np.full_like(F, np.nan)
    with np.errstate(invalid="ignore"):  # a falling curve or a middle below 0 degF: no number
        answer[:, middle] = _bent(F[:, middle], factor, exponent, inverse)
        for k in range(middle + 1, len(points)):
            gap = _bent(F[:, k] - F[:, k - 1], *stretches[points[k - 1], points[k]], inverse)
            answer[:, k] = answer[:, k - 1] + gap
        for k in range(middle - 1, -1, -1):
            gap = _bent(F[:, k + 1] - F[:, k], *stretches[points[k], points[k + 1]], inverse)
            answer[:, k] = answer[:, k + 1] - gap
    return _kelvin(answer)


def _bent(value, factor, exponent, inverse):
    return (value / factor) ** (1.0 / exponent) if inverse else factor * value**exponent


def tbp_from_d86_daubert_1994(T) -> np.ndarray:
    """True boiling point curve from an ASTM D86 curve, gap form (API 3A1.1).

    Parameters
    ----------
    T : array, shape (7,) or (n, 7)
        D86 temperatures at `GAP_POINTS`: 0, 10, 30, 50, 70, 90, 100 vol%. [K]

    Returns
    -------
    array, shape (n, 7)
        True boiling points at the same points; NaN where the curve falls. [K]

    Source
    ------
    Daubert 1994, API 3A1.1, coefficients quoted; data/volatility/distillation_gaps.csv. A
    published worked sheet takes its 95 % point for the end and, in its numbers only, 0.775 for
    the exponent 0.75497 of the stretch from 70 to 90 %.
    """
    return _walk(T, GAP_POINTS, "d86-to-tbp", inverse=False)


def d86_from_tbp_daubert_1994(T) -> np.ndarray:
    """ASTM D86 curve from a true boiling point curve, gap form; inverse of the way there.

    Parameters
    ----------
    T : array, shape (7,) or (n, 7)
        True boiling points at `GAP_POINTS`. [K]

    Returns
    -------
    array, shape (n, 7)
        D86 temperatures at the same points; NaN where the curve falls. [K]

    Source
    ------
    Daubert 1994, API 3A1.1 inverted; data/volatility/distillation_gaps.csv.
    """
    return _walk(T, GAP_POINTS, "d86-to-tbp", inverse=True)


def d86_from_d2887_daubert_1994(T) -> np.ndarray:
    """ASTM D86 curve from a simulated distillation by gas chromatography (API 3A3.2).

    Parameters
    ----------
    T : array, shape (7,) or (n, 7)
        D2887 temperatures at `GAP_POINTS`, mass percent. [K]

    Returns
    -------
    array, shape (n, 7)
        D86 temperatures at the same points, volume percent; NaN where the curve falls. [K]

    Source
    ------
    Daubert 1994, API 3A3.2, from memory, unverified; data/volatility/distillation_gaps.csv.
    """
    return _walk(T, GAP_POINTS, "d2887-to-d86", inverse=False)


def d2887_from_d86_daubert_1994(T) -> np.ndarray:
    """Simulated distillation from an ASTM D86 curve; inverse of API 3A3.2.

    Parameters
    ----------
    T : array, shape (7,) or (n, 7)
        D86 temperatures at `GAP_POINTS`, volume percent. [K]

    Returns
    -------
    array, shape (n, 7)
        D2887 temperatures at the same points, mass percent; NaN where the curve falls. [K]

    Source
    ------
    Daubert 1994, API 3A3.2 inverted, from memory, unverified; data/volatility/distillation_gaps.csv.
    """
    return _walk(T, GAP_POINTS, "d2887-to-d86", inverse=True)


def tbp_from_d2887_daubert_1994(T) -> np.ndarray:
    """True boiling point curve from a simulated distillation (API 3A3.1).

    Parameters
    ----------
    T : array, shape (8,) or (n, 8)
        D2887 temperatures at `GAP_POINTS_D2887_TBP`: 5, 10, 30, 50, 70, 90, 95, 100 mass%. [K]

    Returns
    -------
    array, shape (n, 8)
        True boiling points at the same points, volume percent; NaN where the curve falls. [K]

    Source
    ------
    Daubert 1994, API 3A3.1, from memory, unverified; data/volatility/distillation_gaps.csv.
    """
    return _walk(T, GAP_POINTS_D2887_TBP, "d2887-to-tbp", inverse=False)


def d2887_from_tbp_daubert_1994(T) -> np.ndarray:
    """Simulated distillation from a true boiling point curve; inverse of API 3A3.1.

    Parameters
    ----------
    T : array, shape (8,) or (n, 8)
        True boiling points at `GAP_POINTS_D2887_TBP`, volume percent. [K]

    Returns
    -------
    array, shape (n, 8)
        D2887 temperatures at the same points, mass percent; NaN where the curve falls. [K]

    Source
    ------
    Daubert 1994, API 3A3.1 inverted, from memory, unverified; data/volatility/distillation_gaps.csv.
    """
    return _walk(T, GAP_POINTS_D2887_TBP, "d2887-to-tbp", inverse=True)


def curve_at(fraction, T, wanted) -> np.ndarray:
    """A distillation curve at other points: monotone cubic between the given ones.

    Parameters
    ----------
    fraction : array, shape (k,)
        Fractions distilled of the given points, rising, at least two. [-]
    T : array, shape (k,) or (n, k)
        Temperatures there. [K]
    wanted : array, shape (m,)
        Fractions asked for. [-]

    Returns
    -------
    array, shape (n, m)
        Temperatures; outside the given points straight on with the slope of the end. [K]

    Raises
    ------
    ShapeError
        The fractions do not rise or their number is not that of the temperatures.

    Source
    ------
    Fritsch and Carlson, SIAM J. Numer. Anal. 17 (1980) 238: slopes that keep the curve
    rising; harmonic mean of the slopes on both sides, Fritsch and Butland 1984.
    """
    f, T = np.asarray(fraction, dtype=float), np.atleast_2d(np.asarray(T, dtype=float))
    if f.ndim != 1 or f.size < 2 or T.shape[-1] != f.size or not (np.diff(f) > 0.0).all():
        raise ShapeError("fraction", f"shape {f.shape}", f"rising, with the {T.shape[-1]} temperatures given")
    wanted = np.asarray(wanted, dtype=float)
    h = np.diff(f)
    d = np.diff(T, axis=1) / h
    slope = np.concatenate([d[:, :1], np.zeros((T.shape[0], f.size - 2)), d[:, -1:]], axis=1)
    if f.size > 2:
        left, right = 2.0 * h[1:] + h[:-1], h[1:] + 2.0 * h[:-1]
        one, two = d[:, :-1], d[:, 1:]
        with np.errstate(divide="ignore", invalid="ignore"):
            mean = (left + right) / (left / one + right / two)
        slope[:, 1:-1] = np.where(one * two > 0.0, mean, np.where(np.isnan(one * two), np.nan, 0.0))
    k = np.clip(np.searchsorted(f, wanted, side="right") - 1, 0, f.size - 2)
    t = (wanted - f[k]) / h[k]
    inside = np.clip(t, 0.0, 1.0)
    p = (
        T[:, k] * (1.0 + 2.0 * inside) * (1.0 - inside) ** 2
        + T[:, k + 1] * inside**2 * (3.0 - 2.0 * inside)
        + h[k] * inside * (1.0 - inside) * (slope[:, k] * (1.0 - inside) - slope[:, k + 1] * inside)
    )
    ends = np.where(t < 0.0, slope[:, k] * t * h[k], 0.0) + np.where(
        t > 1.0, slope[:, k + 1] * (t - 1.0) * h[k], 0.0
    )
    return p + ends
