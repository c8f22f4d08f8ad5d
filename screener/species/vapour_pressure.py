"""Choice of a vapour-pressure curve among the published ones, and its fit.

Rule, in this order:

1. candidates are the reference equations, wide correlations and Antoine equations of
   `library.PSAT_SOURCES`; never corresponding states, never a boiling point alone;
2. a curve that misses 1 atm at the normal boiling point by more than 4 % is rejected;
3. curves that coincide within 0.05 % wherever they overlap are one data set and count once;
4. a curve more than 3 % off where three others agree within 2 % is rejected;
5. a reference equation within 3 % of the median of three or more is taken;
6. otherwise, of the curves that cover as much of 250-400 K as any (within 60 K), the first in
   the list whose mean distance from the median is within 0.5 % of the smallest; without
   three curves to form a median, the first in the list.

Where the chosen curve is not valid, it is continued by the geometric mean of two Wagner
forms through the critical point and the last valid point (upwards also through 1 atm at the
boiling point). Where heats of the liquid are known its cold end is then correlated with them
(`cold`), and the band is what that leaves uncertain; otherwise the band is twice half the
distance of the two forms, or twice what the blind test finds if that is more.
tests/species/test_continuation.py measures all of it on species whose curve is known. A
reference equation keeps its vapour pressure.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.species import cold, fits, forms, heats, library

STORAGE = np.arange(250.0, 350.1, 5.0)  # [K] where disagreement is stated
COMPARED = np.arange(250.0, 400.1, 5.0)  # [K] where candidates are weighed against each other
BOILING = 0.04  # [-] largest miss of 1 atm at the normal boiling point; our choice
SAME = 5e-4  # [-] curves closer than this are one data set; our choice
OUTLIER, AGREE = 0.03, 0.02  # [-] rule 4; our choice
NEAR_MEDIAN = 0.03  # [-] rule 5; our choice
REACH, CLOSE = 60.0, 0.005  # [K], [-] rule 6; our choice
WINDOW = 120.0  # [K] stretch of a curve that its continuation is fitted to; our choice
LIGHT = 340.0  # [K] species with Tc below this are fitted on their own saturation range; our choice
LOWEST = (
    200.0  # [K] curves are continued down to here (flash points of light species lie near 215 K); our choice
)
DENIED = 0.02  # [-] four standard deviations of a handbook heat of vaporisation
ATMOSPHERE = 101325.0  # [Pa] the boiling points of the library are at 1 atm
REFERENCE = ("iapws-2007", "helmholtz")


class NoData(LookupError):
    """A property without which a species cannot be used is in no library."""


@dataclass(frozen=True)
class VapourPressure:
    """The chosen vapour-pressure curve of one species, fitted; temperatures [K], errors [-]."""

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
    heats: str
    note: str


def _gap(values, others, where=slice(None)):
    """Largest relative difference where both are known [-]; None where they never are."""
    values, others = values[where], others[where]
    both = np.isfinite(values) & np.isfinite(others)
    return float(np.max(np.abs(values[both] / others[both] - 1.0))) if both.any() else None


def _misses_boiling(candidate, Tb):
    if Tb is None or not candidate.low <= Tb <= candidate.high:
        return False
    return abs(candidate.at(np.array([Tb]))[0] / ATMOSPHERE - 1.0) > BOILING


def _distinct(candidates):
    """Candidates and their values (k, n) over the compared range [Pa], one per data set."""
    kept, table = [], []
    for c in candidates:
        values = c.at(COMPARED)
        gaps = [g for g in (_gap(values, t) for t in table) if g is not None]
        if not any(g < SAME for g in gaps):
            kept.append(c)
            table.append(values)
    return kept, np.array(table).reshape(len(kept), len(COMPARED))


def _outliers(kept, table):
    """Indices of the curves that rule 4 rejects."""
    bad = []
    for i in range(len(kept)):
        others = np.delete(table, i, axis=0)
        at = np.isfinite(table[i]) & (np.isfinite(others).sum(axis=0) >= 3)
        if at.any():
            low, high = np.nanmin(others[:, at], axis=0), np.nanmax(others[:, at], axis=0)
            off = np.abs(table[i, at] / (0.5 * (low + high)) - 1.0) > OUTLIER
            if np.any((high / low - 1.0 < AGREE) & off):
                bad.append(i)
    return bad


def _pick(kept, table, alive):
    """Index of the curve that rules 5 and 6 take."""
    crowd = np.isfinite(table[alive]).sum(axis=0) >= 3
    median = np.full(len(COMPARED), np.nan)
    median[crowd] = np.nanmedian(table[alive][:, crowd], axis=0)
    for i in alive:
        if kept[i].source in REFERENCE and (_gap(table[i], median) or 0.0) <= NEAR_MEDIAN:
            return i
    reach = {i: min(kept[i].high, COMPARED[-1]) - max(kept[i].low, COMPARED[0]) for i in alive}
    wide = [i for i in alive if reach[i] >= max(reach.values()) - REACH]
    off = {i: np.abs(table[i] / median - 1.0) for i in wide}
    off = {i: float(np.nanmean(o)) if np.isfinite(o).any() else 0.0 for i, o in off.items()}
    return next(i for i in wide if off[i] <= min(off.values()) + CLOSE)


def choose_vapour_pressure(cas, Tc, Pc, Tb=None, prefer=None, thermal=None):
    """Choose and fit the vapour-pressure curve of a species.

    Tc [K], Pc [Pa], Tb [K] or None; thermal the `heats.Thermal` that sets its cold end, or None.
    `prefer` names a method to take against the rules; the
    caller keeps the reason. NoData when there is no curve.
    """
    candidates = library.vapour_pressures(cas)
    if not candidates:
        raise NoData(f"{cas}: no vapour-pressure curve")
    off = [c for c in candidates if _misses_boiling(c, Tb)]
    if len(off) == len(candidates):
        off = []  # then the boiling point is as doubtful as the curves
    kept, table = _distinct([c for c in candidates if c not in off])
    bad = _outliers(kept, table)
    alive = [i for i in range(len(kept)) if i not in bad]
    chosen = kept[_pick(kept, table, alive)]
    if prefer is not None:
        chosen = next(c for c in candidates if c.method == prefer)
    rejected = [c.method for c in off] + [kept[i].method for i in bad]
    others = [(kept[i], table[i]) for i in alive if kept[i] is not chosen]
    return _fit(chosen, others, rejected, Tc, Pc, Tb, prefer is not None, thermal)


def continuations(T, P, Tc, Pc, at, Tb=None):
    """Two continuations [Pa] of points T [K], P [Pa] to temperatures `at` [K], below or above all points.

    Wagner forms of three and four terms through the critical point Tc [K], Pc [Pa], shifted
    to meet the last point. With a boiling point Tb [K] above the points they also bend to 1 atm
    there: it counts as much as half the points, and the shift fades out towards it.
    """

    def terms(x, count):
        s = 1.0 - np.asarray(x) / Tc
        return np.stack([s, s**1.5, s**2.5, s**5.0][:count], axis=1) * (Tc / np.asarray(x))[:, None]

    seam = 0 if np.max(at) <= T[0] else len(T) - 1
    fade, fit_T, fit_P = np.ones_like(at), T, P
    if Tb is not None and seam and T[-1] < Tb - 5.0:
        fade = np.clip((Tb - at) / (Tb - T[-1]), 0.0, 1.0)
        fit_T = np.concatenate([T, np.full(len(T) // 2, Tb)])
        fit_P = np.concatenate([P, np.full(len(T) // 2, ATMOSPHERE)])
    lines = []
    for count in (3, 4):
        solution = np.linalg.lstsq(terms(fit_T, count), np.log(fit_P / Pc), rcond=None)[0]
        miss = np.log(P[seam] / Pc) - (terms(T[[seam]], count) @ solution)[0]
        lines.append(Pc * np.exp(terms(at, count) @ solution + miss * fade))
    return lines


def _points(chosen, Tc, Pc, Tb):
    """Points T [K], P [Pa] of the chosen curve with its continuations, its first valid T [K], and (n,) [-]
    half the distance of the two continuations below it."""
    low = max(LOWEST, 0.35 * Tc) if Tc > LIGHT else max(0.5 * Tc, chosen.low)
    high = min(0.98 * Tc, max(450.0, (Tb or 0.0) + 30.0, 0.75 * Tc))
    T = np.linspace(max(low, chosen.low), min(high, chosen.high), 120)
    P = chosen.at(T)
    T, P = T[np.isfinite(P)], P[np.isfinite(P)]
    if len(T) < 20:
        raise NoData(f"{chosen.method}: too little of the curve lies in the range")
    first = float(T[0])
    if T[-1] < high - 0.5:
        at = np.linspace(T[-1] + 1.0, high, 60)
        lines = continuations(T[T >= T[-1] - WINDOW], P[T >= T[-1] - WINDOW], Tc, Pc, at, Tb)
        T, P = np.concatenate([T, at]), np.concatenate([P, np.sqrt(lines[0] * lines[1])])
    if first > low + 0.5:
        at = np.arange(low, first, 2.0)
        lines = continuations(T[T <= first + WINDOW], P[T <= first + WINDOW], Tc, Pc, at)
        half = np.concatenate([0.5 * np.abs(lines[0] / lines[1] - 1.0), np.zeros(len(T))])
        T, P = np.concatenate([at, T]), np.concatenate([np.sqrt(lines[0] * lines[1]), P])
        return T, P, first, half
    return T, P, first, np.zeros(len(T))


def _with_heats(chosen, others, points, thermal, Tc, Pc):
    """P [Pa] and the band [-] of points (T, P, first, half), the cold end correlated with heats if there are any."""
    T, P, first, half = points
    if thermal is not None and chosen.source in REFERENCE:
        known = thermal.capacity is not None
        return (cold.reference_with_capacity(T, P, thermal, Tc, Pc) if known else P), np.zeros(len(T)), False
    if thermal is not None and (thermal.heat is not None or thermal.capacity is not None):
        apart = np.full(len(T), np.nan)
        for c, _ in others:
            apart = np.fmax(apart, 0.5 * np.abs(c.at(T) / P - 1.0))
        found = cold.correlated(T, P, first, half, apart, thermal, Tc, Pc)
        if found is not None:
            return found.P, found.band, True
    return P, np.where(first > T, cold.continued_band(T, first, half), 0.0), False


def _fit(chosen, others, rejected, Tc, Pc, Tb, by_hand, thermal=None):
    points = _points(chosen, Tc, Pc, Tb)
    T, first = points[0], points[2]
    P, band, by_heats = _with_heats(chosen, others, points, thermal, Tc, Pc)
    coefficients, error = fits.psat_coefficients(T, P)
    inside = (STORAGE[0] <= T) & (STORAGE[-1] >= T)
    extension = float(np.max(band[inside], initial=0.0))
    if by_heats:
        others = [(chosen, chosen.at(COMPARED)), *others]  # the curve as published counts among the others
    gaps, denied = _apart(others, coefficients, T, thermal if by_heats else None)
    spread, worst = max(gaps, default=(None, ""))
    words = []
    if by_hand:
        words.append("chosen by hand")
    if spread is None or (by_heats and len(gaps) < 2 and not denied):
        words.append("no second curve within 250-350 K")
    if spread is not None and spread > 0.03:
        words.append(f"{worst} differs by {100 * spread:.1f} %")
    if min([c.low for c, _ in others] + [chosen.low]) >= 300.0:
        words.append("no curve reaches below 300 K")
    if first > STORAGE[0] + 0.5:
        words.append(f"continued below {first:.0f} K")
    if by_heats:
        words.append("cold end by heats")
    if denied:
        words.append("heats deny " + " ".join(denied))
    if rejected:
        words.append("rejected " + " ".join(rejected))
    return VapourPressure(
        coefficients, float(T[0]), float(T[-1]), chosen.method, chosen.source, chosen.low, chosen.high,
        error, spread, extension, thermal.words if by_heats else "", "; ".join(words),
    )  # fmt: skip


def _apart(others, coefficients, T, thermal):
    """(largest relative distance [-], method) of other curves within 250-350 K, and those the heats deny.

    Where slope and bend are known, a curve whose slope at 25 degC is more than DENIED off is denied.
    """
    known = (COMPARED >= T[0]) & (COMPARED <= min(T[-1], STORAGE[-1]))
    reference = np.full(len(COMPARED), np.nan)
    reference[known] = forms.psat(coefficients, COMPARED[known])
    gaps, denied = [], []
    for c, values in others:
        gap = _gap(values, reference)
        if gap is None:
            continue
        ends = np.clip(heats.T_TABLE + np.array([-2.0, 2.0]), c.low, c.high)
        rise, wanted = np.log(c.at(ends)), np.log(forms.psat(coefficients, ends))
        off = abs((rise[1] - rise[0]) / (wanted[1] - wanted[0]) - 1.0) if ends[1] > ends[0] else 0.0
        if thermal is not None and thermal.both and off > DENIED:
            denied.append(c.method)
        else:
            gaps.append((gap, c.method))
    return gaps, denied
