"""Makes data/pairs/pair_corrections.csv and data/pairs/pair_corrections_tried.csv.

Run from the top folder (no network, some ten seconds):

    python data/made_by/pair_corrections.py

A correction adds x_i x_j A0 to G^E/RT of a pair of families or species. It is fitted to the measured sets
of quality A (tests/measured/binary), every set weighing the same, so that the mean |error| of the bubble
pressure is least; sets of quality B are never fitted. The same fit is made again without a part of the data,
and that part is then predicted:

- a rule with several sets leaves out one set at a time;
- a rule with one set of several isotherms or isobars leaves out one of these at a time;
- a rule with one isotherm or isobar leaves out a third of its points, neighbours in composition, at a time.

A correction is kept only if

1. the mean |error| of the parts left out falls by more than the doubt of their sets: what the points
   scatter, or what the pure ends are off, whichever is more (a pair term must not mend a vapour pressure);
2. no part left out gets worse by more than that;
3. no set of quality B of the same pair gets worse by more than its own doubt;
4. it lets no pair it covers split into two liquids at a temperature of 230 to 400 K at which the model
   alone has one;
5. it moves no measured fuel of many species (a gasoline and a crude, tests/measured/test_fuels.py) away from
   its measured vapour pressure by more than 0.1 % of it. What was measured on these is less certain than
   that, but it is all there is to say that a pair's value holds among many species.

A(T) = A0 + A1/T is tried beside each kept A0 and taken only if it lowers the error of the parts left out by
more than the doubt. Rules are tried in the order of CANDIDATES; a rule whose sets a kept rule has served
already is not tried.
"""

from __future__ import annotations

import csv
import re
import sys
from dataclasses import dataclass, replace
from pathlib import Path

import numpy as np

DATA = Path(__file__).resolve().parents[1]
sys.path.insert(0, str(DATA.parent))

from screener.blends import Blend
from screener.equilibrium import Fluid, bubble_pressure
from screener.ground.constants import T_100F, ZERO_CELSIUS
from screener.species import find, names
from screener.volatility import dvpe, vapour_pressure_at_ratio
from tests.measured import binary_sets, test_fuels
from tests.measured.uncorrected import corrected, with_terms

PARAFFINS = ("paraffin", "isoparaffin")
CANDIDATES = (  # (species or families, species or families): wide rules before narrow ones
    (PARAFFINS, ("aromatic",)), (PARAFFINS, ("naphthene",)), (("paraffin",), PARAFFINS),
    (("naphthene",), ("aromatic",)), (("ethanol",), PARAFFINS), (("ethanol",), ("paraffin",)),
    (("ethanol",), ("isoparaffin",)), (("ethanol",), ("naphthene",)), (("ethanol",), ("aromatic",)),
    (("ethanol",), ("ether",)), (("ethanol",), ("water",)), (("methanol",), PARAFFINS),
    (("methanol",), ("aromatic",)), (("ether",), PARAFFINS), (("ether",), ("isoparaffin",)),
    (("ether",), ("paraffin",)), (("ether",), ("aromatic",)), (("2-propanol",), PARAFFINS),
    (("1-butanol",), PARAFFINS), (("tert-butanol",), PARAFFINS),
)  # fmt: skip
SPLIT_T = np.arange(230.0, 400.1, 5.0)  # [K] where a second liquid is looked for
STEP = 0.02  # [-] of A0 in the slope of ln P


@dataclass(frozen=True)
class Points:
    """Some points of a measured set; fluid is the model without any correction, doubt [-] that of the set."""

    set: binary_sets.BinarySet
    fluid: Fluid
    at: np.ndarray
    doubt: float
    label: str

    def ln_error(self, A0: float, A1: float = 0.0):
        """ln of computed over measured bubble pressure (n,) [-] with A = A0 + A1/T."""
        off = 1.0 - np.eye(2)
        fluid = with_terms(self.fluid, A0 * off, A1 * off)
        found = bubble_pressure(fluid, self.set.T[self.at], self.set.x[self.at])
        return np.log(found.P / self.set.P[self.at])

    def error(self, A0: float, A1: float = 0.0) -> float:
        """Mean |error| of the pressure. [-]"""
        return float(np.abs(np.expm1(self.ln_error(A0, A1))).mean())


def points_of(name: str) -> Points:
    """All points of a set, as one part."""
    one = binary_sets.read(name)
    fluid = with_terms(Fluid.of(one.species), np.zeros((2, 2)), np.zeros((2, 2)))
    whole = Points(one, fluid, np.arange(one.T.size), 0.0, name)
    error = np.expm1(whole.ln_error(0.0))
    ends = np.abs(error[(one.x1 <= 0.0) | (one.x1 >= 1.0)])
    return replace(whole, doubt=max([binary_sets.scatter(one, error), *([ends.mean()] if ends.size else [])]))


