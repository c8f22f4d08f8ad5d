"""Makes headspace.md: measured vapour above retail gasolines at 25 degC beside the computed vapour.

Run from the top folder:

    python -m tests.studies.headspace

Measured are the mass shares of liquid and vapour of 25 gasolines (tests/measured/headspace), no
pressure: only ratios of K values can be compared. Nothing of the model is fitted to these data. Three
numbers per fuel come from them, and from nothing but paraffins and heavy aromatics:

1. Carry-over, the mass share of liquid in the vapour sample: median, over paraffins and aromatics of
   nine carbon atoms and more, of what is left of vapour over liquid after Raoult's law has its part.
2. Selection: a fuel counts if its paraffins of four to eight carbon atoms follow Raoult's relative
   volatilities within 15 % (root mean square). No activity model, no other family takes part.
3. The level: those same paraffins have a mean deviation of zero, in place of the pressure.

So MTBE, ethanol, olefins, naphthenes, benzene and toluene are tested blind. The paraffins of a
selected fuel are not wholly: half of them select, the other half are tested, and the reverse.
"""

from __future__ import annotations

import csv
import re
from dataclasses import dataclass
from functools import lru_cache
from pathlib import Path

import numpy as np

from screener.equilibrium import Fluid, bubble_pressure
from screener.ground.constants import ZERO_CELSIUS
from screener.species import find

FILE = Path(__file__).with_suffix(".md")
DATA = Path(__file__).parents[1] / "measured" / "headspace"
T_FLASK = ZERO_CELSIUS + 25.0
BAR = 0.15  # root mean square of ln K ratios of the paraffins that select a fuel
LEAST_LIQUID, LEAST_VAPOUR = 3e-3, 1e-3  # mass shares below which a ratio of two shares is not scored
LEAST_HEAVY = 1e-3  # mass share of the liquid from which a heavy species tells the carry-over
NOTES = """
Three of the four selected fuels with MTBE show it within 5 %; the fourth, 4567, 28 % low. The rule was
fixed before MTBE was looked at and is kept. 4567 is of the series Houston, September 2000, and so are 4562
and 4565: beside their own C6 paraffins all three show MTBE 27 to 31 % low, the eight fuels of the other
series between 8 % low and 17 % high. One model and one species cannot do that; the analyses of that series can. What in
them is not stated. A flame ionisation detector sees about a quarter to a third less of an ether's mass than of a
hydrocarbon's: a response that was corrected in the liquid and not in the vapour would look like this (a supposition).
The fuels of an earlier choice by paraffins (last mark in the column) hold MTBE within 5 %.

Ethylbenzene and the xylenes lie above the computed vapour in every series: there the vapour is no more than
the carry-over that is taken off it, and a carry-over told by heavier species falls short if part of the
film evaporates. They show nothing about activity. Ethanol, six fuels, is seen to about 25 %.

A fuel that is not selected shows light paraffins too low and C8 paraffins too high by much more than any
activity can: its vapour was taken before it had come to rest, or a film of liquid evaporated in the sampling.
"""
NEIGHBOURS = ("2,2-dimethylbutane", "2,3-dimethylbutane", "2-methylpentane", "3-methylpentane")


def rows(name):
    """The rows of a table of tests/measured/headspace."""
    text = (DATA / f"{name}.csv").read_text(encoding="utf-8").splitlines()
    return list(csv.DictReader(line for line in text if not line.startswith("#")))


def columns(table):
    """Profile numbers of a table of compositions."""
    return tuple(key for key in table[0] if key not in ("entry", "cas", "species", "note"))


def shares(table, fuels, names, *, own):
    """Mass shares (fuels, names) [-] and what no species stands for (fuels,); `own`: entries that are the species."""
    place = {name: i for i, name in enumerate(names)}
    w, unnamed = np.zeros((len(fuels), len(names))), np.zeros(len(fuels))
    for row in table:
        percent = np.array([float(row[fuel] or 0.0) for fuel in fuels])
        stands = row["species"].split("+") if row["species"] else []
        if not stands:
            unnamed += percent / 100.0
        elif not own or (row["note"] == "" and row["species"] in place):
            for name in stands:
                w[:, place[name]] += percent / 100.0 / len(stands)
    return w, unnamed


