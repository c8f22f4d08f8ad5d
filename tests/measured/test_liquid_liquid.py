"""Two liquids against measurement: methanol + hydrocarbon, water + hydrocarbon, ethanol + hydrocarbon + water.

The points are those of tests/measured/liquid_liquid, each with its source in the first lines of its file. None of
the methanol points was fitted. The water points gave data/pairs/water_terms.csv; of the ethanol curves those with
toluene and cyclohexane chose its column `wet`, those with hexane nothing. Run with -s for the tables.
"""

import csv
from collections import defaultdict
from pathlib import Path

import numpy as np
import pytest

from screener.equilibrium import Fluid, flash_tp, water_tolerance
from screener.equilibrium.second_liquid import TESTED, TWO_LIQUIDS

FOLDER = Path(__file__).resolve().parent / "liquid_liquid"
PRESSURE = 3e5  # [Pa] above every bubble pressure here; 2e5 Pa move ln x of a liquid by 2e-3


def rows(name):
    lines = (FOLDER / f"{name}.csv").read_text(encoding="utf-8").splitlines()
    assert lines[0].startswith("# source: ")
    return list(csv.DictReader(line for line in lines if not line.startswith("#")))


def two_liquids(one: str, other: str, T):
    """Both liquids of an even mixture: the shares of `one` where it is rich and poor (n,), and the flash."""
    found = flash_tp(Fluid.of([one, other]), T, PRESSURE, [0.5, 0.5], check="full")
    both = np.stack([found.x[:, 0], found.x_W[:, 0]])
    return both.max(axis=0), both.min(axis=0), found


# ---- methanol + hydrocarbon


def methanol_gaps():
    """(hydrocarbon, T, measured poor and rich, computed poor and rich), poor and rich in hydrocarbon."""
    measured = defaultdict(lambda: defaultdict(list))
    for row in rows("methanol_hydrocarbon"):
        assert row["c2"] == "methanol"
        measured[row["c1"]][float(row["T_K"])].append(float(row["x1"]))
    out = []
    for hydrocarbon, gaps in measured.items():
        rich, poor, found = two_liquids(hydrocarbon, "methanol", list(gaps))
        assert (np.isfinite(rich) == (found.checks == TWO_LIQUIDS)).all()
        out += [
            (hydrocarbon, T, min(x), max(x), p, r)
            for (T, x), p, r in zip(gaps.items(), poor, rich, strict=True)
        ]
    return out


def test_methanol_gaps_are_found_where_they_were_measured():
    """Cyclohexane and n-hexane; the model's gap with cyclohexane closes at 315 K, the measured one above 316 K."""
    gaps, misses = methanol_gaps(), []
    print("\nhydrocarbon    T/K     measured           computed")
    for hydrocarbon, T, low, high, poor, rich in gaps:
        print(f"{hydrocarbon:12s} {T:7.2f}   {low:.3f} {high:.3f}      {poor:.3f} {rich:.3f}")
        assert np.isfinite(rich) or (hydrocarbon, T) == ("cyclohexane", 316.15)
        misses.append((abs(poor - low), abs(rich - high)))
    found = np.array([miss for miss in misses if np.isfinite(miss[1])])
    print(f"mean |dx| of the {len(found)} gaps found {found.mean():.3f}, worst {found.max():.3f}")
    assert len(found) == 12
    # the heights of a gap are flat: 10 K of its closing temperature are 0.1 to 0.15 in mole fraction near the top
    assert found.mean() < 0.08 and found.max() < 0.16


def test_methanol_and_heptane_split_and_toluene_does_not():
    """No measured point read; what the model says: a gap with heptane at 290 K, none with toluene."""
    rich, poor, found = two_liquids("n-heptane", "methanol", 290.0)
    assert 0.85 < rich[0] < 1.0 and 0.05 < poor[0] < 0.2 and found.checks[0] == TWO_LIQUIDS
    assert two_liquids("toluene", "methanol", [250.0, 290.0, 330.0])[2].checks.tolist() == [TESTED] * 3


# ---- water + hydrocarbon


