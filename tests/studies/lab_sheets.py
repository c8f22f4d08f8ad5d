"""Twenty hidden recipes written as laboratory sheets and fitted again.

A hidden recipe has 12 to 25 species. Its sheet holds what a certificate prints, rounded as there. The fit starts
from a recipe that lacks some of the species and has other shares, or from nothing. Run
`python -m tests.studies.lab_sheets` to write lab_sheets.md.
"""

from __future__ import annotations

import sys
import time
from dataclasses import dataclass
from pathlib import Path

import numpy as np

from screener.blends import Blend, LabSheet
from screener.volatility import distillation_d86, dvpe, true_vapour_pressure, vapour_pressure_crude

SEED = 20260714
LIGHT = (
    "n-butane",
    "isobutane",
    "isopentane",
    "n-pentane",
    "2-methyl-2-butene",
    "1-pentene",
    "trans-2-pentene",
)
BODY = (
    "2-methylpentane", "3-methylpentane", "n-hexane", "2,3-dimethylbutane", "methylcyclopentane", "1-hexene",
    "cyclohexane", "2-methylhexane", "3-methylhexane", "n-heptane", "isooctane", "2,3,4-trimethylpentane",
    "methylcyclohexane", "benzene", "toluene", "2,4-dimethylhexane", "n-octane", "2-methylheptane", "1-octene",
)  # fmt: skip
TAIL = (
    "ethylbenzene", "o-xylene", "m-xylene", "p-xylene", "n-nonane", "1,2,4-trimethylbenzene", "3-ethyltoluene",
    "1,3,5-trimethylbenzene", "n-decane", "1,3-diethylbenzene", "1,2-dimethyl-4-ethylbenzene", "n-undecane",
)  # fmt: skip
CRUDE_LIGHT = ("propane", "isobutane", "n-butane", "isopentane", "n-pentane")
CRUDE_TAIL = (
    "n-nonane",
    "n-decane",
    "n-dodecane",
    "n-tetradecane",
    "n-hexadecane",
    "o-xylene",
    "butylcyclohexane",
)


@dataclass(frozen=True)
class Hidden:
    """One hidden recipe with its sheet and what the fit may start from (None: the sheet alone)."""

    kind: str
    blend: Blend
    sheet: LabSheet
    start: Blend | None


@dataclass(frozen=True)
class Outcome:
    """What came back: worst misfit in units of R and its number, errors of the true vapour pressure [-], processor time [s]."""

    kind: str
    species: int
    missing: int
    numbers: int
    worst: float
    name: str
    error_20: float
    error_50: float
    seconds: float


def hidden(i: int) -> Hidden:
    """The recipe number i: 0 to 11 gasolines with a recipe, 12 to 15 bare, 16 to 19 condensates with a recipe."""
    rng = np.random.default_rng([SEED, i])
    crude = i >= 16
    shares = _recipe(rng, crude, ethanol=i % 3 == 1)
    blend = Blend.of(shares, title=f"hidden {i}")
    sheet = _crude_sheet(blend) if crude else _gasoline_sheet(blend)
    kind = "condensate, recipe" if crude else "gasoline, recipe" if i < 12 else "gasoline, sheet alone"
    return Hidden(kind, blend, sheet, None if kind.endswith("alone") else _start(rng, shares))


def _recipe(rng, crude, ethanol):
    pools = ((CRUDE_LIGHT, 4, 0.10), (BODY, 7, 0.50), (CRUDE_TAIL, 5, 0.40)) if crude else (
        (LIGHT, 4, 0.24), (BODY, 8, 0.50), (TAIL, 5, 0.26))  # fmt: skip
    shares = {}
    for pool, about, volume in pools:
        count = int(np.clip(rng.integers(about - 1, about + 3), 2, len(pool)))
        part = rng.dirichlet(np.full(count, 3.0)) * volume * rng.uniform(0.85, 1.15)
        shares |= {
            f"species:{name}": float(v) for name, v in zip(rng.choice(pool, count, False), part, strict=True)
        }
    if "species:propane" in shares:
        shares["species:propane"] = min(shares["species:propane"], 0.01)
    if "species:n-butane" in shares:
        shares["species:n-butane"] = min(shares["species:n-butane"], 0.05)
    if "species:isobutane" in shares:
        shares["species:isobutane"] = min(shares["species:isobutane"], 0.02)
    if ethanol and not crude:
        shares["species:ethanol"] = 0.1 * sum(shares.values()) / 0.9
    total = sum(shares.values())
    return {name: v / total for name, v in shares.items()}


def _start(rng, shares):
    """Three to five species forgotten, the others off by about a third."""
    names = [n for n in shares if n != "species:ethanol"]
    gone = set(rng.choice(names, int(rng.integers(3, 6)), False))
    kept = {n: v * float(np.exp(rng.normal(0.0, 0.3))) for n, v in shares.items() if n not in gone}
    total = sum(kept.values())
    return Blend.of({n: v / total for n, v in kept.items()}, title="starting recipe")


