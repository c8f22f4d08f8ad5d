"""Makes data/pairs/water_terms.csv.

Run from the top folder (no network, some five minutes):

    python data/made_by/water_terms.py

Measured and recommended mutual solubilities are those of tests/measured/liquid_liquid/water_hydrocarbon.csv.
Activity coefficients at infinite dilution follow from a solubility x as -ln x / (1 - x)^2, which is exact for a
symmetrical liquid beside a nearly pure one.

- paraffin, isoparaffin: g0, g1 and gn fitted together to water in hexane, octane and isopentane.
- aromatic: g0 from water in benzene; g1 the slope of modified UNIFAC for benzene (the three measured points lie
  within 5 K and agree with it); gn from the UNIFAC of liquid-liquid equilibria for benzene, toluene, m-xylene.
- olefin: g0 from the UNIFAC of liquid-liquid equilibria for 1-hexene; g1 midway between paraffin and aromatic.
- naphthene: water in hexane, times cyclohexane over hexane by the UNIFAC of liquid-liquid equilibria.
- h0, hn: straight lines through Henry constants of hydrocarbons of 4 to 10 carbons in water, the library's
  compilation, points off by more than 1 left out once.
- wet, one number for all families, and HALF of screener/species/water.py: least mean |ln| of computed over
  measured water along the saturation curves of ethanol and water with toluene (two temperatures) and cyclohexane,
  HALF no more than 0.05 (a larger one meets the curves a little better, mean |ln| 0.24 instead of 0.26, and takes the
  term away from the blends with 5 to 10 vol% ethanol that it is for).
"""

from __future__ import annotations

import csv
import itertools
import math
import sys
from dataclasses import replace
from pathlib import Path

import numpy as np

DATA = Path(__file__).resolve().parents[1]
sys.path.insert(0, str(DATA.parent))

from screener.equilibrium import Fluid, water_tolerance
from screener.equilibrium.zero_pressure import ZeroPressure
from screener.species import find, names
from screener.species.water import HALF, M_CH2, N_REFERENCE, T_REFERENCE

MEASURED = DATA.parent / "tests" / "measured" / "liquid_liquid"
WET = np.arange(-1.6, -0.95, 0.1)  # [-] tried
HALVES = (0.01, 0.02, 0.03, 0.05)  # [-] tried; no more than half the alcohols of a blend with 5 vol% ethanol
CURVES = (("toluene", 298.2), ("toluene", 273.2), ("cyclohexane", 298.2))  # each weighs the same
LLE_GROUPS = {  # subgroups of the UNIFAC of liquid-liquid equilibria, Magnussen and others 1981
    "water": {17: 1}, "n-hexane": {1: 2, 2: 4}, "cyclohexane": {2: 6}, "benzene": {9: 6}, "toluene": {9: 5, 11: 1},
    "m-xylene": {9: 4, 11: 2}, "1-hexene": {1: 1, 2: 3, 5: 1},
}  # fmt: skip
HEADER = ("family", "g0", "g1", "gn", "h0", "hn", "wet", "evidence", "source", "note")
LEFT_OUT = 1.0  # [-] distance from the line at which a Henry constant is left out


def rows_of(name: str) -> list[dict[str, str]]:
    """Rows of a measured table."""
    lines = (MEASURED / name).read_text(encoding="utf-8").splitlines()
    return list(csv.DictReader(line for line in lines if not line.startswith("#")))


def measured(solvents) -> list[tuple[float, float, float]]:
    """(n - 6, 1/T - 1/298.15, ln gamma of water) of the rows with these solvents."""
    out = []
    for row in rows_of("water_hydrocarbon.csv"):
        if row["solute"] == "water" and row["solvent"] in solvents:
            x = float(row["x"])
            longer = find(row["solvent"]).MW / M_CH2 - N_REFERENCE
            out.append((longer, 1.0 / float(row["T_K"]) - 1.0 / T_REFERENCE, -math.log(x) / (1.0 - x) ** 2))
    return out


def lle(name: str) -> float:
    """ln gamma of a trace of water at 298.15 K by the UNIFAC of liquid-liquid equilibria."""
    from thermo import unifac

    unifac.load_unifac_ip()
    model = unifac.UNIFAC.from_subgroups(
        T=T_REFERENCE, xs=[1e-9, 1.0 - 1e-9], chemgroups=[LLE_GROUPS["water"], LLE_GROUPS[name]],
        subgroups=unifac.LLEUFSG, interaction_data=unifac.LLEUFIP, version=0,
    )  # fmt: skip
    return math.log(model.gammas()[0])


def slope_of_unifac(name: str) -> float:
    """d ln gamma of a trace of water / d(1/T) between 273 and 323 K by modified UNIFAC. [K]"""
    T = np.array([273.15, 323.15])
    fluid = Fluid.of([name, "water"])
    one = fluid.mixing.excess.unifac.at(T).ln_gamma(np.tile([1.0, 0.0], (2, 1)))[:, 1]
    return float((one[1] - one[0]) / (1.0 / T[1] - 1.0 / T[0]))


