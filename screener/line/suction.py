"""Pressure along a suction line from the liquid surface to the pump inlet.

The line is a pipe of one bore. Its pressure is followed at three places: just
inside the nozzle, at the highest point, at the pump inlet. Where the highest
point lies along the line is not known, so all friction counts before it.
"""

from __future__ import annotations

from dataclasses import dataclass
from enum import IntEnum

import numpy as np

from screener.ground.constants import GRAVITY
from screener.line.friction import DEFAULT_ROUGHNESS, ENTRANCE_LOSS, friction_factor

PLACES = ("nozzle", "highest point", "pump inlet")


class Reason(IntEnum):
    """Why a lane holds a profile, or none."""

    PROFILE = 0
    NOZZLE_UNCOVERED = 1  # the level stands below the nozzle
    BAD_INPUT = 2  # an input is missing or impossible


REASON_WORDS = {
    Reason.PROFILE: "worked out",
    Reason.NOZZLE_UNCOVERED: "the liquid level stands below the suction nozzle",
    Reason.BAD_INPUT: "an input of the suction line is missing or impossible",
}


@dataclass(frozen=True)
class SuctionProfile:
    """Suction line of every lane, arrays (n,) unless said.

    velocity [m/s]; reynolds, friction_factor [-]; static_head, friction_head (pipe, fittings and
    entrance), velocity_head [m]; pressure (n, 3) at the `PLACES`, absolute, NaN where there is no
    high point [Pa]; lowest_pressure [Pa]; lowest_place index into `PLACES`, -1 without a profile;
    reason `Reason`.
    """

    velocity: np.ndarray
    reynolds: np.ndarray
    friction_factor: np.ndarray
    static_head: np.ndarray
    friction_head: np.ndarray
    velocity_head: np.ndarray
    pressure: np.ndarray
    lowest_pressure: np.ndarray
    lowest_place: np.ndarray
    reason: np.ndarray

    @property
    def ok(self) -> np.ndarray:
        """Lanes that hold a profile."""
        return self.reason == Reason.PROFILE


def suction_profile(
    surface_pressure,
    liquid_level,
    rate,
    density,
    kinematic_viscosity,
    line_length,
    line_bore,
    pump_height,
    *,
    nozzle_height=0.0,
    highest_point=np.nan,
    fittings=0.0,
    roughness=DEFAULT_ROUGHNESS,
    entrance_loss=ENTRANCE_LOSS,
):
    """Pressure at the nozzle, at the highest point and at the pump inlet.

    Parameters
    ----------
    surface_pressure : float or array, shape (n,)
        Absolute, on the liquid in the tank. [Pa]
    liquid_level, nozzle_height, highest_point, pump_height : float or array, shape (n,)
        Above the tank bottom; the pump may stand lower (negative). NaN for the highest point means
        that the line does not rise above its ends. [m]
    rate : float or array, shape (n,)
        Flow of liquid, zero or more. [m3/s]
    density : float or array, shape (n,)
        Of the liquid at its temperature. [kg/m3]
    kinematic_viscosity : float or array, shape (n,)
        Of the liquid at its temperature. [m2/s]
    line_length, line_bore, roughness : float or array, shape (n,)
        Of the pipe. [m]
    fittings : float or array, shape (n,)
        Sum of loss coefficients of the fittings, entrance not counted. [-]
    entrance_loss : float or array, shape (n,)
        Loss coefficient of the nozzle. [-]

    Returns
    -------
    SuctionProfile

    Validity
    --------
    Steady flow of a liquid that has not begun to boil. Acceleration at start-up and the acceleration
    head of piston pumps are not in it.

    Source
    ------
    Bernoulli's equation with Darcy friction (Churchill 1977). Entrance 0.57: Rennels and Hudson 2012,
    through the library fluids.
    """
    given = (
        surface_pressure,
        liquid_level,
        rate,
        density,
        kinematic_viscosity,
        line_length,
        line_bore,
        pump_height,
        nozzle_height,
        fittings,
        roughness,
        entrance_loss,
        highest_point,
    )
    given = np.broadcast_arrays(*(np.atleast_1d(np.asarray(value, dtype=float)) for value in given))
    P, level, rate, rho, nu, length, bore, pump, nozzle, K, rough, entrance, high = given
    good = np.isfinite(np.stack(given[:-1])).all(axis=0)
    good &= np.stack([P, rho, nu, bore]).min(axis=0) > 0.0
    good &= np.stack([rate, length, K, rough, entrance, level]).min(axis=0) >= 0.0
    bore, rate, nu = (np.where(good, value, 1.0) for value in (bore, rate, nu))
    velocity = rate / (np.pi / 4.0 * bore**2)
    reynolds = velocity * bore / nu
    factor = friction_factor(reynolds, rough / bore)
    head = velocity**2 / (2.0 * GRAVITY)
    pipe = np.where(np.isnan(factor) & (reynolds <= 1e-3), 0.0, factor * length / bore)
    friction = (pipe + K + entrance) * head
    heads = np.stack(
        [
            level - nozzle - (1.0 + entrance) * head,
            level - high - head - friction,
            level - pump - head - friction,
        ],
        axis=-1,
    )
    # A pipe rougher than a twentieth of its bore has no friction factor, so no profile either.
    reason = np.where(level >= nozzle, Reason.PROFILE, Reason.NOZZLE_UNCOVERED)
    reason = np.where(good & np.isfinite(friction), reason, Reason.BAD_INPUT)
    pressure = P[:, None] + (rho * GRAVITY)[:, None] * heads
    return _profile(reason, velocity, reynolds, factor, level - pump, friction, head, pressure)


def _profile(reason, *columns) -> SuctionProfile:
    """NaN in the lanes without a profile; the lowest of the places that exist."""
    profile = reason == Reason.PROFILE
    *numbers, pressure = columns
    pressure = np.where(profile[:, None], pressure, np.nan)
    found = np.where(np.isnan(pressure), np.inf, pressure)
    lowest = np.where(profile, found.min(axis=-1), np.nan)
    place = np.where(profile, found.argmin(axis=-1), -1)
    return SuctionProfile(
        *(np.where(profile, value, np.nan) for value in numbers), pressure, lowest, place, reason
    )
