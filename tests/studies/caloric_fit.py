"""Makes caloric_fit.md: what alphas fitted to heat capacities as well as to vapour pressures would give.

Run from the top folder (needs CoolProp, thermo and SciPy, no network; some minutes):

    python -m tests.studies.caloric_fit

A proposal with its evidence; the shipped alphas are fitted to vapour pressures alone.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from pathlib import Path

import numpy as np

from screener import species
from screener.equilibrium import Fluid
from screener.equilibrium.alpha import Twu
from screener.equilibrium.cubic import PENG_ROBINSON, roots
from screener.species import fits, forms, pure
from tests.studies.caloric_references import references
from tests.studies.caloric_species import misses, short

PAGE = Path(__file__).with_suffix(".md")
# weights: one standard deviation of each kind of evidence; own choices
PRESSURE = 0.002  # [-] a vapour pressure at 300 K or above
COLD = (
    0.01  # [-] the least that a vapour pressure at 250 K may be off, its own error bar where that is larger
)
CAPACITY, HEAT = 0.015, 0.005  # [-]
GRID = np.linspace(250.0, 400.0, 31)  # [K]


@dataclass(frozen=True)
class Evidence:
    """What one alpha is fitted to: ln P at T with its deviation, and heats at their own temperatures."""

    one: object
    T: np.ndarray
    ln_P: np.ndarray
    deviation: np.ndarray
    known: dict


def constants(p):
    """L, M, N, C, D from g = N M, h = N (1 - M), L, C, D."""
    g, h, L, C, D = p
    return L, g / (g + h), g + h, C, D


def alpha_of(fluid, five) -> Twu:
    """Other alpha constants for a fluid of one species."""
    return Twu(fluid.Tc, *(np.array([value]) for value in five))


def boiling(one, five, T):
    """Vapour pressure [Pa] of the equation with these constants; NaN where it does not saturate."""
    a = pure.OMEGA_A / pure.OMEGA_B * forms.alpha(T / one.Tc, *five) * one.Tc / T
    d1, d2 = PENG_ROBINSON
    ln_P = np.log(one.psat(T))
    with np.errstate(all="ignore"):
        for _ in range(12):
            B = np.exp(ln_P) * pure.OMEGA_B * one.Tc / (one.Pc * T)
            L, V, two = roots(a * B, B)
            gap = [
                Z - 1.0 - np.log(Z - B) - a / (d2 - d1) * np.log((Z + d2 * B) / (Z + d1 * B)) for Z in (L, V)
            ]
            step = np.clip((gap[0] - gap[1]) / (L - V), -0.5, 0.5)
            ln_P = ln_P - step
    return np.where(two & (np.abs(step) < 1e-10), np.exp(ln_P), np.nan)


def pressure_miss(one, five, T, ln_P):
    """ln of the equation's vapour pressure over the one wanted."""
    return np.log(boiling(one, five, T)) - ln_P


def fit(evidence: Evidence, with_heats: bool):
    """Five constants by least squares from the shipped ones."""
    from scipy.optimize import least_squares

    one, fluid = evidence.one, Fluid.of([evidence.one.name])
    L, M, N, C, D = one.alpha

    def residuals(p):
        with np.errstate(all="ignore"):
            return np.clip(np.nan_to_num(misses_of(constants(p)), nan=50.0), -1e3, 1e3)

    def misses_of(five):
        parts = [pressure_miss(one, five, evidence.T, evidence.ln_P) / evidence.deviation]
        if with_heats:
            found = misses(
                replace(fluid, alpha=alpha_of(fluid, five)), evidence.known, lambda T: boiling(one, five, T)
            )
            for key, deviation in (("capacity", CAPACITY), ("heat", HEAT)):
                if key in found:
                    miss = found[key][np.isfinite(found[key])]
                    parts.append(np.sqrt(7.0 / found[key].size) * 0.01 * miss / deviation)
        rise = np.diff(np.log(forms.alpha(fits.FALLING / one.Tc, *five)))
        parts.append(1e4 * np.maximum(rise, -1e-6))  # alpha must fall with temperature everywhere
        return np.concatenate(parts)

    start = np.array([N * M, N * (1.0 - M), L, C, D])
    solution = least_squares(residuals, start, x_scale=np.array([1.0, 0.3, 0.3, 1.0, 1.0]), max_nfev=60)
    five = constants(solution.x)
    falls = np.all(np.diff(forms.alpha(fits.FALLING / one.Tc, *five)) <= 0.0)
    return five if falls else one.alpha


def shipped_curve(one) -> Evidence:
    """The shipped vapour-pressure curve, trusted less below 300 K, and the heats."""
    T = GRID[(one.curve.T_low <= GRID) & (GRID <= 0.9 * one.Tc)]
    bar = max(COLD, one.psat_error)
    deviation = PRESSURE + bar * np.clip((300.0 - T) / 50.0, 0.0, 1.0)
    return Evidence(one, T, np.log(one.psat(T)), deviation, references(one))


