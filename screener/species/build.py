"""From a CAS number to the numbers of a species: the choices between sources, and the fits.

The same functions make the shipped tables (data/made_by/species.py) and a species that
is outside them (find_live). Choices are by the rules written in each docstring.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.ground.constants import R
from screener.species import fits, forms, library, pure

STORAGE = np.arange(250.0, 350.1, 5.0)  # [K] where vapour-pressure curves are compared
SAME = 5e-4  # curves closer than this everywhere are one measurement set; our choice
OUTLIER, AGREE = 0.03, 0.02  # a curve 3 % off three that agree within 2 % is rejected; our choice
NEAR_MEDIAN = 0.03  # the chosen curve may not stand further off the median of three or more; our choice
LIGHT = 340.0  # [K] Tc below which a species is fitted on its own saturation range


class NoCurve(LookupError):
    """No usable vapour-pressure curve or density."""


@dataclass(frozen=True)
class VapourPressure:
    """The chosen vapour-pressure curve of one species, fitted (see `choose_vapour_pressure`)."""

    coefficients: np.ndarray
    T_low: float
    T_high: float
    method: str
    source: str
    source_low: float
    source_high: float
    fit_error: float
    spread: float | None
    extension: float
    note: str


def _gap(values, others):
    """Largest relative difference where both are known [-]; None where they never are."""
    both = np.isfinite(values) & np.isfinite(others)
    return float(np.max(np.abs(values[both] / others[both] - 1.0))) if both.any() else None


def _comparison(candidates):
    """Values of each candidate over the storage range, with repeats of one data set dropped."""
    kept, table = [], []
    for c in candidates:
        values = c.at(STORAGE)
        gaps = [g for g in (_gap(values, t) for t in table) if g is not None]
        if np.isfinite(values).any() and not any(g < SAME for g in gaps):
            kept.append(c)
            table.append(values)
    return kept, np.array(table).reshape(len(kept), len(STORAGE))


def _outliers(kept, table):
    """Names of curves more than 3 % off where at least three others agree within 2 %."""
    bad = []
    for i, c in enumerate(kept):
        others = np.delete(table, i, axis=0)
        count = np.isfinite(others).sum(axis=0)
        at = np.isfinite(table[i]) & (count >= 3)
        if at.any():
            low, high = np.nanmin(others[:, at], axis=0), np.nanmax(others[:, at], axis=0)
            if np.any((high / low - 1.0 < AGREE) & (np.abs(table[i, at] / (0.5 * (low + high)) - 1.0) > OUTLIER)):
                bad.append(c.method)
    return bad


def _continuations(T, P, Tc, Pc, at):
    """Two continuations of points T [K], P [Pa] to temperatures `at`: Wagner forms of three and four terms.

    Both run through the critical point. On twelve species with known curves the one lies
    above and the other below the truth (see data/species/vapour_pressure.toml).
    """

    def terms(x, count):
        s = 1.0 - np.asarray(x) / Tc
        return np.stack([s, s**1.5, s**2.5, s**5.0][:count], axis=1) * (Tc / np.asarray(x))[:, None]

    seam = T[0] if np.max(at) <= T[0] else T[-1]
    lines = []
    for count in (3, 4):
        solution = np.linalg.lstsq(terms(T, count), np.log(P / Pc), rcond=None)[0]
        miss = np.log(P[T == seam][0] / Pc) - terms(np.array([seam]), count)[0] @ solution
        lines.append(Pc * np.exp(terms(at, count) @ solution + miss))
    return lines


def choose_vapour_pressure(cas, Tc, Pc, Tb=None, prefer=None):
    """Choose and fit the vapour-pressure curve of a species.

    Rule: candidates in the order of `library.PSAT_SOURCES` (reference equations, wide
    correlations, Antoine equations); never corresponding states or a boiling point alone.
    Curves that coincide within 0.05 % count once. A curve more than 3 % off where three
    others agree within 2 % is rejected. The first left that stands within 3 % of the median (where
    three or more are valid) is chosen. `prefer` names a method to take instead, with a reason kept
    by the caller. Below and above its validity the curve is continued by the mean of two
    Wagner forms through the critical point; half their distance is the extension band.
    """
    candidates = library.vapour_pressures(cas)
    if not candidates:
        raise NoCurve(f"{cas}: no vapour-pressure curve")
    kept, table = _comparison(candidates)
    rejected = _outliers(kept, table)
    alive = [i for i, c in enumerate(kept) if c.method not in rejected]
    chosen = candidates[0]
    if alive:
        crowd = np.isfinite(table[alive]).sum(axis=0) >= 3
        median = np.full(len(STORAGE), np.nan)
        median[crowd] = np.nanmedian(table[alive][:, crowd], axis=0)
        near = [i for i in alive if (_gap(table[i], median) or 0.0) <= NEAR_MEDIAN]
        chosen = kept[(near or alive)[0]]
    if prefer is not None:
        chosen = next(c for c in candidates if c.method == prefer)
    return _fit_curve(chosen, kept, table, rejected, Tc, Pc, Tb, prefer)


def _fit_curve(chosen, kept, table, rejected, Tc, Pc, Tb, prefer):
    low = max(230.0, 0.35 * Tc) if Tc > LIGHT else max(0.5 * Tc, chosen.low)
    high = min(0.98 * Tc, max(450.0, (Tb or 0.0) + 30.0, 0.75 * Tc))
    inside = np.linspace(max(low, chosen.low), min(high, chosen.high, 0.98 * Tc), 120)
    P = chosen.at(inside)
    inside, P = inside[np.isfinite(P)], P[np.isfinite(P)]
    if len(inside) < 20:
        raise NoCurve(f"{chosen.method}: too little of the curve lies in the range")
    T, value, extension = inside, P, 0.0
    near_low, near_high = inside <= inside[0] + 120.0, inside >= inside[-1] - 120.0
    if inside[0] > low + 0.5:
        below = np.arange(low, inside[0], 2.0)
        lines = _continuations(inside[near_low], P[near_low], Tc, Pc, below)
        stored = below >= STORAGE[0]
        if stored.any():
            extension = float(np.max(0.5 * np.abs(lines[0] / lines[1] - 1.0)[stored]))
        T, value = np.concatenate([below, T]), np.concatenate([np.sqrt(lines[0] * lines[1]), value])
    if inside[-1] < high - 0.5:
        above = np.linspace(inside[-1] + 1.0, high, 60)
        lines = _continuations(inside[near_high], P[near_high], Tc, Pc, above)
        T, value = np.concatenate([T, above]), np.concatenate([value, np.sqrt(lines[0] * lines[1])])
    coefficients, error = fits.psat_coefficients(T, value)
    known = (STORAGE >= T[0]) & (STORAGE <= T[-1])
    reference = np.where(known, forms.psat(coefficients, np.clip(STORAGE, T[0], T[-1])), np.nan)
    spread, worst = None, ""
    for c, values in zip(kept, table):
        gap = _gap(values, reference)
        if c.method == chosen.method or c.method in rejected or gap is None:
            continue
        if spread is None or gap > spread:
            spread, worst = gap, c.method
    note = _note(chosen, spread, worst, rejected, kept, inside[0], prefer)
    return VapourPressure(
        coefficients, float(T[0]), float(T[-1]), chosen.method, chosen.source, chosen.low, chosen.high,
        error, spread, extension, note,
    )  # fmt: skip


def _note(chosen, spread, worst, rejected, kept, low, prefer):
    """Words on the evidence of a curve."""
    parts = []
    if prefer:
        parts.append("chosen by hand")
    if spread is None:
        parts.append("no second curve within 250-350 K")
    elif spread > 0.03:
        parts.append(f"{worst} differs by {100 * spread:.1f} %")
    if min([c.low for c in kept] + [chosen.low]) >= 300.0:
        parts.append("no curve reaches below 300 K")
    if low > 250.5:
        parts.append(f"continued below {low:.0f} K")
    if rejected:
        parts.append("rejected " + " ".join(rejected))
    return "; ".join(parts)


def fit_alpha(curve, Tc, Pc):
    """Alpha constants, and mean and worst relative miss of the vapour pressure of the equation [-].

    Fitted over 230-400 K clipped to 0.9 Tc (light species: up to 0.98 Tc), with a fifth of
    the weight from 400 K to 0.75 Tc for heavy ones. The misses are found by solving the
    equation for its vapour pressure between 250 and 350 K (light: over the fitted range).
    """
    light = Tc <= LIGHT
    top = 0.98 * Tc if light else min(400.0, 0.9 * Tc)
    T = np.linspace(curve.T_low, top, 70)
    weight = np.ones_like(T)
    if not light and 0.75 * Tc > top:
        more = np.linspace(top, min(0.75 * Tc, curve.T_high), 12)[1:]
        T, weight = np.concatenate([T, more]), np.concatenate([weight, np.full(len(more), 0.2)])
    P = forms.psat(curve.coefficients, T)
    constants = fits.alpha_constants(T, P, Tc, Pc, weight)
    check = np.linspace(curve.T_low, top, 40) if light else np.linspace(250.0, min(350.0, 0.9 * Tc), 41)
    check = check[check >= curve.T_low]
    wanted = forms.psat(curve.coefficients, check)
    got = pure.psat_of_alpha(check, forms.alpha(check / Tc, *constants), Tc, Pc, wanted)
    miss = np.abs(got / wanted - 1.0)
    return constants, float(np.mean(miss)), float(np.max(miss))


def choose_density(cas, MW, Tc, Pc):
    """Points T [K], saturated liquid density [kg/m3], method, source key, note.

    Rule: candidates in the order of `library.DENSITY_SOURCES`; a candidate more than 2 % off
    the CRC Handbook density, or more than 2 % off two others that agree within 1 %, is passed
    over. With no candidate the handbook density is continued by the Rackett equation,
    anchored on it.
    """
    T = np.linspace(250.0, 350.0, 41) if Tc > LIGHT else np.linspace(0.55 * Tc, 0.9 * Tc, 41)
    T = T[T <= 0.9 * Tc]
    point = library.density_at_a_point(cas) if Tc > LIGHT else None
    candidates = [c for c in library.liquid_densities(cas, MW, Tc, Pc) if np.isfinite(c.at(T)).sum() >= 10]
    passed = []
    for c in candidates:
        value = c.at(T)
        middle = T[np.isfinite(value)][len(T[np.isfinite(value)]) // 2]
        if point is not None:
            off = abs(c.at(np.array([point[1]]))[0] / point[0] - 1.0)
        else:
            others = [o.at(np.array([middle]))[0] for o in candidates if o is not c]
            others = [o for o in others if np.isfinite(o)]
            agree = len(others) > 1 and max(others) / min(others) < 1.01
            off = abs(c.at(np.array([middle]))[0] / np.mean(others) - 1.0) if agree else 0.0
        if np.isfinite(off) and off > 0.02:
            passed.append(c.method)
            continue
        ok = np.isfinite(value)
        return T[ok], value[ok], c.method, c.source, ("passed over " + " ".join(passed)) if passed else ""
    if point is None:
        raise NoCurve(f"{cas}: no liquid density")
    rho, T0 = point
    ra = (MW / rho * Pc / (R * Tc)) ** (1.0 / (1.0 + (1.0 - T0 / Tc) ** (2.0 / 7.0)))
    value = MW / (R * Tc / Pc * ra ** (1.0 + (1.0 - T / Tc) ** (2.0 / 7.0)))
    return T, value, "RACKETT_FROM_POINT", "crc-handbook", f"{rho:.1f} kg/m3 at {T0 - 273.15:.0f} degC continued"


def fit_density(T, rho, MW, Tc, Pc, constants, curve):
    """(c0, c1), mean and worst relative density miss [-], density coefficients.

    The shift is linear in T; constant for species with Tc below 340 K, whose shift would
    otherwise be continued far outside the fit.
    """
    P = np.where(T >= curve.T_low, forms.psat(curve.coefficients, T), 0.0)
    v_pr = pure.liquid_volume(T, np.maximum(P, 1e-9), forms.alpha(T / Tc, *constants), Tc, Pc)
    c0, c1 = fits.translation(T, v_pr, MW / rho, linear=Tc > LIGHT)
    miss = np.abs(MW / (v_pr - c0 - c1 * (T - 298.15)) / rho - 1.0)
    basis = forms.density_basis(T)
    solution = np.linalg.lstsq(basis, rho, rcond=1e-12)[0]
    return (c0, c1), float(np.mean(miss)), float(np.max(miss)), solution


def fit_cp(cas, MW):
    """(a0..a4), method, source key, largest miss [-] of the ideal-gas heat capacity over 200-500 K."""
    T = np.linspace(200.0, 500.0, 61)
    for c in library.cp_ideal(cas, MW):
        value = c.at(T)
        ok = np.isfinite(value)
        if T[ok].max(initial=0.0) >= 450.0 and ok.sum() >= 30:
            coefficients, miss = fits.polynomial(T[ok], value[ok], 4 if T[ok][0] < 260.0 else 2)
            return tuple(coefficients) + (0.0,) * (5 - len(coefficients)), c.method, c.source, miss
    raise NoCurve(f"{cas}: no ideal-gas heat capacity")


def density_at_15(cas, MW, Tc, Pc, Tb, density):
    """Saturated liquid density at 15 degC [kg/m3] and a note.

    A gas without liquid at 15 degC has an effective one: its saturated liquid at the normal
    boiling point.
    """
    if Tc > LIGHT:
        return float(forms.density_basis(288.15) @ density), ""
    for T, words in ((288.15, ""), (Tb, f"effective: no liquid at 15 degC; saturated liquid at {Tb:.1f} K taken")):
        for c in library.liquid_densities(cas, MW, Tc, Pc):
            value = c.at(np.array([T]))[0]
            if np.isfinite(value) and T <= 0.97 * Tc:
                return float(value), words
    raise NoCurve(f"{cas}: no liquid density")
