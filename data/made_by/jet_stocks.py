"""Fills the species of the jet fuels of data/stocks that are known by bins of class and carbon number.

    python data/made_by/jet_stocks.py            rewrites columns species and stand_in of the CSV files named below

A bin of a two-dimensional gas chromatogram holds every isomer of one class and carbon number. The rule is the
same for every fuel and takes no property of a fuel:

1. A bin boils at the mean boiling point, and has the mean density, of the isomers of its class and carbon number
   in the species table, provided the table holds `ENOUGH` of them. Paraffins and naphthenes with a quaternary carbon
   or with more than two branches take no part, nor do rings of seven and more: they make up little of a straight-run
   cut (common practice, no source). Weighed by mass, the C10 isoparaffins of the published gasolines of data/stocks
   boil at 161 degC, C7 naphthenes at 98, C10 alkylbenzenes at 185; the rule gives 162, 96 and 185.
2. Where the table holds fewer, the bin is moved from the straight-chain member of its carbon number (normal paraffin,
   alkylcyclohexane, alkylbenzene) by as much as the mean lies from the straight-chain member at the largest carbon
   number for which the table holds enough.
3. Ring classes that have no straight-chain member start at their parents (tetralin, the decalins, ethylnaphthalene)
   and rise with carbon number as alkylbenzenes or alkylcyclohexanes do.
4. A species of the bin's formula and class within `NEAR` of that boiling point carries the bin, the nearest one. Else
   a cut does, with that boiling point and density, the families of the class and the molar mass of the formula.
5. `OF_SPECIES` is the one fuel made of table species alone: there two relatives of the class, of any carbon number, that
   boil next below and above share the bin in quarters of its mass. Fused naphthenes then become rings with a
   chain, which are lighter by the litre.
"""

from __future__ import annotations

import csv
import re
from functools import lru_cache
from pathlib import Path

import numpy as np

from screener.ground.constants import ZERO_CELSIUS
from screener.species import cut, find, names

STOCKS = Path(__file__).resolve().parents[1] / "stocks"
FUELS = (
    "average-jet-fuel", "light-jet-fuel", "heavy-jet-fuel", "jet-kerosene-1999", "jet-kerosene-2018",
    "isoparaffinic-jet-fuel", "hydrotreated-tallow-kerosene",
)  # fmt: skip
OF_SPECIES = "jet-kerosene"
CH, C, CY_CH, CY_C = 3, 4, 79, 80  # subgroups of data/groups/subgroups.csv; C and CY_C are quaternary
ENOUGH = 6  # isomers in the table; our choice
NEAR = 3.0  # [K]; our choice
CARBON, HYDROGEN = 12.0107, 1.00794  # [g/mol]; IUPAC 2001, as the species table has them
LAST = {"isoparaffin": 20, "monocycloparaffin": 16, "alkylbenzene": 16}  # straight-chain members of the table
OTHER_RINGS = ("cycloheptane", "cyclooctane")
STEMS = (
    "meth", "eth", "prop", "but", "pent", "hex", "hept", "oct", "non", "dec", "undec", "dodec", "tridec", "tetradec",
    "pentadec", "hexadec", "heptadec", "octadec", "nonadec", "eicos",
)  # fmt: skip
# class: family in the species table, hydrogen atoms beyond 2 n, families of a cut
CLASSES = {
    "isoparaffin": ("isoparaffin", 2, {"naphthenes": 0.0, "aromatics": 0.0}),
    "monocycloparaffin": ("naphthene", 0, {"naphthenes": 1.0, "aromatics": 0.0}),
    "dicycloparaffin": ("naphthene", -2, {"naphthenes": 1.0, "aromatics": 0.0}),
    "tricycloparaffin": ("naphthene", -4, {"naphthenes": 1.0, "aromatics": 0.0}),
    "alkylbenzene": ("aromatic", -6, {"naphthenes": 0.0, "aromatics": 1.0}),
    "cycloaromatic": ("aromatic", -8, {"naphthenes": 0.0, "aromatics": 1.0}),
    "diaromatic": ("aromatic", -12, {"naphthenes": 0.0, "aromatics": 1.0}),
}
PARENTS = {  # class: parents with their carbon number, class whose straight-chain members show the rise
    "cycloaromatic": (("tetralin",), 10, "alkylbenzene"),
    "dicycloparaffin": (("trans-decalin", "cis-decalin"), 10, "monocycloparaffin"),
    "tricycloparaffin": (("trans-decalin", "cis-decalin"), 10, "monocycloparaffin"),
    "diaromatic": (("1-ethylnaphthalene", "2-ethylnaphthalene"), 12, "alkylbenzene"),
}
RINGS = tuple(f"{stem}ylcyclohexane" for stem in STEMS[:10])
FUSED = (
    "indane",
    "tetralin",
    "naphthalene",
    "2-methylnaphthalene",
    "1-methylnaphthalene",
    "1-ethylnaphthalene",
)
RELATIVES = {  # species that may share a bin under rule 5
    "monocycloparaffin": RINGS, "tricycloparaffin": ("trans-decalin", "cis-decalin", *RINGS[5:]),
    "dicycloparaffin": (*RINGS[:3], "trans-decalin", "cis-decalin", *RINGS[5:]),
    "alkylbenzene": tuple(f"{stem}ylbenzene" for stem in STEMS[2:10]), "cycloaromatic": FUSED, "diaromatic": FUSED,
}  # fmt: skip
KNOWN = {"cycloaromatic C9": ("indane",), "cycloaromatic C10": ("tetralin",), "diaromatic C10": ("naphthalene",),
         "diaromatic C11": ("1-methylnaphthalene", "2-methylnaphthalene"), "alkylbenzene C7": ("toluene",),
         "alkylbenzene C8": ("ethylbenzene", "o-xylene", "m-xylene", "p-xylene"),
         "diaromatic C12": ("1-ethylnaphthalene", "2-ethylnaphthalene"),
         "dicycloparaffin C10": ("trans-decalin", "cis-decalin")}  # fmt: skip


