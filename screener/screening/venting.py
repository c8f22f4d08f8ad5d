"""Findings about the vents: breathing out, breathing in, and their settings against the design."""

from __future__ import annotations

import math

from screener.ground.constants import ZERO_CELSIUS
from screener.screening.context import Context
from screener.screening.criteria import criterion
from screener.screening.draft import Draft, Lane
from screener.screening.finding import Condition, Fact
from screener.screening.measured import pressure_facts
from screener.screening.vapour import FLOATING
from screener.screening.wording import lines, say
from screener.states.lanes import BEST


def _draft(key: str, **fields) -> Draft:
    return Draft(criterion(key), caution=say("caution", key), not_counted=lines("not-counted", key), **fields)


def _skip(context: Context) -> str:
    """Why breathing is not screened for this tank, '' if it is."""
    kind = context.case.tank.kind
    if kind == "pressure-vessel":
        return say("skip", "pressure-vessel")
    if kind == "external-floating-roof":
        return say("skip", "external-roof")
    if kind in FLOATING and not context.case.tank.vents:
        return say("skip", "free-vents")
    return ""


def _missing(context: Context, *names: str) -> str:
    paths = context.missing(*names)
    if context.case.tank.kind in ("horizontal", "underground"):
        paths = [path for path in paths if path != "tank.shell_height"] + context.missing("tank_length")
    return say("unknown", "missing", paths=", ".join(paths)) if paths else ""


def _hot_space(context: Context, applies: bool) -> str:
    """The method does not hold for a hot vapour space that is not insulated."""
    if applies:
        return ""
    T = float(context.lanes.weather.T_space[context.i])
    if math.isnan(T):
        return say("unknown", "space-temperature")
    return say("unknown", "hot-space", temperature=f"{T - ZERO_CELSIUS:.1f} degC")


def outbreathing(context: Context, stream) -> Draft:
    """vents.outbreathing: liquid movement, thermal and flashed vapour against capacity."""
    key = "vents.outbreathing"
    if skip := _skip(context):
        return _draft(key, skip=skip)
    b, i = stream.breathing, context.i
    rows = tuple(_out_lane(context, b, k) for k in context.liquids())
    needs = ["shell_diameter", "shell_height", "latitude"]
    if context.case.line.receipt is not None:
        needs.append("receipt_rate")
    unknown = (
        _capacity_unknown(b.vents, i, "out")
        or _missing(context, *needs)
        or _hot_space(context, bool(b.applies[i]))
    )
    facts = (
        Fact("thermal", float(b.out_thermal[i]), "m3/s air"),
        Fact("flashed vapour as air", float(b.out_flash[i, BEST]), "m3/s air"),
        Fact("installed capacity", float(b.vents.out[i]), "m3/s air"),
        Fact(say("note", "one-out"), float(b.vents.out_less[i]), "m3/s air"),
        Fact("hottest vapour space", float(context.lanes.weather.T_space[i]), "K"),
    )
    return _draft(key, lanes=rows, unknown=unknown, range_covers=("weather", "method"), facts=_finite(facts))


def _out_lane(context: Context, b, k: int) -> Lane:
    i, lanes = context.i, context.lanes
    Pv = float(lanes.P_hot[i, k, BEST])
    unknown, caps = context.why_no_hot_pressure(k), context.typical_cap() + context.liquid_caps(k)
    growth = float(b.growth[i, k])
    if not unknown and math.isnan(growth):
        unknown = say("unknown", "boils")
    elif Pv > 0.5 * context.barometer:
        caps += (say("cap", "growth", factor=f"{growth:.2f}"),)
    if unknown:
        unknown = say("unknown", "lane", liquid=context.liquid_name(k), why=unknown)
    facts = (
        Fact("liquid movement", float(b.out_liquid[i, k]), "m3/s air"),
        Fact("vapour pressure at the hottest surface", Pv, "Pa"),
        Fact("growth factor P/(P - Pv)", growth, "-"),
    )
    low, value, high = b.out[i, k]
    return Lane(
        context.condition(k, context.hottest_day, "vents", ""), value, low, high, _capacity(b.vents, i, "out"),
        unknown=unknown, caps=caps, facts=_finite(facts) + pressure_facts(context, k), tag=k,
    )  # fmt: skip


