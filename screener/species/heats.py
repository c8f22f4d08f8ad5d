"""What the property libraries hold on the heats of a liquid: evidence for slope and bend of its vapour pressure.

Each table has a weight, one standard deviation, found by holding it against the reference
equations of the species that have one (tests/studies/caloric_correlation.md). Imports thermo and
chemicals inside the functions.
"""

from __future__ import annotations

import warnings
from dataclasses import dataclass, replace

import numpy as np

from screener.species import forms, library

# table of the library: source key, one standard deviation [-]. Against reference equations two in three
# handbook heats lie within 0.14 %, nine in ten within 0.6 %; of the collection of a group-contribution paper
# within 0.5 and 1.3 % (within 0.6 and 1.6 % of the handbook)
HEATS = {"CRC_HVAP_298": ("crc-handbook", 0.005), "GHARAGHEIZI_HVAP_298": ("gharagheizi-2013", 0.01)}
RECOMMENDED = (
    "ZABRANSKY_SPLINE_SAT", "ZABRANSKY_QUASIPOLYNOMIAL_SAT", "ZABRANSKY_SPLINE_C", "ZABRANSKY_QUASIPOLYNOMIAL_C",
    "ZABRANSKY_SPLINE", "ZABRANSKY_QUASIPOLYNOMIAL",
)  # fmt: skip
CONSTANTS = ("CRCSTD", "POLING_CONST")
# two in three constants lie within 0.6 %, nine in ten within 1.2 % of reference equations and recommended values
CAPACITIES = {
    **dict.fromkeys(RECOMMENDED, ("zabransky-1996", 0.01)),
    "CRCSTD": ("crc-handbook", 0.01),
    "POLING_CONST": ("poling-2001", 0.01),
}
# Without a table the heat capacity of a hydrocarbon is estimated after Rowlinson and Bondi: two in three
# hydrocarbons lie within 2.7 % at 250 K and 2.1 % at 298 K, nine in ten within 4 %
ESTIMATE, ESTIMATE_SOURCE, ESTIMATE_DEVIATION = "ROWLINSON_BONDI", "poling-2001", 0.04
T_TABLE = 298.15  # [K] of the one-value tables
SOLID = 5.0  # [K] a one-value table says nothing of a substance that melts this far above T_TABLE; our choice
RANGE, POINTS = (240.0, 370.0), 7  # [K] where recommended heat capacities are used, at how many; our choice
YIELDS = 0.03  # [-] weight of a reference equation's heat capacity beside its vapour pressure; our choice
SLIP = 0.03  # [-] constants further apart than this are both left out; our choice
# A one-value table is continued: liquid less ideal-gas heat capacity stays as it is. Two in three hydrocarbons,
# ethers and ketones do so within 2 % of the liquid's at 250 K and 1.5 % at 330 K, alcohols and esters within 9 %
CONTINUED_TO = 250.0, 330.0  # [K]
SHAPE, SHAPE_OTHER = 0.02, 0.09  # [-]
OTHER = {14, 15, 16, 21, 22, 77, 81, 82}  # subgroups of modified UNIFAC with hydroxyl or ester
LIQUID = 1.05, 2.6  # [-] a liquid's heat capacity over its vapour's lies within; our choice, 1.2 to 2.3 are met


@dataclass(frozen=True)
class Heat:
    """A heat of vaporisation [J/mol] or liquid heat capacity [J/(mol K)] at temperatures T (n,) [K].

    deviation (n,) [-] is one standard deviation of each point; method and source name the table.
    """

    T: np.ndarray
    value: np.ndarray
    deviation: np.ndarray
    method: str
    source: str


@dataclass(frozen=True)
class Thermal:
    """The heats known of one species, each `Heat` or None, and the ideal-gas heat capacity coefficients."""

    heat: Heat | None
    capacity: Heat | None
    cp_ideal: tuple

    @property
    def both(self) -> bool:
        """Whether slope and bend are known from tables."""
        return self.heat is not None and self.capacity is not None and self.capacity.method != ESTIMATE

    @property
    def words(self) -> str:
        """Names of the tables."""
        return " ".join(one.method for one in (self.heat, self.capacity) if one is not None)


