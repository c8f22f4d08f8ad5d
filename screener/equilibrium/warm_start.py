"""Starts for many lanes of one composition: the answers at a few states, carried over by a polynomial.

Along temperature (or pressure) u of a saturation point is smooth. Where many
lanes in a row share a composition, it is solved at the Chebyshev nodes of
their range, and the polynomial through those answers starts every lane so near
its own answer that one evaluation confirms it. The lanes are judged like any
others; where the polynomial does not settle, nothing is used of it.
"""

from __future__ import annotations

import numpy as np

from screener.equilibrium.fixed_point import solve
from screener.equilibrium.incipient import start

LEAST_LANES = 200  # in a row of one composition; below, the nodes cost as much as they save
NODES = 16
TAIL = 1e-3  # [-] largest of the last two coefficients: a polynomial that has not settled by then is no help


def warm_starts(fluid, name: str, value, feed, bubble: bool):
    """Starts u for the lanes of a call.

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
    array, shape (n, c), or None
        u, NaN in lanes that start blind; None where all do. [-]

    Source
    ------
    Chebyshev interpolation; textbook.
    """
    if value.size < LEAST_LANES:
        return None
    edges = np.concatenate([[0], np.flatnonzero((feed[1:] != feed[:-1]).any(axis=1)) + 1, [value.size]])
    u = None
    for k in np.flatnonzero(np.diff(edges) >= LEAST_LANES):
        some = slice(edges[k], edges[k + 1])
        found = _along(fluid, name, value[some], feed[edges[k]], bubble)
        if found is not None:
            u = np.full(feed.shape, np.nan) if u is None else u
            u[some] = found
    return u


def _along(fluid, name, value, z, bubble):
    """u (n, c) of one composition z (c,), or None."""
    at = 1.0 / value if name == "T" else np.log(value)
    low, high = at.min(), at.max()
    if not high > low * (1.0 + 1e-9):
        return None
    order = np.arange(NODES)
    nodes = np.cos(np.pi * (order + 0.5) / NODES)
    middle, half = 0.5 * (high + low), 0.5 * (high - low)
    given = middle + half * nodes
    given = 1.0 / given if name == "T" else np.exp(given)
    problem, u = start(fluid, name, given, np.tile(z, (NODES, 1)), bubble)
    fixed = solve(problem, u, problem.present, newton=0)
    if not fixed.converged.all():
        return None
    basis = np.cos(np.pi * np.outer(order, order + 0.5) / NODES)
    coefficients = 2.0 / NODES * (basis @ fixed.u)
    coefficients[0] *= 0.5
    if np.abs(coefficients[-2:]).max() > TAIL:
        return None
    return _polynomials((at - middle) / half).T @ coefficients


def _polynomials(x):
    """Chebyshev polynomials (NODES, n) at x (n,)."""
    out = np.empty((NODES, x.size))
    out[0], out[1] = 1.0, x
    for k in range(2, NODES):
        out[k] = 2.0 * x * out[k - 1] - out[k - 2]
    return out
