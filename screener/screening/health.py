"""Finding about health: what stands in the vapour space against dated exposure limits."""

from __future__ import annotations

import math

import numpy as np

from screener.screening.context import Context
from screener.screening.criteria import criterion
from screener.screening.draft import Draft, Lane
from screener.screening.finding import Fact, Information
from screener.screening.measured import pressure_facts, with_doubt
from screener.screening.vapour import _barometer_missing
from screener.screening.wording import lines, say
from screener.species.pseudo import is_cut
from screener.states.fire import HOT
from screener.states.lanes import BEST, HEEL, LIQUIDS, RECEIPT, SOUR_GAS, method_spread
from screener.states.pressures import LEAST_LEFT

JUDGED = ("TWA", "STEL", "ceiling", "peak")  # kinds of limit; IDLH is no limit of exposure and is only shown
# Mark of a limit in the table of exposure limits -> mark of a finding; anything else counts as remembered.
MARKS = {"quoted": "quoted", "library": "quoted"}
SHOWN = ("benzene", "n-hexane", "toluene", "xylenes", "ethylbenzene", SOUR_GAS)


def hatch(context: Context) -> Draft:
    """exposure.hatch: the worst ratio of a concentration in the vapour space to an exposure limit."""
    key = "exposure.hatch"
    fields = {"caution": say("caution", key), "not_counted": lines("not-counted", key)}
    if context.case.tank.kind == "pressure-vessel":
        return Draft(criterion(key), skip=say("skip", "pressure-vessel"), **fields)
    unknown = _barometer_missing(context) or sour_unknown(context)
    if context.case.tank.open_gauging is not True and not sour_unknown(context):
        said = "hatch-not-stated" if context.case.tank.open_gauging is None else "hatch-closed"
        return Draft(criterion(key), skip=say("skip", said), **fields)
    unknown = unknown or _unnamed(context)
    found = limits_of(context)
    if not found:
        return Draft(criterion(key), skip="" if unknown else say("skip", "no-exposure-limit"), unknown=unknown, **fields)
    ratios = np.array([e.ratio[_at(context, 0) : _at(context, len(LIQUIDS))] for e in found])
    rows = tuple(_lane(context, k, found, ratios[:, k]) for k in context.liquids())
    return Draft(criterion(key), lanes=rows, unknown=unknown, range_covers=("weather", "inputs", "method"), **fields)


def sour_unknown(context: Context) -> str:
    """A tank in sour service whose hydrogen sulfide is in no number."""
    if context.case.tank.sour_service is not True or states_sour_gas(context):
        return ""
    return say("unknown", "sour", paths="blend.h2s_in_liquid")


def _unnamed(context: Context) -> str:
    """A liquid described by cuts hides what it is made of."""
    lanes, i = context.lanes, context.i
    there = (lanes.z[i, context.liquids()] > 0.0).any(axis=0)
    hidden = any(is_cut(name) for name, is_there in zip(lanes.names, there.tolist()) if is_there)
    return say("unknown", "unnamed-substances") if hidden else ""


def states_sour_gas(context: Context) -> bool:
    """Whether the case says how much hydrogen sulfide is dissolved, by a number or among the parts."""
    case = context.case
    blends = [case.blend] + ([case.tank.contents.blend] if case.tank.contents is not None else [])
    return case.hydrogen_sulfide is not None or any(SOUR_GAS in b.names or b.figure("h2s") for b in blends)


def limits_of(context: Context):
    """Exposures whose substance is in a liquid of this case."""
    lanes, i = context.lanes, context.i
    there = (lanes.z[i, context.liquids()] > 0.0).any(axis=0)
    here = {name for name, is_there in zip(lanes.names, there.tolist()) if is_there}
    return [e for e in context.fire.exposures if e.limit.kind in JUDGED and here & set(e.limit.members)]


def _at(context: Context, k: int) -> int:
    """Place of a liquid of this case among the lanes of an exposure."""
    return context.i * len(LIQUIDS) + k


