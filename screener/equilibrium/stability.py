"""Is a single phase stable? The tangent-plane test, many lanes and trials at once.

A phase z splits if some composition w has a negative tangent-plane distance

    tpd / RT = sum w [ln w + ln phi(w) - ln z - ln phi(z)].

Its stationary points satisfy ln W = ln z + ln phi(z) - ln phi(w), w = W / sum W,
and there tpd / RT = -ln sum W. They are sought from a vapour-like and a
liquid-like start (Wilson's K, and its cube root) and from every pure component; the trials of all
lanes run as one batch of lanes. The feed is held by its root of lower Gibbs
energy; a trial keeps to one root, which can miss a negative distance on the
other root but never invent one, and both roots are tried. Where its root
vanishes on the way, the trial starts again on the root of lower Gibbs energy.
"""

from __future__ import annotations

import numpy as np

from screener.equilibrium.fixed_point import solve
from screener.equilibrium.phase import Feed, critical_ratio, reduced_volume
from screener.equilibrium.results import TPD_ZERO, Stability, bad_status
from screener.equilibrium.rows import row_max, row_sum
from screener.ground.shapes import lanes as as_lanes
from screener.ground.status import Status

TRIVIAL = 1e-5  # largest |ln w - ln z| of a trial that came back to the feed; its tpd is then below 1e-10
PURE = 0.999  # share of the main component of a pure-component start; the rest is the feed
REACH = 0.3  # longest accelerated step of a trial in ln W: a longer one can leap over a shallow minimum
MOST_TRIAL = 80  # substitutions: next to a vanishing minimum they crawl, and Newton cannot help
MOST_ALONE, FEW_NEWTON = 120, 12  # substitutions and Newton steps of a trial from a given start
ENOUGH = 1e-6  # residual of a trial whose distance counts: it is of second order next to a stationary point
EARLY = 4  # substitutions after which the trials of a lane are compared
MET = 0.1  # [-] largest difference of ln W of trials on their way to one point; own choice, see the stress study
MOST_NUMBERS = 160_000  # trial lanes times components handled at once: keeps the working arrays in cache
MOST_ROWS = 20_000  # trial lanes handled at once: bounds memory
FEW = 1e-150  # a share below this would leave double precision in products


class Trials:
    """Trial phases of one kind: the fixed-point problem in ln W.

    kind is 'L', 'V', or 'lower' for the root of lower Gibbs energy.
    """

    def __init__(self, state, P, d, present, kind: str):
        self.state, self.P, self.d, self.present, self.kind = state, P, d, present, kind

    def take(self, lanes) -> Trials:
        """Some of the lanes."""
        return Trials(self.state.take(lanes), self.P[lanes], self.d[lanes], self.present[lanes], self.kind)

    def share(self, ln_W):
        """w (n, c) [-], and ln sum W (n,) [-]."""
        top = row_max(np.where(self.present, ln_W, -np.inf))
        W = np.where(self.present, np.exp(ln_W - top[:, None]), 0.0)
        total = row_sum(W)
        return W / total[:, None], top + np.log(total)

    def image(self, ln_W):
        """ln z + ln phi(z) - ln phi(w)."""
        w, _ = self.share(ln_W)
        mixture = self.state.mix(w)
        if self.kind != "lower":
            return self.d - mixture.ln_phi(self.P, self.kind)
        ln_L, ln_V = mixture.ln_phi(self.P, "L"), mixture.ln_phi(self.P, "V")
        return self.d - np.where((row_sum(w * (ln_L - ln_V)) <= 0.0)[:, None], ln_L, ln_V)

    def descent(self, ln_W, image):
        """Michelsen's modified distance 1 + sum W (ln W + ln phi - d - 1), and W."""
        W = np.where(self.present, np.exp(np.minimum(ln_W, 300.0)), 0.0)
        return 1.0 - np.einsum("nc,nc->n", W, image - ln_W + 1.0), W

    def liquid(self, w):
        """Mask (n,) of the lanes that are a liquid: on the smaller root, or by density where there is only one."""
        mixture = self.state.mix(w)
        (ln_L, Z_L), (ln_V, Z_V) = (mixture.ln_phi_and_Z(self.P, kind) for kind in "LV")
        with np.errstate(invalid="ignore"):
            one = ~(np.abs(Z_V - Z_L) > 1e-9 * Z_V)
            smaller = row_sum(w * (ln_L - ln_V)) <= 0.0 if self.kind == "lower" else self.kind == "L"
            return np.where(one, reduced_volume(mixture, self.P, Z_L) < critical_ratio(mixture), smaller)


