"""Makes cuts_against_molecules.md: one gasoline as thirteen molecules and as cuts of its distillation.

Run from the top folder:

    python -m tests.studies.cuts_against_molecules

The cuts see the gasoline as a laboratory would: its density, a distillation curve, light
ends, and aromatics and olefins or not. The curve is the true one (every species at its own boiling
point), or the computed D86 curve with reflux turned into true boiling points by either
published method. Compared are bubble pressures from 0 to 50 degC, the DVPE, and its rise with
1 to 10 vol% ethanol.
"""

from __future__ import annotations

from pathlib import Path

import numpy as np

from screener.blends import Blend
from screener.ground.constants import ZERO_CELSIUS
from screener.species import find
from screener.volatility import (
    curve_at,
    distillation_d86,
    dvpe,
    pseudo_components,
    tbp_from_d86_daubert_1994,
    tbp_from_d86_riazi_daubert_1986,
    true_vapour_pressure,
)
from screener.volatility.cutting import EDGES
from screener.volatility.interconversion import GAP_POINTS, POWER_POINTS
from tests.studies.splash import AROMATICS, OLEFINS, SHARES, Splash

FILE = Path(__file__).with_suffix(".md")
T = ZERO_CELSIUS + np.array([0.0, 10.0, 20.0, 30.0, 37.8, 50.0])
ETHANOL = np.arange(11) / 100.0
LIGHT = ("n-butane", "isopentane", "n-pentane", "2-methyl-2-butene")


def gasoline():
    """The gasoline of known molecules."""
    return Blend.of(SHARES, title="thirteen species")


def true_curve():
    """Fractions [-] and temperatures [K] of the true boiling curve: a staircase of thirteen steps."""
    rows = sorted((find(name).Tb, share) for name, share in SHARES.items())
    ends = np.cumsum([0.0, *(share for _, share in rows)])
    fraction, temperature = [], []
    for k, (Tb, _) in enumerate(rows):
        fraction += [ends[k] + 1e-4, ends[k + 1] - 1e-4]
        temperature += [Tb, Tb + 1e-3]
    return np.array(fraction), np.array(temperature)


def d86_curve():
    """Fractions [-] and D86 temperatures [K] of the gasoline, from its molecules."""
    blend = gasoline()
    curve = distillation_d86(blend.fluid, blend.z).require()
    return curve.fraction[0], curve.T[0]


def curves():
    """True boiling point curves by where they come from."""
    f, D86 = d86_curve()
    gaps = tbp_from_d86_daubert_1994(curve_at(f, D86, np.array(GAP_POINTS)))[0]
    power = tbp_from_d86_riazi_daubert_1986(curve_at(f, D86, np.array(POWER_POINTS)))[0]
    return {
        "true boiling points": true_curve(),
        "D86, Daubert 1994": (np.array(GAP_POINTS), gaps),
        "D86, Riazi-Daubert 1986": (np.array(POWER_POINTS), power),
    }


def cases(wanted=lambda label: True):
    """{label: Cuts}: every curve, with light ends known or not, aromatics and olefins known or not."""
    density = gasoline().density_15
    found = {}
    for where, (f, tbp) in curves().items():
        for light in ((), ("n-butane",), LIGHT):
            for known in (False, True):
                ends = {0: "no light ends", 1: "butane", 4: "C4 and C5"}[len(light)]
                label = f"{where}; {ends}; {'families known' if known else 'density only'}"
                if not wanted(label):
                    continue
                cuts = pseudo_components(
                    f, tbp, density, known={name: SHARES[name] for name in light},
                    aromatics=AROMATICS if known else None, olefins=OLEFINS if known else 0.0,
                )  # fmt: skip
                found[label] = cuts
    return found


def pressures(shares, ethanol=ETHANOL):
    """Bubble pressures at T, and the DVPE at each ethanol share, both in kPa, of volume shares by name."""
    splash = Splash(shares)
    bubble = true_vapour_pressure(splash.fluid, T, splash.moles(splash.base, 0.0)).require().P
    return bubble / 1e3, dvpe(splash.fluid, splash.moles(splash.base, ethanol)).require().P / 1e3


def shares_of(cuts):
    """Volume share by name."""
    return dict(zip(cuts.names, cuts.volume, strict=True))


def edges_table():
    """{label: bubble pressures over those of the default cuts} when the cuts are made finer and coarser."""
    f, tbp = curves()["D86, Daubert 1994"]
    density, default = gasoline().density_15, np.array(EDGES)
    finer = np.sort(np.concatenate([default, 0.5 * (default[1:] + default[:-1])]))
    found = {}
    for label, edges in {"default": default, "half as wide": finer, "twice as wide": default[::2]}.items():
        cuts = pseudo_components(f, tbp, density, known={n: SHARES[n] for n in LIGHT}, aromatics=AROMATICS,
                                 olefins=OLEFINS, edges=edges)  # fmt: skip
        found[label] = len(cuts.names), pressures(shares_of(cuts))[0]
    reference = found["default"][1]
    return {label: (count, P / reference) for label, (count, P) in found.items()}


def main():
    """Write the tables."""
    bubble, test = pressures(SHARES)
    rise = test - test[0]
    degC = " | ".join(f"{t - ZERO_CELSIUS:.0f} degC" for t in T)
    lines = ["# One gasoline as molecules and as cuts", "", "Made by `python -m tests.studies.cuts_against_molecules`.",
             "", f"Bubble pressure over that of the molecules; of the molecules: {', '.join(f'{p:.1f}' for p in bubble)} kPa.",
             "", f"| curve; light ends; families | species and cuts | density factor | {degC} | DVPE, kPa |",
             "|---|---|---|" + "---|" * (T.size + 1),
             f"| molecules | 13 | | {' | '.join(['1'] * T.size)} | {test[0]:.1f} |"]  # fmt: skip
    rises = [f"| molecules | {' | '.join(f'{r:.1f}' for r in rise[1:])} | |"]
    for label, cuts in cases().items():
        P, E = pressures(shares_of(cuts))
        lines.append(
            f"| {label} | {len(cuts.names)} | {cuts.gravity_factor:.3f} | "
            + " | ".join(f"{v:.3f}" for v in P / bubble) + f" | {E[0]:.1f} |"
        )  # fmt: skip
        off = np.abs(E - E[0] - rise).max()
        rises.append(f"| {label} | {' | '.join(f'{r:.1f}' for r in (E - E[0])[1:])} | {off:.2f} |")
    head = " | ".join(f"{100 * e:.0f} %" for e in ETHANOL[1:])
    lines += ["", "Rise of the DVPE with ethanol, kPa, and the largest difference from the molecules.", "",
              f"| curve; light ends; families | {head} | off |", "|---|" + "---|" * 11, *rises, "",
              "Width of the cuts: bubble pressure over that of the default cuts (D86 by Daubert 1994, C4 and C5 known).", "",
              f"| cuts | species and cuts | {degC} |", "|---|---|" + "---|" * T.size]  # fmt: skip
    for label, (count, ratio) in edges_table().items():
        lines.append(f"| {label} | {count} | {' | '.join(f'{v:.4f}' for v in ratio)} |")
    lines += ["", "A D86 curve does not show the light ends: without them known the vapour pressure of a gasoline is",
              "lost, whatever the method. The rise with ethanol asks for the aromatics."]  # fmt: skip
    FILE.write_text("\n".join(lines) + "\n", encoding="utf-8")


if __name__ == "__main__":
    main()
