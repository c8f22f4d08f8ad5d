"""Critical constants and molar mass of petroleum cuts from boiling point and specific gravity.

Each function is named after its paper. Tb [K] is the normal boiling point (of a cut: the
mean average one), SG [-] the specific gravity 60/60 degF; arrays broadcast. The papers
work in degrees Rankine and psia; the conversion is inside.

What was read of the coefficients and what is from memory stands with each function. All of
them are held against species of known constants in tests/regression/test_lab_cut_constants.py.
"""

from __future__ import annotations

import numpy as np

from screener.ground.constants import PSI

RANKINE = 1.8  # degrees Rankine per kelvin
BAR = 1.0e5  # [Pa]
WATER_60F = 999.016  # density of water at 60 degF [kg/m3]; API MPMS 11.4.1, from memory, unverified


def specific_gravity(rho_15):
    """Specific gravity 60/60 degF [-] of a petroleum liquid from its density at 15 degC [kg/m3].

    The step from 15 degC to 60 degF takes the thermal expansion of crude oil at 60 degF,
    341.0957/rho^2 per degF: it moves the density by less than 0.1 %.

    Source: API MPMS 11.1 (2004) for the expansion, 11.4.1 for water; both from memory, unverified.
    """
    rho_15 = np.asarray(rho_15, dtype=float)
    return rho_15 * (1.0 - 341.0957 / rho_15**2) / WATER_60F


def density_15(SG):
    """Density at 15 degC [kg/m3] from the specific gravity 60/60 degF [-]; inverse of `specific_gravity`."""
    rho = np.asarray(SG, dtype=float) * WATER_60F
    for _ in range(4):  # each round gains three digits
        rho = np.asarray(SG, dtype=float) * WATER_60F / (1.0 - 341.0957 / rho**2)
    return rho


def watson_factor(Tb, SG):
    """Watson characterisation factor [-]: cube root of Tb in degrees Rankine over SG.

    Source: Watson, Nelson and Murphy, Ind. Eng. Chem. 27 (1935) 1460, as quoted in the trade.
    """
    return np.cbrt(RANKINE * np.asarray(Tb, dtype=float)) / np.asarray(SG, dtype=float)


# ---- Twu 1984: perturbation of n-paraffins. C.H. Twu, Fluid Phase Equilibria 16 (1984) 137.
# Coefficients of the paraffins and of the temperature step read in open code of several authors; those of
# the volume, pressure and molar-mass steps from memory, unverified.


def _twu_paraffin(R):
    """Tc [degR], Pc [psia], Vc and SG of the n-paraffin that boils at R [degR]."""
    Tc = R / (0.533272 + 0.191017e-3 * R + 0.779681e-7 * R**2 - 0.284376e-10 * R**3 + 0.959468e28 / R**13)
    a = 1.0 - R / Tc
    SG = 0.843593 - 0.128624 * a - 3.36159 * a**3 - 13749.5 * a**12
    Pc = (3.83354 + 1.19629 * np.sqrt(a) + 34.8888 * a + 36.1952 * a**2 + 104.193 * a**4) ** 2
    Vc = (1.0 - (0.419869 - 0.505839 * a - 1.56436 * a**3 - 9481.70 * a**14)) ** -8
    return Tc, Pc, Vc, SG


def _perturbed(f):
    return ((1.0 + 2.0 * f) / (1.0 - 2.0 * f)) ** 2


def _twu_temperature(R, SG):
    """Ratio of Tc to that of the n-paraffin boiling at R [degR]."""
    d = np.expm1(5.0 * (_twu_paraffin(R)[3] - SG))
    root = np.sqrt(R)
    return _perturbed(d * (-0.362456 / root + (0.0398285 - 0.948125 / root) * d))


def critical_temperature_twu_1984(Tb, SG):
    """Critical temperature [K] after Twu 1984."""
    R = RANKINE * np.asarray(Tb, dtype=float)
    return _twu_paraffin(R)[0] * _twu_temperature(R, SG) / RANKINE


def critical_pressure_twu_1984(Tb, SG):
    """Critical pressure [Pa] after Twu 1984."""
    R, SG = RANKINE * np.asarray(Tb, dtype=float), np.asarray(SG, dtype=float)
    _, Pc, _, SG_0 = _twu_paraffin(R)
    root = np.sqrt(R)
    d = np.expm1(4.0 * (SG_0**2 - SG**2))
    volume = _perturbed(d * (0.466590 / root + (-0.182421 + 3.01721 / root) * d))
    d = np.expm1(0.5 * (SG_0 - SG))
    f = d * ((2.53262 - 46.1955 / root - 0.00127885 * R) + (-11.4277 + 252.140 / root + 0.00230535 * R) * d)
    return Pc * _twu_temperature(R, SG) / volume * _perturbed(f) * PSI


