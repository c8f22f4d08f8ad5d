"""From chosen curves to the numbers of a species: alpha, translation, density, heat capacity.

The same functions make the shipped tables (data/made_by/species.py) and a species that
is outside them (find_live). Choices are by the rules written in each docstring.
"""

from __future__ import annotations

import numpy as np

from screener.ground.constants import R
from screener.species import fits, forms, heats, library, pure
from screener.species.vapour_pressure import LIGHT, REFERENCE, NoData, choose_vapour_pressure

PROMISE = 0.005, 0.01  # [-] largest mean and single miss of the vapour pressure a species may have


def choose_curve(cas, MW, Tc, Pc, Tb, cp_ideal, prefer=None):
    """The vapour-pressure curve of a species, its cold end set by the heats of the libraries.

    A species below Tc 340 K has none; one with a reference equation keeps it (but for `cold.REFERENCE`).
    """
    plain = choose_vapour_pressure(cas, Tc, Pc, Tb, prefer)
    if Tc <= LIGHT:
        return plain
    omega = float(-np.log10(forms.psat(plain.coefficients, 0.7 * Tc) / Pc) - 1.0)
    known = heats.thermal(cas, MW, Tc, cp_ideal, omega)
    if plain.source not in REFERENCE:
        return choose_vapour_pressure(cas, Tc, Pc, Tb, prefer, known)
    own = heats.Thermal(None, heats.reference_capacity(cas, MW, Tc), known.cp_ideal)
    return choose_vapour_pressure(cas, Tc, Pc, Tb, prefer, own)


def fit_alpha(curve, Tc, Pc):
    """Alpha constants, and mean and worst relative miss of the vapour pressure of the equation [-].

    Fitted over 230-400 K clipped to 0.9 Tc (light species: their saturation range up to
    0.98 Tc, with three constants only), with a fifth of the weight below 230 K, and above
    400 K to 0.75 Tc for heavy ones. The misses are found by solving the equation for its
    vapour pressure between 250 and 350 K, below 0.9 Tc (light: over the fitted range).
    """
    light = Tc <= LIGHT
    top = 0.98 * Tc if light else min(400.0, 0.9 * Tc)
    T = np.linspace(curve.T_low if light else max(230.0, curve.T_low), top, 70)
    weight = np.ones_like(T)
    aside = [np.linspace(curve.T_low, T[0], 6)[:-1]] if curve.T_low < T[0] else []
    if not light and 0.75 * Tc > top:
        aside.append(np.linspace(top, min(0.75 * Tc, curve.T_high), 12)[1:])
    for more in aside:
        T, weight = np.concatenate([T, more]), np.concatenate([weight, np.full(len(more), 0.2)])
    P = forms.psat(curve.coefficients, T)
    constants = fits.alpha_constants(T, P, Tc, Pc, weight, five=not light)
    check = np.linspace(curve.T_low, top, 40) if light else np.linspace(250.0, min(350.0, 0.9 * Tc), 41)
    check = check[check >= curve.T_low]
    wanted = forms.psat(curve.coefficients, check)
    got = pure.psat_of_alpha(check, forms.alpha(check / Tc, *constants), Tc, Pc, wanted)
    miss = np.abs(got / wanted - 1.0)
    if not (np.mean(miss) <= PROMISE[0] and np.max(miss) <= PROMISE[1]):
        raise NoData(f"the equation misses the vapour-pressure curve by {100 * np.max(miss):.1f} %")
    return constants, float(np.mean(miss)), float(np.max(miss))


