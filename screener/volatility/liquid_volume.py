"""Liquid volume of a mixture at any temperature, from standard volumes.

The rule: volumes of stored liquids never come from the equation of state. At
15 degC standard volumes add without shrinkage. Away from 15 degC

- ethanol, methanol and water expand by their own density tables,
- the rest as one petroleum liquid of its density at 15 degC (API MPMS 11.1),
- a rest lighter than that method covers (below 610.6 kg/m3: butanes, propane)
  species by species after Rackett.

The blend of an alcohol and a petroleum liquid expands as the sum of both. That
stands in for API MPMS 11.3.4 (ethanol blends), which was not read.
"""

from __future__ import annotations

import numpy as np

from screener.volatility.volume_correction import (
    density_60F,
    light_expansion,
    lightest_density,
    own_expansion,
    own_volume_species,
    petroleum_expansion,
)


def standard_molar_volume(fluid, x) -> np.ndarray:
    """Molar volume of the liquid at 15 degC, standard volumes added.

    Parameters
    ----------
    fluid : Fluid
        Species of c components; its `v_15` [m3/mol] are the volumes added.
    x : array, shape (c,) or (n, c)
        Liquid mole fractions. [-]

    Returns
    -------
    array, shape (n,)
        Molar volume at 15 degC; NaN where a species present has none. [m3/mol]

    Source
    ------
    Ideal mixing of volumes at 15 degC, a rule of this program: no shrinkage is taken off.
    """
    x = np.atleast_2d(np.asarray(x, dtype=float))
    return np.where(x > 0.0, x * fluid.v_15, 0.0).sum(axis=-1)


def standard_density(fluid, x) -> np.ndarray:
    """Density of the liquid at 15 degC, standard volumes added.

    Parameters
    ----------
    fluid : Fluid
        Species of c components.
    x : array, shape (c,) or (n, c)
        Liquid mole fractions. [-]

    Returns
    -------
    array, shape (n,)
        Density at 15 degC. [kg/m3]

    Source
    ------
    Ideal mixing of volumes at 15 degC, a rule of this program.
    """
    x = np.atleast_2d(np.asarray(x, dtype=float))
    return (x @ fluid.MW) / standard_molar_volume(fluid, x)


def liquid_expansion(fluid, T, x, *, product: str | None = None) -> np.ndarray:
    """Volume of the liquid at T over its volume at 15 degC.

    Parameters
    ----------
    fluid : Fluid
        Species of c components.
    T : float or array, shape (n,)
        Temperature. [K]
    x : array, shape (c,) or (n, c)
        Liquid mole fractions. [-]
    product : str, optional
        "crude" for crude and condensate; otherwise the density chooses the group.

    Returns
    -------
    array, shape (n,)
        V(T)/V(15 degC); NaN outside the range of the method that applies. [-]

    Source
    ------
    API MPMS 11.1 (2004) for the petroleum share, reference equations of state for ethanol,
    methanol and water, Rackett 1970 for light hydrocarbons; see the head of this module.
    """
    x = np.atleast_2d(np.asarray(x, dtype=float))
    T = np.atleast_1d(np.asarray(T, dtype=float))
    n = max(x.shape[0], T.shape[0])
    x, T = np.broadcast_to(x, (n, x.shape[1])), np.broadcast_to(T, (n,))
    volume = np.where(x > 0.0, x * fluid.v_15, 0.0)
    share = volume / volume.sum(axis=-1, keepdims=True)
    expansion = np.zeros(n)
    rest = np.ones(x.shape[1], dtype=bool)
    for i, name in enumerate(fluid.names):
        if name in own_volume_species():
            rest[i] = False
            part = np.where(share[:, i] > 0.0, share[:, i], 0.0)
            expansion += np.where(part > 0.0, part * own_expansion(name, T), 0.0)
    rest_share = share[:, rest].sum(axis=-1)
    if not rest.any():
        return np.where(np.isfinite(share).all(axis=-1), expansion, np.nan)
    petroleum = _rest_expansion(fluid, T, x, volume, rest, product)
    return expansion + np.where(rest_share > 0.0, rest_share * petroleum, 0.0)


def _rest_expansion(fluid, T, x, volume, rest, product) -> np.ndarray:
    """Expansion of everything but the species with a table of their own. [-]"""
    total = volume[:, rest].sum(axis=-1)
    mass = (x * fluid.MW)[:, rest].sum(axis=-1)
    present = total > 0.0
    rho_15 = np.where(present, mass / np.where(present, total, 1.0), np.nan)
    result = petroleum_expansion(rho_15, T, product)
    light = present & (density_60F(rho_15, product) < lightest_density())
    if light.any():
        each = light_expansion(fluid.Tc[rest], fluid.omega[rest], T[light])
        part = volume[light][:, rest]
        known = np.isfinite(each)
        liquid = np.where(known, part, 0.0).sum(axis=-1)
        mean = np.where(known, part * each, 0.0).sum(axis=-1) / np.where(liquid > 0.0, liquid, 1.0)
        result = np.array(result)
        # A little dissolved gas above its critical temperature expands like its solvent.
        result[light] = np.where(liquid >= 0.95 * total[light], mean, np.nan)
    return result


def liquid_molar_volume(fluid, T, x, *, product: str | None = None) -> np.ndarray:
    """Molar volume of the liquid at T and its own vapour pressure.

    Parameters
    ----------
    fluid : Fluid
        Species of c components.
    T : float or array, shape (n,)
        Temperature. [K]
    x : array, shape (c,) or (n, c)
        Liquid mole fractions. [-]
    product : str, optional
        "crude" for crude and condensate; otherwise the density chooses the group.

    Returns
    -------
    array, shape (n,)
        Molar volume. [m3/mol]

    Source
    ------
    As `liquid_expansion`, on the volumes of `standard_molar_volume`.
    """
    return standard_molar_volume(fluid, x) * liquid_expansion(fluid, T, x, product=product)
