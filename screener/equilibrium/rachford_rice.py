"""Rachford-Rice equation without cancellation, many lanes at once.

F(V) = sum z (K-1) / (1 + V (K-1)) = 0 is solved in a = (V - c1)/(cN - V), where
c = 1/(1-K) are the poles of the largest and smallest K. With

    p = (K1 - K)/(K1 - 1),   q = (K - KN)/(1 - KN)

every denominator is a sum of positive terms, 1 + V (K-1) = (p + a q)/(1 + a),
and any root a > 0 is the one between the two poles next to 0..1, so that all x
and y come out positive. G = F and H = -a F are convex in a: Newton on G from
the left and on H from the right never oversteps, and needs no bracket.
"""

from __future__ import annotations

import numpy as np

from screener.equilibrium.results import PhaseSplit
from screener.equilibrium.rows import row_max, row_sum
from screener.ground.errors import ShapeError
from screener.ground.status import Status

MOST_PASSES = 80
EPS = np.finfo(float).eps
LEAST, MOST = 1e-305, 1e305  # bounds of a: next to the ends of double precision


def rachford_rice(z, K) -> PhaseSplit:
    """Vapour fraction and phase compositions from feed and K-values.

    Parameters
    ----------
    z : array, shape (c,) or (n, c)
        Feed mole fractions; zeros allowed. A sum other than 1 is kept and
        reported in `total`. [-]
    K : array, shape (c,) or (n, c)
        K-values y/x, positive where z is. [-]

    Returns
    -------
    PhaseSplit
        beta, beta_L, x, y. NO_SOLUTION where the K-values present are all at
        least 1 or all at most 1, BAD_INPUT where a number is missing or
        negative; such lanes hold NaN.

    Raises
    ------
    ShapeError
        z and K do not broadcast.

    Source
    ------
    Rachford and Rice 1952; window: Whitson and Michelsen 1989; convex forms:
    Nichita and Leibovici, Fluid Phase Equilib. 353 (2013) 38.
    """
    try:
        z, K = np.broadcast_arrays(np.atleast_2d(np.asarray(z, float)), np.atleast_2d(np.asarray(K, float)))
    except ValueError as error:
        raise ShapeError("K", f"shape {np.shape(K)}", f"one that broadcasts with z, {np.shape(z)}") from error
    present = z > 0.0
    with np.errstate(invalid="ignore"):
        good = np.isfinite(z).all(axis=1) & (z >= 0.0).all(axis=1) & present.any(axis=1)
        good &= (np.isfinite(K) & (K > 0.0) | ~present).all(axis=1)
    usable = present & good[:, None]
    beta, beta_L, x, y, step, passes, found = split(np.where(usable, z, 0.0), np.where(usable, K, 1.0))
    found &= good
    status = np.where(good, int(Status.NO_SOLUTION), int(Status.BAD_INPUT))
    status[found] = np.where(passes[found] < MOST_PASSES, int(Status.CONVERGED), int(Status.OUT_OF_STEPS))
    blank = np.where(found, 0.0, np.nan)
    return PhaseSplit(
        beta=beta + blank, beta_L=beta_L + blank, x=x + blank[:, None], y=y + blank[:, None],
        total=z.sum(axis=1), status=status, iterations=passes, residual=step + blank,
    )


def split(z, K, K_minus_1=None, start=None, rough=False):
    """The solver itself: z (n, c) with K = 1 wherever z = 0.

    Parameters
    ----------
    z : array, shape (n, c)
        Feed; zero where a species is absent. [-]
    K : array, shape (n, c)
        K-values, 1 where z is zero. [-]
    K_minus_1 : array, shape (n, c), optional
        expm1(ln K) where ln K is what is known: keeps K next to 1 exact. [-]
    start : array, shape (n,), optional
        A vapour fraction to start from. [-]
    rough : bool
        For use inside an iteration: the root to 1e-12, fractions not refined.

    Returns
    -------
    tuple
        beta, beta_L, x, y, last relative step, passes, mask of lanes with a root.

    Source
    ------
    As `rachford_rice`.
    """
    e = K - 1.0 if K_minus_1 is None else K_minus_1
    with np.errstate(all="ignore"):
        e1, eN = row_max(e), -row_max(-e)
        found = (e1 > 0.0) & (eN < 0.0)
        e1, eN = np.where(found, e1, 1.0), np.where(found, eN, -0.5)
        K1, KN = row_max(K), -row_max(-K)
        # Differences of K are exact among small or large K, those of K - 1 among K next to 1.
        p = np.where((K1 < 2.0)[:, None], e1[:, None] - e, K1[:, None] - K) / e1[:, None]
        q = np.where((KN > 0.5)[:, None], e - eN[:, None], K - KN[:, None]) / -eN[:, None]
        width = 1.0 / e1 - 1.0 / eN
        a = _first(z, e, p, q, e1, eN, start)
        a, step, passes = _iterate(z, e, p, q, width, np.where(found, a, 1.0), found, 1e-12 if rough else 4.0 * EPS)
        # (1 + a) / (p + a q), scaled so that neither end overflows
        scale = 1.0 + np.minimum(a, 1.0 / a)
        low, high = np.minimum(1.0, 1.0 / a)[:, None], np.minimum(1.0, a)[:, None]
        x = z * (scale[:, None] / (p * low + q * high))
        V = _fraction(-1.0 / e1, -1.0 / eN, a)
        L = _fraction(K1 / e1, KN / eN, a)
        if not rough:
            V, L = _refine(z, K, e, V, L)
    return V, L, x, K * x, step, passes, found


