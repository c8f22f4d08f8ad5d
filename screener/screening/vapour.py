"""Findings that rest on a vapour pressure: boiling, the rule packs, the receipt's flash."""

from __future__ import annotations

import math

from screener.screening.context import MONTHS, Context
from screener.screening.criteria import criterion
from screener.screening.draft import Draft, Lane
from screener.screening.finding import Condition, Fact
from screener.screening.measured import pressure_facts
from screener.screening.rules import Rule
from screener.screening.wording import lines, say
from screener.states.lanes import BEST, RECEIPT

FLOATING = ("internal-floating-roof", "external-floating-roof", "domed-floating-roof")
OTHER_ROOF = "limit of the same rule under an internal floating roof"
_VAPOUR_SHOWN = 6  # species of a vapour listed beside a finding


def _draft(key: str, **fields) -> Draft:
    return Draft(
        criterion(key), caution=say("caution", key), not_counted=lines("not-counted", key), **fields
    )  # fmt: skip


def vapour_facts(context: Context, y) -> tuple[Fact, ...]:
    """The largest shares of a vapour, as facts."""
    if not math.isfinite(float(y.sum())):
        return ()
    names = context.lanes.names
    order = sorted(range(len(names)), key=lambda j: -y[j])[:_VAPOUR_SHOWN]
    return tuple(Fact(f"{names[j]} in the vapour", float(y[j]), "mol/mol") for j in order if y[j] > 0.0)


def _hot_lane(context: Context, k: int, limit: float, where: str, caps=()) -> Lane:
    lanes, i = context.lanes, context.i
    T = lanes.T_hot[i, k]
    low, value, high = lanes.P_hot[i, k]
    facts = (
        Fact("temperature of that liquid", float(T[BEST]), "K"),
        Fact("lowest of its range", float(T[0]), "K"),
        Fact("highest of its range", float(T[2]), "K"),
    )
    why = context.why_no_hot_pressure(k)
    return Lane(
        context.condition(k, context.hottest_day, where), value, low, high, limit,
        unknown=say("unknown", "lane", liquid=context.liquid_name(k), why=why) if why else "",
        facts=tuple(f for f in facts if math.isfinite(f.value)) + pressure_facts(context, k)
            + vapour_facts(context, lanes.y_hot[i, k]), tag=k,
        caps=context.typical_cap() + context.liquid_caps(k) + tuple(caps),
    )  # fmt: skip


def _barometer_missing(context: Context) -> str:
    if math.isfinite(context.barometer):
        return ""
    return say("unknown", "missing", paths="site.lowest_barometer or site.elevation")


def boiling(context: Context) -> Draft:
    """boiling.surface: bubble pressure at the hottest surface against the lowest barometer."""
    if context.case.tank.kind == "pressure-vessel":
        return _draft("boiling.surface", skip=say("skip", "pressure-vessel"))
    lanes = tuple(
        _hot_lane(context, k, context.barometer, "liquid surface") for k in context.liquids()
    )  # fmt: skip
    return _draft(
        "boiling.surface",
        lanes=lanes,
        unknown=_barometer_missing(context),
        range_covers=("weather", "inputs", "method"),
        facts=_surface_facts(context),
    )


def _surface_facts(context: Context) -> tuple[Fact, ...]:
    """How the hottest surface came about."""
    weather, i = context.lanes.weather, context.i
    facts = [
        Fact("lowest barometer", context.barometer, "Pa"),
        Fact("hottest surface by the 2006 edition", float(weather.editions[i, 0]), "K"),
        Fact("hottest surface by the 2020 edition", float(weather.editions[i, 1]), "K"),
        Fact("solar absorptance of the paint", float(weather.absorptance[i, 1]), "-"),
        Fact("insolation of the design day", float(weather.insolation[i]), "J/m2"),
        Fact("air maximum of the design day", float(weather.air_high[i]), "K"),
        Fact("air minimum of the design day", float(weather.air_low[i]), "K"),
    ]
    reading = context.case.site.liquid_temperature
    if reading is not None:
        facts.insert(1, Fact(f"gauge reading of {reading.read_on}", reading.value, "K"))
    return tuple(f for f in facts if math.isfinite(f.value))


def legal(context: Context, rule: Rule | None) -> Draft:
    """vapour-pressure.legal for one rule: highest monthly mean against the roof-type limit."""
    if rule is None:
        return _draft("vapour-pressure.legal", unknown=say("unknown", "no-criteria"))
    fields = _rule_fields("vapour-pressure.legal", rule)
    if rule.skip:
        return _draft("vapour-pressure.legal", skip=rule.skip, **fields)
    lanes, i = context.lanes, context.i
    month = int(lanes.weather.month_legal[i])
    when = f"highest monthly mean, {MONTHS[month - 1]}" if month else ""
    rows = []
    for k in context.liquids():
        low, value, high = lanes.P_legal[i, k]
        why = context.unmeasured(k)
        unknown = say("unknown", "lane", liquid=context.liquid_name(k), why=why) if why else ""
        if not math.isfinite(value):
            paths = [p for p in context.own_missing(k) if not p.endswith("temperature")]
            missing = say("unknown", "missing", paths=", ".join(paths)) if paths else ""
            why = missing or context.no_pressure(k, lanes.status_legal[i, k])
            unknown = say("unknown", "lane", liquid=context.liquid_name(k), why=why)
        facts = (Fact("highest monthly mean air temperature", float(lanes.T_legal[i]), "K"),)
        own = float(lanes.T_own[i, k])
        if own > lanes.T_legal[i]:
            facts += (Fact("temperature the liquid brings along, the high end", own, "K"),)
        facts += pressure_facts(context, k)
        rows.append(Lane(context.condition(k, when, "tank"), value, low, high, rule.limit, unknown=unknown,
                         caps=rule.caps + context.liquid_caps(k), facts=facts if month else (), tag=k))  # fmt: skip
    unknown = rule.unknown or ("" if month else say("unknown", "months"))
    return _draft("vapour-pressure.legal", lanes=tuple(rows), unknown=unknown, range_covers=("inputs", "method"),
                  facts=rule.facts + _other_roof_fact(rule), **fields)  # fmt: skip


