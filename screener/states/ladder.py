"""The vapour space month by month: the same liquid between the coldest and the hottest surface of each month."""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from screener.states.fire import INSIDE, LEAN, RICH
from screener.states.inputs import gather
from screener.states.lanes import BEST, Lanes
from screener.states.scaled import vapour_space
from screener.states.weather import weather

_STEPS = 9  # temperatures of a month


def vapour_ladder(lanes: Lanes, i: int, k: int) -> list[dict]:
    """Rows of liquid k of case i, January first; empty where the case gives no months.

    Each row: month, number; T_cold and T_hot [K] of the surface; share_cold and share_hot of
    fuel in the space, LFL and UFL of the vapour halfway between [-]; lowest and highest side in equilibrium
    (LEAN, INSIDE or RICH); reaches, whether some degree of saturation within the month is flammable.
    """
    case = lanes.inputs.cases[i]
    z = lanes.z[i, k]
    if len(case.site.months) != 12 or not np.isfinite(z).all() or not np.isfinite(lanes.weather.barometer[i]):
        return []
    # A gauge reading belongs to its own day, not to the other months.
    months = [replace(case, site=replace(case.site, month=m.name, liquid_temperature=None)) for m in case.site.months]
    sky = weather(gather(months))
    part = np.linspace(0.0, 1.0, _STEPS)
    T_cold, T_hot = sky.T_cold[:, BEST, None], sky.T_surface[:, BEST, None]
    T = 1.0 / ((1.0 - part) / T_cold + part / T_hot)
    factor = lanes.measured.factor[i, k]
    space = vapour_space(lanes.fluid, T.ravel(), z, factor, P=float(lanes.weather.barometer[i]))
    fuel, LFL, UFL, upper = (a.reshape(T.shape) for a in (space.fuel, space.LFL, space.UFL, space.lower_ratio))
    side = np.where(fuel > UFL, RICH, np.where(fuel >= LFL, INSIDE, LEAN))
    rows = [
        {
            "month": month.name, "number": int(sky.month[j]),
            "T_cold": float(T[j, 0]), "T_hot": float(T[j, -1]),
            "share_cold": float(fuel[j, 0]), "share_hot": float(fuel[j, -1]),
            "LFL": float(LFL[j, _STEPS // 2]), "UFL": float(UFL[j, _STEPS // 2]),
            "lowest": int(side[j].min()), "highest": int(side[j].max()),
            "inside": bool((side[j] == INSIDE).any()), "reaches": bool(upper[j, -1] >= 1.0),
        }
        for j, month in enumerate(case.site.months)
    ]  # fmt: skip
    known = all(np.isfinite(v) for row in rows for v in row.values() if isinstance(v, float))
    return sorted(rows, key=lambda row: row["number"]) if known else []
