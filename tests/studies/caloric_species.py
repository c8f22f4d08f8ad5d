"""Makes caloric_species.md: heats of vaporisation and liquid heat capacities of every species.

Run from the top folder (needs CoolProp and thermo, no network; a minute):

    python -m tests.studies.caloric_species
"""

from __future__ import annotations

import re
from pathlib import Path

import numpy as np

from screener import species
from screener.equilibrium import Fluid, bubble_pressure, caloric
from screener.species import library
from tests.studies.caloric_references import AT_25, references, tables_at_25

PAGE = Path(__file__).with_suffix(".md")
HYDROCARBONS = ("paraffin", "isoparaffin", "naphthene", "olefin", "aromatic")
LINE = 10  # values that a line of homologues needs; own choice
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


def lines_of_homologues():
    """Heat of vaporisation at 25 degC against boiling point, by kind (`kind_of`): coefficients, scatter [-].

    dH / Tb as a parabola in Tb through the values of reference equations and the CRC Handbook, those off by
    three times the scatter left out; only for kinds with LINE of them.
    """
    found = {}
    for name in species.names():
        one = species.find(name)
        tables = tables_at_25(one)
        value = tables.get("HEOS_FIT") or tables.get("CRC_HVAP_298")
        if one.family in HYDROCARBONS and 0.85 * one.Tc > 298.15 and value:
            found.setdefault(kind_of(one), []).append((one.Tb, value))
    lines = {}
    for kind, points in found.items():
        if len(points) < LINE:
            continue
        Tb, value = np.array(points).T
        kept = np.ones(len(Tb), dtype=bool)
        for _ in range(5):
            line = np.polyfit(Tb[kept] / 300.0, value[kept] / Tb[kept], 2)
            off = value / (Tb * np.polyval(line, Tb / 300.0)) - 1.0
            kept = np.abs(off) <= 3.0 * max(np.std(off[kept]), 0.003)
        lines[kind] = (line, float(np.std(off[kept])))
    return lines


def kind_of(one):
    """Family and hydrogen missing from the paraffin: alkylbenzenes apart from condensed rings."""
    C, H = (int(n or 1) for n in re.match(r"C(\d*)H(\d*)", one.formula).groups())
    return one.family.replace("isoparaffin", "paraffin"), 2 * C + 2 - H


def cause(row, lines) -> str:
    """Which stated rule speaks against the reference of a species outside its aim; empty if none does.

    homologues: the heat of vaporisation is more than twice the scatter off the line of its kind, and more than
    ours. tables: another table of the library is within the aim of ours at 25 degC. vapour pressures: 25 degC
    lies within a published vapour-pressure curve whose slope there ours keeps within 1 %. solid: the
    heat capacity at 25 degC is of a substance that melts above 30 degC.
    """
    one, words = species.find(row[0]), []
    missed = short(row)
    if "heat of vaporisation" in missed:
        aim, source = aims(one.family)[0], row[2][4]
        tables, ours = tables_at_25(one), _heat_at_25(one)
        if kind_of(one) in lines and source in tables:
            line, scatter = lines[kind_of(one)]
            wanted = one.Tb * np.polyval(line, one.Tb / 300.0)
            off, own = (abs(value / wanted - 1.0) for value in (tables[source], ours))
            if off > max(2.0 * scatter, own):
                words.append("homologues")
        if any(abs(ours / value - 1.0) <= 0.01 * aim for name, value in tables.items() if name != source):
            words.append("tables")
        if _keeps_slope(one):
            words.append("vapour pressures")
    if "liquid heat capacity" in missed:
        import chemicals

        if row[3][4] in AT_25 and (chemicals.Tm(one.cas) or 0.0) > 303.15:
            words.append("solid")
        elif _keeps_slope(one):
            words.append("vapour pressures")
    return ", ".join(words)


def _heat_at_25(one):
    fluid, T = Fluid.of([one.name]), np.array([298.15])
    P = bubble_pressure(fluid, T, [1.0]).P
    return float((caloric(fluid, T, P, [1.0], "V").H - caloric(fluid, T, P, [1.0], "L").H)[0])


def _keeps_slope(one):
    for c in library.vapour_pressures(one.cas):
        if c.low <= 296.0 and c.high >= 300.0:
            theirs, ours = (np.log(f(np.array([296.0, 300.0]))) for f in (c.at, one.psat))
            if abs((ours[1] - ours[0]) / (theirs[1] - theirs[0]) - 1.0) <= 0.01:
                return True
    return False


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
        "The cold end of a vapour-pressure curve that is not a reference equation is correlated with heats",
        "(caloric_correlation.md), so its heats are no blind test; what is left outside an aim is listed with the",
        "rule that speaks against the reference: `homologues` (its heat of vaporisation is more than twice the",
        "scatter off the line through handbook values of its kind against boiling point, and further off than ours),",
        "`tables` (another table of the library agrees with ours), `vapour pressures` (25 degC lies within a",
        "published vapour-pressure curve whose slope ours keeps within 1 %), `solid` (a heat capacity at 25 degC",
        "of a substance that melts higher). `none` means our curve may be the one that is wrong.",
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
    homologues = lines_of_homologues()
    for row in table:
        if short(row):
            figures = ", ".join(
                f"{word} {value[2]:+.1f} % against {value[4]}"
                for word, value in zip(("heat of vaporisation", "liquid heat capacity"), row[2:], strict=True)
                if word in short(row)
            )
            lines.append(f"- {row[0]} ({row[1]}): {figures}; against the reference: {cause(row, homologues) or 'none'}")
    lines += ["", "Lines of homologues (family, hydrogen missing): scatter, percent", ""]
    lines += [f"- {kind[0]}, {kind[1]}: {100.0 * one[1]:.2f}" for kind, one in sorted(homologues.items())]
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
