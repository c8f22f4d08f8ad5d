"""Saturation points of a chunk of lanes: iterate, judge what was found, look again, check.

The fixed-point problems are in `incipient`. A lane that does not settle, or
settles on two equal phases or on the wrong side of a phase envelope, is looked
at once more: the tangent plane of the feed along a ladder of pressures (or
temperatures) says whether a point of the kind asked for exists, and where to
start for it.
"""

from __future__ import annotations

import numpy as np

from screener.equilibrium.crossing import crossings
from screener.equilibrium.curve import P_, T_
from screener.equilibrium.fixed_point import Fixed, solve
from screener.equilibrium.incipient import HIGHEST_P, HIGHEST_T, LOWEST_P, lowest_T, start
from screener.equilibrium.ladder import seek
from screener.equilibrium.one_species import saturation
from screener.equilibrium.phase import DENSE
from screener.equilibrium.rows import row_max
from screener.equilibrium.second_liquid import NO_VAPOUR_LEFT, NOT_TESTED, SPLITS, full_check, splits_anyway
from screener.equilibrium.stability import FEW
from screener.ground.constants import T_15C
from screener.ground.status import Status

COARSE, FINE = 2, 11  # how often the ladder narrows a crossing: to 1/64, to round-off
# Next to a limit of material stability two phases that are nearly one satisfy the equations within their tolerance
# without being a solution: the residual falls with the square of their distance. Such a point has to be proven.
SUSPECT, SWOLLEN = 0.05, 0.2  # [-] largest |ln K| and relative difference of volume of phases under suspicion
TRIVIAL = 1e-6  # [-] both, of phases that are one in any case
PROMISED = 1e-9  # [-] largest residual of a point that says converged
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


def solve_points(out, lanes, fluid, name: str, value, feed, bubble: bool, warm=None):
    """One chunk of valid lanes: a blind or warm start (n, c), then the slower ways for those it fails."""
    problem, u = start(fluid, name, value, feed, bubble, warm)
    fixed = solve(problem, u, problem.present, reach=REACH)
    chunk = Chunk(out, lanes, fluid, name, value, feed, problem)
    status = chunk.take_in(np.arange(lanes.size), problem, fixed)
    if (status == Status.CONVERGED).all():
        return
    # past the upper end a start above the critical point may have gone astray, past the lower end none does
    below = fixed.converged & (problem.close(fixed.u)[0] <= 1.000001 * (LOWEST_P if name == "T" else lowest_T(fluid)))
    chunk.look_again(np.flatnonzero((status != Status.CONVERGED) & ~below))
    if bubble:
        _say_where_it_splits(out, lanes, fluid, name, value, feed)


