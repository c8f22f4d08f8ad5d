"""Bubble and dew points as the ends between which a target may lie."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from screener.equilibrium.fraction import at_fraction, start_of
from screener.equilibrium.incipient import start
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
    return _points(fluid, target, given, z, True, np.arange(given.size))


def dew_points(fluid, target, given, z, lanes) -> Ends:
    """Dew points of some of the lanes, at given T (n,) [K] or P (n,) [Pa] and z (n, c) [-]."""
    return _points(fluid, target, given, z, False, lanes)


def _points(fluid, target, given, z, bubble: bool, lanes) -> Ends:
    """One attempt per lane, and the long search only where the point itself is asked for.

    Elsewhere the flash judges what follows from a point, and a lane without one is
    sought by flashes; to prove that none exists would cost more than that.
    """
    n, name = given.size, target.given
    ends = Ends(*(np.full(n, np.nan) for _ in range(3)), np.full(z.shape, np.nan), np.full(n, np.nan),
                np.full(n, int(Status.OUT_OF_STEPS)), np.zeros(n, dtype=int))  # fmt: skip
    if lanes.size == 0:
        return ends
    _, u = start(fluid, name, given[lanes], z[lanes], bubble)
    beta = np.full(lanes.size, 0.0 if bubble else 1.0)
    found = at_fraction(fluid, name, given[lanes], z[lanes], beta, u)
    s = np.log(found.P) if name == "T" else 1.0 / found.T
    _put(ends, fluid, target, lanes, found, found.u, s, beta)
    lost = lanes[(found.status != Status.CONVERGED) & target.at_edge[lanes]]
    if lost.size:
        functions = (bubble_pressure, dew_pressure) if name == "T" else (bubble_temperature, dew_temperature)
        found = functions[0 if bubble else 1](fluid, given[lost], z[lost])
        _put(ends, fluid, target, lost, found, *start_of(fluid, name, found), np.full(lost.size, beta[0]))
    return ends


def _put(ends, fluid, target, lanes, found, u, s, beta):
    """Write points down; those outside the range of the target hold NaN."""
    low, high = target.limits
    with np.errstate(invalid="ignore"):
        edge = found.P if target.given == "T" else found.T
        at = np.log(edge) if target.given == "T" else edge
        inside = (found.status == Status.CONVERGED) & (at >= low) & (at <= high)
    u = np.where((found.status == Status.CONVERGED)[:, None], u, np.nan)
    share, none = np.where(inside, beta, np.nan), np.full_like(beta, np.nan)
    excess, _ = target.take(lanes).excess(fluid, found.T, found.P, share, none, found.x, found.y, found.x)
    values = edge, np.where(inside, at, np.nan), excess, u, s, found.status, found.iterations
    for array, value in zip(ends, values, strict=True):
        array[lanes] = value
