"""Temperature at which a vapour reaches a given measure: secant in 1/T, all lanes at once."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from screener.ground.status import Status

T_LOW, T_HIGH = 190.0, 520.0  # [K] search range: vapour-pressure curves begin near 200 K; own choice
T_FIRST = 290.0  # [K] start
SLOPE = -5000.0  # [K] d ln p / d(1/T) to begin with: heat of vaporisation of a fuel over R
LONGEST = 4e-4  # [1/K] longest step in 1/T, some 35 K at room temperature
STEPS = 40
TOLERANCE = 1e-8  # on ln of the measure: some 2e-7 K


class Root(NamedTuple):
    """T (n,) [K], status (n,), iterations (n,), residual (n,) [-] of the measure's logarithm."""

    T: np.ndarray
    status: np.ndarray
    iterations: np.ndarray
    residual: np.ndarray


def temperature_of(measure, status, start=None) -> Root:
    """Temperature at which a rising measure of the vapour is one.

    measure(lanes, T) gives ln of the measure for some lanes (indices) at T [K]; status
    (n,) is CONVERGED where a lane is to be solved, else the reason why not; start (n,) [K] a
    first guess, T_FIRST where it is none. A lane whose
    measure is -inf everywhere has NO_SOLUTION; one that leaves T_LOW..T_HIGH, or whose
    measure is no number, OUT_OF_RANGE.
    """
    n = status.size
    out = Root(np.full(n, np.nan), np.array(status), np.zeros(n, dtype=int), np.full(n, np.nan))
    lanes = np.flatnonzero(status == Status.CONVERGED)
    out.status[lanes] = Status.OUT_OF_STEPS
    first = np.full(n, T_FIRST) if start is None else np.where(np.isfinite(start), start, T_FIRST)
    u = 1.0 / first[lanes]
    slope, u_old, g_old = np.full(lanes.size, SLOPE), np.full(lanes.size, np.nan), np.full(lanes.size, np.nan)
    low, high = 1.0 / T_HIGH, 1.0 / T_LOW
    for step in range(1, STEPS + 1):
        if lanes.size == 0:
            break
        g = measure(lanes, 1.0 / u)
        with np.errstate(all="ignore"):
            secant = (g - g_old) / (u - u_old)
            slope = np.where(np.isfinite(secant) & (secant < -300.0), secant, slope)
            move = np.clip(-g / slope, -LONGEST, LONGEST)
        done = np.abs(g) <= TOLERANCE
        stuck = ((u <= low) & (move < 0.0)) | ((u >= high) & (move > 0.0))
        out.iterations[lanes], out.residual[lanes] = step, g
        out.T[lanes[done]], out.status[lanes[done]] = 1.0 / u[done], Status.CONVERGED
        out.status[lanes[np.isneginf(g)]] = Status.NO_SOLUTION
        out.status[lanes[np.isnan(g) | (stuck & ~done & np.isfinite(g))]] = Status.OUT_OF_RANGE
        keep = np.isfinite(g) & ~done & ~stuck
        lanes, slope, u_old, g_old = lanes[keep], slope[keep], u[keep], g[keep]
        u = np.clip(u[keep] + move[keep], low, high)
    return out
