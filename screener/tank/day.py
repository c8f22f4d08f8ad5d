"""One day of a tank as lanes: what goes into an edition, what comes out, and why a lane is empty."""

from __future__ import annotations

from dataclasses import dataclass
from enum import IntEnum

import numpy as np

FIXED_ROOFS = ("fixed-roof", "horizontal")
COVERED_FLOATING_ROOFS = ("internal-floating-roof", "domed-floating-roof")
INSULATION = ("none", "shell", "full")

AIR_TEMPERATURE_RANGE = (200.0, 340.0)  # anything else is a fault of the input [K]
INSOLATION_MOST = 5.0e7  # more than any place on earth receives in a day [J/m2]


class Basis(IntEnum):
    """Why a lane holds a number, or none."""

    METHOD = 0  # the edition's own equations
    FLOATING_ROOF_SWING = 1  # daily swing of a fixed roof taken for a floating one: an upper bound
    NOT_FOR_INSULATED = 2  # this edition does not hold for insulated tanks
    BULK_NOT_GIVEN = 3  # an underground tank needs the liquid temperature itself
    NO_EQUATION = 4  # no equation for this kind of tank
    BAD_INPUT = 5  # an input is missing or impossible


BASIS_WORDS = {
    Basis.METHOD: "by the equations of the edition",
    Basis.FLOATING_ROOF_SWING: "daily swing of a fixed roof taken for the floating roof, an upper bound",
    Basis.NOT_FOR_INSULATED: "this edition does not hold for insulated tanks",
    Basis.BULK_NOT_GIVEN: "an underground tank needs the liquid temperature itself",
    Basis.NO_EQUATION: "the method has no equation for this kind of tank",
    Basis.BAD_INPUT: "an input of the surface temperature is missing or impossible",
}


@dataclass(frozen=True)
class DailyTemperatures:
    """Temperatures of one day by one edition; every array has the shape of the lanes.

    edition : '2006' or '2020'
    evidence : mark of the coefficients, 'law' or 'memory'
    bulk : liquid bulk [K]
    surface_mean : daily mean of the liquid surface, T_LA [K]
    vapour_mean : daily mean of the vapour space, T_V; NaN in the 2006 edition, which has none [K]
    vapour_range : daily range of the vapour temperature, dT_V [K]
    surface_maximum : T_LA + dT_V/4 [K]
    surface_minimum : T_LA - dT_V/4 [K]
    basis : `Basis` per lane; from NOT_FOR_INSULATED on the temperatures are NaN
    """

    edition: str
    evidence: str
    bulk: np.ndarray
    surface_mean: np.ndarray
    vapour_mean: np.ndarray
    vapour_range: np.ndarray
    surface_maximum: np.ndarray
    surface_minimum: np.ndarray
    basis: np.ndarray

    @property
    def ok(self) -> np.ndarray:
        """Lanes that hold numbers."""
        return self.basis <= Basis.FLOATING_ROOF_SWING


@dataclass(frozen=True)
class Day:
    """Lanes of a day: air mean, range [K], sun [J/m2], paint [-], roof, insulation, known bulk [K], basis."""

    mean: np.ndarray
    range: np.ndarray
    sun: np.ndarray
    roof_alpha: np.ndarray
    shell_alpha: np.ndarray
    roof: np.ndarray
    insulation: np.ndarray
    bulk: np.ndarray
    basis: np.ndarray


def day_lanes(high, low, sun, roof_alpha, shell_alpha, roof, insulation, bulk) -> Day:
    """Broadcast the inputs of a day and mark the lanes that no edition can answer."""
    bulk = np.nan if bulk is None else bulk
    numbers = [np.asarray(value, dtype=float) for value in (high, low, sun, roof_alpha, shell_alpha, bulk)]
    high, low, sun, roof_alpha, shell_alpha, bulk, roof, insulation = np.broadcast_arrays(
        *numbers, np.asarray(roof, dtype=str), np.asarray(insulation, dtype=str)
    )
    coldest, hottest = AIR_TEMPERATURE_RANGE
    good = (low >= coldest) & (high <= hottest) & (high >= low) & (sun >= 0.0) & (sun <= INSOLATION_MOST)
    for alpha in (roof_alpha, shell_alpha):
        good &= (alpha >= 0.0) & (alpha <= 1.0)
    underground = roof == "underground"
    known = np.isin(roof, (*FIXED_ROOFS, *COVERED_FLOATING_ROOFS, "external-floating-roof", "underground"))
    basis = np.full(good.shape, int(Basis.METHOD))
    basis[underground & ~np.isfinite(bulk)] = Basis.BULK_NOT_GIVEN
    basis[~known] = Basis.NO_EQUATION
    # Sun, paint and air do not enter where the bulk of a buried tank is known.
    basis[~(good | underground) | ~np.isin(insulation, INSULATION)] = Basis.BAD_INPUT
    return Day(0.5 * (high + low), high - low, sun, roof_alpha, shell_alpha, roof, insulation, bulk, basis)


def finished(edition, evidence, d, basis, bulk, surface, vapour, swing):
    """Underground lanes, the floating-roof mark, and NaN where nothing is known."""
    underground = d.roof == "underground"
    bulk = np.where(underground, d.bulk, bulk)
    surface = np.where(underground, bulk, surface)
    vapour = np.where(underground, bulk, vapour)
    swing = np.where(underground, 0.0, swing)
    floating = np.isin(d.roof, (*COVERED_FLOATING_ROOFS, "external-floating-roof")) & (swing > 0.0)
    basis = np.where((basis == Basis.METHOD) & floating, Basis.FLOATING_ROOF_SWING, basis)
    none = basis > Basis.FLOATING_ROOF_SWING
    bulk, surface, vapour, swing = (np.where(none, np.nan, value) for value in (bulk, surface, vapour, swing))
    return DailyTemperatures(
        edition, evidence, bulk, surface, vapour, swing, surface + swing / 4.0, surface - swing / 4.0, basis
    )
