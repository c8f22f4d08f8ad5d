"""Makes ethanol_sweep.md: ethanol and other oxygenates in gasolines of 50, 60 and 70 kPa, beside published trends.

Run from the top folder:

    python -m tests.studies.ethanol_sweep

The bases are one gasoline of thirteen species with its butane set to the DVPE. Also: what
a gasoline with 10 vol% ethanol loses first from an open vessel at 21 degC.
"""

from __future__ import annotations

import re
from pathlib import Path

import numpy as np

from screener.ground.constants import ZERO_CELSIUS
from screener.species import find
from screener.volatility import dvpe, ethanol_allowance, open_evaporation
from tests.studies.splash import SHARES, Splash

FILE = Path(__file__).with_suffix(".md")
BASES = (50e3, 60e3, 70e3)  # DVPE [Pa]
ETHANOL = np.array([*range(11), 15, 20, 25, 30, 40, 50, 60, 70, 80, 83, 85, 90, 95, 98, 100]) / 100.0
OTHERS = ("methanol", "1-butanol", "isobutanol", "MTBE", "ETBE")
SHARES_OF_OTHERS = np.array([0.02, 0.03, 0.05, 0.10, 0.15, 0.20, 0.85])
T_ROOM = ZERO_CELSIUS + 21.1  # 70 degF
TRENDS = """
| published | here |
|---|---|
| 10 % ethanol raises the vapour pressure by about 1 psi, 6.9 kPa; E15 and E20 cannot be told from E10 (McCormick and Yanowitz for NREL, 2012, abstract) | {at_10} kPa at 10 %; E10, E15 and E20 within {flat} kPa of each other |
| E10, E20 and E30 statistically alike in a survey of blender pumps (Alleman, SAE 2013-01-9071, abstract) | E10 to E30 within {flat_30} kPa |
| the rise grows to 5 % and levels off (98/70/EC annex III as a curve) | column annex III beside base 60 |
| E85 falls far below gasoline, so that butane is allowed in the test fuel of 80 to 83 % ethanol with 41.5 to 45.1 kPa (40 CFR 1065.725) | {at_81} kPa at 80 to 83 % without added butane |
| E85 class 1 asks for at least 5.5 psi, 37.9 kPa, at 51 to 83 % ethanol (D5798-15, afdc.energy.gov) | {at_83} kPa at 83 %: short of it on the base of 50 kPa without butane |
| 53.7 kPa base: E5 +5.6, E10 +5.9, E20 +4.6, E30 +3.1 kPa (Hsieh and others 2002, from memory, unverified) | base 50: {hsieh} kPa |
| methanol lowers distillation and raises vapour pressure more than ethanol (Amine and Barakat 2019, open access) | methanol {methanol} kPa at 5 %, ethanol {ethanol_5} kPa (base 60) |
| n-butanol: at most about 1 kPa up, falling above 10 % (Muzikova and others 2013, abstract) | {butanol} kPa at 5 and 10 %: the small maximum is missed |
| ETBE: vapour pressure falls linearly (Furey and Perry, SAE 901114, abstract) | {etbe} kPa at 5, 10 and 20 % |
| MTBE: hardly any change, about -0.5 kPa at 10 % (blending value from memory, unverified) | {mtbe} kPa at 10 % |
"""


def sweep(target, shares=ETHANOL, alcohol="ethanol"):
    """DVPE (n,) [Pa] of a base of DVPE `target` [Pa] with volume shares of an oxygenate [-]; NaN where none is defined."""
    splash = Splash(SHARES, alcohol)
    base = splash.at_dvpe(target)
    return dvpe(splash.fluid, splash.moles(base, shares)).P


def diffusivity(one):
    """Relative diffusivity in air [-] after Fuller, Schettler and Giddings 1966, volumes from memory, unverified."""
    atoms = {element: int(count or 1) for element, count in re.findall(r"([CHO])(\d*)", one.formula)}
    volume = sum(atoms.get(element, 0) * v for element, v in {"C": 15.9, "H": 2.31, "O": 6.11}.items())
    volume -= 18.3 if one.family == "aromatic" else 0.0
    return np.sqrt(1.0 / (1000.0 * one.MW) + 1.0 / 28.97) / (np.cbrt(volume) + np.cbrt(19.7)) ** 2


def first_lost(target, lost=0.05, *, diffusing=False):
    """Mass share of ethanol [-] in the first mass an E10 on a base of DVPE `target` [Pa] loses at 21 degC."""
    splash = Splash(SHARES)
    z = splash.moles(splash.at_dvpe(target), 0.10)
    mobility = np.array([diffusivity(find(name)) for name in splash.names]) if diffusing else None
    found = open_evaporation(splash.fluid, T_ROOM, z, lost, mobility=mobility).require()
    return float(found.w_lost[0, splash.alcohol])


