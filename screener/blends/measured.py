"""What a laboratory sheet says of the liquid fitted to it, beside the computed value."""

from __future__ import annotations

import math
from dataclasses import dataclass, replace
from functools import lru_cache
from typing import TYPE_CHECKING

from screener.ground.constants import ATMOSPHERE

if TYPE_CHECKING:
    from screener.blends.blend import Blend
    from screener.blends.properties import VolatilitySheet

BLIND = 0.5  # reproducibility over the fuel's own vapour pressure above which a test tells no factor; own choice


@dataclass(frozen=True)
class MeasuredPressure:
    """A vapour pressure of the sheet beside the computed one of the fitted composition.

    what in words; value, computed and reproducibility [Pa] as the method reports them; T [K]; ratio [-]
    measured over computed pressure of the fuel's own vapour in the test: the factor for a computed
    vapour pressure at another temperature, the equation supplying the slope; doubt [-] the
    reproducibility over that computed pressure of the fuel's own vapour; gap [-] by what the computed bubble
    point lies above that pressure: what the vapour space of the test takes off is computed, not measured.
    """

    what: str
    value: float
    T: float
    computed: float
    ratio: float
    reproducibility: float
    doubt: float
    gap: float = 0.0

    @property
    def misfit(self) -> float:
        """Computed less measured in units of the reproducibility. [-]"""
        return (self.computed - self.value) / self.reproducibility


@dataclass(frozen=True)
class MeasuredFigure:
    """Any number of the sheet: key as in data/volatility/reproducibility.csv, what in words, value, computed
    and reproducibility in SI; at the volume fraction evaporated of a distillation point, 0 elsewhere. [-]"""

    key: str
    what: str
    value: float
    computed: float
    reproducibility: float
    at: float = 0.0

    @property
    def misfit(self) -> float:
        """Computed less measured in units of the reproducibility. [-]"""
        return (self.computed - self.value) / self.reproducibility


def told(measured) -> MeasuredPressure | None:
    """The most direct vapour pressure that tells a factor, None where there is none.

    A test whose reproducibility is above BLIND of the fuel's own vapour pressure (a DVPE of jet
    fuel) cannot tell it from half as much: its ratio would be noise.
    """
    return next((m for m in measured if _tells(m)), None)


def _tells(one: MeasuredPressure) -> bool:
    return 0.0 < one.ratio < math.inf and one.doubt <= BLIND


def pressure_factor(measured) -> tuple[float, float]:
    """Factor for computed vapour pressures and its doubt.

    Parameters
    ----------
    measured : sequence of MeasuredPressure
        Vapour pressures of one liquid, the most direct first.

    Returns
    -------
    tuple of float
        Factor: 1 where nothing was measured, or nothing that tells a factor; NaN where the computed
        value is no number. [-] Doubt, below which no range of a vapour pressure may go: the
        relative reproducibility, how far another test of the same liquid lies from this one, or how far
        the bubble point lies above the test, whichever is most; of a test that tells no factor it is
        what keeps its measured value in the range. [-]

    Source
    ------
    Rule of this program: the measured value replaces the computed one, the most direct test first.
    """
    if not measured:
        return 1.0, 0.0
    one = told(measured)
    if one is not None:
        apart = max(abs(m.ratio / one.ratio - 1.0) for m in measured if _tells(m))
        return one.ratio, max(one.doubt, apart, one.gap)
    if not all(math.isfinite(m.ratio) and math.isfinite(m.doubt) for m in measured):
        return math.nan, math.nan
    return 1.0, max(m.doubt for m in measured)


@lru_cache(maxsize=64)
def measured_sheet(blend: Blend) -> VolatilitySheet:
    """Standard volatility figures of a blend, with what its laboratory sheet measured in place of the computed.

    Parameters
    ----------
    blend : Blend
        The blend, fitted to a sheet or not.

    Returns
    -------
    VolatilitySheet
        That of `volatility_sheet` for a blend without a sheet. Else measured figures as the sheet has
        them; DVPE, TVP and T20 without a figure of their own by the factor of the measured vapour pressure.

    Source
    ------
    As `volatility_sheet`; the factor of `pressure_factor`.
    """
    from screener.blends.properties import volatility_sheet
    from screener.volatility import driveability_index, ratio_temperature, vapour_lock_index

    sheet, product = volatility_sheet(blend), blend.product or None
    factor, _ = pressure_factor(blend.measured)
    if factor != 1.0:
        T20 = ratio_temperature(blend.fluid, blend.z, ratio=20.0, P=ATMOSPHERE / factor, air=True, product=product)
        P = _dvpe(blend, factor, product) if math.isfinite(sheet.DVPE) else sheet.DVPE
        sheet = replace(sheet, TVP=factor * sheet.TVP, DVPE=P, T20=float(T20.T[0]))
    known = {"density_15": "density_15", "dvpe": "DVPE", "e70": "E70", "e100": "E100", "e150": "E150"}
    figures = {known[f.key]: f.value for f in blend.figures if f.key in known}
    points = {0.1: "T10", 0.5: "T50", 0.9: "T90"}
    figures |= {points[f.at]: f.value for f in blend.figures if f.key == "distillation" and f.at in points}
    if not figures and factor == 1.0:
        return sheet
    sheet = replace(sheet, **figures)
    lock = float(vapour_lock_index(sheet.DVPE, sheet.E70))
    drive = float(driveability_index(sheet.T10, sheet.T50, sheet.T90, sheet.ethanol))
    return replace(sheet, vapour_lock_index=lock, driveability_index=drive)


def _dvpe(blend: Blend, factor: float, product) -> float:
    """DVPE [Pa] with the fuel's own vapour in the cell multiplied, its air left alone."""
    from screener.volatility import dvpe, dvpe_equation

    test = dvpe(blend.fluid, blend.z, product=product)
    return float(dvpe_equation("ASTM D5191").dvpe(test.P_total + (factor - 1.0) * test.P_vapour)[0])
