"""What a laboratory certificate says of a liquid, checked against itself."""

from __future__ import annotations

import math
from collections.abc import Mapping
from dataclasses import dataclass, fields
from functools import lru_cache
from itertools import pairwise

from screener.ground.constants import T_100F, ZERO_CELSIUS
from screener.ground.errors import CaseErrors, InputError, UnknownName
from screener.ground.files import read_table
from screener.species import find

# Below or above these a number is a slip of the unit, not a petroleum liquid: common practice, no source.
SPANS = {
    "density_15": (450.0, 1100.0, "kg/m3"),
    "dvpe": (0.0, 400e3, "Pa"),
    "rvp": (0.0, 400e3, "Pa"),
    "rvpe": (0.0, 400e3, "Pa"),
    "flash_point": (200.0, 600.0, "K"),
    "viscosity": (1e-8, 1.0, "m2/s"),
    "viscosity_T": (200.0, 500.0, "K"),
    "ibp": (200.0, 1000.0, "K"),
    "fbp": (200.0, 1100.0, "K"),
    **{name: (0.0, 1.0, "-") for name in ("e70", "e100", "e150", "benzene", "aromatics", "olefins")},
    "h2s": (0.0, 0.05, "-"),
    "water": (0.0, 0.05, "-"),
}
PRESSURES = ("dvpe", "rvp", "rvpe", "vpcr", "tvp")
# By which E70 to E150 may miss the curve of the same sheet [-]; common practice, no source
CURVE_SLACK = 0.03


@dataclass(frozen=True)
class LabSheet:
    """Numbers of a certificate in SI; None or () where the certificate is silent.

    density_15 [kg/m3]; dvpe, rvp (gauge), rvpe [Pa]; vpcr (ratio [-], T [K], P [Pa]) and
    tvp (T [K], P [Pa]) rows; distillation (volume fraction evaporated [-], T [K]) rows of an ASTM D86
    curve, ibp and fbp [K] its ends; e70, e100, e150 [-] volume evaporated; oxygenates
    (species, volume share [-]) rows; benzene, aromatics, olefins [-] by volume; flash_point [K];
    viscosity [m2/s] at viscosity_T [K]; h2s and water [-] by mass. product "crude" for crude and
    condensate. reproducibility (number, R) rows in the SI unit of the number take the place of those of
    data/volatility/reproducibility.csv; `dvpe_equation` and `rvp_chamber` name the methods.

    Raises CaseErrors with every fault at once, paths being the names above.
    """

    density_15: float | None = None
    dvpe: float | None = None
    rvp: float | None = None
    rvpe: float | None = None
    vpcr: tuple[tuple[float, float, float], ...] = ()
    tvp: tuple[tuple[float, float], ...] = ()
    distillation: tuple[tuple[float, float], ...] = ()
    ibp: float | None = None
    fbp: float | None = None
    e70: float | None = None
    e100: float | None = None
    e150: float | None = None
    oxygenates: tuple[tuple[str, float], ...] = ()
    benzene: float | None = None
    aromatics: float | None = None
    olefins: float | None = None
    flash_point: float | None = None
    viscosity: float | None = None
    viscosity_T: float | None = None
    h2s: float | None = None
    water: float | None = None
    product: str = ""
    title: str = ""
    reproducibility: tuple[tuple[str, float], ...] = ()
    dvpe_equation: str = "ASTM D5191"
    rvp_chamber: str = "dry"

    def __post_init__(self):
        for name in ("oxygenates", "reproducibility", "distillation"):
            rows = getattr(self, name)
            if isinstance(rows, Mapping):
                object.__setattr__(self, name, tuple(rows.items()))
        object.__setattr__(self, "distillation", tuple(sorted(self.distillation)))
        faults = list(sheet_faults(self))
        if faults:
            raise CaseErrors(faults)

    @property
    def vapour_pressure_known(self) -> bool:
        """Whether any vapour pressure was measured."""
        return any(getattr(self, name) not in (None, ()) for name in PRESSURES)

    @property
    def curve(self) -> tuple[tuple[float, float], ...]:
        """The distillation with its ends, (fraction [-], T [K])."""
        ends = [(0.0, self.ibp)] * (self.ibp is not None), [(1.0, self.fbp)] * (self.fbp is not None)
        return (*ends[0], *self.distillation, *ends[1])


