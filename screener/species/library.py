"""What the property libraries hold for a species: candidate curves and constants, before any choice.

Imports thermo and chemicals inside the functions: this module runs when the tables
are made and when a species outside them is asked for.
"""

from __future__ import annotations

import csv
import warnings
from dataclasses import dataclass
from functools import lru_cache
from pathlib import Path

import numpy as np

# in order of preference: reference equations, then wide correlations, then narrow ones
PSAT_SOURCES = {
    "IAPWS_PSAT": "iapws-2007",
    "HEOS_FIT": "helmholtz",
    "WAGNER_POLING": "poling-2001",
    "DIPPR_PERRY_8E": "perry-8e",
    "VDI_PPDS": "vdi-2010",
    "WAGNER_MCGARRY": "mcgarry-1983",
    "ANTOINE_POLING": "poling-2001",
    "LANDOLT": "landolt-iv20",
    "ANTOINE_WEBBOOK": "nist-webbook",
}
DENSITY_SOURCES = {
    "HEOS_FIT": "helmholtz",
    "DIPPR_PERRY_8E": "perry-8e",
    "VDI_PPDS": "vdi-2010",
    "HTCOSTALDFIT": "hankinson-thomson-1979",
    "RACKETTFIT": "reid-1987",
}
CP_SOURCES = {
    "HEOS_FIT": "helmholtz",
    "TRCIG": "trc-1994",
    "WEBBOOK_SHOMATE": "nist-webbook",
    "POLING_POLY": "poling-2001",
    "JOBACK": "joback-1987",
}
CRITICAL_SOURCES = ("IUPAC", "CRC", "PSRK", "PD", "WEBBOOK", "PINAMARTINES", "YAWS")


@dataclass(frozen=True)
class Candidate:
    """A curve of a library: its method name, source key, validity [K] and the function of T [K]."""

    method: str
    source: str
    low: float
    high: float
    function: object

    def at(self, T):
        """Values at T [K]; NaN outside the validity."""
        out = np.full(len(T), np.nan)
        for i, t in enumerate(T):
            if self.low <= t <= self.high:
                out[i] = float(self.function(float(t)))
        return out


def _candidates(prop, sources):
    return [
        Candidate(method, key, *map(float, prop.T_limits[method]), lambda t, m=method: prop.calculate(t, m))
        for method, key in sources.items()
        if method in prop.T_limits and prop.T_limits[method][1] - prop.T_limits[method][0] > 15.0
    ]


def identity(cas):
    """(name, formula, SMILES, InChI key, molar mass [kg/mol]) of a CAS number; LookupError when unknown."""
    from chemicals.identifiers import search_chemical

    try:
        found = search_chemical(cas)
    except ValueError as error:
        raise LookupError(cas) from error
    return found.common_name, found.formula, found.smiles, found.InChI_key, found.MW / 1000.0


def cas_of(text):
    """CAS number of a name the identifier tables know; LookupError otherwise."""
    from chemicals.identifiers import search_chemical

    try:
        return search_chemical(text).CASs
    except ValueError as error:
        raise LookupError(text) from error


def critical(cas):
    """Tc [K], Pc [Pa], their source words, and the spread of published Tc [-].

    The reference equation's value if there is one, else the median of the published
    values. Values more than 10 % off a first median are slips and left out (one table has
    1-methylnaphthalene 159 K too low); the rest still holds some (methylcyclopentane's Tc
    is 21 K off in one), which is why no single table is trusted.
    """
    import chemicals

    values, words, spread = [], [], 0.0
    for get, methods in ((chemicals.Tc, chemicals.Tc_methods), (chemicals.Pc, chemicals.Pc_methods)):
        known = methods(cas)
        if "HEOS" in known:
            values.append(float(get(cas, method="HEOS")))
            words.append("helmholtz")
            continue
        listed = np.array([float(get(cas, method=m)) for m in CRITICAL_SOURCES if m in known])
        if not len(listed):
            raise LookupError(f"{cas}: no published critical point")
        kept = listed[np.abs(listed / np.median(listed) - 1.0) <= 0.1]
        kept = kept if len(kept) else listed
        slips = f", {len(listed) - len(kept)} left out" if len(kept) < len(listed) else ""
        values.append(float(np.median(kept)))
        words.append(f"median of {len(kept)} published{slips}")
        if get is chemicals.Tc:
            spread = float((kept.max() - kept.min()) / values[-1])
    return values[0], values[1], words, spread


