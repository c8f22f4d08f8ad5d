"""Departures of the cubic equations against thermo; heats of pure species against CoolProp's equations."""

from __future__ import annotations

import numpy as np
import pytest

from screener import species
from screener.equilibrium import Fluid, departure
from tests.studies.caloric_references import references
from tests.studies.caloric_species import aims, misses

# Tc [K], Pc [Pa], omega [-], rounded; any values would do for comparing two codes
CONSTANTS = np.array(
    [
        [369.83, 4.248e6, 0.152],
        [425.12, 3.796e6, 0.200],
        [469.7, 3.370e6, 0.252],
        [540.2, 2.740e6, 0.350],
        [562.05, 4.895e6, 0.210],
        [617.7, 2.110e6, 0.489],
    ]
)
SEED = 20260711


@pytest.mark.parametrize("eos", ["PR", "PR78", "SRK"])
def test_departures(eos):
    from thermo import PR78MIX, PRMIX, SRKMIX

    kind = {"PR": PRMIX, "PR78": PR78MIX, "SRK": SRKMIX}[eos]
    rng = np.random.default_rng(SEED)
    compared = 0
    for _ in range(60):
        c = int(rng.integers(1, 5))
        Tc, Pc, omega = CONSTANTS[rng.choice(len(CONSTANTS), c, replace=False)].T
        kij = np.triu(rng.uniform(-0.1, 0.2, (c, c)), 1)
        kij = kij + kij.T
        x, T, P = rng.dirichlet(np.ones(c)), rng.uniform(230.0, 450.0), 10.0 ** rng.uniform(3.5, 6.5)
        theirs = kind(list(Tc), list(Pc), list(omega), list(x), kijs=kij.tolist(), T=T, P=P)
        fluid = Fluid.from_constants(Tc, Pc, omega, np.full(c, 0.1), kij=kij, eos=eos)
        for phase, suffix in (("L", "l"), ("V", "g")):
            if not hasattr(theirs, f"H_dep_{suffix}") or theirs.phase != "l/g":
                continue
            ours = departure(fluid, T, P, x, phase).require()
            compared += 1
            for name in ("H", "S", "G", "U", "Cp"):
                expected = getattr(theirs, f"{name}_dep_{suffix}")
                scale = 8.3 if name in ("S", "Cp") else 8.3 * T
                # 1e-7: their cubic root is good to 1e-9, Cp of a warm liquid a hundred times as sensitive
                assert abs(getattr(ours, name)[0] - expected) <= 1e-7 * max(abs(expected), scale), (
                    name,
                    phase,
                )
    assert compared >= 40


BEYOND = {"propylene": 4.2}  # percent: liquid heat capacity next to 0.85 Tc, where the cubic form runs off


def test_heats_of_species_with_a_reference_equation():
    """Mean over 250 to 350 K below 0.85 Tc; all species and references: tests/studies/caloric_species.md."""
    compared = 0
    for name in species.names():
        one = species.find(name)
        known = references(one) if 0.85 * one.Tc >= 260.0 else {}
        if known.get("heat", ("", "", ""))[2] != "CoolProp":
            continue
        compared += 1
        found = {key: np.abs(miss).mean() for key, miss in misses(Fluid.of([name]), known).items()}
        heat, capacity = aims(one.family)
        print(f"{name:20s} heat of vaporisation {found['heat']:.2f} %  liquid Cp {found['capacity']:.2f} %")
        assert found["heat"] <= heat, name
        assert capacity is None or found["capacity"] <= BEYOND.get(name, capacity), name
    assert compared >= 35