@lru_cache(maxsize=1)
def reproducibilities() -> dict[str, dict[str, str]]:
    """Rows of data/volatility/reproducibility.csv by number."""
    return {row["number"]: row for row in read_table("volatility/reproducibility.csv")}


def reproducibility(number: str, value: float, slope: float = 0.0) -> float:
    """R of a number in the unit of its row; slope [degC per vol%] of the distillation curve."""
    row = reproducibilities()[number]
    power = float(row["factor"]) * abs(value) ** float(row["exponent"])
    return float(row["constant"]) + power + float(row["slope"]) * slope


def sheet_faults(sheet: LabSheet):
    """Every fault of a sheet, one by one: numbers first, then what contradicts what."""
    bad = list(_numbers(sheet)) + list(_rows(sheet))
    yield from bad
    wrong = {fault.path.partition("[")[0] for fault in bad}
    for check in (_curve, _rising, _evaporated, _shares, _pressures, _enough):
        found = list(check(sheet, wrong))
        wrong |= {fault.path.partition("[")[0] for fault in found}  # what follows from a fault is no second one
        yield from found


def _numbers(sheet):
    for name, (low, high, unit) in SPANS.items():
        value = getattr(sheet, name)
        if value is None:
            continue
        if not (isinstance(value, (int, float)) and math.isfinite(value)):
            yield InputError(name, value, f"{value} is no number", f"allowed: {low:g} to {high:g} {unit}")
        elif not low <= value <= high:
            what = "is negative" if value < 0.0 <= low else "is outside what such a liquid can have"
            yield InputError(name, value, f"{value:g} {unit} {what}", f"allowed: {low:g} to {high:g} {unit}")
    if (sheet.viscosity is None) != (sheet.viscosity_T is None):
        yield InputError("viscosity", sheet.viscosity, "a viscosity needs its temperature", "give both")


_ROW_SPANS = {
    "vpcr": ((0.02, 100.0, "-"), (230.0, 400.0, "K"), (0.0, 2e6, "Pa")),
    "tvp": ((230.0, 400.0, "K"), (0.0, 2e6, "Pa")),
    "distillation": ((0.0, 1.0, "-"), (200.0, 1100.0, "K")),
}


def _rows(sheet):
    for name, spans in _ROW_SPANS.items():
        for i, row in enumerate(getattr(sheet, name)):
            for value, (low, high, unit) in zip(row, spans, strict=True):
                if not (math.isfinite(value) and low <= value <= high):
                    what = "is negative" if value < 0.0 else "is outside the allowed range"
                    yield InputError(f"{name}[{i}]", value, f"{value:g} {unit} {what}",
                                     f"allowed: {low:g} to {high:g} {unit}")  # fmt: skip
    for i, (name, share) in enumerate(sheet.oxygenates):
        try:
            one = find(name)
        except UnknownName as error:
            yield error.at(f"oxygenates[{i}]")
            continue
        if one.family not in ("alcohol", "ether", "ketone", "ester"):
            yield InputError(f"oxygenates[{i}]", name, f"{name} holds no oxygen", "ethanol, MTBE, ETBE ...")
        if not (math.isfinite(share) and 0.0 <= share <= 1.0):
            what = "is negative" if share < 0.0 else "is over 100 %"
            yield InputError(
                f"oxygenates[{i}]", share, f"{name}: {100 * share:g} % {what}", "allowed: 0 to 100 %"
            )
    known = {*reproducibilities(), *(field.name for field in fields(sheet))}
    known |= {name for name, _ in sheet.oxygenates}
    for i, (name, R) in enumerate(sheet.reproducibility):
        if name not in known:
            yield UnknownName(f"reproducibility[{i}]", name, "number of a sheet", reproducibilities())
        elif not (math.isfinite(R) and R > 0.0):
            yield InputError(f"reproducibility[{i}]", R, f"{R} is no reproducibility of {name}", "above zero")


def _percent(fraction):
    return {0.0: "the initial boiling point", 1.0: "the final boiling point"}.get(
        fraction, f"T{100 * fraction:g}"
    )


