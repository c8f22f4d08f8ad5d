"""Bubble and dew points as the ends between which a target may lie."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from screener.equilibrium.fraction import start_of
from screener.equilibrium.saturation import (
    bubble_pressure,
    bubble_temperature,
    dew_pressure,
    dew_temperature,
)
from screener.ground.status import Status


class Ends(NamedTuple):
    """Bubble or dew points of the lanes, NaN where there is none or it was not asked for.

    edge (n,) T [K] or P [Pa]; at (n,) T or ln P; excess (n,) over the target there [-]; u (n, c)
    and s (n,) to start two phases from (see `fraction`); status and iterations (n,).
    """

    edge: np.ndarray
    at: np.ndarray
    excess: np.ndarray
    u: np.ndarray
    s: np.ndarray
    status: np.ndarray
    iterations: np.ndarray

    def take(self, lanes) -> Ends:
        """Some of the lanes."""
        return Ends(*(value[lanes] for value in self))


def bubble_points(fluid, target, given, z) -> Ends:
    """Bubble points of all lanes at given T (n,) [K] or P (n,) [Pa] and z (n, c) [-]."""
    point = bubble_pressure if target.given == "T" else bubble_temperature
    return _points(fluid, target, given, z, point, 0.0, np.arange(given.size))


def dew_points(fluid, target, given, z, lanes) -> Ends:
    """Dew points of some of the lanes, at given T (n,) [K] or P (n,) [Pa] and z (n, c) [-]."""
    point = dew_pressure if target.given == "T" else dew_temperature
    return _points(fluid, target, given, z, point, 1.0, lanes)


def _points(fluid, target, given, z, point, beta, lanes) -> Ends:
    n = given.size
    ends = Ends(*(np.full(n, np.nan) for _ in range(3)), np.full(z.shape, np.nan), np.full(n, np.nan),
                np.full(n, int(Status.OUT_OF_STEPS)), np.zeros(n, dtype=int))  # fmt: skip
    if lanes.size == 0:
        return ends
    found = point(fluid, given[lanes], z[lanes])
    low, high = target.limits
    with np.errstate(invalid="ignore"):
        edge = found.P if target.given == "T" else found.T
        at = np.log(edge) if target.given == "T" else edge
        inside = found.ok & (at >= low) & (at <= high)
    share = np.where(inside, beta, np.nan)
    none = np.full_like(share, np.nan)
    excess, _ = target.take(lanes).excess(fluid, found.T, found.P, share, none, found.x, found.y, found.x)
    values = edge, np.where(inside, at, np.nan), excess, *start_of(fluid, target.given, found)
    for array, value in zip(ends, (*values, found.status, found.iterations), strict=True):
        array[lanes] = value
    return ends
