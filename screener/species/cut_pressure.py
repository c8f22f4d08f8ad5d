"""Vapour pressure of petroleum cuts, each function named after its paper.

The chosen one for cuts is `vapour_pressure_ambrose_walton_1989`, anchored on the boiling
point, with critical constants after Twu 1984. Treated as cuts, the hydrocarbons of the
species table come back with it as the table in tests/studies/cut_vapour_pressures.md
shows; Maxwell and Bonnell and Lee and Kesler stand beside it there and lose. All of them are exact at
the boiling point, so errors grow with the distance from it.
"""

from __future__ import annotations

import numpy as np

from screener.ground.constants import ATMOSPHERE
from screener.species.cut_constants import RANKINE, watson_factor


def _lee_kesler_terms(Tr):
    ln_Tr, sixth = np.log(Tr), Tr**6
    return (
        5.92714 - 6.09648 / Tr - 1.28862 * ln_Tr + 0.169347 * sixth,
        15.2518 - 15.6875 / Tr - 13.4721 * ln_Tr + 0.43577 * sixth,
    )


def vapour_pressure_lee_kesler_1975(T, Tb, Tc, Pc):
    """Vapour pressure [Pa] at T [K], through one atmosphere at Tb [K]; Tc [K], Pc [Pa].

    Source: B.I. Lee, M.G. Kesler, AIChE J. 21 (1975) 510; coefficients read in open code.
    """
    zero, one = _lee_kesler_terms(np.asarray(Tb, dtype=float) / Tc)
    omega = (np.log(ATMOSPHERE / Pc) - zero) / one
    zero, one = _lee_kesler_terms(np.asarray(T, dtype=float) / Tc)
    return Pc * np.exp(zero + omega * one)


def _ambrose_walton_terms(Tr):
    s = 1.0 - Tr
    powers = np.stack([s, s**1.5, s**2.5, s**5], axis=-1) / np.asarray(Tr)[..., None]
    return (
        powers @ np.array([-5.97616, 1.29874, -0.60394, -1.06841]),
        powers @ np.array([-5.03365, 1.11505, -5.41217, -7.46628]),
        powers @ np.array([-0.64771, 2.41539, -4.26979, 3.25259]),
    )


def vapour_pressure_ambrose_walton_1989(T, Tb, Tc, Pc):
    """Vapour pressure [Pa] at T [K], through one atmosphere at Tb [K]; Tc [K], Pc [Pa].

    The acentric factor is not taken from anywhere: it is the value that gives one
    atmosphere at the boiling point.

    Source: D. Ambrose, J. Walton, Pure Appl. Chem. 61 (1989) 1395; coefficients from memory,
    unverified, held against the species table (tests/regression/test_lab_cut_pressures.py).
    """
    f0, f1, f2 = _ambrose_walton_terms(np.asarray(Tb, dtype=float) / Tc)
    target = np.log(ATMOSPHERE / Pc) - f0
    omega = target / f1
    for _ in range(30):  # f2 is a small correction: each round gains a digit or more
        omega = (target - f2 * omega**2) / f1
    f0, f1, f2 = _ambrose_walton_terms(np.asarray(T, dtype=float) / Tc)
    return Pc * np.exp(f0 + omega * f1 + omega**2 * f2)


def vapour_pressure_maxwell_bonnell_1957(T, Tb, SG):
    """Vapour pressure [Pa] at T [K] from Tb [K] and SG [-].

    Boiling points away from a Watson factor of 12 are shifted as the method says: by
    2.5 f (K - 12) log10(P/atm) degR, f rising from 0 at 200 degF to 1 at 400 degF, and 1 above
    one atmosphere.

    Source: J.B. Maxwell, L.S. Bonnell, Ind. Eng. Chem. 49 (1957) 1187, in the form of API
    procedure 5A1.19; from memory, unverified. The form gives one atmosphere at Tb within 0.5 %.
    """
    T, R = np.broadcast_arrays(np.asarray(T, dtype=float), RANKINE * np.asarray(Tb, dtype=float))
    K = watson_factor(Tb, SG)
    cold = np.clip((R - 659.67) / 200.0, 0.0, 1.0)
    decades = np.zeros_like(T)  # log10(P/atm)
    for _ in range(60):
        factor = np.where(decades > 0.0, 1.0, cold)
        boiling = R - 2.5 * factor * (K - 12.0) * decades
        X = (boiling / (RANKINE * T) - 0.0002867 * boiling) / (748.1 - 0.2145 * boiling)
        decades = 0.5 * (decades + _maxwell_bonnell(X) - np.log10(760.0))
    return ATMOSPHERE * 10.0**decades


def _maxwell_bonnell(X):
    """log10 of the vapour pressure in mmHg."""
    low = (3000.538 * X - 6.761560) / (43.0 * X - 0.987672)
    middle = (2663.129 * X - 5.994296) / (95.76 * X - 0.972546)
    high = (2770.085 * X - 6.412631) / (36.0 * X - 0.989679)
    return np.where(X > 0.0022, low, np.where(X >= 0.0013, middle, high))


def heat_capacity_lee_kesler_1976(T, MW, K, omega):
    """Ideal-gas heat capacity [J/(mol K)] at T [K] from MW [kg/mol], Watson factor K [-] and omega [-].

    Source: M.G. Kesler, B.I. Lee, Hydrocarbon Processing 55 (March 1976) 153; from memory,
    unverified. Within 4 % of the species table from 250 to 500 K, 8 % for cyclohexane and
    9 % for naphthalene (tests/regression/test_lab_cut_pressures.py).
    """
    T = np.asarray(T, dtype=float)
    a0 = -1.41779 + 0.11828 * K
    a1 = -(6.99724 - 8.69326 * K + 0.27715 * K**2) * 1e-4
    b0 = 1.09223 - 2.48245 * omega
    b1 = -(3.434 - 7.14 * omega) * 1e-3
    b2 = -(7.2661 - 9.2561 * omega) * 1e-7
    C = ((12.8 - K) * (10.0 - K) / (10.0 * omega)) ** 2
    return 1000.0 * MW * (a0 + a1 * T - 2.2582e-6 * T**2 - C * (b0 + b1 * T + b2 * T**2))
