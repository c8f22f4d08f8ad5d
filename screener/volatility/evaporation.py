"""Evaporation from an open vessel at one temperature: what a liquid loses first."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.equilibrium import bubble_pressure
from screener.ground.shapes import lanes
from screener.ground.status import Status
from screener.volatility.results import Lanes
from screener.volatility.still import Still

STEPS = 20


@dataclass(frozen=True)
class Evaporation(Lanes):
    """What left and what stayed after a share of the mass has evaporated.

    lost (n,) [-] mass lost over mass charged, w_lost (n, c) [-] mass fractions of what left,
    x (n, c) [-] mole fractions of what stayed, P (n,) [Pa] its bubble pressure.
    """

    lost: np.ndarray
    w_lost: np.ndarray
    x: np.ndarray
    P: np.ndarray


def open_evaporation(fluid, T, x, lost, *, mobility=None, steps: int = STEPS) -> Evaporation:
    """Composition of the first mass that an open, well-stirred liquid loses at one temperature.

    Vapour leaves as it forms, in equilibrium with the whole liquid, whose surface is not depleted.
    It is carried away as one gas; where it has to diffuse through still air, the species of higher
    diffusivity leave faster than that, and `mobility` says how much.

    Parameters
    ----------
    fluid : Fluid
        Species and model of c components.
    T : float or array, shape (n,)
        Temperature. [K]
    x : array, shape (c,) or (n, c)
        Liquid mole fractions. [-]
    lost : float or array, shape (n,)
        Mass lost over mass charged, above 0, at most 0.95. [-]
    mobility : array, shape (c,), optional
        Relative rates at which the vapours are carried away; all alike when absent. [-]
    steps : int
        Steps of about equal mass.

    Returns
    -------
    Evaporation
        What left, what stayed, and the vapour pressure of that.

    Source
    ------
    Rayleigh, Philos. Mag. 4 (1902) 521, at constant temperature.
    """
    z, T, lost, good = lanes(fluid.c, x, T=T, lost=lost)
    n = T.size
    good &= lost <= 0.95
    status = np.where(good, Status.CONVERGED, Status.BAD_INPUT).astype(int)
    w_lost, left, P = np.full((n, fluid.c), np.nan), np.full((n, fluid.c), np.nan), np.full(n, np.nan)
    active = np.flatnonzero(good)
    mass = z @ fluid.MW
    dish = Still(
        fluid,
        z[active],
        T[active],
        fluid.MW,
        lost[active] * mass[active] / steps,
        bubble_pressure,
        "P",
        mobility=mobility,
    )
    for step in range(steps + 1):
        failed = dish.boil()
        status[active[failed]] = dish.status[failed]
        dish.keep(~failed)
        active = active[~failed]
        if not active.size:
            break
        if step < steps:
            dish.step()
    gone = (z[active] - dish.n) * fluid.MW
    w_lost[active] = gone / gone.sum(axis=-1, keepdims=True)
    left[active] = dish.n / dish.n.sum(axis=-1, keepdims=True)
    P[active] = dish.found
    return Evaporation(status=status, lost=lost, w_lost=w_lost, x=left, P=P)
