"""Pseudo-components: cuts of petroleum that stand beside real species.

A cut is a `Species` like any other, made from its boiling point and density. Its name says
all that it is made of,

    cut 99.30 degC 745.00 kg/m3 A24.0 N10.0 O0.0            boiling point, density at 15 degC,
                                                            volume percent by family
    cut 560.00 degC 948.38 kg/m3 A38.1 N38.1 O0.0 M526.50   with its measured molar mass [g/mol]

so that `find(cut.name)` is the cut again: nothing is registered, a cut is as immutable as its
name, and a name is enough wherever a species is asked for (a fluid, a blend, a case file).
The shares may be left out of a name; rule 1 of `cut_families` then supplies them, and the
canonical name carries them.
"""

from __future__ import annotations

import math
import re
from functools import lru_cache

import numpy as np

from screener.ground.constants import T_15C, ZERO_CELSIUS, R
from screener.ground.errors import InputError
from screener.species import build, cut_constants, fits
from screener.species.cut_families import FAMILIES, family_shares, groups_of, mole_shares
from screener.species.cut_pressure import heat_capacity_lee_kesler_1976, vapour_pressure_ambrose_walton_1989
from screener.species.record import Curve, Species
from screener.species.vapour_pressure import NoData

BOILING = 250.0, 1100.0  # [K] span of boiling points accepted; our choice
DENSITY = 500.0, 1150.0  # [kg/m3] span of densities accepted; our choice
ROUNDED = 1.002  # [-] three shares printed to 0.1 % may sum to a little more than 1
T_LOW = 200.0  # [K] vapour-pressure curves of cuts start here, like those of the species
# Largest relative miss of the vapour pressure between 250 and 350 K, by boiling point [K]: the root mean square over
# the hydrocarbons of the species table treated as cuts, tests/studies/cut_vapour_pressures.md.
SCATTER_AT = (320.0, 375.0, 425.0, 475.0, 560.0)
SCATTER = (0.07, 0.09, 0.12, 0.29, 0.45)

_NAME = re.compile(
    r"\s*cut\s+(?P<Tb>-?\d+(\.\d+)?)\s*degC\s+(?P<rho>\d+(\.\d+)?)\s*kg/m3"
    r"(\s+A(?P<A>\d+(\.\d+)?)\s+N(?P<N>\d+(\.\d+)?)\s+O(?P<O>\d+(\.\d+)?))?"
    r"(\s+M(?P<M>\d+(\.\d+)?))?\s*",
    re.IGNORECASE,
)


def is_cut(text: str) -> bool:
    """Whether a text sets out to name a cut: the word and a number. `read` says what is wrong with the rest."""
    return re.match(r"\s*cut\s+-?\d", text, re.IGNORECASE) is not None


def cut(Tb, rho_15, *, aromatics=None, naphthenes=None, olefins=0.0, MW=None) -> Species:
    """The pseudo-component with a boiling point and a density.

    Tb [K] normal boiling point, rho_15 [kg/m3] at 15 degC; volume shares of families [-], None
    where not known; MW [kg/mol] when measured, else after Twu 1984. What is given is rounded
    to what the name prints.

    Raises
    ------
    InputError
        A number is outside its span, shares exceed 1, or no alpha function fits the curve.
    """
    return read(name_of(Tb, rho_15, aromatics=aromatics, naphthenes=naphthenes, olefins=olefins, MW=MW))


def name_of(Tb, rho_15, *, aromatics=None, naphthenes=None, olefins=0.0, MW=None) -> str:
    """Canonical name of the cut; arguments as `cut`."""
    numbers = [v for v in (Tb, rho_15, aromatics, naphthenes, olefins, MW) if v is not None]
    if not all(math.isfinite(v) for v in numbers):
        raise InputError("", Tb, "a cut is described by something that is no number", "finite numbers")
    _inside("boiling point", Tb, BOILING, "K")
    _inside("density", rho_15, DENSITY, "kg/m3")
    given = [v for v in (aromatics, naphthenes, olefins) if v is not None]
    if min(given) < 0.0 or sum(given) > ROUNDED:
        raise InputError("", sum(given), f"the shares of a cut sum to {100 * sum(given):.4g} %", "0 to 100 %")
    SG = cut_constants.specific_gravity(rho_15)
    _, N, O, A = (float(v) for v in family_shares(Tb, SG, aromatics, naphthenes, olefins))
    mass = "" if MW is None else f" M{1000.0 * MW:.2f}"
    return f"cut {Tb - ZERO_CELSIUS:.2f} degC {rho_15:.2f} kg/m3 A{100 * A:.1f} N{100 * N:.1f} O{100 * O:.1f}{mass}"


def _inside(word, value, span, unit):
    if not span[0] <= value <= span[1]:
        raise InputError(
            "",
            value,
            f"a cut of {word} {value:.6g} {unit} cannot be made",
            f"{span[0]:g} to {span[1]:g} {unit}",
        )


