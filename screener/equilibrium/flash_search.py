"""A target met by flashes at T and P between two ends of T or ln P: slow, and for any mixture."""

from __future__ import annotations

from dataclasses import fields

import numpy as np

from screener.equilibrium.bracket import root_between
from screener.equilibrium.flash import flash_tp
from screener.equilibrium.results import Flash
from screener.ground.status import Status

PROMISED = 1e-8  # [-] largest miss of a lane that says converged
INWARD = (0.0, 0.1, 0.25)  # shares of the range tried as an end where the flash has no answer further out
RUNGS = 48  # states tried across the range where a vapour fraction is not between its ends


def rows_of(flash):
    """The arrays of a Flash by name, copied."""
    return {field.name: np.array(getattr(flash, field.name)) for field in fields(Flash)}


def excess_of(fluid, target, rows):
    """Excess over the target (n,) of flashes, and its size (n,)."""
    return target.excess(fluid, *(rows[name] for name in ("T", "P", "beta", "beta_W", "x", "y", "x_W")))


def miss_of(fluid, target, rows):
    """By how much flashes miss the target (n,). [-]"""
    f, size = excess_of(fluid, target, rows)
    with np.errstate(invalid="ignore", divide="ignore"):
        return np.abs(f) / size


class FlashSearch:
    """Lanes whose target is sought by flashes; rows holds the nearest flash of each, miss (n,) how near."""

    def __init__(self, fluid, target, given, z, check: str):
        self.fluid, self.target, self.given, self.z, self.check = fluid, target, given, z, check
        self.rows, self.miss = {}, np.full(given.shape, np.inf)

    def run(self, bubble, dew):
        """Search between the bubble and the dew point where they serve, else over the whole range.

        Returns the rows and the miss; OUT_OF_RANGE where the target lies beyond the range.
        """
        low, high = self.target.limits
        wide = [
            np.full(self.given.shape, end)
            for end in ((high, low) if self.target.given == "T" else (low, high))
        ]
        with np.errstate(invalid="ignore"):
            a = np.where(bubble.excess < 0.0, bubble.at, wide[0])
            b = np.where(dew.excess > 0.0, dew.at, wide[1])
        every = np.arange(self.given.size)
        f_a, f_b = self._excess(every, a), self._excess(every, b)
        self._widen(a, f_a, -1.0, wide[0], wide[1])
        self._widen(b, f_b, 1.0, wide[1], wide[0])
        outside = (f_a > 0.0) | (f_b < 0.0)
        iterations = self._between(a, f_a, b, f_b)
        left = np.flatnonzero(~(self.miss <= PROMISED))
        if self.target.what == "beta" and left.size:
            self._scan(left, a, f_a, b, f_b)
            iterations[left] += RUNGS
            iterations += self._between(a, f_a, b, f_b)
        self.rows["iterations"] += iterations
        self.rows["status"][outside & ~(self.miss <= PROMISED)] = Status.OUT_OF_RANGE
        return self.rows, self.miss

    def _between(self, a, f_a, b, f_b):
        """Search the lanes still open between two ends; how many flashes (n,) that took."""
        f_b = np.where(self.miss <= PROMISED, np.nan, f_b)
        return root_between(self._excess, a, f_a, b, f_b, self.target.small(f_a)).iterations

    def _excess(self, lanes, at):
        """Excess over the target of flashes at these T or ln P; the nearest are kept."""
        given = self.given[lanes]
        T, P = (given, np.exp(at)) if self.target.given == "T" else (at, given)
        rows = rows_of(flash_tp(self.fluid, T, P, self.z[lanes], check=self.check))
        f, size = excess_of(self.fluid, self.target.take(lanes), rows)
        if not self.rows:
            self.rows = {name: np.array(value) for name, value in rows.items()}
        with np.errstate(invalid="ignore", divide="ignore"):
            miss = np.abs(f) / size
            nearer = miss < self.miss[lanes]
        for name, value in rows.items():
            self.rows[name][lanes[nearer]] = value[nearer]
        self.miss[lanes[nearer]] = miss[nearer]
        return f

    def _widen(self, end, f, sign, own, other):
        """Move an end on the wrong side of the target, or without a flash, to the end of the range."""
        for inward in INWARD:
            bad = np.flatnonzero(~(f * sign >= 0.0))
            if bad.size == 0:
                return
            end[bad] = own[bad] + inward * (other[bad] - own[bad])
            f[bad] = self._excess(bad, end[bad])

    def _scan(self, lanes, a, f_a, b, f_b):
        """Ends around the crossing nearest the vapour; with dissolved gases a fraction may fall, then rise."""
        at, f, stop = b[lanes].copy(), f_b[lanes].copy(), a[lanes].copy()
        some = np.arange(lanes.size)
        for left in range(RUNGS, 0, -1):
            if some.size == 0:
                return
            last, f_last = at[some], f[some]
            far = stop[some] / last if self.target.given == "P" else stop[some] - last
            at[some] = last * far ** (1.0 / left) if self.target.given == "P" else last + far / left
            f[some] = self._excess(lanes[some], at[some])
            with np.errstate(invalid="ignore"):
                crossed = (f_last > 0.0) & (f[some] <= 0.0)
            here = lanes[some[crossed]]
            a[here], f_a[here], b[here], f_b[here] = (
                at[some[crossed]],
                f[some[crossed]],
                last[crossed],
                f_last[crossed],
            )
            some = some[~crossed]
