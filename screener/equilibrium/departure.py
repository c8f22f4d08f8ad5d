"""What one phase of a cubic equation of state adds to the ideal gas at the same T and P.

With the residual Helmholtz energy F(T, v) = A/RT = -ln(1 - b/v) - alpha(T) I(v),
I = ln((v + d2 b) / (v + d1 b)) / (d2 - d1), all departures follow from alpha and its
first two derivatives in T at constant composition:

    H/RT = T alpha' I + Z - 1            S/R = (alpha + T alpha') I + ln(Z - B)
    Cp/R = 2 T alpha' I + T^2 alpha'' I - T (dP/dT)^2 / (R dP/dv) - 1.

A translation c(T), v = v_eos - c, adds -P c to G and thereby P dc/dT to S and
-P (c - T dc/dT) to H; one that is linear in T leaves Cp as it is.

Source: Michelsen and Mollerup, Thermodynamic Models (departures from the
Helmholtz energy; from memory, unverified, and held by tests/identities);
Peneloux, Rauzy and Freze, Fluid Phase Equilib. 8 (1982) 7 (translation).
"""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from screener.ground.constants import R


class Values(NamedTuple):
    """Departures of one phase, and its volume.

    H [J/mol], S and Cp [J/(mol K)] (n,), partial molar H_i (n, c) [J/mol]: differences from
    the ideal gas. In full: v [m3/mol], expansion (dv/dT)/v [1/K], compression -(dv/dP)/v
    [1/Pa], each (n,). residual (n,) [-] is the miss of P over its repulsive part.
    """

    v: np.ndarray
    H: np.ndarray
    S: np.ndarray
    Cp: np.ndarray
    H_i: np.ndarray
    expansion: np.ndarray
    compression: np.ndarray
    residual: np.ndarray


def departures(state, P, x, phase: str) -> Values:
    """Departures of one phase (n lanes) from the ideal gas.

    Parameters
    ----------
    state : AtTemperature
        The fluid at the temperatures of the lanes, of a cubic equation.
    P : array, shape (n,)
        Pressure. [Pa]
    x : array, shape (n, c)
        Composition of the phase. [-]
    phase : str
        "L" or "V".

    Returns
    -------
    Values
        NaN where a lane holds no number.

    Source
    ------
    As in the module.
    """
    with np.errstate(all="ignore"):
        mixture = state.mix(x)
        slopes = state.slopes(x, mixture)
        T, b, alpha = state.T, mixture.b, mixture.alpha
        (d1, d2), RT = mixture.d, mixture.RT
        Z = mixture.Z(P, phase)
        v = Z * RT / P
        gap, product = v - b, (v + d1 * b) * (v + d2 * b)
        I = np.log((v + d2 * b) / (v + d1 * b)) / (d2 - d1)
        warm = T * slopes.alpha_1
        H = RT * (Z - 1.0 + warm * I)
        S = R * ((alpha + warm) * I + np.log(gap * P / RT))
        P_T = R / gap - R * b * (alpha + warm) / product
        P_v = RT * (alpha * b * (2.0 * v + (d1 + d2) * b) / product**2 - 1.0 / gap**2)
        Cp = R * ((2.0 * warm + T**2 * slopes.alpha_2) * I - 1.0) - T * P_T**2 / P_v
        v_T = -P_T / P_v
        ln_phi_T = (Z * (v_T / v - 1.0 / T) / b)[:, None] * mixture.b_i - (v_T / gap - 1.0 / T)[:, None]
        ln_phi_T -= slopes.abar_1 * I[:, None] - mixture.abar * (b / product * v_T)[:, None]
        c, c_1 = mixture.shift, slopes.shift_1
        lift_i = state.shift_i - state.T[:, None] * state.fluid.shift_1
        residual = np.abs(RT / gap - RT * alpha * b / product - P) * gap / RT
        return Values(
            v - c,
            H - P * (c - T * c_1),
            S + P * c_1,
            Cp,
            -(RT * T)[:, None] * ln_phi_T - P[:, None] * lift_i,
            (v_T - c_1) / (v - c),
            -1.0 / (P_v * (v - c)),
            residual,
        )
