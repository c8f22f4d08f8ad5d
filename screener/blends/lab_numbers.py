"""The numbers of a laboratory sheet as computations over many compositions at once."""

from __future__ import annotations

import re
from collections.abc import Callable
from dataclasses import dataclass

import numpy as np

from screener.blends.lab_sheet import LabSheet, reproducibility
from screener.fire import flash_point
from screener.ground.constants import T_100F, ZERO_CELSIUS
from screener.species import columns, find
from screener.volatility import (
    distillation_d86,
    dvpe,
    reid_equivalent_crude,
    reid_vapour_pressure,
    true_vapour_pressure,
    vapour_pressure_crude,
)

_SI = {"kg/m3": 1.0, "kPa": 1e3, "degC": 1.0, "vol%": 0.01, "ppm mass": 1e-6, "mm2/s": 1e-6}
LEAST_FLASH = 2.0  # [K] smallest reproducibility taken for a flash point; common practice, no source
_CUT = re.compile(r" A(?P<A>[\d.]+) N[\d.]+ O(?P<O>[\d.]+)")


@dataclass(frozen=True)
class Number:
    """One measured number: name, value and reproducibility R in SI, T [K] and ratio [-] of a vapour pressure.

    key is that of `reproducibilities`, argument what the test needs besides the liquid; guide marks the
    ends of a distillation, which depend on the flask more than on the liquid: they weigh a third.
    """

    name: str
    key: str
    value: float
    R: float
    argument: object = None
    T: float = T_100F
    guide: bool = False


def numbers_of(sheet: LabSheet) -> tuple[Number, ...]:
    """All numbers of a sheet that a composition can be fitted to."""
    own = dict(sheet.reproducibility)
    made = []

    def add(name, key, value, argument=None, *, T=T_100F, slope=0.0, own_key="", guide=False):
        unit = _SI[_unit(key)]
        shown = value - ZERO_CELSIUS if _unit(key) == "degC" else value / unit
        R = own.get(own_key or key) or unit * reproducibility(key, shown, slope)
        if key == "flash_point" and "flash_point" not in own:
            R = max(R, LEAST_FLASH)
        made.append(Number(name, key, value, max(R, 1e-9), argument, T, guide))

    for key in ("density_15", "dvpe", "rvp", "rvpe"):
        if getattr(sheet, key) is not None:
            argument = {"dvpe": sheet.dvpe_equation, "rvp": sheet.rvp_chamber}.get(key)
            add("density at 15 degC" if key == "density_15" else key.upper(), key, getattr(sheet, key), argument)
    for ratio, T, P in sheet.vpcr:
        key = "vpcr_4" if ratio >= 1.0 else "vpcr_low"
        add(f"VPCR{ratio:g} at {T - ZERO_CELSIUS:.4g} degC", key, P, (ratio, T), T=T, own_key="vpcr")
    for T, P in sheet.tvp:
        add(f"true vapour pressure at {T - ZERO_CELSIUS:.4g} degC", "tvp", P, T, T=T)
    slopes = curve_slopes(sheet)
    for fraction, T in sheet.distillation:
        add(f"T{100 * fraction:g}", "distillation", T, fraction, slope=slopes[fraction])
    for key, end in (("ibp", 0), ("fbp", -1)):
        if getattr(sheet, key) is not None:
            add(key.upper(), key, getattr(sheet, key), end, guide=True)
    for key, degC in (("e70", 70.0), ("e100", 100.0), ("e150", 150.0)):
        if getattr(sheet, key) is not None:
            add(key.upper(), key, getattr(sheet, key), ZERO_CELSIUS + degC)
    for name, share in sheet.oxygenates:
        plain = find(name).name
        key = "ethanol" if plain == "ethanol" else "oxygenate"
        add(plain, key, share, plain, own_key=name)
    for key in ("benzene", "aromatics", "olefins", "flash_point", "h2s", "water"):
        if getattr(sheet, key) is not None:
            add(key.replace("_", " "), key, getattr(sheet, key))
    return tuple(made)


def _unit(key):
    from screener.blends.lab_sheet import reproducibilities

    return reproducibilities()[key]["unit"]


