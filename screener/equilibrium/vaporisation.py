"""Heat of vaporisation of a pure species, and of a mixture along its boiling range."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.equilibrium.caloric import phase_values
from screener.equilibrium.results import LaneAnswer
from screener.equilibrium.volume_flash import state_at_beta


@dataclass(frozen=True)
class HeatOfVaporisation(LaneAnswer):
    """Heats of a mixture of which the share beta (n,) is vapour.

    T (n,) [K], P (n,) [Pa], the liquid x and the vapour y (n, c) in
    equilibrium. differential (n,) [J/mol of vapour] is the heat taken up, at
    that T and P, by a little of the liquid as it turns into vapour y: sum of
    y_i (H_i of the vapour - H_i of the liquid), partial molar. taken (n,)
    [J/mol of feed] is the enthalpy gained since the bubble point at the same
    given T or P; at given P that is the heat supplied, warming included. A
    pure species has one heat: differential, and taken = beta times it.
    """

    T: np.ndarray
    P: np.ndarray
    beta: np.ndarray
    x: np.ndarray
    y: np.ndarray
    differential: np.ndarray
    taken: np.ndarray
    status: np.ndarray
    residual: np.ndarray


def heat_of_vaporisation(fluid, x, *, T=None, P=None, beta=0.0) -> HeatOfVaporisation:
    """Heat of vaporisation at given temperature or pressure, at the bubble point or along the boiling range.

    Parameters
    ----------
    fluid : Fluid
        Species constants and model parameters of c components, with ideal-gas
        heat capacities.
    x : array, shape (c,) or (n, c)
        Mole fractions of the liquid before it boils; each row sums to 1. [-]
    T : float or array, shape (n,), optional
        Temperature. [K]
    P : float or array, shape (n,), optional
        Pressure. [Pa]
    beta : float or array, shape (n,)
        Share that has boiled off and stayed with the liquid: 0 is the first
        bubble, 1 the last drop. [-]

    Returns
    -------
    HeatOfVaporisation
        differential and taken, with the phases they belong to.

    Raises
    ------
    ShapeError
        x does not match the fluid, or rows do not broadcast with the rest.
    InputError
        Not exactly one of T and P given, or the model is gamma-phi.

    Source
    ------
    Partial molar enthalpies of the equation of state, as `caloric`.
    """
    state = state_at_beta(fluid, beta, x, T=T, P=P)
    none = np.full(state.T.shape, np.nan)
    differential, taken = none.copy(), none.copy()
    some = np.flatnonzero(state.ok)
    if some.size:
        at = state.T[some], state.P[some]
        liquid = phase_values(fluid, *at, state.x[some], "L")
        vapour = phase_values(fluid, *at, state.y[some], "V")
        differential[some] = (state.y[some] * (vapour.H_i - liquid.H_i)).sum(axis=1)
        given = {"T": state.T[some]} if P is None else {"P": state.P[some]}
        start = state_at_beta(fluid, 0.0, state.z[some], **given)
        taken[some] = state.H[some] - start.H
    return HeatOfVaporisation(
        T=state.T,
        P=state.P,
        beta=state.beta,
        x=state.x,
        y=state.y,
        differential=differential,
        taken=taken,
        status=state.status,
        residual=state.residual,
    )
