"""Standard volatility figures of blends, all at once."""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache

import numpy as np

from screener.blends.blend import Blend, _fluid
from screener.blends.lanes import union
from screener.ground.constants import T_100F
from screener.species import find
from screener.volatility import (
    distillation,
    driveability_index,
    dvpe,
    ratio_20_temperature_d4814,
    ratio_temperature,
    true_vapour_pressure,
    vapour_lock_index,
    volatility_classes,
)


@dataclass(frozen=True)
class VolatilitySheet:
    """Computed volatility of one blend; NaN where a test has no answer for it.

    density_15 [kg/m3]; TVP at 37.8 degC, DVPE and total pressure X [Pa]; T10, T50, T90
    and T20 = T(V/L=20) with dissolved air [K]; T20_line [K] the straight-line estimate,
    NaN with an alcohol; E70, E100, E150 [-]; vapour lock and driveability index [-];
    ethanol [-] volume fraction.
    """

    title: str
    density_15: float
    TVP: float
    DVPE: float
    X: float
    T10: float
    T50: float
    T90: float
    E70: float
    E100: float
    E150: float
    T20: float
    T20_line: float
    vapour_lock_index: float
    driveability_index: float
    ethanol: float

    def classes(self, standard: str):
        """Every class of a standard against these figures; see `volatility_classes`."""
        return volatility_classes(
            standard,
            {
                "vapour pressure": self.DVPE, "T10": self.T10, "T50": self.T50, "T90": self.T90,
                "E70": self.E70, "E100": self.E100, "E150": self.E150,
                "vapour lock index": self.vapour_lock_index, "driveability index": self.driveability_index,
            },
        )  # fmt: skip

    def classes_met(self, standard: str) -> tuple[str, ...]:
        """Names of the classes whose every limit these figures meet."""
        return tuple(match.name for match in self.classes(standard) if match.met)


def volatility_sheets(blends) -> tuple[VolatilitySheet, ...]:
    """Standard volatility figures of several blends in one batch.

    Parameters
    ----------
    blends : sequence of Blend
        The blends.

    Returns
    -------
    tuple of VolatilitySheet
        One per blend; lane by lane equal to the single run.

    Source
    ------
    Methods of `screener.volatility`, named there one by one.
    """
    blends = tuple(blends)
    rows = [None] * len(blends)
    for product in dict.fromkeys(blend.product for blend in blends):
        chosen = [i for i, blend in enumerate(blends) if blend.product == product]
        for i, sheet in zip(chosen, _sheets([blends[i] for i in chosen], product or None), strict=True):
            rows[i] = sheet
    return tuple(rows)


@lru_cache(maxsize=64)
def volatility_sheet(blend: Blend) -> VolatilitySheet:
    """Standard volatility figures of one blend.

    Parameters
    ----------
    blend : Blend
        The blend.

    Returns
    -------
    VolatilitySheet
        Its figures.

    Source
    ------
    Methods of `screener.volatility`, named there one by one.
    """
    return volatility_sheets((blend,))[0]


def _sheets(blends, product):
    names, Z = union(blends)
    fluid = _fluid(names)
    true = true_vapour_pressure(fluid, T_100F, Z)
    test = dvpe(fluid, Z, product=product)
    curve = distillation(fluid, Z)
    T20 = ratio_temperature(fluid, Z, ratio=20.0, air=True, product=product)
    ethanol = np.array([blend.oxygenates.get("ethanol", 0.0) for blend in blends])
    # The straight line was drawn through fuels without an alcohol.
    dry = np.array([_alcohol(blend) < 1e-3 for blend in blends])
    line = np.where(dry, ratio_20_temperature_d4814(test.P, curve.T10, curve.T50), np.nan)
    lock = vapour_lock_index(test.P, curve.E70)
    drive = driveability_index(curve.T10, curve.T50, curve.T90, ethanol)
    points = (curve.T10, curve.T50, curve.T90, curve.E70, curve.E100, curve.E150)
    columns = (true.P, test.P, test.P_total, *points, T20.T, line, lock, drive, ethanol)
    return [
        VolatilitySheet(blend.title, blend.density_15, *(float(column[i]) for column in columns))
        for i, blend in enumerate(blends)
    ]


def _alcohol(blend: Blend) -> float:
    """Volume fraction of alcohols. [-]"""
    return sum(v for name, v in blend.oxygenates.items() if find(name).family == "alcohol")
