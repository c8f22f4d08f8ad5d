"""A vapour over two liquids, and how a flash is looked at again until nothing lowers its energy.

The shares of three phases with known fugacity coefficients are the minimum of a
convex function (Michelsen, Comput. Chem. Eng. 18 (1994) 545), with e_ij = 1/phi_ij
up to a factor of the species:

    Q(beta) = sum_j beta_j - sum_i z_i ln E_i,   E_i = sum_j beta_j e_ij,   beta_j >= 0
    dQ/dbeta_j = 1 - sum_i z_i e_ij / E_i,       x_ij = z_i e_ij / E_i

At the minimum the shares sum to one, and a phase that does not pay stays at
zero. The step of the fixed-point problem is ln phi(x) - ln phi of the other two.

`look_again` runs the tangent plane of each answer and adds the phase it finds:
one liquid becomes two, or liquid and vapour; liquid and vapour, or two liquids,
become three phases, or the pair that is left when a phase vanishes.
"""

from __future__ import annotations

import numpy as np

from screener.equilibrium.fixed_point import solve
from screener.equilibrium.phase import DENSE, Feed, reduced_volume
from screener.equilibrium.rows import row_max
from screener.equilibrium.second_liquid import THREE_PHASES, TWO_LIQUIDS, full_check
from screener.equilibrium.stability import FEW
from screener.equilibrium.two_phase import LARGEST, REACH, TRIVIAL, Split, again, density, put_two
from screener.ground.status import Status

ROUNDS = 4  # looks at one lane: a single phase can become two, then three, then be confirmed
MOST_SHARES = 60  # Newton steps for the shares
SHARE_ZERO = 1e-14  # [-] a share, or a slope of Q, this close to zero is zero: rounding of sums over species
MOST_TRIPLE = 400  # substitutions before Newton takes over: next to a tricritical point they crawl
L, V, W = 0, 1, 2  # columns of three phases: liquid, vapour, second liquid


def shares_of_phases(z, ln_e, beta):
    """Shares and compositions of phases with known fugacity coefficients.

    Parameters
    ----------
    z : array, shape (n, c)
        Feed. [-]
    ln_e : array, shape (n, k, c)
        -ln phi of each phase, up to a number per species. [-]
    beta : array, shape (n, k)
        Start. [-]

    Returns
    -------
    tuple
        beta (n, k) and compositions (n, k, c), each scaled to sum 1.

    Source
    ------
    Michelsen 1994; Newton's method on the phases that are not held at zero.
    """
    present = z > 0.0
    ln_e = np.where(present[:, None, :], ln_e - ln_e.max(axis=1, keepdims=True), 0.0)
    e = np.exp(ln_e)
    beta = np.maximum(beta, 1e-3)
    value, slope, bend, ratio = _convex(z, e, beta)
    k = beta.shape[1]
    for _ in range(MOST_SHARES):
        free = (beta > 0.0) | (slope < 0.0)
        if (np.abs(np.where(free, slope, 0.0)) <= SHARE_ZERO).all():
            break
        for _ in range(k):
            step = _newton(bend, slope, free)
            held = (beta == 0.0) & (step < 0.0)  # pushed below zero by the others: stays there
            if not held.any():
                break
            free &= ~held
        beta, value, slope, bend, ratio = _descend(z, e, beta, value, slope, bend, ratio, step)
    x = z[:, None, :] * ratio
    return beta / beta.sum(axis=1, keepdims=True), x / x.sum(axis=2, keepdims=True)


def _newton(bend, slope, free):
    """Newton step (n, k) in the shares that are free."""
    matrix = np.where(free[:, :, None] & free[:, None, :], bend, 0.0)
    matrix += (
        np.eye(free.shape[1]) * np.where(free, 1e-13 * (1.0 + np.einsum("njj->nj", bend)), 1.0)[:, None, :]
    )
    return np.linalg.solve(matrix, -np.where(free, slope, 0.0)[:, :, None])[:, :, 0]


def _convex(z, e, beta):
    """Q (n,), its slope (n, k) and second derivatives (n, k, k), and e/E (n, k, c)."""
    E = np.einsum("nk,nkc->nc", beta, e)
    with np.errstate(divide="ignore", invalid="ignore"):
        ratio = e / E[:, None, :]
        value = beta.sum(axis=1) - np.where(z > 0.0, z * np.log(E), 0.0).sum(axis=1)
    weighed = z[:, None, :] * ratio
    return value, 1.0 - weighed.sum(axis=2), np.einsum("njc,nkc->njk", weighed, ratio), ratio


