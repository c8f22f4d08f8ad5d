"""Remakes data/cuts/family_lines.csv: specific gravity of hydrocarbon families against boiling point.

    python data/made_by/cut_families.py

A straight line in Tb through the Watson factors of the family's species, each weighed by a
Gaussian of its distance from the node; normal and branched paraffins count half each, and of
the olefins only open chains with one double bond count.
Where a family has no species within 40 K of a node, its Watson factor at the nearest node
that has is held.
"""

from __future__ import annotations

import csv
from pathlib import Path

import numpy as np

from screener.species import find, names
from screener.species.cut_constants import specific_gravity, watson_factor

FILE = Path(__file__).resolve().parents[1] / "cuts" / "family_lines.csv"
NODES = np.arange(260.0, 461.0, 20.0)  # [K]; above the last one the Watson factor is held: heavier rings of
# the species table carry one long chain, those of petroleum do not
WIDTH = 25.0  # [K] of the weight
REACH = 40.0  # [K]
HIGHEST = 505.0  # [K] species that boil higher take no part
OPEN_CHAIN = {1, 2, 3, 4, 5, 6, 7, 8, 70}  # subgroups CH3, CH2, CH, C and those with a double bond
FAMILIES = {
    "paraffin": ("paraffin", "isoparaffin"),
    "naphthene": ("naphthene",),
    "olefin": ("olefin",),
    "aromatic": ("aromatic",),
}


def members(families):
    """Boiling point [K], Watson factor [-] and weight [-] of the species of some families."""
    rows = []
    for family in families:
        found = [find(name) for name in names() if find(name).family == family]
        found = [one for one in found if one.Tc > 400.0 and one.Tb < HIGHEST]
        if family == "olefin":
            found = [one for one in found if set(one.groups) <= OPEN_CHAIN]
        rows += [
            (one.Tb, float(watson_factor(one.Tb, specific_gravity(one.rho_15))), 1.0 / len(found))
            for one in found
        ]
    return np.array(rows).T


def line(families):
    """Watson factor [-] at the nodes."""
    Tb, K, weight = members(families)
    values = np.full(NODES.size, np.nan)
    for i, node in enumerate(NODES):
        if np.min(np.abs(Tb - node)) <= REACH:
            w = np.sqrt(weight * np.exp(-0.5 * ((Tb - node) / WIDTH) ** 2))
            basis = np.stack([np.ones_like(Tb), Tb - node], axis=1)
            values[i] = np.linalg.lstsq(basis * w[:, None], K * w, rcond=None)[0][0]
    known = np.flatnonzero(np.isfinite(values))
    return np.interp(np.arange(NODES.size), known, values[known])


def main():
    table = {family: line(members) for family, members in FAMILIES.items()}
    with FILE.open("w", encoding="utf-8", newline="") as file:
        file.write("# Watson factor of hydrocarbon families against boiling point; see the passport\n")
        writer = csv.writer(file, lineterminator="\n")
        writer.writerow(["Tb", *table])
        for i, node in enumerate(NODES):
            writer.writerow([f"{node:g}", *(f"{values[i]:.3f}" for values in table.values())])


if __name__ == "__main__":
    main()
