"""Bubble and dew points of many lanes at once, from a blind start."""

from __future__ import annotations

import numpy as np

from screener.equilibrium.points import Points, check_points, solve_points
from screener.equilibrium.results import Saturation, bad_status
from screener.equilibrium.second_liquid import known_check
from screener.equilibrium.warm_start import warm_starts
from screener.ground.shapes import lanes as as_lanes
from screener.ground.status import Status

MOST_NUMBERS = 16_000  # lanes times components handled at once: keeps the working arrays in cache


def bubble_pressure(fluid, T, x, *, check="vapour-liquid") -> Saturation:
    """Pressure at which the first bubble forms in a liquid.

    Parameters
    ----------
    fluid : Fluid
        Species constants and model parameters of c components.
    T : float or array, shape (n,)
        Temperature. [K]
    x : array, shape (c,) or (n, c)
        Liquid mole fractions; each row sums to 1. [-]
    check : str
        "vapour-liquid", or "full": also the tangent plane of the feed at the
        point from every pure component, which finds second liquids.

    Returns
    -------
    Saturation
        P (n,) [Pa], y (n, c) [-], K, status, iterations, residual. A lane
        without a solution holds NaN and a status that says why.

    Raises
    ------
    ShapeError
        x does not match the fluid, or rows do not broadcast with T.
    InputError
        check is no known word.

    Source
    ------
    Michelsen, Fluid Phase Equilib. 23 (1985) 181 (saturation points).
    """
    return _saturation(fluid, x, True, check, T=T)


def dew_pressure(fluid, T, y, *, check="vapour-liquid") -> Saturation:
    """Pressure at which the first drop forms in a vapour on compression.

    Parameters
    ----------
    fluid : Fluid
        Species constants and model parameters of c components.
    T : float or array, shape (n,)
        Temperature. [K]
    y : array, shape (c,) or (n, c)
        Vapour mole fractions; each row sums to 1. [-]
    check : str
        "vapour-liquid", or "full": also the tangent plane of the feed at the
        point from every pure component, which finds second liquids.

    Returns
    -------
    Saturation
        P (n,) [Pa], x (n, c) [-], K, status, iterations, residual. A lane
        without a solution holds NaN and a status that says why.

    Raises
    ------
    ShapeError
        y does not match the fluid, or rows do not broadcast with T.
    InputError
        check is no known word.

    Source
    ------
    As `bubble_pressure`.
    """
    return _saturation(fluid, y, False, check, T=T)


def bubble_temperature(fluid, P, x, *, check="vapour-liquid") -> Saturation:
    """Temperature at which the first bubble forms in a liquid on heating.

    Parameters
    ----------
    fluid : Fluid
        Species constants and model parameters of c components.
    P : float or array, shape (n,)
        Pressure. [Pa]
    x : array, shape (c,) or (n, c)
        Liquid mole fractions; each row sums to 1. [-]
    check : str
        "vapour-liquid", or "full": also the tangent plane of the feed at the
        point from every pure component, which finds second liquids.

    Returns
    -------
    Saturation
        T (n,) [K], y (n, c) [-], K, status, iterations, residual. A lane
        without a solution holds NaN and a status that says why.

    Raises
    ------
    ShapeError
        x does not match the fluid, or rows do not broadcast with P.
    InputError
        check is no known word.

    Source
    ------
    As `bubble_pressure`.
    """
    return _saturation(fluid, x, True, check, P=P)


def dew_temperature(fluid, P, y, *, check="vapour-liquid") -> Saturation:
    """Temperature at which the first drop forms in a vapour on cooling.

    Parameters
    ----------
    fluid : Fluid
        Species constants and model parameters of c components.
    P : float or array, shape (n,)
        Pressure. [Pa]
    y : array, shape (c,) or (n, c)
        Vapour mole fractions; each row sums to 1. [-]
    check : str
        "vapour-liquid", or "full": also the tangent plane of the feed at the
        point from every pure component, which finds second liquids.

    Returns
    -------
    Saturation
        T (n,) [K], x (n, c) [-], K, status, iterations, residual. A lane
        without a solution holds NaN and a status that says why.

    Raises
    ------
    ShapeError
        y does not match the fluid, or rows do not broadcast with P.
    InputError
        check is no known word.

    Source
    ------
    As `bubble_pressure`.
    """
    return _saturation(fluid, y, False, check, P=P)


def _saturation(fluid, feed, bubble: bool, check: str, **given) -> Saturation:
    """All four questions: `given` holds T or P."""
    full = known_check(check)
    (name, value), = given.items()
    feed, value, good = as_lanes(fluid.c, feed, **given)
    n, c = feed.shape
    status = bad_status(good)
    status[good & fluid.lacks(feed)] = Status.NO_PARAMETERS
    out = Points(n, c, status)
    work = np.flatnonzero(status == Status.OUT_OF_STEPS)
    warm = warm_starts(fluid, name, value[work], feed[work], bubble) if work.size else None
    for some in np.array_split(np.arange(work.size), max(1, -(-work.size * c // MOST_NUMBERS))):
        if some.size:
            u, some = None if warm is None else warm[some], work[some]
            solve_points(out, some, fluid, name, value[some], feed[some], bubble, u)
            if full:
                check_points(out, some, fluid, name, value[some], feed[some], bubble)
    T, P = (value, out.value) if name == "T" else (out.value, value)
    x, y = (feed, out.other) if bubble else (out.other, feed)
    with np.errstate(all="ignore"):
        K = np.where(feed > 0.0, np.exp(out.ln_K), np.nan)
    return Saturation(
        T=T, P=P, x=x, y=y, K=K, status=out.status, iterations=out.iterations, residual=out.residual, tpd=out.tpd,
        checks=out.checks,
    )
