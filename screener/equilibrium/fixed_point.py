"""Fixed points of many lanes at once: u = image(u), u a vector like ln K.

A flash, a tangent-plane trial and a saturation point are all successive
substitution in logarithms, u -> image(u); they differ only in how x, y, P or T
follow from u. The loop here is theirs in common and knows no chemistry:

- acceleration by the last two differences (Anderson 1965; for one remembered
  difference it is the dominant-eigenvalue jump of Crowe and Nishio 1975);
- a jump that made things worse is undone and replaced by plain substitution;
- lanes that are done stop moving, and are dropped from the work once enough of
  them are done;
- the stubborn rest is finished by Newton with a Jacobian by differences.

A problem offers `image(u)` for the lanes it holds and `take(lanes)` for some
of them. Where substitution is a descent on some function it may offer
`descent(u, image)`: the function (n,) and the positive weights (n, c) w with
which its gradient is -w (image - u). A jump is then judged by that function,
not by the residual, and never leads uphill, towards a saddle.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from screener.equilibrium.rows import row_max

TOLERANCE = 1e-10  # on max |image(u) - u|: ten times below the residual promised
MOST_PLAIN = 30  # accelerated substitutions before Newton takes over
MOST_NEWTON = 15
LONGEST = 4.0  # longest change of any ln K in one step
TRUSTED = 20.0  # longest accelerated step in plain steps: an eigenvalue of 0.95 (a guard in common use, no source)
FASTER = 4.0  # plain steps taken at once away from a saddle, doubled while that goes well; own choice
FASTEST = 128.0
KEEP = 0.6  # drop finished lanes once fewer than this share is active


class Fixed(NamedTuple):
    """u (n, c), residual (n,), iterations (n,) and the mask converged (n,)."""

    u: np.ndarray
    residual: np.ndarray
    iterations: np.ndarray
    converged: np.ndarray


def solve(
    problem, u, present, tolerance=TOLERANCE, plain=MOST_PLAIN, newton=MOST_NEWTON, reach=LONGEST
) -> Fixed:
    """Fixed points of `problem.image` from the start u.

    Parameters
    ----------
    problem : object
        The lanes, as described in the module.
    u : array, shape (n, c)
        Start. [-]
    present : array of bool, shape (n, c)
        Species that count; the others keep their u.
    tolerance : float
        Largest |image(u) - u| taken as zero. [-]
    plain : int
        Most accelerated substitutions.
    newton : int
        Most Newton steps after them.
    reach : float
        Longest accelerated change of any u; a longer one is replaced by plain
        substitution. [-]

    Returns
    -------
    Fixed
        u is the point at which `residual` was computed, not one step further.

    Source
    ------
    Anderson, J. ACM 12 (1965) 547; Crowe and Nishio, AIChE J. 21 (1975) 528.
    """
    n = u.shape[0]
    out = Fixed(np.array(u, dtype=float), np.full(n, np.inf), np.zeros(n, dtype=int), np.zeros(n, dtype=bool))
    lanes = np.arange(n)
    walk = _Walk(problem, out.u.copy(), present, reach)
    for _ in range(plain):
        finished = walk.look(tolerance)
        moving = walk.moving
        here = lanes[moving]
        out.u[here], out.residual[here] = walk.u[moving], walk.r[moving]
        out.iterations[here] += 1
        out.converged[lanes[finished]] = True
        walk.moving = moving = moving & ~finished
        if not moving.any():
            return out
        if moving.mean() < KEEP:
            lanes = lanes[moving]
            walk = walk.take(np.flatnonzero(moving))
        walk.step()
    if newton:
        lanes = lanes[walk.moving]
        walk = walk.take(np.flatnonzero(walk.moving))
        _finish(walk, lanes, out, tolerance, newton)
    return out


class _Walk:
    """Lanes on their way: where they are, the last two steps, the best point so far."""

    def __init__(self, problem, u, present, reach):
        self.problem, self.u, self.present, self.reach = problem, u, present, reach
        n = u.shape[0]
        self.g = np.zeros_like(u)
        self.r = np.full(n, np.inf)
        self.moving = np.ones(n, dtype=bool)
        self.best_u, self.best_g, self.best_r = u.copy(), np.zeros_like(u), np.full(n, np.inf)
        self.past: list[tuple[np.ndarray, np.ndarray]] = []  # (difference of u, difference of g), newest first
        self.last: tuple | None = None  # u, g, r and value at the step before
        self.jumped = np.zeros(n, dtype=bool)  # the last move was an accelerated one
        self.damping = np.ones(n)
        self.downhill = hasattr(problem, "descent")
        self.value, self.weight = np.zeros(n), present.astype(float)
        self.boost = np.full(n, FASTER)

    def take(self, lanes) -> _Walk:
        """Some of the lanes."""
        some = _Walk(self.problem.take(lanes), self.u[lanes], self.present[lanes], self.reach)
        for name in ("g", "r", "moving", "best_u", "best_g", "best_r", "jumped", "damping", "value", "weight", "boost"):
            setattr(some, name, getattr(self, name)[lanes])
        some.past = [(du[lanes], dg[lanes]) for du, dg in self.past]
        some.last = None if self.last is None else tuple(v[lanes] for v in self.last)
        return some

    def look(self, tolerance):
        """Evaluate the image; mask of lanes that are done."""
        image = self.problem.image(self.u)
        with np.errstate(invalid="ignore"):
            self.g = np.where(self.present, image - self.u, 0.0)
            self.r = row_max(np.abs(self.g))
            if self.downhill:
                self.value, self.weight = self.problem.descent(self.u, image)
        return self.moving & (self.r <= tolerance)

    def step(self):
        """Move every moving lane by an accelerated step; undo a jump that made things worse."""
        self._remember()
        u, g, r = self.u, self.g, self.r
        lost = ~np.isfinite(r)
        undo = lost.copy()
        if self.last is not None:
            worse = r > 1.5 * self.last[2]
            if self.downhill:
                worse = (self.value > self.last[3] + 1e-12 * (1.0 + np.abs(self.last[3]))) & (r > 0.5 * self.last[2])
            undo |= self.jumped & worse
            self.past = [(u - self.last[0], g - self.last[1])] + self.past[:1]
        self.damping = np.where(lost, 0.5 * self.damping, 1.0)
        self.boost = np.where(undo, FASTER, np.minimum(2.0 * self.boost, FASTEST))
        if undo.any():
            # back to the point before the jump (the best one where numbers were lost), and on by plain substitution
            before = self.last if self.last is not None else (self.best_u, self.best_g, self.best_r, self.value)
            row, hole = undo[:, None], lost[:, None]
            u = np.where(hole, self.best_u, np.where(row, before[0], u))
            g = np.where(hole, self.best_g, np.where(row, before[1], g))
            r = np.where(lost, self.best_r, np.where(undo, before[2], r))
            self.value = np.where(undo & ~lost, before[3], self.value)
            self.past = [(np.where(row, 0.0, du), np.where(row, 0.0, dg)) for du, dg in self.past]
        with np.errstate(all="ignore"):
            move = self._accelerated(g) * self.damping[:, None]
            longest = row_max(np.abs(move))
            move *= np.minimum(1.0, LONGEST / np.maximum(longest, LONGEST))[:, None]
            self.jumped = (move != g).any(axis=1)
        self.last = (u, g, r, self.value)
        usable = self.moving & np.isfinite(longest)
        self.u = np.where(usable[:, None], u + move, self.u)

    def _remember(self):
        """Keep the best point of each lane."""
        better = self.r < self.best_r
        self.best_u = np.where(better[:, None], self.u, self.best_u)
        self.best_g = np.where(better[:, None], self.g, self.best_g)
        self.best_r = np.where(better, self.r, self.best_r)

    def _accelerated(self, g):
        """g less the part of it that the last differences explain."""
        if not self.past:
            return g.copy()
        du1, dg1 = self.past[0]
        a11, b1 = _dot(dg1, dg1), _dot(dg1, g)
        if len(self.past) == 1:
            s1, s2 = b1 / a11, np.zeros_like(b1)
        else:
            du2, dg2 = self.past[1]
            a22, a12, b2 = _dot(dg2, dg2), _dot(dg1, dg2), _dot(dg2, g)
            det = a11 * a22 - a12 * a12
            both = det > 1e-10 * a11 * a22
            safe = np.where(both, det, 1.0)
            s1 = np.where(both, (a22 * b1 - a12 * b2) / safe, b1 / a11)
            s2 = np.where(both, (a11 * b2 - a12 * b1) / safe, 0.0)
        s1 = np.where(np.isfinite(s1), s1, 0.0)
        move = g - s1[:, None] * (du1 + dg1)
        if len(self.past) == 2:
            move -= np.where(np.isfinite(s2), s2, 0.0)[:, None] * (du2 + dg2)
        plain = row_max(np.abs(g))
        trusted = np.minimum(TRUSTED * plain, self.reach)
        size = row_max(np.abs(move))
        if not self.downhill:
            move = np.where((size > trusted)[:, None], move * (trusted / size)[:, None], move)
            return np.where(((plain > trusted) | ~np.isfinite(size))[:, None], g, move)
        uphill = ~(np.einsum("nc,nc,nc->n", self.weight, g, move) > 0.0)
        # against g lies a saddle: leave it faster along g (undone if that overshoots)
        faster = np.where(uphill & (a11 > 0.0), self.boost, 1.0)
        move = np.where(uphill[:, None], faster[:, None] * g, move)
        size = row_max(np.abs(move))
        trusted = np.where(uphill, self.reach, trusted)
        move = np.where((size > trusted)[:, None], move * (trusted / size)[:, None], move)
        return np.where((plain > trusted)[:, None], g, move)


def _dot(a, b):
    return np.einsum("nc,nc->n", a, b)


def _finish(walk, lanes, out, tolerance, most):
    """Newton on image(u) - u = 0 for the lanes left, from the best point of each."""
    problem, present = walk.problem, walk.present
    u, g, r = walk.best_u, walk.best_g, walk.best_r
    for _ in range(most):
        alive = np.isfinite(r)
        if not alive.all():
            problem, present, lanes = problem.take(np.flatnonzero(alive)), present[alive], lanes[alive]
            u, g, r = u[alive], g[alive], r[alive]
        if lanes.size == 0:
            return
        step = _newton_step(problem, u, g, present)
        u, g, r = _search(problem, u, g, r, step, present)
        out.iterations[lanes] += 1
        out.u[lanes], out.residual[lanes] = u, r
        done = r <= tolerance
        out.converged[lanes[done]] = True
        if done.any():
            left = np.flatnonzero(~done)
            problem, present, lanes, u, g, r = problem.take(left), present[left], lanes[left], u[left], g[left], r[left]


def _newton_step(problem, u, g, present):
    """Solve J step = -g, J by forward differences, all lanes and directions as one batch."""
    n, c = u.shape
    h = 1e-6  # error of the difference 1e-6 of the second derivative, 1e-10 by rounding
    J = np.empty((n, c, c))
    chunk = max(1, 4096 // c)
    for first in range(0, n, chunk):
        some = np.arange(first, min(first + chunk, n))
        rows = np.repeat(some, c)
        shift = np.tile(np.eye(c) * h, (some.size, 1))
        moved = u[rows] + shift
        with np.errstate(all="ignore"):
            difference = np.where(present[rows], problem.take(rows).image(moved) - moved, 0.0) - g[rows]
        J[some] = np.swapaxes(difference.reshape(some.size, c, c), 1, 2) / h
    absent = ~present
    J[absent] = 0.0
    lane, i = np.nonzero(absent)
    J[lane, :, i] = 0.0
    J[lane, i, i] = 1.0
    broken = ~np.isfinite(J).all(axis=(1, 2))
    J[broken] = -np.eye(c)  # where no derivative exists: a plain substitution
    try:
        step = np.linalg.solve(J, -g[:, :, None])[:, :, 0]
    except np.linalg.LinAlgError:
        step = np.einsum("nij,nj->ni", np.linalg.pinv(J), -g)
    return np.where(np.isfinite(step).all(axis=1)[:, None], step, g)


def _search(problem, u, g, r, step, present):
    """Shorten the step until the residual falls; a plain substitution where it never does."""
    norm = np.sqrt(_dot(g, g))
    longest = row_max(np.abs(step))
    step = step * np.minimum(1.0, LONGEST / np.maximum(longest, LONGEST))[:, None]
    new_u, new_g, new_r = u + g, g, r
    open_ = np.ones(u.shape[0], dtype=bool)
    for share in (1.0, 0.5, 0.2, 0.05, None):
        trial = u + g if share is None else u + share * step
        with np.errstate(all="ignore"):
            image = problem.image(trial)
            trial_g = np.where(present, image - trial, 0.0)
            good = open_ & (np.sqrt(_dot(trial_g, trial_g)) < norm)
        if share is None:
            good = open_
        new_u = np.where(good[:, None], trial, new_u)
        new_g = np.where(good[:, None], trial_g, new_g)
        new_r = np.where(good, row_max(np.abs(trial_g)), new_r)
        open_ &= ~good
        if not open_.any():
            break
    return new_u, new_g, new_r
