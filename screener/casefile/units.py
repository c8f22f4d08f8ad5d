"""Text to SI and back: the one place where units are read.

pint is imported on first use, not when this module is imported, so that the
first screen does not wait for it.
"""

from __future__ import annotations

import math
import re
from dataclasses import dataclass
from functools import lru_cache

from screener.casefile.quantities import KINDS, Kind, Shown
from screener.casefile.spellings import API, GAUGE, SOUTH, Spelling, fold
from screener.ground.errors import UnitError
from screener.ground.files import data_folder

# rho(60 degF) = 141.5 / (API + 131.5) of water at 60 degF: API MPMS 11.1 (2004) takes water as
# 999.016 kg/m3; read in public calculations that follow that standard, not in the standard itself.
_API_A, _API_B, _WATER_60F = 141.5, 131.5, 999.016

_SPACES = str.maketrans(
    {c: " " for c in "\u00a0\u2007\u2009\u202f\u2002\u2003\u2008\u200a\t"} | {"\u2212": "-"}
)
_NUMBER = re.compile(
    r"(?P<sign>[+-]?)"
    r"(?P<whole>[0-9]{1,3}(?:(?P<gap>[ _'\u2019])[0-9]{3})(?:(?P=gap)[0-9]{3})*(?![0-9])|[0-9]*)"
    r"(?:(?P<mark>[.,])(?P<part>[0-9]*))?(?P<power>[eE][+-]?[0-9]+)?"
)
_SHORT_LENGTH = 0.01  # [m]
_REFUSED = {
    "ton": "a ton may be 907, 1000 or 1016 kg, so it is not read",
    "tons": "a ton may be 907, 1000 or 1016 kg, so it is not read",
    "C": "a lone C is the coulomb; a temperature is written degC",
    "F": "a lone F is the farad; a temperature is written degF",
    "R": "a lone R is not read; degrees Rankine are written degR",
    "cfm": "cfm does not say at which temperature and pressure; write SCFM",
    "cfh": "cfh does not say at which temperature and pressure; write SCFH",
}


@dataclass(frozen=True)
class Measured:
    """A quantity that was read: SI value and what its spelling said besides.

    mark is 'gauge', 'abs' or '' for pressures; 'volume', 'mole', 'mass' or '' for shares.
    """

    value: float
    mark: str


def kinds() -> tuple[str, ...]:
    """Names of the kinds of quantity that can be read."""
    return tuple(KINDS)


def expected(kind: str) -> str:
    """What a text of this kind looks like, for messages."""
    known = KINDS[kind]
    article = "an" if kind[0] in "aeiou" else "a"
    return f"{article} {kind} such as '{known.example}' ({known.accepted})"


def quantity(text: str, kind: str, path: str = ""):
    """SI value of a text such as '24 m'.

    Temperatures in K, angles in deg, insolation in J/m2 of one day, shares as
    fractions, air flow in m3/s at 0 degC and 101,325 Pa. For the kind 'pressure'
    the result is (value [Pa], is_gauge); all others give a float. Raises UnitError.
    """
    got = measure(text, kind, path)
    return (got.value, got.mark == GAUGE) if kind == "pressure" else got.value


def measure(text: str, kind: str, path: str = "") -> Measured:
    """As `quantity`, with the mark of the spelling."""
    if not isinstance(text, str):
        raise UnitError(path, text, f"{short(text)} has no unit", expected(kind))
    number, unit = _split(text, kind, path)
    meaning = _meaning(unit, kind, text, path)
    value = _convert(number, meaning, kind)
    if kind == "temperature" and value < 0.0:
        raise UnitError(path, text, f"'{short(text)}' lies below absolute zero", expected(kind))
    if not math.isfinite(value):
        raise UnitError(path, text, f"'{short(text)}' is too large to be a quantity", expected(kind))
    return Measured(value, meaning.mark)


def _convert(number: float, meaning: Spelling, kind: str) -> float:
    if meaning.mark == API:
        return math.inf if number <= -_API_B else _API_A / (number + _API_B) * _WATER_60F
    if meaning.mark == SOUTH:
        number = -number
    return float(registry().Quantity(number, meaning.unit).to(KINDS[kind].si).magnitude)


def _split(text: str, kind: str, path: str) -> tuple[float, str]:
    """Number and unit text; faults for what is no number, ambiguous, or has no unit."""

    def refuse(problem: str) -> UnitError:
        return UnitError(path, text, f"'{short(text)}' {problem}", expected(kind))

    plain = text.translate(_SPACES).strip()
    found = _NUMBER.match(plain)
    unit = plain[found.end() :].strip()
    if not (found["whole"] or found["part"]) or unit[:1] in tuple(".,0123456789"):
        raise refuse("does not begin with one plain number")
    if unit[:1] in tuple("'\u2019\""):
        raise refuse("is not read: write ft or in for the marks ' and \"")
    whole = _digits(found)
    if found["mark"] == "," and len(found["part"]) == 3 and 1 <= len(found["whole"]) <= 3 and int(whole):
        part = found["part"]
        raise refuse(
            f"is ambiguous: '{whole},{part}' may be {whole}{part} or {whole}.{part}; write one of these"
        )
    number = _value(found)
    if not math.isfinite(number):
        raise refuse("is too large to be a quantity")
    if not unit:
        raise refuse("has no unit")
    return number, unit