def curve_slopes(sheet: LabSheet) -> dict[float, float]:
    """Slope of the measured curve at each of its points [degC per vol%]; 0.5 for a single point."""
    points = sheet.curve
    if len(points) < 2:
        return dict.fromkeys((f for f, _ in points), 0.5)
    f, T = np.array(points).T
    return dict(zip(f, np.gradient(T, 100.0 * f), strict=True))


def family_shares(names) -> dict[str, np.ndarray]:
    """Volume share of aromatics and olefins in each species or cut (c,). [-]"""
    shares = {"aromatics": [], "olefins": []}
    for name in names:
        found, family = _CUT.search(name), find(name).family
        shares["aromatics"].append(float(found["A"]) / 100.0 if found else float(family == "aromatic"))
        shares["olefins"].append(float(found["O"]) / 100.0 if found else float(family == "olefin"))
    return {key: np.array(values) for key, values in shares.items()}


@dataclass(frozen=True)
class Laboratory:
    """Computes the numbers of a sheet for compositions by volume at 15 degC of one list of species."""

    names: tuple[str, ...]
    fluid: object
    numbers: tuple[Number, ...]
    product: str
    steps: int

    def measure(self, V) -> np.ndarray:
        """Values (n, m) in SI of the m numbers for standard volumes V (n, c); NaN where a test has none."""
        V = V / V.sum(axis=-1, keepdims=True)
        table = columns(self.names)
        mass = V * table.rho_15
        moles = mass / table.MW
        Z = moles / moles.sum(axis=-1, keepdims=True)
        W = mass / mass.sum(axis=-1, keepdims=True)
        families = family_shares(self.names)
        curve = None
        if any(one.key in _CURVE for one in self.numbers):
            curve = distillation_d86(self.fluid, Z, steps=self.steps)
        answers = []
        for one in self.numbers:
            if one.key in _CURVE:
                answers.append(_CURVE[one.key](curve, one.argument))
            elif one.key in families:
                answers.append(V @ families[one.key])
            elif one.key in _SPECIES:
                holder, shares = (one.argument, V) if _SPECIES[one.key] is None else _SPECIES[one.key]
                shares = {"volume": V, "mass": W}.get(shares, V) if isinstance(shares, str) else shares
                here = [i for i, name in enumerate(self.names) if name == holder]
                answers.append(shares[:, here].sum(axis=-1))
            elif one.key == "density_15":
                answers.append(mass.sum(axis=-1))
            else:
                answers.append(_PRESSURE[one.key](self.fluid, Z, one.argument, self.product or None))
        return np.stack(answers, axis=-1)


_SPECIES = {
    "ethanol": None,
    "oxygenate": None,
    "benzene": ("benzene", "volume"),
    "h2s": ("hydrogen sulfide", "mass"),
    "water": ("water", "mass"),
}
_CURVE: dict[str, Callable] = {
    "distillation": lambda curve, fraction: curve.temperature(fraction),
    "ibp": lambda curve, end: curve.T[:, 0],
    "fbp": lambda curve, end: curve.T[:, -1],
    "e70": lambda curve, T: curve.evaporated(T),
    "e100": lambda curve, T: curve.evaporated(T),
    "e150": lambda curve, T: curve.evaporated(T),
}


def _dvpe(fluid, Z, equation, product):
    # Outside the pressures of the method there is no DVPE, but the fit has to find its way back in.
    from screener.volatility import dvpe_equation

    return dvpe_equation(equation).dvpe(dvpe(fluid, Z, equation=equation, product=product).P_total)


_PRESSURE: dict[str, Callable] = {
    "dvpe": _dvpe,
    "rvp": lambda fluid, Z, chamber, product: (
        reid_vapour_pressure(fluid, Z, chamber=chamber, product=product).P
    ),
    "rvpe": lambda fluid, Z, _, product: reid_equivalent_crude(vapour_pressure_crude(fluid, Z).P),
    "vpcr_4": lambda fluid, Z, at, product: vapour_pressure_crude(fluid, Z, ratio=at[0], T=at[1]).P,
    "vpcr_low": lambda fluid, Z, at, product: vapour_pressure_crude(fluid, Z, ratio=at[0], T=at[1]).P,
    "tvp": lambda fluid, Z, T, product: true_vapour_pressure(fluid, T, Z).P,
    "flash_point": lambda fluid, Z, _, product: flash_point(fluid, Z).T,
}
