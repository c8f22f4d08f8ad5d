"""Pseudo-components: a name is the whole record, and a cut stands beside real species."""

from __future__ import annotations

import dataclasses
import subprocess
import sys
from pathlib import Path

import numpy as np
import pytest

from screener.blends import Blend, union
from screener.equilibrium import Fluid, bubble_pressure, bubble_temperature
from screener.ground.constants import ATMOSPHERE
from screener.ground.errors import InputError, UnknownName
from screener.species import columns, cut, find, pair_terms, pure
from screener.species.cut_families import FAMILIES, family_gravity, family_shares, groups_of
from screener.species.groups import atoms
from screener.species.pairs import correction
from screener.species.pseudo import name_of

ROOT = Path(__file__).resolve().parents[2]
NAPHTHA = 372.45, 745.0  # [K], [kg/m3]


def test_the_name_is_the_record():
    one = cut(*NAPHTHA, aromatics=0.24, naphthenes=0.10)
    assert one.name == "cut 99.30 degC 745.00 kg/m3 A24.0 N10.0 O0.0"
    assert find(one.name) == one
    assert find("CUT 99.3 degc 745 kg/m3 a24 n10 o0") == one
    assert cut(372.4499, 745.0012, aromatics=0.2401, naphthenes=0.1) == one  # rounded to what the name prints


def test_names_come_to_rest():
    """Any cut's name, read back part by part, is that name: rounding never drifts, nor refuses its own print."""
    rng = np.random.default_rng(8)
    for _ in range(3000):
        Tb, rho = rng.uniform(255.0, 1000.0), rng.uniform(520.0, 1100.0)
        known = {} if rng.random() < 0.5 else {"aromatics": rng.uniform(0.0, 0.7), "olefins": rng.uniform(0.0, 0.3)}
        name = name_of(Tb, rho, **known)
        part = name.split()
        shares = {k: float(part[i][1:]) / 100.0 for k, i in (("aromatics", 5), ("naphthenes", 6), ("olefins", 7))}
        assert name_of(float(part[1]) + 273.15, float(part[3]), **shares) == name


def test_shares_left_out_are_supplied_and_named():
    one = find("cut 99.3 degC 745 kg/m3")
    assert one == cut(*NAPHTHA) and " A19.5 N19.5 O0.0" in one.name
    assert find(one.name) is one or find(one.name) == one


def test_a_measured_molar_mass_is_part_of_the_name():
    one = cut(*NAPHTHA, MW=0.1013)
    assert one.name.endswith(" M101.30") and one.MW == pytest.approx(0.1013, abs=1e-12)
    assert find(one.name) == one != cut(*NAPHTHA)


def test_records_are_hashable_and_cannot_be_changed():
    one, other = cut(*NAPHTHA), cut(400.0, 780.0)
    assert {one: 1, other: 2, find("toluene"): 3}[find(one.name)] == 1
    with pytest.raises(dataclasses.FrozenInstanceError, match="cannot assign"):
        one.MW = 0.1


def test_nothing_is_registered():
    """A fresh interpreter that never saw the cut made finds it by its name."""
    name = cut(*NAPHTHA, aromatics=0.2).name
    code = f"from screener.species import find, names\nn = len(names())\nprint(find({name!r}).Tb, len(names()) - n)"
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, cwd=ROOT, check=True)
    Tb, added = done.stdout.split()
    assert float(Tb) == pytest.approx(NAPHTHA[0], abs=1e-9) and added == "0"


@pytest.mark.parametrize(
    ("arguments", "words"),
    [(((1200.0, 900.0), {}), "boiling point 1200 K"), (((400.0, 300.0), {}), "density 300 kg/m3"),
     (((400.0, 780.0), {"aromatics": 0.7, "naphthenes": 0.5}), "sum to 120 %"),
     (((400.0, float("nan")), {}), "no number"), (((400.0, 780.0), {"olefins": -0.1}), "shares of a cut")],
)  # fmt: skip
def test_impossible_cuts_are_refused(arguments, words):
    with pytest.raises(InputError, match=words):
        cut(*arguments[0], **arguments[1])


def test_other_names_are_still_unknown():
    with pytest.raises(UnknownName, match="'cutlery' is not a known species"):
        find("cutlery")
    with pytest.raises(InputError, match="'cut 99 degrees' does not describe a cut"):
        find("cut 99 degrees")
    with pytest.raises(InputError, match="does not describe a cut"):
        find("cut 99.3 degC 745 kg/m3 A24")  # all families or none


SPAN = [(Tb, share) for Tb in (265.0, 300.0, 340.0, 400.0, 470.0, 560.0, 700.0, 900.0) for share in (0.0, 0.5)]


