"""Makes ethanol_sweep.md: ethanol and other oxygenates in gasolines of 50, 60 and 70 kPa, beside published trends.

Run from the top folder:

    python -m tests.studies.ethanol_sweep

The bases are one gasoline of thirteen species with its butane set to the DVPE. The trends that were read are
tests in tests/published/test_volatility_trends.py and test_volatility_annex_iii.py, what is remembered in
tests/regression/test_lab_ethanol.py. Real gasolines: ethanol_sweep_bases. What E10 loses first:
ethanol_sweep_loss.
"""

from __future__ import annotations

from pathlib import Path

import numpy as np

from screener.volatility import dvpe, ethanol_allowance
from tests.studies import ethanol_sweep_trends as trends
from tests.studies.splash import SHARES, Splash

FILE = Path(__file__).with_suffix(".md")
BASES = trends.BASES
ETHANOL = np.array([*range(11), 15, 20, 25, 30, 40, 50, 60, 70, 80, 83, 85, 90, 95, 98, 100]) / 100.0
OTHERS = ("methanol", "2-propanol", "tert-butanol", "1-butanol", "isobutanol", "MTBE", "ETBE")
SHARES_OF_OTHERS = np.array([0.02, 0.03, 0.05, 0.10, 0.15, 0.20, 0.30, 0.50, 0.85])
HSIEH = {0.05: 5.6, 0.10: 5.9, 0.20: 4.6, 0.30: 3.1}  # from memory, unverified; base of 53.7 kPa [kPa]
TRENDS = """
| published | here, bases 50 / 60 / 70 kPa |
|---|---|
| permitted excess over 60 kPa, as a curve (98/70/EC annex III) | column annex III; farthest from it, 0 to 10 %: {annex} kPa |
| 10 % ethanol raises the vapour pressure by about 1 psi, 6.9 kPa; E15 cannot be told from E10 on any base, nor E20 on some (McCormick and Yanowitz for NREL, 2012, abstract) | {at_10} kPa at 10 %; E15 less E10 {e15} kPa, E20 less E10 {e20} kPa |
| E10, E20 and E30 statistically alike in a survey of blender pumps (Alleman, SAE 2013-01-9071, abstract) | E10 to E30 within {flat_30} kPa |
| n-butanol: up by about 1 kPa at most, falling above 10 % (Muzikova and others 2013, abstract) | {butanol} kPa at 5 %, {butanol_10} kPa at 10 %: below the bound; the small maximum is missed |
| ETBE: falls linearly; ethanol: rises, not linearly (Furey and Perry, SAE 901114, abstract) | ETBE {etbe} kPa at 10 %, {etbe_20} kPa at 20 % |
| ethanol to 5 % raises it, 2.0 to 9.8 % of ETBE besides smooths that (J. Energy Eng. 140(3), 2013, abstract); ETBE to 20.8 % in E10 lowers it (Michalopoulou and others 2021, abstract) | E5.5: {e5} kPa; with 9.8 % ETBE {e5_etbe} kPa; E10 with 20 % ETBE {e10_etbe} kPa |
| methanol, ethanol, 2-propanol, tert-butanol: first up, then down (Pumphrey, Brand and Scheller 2000, abstract) | highest at {highest_methanol} / {highest_ethanol} / {highest_2-propanol} / {highest_tert-butanol} vol% on base 60 |
| methanol, 5 to 15 %, lowers distillation more than ethanol; 5 % of each lies between 10 % of either (Amine and Barakat 2019, open access, abstract) | 30 % evaporated, base 60: methanol {D_methanol}, both {D_both}, ethanol {D_ethanol} degC at 10 % |
| E10 weighed beside its base at 21 degC: 13 mass% of ethanol in the first 5 mass% lost, 5 % less gasoline (abstract) | ethanol_sweep_loss.md |
| E85 classes, 51 to 83 % ethanol: 38 to 62, 48 to 66, 59 to 83, 66 to 103 kPa (D5798-15, afdc.energy.gov) | {at_51} kPa at 51 %, {at_83} kPa at 83 %: the volatile classes need butane |
| test fuel of 80 to 83 % ethanol, 41.5 to 45.1 kPa, butane added as needed (40 CFR 1065.725) | {at_80} kPa at 80 %, {at_83} kPa at 83 %; to 43 kPa at 83 % with {butane} vol% butane in the base |
| 53.7 kPa: E5 +5.6, E10 +5.9, E20 +4.6, E30 +3.1 kPa (Hsieh and others 2002, from memory, unverified) | base 53.7: {hsieh} kPa |
| MTBE: about -0.5 kPa at 10 % (blending value from memory, unverified) | {mtbe} kPa at 10 % |

Off: the rise at 10 % is 0.9 to 1.7 kPa above one psi, as annex III is (7.8 kPa); E30 keeps 65 to 85 % of it where the
survey, of fuels with different bases, sees no difference; the remembered table lies 2 to 4 kPa lower.
"""