def _lane(context: Context, k: int, found, ratios) -> Lane:
    from screener.screening.fire import span_missing

    i, at = context.i, _at(context, k)
    condition = context.condition(k, context.hottest_day, "vapour space")
    if not np.isfinite(ratios).all():
        paths = span_missing(context, k)
        status = context.fire.space.status[i, k]
        why = say("unknown", "missing", paths=", ".join(paths)) if paths else say(
            "unknown", "no-space", why=context._status_words(status))  # fmt: skip
        return Lane(condition, unknown=say("unknown", "lane", liquid=context.liquid_name(k), why=why), tag=k)
    worst, value = _worst(found, ratios.tolist())
    limit = worst.limit
    low, high = _range(context, k)
    beyond = say("health", "beyond", substance=limit.of, kind=limit.kind, agency=limit.agency, date=limit.date)
    # One species decides, not the light end: what is beyond stays beyond, with what is doubtful said.
    doubtful = say("unknown", "unmeasured-hatch") if context.unmeasured(k) else ""
    return Lane(
        condition, value, value * low, value * high, 1.0, unknown=doubtful,
        evidence=MARKS.get(limit.evidence, "memory"), beyond=beyond, caps=context.typical_cap() + context.misfit_caps(k),
        facts=_facts(context, worst, found, at) + pressure_facts(context, k), tag=k,
    )  # fmt: skip


def _worst(found, ratios):
    """The worst limit that was read; a remembered one only where no limit read is passed."""
    read = [(r, j) for j, (e, r) in enumerate(zip(found, ratios)) if e.limit.evidence in MARKS]
    every = [(r, j) for j, r in enumerate(ratios)]
    ratio, j = max(read, default=(0.0, 0))
    if ratio < 1.0:
        ratio, j = max(every)
    return found[j], ratio


def _range(context: Context, k: int) -> tuple[float, float]:
    """Factors of the low and high end: range of the temperature and of the method, as on the vapour pressure.

    A measured vapour pressure below the computed one need not be short of this substance: the high
    end is that of the computed one.
    """
    low, high = _method_range(context, k)
    return low, high / min(float(context.lanes.measured.factor[context.i, k]), 1.0)


def _method_range(context: Context, k: int) -> tuple[float, float]:
    lanes, i = context.lanes, context.i
    P = lanes.P_hot[i, k]
    if np.isfinite(P).all() and P[BEST] > 0.0:
        return float(P[0] / P[BEST]), float(P[2] / P[BEST])
    s = float(method_spread(lanes, context.fire.space.y[i, k, HOT][None, :], i, k)[0])
    return max(1.0 - s, LEAST_LEFT), 1.0 + s


def hatch_information(context: Context) -> tuple[Information, ...]:
    """The same concentrations where nobody is said to open a hatch: numbers without a verdict."""
    if context.case.tank.open_gauging is True or context.case.tank.kind == "pressure-vessel":
        return ()
    rows = []
    for k in (k for k in context.liquids() if k in (RECEIPT, HEEL)):
        facts = _substances(context, limits_of(context), _at(context, k))
        facts = tuple(f for f in facts if math.isfinite(f.value) and f.value > 0.0)
        if facts:
            title = say("health", "information", liquid=context.liquid_name(k))
            rows.append(Information(title, facts, with_doubt("hatch", context.parts(k)[0][1])))
    return tuple(rows)


def _substances(context: Context, found, at: int) -> list[Fact]:
    """Concentrations of the substances named most, each with the limit it passes by most."""
    facts = []
    for name in (name for name in SHOWN if any(e.limit.of == name for e in found)):
        one = max((e for e in found if e.limit.of == name), key=lambda e: float(e.ratio[at]))
        limit = one.limit
        note = f"{limit.kind} {limit.ppm:g} ppm, {limit.agency}, {limit.date}, {limit.evidence}"
        facts.append(Fact(f"{name}, by volume", float(one.ppm[at]), "ppm", note))
        facts.append(Fact(f"{name}, by mass", float(one.mg_m3[at]), "mg/m3", f"limit {limit.mg_m3:.3g} mg/m3"))
    return facts


def _facts(context: Context, worst, found, at: int) -> tuple[Fact, ...]:
    """The worst limit, and with a full screening the concentrations of the substances named most."""
    limit = worst.limit
    facts = [
        Fact("substance and limit", f"{limit.of}, {limit.kind}, {limit.agency}, {limit.date}", "", limit.evidence),
        Fact("that limit", limit.ppm, "ppm"),
        Fact("in the vapour space", float(worst.ppm[at]), "ppm"),
        Fact("volumes of air and vapour that bring it to the limit", float(worst.dilution[at]), "-"),
    ]
    if context.full:
        facts += _substances(context, found, at)
        if not states_sour_gas(context):
            facts.append(Fact(SOUR_GAS, say("health", "sour-not-stated")))
    return tuple(f for f in facts if not isinstance(f.value, float) or math.isfinite(f.value))
