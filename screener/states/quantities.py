"""Flows of every lane, and the curve behind the pictures."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.states.breathing import Breathing, breathing
from screener.states.inputs import gather
from screener.states.lanes import Lanes, evaluate
from screener.states.scaled import bubble_pressure
from screener.states.suction import SuctionLanes, suction_lanes
from screener.states.weather import weather


def table(cases) -> Lanes:
    """The table of lanes of many cases."""
    inputs = gather(cases)
    return evaluate(inputs, weather(inputs))


@dataclass(frozen=True)
class Flows:
    """What moves: breathing of the tank and flow in the suction line."""

    breathing: Breathing
    suction: SuctionLanes


def flows(lanes: Lanes) -> Flows:
    """Breathing and suction of every lane."""
    b = breathing(lanes)
    return Flows(b, suction_lanes(lanes, b.vents.set_under))


def bubble_curve(lanes: Lanes, i: int, T) -> dict:
    """Bubble pressure over T [K] of receipt, heel and the mixture at normal level of case i.

    T is a list; each curve a list with None where there is no bubble point.
    """
    T = np.asarray(T, dtype=float)
    curve = {"T": T.tolist(), "P": {}}
    for k, name in ((0, "receipt"), (1, "heel"), (3, "mixture")):
        z = lanes.z[i, k]
        if not lanes.present[i, k] or not np.isfinite(z).all():
            continue
        answer = bubble_pressure(lanes.fluid, T, z, lanes.measured.factor[i, k])
        curve["P"][name] = [float(p) if ok else None for p, ok in zip(answer.P, answer.ok)]
    return curve