def read(text: str) -> Species:
    """The cut that a name describes; InputError when it cannot be made."""
    found = _NAME.fullmatch(text)
    if found is None:
        raise InputError("", text, f"'{text}' does not describe a cut", "cut 99.3 degC 745 kg/m3 A24 N10 O0")
    part = {key: None if value is None else float(value) for key, value in found.groupdict().items()}
    shares = {}
    if part["A"] is not None:
        shares = {
            "aromatics": part["A"] / 100.0,
            "naphthenes": part["N"] / 100.0,
            "olefins": part["O"] / 100.0,
        }
    MW = None if part["M"] is None else part["M"] / 1000.0
    name = name_of(part["Tb"] + ZERO_CELSIUS, part["rho"], MW=MW, **shares)
    return _record(name) if _fields(name) == _fields(text) else read(name)


def _fields(text):
    """Numbers of a name, shares included, as the canonical form prints them."""
    found = _NAME.fullmatch(text).groupdict()
    digits = {"Tb": 2, "rho": 2, "A": 1, "N": 1, "O": 1, "M": 2}
    return tuple(None if found[k] is None else round(float(found[k]), d) for k, d in digits.items())


@lru_cache(maxsize=1024)
def _record(name: str) -> Species:
    """The record of a canonical name."""
    degC, rho_15, A, N, O, mass = _fields(name)
    Tb, SG = degC + ZERO_CELSIUS, cut_constants.specific_gravity(rho_15)
    shares = (max(1.0 - (A + N + O) / 100.0, 0.0), N / 100.0, O / 100.0, A / 100.0)
    Tc = float(cut_constants.critical_temperature_twu_1984(Tb, SG))
    Pc = float(cut_constants.critical_pressure_twu_1984(Tb, SG))
    MW = float(cut_constants.molar_mass_twu_1984(Tb, SG)) if mass is None else mass / 1000.0
    try:
        if not (Tc > 1.05 * Tb and Pc > 2.0e5 and MW > 0.04):
            raise NoData("boiling point and density give no critical point")
        curve = _curve(Tb, Tc, Pc)
        alpha, _, _ = build.fit_alpha(curve, Tc, Pc)
    except LookupError as error:
        raise InputError(
            "", name, f"'{name}' cannot be used: {error}", "another boiling point or density"
        ) from error
    omega = float(-np.log10(vapour_pressure_ambrose_walton_1989(0.7 * Tc, Tb, Tc, Pc) / Pc) - 1.0)
    return Species(
        name=name, synonyms=(), cas="", formula=f"cut, {1000.0 * MW:.1f} g/mol", family="cut",
        MW=MW, Tc=Tc, Pc=Pc, omega=omega, Tb=Tb, alpha=alpha,
        translation=_translation(rho_15, MW, Tc, Pc, alpha, curve),
        cp_ideal=_heat_capacity(MW, float(cut_constants.watson_factor(Tb, SG)), omega),
        groups=groups_of(Tb, MW, shares), rho_15=rho_15, rho_note="given", curve=curve,
        psat_spread=float(np.interp(Tb, SCATTER_AT, SCATTER)), psat_extension=0.0,
        psat_note="Ambrose and Walton 1989 through the boiling point, constants after Twu 1984",
        families=tuple(pair for pair in zip(FAMILIES, mole_shares(Tb, shares), strict=True) if pair[1] > 0.0),
    )  # fmt: skip


def _curve(Tb, Tc, Pc) -> Curve:
    """The vapour-pressure curve from 200 K to 0.98 Tc in the form of the species table."""
    high = min(0.98 * Tc, max(450.0, Tb + 30.0, 0.75 * Tc))
    T = np.linspace(T_LOW, high, 160)
    coefficients, miss = fits.psat_coefficients(T, vapour_pressure_ambrose_walton_1989(T, Tb, Tc, Pc))
    return Curve(tuple(map(float, coefficients)), T_LOW, high, "ambrose-walton-1989", T_LOW, high, miss)


def _translation(rho_15, MW, Tc, Pc, alpha, curve):
    """Volume shift that gives the density at 15 degC and its fall with temperature after Rackett."""
    T = np.linspace(250.0, min(350.0, 0.9 * Tc), 41)
    ra = (MW / rho_15 * Pc / (R * Tc)) ** (1.0 / (1.0 + (1.0 - T_15C / Tc) ** (2.0 / 7.0)))
    rho = MW / (R * Tc / Pc * ra ** (1.0 + (1.0 - T / Tc) ** (2.0 / 7.0)))
    return build.fit_density(T, rho, MW, Tc, Pc, alpha, curve)[0]


def _heat_capacity(MW, K, omega):
    T = np.linspace(200.0, 500.0, 31)
    coefficients, _ = fits.polynomial(T, heat_capacity_lee_kesler_1976(T, MW, K, omega), 2)
    return (*map(float, coefficients), 0.0, 0.0)
