"""Time of the equilibrium floor against thermo, feos and CoolProp, in one run: `python -m tests.bench.bench_flash`.

A year of hours (8,760 temperatures) goes through the batch; the libraries take
a sample of the same hours in a loop with the same equation and constants, and
all figures are per point, residual and balance included. `--write` keeps the
table as bench_flash.md. Nothing here passes or fails.
"""

from __future__ import annotations

import argparse
import os
import platform
import resource
import time
import tracemalloc
from concurrent.futures import ThreadPoolExecutor
from pathlib import Path

for _name in ("OMP_NUM_THREADS", "OPENBLAS_NUM_THREADS"):
    os.environ.setdefault(_name, "1")

import numpy as np

from screener.equilibrium import Fluid, bubble_pressure, flash_tp
from screener.equilibrium.mixing import VanDerWaals
from tests.studies.stress_peers import CoolProp, Feos, Thermo

PAGE = Path(__file__).with_suffix(".md")
HOURS = 8760
NAMES = ["n-butane", "isopentane", "n-pentane", "n-hexane", "isooctane", "n-heptane", "toluene", "m-xylene",
         "n-octane", "cyclohexane"]  # fmt: skip
Z = np.array([0.05, 0.13, 0.09, 0.10, 0.16, 0.08, 0.15, 0.10, 0.07, 0.07])
LIBRARIES = {"thermo": Thermo, "feos": Feos, "CoolProp": CoolProp}


def hours():
    """Liquid temperatures of a temperate year with a daily swing. [K]"""
    hour = np.arange(HOURS)
    noise = np.random.default_rng(8).normal(0.0, 1.5, HOURS)
    return 288.0 - 11.0 * np.cos(2 * np.pi * hour / HOURS) - 4.0 * np.cos(2 * np.pi * hour / 24) + noise


def seconds(function, repeat=5):
    """Shortest of some runs, and the last answer."""
    best = np.inf
    for _ in range(repeat):
        start = time.perf_counter()
        answer = function()
        best = min(best, time.perf_counter() - start)
    return best, answer


def megabytes(function):
    """Most memory a call holds at once, its answer included. [MB]"""
    tracemalloc.start()
    function()
    peak = tracemalloc.get_traced_memory()[1]
    tracemalloc.stop()
    return peak / 1e6


def loop(function, points):
    """Seconds per point of a library called point by point; the median, lest one slow state decides."""
    spent = []
    for point in points:
        start = time.perf_counter()
        function(*point)
        spent.append(time.perf_counter() - start)
    return float(np.median(spent))


class Table:
    """Rows of the page, printed as they come."""

    HEAD = ("what", "points", "us per point", *LIBRARIES, "MB held", "note")

    def __init__(self):
        self.lines = ["| " + " | ".join(self.HEAD) + " |", "|" + "---|" * len(self.HEAD)]
        print(*self.lines, sep="\n")

    def row(self, what, points, function, peers, note="", repeat=5):
        """Our time, that of each library (seconds per point, None where not asked) and the ratio; our answer."""
        spent, answer = seconds(function, repeat)
        ours = spent / points
        held = f"{megabytes(function):.0f}" if points > 1 else ""
        cells = [f"{peers[k] * 1e6:,.0f} us = {peers[k] / ours:,.1f} x" if k in peers else "" for k in LIBRARIES]
        note = note(answer) if callable(note) else note
        self.lines.append("| " + " | ".join([what, f"{points:,}", f"{ours * 1e6:,.1f}", *cells, held, note]) + " |")
        print(self.lines[-1], flush=True)
        return ours, answer


def with_kij(fluid):
    """The fluid with a matrix of zeros, which is what the libraries are given."""
    from dataclasses import replace

    return replace(fluid, mixing=VanDerWaals(np.zeros((fluid.c, fluid.c))))


def asked(fluid, names, question, z, points):
    """Seconds per point of the libraries named, by name; `question` is 'flash' or 'bubble'."""
    there = np.arange(fluid.c)
    out = {}
    for name, few in names.items():
        library = LIBRARIES[name](with_kij(fluid))
        getattr(library, question)(*points[0], z, there)  # the first call builds what is kept
        out[name] = loop(getattr(library, question), [(*point, z, there) for point in points[:few]])
    return out


