"""Flash points of crudes and fuels computed from their distillation curve and density alone.

Run from the top folder, some two minutes; writes tests/studies/oil_flash_points.md:

    python tests/studies/oil_flash_points.py
"""

from __future__ import annotations

import csv
import json
import sys
from pathlib import Path

import numpy as np

ROOT = Path(__file__).resolve().parents[2]
sys.path.insert(0, str(ROOT))

from screener.equilibrium import Fluid
from screener.fire import flash_point
from screener.ground.constants import ZERO_CELSIUS
from screener.volatility.cutting import pseudo_components

HERE = Path(__file__).parent
OUT = Path(__file__).with_suffix(".md")
TAIL = 100.0  # [K] what did not distil is taken to boil so far above the last point; it sends no vapour


def oils(quality: str) -> list[dict[str, str]]:
    """Rows of one grade."""
    with (HERE / "data" / "oil_flash_and_distillation.csv").open(encoding="utf-8", newline="") as file:
        rows = list(csv.DictReader(line for line in file if not line.startswith("#")))
    return [row for row in rows if row["quality"] == quality]


def volume_curve(row) -> tuple[np.ndarray, np.ndarray]:
    """Volume fractions [-] and boiling points [K] from the mass percent of the simulated distillation.

    One Watson factor for the whole makes the density of a slice go with the cube root of its
    boiling point.
    """
    mass, T = np.array(json.loads(row["cuts_percent_C"]), dtype=float).T
    rising = np.concatenate([np.diff(mass) > 0.0, [True]])  # of points at one percent the hottest counts
    mass, T = mass[rising] / 100.0, T[rising] + ZERO_CELSIUS
    before, after = mass[0] / np.cbrt(T[0]), max(1.0 - mass[-1], 0.0) / np.cbrt(T[-1] + TAIL)
    between = np.diff(mass) / np.cbrt(0.5 * (T[1:] + T[:-1]))
    volume = before + np.concatenate([[0.0], np.cumsum(between)])
    return volume / (volume[-1] + after), T


def computed(row):
    """Flash point of one oil with its range from the estimated limits. [degC]"""
    fraction, T = volume_curve(row)
    cuts = pseudo_components(fraction, T, float(row["density15"]))
    flash = flash_point(Fluid.of(cuts.names), cuts.z)
    return tuple(float(v[0]) - ZERO_CELSIUS for v in (flash.T, flash.T_low, flash.T_high))


HEAD = """\
# Flash points of oils from distillation and density

Measured closed-cup flash point and simulated distillation of the Environment and Climate Change Canada
laboratory (tests/studies/data). Each curve is cut into pseudo-components, nothing is fitted; every lower
limit is an estimate, so the computed value comes with a range.
"""
GRADE = """
## Grade {quality}: {count} samples

Computed less measured: median {median:.1f} K, root mean square {rms:.1f} K, from {least:.1f} to {most:.1f} K;
within 10 K: {within:.0%}.

| oil | sample | first points, % at degC | measured, degC | computed, degC | range | miss, K |
| --- | --- | --- | --- | --- | --- | --- |
"""
FOOT = """
Why B and C miss: the vapour at the flash point comes from the first few percent. Grade A has that part of
the curve from a detailed analysis of the light end; in grades B and C it is one or two points, or a column
that starts at 40 degC with zero, and the flash point follows whatever is drawn between them.
"""


def _line(row, best, low, high) -> str:
    first = "; ".join(f"{p:g} at {T:g}" for p, T in json.loads(row["cuts_percent_C"])[:3])
    measured = float(row["flash_C"])
    cells = (row["oil_id"], f"{row['type']}, {row['sample']}", first, f"{measured:.0f}", f"{best:.1f}",
             f"{low:.1f} to {high:.1f}", f"{best - measured:+.1f}")  # fmt: skip
    return "| " + " | ".join(cells) + " |\n"


def report() -> str:
    """The study as Markdown."""
    text = HEAD
    for quality in "ABC":
        rows = [(row, computed(row)) for row in oils(quality)]
        miss = np.array([best - float(row["flash_C"]) for row, (best, _, _) in rows])
        text += GRADE.format(
            quality=quality, count=len(rows), median=np.median(miss), rms=np.sqrt(np.mean(miss**2)),
            least=miss.min(), most=miss.max(), within=np.mean(np.abs(miss) <= 10.0),
        )  # fmt: skip
        text += "".join(_line(row, *values) for row, values in rows)
    return text + FOOT


if __name__ == "__main__":
    OUT.write_text(report(), encoding="utf-8")
