"""What became of a lane: one small vocabulary shared by every batched routine."""

from __future__ import annotations

from enum import IntEnum

import numpy as np


class Status(IntEnum):
    """State of one lane after a batched calculation.

    Only CONVERGED lanes hold numbers to rely on; every other lane holds NaN
    where no answer exists.
    """

    CONVERGED = 0
    OUT_OF_STEPS = 1  # the iteration cap was reached
    NO_SOLUTION = 2  # none exists: no bubble point at this temperature, no root in the interval
    TRIVIAL = 3  # both phases collapsed onto one composition and density
    OUT_OF_RANGE = 4  # outside the range of the model or its parameters
    BAD_INPUT = 5  # NaN, negative or unnormalised input in this lane
    LIQUID_SPLITS = 6  # a second liquid forms before the first bubble
    NO_PARAMETERS = 7  # a parameter the answer depends on is not in the tables


WORDS = {
    Status.CONVERGED: "converged",
    Status.OUT_OF_STEPS: "did not converge within the iteration cap",
    Status.NO_SOLUTION: "no solution exists at this state",
    Status.TRIVIAL: "both phases collapsed into one",
    Status.OUT_OF_RANGE: "outside the range of the method",
    Status.BAD_INPUT: "input of this lane is not a valid state",
    Status.LIQUID_SPLITS: "the liquid splits into two before it boils",
    Status.NO_PARAMETERS: "a needed parameter is missing",
}


def words(status: int) -> str:
    """Plain words for a status value."""
    return WORDS[Status(int(status))]


def converged(status) -> np.ndarray:
    """Boolean mask of the lanes that converged."""
    return np.asarray(status) == Status.CONVERGED
