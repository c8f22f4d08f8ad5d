"""Water of a laboratory sheet: what the liquid dissolves belongs to its composition, the rest is free water.

A composition is one liquid. Water that it cannot dissolve would be held in it at an activity above that of water
itself and make a vapour pressure many times its own: a fit to a measured vapour pressure would then take the light
ends out of a wet crude to make room for it.
"""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from screener.blends.lab_sheet import LabSheet
from screener.blends.lab_start import Start
from screener.equilibrium import Fluid, water_tolerance
from screener.ground.constants import T_100F
from screener.species import columns

WATER = "water"
NAME = "water dissolved"


def dissolved_only(sheet: LabSheet, start: Start) -> tuple[LabSheet, str]:
    """The sheet with no more water than its liquid dissolves at 37.8 degC, where fuels are tested; what was left out.

    '' where nothing was left out, or where no limit is found, as of liquids that take up any water.
    """
    if not sheet.water:
        return sheet, ""
    holds = _holds(start)
    if not holds < sheet.water:
        return sheet, ""
    note = (
        f"laboratory sheet, water: {1e6 * sheet.water:.4g} ppm mass, of which this liquid dissolves "
        f"{1e6 * holds:.4g} ppm at 37.8 degC; the rest is free water and no part of the composition"
    )
    return replace(sheet, water=holds), note


def _holds(start: Start) -> float:
    """Water the dry start dissolves (by mass of the whole), NaN where no limit is found. [-]"""
    names = tuple(name for name in start.names if name != WATER) + (WATER,)
    volume = dict(zip(start.names, start.volume @ start.groups, strict=True)) | {WATER: 0.0}
    table = columns(names)
    moles = np.array([volume[name] for name in names]) * table.rho_15 / table.MW
    z = moles / moles.sum()
    found = water_tolerance(Fluid.of(names), T_100F, z)
    w = float(found.water[0]) if found.ok[0] else np.nan
    mass = w * table.MW[-1]
    return mass / (mass + (1.0 - w) * float(z @ table.MW))
