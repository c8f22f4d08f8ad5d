"""Numbers with their units as people read them: one table, two unit systems.

Everything below this floor is SI. Memo, command line and screens all print
through this module, so a pressure looks the same wherever it is read. Pure
standard library: it can be imported before NumPy is.
"""

from __future__ import annotations

import math
from dataclasses import dataclass, replace

from screener.ground.constants import PSI, T_60F, T_NORMAL

SYSTEMS = ("si", "us")
NONE = "none"  # printed where a number does not exist

_FOOT = 0.3048  # [m]; exact, international foot 1959
_GALLON = 3.785411784e-3  # US liquid gallon [m3]; exact, 231 in3
_BARREL = 42 * _GALLON  # petroleum barrel [m3]; 42 US gal
_POUND = 0.45359237  # [kg]; exact, international pound 1959
_SCF = (
    _FOOT**3 * T_NORMAL / T_60F
)  # standard cubic foot (60 degF) as normal cubic metres (0 degC), one pressure
_BTU = 1055.05585262  # [J]; international table Btu, exact by definition


@dataclass(frozen=True)
class Shown:
    """How a unit is shown: value / size - offset, with at least so many decimals."""

    unit: str
    size: float = 1.0
    offset: float = 0.0
    decimals: int = 0
    fixed: bool = False  # decimals never grow: temperatures, percentages


@dataclass(frozen=True)
class Quantity:
    """A number in SI beside the text that stands for it in print."""

    value: float | None
    unit: str
    text: str

    def __str__(self) -> str:
        return self.text


def _same(unit: str, size: float = 1.0, decimals: int = 0, fixed: bool = False) -> dict[str, Shown]:
    return {system: Shown(unit, size, 0.0, decimals, fixed) for system in SYSTEMS}


@dataclass(frozen=True)
class Span:
    """A range, or a limit that may have one end only, in SI beside its text."""

    low: float | None
    high: float | None
    unit: str
    text: str

    def __str__(self) -> str:
        return self.text


_TABLE: dict[str, dict[str, Shown]] = {
    "Pa": {"si": Shown("kPa", 1e3, decimals=1), "us": Shown("psi", PSI, decimals=2)},
    "Pa over barometer": {
        "si": Shown("kPa gauge", 1e3, decimals=2),
        "us": Shown("psi gauge", PSI, decimals=3),
    },
    "Pa under barometer": {
        "si": Shown("kPa vacuum", 1e3, decimals=2),
        "us": Shown("psi vacuum", PSI, decimals=3),
    },
    "Pa difference": {"si": Shown("kPa", 1e3, decimals=1), "us": Shown("psi", PSI, decimals=2)},
    "K": {
        "si": Shown("degC", 1.0, 273.15, 1, True),
        "us": Shown("degF", 1 / 1.8, 459.67, 1, True),
    },
    "K difference": {"si": Shown("K", 1.0, decimals=1), "us": Shown("degF difference", 1 / 1.8, decimals=1)},
    "m3/s": {"si": Shown("m3/h", 1 / 3600, decimals=0), "us": Shown("bbl/h", _BARREL / 3600, decimals=0)},
    "m3/s air": {
        "si": Shown("Nm3/h air", 1 / 3600, decimals=0),
        "us": Shown("SCFH air", _SCF / 3600, decimals=0),
    },
    "m": {"si": Shown("m", decimals=2), "us": Shown("ft", _FOOT, decimals=2)},
    "m small": {"si": Shown("mm", 1e-3, decimals=1), "us": Shown("in", _FOOT / 12, decimals=3)},
    "m2": {"si": Shown("m2", decimals=1), "us": Shown("ft2", _FOOT**2, decimals=0)},
    "m3": {"si": Shown("m3", decimals=0), "us": Shown("bbl", _BARREL, decimals=0)},
    "m/s": {"si": Shown("m/s", decimals=2), "us": Shown("ft/s", _FOOT, decimals=2)},
    "kg/m3": {"si": Shown("kg/m3", decimals=1), "us": Shown("lb/ft3", _POUND / _FOOT**3, decimals=2)},
    "kg/mol": _same("g/mol", 1e-3, 2),
    "J/m2": {
        "si": Shown("MJ/m2", 1e6, decimals=1),
        "us": Shown("Btu/ft2", _BTU / _FOOT**2, decimals=0),
    },
    "J/m2/day": {
        "si": Shown("MJ/m2 a day", 1e6, decimals=1),
        "us": Shown("Btu/ft2 a day", _BTU / _FOOT**2, decimals=0),
    },
    "m2/s": _same("mm2/s", 1e-6, 2),
    "mol/mol": _same("mol %", 1e-2, 1),
    "vol/vol": _same("vol %", 1e-2, 1),
    "kg/kg": _same("mass %", 1e-2, 1),
    "deg": _same("deg", 1.0, 1),
    "%": _same("%", 1.0, 1, True),
    "-": _same(""),
    "": _same(""),
}
_OTHER_NAMES = {
    "Pa above the barometer": "Pa over barometer",
    "Pa gauge": "Pa over barometer",
    "Pa below the barometer": "Pa under barometer",
    "m3/s of normal air": "m3/s air",
    "Nm3/s": "m3/s air",
    "1": "-",
    "m^3/s": "m3/s",
    "m^3": "m3",
    "kg/m^3": "kg/m3",
    "J/m^2": "J/m2",
}
_DIFFERENCE = {
    "K": "K difference",
    "Pa": "Pa difference",
    "Pa over barometer": "Pa difference",
    "Pa under barometer": "Pa difference",
}
_MOST_DECIMALS = 6
_SMALL_LENGTH = 0.01  # [m]; a length standing alone below this is shown in mm or in