def choose_density(cas, MW, Tc, Pc):
    """Points T [K], saturated liquid density [kg/m3], method, source key, note.

    Rule: candidates in the order of `library.DENSITY_SOURCES`; a candidate more than 2 % off
    the CRC Handbook density, or more than 2 % off two others that agree within 1 %, is passed
    over. With no candidate the handbook density, else the CAS Common Chemistry volume read as
    at 20 degC, is continued by the Rackett equation, anchored on it.
    """
    T = np.linspace(250.0, 350.0, 41) if Tc > LIGHT else np.linspace(0.55 * Tc, 0.9 * Tc, 41)
    T = T[T <= 0.9 * Tc]
    point = library.density_at_a_point(cas) if Tc > LIGHT else None
    candidates = [c for c in library.liquid_densities(cas, MW, Tc, Pc) if np.isfinite(c.at(T)).sum() >= 10]
    passed = []
    for c in candidates:
        value = c.at(T)
        middle = T[np.isfinite(value)][len(T[np.isfinite(value)]) // 2]
        if point is not None:
            off = abs(c.at(np.array([point[1]]))[0] / point[0] - 1.0)
        else:
            others = [o.at(np.array([middle]))[0] for o in candidates if o is not c]
            others = [o for o in others if np.isfinite(o)]
            agree = len(others) > 1 and max(others) / min(others) < 1.01
            off = abs(c.at(np.array([middle]))[0] / np.mean(others) - 1.0) if agree else 0.0
        if np.isfinite(off) and off > 0.02:
            passed.append(c.method)
            continue
        ok = np.isfinite(value)
        return T[ok], value[ok], c.method, c.source, ("passed over " + " ".join(passed)) if passed else ""
    source, words = "crc-handbook", ""
    if point is None and Tc > LIGHT:
        volume = library.volume_of_unknown_temperature(cas)
        point = (MW / volume, 293.15) if volume else None
        source, words = "cas-common-chemistry", ", a table that carries no temperature"
    if point is None:
        raise NoData(f"{cas}: no liquid density")
    rho, T0 = point
    ra = (MW / rho * Pc / (R * Tc)) ** (1.0 / (1.0 + (1.0 - T0 / Tc) ** (2.0 / 7.0)))
    value = MW / (R * Tc / Pc * ra ** (1.0 + (1.0 - T / Tc) ** (2.0 / 7.0)))
    note = f"{rho:.1f} kg/m3 at {T0 - 273.15:.0f} degC{words}, continued by the Rackett equation"
    return T, value, "RACKETT_FROM_POINT", source, note


def fit_density(T, rho, MW, Tc, Pc, constants, curve):
    """(c0, c1), mean and worst relative density miss [-], density coefficients.

    The shift is linear in T; constant for species with Tc below 340 K, whose shift would
    otherwise be continued far outside the fit.
    """
    P = np.where(T >= curve.T_low, forms.psat(curve.coefficients, T), 0.0)
    v_pr = pure.liquid_volume(T, np.maximum(P, 1e-9), forms.alpha(T / Tc, *constants), Tc, Pc)
    c0, c1 = fits.translation(T, v_pr, MW / rho, linear=Tc > LIGHT)
    miss = np.abs(MW / (v_pr - c0 - c1 * (T - 298.15)) / rho - 1.0)
    basis = forms.density_basis(T)
    solution = np.linalg.lstsq(basis, rho, rcond=1e-12)[0]
    return (c0, c1), float(np.mean(miss)), float(np.max(miss)), solution


def fit_cp(cas, MW):
    """(a0..a4), method, source key, largest miss [-] of the ideal-gas heat capacity over 200-500 K."""
    T = np.linspace(200.0, 500.0, 61)
    for c in library.cp_ideal(cas, MW):
        value = c.at(T)
        ok = np.isfinite(value)
        if T[ok].max(initial=0.0) >= 450.0 and ok.sum() >= 30:
            coefficients, miss = fits.polynomial(T[ok], value[ok], 4 if T[ok][0] < 260.0 else 2)
            return tuple(coefficients) + (0.0,) * (5 - len(coefficients)), c.method, c.source, miss
    raise NoData(f"{cas}: no ideal-gas heat capacity")


def density_at_15(cas, MW, Tc, Pc, Tb, density):
    """Saturated liquid density at 15 degC [kg/m3] and a note.

    A gas without liquid at 15 degC has an effective one: its saturated liquid at the normal
    boiling point.
    """
    if Tc > LIGHT:
        return float(forms.density_basis(288.15) @ density), ""
    for T, words in (
        (288.15, ""),
        (Tb, f"effective: no liquid at 15 degC; saturated liquid at {Tb:.1f} K taken"),
    ):
        for c in library.liquid_densities(cas, MW, Tc, Pc):
            value = c.at(np.array([T]))[0]
            if np.isfinite(value) and T <= 0.97 * Tc:
                return float(value), words
    raise NoData(f"{cas}: no liquid density")
