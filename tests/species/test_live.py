"""A species outside the table, built from the libraries when asked for."""

from __future__ import annotations

import dataclasses

import numpy as np
import pytest

from screener.ground.errors import InputError, UnknownName
from screener.species import alpha, columns, find, find_live, pure


def test_same_numbers_as_the_table():
    table, live = find("n-heptane"), find_live("142-82-5")
    for key in ("MW", "Tc", "Pc", "omega", "Tb", "rho_15"):
        assert getattr(live, key) == pytest.approx(getattr(table, key), rel=1e-6), key  # digits of the table
    assert live.alpha == pytest.approx(table.alpha, rel=1e-8)
    assert live.groups == table.groups and live.live and not table.live


def test_a_new_species_is_fitted_like_the_others():
    one = find_live("1-pentanol")
    assert one.formula == "C5H12O" and one.groups == {1: 1, 2: 4, 14: 1}
    T = np.linspace(290.0, 350.0, 13)
    P = pure.psat_of_alpha(T, alpha(T / one.Tc, *one.alpha), one.Tc, one.Pc, one.psat(T))
    assert np.max(np.abs(P / one.psat(T) - 1.0)) < 0.01
    assert one.psat(one.Tb) == pytest.approx(101325.0, rel=0.04)
    assert columns([one, "n-hexane"]).names == (one.name, "n-hexane")


def test_refused_without_a_curve():
    with pytest.raises(
        InputError, match=r"'2-methyl-2-pentene' \(625-27-4\) cannot be used: .*no vapour-pressure curve"
    ):
        find_live("2-methyl-2-pentene")
    with pytest.raises(InputError, match="cannot be used"):
        find_live("glucose")


def test_unknown_to_the_library():
    with pytest.raises(UnknownName, match="'not a substance' is not a known species"):
        find_live("not a substance")


def test_records_are_frozen():
    with pytest.raises(dataclasses.FrozenInstanceError, match="cannot assign"):
        find("ethanol").Tc = 1.0
