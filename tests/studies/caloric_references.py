"""Reference heats of vaporisation and liquid heat capacities of the species of the tables.

CoolProp's reference equation where it has the fluid; else thermo's tables in the order of
HEATS and CAPACITIES. Constants at 25 degC are compared there alone. Of species that have
both, the 25 degC constants agree with the recommended measured capacities within 0.3 % for
half of them and 2 % for nine in ten; ethylbenzene and 1-butene, whose constants are slips of
the tables (50 times too large; 8 % off), have reference equations and do not use them.
"""

from __future__ import annotations

import warnings
from functools import lru_cache

import numpy as np

T_LOW, T_HIGH, SHARE = 250.0, 350.0, 0.85  # [K], [K], share of Tc
AT_25 = ("CRC_HVAP_298", "GHARAGHEIZI_HVAP_298", "CRCSTD", "POLING_CONST")
HEATS = ("HEOS_FIT", "CRC_HVAP_298", "DIPPR_PERRY_8E", "VDI_PPDS", "GHARAGHEIZI_HVAP_298")
CAPACITIES = (
    "HEOS_FIT", "ZABRANSKY_SPLINE_SAT", "ZABRANSKY_QUASIPOLYNOMIAL_SAT", "ZABRANSKY_SPLINE_C",
    "ZABRANSKY_QUASIPOLYNOMIAL_C", "ZABRANSKY_SPLINE", "ZABRANSKY_QUASIPOLYNOMIAL", "CRCSTD", "POLING_CONST",
    "DIPPR_PERRY_8E", "VDI_PPDS",
)  # fmt: skip


@lru_cache(maxsize=1)
def _fluids():
    """CAS number -> CoolProp's name."""
    import CoolProp.CoolProp as CP

    return {CP.get_fluid_param_string(name, "CAS"): name for name in CP.FluidsList()}


def references(one):
    """Of a species, as far as known, by "heat" [J/mol] and "capacity" [J/(mol K)]: T [K], values, source."""
    T = np.linspace(T_LOW, min(T_HIGH, SHARE * one.Tc), 21)
    if one.cas in _fluids():
        return _coolprop(_fluids()[one.cas], T)
    from thermo import EnthalpyVaporization, HeatCapacityLiquid

    with warnings.catch_warnings():
        warnings.simplefilter("ignore")
        capacity = HeatCapacityLiquid(
            CASRN=one.cas, MW=1e3 * one.MW, Tc=one.Tc, omega=one.omega, extrapolation=None
        )
        heat = EnthalpyVaporization(
            CASRN=one.cas, Tc=one.Tc, Pc=one.Pc, omega=one.omega, Tb=one.Tb, extrapolation=None
        )
        found = {"heat": _first(heat, HEATS, T), "capacity": _first(capacity, CAPACITIES, T)}
    return {key: value for key, value in found.items() if value is not None}


def _coolprop(name, T):
    import CoolProp.CoolProp as CP

    T = T[CP.PropsSI("Ttriple", name) + 0.1 <= T]
    if not T.size:
        return {}

    def at(what, quality):
        return np.array([CP.PropsSI(what, "T", t, "Q", quality, name) for t in T])

    heat = at("HMOLAR", 1) - at("HMOLAR", 0)
    return {"heat": (T, heat, "CoolProp"), "capacity": (T, at("CPMOLAR", 0), "CoolProp")}


def _first(prop, methods, T):
    for method in methods:
        if method not in prop.T_limits:
            continue
        low, high = prop.T_limits[method]
        at = np.array([298.15]) if method in AT_25 else T[(low <= T) & (high >= T)]
        if at.size:
            return at, np.array([prop.calculate(t, method) for t in at]), method
    return None


@lru_cache
def _heat_tables(cas, Tc):
    from thermo import EnthalpyVaporization

    with warnings.catch_warnings():
        warnings.simplefilter("ignore")
        return EnthalpyVaporization(CASRN=cas, Tc=Tc, extrapolation=None)


def tables_at_25(one):
    """Heat of vaporisation at 25 degC [J/mol] of every table of HEATS that holds it, by table."""
    prop, found = _heat_tables(one.cas, one.Tc), {}
    for method in HEATS:
        low, high = prop.T_limits.get(method, (1.0, 0.0))
        if low <= 298.15 <= high:
            found[method] = float(prop.calculate(298.15, method))
    return found
