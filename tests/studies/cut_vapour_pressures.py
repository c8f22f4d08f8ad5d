"""Makes cut_vapour_pressures.md: hydrocarbons of the species table treated as petroleum cuts.

Run from the top folder:

    python -m tests.studies.cut_vapour_pressures

Each species gives away nothing but its boiling point (where its own curve passes one
atmosphere) and its density. Critical constants follow after Twu 1984 or Kesler and Lee 1976, then
the vapour pressure by each of the published correlations; it is held against the species'
own curve. What is left is what a cut of unknown chemistry has to expect.
"""

from __future__ import annotations

from pathlib import Path

import numpy as np

from screener.ground.constants import ATMOSPHERE
from screener.species import cut_constants as constants
from screener.species import cut_pressure as pressure
from screener.species import find, names

FILE = Path(__file__).with_suffix(".md")
FAMILIES = ("paraffin", "isoparaffin", "naphthene", "olefin", "aromatic")
BANDS = ((295.0, 350.0), (350.0, 400.0), (400.0, 450.0), (450.0, 500.0), (500.0, 620.0))
T = np.array([250.0, 275.0, 300.0, 325.0, 350.0])


def boiling_point(one):
    """Where the species' own curve passes one atmosphere [K], by bisection."""
    low, high = one.Tb - 20.0, one.Tb + 20.0
    for _ in range(60):
        middle = 0.5 * (low + high)
        low, high = (middle, high) if one.psat(middle) < ATMOSPHERE else (low, middle)
    return 0.5 * (low + high)


def members():
    """Species that take part."""
    found = [find(name) for name in names()]
    return [one for one in found if one.family in FAMILIES and one.Tb > BANDS[0][0] and one.Tc > 400.0]


def misses(one):
    """Relative misses at T by each method, {method: (k,)}; NaN outside the species' own curve."""
    Tb = boiling_point(one)
    SG = float(constants.specific_gravity(one.rho_15))
    twu = constants.critical_temperature_twu_1984(Tb, SG), constants.critical_pressure_twu_1984(Tb, SG)
    lee = (
        constants.critical_temperature_lee_kesler_1976(Tb, SG),
        constants.critical_pressure_lee_kesler_1976(Tb, SG),
    )
    own = one.psat(T)
    return {
        "Ambrose and Walton, Twu": pressure.vapour_pressure_ambrose_walton_1989(T, Tb, *twu) / own - 1.0,
        "Lee and Kesler, Twu": pressure.vapour_pressure_lee_kesler_1975(T, Tb, *twu) / own - 1.0,
        "Lee and Kesler, Kesler and Lee": pressure.vapour_pressure_lee_kesler_1975(T, Tb, *lee) / own - 1.0,
        "Maxwell and Bonnell": pressure.vapour_pressure_maxwell_bonnell_1957(T, Tb, SG) / own - 1.0,
    }


def table():
    """{(band, method): (number, rms at 300 K, rms at 350 K, worst rms of 250 to 350 K)}, all [-]."""
    every = [(one.Tb, misses(one)) for one in members()]
    result = {}
    for low, high in BANDS:
        chosen = [found for Tb, found in every if low <= Tb < high]
        for method in chosen[0]:
            square = np.nanmean(np.array([found[method] for found in chosen]) ** 2, axis=0)
            rms = np.sqrt(square)
            result[(low, high), method] = (len(chosen), rms[2], rms[4], rms.max())
    return result


def by_family():
    """{(family, method): (number, mean, rms)} at 300 K of the species that boil below 450 K. [-]"""
    result = {}
    for family in FAMILIES:
        chosen = [misses(one) for one in members() if one.family == family and one.Tb < 450.0]
        for method in chosen[0]:
            at = np.array([found[method][2] for found in chosen])
            result[family, method] = (len(chosen), np.nanmean(at), np.sqrt(np.nanmean(at**2)))
    return result


def main():
    """Write the tables."""
    lines = ["# Vapour pressures of species treated as cuts", "", "Made by `python -m tests.studies.cut_vapour_pressures`.", "",
             "Root mean square of the relative miss, percent, by boiling point; worst is the worst of 250, 275, 300, 325 and 350 K.", "",
             "| boiling point, K | species | method, critical constants | 300 K | 350 K | worst |", "|---|---|---|---|---|---|"]  # fmt: skip
    for ((low, high), method), (number, cold, hot, worst) in table().items():
        lines.append(
            f"| {low:.0f}-{high:.0f} | {number} | {method} | {100 * cold:.1f} | {100 * hot:.1f} | {100 * worst:.1f} |"
        )
    lines += ["", "Mean and root mean square at 300 K by family, species that boil below 450 K, percent.", "",
              "| family | species | method, critical constants | mean | rms |", "|---|---|---|---|---|"]  # fmt: skip
    for (family, method), (number, mean, rms) in by_family().items():
        lines.append(f"| {family} | {number} | {method} | {100 * mean:+.1f} | {100 * rms:.1f} |")
    lines += ["", "The curve of a heavy isomer is itself extrapolated to these temperatures: above 450 K part of the",
              "miss is the reference's own."]  # fmt: skip
    FILE.write_text("\n".join(lines) + "\n", encoding="utf-8")


if __name__ == "__main__":
    main()