def inbreathing(context: Context, stream) -> Draft:
    """vents.inbreathing: liquid drawn and thermal against capacity."""
    key = "vents.inbreathing"
    if skip := _skip(context):
        return _draft(key, skip=skip)
    b, i = stream.breathing, context.i
    rows = []
    for k in context.liquids():
        why = context.why_no_hot_pressure(k)
        value = float(b.into[i, k])
        rows.append(Lane(
            context.condition(k, context.hottest_day, "vents", ""), value, value, value,
            _capacity(b.vents, i, "in"),
            unknown=say("unknown", "lane", liquid=context.liquid_name(k), why=why) if why else "", tag=k,
            facts=_finite((Fact("thermal", float(b.into_thermal[i, k]), "m3/s air"),)) + pressure_facts(context, k),
            caps=context.misfit_caps(k),
        ))  # fmt: skip
    needs = ["shell_diameter", "shell_height", "latitude"]
    if context.case.line.draw_rate is None:
        needs.append("draw_rate")
    unknown = (
        _capacity_unknown(b.vents, i, "in")
        or _missing(context, *needs)
        or _hot_space(context, bool(b.applies[i]))
    )
    facts = (
        Fact("liquid movement", float(b.into_liquid[i]), "m3/s air"),
        Fact("installed capacity", float(b.vents.into[i]), "m3/s air"),
        Fact(say("note", "one-out"), float(b.vents.into_less[i]), "m3/s air"),
    )
    return _draft(key, lanes=tuple(rows), unknown=unknown, range_covers=("method",), facts=_finite(facts))


def _capacity_unknown(vents, i: int, way: str) -> str:
    """Why the installed capacity cannot be judged, '' if it can."""
    if not vents.given[i]:
        return say("unknown", "no-vents")
    capacity, known = (
        (vents.out, vents.rated_out_known) if way == "out" else (vents.into, vents.rated_in_known)
    )
    if math.isnan(capacity[i]):
        return say("unknown", f"capacity-{way}")
    return "" if known[i] else say("unknown", f"capacity-{way}-pressure")


def _capacity(vents, i: int, way: str) -> float:
    """Installed capacity to judge by; NaN where it cannot be told, so that no lane is judged against it."""
    if _capacity_unknown(vents, i, way):
        return math.nan
    return float((vents.out if way == "out" else vents.into)[i])


def pressure_setting(context: Context, stream) -> Draft:
    """vents.pressure-setting: setting plus accumulation against the design pressure."""
    v = stream.breathing.vents
    return _setting(context, "vents.pressure-setting", "design_overpressure", v.over_reached, v.set_over, v.given,
                    "capacity-out-pressure")  # fmt: skip


def vacuum_setting(context: Context, stream) -> Draft:
    """vents.vacuum-setting: vacuum setting plus accumulation against the design vacuum."""
    v = stream.breathing.vents
    return _setting(context, "vents.vacuum-setting", "design_vacuum", v.under_reached, v.set_under, v.given,
                    "capacity-in-pressure")  # fmt: skip


def _setting(context: Context, key: str, design: str, reached, setting, given, no_rating: str) -> Draft:
    if skip := _skip(context):
        return _draft(key, skip=skip)
    i = context.i
    unknown = "" if given[i] else say("unknown", "no-vents")
    if not unknown and math.isnan(reached[i]):
        unknown = say("unknown", no_rating)
    unknown = unknown or _missing(context, design)
    value = float(reached[i])
    lane = Lane(
        Condition("", "", "at rated capacity", "vapour space"), value, value, value, context.input(design)
    )
    if unknown and float(setting[i]) >= context.input(design):
        # The setting alone already reaches the design figure: no accumulation is needed to tell.
        lane = Lane(
            Condition("", "", "as it opens", "vapour space"), *[float(setting[i])] * 3, context.input(design)
        )
    unit = criterion(key).unit
    facts = _finite(
        (Fact("setting", float(setting[i]), unit), Fact("setting plus accumulation", value, unit))
    )
    return _draft(key, lanes=(lane,), unknown=unknown, range_covers=(), facts=facts)


def _finite(facts) -> tuple[Fact, ...]:
    return tuple(fact for fact in facts if math.isfinite(fact.value))
