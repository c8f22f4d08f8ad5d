"""Saturation points of a chunk of lanes: iterate, judge what was found, look again, check.

The fixed-point problems are in `incipient`. A lane that does not settle, or
settles on two equal phases or on the wrong side of a phase envelope, is looked
at once more: the tangent plane of the feed along a ladder of pressures (or
temperatures) says whether a point of the kind asked for exists, and where to
start for it.
"""

from __future__ import annotations

import numpy as np

from screener.equilibrium.fixed_point import solve
from screener.equilibrium.incipient import HIGHEST_P, HIGHEST_T, LOWEST_P, LOWEST_T, start
from screener.equilibrium.ladder import seek
from screener.equilibrium.phase import DENSE, reduced_volume
from screener.equilibrium.rows import row_max
from screener.equilibrium.second_liquid import NOT_TESTED, SPLITS, full_check, splits_anyway
from screener.equilibrium.stability import FEW
from screener.ground.constants import T_15C
from screener.ground.status import Status

FINER = (2, 11)  # how often the ladder narrows a crossing, first and second time: to 1/64, to round-off
TRIVIAL = 1e-4  # [-] largest |ln K| and relative difference of volume of two phases that are one
REACH = 1.0  # longest accelerated step in ln K


class Points:
    """The arrays of a Saturation while they are filled: value is the unknown, other the new phase."""

    def __init__(self, n: int, c: int, status):
        self.value, self.residual = np.full(n, np.nan), np.full(n, np.nan)
        self.other, self.ln_K = np.full((n, c), np.nan), np.full((n, c), np.nan)
        self.iterations, self.status = np.zeros(n, dtype=int), status
        self.tpd, self.checks = np.full(n, np.nan), np.full(n, NOT_TESTED, dtype=object)

    def drop(self, lanes):
        """Take back the answer of some lanes."""
        self.status[lanes] = Status.OUT_OF_STEPS
        self.value[lanes], self.other[lanes], self.ln_K[lanes] = np.nan, np.nan, np.nan


def solve_points(out, lanes, fluid, name: str, value, feed, bubble: bool):
    """One chunk of valid lanes; those that fail get a second start from the ladder."""
    problem, u = start(fluid, name, value, feed, bubble)
    fixed = solve(problem, u, problem.present, reach=REACH)
    status = _take_in(out, lanes, fluid, name, value, problem, fixed)
    for finer in FINER:
        again = np.flatnonzero((status != Status.CONVERGED) & (status != Status.OUT_OF_RANGE))
        if again.size == 0:
            break
        sought, u = seek(fluid, name, value[again], feed[again], bubble, finer)
        exists = sought == Status.CONVERGED
        status[again[~exists]] = Status.OUT_OF_RANGE  # nothing more to seek there
        out.status[lanes[again[~exists]]] = sought[~exists]
        again, u = again[exists], u[exists]
        if again.size:
            held = problem.take(again)
            fixed = solve(held, u, held.present, plain=2, newton=30)  # next to the answer: straight to Newton
            status[again] = _take_in(out, lanes[again], fluid, name, value[again], held, fixed)
    if bubble:
        _say_where_it_splits(out, lanes, fluid, name, value, feed)


def _say_where_it_splits(out, lanes, fluid, name: str, value, feed):
    """A liquid without bubble point, or with one out of range, may be two liquids: that is the better answer."""
    none = np.flatnonzero(np.isin(out.status[lanes], (Status.NO_SOLUTION, Status.OUT_OF_RANGE)))
    if none.size:
        T = value[none] if name == "T" else np.full(none.size, T_15C)
        split = lanes[none[splits_anyway(fluid, T, feed[none])]]
        out.status[split], out.checks[split] = Status.LIQUID_SPLITS, SPLITS


def _take_in(out, lanes, fluid, name: str, value, problem, fixed):
    """Judge what the iteration found and write down the lanes that stand."""
    found, other = problem.close(fixed.u)
    T, P = (value, found) if name == "T" else (found, value)
    shift = np.log(P)[:, None] if name == "T" else problem.h / T[:, None]
    ln_K = np.where(problem.present, fixed.u - shift, 0.0)
    state, feed = problem.feed_at(T)
    new = state.mix(other)
    kinds = "LV" if problem.bubble else "VL"
    ratio = reduced_volume(feed, P, feed.Z(P, kinds[0])), reduced_volume(new, P, new.Z(P, kinds[1]))
    volume_L, volume_V = (ratio[0] * feed.b, ratio[1] * new.b)[:: 1 if problem.bubble else -1]
    with np.errstate(invalid="ignore"):
        status = np.where(fixed.converged, int(Status.CONVERGED), int(Status.OUT_OF_STEPS))
        alike = (row_max(np.abs(ln_K)) < TRIVIAL) & ~(np.abs(volume_V / volume_L - 1.0) > TRIVIAL)
        dense = (ratio[0] < DENSE) & (ratio[1] < DENSE)
        low, high = (LOWEST_P, HIGHEST_P) if name == "T" else (LOWEST_T, HIGHEST_T)
        outside = ~((found > low * 1.000001) & (found < high * 0.999999))
    status = np.where(fixed.converged & (volume_V <= volume_L), int(Status.NO_SOLUTION), status)
    status = np.where(fixed.converged & dense, int(Status.LIQUID_SPLITS), status)
    status = np.where(outside, int(Status.OUT_OF_RANGE), status)
    status = np.where(fixed.converged & alike, int(Status.TRIVIAL), status)
    out.status[lanes] = status
    out.iterations[lanes] += fixed.iterations
    out.residual[lanes] = fixed.residual
    keep = status == Status.CONVERGED
    here = lanes[keep]
    out.value[here], out.other[here], out.ln_K[here] = found[keep], other[keep], ln_K[keep]
    return status


def check_points(out, lanes, fluid, name: str, value, feed, bubble: bool):
    """The tangent plane of the feed at its saturation point.

    A trial of the incipient kind that lies below is the bubble or drop that
    forms earlier: the point is sought again from it, once. A second liquid
    leaves a bubble point standing as a number (one liquid held together)
    under the status LIQUID_SPLITS.
    """
    incipient = "V" if bubble else "L"
    for last in (False, True):
        some = np.flatnonzero(out.status[lanes] == Status.CONVERGED)
        if some.size == 0:
            return
        here, z, given, found = lanes[some], feed[some], value[some], out.value[lanes[some]]
        T, P = (given, found) if name == "T" else (found, given)
        state = fluid.at(T)
        ln_phi = state.ln_phi(P, z, "L" if bubble else "V")
        plane, splits, text = full_check(fluid, state, P, z, z, ln_phi, fluid.wilson_K(T, P))
        out.tpd[here], out.checks[here] = plane.tpd, text
        early = splits & (plane.kind == incipient)
        out.status[here[splits & ~early]] = Status.LIQUID_SPLITS
        out.drop(here[early | ~np.isfinite(plane.tpd)])
        some = np.flatnonzero(early)
        if last or some.size == 0:
            return
        problem, _ = start(fluid, name, given[some], z[some], bubble)
        ln_ratio = (plane.ln_W - np.log(np.maximum(z, FEW)))[some] * (1.0 if bubble else -1.0)
        shift = np.log(P[some])[:, None] if name == "T" else problem.h / T[some][:, None]
        u = np.where(problem.present, ln_ratio + shift, 0.0)
        fixed = solve(problem, u, problem.present, plain=2, newton=30)
        _take_in(out, here[some], fluid, name, given[some], problem, fixed)
