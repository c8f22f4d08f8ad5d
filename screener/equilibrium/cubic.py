"""Roots of a cubic equation of state with the liquid root kept at low pressure.

Every two-parameter cubic used here is

    P = R T / (v - b) - a / ((v + d1 b)(v + d2 b)).

With A = a P / (R T)^2, B = b P / (R T) and the gap w = Z - B it reads

    w^3 + ((2 + s) B - 1) w^2 + (A - (2 + s) B + (1 + s + p) B^2) w
        - (1 + s + p) B^2 = 0,      s = d1 + d2,  p = d1 d2,

which is exact and has its physical roots at w > 0. A closed form in Z loses
the liquid root once B is below about 1e-8; here the largest root is found
first, the other two follow from deflation from the constant term upwards
(stable when the largest root is removed), and all are polished by Newton.
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

PENG_ROBINSON = (1.0 - np.sqrt(2.0), 1.0 + np.sqrt(2.0))  # Peng and Robinson, Ind. Eng. Chem. Fundam. 15 (1976) 59
SOAVE_REDLICH_KWONG = (0.0, 1.0)  # Soave, Chem. Eng. Sci. 27 (1972) 1197

# v/b at the critical point, from the triple root of the cubic: the divide between
# liquid-like and vapour-like where only one root exists.
CRITICAL_VOLUME_RATIO = {PENG_ROBINSON: 3.951373035591, SOAVE_REDLICH_KWONG: 3.847322101863}


class Roots(NamedTuple):
    """Smallest and largest compressibility factor above B, lane by lane.

    Where only one root exists both fields hold it and `two` is False; a lane
    whose A or B is not finite, or whose B is not positive, holds NaN.
    """

    Z_L: np.ndarray
    Z_V: np.ndarray
    two: np.ndarray


def roots(A, B, d=PENG_ROBINSON) -> Roots:
    """Smallest and largest root Z > B of the cubic.

    Parameters
    ----------
    A : float or array
        a P / (R T)^2. [-]
    B : float or array
        b P / (R T). [-]
    d : tuple
        The two constants d1, d2 of the equation of state. [-]

    Returns
    -------
    Roots
        Z_L, Z_V [-] and the mask of lanes with two distinct physical roots,
        in the broadcast shape of A and B.

    Source
    ------
    Deiters, AIChE J. 48 (2002) 882 (largest root first, deflate, polish).
    """
    A, B = np.broadcast_arrays(np.asarray(A, dtype=float), np.asarray(B, dtype=float))
    c2, c1, c0 = _coefficients(A, B, d)
    with np.errstate(all="ignore"):
        w = _largest(c2, c1, c0)
        e0 = -c0 / w
        e1 = (e0 - c1) / w
        square = e1 * e1 - 4.0 * e0
        two = (square >= 0.0) & (e1 < 0.0)
        small = 2.0 * e0 / (np.sqrt(np.where(two, square, 0.0)) - e1)
        small = _polish(small, c2, c1, c0)
        two &= np.isfinite(small) & (small > 0.0) & (small < w)
        bad = ~(np.isfinite(w) & (w > 0.0) & (B > 0.0))
    w = np.where(bad, np.nan, w)
    two &= ~bad
    return Roots(B + np.where(two, small, w), B + w, two)


def Z_of_phase(A, B, phase: str, d=PENG_ROBINSON):
    """Compressibility factor of one phase: the smallest root for 'L', the largest for 'V'.

    Parameters
    ----------
    A : float or array
        a P / (R T)^2. [-]
    B : float or array
        b P / (R T). [-]
    phase : str
        'L' or 'V'.
    d : tuple
        The two constants d1, d2 of the equation of state. [-]

    Returns
    -------
    array
        Z [-]; the only root where there is one, NaN where A or B is no number.

    Source
    ------
    As `roots`.
    """
    if phase == "L":
        return roots(A, B, d).Z_L
    A, B = np.asarray(A, dtype=float), np.asarray(B, dtype=float)
    with np.errstate(all="ignore"):
        w = _largest(*_coefficients(A, B, d))
        return np.where((w > 0.0) & (B > 0.0), B + w, np.nan)


def _coefficients(A, B, d):
    """Coefficients of w^2, w and 1 in the gap form of the cubic."""
    s, p = d[0] + d[1], d[0] * d[1]
    if d == PENG_ROBINSON:
        s, p = 2.0, -1.0  # exact; the product of the two surds is not
    BB = (1.0 + s + p) * B * B
    return (2.0 + s) * B - 1.0, A - (2.0 + s) * B + BB, -BB


def _largest(c2, c1, c0):
    """Largest real root: in closed form, good to some 1e-8, then polished."""
    return _polish(_closed_form(c2, c1, c0), c2, c1, c0)


def _closed_form(c2, c1, c0):
    shift = c2 / 3.0
    square = shift * shift
    Q = square - c1 / 3.0
    R = shift * (square - 0.5 * c1) + 0.5 * c0
    bend = Q * Q * Q - R * R
    three = bend > 0.0
    every = three.all()
    if every:
        return _largest_of_three(Q, R, bend) - shift
    root = np.sqrt(np.maximum(-bend, 0.0))
    S = np.cbrt(np.where(R > 0.0, -R - root, root - R))
    w = S + Q / np.where(S == 0.0, np.inf, S) - shift
    if three.any():
        w = np.where(three, _largest_of_three(Q, R, np.maximum(bend, 0.0)) - shift, w)
    return w


def _largest_of_three(Q, R, bend):
    return -2.0 * np.sqrt(Q) * np.cos((np.arctan2(np.sqrt(bend), R) + 2.0 * np.pi) / 3.0)


def _polish(w, c2, c1, c0):
    """One Newton step, taken only where it is small: a step that is large marks a multiple root."""
    a = w + c2
    b = a * w + c1
    step = (b * w + c0) / ((w + a) * w + b)
    return np.where(np.abs(step) < 0.05 * np.abs(w), w - step, w)
