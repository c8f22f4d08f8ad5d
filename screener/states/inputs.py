"""Numbers of many cases as arrays, with the case-file path of each.

A missing number is NaN here; `missing` turns NaN back into the path the user
has to fill in. This is the only place that walks over cases one by one.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.site import month_number


def _sulfide(case):
    """Hydrogen sulfide of the receipt: as the case states it, else as its laboratory sheet has it. [kg/kg]"""
    found = case.blend.figure("h2s")
    return found.value if case.hydrogen_sulfide is None and found else case.hydrogen_sulfide


# name -> (path in the case file, how to read it from a Case). None reads as NaN.
_READ = {
    "shell_diameter": ("tank.shell_diameter", lambda c: c.tank.shell_diameter),
    "shell_height": ("tank.shell_height", lambda c: c.tank.shell_height),
    "tank_length": ("tank.length", lambda c: c.tank.length),
    "level_low": ("tank.liquid_level.low", lambda c: c.tank.levels and c.tank.levels.low),
    "level_normal": ("tank.liquid_level.normal", lambda c: c.tank.levels and c.tank.levels.normal),
    "level_high": ("tank.liquid_level.high", lambda c: c.tank.levels and c.tank.levels.high),
    "design_overpressure": ("tank.design_pressure", lambda c: c.tank.design_overpressure),
    "design_vacuum": ("tank.design_vacuum", lambda c: c.tank.design_vacuum),
    "vapour_space_temperature": (
        "tank.vapour_space_temperature",
        lambda c: c.tank.vapour_space_temperature,
    ),
    "vapour_space_oxygen": ("tank.vapour_space_oxygen", lambda c: c.tank.vapour_space_oxygen),
    "roof_leg_height": ("tank.roof_leg_height", lambda c: c.tank.roof_leg_height),
    "hydrogen_sulfide": ("blend.h2s_in_liquid", _sulfide),
    "heel_volume": ("tank.contents.volume", lambda c: c.tank.contents and c.tank.contents.volume),
    "heel_temperature": (
        "tank.contents.temperature",
        lambda c: c.tank.contents and c.tank.contents.temperature,
    ),
    "latitude": ("site.latitude", lambda c: c.site.latitude),
    "elevation": ("site.elevation", lambda c: c.site.elevation),
    "lowest_barometer": ("site.lowest_barometer", lambda c: c.site.lowest_barometer),
    "ambient_low": ("site.ambient.low", lambda c: c.site.ambient and c.site.ambient.low),
    "ambient_high": ("site.ambient.high", lambda c: c.site.ambient and c.site.ambient.high),
    "design_insolation": ("site.design_insolation", lambda c: c.site.design_insolation),
    "reading": (
        "site.liquid_temperature",
        lambda c: c.site.liquid_temperature and c.site.liquid_temperature.value,
    ),
    "receipt_rate": ("line.receipt.rate", lambda c: c.line.receipt and c.line.receipt.rate),
    "receipt_temperature": (
        "line.receipt.temperature",
        lambda c: c.line.receipt and c.line.receipt.temperature,
    ),
    "draw_rate": ("line.draw.rate", lambda c: c.line.draw_rate),
    "line_length": ("line.suction.line_length", lambda c: c.line.suction and c.line.suction.line_length),
    "line_bore": ("line.suction.line_bore", lambda c: c.line.suction and c.line.suction.line_bore),
    "roughness": ("line.suction.roughness", lambda c: c.line.suction and c.line.suction.roughness),
    "fittings": ("line.suction.fittings", lambda c: c.line.suction and c.line.suction.fittings),
    "nozzle_height": (
        "line.suction.nozzle_above_tank_bottom",
        lambda c: c.line.suction and c.line.suction.nozzle_above_tank_bottom,
    ),
    "high_point": (
        "line.suction.highest_point_above_tank_bottom",
        lambda c: c.line.suction and c.line.suction.highest_point_above_tank_bottom,
    ),
    "pump_height": (
        "line.suction.pump_above_tank_bottom",
        lambda c: c.line.suction and c.line.suction.pump_above_tank_bottom,
    ),
    "npsh_required": (
        "line.suction.npsh_required",
        lambda c: c.line.suction and c.line.suction.npsh_required,
    ),
}


@dataclass(frozen=True)
class Inputs:
    """Arrays (n,) of the inputs of n cases, NaN where not given.

    months holds mean, mean_high, mean_low [K] and insolation [J/m2], each (n, 12),
    January first.
    """

    cases: tuple
    arrays: dict
    months: dict

    def __getitem__(self, name: str) -> np.ndarray:
        return self.arrays[name]

    def missing(self, i: int, *names: str) -> list[str]:
        """Case-file paths of those of the named inputs that case i does not give."""
        return [_READ[name][0] for name in names if np.isnan(self.arrays[name][i])]


def gather(cases) -> Inputs:
    """Inputs of many cases as arrays (n,)."""
    cases = tuple(cases)
    arrays = {}
    for name, (_, read) in _READ.items():
        values = (read(case) for case in cases)
        arrays[name] = np.array([np.nan if v is None else float(v) for v in values])
    months = {
        key: np.full((len(cases), 12), np.nan) for key in ("mean", "mean_high", "mean_low", "insolation")
    }
    for i, case in enumerate(cases):
        for month in case.site.months:
            number = month_number(month.name)
            for key, table in months.items():
                value = getattr(month, key)
                if number and value is not None:
                    table[i, number - 1] = value
    return Inputs(cases, arrays, months)


def path_of(name: str) -> str:
    """Case-file path of an input."""
    return _READ[name][0]