def warm_only(one) -> Evidence | None:
    """A species whose cold vapour pressures are known, as if all there was were an Antoine fit above 330 K.

    Its continuation counts as 5 % uncertain at 250 K.
    """
    T = GRID[GRID <= 0.9 * one.Tc]
    warm = T >= 330.0
    known = references(one) if warm.sum() >= 8 else {}
    if known.get("capacity", ("", "", ""))[2] != "CoolProp" or one.psat_error > 0.03:
        return None
    antoine = np.linalg.lstsq(_antoine(T[warm], one.Tc), np.log(one.psat(T[warm])), rcond=None)[0]
    deviation = PRESSURE + 0.05 * np.clip((330.0 - T) / 80.0, 0.0, 1.0)
    return Evidence(one, T, _antoine(T, one.Tc) @ antoine, deviation, known)


def _antoine(T, Tc):
    """Terms of A - B / (T - C), C one tenth of Tc: near enough to what is fitted to every fluid."""
    return np.stack([np.ones_like(T), -1.0 / (T - 0.1 * Tc)], axis=1)


def proposal_rows():
    """Species outside an aim: misses now and with heats, and how far the vapour pressure moves [%]."""
    rows = []
    for name in species.names():
        one = species.find(name)
        known = references(one) if 0.85 * one.Tc >= 260.0 else {}
        now = _row(one, one.alpha, known)
        if not known or not short(now):
            continue
        evidence = shipped_curve(one)
        five = fit(evidence, True)
        then = _row(one, five, known)
        at = np.array([250.0, 300.0, 350.0])
        at = at[at <= 0.9 * one.Tc]
        moved = 100.0 * np.expm1(pressure_miss(one, five, at, np.log(one.psat(at))))
        rows.append((now, then, moved, 100.0 * one.psat_error))
    return rows


def _row(one, five, known):
    fluid = Fluid.of([one.name])
    found = misses(replace(fluid, alpha=alpha_of(fluid, five)), known, lambda T: boiling(one, five, T))
    cells = [
        (np.nanmean(np.abs(found[key])), 0.0, 0.0, 0, "") if key in found else None
        for key in ("heat", "capacity")
    ]
    return (one.name, one.family, *cells)


def blind_rows():
    """Known species as `warm_only`: errors of the vapour pressure at 255 and 280 K [%], three ways."""
    rows = []
    for name in species.names():
        one = species.find(name)
        evidence = warm_only(one)
        if evidence is None:
            continue
        at = np.array([255.0, 280.0])
        wanted = np.log(one.psat(at))
        errors = [100.0 * np.expm1(np.interp(at, evidence.T, evidence.ln_P) - wanted)]
        errors += [
            100.0 * np.expm1(pressure_miss(one, fit(evidence, heats), at, wanted)) for heats in (False, True)
        ]
        rows.append((name, *errors))
    return rows


def page(proposal, blind) -> str:
    """The whole page."""
    left = [row for row in proposal if short(row[1])]
    miss = np.array([np.abs(row[1:]) for row in blind])
    lines = [
        "# Alphas fitted to heats as well",
        "",
        "Made by `python -m tests.studies.caloric_fit`. A proposal: the five constants of alpha fitted at once",
        "to the vapour-pressure curve (0.2 % from 300 K up; below, its error bar, at least 1 % at 250 K), the",
        "liquid heat capacity (1.5 %) and the heat of vaporisation (0.5 %) where the libraries hold them.",
        "",
        "## Does heat capacity tell the cold end of a vapour-pressure curve?",
        "",
        f"{len(blind)} species whose vapour pressure is known, as if all there was were an Antoine fit from 330 K",
        "up. Error at 255 and 280 K, percent:",
        "",
        "| taken from | mean at 255 K | worst at 255 K | mean at 280 K | worst at 280 K |",
        "| --- | --- | --- | --- | --- |",
    ]
    for k, word in enumerate(
        ("the Antoine fit continued", "alpha fitted to it", "alpha fitted to it and to heats")
    ):
        cells = [f"{cut(miss[:, k, j]):.2f}" for j in (0, 1) for cut in (np.nanmean, np.nanmax)]
        lines.append(f"| {word} | {' | '.join(cells)} |")
    lines += [
        "",
        "## Species outside an aim",
        "",
        f"{len(proposal)} now, {len(left)} with heats in the fit: "
        + ", ".join(row[0][0] for row in left)
        + ".",
        "",
        "Percent. A row that does not move is one on which this plain least squares failed, or found no better",
        "alpha that falls with temperature everywhere. The curves of isobutanol tell most: two published ones",
        "differ by 43 % at 250 K, the heats side with the one not shipped.",
        "",
        "| species | heat | with heats | capacity | with heats | Psat moves at 250, 300, 350 K | error bar |",
        "| --- | --- | --- | --- | --- | --- | --- |",
    ]
    for now, then, moved, bar in proposal:
        cells = [
            f"{one[0]:.2f}" if one else "-" for pair in zip(now[2:], then[2:], strict=True) for one in pair
        ]
        lines.append(
            f"| {now[0]} | {' | '.join(cells)} | {', '.join('-' if np.isnan(m) else f'{m:+.2f}' for m in moved)} | {bar:.1f} |"
        )
    return "\n".join(lines) + "\n"


if __name__ == "__main__":
    PAGE.write_text(page(proposal_rows(), blind_rows()), encoding="utf-8")
    print(PAGE.read_text(encoding="utf-8"))