def _shown(unit: str, system: str) -> Shown:
    name = _OTHER_NAMES.get(unit, unit)
    row = _TABLE.get(name)
    return row[system] if row else Shown(unit)


def difference_unit(unit: str) -> str:
    """Unit of the difference of two values in `unit` (kelvin, not degC)."""
    name = _OTHER_NAMES.get(unit, unit)
    return _DIFFERENCE.get(name, name)


def unit_text(unit: str, system: str = "si") -> str:
    """The unit as printed."""
    return _shown(unit, system).unit


def _real(value) -> float | None:
    return None if value is None or not math.isfinite(value) else float(value)


def converted(value: float | None, unit: str, system: str = "si") -> float | None:
    """The number as printed, before rounding; None for a number that does not exist."""
    value, shown = _real(value), _shown(unit, system)
    return None if value is None else value / shown.size - shown.offset


def _digits(value: float, shown: Shown) -> int:
    """Decimals that leave three significant digits, and never fewer than the unit asks for."""
    if shown.fixed or value == 0.0:
        return shown.decimals
    return max(shown.decimals, min(_MOST_DECIMALS, 2 - math.floor(math.log10(abs(value)))))


def decimals(values, unit: str, system: str = "si") -> int:
    """Decimals for numbers printed side by side: those the largest of them needs."""
    found = [abs(v) for v in (converted(value, unit, system) for value in values) if v is not None]
    return _digits(max(found), _shown(unit, system)) if found else _shown(unit, system).decimals


def number(value, unit: str, system: str = "si", *, places: int | None = None, sign: bool = False) -> str:
    """The number alone, without its unit. A value too small for `places` keeps one digit that is not zero."""
    shown = converted(value, unit, system)
    if shown is None:
        return NONE
    if places is None:
        places = _digits(shown, _shown(unit, system))
    if shown != 0.0 and abs(shown) < 0.5 * 10.0**-places and not _shown(unit, system).fixed:
        places = min(_MOST_DECIMALS, -math.floor(math.log10(abs(shown))))
    text = f"{shown:+.{places}f}" if sign else f"{shown:.{places}f}"
    return text.replace("-", "", 1) if text.startswith("-") and float(text) == 0.0 else text


def quantity(value, unit: str, system: str = "si", *, places=None, sign=False, bare=False) -> Quantity:
    """The number with its unit, SI value kept beside the text. `bare` leaves the unit out of the text."""
    text = number(value, unit, system, places=places, sign=sign)
    label = unit_text(unit, system)
    if text != NONE and label and not bare:
        text = f"{text} {label}"
    return Quantity(_real(value), unit, text)


def span(low, high, unit: str, system: str = "si", *, places=None, bare=False) -> Span:
    """Low to high with one unit, which `bare` leaves out; 'no range' where both ends are the same number."""
    texts = [number(value, unit, system, places=places) for value in (low, high)]
    label = "" if bare else unit_text(unit, system)
    text = NONE if NONE in texts else f"{texts[0]} to {texts[1]} {label}".rstrip()
    if NONE not in texts and _real(low) == _real(high):
        text = "no range"
    return Span(_real(low), _real(high), unit, text)


def anything(value, unit: str = "", system: str = "si") -> Quantity | str:
    """A number, a text or nothing, as it stands in an input or a fact."""
    if value is None:
        return NONE
    if isinstance(value, bool):
        return "yes" if value else "no"
    if isinstance(value, int) and unit_text(unit, system) == "":
        return Quantity(float(value), unit, str(value))
    if isinstance(value, (int, float)):
        shown = quantity(
            value, "m small" if unit == "m" and 0.0 < abs(value) < _SMALL_LENGTH else unit, system
        )
        return replace(shown, unit=unit)
    return str(value)


def percent(share: float | None) -> Quantity:
    """A share as whole percent; more decimals where rounding would hide on which side of 100 it lies.

    Past 999 % the number says no more than that.
    """
    if share is None or not math.isfinite(share):
        return Quantity(None, "-", NONE)
    if share >= 9.995:
        return Quantity(float(share), "-", ">999 %")
    value, places = 100.0 * share, 0
    while places < 3 and (float(f"{value:.{places}f}") < 100.0) != (value < 100.0):
        places += 1
    return Quantity(float(share), "-", f"{value:.{places}f} %")
