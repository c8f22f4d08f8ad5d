"""How a fitted blend meets its laboratory sheet: one row a number, in units people know."""

from __future__ import annotations

from dataclasses import dataclass

from screener.casefile.lab_keys import OXYGENATES

# Unit of a figure by its key, as `screener.memo.numbers` prints it; pressures [Pa] where no other is named.
_UNITS = {
    "density_15": "kg/m3",
    **dict.fromkeys(("distillation", "ibp", "fbp", "flash_point"), "K"),
    **dict.fromkeys(("e70", "e100", "e150", "ethanol", "oxygenate", "benzene", "aromatics", "olefins"), "vol/vol"),
    **dict.fromkeys(("h2s", "water"), "ppm mass"),
    "rvp": "Pa over barometer",
}
_SIZES = {"ppm mass": 1e-6}  # SI value of one, where it is no unit of the numbers table


@dataclass(frozen=True)
class Residual:
    """One number of a sheet: measured, computed and reproducibility in `unit`, misfit in units of the last [-].

    place is where the measured value stands below [blend.lab] or [tank.contents.lab].
    """

    key: str
    place: str
    what: str
    unit: str
    measured: float
    computed: float
    reproducibility: float
    misfit: float


def residuals(blend) -> tuple[Residual, ...]:
    """Every number of the sheet a blend was fitted to, in its order; () for a blend without one."""
    rows, seen = [], {}
    for one in getattr(blend, "figures", ()):
        unit = _UNITS.get(one.key, "Pa")
        size = _SIZES.get(unit, 1.0)
        values = (one.value / size, one.computed / size, one.reproducibility / size)
        table = _TABLES.get(one.key, "")
        seen[table] = seen.get(table, -1) + 1
        place = f"{table}[{seen[table]}].pressure" if table else _place(one)
        rows.append(Residual(one.key, place, one.what, unit, *values, one.misfit))
    return tuple(rows)


_TABLES = {"vpcr_4": "vpcr", "vpcr_low": "vpcr", "tvp": "true_vapour_pressure"}
_PLACES = {"density_15": "density", "ibp": "distillation.IBP", "fbp": "distillation.FBP"}


def _place(one) -> str:
    if one.key == "distillation":
        return f'distillation."{100.0 * one.at:.0f} %"'
    if one.key in ("ethanol", "oxygenate"):
        return next((key for key, name in OXYGENATES.items() if name == one.what), one.what)
    return _PLACES.get(one.key, one.key)
