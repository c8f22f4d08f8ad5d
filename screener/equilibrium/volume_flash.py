"""Flashes in which a volume or a vapour fraction is given in place of a pressure or temperature."""

from __future__ import annotations

import numpy as np

from screener.equilibrium.caloric import cubic_only
from screener.equilibrium.inverse import solve_many
from screener.equilibrium.solved import SolvedFlash
from screener.equilibrium.sought import Target
from screener.ground.errors import InputError


def flash_tv(
    fluid, T, z, *, ratio=None, density=None, mass_density=None, check="vapour-liquid"
) -> SolvedFlash:
    """Pressure, vapour fraction and phases in a closed space, told by one of three measures of its volume.

    Parameters
    ----------
    fluid : Fluid
        Species constants and model parameters of c components.
    T : float or array, shape (n,)
        Temperature. [K]
    z : array, shape (c,) or (n, c)
        Mole fractions of all that is in the space; each row sums to 1. [-]
    ratio : float or array, shape (n,), optional
        Volume of the vapour over that of the liquid at T, both of the
        equation of state; 0 is the bubble point. [-]
    density : float or array, shape (n,), optional
        Total amount over total volume. [mol/m3]
    mass_density : float or array, shape (n,), optional
        Total mass over total volume. [kg/m3]
    check : str
        "vapour-liquid" or "full", as in `flash_tp`.

    Returns
    -------
    SolvedFlash
        P (n,) [Pa] and all of `flash_tp`; v, v_L, v_V [m3/mol], and miss (n,)
        [-] by how much of itself the volume or ratio was missed. A density
        above that of the saturated liquid, or below that of the saturated
        vapour, gives one phase at the pressure of the equation of state. Of a
        liquid that is no number to rely on: with temperature it rises 5 to 29 %
        too slowly for hydrocarbons, 86 % too fast for ethanol (see
        tests/studies/liquid_expansion.md).

    Raises
    ------
    ShapeError
        z does not match the fluid, or rows do not broadcast with T.
    InputError
        None or several of ratio, density and mass_density given, check is no
        known word, or the model is gamma-phi.

    Source
    ------
    As `screener.equilibrium.inverse`.
    """
    cubic_only(fluid)
    named = {"ratio": ratio, "density": density, "mass_density": mass_density}
    told = [name for name, value in named.items() if value is not None]
    if len(told) != 1:
        words = f"{len(told)} measures of the volume given"
        raise InputError("flash_tv", told, words, "one of ratio, density, mass_density")
    value = np.asarray(named[told[0]], dtype=float)
    if told[0] == "ratio":
        return solve_many(fluid, Target("ratio", "T", value), T, z, check)
    with np.errstate(all="ignore"):
        mass = 1.0 if told[0] == "density" else _molar_mass(fluid, z)
        v = np.where(value > 0.0, mass / value, np.nan)
    return solve_many(fluid, Target("v", "T", v), T, z, check)


def _molar_mass(fluid, z):
    z = np.asarray(z, dtype=float)
    return (
        z @ fluid.MW if z.shape[-1:] == (fluid.c,) else np.nan
    )  # a wrong shape is refused later, with its name


def state_at_beta(fluid, beta, z, *, T=None, P=None, check="vapour-liquid") -> SolvedFlash:
    """The state of given vapour fraction at given temperature or pressure.

    Parameters
    ----------
    fluid : Fluid
        Species constants and model parameters of c components.
    beta : float or array, shape (n,)
        Vapour fraction by moles, 0 to 1: 0 is the bubble point, 1 the dew point. [-]
    z : array, shape (c,) or (n, c)
        Feed mole fractions; each row sums to 1. [-]
    T : float or array, shape (n,), optional
        Temperature. [K]
    P : float or array, shape (n,), optional
        Pressure. [Pa]
    check : str
        "vapour-liquid" or "full", as in `flash_tp`.

    Returns
    -------
    SolvedFlash
        The missing one of T and P, and all of `flash_tp`; at beta 0 and 1 both
        phases are given, the one without share as it begins to form. H and S
        are NaN outside 200 to 500 K.

    Raises
    ------
    ShapeError
        z does not match the fluid, or rows do not broadcast with the rest.
    InputError
        Not exactly one of T and P given, check is no known word, or the model
        is gamma-phi.

    Source
    ------
    As `screener.equilibrium.inverse`.
    """
    cubic_only(fluid)
    if (T is None) == (P is None):
        raise InputError("state_at_beta", None, "one of T and P is needed", "T=... or P=...")
    beta = np.asarray(beta, dtype=float)
    with np.errstate(invalid="ignore"):
        beta = np.where((beta >= 0.0) & (beta <= 1.0), beta, np.nan)
    return solve_many(fluid, Target("beta", "P" if T is None else "T", beta), P if T is None else T, z, check)