def trend_numbers():
    """What the lines of TRENDS show."""

    def at(P, share):
        return P[int(np.argmin(np.abs(ETHANOL - share)))] / 1e3

    curves = {target: sweep(target) for target in BASES}
    others = {name: sweep(60e3, SHARES_OF_OTHERS, name) / 1e3 - 60.0 for name in OTHERS}
    flat = [np.ptp([at(P, s) for s in (0.10, 0.15, 0.20)]) for P in curves.values()]
    flat_30 = [np.ptp([at(P, s) for s in (0.10, 0.20, 0.30)]) for P in curves.values()]

    def spread(values, sign="+"):
        return " / ".join(f"{v:{sign}.1f}" for v in values)

    return curves, others, {
        "at_10": spread([at(P, 0.10) - at(P, 0.0) for P in curves.values()]),
        "flat": spread(flat, ""), "flat_30": spread(flat_30, ""),
        "at_81": spread([at(P, 0.80) for P in curves.values()], ""),
        "at_83": spread([at(P, 0.83) for P in curves.values()], ""),
        "hsieh": spread([at(curves[50e3], s) - 50.0 for s in (0.05, 0.10, 0.20, 0.30)]),
        "methanol": f"{others['methanol'][2]:+.1f}", "ethanol_5": f"{at(curves[60e3], 0.05) - 60.0:+.1f}",
        "butanol": spread(others["1-butanol"][2:4]), "etbe": spread(others["ETBE"][[2, 3, 5]]),
        "mtbe": f"{others['MTBE'][3]:+.1f}",
    }  # fmt: skip


def main():
    """Write the tables."""
    curves, others, numbers = trend_numbers()
    allowed = ethanol_allowance(ETHANOL) / 1e3
    lines = ["# Ethanol from 0 to 100 % in gasolines of 50, 60 and 70 kPa", "",
             "Made by `python -m tests.studies.ethanol_sweep`. Splash blending, volumes at 15 degC; DVPE after ASTM D5191, kPa.", "",
             "| ethanol, vol% | base 50 | change | base 60 | change | annex III | base 70 | change |", "|---|---|---|---|---|---|---|---|"]  # fmt: skip
    for i, share in enumerate(ETHANOL):
        cells = []
        for target in BASES:
            P = curves[target][i] / 1e3
            cells += [f"{P:.1f}", f"{P - curves[target][0] / 1e3:+.1f}"]
            if target == 60e3:
                cells.append(f"{allowed[i]:+.1f}" if np.isfinite(allowed[i]) else "")
        lines.append(f"| {100 * share:.0f} | {' | '.join(cells)} |")
    lines += ["", "Other oxygenates on the base of 60 kPa, change of DVPE, kPa.", "",
              "| vol% | " + " | ".join(f"{100 * s:.0f}" for s in SHARES_OF_OTHERS) + " |", "|---|" + "---|" * SHARES_OF_OTHERS.size]  # fmt: skip
    lines += [f"| {name} | {' | '.join(f'{v:+.1f}' for v in change)} |" for name, change in others.items()]
    lines += ["", "Published trends; three numbers are bases 50, 60 and 70.", *TRENDS.format(**numbers).splitlines(), "",
              "Mass share of ethanol in the first 5 mass% lost by E10 from an open vessel at 21 degC, percent.", "",
              "| base, kPa | carried away as one gas | diffusing through still air |", "|---|---|---|"]  # fmt: skip
    for target in BASES:
        lines.append(
            f"| {target / 1e3:.0f} | {100 * first_lost(target):.1f} | {100 * first_lost(target, diffusing=True):.1f} |"
        )
    lines += ["",
              "Published: about 13 % in weight-loss tests at 70 degF (AWMA study of evaporation, abstract). Of the difference,",
              "diffusion through still air explains the step between the two columns: ethanol diffuses faster than the",
              "butane and pentanes it competes with. A less volatile base adds more, from right to left in the bases: the base of",
              "the study is not stated in what was read; on the base of 50 kPa the first 20 % lost hold",
              f"{100 * first_lost(50e3, 0.20, diffusing=True):.1f} %.",
              "At the same mass lost the blend loses that much less hydrocarbon, which the study puts at about 5 %."]  # fmt: skip
    FILE.write_text("\n".join(lines) + "\n", encoding="utf-8")


if __name__ == "__main__":
    main()
