"""Named shortcuts for a flash point: blending index, distillation, barometer. Each with its limits."""

from __future__ import annotations

import numpy as np

from screener.fire.results import Estimate
from screener.ground.constants import ZERO_CELSIUS
from screener.ground.status import Status

# Wickey and Chittenden 1963: log10 I = A + B/(F + C), F in degrees Fahrenheit. From memory; gives back a
# table that a refiner published (R.J. Patel, petroleum quality notes, 2017) from 20 to 100 degC.
INDEX_A, INDEX_B, INDEX_C = -6.1188, 4345.2, 383.0
INDEX_LOW, INDEX_HIGH = 293.15, 373.15  # [K] range of that table: beyond it nothing was checked
# API procedure 2B7.1 (Riazi and Daubert): 1/T = a + b/T10 + c ln T10, kelvin. From memory, unverified.
D86_A, D86_B, D86_C = -0.024209, 2.84947, 3.4254e-3
D86_LOW, D86_HIGH = 338.15, 620.0  # [K] 10 % points of naphtha to gas oil; from memory, unverified
# ISO 2719 clause 11.2: T + 0.25 (101.3 - p) with p in kPa; its note: proven from 82.0 to 104.7 kPa.
BAROMETER_SLOPE, BAROMETER_STANDARD = 0.25e-3, 101.3e3  # [K/Pa], [Pa]
BAROMETER_LOW, BAROMETER_HIGH = 82.0e3, 104.7e3  # [Pa]


def blending_index(T) -> np.ndarray:
    """Flash-point blending index of Wickey and Chittenden.

    Parameters
    ----------
    T : float or array
        Flash point. [K]

    Returns
    -------
    array
        Index, which blends by volume; NaN at or below its pole near -230 degC. [-]

    Validity
    --------
    Checked from 20 to 100 degC; below that it grows without measure.

    Source
    ------
    R.B. Wickey, D.M. Chittenden, Hydrocarbon Process. 42 (1963) 157; formula from memory.
    """
    F = (np.asarray(T, dtype=float) - ZERO_CELSIUS) * 1.8 + 32.0
    with np.errstate(all="ignore"):
        return np.where(F + INDEX_C > 0.0, 10.0 ** (INDEX_A + INDEX_B / (F + INDEX_C)), np.nan)


def flash_point_of_index(index) -> np.ndarray:
    """Flash point with a given blending index; inverse of `blending_index`.

    Parameters
    ----------
    index : float or array
        Index. [-]

    Returns
    -------
    array
        Flash point. [K]

    Source
    ------
    As `blending_index`.
    """
    with np.errstate(all="ignore"):
        F = INDEX_B / (np.log10(np.asarray(index, dtype=float)) - INDEX_A) - INDEX_C
    return (F - 32.0) / 1.8 + ZERO_CELSIUS


def flash_point_by_index(T, volume, *, beyond: bool = False) -> Estimate:
    """Flash point of a blend of products from their own flash points.

    Parameters
    ----------
    T : array, shape (k,) or (n, k)
        Flash points of the k products. [K]
    volume : array, shape (k,) or (n, k)
        Their shares of the volume. [-]
    beyond : bool
        Compute outside the checked range too; for studies of where the method fails.

    Returns
    -------
    Estimate
        T (n,). OUT_OF_RANGE where a product present flashes below 20 degC or above 100
        degC, above all for a gasoline: with -40 degC the index is absurd at a tenth of a percent.

    Validity
    --------
    Products of one kind, flash points from 20 to 100 degC.

    Source
    ------
    As `blending_index`.
    """
    T, volume = np.broadcast_arrays(*(np.atleast_2d(np.asarray(v, dtype=float)) for v in (T, volume)))
    present = volume > 0.0
    good = (
        np.isfinite(volume).all(axis=1)
        & (volume >= 0.0).all(axis=1)
        & (np.abs(volume.sum(axis=1) - 1.0) < 1e-6)
    )
    good &= np.where(present, np.isfinite(T), True).all(axis=1)
    with np.errstate(invalid="ignore"):
        inside = np.where(present, (T >= INDEX_LOW) & (T <= INDEX_HIGH), True).all(axis=1)
    status = np.where(
        good,
        np.where(inside | beyond, int(Status.CONVERGED), int(Status.OUT_OF_RANGE)),
        int(Status.BAD_INPUT),
    )
    mean = np.where(present, volume * blending_index(T), 0.0).sum(axis=1)
    flash = np.where(status == Status.CONVERGED, flash_point_of_index(mean), np.nan)
    return Estimate(
        flash, "blending index of Wickey and Chittenden", "flash points of 20 to 100 degC", status
    )


def flash_point_by_distillation(T_10) -> Estimate:
    """Flash point of a petroleum product from the 10 % point of its ASTM D86 distillation.

    Parameters
    ----------
    T_10 : float or array, shape (n,)
        Temperature at 10 % evaporated, ASTM D86. [K]

    Returns
    -------
    Estimate
        T (n,). OUT_OF_RANGE outside 65 to 347 degC.

    Validity
    --------
    A straight-run or finished product. One that carries a little of something lighter
    flashes far below what its 10 % point says.

    Source
    ------
    API Technical Data Book procedure 2B7.1; coefficients from memory, unverified.
    """
    T_10 = np.atleast_1d(np.asarray(T_10, dtype=float))
    inside = (T_10 >= D86_LOW) & (T_10 <= D86_HIGH)
    status = np.where(
        np.isfinite(T_10),
        np.where(inside, int(Status.CONVERGED), int(Status.OUT_OF_RANGE)),
        int(Status.BAD_INPUT),
    )
    inner = np.where(inside, T_10, 400.0)
    flash = np.where(inside, 1.0 / (D86_A + D86_B / inner + D86_C * np.log(inner)), np.nan)
    return Estimate(flash, "10 % point of ASTM D86, API 2B7.1", "10 % points of 65 to 347 degC", status)


def flash_point_at_standard_pressure(T, P) -> Estimate:
    """Flash point observed at a barometer reading, corrected to 101.3 kPa.

    Parameters
    ----------
    T : float or array, shape (n,)
        Flash point as observed. [K]
    P : float or array, shape (n,)
        Barometric pressure during the test. [Pa]

    Returns
    -------
    Estimate
        T (n,) corrected. OUT_OF_RANGE outside 82.0 to 104.7 kPa.

    Validity
    --------
    82.0 to 104.7 kPa, where the standard calls the formula proven.

    Source
    ------
    ISO 2719 clause 11.2, read on a test-equipment maker's page; the same in ASTM D3828 clause 13.
    """
    T, P = np.broadcast_arrays(*(np.atleast_1d(np.asarray(v, dtype=float)) for v in (T, P)))
    inside = (P >= BAROMETER_LOW) & (P <= BAROMETER_HIGH)
    good = np.isfinite(T) & np.isfinite(P) & (T > 0.0) & (P > 0.0)
    status = np.where(
        good, np.where(inside, int(Status.CONVERGED), int(Status.OUT_OF_RANGE)), int(Status.BAD_INPUT)
    )
    corrected = np.where(status == Status.CONVERGED, T + BAROMETER_SLOPE * (BAROMETER_STANDARD - P), np.nan)
    return Estimate(corrected, "barometric correction of ISO 2719", "82.0 to 104.7 kPa", status)
