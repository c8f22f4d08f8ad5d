"""Context printed with a result and judged by nobody: the fuel's own figures and class."""

from __future__ import annotations

import math

from screener.blends.measured import measured_sheet, pressure_factor
from screener.screening.context import Context
from screener.screening.finding import Fact, Information
from screener.screening.measured import with_doubt
from screener.screening.wording import say
from screener.volatility import class_standards

GASOLINE_LIKE = (2.0e4, 1.3e5)  # DVPE between which a class of motor fuel is worth naming; no limit [Pa]


def information(context: Context) -> tuple[Information, ...]:
    """Figures of the receipt and, where there is one, of the heel."""
    case = context.case
    rows = [_figures(context.liquid_name(0), case.blend, case.fuel_class)]
    if case.tank.contents is not None:
        rows.append(_figures("heel", case.tank.contents.blend, ""))
    return tuple(rows)


def _figures(name: str, blend, claimed: str) -> Information:
    sheet = measured_sheet(blend)
    scaled = say("note", "scaled") if pressure_factor(blend.measured)[0] != 1.0 else ""

    def note(key: str, other: str = "", at: float = 0.0) -> str:
        """Where a figure was measured, the note that says so."""
        return say("note", "measured") if blend.figure(key, at) else other

    facts = [
        Fact("density at 15 degC", sheet.density_15, "kg/m3", note("density_15")),
        Fact("DVPE (37.8 degC, ASTM D5191)", sheet.DVPE, "Pa", note("dvpe", scaled)),
        Fact("true vapour pressure at 37.8 degC", sheet.TVP, "Pa", scaled),
        Fact("temperature for V/L 20", sheet.T20, "K", scaled or say("note", "information")),
        Fact("evaporated at 70 degC", sheet.E70, "vol/vol", note("e70")),
        Fact("evaporated at 100 degC", sheet.E100, "vol/vol", note("e100")),
        Fact("T50", sheet.T50, "K", note("distillation", at=0.5)),
    ]
    facts = [fact for fact in facts if math.isfinite(fact.value)]
    if blend.vapour_pressure_known and GASOLINE_LIKE[0] < sheet.DVPE < GASOLINE_LIKE[1]:
        for standard in class_standards():
            met = [match for match in sheet.classes(standard) if match.met]
            if met:
                marks = ", ".join(dict.fromkeys(match.evidence for match in met))
                facts.append(
                    Fact(f"{standard} classes met", ", ".join(m.name for m in met), "", f"limits: {marks}")
                )
    if claimed:
        facts.append(Fact("class claimed in the case", claimed))
    return Information(f"{name}: {blend.title}", tuple(facts), with_doubt("information", blend))
