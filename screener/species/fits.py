"""Fits of the functional forms to chosen curves. Deterministic, NumPy only."""

from __future__ import annotations

import numpy as np

from screener.species import forms, pure

FALLING = np.geomspace(195.0, 1050.0, 60)  # [K] alpha must fall from each of these to the next; our choice
# alpha [-] stays above the second up to the first [K], so that gases keep some attraction: second virial
# coefficients at 300 K ask for 0.48 (nitrogen, Tr 2.4) and 0.16 (hydrogen, Tr 9); our choice
SUPERCRITICAL = 500.0, 0.1
TWU_ENOUGH = (
    0.0015  # largest relative miss in vapour pressure up to which three constants are kept; our choice
)


def psat_coefficients(T, P, digits=13):
    """Six coefficients of ln P fitted to points T [K], P [Pa], and the largest relative error [-]."""
    basis, ln_P = forms.psat_basis(T), np.log(P)
    size = np.abs(basis).max(axis=0)
    solution = np.linalg.lstsq(basis / size, ln_P, rcond=1e-13)[0] / size
    solution = np.array([float(f"{c:.{digits}g}") for c in solution])
    return solution, float(np.max(np.abs(np.expm1(basis @ solution - ln_P))))


def alpha_constants(T, P, Tc, Pc, weight, five=True):
    """Alpha constants L, M, N, C, D [-] that reproduce points T [K], P [Pa] of a vapour-pressure curve.

    The alpha that makes the equation saturate exactly is found at each point; then
    ln alpha = -h ln Tr + L (1 - Tr^g) [+ C s^3 + D s^4] is linear in all but g, and g is
    searched on a line among the values that let alpha fall with temperature everywhere and
    leave a supercritical gas some attraction. Each point counts by its weight [-] and by
    what an error of alpha does to the vapour pressure there. C and D stay zero where three
    constants are enough, or `five` is false.
    """
    Tr = np.asarray(T) / Tc
    exact, sensitivity = pure.alpha_at_saturation(Tr, np.asarray(P) / Pc)
    good = np.isfinite(exact) & np.isfinite(sensitivity)
    Tr, ln_alpha, sensitivity, weight = Tr[good], np.log(exact[good]), sensitivity[good], weight[good]
    found = []
    for terms in (2, 4) if five else (2,):
        total, error, constants = _search(Tr, ln_alpha, sensitivity, weight, Tc, terms)
        if np.isfinite(total):
            found.append((total, constants))
            if error <= TWU_ENOUGH:
                break
    if not found:
        raise LookupError("no alpha function that falls with temperature fits the vapour-pressure curve")
    return min(found)[1]


def _alpha_basis(Tr, g, terms):
    s = np.maximum(1.0 - Tr, 0.0)
    return np.stack([-np.log(Tr), 1.0 - Tr**g, s**3, s**4][:terms], axis=1)


def _search(Tr, ln_alpha, sensitivity, weight, Tc, terms):
    """Best exponent g on successively finer lines: sum of squares, largest error, constants."""
    falling, end = FALLING / Tc, SUPERCRITICAL[0] / Tc

    def solve(g):
        basis, far = _alpha_basis(Tr, g, terms), _alpha_basis(falling, g, terms)
        w = weight * sensitivity
        solution = np.linalg.lstsq(basis * w[:, None], ln_alpha * w, rcond=1e-12)[0]
        miss = (basis @ solution - ln_alpha) * sensitivity
        beyond = far @ solution
        bad = np.any(np.diff(beyond) > 0.0) or np.interp(end, falling, beyond) < np.log(SUPERCRITICAL[1])
        total = np.inf if bad else float(np.sum((miss * weight) ** 2))
        return total, float(np.abs(miss[weight >= 1.0]).max()), g, solution

    grid = np.geomspace(0.1, 6.0, 60)
    for _ in range(5):
        tried = [solve(g) for g in grid]
        best = int(np.argmin([t[0] for t in tried]))
        grid = np.linspace(grid[max(best - 1, 0)], grid[min(best + 1, len(grid) - 1)], 20)
    total, error, g, solution = tried[best]
    h, L, C, D = (*solution, 0.0, 0.0)[:4]
    return total, error, tuple(float(f"{value:.12g}") for value in (L, g / (g + h), g + h, C, D))


def translation(T, v_pr, v_liquid, linear):
    """c0 [m3/mol] and c1 [m3/(mol K)] of c0 + c1 (T - 298.15 K) = v_pr - v_liquid at T [K]."""
    shift = np.asarray(v_pr) - np.asarray(v_liquid)
    basis = np.stack([np.ones_like(T), np.asarray(T) - 298.15], axis=1) / np.asarray(v_liquid)[:, None]
    if not linear:
        basis = basis[:, :1]
    solution = np.linalg.lstsq(basis, shift / v_liquid, rcond=None)[0]
    c0, c1 = (float(solution[0]), float(solution[1]) if linear else 0.0)
    return float(f"{c0:.10g}"), float(f"{c1:.10g}")


def polynomial(T, value, degree, digits=12):
    """Coefficients a0..a_degree of a polynomial in T [K] fitted to values, and the largest miss [-]."""
    t = np.asarray(T) / forms.T_SCALE
    basis = np.stack([t**k for k in range(degree + 1)], axis=1)
    solution = np.linalg.lstsq(basis / np.asarray(value)[:, None], np.ones_like(t), rcond=None)[0]
    raw = np.array([float(f"{c / forms.T_SCALE**k:.{digits}g}") for k, c in enumerate(solution)])
    fitted = sum(c * np.asarray(T) ** k for k, c in enumerate(raw))
    return raw, float(np.max(np.abs(fitted / value - 1.0)))
