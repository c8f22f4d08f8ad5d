"""Makes caloric_correlation.md: what the cold ends of the vapour-pressure curves rest on, and their blind test.

Run from the top folder (needs thermo, no network; a minute):

    python -m tests.studies.caloric_correlation
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from functools import lru_cache
from pathlib import Path

import numpy as np

from screener import species
from screener.species import cold, heats, library
from screener.species import vapour_pressure as choice

PAGE = Path(__file__).with_suffix(".md")
NARROW = ("ANTOINE_POLING", "LANDOLT", "WAGNER_MCGARRY", "ANTOINE_WEBBOOK")
HYDROCARBONS = ("paraffin", "isoparaffin", "naphthene", "olefin", "aromatic")
AT = np.array([255.0, 280.0])  # [K]
KINDS = {
    "": "continued", "h": "with heats of vaporisation", "c": "with heat capacities", "hc": "with both",
    "e": "with estimated heat capacities", "he": "with heats of vaporisation and estimated heat capacities",
}  # fmt: skip
DECADES = ((2e4, 1.2e5), (6e3, 2e4), (2e3, 6e3), (6e2, 2e3), (60.0, 6e2), (6.0, 60.0), (0.6, 6.0))  # [Pa]


@dataclass(frozen=True)
class Trial:
    """A narrow curve cut off at its cold end, held against the reference equation: misses and bands at AT [-]."""

    name: str
    method: str
    miss: np.ndarray
    band: np.ndarray


def liquids():
    """Species that are liquid enough at storage temperatures for the study."""
    return [one for one in map(species.find, species.names()) if one.Tc > 400.0]


def trial(one, curve, reference, cut, kinds):
    """One `Trial` of a published curve without its part below `cut` [K]; None where it teaches nothing.

    kinds: "h" with the heat of vaporisation, "c" with the heat capacity, of the tables that are no reference equation;
    "e" with the estimate of the heat capacity instead (hydrocarbons only).
    """
    first = max(curve.low, cut)
    if curve.high - first < 40.0 or first > cut + 25.0 or choice._misses_boiling(curve, one.Tb):
        return None
    seam = np.array([first])
    if abs(curve.at(seam)[0] / reference.at(seam)[0] - 1.0) > 0.03:
        return None  # another substance, or a slip: nothing to learn about the continuation
    known = _heats(one)
    known = replace(
        known, heat=known.heat if "h" in kinds else None, capacity=known.capacity if "c" in kinds else None
    )
    if ("h" in kinds and known.heat is None) or ("c" in kinds and known.capacity is None):
        return None
    if "e" in kinds:
        if one.family not in HYDROCARBONS:
            return None
        known = replace(known, capacity=heats.estimated(one.Tc, one.omega, one.cp_ideal))
    points = choice._points(replace(curve, low=first), one.Tc, one.Pc, one.Tb)
    P, band, _ = choice._with_heats(curve, [], points, known, one.Tc, one.Pc)
    miss = np.exp(np.interp(AT, points[0], np.log(P))) / reference.at(AT) - 1.0
    return Trial(one.name, curve.method, miss, np.interp(AT, points[0], band))


@lru_cache
def _curves(cas):
    return {c.method: c for c in library.vapour_pressures(cas)}


@lru_cache
def _heats(one):
    return heats.thermal(one.cas, one.MW, one.Tc, one.cp_ideal)


def trials(cut, kinds):
    """All trials of the species that have a reference equation."""
    found = []
    for one in liquids():
        curves = _curves(one.cas)
        if "HEOS_FIT" in curves:
            some = [trial(one, curves[m], curves["HEOS_FIT"], cut, kinds) for m in NARROW if m in curves]
            found += [t for t in some if t is not None]
    return found


def distances():
    """Mean distance [%] of every other curve from the reference equation, by range of pressure."""
    T, found = np.arange(200.0, 420.0, 4.0), {span: [] for span in DECADES}
    for one in liquids():
        curves = {c.method: c for c in library.vapour_pressures(one.cas) if not choice._misses_boiling(c, one.Tb)}
        if "HEOS_FIT" not in curves:
            continue
        wanted = curves["HEOS_FIT"].at(T)
        for method, curve in curves.items():
            if method == "HEOS_FIT":
                continue
            off = 100.0 * np.abs(curve.at(T) / wanted - 1.0)
            for low, high in DECADES:
                inside = (low < wanted) & (high > wanted) & np.isfinite(off)
                if inside.any():
                    found[low, high].append(float(np.mean(off[inside])))
    return found


def tables():
    """Distance [%] at 25 degC of the heats of every table from the reference equations, by table."""
    from thermo import EnthalpyVaporization, HeatCapacityLiquid

    found = {}
    for one in liquids():
        for prop, names in (
            (EnthalpyVaporization(CASRN=one.cas, Tc=one.Tc, extrapolation=None), heats.HEATS),
            (HeatCapacityLiquid(CASRN=one.cas, MW=1e3 * one.MW, Tc=one.Tc, extrapolation=None), heats.CAPACITIES),
        ):
            if not _holds(prop, "HEOS_FIT"):
                continue
            wanted = prop.calculate(298.15, "HEOS_FIT")
            for name in names:
                if _holds(prop, name):
                    found.setdefault(name, []).append(100.0 * abs(prop.calculate(298.15, name) / wanted - 1.0))
    return found


def _holds(prop, method):
    low, high = prop.T_limits.get(method, (1.0, 0.0))
    return low <= 298.15 <= high


def _percentiles(values):
    return " | ".join(f"{p:.2f}" for p in np.percentile(values, (50.0, 68.0, 90.0)))


def blind_lines():
    """Rows of the blind test."""
    for cut in (300.0, 330.0):
        for kinds, word in KINDS.items():
            found = trials(cut, kinds)
            miss = 100.0 * np.array([t.miss for t in found])
            band = 100.0 * np.array([t.band for t in found])
            cells = [f"{np.nanmean(np.abs(miss[:, k])):.2f} | {np.nanmax(np.abs(miss[:, k])):.2f}" for k in (0, 1)]
            known = np.isfinite(miss[:, 0])
            inside = 100.0 * np.mean(np.abs(miss[known, 0]) <= band[known, 0])
            yield f"| {cut:.0f} K | {word} | {len(found)} | {' | '.join(cells)} | {inside:.0f} | {np.mean(band[:, 0]):.1f} |"


def cold_lines():
    """How many curves of the tables the heats have set, by family."""
    for family in sorted({one.family for one in liquids()}):
        some = [one for one in liquids() if one.family == family]
        by_heats = [one for one in some if "cold end by heats" in one.psat_note]
        denied = [one.name for one in some if "heats deny" in one.psat_note]
        yield f"| {family} | {len(some)} | {len(by_heats)} | {', '.join(denied) or '-'} |"


def page() -> str:
    """The whole page."""
    lines = [
        "# Vapour pressures and heats in one curve",
        "",
        "Made by `python -m tests.studies.caloric_correlation`. A vapour-pressure curve below its measured",
        "stretch is set by the heat of vaporisation (its slope) and the liquid heat capacity (its bend), after",
        "V. Ruzicka and V. Majer, J. Phys. Chem. Ref. Data 23 (1994) 1-39. How: screener/species/correlate.py,",
        "cold.py, heats.py; what each kind of evidence weighs is read off the first two tables.",
        "",
        "## How far other published curves lie from the reference equations",
        "",
        f"Percent, mean over the range. Shipped weight: {100 * cold.MEASURED:.1f} % above {cold.LEAST:.0f} Pa,",
        f"{100 * cold.LONE:.1f} % of a curve no other confirms, {100 * cold.PER_DECADE:.1f} % more per decade below.",
        "",
        "| vapour pressure, Pa | curves | 50 in 100 | 68 | 90 |",
        "| --- | --- | --- | --- | --- |",
    ]
    lines += [
        f"| {low:g} to {high:g} | {len(v)} | {_percentiles(v)} |" for (low, high), v in distances().items() if v
    ]
    lines += [
        "",
        "## How far the tables of heats lie from the reference equations at 25 degC",
        "",
        "Percent. One spline of ethylbenzene is a slip (negative); the build passes over what cannot be a liquid's.",
        "",
        "| table | species | 50 in 100 | 68 | 90 | weight |",
        "| --- | --- | --- | --- | --- | --- |",
    ]
    weights = {**heats.HEATS, **heats.CAPACITIES}
    lines += [
        f"| {name} | {len(v)} | {_percentiles(v)} | {100 * weights[name][1]:.1f} |" for name, v in tables().items()
    ]
    lines += [
        "",
        "## Blind test",
        "",
        "Published narrow curves of species that have a reference equation, cut off at 300 or 330 K and set",
        "below by heats that do not come from it. Miss of the vapour pressure, percent; the band is the two",
        "standard deviations that are shipped as `extension`.",
        "",
        "| cut at | below | trials | mean at 255 K | worst | mean at 280 K | worst | within the band, of 100 | band at 255 K |",
        "| --- | --- | --- | --- | --- | --- | --- | --- | --- |",
        *blind_lines(),
        "",
        "## In the tables",
        "",
        "| family | species | cold end by heats | a published curve is denied by them (slope at 25 degC 2 % off) |",
        "| --- | --- | --- | --- |",
        *cold_lines(),
    ]
    return "\n".join(lines) + "\n"


if __name__ == "__main__":
    PAGE.write_text(page(), encoding="utf-8")
    print(PAGE.read_text(encoding="utf-8"))
