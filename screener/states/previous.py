"""What a tank held before: vapour class beside that of the receipt, and the vapour it may have left."""

from __future__ import annotations

import math
from dataclasses import dataclass
from functools import lru_cache

import numpy as np

from screener.blends import Blend
from screener.blends.measured import measured_sheet, pressure_factor
from screener.fire import static_class
from screener.states.lanes import Lanes
from screener.states.measured import flash_known
from screener.states.pressures import psat_errors, relative_spread
from screener.states.scaled import flash_point, vapour_space


@dataclass(frozen=True)
class Previous:
    """One case: title of the previous contents, its vapour class and that of the receipt, with flash points [K]
    and Reid vapour pressures [Pa] of both; fuel (3,) share of the vapour left, low, best and high, and its
    LFL [-]; T (3,) hottest surface [K]."""

    title: str
    static: str
    static_receipt: str
    T_flash: float
    T_flash_receipt: float
    P_reid: float
    P_reid_receipt: float
    fuel: np.ndarray
    LFL: float
    T: np.ndarray


@lru_cache(maxsize=32)
def _stock(name: str) -> Blend:
    return Blend.of({f"stock:{name}": 1.0})


def classed(blend) -> tuple[float, float, str]:
    """Flash point [K], DVPE [Pa] taken as the Reid vapour pressure, and vapour class; measured where a sheet has them.

    NaN and unknown of a sheet that says nothing of the light end.
    """
    if not flash_known(blend):
        return math.nan, math.nan, str(static_class(math.nan, math.nan)[0])
    flash, reid = blend.figure("flash_point"), None if blend.figure("dvpe") else blend.figure("rvp")
    T = flash.value if flash else float(flash_point(blend.fluid, blend.z, pressure_factor(blend.measured)[0]).T[0])
    P = reid.value if reid else float(measured_sheet(blend).DVPE)
    return T, P, str(static_class(T, P)[0])


def previous_contents(lanes: Lanes) -> tuple[Previous | None, ...]:
    """One entry a case, None where no previous contents or no receipt are described."""
    return tuple(_previous(lanes, i) for i in range(len(lanes.inputs.cases)))


def _previous(lanes: Lanes, i: int) -> Previous | None:
    case = lanes.inputs.cases[i]
    if case.tank.previous_contents is None or case.line.receipt is None:
        return None
    old = _stock(case.tank.previous_contents)
    (T_old, P_old, class_old), (T_new, P_new, class_new) = classed(old), classed(case.blend)
    T = lanes.weather.T_surface[i]
    space = vapour_space(old.fluid, T, old.z, 1.0, P=float(lanes.weather.barometer[i]))
    with np.errstate(all="ignore"):
        s = relative_spread(space.y / space.y.sum(axis=1, keepdims=True), psat_errors(old.names))
    fuel = np.array([
        space.LFL[0] * space.lower_ratio_low[0] * (1.0 - s[0]), space.fuel[1],
        space.LFL[2] * space.lower_ratio_high[2] * (1.0 + s[2]),
    ])  # fmt: skip
    return Previous(old.title, class_old, class_new, T_old, T_new, P_old, P_new, fuel, float(space.LFL[1]), T)
