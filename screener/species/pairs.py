"""Terms between pairs of species: pair terms of gases and of measured pairs, kij of the plain equations."""

from __future__ import annotations

from functools import lru_cache

import numpy as np

from screener.ground.errors import DataError, InputError
from screener.ground.files import read_table
from screener.species.catalogue import find

EQUATIONS = {"PR": "PR", "PR78": "PR"}  # equation of state -> column value in data/pairs/kij.csv


@lru_cache(maxsize=1)
def _terms() -> dict[tuple[str, str], tuple[float, float, float]]:
    """(gas, solvent) -> A0, A1, A2; gas is a canonical name, solvent a name or a family."""
    return {
        (row["gas"], row["solvent"]): (float(row["A0"]), float(row["A1"]), float(row["A2"]))
        for row in read_table("pairs/pair_terms.csv")
    }


def _is_gas(one) -> bool:
    """A species without groups: only the pair term describes it in a liquid."""
    return not one.groups


def _look_up(gas, other):
    """The term of a gas with a species: its own, else the mean over the families of its molecules."""
    own = _terms().get((gas.name, other.name))
    if own is not None:
        return own
    found = [(share, _terms().get((gas.name, family))) for family, share in other.family_shares]
    if any(term is None for _, term in found):
        return None
    return tuple(sum(share * term[k] for share, term in found) for k in range(3))


@lru_cache(maxsize=1)
def _corrections() -> dict[tuple[str, str], tuple[float, float]]:
    """(one, other) in both orders -> A0, A1; each a canonical name or a family."""
    table: dict[tuple[str, str], tuple[float, float]] = {}
    for row in read_table("pairs/pair_corrections.csv"):
        pair = row["one"], row["other"]
        if pair in table:
            raise DataError("pairs/pair_corrections.csv", None, f"{pair[0]} and {pair[1]} occur twice")
        table[pair] = table[pair[::-1]] = float(row["A0"]), float(row["A1"])
    return table


def correction(one, other) -> tuple[float, float]:
    """A0 [-] and A1 [K] that measured data add to UNIFAC for two species; zeros without.

    A row of two species goes before a row of a species and a family, that before one of two families
    (data/pairs/pair_corrections.csv). A cut counts as the mean of the families of its molecules.
    """
    A0 = A1 = 0.0
    for share, family in ((s, f) for f, s in one.family_shares):
        for other_share, other_family in ((s, f) for f, s in other.family_shares):
            value = _correction_row((one.name, family), (other.name, other_family))
            A0, A1 = A0 + share * other_share * value[0], A1 + share * other_share * value[1]
    return A0, A1


def _correction_row(one, other) -> tuple[float, float]:
    """The first row for (name, family) of one and other; zeros without."""
    table = _corrections()
    return next((table[i, j] for i in one for j in other if (i, j) in table), (0.0, 0.0))


def pair_terms(names):
    """Pair terms A_ij(T) = A0 + A1/T + A2 ln T of G^E/RT += sum_{i<j} x_i x_j A_ij(T).

    Parameters
    ----------
    names : sequence of str or Species
        Species of the mixture.

    Returns
    -------
    tuple
        A0 [-], A1 [K], A2 [-], each (c, c) and symmetric, and the list of (gas, other) names that
        need a term and have none. A term is looked up for the other species itself, then
        for its family (data/pairs/pair_terms.csv). Two gases without a row have A = 0. Between two
        species with groups A is the correction from measured pairs, zero for most (`correction`).
    """
    found = [one if not isinstance(one, str) else find(one) for one in names]
    c = len(found)
    A = np.zeros((3, c, c))
    missing = []
    for i, one in enumerate(found):
        for j in range(i + 1, c):
            other = found[j]
            gases = [g for g in ((one, other), (other, one)) if _is_gas(g[0])]
            if not gases:
                A[:2, i, j] = A[:2, j, i] = correction(one, other)
                continue
            value = next((v for v in (_look_up(*g) for g in gases) if v is not None), None)
            if value is not None:
                A[:, i, j] = A[:, j, i] = value
            elif len(gases) == 1:
                missing.append((gases[0][0].name, gases[0][1].name))
    return A[0], A[1], A[2], missing


@lru_cache(maxsize=1)
def _kij() -> dict[tuple[str, str, str], float]:
    table = {}
    for row in read_table("pairs/kij.csv"):
        if row["used"] == "1":
            i, j = row["cas_i"], row["cas_j"]
            if (row["eos"], j, i) in table:
                raise DataError("pairs/kij.csv", None, f"{i} and {j} occur twice")
            table[row["eos"], i, j] = float(row["kij"])
    return table


def interactions(names, eos="PR"):
    """Binary interaction of a plain equation of state.

    Parameters
    ----------
    names : sequence of str or Species
        Species of the mixture.
    eos : str
        "PR" or "PR78".

    Returns
    -------
    tuple
        kij (c, c) [-], symmetric with a zero diagonal, and the list of pairs of names that fell
        back to zero.
    """
    if eos not in EQUATIONS:
        raise InputError("", eos, f"no interaction table for '{eos}'", f"one of {', '.join(EQUATIONS)}")
    found = [one if not isinstance(one, str) else find(one) for one in names]
    kij, fallback = np.zeros((len(found), len(found))), []
    for i, one in enumerate(found):
        for j in range(i + 1, len(found)):
            other = found[j]
            column = EQUATIONS[eos]
            value = _kij().get((column, one.cas, other.cas), _kij().get((column, other.cas, one.cas)))
            if value is None:
                fallback.append((one.name, other.name))
            else:
                kij[i, j] = kij[j, i] = value
    return kij, fallback
