"""What the fire and health functions return: frozen arrays, one entry per lane, with a status."""

from __future__ import annotations

from dataclasses import dataclass
from enum import IntEnum

import numpy as np

from screener.equilibrium.results import LaneAnswer
from screener.ground.constants import R


class SpaceState(IntEnum):
    """What a mixture of vapour and air can do. Neither end is a promise: a space that is too
    rich passes through its flammable range whenever air gets in."""

    UNKNOWN = -1
    TOO_LEAN = 0
    FLAMMABLE = 1
    TOO_RICH = 2

    @property
    def label(self) -> str:
        """The state in words."""
        return self.name.lower().replace("_", " ")


@dataclass(frozen=True)
class FlashPoint(LaneAnswer):
    """Flash point by vapour-liquid equilibrium.

    T (n,) [K]; T_low and T_high (n,) [K] the same with every estimated limit at the ends
    of its stated error; estimated (n,) [-] share of the flammable vapour at T whose limit
    is an estimate; P (n,) [Pa] the pressure it holds at; method in words.
    """

    T: np.ndarray
    T_low: np.ndarray
    T_high: np.ndarray
    estimated: np.ndarray
    P: np.ndarray
    method: str
    status: np.ndarray
    iterations: np.ndarray
    residual: np.ndarray


@dataclass(frozen=True)
class Window(LaneAnswer):
    """Temperatures between which a vapour space is flammable.

    T_lower and T_upper (n,) [K] with their ranges _low and _high from the stated error of
    estimated limits; estimated_lower and estimated_upper (n,) [-] share of the flammable
    vapour there whose limit is an estimate; status_lower and status_upper of each end;
    status is the worse of the two. Below T_lower the space is too lean, above T_upper too
    rich.
    """

    T_lower: np.ndarray
    T_lower_low: np.ndarray
    T_lower_high: np.ndarray
    T_upper: np.ndarray
    T_upper_low: np.ndarray
    T_upper_high: np.ndarray
    estimated_lower: np.ndarray
    estimated_upper: np.ndarray
    status_lower: np.ndarray
    status_upper: np.ndarray
    status: np.ndarray
    iterations: np.ndarray
    residual: np.ndarray


@dataclass(frozen=True)
class VapourSpace(LaneAnswer):
    """State of a vapour space at one temperature.

    y (n, c) [-] vapour in the space, fuel (n,) [-] its flammable part; lower_ratio (n,)
    [-] vapour over what the lower limit needs (1 at the limit), upper_ratio the same for
    the upper limit, each with _low and _high from the error of estimated limits; LFL and
    UFL (n,) [-] of this vapour; state (n,) of `SpaceState`, state_low and state_high the
    leanest and richest the errors leave open; saturation_lower and saturation_upper (n,)
    [-] the degrees of saturation between which the same liquid gives a flammable space
    (above 1: the saturated space is still leaner than that limit); estimated_lower and
    estimated_upper (n,) [-] share of the flammable vapour whose limit is an estimate;
    density_ratio (n,) [-] density over that of air at the same temperature and pressure;
    boils (n,) mask, the liquid boils at this pressure and the space holds no air.
    """

    y: np.ndarray
    fuel: np.ndarray
    lower_ratio: np.ndarray
    lower_ratio_low: np.ndarray
    lower_ratio_high: np.ndarray
    upper_ratio: np.ndarray
    upper_ratio_low: np.ndarray
    upper_ratio_high: np.ndarray
    LFL: np.ndarray
    UFL: np.ndarray
    state: np.ndarray
    state_low: np.ndarray
    state_high: np.ndarray
    saturation_lower: np.ndarray
    saturation_upper: np.ndarray
    estimated_lower: np.ndarray
    estimated_upper: np.ndarray
    density_ratio: np.ndarray
    boils: np.ndarray
    status: np.ndarray
    residual: np.ndarray


@dataclass(frozen=True)
class Headspace(LaneAnswer):
    """Vapour in the space above a liquid.

    T (n,) [K], P (n,) [Pa] pressure of the space, names (c,), p (n, c) [Pa] partial
    pressures, y (n, c) [-], MW (c,) [kg/mol], liquid (n,) [-] moles of liquid left of one
    charged, boils (n,) mask as in `VapourSpace`.
    """

    T: np.ndarray
    P: np.ndarray
    names: tuple[str, ...]
    MW: np.ndarray
    p: np.ndarray
    y: np.ndarray
    liquid: np.ndarray
    boils: np.ndarray
    status: np.ndarray
    residual: np.ndarray

    @property
    def ppm(self) -> np.ndarray:
        """Concentration by volume (n, c). [ppm]"""
        return self.y * 1e6

    @property
    def mg_m3(self) -> np.ndarray:
        """Mass of each species per volume of the space at its own T and P (n, c). [mg/m3]"""
        return self.y * (self.P / (R * self.T))[:, None] * self.MW * 1e6


@dataclass(frozen=True)
class Estimate(LaneAnswer):
    """A named cross-check: T (n,) [K], method in words, limits of use in words."""

    T: np.ndarray
    method: str
    limits: str
    status: np.ndarray

    @property
    def residual(self) -> np.ndarray:
        """Zero where there is an answer: the formulas are explicit. [-]"""
        return np.where(self.ok, 0.0, np.nan)


@dataclass(frozen=True)
class Share(LaneAnswer):
    """Share of a second liquid: share (n,) [-] of the volume at 15 degC; residual (n,) [-] of
    the flash-point condition there."""

    share: np.ndarray
    status: np.ndarray
    residual: np.ndarray
