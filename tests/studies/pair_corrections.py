"""Makes pair_corrections.md: binary sets, azeotropes and fuels with and without the pair corrections.

Run from the top folder:

    python -m tests.studies.pair_corrections
"""

from __future__ import annotations

from pathlib import Path

import numpy as np

from screener.blends import Blend, stocks
from screener.equilibrium import Fluid, bubble_pressure
from screener.ground.constants import ATMOSPHERE, T_100F, ZERO_CELSIUS
from screener.ground.files import read_table
from screener.volatility import dvpe, vapour_pressure_at_ratio
from tests.measured import binary_sets, test_fuels
from tests.measured.uncorrected import corrected
from tests.published import test_volatility_annex_iii as annex

PAGE = Path(__file__).with_suffix(".md")
REMEMBERED = {  # azeotropes at 101.325 kPa [degC], from memory, unverified
    ("methanol", "benzene"): 58.3, ("methanol", "toluene"): 63.8, ("MTBE", "ethanol"): 54.9,
    ("ETBE", "ethanol"): 66.6, ("ethanol", "toluene"): 76.7, ("ethanol", "n-hexane"): 58.7,
    ("ethanol", "n-heptane"): 70.9, ("methanol", "n-heptane"): 59.1,
}  # fmt: skip


def both(names):
    """The model without and with the corrections."""
    fluid = Fluid.of(names)
    return corrected(fluid), fluid


def error(fluid, one):
    """Relative error (n,) [-] of the bubble pressures of a measured set."""
    return bubble_pressure(fluid, one.T, one.x).P / one.P - 1.0


def set_rows():
    """Per set: name, quality, points, mean |error| without and with, bias without and with [%]."""
    rows = []
    for name in binary_sets.NAMES:
        one = binary_sets.read(name)
        off, on = (100.0 * error(fluid, one) for fluid in both(one.species))
        means = (np.abs(off).mean(), np.abs(on).mean(), off.mean(), on.mean())
        rows.append((name, one.quality, on.size, *means))
    return rows


def mean(rows, quality: str, column: int) -> float:
    """Mean of a column over the sets of one quality."""
    return float(np.mean([row[column] for row in rows if row[1] == quality]))


def left_out_mean(rows) -> float:
    """Mean over the A sets [%], every fitted set counted with the error of its points left out."""
    tried = [row for row in read_table("pairs/pair_corrections_tried.csv") if row["kept"] == "1"]
    instead = {code: float(row["left_out_after"]) for row in tried for code in row["sets"].split()}
    return float(np.mean([instead.get(row[0][:4], row[4]) for row in rows if row[1] == "A"]))


def azeotrope(fluid, P=ATMOSPHERE) -> float:
    """Temperature [K] at which the highest bubble pressure of a pair is P [Pa]."""
    x1 = np.linspace(0.01, 0.99, 99)
    x, low, high = np.stack([x1, 1.0 - x1], axis=1), 290.0, 380.0
    while high - low > 0.005:
        T = 0.5 * (low + high)
        if bubble_pressure(fluid, T, x).P.max() > P:
            high = T
        else:
            low = T
    return 0.5 * (low + high)


def table(header, rows):
    """A Markdown table."""
    lines = ["| " + " | ".join(row) + " |" for row in [header, ["---"] * len(header), *rows]]
    return "\n".join(lines)


def page() -> str:
    """The whole page."""
    rows = set_rows()
    sets = [[r[0], r[1], str(r[2]), *(f"{v:.2f}" for v in r[3:5]), *(f"{v:+.2f}" for v in r[5:])]
            for r in rows]  # fmt: skip
    for q in "AB":
        means = (f"{mean(rows, q, column):.2f}" for column in (3, 4))
        sets.append([f"mean of the {q} sets", q, "", *means, "", ""])
    azeotropes = []
    for pair, remembered in REMEMBERED.items():
        off, on = (azeotrope(fluid) - ZERO_CELSIUS for fluid in both(pair))
        azeotropes.append([" + ".join(pair), f"{off:.2f}", f"{on:.2f}", f"{remembered:.1f}"])
    return TEXT.format(
        sets=table(["set", "quality", "points", "without", "with", "bias without", "bias with"], sets),
        left_out=left_out_mean(rows),
        after=mean(rows, "A", 4),
        azeotropes=table(["pair", "without", "with", "remembered"], azeotropes),
        fuels=table(["what", "without", "with", "rejected rule", "measured or asked"], fuel_rows()),
    )


def rejected(fluid):
    """The fluid with the rule that was not kept for paraffins and aromatics, and no other."""
    row = next(row for row in read_table("pairs/pair_corrections_tried.csv") if row["other"] == "aromatic")
    sides = tuple(tuple(row[side].split("/")) for side in ("one", "other"))

    def value(one, other):
        met = any(i.family in sides[0] and j.family in sides[1] for i, j in ((one, other), (other, one)))
        return (float(row["A0"]) if met else 0.0), 0.0

    return corrected(fluid, value)


def fuel_rows():
    """Checks of many species: what, without, with, with the rejected rule, what was measured or is asked."""
    models = (corrected, lambda fluid: fluid, rejected)
    rows = []
    for item in stocks():
        if "gasoline" in item.name:
            blend = Blend.of({f"stock:{item.name}": 1.0})
            P = (dvpe(model(blend.fluid), blend.z).require().P[0] / 1e3 for model in models)
            measured = "54.5 (17.8 % of the mass unnamed)" if item.name == "average gasoline" else ""
            rows.append([f"DVPE of {item.name}, kPa", *(f"{v:.2f}" for v in P), measured])
    fluid, z = test_fuels.crude()
    fill = {"T_fill": ZERO_CELSIUS + 20.0, "product": "crude"}
    cells = [vapour_pressure_at_ratio(model(fluid), T_100F, z, 4.0, **fill) for model in models]
    measured = f"{test_fuels.CRUDE_RVP / 1e3:.2f} (method not stated)"
    rows.append(["VPCR4 of a crude, kPa", *(f"{c.require().P[0] / 1e3:.2f}" for c in cells), measured])
    for name in ("thirteen species", "summer gasoline base", "average gasoline", "summer gasoline 1985"):
        base, misses = annex.base_gasoline(name), []
        for model in models:
            annex.FLUIDS["study"] = lambda names, model=model: model(Fluid.of(names))
            misses.append(np.abs(annex.Curve(base, "study").rises() - annex.ANNEX_III).max())
        what = f"ethanol's rise against annex III, {name}: largest miss, kPa"
        rows.append([what, *(f"{v:.2f}" for v in misses), "at most 1.0"])
    return rows


TEXT = """# The model with and without the pair corrections

Made by `python -m tests.studies.pair_corrections`. The corrections are those of
data/pairs/pair_corrections.csv; what was tried, kept and left is in data/pairs/pair_corrections_tried.csv.

## Measured binary sets

Error of the bubble pressure at the measured temperature and composition, percent. B sets were never fitted.

{sets}

Mean of the A sets {after:.2f} %; every fitted set counted by points left out of its fit: {left_out:.2f} %.

## Azeotropes at 101.325 kPa, degC

The last column is from memory, unverified; no azeotrope was fitted.

{azeotropes}

## Fuels of many species

Nothing here was fitted. No kept correction meets a pair of species in these fuels. The rule for paraffins and
aromatics was not kept because it moves the measured gasoline away (column rejected rule).

{fuels}
"""

if __name__ == "__main__":
    PAGE.write_text(page(), encoding="utf-8")
    print(f"{PAGE.name} written")