def _first(z, e, p, q, e1, eN, start):
    """First a: from a vapour fraction between the poles, else where both ends of the K-values would balance."""
    if start is not None:
        a = (start + 1.0 / e1) / (-1.0 / eN - start)
        if ((a > LEAST) & (a < MOST)).all():
            return a
    light, heavy = e > 0.0, e < 0.0
    up = row_sum(np.where(light, z * e / np.where(light, q, 1.0), 0.0))
    down = row_sum(np.where(heavy, -z * e / np.where(heavy, p, 1.0), 0.0))
    cold = np.clip(up / down, LEAST, MOST)
    return cold if start is None else np.where((a > LEAST) & (a < MOST), a, cold)


def _fraction(at_zero, at_infinity, a):
    """(at_zero + a at_infinity) / (1 + a) without overflow."""
    return np.where(a < 1.0, (at_zero + a * at_infinity) / (1.0 + a), (at_zero / a + at_infinity) / (1.0 / a + 1.0))


def _iterate(z, e, p, q, width, a, found, enough):
    """Newton on G left of the root and on H right of it, in relative steps of a."""
    passes = np.zeros(a.shape, dtype=int)
    step = np.zeros(a.shape)
    active = np.flatnonzero(found)
    zA, eA, pA, qA, wA, aA = z, e, p, q, width, a
    if active.size < a.size:
        zA, eA, pA, qA, wA, aA = (v[active] for v in (z, e, p, q, width, a))
    last = np.full(active.shape, np.inf)
    for _ in range(MOST_PASSES):
        if active.size == 0:
            break
        low, high = np.minimum(1.0, 1.0 / aA), np.minimum(1.0, aA)
        # t is (K-1)/(p + a q), times a where a < 1: neither end of a then overflows its square
        t = eA * (low * high)[:, None] / (pA * low[:, None] + qA * high[:, None])
        zt = zA * t
        r = (low + high) * row_sum(zt) / (wA * np.einsum("nc,nc->n", zt, t))
        new = np.where(r > 0.0, aA * (1.0 + r), aA / (1.0 - r))
        new = np.where(np.isfinite(new), np.clip(new, LEAST, MOST), aA)
        size = np.abs(new - aA) / aA
        passes[active] += 1
        a[active], step[active] = new, size
        going = (size > enough) & ~((size < 1e-9) & (size >= 0.5 * last))
        aA, last = new, size
        if not going.all():
            active, last = active[going], last[going]
            zA, eA, pA, qA, wA, aA = (v[going] for v in (zA, eA, pA, qA, wA, aA))
    return a, step, passes


def _refine(z, K, e, V, L):
    """Two Newton steps in V itself (in L where that is the smaller), away from the poles.

    Near 0 or 1 the fraction is a difference of two poles; the equation written
    in the smaller fraction gives it to full relative accuracy.
    """
    small_L = np.abs(L) < np.abs(V)
    fraction = np.where(small_L, L, V)
    slope = np.where(small_L[:, None], -e, e)  # 1 + V e = K - L e
    constant = np.where(small_L[:, None], K, 1.0)
    for _ in range(2):
        D = constant + fraction[:, None] * slope
        ratio = slope / D
        zr = z * ratio
        new = fraction + row_sum(zr) / np.einsum("nc,nc->n", zr, ratio)
        take = (row_max(-D) < -0.05) & np.isfinite(new)
        fraction = np.where(take, new, fraction)
    return np.where(small_L, 1.0 - fraction, fraction), np.where(small_L, fraction, 1.0 - fraction)
