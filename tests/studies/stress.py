"""Makes stress.md: random feeds, flashed and brought to their saturation points, every answer judged; libraries beside.

Run from the top folder (some ten minutes; --quick takes a tenth of the feeds and writes nothing):

    python -m tests.studies.stress
"""

from __future__ import annotations

import os

for _name in ("OMP_NUM_THREADS", "OPENBLAS_NUM_THREADS"):
    os.environ.setdefault(_name, "1")

import argparse
import time
from collections import Counter
from pathlib import Path

import numpy as np

from screener.equilibrium import bubble_pressure, bubble_temperature, dew_pressure, dew_temperature, flash_tp
from screener.equilibrium.second_liquid import DOUBTFUL, THREE_PHASES, TWO_LIQUIDS
from screener.ground.status import Status
from tests.studies.stress_absent import exists
from tests.studies.stress_cases import SEED, Cases, blend_pool, stress_cases
from tests.studies.stress_judge import LIQUID, OWN, ModelPhases, PlainPR, judge_phases, judge_points

PAGE = Path(__file__).with_suffix(".md")
POINTS = {
    "bubble pressure": (bubble_pressure, "T", True), "dew pressure": (dew_pressure, "T", False),
    "bubble temperature": (bubble_temperature, "P", True), "dew temperature": (dew_temperature, "P", False),
}  # fmt: skip
ANSWERED = (Status.CONVERGED, Status.LIQUID_SPLITS, Status.NO_SOLUTION, Status.OUT_OF_RANGE)
NAMES = {
    Status.CONVERGED: "converged", Status.LIQUID_SPLITS: "second liquid", Status.NO_SOLUTION: "none exists",
    Status.OUT_OF_RANGE: "out of range",
}  # fmt: skip


def flash_faults(equation, cases: Cases, found, generator):
    """Faults (n,) of the lanes of a flash that converged or found two liquids, and the distance found (n,)."""
    shares = np.stack([1.0 - found.beta - np.nan_to_num(found.beta_W), found.beta, np.nan_to_num(found.beta_W)])
    phases = np.stack([found.x, found.y, found.x_W])
    some = np.flatnonzero(found.ok | np.isin(found.checks, (TWO_LIQUIDS, THREE_PHASES)))
    fault, tpd = np.full(cases.T.size, "", dtype=object), np.full(cases.T.size, np.nan)
    held = cases.take(some)
    fault[some], tpd[some], _ = judge_phases(
        equation(held.T, held.P), held.z, shares[:, some], phases[:, some], generator, OWN
    )
    doubtful = found.checks == DOUBTFUL  # one liquid stands by rule where the model splits
    fault[doubtful & (fault == "tangent plane")] = ""
    return fault, tpd


def point_faults(equation, cases: Cases, found, bubble: bool, generator):
    """As `flash_faults`, of saturation points. Where a number stands under LIQUID_SPLITS, it has to be the point of
    one liquid held together, and a dense phase has to lie below the tangent plane: else 'no second liquid'."""
    split = found.status == Status.LIQUID_SPLITS
    some = np.flatnonzero((found.ok | split) & np.isfinite(found.P) & np.isfinite(found.T))
    fault, split = np.full(cases.T.size, "", dtype=object), split[some]
    other = (found.y if bubble else found.x)[some]
    said, tpd, ratio = judge_points(
        equation(found.T[some], found.P[some]), cases.z[some], other, bubble, generator, OWN
    )
    doubtful = found.checks[some] == DOUBTFUL
    said[(split | doubtful) & (said == "tangent plane")] = ""
    said[split & ~((tpd < 0.0) & (ratio < LIQUID))] = "no second liquid"
    fault[some] = said
    return fault, int(split.sum())


def tally(status):
    """Counts of the answers, and of lanes not converged."""
    counts = Counter(status.tolist())
    return [counts.get(one, 0) for one in ANSWERED], sum(v for k, v in counts.items() if k not in ANSWERED)


class Report:
    """The page while it is written; also printed."""

    def __init__(self):
        self.lines = []

    def say(self, *lines):
        """Some lines."""
        self.lines += lines
        print(*lines, sep="\n", flush=True)

    def table(self, head, rows):
        """A table; cells as they come."""
        self.say("| " + " | ".join(head) + " |", "|" + "---|" * len(head))
        for row in rows:
            self.say("| " + " | ".join(str(cell) for cell in row) + " |")
        self.say("")


