"""Makes caloric_species.md: heats of vaporisation and liquid heat capacities of every species.

Run from the top folder (needs CoolProp and thermo, no network; half a minute):

    python -m tests.studies.caloric_species
"""

from __future__ import annotations

from pathlib import Path

import numpy as np

from screener import species
from screener.equilibrium import Fluid, bubble_pressure, caloric
from tests.studies.caloric_references import references

PAGE = Path(__file__).with_suffix(".md")
HYDROCARBONS = ("paraffin", "isoparaffin", "naphthene", "olefin", "aromatic")
AIMS = {"alcohol": (4.0, 10.0), "water": (2.0, 10.0)}  # percent: heat of vaporisation, liquid heat capacity


def aims(family: str):
    """Largest mean misses wanted [%]; None where nothing is asked for."""
    return AIMS.get(family, (2.0, 4.0 if family in HYDROCARBONS else None))


def misses(fluid, known, boiling=None):
    """Misses [%] of "heat" and "capacity" at the references' temperatures, of a fluid of one species.

    boiling(T) gives its vapour pressure [Pa] where that is known already.
    """
    out = {}
    for key, (T, value, _) in known.items():
        P = bubble_pressure(fluid, T, [1.0]).P if boiling is None else boiling(T)
        liquid = caloric(fluid, T, P, [1.0], "L")
        found = caloric(fluid, T, P, [1.0], "V").H - liquid.H if key == "heat" else liquid.Cp
        out[key] = 100.0 * (found / value - 1.0)
    return out


def rows():
    """Per species: name, family, and per property (mean |miss|, worst, bias [%], points, source) or None."""
    table = []
    for name in species.names():
        one = species.find(name)
        if 0.85 * one.Tc < 260.0:
            continue  # a gas at storage temperatures
        known = references(one)
        found = misses(Fluid.of([name]), known)
        cells = []
        for key in ("heat", "capacity"):
            if key not in found:
                cells.append(None)
                continue
            miss = found[key]
            cells.append((np.abs(miss).mean(), np.abs(miss).max(), miss.mean(), miss.size, known[key][2]))
        table.append((name, one.family, *cells))
    return table


def short(row) -> list[str]:
    """Which aims a species misses."""
    wanted = aims(row[1])
    pairs = zip(("heat of vaporisation", "liquid heat capacity"), row[2:], wanted, strict=True)
    return [word for word, cell, aim in pairs if cell and aim is not None and cell[0] > aim]


def cell(value) -> str:
    """One property of one species as table cells."""
    if value is None:
        return "- | - | - | -"
    return f"{value[0]:.2f} | {value[1]:.2f} | {value[2]:+.2f} | {value[4]}, {value[3]}"


def page(table) -> str:
    """The whole page."""
    lines = [
        "# Heat of vaporisation and liquid heat capacity of every species",
        "",
        "Made by `python -m tests.studies.caloric_species`. Miss of the equation of state in percent,",
        "250 to 350 K below 0.85 Tc (or at 25 degC where the reference is one value), against CoolProp's",
        "reference equations or, where there is none, thermo's tables. Aims (mean): heat of vaporisation 2,",
        "alcohols 4; liquid heat capacity 4 for hydrocarbons, 10 for alcohols and water.",
        "",
        "The alphas are fitted to vapour-pressure curves alone. Where the curve is a reference equation the",
        "heats come out within the aims; where it is an Antoine fit continued to the cold, its slope and bend",
        "often do not.",
        "",
        "| family | species | heat: known | mean | within aim | capacity: known | mean | within aim |",
        "| --- | --- | --- | --- | --- | --- | --- | --- |",
    ]
    for family in sorted({row[1] for row in table}):
        some = [row for row in table if row[1] == family]
        parts = [f"| {family} | {len(some)}"]
        for k, aim in zip((2, 3), aims(family), strict=True):
            means = [row[k][0] for row in some if row[k]]
            good = sum(m <= aim for m in means) if aim is not None else "-"
            parts.append(f"| {len(means)} | {np.mean(means):.2f} | {good}" if means else "| 0 | - | -")
        lines.append(" ".join(parts) + " |")
    with_curve = [row for row in table if row[2] and row[2][4] == "CoolProp"]
    inside = sum(not short(row) for row in with_curve)
    lines += [
        "",
        f"Of {len(with_curve)} species with a reference equation {inside} meet every aim.",
        "",
        "Outside an aim:",
        "",
    ]
    lines += [f"- {row[0]} ({row[1]}): {', '.join(short(row))}" for row in table if short(row)]
    lines += [
        "",
        "| species | family | heat | worst | bias | reference, points | capacity | worst | bias | reference, points |",
        "| --- | --- | --- | --- | --- | --- | --- | --- | --- | --- |",
    ]
    lines += [f"| {row[0]} | {row[1]} | {cell(row[2])} | {cell(row[3])} |" for row in table]
    return "\n".join(lines) + "\n"


if __name__ == "__main__":
    PAGE.write_text(page(rows()), encoding="utf-8")
    print(PAGE.read_text(encoding="utf-8").split("Outside an aim:")[0])
