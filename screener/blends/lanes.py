"""Many blends at once: one species list, one composition a lane."""

from __future__ import annotations

import numpy as np

from screener.blends.blend import Blend, _volumes
from screener.ground.errors import ShapeError
from screener.species import find
from screener.volatility.volume_correction import (
    density_60F,
    light_expansion,
    lightest_density,
    petroleum_expansion,
)


def union(blends, *, extra=()) -> tuple[tuple[str, ...], np.ndarray]:
    """Bring blends onto one list of species.

    Parameters
    ----------
    blends : sequence of Blend
        The k blends.
    extra : sequence of str
        Further species to have on the list, with share zero where no blend holds them.

    Returns
    -------
    tuple
        names (c,) in the order of first appearance, and mole fractions (k, c). [-]

    Source
    ------
    Bookkeeping; nothing is computed.
    """
    blends = tuple(blends)
    names = tuple(
        dict.fromkeys(
            [name for blend in blends for name in blend.names] + [find(name).name for name in extra]
        )
    )
    place = {name: j for j, name in enumerate(names)}
    Z = np.zeros((len(blends), len(names)))
    for i, blend in enumerate(blends):
        Z[i, [place[name] for name in blend.names]] = blend.moles
    return names, Z


def mix(names, z_1, V_1, z_2, V_2) -> np.ndarray:
    """Mole fractions of two liquids brought together, lane by lane.

    Parameters
    ----------
    names : tuple of str
        The c species of both compositions.
    z_1 : array, shape (c,) or (n, c)
        Mole fractions of the first liquid. [-]
    V_1 : float or array, shape (n,)
        Its volume at 15 degC. [m3]
    z_2 : array, shape (c,) or (n, c)
        Mole fractions of the second liquid. [-]
    V_2 : float or array, shape (n,)
        Its volume at 15 degC. [m3]

    Returns
    -------
    array, shape (n, c)
        Mole fractions of the mixture; NaN in a lane with a negative volume, or with no
        volume at all. [-]

    Raises
    ------
    ShapeError
        A composition has not as many columns as there are names.

    Source
    ------
    Ideal mixing of standard volumes, a rule of this program.
    """
    v = _volumes(tuple(names))
    z_1, z_2 = (np.atleast_2d(np.asarray(z, dtype=float)) for z in (z_1, z_2))
    for argument, z in (("z_1", z_1), ("z_2", z_2)):
        if z.shape[1] != v.size:
            raise ShapeError(argument, f"shape {z.shape}", f"(n, {v.size})")
    V_1, V_2 = (np.atleast_1d(np.asarray(V, dtype=float)) for V in (V_1, V_2))
    n_1, n_2 = V_1 / (z_1 @ v), V_2 / (z_2 @ v)
    bad = (V_1 < 0.0) | (V_2 < 0.0) | ~(V_1 + V_2 > 0.0)
    moles = np.where(bad, np.nan, n_1)[:, None] * z_1 + np.where(bad, np.nan, n_2)[:, None] * z_2
    with np.errstate(invalid="ignore"):
        return moles / moles.sum(axis=-1, keepdims=True)


def density(blend: Blend, T) -> np.ndarray:
    """Density of a blend at a temperature, by the volume correction of the trade.

    Parameters
    ----------
    blend : Blend
        The liquid; its commodity group and its alcohols are its own.
    T : float or array, shape (n,)
        Temperature. [K]

    Returns
    -------
    array, shape (n,)
        Density; NaN outside the range of the correction. [kg/m3]

    Source
    ------
    API MPMS 11.1 form, ethanol, methanol, water and light hydrocarbons apart: see
    `screener.volatility.liquid_expansion`.
    """
    return blend.density_15 / blend.expansion(T)


def density_at(rho_15, T, group="") -> np.ndarray:
    """Density at a temperature of liquids known by their density at 15 degC alone.

    Alcohols are not told apart: at 10 % ethanol that costs under 0.01 % a 10 K step, at
    85 % about 0.1 %. A liquid too light for the petroleum correction (below 610.6 kg/m3 at
    60 degF) is taken to expand like n-butane.

    Parameters
    ----------
    rho_15 : float or array, shape (n,)
        Density at 15 degC. [kg/m3]
    T : float or array, shape (n,)
        Temperature. [K]
    group : str or array of str
        Commodity group as `Blend.volume_group` gives it: "crude", or "" for by density.

    Returns
    -------
    array, shape (n,)
        Density; NaN outside the range of the correction. [kg/m3]

    Source
    ------
    API MPMS 11.1 form (from memory, unverified); light liquids after Rackett 1970.
    """
    rho_15, T, group = np.broadcast_arrays(
        np.atleast_1d(np.asarray(rho_15, dtype=float)), np.atleast_1d(np.asarray(T, dtype=float)), group
    )
    expansion = np.full(rho_15.shape, np.nan)
    for name in np.unique(group):
        chosen = group == name
        expansion[chosen] = petroleum_expansion(rho_15[chosen], T[chosen], str(name) or None)
    light = density_60F(rho_15) < lightest_density()
    if light.any():
        butane = find("n-butane")
        expansion[light] = light_expansion([butane.Tc], [butane.omega], T[light])[:, 0]
    return rho_15 / expansion
