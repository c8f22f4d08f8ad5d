"""Does a saturation point exist, and where: the tangent plane along a ladder of states.

For a liquid held at falling pressure (or rising temperature) the vapour-like
trial has a negative tangent-plane distance from the bubble point on; for a
vapour held at rising pressure (or falling temperature) the liquid-like trial
has one from the dew point on. A change of sign between two rungs, the feed
being of its kind on the stable one and the trial phase of the other density,
proves that the point exists; without one there is none that is wider than a rung.
"""

from __future__ import annotations

import numpy as np

from screener.equilibrium.fixed_point import solve
from screener.equilibrium.incipient import HIGHEST_P, HIGHEST_T, lowest_T
from screener.equilibrium.phase import DENSE, critical_ratio, reduced_volume
from screener.equilibrium.results import TPD_ZERO
from screener.equilibrium.rows import row_max, row_sum
from screener.equilibrium.stability import FEW, MOST_TRIAL, PURE, REACH, Trials
from screener.ground.status import Status

RUNGS = 48
FINE_RUNGS = 9  # a crossing is narrowed eightfold each time
PRESSURES = (1.0, HIGHEST_P)  # [Pa] ends of the ladder; stored liquids lie far inside
WARMEST = 0.8 * HIGHEST_T  # [K] the same, from `lowest_T` on
ALIKE = 0.05  # [-] |ln w/z| of a crossing that may be a limit of material stability: no point where two phases meet
MOST_ROWS = 20_000


