"""Vapour pressures and heats of one liquid in one curve.

A vapour pressure below its measured range is fixed by what the liquid does with heat: the heat of
vaporisation is the slope of the curve and the liquid heat capacity its bend. Both are taken together
with the measured stretch, by weighted least squares of

    ln P = c0 + c1/t + c2 ln t + c3 t + c4 t^2,   t = T / 300 K

(a heat capacity of vaporisation that is quadratic in T), between the equation of state's own
compressibilities of vapour and liquid, so that the equation with an alpha fitted to the
curve has these heats. Solved by Newton, the bend's slope being exact but for the pressure terms.

Source: V. Ruzicka, V. Majer, J. Phys. Chem. Ref. Data 23 (1994) 1-39 (method: simultaneous
correlation of vapour pressures and related thermal data); the form and the weights are ours.
"""

from __future__ import annotations

import numpy as np

from screener.ground.constants import R
from screener.species import forms, pure

STEP = 2.0  # [K] for the slopes of alpha along saturation
NEWTON = 8
ENOUGH = 1e-6  # [-] of ln P: the last step; thousandths of the weights
INDEPENDENT = 3.0  # our choice


def basis(T):
    """Terms of ln P and their first and second slopes in T: three arrays (n, 5), T in [K]."""
    t = np.asarray(T, dtype=float) / forms.T_SCALE
    one, zero, s = np.ones_like(t), np.zeros_like(t), forms.T_SCALE
    return (
        np.stack([one, 1.0 / t, np.log(t), t, t**2], axis=-1),
        np.stack([zero, -1.0 / t**2, 1.0 / t, one, 2.0 * t], axis=-1) / s,
        np.stack([zero, 2.0 / t**3, -1.0 / t**2, zero, 2.0 * one], axis=-1) / s**2,
    )


def equation_at(T, ln_P, Tc, Pc):
    """What the equation says at saturation points T [K], ln P: Zv - Zl [-], departure of the liquid Cp [J/(mol K)].

    ln_P (3, n) at T - STEP, T and T + STEP.
    """
    three = np.stack([T - STEP, T, T + STEP])
    with np.errstate(all="ignore"):
        return _equation_at(T, ln_P, *pure.alpha_at_saturation(three / Tc, np.exp(ln_P) / Pc), Tc, Pc)


def _equation_at(T, ln_P, alpha, _, Tc, Pc):
    a = pure.OMEGA_A / pure.OMEGA_B * alpha[1] * Tc / T
    B = pure.OMEGA_B * np.exp(ln_P[1]) * Tc / (Pc * T)
    liquid, vapour = pure.liquid_root(a, B), pure.vapour_root(a, B)
    # a(T) / (b R) = OMEGA_A / OMEGA_B Tc alpha(T): its slopes give the residual heat capacity
    scale = pure.OMEGA_A / pure.OMEGA_B * Tc
    slope = scale * (alpha[2] - alpha[0]) / (2.0 * STEP)
    bend = scale * (alpha[2] - 2.0 * alpha[1] + alpha[0]) / STEP**2
    D1, D2 = pure.D1, pure.D2
    q = (liquid + D1) * (liquid + D2)
    volume = T * bend * np.log((liquid + D2) / (liquid + D1)) / (D2 - D1)
    dP_dT = 1.0 / (liquid - 1.0) - slope / q
    dP_dv = -T / (liquid - 1.0) ** 2 + scale * alpha[1] * (2.0 * liquid + D1 + D2) / q**2
    return B * (vapour - liquid), R * (volume - 1.0 - T * dP_dT**2 / dP_dv)


def _rows(c, thermal, Tc, Pc):
    """Rows and right-hand sides of the heats, linear about the coefficients c."""
    out = []
    for one, is_heat in ((thermal.heat, True), (thermal.capacity, False)):
        if one is None:
            continue
        T = one.T
        f, f1, f2 = basis(T)
        ln_P = np.stack([basis(T - STEP)[0] @ c, f @ c, basis(T + STEP)[0] @ c])
        dZ, departure = equation_at(T, ln_P, Tc, Pc)
        if is_heat:
            row, now = R * T[:, None] ** 2 * dZ[:, None] * f1, R * T**2 * dZ * (f1 @ c)
        else:
            row = -R * dZ[:, None] * (2.0 * T[:, None] * f1 + T[:, None] ** 2 * f2)
            now = forms.cp_ideal(thermal.cp_ideal, T) + departure
        # the points of one table share their error: all of them count as at most so many
        weight = 1.0 / (one.deviation * one.value * np.sqrt(max(len(T) / INDEPENDENT, 1.0)))
        out.append((row * weight[:, None], (one.value - now) * weight))
    return out


def capacity_miss(c, thermal, Tc, Pc):
    """Mean miss [-] of the liquid heat capacity of the equation on the curve of coefficients c."""
    T = thermal.capacity.T
    ln_P = np.stack([basis(t)[0] @ c for t in (T - STEP, T, T + STEP)])
    found = forms.cp_ideal(thermal.cp_ideal, T) + equation_at(T, ln_P, Tc, Pc)[1]
    return float(np.mean(np.abs(found / thermal.capacity.value - 1.0)))


def correlate(T, P, deviation, thermal, Tc, Pc):
    """Coefficients (5,) of ln P that hold points T [K], P [Pa] and heats, and their covariance (5, 5).

    deviation (n,) [-] of each point; thermal is a `heats.Thermal`; Tc [K], Pc [Pa]. None where it does not end.
    """
    f, w = basis(T)[0], 1.0 / deviation
    size = np.abs(f).max(axis=0)
    points, wanted = f * w[:, None], np.log(P) * w
    c = np.linalg.lstsq(points / size, wanted, rcond=1e-13)[0] / size
    for _ in range(NEWTON):
        more = _rows(c, thermal, Tc, Pc)
        matrix = np.concatenate([points, *(row for row, _ in more)]) / size
        right = np.concatenate([wanted - points @ c, *(miss for _, miss in more)])
        if not np.all(np.isfinite(matrix)) or not np.all(np.isfinite(right)):
            return None
        step = np.linalg.lstsq(matrix, right, rcond=1e-13)[0] / size
        c = c + step
        if np.max(np.abs(f @ step)) < ENOUGH:
            inverse = np.linalg.pinv(matrix.T @ matrix, rcond=1e-26)
            return c, inverse / np.outer(size, size)
    return None