def number_text(text: str) -> float | None:
    """A plain number without a unit, decimal point or comma; None where the text is none."""
    found = _NUMBER.fullmatch(text.translate(_SPACES).strip())
    return _value(found) if found and (found["whole"] or found["part"]) else None


def _digits(found: re.Match) -> str:
    return re.sub(r"[^0-9]", "", found["whole"])


def _value(found: re.Match) -> float:
    return float(f"{found['sign']}{_digits(found) or 0}.{found['part'] or 0}{found['power'] or ''}")


def _meaning(unit: str, kind: str, text: str, path: str) -> Spelling:
    """Meaning of a unit's spelling within a kind."""
    key = fold(unit)
    meaning = _look_up(key, KINDS[kind])
    if meaning is not None:
        return meaning
    raise UnitError(path, text, f"'{short(text)}': {_refusal(unit, key, kind)}", expected(kind))


def _look_up(key: str, kind: Kind) -> Spelling | None:
    """Exact spelling, else the same letters in another case where that cannot change the meaning.

    One letter alone is taken as written (K, C, m), and so is the first letter of what begins
    with m (mm, mbar, MPa): there the case is the prefix.
    """
    exact = kind.spellings.get(key)
    if exact is not None or len(key) < 2:
        return exact
    alike = {
        meaning
        for spelling, meaning in kind.spellings.items()
        if spelling.casefold() == key.casefold() and (spelling[0] == key[0] or spelling[0] not in "mM")
    }
    return alike.pop() if len(alike) == 1 else None


def _refusal(unit: str, key: str, kind: str) -> str:
    if key in _REFUSED:
        return f"'{unit}' is refused: {_REFUSED[key]}"
    if kind == "absolute pressure" and _look_up(key, KINDS["pressure"]):
        return f"'{unit}' is a gauge pressure where an absolute one is needed"
    if kind == "pressure difference" and _look_up(key, KINDS["pressure"]):
        return f"'{unit}' is an absolute pressure where a difference from the barometer is needed"
    if kind == "air flow" and _look_up(key, KINDS["flow"]):
        return f"'{unit}' does not say at which temperature and pressure the air is counted"
    if kind == "temperature difference" and _look_up(key, KINDS["temperature"]):
        return f"'{unit}' is a temperature; a difference is written K or {unit} difference"
    others = [name for name, other in KINDS.items() if _look_up(key, other)]
    if others:
        return f"'{unit}' is a unit of {others[0]}, not of {kind}"
    return f"'{short(unit)}' is not a unit of {kind} that is read here"


def show(value: float | None, kind: str, system: str = "si", *, digits: int = 4, plain: bool = True) -> str:
    """A value in SI as text with a unit people use, 'si' (kPa, degC, m3/h) or 'us' (psi, degF, bbl/h).

    digits is the number of significant digits, never fewer than the whole number has. With
    plain=False degree signs and superscripts are written as such.
    """
    number, unit = shown(value, kind, system)
    if number is None:
        return "not known"
    fixed = _form(value, kind, system).decimals
    text = f"{_decimal(number, digits, fixed)} {unit}"
    if plain:
        return text
    return (
        text.replace("degC", "\u00b0C")
        .replace("degF", "\u00b0F")
        .replace("m3", "m\u00b3")
        .replace("m2", "m\u00b2")
    )


def shown(value: float | None, kind: str, system: str = "si") -> tuple[float | None, str]:
    """Number and unit text as shown; the number is None where there is none."""
    form = _form(value, kind, system)
    if value is None or not math.isfinite(value):
        return None, form.text
    return float(registry().Quantity(float(value), KINDS[kind].si).to(form.unit).magnitude), form.text


def _form(value: float | None, kind: str, system: str) -> Shown:
    """How a value is printed; short lengths (roughness of a pipe) in mm or in."""
    if kind == "length" and value is not None and 0.0 < abs(value) < _SHORT_LENGTH:
        return Shown("millimeter", "mm") if system == "si" else Shown("inch", "in")
    return {"si": KINDS[kind].si_shown, "us": KINDS[kind].us_shown}[system]


def _decimal(number: float, digits: int, fixed: int | None) -> str:
    if fixed is None:
        size = math.floor(math.log10(abs(number))) if number else 0
        fixed = max(0, digits - 1 - size)
    else:
        fixed = fixed + max(0, digits - 4)
    text = f"{number:.{fixed}f}"
    text = text.rstrip("0").rstrip(".") if "." in text else text
    return "0" if text in ("-0", "") else text


def short(text: object) -> str:
    """A value for a message, cut when someone pasted a page."""
    full = str(text)
    return full if len(full) <= 60 else full[:57] + "..."


@lru_cache(maxsize=1)
def registry():
    """The pint registry with our definitions and no others."""
    import pint

    file = data_folder() / "units" / "definitions.txt"
    return pint.UnitRegistry(str(file), on_redefinition="raise", cache_folder=None)
