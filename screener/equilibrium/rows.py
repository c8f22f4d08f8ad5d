"""Sums and maxima over species, lane by lane.

NumPy reduces a short last axis slowly (75 us for the sum, 145 us for the
maximum of 3,600 lanes of 11 species); a product with ones takes 10 us, a
transposed copy 35 us. These are the innermost loops of every iteration.
"""

from __future__ import annotations

from functools import lru_cache

import numpy as np


@lru_cache(maxsize=64)
def ones(c: int):
    """A vector of ones (c,), never to be written to."""
    return np.ones(c)


def row_sum(a):
    """Sum over the last axis of a (n, c)."""
    return a @ ones(a.shape[1])


def row_max(a):
    """Maximum over the last axis of a (n, c); NaN where the lane holds one."""
    return np.maximum.reduce(a.T.copy(), axis=0)