def _curve(sheet, wrong):
    """The distillation curve rises."""
    if wrong & {"distillation", "ibp", "fbp"}:
        return
    for (f, T), (g, U) in pairwise(sheet.curve):
        if not (g > f and U > T):
            yield InputError(
                "distillation",
                U - ZERO_CELSIUS,
                f"{_percent(g)} ({U - ZERO_CELSIUS:.4g} degC) is not above "
                f"{_percent(f)} ({T - ZERO_CELSIUS:.4g} degC)",
                f"allowed: above {T - ZERO_CELSIUS:.4g} degC",
            )


_EVAPORATED = {"e70": 70.0, "e100": 100.0, "e150": 150.0}  # [degC]


def _rising(sheet, wrong):
    """E70, E100 and E150 rise."""
    given = [(n, getattr(sheet, n)) for n in _EVAPORATED if getattr(sheet, n) is not None and n not in wrong]
    for (low, a), (high, b) in pairwise(given):
        if b < a:
            yield InputError(high, b, f"{high.upper()} ({100 * b:g} %) is below {low.upper()} ({100 * a:g} %)",
                             f"allowed: at least {100 * a:g} %")  # fmt: skip


def _evaporated(sheet, wrong):
    """E70, E100 and E150 go with the curve."""
    if wrong & {"distillation", "ibp", "fbp"}:
        return
    for name, at in _EVAPORATED.items():
        value = getattr(sheet, name)
        if value is None or name in wrong:
            continue
        T = ZERO_CELSIUS + at
        below = [f for f, temperature in sheet.distillation if temperature <= T]
        above = [f for f, temperature in sheet.distillation if temperature >= T]
        least, most = max(below, default=0.0), min(above, default=1.0)
        if least <= most and not least - CURVE_SLACK <= value <= most + CURVE_SLACK:
            yield InputError(
                name,
                value,
                f"{name.upper()} ({100 * value:g} %) contradicts the distillation points of the same sheet",
                f"allowed: {100 * least:g} to {100 * most:g} % by these points",
            )


def _shares(sheet, wrong):
    """Families and oxygenates fit into 100 %, benzene into the aromatics."""
    if wrong & {"oxygenates", "benzene", "aromatics", "olefins"}:
        return
    named = [(name, share) for name, share in sheet.oxygenates]
    named += [(n, getattr(sheet, n)) for n in ("aromatics", "olefins") if getattr(sheet, n) is not None]
    if sheet.aromatics is None and sheet.benzene is not None:
        named.append(("benzene", sheet.benzene))
    total = sum(share for _, share in named)
    if total > 1.0 + 1e-9:
        text = " + ".join(f"{name} {100 * share:g} %" for name, share in named)
        yield InputError("oxygenates" if sheet.oxygenates else named[0][0], total,
                         f"the shares sum to {100 * total:.4g} %: {text}", "allowed: up to 100 % by volume")  # fmt: skip
    if sheet.benzene is not None and sheet.aromatics is not None and sheet.benzene > sheet.aromatics:
        yield InputError("benzene", sheet.benzene,
                         f"benzene ({100 * sheet.benzene:g} %) is above all aromatics "
                         f"({100 * sheet.aromatics:g} %)",
                         f"allowed: up to {100 * sheet.aromatics:g} %")  # fmt: skip


def _pressures(sheet, wrong):
    """A bubble pressure at 37.8 degC or above cannot lie far below what a cell of ratio 4 shows there."""
    if sheet.dvpe is None or wrong & {"tvp", "dvpe"}:
        return
    for i, (T, P) in enumerate(sheet.tvp):
        if T >= T_100F and P < 0.9 * sheet.dvpe:
            yield InputError(f"tvp[{i}]", P, f"a true vapour pressure of {P / 1e3:.4g} kPa "
                             f"at {T - ZERO_CELSIUS:.4g} degC "
                             f"contradicts the DVPE of {sheet.dvpe / 1e3:.4g} kPa at 37.8 degC",
                             f"allowed: above {0.9 * sheet.dvpe / 1e3:.4g} kPa")  # fmt: skip


def _enough(sheet, wrong):
    if not any(getattr(sheet, f.name) not in (None, (), "") for f in fields(sheet)[:21]):
        yield InputError(
            "lab", None, "the sheet holds no number", "density, vapour pressure, distillation ..."
        )
