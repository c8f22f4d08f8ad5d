"""Kinds of quantity: SI unit, how each is printed, how each may be written."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from screener.casefile.spellings import (
    ABSOLUTE,
    AREAS,
    CELSIUS,
    FAHRENHEIT,
    GAUGE,
    LENGTHS,
    RANKINE,
    SOUTH,
    VOLUMES,
    Spelling,
    air_rates,
    densities,
    differences,
    insolations,
    pressures,
    rates,
    shares,
    table,
)


@dataclass(frozen=True)
class Shown:
    """How a kind is printed: unit for pint, text behind the number, fixed decimals if any."""

    unit: str
    text: str
    decimals: int | None = None


@dataclass(frozen=True)
class Kind:
    """One kind of quantity."""

    name: str
    si: str  # unit of the value handed on, for pint
    si_text: str  # the same for people
    si_shown: Shown
    us_shown: Shown
    example: str
    accepted: str  # the usual spellings, for messages
    spellings: Mapping[str, Spelling]


def _kind(name, si, si_text, si_shown, us_shown, example, accepted, groups) -> Kind:
    return Kind(name, si, si_text, Shown(*si_shown), Shown(*us_shown), example, accepted, table(*groups))


KINDS: dict[str, Kind] = {
    kind.name: kind
    for kind in (
        _kind(
            "length", "meter", "m", ("meter", "m"), ("foot", "ft"), "24 m", "m, mm, cm, km, ft, in", LENGTHS
        ),
        _kind(
            "area",
            "meter**2",
            "m2",
            ("meter**2", "m2"),
            ("foot**2", "ft2"),
            "450 m2",
            "m2, cm2, mm2, ft2, in2",
            AREAS,
        ),
        _kind(
            "volume",
            "meter**3",
            "m3",
            ("meter**3", "m3"),
            ("barrel", "bbl"),
            "2100 m3",
            "m3, L, ft3, gal (US), bbl (42 US gal)",
            VOLUMES,
        ),
        _kind(
            "flow",
            "meter**3/second",
            "m3/s",
            ("meter**3/hour", "m3/h"),
            ("barrel/hour", "bbl/h"),
            "600 m3/h",
            "m3/h, L/min, L/s, bbl/h, gpm",
            [
                *rates(VOLUMES),
                (("gpm", "US gpm"), "us_gallon/minute"),
                (("gph",), "us_gallon/hour"),
                (("bph",), "barrel/hour"),
                (("bpd",), "barrel/day"),
                (("lpm",), "liter/minute"),
            ],
        ),
        _kind(
            "air flow",
            "normal_cubic_meter/second",
            "m3/s",
            ("normal_cubic_meter/hour", "Nm3/h air"),
            ("standard_cubic_foot/hour", "SCFH air"),
            "2400 Nm3/h air",
            "Nm3/h (0 degC), Sm3/h (15 degC), SCFH or SCFM (60 degF) of air",
            air_rates(),
        ),
        _kind(
            "pressure",
            "pascal",
            "Pa",
            ("kilopascal", "kPa"),
            ("psi", "psi"),
            "62 kPa",
            "kPa, kPa gauge, kPa abs, bar, barg, mbar, psia, psig",
            pressures(("", GAUGE, ABSOLUTE)),
        ),
        _kind(
            "absolute pressure",
            "pascal",
            "Pa",
            ("kilopascal", "kPa abs"),
            ("psi", "psia"),
            "97.5 kPa",
            "kPa, kPa abs, mbar, bara, psia, mmHg, inHg",
            pressures(("", ABSOLUTE)),
        ),
        _kind(
            "pressure difference",
            "pascal",
            "Pa",
            ("kilopascal", "kPa"),
            ("psi", "psi"),
            "1.5 kPa gauge",
            "kPa, kPa gauge, mbar, barg, psig, oz/in2, inH2O",
            pressures(("", GAUGE)),
        ),
        _kind(
            "temperature",
            "kelvin",
            "K",
            ("degree_Celsius", "degC", 1),
            ("degree_Fahrenheit", "degF", 1),
            "32 degC",
            "degC, degF, K, degR",
            [
                (CELSIUS, "degree_Celsius"),
                (FAHRENHEIT, "degree_Fahrenheit"),
                (("K", "kelvin"), "kelvin"),
                (RANKINE, "degree_Rankine"),
            ],
        ),
        _kind(
            "temperature difference",
            "kelvin",
            "K",
            ("kelvin", "K", 1),
            ("degree_Rankine", "degF difference", 1),
            "5 K",
            "K, degC difference, degF difference, delta_degC",
            [
                ((*differences(CELSIUS), "K", "kelvin"), "kelvin"),
                ((*differences(FAHRENHEIT), *RANKINE), "degree_Rankine"),
            ],
        ),
        _kind(
            "share",
            "fraction",
            "-",
            ("percent", "%"),
            ("percent", "%"),
            "90 %",
            "%, vol%, mol%, mass%, wt%, ppm",
            shares(),
        ),
        _kind(
            "density",
            "kilogram/meter**3",
            "kg/m3",
            ("kilogram/meter**3", "kg/m3"),
            ("pound/us_gallon", "lb/gal"),
            "742 kg/m3",
            "kg/m3, g/cm3, kg/L, lb/gal, lb/ft3, API (60 degF)",
            densities(),
        ),
        _kind(
            "viscosity",
            "pascal*second",
            "Pa s",
            ("millipascal*second", "mPa s"),
            ("centipoise", "cP"),
            "0.6 mPa s",
            "Pa s, mPa s, cP",
            [(("Pa s",), "pascal*second"), (("mPa s",), "millipascal*second"), (("cP",), "centipoise")],
        ),
        _kind(
            "kinematic viscosity",
            "meter**2/second",
            "m2/s",
            ("centistokes", "cSt"),
            ("centistokes", "cSt"),
            "0.7 cSt",
            "m2/s, mm2/s, cSt",
            [(("m2/s",), "meter**2/second"), (("mm2/s",), "millimeter**2/second"), (("cSt",), "centistokes")],
        ),
        _kind(
            "insolation",
            "joule/meter**2",
            "J/m2",
            ("megajoule/meter**2", "MJ/m2/day"),
            ("british_thermal_unit/foot**2", "Btu/ft2/day"),
            "6.9 kWh/m2/day",
            "MJ/m2/day, kWh/m2/day, Wh/m2/day, J/cm2/day, Btu/ft2/day",
            insolations(),
        ),
        _kind(
            "angle",
            "degree",
            "deg",
            ("degree", "deg"),
            ("degree", "deg"),
            "41 deg",
            "deg, rad, deg N, deg S",
            [
                (("deg", "degree", "degrees", "deg N", "degrees N", "degrees north"), "degree"),
                (("deg S", "degrees S", "degrees south"), "degree", SOUTH),
                (("rad",), "radian"),
            ],
        ),
        _kind(
            "speed",
            "meter/second",
            "m/s",
            ("meter/second", "m/s"),
            ("mile/hour", "mph"),
            "3 m/s",
            "m/s, km/h, mph, ft/s, knots",
            [
                (("m/s", "m s-1"), "meter/second"),
                (("km/h", "kph", "km/hr"), "kilometer/hour"),
                (("mph", "mi/h"), "mile/hour"),
                (("ft/s", "fps"), "foot/second"),
                (("ft/min", "fpm"), "foot/minute"),
                (("kn", "kt", "knot", "knots"), "nautical_mile/hour"),
            ],
        ),
        _kind(
            "mass",
            "kilogram",
            "kg",
            ("kilogram", "kg"),
            ("pound", "lb"),
            "1500 kg",
            "kg, g, t, lb",
            [
                (("kg",), "kilogram"),
                (("g",), "gram"),
                (("t", "tonne", "tonnes"), "tonne"),
                (("lb", "lbs"), "pound"),
            ],
        ),
    )
}