def sweep(target, shares=ETHANOL, alcohol="ethanol"):
    """DVPE (n,) [Pa] of a base of DVPE `target` [Pa] with volume shares of an oxygenate [-]; NaN where none is defined."""
    splash = Splash(SHARES, alcohol)
    return dvpe(splash.fluid, splash.moles(splash.at_dvpe(target), shares)).P


def each(function, sign="+"):
    """A number per base, as text."""
    return " / ".join(
        "-" if np.isnan(v) else f"{v:{sign}.1f}" for v in (function(target) for target in BASES)
    )


def trend_numbers():
    """What the lines of TRENDS show."""
    percent = np.arange(11) / 100.0
    curves = {target: sweep(target) / 1e3 for target in BASES}
    fine = np.arange(0.0, 0.31, 0.01)

    def at(target, share):
        return curves[target][int(np.argmin(np.abs(ETHANOL - share)))]

    def one(name, share):
        return each(lambda target: trends.rise(target, name, share)[0])

    def highest(name):
        return f"{100 * fine[np.argmax(trends.rise(60e3, name, fine))]:.0f}"

    def both(**shares):
        return each(lambda target: trends.pressure(target, shares)[0] - target / 1e3)

    def still(shares):
        return f"{trends.evaporated(60e3, shares, [0.3])[0, 0] - 273.15:.1f}"

    return curves, {
        "annex": each(lambda t: np.abs(trends.rise(t, "ethanol", percent) - ethanol_allowance(percent) / 1e3).max(), ""),
        "at_10": each(lambda t: at(t, 0.10) - at(t, 0.0)), "e15": each(lambda t: at(t, 0.15) - at(t, 0.10)),
        "e20": each(lambda t: at(t, 0.20) - at(t, 0.10)),
        "flat_30": each(lambda t: np.ptp([at(t, s) for s in (0.10, 0.20, 0.30)]), ""),
        "butanol": one("1-butanol", 0.05), "butanol_10": one("1-butanol", 0.10),
        "etbe": one("ETBE", 0.10), "etbe_20": one("ETBE", 0.20), "mtbe": one("MTBE", 0.10),
        "e5": both(ethanol=0.055), "e5_etbe": both(ethanol=0.055, ETBE=0.098), "e10_etbe": both(ethanol=0.10, ETBE=0.20),
        **{f"highest_{name}": highest(name) for name in ("methanol", "ethanol", "2-propanol", "tert-butanol")},
        "D_methanol": still({"methanol": 0.10}), "D_ethanol": still({"ethanol": 0.10}),
        "D_both": still({"methanol": 0.05, "ethanol": 0.05}),
        "at_51": each(lambda t: trends.pressure(t, {"ethanol": 0.51})[0], ""),
        "at_80": each(lambda t: at(t, 0.80), ""), "at_83": each(lambda t: at(t, 0.83), ""),
        "butane": each(lambda t: 100.0 * trends.butane_for(t, {"ethanol": 0.83}, 43.0), ""),
        "hsieh": " / ".join(f"{v - 53.7:+.1f}" for v in sweep(53.7e3, np.array(list(HSIEH))) / 1e3),
    }  # fmt: skip


def main():
    """Write the tables."""
    curves, numbers = trend_numbers()
    allowed = ethanol_allowance(ETHANOL) / 1e3
    lines = ["# Ethanol from 0 to 100 % in gasolines of 50, 60 and 70 kPa", "",
             "Made by `python -m tests.studies.ethanol_sweep`. Splash blending, volumes at 15 degC; DVPE after ASTM D5191, kPa.", "",
             "| ethanol, vol% | base 50 | change | base 60 | change | base 70 | change | annex III |", "|---|---|---|---|---|---|---|---|"]  # fmt: skip
    for i, share in enumerate(ETHANOL):
        cells = [f"{curves[t][i]:.1f} | {curves[t][i] - curves[t][0]:+.1f}" for t in BASES]
        limit = f"{allowed[i]:+.1f}" if np.isfinite(allowed[i]) else ""
        lines.append(f"| {100 * share:.0f} | {' | '.join(cells)} | {limit} |")
    lines += ["", "Other oxygenates, change of the DVPE on bases 50 / 60 / 70, kPa.", "",
              "| vol% | " + " | ".join(f"{100 * s:.0f}" for s in SHARES_OF_OTHERS) + " |", "|---|" + "---|" * SHARES_OF_OTHERS.size]  # fmt: skip
    for name in OTHERS:
        change = np.stack([trends.rise(target, name, SHARES_OF_OTHERS) for target in BASES])
        lines.append(
            f"| {name} | " + " | ".join(" / ".join(f"{v:+.1f}" for v in column) for column in change.T) + " |"
        )
    lines += ["", "Published trends.", *TRENDS.format(**numbers).rstrip().splitlines()]
    FILE.write_text("\n".join(lines) + "\n", encoding="utf-8")


if __name__ == "__main__":
    main()
