"""Saturation points at given temperature or pressure read from phase envelopes.

Between two points the curve is the cubic of their tangents (Hermite). Where it
crosses the value given, Newton on the equations of the point with that value
held makes the crossing exact. Of several the one met first is taken: the bubble
point of highest pressure (lowest temperature), the dew point of lowest pressure
(highest temperature).
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from screener.equilibrium.curve import P_, T_, W_, Z_, Curve
from screener.equilibrium.envelope import Envelopes, apart, envelopes
from screener.equilibrium.rows import row_max
from screener.ground.status import Status

SAMPLES = 33  # places looked at on each stretch, its ends included
MOST_CROSSINGS = 6  # per lane
MOST_PASSES = 20  # Newton passes to the value given
STANDS = 0.01  # d ln T / d ln P (or its inverse) below which the curve goes nowhere in that variable
MOST_MOVES = 8  # along the curve to the value given
MET = 1e-7  # relative miss of the value given, before the last step along the tangent
MOST_CURVES = 256  # handled at once: bounds memory


class Crossings(NamedTuple):
    """found (n,), X (n, c+4) of the point, absent (n,) the status of a lane not found: NO_SOLUTION where the envelope
    is known from end to end, OUT_OF_RANGE where it goes on past the range of the method, else OUT_OF_STEPS."""

    found: np.ndarray
    X: np.ndarray
    absent: np.ndarray


def crossings(fluid, name: str, value, feed, bubble: bool) -> Crossings:
    """Bubble or dew points on the phase envelopes of the feeds.

    Parameters
    ----------
    fluid : Fluid
        The fluid; any cubic equation of state.
    name : str
        "T" or "P": what `value` is.
    value : array, shape (n,)
        Temperature [K] or pressure [Pa].
    feed : array, shape (n, c)
        Liquid (bubble) or vapour (dew). [-]
    bubble : bool
        Which of the two.

    Returns
    -------
    Crossings
        The points, and what is known of lanes without one.

    Source
    ------
    Michelsen, Fluid Phase Equilib. 4 (1980) 1.
    """
    n, c = feed.shape
    out = Crossings(np.zeros(n, dtype=bool), np.full((n, c + 4), np.nan), np.zeros(n, dtype=int))
    kinds, which = np.unique(feed, axis=0, return_inverse=True)
    for first in range(0, kinds.shape[0], MOST_CURVES):
        lines = envelopes(fluid, kinds[first : first + MOST_CURVES])
        lanes = np.flatnonzero((which >= first) & (which < first + MOST_CURVES))
        for some in np.array_split(lanes, -(-lanes.size // MOST_CURVES)):
            _look(out, some, fluid, lines, which[some] - first, name, value[some], feed[some], bubble)
    return out


def _look(out, lanes, fluid, lines: Envelopes, which, name, value, feed, bubble):
    """Crossings of a chunk of lanes, each with its curve."""
    column, other = (T_, P_) if name == "T" else (P_, T_)
    target = np.log(value)
    lane, stretch, share = _changes(lines, which, column, target)
    guess = _between(lines, which[lane], stretch, share)
    # the pressure side counts from above for a bubble, the temperature side from below; the dew point otherwise
    rank = guess[:, other] * (-1.0 if bubble == (name == "T") else 1.0)
    order = np.lexsort((rank, lane))
    lane, guess = lane[order], guess[order]
    turn = np.arange(lane.size) - np.searchsorted(lane, lane)
    failed = np.zeros(lanes.size, dtype=bool)
    for k in range(min(MOST_CROSSINGS, int(turn.max(initial=-1)) + 1)):
        row = np.flatnonzero((turn == k) & ~out.found[lanes[lane]])
        if row.size == 0:
            continue
        here = lane[row]
        curve = Curve(fluid, feed[here])
        X, good = _point(curve, guess[row], column, target[here])
        right = good & ((X[:, W_] > X[:, Z_]) == bubble)
        out.found[lanes[here[right]]] = True
        out.X[lanes[here[right]]] = X[right]
        failed[here[~good]] = True
    beyond = _beyond(lines, which, column, other, target)
    known = lines.closed[which] & ~failed
    if not bubble:  # the dew line goes on below its first point
        known &= target > lines.X[which, 0, column]
    out.absent[lanes] = np.where(beyond, int(Status.OUT_OF_RANGE), int(Status.NO_SOLUTION))
    out.absent[lanes[~known]] = Status.OUT_OF_STEPS


def _beyond(lines: Envelopes, which, column, other, target):
    """Mask (n,) of values past the end of the curve of their lane, where it would go on towards them."""
    end = lines.count[which] - 1
    last, before = lines.X[which, end], lines.X[which, np.maximum(end - 1, 0)]
    way = last - before
    moves = np.abs(way[:, column]) > STANDS * np.abs(way[:, other])
    return moves & ((target - last[:, column]) * way[:, column] > 0.0)


def _changes(lines: Envelopes, which, column, target):
    """Lanes (m,), stretches (m,) and places on them (m,) where the curve of a lane crosses its value."""
    X, leave, arrive = (a[..., column] for a in (lines.X, lines.leave, lines.arrive))
    t = np.linspace(0.0, 1.0, SAMPLES)
    curve = _hermite(X[:, :-1, None], X[:, 1:, None], leave[:, :-1, None], arrive[:, :-1, None], t)
    with np.errstate(invalid="ignore"):
        above = curve[which] > target[:, None, None]
        known = np.isfinite(curve[which])
    crossed = (above[..., 1:] != above[..., :-1]) & known[..., 1:] & known[..., :-1]
    lane, stretch, k = np.nonzero(crossed)
    low, high = (curve[which[lane], stretch, k + i] for i in (0, 1))
    return lane, stretch, t[k] + (target[lane] - low) / (high - low) * (t[1] - t[0])


def _between(lines: Envelopes, which, stretch, share):
    """X (m, c+4) at a share (m,) of the way along stretches."""
    row = which, stretch
    return _hermite(lines.X[row], lines.X[which, stretch + 1], lines.leave[row], lines.arrive[row], share[:, None])


def _hermite(a, b, leave, arrive, t):
    """Cubic through a and b with the given slopes there, at t between 0 and 1."""
    s = 1.0 - t
    return s * s * (1.0 + 2.0 * t) * a + t * t * (3.0 - 2.0 * t) * b + t * s * (s * leave - t * arrive)


def _point(curve, guess, column, target):
    """The point X (n, c+4) next to a guess with the value given, and the mask (n,) of those found.

    Newton with the value held; where that fails, next to critical points, with the largest of what tells the
    phases apart held, moved along the tangent until the value is met. Nearer still no matrix is exact enough: there
    the guess stands as it is, a cubic over a short stretch of a smooth curve. Its residual is judged as any other's.
    """
    start = guess.copy()
    start[:, column] = target
    point = curve.newton(start, np.full(target.size, column), MOST_PASSES)
    X, good = point.X, point.good & _same(guess, point.X, curve.present)
    left = np.flatnonzero(~good)
    if left.size == 0:
        return X, good
    held, at = curve.take(left), guess[left]
    size = np.abs(np.where(held.present, at[:, :-4], 0.0))
    spec = np.where(row_max(size) > 0.0, size.argmax(axis=1), at.shape[1] + W_)
    for _ in range(MOST_MOVES):
        point = held.newton(at, spec)
        miss = target[left] - point.X[:, column]
        met = point.good & (np.abs(miss) < MET)
        with np.errstate(all="ignore"):
            at = point.X + point.tangent * (miss / point.tangent[:, column])[:, None]
        at = np.where(np.isfinite(at), at, guess[left])
    met &= _same(guess[left], at, held.present)
    X[left], good[left] = np.where(met[:, None], at, guess[left]), True
    return X, good


def _same(guess, X, present):
    """Mask (n,) of points that are the crossing guessed: next to it, the phases as far apart."""
    before, after = apart(guess, present), apart(X, present)
    gap = row_max(np.abs(before))
    return (row_max(np.abs(X - guess)) < np.maximum(0.1, gap)) & (row_max(np.abs(after - before)) < 0.5 * gap + 1e-4)
