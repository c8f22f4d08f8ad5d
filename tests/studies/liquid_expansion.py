"""Makes liquid_expansion.md: the equation of state's own expansivity and compressibility against references.

Run from the top folder (a second, no network):

    python -m tests.studies.liquid_expansion
"""

from __future__ import annotations

from pathlib import Path

import numpy as np

from screener.equilibrium import Fluid, caloric
from screener.ground.constants import T_15C
from screener.species import find
from screener.volatility import petroleum_compressibility, petroleum_expansion, shut_in_pressure_rise
from tests.measured.test_caloric import TABLES, read

PAGE = Path(__file__).with_suffix(".md")
STORAGE = (250.0, 350.0)  # [K]
T_20C = 293.15  # [K]
PETROLEUM = [name for name in TABLES if name not in ("n-butane", "ethanol", "water")]  # the classes of the standard


def miss_of(name):
    """Temperatures [K] and misses [%] of density, expansivity, compressibility, and of expansivity over
    compressibility, the pressure rise per kelvin of a liquid shut in."""
    data, one, fluid = read(f"{name}_sat"), find(name), Fluid.of([name])
    inside = (data["T_K"] >= STORAGE[0]) & (data["T_K"] <= min(STORAGE[1], 0.85 * one.Tc))
    T, P = data["T_K"][inside], data["Psat_Pa"][inside]
    found = caloric(fluid, T, P, [1.0], "L").require()
    expansion, compression = data["beta_1_K"][inside], data["kappaT_1_Pa"][inside]
    density = fluid.MW[0] / found.v
    pairs = (
        (density, data["rhoL_kg_m3"][inside]), (found.expansion, expansion), (found.compression, compression),
        (found.expansion / found.compression, expansion / compression),
    )  # fmt: skip
    warm = T >= 280.0  # water: its expansivity passes through zero at 4 degC
    keep = warm if name == "water" else np.ones_like(warm)
    return T[keep], [100.0 * (value[keep] / wanted[keep] - 1.0) for value, wanted in pairs]


def shut_in(name):
    """Compressibility [1/Pa] and pressure rise [Pa/K] at 20 degC: of the reference, of the standard."""
    data = read(f"{name}_sat")
    rho, expansion, compression = (
        float(np.interp(T, data["T_K"], data[key]))
        for T, key in ((T_15C, "rhoL_kg_m3"), (T_20C, "beta_1_K"), (T_20C, "kappaT_1_Pa"))
    )
    standard = petroleum_compressibility(rho, T_20C)[0], shut_in_pressure_rise(rho, T_20C)[0]
    return (compression, expansion / compression), standard


def page() -> str:
    """The whole page."""
    lines = [
        "# Expansion and compression of liquids by the equation of state",
        "",
        "Made by `python -m tests.studies.liquid_expansion`. Miss in percent of the saturated liquid, 250 to",
        "350 K below 0.85 Tc, mean (and range), against the reference equations of tests/measured/pure.",
        "expansion is (dv/dT)/v at constant P, compression -(dv/dP)/v at constant T; their quotient is the",
        "pressure rise per kelvin of a liquid shut in between valves. The density is right because the",
        "translation is fitted to it; its derivative in P is not touched by a translation, and the one in T",
        "follows the density only as far as the translation is linear in T.",
        "",
        "| liquid | density | expansion | compression | pressure rise of a shut-in liquid |",
        "| --- | --- | --- | --- | --- |",
    ]
    for name in TABLES:
        _, misses = miss_of(name)
        cells = [f"{np.mean(miss):+.2f} ({np.min(miss):+.1f} to {np.max(miss):+.1f})" for miss in misses]
        lines.append(f"| {name} | {' | '.join(cells)} |")
    lines += [
        "",
        "Volumes in trade, the thermal expansion of real stocks and the pressure of shut-in liquid therefore",
        "never come from here but from screener.volatility (volume_correction, compression); what follows is that standard's",
        "form on the same liquids, growth of the volume from 15 degC to 50 degC:",
        "",
        "| liquid | reference, % | equation of state, % | volume correction for products, % |",
        "| --- | --- | --- | --- |",
    ]
    for name in PETROLEUM:
        data, fluid = read(f"{name}_sat"), Fluid.of([name])
        rho = np.interp([288.15, 323.15], data["T_K"], data["rhoL_kg_m3"])
        v = caloric(fluid, [288.15, 323.15], 101325.0, [1.0], "L").require().v
        standard = np.atleast_1d(petroleum_expansion(rho[0], np.array([323.15])))[0]
        lines.append(
            f"| {name} | {100.0 * (rho[0] / rho[1] - 1.0):.2f} | {100.0 * (v[1] / v[0] - 1.0):.2f} "
            f"| {100.0 * (standard - 1.0):.2f} |"
        )
    lines += [
        "",
        "The same standard's compressibility and the pressure rise of a shut-in liquid at 20 degC, in 1/GPa and",
        "kPa/K. It is drawn for petroleum: ring compounds alone are stiffer or softer than a fuel of their density.",
        "",
        "| liquid | compressibility: reference | standard | miss, % | pressure rise: reference | standard | miss, % |",
        "| --- | --- | --- | --- | --- | --- | --- |",
    ]
    for name in PETROLEUM:
        cells = []
        for wanted, found, scale in zip(*shut_in(name), (1e9, 1e-3), strict=True):
            cells += [f"{scale * wanted:.3f}", f"{scale * found:.3f}", f"{100.0 * (found / wanted - 1.0):+.1f}"]
        lines.append(f"| {name} | {' | '.join(cells)} |")
    return "\n".join(lines) + "\n"


if __name__ == "__main__":
    PAGE.write_text(page(), encoding="utf-8")
    print(PAGE.read_text(encoding="utf-8"))
