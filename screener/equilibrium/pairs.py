"""Two phases that meet a target: the vapour fraction as the only unknown, T or P following from it."""

from __future__ import annotations

import numpy as np

from screener.equilibrium.bracket import root_between
from screener.equilibrium.fraction import at_fraction, between, blind_start
from screener.ground.status import Status

NARROW = 1e-4  # [-] relative boiling range below which T and P do not tell the vapour fraction; own choice
TINY = 1e-300  # keeps a miss of zero over a size of zero a number
KEPT = ("T", "P", "beta", "x", "y", "ln_K", "residual", "balance")


class PairSearch:
    """Lanes whose target lies between the bubble and the dew point.

    best holds, lane by lane, the fields `KEPT` of the pair that came nearest;
    miss (n,) [-] how near, infinite where no pair was found; narrow (n,) the lanes whose boiling
    range is too narrow for T and P to tell the fraction.
    """

    def __init__(self, fluid, target, given, z):
        n, c = z.shape
        self.fluid, self.target, self.given, self.z = fluid, target, given, z
        self.starts: list[tuple[np.ndarray, np.ndarray]] = []
        self.u, self.s = np.full((n, c), np.nan), np.full(n, np.nan)
        self.best = {name: np.full((n, c) if name in ("x", "y", "ln_K") else n, np.nan) for name in KEPT}
        self.miss = np.full(n, np.inf)
        self.iterations = np.zeros(n, dtype=int)
        self.narrow = np.zeros(n, dtype=bool)

    def run(self, bubble, dew):
        """Search between the two ends."""
        with np.errstate(invalid="ignore"):
            self.narrow = np.abs(dew.at - bubble.at) <= NARROW * np.abs(bubble.at)
        self.starts = [(end.u, end.s) for end in (bubble, dew)]
        zero, small = np.zeros(self.miss.shape), self.target.small(bubble.excess)
        for end, beta in ((bubble, zero), (dew, zero + 1.0)):
            there = np.flatnonzero(np.abs(end.excess) <= small)
            if there.size:
                self._excess(there, beta[there])
        root_between(self._excess, zero, bubble.excess, zero + 1.0, dew.excess, small)

    def _excess(self, lanes, beta):
        """Excess over the target at these fractions, NaN where the pair was not found."""
        name = self.target.given
        u, s = between(beta, *((u[lanes], s[lanes]) for u, s in self.starts))
        warm = np.isfinite(self.s[lanes])
        u, s = np.where(warm[:, None], self.u[lanes], u), np.where(warm, self.s[lanes], s)
        found = at_fraction(self.fluid, name, self.given[lanes], self.z[lanes], beta, u, s)
        lost = np.flatnonzero(found.status != Status.CONVERGED)
        if lost.size:
            here = lanes[lost]
            start = blind_start(self.fluid, name, self.given[here])
            again = at_fraction(self.fluid, name, self.given[here], self.z[here], beta[lost], *start)
            for old, new in zip(found, again):
                old[lost] = new
        self.iterations[lanes] += found.iterations
        ok = found.status == Status.CONVERGED
        here = lanes[ok]
        self.u[here] = found.u[ok]
        self.s[here] = np.log(found.P[ok]) if name == "T" else 1.0 / found.T[ok]
        none = np.full(beta.shape, np.nan)
        f, size = self.target.take(lanes).excess(
            self.fluid, found.T, found.P, beta, none, found.x, found.y, np.full(found.x.shape, np.nan)
        )
        with np.errstate(invalid="ignore", divide="ignore"):
            miss = np.abs(f) / np.maximum(size, TINY)
            nearer = miss < self.miss[lanes]
        here = lanes[nearer]
        self.miss[here] = miss[nearer]
        for field in KEPT:
            self.best[field][here] = getattr(found, field)[nearer]
        return f
