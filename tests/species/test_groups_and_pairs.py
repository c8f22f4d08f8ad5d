"""Groups balance, group tables, pair terms, kij."""

from __future__ import annotations

import re

import numpy as np
import pytest

from screener.ground.errors import DataError, InputError
from screener.species import columns, find, group_tables, interactions, names, pair_terms
from screener.species.groups import atoms


def formula(text):
    return {element: int(count or 1) for element, count in re.findall(r"([A-Z][a-z]?)(\d*)", text)}


def test_groups_make_up_the_formula():
    without = []
    for name in names():
        one = find(name)
        if one.groups:
            assert {e: n for e, n in atoms(one.groups).items() if n} == formula(one.formula), name
        else:
            without.append(name)
    assert set(without) == {
        "hydrogen",
        "nitrogen",
        "oxygen",
        "carbon dioxide",
        "hydrogen sulfide",
        "methane",
        "ethylene",
    }
    assert all(find(name).family == "gas" for name in without)


def test_molar_mass_of_the_formula():
    weight = {"C": 12.011, "H": 1.008, "O": 15.999, "N": 14.007, "S": 32.06}  # IUPAC 2021 abridged, g/mol
    for name in names():
        one = find(name)
        total = sum(weight[e] * n for e, n in formula(one.formula).items()) / 1000.0
        assert one.MW == pytest.approx(total, rel=2e-4), name  # abridged weights


def test_group_tables():
    table = columns(["n-hexane", "toluene", "ethanol", "MTBE"])
    R, Q, main, a, b, c = group_tables(table.subgroups)
    at = {int(k): i for i, k in enumerate(table.subgroups)}
    # Weidlich and Gmehling 1987: CH3 R 0.6325 Q 1.0608, CH2 R 0.6325 Q 0.7081 (as carried by thermo 0.6.1)
    assert (R[at[1]], Q[at[1]], R[at[2]], Q[at[2]]) == (0.6325, 1.0608, 0.6325, 0.7081)
    assert main[at[1]] == main[at[2]] == 1 and main[at[14]] == 5
    assert a[at[1], at[2]] == b[at[1], at[2]] == c[at[1], at[2]] == 0.0
    # CH2-OH of the published matrix: 2777.0, -4.674, 0.001551 and back 1606.0, -4.746, 0.0009181
    assert (a[at[1], at[14]], b[at[1], at[14]], c[at[1], at[14]]) == (2777.0, -4.674, 0.001551)
    assert (a[at[14], at[1]], b[at[14], at[1]], c[at[14], at[1]]) == (1606.0, -4.746, 0.0009181)


def test_missing_group_pair_is_nan_and_unknown_group_an_error():
    _, _, _, a, _, _ = group_tables([20 if False else 77, 83])  # COO and cyclic ether: no published value
    assert np.isnan(a[0, 1]) and a[0, 0] == 0.0
    with pytest.raises(DataError, match="subgroup 999 is not in the table"):
        group_tables([1, 999])


def test_pair_terms_are_symmetric_and_zero_between_most_species_with_groups():
    wanted = ["n-butane", "cyclohexane", "ethanol", "nitrogen", "oxygen"]  # none between the first three
    A0, A1, A2, missing = pair_terms(wanted)
    for A in (A0, A1, A2):
        assert A.shape == (5, 5) and np.array_equal(A, A.T) and not np.diag(A).any()
        assert not A[:3, :3].any()
    assert not missing
    again = pair_terms(list(reversed(wanted)))
    assert np.array_equal(again[0], A0[::-1, ::-1])


def test_a_gas_without_a_term_is_named():
    _, _, _, missing = pair_terms(["ethylene", "n-hexane", "ethanol"])
    assert missing == [("ethylene", "n-hexane"), ("ethylene", "ethanol")]


def test_interactions():
    kij, fallback = interactions(["methane", "n-hexane", "nitrogen", "n-octane"])
    assert np.array_equal(kij, kij.T) and not np.diag(kij).any()
    assert kij[0, 1] == 0.04 and kij[1, 2] == 0.1496
    assert kij[2, 3] == 0.0 and ("nitrogen", "n-octane") in fallback  # -0.4 in the table: out of family
    with pytest.raises(InputError, match="no interaction table for 'SRK'"):
        interactions(["methane"], "SRK")
