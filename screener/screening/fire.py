"""Findings about fire: the vapour space against its flammable range, its oxygen, the flash point, switch loading."""

from __future__ import annotations

import math

from screener.fire import purge_volumes
from screener.ground.constants import ZERO_CELSIUS
from screener.ground.status import Status
from screener.screening.context import MONTHS, Context
from screener.screening.criteria import criterion
from screener.screening.draft import Draft, Lane
from screener.screening.finding import Condition, Fact
from screener.screening.fire_words import ways_in
from screener.screening.measured import flash_caps, flash_facts, measured_note, pressure_facts
from screener.screening.vapour import FLOATING, _barometer_missing
from screener.screening.wording import lines, say
from screener.states.fire import COLD, HOT, INSIDE, RICH
from screener.states.flash import FLASH_SPREAD
from screener.states.lanes import BEST, HEEL, RECEIPT

ESTIMATES_CARRIED = 0.10  # share of the vapour that may rest on estimated limits before it caps a verdict
OXYGEN_OF_AIR = 0.2095  # dry air, where a purge starts; from memory, unverified [-]
FLASH_REFERENCE = 100.0  # below the flash point, where no room is used: own choice [K]
# Categories 1 and 2 of GHS and of 29 CFR 1910.106(a)(19) lie below this flash point (73.4 degF) [K].
ALWAYS_ABOVE = 23.0 + ZERO_CELSIUS
STATIC_ORDER = ("low vapour pressure", "intermediate vapour pressure", "high vapour pressure")


def _draft(key: str, **fields) -> Draft:
    fields.setdefault("caution", say("caution", key))
    return Draft(criterion(key), not_counted=lines("not-counted", key), **fields)


def space_liquids(context: Context) -> list[int]:
    """Liquids with a vapour space above them: under a floating roof those whose level leaves it on its legs."""
    if context.case.tank.kind not in FLOATING:
        return context.liquids()
    legs = context.input("roof_leg_height")
    return [k for k in context.liquids() if context.lanes.level[context.i, k] < legs]


def _closed_space(context: Context) -> tuple[str, str]:
    """Why a vapour space is not judged here, and why it cannot be told; '' where it can."""
    kind = context.case.tank.kind
    if kind == "pressure-vessel":
        return say("skip", "vessel-space"), ""
    if kind in FLOATING:
        missing = context.missing("roof_leg_height", "level_low")
        if missing:
            return "", say("unknown", "missing", paths=", ".join(missing))
        if not space_liquids(context):
            return say("skip", "roof-floats"), ""
    return "", _barometer_missing(context)


def space(context: Context, oxygen=None) -> Draft:
    """vapour-space.flammable: fuel share of the vapour space against its limits, over the span of temperatures.

    oxygen is the finding about the measured oxygen: a space it shows to be short of oxygen is judged there.
    """
    key = "vapour-space.flammable"
    skip, unknown = _closed_space(context)
    if skip or (oxygen is not None and oxygen.verdict in ("room", "near")):
        return _draft(key, skip=skip or say("skip", "inerted"))
    liquids = space_liquids(context)
    rows = tuple(_space_lane(context, k) for k in liquids)
    rich = any(int(context.fire.space.side[context.i, k]) == RICH for k in liquids)
    caution = say("caution", key) + (" " + say("fire", "passes", ways=ways_in(context)) if rich else "")
    return _draft(key, lanes=rows, unknown=unknown, caution=caution, range_covers=("weather", "inputs", "method"),
                  facts=_span_facts(context))  # fmt: skip


def span_missing(context: Context, k: int) -> list[str]:
    """What the span from the coldest to the hottest liquid lacks."""
    paths = context.surface_missing()
    if math.isnan(context.input("reading")):
        paths += context.missing("ambient_low")
    return list(dict.fromkeys(paths + context.own_missing(k)))


def _lane_unknown(context: Context, k: int, T: float, status: int) -> str:
    paths = span_missing(context, k)
    if paths:
        why = say("unknown", "missing", paths=", ".join(paths))
    elif context.unmeasured(k):
        why = context.unmeasured(k)
    elif math.isnan(T):
        why = say("unknown", "no-surface")
    else:
        why = say("unknown", "no-space", why=context._status_words(status))
    return say("unknown", "lane", liquid=context.liquid_name(k), why=why)


def _space_lane(context: Context, k: int) -> Lane:
    s, i = context.fire.space, context.i
    T, fuel, status = float(s.T[i, k]), float(s.fuel[i, k]), int(s.status[i, k])
    told = status == Status.CONVERGED and math.isfinite(fuel)
    caps, share = typical_span_cap(context) + context.misfit_caps(k), float(s.estimated[i, k])
    if share > ESTIMATES_CARRIED:
        caps += (say("cap", "estimates", share=f"{100.0 * share:.0f} %"),)
    when = _when(context, int(s.place[i, k])) if told else ""
    return Lane(
        context.condition(k, when, "vapour space"), fuel, float(s.low[i, k]), float(s.high[i, k]),
        float(s.LFL[i, k]), upper=float(s.UFL[i, k]), rich_caps=(say("fire", "rich", ways=ways_in(context)),),
        beyond=say("fire", "inside", T=f"{T - ZERO_CELSIUS:.1f} degC") if told else "",
        unknown="" if told and not context.unmeasured(k) else _lane_unknown(context, k, T, status), caps=caps,
        facts=_space_facts(context, k) + pressure_facts(context, k) if told else (), tag=k,
    )  # fmt: skip