def _descend(z, e, beta, value, slope, bend, ratio, step):
    """A Newton step, cut where a share would turn negative and halved until Q falls."""
    open_ = np.ones(beta.shape[0], dtype=bool)
    new = [beta.copy(), value.copy(), slope.copy(), bend.copy(), ratio.copy()]
    with np.errstate(divide="ignore", invalid="ignore"):
        room = np.where(step < 0.0, -beta / step, np.inf).min(axis=1)
    first = np.minimum(1.0, room)
    for cut in (1.0, 0.5, 0.2, 0.05, 1e-2, 1e-3):
        trial = beta + (cut * first)[:, None] * step
        trial = np.where(trial <= SHARE_ZERO, 0.0, trial)
        found = _convex(z, e, trial)
        with np.errstate(invalid="ignore"):
            good = open_ & (found[0] <= value + 1e-15 * (1.0 + np.abs(value)))
        for old, fresh in zip(new, (trial, *found), strict=True):
            old[good] = fresh[good]
        open_ &= ~good
        if not open_.any():
            break
    return new


class Triple:
    """A vapour and two liquids: the fixed-point problem in ln(y/x) and ln(x_W/x), side by side (n, 2c)."""

    def __init__(self, state, P, z, beta=None):
        self.state, self.P, self.z = state, P, z
        self.beta = np.full((z.shape[0], 3), 1.0 / 3.0) if beta is None else beta

    def take(self, lanes) -> Triple:
        """Some of the lanes."""
        return Triple(self.state.take(lanes), self.P[lanes], self.z[lanes], self.beta[lanes])

    def phases(self, u):
        """beta (n, 3) and compositions (n, 3, c) at these ln K (n, 2c)."""
        c = self.z.shape[1]
        u = np.clip(u, -LARGEST, LARGEST)
        ln_e = np.stack([np.zeros_like(self.z), u[:, :c], u[:, c:]], axis=1)
        return shares_of_phases(self.z, ln_e, self.beta)

    def image(self, u):
        """ln phi(x) - ln phi(y) and ln phi(x) - ln phi(x_W)."""
        self.beta, x = self.phases(u)
        ln_phi = [self.state.mix(x[:, j]).ln_phi(self.P, kind) for j, kind in enumerate("LVL")]
        return np.concatenate([ln_phi[L] - ln_phi[V], ln_phi[L] - ln_phi[W]], axis=1)


def look_again(answer, lanes, fluid, state, P, z, wilson):
    """The tangent plane of every answer of a chunk, and the phases it adds, until nothing more is found."""
    todo = np.flatnonzero(answer.phases[lanes] > 0)
    for last in [False] * (ROUNDS - 1) + [True]:
        if todo.size == 0:
            return
        here, held = lanes[todo], state.take(todo)
        from_x = np.isfinite(answer.x[here]).all(axis=1)
        phase = np.where(from_x[:, None], answer.x[here], answer.y[here])
        mixture = held.mix(phase)
        ln_phi = np.where(from_x[:, None], mixture.ln_phi(P[todo], "L"), mixture.ln_phi(P[todo], "V"))
        single = answer.phases[here] == 1
        if single.any():
            ln_phi[single] = Feed(held, P[todo], phase).ln_phi[single]
        found, splits, text = full_check(fluid, held, P[todo], z[todo], phase, ln_phi, wilson[todo])
        _say(answer, here, found, splits, text)
        again_ = np.flatnonzero(splits)
        if last or again_.size == 0:
            return
        part = Split(held.take(again_), P[todo][again_], z[todo][again_])
        moved = _add(answer, here[again_], part, phase[again_], from_x[again_], found.take(again_))
        todo = todo[again_[moved]]


def _say(answer, here, found, splits, text):
    """Write down what the tangent plane says of answers that stand."""
    answer.tpd[here] = found.tpd
    phases, liquids = answer.phases[here], np.isfinite(answer.beta_W[here])
    stands = ~splits & found.converged
    text = np.where(stands & liquids, np.where(phases == 3, THREE_PHASES, TWO_LIQUIDS), text)
    answer.checks[here] = text
    answer.status[here[splits]] = Status.LIQUID_SPLITS
    answer.status[here[~np.isfinite(found.tpd)]] = Status.OUT_OF_STEPS


