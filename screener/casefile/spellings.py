"""How units may be written, kind of quantity by kind of quantity.

A closed table: a spelling that is not here is refused, and one spelling has one
meaning within a kind. Every spelling leads to an expression in the units of
data/units/definitions.txt, so pint checks the dimension and does the arithmetic.
"""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

# Marks carried by a spelling besides its factor.
GAUGE, ABSOLUTE, SOUTH, API = "gauge", "abs", "south", "API"

_DROPPED = str.maketrans("", "", " _().^*\u00b7\u22c5\u2219\u2022\u00a0\u2009\u202f\u2007")
_REPLACED = (
    ("\u2103", "degC"),  # one-character degree Celsius
    ("\u2109", "degF"),
    ("\u00b0", "deg"),
    ("\u00ba", "deg"),  # masculine ordinal, often typed for the degree sign
    ("\u0394", "delta"),
    ("\u2206", "delta"),  # increment sign, looks the same
    ("\u00b2", "2"),
    ("\u00b3", "3"),
    ("\u207b", "-"),
    ("\u00b9", "1"),
    ("\u2212", "-"),
    (" per ", "/"),
)


def fold(text: str) -> str:
    """A unit's spelling without what makes no difference: spaces, brackets, superscripts."""
    for old, new in _REPLACED:
        text = text.replace(old, new)
    return text.translate(_DROPPED)


@dataclass(frozen=True)
class Spelling:
    """What a spelling means: an expression for pint and, where needed, a mark."""

    unit: str
    mark: str = ""


def table(*groups: tuple[Iterable[str], str] | tuple[Iterable[str], str, str]) -> dict[str, Spelling]:
    """Folded spelling -> meaning; two meanings for one spelling are a fault of ours."""
    made: dict[str, Spelling] = {}
    for texts, unit, *mark in groups:
        for text in texts:
            key, new = fold(text), Spelling(unit, *mark)
            if made.setdefault(key, new) != new:
                raise AssertionError(f"'{text}' has two meanings: {made[key]} and {new}")
    return made


LENGTHS = (
    (("m", "meter", "meters", "metre", "metres"), "meter"),
    (("mm", "millimeter", "millimetre"), "millimeter"),
    (("cm", "centimeter", "centimetre"), "centimeter"),
    (("km", "kilometer", "kilometre"), "kilometer"),
    (("ft", "foot", "feet"), "foot"),
    (("in", "inch", "inches"), "inch"),
)
AREAS = (
    (("m2", "sq m"), "meter**2"),
    (("cm2", "sq cm"), "centimeter**2"),
    (("mm2", "sq mm"), "millimeter**2"),
    (("ft2", "sq ft", "sqft"), "foot**2"),
    (("in2", "sq in"), "inch**2"),
)
VOLUMES = (
    (("m3", "cu m", "cubic metre", "cubic metres", "cubic meter", "cubic meters"), "meter**3"),
    (("L", "l", "litre", "litres", "liter", "liters", "dm3"), "liter"),
    (("ft3", "cu ft", "cuft", "cubic foot", "cubic feet"), "foot**3"),
    (("gal", "US gal", "USgal", "gallon", "gallons"), "us_gallon"),
    (("bbl", "bbls", "barrel", "barrels"), "barrel"),
)
_TIMES = (
    (("s", "sec", "second"), "second"),
    (("min", "minute"), "minute"),
    (("h", "hr", "hour"), "hour"),
    (("d", "day"), "day"),
)
_PRESSURES = (
    (("Pa",), "pascal"),
    (("hPa",), "hectopascal"),
    (("kPa",), "kilopascal"),
    (("MPa",), "megapascal"),
    (("bar",), "bar"),
    (("mbar",), "millibar"),
    (("psi", "lbf/in2", "lb/in2", "lb/sq in"), "psi"),
    (("oz/in2", "ozf/in2", "oz/sq in", "osi"), "ounce_per_square_inch"),
    (("atm",), "atmosphere"),
    (("kgf/cm2", "kg/cm2"), "technical_atmosphere"),
    (("mmHg", "mm Hg"), "millimeter_of_mercury"),
    (("inHg", "in Hg"), "inch_of_mercury"),
    (("inH2O", "in H2O", "in WC", "in WG", "inch WC", "inch H2O", "inches of water"), "inch_of_water"),
    (("mmH2O", "mm H2O", "mm WC", "mm WG"), "millimeter_of_water"),
)
_AIR = (
    (("Nm3", "normal m3"), "normal_cubic_meter"),
    (("Sm3", "standard m3"), "standard_cubic_meter"),
    (("SCF", "standard ft3"), "standard_cubic_foot"),
)