def carbon(one):
    """Carbon atoms of a species."""
    return int(re.match(r"C(\d*)", one.formula)[1] or 1)


def whole_liquid(table, fuels, names):
    """Mass shares (fuels, names) that add up to one: unnamed mass spread over what has seven carbon atoms and more."""
    w, unnamed = shares(table, fuels, names, own=False)
    heavy = np.array([carbon(find(name)) >= 7 for name in names])
    w = w + unnamed[:, None] * np.where(heavy, w, 0.0) / w[:, heavy].sum(axis=1, keepdims=True)
    return w / w.sum(axis=1, keepdims=True)


def liquid_names(table):
    """Species of a table, in the order of its rows."""
    return tuple(dict.fromkeys(name for row in table for name in row["species"].split("+") if name))


@dataclass(frozen=True)
class Headspace:
    """Fuels by species: measured liquid and vapour [mass share, NaN where absent], K by mass of two liquids [-]."""

    fuels: tuple
    names: tuple
    family: np.ndarray
    carbon: np.ndarray
    liquid: np.ndarray
    vapour: np.ndarray
    K: np.ndarray  # computed
    K_ideal: np.ndarray  # Raoult
    P: np.ndarray  # computed bubble pressure [Pa]
    psat: np.ndarray  # [Pa]

    @property
    def paraffin(self):
        return np.isin(self.family, ("paraffin", "isoparaffin"))

    def carry_over(self):
        """Mass share of liquid in each vapour sample (fuels,) and how many species tell it."""
        heavy = (self.carbon >= 9) & (self.paraffin | (self.family == "aromatic"))
        told = np.where(heavy & (self.liquid >= LEAST_HEAVY), (self.vapour / self.liquid - self.K_ideal) / (1.0 - self.K_ideal), np.nan)  # fmt: skip
        return np.nanmedian(told, axis=1), np.isfinite(told).sum(axis=1)

    def measured(self):
        """Vapour shares without the carry-over; NaN where too little of either phase is left to score."""
        f = self.carry_over()[0][:, None]
        clean = (self.vapour - f * self.liquid) / (1.0 - f)
        with np.errstate(invalid="ignore"):
            return np.where((self.liquid >= LEAST_LIQUID) & (clean >= LEAST_VAPOUR), clean, np.nan)

    def light(self, turn=None):
        """Mask of paraffins of four to eight carbon atoms; turn 0 or 1: every other one by vapour pressure."""
        mask = self.paraffin & (self.carbon >= 4) & (self.carbon <= 8)
        if turn is None:
            return mask
        by_pressure = np.flatnonzero(mask)[np.argsort(-self.psat[mask])]
        half = np.zeros(mask.size, dtype=bool)
        half[by_pressure[turn::2]] = True
        return half

    def deviations(self, K, level):
        """ln of measured over computed K ratios (fuels, names), the mean of the species `level` at zero."""
        ln = np.log(self.measured() / self.liquid / K)
        return ln - np.nanmean(np.where(level, ln, np.nan), axis=1, keepdims=True)

    def selected(self, level=None):
        """Mask of fuels whose paraffins (`level`, all light ones if not given) follow Raoult within the bar."""
        level = self.light() if level is None else level
        return spread(self.deviations(self.K_ideal, level), level) <= BAR


def spread(ln, mask):
    """Root mean square (fuels,) of deviations over the species of a mask."""
    return np.sqrt(np.nanmean(np.where(mask, ln, np.nan) ** 2, axis=1))


