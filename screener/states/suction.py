"""The suction line, lane by lane: lowest pressure, room above the bubble point, NPSH available."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.line import DEFAULT_ROUGHNESS, kinematic_viscosity_band, npsh_available, suction_profile
from screener.states.lanes import BEST, Lanes
from screener.states.scaled import bubble_temperature
from screener.states.volumes import density_15, expansion

# Taken where the case does not say; each is listed among the assumptions of the result.
DEFAULT_FITTINGS = 10.0  # valves, strainer and bends of a short suction [-]; common practice, no source
DEFAULT_NOZZLE = 0.0  # nozzle at the tank bottom [m]; common practice, no source


@dataclass(frozen=True)
class SuctionLanes:
    """Suction at the lowest barometer less the vacuum setting, arrays (n, 5) unless said.

    density [kg/m3]; surface pressure (n,) [Pa]; lowest pressure in the line [Pa]
    and its place; room (n, 5, 3) that pressure less the bubble pressure of the hottest liquid
    [Pa]; room_K how much warmer the liquid may get before it boils there [K];
    npsh (n, 5, 3) available [m]; head (n, 5) of the surface pressure and the highest level at
    rest [m]; reason of the profile.
    """

    density: np.ndarray
    surface: np.ndarray
    lowest: np.ndarray
    place: np.ndarray
    room: np.ndarray
    room_K: np.ndarray
    npsh: np.ndarray
    head: np.ndarray
    friction: np.ndarray
    velocity: np.ndarray
    viscosity: np.ndarray
    reason: np.ndarray


def surface_pressure(lanes: Lanes, set_under) -> np.ndarray:
    """Lowest barometer less the vacuum setting (n,); under a floating roof without listed vents, the barometer. [Pa]"""
    floating = np.array(["floating" in case.tank.kind and not case.tank.vents for case in lanes.inputs.cases])
    return lanes.weather.barometer - np.where(floating, 0.0, set_under)


def suction_lanes(lanes: Lanes, set_under) -> SuctionLanes:
    """Suction line of every lane; set_under (n,) is the highest vacuum setting of the vents [Pa]."""
    i, shape = lanes.inputs, lanes.level.shape
    T = lanes.T_hot[:, :, BEST]
    z = lanes.z.reshape(-1, lanes.fluid.c)
    rho_15 = density_15(lanes.fluid, z) * lanes.measured.density.ravel()
    rho = (rho_15 / expansion(lanes.fluid, T.ravel(), z)).reshape(shape)
    band = [nu.reshape(shape) for nu in kinematic_viscosity_band(rho_15)]
    surface = surface_pressure(lanes, set_under)

    def given(name, default):
        return np.where(np.isnan(i[name]), default, i[name])[:, None]

    def profile(nu):
        return suction_profile(
            *(a.ravel() for a in np.broadcast_arrays(
                surface[:, None], lanes.level, i["draw_rate"][:, None], rho, nu,
                i["line_length"][:, None], i["line_bore"][:, None], i["pump_height"][:, None])),
            nozzle_height=np.broadcast_to(given("nozzle_height", DEFAULT_NOZZLE), shape).ravel(),
            highest_point=np.broadcast_to(i["high_point"][:, None], shape).ravel(),
            fittings=np.broadcast_to(given("fittings", DEFAULT_FITTINGS), shape).ravel(),
            roughness=np.broadcast_to(given("roughness", DEFAULT_ROUGHNESS), shape).ravel(),
        )  # fmt: skip

    profiles = [profile(nu) for nu in (band[2], band[1], band[0])]  # thick to thin: low, best, high pressure
    lowest = np.stack([p.lowest_pressure.reshape(shape) for p in profiles], axis=-1)
    # The worst end pairs the thickest liquid with the highest bubble pressure.
    P_bubble = lanes.P_hot[:, :, ::-1]
    npsh = np.stack([
        npsh_available(surface[:, None], P_bubble[:, :, k], rho, p.static_head.reshape(shape),
                       p.friction_head.reshape(shape))
        for k, p in enumerate(profiles)
    ], axis=-1)  # fmt: skip
    best = profiles[BEST]
    high = i["level_high"][:, None] - i["pump_height"][:, None]
    head = npsh_available(surface[:, None], 0.0, rho, high, 0.0)
    return SuctionLanes(
        density=rho,
        surface=surface,
        lowest=lowest[:, :, BEST],
        place=best.lowest_place.reshape(shape),
        room=lowest - P_bubble,
        room_K=_room_in_kelvin(lanes, lowest[:, :, BEST], T),
        npsh=npsh,
        head=head,
        friction=best.friction_head.reshape(shape),
        velocity=best.velocity.reshape(shape),
        viscosity=band[1],
        reason=best.reason.reshape(shape),
    )


def _room_in_kelvin(lanes: Lanes, lowest, T) -> np.ndarray:
    """Bubble temperature (n, 5) at the lowest line pressure less the temperature of the liquid. [K]"""
    room = np.full(lowest.shape, np.nan)
    go = np.isfinite(lowest) & (lowest > 0.0) & np.isfinite(T) & lanes.present
    go &= np.isfinite(lanes.z).all(axis=-1)
    if go.any():
        answer = bubble_temperature(lanes.fluid, lowest[go], lanes.z[go], lanes.measured.factor[go])
        room[go] = np.where(answer.ok, answer.T - T[go], np.nan)
    return room