def seek(fluid, name: str, value, feed, bubble: bool, finer: int):
    """Look for the saturation point of each lane.

    Parameters
    ----------
    fluid : Fluid
        The fluid.
    name : str
        "T" or "P": what `value` is.
    value : array, shape (n,)
        Temperature [K] or pressure [Pa].
    feed : array, shape (n, c)
        Liquid (bubble) or vapour (dew). [-]
    bubble : bool
        Which of the two.
    finer : int
        How often the crossing found is narrowed.

    Returns
    -------
    tuple
        Status (n,): CONVERGED where it exists, NO_SOLUTION where no two rungs
        show it, TRIVIAL where the phases that cross are nearly one,
        OUT_OF_RANGE where it lies beyond the ladder; and u (n, c) to start from.

    Source
    ------
    Michelsen, Fluid Phase Equilib. 9 (1982) 1 (tangent plane).
    """
    n, c = feed.shape
    status, u = np.zeros(n, dtype=int), np.zeros((n, c))
    for some in np.array_split(np.arange(n), max(1, -(-n * RUNGS // MOST_ROWS))):
        rungs = np.tile(_rungs(fluid, name, bubble), (some.size, 1))
        status[some], ends, u[some] = _climb(fluid, name, value[some], feed[some], bubble, rungs)
        crossed = status[some] == Status.CONVERGED
        for _ in range(finer):
            if not crossed.any():
                break
            some, ends = some[crossed], ends[crossed]
            share = np.linspace(0.0, 1.0, FINE_RUNGS)
            rungs = ends[:, :1] + (ends[:, 1:] - ends[:, :1]) * share
            inner, ends, start = _climb(fluid, name, value[some], feed[some], bubble, rungs)
            crossed = inner == Status.CONVERGED
            lost = np.where(inner == Status.TRIVIAL, inner, int(Status.NO_SOLUTION))  # the edge there is another's
            status[some[~crossed]] = lost[~crossed]
            u[some[crossed]] = start[crossed]
    return status, u


def _rungs(fluid, name: str, bubble: bool):
    """States from the stable side on: high pressure or low temperature for a liquid, the opposite for a vapour."""
    low, high = np.log(PRESSURES) if name == "T" else -np.log((WARMEST, lowest_T(fluid)))
    ladder = np.linspace(high, low, RUNGS)  # falling ln P, or falling -ln T
    return ladder if bubble else ladder[::-1]


def _climb(fluid, name, value, feed, bubble, rungs):
    """One ladder (n, m) per lane: its status, the two rungs of the crossing, u on the unstable side."""
    n, m = rungs.shape
    given = np.repeat(value, m)
    other = np.exp(rungs if name == "T" else -rungs).ravel()
    T, P = (given, other) if name == "T" else (other, given)
    z = np.repeat(feed, m, axis=0)
    present = z > 0.0
    state = fluid.at(T)
    kind, trial_kind = ("L", "V") if bubble else ("V", "L")
    mixture = state.mix(z)
    ln_phi, Z = mixture.ln_phi_and_Z(P, kind)
    ratio = reduced_volume(mixture, P, Z)
    of_kind = (ratio < 1.5 * critical_ratio(mixture)) if bubble else (ratio > 0.5 * critical_ratio(mixture))
    ln_z = np.log(np.where(present, np.maximum(z, FEW), 1.0))
    trials = Trials(state, P, ln_z + ln_phi, present, trial_kind)
    ln_sum, ln_W, settled = _deepest(trials, _starts(fluid, T, P, ln_z, ln_phi, present, bubble), ln_z)
    usable = of_kind & settled & np.isfinite(ln_sum)
    unstable = (usable & (ln_sum > TPD_ZERO)).reshape(n, m)
    stable = (usable & (ln_sum <= TPD_ZERO)).reshape(n, m)
    crossing = stable[:, :-1] & unstable[:, 1:]
    lane, k = np.nonzero(crossing)
    row = lane * m + k + 1
    new = state.take(row).mix(trials.take(row).share(ln_W[row])[0])
    with np.errstate(invalid="ignore"):  # a crossing to a phase of the other density is the edge of another kind
        lighter = reduced_volume(new, P[row], new.Z(P[row], trial_kind)) > ratio[row]
    crossing[lane[lighter != bubble], k[lighter != bubble]] = False
    rung = crossing.argmax(axis=1)
    begin = usable.reshape(n, m).argmax(axis=1)
    row = np.arange(n) * m + begin
    new = state.take(row).mix(trials.take(row).share(ln_W[row])[0])
    with np.errstate(invalid="ignore"):  # another liquid at the first rung says nothing of bubbles
        first = unstable[np.arange(n), begin] & ~(bubble & (reduced_volume(new, P[row], new.Z(P[row], "V")) < DENSE))
    # nor does a ladder that begins with a feed of the other kind know what lies before it
    begun = of_kind.reshape(n, m)[:, 0]
    status = np.where(first | ~begun, int(Status.OUT_OF_RANGE), int(Status.NO_SOLUTION))
    status = np.where(crossing.any(axis=1), int(Status.CONVERGED), status)
    row = np.arange(n) * m + rung + 1
    apart = row_max(np.where(present[row], np.abs(ln_W - ln_z)[row], 0.0))
    status = np.where(crossing.any(axis=1) & (apart < ALIKE), int(Status.TRIVIAL), status)
    ln_ratio = (ln_W - ln_z)[row] * (1.0 if bubble else -1.0)
    shift = np.log(P[row])[:, None] if name == "T" else 5.373 * (1.0 + fluid.omega) * fluid.Tc / T[row][:, None]
    ends = np.stack([rungs[np.arange(n), rung], rungs[np.arange(n), rung + 1]], axis=1)
    return status, ends, np.where(feed > 0.0, ln_ratio + shift, 0.0)


def _starts(fluid, T, P, ln_z, ln_phi, present, bubble: bool):
    """Trial starts: what the liquid would give to an ideal vapour; for a vapour Wilson's liquid and every pure one."""
    if bubble:
        return [ln_z + ln_phi]
    starts = [ln_z - np.log(fluid.wilson_K(T, P))]
    for i in np.flatnonzero(present.any(axis=0)):
        pure = np.log(1.0 - PURE) + ln_z
        pure[:, i] = np.where(present[:, i], np.log(PURE), 0.0)
        starts.append(pure)
    return starts


def _deepest(trials, starts, ln_z):
    """Largest negative distance (n,) [-] over the starts, its ln W (n, c), and whether any of them settled (n,).

    The distance is ln sum W of a trial at rest. A trial that came back to the feed says nothing and counts as stable.
    """
    n = ln_z.shape[0]
    ln_sum, ln_W, settled = np.full(n, -np.inf), np.zeros_like(ln_z), np.zeros(n, dtype=bool)
    for start in starts:
        start = np.where(trials.present, start, 0.0)
        fixed = solve(trials, start, trials.present, plain=MOST_TRIAL, newton=0, reach=REACH)
        ok = fixed.residual < 1e-3
        away = np.where(trials.present, np.abs(fixed.u - ln_z), 0.0).max(axis=1) > 1e-3
        # exact at any composition, also where the trial has not come to rest: a value above zero is a proof
        w, ln_total = trials.share(fixed.u)
        with np.errstate(invalid="ignore"):
            rest = row_sum(np.where(trials.present, w * (trials.image(fixed.u) - fixed.u), 0.0))
        found = np.where(away, ln_total + rest, 0.0)
        better = ok & (found > ln_sum)
        ln_sum = np.where(better, found, ln_sum)
        ln_W = np.where(better[:, None], fixed.u, ln_W)
        settled |= ok
    return ln_sum, ln_W, settled
