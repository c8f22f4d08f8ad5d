"""What laboratory sheets say of the five liquids of every case: the measured value in place of the computed one.

Rules of this project, all of them here:

- A liquid alone carries the factor of its own sheet, measured over computed pressure of its own vapour, the most
  direct test first (`blends.measured`); the equation supplies the slope from there to other temperatures. The method
  spread stays: an error of the slope is not measured by one point. It is never below the
  reproducibility of the test.
- A mixture carries the mean of the factors of its parts, weighted by the share each part's molecules have in the
  vapour pressure of the mixture at 37.8 degC, where fuels are tested. Not by volume: a tenth of gasoline in
  diesel makes nearly all of its vapour, and what was measured of the diesel says nothing about that.
- Where one part was measured and the other not, the other may deviate as much: the range is widened by its
  weight times the deviation of the measured one.
- Densities add by volume, so the measured ones do. A volume correction follows the computed density: it
  moves by less than 0.01 % of the volume for the few tenths of kg/m3 that a fit leaves.
- Hydrogen sulfide measured in a liquid is the whole of it; a value stated in the case goes before it.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.blends.measured import pressure_factor, told
from screener.ground.constants import T_100F
from screener.states.scaled import bubble_pressure


@dataclass(frozen=True)
class Measured:
    """Arrays (n, 5) over the liquids of n cases.

    factor on computed vapour pressures, 1 where nothing was measured [-]; doubt relative
    reproducibility of it [-]; widening of a range for the part of a mixture that was not measured [-];
    density measured over computed [-]; flash (n, 2) measured flash point of receipt and heel [K], NaN
    where there is none, and its reproducibility flash_R (n, 2) [K]; holds (n, 5, 2) whether the liquid holds some
    of the receipt, some of the heel.
    """

    factor: np.ndarray
    doubt: np.ndarray
    widening: np.ndarray
    density: np.ndarray
    flash: np.ndarray
    flash_R: np.ndarray
    holds: np.ndarray

    def wider(self, spread, k=slice(None)):
        """A relative method spread (n, 5, ...) [-], or that of liquid k (n, ...), with what was measured."""
        doubt, more = self.doubt[:, k], self.widening[:, k]
        ahead = (...,) + (None,) * (np.ndim(spread) - doubt.ndim)
        return np.maximum(spread, doubt[ahead]) + more[ahead]


@dataclass(frozen=True)
class Own:
    """What was measured of n liquids: factor, doubt (n,) [-], whether a factor was told (n,)."""

    factor: np.ndarray
    doubt: np.ndarray
    told: np.ndarray


def own(blends) -> Own:
    """What the sheets of n blends say of their vapour pressure."""
    pairs = np.array([pressure_factor(blend.measured) for blend in blends]).reshape(-1, 2)
    return Own(pairs[:, 0], pairs[:, 1], np.array([told(blend.measured) is not None for blend in blends]))


def mixed(fluid, z_1, n_1, z_2, n_2, one: Own, two: Own):
    """Factor, doubt and widening (n,) of two liquids brought together, by the rules above.

    z_1, z_2 (n, c) [-] with n_1, n_2 (n,) moles of each; one, two (n,) what was measured of them. A lane of
    which nothing was measured is 1, 0, 0; one whose vapour at 37.8 degC is not found is NaN.
    """
    factor, doubt, widening = np.ones(n_1.shape), np.zeros(n_1.shape), np.zeros(n_1.shape)
    go = (one.factor != 1.0) | (two.factor != 1.0) | (one.doubt > 0.0) | (two.doubt > 0.0)
    if not go.any():
        return factor, doubt, widening
    first, second = n_1[go, None] * z_1[go], n_2[go, None] * z_2[go]
    moles = first + second
    with np.errstate(invalid="ignore", divide="ignore"):
        answer = bubble_pressure(fluid, T_100F, moles / moles.sum(axis=1, keepdims=True), 1.0)
        w = np.where(moles > 0.0, answer.y * first / moles, 0.0).sum(axis=1)
    w = np.where(answer.ok, w, np.nan)
    f_1, f_2, v = one.factor[go], two.factor[go], 1.0 - w
    factor[go] = w * f_1 + v * f_2
    doubt[go] = w * one.doubt[go] + v * two.doubt[go]
    lone_1, lone_2 = one.told[go] & ~two.told[go], two.told[go] & ~one.told[go]
    widening[go] = v * lone_1 * np.abs(f_1 - 1.0) + w * lone_2 * np.abs(f_2 - 1.0)
    return factor, doubt, widening


def _figures(blends, key: str, name: str) -> np.ndarray:
    """A field of one measured number of n blends, NaN where it was not measured."""
    found = (blend.figure(key) for blend in blends)
    return np.array([np.nan if one is None else getattr(one, name) for one in found])


def density_ratios(blends) -> np.ndarray:
    """Measured density at 15 degC over the computed one (n,), 1 where it was not measured. [-]"""
    ratio = _figures(blends, "density_15", "value") / _figures(blends, "density_15", "computed")
    return np.where(np.isnan(ratio), 1.0, ratio)


def sour_shares(blends) -> np.ndarray:
    """Hydrogen sulfide measured in n liquids (n,), NaN where it was not. [kg/kg]"""
    return _figures(blends, "h2s", "value")


def flash_known(blend) -> bool:
    """Whether a flash point of a blend means anything: measured, or of a liquid whose light end is known."""
    return blend.vapour_pressure_known or blend.figure("flash_point") is not None


def measured_of(fluid, Z, receipts, heels, moles, masses) -> Measured:
    """What was measured of every liquid.

    Z (2, n, c) [-] receipt and heel, their blends, moles and masses (2, n, 3) of each
    [mol, kg] in the mixtures at low, normal and high level.
    """
    one, two, n = own(receipts), own(heels), len(receipts)
    columns = np.empty((3, n, 5))
    columns[:, :, 0] = one.factor, one.doubt, np.zeros(n)
    columns[:, :, 1] = two.factor, two.doubt, np.zeros(n)
    for j in range(3):
        columns[:, :, 2 + j] = mixed(fluid, Z[0], moles[0, :, j], Z[1], moles[1, :, j], one, two)
    ratio_1, ratio_2 = density_ratios(receipts)[:, None], density_ratios(heels)[:, None]
    with np.errstate(invalid="ignore", divide="ignore"):
        mixture = (masses[0] * ratio_1 + masses[1] * ratio_2) / (masses[0] + masses[1])
    density = np.hstack([ratio_1, ratio_2, np.where((ratio_1 == 1.0) & (ratio_2 == 1.0), 1.0, mixture)])
    holds = np.zeros((n, 5, 2), dtype=bool)
    holds[:, 0, 0] = holds[:, 1, 1] = True
    holds[:, 2:] = np.moveaxis(moles > 0.0, 0, -1)
    flash = np.stack([_figures(b, "flash_point", "value") for b in (receipts, heels)], axis=1)
    flash_R = np.stack([_figures(b, "flash_point", "reproducibility") for b in (receipts, heels)], axis=1)
    return Measured(*columns, density, flash, flash_R, holds)