def normal(n: int) -> str:
    """Name of the normal paraffin of n carbon atoms."""
    return f"n-{STEMS[n - 1]}ane"


def straight(kind: str, n: int):
    """The straight-chain member of a class as a species."""
    if kind == "isoparaffin":
        return find(normal(n))
    ring, methyl = ("benzene", "toluene") if kind == "alkylbenzene" else ("cyclohexane", "methylcyclohexane")
    return find(methyl if n == 7 else f"{STEMS[n - 7]}yl{ring}")


@lru_cache
def isomers(kind: str, n: int):
    """Species of a class and carbon number."""
    family, extra, _ = CLASSES[kind]
    formula = f"C{n}H{2 * n + extra}"
    members = [find(name) for name in names() if name not in OTHER_RINGS]
    return tuple(one for one in members if one.family == family and one.formula == formula and _common(one))


def _common(one) -> bool:
    """Whether the isomer is common in straight-run petroleum, rule 1; every aromatic is."""
    groups = dict(one.groups)
    branches = sum(groups.get(k, 0) for k in (CH, CY_CH))
    return one.family == "aromatic" or (branches <= 2 and not any(k in groups for k in (C, CY_C)))


def mean(members) -> np.ndarray:
    """Boiling point [K] and density [kg/m3], means over species."""
    return np.mean([(one.Tb, one.rho_15) for one in members], axis=0)


def where(kind: str, n: int) -> np.ndarray:
    """Boiling point [K] and density [kg/m3] of a bin."""
    label = f"{kind} C{n}"
    if label in KNOWN:
        return mean(find(name) for name in KNOWN[label])
    if kind in PARENTS:
        parents, start, along = PARENTS[kind]
        return mean(find(p) for p in parents) + _member(along, n) - _member(along, start)
    if len(isomers(kind, n)) >= ENOUGH:
        return mean(isomers(kind, n))
    best = max(m for m in range(5, 17) if len(isomers(kind, m)) >= ENOUGH)
    return _member(kind, n) + mean(isomers(kind, best)) - _member(kind, best)


def _member(kind: str, n: int) -> np.ndarray:
    """The straight-chain member; beyond the table each carbon atom adds what the last one in it did."""
    last = LAST[kind]
    if n > last:
        return _member(kind, last) + (n - last) * (_member(kind, last) - _member(kind, last - 1))
    one = straight(kind, n)
    return np.array([one.Tb, one.rho_15])


def carrier(entry: str, cuts: bool) -> tuple[str, str]:
    """The species of a bin, and why; without cuts by rule 5."""
    kind, n = re.fullmatch(r"([\w-]+) C(\d+)", entry).groups()
    n = int(n)
    if kind == "n-paraffin":
        return find(normal(n)).name, ""
    if kind == "alkene":
        return find(f"1-{STEMS[n - 1]}ene").name, "one isomer stands for the bin"
    Tb, rho = where(kind, n)
    near = min(isomers(kind, n), key=lambda one: abs(one.Tb - Tb), default=None)
    about = f"boils at {Tb - ZERO_CELSIUS:.0f} degC as the mean of the bin does"
    if near is not None and abs(near.Tb - Tb) <= NEAR:
        return near.name, "" if near.name == "toluene" else f"isomer that {about}"
    if not cuts:
        return shared(kind, Tb), f"relatives whose mean {about}"
    _, extra, shares = CLASSES[kind]
    MW = (n * CARBON + (2 * n + extra) * HYDROGEN) / 1000.0
    return cut(Tb, rho, MW=MW, **shares).name, f"cut that {about}, with its density and molar mass"


def shared(kind: str, Tb: float) -> str:
    """Two relatives that boil next below and above Tb [K], each named as often as it has quarters of the bin."""
    if kind == "isoparaffin":
        found = [find(name) for name in names() if find(name).family == "isoparaffin" and _common(find(name))]
        found += [find(normal(n)) for n in range(16, 21)]
    else:
        found = [find(name) for name in RELATIVES[kind]]
    low = max((one for one in found if one.Tb <= Tb), key=lambda one: one.Tb, default=None)
    high = min((one for one in found if one.Tb > Tb), key=lambda one: one.Tb, default=None)
    if low is None or high is None:
        return (low or high).name
    quarters = round(4.0 * (Tb - low.Tb) / (high.Tb - low.Tb))
    return (
        "+".join([low.name] * (4 - quarters) + [high.name] * quarters)
        if quarters % 4
        else (high if quarters else low).name
    )


def refill(stem: str, cuts: bool = True) -> None:
    """Rewrites one stock; rows that name a molecule (column cas) keep their species."""
    path = STOCKS / f"{stem}.csv"
    lines = path.read_text(encoding="utf-8").splitlines()
    head = [line for line in lines if line.startswith("#")]
    rows = list(csv.DictReader(line for line in lines if not line.startswith("#")))
    for row in rows:
        if not row["cas"]:
            row["species"], row["stand_in"] = carrier(row["entry"], cuts)
    with path.open("w", encoding="utf-8", newline="") as file:
        file.write("".join(f"{line}\n" for line in head))
        writer = csv.DictWriter(file, rows[0], lineterminator="\n")
        writer.writeheader()
        writer.writerows(rows)


if __name__ == "__main__":
    for fuel in FUELS:
        refill(fuel)
    refill(OF_SPECIES, cuts=False)