def boiling_point(cas):
    """Normal boiling point [K] of the library, or None."""
    import chemicals

    Tb = chemicals.Tb(cas)
    return None if Tb is None else float(Tb)


def vapour_pressures(cas):
    """Candidate vapour-pressure curves [Pa], in order of preference; no corresponding states."""
    from thermo import VaporPressure

    with warnings.catch_warnings():
        warnings.simplefilter("ignore")
        return _candidates(VaporPressure(CASRN=cas, extrapolation=None), PSAT_SOURCES)


def liquid_densities(cas, MW, Tc, Pc):
    """Candidate saturated-liquid densities [kg/m3], in order of preference."""
    from thermo import VolumeLiquid

    with warnings.catch_warnings():
        warnings.simplefilter("ignore")
        volume = VolumeLiquid(CASRN=cas, MW=MW * 1000.0, Tc=Tc, Pc=Pc)
    found = []
    for c in _candidates(volume, DENSITY_SOURCES):
        low = max(c.low, 0.25 * Tc)
        found.append(
            Candidate(c.method, c.source, low, min(c.high, 0.97 * Tc), lambda t, f=c.function: MW / f(t))
        )
    return found


def density_at_a_point(cas):
    """(density [kg/m3], temperature [K]) of the CRC Handbook table, or None.

    The library's copy runs the printed superscript into the number: 0.7017 at 25 degC
    reads 701.725 and 0.8765 at 20 degC reads 876.52 (checked on octane, benzene,
    2,3,4-trimethylpentane). Four decimals are the density, the rest the temperature;
    without one, 20 degC, the handbook's default, is meant.
    """
    text = _crc_densities().get(cas, "")
    if not text or float(text) < 400.0 or float(text) >= 1000.0:
        return None
    digits = text.replace(".", "")
    decimals, tail = digits[:4], digits[4:]
    if len(digits) == 5 and digits.endswith("25"):
        decimals, tail = digits[:3], "25"  # three decimals at 25 degC
    elif len(digits) == 4 and digits.endswith("2"):
        decimals, tail = digits[:3], "2"  # three decimals at 20 degC
    T = {"": 20.0, "2": 20.0, "25": 25.0}.get(tail)
    return None if T is None else (float(decimals.ljust(4, "0")) / 10.0, T + 273.15)


def volume_of_unknown_temperature(cas):
    """Liquid molar volume [m3/mol] of the CAS Common Chemistry table, or None.

    The library carries no temperature with it. Read as at 20 degC it agrees with the other
    densities of 202 species within 0.3 % for half of them and -0.9 to +2.4 % for nine in ten.
    """
    text = _common_chemistry().get(cas.replace("-", ""), "")
    return float(text) if text else None


@lru_cache(maxsize=1)
def _crc_densities():
    import chemicals

    path = Path(chemicals.__file__).parent / "Misc" / "Physical Constants of Organic Compounds.csv"
    with path.open(encoding="utf-8") as file:
        return {row["CAS"]: row["rho"] for row in csv.DictReader(file, delimiter="\t")}


@lru_cache(maxsize=1)
def _common_chemistry():
    import chemicals

    path = Path(chemicals.__file__).parent / "Misc" / "common_chemistry_data.tsv"
    with path.open(encoding="utf-8") as file:
        return {row["CAS"]: row["Vml"] for row in csv.DictReader(file, delimiter="\t")}


def cp_ideal(cas, MW):
    """Candidate ideal-gas heat capacities [J/(mol K)], in order of preference."""
    from thermo import HeatCapacityGas

    with warnings.catch_warnings():
        warnings.simplefilter("ignore")
        prop = HeatCapacityGas(CASRN=cas, MW=MW * 1000.0)
    return _candidates(prop, CP_SOURCES)


def group_counts(inchi_key):
    """Modified UNIFAC (Dortmund) subgroup counts by InChI key, or {}.

    A stereoisomer that has no entry takes the one of another with the same skeleton (first
    block of the key): groups do not see cis and trans.
    """
    from thermo import unifac

    if not unifac.DDBST_MODIFIED_UNIFAC_assignments:
        unifac.load_group_assignments_DDBST()
    table = unifac.DDBST_MODIFIED_UNIFAC_assignments
    if inchi_key in table:
        return dict(table[inchi_key])
    same = sorted(key for key in table if key[:14] == inchi_key[:14])
    return dict(table[same[0]]) if same else {}
