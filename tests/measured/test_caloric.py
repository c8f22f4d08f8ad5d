"""Heats of vaporisation, liquid heat capacities, pump work and ethanol gasoline against reference values.

*_sat.csv and n-octane_compressed_and_pump.csv hold values computed from the reference
equation named in each file's head (REFERENCES.md). Run with -s to see the table. Every species of the
tables is held against all references there are (tests/studies/caloric_species.md lists them): those outside
an aim are named below, each with the rule that speaks against its reference.
"""

from __future__ import annotations

import csv
from pathlib import Path

import numpy as np
import pytest

from screener.blends import Blend
from screener.equilibrium import Fluid, caloric, flash_ps, heat_of_vaporisation
from screener.ground.constants import R
from screener.species import find
from tests.studies.caloric_species import cause, lines_of_homologues, rows, short

FOLDER = Path(__file__).parent / "pure"
TABLES = sorted(path.stem.removesuffix("_sat") for path in FOLDER.glob("*_sat.csv"))
# What the screening needs of each: percent, mean over 250 to 350 K below 0.85 Tc.
HEAT = {"alcohol": 4.0, "water": 2.0}  # otherwise 2 %
CAPACITY = {"alcohol": 10.0, "water": 10.0}  # otherwise 4 %: hydrocarbons


def read(name):
    """Columns of one file as arrays."""
    with (FOLDER / f"{name}.csv").open(encoding="utf-8") as file:
        rows = list(csv.DictReader(line for line in file if not line.startswith("#")))
    return {key: np.array([float(row[key]) for row in rows]) for key in rows[0]}


@pytest.mark.parametrize("name", TABLES)
def test_heat_of_vaporisation_and_liquid_heat_capacity(name):
    data, one, fluid = read(f"{name}_sat"), find(name), Fluid.of([name])
    inside = (data["T_K"] >= 250.0) & (data["T_K"] <= 350.0) & (data["T_K"] <= 0.85 * one.Tc)
    T = data["T_K"][inside]
    found = heat_of_vaporisation(fluid, [1.0], T=T).require()
    heat = 100.0 * (found.differential / data["Hvap_J_mol"][inside] - 1.0)
    liquid = caloric(fluid, T, found.P, [1.0], "L").require()
    capacity = 100.0 * (liquid.Cp / data["cpL_J_molK"][inside] - 1.0)
    print(
        f"{name:12s} heat of vaporisation mean {np.mean(np.abs(heat)):.2f} %"
        f" worst {np.max(np.abs(heat)):.2f} %"
        f"  liquid Cp mean {np.mean(np.abs(capacity)):.2f} % worst {np.max(np.abs(capacity)):.2f} %"
        f" at {T[np.argmax(np.abs(capacity))]:.0f} K"
    )
    assert np.mean(np.abs(heat)) <= HEAT.get(one.family, 2.0)
    assert np.mean(np.abs(capacity)) <= CAPACITY.get(one.family, 4.0)


# Species outside an aim, and which rule of tests/studies/caloric_species.py (`cause`) denies the reference; "" where
# none does and our curve may be the one that is wrong. A species that comes in or leaves must be seen.
OUTSIDE = {
    # published vapour pressures across 25 degC, or another table, against one heat at 25 degC; the handbook has the two
    # 3-methyl-2-pentenes exchanged against the vapour pressures
    "cis-1,3-dimethylcyclohexane": "vapour pressures",
    "isoprene": "vapour pressures",
    "trans-3-methyl-2-pentene": "tables, vapour pressures",
    "hexylcyclohexane": "tables",
    "1-methylnaphthalene": "vapour pressures",
    "1-ethylnaphthalene": "vapour pressures",
    "2-ethylnaphthalene": "vapour pressures",
    # homologues against the collection of a group-contribution paper, which is 2 to 4 % above the alkylbenzenes of the
    # handbook, or against one handbook's heats
    "2,2-dimethyloctane": "homologues",
    "cis-2-octene": "homologues",
    "trans-2-octene": "homologues",
    "2-propyltoluene": "homologues",
    "3-propyltoluene": "homologues",
    "4-propyltoluene": "homologues",
    "1,2-diethylbenzene": "homologues",
    "1,4-diethylbenzene": "homologues",
    "1,2-dimethyl-3-ethylbenzene": "homologues",
    "1,2-dimethyl-4-ethylbenzene": "homologues",
    "1,3-dimethyl-2-ethylbenzene": "homologues",
    "1,3-dimethyl-4-ethylbenzene": "homologues",
    "1,3-dimethyl-5-ethylbenzene": "homologues",
    "1,2,3,4-tetramethylbenzene": "homologues, tables, vapour pressures",
    "1,2,4,5-tetramethylbenzene": "homologues",
    "pentamethylbenzene": "homologues",
    # nothing but the one table: the curve may be wrong
    "1-undecene": "",
    "o-cymene": "",
    "m-cymene": "",
    "1,4-dimethyl-2-ethylbenzene": "",
    "1,3-diisopropylbenzene": "",
    "2-methylnaphthalene": "",
}