def solubilities():
    """(solute, solvent, T, measured x, computed x, kind)."""
    out, pairs = [], defaultdict(list)
    for row in rows("water_hydrocarbon"):
        pairs[row["solvent"] if row["solute"] == "water" else row["solute"]].append(row)
    for hydrocarbon, some in pairs.items():
        found = two_liquids(hydrocarbon, "water", [float(row["T_K"]) for row in some])[2]
        assert (found.checks == TWO_LIQUIDS).all()
        for i, row in enumerate(some):  # the second liquid is water: the denser
            x = found.x[i, 1] if row["solute"] == "water" else found.x_W[i, 0]
            out.append(
                (row["solute"], row["solvent"], float(row["T_K"]), float(row["x"]), float(x), row["kind"])
            )
    return out


def test_mutual_solubilities_of_water_and_hydrocarbons():
    print("\nsolute in solvent              T/K      measured  computed  ratio  kind")
    ratios = defaultdict(list)
    for solute, solvent, T, x, computed, kind in solubilities():
        print(
            f"{solute + ' in ' + solvent:28s} {T:7.2f} {x:10.3g} {computed:9.3g} {computed / x:6.2f}  {kind}"
        )
        ratios[solute == "water"].append(computed / x)
    print(
        f"mean |ln| water in hydrocarbon {np.abs(np.log(ratios[True])).mean():.2f}, "
        f"hydrocarbon in water {np.abs(np.log(ratios[False])).mean():.2f}"
    )
    # water in hydrocarbon: two sources of one pair differ by 40 % at 313 K; modified UNIFAC alone is 15 times too high
    assert max(np.abs(np.log(ratios[True]))) < np.log(1.5) and np.abs(np.log(ratios[True])).mean() < 0.15
    # hydrocarbon in water: one straight line a family, and the slope of modified UNIFAC; alone it is 60 times too high
    assert max(np.abs(np.log(ratios[False]))) < np.log(2.0)


# ---- ethanol + hydrocarbon + water


def curve(hydrocarbon: str, T: float):
    """Measured water along a saturation curve, and what the model lets the same hydrocarbon and ethanol hold."""
    points = [
        (float(row["x_ethanol"]), float(row["x_hydrocarbon"])) for row in rows("ethanol_hydrocarbon_water")
        if (row["hydrocarbon"], float(row["T_K"])) == (hydrocarbon, T)
    ]  # fmt: skip
    ethanol, other = np.array(points[::2]).T  # every second: each is an edge to be found
    z = np.stack([other, ethanol, np.zeros_like(ethanol)], axis=1) / (ethanol + other)[:, None]
    return ethanol, 1.0 - ethanol - other, water_tolerance(Fluid.of([hydrocarbon, "ethanol", "water"]), T, z)


@pytest.mark.parametrize(
    ("hydrocarbon", "T", "least", "most"),
    [
        # fitted: within 10 %, but for the point of least ethanol, 40 %
        ("toluene", 298.2, 0.85, 1.45),
        ("toluene", 273.2, 0.90, 1.10),
        # where ethanol is scarce the model's own ethanol + cyclohexane is next to splitting: a quarter of the water
        ("cyclohexane", 298.2, 0.20, 2.4),
        # not fitted; a lower bound of the measured water (the set is rejected for its large gap)
        ("n-hexane", 298.15, 0.30, 3.0),
    ],
)
def test_water_along_the_saturation_curves_of_ethanol_blends(hydrocarbon, T, least, most):
    ethanol, water, found = curve(hydrocarbon, T)
    assert found.ok.all()
    ratio = found.water / water
    print(f"\n{hydrocarbon}, {T} K: ethanol, measured and computed water, ratio")
    for row in zip(ethanol, water, found.water, ratio, strict=True):
        print("   {:.4f}   {:.4f} {:.4f}   {:.2f}".format(*row))
    assert (ratio > least).all() and (ratio < most).all()


def test_no_measured_blend_splits_with_less_water_than_counts_as_dry():
    """Behind DRY of screener/equilibrium/second_liquid.py: water to ethanol on every measured curve."""
    ratios = [
        (1.0 - float(row["x_ethanol"]) - float(row["x_hydrocarbon"])) / float(row["x_ethanol"])
        for row in rows("ethanol_hydrocarbon_water")
    ]
    assert min(ratios) > 0.059
