"""Breathing of the tank, lane by lane: what has to leave and what has to come in, as air."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.ground.constants import T_15C
from screener.species import find
from screener.states.lanes import BEST, RECEIPT, Lanes
from screener.states.vents import VentSums, vent_sums
from screener.states.volumes import molar_volume
from screener.tank import (
    flashed_vapour_as_air,
    growth_factor,
    horizontal_volume,
    inbreathing_liquid,
    inbreathing_thermal,
    outbreathing_liquid,
    outbreathing_thermal,
    tables_apply,
    vertical_volume,
)


@dataclass(frozen=True)
class Breathing:
    """Flows as air at 0 degC and 101,325 Pa [m3/s].

    out (n, 5, 3) required with its range, made of out_liquid (n, 5), out_thermal
    (n,) and out_flash (n, 3); into (n, 5) made of into_liquid (n,) and into_thermal
    (n, 5); growth (n, 5) [-], NaN where the liquid may boil; applies (n,) whether
    the venting method holds at the temperature of the vapour space; volume (n,)
    of the tank [m3]; vents the installed sums.
    """

    out: np.ndarray
    out_liquid: np.ndarray
    out_thermal: np.ndarray
    out_flash: np.ndarray
    into: np.ndarray
    into_liquid: np.ndarray
    into_thermal: np.ndarray
    growth: np.ndarray
    applies: np.ndarray
    volume: np.ndarray
    vents: VentSums


def tank_volume(inputs) -> np.ndarray:
    """Whole volume (n,) of the shell. [m3]"""
    upright = vertical_volume(inputs["shell_diameter"], inputs["shell_height"])
    lying = horizontal_volume(inputs["shell_diameter"], inputs["tank_length"])
    return np.where(np.isfinite(inputs["tank_length"]), lying, upright)


def breathing(lanes: Lanes) -> Breathing:
    """Required breathing of every lane.

    A tank that receives nothing pushes nothing out by filling, and one that is
    not drawn takes nothing in by emptying. Insulation is not credited: the
    case says whether a tank is insulated, not how well.
    """
    inputs, weather = lanes.inputs, lanes.weather
    cases = inputs.cases
    filling = np.array([case.line.receipt is not None for case in cases])
    fill = np.where(filling, inputs["receipt_rate"], 0.0)
    drawing = np.array([case.line.draw_rate is not None or case.line.suction is not None for case in cases])
    draw = np.where(drawing, inputs["draw_rate"], 0.0)
    volume = tank_volume(inputs)
    P, T = lanes.P_hot, lanes.T_hot[:, :, BEST]
    liquid = outbreathing_liquid(fill[:, None, None], P)
    thermal = outbreathing_thermal(volume, inputs["latitude"])
    flash = _flash(lanes, fill, filling)
    hexane = find("n-hexane").psat(T.ravel()).reshape(T.shape)
    volatile = ~(P[:, :, BEST] <= hexane)
    into_thermal = inbreathing_thermal(volume[:, None], inputs["latitude"][:, None], T, volatile)
    into_liquid = inbreathing_liquid(draw)
    insulated = np.array([case.tank.kind == "underground" for case in cases])
    return Breathing(
        out=liquid + thermal[:, None, None] + flash[:, None, :],
        out_liquid=liquid[:, :, BEST],
        out_thermal=thermal,
        out_flash=flash,
        into=into_liquid[:, None] + into_thermal,
        into_liquid=into_liquid,
        into_thermal=into_thermal,
        growth=growth_factor(weather.barometer[:, None], P[:, :, BEST]),
        applies=tables_apply(weather.T_space, insulated),
        volume=volume,
        vents=vent_sums(cases),
    )


def _flash(lanes: Lanes, fill, filling) -> np.ndarray:
    """Flashed vapour as air (n, 3): the receipt's vapour fraction times its molar flow."""
    inputs = lanes.inputs
    T, z = inputs["receipt_temperature"], lanes.z[:, RECEIPT]
    v = molar_volume(lanes.fluid, T, z) / lanes.measured.density[:, RECEIPT]
    after = lanes.arrival.T_after
    y = np.where(np.isfinite(lanes.arrival.y), lanes.arrival.y, 0.0)
    M = np.where(lanes.arrival.beta[:, BEST] > 0.0, y @ lanes.fluid.MW, z @ lanes.fluid.MW)
    flow = lanes.arrival.beta * (fill / v)[:, None]
    flash = flashed_vapour_as_air(flow, M[:, None], np.where(np.isfinite(after), after, T_15C)[:, None])
    return np.where(filling[:, None], flash, 0.0)
