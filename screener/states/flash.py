"""Flash point of every liquid: measured where a laboratory sheet has it, by equilibrium where not."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.ground.constants import ATMOSPHERE
from screener.ground.status import Status
from screener.states.lanes import Lanes
from screener.states.scaled import flash_point

# Half range of a computed flash point [K]: mixtures read in tables miss by up to 4 K, pure species worked out
# from their limits by 3.5 K in the median (tests/measured/test_flash_points.py); rule of this project.
FLASH_SPREAD = 5.0


@dataclass(frozen=True)
class FlashLanes:
    """Flash points at standard pressure (n, 5) [K] with the range of estimated limits, share of the vapour whose
    limit is an estimate [-], and status."""

    T: np.ndarray
    T_low: np.ndarray
    T_high: np.ndarray
    estimated: np.ndarray
    status: np.ndarray


def flash_lanes(lanes: Lanes) -> FlashLanes:
    """Closed-cup flash point of every liquid by equilibrium. Equal liquids are worked out once.

    A measured one takes the place of the computed one. Its range is the greater of
    FLASH_SPREAD, which whoever reads these adds, and the reproducibility of its method: that is known from
    memory and may widen a range, not narrow it. A mixture that holds a liquid whose measured
    flash point lies below the computed one is lowered as much; above, it stays as computed. The low end
    of its range goes down by what the reproducibility is above FLASH_SPREAD.
    """
    shape = lanes.present.shape
    known = lanes.present & np.isfinite(lanes.z).all(axis=-1)
    out = [np.full(shape, np.nan) for _ in range(4)]
    status = np.full(shape, int(Status.BAD_INPUT))
    if known.any():
        liquids = np.column_stack([lanes.z[known], lanes.measured.factor[known]])
        z, back = np.unique(liquids, axis=0, return_inverse=True)
        flash = flash_point(lanes.fluid, z[:, :-1], z[:, -1], P=ATMOSPHERE)
        for values, found in zip(out, (flash.T, flash.T_low, flash.T_high, flash.estimated)):
            values[known] = found[back.ravel()]
        status[known] = flash.status[back.ravel()]
    return _measured_flash(lanes, known, FlashLanes(*out, status))


def _measured_flash(lanes: Lanes, known, flash: FlashLanes) -> FlashLanes:
    """Flash points with the measured ones in their place."""
    measured = lanes.measured
    if np.isnan(measured.flash).all():
        return flash
    T, T_low, T_high = flash.T.copy(), flash.T_low.copy(), flash.T_high.copy()
    estimated, status = flash.estimated.copy(), flash.status.copy()
    shift = measured.flash - T[:, :2]
    # A part without a computed flash point, of which one was measured, shifts its mixtures by an unknown amount.
    lower = np.where(np.isnan(measured.flash), 0.0, np.minimum(shift, 0.0))[:, None, :]
    shift = np.where(measured.holds[:, 2:], lower, 0.0).min(axis=-1)
    T[:, 2:] += shift
    more = np.fmax(measured.flash_R - FLASH_SPREAD, 0.0)
    T_low[:, 2:] += shift - np.where(measured.holds[:, 2:], more[:, None, :], 0.0).max(axis=-1)
    own = known[:, :2] & np.isfinite(measured.flash)
    T[:, :2] = np.where(own, measured.flash, T[:, :2])
    T_low[:, :2] = np.where(own, measured.flash - more, T_low[:, :2])
    T_high[:, :2] = np.where(own, measured.flash + more, T_high[:, :2])
    estimated[:, :2] = np.where(own, 0.0, estimated[:, :2])
    status[:, :2] = np.where(own, int(Status.CONVERGED), status[:, :2])
    return FlashLanes(T, T_low, T_high, estimated, status)