def henry(family: str) -> tuple[float, float, int]:
    """h0, hn and how many constants stand behind them."""
    from thermo.interaction_parameters import IPDB

    n, value = [], []
    for name in names():
        one = find(name)
        longer = one.MW / M_CH2 - N_REFERENCE
        if one.family != family or not 3.5 <= one.MW / M_CH2 <= 10.5:
            continue
        for table in ("Sander T dep", "Sander Const"):
            pair = next(
                (k for k in (f"{one.cas} 7732-18-5", f"7732-18-5 {one.cas}") if k in IPDB.tables[table]), None
            )
            if pair:
                constants = IPDB.tables[table][pair]
                n.append(longer)
                value.append(constants["A"] + constants["B"] / T_REFERENCE - math.log(one.psat(T_REFERENCE)))
                break
    n, value = np.array(n), np.array(value)
    near = np.ones(n.size, dtype=bool)
    for _ in range(2):
        hn, h0 = np.polyfit(n[near], value[near], 1)
        near = np.abs(value - h0 - hn * n) < LEFT_OUT
    return float(h0), float(hn), int(near.sum())


def g_rows() -> dict[str, tuple[float, float, float]]:
    """g0, g1, gn of each family."""
    points = np.array(measured({"n-hexane", "n-octane", "isopentane"}))
    matrix = np.column_stack([np.ones(len(points)), points[:, 1], points[:, 0]])
    g0, g1, gn = np.linalg.lstsq(matrix, points[:, 2], rcond=None)[0]
    slope = slope_of_unifac("benzene")
    at_benzene = np.mean([value - slope * at for _, at, value in measured({"benzene"})])
    rings = ["benzene", "toluene", "m-xylene"]
    longer = [find(name).MW / M_CH2 - N_REFERENCE for name in rings]
    ring_n = float(np.polyfit(longer, [lle(name) for name in rings], 1)[0])
    aromatic = float(at_benzene - ring_n * longer[0])
    olefin = lle("1-hexene")
    return {
        "paraffin": (g0, g1, gn), "isoparaffin": (g0, g1, gn),
        "naphthene": (g0 + lle("cyclohexane") - lle("n-hexane"), g1, gn),
        "olefin": (olefin, 0.5 * (g1 + slope), gn), "aromatic": (aromatic, slope, ring_n),
    }  # fmt: skip


NOTES = {
    "paraffin": ("measured", "iupac-solubility", "hexane and octane and isopentane"),
    "isoparaffin": ("measured", "iupac-solubility", "as paraffin; isopentane among the points"),
    "naphthene": ("library thermo 0.6.1", "unifac-lle", "paraffin times cyclohexane over hexane"),
    "olefin": ("library thermo 0.6.1", "unifac-lle", "1-hexene; slope midway between paraffin and aromatic"),
    "aromatic": ("measured", "iupac-solubility", "benzene; carbon number by unifac-lle"),
}  # fmt: skip


def wet_and_half() -> tuple[float, float]:
    """The pair of `wet` and the half that misses the saturation curves of ethanol, hydrocarbon and water least."""
    misses = {pair: 0.0 for pair in itertools.product(WET, HALVES)}
    for hydrocarbon, T in CURVES:
        rows = [
            r
            for r in rows_of("ethanol_hydrocarbon_water.csv")
            if (r["hydrocarbon"], float(r["T_K"])) == (hydrocarbon, T)
        ]
        ethanol, other = (np.array([float(row[k]) for row in rows]) for k in ("x_ethanol", "x_hydrocarbon"))
        z = np.stack([other, ethanol, np.zeros_like(ethanol)], axis=1) / (other + ethanol)[:, None]
        fluid = Fluid.of([hydrocarbon, "ethanol", "water"])
        excess = fluid.mixing.excess
        for wet, half in misses:
            columns = excess.water.columns.copy()
            columns[:, 4] = np.where(columns[:, 4] != 0.0, wet, 0.0)
            term = replace(excess.water, columns=columns, half=half)
            found = water_tolerance(replace(fluid, mixing=ZeroPressure(replace(excess, water=term))), T, z)
            misses[wet, half] += float(np.abs(np.log(found.water / (1.0 - ethanol - other))).mean()) / len(
                CURVES
            )
    for half in HALVES:
        print(f"half {half}: mean |ln| " + " ".join(f"{wet:.2f}:{misses[wet, half]:.3f}" for wet in WET))
    return min(misses, key=misses.get)


def write(wet: float) -> None:
    """Write the table."""
    lines = [
        "# ln gamma at infinite dilution of water in a hydrocarbon (g) and of it in water (h); see the passport"
    ]
    lines.append(",".join(HEADER))
    for family, (g0, g1, gn) in g_rows().items():
        h0, hn, count = henry(family)
        print(
            f"{family:12s} g0 {g0:.3f} g1 {g1:.0f} K gn {gn:.3f}   h0 {h0:.3f} hn {hn:.3f} from {count} constants"
        )
        row = [
            family,
            f"{g0:.4g}",
            f"{g1:.4g}",
            f"{gn:.3g}",
            f"{h0:.4g}",
            f"{hn:.3g}",
            f"{wet:.4g}",
            *NOTES[family],
        ]
        lines.append(",".join(row))
    (DATA / "pairs" / "water_terms.csv").write_text("\n".join(lines) + "\n", encoding="utf-8")


if __name__ == "__main__":
    write(-1.0)  # any value: the curves are met by the pair tried in its stead
    from screener.species import water

    water._families.cache_clear()
    best_wet, best_half = wet_and_half()
    print(f"wet {best_wet:.2f}, half {best_half}; HALF of screener/species/water.py is {HALF}")
    write(best_wet)
