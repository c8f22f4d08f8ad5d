"""Flash at given temperature and pressure, many lanes at once.

One iteration serves both questions. With K known the vapour fraction is the
Rachford-Rice root held inside 0..1. Between the ends a step is successive
substitution for two phases; held at 0 (or 1) the feed is the liquid (vapour)
and the step is the tangent-plane trial for the other phase. A lane that comes
to rest at an end is therefore one phase by the tangent plane of its vapour-
liquid pair; a lane whose trial fell back on the feed is given to the full
vapour-liquid stability test before anything is said about it.
"""

from __future__ import annotations

import numpy as np

from screener.equilibrium.fixed_point import solve
from screener.equilibrium.phase import DENSE, Feed, reduced_volume
from screener.equilibrium.rachford_rice import split
from screener.equilibrium.results import TPD_ZERO, Flash, bad_status
from screener.equilibrium.rows import row_max, row_sum
from screener.equilibrium.second_liquid import NOT_TESTED, TWO_LIQUIDS, full_check, known_check
from screener.equilibrium.stability import FEW, tangent_plane
from screener.ground.shapes import lanes as as_lanes
from screener.ground.status import Status

TRIVIAL = 1e-4  # largest |ln K| of two phases that are one; critical splits shown apart start near 1e-2
LARGEST = 300.0  # bound of |ln K|: keeps squares of exp in double precision
REACH = 1.0  # longest accelerated step in ln K
MOST_AGAIN = 100  # substitutions of a lane that lost its way
MOST_NUMBERS = 40_000  # lanes times components handled at once: keeps the working arrays in cache


class Split:
    """Two phases of a feed: the fixed-point problem in ln K. kinds are the roots of x and y."""

    def __init__(self, state, P, z, beta=None, kinds="LV"):
        self.state, self.P, self.z, self.kinds = state, P, z, kinds
        self.beta = np.full(z.shape[0], 0.5) if beta is None else beta

    def take(self, lanes) -> Split:
        """Some of the lanes."""
        return Split(self.state.take(lanes), self.P[lanes], self.z[lanes], self.beta[lanes], self.kinds)

    def phases(self, ln_K, rough=False):
        """beta (n,), x and y (n, c) at these K-values, beta held inside 0..1."""
        z = self.z
        ln_K = np.where(z > 0.0, np.clip(ln_K, -LARGEST, LARGEST), 0.0)
        K = np.exp(ln_K)
        up, down = z * K, z / K
        all_up, all_down = row_sum(up), row_sum(down)
        liquid = ~(all_up > 1.0)  # no vapour forms: F(0) <= 0
        vapour = ~liquid & ~(all_down > 1.0)  # no liquid forms: F(1) >= 0
        one = liquid | vapour
        if not one.any():
            beta, _, x, y, _, _, _ = split(z, K, np.expm1(ln_K), self.beta, rough)
            return beta, x, y
        beta = np.where(liquid, 0.0, 1.0)
        x = np.where(liquid[:, None], z, down / all_down[:, None])
        y = np.where(liquid[:, None], up / all_up[:, None], z)
        two = np.flatnonzero(~one)
        if two.size:
            found = split(z[two], K[two], np.expm1(ln_K[two]), self.beta[two], rough)
            beta[two], x[two], y[two] = found[0], found[2], found[3]
        return beta, x, y

    def image(self, ln_K):
        """ln phi(x) - ln phi(y)."""
        self.beta, x, y = self.phases(ln_K, rough=True)
        return self.state.mix(x).ln_phi(self.P, self.kinds[0]) - self.state.mix(y).ln_phi(self.P, self.kinds[1])


class DescendingSplit(Split):
    """The same, watched over by the Gibbs energy: slower, for lanes that lost their way."""

    energy: np.ndarray
    weight: np.ndarray

    def take(self, lanes) -> DescendingSplit:
        """Some of the lanes."""
        return DescendingSplit(self.state.take(lanes), self.P[lanes], self.z[lanes], self.beta[lanes], self.kinds)

    def image(self, ln_K):
        """ln phi(x) - ln phi(y); keeps the Gibbs energy over RT on the way."""
        self.beta, x, y = self.phases(ln_K, rough=True)
        ln_phi_x = self.state.mix(x).ln_phi(self.P, self.kinds[0])
        ln_phi_y = self.state.mix(y).ln_phi(self.P, self.kinds[1])
        self.energy = (1.0 - self.beta) * _energy(x, ln_phi_x) + self.beta * _energy(y, ln_phi_y)
        self.weight = x * y / np.where(self.z > 0.0, self.z, 1.0)
        return ln_phi_x - ln_phi_y

    def descent(self, ln_K, image):
        """Gibbs energy and, up to a factor and smaller terms, the weights of its gradient in ln K."""
        return self.energy, self.weight


def _energy(x, ln_phi):
    return np.einsum("nc,nc->n", x, np.log(np.maximum(x, FEW)) + ln_phi)


