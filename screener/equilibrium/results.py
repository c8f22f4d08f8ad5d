"""Answers of the equilibrium floor: frozen dataclasses of arrays, one entry per lane."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.ground.errors import NotConverged
from screener.ground.status import Status, converged, words


class LaneAnswer:
    """What every answer can say about its lanes."""

    status: np.ndarray
    residual: np.ndarray

    @property
    def ok(self) -> np.ndarray:
        """Mask (n,) of the lanes that converged."""
        return converged(self.status)

    @property
    def words(self) -> tuple[str, ...]:
        """The status of each lane in plain words."""
        return tuple(words(s) for s in self.status)

    def require(self):
        """The answer itself, or NotConverged naming the lanes that have none.

        Returns
        -------
        LaneAnswer
            This answer, every lane of it converged.

        Raises
        ------
        NotConverged
            At least one lane has no answer.

        Source
        ------
        None; bookkeeping.
        """
        lost = np.flatnonzero(~self.ok)
        if lost.size:
            raise NotConverged(lost.tolist(), [words(s) for s in self.status[lost]], self.residual[lost].tolist())
        return self


@dataclass(frozen=True)
class PhaseSplit(LaneAnswer):
    """Root of the Rachford-Rice equation.

    beta (n,) [-] vapour fraction, outside 0..1 for a negative flash; beta_L
    (n,) [-] = 1 - beta, exact where beta is next to 1; x and y (n, c) [-],
    zero where the feed is; total (n,) [-] sum of the feed as given (x and y
    carry the same sum as far as the equation allows); residual (n,) [-] the
    last relative step of the root.
    """

    beta: np.ndarray
    beta_L: np.ndarray
    x: np.ndarray
    y: np.ndarray
    total: np.ndarray
    status: np.ndarray
    iterations: np.ndarray
    residual: np.ndarray

    @property
    def negative(self) -> np.ndarray:
        """Mask (n,) of negative flashes: the root lies outside 0..1."""
        return (self.beta < 0.0) | (self.beta_L < 0.0)


@dataclass(frozen=True)
class Stability(LaneAnswer):
    """Outcome of the tangent-plane test.

    tpd (n,) [-] smallest tangent-plane distance over RT found, zero where
    every trial returned to the feed; w (n, c) [-] the composition it belongs
    to and kind (n,) its phase, 'L' or 'V'; reference (n,) the phase of the
    feed itself (its root of lower Gibbs energy); trials, how many starts.
    A lane is stable only where every trial converged and none is below zero;
    a trial below zero proves it unstable; anything else is neither.
    """

    T: np.ndarray
    P: np.ndarray
    z: np.ndarray
    tpd: np.ndarray
    w: np.ndarray
    kind: np.ndarray
    reference: np.ndarray
    trials: int
    status: np.ndarray
    iterations: np.ndarray
    residual: np.ndarray

    @property
    def unstable(self) -> np.ndarray:
        """Mask (n,) of lanes proven to split."""
        return self.tpd < -TPD_ZERO

    @property
    def stable(self) -> np.ndarray:
        """Mask (n,) of lanes in which every trial converged and none is below zero."""
        return self.ok & (self.tpd >= -TPD_ZERO)


@dataclass(frozen=True)
class Saturation(LaneAnswer):
    """Bubble or dew point.

    T (n,) [K], P (n,) [Pa], x and y (n, c) [-], K = y/x (n, c) [-], NaN for
    absent species; residual (n,) [-] the largest |ln f_V - ln f_L| over the
    species present; tpd (n,) [-] the smallest tangent-plane distance of the
    feed at the point, NaN where no test ran; checks, one line per lane, what
    was tested. Under LIQUID_SPLITS a bubble point is that of one liquid held
    together: an upper bound of the pressure where water settles, good to some
    percent otherwise; `first_vapour` gives the point of the two.
    """

    T: np.ndarray
    P: np.ndarray
    x: np.ndarray
    y: np.ndarray
    K: np.ndarray
    status: np.ndarray
    iterations: np.ndarray
    residual: np.ndarray
    tpd: np.ndarray
    checks: np.ndarray


@dataclass(frozen=True)
class Flash(LaneAnswer):
    """Flash at given temperature and pressure.

    beta (n,) [-] vapour fraction by moles, phases (n,) how many, x and y
    (n, c) [-] with K = y/x; beta_W, x_W share and composition of a second, the
    denser liquid, NaN where none was found. A single phase has beta 0 or 1, its
    own composition on its side and NaN on the other; two liquids have beta 0
    and no y, three phases everything. residual (n,) [-] is the largest |ln f|
    between phases over species present, zero for a single phase; balance (n,)
    [-] the largest |z - (1 - beta - beta_W) x - beta y - beta_W x_W|; tpd (n,)
    [-] the smallest tangent-plane distance found, NaN where no test ran;
    checks, one line per lane, what was tested. LIQUID_SPLITS names a second
    liquid: solved where checks says two liquids, or a vapour and two liquids,
    were found.
    """

    T: np.ndarray
    P: np.ndarray
    z: np.ndarray
    beta: np.ndarray
    x: np.ndarray
    y: np.ndarray
    K: np.ndarray
    phases: np.ndarray
    beta_W: np.ndarray
    x_W: np.ndarray
    status: np.ndarray
    iterations: np.ndarray
    residual: np.ndarray
    balance: np.ndarray
    tpd: np.ndarray
    checks: np.ndarray


# A tangent-plane distance this close to zero is zero: rounding of ln phi over many species stays some
# hundred times below it, and a split of that depth moves no mole fraction by more than its square root.
TPD_ZERO = 1e-10


def bad_status(good) -> np.ndarray:
    """Status (n,) to start from: BAD_INPUT where the lane is no valid state, else OUT_OF_STEPS."""
    return np.where(good, int(Status.OUT_OF_STEPS), int(Status.BAD_INPUT))
