"""Findings about the suction: vapour in the line, and the head the pump needs."""

from __future__ import annotations

import math

from screener.line import PLACES, REASON_WORDS, Reason, asked_npsh
from screener.screening.context import Context
from screener.screening.criteria import criterion
from screener.screening.draft import Draft, Lane
from screener.screening.finding import Fact
from screener.screening.measured import pressure_facts
from screener.screening.wording import lines, say
from screener.states.lanes import BEST, LIQUIDS

_NEEDS = ("draw_rate", "line_length", "line_bore", "pump_height", "level_low")


def _draft(key: str, **fields) -> Draft:
    return Draft(criterion(key), caution=say("caution", key), not_counted=lines("not-counted", key), **fields)


def _unknown(context: Context, stream, *more: str) -> str:
    paths = context.missing(*_NEEDS, *more)
    if math.isnan(stream.suction.surface[context.i]):
        paths += ["tank.vents (vacuum_set)"] if math.isfinite(context.barometer) else [
            "site.lowest_barometer or site.elevation"]  # fmt: skip
    return say("unknown", "missing", paths=", ".join(paths)) if paths else ""


def _lane_unknown(context: Context, stream, k: int) -> str:
    why = context.why_no_hot_pressure(k)
    reason = int(stream.suction.reason[context.i, k])
    if not why and reason != Reason.PROFILE:
        why = REASON_WORDS[Reason(reason)]
    return say("unknown", "lane", liquid=context.liquid_name(k), why=why) if why else ""


def _facts(context: Context, stream, k: int) -> tuple[Fact, ...]:
    s, i, lanes = stream.suction, context.i, context.lanes
    facts = (
        Fact("bubble pressure of the hottest liquid", float(lanes.P_hot[i, k, BEST]), "Pa"),
        Fact("temperature of that liquid", float(lanes.T_hot[i, k, BEST]), "K"),
        Fact("lowest pressure in the line", float(s.lowest[i, k]), "Pa"),
        Fact("room in temperature", float(s.room_K[i, k]), "K difference"),
        Fact("surface pressure", float(s.surface[i]), "Pa"),
        Fact("liquid level", float(lanes.level[i, k]), "m"),
        Fact("density", float(s.density[i, k]), "kg/m3"),
        Fact("kinematic viscosity", float(s.viscosity[i, k]), "m2/s"),
        Fact("velocity", float(s.velocity[i, k]), "m/s"),
        Fact("friction head", float(s.friction[i, k]), "m"),
    )
    return tuple(fact for fact in facts if math.isfinite(fact.value)) + pressure_facts(context, k)


def _level(k: int) -> str:
    """Receipt and heel alone are judged at the low level."""
    return LIQUIDS[k][1] or "low"


def suction(context: Context, stream) -> Draft:
    """vapour-lock.suction: lowest line pressure less the bubble pressure of the hottest liquid."""
    key = "vapour-lock.suction"
    if context.case.line.suction is None:
        return _draft(key, skip=say("skip", "no-suction"))
    s, i, rows = stream.suction, context.i, []
    for k in context.liquids():
        low, value, high = s.room[i, k]
        place = PLACES[int(s.place[i, k])] if s.place[i, k] >= 0 else "suction line"
        rows.append(Lane(
            context.condition(k, context.hottest_day, place, _level(k)), value, low, high, 0.0,
            reference=context.barometer, unknown=_lane_unknown(context, stream, k),
                caps=context.typical_cap() + context.liquid_caps(k), facts=_facts(context, stream, k),
            tag=k,
        ))  # fmt: skip
    return _draft(key, lanes=tuple(rows), unknown=_unknown(context, stream),
                  range_covers=("weather", "inputs", "method"))  # fmt: skip


def npsh(context: Context, stream) -> Draft:
    """npsh.pump: NPSH available against required, gap by the greater of ratio and least head."""
    key = "npsh.pump"
    if context.case.line.suction is None:
        return _draft(key, skip=say("skip", "no-suction"))
    s, i, rows = stream.suction, context.i, []
    required = context.input("npsh_required")
    for k in context.liquids():
        low, value, high = s.npsh[i, k]
        rows.append(Lane(
            context.condition(k, context.hottest_day, "pump inlet", _level(k)), value, low, high, required,
            reference=float(s.head[i, k]), unknown=_lane_unknown(context, stream, k),
                caps=context.typical_cap() + context.liquid_caps(k),
            facts=_facts(context, stream, k) + (Fact("NPSH to ask for", float(asked_npsh(required)), "m"),)
            if math.isfinite(required) else _facts(context, stream, k), tag=k,
        ))  # fmt: skip
    return _draft(key, lanes=tuple(rows), unknown=_unknown(context, stream, "npsh_required", "level_high"),
                  range_covers=("weather", "inputs", "method"))  # fmt: skip