def molar_mass_twu_1984(Tb, SG):
    """Molar mass [kg/mol] after Twu 1984; the paraffin's is solved from its boiling point."""
    R, SG = np.broadcast_arrays(RANKINE * np.asarray(Tb, dtype=float), np.asarray(SG, dtype=float))
    h = np.log(R / (10.44 - 0.0052 * R))  # Twu's own start

    for _ in range(30):
        e = np.exp(5.71419 + 2.71579 * h - 0.286590 * h**2 - 39.8544 / h - 0.122488 / h**2)
        gap = e - 24.7522 * h + 35.3155 * h**2 - R
        slope = e * (2.71579 - 0.573180 * h + 39.8544 / h**2 + 0.244976 / h**3) - 24.7522 + 70.6310 * h
        step = gap / slope
        h = h - step
        if not np.any(np.abs(step) > 1e-13 * np.abs(h)):
            break
    root = np.sqrt(R)
    d = np.expm1(5.0 * (_twu_paraffin(R)[3] - SG))
    f = d * (np.abs(0.012342 - 0.328086 / root) + (-0.0175691 + 0.193168 / root) * d)
    return np.exp(h * _perturbed(f)) / 1000.0


# ---- Lee and Kesler 1976: M.G. Kesler, B.I. Lee, Hydrocarbon Processing 55 (March 1976) 153.
# Coefficients read in open code of several authors. One of them has a minus before 0.02226 in the molar mass,
# which makes that of pentane negative; the sign is plus.


def critical_temperature_lee_kesler_1976(Tb, SG):
    """Critical temperature [K] after Kesler and Lee 1976."""
    R, SG = RANKINE * np.asarray(Tb, dtype=float), np.asarray(SG, dtype=float)
    Tc = 341.7 + 811.1 * SG + (0.4244 + 0.1174 * SG) * R + (0.4669 - 3.2623 * SG) * 1e5 / R
    return Tc / RANKINE


def critical_pressure_lee_kesler_1976(Tb, SG):
    """Critical pressure [Pa] after Kesler and Lee 1976."""
    R, SG = RANKINE * np.asarray(Tb, dtype=float), np.asarray(SG, dtype=float)
    ln_Pc = (
        8.3634 - 0.0566 / SG
        - (0.24244 + 2.2898 / SG + 0.11857 / SG**2) * 1e-3 * R
        + (1.4685 + 3.648 / SG + 0.47227 / SG**2) * 1e-7 * R**2
        - (0.42019 + 1.6977 / SG**2) * 1e-10 * R**3
    )  # fmt: skip
    return np.exp(ln_Pc) * PSI


def molar_mass_lee_kesler_1976(Tb, SG):
    """Molar mass [kg/mol] after Kesler and Lee 1976; runs 5 to 8 % high on pure compounds."""
    R, SG = RANKINE * np.asarray(Tb, dtype=float), np.asarray(SG, dtype=float)
    M = (
        -12272.6 + 9486.4 * SG + (4.6523 - 3.3287 * SG) * R
        + (1.0 - 0.77084 * SG - 0.02058 * SG**2) * (1.3437 - 720.79 / R) * 1e7 / R
        + (1.0 - 0.80882 * SG + 0.02226 * SG**2) * (1.8828 - 181.98 / R) * 1e12 / R**3
    )  # fmt: skip
    return M / 1000.0


def acentric_factor_lee_kesler_1976(Tb, Tc, Pc, K):
    """Acentric factor [-] from Tb [K], Tc [K], Pc [Pa] and the Watson factor K [-].

    Below Tb/Tc = 0.8 the value that makes the Lee-Kesler vapour pressure one atmosphere at
    Tb; above, the authors' own fit in K.
    """
    Tbr = np.asarray(Tb, dtype=float) / Tc
    ln_Tbr, sixth = np.log(Tbr), Tbr**6
    low = (
        -np.log(np.asarray(Pc) / 101325.0) - 5.92714 + 6.09648 / Tbr + 1.28862 * ln_Tbr - 0.169347 * sixth
    ) / (15.2518 - 15.6875 / Tbr - 13.4721 * ln_Tbr + 0.43577 * sixth)
    high = -7.904 + 0.1352 * K - 0.007465 * np.square(K) + 8.359 * Tbr + (1.408 - 0.01063 * K) / Tbr
    return np.where(Tbr < 0.8, low, high)


# ---- Riazi and Daubert: Hydrocarbon Processing 59 (March 1980) 115; Ind. Eng. Chem. Res. 26 (1987) 755.
# 1980: Tc read in an open code, Pc and molar mass from memory; 1987: from memory, unverified.