def thermo_unifac(names):
    """thermo's activity-coefficient flash with modified UNIFAC (Dortmund) and its own vapour pressures."""
    from thermo import PRMIX, UNIFAC, CEOSGas, ChemicalConstantsPackage, FlashVL, GibbsExcessLiquid
    from thermo.unifac import DOUFIP2016, DOUFSG

    known = [{"isooctane": "2,2,4-trimethylpentane"}.get(name, name) for name in names]
    constants, correlations = ChemicalConstantsPackage.from_IDs(known)
    c = len(names)
    excess = UNIFAC.from_subgroups(
        T=300.0, xs=[1.0 / c] * c, chemgroups=constants.UNIFAC_Dortmund_groups, version=1,
        subgroups=DOUFSG, interaction_data=DOUFIP2016,
    )  # fmt: skip
    liquid = GibbsExcessLiquid(
        VaporPressures=correlations.VaporPressures, HeatCapacityGases=correlations.HeatCapacityGases,
        VolumeLiquids=correlations.VolumeLiquids, GibbsExcessModel=excess, equilibrium_basis="Psat",
        caloric_basis="Psat", T=300.0, P=1e5, zs=[1.0 / c] * c,
    )  # fmt: skip
    gas = CEOSGas(
        PRMIX, {"Tcs": constants.Tcs, "Pcs": constants.Pcs, "omegas": constants.omegas},
        HeatCapacityGases=correlations.HeatCapacityGases,
    )  # fmt: skip
    return FlashVL(constants, correlations, liquid=liquid, gas=gas)


def wide(count):
    """A Peng-Robinson fluid of many invented pseudo-components from butane to C30."""
    t = np.linspace(0.0, 1.0, count)
    return Fluid.from_constants(425.0 + 400.0 * t, 3.8e6 * (0.9e6 / 3.8e6) ** t, 0.2 + 0.9 * t, np.full(count, 0.1))


