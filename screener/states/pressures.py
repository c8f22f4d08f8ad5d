"""Bubble pressures of lanes with their method spread; shared by the table of lanes and the arrival of the receipt."""

from __future__ import annotations

import numpy as np

from screener.equilibrium import bubble_pressure
from screener.ground.status import Status
from screener.species import find

METHOD_SPREAD = 0.05  # least relative spread of any computed vapour pressure; rule of this project
SPREAD_COUNTED = (
    0.03  # disagreement of pure vapour-pressure curves above this is carried; rule of this project
)
SIGNS = np.array([-1.0, 0.0, 1.0])  # low, best, high


def bubble(fluid, T, z, mask):
    """Bubble pressure (...), y (..., c), status (...) and residual (...) of the lanes in mask."""
    shape, c = T.shape, fluid.c
    P = np.full(shape, np.nan)
    y = np.full((*shape, c), np.nan)
    status = np.full(shape, Status.BAD_INPUT, dtype=int)
    residual = np.full(shape, np.nan)
    wanted = mask & np.isfinite(T)
    if wanted.any():
        answer = bubble_pressure(fluid, T[wanted], np.broadcast_to(z, (*shape, c))[wanted])
        P[wanted] = np.where(answer.ok, answer.P, np.nan)
        y[wanted] = np.where(answer.ok[:, None], answer.y, np.nan)
        status[wanted], residual[wanted] = answer.status, answer.residual
    return P, y, status, residual, wanted


def relative_spread(y, errors):
    """Relative method spread (...) of a vapour pressure: 5 % and what its vapour species add."""
    carried = np.where(errors > SPREAD_COUNTED, errors, 0.0)
    return METHOD_SPREAD + np.nansum(y * carried, axis=-1)


def with_edges(P, spread):
    """Widen low and high of P (..., 3) by the relative spread (..., 3)."""
    return P * (1.0 + spread * SIGNS)


def psat_errors(names) -> np.ndarray:
    """Error bar of each species' vapour-pressure curve: disagreement or extension, 0 where none is known. [-]"""
    return np.array([find(name).psat_error or 0.0 for name in names])