def hottest(context: Context, rule: Rule | None) -> Draft:
    """vapour-pressure.hottest for one rule: the hottest surface against the same limit."""
    if rule is None:
        return _draft("vapour-pressure.hottest", unknown=say("unknown", "no-criteria"))
    fields = _rule_fields("vapour-pressure.hottest", rule)
    if rule.skip:
        return _draft("vapour-pressure.hottest", skip=rule.skip, **fields)
    rows = tuple(_hot_lane(context, k, rule.limit, "liquid surface", rule.caps) for k in context.liquids())
    return _draft("vapour-pressure.hottest", lanes=rows, unknown=rule.unknown,
                  range_covers=("weather", "inputs", "method"), facts=rule.facts, **fields)  # fmt: skip


def _other_roof_fact(rule: Rule) -> tuple[Fact, ...]:
    return (Fact(OTHER_ROOF, rule.other_roof, "Pa"),) if math.isfinite(rule.other_roof) else ()


def _rule_fields(key: str, rule: Rule) -> dict:
    return {
        "id": f"{key}.{rule.pack}",
        "title": criterion(key).title if rule.only else f"{criterion(key).title} ({rule.pack})",
        "evidence": rule.evidence,
        "source": rule.source,
        "sources": rule.source_keys,
    }


def receipt(context: Context) -> Draft:
    """receipt.flash: does the receipt boil at tank pressure as it arrives, and does gas come out."""
    key = "receipt.flash"
    line = context.case.line.receipt
    if line is None:
        return _draft(key, skip=say("skip", "no-receipt"))
    if context.case.tank.kind == "pressure-vessel":
        return _draft(key, skip=say("skip", "pressure-vessel"))
    lanes, i = context.lanes, context.i
    low, value, high = lanes.arrival.P[i]
    unknown, caps = _gas_state(context)
    caps += context.liquid_caps(RECEIPT)
    unknown = context.unmeasured(RECEIPT) or unknown
    if not math.isfinite(value):
        paths = context.missing("receipt_temperature")
        missing = say("unknown", "missing", paths=", ".join(paths)) if paths else ""
        unknown = missing or context.no_pressure(RECEIPT, lanes.arrival.status[i])
    lane = Lane(
        Condition("receipt", "", "on arrival", "tank inlet"), value, low, high, context.barometer,
        unknown=unknown, caps=caps, facts=_receipt_facts(context), tag=RECEIPT,
    )  # fmt: skip
    return _draft(key, lanes=(lane,), unknown=_barometer_missing(context), range_covers=("method",))


def _gas_state(context: Context) -> tuple[str, tuple[str, ...]]:
    """What the stated gas content does to the verdict: a reason for unknown, or caps."""
    stated = context.case.line.receipt.dissolved_gas
    if stated is None:
        return say("unknown", "dissolved-gas"), ()
    if stated == "in-blend" and not context.holds_gas():
        return say("unknown", "gas-blend"), ()
    if stated == "air-saturated":
        share = float(context.lanes.beta_gas[context.i])
        if not math.isfinite(share):
            return say("unknown", "gas-flash"), ()
        if share > 0.0:
            return "", (say("cap", "gas-comes-out", share=f"{100.0 * share:.2g} %"),)
    return "", ()


def _receipt_facts(context: Context) -> tuple[Fact, ...]:
    lanes, i = context.lanes, context.i
    came = lanes.arrival
    facts = [
        Fact("arrival temperature", context.input("receipt_temperature"), "K"),
        Fact("tank pressure", context.barometer, "Pa"),
        Fact("vapour fraction by moles, isenthalpic", float(came.beta[i, BEST]), "mol/mol"),
        Fact("temperature after the flash", float(came.T_after[i]), "K"),
        Fact(
            "vapour fraction by moles, isothermal",
            float(came.isothermal[i]),
            "mol/mol",
            say("note", "isothermal"),
        ),
        Fact("vapour fraction by moles, high end", float(came.beta[i, 2]), "mol/mol"),
    ]
    if context.case.line.receipt.dissolved_gas == "air-saturated":
        facts.append(Fact("vapour fraction with the dissolved air", float(lanes.beta_gas[i]), "mol/mol"))
    facts = [f for f in facts if math.isfinite(f.value)] + list(pressure_facts(context, RECEIPT))
    if came.beta[i, BEST] > 0.0:
        facts += vapour_facts(context, came.y[i])
    return tuple(facts)