def cubic_rows(table, fluid, T, some):
    """Peng-Robinson, ten hydrocarbons."""
    few = {"thermo": some.size, "feos": some.size // 2, "CoolProp": some.size // 5}
    at = [(t,) for t in some]

    def settled(answer):
        return f"all converged: {answer.ok.all()}, residual {np.nanmax(answer.residual):.0e}"

    bubble, found = table.row(
        "PR bubble pressure, one composition", HOURS, lambda: bubble_pressure(fluid, T, Z),
        asked(fluid, few, "bubble", Z, at), settled,
    )  # fmt: skip
    each = np.random.default_rng(9).dirichlet(60.0 * Z, HOURS)
    table.row("PR bubble pressure, every hour its own", HOURS, lambda: bubble_pressure(fluid, T, each), {}, settled)
    full, _ = table.row(
        "PR bubble pressure, full check", HOURS, lambda: bubble_pressure(fluid, T, Z, check="full"), {}, settled, 2
    )
    half = HOURS // 2
    with ThreadPoolExecutor(2) as pool:
        table.row(
            "PR bubble pressure, two threads", HOURS,
            lambda: list(pool.map(lambda part: bubble_pressure(fluid, part, Z), (T[:half], T[half:]))), {},
        )  # fmt: skip
    P, P_some = 0.8 * found.P, 0.8 * bubble_pressure(fluid, some, Z).P
    states = list(zip(some, P_some))
    flash, _ = table.row(
        "PR TP flash, two phases", HOURS, lambda: flash_tp(fluid, T, P, Z), asked(fluid, few, "flash", Z, states),
        lambda f: f"beta {f.beta.min():.2f}..{f.beta.max():.2f}, {settled(f)}",
    )  # fmt: skip
    states = [(t, p / 0.8 * 1.5) for t, p in states]
    table.row(
        "PR TP flash, one phase", HOURS, lambda: flash_tp(fluid, T, 1.5 * found.P, Z),
        asked(fluid, {name: max(4, n // 4) for name, n in few.items()}, "flash", Z, states),
        lambda f: f"phases {sorted(set(f.phases.tolist()))}",
    )  # fmt: skip
    checked, _ = table.row(
        "PR TP flash, full check", HOURS, lambda: flash_tp(fluid, T, P, Z, check="full"), {},
        lambda f: f"tangent plane {np.nanmin(f.tpd):.0e}", repeat=2,
    )  # fmt: skip
    return bubble, full, flash, checked


def blend_rows(table, T, some):
    """The model of the blends: the ten hydrocarbons with 20 % ethanol."""
    names, share = [*NAMES, "ethanol"], np.append(0.8 * Z, 0.2)
    blend, theirs = Fluid.of(names), thermo_unifac(names)
    z = share.tolist()
    peers = {"thermo": loop(lambda t: theirs.flash(T=t, VF=0, zs=z), [(t,) for t in some[: some.size // 2]])}
    _, found = table.row(
        "PR-GE bubble pressure, 11 with ethanol", HOURS, lambda: bubble_pressure(blend, T, share), peers,
        lambda f: f"all converged: {f.ok.all()}; thermo: UNIFAC over vapour pressures",
    )  # fmt: skip
    P, states = 0.8 * found.P, list(zip(some, 0.8 * bubble_pressure(blend, some, share).P))
    peers = {"thermo": loop(lambda t, p: theirs.flash(T=t, P=p, zs=z), states)}
    flash, _ = table.row(
        "PR-GE TP flash, two phases", HOURS, lambda: flash_tp(blend, T, P, share), peers,
        lambda f: f"all converged: {f.ok.all()}",
    )  # fmt: skip
    n = HOURS // 4
    checked, _ = table.row(
        "PR-GE TP flash, full check", n, lambda: flash_tp(blend, T[:n], P[:n], share, check="full"), {},
        lambda f: f"tangent plane {np.nanmin(f.tpd):.0e}", repeat=2,
    )  # fmt: skip
    return blend, share, flash, checked


def main():
    """Print the table."""
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("--sample", type=int, default=100, help="hours given to each library")
    parser.add_argument("--write", action="store_true", help="keep the table as bench_flash.md")
    given = parser.parse_args()
    T = hours()
    some = T[:: HOURS // given.sample][: given.sample]
    constants = Fluid.of(NAMES, model="PR")
    fluid = Fluid.from_constants(constants.Tc, constants.Pc, constants.omega, constants.MW)
    table = Table()
    bubble, bubble_full, flash, flash_full = cubic_rows(table, fluid, T, some)
    blend, share, blend_flash, blend_full = blend_rows(table, T, some)
    for count in (15, 40):
        many, z = wide(count), np.full(count, 1.0 / count)
        few = {"thermo": 20, "feos": 10} | ({"CoolProp": 5} if count == 15 else {})
        table.row(
            f"PR bubble pressure, {count} species", HOURS, lambda f=many, z=z: bubble_pressure(f, T, z),
            asked(many, few, "bubble", z, [(t,) for t in some]), lambda f: f"all converged: {f.ok.all()}",
        )  # fmt: skip
        P = 0.5 * bubble_pressure(many, T, z).P
        table.row(
            f"PR TP flash, {count} species", HOURS, lambda f=many, z=z, P=P: flash_tp(f, T, P, z),
            asked(many, {"thermo": 20, "feos": 10}, "flash", z, [(T[0], P[0])] * 20),
            lambda f: f"all converged: {f.ok.all()}",
        )  # fmt: skip
    once = [(300.0,)] * 60
    one, _ = table.row(
        "PR bubble pressure, one call", 1, lambda: bubble_pressure(fluid, 300.0, Z),
        asked(fluid, {"thermo": 60, "feos": 60, "CoolProp": 20}, "bubble", Z, once), repeat=300,
    )  # fmt: skip
    few = {"thermo": 60, "feos": 60, "CoolProp": 20}
    table.row(
        "PR TP flash, one call", 1, lambda: flash_tp(fluid, 300.0, 5e4, Z),
        asked(fluid, few, "flash", Z, [(300.0, 5e4)] * 60), repeat=300,
    )  # fmt: skip
    table.row("PR-GE bubble pressure, one call", 1, lambda: bubble_pressure(blend, 300.0, share), {}, repeat=200)
    peak = resource.getrusage(resource.RUSAGE_SELF).ru_maxrss / 1024
    cost = (
        f"Full check over plain: bubble pressure {bubble_full / bubble:.0f} x, TP flash {flash_full / flash:.0f} x, TP"
        f" flash with ethanol {blend_full / blend_flash:.0f} x. Peak memory of the process, libraries included:"
        f" {peak:.0f} MB."
    )
    year = (
        f"{HOURS * bubble:.2f} s, its full check {HOURS * bubble_full:.1f} s, that of the flash with ethanol"
        f" {HOURS * blend_full:.1f} s"
    )
    tail = ["", cost, "", VERDICT.format(year=year, one=f"{1e3 * one:.1f} ms")]
    print(*tail, sep="\n")
    if given.write:
        where = (
            f"`python -m tests.bench.bench_flash --write`: {platform.machine()}, {os.cpu_count()} shared cores, one"
            f" thread but where said, Python {platform.python_version()}, NumPy {np.__version__}. Libraries: a loop over"
            f" up to {given.sample} of the {HOURS:,} hours, same equation and constants, median per point; x is their"
            " time over ours."
        )
        page = ["# Last run of the bench", "", where, "", *table.lines, *tail]
        PAGE.write_text("\n".join(page) + "\n", encoding="utf-8")


VERDICT = (
    "Is a compiled backend worth its weight? A year of hours takes {year}; a single call {one}. Batching meets every"
    " need there is. A compiler could shorten the single call and the full check; neither holds anybody up (a case makes"
    " a few dozen calls and full checks of a few hundred lanes), while a compiler or a wheel per platform would hold up"
    " every installation. Two threads gain nothing: the arrays of a chunk are too small to be worth sharing. The default"
    " stays plain NumPy, one thread."
)


if __name__ == "__main__":
    main()