def rates(amounts) -> list[tuple[list[str], str]]:
    """Amounts over every unit of time."""
    return [
        ([f"{amount}/{time}" for amount in texts for time in times], f"{unit}/{per}")
        for texts, unit in amounts
        for times, per in _TIMES
    ]


def air_rates() -> list[tuple[list[str], str]]:
    """Rates of air, with and without the word air."""
    words = [
        (["SCFH"], "standard_cubic_foot/hour"),
        (["SCFM"], "standard_cubic_foot/minute"),
        (["SCFD"], "standard_cubic_foot/day"),
    ]
    return [
        (texts + [f"{text} {of}" for text in texts for of in ("air", "of air")], unit)
        for texts, unit in rates(_AIR) + words
    ]


def pressures(marks: Iterable[str]) -> list[tuple[list[str], str, str]]:
    """Pressures with the endings of the marks: none, gauge, absolute."""
    endings = {"": ("",), GAUGE: ("g", "ga", "gauge", "gage"), ABSOLUTE: ("a", "abs", "absolute")}
    return [
        ([f"{text} {ending}" for text in texts for ending in endings[mark]], unit, mark)
        for mark in marks
        for texts, unit in _PRESSURES
    ]


def densities() -> list[tuple]:
    """Mass over volume, and API gravity."""
    masses = (("kg", "kilogram"), ("g", "gram"), ("t", "tonne"), ("lb", "pound"))
    volumes = (
        (("m3",), "meter**3"),
        (("cm3", "mL", "ml"), "centimeter**3"),
        (("L", "l"), "liter"),
        (("gal", "US gal"), "us_gallon"),
        (("ft3", "cu ft"), "foot**3"),
    )
    made = [
        ([f"{mass}/{text}" for text in texts], f"{m}/({v})") for mass, m in masses for texts, v in volumes
    ]
    return [*made, (("kg m-3",), "kilogram/meter**3"), (("API", "degAPI"), "kilogram/meter**3", API)]


def shares() -> list[tuple]:
    """Percent and ppm, marked with the basis where the spelling names it."""
    bases = {
        "volume": ("vol", "volume", "v", "v/v", "by volume", "LV"),
        "mole": ("mol", "mole", "molar", "mol/mol"),
        "mass": ("mass", "wt", "weight", "w", "w/w", "m/m", "by weight", "by mass"),
    }
    made: list[tuple] = [(("%", "percent"), "percent", ""), (("ppm",), "ppm", "")]
    for mark, words in bases.items():
        for sign, unit in (("%", "percent"), ("ppm", "ppm")):
            texts = [f"{word} {sign}" for word in words] + [f"{sign} {word}" for word in words]
            made.append((texts, unit, mark))
    return made


def insolations() -> list[tuple]:
    """Energy over area and day; the value is that of one day."""
    energies = {
        "J": "joule",
        "kJ": "kilojoule",
        "MJ": "megajoule",
        "Wh": "watt*hour",
        "kWh": "kilowatt*hour",
        "Btu": "british_thermal_unit",
    }
    areas = (("m2", "meter**2"), ("cm2", "centimeter**2"), ("ft2", "foot**2"), ("sq ft", "foot**2"))
    return [
        (
            [f"{e}/{a}/{day}" for day in ("day", "d")] + [f"{e}/({a} {day})" for day in ("day", "d")],
            f"{eu}/({au})",
        )
        for e, eu in energies.items()
        for a, au in areas
    ]


CELSIUS = ("degC", "deg C", "degree C", "degrees C", "celsius", "degrees celsius", "degree celsius")
FAHRENHEIT = ("degF", "deg F", "degree F", "degrees F", "fahrenheit", "degrees fahrenheit")
RANKINE = ("degR", "deg R", "rankine")


def differences(names: Iterable[str]) -> list[str]:
    """Spellings of a temperature difference in degrees of a scale."""
    short = [name for name in names if name.startswith("deg")]
    return [text for n in short for text in (f"{n} difference", f"delta {n}", f"{n} diff")]
