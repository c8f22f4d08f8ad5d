"""Every stock with its computed tests, published numbers beside them, and the roads to a jet fuel's vapour pressure.

Run from the top folder, some twenty seconds; writes tests/studies/stocks.md:

    python -m tests.studies.stocks
"""

from __future__ import annotations

from pathlib import Path

import numpy as np

from screener.blends import Blend, LabSheet, published_beside_computed, stock, stocks
from screener.equilibrium import Fluid
from screener.fire import flash_point
from screener.ground.constants import T_100F, ZERO_CELSIUS
from screener.volatility import (
    curve_at,
    distillation_d86,
    dvpe,
    pseudo_components,
    tbp_from_d86_daubert_1994,
    true_vapour_pressure,
    vapour_pressure_crude,
)
from screener.volatility.interconversion import GAP_POINTS

OUT = Path(__file__).with_suffix(".md")
ROADS = ("light jet fuel", "average jet fuel", "heavy jet fuel")
# IBP, T20, FBP [degC] and aromatics [-] of POSF 10264, 10325 and 10289 (AFRL-RQ-WP-TR-2020-0017, table 5), with the
# published points of the passports all that the road from D86 and density uses
ENDS = {"light jet fuel": (150.0, 171.1, 256.7, 0.1356), "average jet fuel": (159.2, 185.4, 270.5, 0.1853),
        "heavy jet fuel": (177.9, 201.3, 259.5, 0.2036)}  # fmt: skip


def overview() -> list[str]:
    """One row a stock: density, vapour pressures, distillation, flash point."""
    rows = [
        "| stock | composition | density 15 degC, kg/m3 | TVP 37.8 degC, kPa | DVPE, kPa | VPCR4, kPa | T10 | T50 | T90 | flash point |",
        "|---|---|---|---|---|---|---|---|---|---|",
    ]
    for item in stocks():
        blend = Blend.of({f"stock:{item.name}": 1.0})
        fluid, z = blend.fluid, blend.z
        true = true_vapour_pressure(fluid, T_100F, z).P[0] / 1e3
        test = dvpe(fluid, z, product=blend.product or None).P[0] / 1e3
        crude = vapour_pressure_crude(fluid, z).P[0] / 1e3 if item.claims.startswith("stabilised ") else np.nan
        curve = distillation_d86(fluid, z)
        flash = flash_point(fluid, z).T[0] - ZERO_CELSIUS
        points = [float(v[0]) - ZERO_CELSIUS for v in (curve.T10, curve.T50, curve.T90)]
        cells = [_text(v) for v in (true, test, crude, *points, flash)]
        rows.append(f"| {item.name} | {item.obtained} | {blend.density_15:.1f} | " + " | ".join(cells) + " |")
    return rows


def _text(value: float) -> str:
    return "-" if np.isnan(value) else f"{value:.2f}" if abs(value) < 2.0 else f"{value:.1f}"


def beside() -> list[str]:
    """One row a published number."""
    rows = [
        "| stock | number | published | computed | difference | in R | computed/published | source |",
        "|---|---|---|---|---|---|---|---|",
    ]
    for item in stocks():
        for one in published_beside_computed(item):
            unit, shift, scale = _unit(one.published.number)
            value, computed = (v / scale - shift for v in (one.published.value, one.computed))
            ratio = "" if shift else f"{one.computed / one.published.value:.3f}"
            rows.append(
                f"| {item.name} | {one.name} | {value:.5g} {unit} | {computed:.5g} | {computed - value:+.3g} | "
                f"{one.in_R:+.1f} | {ratio} | {one.published.source} |"
            )
    return rows


def _unit(number: str) -> tuple[str, float, float]:
    """Unit for print, what to take off and what to divide by."""
    if number == "density_15":
        return "kg/m3", 0.0, 1.0
    return ("kPa", 0.0, 1e3) if number in ("dvpe", "rvp", "tvp") else ("degC", ZERO_CELSIUS, 1.0)


def roads() -> list[str]:
    """Vapour pressures of the reference jet fuels over the measured ones by three roads, and the data's own slope."""
    rows = [
        "| fuel | road | 60 degC | 80 degC | 100 degC | 120 degC |",
        "|---|---|---|---|---|---|",
    ]
    slopes = [
        "| fuel | heat of vaporisation from | 60-80 degC | 80-100 degC | 100-120 degC | greatest departure from one straight line |",
        "|---|---|---|---|---|---|",
    ]
    for name in ROADS:
        item = stock(name)
        T, measured = np.array([(p.at, p.value) for p in item.published if p.number == "tvp"]).T
        blend = Blend.of({f"stock:{name}": 1.0})
        found = {"composition": true_vapour_pressure(blend.fluid, T, blend.z).require().P}
        for road, (fluid, z) in {
            "D86, density, API 1994": _cuts(item),
            "D86 and density fitted": _fitted(item),
        }.items():
            found[road] = true_vapour_pressure(fluid, T, z).require().P
        rows += [
            f"| {name} | {road} | " + " | ".join(f"{v:.2f}" for v in P / measured) + " |"
            for road, P in found.items()
        ]
        for label, P in (("measurement", measured), ("composition", found["composition"])):
            heat = -8.314e-3 * np.diff(np.log(P)) / np.diff(1.0 / T)
            line = np.polyval(np.polyfit(1.0 / T, np.log(P), 1), 1.0 / T)
            worst = 100.0 * np.abs(np.log(P) - line).max()
            slopes.append(
                f"| {name} | {label} | " + " | ".join(f"{v:.1f}" for v in heat) + f" | {worst:.1f} % |"
            )
    return [*rows, "", "Heat of vaporisation between neighbouring readings, kJ/mol:", "", *slopes]