def belongs(species: str, side) -> bool:
    """Whether a species is on one side of a rule."""
    return species in side or find(species).family in side


def serves(rule, pair) -> bool:
    """Whether a rule covers a pair of species."""
    return any(belongs(one, rule[0]) and belongs(other, rule[1]) for one, other in (pair, pair[::-1]))


def fit(parts, form: int = 1):
    """A0 [-] (and A1 [K] if form is 2) with the least mean |error|, every set weighing the same."""
    share = {p.set.name: sum(q.at.size for q in parts if q.set.name == p.set.name) for p in parts}
    weight = np.concatenate([np.full(p.at.size, 1.0 / share[p.set.name]) for p in parts])
    T = np.concatenate([p.set.T[p.at] for p in parts])
    basis = np.stack([np.ones_like(T), 300.0 / T], axis=1)[:, :form]
    A = np.zeros(2)
    for _ in range(2):
        now, up = (np.concatenate([p.ln_error(A[0] + s, A[1]) for p in parts]) for s in (0.0, STEP))
        slope = ((up - now) / STEP)[:, None] * basis
        change = np.zeros(form)
        for _ in range(60):  # least absolute errors by weights 1/|error|, floored at 0.01 %
            w = np.sqrt(weight / np.maximum(np.abs(now + slope @ change), 1e-4))
            change = np.linalg.lstsq(slope * w[:, None], -now * w, rcond=None)[0]
        A = A + np.pad(change * np.array([1.0, 300.0])[:form], (0, 2 - form))
    return round(float(A[0]), 3), round(float(A[1]), 1)