def model_part(report, title, cases: Cases, equation, generator, coldest=60.0):
    """All five questions of one model; coldest [K] is where its range ends."""
    n = cases.T.size
    report.say(f"## {title}", "", f"{n} feeds; the full check of every answer.", "")
    rows, worst, lost, all_lanes, numbered = [], [], 0, 0, 0
    started = time.perf_counter()
    found = flash_tp(cases.fluid, cases.T, cases.P, cases.z, check="full")
    spent = time.perf_counter() - started
    fault, _ = flash_faults(equation, cases, found, generator)
    rows.append(_row("flash at T and P", found, fault, 0, spent))
    phases = Counter(zip(found.phases.tolist(), found.checks.tolist()))
    worst += _faults("flash at T and P", cases, fault)
    lost, all_lanes = lost + rows[-1][-4], all_lanes + n
    flashed = found
    for what, (function, name, bubble) in POINTS.items():
        value = cases.T if name == "T" else cases.P
        started = time.perf_counter()
        found = function(cases.fluid, value, cases.z, check="full")
        spent = time.perf_counter() - started
        fault, held = point_faults(equation, cases, found, bubble, generator)
        numbered += held
        none = np.flatnonzero(found.status == Status.NO_SOLUTION)
        there = exists(equation, name, value[none], cases.z[none], bubble, generator, coldest)
        fault[none[there]] = "exists"
        rows.append(_row(what, found, fault, int(there.sum()), spent))
        worst += _faults(what, cases, fault)
        lost, all_lanes = lost + rows[-1][-4], all_lanes + n
    head = ["question", *NAMES.values(), "not converged", "converged but false", "'none exists' but found", "s"]
    report.table(head, rows)
    report.say(
        f"Not converged: {lost} of {all_lanes} lanes, {100.0 * lost / all_lanes:.3f} %. Of the saturation points named",
        f"'second liquid' {numbered} carry the number of one liquid held together; those are judged too (equal fugacity,",
        "and the second liquid has to be there).",
        "",
    )
    report.table(["phases of the flash", "check", "feeds"], [(p, c, k) for (p, c), k in sorted(phases.items())])
    if worst:
        report.table(["question", "feed", "family", "fault"], worst)
    return flashed


def _row(what, found, fault, false_none, spent):
    answered, lost = tally(found.status)
    false = int(((fault != "") & (fault != "exists")).sum())
    return what, *answered, lost, false, false_none, f"{spent:.1f}"


def _faults(what, cases, fault):
    return [(what, int(i), cases.family[i], fault[i]) for i in np.flatnonzero(fault != "")]


def by_family(report, cases: Cases, flashed):
    """Flash answers by family."""
    rows = []
    for family in dict.fromkeys(cases.family):
        here = cases.family == family
        answered, lost = tally(flashed.status[here])
        steps = f"{flashed.iterations[here].mean():.0f}"
        rows.append((family, int(here.sum()), answered[0], answered[1], lost, steps))
    report.table(["family", "feeds", "converged", "second liquid", "not converged", "mean steps"], rows)


def main():
    """Write the page."""
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("--quick", action="store_true", help="a tenth of the feeds, nothing written")
    parser.add_argument("--no-peers", action="store_true", help="without the libraries")
    asked = parser.parse_args()
    n = 200 if asked.quick else 2000
    generator = np.random.default_rng(SEED + 1)
    report = Report()
    report.say("# Stress: random feeds, every answer judged", "", *INTRODUCTION)
    cases = stress_cases(n)
    flashed = model_part(report, "Peng-Robinson", cases, lambda T, P: PlainPR(cases.fluid, T, P), generator)
    by_family(report, cases, flashed)
    blends = stress_cases(n // 5, blend_pool())
    model_part(report, "Model of the blends", blends, lambda T, P: ModelPhases(blends.fluid, T, P), generator, 155.0)
    if not asked.no_peers:
        from tests.studies.stress_peers import peers_part

        peers_part(report, cases.take(np.arange(0, n, 5)), generator)
    if not asked.quick and not asked.no_peers:
        PAGE.write_text("\n".join(report.lines).rstrip() + "\n", encoding="utf-8")


INTRODUCTION = (
    "2 to 15 species of 25 from nitrogen to eicosane with water and methanol, 230-400 K, 20-3,000 kPa (near-critical",
    "feeds at up to 1.5 times their pseudo-critical pressure), shares down to 1e-12. Judged by equal fugacity (1e-8),",
    "balance (1e-11) and tangent plane (-1e-7) with another code: plain Peng-Robinson, plain substitution from every",
    "pure species, from ideal vapour and liquid, and from random compositions. Where an answer says that no saturation",
    "point exists, a ladder of 60 states is searched for one. Made by `python -m tests.studies.stress`.",
    "",
)


if __name__ == "__main__":
    main()