def _points(item):
    """Fractions [-] and temperatures [K] of the measured D86 curve."""
    T10, T50, T90 = (next(p.printed for p in item.published if p.number == k) for k in ("T10", "T50", "T90"))
    ibp, T20, fbp, _ = ENDS[item.name]
    return np.array([0.0, 0.1, 0.2, 0.5, 0.9, 1.0]), np.array([ibp, T10, T20, T50, T90, fbp]) + ZERO_CELSIUS


def _density(item) -> float:
    return next(p.value for p in item.published if p.number == "density_15")


def _cuts(item):
    fraction, T = _points(item)
    tbp = tbp_from_d86_daubert_1994(curve_at(fraction, T, np.array(GAP_POINTS)))[0]
    cuts = pseudo_components(np.array(GAP_POINTS), tbp, _density(item), aromatics=ENDS[item.name][3])
    return Fluid.of(cuts.names), cuts.z


def _fitted(item):
    fraction, T = _points(item)
    middle = tuple(zip(fraction[1:-1], T[1:-1], strict=True))
    sheet = LabSheet(density_15=_density(item), distillation=middle, ibp=T[0], fbp=T[-1])
    blend = Blend.from_lab(sheet)
    return blend.fluid, blend.z


HEAD = """\
# Stocks: computed tests beside published numbers

Made by `python -m tests.studies.stocks`. Nothing here is fitted to a published number; `tests/blends/test_stocks.py`
holds every one of them to an argued bar. Temperatures in degC; T10, T50 and T90 as an ASTM D86 flask reads them
(`distillation_d86`), by volume evaporated; flash points by equilibrium. A dash: the test has no answer for that liquid.
The flash point of a liquid with gases, and the heavy end of the crude's distillation, have no meaning as tests.

"""
SECOND = """

## Published beside computed

R is the reproducibility of the method (data/volatility/reproducibility.csv). A Reid vapour pressure is computed for the
wet apparatus; that of the average gasoline is taken for a DVPE.

"""
THIRD = """

## What the differences say

- *Jet fuels, bins of isomers.* A bin boils as the mean of the common isomers of its class (rule and choice of isomers in
  `data/made_by/jet_stocks.py`; no property of a jet fuel goes into it). With one isomer a bin, the straight-chain one for
  rings, computed over measured vapour pressure was 0.60 to 0.84 at 60 to 120 degC. The mean over all isomers of the
  table, rare ones too, would give 0.68 to 0.96, flash points 2 K and densities 2 kg/m3 lower.
- *Jet fuels, distillation.* The isoparaffinic fuel is 95 % two known molecules, yet its measured curve lies 3 to 7 K
  below the computed one: that much is the flask against the computed still, not the choice of isomers. The other
  fuels lie 7 to 14 K below.
- *Flash points.* Five are published: two topped crudes within 2 K; the isoparaffinic fuel 4 K low (1 R); distillate and
  residual fuel oil 7 K low and 13 K high, whose curves are uncertain in the first 5 % that decide. For POSF 10264,
  10325 and 10289 closed-cup values of 42, 48 and 60 degC are remembered (unverified): the computed ones are 1 to 4 K
  lower.
- *Crude.* The group model lowers light ends in a heavy residue (VPCR4 34.9 kPa); the plain equation of state gives
  39.5, the assay prints 39.4 without its method.

## Vapour pressure of the reference jet fuels, computed over measured

By composition; by the D86 curve and density through the 1994 API conversion and the cutting rule; by a bare laboratory
sheet (D86 and density) fitted with `Blend.from_lab`.

"""
LAST = """

- Measured readings are from figures. Those of the heavy jet fuel do not lie on one curve: the heat of vaporisation
  between neighbours jumps 46, 36, 47 kJ/mol, which no liquid does; its reading at 80 degC is too high against that at
  100 degC by some 15 %. The ratios of 0.48 and 0.50 on the D86 road belong to this fuel at 60 and 80 degC; from
  composition it is 0.63 to 0.73.
- Of the other two fuels the measured slope is 2 to 4 kJ/mol below that of such hydrocarbons: part of the reading is a gas
  that does not come from the fuel, taken for dissolved air (at 0 degC all three fuels show one and the same pressure),
  and its share falls with heat.
- The D86 road lies below composition by 11 to 26 %: the conversion gives true boiling points 0 to 6 K above those of the
  composition between 10 and 50 %. A fitted bare sheet lies 1.5 to 3 times above measurement, because flask readings
  lie 7 to 14 K below the still the fit computes with; a sheet without vapour pressure gives no good verdict on one.
"""


def main():
    parts = [HEAD, "\n".join(overview()), SECOND, "\n".join(beside()), THIRD, "\n".join(roads()), LAST]
    OUT.write_text("".join(parts), encoding="utf-8")


if __name__ == "__main__":
    main()
