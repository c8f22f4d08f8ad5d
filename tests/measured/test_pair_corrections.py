"""Pair corrections: they lower the error of points that were not fitted, and harm nothing else."""

from __future__ import annotations

import importlib.util
import sys
from dataclasses import replace
from functools import cache
from pathlib import Path

import numpy as np
import pytest

from screener.blends import Blend, union
from screener.equilibrium import Fluid, bubble_pressure
from screener.ground.files import read_table, read_toml
from screener.species import find, names, pair_terms
from tests.measured import binary_sets
from tests.measured.uncorrected import with_terms
from tests.studies.pair_corrections import azeotrope, both, error, left_out_mean, rejected, set_rows

ROWS = read_table("pairs/pair_corrections.csv")
TRIED = read_table("pairs/pair_corrections_tried.csv")
KEPT = [row for row in TRIED if row["kept"] == "1"]


def rule(row):
    """Both sides of a rule, as the program that fits takes them."""
    return tuple(row["one"].split("/")), tuple(row["other"].split("/"))


def title(row):
    return f"{row['one']} + {row['other']}"


@cache
def fitting():
    """data/made_by/pair_corrections.py as a module."""
    path = Path(__file__).parents[2] / "data" / "made_by" / "pair_corrections.py"
    spec = importlib.util.spec_from_file_location("made_by_pair_corrections", path)
    module = importlib.util.module_from_spec(spec)
    sys.modules[spec.name] = module  # its dataclasses look themselves up there
    spec.loader.exec_module(module)
    return module


@pytest.mark.parametrize("row", KEPT, ids=title)
def test_error_of_what_was_left_out_is_lower(row):
    """Fitted again without each part, and that part predicted: done here, not read from the table."""
    program = fitting()
    sets = [program.points_of(name) for name in binary_sets.NAMES if name[:4] in row["sets"].split()]
    assert all(p.set.quality == "A" for p in sets)
    # 0.003: 0.1 % of the pressure; species tables may be remade
    assert program.fit(sets)[0] == pytest.approx(float(row["A0"]), abs=0.003)
    parts, how = program.parts_to_leave_out(sets)
    assert how == row["left_out"] and len(parts) >= 2
    before, after = np.array([p.error(0.0) for p in parts]), program.left_out(parts)
    print(f"\n{title(row)}: left out {100 * before.mean():.2f} % before, {100 * after.mean():.2f} % after")
    assert before.mean() - after.mean() > np.mean([p.doubt for p in parts])
    # 0.05 %: for the same reason
    assert 100 * after.mean() == pytest.approx(float(row["left_out_after"]), abs=0.05)


def test_what_was_not_kept_is_not_used():
    kept = {rule(row) for row in KEPT}
    used = {(row["one"], row["other"]) for row in ROWS}
    assert used == {(one, other) for left, right in kept for one in left for other in right}
    assert all(bool(row["reason"]) == (row["kept"] == "0") for row in TRIED)
    assert len(KEPT) < len(TRIED) / 2  # most rules gain nothing that holds


def test_rejected_for_a_second_liquid():
    """Ethanol with naphthenes: sets left out are predicted better, but rings with side chains would split."""
    row = next(row for row in TRIED if (row["one"], row["other"]) == ("ethanol", "naphthene"))
    assert float(row["left_out_after"]) < 0.7 * float(row["left_out_before"]) and "splits" in row["reason"]
    program = fitting()
    off = both(("ethanol", "ethylcyclohexane"))[0]
    on = with_terms(off, float(row["A0"]) * (1.0 - np.eye(2)), np.zeros((2, 2)))
    assert program.splits(on).any() and not program.splits(off).any()


def test_rejected_for_a_measured_fuel():
    """Paraffins with aromatics: a set never fitted gains, but the measured gasoline would move away."""
    row = next(row for row in TRIED if row["other"] == "aromatic")
    one = binary_sets.read("hc14_benzene_n-heptane")
    fluid = Fluid.of(one.species)

    def mean(model):
        return np.abs(error(model, one)).mean()

    assert mean(rejected(fluid)) < 0.75 * mean(fluid)
    reasons = fitting().moved_away(rule(row), float(row["A0"]))
    assert row["kept"] == "0" and len(reasons) == 1 and "gasoline" in reasons[0]


def test_kept_rules_move_no_measured_fuel():
    assert not any(fitting().moved_away(rule(row), float(row["A0"])) for row in KEPT)


def test_sets_never_fitted_do_not_get_worse():
    """The B sets, and every A set outside the fits: lower or the same."""
    for name, quality, _, off, on, *_ in set_rows():
        fitted = any(name[:4] in row["sets"].split() for row in KEPT)
        assert on < off if fitted else on <= off, name
        assert not (fitted and quality == "B")


def test_mean_with_every_fitted_set_counted_by_points_left_out():
    # 1.25 % as in test_binary: the bar is met by prediction as well as by fit
    assert left_out_mean(set_rows()) <= 1.25