def typical_span_cap(context: Context) -> tuple[str, ...]:
    """A range of typical days bounds neither end of the span."""
    return (say("cap", "typical-span"),) if context.typical_cap() else ()


def _when(context: Context, place: int) -> str:
    """Where in the span the worst temperature lies, in words."""
    reading = context.case.site.liquid_temperature
    if reading is not None and place in (COLD, HOT):
        return f"gauge reading of {reading.read_on}"
    weather, i = context.lanes.weather, context.i
    month = int((weather.month_cold if place == COLD else weather.month)[i])
    asked = f", {MONTHS[month - 1]}" if month else " of the year"
    return say("fire", {COLD: "coldest", HOT: "hottest"}.get(place, "between")) + asked


def _space_facts(context: Context, k: int) -> tuple[Fact, ...]:
    s, i = context.fire.space, context.i
    side = int(s.side[i, k])
    facts = [
        Fact("temperature of the worst", float(s.T[i, k]), "K"),
        Fact("state in equilibrium", say("state", {INSIDE: "inside", RICH: "rich"}.get(side, "lean"))),
        *_saturation(float(s.saturation_lower[i, k]), float(s.saturation_upper[i, k])),
        Fact("share of the vapour whose limit is an estimate", float(s.estimated[i, k]), "mol/mol"),
        Fact("density of the space over that of air", float(s.density[i, k]), "-"),
    ]  # fmt: skip
    if s.depleted[i, k]:
        facts.append(Fact("vapour space over liquid volume", float(s.ratio[i, k]), "-", say("note", "depleted")))
    return tuple(f for f in facts if not isinstance(f.value, float) or math.isfinite(f.value))


def _saturation(lower: float, upper: float) -> tuple[Fact, ...]:
    """Degrees of saturation at which the space is flammable: what a space not yet saturated goes through."""
    if lower >= 1.0:
        return (Fact("flammable degrees of saturation", say("fire", "none-flammable")),)
    return (
        Fact("flammable from this degree of saturation", 100.0 * lower, "%"),
        Fact("flammable up to this degree of saturation", 100.0 * min(upper, 1.0), "%", say("note", "saturation")),
    )


def _span_facts(context: Context) -> tuple[Fact, ...]:
    weather, i = context.lanes.weather, context.i
    facts = [
        Fact("coldest surface", float(weather.T_cold[i, BEST]), "K"),
        Fact("hottest surface", float(weather.T_surface[i, BEST]), "K"),
        Fact("lowest barometer", context.barometer, "Pa"),
    ]
    if context.case.tank.blanket is not None:
        facts.append(Fact("inert blanket", say("fire", "blanket-not-counted")))
    return tuple(f for f in facts if not isinstance(f.value, float) or math.isfinite(f.value))


def oxygen(context: Context) -> Draft:
    """vapour-space.oxygen: measured oxygen against the limiting oxygen of the vapour.

    Only under an inert blanket: without one, little oxygen means vapour in place of air, and air comes back.
    """
    key, case = "vapour-space.oxygen", context.case
    measured = context.input("vapour_space_oxygen")
    skip, unknown = _closed_space(context)
    if skip or case.tank.blanket is None:
        return _draft(key, skip=skip or say("skip", "no-blanket"))
    if math.isnan(measured):
        unknown = unknown or say("unknown", "blanket-oxygen", paths="tank.vapour_space_oxygen")
    rows = tuple(_oxygen_lane(context, k, measured) for k in space_liquids(context))
    return _draft(key, lanes=rows, unknown=unknown, range_covers=())


def _oxygen_lane(context: Context, k: int, measured: float) -> Lane:
    o, i = context.fire.oxygen, context.i
    limit, read = float(o.limit[i, k]), bool(o.read[i, k])
    unknown = ""
    if math.isnan(limit):
        paths = span_missing(context, k)
        why = say("unknown", "missing", paths=", ".join(paths)) if paths else say("unknown", "no-oxygen-limit")
        unknown = say("unknown", "lane", liquid=context.liquid_name(k), why=why)
    facts = [Fact("species that sets the limit", str(o.species[i, k]))] if not unknown else []
    if math.isfinite(limit):
        target = limit - criterion("vapour-space.oxygen").gap(limit)
        facts.append(Fact("volumes of nitrogen that bring air down to the limit less the gap",
                          float(purge_volumes(OXYGEN_OF_AIR, target)[0]), "-", say("note", "purge")))  # fmt: skip
    return Lane(
        context.condition(k, "as measured", "vapour space"), measured, measured, measured, limit,
        evidence="quoted" if read else "memory", unknown=unknown, facts=tuple(facts), tag=k,
    )  # fmt: skip