@lru_cache(maxsize=1)
def headspace():
    """The 25 fuels with measured liquid and vapour."""
    table = rows("liquid")
    fuels, names = columns(table), liquid_names(table)
    fluid = Fluid.of(names)
    whole = whole_liquid(table, fuels, names)
    x = whole / fluid.MW
    x /= x.sum(axis=1, keepdims=True)
    point = bubble_pressure(fluid, T_FLASK, x).require()
    species = [find(name) for name in names]
    psat = np.array([float(one.psat(T_FLASK)) for one in species])
    measured = [shares(t, fuels, names, own=True)[0] for t in (table, rows("vapour"))]
    liquid, vapour = (np.where(w > 0.0, w, np.nan) for w in measured)
    y_ideal = x * psat
    return Headspace(
        fuels, names, np.array([one.family for one in species]), np.array([carbon(one) for one in species]),
        liquid, vapour, by_mass(point.y, x, fluid.MW), by_mass(y_ideal / y_ideal.sum(axis=1, keepdims=True), x, fluid.MW),
        point.P, psat,
    )  # fmt: skip


def by_mass(y, x, MW):
    """K by mass shares of vapour y over liquid x, NaN where the liquid has none."""
    with np.errstate(invalid="ignore", divide="ignore"):
        return y / x * (x @ MW / (y @ MW))[:, None]


def held_out():
    """Paraffins that did not select their fuel: ln deviations, by model and after Raoult, both turns together."""
    h = headspace()
    found = []
    for turn in (0, 1):
        chooser, tested = h.light(turn), h.light(1 - turn)
        keep = h.selected(chooser)
        for K in (h.K, h.K_ideal):
            ln = np.where(tested, h.deviations(K, chooser), np.nan)[keep]
            found.append(ln[np.isfinite(ln)])
    return np.concatenate(found[0::2]), np.concatenate(found[1::2])


def groups():
    """Mask of species by the group they are told under."""
    h = headspace()
    light, name = h.carbon <= 8, np.array(h.names)
    single = {n: name == n for n in ("MTBE", "ethanol", "benzene", "toluene")}
    return {
        "normal paraffins, C4 to C8": (h.family == "paraffin") & h.light(),
        "isoparaffins, C4 to C8": (h.family == "isoparaffin") & h.light(), **single,
        "naphthenes": (h.family == "naphthene") & light, "olefins": (h.family == "olefin") & light,
        "aromatics of C8": (h.family == "aromatic") & (h.carbon == 8),
        "anything of C9 and more": h.carbon >= 9,
    }  # fmt: skip


def beside_neighbours():
    """MTBE of every fuel that holds it: ln of measured over computed beside the four C6 paraffins nearest to it."""
    h = headspace()
    near = np.isin(h.names, NEIGHBOURS)
    ln = h.deviations(h.K, near)[:, h.names.index("MTBE")]
    holds = h.liquid[:, h.names.index("MTBE")] > 0.02
    return {fuel: float(v) for fuel, v, is_in in zip(h.fuels, ln, holds, strict=True) if is_in}


def stated(values):
    """Count, median, root mean square and the share within 15 %, as cells of a table."""
    v = values[np.isfinite(values)]
    if not v.size:
        return "0 | | | "
    within = np.mean(np.abs(np.expm1(v)) <= 0.15)
    return f"{v.size} | {100 * np.expm1(np.median(v)):+.1f} | {100 * np.sqrt(np.mean(v**2)):.1f} | {100 * within:.0f}"


