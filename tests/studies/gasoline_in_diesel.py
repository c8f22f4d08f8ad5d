"""Flash point of diesel with a little gasoline in it, by every method side by side.

Run from the top folder; writes tests/studies/gasoline_in_diesel.md:

    python tests/studies/gasoline_in_diesel.py
"""

from __future__ import annotations

import sys
from pathlib import Path

import numpy as np

ROOT = Path(__file__).resolve().parents[2]
sys.path.insert(0, str(ROOT))

from screener.blends import Blend, union
from screener.equilibrium import Fluid
from screener.fire import (
    contaminated,
    contaminated_flash_point,
    flash_point_by_distillation,
    flash_point_by_index,
    share_at_flash_point,
)
from screener.ground.constants import ZERO_CELSIUS
from screener.volatility import distillation

OUT = Path(__file__).with_suffix(".md")
SHARES = np.array([0.0, 0.001, 0.002, 0.005, 0.01, 0.02, 0.03, 0.05, 0.1])
EFFECTIVE = (
    -5.7 + ZERO_CELSIUS
)  # [K] gasoline flash point that makes the index meet the one measured blend below
TRUE = -40.0 + ZERO_CELSIUS  # [K] gasoline flash point as data sheets have it
LIMIT = 55.0 + ZERO_CELSIUS  # [K] least flash point of EN 590, from memory, unverified
HEADS = (
    "gasoline, vol%", "Liaw", "Le Chatelier", "range of Le Chatelier", "index, gasoline at -5.7",
    "index, gasoline at -40", "D86 10 % point",
)  # fmt: skip


def table() -> list[list[str]]:
    """Rows of the table, flash points in degC."""
    names, Z = union([Blend.of({"stock:diesel": 1.0}), Blend.of({"stock:summer gasoline base": 1.0})])
    fluid = Fluid.of(names)
    liaw = contaminated_flash_point(fluid, *Z, SHARES).require()
    limits = contaminated_flash_point(fluid, *Z, SHARES, method="le-chatelier").require()
    volume = np.stack([1.0 - SHARES, SHARES], axis=1)
    index = [flash_point_by_index([liaw.T[0], T], volume, beyond=True).T for T in (EFFECTIVE, TRUE)]
    curve = distillation(fluid, contaminated(fluid, *Z, SHARES))
    d86 = flash_point_by_distillation(curve.temperature(0.1))
    columns = [liaw.T, limits.T, limits.T_low, limits.T_high, *index, d86.T]
    shown = [[f"{T - ZERO_CELSIUS:.1f}" for T in column] for column in columns]
    return [
        [f"{100 * s:.1f}", a, b, f"{low} to {high}", e, t, d]
        for s, a, b, low, high, e, t, d in zip(SHARES, *shown, strict=True)
    ]


TEXT = """\
# Gasoline in diesel: flash point by each method, degC

Stocks: diesel (invented), summer gasoline base (published composition). The index columns start from
the flash point that the first column gives the diesel.

{table}

Which is careful: above one percent equilibrium (Liaw, Le Chatelier) is the lowest of the usable columns,
because a closed-cup tester loses butane and pentane while it heats and reads higher. Measured: diesel of
75 degC with 5 % gasoline flashed at 25 degC (Mowrer and others 1989, as quoted): 50 K lower; equilibrium
has {fall:.0f} K. The index with the gasoline at -5.7 degC is fitted to that one blend; below one percent it
lies under equilibrium, for want of any measured blend there.

The index must not be used with the true flash point of a gasoline, -40 degC: a tenth of a percent takes
{absurd:.0f} K. Its formula has a pole at -230 degC and was checked from 20 to 100 degC only; outside that
`flash_point_by_index` answers out of range. The D86 estimate hardly sees the gasoline, because the 10 %
point hardly moves: it errs on the dangerous side and is no check of contamination.

Share that brings this diesel down to 55 degC (Liaw): {share:.2f} vol%.
"""


def report() -> str:
    """The study as Markdown."""
    names, Z = union([Blend.of({"stock:diesel": 1.0}), Blend.of({"stock:summer gasoline base": 1.0})])
    share = share_at_flash_point(Fluid.of(names), *Z, LIMIT).require().share[0]
    rows = table()
    lines = ["| " + " | ".join(cells) + " |" for cells in [HEADS, ["---"] * len(HEADS), *rows]]
    clean, tenth, five = (next(row for row in rows if row[0] == share) for share in ("0.0", "0.1", "5.0"))
    return TEXT.format(
        table="\n".join(lines),
        fall=float(clean[1]) - float(five[1]),
        absurd=float(clean[5]) - float(tenth[5]),
        share=100.0 * share,
    )


if __name__ == "__main__":
    OUT.write_text(report(), encoding="utf-8")
