"""Cautions that only some cases need, tied to the inputs that call for them.

| caution | printed when | with |
|---|---|---|
| iron-sulphide | sour service or hydrogen sulfide stated, and the tank can take in air | vapour space, oxygen, in-breathing |
| frozen-vents | vents listed and the air of the coldest day below 0 degC | both breathing findings |
| arrester | a vent listed with a flame arrester | both breathing findings |
| idle-vents | a vent listed as out of service | both breathing findings |
| rain | an uninsulated tank above ground with vents | vacuum setting; in-breathing always says it |
| cold-receipt | the receipt at least 15 K colder than the hottest vapour space | in-breathing, vacuum setting |
| shared-header | a vapour return | vapour space, hatch, switch loading |
| static | a receipt, and a vapour space that is not too lean with room | vapour space |
| boil-over | a liquid with a light and a heavy end | boiling at the surface |

The thresholds are common practice, no source; they decide what is printed, never a verdict.
"""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass, replace
from functools import lru_cache

import numpy as np

from screener.ground.constants import ZERO_CELSIUS
from screener.screening.context import Context
from screener.screening.finding import Finding
from screener.screening.health import states_sour_gas
from screener.screening.wording import say
from screener.species import find
from screener.states.lanes import SOUR_GAS

COLD_RECEIPT = 15.0  # colder than the vapour space from here on [K]
LIGHT, LIGHT_SHARE = ZERO_CELSIUS + 100.0, 0.05  # boiling below [K], at least this share by mass [-]
HEAVY, HEAVY_SHARE = ZERO_CELSIUS + 300.0, 0.10  # boiling above [K], at least this share by mass [-]

_SPACE, _OXYGEN, _HATCH, _SWITCH = "vapour-space.flammable", "vapour-space.oxygen", "exposure.hatch", "switch-loading"
_OUT, _IN, _VACUUM, _BOILING = "vents.outbreathing", "vents.inbreathing", "vents.vacuum-setting", "boiling.surface"


@dataclass(frozen=True)
class Tied:
    """A caution, the findings it belongs to and the rule that prints it: fields for its words, or None."""

    key: str
    findings: tuple[str, ...]
    when: Callable


def _closed(context: Context) -> bool:
    """A tank that breathes air through vents."""
    return context.case.tank.kind != "pressure-vessel"


def _sour(context: Context, finding: Finding):
    case = context.case
    gas = states_sour_gas(context) and _holds_sour_gas(context)
    return {} if _closed(context) and (case.tank.sour_service or gas) else None


def _holds_sour_gas(context: Context) -> bool:
    names, z = context.lanes.names, context.lanes.z[context.i]
    return SOUR_GAS in names and bool((z[context.liquids(), names.index(SOUR_GAS)] > 0.0).any())


def _frozen(context: Context, finding: Finding):
    T = float(context.lanes.weather.air_coldest[context.i])
    return {"T": f"{T - ZERO_CELSIUS:.0f} degC"} if context.case.tank.vents and T < ZERO_CELSIUS else None


def _arrester(context: Context, finding: Finding):
    return {} if any(vent.arrester for vent in context.case.tank.vents) else None


def _idle(context: Context, finding: Finding):
    count = sum(vent.out_of_service for vent in context.case.tank.vents)
    return {"count": count} if count else None


def _rain(context: Context, finding: Finding):
    tank = context.case.tank
    return {} if tank.vents and not tank.insulated and tank.kind in ("fixed-roof", "horizontal") else None


def _cold_receipt(context: Context, finding: Finding):
    colder = float(context.lanes.weather.T_space[context.i]) - context.input("receipt_temperature")
    return {"K": f"{colder:.0f} K"} if math.isfinite(colder) and colder >= COLD_RECEIPT else None


def _header(context: Context, finding: Finding):
    return {} if context.case.tank.vapour_return else None


def _static(context: Context, finding: Finding):
    return {} if context.case.line.receipt is not None and finding.verdict != "room" else None


def _boil_over(context: Context, finding: Finding):
    lanes, i = context.lanes, context.i
    Tb = _boiling_points(lanes.names)
    mass = lanes.z[i, context.liquids()] * lanes.fluid.MW
    with np.errstate(invalid="ignore"):
        share = mass / mass.sum(axis=1, keepdims=True)
    light, heavy = share[:, Tb < LIGHT].sum(axis=1), share[:, Tb > HEAVY].sum(axis=1)
    return {} if ((light >= LIGHT_SHARE) & (heavy >= HEAVY_SHARE)).any() else None


@lru_cache(maxsize=16)
def _boiling_points(names) -> np.ndarray:
    return np.array([find(name).Tb for name in names])


TIED = (
    Tied("iron-sulphide", (_SPACE, _OXYGEN, _IN), _sour),
    Tied("frozen-vents", (_OUT, _IN), _frozen),
    Tied("arrester", (_OUT, _IN), _arrester),
    Tied("idle-vents", (_OUT, _IN), _idle),
    Tied("rain", (_VACUUM,), _rain),
    Tied("cold-receipt", (_IN, _VACUUM), _cold_receipt),
    Tied("shared-header", (_SPACE, _HATCH, _SWITCH), _header),
    Tied("static", (_SPACE,), _static),
    Tied("boil-over", (_BOILING,), _boil_over),
)


def with_cautions(context: Context, findings) -> list[Finding]:
    """The findings with the cautions their inputs call for; one that does not apply is left as it is."""
    return [f if f.verdict == "skipped" else replace(f, caution=_caution(context, f)) for f in findings]


def _caution(context: Context, finding: Finding) -> str:
    texts = [finding.caution]
    for one in TIED:
        if finding.id in one.findings:
            fields = one.when(context, finding)
            if fields is not None:
                texts.append(say("tied", one.key, **fields))
    return " ".join(text for text in texts if text)
