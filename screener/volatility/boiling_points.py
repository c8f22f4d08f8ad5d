"""Average boiling points of a petroleum liquid from its D86 curve, and its Watson factor."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.ground.constants import ZERO_CELSIUS
from screener.ground.errors import ShapeError
from screener.species.cut_constants import specific_gravity, watson_factor

POINTS = (0.10, 0.30, 0.50, 0.70, 0.90)  # fractions evaporated that the averages are made of

# ln(step) = a - b t^c + d slope^e, step and slope in K and K per volume percent, t in degC.
_STEPS = {
    "mass": (-3.64991, 0.02706, 0.6667, 5.16388, 0.25),
    "molar": (-1.15158, 0.01181, 0.6667, 3.70612, 0.333),
    "cubic": (-0.82368, 0.08997, 0.45, 2.45679, 0.45),
    "mean": (-1.53181, 0.01280, 0.6667, 3.64606, 0.333),
}


@dataclass(frozen=True)
class AverageBoilingPoints:
    """Averages of one D86 curve a lane, each (n,). [K]

    volume is the mean of the five points; mass, molar and cubic and their mean (`mean`, MeABP)
    are steps from it that grow with the slope (n,) [K per volume percent] of the curve.
    """

    volume: np.ndarray
    mass: np.ndarray
    molar: np.ndarray
    cubic: np.ndarray
    mean: np.ndarray
    slope: np.ndarray

    def watson_factor(self, rho_15) -> np.ndarray:
        """Watson factor (n,) [-] from the mean average boiling point and density at 15 degC [kg/m3]."""
        return watson_factor(self.mean, specific_gravity(rho_15))


def average_boiling_points(T) -> AverageBoilingPoints:
    """Average boiling points from an ASTM D86 curve.

    Parameters
    ----------
    T : array, shape (5,) or (n, 5)
        D86 temperatures at 10, 30, 50, 70 and 90 vol% evaporated. [K]

    Returns
    -------
    AverageBoilingPoints
        Volume, mass, molar, cubic and mean averages; NaN where the curve does not rise.

    Validity
    --------
    Volume average above 0 degC.

    Source
    ------
    API Technical Data Book 2B1.1, after Zhou 1984. The mean average read on a worked sheet
    ('Example 3-1', scribd 782942720) in its degF form, which is this one exactly; mass, molar
    and cubic from memory, unverified.
    """
    T = np.atleast_2d(np.asarray(T, dtype=float))
    if T.shape[-1] != len(POINTS):
        raise ShapeError("T", f"shape {T.shape}", f"(n, {len(POINTS)}), at {POINTS}")
    volume, slope = T.mean(axis=-1), (T[:, -1] - T[:, 0]) / 80.0
    known = (slope > 0.0) & (volume > ZERO_CELSIUS)
    t, s = np.where(known, volume - ZERO_CELSIUS, np.nan), np.where(known, slope, np.nan)
    found = {}
    for name, (a, b, c, d, e) in _STEPS.items():
        step = np.exp(a - b * t**c + d * s**e)
        found[name] = volume + step if name == "mass" else volume - step
    return AverageBoilingPoints(volume=volume, slope=slope, **found)
