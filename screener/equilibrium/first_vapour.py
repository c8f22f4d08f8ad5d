"""The first vapour over a liquid that may be two: free water adds its vapour pressure, and no more.

A one-liquid bubble point of a feed that has settled into two counts the
dissolved water at an activity above that of water itself: it is an upper bound.
Here the two liquids and the first bubble are solved together at given T. The
unknowns are u = ln(x_W/x) and v = ln(y/x) + ln P; the shares of the liquids
follow from u by the Rachford-Rice equation, P and y from

    P = sum x_i exp(v_i),   y_i = x_i exp(v_i) / P
    u -> ln phi(x) - ln phi(x_W),   v -> ln phi(x) - ln phi(y) + ln P
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.equilibrium.fixed_point import solve
from screener.equilibrium.incipient import weighted
from screener.equilibrium.phase import DENSE, reduced_volume
from screener.equilibrium.results import LaneAnswer
from screener.equilibrium.rows import row_max
from screener.equilibrium.saturation import bubble_pressure
from screener.equilibrium.second_liquid import NO_VAPOUR_LEFT, TWO_LIQUIDS, full_check
from screener.equilibrium.stability import FEW
from screener.equilibrium.two_phase import TRIVIAL, Answer, Split, again, density
from screener.ground.shapes import lanes as as_lanes
from screener.ground.status import Status

MOST_NUMBERS = 20_000  # lanes times components handled at once: keeps the working arrays in cache
REACH = 1.0  # longest accelerated step in ln K
MOST_PLAIN = 60  # substitutions before Newton takes over


@dataclass(frozen=True)
class FirstVapour(LaneAnswer):
    """Bubble point of a feed whose liquid may be two.

    P (n,) [Pa] at which the first vapour y (n, c) [-] forms; liquids (n,) 1 or
    2; x (n, c) [-] and, of two, the denser x_W (n, c) [-] with its share beta_W
    (n,) [-] by moles, NaN without one. one_liquid (n,) [Pa] is the bubble point
    of the feed held together, NaN where it has none. residual (n,) [-] is the
    largest |ln f| between any two phases, balance (n,) [-] the largest
    |z - (1 - beta_W) x - beta_W x_W|, tpd (n,) [-] the smallest tangent-plane
    distance at the point; checks, one line per lane, what was tested. status is
    CONVERGED for one liquid and for two, LIQUID_SPLITS where the feed is known
    to split and the point of the two was not found.
    """

    T: np.ndarray
    P: np.ndarray
    z: np.ndarray
    y: np.ndarray
    x: np.ndarray
    x_W: np.ndarray
    beta_W: np.ndarray
    liquids: np.ndarray
    one_liquid: np.ndarray
    status: np.ndarray
    iterations: np.ndarray
    residual: np.ndarray
    balance: np.ndarray
    tpd: np.ndarray
    checks: np.ndarray


def first_vapour(fluid, T, z) -> FirstVapour:
    """Pressure at which the first vapour forms over a feed, its liquid settled into two where it splits.

    Parameters
    ----------
    fluid : Fluid
        Species constants and model parameters of c components.
    T : float or array, shape (n,)
        Temperature. [K]
    z : array, shape (c,) or (n, c)
        Feed mole fractions, free water included; each row sums to 1. [-]

    Returns
    -------
    FirstVapour
        P, y, the liquids and their shares, and the one-liquid bubble pressure
        beside it. Where the model alone splits dry ethanol and light
        hydrocarbon the liquid is held together, and checks says so.

    Raises
    ------
    ShapeError
        z does not match the fluid, or rows do not broadcast with T.

    Source
    ------
    Own arrangement of equal fugacities; the first test of the feed: Michelsen,
    Fluid Phase Equilib. 9 (1982) 1.
    """
    z, T, _ = as_lanes(fluid.c, z, T=T)
    one = bubble_pressure(fluid, T, z, check="full")
    n, c = z.shape
    out = {name: np.full(n, np.nan) for name in ("beta_W", "balance")} | {"x_W": np.full((n, c), np.nan)}
    known = one.ok | (one.status == Status.LIQUID_SPLITS) & np.isfinite(one.P)
    out |= {
        "P": one.P.copy(),
        "y": one.y.copy(),
        "x": np.where(known[:, None], z, np.nan),
        "liquids": known.astype(int),
    }
    out |= {name: getattr(one, name).copy() for name in ("status", "iterations", "residual", "tpd", "checks")}
    out["balance"][known] = 0.0
    split = np.flatnonzero(one.status == Status.LIQUID_SPLITS)
    for some in np.array_split(split, max(1, -(-split.size * c // MOST_NUMBERS))):
        if some.size:
            _settle(out, some, fluid, T[some], z[some], one.P[some])
    return FirstVapour(T=T, z=z, one_liquid=one.P, **out)


class Settled:
    """Two liquids and their first vapour: the fixed-point problem in u and v, side by side (n, 2c)."""

    def __init__(self, state, z, beta):
        self.state, self.z, self.beta = state, z, beta

    def take(self, lanes) -> Settled:
        """Some of the lanes."""
        return Settled(self.state.take(lanes), self.z[lanes], self.beta[lanes])

    def close(self, unknown):
        """beta_W (n,), x, x_W, P (n,) [Pa] and y."""
        c = self.z.shape[1]
        pair = Split(self.state, None, self.z, self.beta)
        beta, x, x_W = pair.phases(unknown[:, :c])
        y, ln_P = weighted(x, unknown[:, c:])
        return beta, x, x_W, np.exp(np.clip(ln_P, -300.0, 300.0)), y

    def image(self, unknown):
        """The two differences of ln phi."""
        self.beta, x, x_W, P, y = self.close(unknown)
        ln_phi = self.state.mix(x).ln_phi(P, "L")
        u = ln_phi - self.state.mix(x_W).ln_phi(P, "L")
        return np.concatenate([u, ln_phi - self.state.mix(y).ln_phi(P, "V") + np.log(P)[:, None]], axis=1)


def _settle(out, lanes, fluid, T, z, P_one):
    """Feeds that split: the two liquids near the pressure of one, then the bubble point of both together."""
    state, n = fluid.at(T), lanes.size
    for name, value in (
        ("P", np.nan),
        ("y", np.nan),
        ("x", np.nan),
        ("residual", np.nan),
        ("balance", np.nan),
    ):
        out[name][lanes] = value
    out["liquids"][lanes] = 0
    P = np.where(np.isfinite(P_one), P_one, NO_VAPOUR_LEFT)
    pair, every = Answer(n, z.shape[1], np.full(n, int(Status.OUT_OF_STEPS))), np.arange(n)
    ln_phi = state.ln_phi(P, z, "L")
    found, _, _ = full_check(fluid, state, P, z, z, ln_phi, fluid.wilson_K(T, P))
    again(pair, every, Split(state, P, z), "LL", found.ln_W - np.log(np.maximum(z, FEW)))
    out["iterations"][lanes] += pair.iterations
    two = np.flatnonzero(np.isfinite(pair.beta_W))
    if two.size == 0:
        return
    held, x, x_W = state.take(two), pair.x[two], pair.x_W[two]
    u = np.log(np.maximum(x_W, FEW)) - np.log(np.maximum(x, FEW))
    v = held.ln_phi(P[two], x, "L") + np.log(P[two])[:, None]
    present = np.tile(z[two] > 0.0, (1, 2))
    problem = Settled(held, z[two], pair.beta_W[two])
    fixed = solve(
        problem,
        np.where(present, np.concatenate([u, v], axis=1), 0.0),
        present,
        plain=MOST_PLAIN,
        reach=REACH,
    )
    out["iterations"][lanes[two]] += fixed.iterations
    _take_in(out, lanes[two], fluid, T[two], problem, fixed)


def _take_in(out, lanes, fluid, T, problem, fixed):
    """Judge what was found, and write down the lanes that stand."""
    beta, x, x_W, P, y = problem.close(fixed.u)
    state, z, c = problem.state, problem.z, problem.z.shape[1]
    apart = row_max(np.abs(np.where(z > 0.0, fixed.u[:, :c], 0.0))) > TRIVIAL
    thin = reduced_volume(state.mix(y), P, state.mix(y).Z(P, "V")) > DENSE
    good = np.flatnonzero(fixed.converged & apart & thin & (beta > 0.0) & (beta < 1.0))
    if good.size == 0:
        return
    held = Split(state.take(good), P[good], z[good])
    x, x_W, beta, y = x[good], x_W[good], beta[good], y[good]
    swap = density(held, x, "L") > density(held, x_W, "L")
    row = swap[:, None]
    x, x_W, beta = np.where(row, x_W, x), np.where(row, x, x_W), np.where(swap, 1.0 - beta, beta)
    ln_phi = held.state.ln_phi(held.P, x, "L")
    found, splits, text = full_check(
        fluid, held.state, held.P, z[good], x, ln_phi, fluid.wilson_K(T[good], held.P)
    )
    stands = ~splits & np.isfinite(found.tpd)
    here = lanes[good]
    out["tpd"][here], out["checks"][here] = found.tpd, np.where(stands & found.converged, TWO_LIQUIDS, text)
    some, here = np.flatnonzero(stands), here[stands]
    out["P"][here], out["y"][here], out["x"][here], out["x_W"][here] = (
        held.P[some],
        y[some],
        x[some],
        x_W[some],
    )
    out["beta_W"][here], out["liquids"][here], out["status"][here] = beta[some], 2, Status.CONVERGED
    out["residual"][here] = fixed.residual[good][some]
    left = (1.0 - beta)[:, None] * x + beta[:, None] * x_W
    out["balance"][here] = row_max(np.abs(z[good] - left))[some]
