"""Flash at given pressure and enthalpy or entropy: T is solved for."""

from __future__ import annotations

import numpy as np

from screener.equilibrium.caloric import cubic_only
from screener.equilibrium.inverse import solve_many
from screener.equilibrium.solved import SolvedFlash
from screener.equilibrium.sought import Target


def flash_ph(fluid, P, H, z, *, check="vapour-liquid") -> SolvedFlash:
    """Temperature, vapour fraction and phases at given pressure and enthalpy.

    Parameters
    ----------
    fluid : Fluid
        Species constants and model parameters of c components, with ideal-gas
        heat capacities.
    P : float or array, shape (n,)
        Pressure. [Pa]
    H : float or array, shape (n,)
        Enthalpy of the feed; each species as ideal gas at 298.15 K and
        101,325 Pa has none. [J/mol]
    z : array, shape (c,) or (n, c)
        Feed mole fractions; each row sums to 1. [-]
    check : str
        "vapour-liquid" or "full", as in `flash_tp`.

    Returns
    -------
    SolvedFlash
        T (n,) [K] and all of `flash_tp`; H, S, v of the answer, and miss (n,)
        [-] the enthalpy missed over RT, at most 1e-8 where the status is
        converged. For a pure component T is the boiling point and beta follows
        from H. OUT_OF_RANGE where H lies beyond 200 to 500 K, NO_PARAMETERS for
        a fluid without heat capacities.

    Raises
    ------
    ShapeError
        z does not match the fluid, or rows do not broadcast with P and H.
    InputError
        check is no known word, or the model is gamma-phi.

    Source
    ------
    As `screener.equilibrium.inverse`.
    """
    cubic_only(fluid)
    return solve_many(fluid, Target("H", "P", np.asarray(H, dtype=float)), P, z, check)


def flash_ps(fluid, P, S, z, *, check="vapour-liquid") -> SolvedFlash:
    """Temperature, vapour fraction and phases at given pressure and entropy.

    Parameters
    ----------
    fluid : Fluid
        Species constants and model parameters of c components, with ideal-gas
        heat capacities.
    P : float or array, shape (n,)
        Pressure. [Pa]
    S : float or array, shape (n,)
        Entropy of the feed; each species as ideal gas at 298.15 K and
        101,325 Pa has none, mixing counts. [J/mol/K]
    z : array, shape (c,) or (n, c)
        Feed mole fractions; each row sums to 1. [-]
    check : str
        "vapour-liquid" or "full", as in `flash_tp`.

    Returns
    -------
    SolvedFlash
        As `flash_ph`; miss (n,) [-] is the entropy missed over R.

    Raises
    ------
    ShapeError
        z does not match the fluid, or rows do not broadcast with P and S.
    InputError
        check is no known word, or the model is gamma-phi.

    Source
    ------
    As `screener.equilibrium.inverse`.
    """
    cubic_only(fluid)
    return solve_many(fluid, Target("S", "P", np.asarray(S, dtype=float)), P, z, check)
