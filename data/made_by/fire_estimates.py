"""Makes data/fire/limit_estimates.csv: how far tabled flammable limits lie from the estimate of Jones.

Run from the top folder (no network):

    python data/made_by/fire_estimates.py

Every species of data/species with a tabled limit and at least four carbon atoms counts once:
that is what lacks a tabled limit in fuels. low and high are the 5th and 95th percentile of
tabled over estimated.
"""

from __future__ import annotations

import csv
import sys
from pathlib import Path

import numpy as np

DATA = Path(__file__).resolve().parents[1]
sys.path.insert(0, str(DATA.parent))

from screener.fire.limits import O2_IN_AIR, atoms, oxygen_demand
from screener.species import find, names

JONES = {"LFL": 0.55, "UFL": 3.5}  # G.W. Jones, Chem. Rev. 22 (1938) 1, as carried by chemicals 1.5.2
LEAST_CARBON = 4


def ratios(limit: str) -> dict[str, float]:
    """Tabled over estimated limit of each species that has a tabled one. [-]"""
    found = {}
    for name in names():
        one = find(name)
        tabled = getattr(one, limit)
        if tabled is not None and atoms(one.formula).get("C", 0.0) >= LEAST_CARBON:
            found[name] = tabled * (1.0 + oxygen_demand(one.formula) / O2_IN_AIR) / JONES[limit]
    return found


def rows():
    """Rows of the table."""
    for limit, coefficient in JONES.items():
        r = np.array(list(ratios(limit).values()))
        low, high = np.quantile(r, [0.05, 0.95])
        miss = np.median(np.abs(r - 1.0))
        yield [
            limit,
            coefficient,
            *(f"{v:.3f}" for v in (low, high, r.mean(), miss, r.min(), r.max())),
            len(r),
        ]


def main():
    """Write the table."""
    with (DATA / "fire/limit_estimates.csv").open("w", encoding="utf-8", newline="") as file:
        out = csv.writer(file, lineterminator="\n")
        out.writerow(["limit", "coefficient", "low", "high", "mean", "median_miss", "least", "most", "count"])
        out.writerows(rows())


if __name__ == "__main__":
    main()