def _add(answer, lanes, problem, phase, from_x, found):
    """Add the phase a trial found; mask (n,) of the lanes whose answer changed."""
    ln_ratio = found.ln_W - np.log(np.maximum(phase, FEW))
    before, light = answer.phases[lanes].copy(), _light(problem, found)
    single = before == 1
    moved = np.zeros(lanes.size, dtype=bool)
    for kinds, mask in (("LL", single & from_x & ~light), ("LV", single & (from_x == light))):
        some = np.flatnonzero(mask)
        if some.size:
            start = np.where(from_x[some, None], ln_ratio[some], -ln_ratio[some])
            again(answer, lanes[some], problem.take(some), kinds, start)
            moved[some] = answer.phases[lanes[some]] == 2
            lost = lanes[some[~moved[some]]]  # the phase stands, and the words that it is not stable
            answer.status[lost], answer.residual[lost] = Status.LIQUID_SPLITS, 0.0
    liquids = np.isfinite(answer.beta_W[lanes])
    some = np.flatnonzero((before == 2) & (~liquids | light))
    if some.size:
        moved[some] = _triple(answer, lanes[some], problem.take(some), found.ln_W[some], liquids[some])
    some = np.flatnonzero((before == 2) & ~liquids & ~light & ~moved)
    if some.size:  # three at once were not found: the two liquids first, their vapour at the next look
        held = problem.take(some)
        status, residual = answer.status[lanes[some]].copy(), answer.residual[lanes[some]].copy()
        start = found.ln_W[some] - np.log(np.maximum(held.z, FEW))
        again(answer, lanes[some], held, "LL", start)
        moved[some] = np.isfinite(answer.beta_W[lanes[some]])
        lost = ~moved[some]
        answer.status[lanes[some[lost]]], answer.residual[lanes[some[lost]]] = status[lost], residual[lost]
    return moved


def _light(problem, found):
    """Mask (n,) of trials that are no liquid: by their density, since a trial of either kind may have one root."""
    trial = problem.state.mix(found.w)
    Z = np.where(found.kind == "V", trial.Z(problem.P, "V"), trial.Z(problem.P, "L"))
    return reduced_volume(trial, problem.P, Z) > DENSE


def _triple(answer, lanes, problem, ln_W, liquids):
    """Three phases from two and a trial; mask (n,) of the lanes in which they, or two of them, were found."""
    present = problem.z > 0.0
    ln_x = np.log(np.maximum(answer.x[lanes], FEW))
    other = np.where(liquids[:, None], answer.x_W[lanes], answer.y[lanes])
    ln_other, row = np.log(np.maximum(other, FEW)), liquids[:, None]
    u = np.concatenate([np.where(row, ln_W, ln_other) - ln_x, np.where(row, ln_other, ln_W) - ln_x], axis=1)
    twice = np.concatenate([present, present], axis=1)
    triple = Triple(problem.state, problem.P, problem.z)
    fixed = solve(triple, np.where(twice, u, 0.0), twice, plain=MOST_TRIPLE, reach=REACH)
    answer.iterations[lanes] += fixed.iterations
    beta, x = triple.phases(fixed.u)
    c = problem.z.shape[1]
    to_V, to_W = np.where(present, fixed.u[:, :c], 0.0), np.where(present, fixed.u[:, c:], 0.0)
    apart = np.min([row_max(np.abs(ln_K)) for ln_K in (to_V, to_W, to_V - to_W)], axis=0) > TRIVIAL
    settled = fixed.converged & apart
    _put_three(answer, lanes, triple, beta, x, fixed, settled)
    good = settled & ((beta > 0.0).sum(axis=1) == 2)
    for gone, first, second, kinds in ((W, L, V, "LV"), (L, W, V, "LV"), (V, L, W, "LL")):
        some = np.flatnonzero(good & (beta[:, gone] == 0.0))
        if some.size:
            ln_K = {L: np.zeros((lanes.size, c)), V: to_V, W: to_W}
            pair = Split(problem.state, problem.P, problem.z, beta[:, second], kinds)
            ratio = fixed._replace(u=ln_K[second] - ln_K[first])
            put_two(answer, lanes, some, pair, beta[:, second], x[:, first], x[:, second], ratio)
    return settled & ((beta > 0.0).sum(axis=1) >= 2)


def _put_three(answer, lanes, triple, beta, x, fixed, settled):
    """Write down the lanes with three phases; the denser liquid is the second."""
    some = np.flatnonzero(settled & (beta > 0.0).all(axis=1))
    if some.size == 0:
        return
    held, beta, x = triple.take(some), beta[some], x[some]
    swap = density(held, x[:, L], "L") > density(held, x[:, W], "L")
    row = swap[:, None]
    answer.three_phases(
        lanes[some],
        held.z,
        beta[:, V],
        np.where(swap, beta[:, L], beta[:, W]),
        np.where(row, x[:, W], x[:, L]),
        x[:, V],
        np.where(row, x[:, L], x[:, W]),
        fixed.residual[some],
    )