def thermal(cas, MW, Tc, cp_ideal, omega=None):
    """The best tables of heat of vaporisation and liquid heat capacity of a species: `Thermal`.

    With an acentric factor omega [-] a hydrocarbon that has no table of the heat capacity has an estimate.
    """
    import chemicals
    from thermo import EnthalpyVaporization, HeatCapacityLiquid

    _, formula, _, inchi_key, _ = library.identity(cas)
    groups = set(library.group_counts(inchi_key))
    plain = "O" not in formula or (groups and not groups & OTHER)
    shape = SHAPE if plain else SHAPE_OTHER
    with warnings.catch_warnings():
        warnings.simplefilter("ignore")
        heat = EnthalpyVaporization(CASRN=cas, Tc=Tc, extrapolation=None)
        capacity = HeatCapacityLiquid(CASRN=cas, MW=1e3 * MW, Tc=Tc, extrapolation=None)
        solid = (chemicals.Tm(cas) or 0.0) > T_TABLE + SOLID
        sound = _sound(capacity, cp_ideal, solid)
        known = _first(capacity, {k: v for k, v in CAPACITIES.items() if k in sound}, cp_ideal)
        known = known and _continued(known, cp_ideal, shape)
        if known is None and omega is not None and "O" not in formula and "C" in formula and "H" in formula:
            known = estimated(Tc, omega, cp_ideal)
        return Thermal(None if solid else _first(heat, HEATS), known, tuple(cp_ideal))


def estimated(Tc, omega, cp_ideal):
    """Liquid heat capacity of a hydrocarbon by corresponding states, 250-350 K below 0.85 Tc [K]; omega [-].

    Source: the method of Rowlinson and Bondi as in Poling, Prausnitz and O'Connell 2001.
    """
    from chemicals.heat_capacity import Rowlinson_Bondi

    T = np.linspace(250.0, min(350.0, 0.85 * Tc), POINTS)
    value = np.array([Rowlinson_Bondi(float(t), Tc, omega, float(forms.cp_ideal(cp_ideal, t))) for t in T])
    return Heat(T, value, np.full(POINTS, ESTIMATE_DEVIATION), ESTIMATE, ESTIMATE_SOURCE)


def reference_capacity(cas, MW, Tc):
    """Saturated-liquid heat capacity of a reference equation over 250-350 K below 0.85 Tc, or None."""
    from thermo import HeatCapacityLiquid

    with warnings.catch_warnings():
        warnings.simplefilter("ignore")
        prop = HeatCapacityLiquid(CASRN=cas, MW=1e3 * MW, Tc=Tc, extrapolation=None)
        if "HEOS_FIT" not in prop.T_limits:
            return None
        low, high = prop.T_limits["HEOS_FIT"]
        low, high = max(low, 250.0), min(high, 350.0, 0.85 * Tc)
        if high - low < 10.0:
            return None
        T = np.linspace(low, high, POINTS)
        value = np.array([float(prop.calculate(float(t), "HEOS_FIT")) for t in T])
    return Heat(T, value, np.full(POINTS, YIELDS), "HEOS_FIT", "helmholtz")


def _sound(prop, cp_ideal, solid):
    """Tables that can be used: all recommended ones, and constants no other constant or the vapour denies."""
    constants = {m: float(prop.calculate(T_TABLE, m)) for m in CONSTANTS if m in prop.T_limits and not solid}
    fair = {m: v for m, v in constants.items() if _liquid_like(T_TABLE, v, cp_ideal)}
    if len(fair) > 1 and max(fair.values()) / min(fair.values()) - 1.0 > SLIP:
        fair = {}
    return set(fair) | set(RECOMMENDED)


def _continued(one, cp_ideal, shape):
    """A one-value heat capacity with two points more, far less certain; other tables as they are."""
    if len(one.T) > 1:
        return one
    T = np.array([T_TABLE, *CONTINUED_TO])
    value = one.value + forms.cp_ideal(cp_ideal, T) - forms.cp_ideal(cp_ideal, T_TABLE)
    return replace(one, T=T, value=value, deviation=np.array([one.deviation[0], shape, shape]))


def _liquid_like(T, value, cp_ideal):
    """Whether heat capacities can be a liquid's: a spline of ethylbenzene is negative below 320 K."""
    share = value / forms.cp_ideal(cp_ideal, T)
    return bool(np.all((LIQUID[0] <= share) & (share <= LIQUID[1])))


def _first(prop, sources, cp_ideal=None):
    for method, (source, deviation) in sources.items():
        if method not in prop.T_limits:
            continue
        T = np.array([T_TABLE])
        if method in RECOMMENDED:
            low, high = prop.T_limits[method]
            low, high = max(low, RANGE[0]), min(high, RANGE[1])
            if high - low < 5.0:
                continue
            T = np.linspace(low, high, POINTS)
        value = np.array([float(prop.calculate(float(t), method)) for t in T])
        if cp_ideal is not None and not _liquid_like(T, value, cp_ideal):
            continue
        return Heat(T, value, np.full(len(T), deviation), method, source)
    return None
