"""Two phases of a feed, and the arrays of a Flash while they are filled.

With K known the vapour fraction is the Rachford-Rice root held inside 0..1; the
step of the fixed-point problem is ln phi(x) - ln phi(y). Where it has to be
watched over, the Gibbs energy is the function that must fall.
"""

from __future__ import annotations

import numpy as np

from screener.equilibrium.fixed_point import solve
from screener.equilibrium.phase import DENSE, reduced_volume
from screener.equilibrium.rachford_rice import split
from screener.equilibrium.rows import row_max, row_sum
from screener.equilibrium.second_liquid import NOT_TESTED, THREE_PHASES, TWO_LIQUIDS
from screener.equilibrium.stability import FEW
from screener.ground.status import Status

TRIVIAL = 1e-4  # largest |ln K| of two phases that are one; critical splits shown apart start near 1e-2
LARGEST = 300.0  # bound of |ln K|: keeps squares of exp in double precision
REACH = 1.0  # longest accelerated step in ln K
MOST_AGAIN = 400  # substitutions of a lane that lost its way: next to a plait point they crawl


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
        return self.state.mix(x).ln_phi(self.P, self.kinds[0]) - self.state.mix(y).ln_phi(
            self.P, self.kinds[1]
        )


class DescendingSplit(Split):
    """The same, watched over by the Gibbs energy: slower, for lanes that lost their way."""

    energy: np.ndarray
    weight: np.ndarray

    def take(self, lanes) -> DescendingSplit:
        """Some of the lanes."""
        return DescendingSplit(
            self.state.take(lanes), self.P[lanes], self.z[lanes], self.beta[lanes], self.kinds
        )

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


class Answer:
    """The arrays of a Flash while they are filled."""

    def __init__(self, n: int, c: int, status):
        for name in ("beta", "beta_W", "residual", "balance", "tpd"):
            setattr(self, name, np.full(n, np.nan))
        for name in ("x", "y", "x_W", "K"):
            setattr(self, name, np.full((n, c), np.nan))
        self.status = status
        self.phases, self.iterations = np.zeros(n, dtype=int), np.zeros(n, dtype=int)
        self.checks = np.full(n, NOT_TESTED, dtype=object)

    def forget(self, lanes):
        """Take back the answer of some lanes."""
        for name in ("beta", "beta_W", "residual", "balance", "tpd", "x", "y", "x_W", "K"):
            getattr(self, name)[lanes] = np.nan
        self.status[lanes], self.phases[lanes], self.checks[lanes] = Status.OUT_OF_STEPS, 0, NOT_TESTED

    def one_phase(self, lanes, z, liquid, K, tpd):
        """Lanes that are one phase, liquid or vapour."""
        self.status[lanes], self.phases[lanes] = Status.CONVERGED, 1
        self.beta[lanes] = np.where(liquid, 0.0, 1.0)
        self.x[lanes] = np.where(liquid[:, None], z, np.nan)
        self.y[lanes] = np.where(liquid[:, None], np.nan, z)
        self.K[lanes], self.tpd[lanes] = K, tpd
        self.residual[lanes] = self.balance[lanes] = 0.0

    def three_phases(self, lanes, z, beta, beta_W, x, y, x_W, residual):
        """Lanes that are a vapour and two liquids."""
        self.status[lanes], self.checks[lanes], self.phases[lanes] = Status.LIQUID_SPLITS, THREE_PHASES, 3
        self.beta[lanes], self.beta_W[lanes], self.residual[lanes] = beta, beta_W, residual
        self.x[lanes], self.y[lanes], self.x_W[lanes] = x, y, x_W
        with np.errstate(divide="ignore", invalid="ignore"):
            self.K[lanes] = np.where(z > 0.0, y / x, np.nan)
        left = (1.0 - beta - beta_W)[:, None] * x + beta[:, None] * y + beta_W[:, None] * x_W
        self.balance[lanes] = row_max(np.abs(z - left))

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


def put_two(answer, lanes, some, problem, beta, x, y, fixed):
    """Two phases that converged: the lighter is the vapour; of two dense ones the denser is the second liquid."""
    if some.size == 0:
        return
    held = problem.take(some)
    first, second = held.state.mix(x[some]), held.state.mix(y[some])
    ratio_x = reduced_volume(first, held.P, first.Z(held.P, held.kinds[0]))
    ratio_y = reduced_volume(second, held.P, second.Z(held.P, held.kinds[1]))
    both = (ratio_x < DENSE) & (ratio_y < DENSE)
    heavier = density(held, x[some], held.kinds[0]) > density(held, y[some], held.kinds[1])
    swap = np.where(both, heavier, ratio_x * first.b > ratio_y * second.b)
    row = swap[:, None]
    answer.two_phases(
        lanes[some],
        held.z,
        np.where(swap, 1.0 - beta[some], beta[some]),
        np.where(row, y[some], x[some]),
        np.where(row, x[some], y[some]),
        np.where(row, -fixed.u[some], fixed.u[some]),
        fixed.residual[some],
        both,
    )


def density(problem, x, kind: str):
    """Mass density (n,) [kg/m3] of phases x (n, c) at the states of a problem: the denser liquid settles."""
    return (x @ problem.state.fluid.MW) / problem.state.mix(x).volume(problem.P, kind)


def again(answer, lanes, problem, kinds, start):
    """Split unstable feeds from the trial phase that proved them unstable."""
    problem = DescendingSplit(problem.state, problem.P, problem.z, None, kinds)
    present = problem.z > 0.0
    fixed = solve(problem, np.where(present, start, 0.0), present, plain=MOST_AGAIN, reach=REACH)
    answer.iterations[lanes] += fixed.iterations
    beta, x, y = problem.phases(fixed.u)
    apart = row_max(np.abs(np.where(present, fixed.u, 0.0))) > TRIVIAL
    answer.status[lanes[fixed.converged & ~apart]] = Status.TRIVIAL
    answer.residual[lanes] = fixed.residual
    put_two(
        answer,
        lanes,
        np.flatnonzero(fixed.converged & apart & (beta > 0.0) & (beta < 1.0)),
        problem,
        beta,
        x,
        y,
        fixed,
    )