def flash(context: Context) -> Draft:
    """fire.flash-point: the hottest liquid against its flash point."""
    key = "fire.flash-point"
    if context.case.tank.kind == "pressure-vessel":
        return _draft(key, skip=say("skip", "pressure-vessel"))
    own = [k for k in context.liquids() if k in (RECEIPT, HEEL)]
    light = (context.fire.flash.T[context.i, k] < ALWAYS_ABOVE and not context.unmeasured_flash(k) for k in own)
    if all(light):
        # Mixtures of such liquids are no different; one that is contaminated by such a liquid is judged.
        return _draft(key, skip=say("skip", "always-above-flash"))
    rows = tuple(_flash_lane(context, k) for k in context.liquids())
    return _draft(key, lanes=rows, range_covers=("weather", "inputs", "method"))


def _flash_lane(context: Context, k: int) -> Lane:
    """The error of the flash point is carried by the range of the temperature."""
    lanes, f, i = context.lanes, context.fire.flash, context.i
    low, T, high = (float(v) for v in lanes.T_hot[i, k])
    limit, status = float(f.T[i, k]), int(f.status[i, k])
    unknown, caps = context.unmeasured_flash(k), context.typical_cap() + flash_caps(context, k)
    if unknown:
        limit, unknown = math.nan, say("unknown", "lane", liquid=context.liquid_name(k), why=unknown)
    elif math.isnan(T) or math.isnan(limit):
        paths = context.surface_missing() + context.own_missing(k)
        why = say("unknown", "no-flash", why=context._status_words(status))
        if paths:
            why = say("unknown", "missing", paths=", ".join(dict.fromkeys(paths)))
        elif math.isnan(T):
            why = say("unknown", "no-surface")
        unknown = say("unknown", "lane", liquid=context.liquid_name(k), why=why)
    if float(f.estimated[i, k]) > ESTIMATES_CARRIED:
        caps += (say("cap", "estimates", share=f"{100.0 * float(f.estimated[i, k]):.0f} %"),)
    facts = (
        Fact("flash point, low end of its range", float(f.T_low[i, k]) - FLASH_SPREAD, "K"),
        Fact("flash point, high end of its range", float(f.T_high[i, k]) + FLASH_SPREAD, "K"),
    )
    return Lane(
        context.condition(k, context.hottest_day, "liquid surface"), T,
        low - FLASH_SPREAD - (float(f.T_high[i, k]) - limit), high + FLASH_SPREAD + (limit - float(f.T_low[i, k])),
        limit, reference=limit - FLASH_REFERENCE, unknown=unknown, caps=caps, beyond=say("fire", "above-flash-point"),
        facts=tuple(fact for fact in facts if math.isfinite(fact.value)) + flash_facts(context, k), tag=k,
    )  # fmt: skip


def switch_loading(context: Context) -> Draft:
    """switch-loading: vapour left by previous contents of a higher vapour class than the receipt."""
    key, old = "switch-loading", context.fire.previous[context.i]
    if old is None:
        nothing = context.case.tank.previous_contents is None
        return _draft(key, skip=say("skip", "no-previous" if nothing else "no-receipt"))
    facts = (
        Fact("vapour class of the previous contents", old.static, "", old.title),
        Fact("vapour class of the receipt", old.static_receipt),
        Fact("flash point of the previous contents", old.T_flash, "K"),
        Fact("flash point of the receipt", old.T_flash_receipt, "K", measured_note(context.case.blend, "flash_point")),
        Fact("Reid vapour pressure of the previous contents", old.P_reid, "Pa"),
        Fact("Reid vapour pressure of the receipt", old.P_reid_receipt, "Pa",
             measured_note(context.case.blend, "dvpe", "rvp")),
    )
    facts = tuple(f for f in facts if not isinstance(f.value, float) or math.isfinite(f.value))
    classes = old.static, old.static_receipt
    if not set(classes) <= set(STATIC_ORDER):
        why = context.unmeasured_flash(RECEIPT) or say("unknown", "static-class")
        return _draft(key, unknown=why, facts=facts)
    before, now = map(STATIC_ORDER.index, classes)
    if now >= before:
        return _draft(key, skip=say("skip", "same-class" if now == before else "higher-class"), facts=facts)
    unknown = _barometer_missing(context)
    if not unknown and math.isnan(old.fuel[BEST]):
        paths = context.surface_missing()
        unknown = say("unknown", "missing", paths=", ".join(paths)) if paths else say("unknown", "no-surface")
    low, value, high = (min(float(v), 1.0) for v in old.fuel)
    lane = Lane(
        Condition(old.title, "", context.hottest_day, "vapour space"), value, low, high, old.LFL,
        caps=(say("cap", "switch"),) + context.typical_cap(), beyond=say("fire", "switch"), unknown=unknown,
        tag=RECEIPT,
    )  # fmt: skip
    return _draft(key, lanes=(lane,), unknown=unknown, facts=facts, range_covers=("weather", "method"))