def fuel_lines(h, ln, index):
    """One line per fuel."""
    f, told = h.carry_over()
    ideal, model = spread(h.deviations(h.K_ideal, h.light()), h.light()), spread(ln, h.light())
    lines = ["| liquid profile | where, when | carry-over | told by | paraffins | rms Raoult, % | rms computed, % | selected | MTBE, % | ethanol, % | computed bubble pressure, kPa |",
             "|---|---|---|---|---|---|---|---|---|---|---|"]  # fmt: skip
    for i, fuel in enumerate(h.fuels):
        row = next(r for r in index if r["liquid_profile"] == fuel)
        number = np.isfinite(ln[i][h.light()]).sum()
        extra = [ln[i, h.names.index(n)] for n in ("MTBE", "ethanol")]
        cells = ["" if np.isnan(v) else f"{100 * np.expm1(v):+.0f}" for v in extra]
        chosen = ("yes" if h.selected()[i] else "") + (
            " (earlier: yes)" if row["earlier_choice"] == "1" else ""
        )
        lines.append(f"| {fuel} | {row['region']}, {row['sampled']} | {f[i]:.3f} | {told[i]} | {number} | {100 * ideal[i]:.1f} | "
                     f"{100 * model[i]:.1f} | {chosen} | {cells[0]} | {cells[1]} | {h.P[i] / 1e3:.1f} |")  # fmt: skip
    return lines


def main():
    """Write the tables."""
    h = headspace()
    ln, ideal, keep = h.deviations(h.K, h.light()), h.deviations(h.K_ideal, h.light()), h.selected()
    model, raoult = held_out()
    lines = ["# Vapour above 25 retail gasolines at 25 degC", "", "Made by `python -m tests.studies.headspace`.", "", *__doc__.splitlines()[6:], "",
             "Deviations are measured over computed, less one. Liquid and vapour shares below 0.3 and 0.1 mass% are not scored.", "",
             *fuel_lines(h, ln, rows("fuels")), "",
             f"Groups, selected fuels ({keep.sum()}) and all {keep.size}. Heavier than toluene the vapour is what is left of the carry-over.", "",
             "| group | selected: number | median, % | rms, % | within 15 %, % of them | after Raoult: median, % | all: number | median, % | rms, % | within 15 %, % of them |",
             "|---|---|---|---|---|---|---|---|---|---|"]  # fmt: skip
    for name, mask in groups().items():
        plain = ideal[keep][:, mask]
        raoult_median = f"{100 * np.expm1(np.nanmedian(plain)):+.0f}" if np.isfinite(plain).any() else ""
        lines.append(f"| {name} | {stated(ln[keep][:, mask])} | {raoult_median} | {stated(ln[:, mask])} |")
    lines += ["", "Paraffins that did not choose their fuel (every other one chooses, the rest is tested, both turns): "
              + f"rms {100 * np.sqrt(np.mean(model**2)):.1f} % computed, {100 * np.sqrt(np.mean(raoult**2)):.1f} % after Raoult, {model.size} values.", "",
              "Species of the selected fuels.", "", "| species | number | median, % | rms, % | within 15 %, % of them |", "|---|---|---|---|---|"]  # fmt: skip
    for j in np.argsort(-h.psat):
        if np.isfinite(ln[keep][:, j]).sum() >= 3:
            lines.append(f"| {h.names[j]} | {stated(ln[keep][:, j])} |")
    far = np.argwhere((np.abs(np.expm1(ln)) > 0.15) & keep[:, None] & h.light())
    single = "; ".join(f"{h.fuels[i]} {h.names[j]} {100 * np.expm1(ln[i, j]):+.0f}" for i, j in far)
    lines += ["", f"Single paraffin ratios of the selected fuels outside 15 %, {len(far)} of {np.isfinite(ln[keep][:, h.light()]).sum()}: {single}.",
              "Those of 4679 show a film that evaporates (light ones low, C8 high), in 4698 the carry-over is a third of the isooctane measured."]  # fmt: skip
    lines += ["", f"MTBE beside {', '.join(NEIGHBOURS)}, which boil around it and share whatever happened to a sample: every fuel that holds it.", "",
              "| liquid profile | measured over computed, % |", "|---|---|"]  # fmt: skip
    lines += [f"| {fuel} | {100 * np.expm1(v):+.0f} |" for fuel, v in beside_neighbours().items()]
    lines += ["", *NOTES.strip().splitlines()]
    FILE.write_text("\n".join(lines) + "\n", encoding="utf-8")


if __name__ == "__main__":
    main()
