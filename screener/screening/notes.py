"""Assumptions, reservations and sources of one case, as sentences."""

from __future__ import annotations

import math

from screener.screening.context import Context
from screener.screening.finding import Finding
from screener.screening.health import states_sour_gas
from screener.screening.measured import measured_assumptions
from screener.screening.wording import say
from screener.states.lanes import LOW


def assumptions(context: Context) -> tuple[str, ...]:
    """What was taken for granted: defaults of the case file, and what the states fell back on."""
    case = context.case
    rows = [f"{echo.path}: {echo.note}" for echo in case.inputs if echo.quality == "default" and echo.note]
    if math.isnan(context.input("lowest_barometer")) and math.isfinite(context.barometer):
        rows.append(say("assumed", "barometer", value=f"{context.barometer / 1000.0:.1f} kPa"))
    if not case.site.months and not math.isnan(context.input("ambient_high")):
        rows.append(say("assumed", "swing"))
    if math.isnan(context.input("design_insolation")) and math.isfinite(
        context.lanes.weather.insolation[context.i]
    ):
        rows.append(say("assumed", "insolation"))
    if case.site.months and case.site.liquid_temperature is None:
        rows.append(say("assumed", "design-day"))
    if math.isfinite(context.input("ambient_low")) and case.tank.kind != "underground":
        rows.append(say("assumed", "cold-day"))
    if case.tank.insulated:
        rows.append(say("assumed", "insulated"))
    for name in ("fittings", "roughness", "nozzle_height") if case.line.suction is not None else ():
        if math.isnan(context.input(name)):
            rows.append(say("assumed", name))
    if case.tank.surface:
        rows.append(say("assumed", "paint", text=case.tank.surface, note=paint_note(case.tank.surface)))
    for name, blend in context.parts(LOW):
        rows += measured_assumptions(name, blend)
    sour = case.blend.figure("h2s")
    if sour is not None and case.hydrogen_sulfide is not None:
        rows.append(say("assumed", "stated-sulfide", value=f"{1e6 * case.hydrogen_sulfide:.3g} ppm",
                        measured=f"{1e6 * sour.value:.3g} ppm"))  # fmt: skip
    rows += list(case.blend.report.assumed)
    if case.tank.contents is not None:
        rows += [f"heel: {text}" for text in case.tank.contents.blend.report.assumed]
    return tuple(dict.fromkeys(rows))


def paint_note(text: str) -> str:
    """What the paint text was taken to mean."""
    from screener.tank import absorptance

    found = absorptance(text)
    words = f"{found.row} {found.condition}".strip()
    return f"{words}, absorptance {found.best:.2f} ({found.low:.2f} to {found.high:.2f})"


def reservations(context: Context) -> tuple[str, ...]:
    """What weakens the result: failed lanes, parameters that fell back, spread of pure data."""
    lanes, case = context.lanes, context.case
    rows = []
    if lanes.failed:
        rows.append(say("reserved", "failed", count=lanes.failed))
    if lanes.fluid.gaps:
        rows.append(say("reserved", "gaps", pairs="; ".join(lanes.fluid.gaps[:12])))
    rows.append(_second_liquid(context))
    if not states_sour_gas(context) and case.tank.sour_service is None:
        rows.append(say("reserved", "sour-gas"))
    rows.append(say("reserved", "residual", value=f"{lanes.worst_residual:.1e}"))
    return tuple(rows)


def _second_liquid(context: Context) -> str:
    """What is known of a second liquid in this case."""
    second, i = context.lanes.second, context.i
    mine = context.liquids()
    split = [context.condition(k, "", "").sentence() for k in mine if second.splits[i, k]]
    if split:
        return say("reserved", "splits", liquids="; ".join(split))
    return say("reserved", "one-liquid" if second.tested[i, mine].all() else "second-liquid")


def sources(context: Context, findings: tuple[Finding, ...]) -> tuple[str, ...]:
    """Sources the case touched: of every finding and of the blends."""
    rows = [key for finding in findings for key in finding.sources]
    rows += list(context.case.blend.report.sources)
    if context.case.tank.contents is not None:
        rows += list(context.case.tank.contents.blend.report.sources)
    return tuple(dict.fromkeys(rows))
