"""Group tables of modified UNIFAC (Dortmund): volumes, areas, interactions."""

from __future__ import annotations

from functools import lru_cache

import numpy as np

from screener.ground.errors import DataError
from screener.ground.files import read_table


@lru_cache(maxsize=1)
def subgroup_table() -> dict[int, dict[str, str]]:
    """Rows of data/groups/subgroups.csv by subgroup number."""
    return {int(row["subgroup"]): row for row in read_table("groups/subgroups.csv")}


@lru_cache(maxsize=1)
def _interactions() -> dict[tuple[int, int], tuple[float, float, float]]:
    return {
        (int(row["main_i"]), int(row["main_j"])): (float(row["a"]), float(row["b"]), float(row["c"]))
        for row in read_table("groups/interactions.csv")
    }


def atoms(counts: dict[int, int]) -> dict[str, int]:
    """Atoms of a set of subgroups, by element."""
    total = {"C": 0, "H": 0, "O": 0}
    for number, count in counts.items():
        for element in total:
            total[element] += count * int(subgroup_table()[number][element])
    return total


def group_tables(subgroups):
    """Tables of the subgroups given.

    Parameters
    ----------
    subgroups : array of int, shape (G,)
        Subgroup numbers of modified UNIFAC (Dortmund).

    Returns
    -------
    tuple
        R (G,) and Q (G,) [-], main (G,) main-group numbers, and a [K], b [-], c [1/K], each
        (G, G), of psi_ij = exp(-(a + b T + c T^2)/T). Zero within a main group, NaN where
        the published table has no value for the pair.
    """
    rows = []
    for number in subgroups:
        if int(number) not in subgroup_table():
            raise DataError("groups/subgroups.csv", None, f"subgroup {number} is not in the table")
        rows.append(subgroup_table()[int(number)])
    R = np.array([float(row["R"]) for row in rows])
    Q = np.array([float(row["Q"]) for row in rows])
    main = np.array([int(row["main"]) for row in rows], dtype=int)
    G = len(rows)
    abc = np.full((3, G, G), np.nan)
    table = _interactions()
    for i in range(G):
        for j in range(G):
            value = (0.0, 0.0, 0.0) if main[i] == main[j] else table.get((int(main[i]), int(main[j])))
            if value is not None:
                abc[:, i, j] = value
    return R, Q, main, abc[0], abc[1], abc[2]
