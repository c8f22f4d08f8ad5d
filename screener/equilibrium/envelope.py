"""Phase envelopes by continuation: from the dew line at low pressure over the critical point to the bubble line.

Each point of `curve` is solved with the variable held that changes fastest; the
tangent dX/dS of its matrix, and the one before, lead to the next. At the
critical point every ln K and g_w - g_z is zero, and the curve itself is smooth:
a step of twice the distance leads across. The curve belongs to the composition
alone, so that one serves all lanes of it.

Source: Michelsen, Fluid Phase Equilib. 4 (1980) 1.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.equilibrium.curve import P_, T_, W_, Z_, Curve
from screener.equilibrium.fixed_point import solve
from screener.equilibrium.incipient import HIGHEST_P, HIGHEST_T, lowest_T, start
from screener.equilibrium.rows import row_max
from screener.ground.constants import R

LAST_P = 0.5  # [Pa] where the bubble line ends
DENSE_FEED = 3.0  # g = ln(v/b - 1) of a feed that is no vapour at LAST_P: v/b below 21
MOST_POINTS = 300
FIRST, LEAST, LONGEST = 0.1, 1e-5, 0.6  # steps of the variable held, each a logarithm
LONGEST_T = 0.08  # step of ln T: along a dew line ln K runs ten times as fast
ALIKE = 0.5  # distance of the phases below which one of its parts is held
# Where the dew line begins [Pa], and the same distance from which the critical point is stepped over. A good vacuum
# comes first; where liquids split in the cold a line may loop there, and a warmer start is tried. A near step over
# the critical point is more exact, a wide one safer.
TRIES = ((1e3, 0.06), (1e5, 0.3), (1e6, 0.3))
CLOSEST = 1e-3  # where stepping over the critical point is given up


@dataclass(frozen=True)
class Envelopes:
    """n curves of up to m points: X (n, m, c+4), tangents over each stretch at its two ends (n, m, c+4),
    count (n,) points, closed (n,) followed to the end of the range."""

    X: np.ndarray
    leave: np.ndarray
    arrive: np.ndarray
    count: np.ndarray
    closed: np.ndarray


def envelopes(fluid, feed) -> Envelopes:
    """Phase envelopes of compositions.

    Parameters
    ----------
    fluid : Fluid
        The fluid; any cubic equation of state.
    feed : array, shape (n, c)
        Compositions. [-]

    Returns
    -------
    Envelopes
        The curves; count 0 where no dew point was found to begin from.

    Source
    ------
    Michelsen, Fluid Phase Equilib. 4 (1980) 1.
    """
    store = _follow(fluid, feed, *TRIES[0])
    for other in TRIES[1:]:
        broken = np.flatnonzero(~store.closed)
        if broken.size == 0:
            break
        again = _follow(fluid, feed[broken], *other)
        store.replace(broken[again.closed], again, again.closed)
    return store.envelopes()


def _follow(fluid, feed, first_P, across_from):
    """The points of the curves, as far as they can be followed."""
    n, c = feed.shape
    curve = Curve(fluid, feed)
    X, alive = _first_points(fluid, feed, first_P)
    first = curve.newton(X, np.full(n, P_))
    alive &= first.good
    X, tangent = first.X, first.tangent
    store = _Store(n, c + 4)
    store.put(np.flatnonzero(alive), X[alive])
    step, close = np.full(n, FIRST), np.full(n, across_from)
    for _ in range(2 * MOST_POINTS):
        some = np.flatnonzero(alive & (store.count < MOST_POINTS))
        if some.size == 0:
            break
        held = curve.take(some)
        at = X[some]
        spec, t, forward = _fastest(at, tangent[some], store.heading(some), held.present)
        dS, across = _length(at, t, forward * step[some], held.present, close[some])
        guess = at + t * dS[:, None] + _bend(at, t, spec, store.behind(some), dS)
        new = held.newton(guess, spec)
        good = new.good & _goes_on(at, new.X, guess, held.present, across)
        here = some[good]
        store.stretch(here, (t * dS[:, None])[good], (new.tangent * dS[:, None])[good])
        X[here], tangent[here] = new.X[good], new.tangent[good]
        store.put(here, X[here])
        faster = np.where(new.passes <= 3, 1.7, np.where(new.passes <= 5, 1.0, 0.5))
        longest = LONGEST * np.maximum(1.0, 0.1 * np.abs(at[np.arange(some.size), spec]))
        step[some] = np.minimum(np.abs(dS) * np.where(good, faster, 0.4), longest)
        step[some[good & across]] = FIRST
        close[some[~good & across]] *= 0.5
        outside, ended = _ends(X[here], lowest_T(fluid))
        store.closed[here] = ended
        alive[here] = ~outside
        alive[some[(step[some] < LEAST) | (close[some] < CLOSEST)]] = False
    return store


class _Store:
    """Points of n curves while they grow."""

    def __init__(self, n: int, width: int):
        self.X, self.leave, self.arrive = (np.full((n, MOST_POINTS, width), np.nan) for _ in range(3))
        self.count, self.closed = np.zeros(n, dtype=int), np.zeros(n, dtype=bool)

    def put(self, lanes, X):
        """The next point of some curves."""
        k = self.count[lanes]
        self.X[lanes, k] = X
        self.count[lanes] = k + 1

    def stretch(self, lanes, leave, arrive):
        """Tangents over the stretch from the last point of some curves to the one that is put next."""
        k = self.count[lanes] - 1
        self.leave[lanes, k], self.arrive[lanes, k] = leave, arrive

    def replace(self, lanes, other, mask):
        """Take some curves from another store."""
        for name, value in vars(self).items():
            value[lanes] = getattr(other, name)[mask]

    def heading(self, lanes):
        """The way the curves came (n, c+4); rising pressure at the first point."""
        k = self.count[lanes] - 1
        way = self.X[lanes, k] - self.X[lanes, np.maximum(k - 1, 0)]
        way[k == 0, P_] = 1.0
        return way

    def behind(self, lanes):
        """Point (n, c+4) before the last and its tangent; the last point itself at the beginning."""
        k = np.maximum(self.count[lanes] - 2, 0)
        return self.X[lanes, k], self.leave[lanes, k]

    def envelopes(self) -> Envelopes:
        """The curves, without the room not used."""
        most = max(1, int(self.count.max(initial=1)))
        return Envelopes(*(a[:, :most] for a in (self.X, self.leave, self.arrive)), self.count, self.closed)


def _first_points(fluid, feed, first_P):
    """X (n, c+4) on the dew lines at first_P [Pa], the mask (n,) of those found."""
    P = np.full(feed.shape[0], first_P)
    problem, u = start(fluid, "P", P, feed, False)
    fixed = solve(problem, u, problem.present, reach=1.0)
    T, w = problem.close(fixed.u)
    ln_K = np.where(problem.present, -(fixed.u - problem.h / T[:, None]), 0.0)
    state, g = fluid.at(T), []
    with np.errstate(all="ignore"):
        for x, kind in ((w, "L"), (feed, "V")):
            mixture = state.mix(x)
            g.append(np.log(mixture.Z(P, kind) * R * T / P / mixture.b - 1.0))
    return np.column_stack([ln_K, np.log(T), np.log(P), *g]), fixed.converged


def _fastest(X, tangent, heading, present):
    """Variable to hold (n,), the tangents (n, c+4) scaled to 1 for it, and the sign (n,) of going on.

    The one that changes fastest; among the ln K where the phases are alike, lest both become one.
    """
    size = np.abs(tangent)
    alike = row_max(np.abs(apart(X, present))) < ALIKE
    alike &= row_max(np.where(present, size[:, :-4], 0.0)) > 0.02 * row_max(size)
    size[:, -4:] = np.where(alike[:, None], 0.0, size[:, -4:])
    spec = size.argmax(axis=1)
    t = tangent / np.take_along_axis(tangent, spec[:, None], axis=1)
    return spec, t, np.where(np.einsum("nc,nc->n", t, heading) < 0.0, -1.0, 1.0)


def _bend(X, t, spec, behind, dS):
    """Second-order part of a step, from the tangent at the point before; zero where that says little."""
    X_0, t_0 = behind
    lane = np.arange(X.shape[0])
    with np.errstate(all="ignore"):
        curvature = (t - t_0 / t_0[lane, spec][:, None]) / (X[lane, spec] - X_0[lane, spec])[:, None]
        bend = 0.5 * curvature * (dS * dS)[:, None]
        small = row_max(np.abs(bend)) < row_max(np.abs(t * dS[:, None]))
    return np.where(small[:, None], bend, 0.0)


def apart(X, present):
    """What tells the two phases apart (n, c+1): ln K and g_w - g_z."""
    return np.column_stack([np.where(present, X[:, :-4], 0.0), X[:, W_] - X[:, Z_]])


def _length(X, t, dS, present, close):
    """Step of the variable held, and the lanes (n,) that step over the critical point.

    The distance of the phases is at most halved in a step; where it is small the step goes to its mirror image.
    """
    dS = np.sign(dS) * np.minimum(np.abs(dS), LONGEST_T / np.maximum(np.abs(t[:, T_]), 1e-300))
    lane = np.arange(X.shape[0])
    gap, change = apart(X, present), apart(t, present)
    i = np.abs(gap).argmax(axis=1)
    gap, change = gap[lane, i], change[lane, i]
    with np.errstate(all="ignore"):
        to_zero = -gap / change
    half = (to_zero * dS > 0.0) & (np.abs(dS) > 0.5 * np.abs(to_zero))
    across = half & (np.abs(gap) <= close)
    return np.where(across, 2.0 * to_zero, np.where(half, 0.5 * to_zero, dS)), across


def _goes_on(X, new, guess, present, across):
    """Mask (n,) of the points that continue the curve: next to the guess, the phases apart as the step meant."""
    with np.errstate(invalid="ignore"):
        way, miss = row_max(np.abs(guess - X)), row_max(np.abs(new - guess))
        before, after = apart(X, present), apart(new, present)
        turned = np.einsum("nc,nc->n", before, after) < 0.0
        share = row_max(np.abs(after)) / row_max(np.abs(before))
    near = miss < np.maximum(0.5 * way, 0.02)
    return near & np.where(across, turned & (share < 3.0) & (share > 0.3), share > 0.1)


def _ends(X, coldest):
    """Masks (n,) of points past the end of the range, and of those where the curve has come to its own end.

    At low pressure that is the bubble line, or a liquid beside another; a dew line that came back has looped.
    """
    T, P = np.exp(X[:, T_]), np.exp(X[:, P_])
    far = (P > HIGHEST_P) | (T < coldest) | (T > HIGHEST_T)
    liquid = (X[:, W_] > X[:, Z_]) | (X[:, Z_] < DENSE_FEED)
    return far | (P < LAST_P), far | (P < LAST_P) & liquid
