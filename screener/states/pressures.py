"""Bubble pressures of lanes with their method spread; shared by the table of lanes and the arrival of the receipt."""

from __future__ import annotations

import numpy as np

from screener.ground.status import Status
from screener.species import find
from screener.states.scaled import bubble_pressure

METHOD_SPREAD = 0.05  # least relative spread of any computed vapour pressure; rule of this project
SPREAD_COUNTED = (
    0.03  # disagreement of pure vapour-pressure curves above this is carried; rule of this project
)
LEAST_LEFT = 0.05  # of a value at the low end, whatever its spread: a pressure is above zero; own choice
SIGNS = np.array([-1.0, 0.0, 1.0])  # low, best, high


def bubble(fluid, T, z, mask, factor):
    """Bubble pressure (...), y (..., c), status (...) and residual (...) of the lanes in mask.

    factor (...) [-] is that of what was measured of each liquid.
    """
    shape, c = T.shape, fluid.c
    P = np.full(shape, np.nan)
    y = np.full((*shape, c), np.nan)
    status = np.full(shape, Status.BAD_INPUT, dtype=int)
    residual = np.full(shape, np.nan)
    wanted = mask & np.isfinite(T)
    if wanted.any():
        answer = bubble_pressure(
            fluid, T[wanted], np.broadcast_to(z, (*shape, c))[wanted], np.broadcast_to(factor, shape)[wanted]
        )
        P[wanted] = np.where(answer.ok, answer.P, np.nan)
        y[wanted] = np.where(answer.ok[:, None], answer.y, np.nan)
        status[wanted], residual[wanted] = answer.status, answer.residual
    return P, y, status, residual, wanted


def relative_spread(y, errors):
    """Relative method spread (...) of a vapour pressure: 5 % and what its vapour species add."""
    carried = np.where(errors > SPREAD_COUNTED, errors, 0.0)
    return METHOD_SPREAD + np.nansum(y * carried, axis=-1)


def edges(spread):
    """Factors (..., 3) of low, best and high for the relative spread (..., 3) or (..., 1)."""
    return np.maximum(1.0 + spread * SIGNS, LEAST_LEFT)


def with_edges(P, spread):
    """Widen low and high of P (..., 3) by the relative spread (..., 3)."""
    return P * edges(spread)


def psat_errors(names) -> np.ndarray:
    """Error bar of each species' vapour-pressure curve: disagreement or extension, 0 where none is known. [-]"""
    return np.array([find(name).psat_error or 0.0 for name in names])
