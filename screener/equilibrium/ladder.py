"""Does a saturation point exist, and where: the tangent plane along a ladder of states.

For a liquid held at falling pressure (or rising temperature) the vapour-like
trial has a negative tangent-plane distance from the bubble point on; for a
vapour held at rising pressure (or falling temperature) the liquid-like trial
has one from the dew point on. A change of sign between two rungs, the feed
being of its kind on the stable one, proves that the point exists; without one
there is none in the range looked at.
"""

from __future__ import annotations

import numpy as np

from screener.equilibrium.fixed_point import solve
from screener.equilibrium.incipient import HIGHEST_P, HIGHEST_T
from screener.equilibrium.phase import critical_ratio, reduced_volume
from screener.equilibrium.results import TPD_ZERO
from screener.equilibrium.stability import FEW, REACH, Trials

RUNGS = 48
PRESSURES = (1.0, 2.0 * HIGHEST_P)  # [Pa] ends of the ladder; stored liquids lie far inside
TEMPERATURES = (90.0, 0.8 * HIGHEST_T)  # [K]
MOST_ROWS = 20_000


def seek(fluid, name: str, value, feed, bubble: bool):
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

    Returns
    -------
    tuple
        Mask (n,) of the lanes in which it exists, and u (n, c) to start from.

    Source
    ------
    Michelsen, Fluid Phase Equilib. 9 (1982) 1 (tangent plane).
    """
    n, c = feed.shape
    exists, u = np.zeros(n, dtype=bool), np.zeros((n, c))
    for some in np.array_split(np.arange(n), max(1, -(-n * RUNGS // MOST_ROWS))):
        exists[some], u[some] = _seek(fluid, name, value[some], feed[some], bubble)
    return exists, u


def _rungs(name: str, bubble: bool):
    """States from the stable side on: high pressure or low temperature for a liquid, the opposite for a vapour."""
    low, high = np.log(PRESSURES) if name == "T" else (1.0 / TEMPERATURES[1], 1.0 / TEMPERATURES[0])
    ladder = np.linspace(high, low, RUNGS)  # falling ln P, or falling 1/T
    return ladder if bubble else ladder[::-1]


def _seek(fluid, name, value, feed, bubble):
    n = feed.shape[0]
    rungs = _rungs(name, bubble)
    given, other = np.repeat(value, RUNGS), np.tile(np.exp(rungs) if name == "T" else 1.0 / rungs, n)
    T, P = (given, other) if name == "T" else (other, given)
    z = np.repeat(feed, RUNGS, axis=0)
    present = z > 0.0
    state = fluid.at(T)
    kind, trial_kind = ("L", "V") if bubble else ("V", "L")
    mixture = state.mix(z)
    ln_phi, Z = mixture.ln_phi_and_Z(P, kind)
    ratio = reduced_volume(mixture, P, Z)
    of_kind = (ratio < 1.5 * critical_ratio(mixture)) if bubble else (ratio > 0.5 * critical_ratio(mixture))
    ln_z = np.log(np.where(present, np.maximum(z, FEW), 1.0))
    ln_K = np.log(fluid.wilson_K(T, P))
    trials = Trials(state, P, ln_z + ln_phi, present, trial_kind)
    # a bubble starts as what the liquid would give to an ideal vapour
    fixed = solve(trials, np.where(present, ln_z + (ln_phi if bubble else -ln_K), 0.0), present, newton=0, reach=REACH)
    _, ln_sum = trials.share(fixed.u)
    usable = of_kind & (fixed.residual < 1e-3) & np.isfinite(ln_sum)
    away = np.where(present, np.abs(fixed.u - ln_z), 0.0).max(axis=1) > 1e-3
    unstable = (usable & away & (ln_sum > TPD_ZERO)).reshape(n, RUNGS)
    stable = (usable & (ln_sum <= TPD_ZERO)).reshape(n, RUNGS)
    crossing = stable[:, :-1] & unstable[:, 1:]
    exists = crossing.any(axis=1)
    rung = np.where(exists, crossing.argmax(axis=1) + 1, 0)
    row = np.arange(n) * RUNGS + rung
    ln_ratio = (fixed.u - ln_z)[row] * (1.0 if bubble else -1.0)
    if name == "T":
        shift = np.log(P[row])[:, None]
    else:
        shift = 5.373 * (1.0 + fluid.omega) * fluid.Tc / T[row][:, None]
    return exists, np.where(feed > 0.0, ln_ratio + shift, 0.0)