@pytest.mark.parametrize(("Tb", "share"), SPAN)
def test_the_equation_boils_and_weighs_what_it_was_told(Tb, share):
    """From butane to residue, paraffinic and half aromatic: one atmosphere at Tb, density at 15 degC."""
    SG = (1.0 - share) * family_gravity("paraffin", Tb) + share * family_gravity("aromatic", Tb)
    one = cut(Tb, float(SG) * 999.5)
    T = bubble_temperature(Fluid.of([one]), ATMOSPHERE, [1.0]).T[0]
    # The fit promises 1 % in pressure, which is 0.3 K at the boiling point; above 0.75 Tc it goes unfitted.
    assert abs(T - one.Tb) < (0.3 if Tb < 800.0 else 3.0)
    fluid = Fluid.of([one])
    rho = one.MW / fluid.volume(288.15, 1e5, [1.0], "L")[0]
    assert rho == pytest.approx(one.rho_15, rel=4e-3)  # a straight shift over 100 K of a curved density
    for T in (260.0, 300.0, 340.0):
        P = np.array([one.psat(T)])
        alpha = fluid.alpha(np.array([T]))[0]
        # below a thousandth of a pascal nothing depends on the vapour pressure
        if P[0] > 1e-3 and one.Tc * 0.9 > T:
            found = pure.psat_of_alpha(np.array([T]), alpha, one.Tc, one.Pc, P)
            assert found == pytest.approx(P, rel=0.01)


def test_groups_carry_the_molar_mass():
    """Atoms of the groups against MW: C 12.0107, H 1.00794, O 15.9994 g/mol."""
    for Tb, MW in ((300.0, 0.070), (372.0, 0.098), (450.0, 0.140), (650.0, 0.300)):
        for shares in (*np.eye(4), np.array([0.4, 0.2, 0.1, 0.3])):
            counts = groups_of(Tb, MW, shares)
            total = sum(n * atoms({k: 1})[e] * m for k, n in counts.items()
                        for e, m in (("C", 0.0120107), ("H", 0.00100794), ("O", 0.0159994)))  # fmt: skip
            assert total == pytest.approx(MW, rel=1e-9)
            assert min(counts.values()) > 0.0


@pytest.mark.parametrize("name", ["n-heptane", "toluene", "m-xylene", "methylcyclohexane", "benzene", "cyclohexane"])
def test_representatives_are_the_molecules_they_should_be(name):
    """At the molar mass of a real species of its family the groups are that species' own."""
    one = find(name)
    family = {"aromatic": 3, "naphthene": 1, "paraffin": 0}[one.family]
    counts = groups_of(one.Tb, one.MW, np.eye(4)[family])
    if family == 0:  # half of the paraffins carry one branch
        assert counts == pytest.approx({1: 2.5, 3: 0.5, 2: 4.0}, abs=1e-3)
    else:
        assert {k: v for k, v in counts.items() if v > 1e-3} == pytest.approx(one.groups, abs=2e-3)


def test_split_of_families():
    """The gravity lines come back: a cut as heavy as its family is of that family."""
    for Tb in (380.0, 430.0, 480.0):
        P, N, A = (float(family_gravity(f, Tb)) for f in ("paraffin", "naphthene", "aromatic"))
        assert family_shares(Tb, P) == pytest.approx([1.0, 0.0, 0.0, 0.0], abs=1e-9)
        assert family_shares(Tb, A) == pytest.approx([0.0, 0.0, 0.0, 1.0], abs=1e-9)
        half = family_shares(Tb, 0.5 * P + 0.25 * N + 0.25 * A)
        assert half == pytest.approx([0.5, 0.25, 0.0, 0.25], abs=1e-9)
        known = family_shares(Tb, 0.6 * P + 0.1 * N + 0.3 * A, aromatics=0.3)
        assert known == pytest.approx([0.6, 0.1, 0.0, 0.3], abs=1e-9)
    assert family_shares(330.0, 0.72)[3] == 0.0  # nothing aromatic boils below benzene
    rng = np.random.default_rng(3)
    Tb, SG = rng.uniform(270.0, 900.0, 200), rng.uniform(0.55, 1.1, 200)
    shares = family_shares(Tb, SG)
    assert shares.sum(axis=-1) == pytest.approx(np.ones(200), abs=1e-12) and (shares >= 0.0).all()


def test_family_lines_are_remade():
    """data/made_by/cut_families.py gives the shipped table."""
    import importlib.util

    spec = importlib.util.spec_from_file_location("cut_families_maker", ROOT / "data" / "made_by" / "cut_families.py")
    maker = importlib.util.module_from_spec(spec)
    spec.loader.exec_module(maker)
    for family, members in maker.FAMILIES.items():
        Tb = maker.NODES
        K = np.cbrt(1.8 * Tb) / family_gravity(family, Tb)
        assert K == pytest.approx(maker.line(members), abs=6e-4), family  # three decimals are shipped


