"""Enthalpy, entropy, Gibbs energy and heat capacity of one phase: ideal gas plus departure.

Each species as ideal gas at 298.15 K and 101,325 Pa has H = S = 0; the
entropy of mixing is included. Heat capacities of the ideal gas are known from
200 to 500 K; a fluid without them has departures only.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.equilibrium import ideal_gas
from screener.equilibrium.departure import departures
from screener.equilibrium.results import LaneAnswer, bad_status
from screener.ground.constants import R
from screener.ground.errors import InputError
from screener.ground.shapes import lanes as as_lanes
from screener.ground.status import Status

MOST_NUMBERS = 40_000  # lanes times components handled at once: keeps the working arrays in cache


@dataclass(frozen=True)
class Caloric(LaneAnswer):
    """Properties of one phase of given T (n,) [K], P (n,) [Pa], x (n, c) [-].

    v [m3/mol], H U G [J/mol], S Cp [J/(mol K)], expansion (dv/dT)/v [1/K] and
    compression -(dv/dP)/v [1/Pa] at constant P and T, each (n,); H_i (n, c)
    partial molar enthalpies [J/mol]. residual (n,) [-] is the miss of the
    pressure of the equation at v over its repulsive part.

    expansion and compression are the equation's own: for stored liquids the
    one is up to 23 % off at 250 and 350 K, the other 6 to 60 %
    (tests/studies/liquid_expansion.md).

    As an answer of `departure` all but v, expansion and compression are the
    differences from the ideal gas at the same T, P and x.
    """

    T: np.ndarray
    P: np.ndarray
    x: np.ndarray
    phase: str
    v: np.ndarray
    H: np.ndarray
    U: np.ndarray
    S: np.ndarray
    G: np.ndarray
    Cp: np.ndarray
    H_i: np.ndarray
    expansion: np.ndarray
    compression: np.ndarray
    status: np.ndarray
    residual: np.ndarray


def caloric(fluid, T, P, x, phase) -> Caloric:
    """Enthalpy, internal energy, entropy, Gibbs energy, heat capacity and volume of one phase.

    Parameters
    ----------
    fluid : Fluid
        Species constants and model parameters of c components.
    T : float or array, shape (n,)
        Temperature. [K]
    P : float or array, shape (n,)
        Pressure. [Pa]
    x : array, shape (c,) or (n, c)
        Mole fractions of the phase; each row sums to 1. [-]
    phase : str
        "L" takes the smallest root of the equation, "V" the largest.

    Returns
    -------
    Caloric
        H, U, S, G, Cp, v, H_i, expansion, compression by lane. Outside 200 to
        500 K the status is OUT_OF_RANGE, for a fluid without ideal-gas heat
        capacities NO_PARAMETERS: v, expansion and compression are then given
        and the rest is NaN.

    Raises
    ------
    ShapeError
        x does not match the fluid, or rows do not broadcast with T and P.
    InputError
        phase is no known word, or the model is gamma-phi.

    Source
    ------
    Departures of the equation of state in use (`screener.equilibrium.departure`);
    ideal-gas heat capacities of data/species/cp_ideal.csv.
    """
    return _evaluate(fluid, T, P, x, phase, True)


def departure(fluid, T, P, x, phase) -> Caloric:
    """Departures of one phase from the ideal gas at the same temperature, pressure and composition.

    Parameters
    ----------
    fluid : Fluid
        Species constants and model parameters of c components; needs no
        ideal-gas heat capacities.
    T : float or array, shape (n,)
        Temperature. [K]
    P : float or array, shape (n,)
        Pressure. [Pa]
    x : array, shape (c,) or (n, c)
        Mole fractions of the phase; each row sums to 1. [-]
    phase : str
        "L" takes the smallest root of the equation, "V" the largest.

    Returns
    -------
    Caloric
        Differences H, U, S, G, Cp, H_i; v, expansion and compression in full.

    Raises
    ------
    ShapeError
        x does not match the fluid, or rows do not broadcast with T and P.
    InputError
        phase is no known word, or the model is gamma-phi.

    Source
    ------
    `screener.equilibrium.departure`.
    """
    return _evaluate(fluid, T, P, x, phase, False)


def cubic_only(fluid):
    """Refuse the gamma-phi model: its two phases do not share one energy."""
    if fluid.model == "gamma-phi":
        raise InputError(
            "model", fluid.model, "the gamma-phi model has no caloric properties", "PR-GE, PR or SRK"
        )


def _evaluate(fluid, T, P, x, phase, in_full: bool) -> Caloric:
    cubic_only(fluid)
    if phase not in ("L", "V"):
        raise InputError("phase", phase, f"'{phase}' is not a phase", "L or V")
    x, T, P, good = as_lanes(fluid.c, x, T=T, P=P)
    n, c = x.shape
    status = bad_status(good)
    status[good & fluid.lacks(x)] = Status.NO_PARAMETERS
    names = ("v", "H", "S", "Cp", "expansion", "compression", "residual")
    out = {name: np.full(n, np.nan) for name in names} | {"H_i": np.full((n, c), np.nan)}
    work = np.flatnonzero(status == Status.OUT_OF_STEPS)
    for some in np.array_split(work, max(1, -(-work.size * c // MOST_NUMBERS))):
        if some.size:
            values = phase_values(fluid, T[some], P[some], x[some], phase, in_full)
            for name in out:
                out[name][some] = getattr(values, name)
    answered = np.isfinite(out["v"]) & (status == Status.OUT_OF_STEPS)
    status[answered] = Status.CONVERGED
    if in_full:
        status[answered & ~ideal_gas.in_range(T)] = Status.OUT_OF_RANGE
        if fluid.cp_ideal is None:
            status[answered] = Status.NO_PARAMETERS
    v, H, S = out["v"], out["H"], out["S"]
    U = H - P * v if in_full else H - (P * v - R * T)
    return Caloric(T=T, P=P, x=x, phase=phase, U=U, G=H - T * S, status=status, **out)


def phase_values(fluid, T, P, x, phase: str, in_full: bool = True):
    """One phase of valid lanes, without checks.

    Parameters
    ----------
    fluid : Fluid
        A fluid of a cubic equation of state.
    T : array, shape (n,)
        Temperature. [K]
    P : array, shape (n,)
        Pressure. [Pa]
    x : array, shape (n, c)
        Mole fractions; a row of NaN answers NaN. [-]
    phase : str
        "L" or "V".
    in_full : bool
        False leaves the ideal gas out.

    Returns
    -------
    Values
        H, S, Cp, H_i with the ideal gas where it is known, else NaN.

    Source
    ------
    As `caloric`.
    """
    values = departures(fluid.at(T), P, x, phase)
    if not in_full:
        return values
    known = np.where(ideal_gas.in_range(T), 0.0, np.nan)
    if fluid.cp_ideal is None:
        nothing = np.full(T.size, np.nan)
        return values._replace(H=nothing, S=nothing, Cp=nothing, H_i=np.full(x.shape, np.nan))
    a = fluid.cp_ideal
    with np.errstate(invalid="ignore", divide="ignore"):
        H_i = ideal_gas.enthalpy(a, T)
        S = (x * ideal_gas.entropy(a, T)).sum(axis=1) + ideal_gas.entropy_of_mixing(P, x)
    return values._replace(
        H=values.H + (x * H_i).sum(axis=1) + known,
        S=values.S + np.where(np.isnan(x).any(axis=1), np.nan, S) + known,
        Cp=values.Cp + (x * ideal_gas.heat_capacity(a, T)).sum(axis=1) + known,
        H_i=values.H_i + H_i + known[:, None],
    )
