"""Roots of many lanes at once, each held between two ends of opposite sign."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

SAME = 4e-16  # relative width below which two ends are one number
ASIDE = (0.37, 0.71)  # shares of the bracket tried where the function has no value at the point asked for


class Between(NamedTuple):
    """t (n,) the best point, f (n,) its value, iterations (n,) and the mask converged (n,)."""

    t: np.ndarray
    f: np.ndarray
    iterations: np.ndarray
    converged: np.ndarray


def root_between(function, a, f_a, b, f_b, tolerance, most=60) -> Between:
    """The root of a function of each lane between a and b.

    Parameters
    ----------
    function : callable
        function(lanes, t) -> f at t for the lanes of these indices; NaN where it has no value.
    a : array, shape (n,)
        One end. [any]
    f_a : array, shape (n,)
        Its value. [any]
    b : array, shape (n,)
        The other end. [any]
    f_b : array, shape (n,)
        Its value, of the opposite sign. [any]
    tolerance : array, shape (n,)
        |f| taken as zero. [any]
    most : int
        Most evaluations.

    Returns
    -------
    Between
        A lane without a change of sign, or whose ends met without |f| falling
        below the tolerance (a jump), is not converged.

    Source
    ------
    Chandrupatla, Adv. Eng. Softw. 28 (1997) 145; the first step is a secant.
    """
    n = a.shape[0]
    best, value = np.where(np.abs(f_a) <= np.abs(f_b), a, b), np.where(np.abs(f_a) <= np.abs(f_b), f_a, f_b)
    iterations = np.zeros(n, dtype=int)
    with np.errstate(invalid="ignore"):
        converged = np.abs(value) <= tolerance
        go = np.flatnonzero((f_a * f_b < 0.0) & ~converged)
    # x[0] newest point, x[1] the end across the root, x[2] the point before
    x = [np.array(b[go], dtype=float), np.array(a[go], dtype=float), np.array(b[go], dtype=float)]
    f = [np.array(f_b[go], dtype=float), np.array(f_a[go], dtype=float), np.array(f_b[go], dtype=float)]
    step = f[0] / (f[0] - f[1])
    for _ in range(most):
        if go.size == 0:
            break
        t = x[0] + np.clip(step, 1e-9, 1.0 - 1e-9) * (x[1] - x[0])
        f_t = _evaluate(function, go, t, x)
        iterations[go] += 1
        same = np.sign(f_t) == np.sign(f[0])
        x = [t, np.where(same, x[1], x[0]), np.where(same, x[0], x[1])]
        f = [f_t, np.where(same, f[1], f[0]), np.where(same, f[0], f[1])]
        better = np.abs(f_t) < np.abs(value[go])
        best[go[better]], value[go[better]] = t[better], f_t[better]
        converged[go] = np.abs(value[go]) <= tolerance[go]
        narrow = np.abs(x[1] - x[0]) <= SAME * np.abs(x[0])
        left = np.flatnonzero(~converged[go] & ~narrow & np.isfinite(f_t))
        go, x, f = go[left], [v[left] for v in x], [v[left] for v in f]
        step = _next(x, f)
    return Between(best, value, iterations, converged)


def _evaluate(function, lanes, t, x):
    """f at t; where it has no value, at another point of the bracket (t is changed in place)."""
    f = np.array(function(lanes, t), dtype=float)
    for share in ASIDE:
        lost = np.flatnonzero(~np.isfinite(f))
        if lost.size == 0:
            break
        t[lost] = x[0][lost] + share * (x[1][lost] - x[0][lost])
        f[lost] = function(lanes[lost], t[lost])
    return f


def _next(x, f):
    """Share of the bracket for the next point: inverse quadratic where it can be trusted, else the middle."""
    with np.errstate(all="ignore"):
        xi = (x[0] - x[1]) / (x[2] - x[1])
        phi = (f[0] - f[1]) / (f[2] - f[1])
        quadratic = (phi * phi < xi) & ((1.0 - phi) ** 2 < 1.0 - xi)
        step = f[0] / (f[1] - f[0]) * f[2] / (f[1] - f[2])
        step += (x[2] - x[0]) / (x[1] - x[0]) * f[0] / (f[2] - f[0]) * f[1] / (f[2] - f[1])
    return np.where(quadratic & np.isfinite(step), step, 0.5)