class Chunk:
    """Lanes of one question: what was found is judged and written down here."""

    def __init__(self, out, lanes, fluid, name, value, feed, problem):
        self.out, self.lanes, self.fluid, self.name, self.value = out, lanes, fluid, name, value
        self.feed, self.problem, self.bubble = feed, problem, problem.bubble

    def look_again(self, open_):
        """The slower ways, one after the other, for the lanes still open.

        That none exists takes two witnesses: the envelope followed from end to end, and the ladder.
        """
        absent = np.zeros(self.lanes.size, dtype=int)
        if self.fluid.model == "gamma-phi":
            absent[open_] = Status.NO_SOLUTION
        else:
            open_ = self._as_one_species(open_)
            open_, absent[open_] = self._from_envelope(open_)
        for finer in (COARSE, FINE):
            open_, sought = self._from_ladder(open_, finer)
            before = self.out.status[self.lanes[open_]]
            say = np.where(sought == Status.OUT_OF_RANGE, sought, int(Status.OUT_OF_STEPS))
            # a crossing of phases that are nearly one, or that become one when solved, is no sign of a point
            unseen = np.isin(sought, (Status.NO_SOLUTION, Status.TRIVIAL)) | (before == Status.TRIVIAL)
            say = np.where(unseen, absent[open_], say)
            # two dense phases that meet stand; two that became one say more than an iteration that went nowhere
            stands = (before == Status.LIQUID_SPLITS) | (before == Status.TRIVIAL) & (say == Status.OUT_OF_STEPS)
            self.out.status[self.lanes[open_]] = np.where(stands, before, say)
            open_ = open_[(sought == Status.CONVERGED) & (say == Status.OUT_OF_STEPS)]

    def _as_one_species(self, open_):
        """Lanes that hold one species: found up to the critical point, none beyond."""
        some = open_[self.problem.present[open_].sum(axis=1) == 1]
        if some.size == 0:
            return open_
        found, there = saturation(self.fluid, self.name, self.value[some], self.feed[some])
        self.out.status[self.lanes[some[~there]]] = Status.NO_SOLUTION
        shift = np.log(found)[:, None] if self.name == "T" else self.problem.h / found[:, None]
        self._put(some[there], np.broadcast_to(shift, self.feed[some].shape)[there])
        return np.setdiff1d(open_, some)

    def _from_envelope(self, open_):
        """Lanes whose point lies on the phase envelope, and of those left what the envelope says."""
        if open_.size == 0:
            return open_, np.zeros(0, dtype=int)
        at = crossings(self.fluid, self.name, self.value[open_], self.feed[open_], self.bubble)
        some = np.flatnonzero(at.found)
        ln_K = at.X[some, :-4] * (1.0 if self.bubble else -1.0)
        shift = at.X[some, P_, None] if self.name == "T" else self.problem.h / np.exp(at.X[some, T_, None])
        left, absent = np.ones(open_.size, dtype=bool), at.absent
        status = self._put(open_[some], ln_K + shift)
        # a point past the range or of two dense phases is as good an answer
        left[some] = ~np.isin(status, (Status.CONVERGED, Status.OUT_OF_RANGE, Status.LIQUID_SPLITS))
        absent[some] = Status.OUT_OF_STEPS
        return open_[left], absent[left]

    def _from_ladder(self, open_, finer: int):
        """Lanes where the tangent plane along a ladder of states shows the point; what it says of those left."""
        if open_.size == 0:
            return open_, open_
        sought, u = seek(self.fluid, self.name, self.value[open_], self.feed[open_], self.bubble, finer)
        left = np.ones(open_.size, dtype=bool)
        some = np.flatnonzero(sought == Status.CONVERGED)
        if some.size:
            held = self.problem.take(open_[some])
            fixed = solve(held, u[some], held.present, plain=2, newton=30)  # next to the answer
            left[some] = self.take_in(open_[some], held, fixed) != Status.CONVERGED
        return open_[left], sought[left]

    def _put(self, some, u):
        """Points known beforehand; the status of each."""
        if some.size == 0:
            return some
        held = self.problem.take(some)
        u = np.where(held.present, u, 0.0)
        held.nudged = False
        residual = row_max(np.abs(np.where(held.present, held.image(u) - u, 0.0)))
        fixed = Fixed(u, residual, np.ones(some.size, dtype=int), residual <= PROMISED)
        return self.take_in(some, held, fixed, proven=True)

    def take_in(self, some, problem, fixed, proven=False):
        """Judge what an iteration found, write down the lanes that stand, return the status of all."""
        out, lanes = self.out, self.lanes[some]
        found, other, volume_L, volume_V = problem.look(fixed.u)
        T, P = (self.value[some], found) if self.name == "T" else (found, self.value[some])
        shift = np.log(P)[:, None] if self.name == "T" else problem.h / T[:, None]
        ln_K = np.where(problem.present, fixed.u - shift, 0.0)
        apart, swollen = (TRIVIAL, TRIVIAL) if proven else (SUSPECT, SWOLLEN)
        with np.errstate(invalid="ignore"):
            status = np.where(fixed.converged, int(Status.CONVERGED), int(Status.OUT_OF_STEPS))
            alike = (row_max(np.abs(ln_K)) < apart) & ~(np.abs(volume_V / volume_L - 1.0) > swollen)
            dense = (volume_L < DENSE) & (volume_V < DENSE)
            if proven:  # a gas under such a pressure is as dense as a liquid
                dense &= P <= NO_VAPOUR_LEFT
            low, high = (LOWEST_P, HIGHEST_P) if self.name == "T" else (lowest_T(self.fluid), HIGHEST_T)
            outside = ~((found > low * 1.000001) & (found < high * 0.999999))
        status = np.where(fixed.converged & (volume_V <= volume_L), int(Status.NO_SOLUTION), status)
        status = np.where(fixed.converged & dense, int(Status.LIQUID_SPLITS), status)
        status = np.where(outside, int(Status.OUT_OF_RANGE), status)
        status = np.where(fixed.converged & alike, int(Status.TRIVIAL), status)
        keep = status == Status.CONVERGED
        out.status[lanes] = np.where(status == Status.NO_SOLUTION, int(Status.OUT_OF_STEPS), status)
        out.iterations[lanes] += fixed.iterations
        out.residual[lanes] = fixed.residual
        here = lanes[keep]
        out.value[here], out.other[here], out.ln_K[here] = found[keep], other[keep], ln_K[keep]
        return status


def _say_where_it_splits(out, lanes, fluid, name: str, value, feed):
    """A liquid without bubble point, or with one out of range, may be two liquids: that is the better answer."""
    none = np.flatnonzero(out.status[lanes] != Status.CONVERGED)
    if none.size:
        T = value[none] if name == "T" else np.full(none.size, T_15C)
        split = lanes[none[splits_anyway(fluid, T, feed[none])]]
        out.status[split], out.checks[split] = Status.LIQUID_SPLITS, SPLITS


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
        Chunk(out, here[some], fluid, name, given[some], z[some], problem).take_in(np.arange(some.size), problem, fixed)