def stability(fluid, T, P, z, *, pures=True) -> Stability:
    """Tangent-plane test of a mixture as one phase.

    Parameters
    ----------
    fluid : Fluid
        Species constants and model parameters of c components.
    T : float or array, shape (n,)
        Temperature. [K]
    P : float or array, shape (n,)
        Pressure. [Pa]
    z : array, shape (c,) or (n, c)
        Mole fractions; each row sums to 1. [-]
    pures : bool
        Also start from every pure component present, which finds second
        liquids; without them only the vapour-liquid pair of starts is tried.

    Returns
    -------
    Stability
        tpd (n,) [-] the smallest distance found, w (n, c) [-] where, kind 'L'
        or 'V', reference, status. A lane with a trial that did not converge
        is OUT_OF_STEPS unless another trial proves it unstable.

    Raises
    ------
    ShapeError
        z does not match the fluid, or rows do not broadcast with T and P.

    Source
    ------
    Michelsen, Fluid Phase Equilib. 9 (1982) 1; pure-component starts: Li and
    Firoozabadi, SPE J. 17 (2012) 1096.
    """
    z, T, P, good = as_lanes(fluid.c, z, T=T, P=P)
    n, c = z.shape
    status = bad_status(good)
    status[good & fluid.lacks(z)] = Status.NO_PARAMETERS
    found = Found(n, c)
    reference = np.full(n, "", dtype="<U1")
    work = np.flatnonzero(status == Status.OUT_OF_STEPS)
    for some in np.array_split(work, max(1, -(-work.size * (c + 4) // MOST_ROWS))):
        if some.size:
            state = fluid.at(T[some])
            feed = Feed(state, P[some], z[some])
            reference[some] = np.where(feed.liquid, "L", "V")
            part = tangent_plane(state, P[some], z[some], z[some], feed.ln_phi, fluid.wilson_K(T[some], P[some]), pures)
            found.put(some, part)
    settled = found.converged | (found.tpd < -TPD_ZERO)
    status[work] = np.where(settled[work], int(Status.CONVERGED), int(Status.OUT_OF_STEPS))
    return Stability(
        T=T, P=P, z=z, tpd=found.tpd, w=found.w, kind=found.kind, reference=reference,
        trials=4 + (c if pures else 0), status=status, iterations=found.iterations, residual=found.residual,
    )


class Found:
    """Smallest tangent-plane distance over the trials so far, lane by lane.

    ratio (n, c) [-] is W/z of that trial: the K-values (or their inverse) a
    split would start from.
    """

    def __init__(self, n: int, c: int):
        self.tpd = np.full(n, np.nan)
        self.w = np.full((n, c), np.nan)
        self.ln_W = np.full((n, c), np.nan)
        self.kind = np.full(n, "", dtype="<U1")
        self.iterations = np.zeros(n, dtype=int)
        self.residual = np.zeros(n)
        self.converged = np.ones(n, dtype=bool)

    def put(self, lanes, part: Found) -> None:
        """Fill some of the lanes from another."""
        for name, value in vars(part).items():
            getattr(self, name)[lanes] = value

    def take(self, lanes) -> Found:
        """Some of the lanes."""
        some = Found(0, self.w.shape[1])
        for name, value in vars(self).items():
            setattr(some, name, value[lanes])
        return some

    def join(self, lanes, tpd, w, ln_W, kind, fixed) -> None:
        """Take in one trial per lane."""
        self.iterations[lanes] += fixed.iterations
        self.residual[lanes] = np.maximum(self.residual[lanes], np.where(np.isfinite(tpd), fixed.residual, np.inf))
        self.converged[lanes] &= fixed.converged
        with np.errstate(invalid="ignore"):
            better = np.isfinite(tpd) & ~(self.tpd[lanes] <= tpd)
        here = lanes[better]
        self.tpd[here], self.w[here], self.ln_W[here] = tpd[better], w[better], ln_W[better]
        self.kind[here] = kind[better]


def tangent_plane(state, P, z, around, ln_phi, K, pures: bool) -> Found:
    """Smallest tangent-plane distance of a phase z.

    Parameters
    ----------
    state : AtTemperature
        The fluid at the temperatures of the lanes.
    P : array, shape (n,)
        Pressure. [Pa]
    z : array, shape (n, c)
        The phase tested. [-]
    around : array, shape (n, c)
        Composition the Wilson starts are made from: the feed. [-]
    ln_phi : array, shape (n, c)
        Of the phase tested. [-]
    K : array, shape (n, c)
        Wilson's K-values. [-]
    pures : bool
        Also start from every pure component.

    Returns
    -------
    Found
        The smallest distance, its composition and kind.

    Source
    ------
    As `stability`.
    """
    n, c = z.shape
    present = z > 0.0
    ln_z = np.log(np.where(present, np.maximum(z, FEW), 1.0))
    d = ln_z + ln_phi
    ln_a = np.log(np.where(present, np.maximum(around, FEW), 1.0))
    every = np.arange(n)
    found = Found(n, c)
    _try(found, every, Trials(state, P, d, present, "V"), ln_a + np.log(K), ln_z)
    lanes = np.concatenate([every, every])
    third = np.log(K) / 3.0
    starts = np.concatenate([ln_a - np.log(K), ln_a - third])
    _try(found, every, Trials(state, P, d, present, "V"), ln_a + third, ln_z)
    if pures:
        lane, i = np.nonzero(present)
        main = np.repeat(np.log(np.maximum((1.0 - PURE) * z, FEW)), present.sum(axis=1), axis=0)
        main[np.arange(lane.size), i] = np.log(PURE)
        lanes, starts = np.concatenate([lanes, lane]), np.concatenate([starts, main])
    _try(found, lanes, Trials(state, P, d, present, "L").take(lanes), starts, ln_z)
    return found


def trials_from(state, P, z, ln_phi, starts, kind: str) -> Found:
    """Smallest tangent-plane distance of a phase z over trials of one kind from given starts.

    Parameters
    ----------
    state : AtTemperature
        The fluid at the temperatures of the lanes.
    P : array, shape (n,)
        Pressure. [Pa]
    z : array, shape (n, c)
        The phase tested. [-]
    ln_phi : array, shape (n, c)
        Of the phase tested. [-]
    starts : array, shape (k, n, c)
        ln W of k starts; the whole lane NaN where a lane does without. [-]
    kind : str
        Root of the trials, "L" or "V".

    Returns
    -------
    Found
        As `tangent_plane`.

    Source
    ------
    As `stability`.
    """
    n, c = z.shape
    present = z > 0.0
    ln_z = np.log(np.where(present, np.maximum(z, FEW), 1.0))
    found = Found(n, c)
    which, lanes = np.nonzero(np.isfinite(starts).all(axis=2))
    trials = Trials(state, P, ln_z + ln_phi, present, kind).take(lanes)
    fixed = solve(trials, starts[which, lanes], trials.present, plain=MOST_ALONE, newton=FEW_NEWTON, reach=REACH)
    _join(found, lanes, trials, fixed._replace(converged=fixed.residual < ENOUGH), trials.liquid, ln_z)
    return found


def _try(found, lanes, trials, start, ln_z):
    """Run trials of one kind to their stationary points and take in what they found, some of them at a time."""
    order = np.argsort(lanes, kind="stable")  # the trials of a lane side by side
    for some in np.array_split(order, max(1, -(-start.size // MOST_NUMBERS))):
        if some.size:
            _try_some(found, lanes[some], trials.take(some), start[some], ln_z)


def _try_some(found, lanes, trials, start, ln_z):
    early = solve(trials, start, trials.present, plain=EARLY, newton=0, reach=REACH)
    apart = _distinct(lanes, np.where(trials.present, early.u, 0.0))
    lanes, trials, start = lanes[apart], trials.take(apart), start[apart]
    fixed = solve(trials, early.u[apart], trials.present, plain=MOST_TRIAL, reach=REACH)
    lost = np.flatnonzero(~fixed.converged)
    if lost.size:
        lower = trials.take(lost)
        lower.kind = "lower"
        again = solve(lower, start[lost], lower.present, plain=4 * MOST_TRIAL, reach=REACH)
        for old, new in zip(fixed, again):
            old[lost] = new
    fixed.iterations[:] += EARLY

    def liquid(w):
        mask = trials.liquid(w)
        if lost.size:
            mask[lost] = lower.liquid(w[lost])
        return mask

    _join(found, lanes, trials, fixed, liquid, ln_z)


def _distinct(lanes, u):
    """Trials (k,) that go on: of those of a lane that have come next to each other, the first."""
    begin = np.flatnonzero(np.concatenate([[True], lanes[1:] != lanes[:-1]]))
    nth = np.arange(lanes.size) - np.repeat(begin, np.diff(np.append(begin, lanes.size)))
    goes_on = np.ones(lanes.size, dtype=bool)
    for k in range(int(nth.max())):  # each trial in turn drops the later ones of its lane that are next to it
        for other in range(k + 1, int(nth.max()) + 1):
            row = np.flatnonzero(nth == other)
            first = row - (other - k)
            near = goes_on[first] & (row_max(np.abs(u[row] - u[first])) < MET)
            goes_on[row[near]] = False
    return np.flatnonzero(goes_on)


def _join(found, lanes, trials, fixed, liquid, ln_z):
    """Take in what trials found; liquid tells from w (n, c) which of them are on the smaller root."""
    w, ln_total = trials.share(fixed.u)
    liquid = liquid(w)
    away = row_max(np.where(trials.present, np.abs(fixed.u - ln_z[lanes]), 0.0))
    # A trial that came back to the feed, on the feed's own root, has distance zero whatever rounding says.
    tpd = np.where((away < TRIVIAL) & (np.abs(ln_total) < 100.0 * TPD_ZERO), 0.0, -ln_total)
    usable = fixed.converged | (fixed.residual < ENOUGH)
    tpd = np.where(usable, tpd, np.nan)
    order = np.argsort(lanes, kind="stable")
    position = np.arange(lanes.size) - np.searchsorted(lanes[order], lanes[order])  # nth trial of its lane
    for k in range(int(position.max(initial=-1)) + 1):
        row = order[position == k]
        part = type(fixed)(*(v[row] for v in fixed))
        found.join(lanes[row], tpd[row], w[row], fixed.u[row], np.where(liquid[row], "L", "V"), part)