def flash_tp(fluid, T, P, z, *, check="vapour-liquid") -> Flash:
    """Vapour fraction and phase compositions at given temperature and pressure.

    Parameters
    ----------
    fluid : Fluid
        Species constants and model parameters of c components.
    T : float or array, shape (n,)
        Temperature. [K]
    P : float or array, shape (n,)
        Pressure. [Pa]
    z : array, shape (c,) or (n, c)
        Feed mole fractions; each row sums to 1. [-]
    check : str
        "vapour-liquid", or "full": also the tangent plane of the answer from
        every pure component, which finds second liquids.

    Returns
    -------
    Flash
        beta, x, y, K, phases, status and the proofs: residual, balance, tpd,
        checks. LIQUID_SPLITS where the phases found are two liquids (x and
        x_W), or where the full check finds a second liquid.

    Raises
    ------
    ShapeError
        z does not match the fluid, or rows do not broadcast with T and P.
    InputError
        check is no known word.

    Source
    ------
    Michelsen, Fluid Phase Equilib. 9 (1982) 1 and 21 (method).
    """
    full = known_check(check)
    z, T, P, good = as_lanes(fluid.c, z, T=T, P=P)
    n, c = z.shape
    status = bad_status(good)
    status[good & fluid.lacks(z)] = Status.NO_PARAMETERS
    answer = _Answer(n, c, status)
    work = np.flatnonzero(status == Status.OUT_OF_STEPS)
    for some in np.array_split(work, max(1, -(-work.size * c // MOST_NUMBERS))):
        if some.size:
            _flash(answer, some, fluid, T[some], P[some], z[some], full)
    return Flash(T=T, P=P, z=z, **vars(answer))


class _Answer:
    """The arrays of a Flash while they are filled."""

    def __init__(self, n: int, c: int, status):
        for name in ("beta", "beta_W", "residual", "balance", "tpd"):
            setattr(self, name, np.full(n, np.nan))
        for name in ("x", "y", "x_W", "K"):
            setattr(self, name, np.full((n, c), np.nan))
        self.status = status
        self.phases, self.iterations = np.zeros(n, dtype=int), np.zeros(n, dtype=int)
        self.checks = np.full(n, NOT_TESTED, dtype=object)

    def one_phase(self, lanes, z, liquid, K, tpd):
        """Lanes that are one phase, liquid or vapour."""
        self.status[lanes], self.phases[lanes] = Status.CONVERGED, 1
        self.beta[lanes] = np.where(liquid, 0.0, 1.0)
        self.x[lanes] = np.where(liquid[:, None], z, np.nan)
        self.y[lanes] = np.where(liquid[:, None], np.nan, z)
        self.K[lanes], self.tpd[lanes] = K, tpd
        self.residual[lanes] = self.balance[lanes] = 0.0

    def two_phases(self, lanes, z, beta, x, y, ln_K, residual, both_liquid):
        """Lanes that are two phases, the second a vapour or a liquid."""
        self.status[lanes] = np.where(both_liquid, int(Status.LIQUID_SPLITS), int(Status.CONVERGED))
        self.checks[lanes] = np.where(both_liquid, TWO_LIQUIDS, NOT_TESTED)
        self.phases[lanes], self.x[lanes], self.residual[lanes] = 2, x, residual
        self.beta[lanes] = np.where(both_liquid, 0.0, beta)
        self.beta_W[lanes] = np.where(both_liquid, beta, np.nan)
        self.y[lanes] = np.where(both_liquid[:, None], np.nan, y)
        self.x_W[lanes] = np.where(both_liquid[:, None], y, np.nan)
        self.K[lanes] = np.where((z > 0.0) & ~both_liquid[:, None], np.exp(ln_K), np.nan)
        self.balance[lanes] = row_max(np.abs(z - (1.0 - beta)[:, None] * x - beta[:, None] * y))


def _flash(answer, lanes, fluid, T, P, z, full: bool):
    """One chunk of valid lanes."""
    state, present = fluid.at(T), z > 0.0
    feed = Feed(state, P, z)
    wilson = fluid.wilson_K(T, P)
    start = np.where(feed.two[:, None], feed.ln_K, np.log(wilson))
    problem = Split(state, P, z)
    fixed = solve(problem, np.where(present, start, 0.0), present, reach=REACH)
    answer.iterations[lanes] = fixed.iterations
    beta, x, y = problem.phases(fixed.u)
    apart = fixed.converged & (row_max(np.abs(np.where(present, fixed.u, 0.0))) > TRIVIAL)
    inside = (beta > 0.0) & (beta < 1.0)
    two = apart & inside
    one = apart & ~inside & feed.sure & ((beta == 0.0) == feed.liquid)
    _put_two(answer, lanes, np.flatnonzero(two), problem, beta, x, y, fixed)
    some = np.flatnonzero(one)
    K = np.where(present, np.exp(fixed.u), np.nan)
    tpd = -np.log(np.where(beta[:, None] == 0.0, z * K, z / K).sum(axis=1, where=present))
    answer.one_phase(lanes[some], z[some], beta[some] == 0.0, K[some], tpd[some])
    open_ = np.flatnonzero(~two & ~one)
    if open_.size:
        _judge(answer, lanes, open_, problem, feed, wilson)
    if full:
        _check(answer, lanes, fluid, state, P, z, wilson)


def _put_two(answer, lanes, some, problem, beta, x, y, fixed):
    """Two phases that converged; the lighter one is the vapour, unless both are dense."""
    if some.size == 0:
        return
    held = problem.take(some)
    first, second = held.state.mix(x[some]), held.state.mix(y[some])
    ratio_x = reduced_volume(first, held.P, first.Z(held.P, held.kinds[0]))
    ratio_y = reduced_volume(second, held.P, second.Z(held.P, held.kinds[1]))
    both = (ratio_x < DENSE) & (ratio_y < DENSE)
    swap = (ratio_x * first.b > ratio_y * second.b) & ~both
    row = swap[:, None]
    answer.two_phases(
        lanes[some], held.z, np.where(swap, 1.0 - beta[some], beta[some]), np.where(row, y[some], x[some]),
        np.where(row, x[some], y[some]), np.where(row, -fixed.u[some], fixed.u[some]), fixed.residual[some], both,
    )


def _judge(answer, lanes, open_, problem, feed, wilson):
    """Lanes whose two phases became one or did not settle: the full vapour-liquid stability test decides."""
    held = problem.take(open_)
    liquid, ln_phi = feed.liquid[open_], feed.ln_phi[open_]
    found = tangent_plane(held.state, held.P, held.z, held.z, ln_phi, wilson[open_], pures=False)
    answer.iterations[lanes[open_]] += found.iterations
    ln_z = np.log(np.maximum(held.z, FEW))
    ln_ratio = found.ln_W - ln_z
    light = found.kind == "V"
    unstable = found.tpd < -TPD_ZERO
    stable = found.converged & ~unstable
    some = np.flatnonzero(stable)
    K = np.where((held.z > 0.0) & (found.tpd > 0.0)[:, None], np.exp(np.where(light[:, None], 1, -1) * ln_ratio), np.nan)
    answer.one_phase(lanes[open_[some]], held.z[some], liquid[some], K[some], found.tpd[some])
    for kinds, mask in (("LV", unstable & ~(liquid & ~light)), ("LL", unstable & liquid & ~light)):
        some = np.flatnonzero(mask)
        if some.size:
            start = np.where(light[some, None] | (kinds == "LL"), 1.0, -1.0) * ln_ratio[some]
            _again(answer, lanes[open_[some]], held.take(some), kinds, start)


def _again(answer, lanes, problem, kinds, start):
    """Split unstable feeds from the trial phase that proved them unstable."""
    problem = DescendingSplit(problem.state, problem.P, problem.z, None, kinds)
    present = problem.z > 0.0
    fixed = solve(problem, np.where(present, start, 0.0), present, plain=MOST_AGAIN, reach=REACH)
    answer.iterations[lanes] += fixed.iterations
    beta, x, y = problem.phases(fixed.u)
    apart = row_max(np.abs(np.where(present, fixed.u, 0.0))) > TRIVIAL
    answer.status[lanes[fixed.converged & ~apart]] = Status.TRIVIAL
    answer.residual[lanes] = fixed.residual
    _put_two(answer, lanes, np.flatnonzero(fixed.converged & apart & (beta > 0.0) & (beta < 1.0)), problem, beta, x, y, fixed)


def _check(answer, lanes, fluid, state, P, z, wilson):
    """The tangent plane of every answer of the chunk."""
    some = np.flatnonzero(answer.status[lanes] == Status.CONVERGED)
    if some.size == 0:
        return
    here, held, P = lanes[some], state.take(some), P[some]
    from_x = answer.beta[here] < 1.0
    phase = np.where(from_x[:, None], answer.x[here], answer.y[here])
    mixture = held.mix(phase)
    single = answer.phases[here] == 1
    ln_phi = np.where(from_x[:, None], mixture.ln_phi(P, "L"), mixture.ln_phi(P, "V"))
    if single.any():
        ln_phi[single] = Feed(held, P, phase).ln_phi[single]
    found, splits, text = full_check(fluid, held, P, z[some], phase, ln_phi, wilson[some])
    answer.tpd[here], answer.checks[here] = found.tpd, text
    answer.status[here[splits]] = Status.LIQUID_SPLITS
    answer.status[here[~np.isfinite(found.tpd)]] = Status.OUT_OF_STEPS
    apart = np.flatnonzero(splits & single & from_x & (found.kind == "L"))
    if apart.size:  # one liquid that is two: show them
        problem = Split(held.take(apart), P[apart], z[some][apart])
        ln_K = (found.ln_W - np.log(np.maximum(phase, FEW)))[apart]
        _again(answer, here[apart], problem, "LL", ln_K)
