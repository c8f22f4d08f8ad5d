"""Air dissolved in a fuel: Ostwald coefficient and the pressure it makes in a test cell."""

from __future__ import annotations

import numpy as np

# Ostwald coefficient of air at 0 degC in the reference oil of density 850 kg/m3 [-].
# ASTM D2779 / NACA TN 3276, from memory, unverified; with it the totals of pure
# reference fluids of ASTM D5191 come back within 0.5 kPa (tests/regression).
AIR_AT_0C = 0.098


def ostwald_air(rho_15, T) -> np.ndarray:
    """Ostwald coefficient of air in a petroleum liquid: gas volume per liquid volume, both at T.

    Parameters
    ----------
    rho_15 : float or array, shape (n,)
        Density of the liquid at 15 degC. [kg/m3]
    T : float or array, shape (n,)
        Temperature. [K]

    Returns
    -------
    array, shape (n,)
        Ostwald coefficient. [-]

    Validity
    --------
    630 to 900 kg/m3, -45 to 150 degC (scope of ASTM D2779); used below 630 kg/m3 as an
    extrapolation. Alcohols lie outside the method: for a blend the density decides alone.

    Source
    ------
    ASTM D2779, formula from memory, unverified.
    """
    rho_15, T = np.atleast_1d(np.asarray(rho_15, float)), np.atleast_1d(np.asarray(T, float))
    reference = 0.300 * np.exp(0.639 * (700.0 - T) / T * np.log(3.333 * AIR_AT_0C))
    return np.maximum(7.70 * reference * (0.980 - rho_15 / 1000.0), 0.0)


def cell_air_pressure(rho_15, P_air_0, T_0, T, vapour_volume, liquid_volume) -> np.ndarray:
    """Partial pressure of the air that a charge brought along, once in the test cell.

    The charge is one volume at T_0, saturated with air of partial pressure P_air_0; the
    air then divides between vapour space and liquid at T after Ostwald's law.

    Parameters
    ----------
    rho_15 : array, shape (n,)
        Density of the liquid at 15 degC. [kg/m3]
    P_air_0 : array, shape (n,)
        Partial pressure of air over the sample at T_0. [Pa]
    T_0 : array, shape (n,)
        Temperature of saturation with air. [K]
    T : array, shape (n,)
        Temperature of the cell. [K]
    vapour_volume : array, shape (n,)
        Vapour space per volume of charge. [-]
    liquid_volume : array, shape (n,)
        Liquid at T per volume of charge. [-]

    Returns
    -------
    array, shape (n,)
        Partial pressure of air in the cell. [Pa]

    Source
    ------
    Balance of the air between two phases; solubility as `ostwald_air`.
    """
    dissolved = ostwald_air(rho_15, T_0) * P_air_0 / T_0
    return dissolved * T / (vapour_volume + ostwald_air(rho_15, T) * liquid_volume)