def test_gases_find_their_terms_with_a_cut():
    """Dissolved gases: the term is the mean over the families of the cut's molecules, and none is missing."""
    one = cut(400.0, 780.0, aromatics=0.3, naphthenes=0.3)
    gases = ("nitrogen", "oxygen", "methane", "carbon dioxide", "hydrogen sulfide", "hydrogen")
    # species without a term of their own, so that their family's is used
    kin = {"paraffin": "n-nonane", "naphthene": "propylcyclohexane", "aromatic": "cumene"}
    A0, A1, A2, missing = pair_terms([one, *kin.values(), *gases])
    assert not missing
    shares = dict(one.families)
    assert sum(shares.values()) == pytest.approx(1.0, abs=1e-12) and set(shares) <= set(FAMILIES)
    for A in (A0, A1, A2):
        mean = sum(shares[family] * A[1 + k, 4:] for k, family in enumerate(kin))
        assert A[0, 4:] == pytest.approx(mean, rel=1e-9, abs=1e-12)
    assert (A1[0, 4:] != 0.0).all()


def test_corrections_of_measured_pairs_are_shared_out():
    """Paraffin and aromatic have a correction: a cut that is all aromatic has it, one half so has half."""
    heptane = find("n-heptane")
    whole = correction(heptane, find("toluene"))
    pure_aromatic = cut(420.0, float(family_gravity("aromatic", 420.0)) * 999.6, aromatics=1.0, naphthenes=0.0)
    assert correction(heptane, pure_aromatic) == pytest.approx(whole, rel=1e-9)
    mixed = cut(420.0, 780.0, aromatics=0.4, naphthenes=0.0)
    share = dict(mixed.families)["aromatic"]
    assert correction(heptane, mixed) == pytest.approx(tuple(share * v for v in whole), rel=1e-9)


def test_a_fluid_takes_names_and_records_alike():
    one = cut(*NAPHTHA)
    by_record = Fluid.of([one, "ethanol", find("n-butane")])
    by_name = Fluid.of([one.name, "ethanol", "n-butane"])
    z = [0.7, 0.2, 0.1]
    assert by_record.names == by_name.names == (one.name, "ethanol", "n-butane")
    assert bubble_pressure(by_record, 310.0, z).P[0] == bubble_pressure(by_name, 310.0, z).P[0]


def test_a_record_of_ones_own_is_used_as_it_is():
    """A species that is in no table, or differs from the table: its own numbers count."""
    mine = dataclasses.replace(find("toluene"), name="toluene, own density", rho_15=900.0)
    fluid = Fluid.of([mine, "n-hexane"])
    assert fluid.v_15[0] == pytest.approx(mine.MW / 900.0, rel=1e-12)
    same = Fluid.of(["toluene", "n-hexane"])
    assert bubble_pressure(fluid, 310.0, [0.5, 0.5]).P == pytest.approx(
        bubble_pressure(same, 310.0, [0.5, 0.5]).P, rel=1e-12
    )
    assert columns([mine, "n-hexane"]).names == ("toluene, own density", "n-hexane")


def test_cuts_in_blends():
    one, two = cut(360.0, 720.0), cut(430.0, 790.0, aromatics=0.3)
    base = Blend.of({f"species:{one.name}": 0.5, two.name: 0.4, "species:n-butane": 0.1})
    assert base.density_15 == pytest.approx(0.5 * 720.0 + 0.4 * 790.0 + 0.1 * find("n-butane").rho_15, rel=1e-6)
    mixed = base.mixed_with(Blend.of({"ethanol": 1.0}), volume=0.9, other_volume=0.1)
    assert one.name in mixed.names and mixed.oxygenates["ethanol"] == pytest.approx(0.1, abs=1e-9)
    names, Z = union([base, mixed])
    P = bubble_pressure(Fluid.of(names), 310.0, Z).require().P
    alone = bubble_pressure(base.fluid, 310.0, base.z).require().P[0]
    assert P[0] == pytest.approx(alone, rel=1e-9)  # share zero changes nothing
    assert P[1] > P[0] + 4e3  # ethanol raises a gasoline of cuts too


def test_splitting_a_cut_in_two_equal_ones_changes_nothing():
    """Twice the same cut under two molar-mass names that agree: the sum behaves as the one."""
    one = cut(*NAPHTHA, MW=0.09830)
    pair = Fluid.of([one, one, "ethanol"])
    single = Fluid.of([one, "ethanol"])
    P = bubble_pressure(pair, 310.0, [0.3, 0.4, 0.3]).require().P
    assert P == pytest.approx(bubble_pressure(single, 310.0, [0.7, 0.3]).require().P, rel=1e-9)
