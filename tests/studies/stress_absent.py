"""Is there a bubble or dew point where none is said to exist? Looked for along a ladder of states."""

from __future__ import annotations

import numpy as np

from tests.studies.stress_judge import ln_f, lower, tangent_plane

RUNGS = 60
PRESSURES, TEMPERATURES = (1e3, 9e7), (60.0, 1200.0)  # [Pa], [K] ends of the ladder
BELOW = 1e-9  # [-] distance over RT of an unstable feed
HALVINGS = 22  # of a rung: to 1e-7 of its length
LIQUID, VAPOUR = 6.0, 2.0  # v/b below and above which the feed can be a liquid and a vapour: 1.5 and 0.5 of critical
APART = 0.02  # [-] difference of ln v/b of phases that are two beyond doubt


def exists(equation, name: str, value, feed, bubble: bool, generator, coldest=TEMPERATURES[0]):
    """Mask (n,) of lanes with a point of the kind; equation(T, P) gives the equation of state of lanes, coldest is
    the lowest temperature looked at. [K]"""
    n = value.size
    if n == 0:
        return np.zeros(0, dtype=bool)
    ends = np.log(PRESSURES if name == "T" else (coldest, TEMPERATURES[1]))
    rungs = np.linspace(*ends, RUNGS)[:: -1 if bubble == (name == "T") else 1]  # from the stable side

    def look(lane, at):
        T, P = (value[lane], np.exp(at)) if name == "T" else (np.exp(at), value[lane])
        eos, x = equation(T, P), feed[lane]
        ln_phi, v_x = lower(eos, x)
        tpd, _, v_w = tangent_plane(eos, x, ln_f(ln_phi, x), generator, wide=False)
        return tpd < -BELOW, np.log(v_w / v_x), v_x

    lane, rung = np.repeat(np.arange(n), RUNGS), np.tile(rungs, n)
    unstable = look(lane, rung)[0].reshape(n, RUNGS)
    lane, k = np.nonzero(~unstable[:, :-1] & unstable[:, 1:])
    good, bad = rungs[k], rungs[k + 1]
    way = np.zeros(lane.size)
    for _ in range(HALVINGS):
        if lane.size == 0:
            break
        middle = 0.5 * (good + bad)
        splits, lighter, v_x = look(lane, middle)
        good, bad = np.where(splits, good, middle), np.where(splits, middle, bad)
        way = np.where(splits, lighter, way)
    found = np.zeros(n, dtype=bool)
    if lane.size:
        kind = v_x < LIQUID if bubble else v_x > VAPOUR
        found[lane[kind & ((way > APART) if bubble else (way < -APART))]] = True
    return found
