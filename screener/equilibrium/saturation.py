"""Bubble and dew points of many lanes at once, from a blind start.

The fixed-point problems are in `incipient`. A lane that does not settle, or
settles on two equal phases or on the wrong side of a phase envelope, is looked
at once more: the tangent plane of the feed along a ladder of pressures (or
temperatures) says whether a point of the kind asked for exists, and where to
start for it.
"""

from __future__ import annotations

import numpy as np

from screener.equilibrium.fixed_point import solve
from screener.equilibrium.incipient import (
    HIGHEST_P,
    HIGHEST_T,
    LOWEST_P,
    LOWEST_T,
    start,
)
from screener.equilibrium.ladder import seek
from screener.equilibrium.phase import DENSE, reduced_volume
from screener.equilibrium.results import Saturation, bad_status
from screener.equilibrium.second_liquid import NOT_TESTED, full_check, known_check, splits_anyway
from screener.equilibrium.stability import FEW
from screener.ground.constants import T_15C
from screener.ground.shapes import lanes as as_lanes
from screener.ground.status import Status

TRIVIAL = 1e-4  # [-] largest |ln K| and relative difference of volume of two phases that are one
REACH = 1.0  # longest accelerated step in ln K
MOST_NUMBERS = 40_000  # lanes times components handled at once: keeps the working arrays in cache


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
    out = _Points(n, c, status)
    work = np.flatnonzero(status == Status.OUT_OF_STEPS)
    for some in np.array_split(work, max(1, -(-work.size * c // MOST_NUMBERS))):
        if some.size:
            _solve(out, some, fluid, name, value[some], feed[some], bubble)
            if full:
                _check(out, some, fluid, name, value[some], feed[some], bubble)
    T, P = (value, out.value) if name == "T" else (out.value, value)
    x, y = (feed, out.other) if bubble else (out.other, feed)
    with np.errstate(all="ignore"):
        K = np.where(feed > 0.0, np.exp(out.ln_K), np.nan)
    return Saturation(
        T=T, P=P, x=x, y=y, K=K, status=out.status, iterations=out.iterations, residual=out.residual, tpd=out.tpd,
        checks=out.checks,
    )


class _Points:
    """The arrays of a Saturation while they are filled: value is the unknown, other the new phase."""

    def __init__(self, n: int, c: int, status):
        self.value, self.residual = np.full(n, np.nan), np.full(n, np.nan)
        self.other, self.ln_K = np.full((n, c), np.nan), np.full((n, c), np.nan)
        self.iterations, self.status = np.zeros(n, dtype=int), status
        self.tpd, self.checks = np.full(n, np.nan), np.full(n, NOT_TESTED, dtype=object)


def _solve(out, lanes, fluid, name: str, value, feed, bubble: bool):
    """One chunk of valid lanes; those that fail get a second start from the ladder."""
    problem, u = start(fluid, name, value, feed, bubble)
    fixed = solve(problem, u, problem.present, reach=REACH)
    status = _take_in(out, lanes, fluid, name, value, problem, fixed)
    again = np.flatnonzero((status != Status.CONVERGED) & (status != Status.OUT_OF_RANGE))
    if again.size == 0:
        return
    exists, u = seek(fluid, name, value[again], feed[again], bubble)
    none = again[~exists]
    out.status[lanes[none]] = Status.NO_SOLUTION
    if bubble and none.size:
        T = value[none] if name == "T" else np.full(none.size, T_15C)
        split = splits_anyway(fluid, T, feed[none])
        out.status[lanes[none[split]]] = Status.LIQUID_SPLITS
    again, u = again[exists], u[exists]
    if again.size:
        problem = problem.take(again)
        fixed = solve(problem, u, problem.present, plain=2, newton=30)  # next to the answer: straight to Newton
        _take_in(out, lanes[again], fluid, name, value[again], problem, fixed)


def _take_in(out, lanes, fluid, name: str, value, problem, fixed):
    """Judge what the iteration found and write down the lanes that stand."""
    found, other = problem.close(fixed.u)
    T, P = (value, found) if name == "T" else (found, value)
    shift = np.log(P)[:, None] if name == "T" else problem.h / T[:, None]
    ln_K = np.where(problem.present, fixed.u - shift, 0.0)
    state = fluid.at(T)
    kinds = "LV" if problem.bubble else "VL"
    feed, new = state.mix(problem.feed), state.mix(other)
    ratio = reduced_volume(feed, P, feed.Z(P, kinds[0])), reduced_volume(new, P, new.Z(P, kinds[1]))
    volume_L, volume_V = (ratio[0] * feed.b, ratio[1] * new.b)[:: 1 if problem.bubble else -1]
    with np.errstate(invalid="ignore"):
        status = np.where(fixed.converged, int(Status.CONVERGED), int(Status.OUT_OF_STEPS))
        alike = (np.abs(ln_K).max(axis=1) < TRIVIAL) & ~(np.abs(volume_V / volume_L - 1.0) > TRIVIAL)
        dense = (ratio[0] < DENSE) & (ratio[1] < DENSE)
        low, high = (LOWEST_P, HIGHEST_P) if name == "T" else (LOWEST_T, HIGHEST_T)
        outside = ~((found > low * 1.000001) & (found < high * 0.999999))
    status = np.where(fixed.converged & (volume_V <= volume_L), int(Status.NO_SOLUTION), status)
    status = np.where(fixed.converged & dense, int(Status.LIQUID_SPLITS), status)
    status = np.where(fixed.converged & alike, int(Status.TRIVIAL), status)
    status = np.where(outside, int(Status.OUT_OF_RANGE), status)
    out.status[lanes] = status
    out.iterations[lanes] += fixed.iterations
    out.residual[lanes] = fixed.residual
    keep = status == Status.CONVERGED
    here = lanes[keep]
    out.value[here], out.other[here], out.ln_K[here] = found[keep], other[keep], ln_K[keep]
    return status


def _check(out, lanes, fluid, name: str, value, feed, bubble: bool):
    """The tangent plane of the feed at its saturation point.

    A second liquid leaves a bubble point standing as a number (one liquid
    held together) under the status LIQUID_SPLITS. For a dew point the trial
    that lies below is the drop that forms earlier: it is tried first.
    """
    for _ in range(1 if bubble else 2):
        some = np.flatnonzero(out.status[lanes] == Status.CONVERGED)
        if some.size == 0:
            return
        here, z, given, found = lanes[some], feed[some], value[some], out.value[lanes[some]]
        T, P = (given, found) if name == "T" else (found, given)
        state = fluid.at(T)
        ln_phi = state.ln_phi(P, z, "L" if bubble else "V")
        plane, splits, text = full_check(fluid, state, P, z, z, ln_phi, fluid.wilson_K(T, P))
        out.tpd[here], out.checks[here] = plane.tpd, text
        out.status[here[~np.isfinite(plane.tpd)]] = Status.OUT_OF_STEPS
        out.status[here[splits]] = Status.LIQUID_SPLITS
        earlier = np.flatnonzero(splits & (plane.kind == "L"))
        if bubble or earlier.size == 0:
            return
        problem, _ = start(fluid, name, given[earlier], z[earlier], bubble)
        shift = np.log(P)[:, None] if name == "T" else problem.h / T[:, None]
        u = np.log(np.maximum(z, FEW)) - plane.ln_W + shift
        fixed = solve(problem, np.where(problem.present, u[earlier], 0.0), problem.present, reach=REACH)
        _take_in(out, here[earlier], fluid, name, given[earlier], problem, fixed)