def parts_to_leave_out(sets):
    """The parts of the data that are predicted without themselves, and in words what they are."""
    if len(sets) > 1:
        return sets, "one set at a time"
    one = sets[0]
    curve = one.set.curve
    how = "one isotherm or isobar at a time"
    if curve.max() == 0:
        curve = np.minimum((np.argsort(np.argsort(one.set.x1)) * 3) // one.set.T.size, 2)
        how = "a third of the points at a time"
    return [replace(one, at=np.flatnonzero(curve == k), label=f"{one.label} part {k + 1}")
            for k in range(curve.max() + 1)], how  # fmt: skip


def left_out(parts, form: int = 1):
    """Mean |error| (k,) [-] of each part, predicted from the others."""
    return np.array([p.error(*fit([q for q in parts if q is not p], form)) for p in parts])


def new_split(rule, A0: float) -> str:
    """A pair that the correction lets split where the model alone does not, or nothing."""
    if A0 <= 0.0:
        return ""  # x1 x2 A0 then only adds to the curvature of the Gibbs energy of the pair
    known = names()
    pairs = [(i, j) for i in known for j in known if belongs(i, rule[0]) and belongs(j, rule[1]) and i != j]
    for pair in pairs:
        fluid = with_terms(Fluid.of(pair), np.zeros((2, 2)), np.zeros((2, 2)))
        new = splits(with_terms(fluid, A0 * (1.0 - np.eye(2)), np.zeros((2, 2)))) & ~splits(fluid)
        if new.any():
            return f"{pair[0]} + {pair[1]} at {SPLIT_T[new].min():.0f} to {SPLIT_T[new].max():.0f} K"
    return ""


def fuel_errors(value):
    """Relative error (2,) [-] of the vapour pressures of the measured fuels with these corrections only."""
    blend = Blend.of({"stock:average gasoline": 1.0})
    gasoline = dvpe(corrected(blend.fluid, value), blend.z).require().P[0] / (7.9 * test_fuels.PSI)
    fluid, z = test_fuels.crude()
    cell = vapour_pressure_at_ratio(
        corrected(fluid, value), T_100F, z, 4.0, T_fill=ZERO_CELSIUS + 20.0, product="crude"
    )
    return np.array([gasoline, cell.require().P[0] / test_fuels.CRUDE_RVP]) - 1.0


def moved_away(rule, A0: float) -> list[str]:
    """The measured fuels that a rule moves away from what was measured."""

    def value(one, other):
        return (A0 if serves(rule, (one.name, other.name)) else 0.0), 0.0

    before, after = fuel_errors(lambda one, other: (0.0, 0.0)), fuel_errors(value)
    fuels = zip(("gasoline", "crude"), before, after, strict=True)
    return [f"moves the measured {name} away: {100 * b:+.1f} to {100 * a:+.1f} %"
            for name, b, a in fuels if abs(a) > abs(b) + 1e-3]  # fmt: skip


def splits(fluid):
    """Whether a pair makes two liquids at SPLIT_T (k,): an activity that falls as the share rises."""
    end = np.geomspace(1e-4, 0.0195, 20)
    x1 = np.concatenate([end, np.linspace(0.02, 0.98, 97), 1.0 - end[::-1]])
    x = np.tile(np.stack([x1, 1.0 - x1], axis=1), (SPLIT_T.size, 1))
    T = np.repeat(SPLIT_T, x1.size)
    activity = np.log(x[:, 0]) + fluid.mixing.excess.at(T).ln_gamma(x)[:, 0]
    return (np.diff(activity.reshape(SPLIT_T.size, x1.size), axis=1) < 0.0).any(axis=1)


def judge(rule, sets, others):
    """The row of one rule in the table of all that were tried."""
    A0, _ = fit(sets)
    parts, how = parts_to_leave_out(sets)
    before = np.array([p.error(0.0) for p in parts])
    after, tilted = left_out(parts), None
    allowed = np.array([p.doubt for p in parts])
    reasons = []
    if before.mean() - after.mean() <= allowed.mean():
        reasons.append("gain on what was left out within the doubt")
    if (after - before > allowed).any():
        reasons.append(f"worse on {parts[int(np.argmax(after - before - allowed))].label}, left out")
    reasons += [f"worse on {p.label}" for p in others if p.error(A0) - p.error(0.0) > p.doubt]
    if not reasons:
        split = new_split(rule, A0)
        reasons = ([f"splits {split}"] if split else []) + moved_away(rule, A0)
    A1 = 0.0
    if not reasons and max(np.ptp(p.set.T) for p in sets) > 1.0:
        tilted = left_out(parts, 2)
        if after.mean() - tilted.mean() > allowed.mean():
            A0, A1 = fit(sets, 2)
            after = tilted
    figures = (np.mean([p.error(0.0) for p in sets]), np.mean([p.error(A0, A1) for p in sets]), before.mean(),
               after.mean(), np.nan if tilted is None else tilted.mean(), allowed.mean())  # fmt: skip
    row = ("/".join(rule[0]), "/".join(rule[1]), f"{A0:g}", f"{A1:g}", " ".join(p.set.name[:4] for p in sets),
           sum(p.at.size for p in sets), how, *("" if np.isnan(v) else f"{100.0 * v:.2f}" for v in figures),
           "; ".join(f"{p.set.name[:4]} {100 * p.error(0):.2f} to {100 * p.error(A0, A1):.2f}"
                     for p in others),
           0 if reasons else 1, "; ".join(reasons))  # fmt: skip
    return row, A0, A1, not reasons


def write(name: str, header, rows, remark: str) -> None:
    """A table of data/pairs."""
    with (DATA / "pairs" / name).open("w", encoding="utf-8", newline="") as file:
        file.write(f"# {remark}\n")
        writer = csv.writer(file, lineterminator="\n")
        writer.writerow(header)
        writer.writerows(rows)


def main() -> None:
    """Try every rule, write the kept ones and the table of all."""
    every = [points_of(name) for name in binary_sets.NAMES]
    tried, kept, served = [], [], set()
    for rule in CANDIDATES:
        covered = [p for p in every if serves(rule, p.set.species)]
        sets = [p for p in covered if p.set.quality == "A"]
        if {p.set.name for p in sets} & served:
            continue
        row, A0, A1, good = judge(rule, sets, [p for p in covered if p.set.quality == "B"])
        tried.append(row)
        print(*row, sep=" | ")
        if good:
            served |= {p.set.name for p in sets}
            kept += rows_of(rule, sets, A0, A1)
    write("pair_corrections.csv",
          ["one", "other", "A0", "A1", "T_low", "T_high", "measured", "source"], kept,
          "G^E/RT += x_i x_j (A0 + A1/T), T in K; one, other: a species, or else a family of species")
    write("pair_corrections_tried.csv",
          ["one", "other", "A0", "A1", "sets", "points", "left_out", "error_before", "error_after",
           "left_out_before", "left_out_after", "left_out_after_with_A1", "doubt", "never_fitted", "kept",
           "reason"], tried,
          "Every rule tried; mean absolute errors of the bubble pressure in percent, sets weighing the same")


def rows_of(rule, sets, A0: float, A1: float):
    """Rows of a kept rule: one for every two of its species or families."""
    T = np.concatenate([p.set.T for p in sets])
    pairs = "; ".join(dict.fromkeys(" + ".join(p.set.species) for p in sets))
    sources = ";".join(dict.fromkeys(source_key(p.set) for p in sets))
    ends = f"{T.min():.1f}", f"{T.max():.1f}"
    return [(one, other, f"{A0:g}", f"{A1:g}", *ends, pairs, sources) for one in rule[0] for other in rule[1]]


def source_key(one) -> str:
    """Key of a set's paper in data/sources.toml: the end of its DOI."""
    found = re.search(r"DOI 10\.\d+/([\w.]*\w)", one.source)
    return "vle-" + found[1].replace(".", "-") if found else one.name


if __name__ == "__main__":
    main()
