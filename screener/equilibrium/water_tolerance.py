"""The water a blend holds before a second liquid settles out of it.

Water is added to a blend without any until the tangent plane of the mixture
touches a second liquid: the smallest distance, negative where the mixture
splits, crosses zero. A ladder of water shares finds the first that splits; the
crossing below it is then narrowed down with the liquid found there as the only
trial, and every start is tried once more just below the crossing.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.equilibrium.results import LaneAnswer, bad_status
from screener.equilibrium.second_liquid import (
    DEPTH,
    DOUBTFUL,
    NOT_TESTED,
    SPLITS,
    TESTED,
    dry_ethanol,
    liquid_starts,
)
from screener.equilibrium.stability import ENOUGH, trials_from
from screener.ground.constants import ATMOSPHERE
from screener.ground.errors import InputError
from screener.ground.shapes import lanes as as_lanes
from screener.ground.status import Status

LEAST_WATER = 1e-6  # [-] first rung: below the water any stored hydrocarbon holds; own choice
RUNGS = 1.0 - np.concatenate([[1.0], 1.0 - np.geomspace(LEAST_WATER, 0.5, 20), np.geomspace(0.4, 0.001, 8)])
NEAR = 1e-9  # [-] tangent-plane distance over RT taken as touching: ten times its rounding
NARROW = (
    1e-4  # relative width of a bracket that is narrow enough where two liquids become one and distances drown
)
MOST_STEPS = 60
BACK = 2.0 * NARROW  # how far below the crossing, relative to it, every start is tried again
MOST_BRANCHES = 3  # liquids that may split off before the one followed
MOST_ROWS = 4_000  # lanes times rungs handled at once: bounds memory


@dataclass(frozen=True)
class WaterTolerance(LaneAnswer):
    """Water a blend holds.

    water (n,) [-] the mole fraction of water at which a second liquid appears;
    water_volume (n,) [-] the same as a share of the volumes of blend and water
    at 15 degC before mixing, NaN where a volume is not known; x (n, c) [-] the
    blend with that water, x_W (n, c) [-] the liquid that settles; residual (n,)
    [-] the tangent-plane distance over RT left between them, below 1e-9 but
    next to a point where the two liquids are one; checks in words, doubtful
    where measured blends of ethanol hold more water than this. NO_SOLUTION where no
    amount of water splits the blend, LIQUID_SPLITS where it splits without any.
    """

    T: np.ndarray
    z: np.ndarray
    water: np.ndarray
    water_volume: np.ndarray
    x: np.ndarray
    x_W: np.ndarray
    status: np.ndarray
    iterations: np.ndarray
    residual: np.ndarray
    checks: np.ndarray


def water_tolerance(fluid, T, z) -> WaterTolerance:
    """Water a blend holds before it splits into two liquids.

    Parameters
    ----------
    fluid : Fluid
        Species constants and model parameters of c components, water among them.
    T : float or array, shape (n,)
        Temperature. [K]
    z : array, shape (c,) or (n, c)
        Mole fractions of the blend; water in it is left out of account. [-]

    Returns
    -------
    WaterTolerance
        The share of water at the point, the blend there and the liquid that
        settles out.

    Raises
    ------
    ShapeError
        z does not match the fluid, or rows do not broadcast with T.
    InputError
        The fluid holds no water.

    Validity
    --------
    As good as the activity coefficients: measured saturation curves of
    hydrocarbon, ethanol and water in tests/measured/test_liquid_liquid.py.

    Source
    ------
    Own arrangement; the condition is that of Michelsen, Fluid Phase Equilib. 9
    (1982) 1.
    """
    if "water" not in fluid.names:
        raise InputError(
            "fluid", fluid.names, "the fluid holds no water", "name water among its species, share zero"
        )
    z, T, good = as_lanes(fluid.c, z, T=T)
    i = fluid.names.index("water")
    z[:, i] = 0.0
    total = z.sum(axis=1)
    good &= total > 0.0
    z[good] /= total[good, None]
    n, c = z.shape
    status = bad_status(good)
    status[good & fluid.lacks(np.where(np.arange(c) == i, 1.0, z))] = Status.NO_PARAMETERS
    out = {name: np.full(n, np.nan) for name in ("water", "residual")} | {"status": status}
    out |= {name: np.full((n, c), np.nan) for name in ("x", "x_W")}
    out |= {"iterations": np.zeros(n, dtype=int), "checks": np.full(n, NOT_TESTED, dtype=object)}
    work = np.flatnonzero(status == Status.OUT_OF_STEPS)
    for some in np.array_split(work, max(1, -(-work.size * RUNGS.size // MOST_ROWS))):
        if some.size:
            _hold(out, some, fluid, T[some], z[some], i)
    return WaterTolerance(T=T, z=z, water_volume=_by_volume(fluid, out["water"], z, i), **out)


def _by_volume(fluid, water, z, i: int):
    """Share (n,) [-] of the volume at 15 degC of water [-] added to blends z."""
    wet, dry = water * fluid.v_15[i], (1.0 - water) * (z @ np.where(np.isnan(fluid.v_15), 0.0, fluid.v_15))
    unknown = (z[:, np.isnan(fluid.v_15)] > 0.0).any(axis=1)
    return np.where(unknown, np.nan, wet / (wet + dry))


def _with_water(z, w, i: int):
    """Blends z (n, c) of share 1 - w (n,) with water, species i, of share w."""
    x = (1.0 - w)[:, None] * z
    x[:, i] = w
    return x


def _look(fluid, T, x, start=None):
    """Liquid trials beside x (n, c) at T (n,) and one atmosphere, from start (n, c), ln W, or every start."""
    state, P = fluid.at(T), np.full(T.shape, ATMOSPHERE)
    starts = liquid_starts(fluid, T, x) if start is None else start[None]
    return trials_from(state, P, x, state.ln_phi(P, x, "L"), starts, "L")


def _hold(out, lanes, fluid, T, z, i: int):
    """One chunk of blends without water."""
    n, k = T.size, RUNGS.size
    x = _with_water(np.repeat(z, k, axis=0), np.tile(RUNGS, n), i)
    found = _look(fluid, np.repeat(T, k), x)
    out["iterations"][lanes] += found.iterations.reshape(n, k).sum(axis=1)
    with np.errstate(invalid="ignore"):
        splits = (found.tpd < -DEPTH).reshape(n, k)
    told, rung = np.isfinite(found.tpd).reshape(n, k), np.arange(k)
    first = np.argmax(splits, axis=1)
    never = ~splits.any(axis=1)
    holds = np.where(told & ~splits & ((rung < first[:, None]) | never[:, None]), rung, -1).max(axis=1)
    at_once = splits[:, 0]
    sure = never & told.all(axis=1)
    out["status"][lanes[sure]], out["checks"][lanes[sure]] = Status.NO_SOLUTION, TESTED
    out["status"][lanes[at_once]] = Status.LIQUID_SPLITS
    out["checks"][lanes[at_once]] = np.where(dry_ethanol(fluid, z), DOUBTFUL, SPLITS)[at_once]
    some = np.flatnonzero(~never & (holds >= 0))
    for _ in range(MOST_BRANCHES):
        if some.size == 0:
            return
        row = some * k + first[some]
        w, ln_W, left, steps = _crossing(
            fluid,
            T[some],
            z[some],
            i,
            RUNGS[holds[some]],
            RUNGS[first[some]],
            found.ln_W[row],
            found.tpd[row],
        )
        out["iterations"][lanes[some]] += steps
        below = _look(fluid, T[some], _with_water(z[some], w * (1.0 - BACK), i))
        with np.errstate(invalid="ignore"):
            earlier = below.tpd < -ENOUGH
        _take_in(out, lanes[some[~earlier]], fluid, z[some], i, w, ln_W, left, ~earlier)
        some = some[earlier]  # another liquid splits off first: follow that one
        row = some * k + first[some]
        found.ln_W[row], found.tpd[row] = below.ln_W[earlier], below.tpd[earlier]


def _take_in(out, lanes, fluid, z, i: int, w, ln_W, left, stands):
    """Write down the crossings that stand."""
    w, z, W = w[stands], z[stands], np.exp(ln_W[stands])
    out["water"][lanes], out["residual"][lanes], out["x"][lanes] = w, left[stands], _with_water(z, w, i)
    out["x_W"][lanes] = np.where(out["x"][lanes] > 0.0, W, 0.0)
    out["x_W"][lanes] /= out["x_W"][lanes].sum(axis=1, keepdims=True)
    out["status"][lanes] = Status.CONVERGED
    out["checks"][lanes] = np.where(dry_ethanol(fluid, out["x"][lanes]), DOUBTFUL, TESTED)


def _crossing(fluid, T, z, i: int, low, high, ln_W, f_high):
    """Share of water (n,) where a liquid, ln W (n, c), begins to split off, the distance left, and steps.

    Below the crossing the trial stands at a positive distance, or has become
    the blend itself; the step is the secant of the two ends as far as they
    have one, else a halving.
    """
    low, high, ln_W, f_high = low.copy(), high.copy(), ln_W.copy(), f_high.copy()
    f_low, steps, open_ = np.full(T.shape, np.nan), np.zeros(T.size, dtype=int), np.arange(T.size)
    for step in range(MOST_STEPS):
        a, b, fa, fb = low[open_], high[open_], f_low[open_], f_high[open_]
        with np.errstate(invalid="ignore", divide="ignore"):
            secant = b - fb * (b - a) / (fb - fa)
        usable = np.isfinite(secant) & (secant > a) & (secant < b) & (step % 3 != 2)
        middle = np.where(usable, secant, np.where(a > 0.1 * b, 0.5 * (a + b), np.sqrt(a * b)))
        found = _look(fluid, T[open_], _with_water(z[open_], middle, i), ln_W[open_])
        steps[open_] += found.iterations
        splits = np.nan_to_num(found.tpd) < 0.0
        up, down = open_[splits], open_[~splits]
        high[up], f_high[up], ln_W[up] = middle[splits], found.tpd[splits], found.ln_W[splits]
        low[down] = middle[~splits]
        f_low[down] = np.where(found.tpd[~splits] > 0.0, found.tpd[~splits], np.nan)
        narrow = np.where(np.isfinite(f_low[open_]) & (f_low[open_] > ENOUGH), NEAR, NARROW)
        done = (np.abs(f_high[open_]) <= NEAR) | (high[open_] - low[open_] <= narrow * high[open_])
        open_ = open_[~done]
        if open_.size == 0:
            break
    return high, ln_W, np.abs(f_high), steps