def test_azeotrope_of_methanol_and_benzene():
    """Of set ox15: 331.5 K at 101.3 kPa (cubic through the points around the lowest temperature)."""
    off, on = (azeotrope(fluid, 101.3e3) - 331.5 for fluid in both(("methanol", "benzene")))
    assert abs(on) < abs(off) and abs(on) < 0.15  # K; the set prints 0.1 K


def test_all_are_negative_constants():
    """So none can make two liquids of one in a pair, and none adds to the heat of mixing."""
    assert all(-0.1 < float(row["A0"]) < 0.0 and float(row["A1"]) == 0.0 for row in ROWS)


def test_isomers_share_a_correction():
    A0 = pair_terms(["MTBE", "isooctane", "2-methylhexane", "2,4-dimethylpentane", "TAME"])[0]
    assert A0[0, 1] == A0[0, 2] == A0[0, 3] == A0[4, 1] == A0[4, 3] != 0.0
    A0 = pair_terms(["ethanol", "MTBE", "ETBE", "TAME"])[0]
    assert A0[0, 1] == A0[0, 2] == A0[0, 3] != 0.0
    A0 = pair_terms(["methanol", "toluene", "benzene", "m-xylene", "1,2,4-trimethylbenzene"])[0]
    assert A0[0, 1] == A0[0, 2] == A0[0, 3] == A0[0, 4] != 0.0


def test_methanol_and_paraffins_or_naphthenes_are_left_alone():
    """Their two liquids are measured; no correction touches them."""
    families = ("paraffin", "isoparaffin", "naphthene", "olefin")
    others = [name for name in names() if find(name).family in families]
    for alcohol in ("methanol", "ethanol"):
        assert not pair_terms([alcohol, *others])[0][0].any()


def test_a_species_of_share_zero_changes_nothing():
    T, x = np.array([260.0, 300.0, 340.0]), np.array([0.3, 0.3, 0.2, 0.2])
    fluid = Fluid.of(["isooctane", "toluene", "ethanol", "MTBE"])
    short = bubble_pressure(fluid, T, np.tile(x, (3, 1))).require()
    more = Fluid.of(["methanol", "isooctane", "toluene", "n-heptane", "ethanol", "benzene", "MTBE", "ETBE"])
    z = np.zeros(8)
    z[[1, 2, 4, 6]] = x
    long = bubble_pressure(more, T, np.tile(z, (3, 1))).require()
    np.testing.assert_allclose(long.P, short.P, rtol=1e-9)  # both solved to 1e-10


def test_slope_in_temperature_enters_as_written():
    """A1 of a row reaches the model: A = A0 + A1/T in ln gamma of a pair at infinite dilution."""
    off, on = both(("MTBE", "isooctane"))
    x, T = np.array([[0.0, 1.0]]), np.array([300.0])
    step = (on.mixing.excess.at(T).ln_gamma(x) - off.mixing.excess.at(T).ln_gamma(x))[0]
    A0 = next(float(row["A0"]) for row in ROWS if (row["one"], row["other"]) == ("ether", "isoparaffin"))
    assert step == pytest.approx([A0, 0.0], abs=1e-12)
    tilted = replace(on.mixing.excess, A1=np.array([[0.0, 30.0], [30.0, 0.0]]))
    more = (tilted.at(T).ln_gamma(x) - on.mixing.excess.at(T).ln_gamma(x))[0]
    assert more == pytest.approx([0.1, 0.0], abs=1e-12)


def test_blends_do_not_split_because_of_them():
    """Gasoline with alcohols and ethers: no second liquid that was not there without corrections."""
    base = Blend.of({"stock:summer gasoline base": 1.0})
    species, _ = union([base], extra=("ethanol", "methanol", "MTBE"))
    shares = [{"ethanol": 0.2}, {"ethanol": 0.9}, {"methanol": 0.05}, {"MTBE": 0.2, "ethanol": 0.1}]
    z = np.zeros((len(shares), len(species)))
    for row, share in zip(z, shares, strict=True):
        row[[species.index(name) for name in base.names]] = base.z * (1.0 - sum(share.values()))
        for name, part in share.items():
            row[species.index(name)] += part
    T, z = np.repeat([255.0, 290.0], len(shares)), np.tile(z, (2, 1))
    off, on = both(species)
    worse = with_terms(off, 1.0 - np.eye(len(species)), np.zeros((len(species),) * 2))
    one, split, seen = (bubble_pressure(f, T, z, check="full").tpd < -1e-8 for f in (off, on, worse))
    assert not (split & ~one).any()
    assert (seen & ~one).any()  # the test can fail: terms of +1 everywhere split some


def test_sources_and_papers():
    known = read_toml("sources.toml")
    for row in ROWS:
        assert set(row["source"].split(";")) <= set(known), row
        assert row["measured"] and float(row["T_low"]) <= float(row["T_high"])
    sets = {name for name in binary_sets.NAMES for row in KEPT if name[:4] in row["sets"].split()}
    assert {fitting().source_key(binary_sets.read(name)) for name in sets} == {
        key for row in ROWS for key in row["source"].split(";")
    }