def critical_temperature_riazi_daubert_1980(Tb, SG):
    """Critical temperature [K] after Riazi and Daubert 1980; 1 % high to 2.5 % on aromatics."""
    R = RANKINE * np.asarray(Tb, dtype=float)
    return 24.2787 * R**0.58848 * np.asarray(SG, dtype=float) ** 0.3596 / RANKINE


def critical_pressure_riazi_daubert_1980(Tb, SG):
    """Critical pressure [Pa] after Riazi and Daubert 1980."""
    R = RANKINE * np.asarray(Tb, dtype=float)
    return 3.12281e9 * R**-2.3125 * np.asarray(SG, dtype=float) ** 2.3201 * PSI


def molar_mass_riazi_daubert_1980(Tb, SG):
    """Molar mass [kg/mol] after Riazi and Daubert 1980."""
    R = RANKINE * np.asarray(Tb, dtype=float)
    return 4.5673e-5 * R**2.1962 * np.asarray(SG, dtype=float) ** -1.0164 / 1000.0


def critical_temperature_riazi_daubert_1987(Tb, SG):
    """Critical temperature [K] after Riazi and Daubert 1987."""
    R, SG = RANKINE * np.asarray(Tb, dtype=float), np.asarray(SG, dtype=float)
    Tc = 10.6443 * np.exp(-5.1747e-4 * R - 0.54444 * SG + 3.5995e-4 * R * SG) * R**0.81067 * SG**0.53691
    return Tc / RANKINE


def critical_pressure_riazi_daubert_1987(Tb, SG):
    """Critical pressure [Pa] after Riazi and Daubert 1987."""
    R, SG = RANKINE * np.asarray(Tb, dtype=float), np.asarray(SG, dtype=float)
    Pc = 6.162e6 * np.exp(-4.725e-3 * R - 4.8014 * SG + 3.1939e-3 * R * SG) * R**-0.4844 * SG**4.0846
    return Pc * PSI


def molar_mass_riazi_daubert_1987(Tb, SG):
    """Molar mass [kg/mol] after Riazi and Daubert 1987."""
    Tb, SG = np.asarray(Tb, dtype=float), np.asarray(SG, dtype=float)
    M = 42.965 * np.exp(2.097e-4 * Tb - 7.78712 * SG + 2.08476e-3 * Tb * SG) * Tb**1.26007 * SG**4.98308
    return M / 1000.0


# ---- From molar mass and gravity: for a residue or a plus fraction that nobody distilled.
# Riazi and Daubert 1987 in the form printed by T. Ahmed, Equations of State and PVT Analysis; from memory, unverified.


def _of_mass(MW, SG, a, b, c, d, e, f):
    M, g = 1000.0 * np.asarray(MW, dtype=float), np.asarray(SG, dtype=float)
    return a * M**b * g**c * np.exp(d * M + e * g + f * M * g)


def boiling_point_of_mass_riazi_daubert_1987(MW, SG):
    """Boiling point [K] from molar mass [kg/mol] and gravity [-]; 70 to 300 g/mol in the paper."""
    return _of_mass(MW, SG, 6.77857, 0.401673, -1.58262, 3.77409e-3, 2.984036, -4.25288e-3) / RANKINE


def critical_temperature_of_mass_riazi_daubert_1987(MW, SG):
    """Critical temperature [K] from molar mass [kg/mol] and gravity [-]; 70 to 300 g/mol in the paper."""
    return _of_mass(MW, SG, 544.4, 0.2998, 1.0555, -1.3478e-4, -0.61641, 0.0) / RANKINE


def critical_pressure_of_mass_riazi_daubert_1987(MW, SG):
    """Critical pressure [Pa] from molar mass [kg/mol] and gravity [-]; 70 to 300 g/mol in the paper."""
    return _of_mass(MW, SG, 4.5203e4, -0.8063, 1.6015, -1.8078e-3, -0.3084, 0.0) * PSI


def boiling_point_of_mass_twu_1984(MW, SG):
    """Boiling point [K] at which Twu 1984 gives the molar mass [kg/mol] for the gravity [-].

    By bisection between 220 and 1080 K; NaN where it is not there.
    """
    MW, SG = np.broadcast_arrays(np.asarray(MW, dtype=float), np.asarray(SG, dtype=float))
    low, high = np.full(MW.shape, 220.0), np.full(MW.shape, 1080.0)
    inside = (molar_mass_twu_1984(low, SG) <= MW) & (MW <= molar_mass_twu_1984(high, SG))
    for _ in range(60):
        middle = 0.5 * (low + high)
        light = molar_mass_twu_1984(middle, SG) < MW
        low, high = np.where(light, middle, low), np.where(light, high, middle)
    return np.where(inside, 0.5 * (low + high), np.nan)
