"""Bring scalars and arrays into lanes: states first, components last."""

from __future__ import annotations

import numpy as np

from screener.ground.errors import ShapeError

SUM_TOLERANCE = 1e-8  # rounding only; a composition that misses 1 by more is a bad lane


def lanes(c: int, composition, **scalars):
    """Broadcast a composition and scalars to n lanes.

    Parameters
    ----------
    c : int
        Number of components.
    composition : array, shape (c,) or (n, c)
        Mole fractions. [-]
    **scalars : float or array, shape (n,)
        Named state variables.

    Returns
    -------
    tuple
        composition (n, c) normalised within rounding, the scalars (n,) in the
        order given, and the Boolean mask (n,) of lanes that are valid states
        (finite and positive scalars, no negative share, sum within 1e-8 of 1).

    Raises
    ------
    ShapeError
        Last axis is not c, or the lanes do not broadcast.
    """
    z = np.asarray(composition, dtype=float)
    if z.ndim not in (1, 2) or z.shape[-1] != c:
        raise ShapeError("composition", f"shape {z.shape}", f"({c},) or (n, {c})")
    arrays = []
    for name, value in scalars.items():
        value = np.asarray(value, dtype=float)
        if value.ndim > 1:
            raise ShapeError(name, f"shape {value.shape}", "a scalar or shape (n,)")
        arrays.append(np.atleast_1d(value))
    counts = {a.shape[0] for a in arrays} | {1 if z.ndim == 1 else z.shape[0]}
    n = max(counts)
    if counts - {1, n}:
        raise ShapeError("lanes", f"lengths {sorted(counts)}", "equal lengths, or 1")
    z = np.array(np.broadcast_to(np.atleast_2d(z), (n, c)))
    arrays = [np.array(np.broadcast_to(a, (n,))) for a in arrays]
    total = z.sum(axis=-1)
    good = np.isfinite(z).all(axis=-1) & (z >= 0.0).all(axis=-1) & (np.abs(total - 1.0) <= SUM_TOLERANCE)
    for a in arrays:
        good &= np.isfinite(a) & (a > 0.0)
    z[good] /= total[good, None]
    return (z, *arrays, good)