def test_every_species_is_within_its_aim_or_named():
    table = rows()
    homologues = lines_of_homologues()
    found = {row[0]: cause(row, homologues) for row in table if short(row)}
    heat = [row[2][0] for row in table if row[2]]
    capacity = [row[3][0] for row in table if row[3]]
    print(f"{len(table)} species: heat of vaporisation known of {len(heat)}, mean {np.mean(heat):.2f} %; "
          f"liquid heat capacity of {len(capacity)}, mean {np.mean(capacity):.2f} %; {len(found)} outside an aim")  # fmt: skip
    assert found == OUTSIDE
    assert len(table) >= 270 and len(heat) >= 260 and len(capacity) >= 150
    # the misses of those named stay small too: nobody is far off
    worst = max(row[2][0] for row in table if row[2])
    assert worst <= 7.0  # 1,2-dimethyl-3-ethylbenzene and 1,3-diisopropylbenzene 6.5 %


def test_reversible_pump_work_of_n_octane():
    """Enthalpy of the isentropic compression, 1 % asked for.

    The density of the equation is 0.1 % off and its compressibility some 15 %, which counts with half
    of the 1.2 % by which 10 MPa shrink the liquid.
    """
    data, fluid = read("n-octane_compressed_and_pump"), Fluid.of(["n-octane"])
    T, P = data["T1_K"], data["P2_Pa"]
    start = caloric(fluid, T, 101325.0, [1.0], "L").require()
    pumped = flash_ps(fluid, P, start.S, [1.0]).require()
    work = pumped.H - start.H
    at_T = caloric(fluid, T, P, [1.0], "L").require().G - start.G
    miss = 100.0 * (work / data["w_s_J_mol"] - 1.0)
    print(f"n-octane pump work: mean {np.mean(np.abs(miss)):.3f} % worst {np.max(np.abs(miss)):.3f} %")
    assert np.max(np.abs(miss)) <= 1.0
    assert np.max(np.abs(at_T / data["w_T_J_mol"] - 1.0)) <= 0.01
    # v T beta / Cp dP: the expansivity of the equation is within 9 % of octane's
    assert pumped.T - T == pytest.approx(data["dT_s_K"], rel=0.1)
    density = fluid.MW[0] / start.v
    assert density == pytest.approx(data["rho1_kg_m3"], rel=2e-3)


STOCKS = ("average gasoline", "summer gasoline base", "winter gasoline base")
SHARES = (0.05, 0.10, 0.20, 0.50, 0.85)
T = np.array([278.15, 288.15, 298.15, 308.15])
P = 5e5  # [Pa] keeps every species of a gasoline liquid


def ethanol_gasoline(stock, share):
    """Fluid, composition, and volumes [m3/mol] and enthalpies [J/mol] of the pure species (4, c)."""
    blend = Blend.of({"species:ethanol": share, f"stock:{stock}": 1.0 - share}, basis="volume")
    pure = [caloric(blend.fluid, T, P, e, "L").require() for e in np.eye(blend.fluid.c)]
    return blend, np.stack([one.v for one in pure], axis=1), np.stack([one.H for one in pure], axis=1)


@pytest.mark.parametrize("stock", STOCKS)
@pytest.mark.parametrize("share", SHARES)
def test_ethanol_gasoline_density_is_near_ideal_mixing(stock, share):
    blend, v, _ = ethanol_gasoline(stock, share)
    liquid = caloric(blend.fluid, T, P, blend.z, "L").require()
    miss = 100.0 * ((v @ blend.z) / liquid.v - 1.0)
    standard = 100.0 * (blend.MW / liquid.v[1] / blend.density_15 - 1.0)
    print(f"{stock} + {share:.0%} ethanol: density {np.max(np.abs(miss)):.2f} % off ideal mixing, "
          f"{standard:+.2f} % off the density at 15 degC")  # fmt: skip
    assert np.max(np.abs(miss)) <= 1.0
    assert abs(standard) <= 1.0


@pytest.mark.parametrize("stock", STOCKS)
@pytest.mark.parametrize("share", SHARES)
def test_ethanol_gasoline_heat_of_vaporisation_holds_the_excess_enthalpy(stock, share):
    """All of the liquid into thin vapour: the heats of the species less the heat of mixing of the liquid."""
    blend, _, H = ethanol_gasoline(stock, share)
    fluid, z = blend.fluid, blend.z
    thin = 10.0  # [Pa] no departure is left in the vapour
    vapour = np.stack([caloric(fluid, T, thin, e, "V").H for e in np.eye(fluid.c)], axis=1)
    step = 0.5
    ln_gamma = {k: fluid.ln_gamma(T + k * step, z) for k in (-2, -1, 1, 2)}
    slope = (8.0 * (ln_gamma[1] - ln_gamma[-1]) - (ln_gamma[2] - ln_gamma[-2])) / (12.0 * step)
    excess = -R * T**2 * (slope @ z)
    heat = caloric(fluid, T, thin, z, "V").H - caloric(fluid, T, P, z, "L").H
    expected = (vapour - H) @ z - excess
    print(
        f"{stock} + {share:.0%} ethanol: heat {heat[2]:.0f} J/mol at 25 degC,"
        f" heat of mixing {excess[2]:.0f} J/mol"
    )
    # 1e-4: the matching is exact at zero pressure; at 5 bar the volume of mixing adds its share
    assert heat == pytest.approx(expected, rel=1e-4)
    if share < 0.6:
        assert np.all(excess > 100.0)  # breaking up the alcohol takes heat