def _curve(blend, points):
    curve = distillation_d86(blend.fluid, blend.z)
    # A certificate prints half degrees.
    rows = [(p, float(np.round(2 * (curve.temperature(p)[0] - 273.15)) / 2 + 273.15)) for p in points]
    return curve, tuple(rows)


def _family(blend, family):
    from screener.species import find

    return sum(
        v for n, v in zip(blend.names, blend.volume_fractions, strict=True) if find(n).family == family
    )


def _gasoline_sheet(blend):
    curve, rows = _curve(blend, (0.05, 0.1, 0.2, 0.3, 0.5, 0.7, 0.8, 0.9, 0.95))
    volume = dict(zip(blend.names, blend.volume_fractions, strict=True))
    return LabSheet(
        density_15=round(blend.density_15, 1),
        dvpe=1e3 * round(float(dvpe(blend.fluid, blend.z).P_total[0] * 0.965e-3 - 3.78), 1),
        distillation=rows,
        ibp=round(float(curve.T[0, 0]), 1),
        fbp=round(float(curve.T[0, -1]), 1),
        e70=round(float(curve.E70[0]), 3),
        e100=round(float(curve.E100[0]), 3),
        e150=round(float(curve.E150[0]), 3),
        oxygenates=(("ethanol", round(volume["ethanol"], 3)),) if "ethanol" in volume else (),
        benzene=round(volume.get("benzene", 0.0), 4),
        aromatics=round(_family(blend, "aromatic"), 3),
        olefins=round(_family(blend, "olefin"), 3),
    )


def _crude_sheet(blend):
    _, rows = _curve(blend, (0.1, 0.2, 0.3, 0.5, 0.7, 0.8, 0.9, 0.95))
    P = [float(vapour_pressure_crude(blend.fluid, blend.z, ratio=r).P[0]) for r in (4.0, 0.5)]
    return LabSheet(
        density_15=round(blend.density_15, 1),
        vpcr=tuple((r, 310.95, 100.0 * round(p / 100.0)) for r, p in zip((4.0, 0.5), P, strict=True)),
        distillation=rows,
        product="crude",
    )


def outcome(i: int) -> Outcome:
    """Fit the sheet of the recipe number i and hold the answer against the recipe."""
    case = hidden(i)
    began = time.process_time()
    fitted = Blend.from_lab(case.sheet, case.start)
    seconds = time.process_time() - began
    misfits = fitted.report.misfits
    name = max(misfits, key=lambda n: abs(misfits[n]))
    errors = []
    for T in (293.15, 323.15):
        true, back = (float(true_vapour_pressure(b.fluid, T, b.z).P[0]) for b in (case.blend, fitted))
        errors.append(back / true - 1.0)
    missing = len(set(case.blend.names) - set(case.start.names)) if case.start else len(case.blend.names)
    return Outcome(
        case.kind, len(case.blend.names), missing, len(misfits), misfits[name], name, *errors, seconds
    )


def write(outcomes) -> str:
    """The table as Markdown."""
    lines = [
        "# Hidden recipes back from their laboratory sheets", "",
        "Made by `python -m tests.studies.lab_sheets`.", "",
        "| recipe | species | not in the start | numbers | worst misfit, R | of | TVP 20 degC, % | TVP 50 degC, % | CPU s |",
        "|---|---|---|---|---|---|---|---|---|",
    ]  # fmt: skip
    for i, one in enumerate(outcomes):
        lines.append(
            f"| {i}: {one.kind} | {one.species} | {one.missing} | {one.numbers} | {one.worst:+.2f} | {one.name} "
            f"| {100 * one.error_20:+.2f} | {100 * one.error_50:+.2f} | {one.seconds:.1f} |"
        )
    errors = 100.0 * np.abs([[one.error_20, one.error_50] for one in outcomes])
    worst, longest = max(abs(one.worst) for one in outcomes), max(one.seconds for one in outcomes)
    text = f"True vapour pressure at 20 and 50 degC: median {np.median(errors):.2f} %, worst {errors.max():.2f} %. "
    lines += ["", f"{text}Worst misfit {worst:.2f} R. Longest {longest:.1f} s of one processor."]
    return "\n".join(lines) + "\n"


def main(chosen=range(20)):
    """Run and write the table, or print it when only some were chosen."""
    outcomes = []
    for i in chosen:
        outcomes.append(outcome(i))
        sys.stderr.write(f"{i} {outcomes[-1]}\n")
    if len(outcomes) == 20:
        Path(__file__).with_suffix(".md").write_text(write(outcomes), encoding="utf-8")


if __name__ == "__main__":
    main([int(a) for a in sys.argv[1:]] or range(20))
