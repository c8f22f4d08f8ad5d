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
from screener.equilibrium.results import TPD_ZERO, Flash, bad_status
from screener.equilibrium.rows import row_max
from screener.equilibrium.second_liquid import DOUBTFUL, dry_ethanol, known_check
from screener.equilibrium.stability import FEW, tangent_plane, trials_from
from screener.equilibrium.three_phase import look_again
from screener.equilibrium.two_phase import REACH, TRIVIAL, Answer, Split, again, put_two
from screener.ground.shapes import lanes as as_lanes
from screener.ground.status import Status

MOST_NUMBERS = 40_000  # lanes times components handled at once: keeps the working arrays in cache


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
        every pure component, which finds second liquids; the phases it finds
        are added and solved, a vapour over two liquids among them.

    Returns
    -------
    Flash
        beta, x, y, K, phases, status and the proofs: residual, balance, tpd,
        checks. LIQUID_SPLITS where a second liquid was found (x and x_W, with y
        where there is a vapour too). Two liquids of dry ethanol and light
        hydrocarbon are held not to exist: one liquid stands in their place, and
        checks says so.

    Raises
    ------
    ShapeError
        z does not match the fluid, or rows do not broadcast with T and P.
    InputError
        check is no known word.

    Source
    ------
    Michelsen, Fluid Phase Equilib. 9 (1982) 1 and 21 (method); three phases:
    Michelsen, Comput. Chem. Eng. 18 (1994) 545.
    """
    full = known_check(check)
    z, T, P, good = as_lanes(fluid.c, z, T=T, P=P)
    n, c = z.shape
    status = bad_status(good)
    status[good & fluid.lacks(z)] = Status.NO_PARAMETERS
    answer = Answer(n, c, status)
    work = np.flatnonzero(status == Status.OUT_OF_STEPS)
    for some in np.array_split(work, max(1, -(-work.size * c // MOST_NUMBERS))):
        if some.size:
            _flash(answer, some, fluid, T[some], P[some], z[some], full)
    return Flash(T=T, P=P, z=z, **vars(answer))


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
    put_two(answer, lanes, np.flatnonzero(two), problem, beta, x, y, fixed)
    some = np.flatnonzero(one)
    K = np.where(present, np.exp(fixed.u), np.nan)
    tpd = -np.log(np.where(beta[:, None] == 0.0, z * K, z / K).sum(axis=1, where=present))
    answer.one_phase(lanes[some], z[some], beta[some] == 0.0, K[some], tpd[some])
    open_ = np.flatnonzero(~two & ~one)
    if open_.size:
        _judge(answer, lanes, open_, problem, feed, wilson)
    doubtful = np.flatnonzero(np.isfinite(answer.beta_W[lanes]) & dry_ethanol(fluid, z))
    if doubtful.size:
        _hold_together(answer, lanes, doubtful, problem, wilson)
    if full:
        look_again(answer, lanes, fluid, state, P, z, wilson)


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
    K = np.where(
        (held.z > 0.0) & (found.tpd > 0.0)[:, None],
        np.exp(np.where(light[:, None], 1, -1) * ln_ratio),
        np.nan,
    )
    answer.one_phase(lanes[open_[some]], held.z[some], liquid[some], K[some], found.tpd[some])
    for kinds, mask in (("LV", unstable & ~(liquid & ~light)), ("LL", unstable & liquid & ~light)):
        some = np.flatnonzero(mask)
        if some.size:
            start = np.where(light[some, None] | (kinds == "LL"), 1.0, -1.0) * ln_ratio[some]
            again(answer, lanes[open_[some]], held.take(some), kinds, start)


def _hold_together(answer, lanes, doubtful, problem, wilson):
    """Two liquids that are held not to exist: one liquid, or liquid and vapour, and the doubt in words."""
    held, here = problem.take(doubtful), lanes[doubtful]
    ln_phi = held.state.ln_phi(held.P, held.z, "L")
    ln_z = np.log(np.maximum(held.z, FEW))
    found = trials_from(held.state, held.P, held.z, ln_phi, (ln_z + np.log(wilson[doubtful]))[None], "V")
    answer.forget(here)
    trial = held.state.mix(np.where(np.isfinite(found.w), found.w, held.z))
    vapour = (
        reduced_volume(trial, held.P, trial.Z(held.P, "V")) > DENSE
    )  # else it is the liquid held not to exist
    light = (found.tpd < -TPD_ZERO) & vapour
    some = np.flatnonzero((found.converged | ~vapour) & ~light)
    K = np.where((held.z > 0.0) & (found.tpd > 0.0)[:, None], np.exp(found.ln_W - ln_z), np.nan)
    answer.one_phase(here[some], held.z[some], np.ones(some.size, dtype=bool), K[some], found.tpd[some])
    some = np.flatnonzero(light)
    if some.size:  # from the vapour itself, and not watched over: the two liquids have less energy
        pair, present = held.take(some), held.z[some] > 0.0
        fixed = solve(pair, np.where(present, (found.ln_W - ln_z)[some], 0.0), present, reach=REACH)
        beta, x, y = pair.phases(fixed.u)
        put_two(
            answer,
            here[some],
            np.flatnonzero(fixed.converged & (beta > 0.0) & (beta < 1.0)),
            pair,
            beta,
            x,
            y,
            fixed,
        )
        answer.forget(here[some][np.isfinite(answer.beta_W[here[some]])])
    answer.checks[here[answer.phases[here] > 0]] = DOUBTFUL
