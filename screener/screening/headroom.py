"""What moves a finding most, and which single change would restore its room.

The numbers come from the same bubble points as the findings: knob values are
lanes. A change is printed only where the calculation reached it.
"""

from __future__ import annotations

import math
from dataclasses import replace

import numpy as np

from screener.ground.constants import GRAVITY, ZERO_CELSIUS
from screener.screening.context import Context
from screener.screening.criteria import criterion
from screener.screening.finding import Finding, Headroom
from screener.screening.fire_headroom import fire_headroom
from screener.screening.vapour import OTHER_ROOF
from screener.screening.wording import say
from screener.states.lanes import LIQUIDS, method_spread
from screener.states.quantities import flows, table
from screener.states.scaled import bubble_pressure, bubble_temperature

_PRESSURE = ("boiling.surface", "vapour-pressure.legal", "vapour-pressure.hottest", "receipt.flash")
_FIRE = ("vapour-space.flammable", "fire.flash-point")
_SHARE_STEPS = np.linspace(0.0, 1.0, 17)  # of the share the species has now


def with_headroom(context: Context, stream, findings: tuple[Finding, ...]) -> tuple[Finding, ...]:
    """The findings with `moved_by` and `headroom` filled in where they can be worked out."""
    knobs = _draw_knobs(context)
    return tuple(_extend(context, stream, finding, knobs) for finding in findings)


def _extend(context: Context, stream, finding: Finding, knobs) -> Finding:
    if finding.value is None or finding.asked_gap is None or finding.verdict == "skipped":
        return finding
    family = next((key for key in _PRESSURE if finding.id.startswith(key)), finding.id)
    if family in _PRESSURE:
        moved, rooms = _pressure(context, finding, family)
    elif family in ("vapour-lock.suction", "npsh.pump"):
        moved, rooms = _suction(context, stream, finding, knobs)
    elif family in ("vents.outbreathing", "vents.inbreathing"):
        moved, rooms = _breathing(context, stream, finding)
    elif family in _FIRE:
        moved, rooms = fire_headroom(context, finding, _liquid(context, finding))
    else:
        return finding
    if not _short_of_room(finding):
        rooms = ()
    return replace(finding, moved_by=moved, headroom=rooms)


def _short_of_room(finding: Finding) -> bool:
    """Whether the numbers themselves lack room: a change of a knob does not lift a cap or tell an unknown."""
    if finding.verdict not in ("beyond", "near"):
        return False
    if finding.kind == "keep out of":
        return True
    worse = finding.high if finding.kind == "stay below" else finding.low
    limit = finding.limit_high if finding.kind == "stay below" else finding.limit_low
    return (
        worse is None
        or abs(limit - worse) < finding.asked_gap
        or (worse > limit) == (finding.kind == "stay below")
    )


def _liquid(context: Context, finding: Finding) -> int:
    """Index of the liquid a finding names as worst."""
    wanted = finding.condition
    for k, (_, level) in enumerate(LIQUIDS):
        if context.liquid_name(k) == wanted.liquid and level in ("", wanted.level):
            return k
    return 0


def _fact(finding: Finding, *labels: str) -> float:
    """Value of the first fact with one of the labels, NaN if there is none."""
    found = (fact.value for fact in finding.facts if fact.label in labels)
    return next((value for value in found if isinstance(value, float)), math.nan)


def _lightest(lanes, z, y) -> int:
    """The species whose share raises the pressure most: largest excess of vapour over liquid share."""
    return int(np.nanargmax(np.where(z > 0.0, y - z, -np.inf)))


def _pressure(context: Context, finding: Finding, family: str):
    lanes, i, k = context.lanes, context.i, _liquid(context, finding)
    T = _fact(finding, "highest of its range", "highest monthly mean air temperature", "arrival temperature")
    if math.isnan(T):
        return (), ()
    z, fluid, factor = lanes.z[i, k], lanes.fluid, lanes.measured.factor[i, k]
    here = bubble_pressure(fluid, T, z, factor)
    if not here.ok[0]:
        return (), ()
    light = _lightest(lanes, z, here.y[0])
    spread = float(method_spread(lanes, here.y, i, k)[0])
    target = (finding.limit_high - finding.asked_gap) / (1.0 + spread)
    more = z.copy()
    more[light] += 0.01
    shares = z[light] * _SHARE_STEPS
    knobs = np.repeat(z[None, :], len(shares), axis=0)
    knobs[:, light] = shares
    with np.errstate(invalid="ignore"):  # a liquid of one species without that species is no liquid
        batch = np.vstack([z, more / more.sum(), knobs / knobs.sum(axis=1, keepdims=True)])
    answer = bubble_pressure(fluid, np.concatenate([[T + 1.0, T], np.full(len(shares), T)]), batch, factor)
    name = fluid.names[light]
    moved = _moved(here.P[0], answer.P[:2], name)
    rooms = _other_roof(finding, family)
    if family == "receipt.flash" and lanes.beta_gas[i] > 0.0:
        return moved, ()  # dissolved gas comes out whatever the liquid's own vapour pressure is
    limit_T = bubble_temperature(fluid, target, z, factor)
    if limit_T.ok[0] and not limit_T.T[0] < _coldest_useful(context):
        knob = "receipt-temperature" if family == "receipt.flash" else "surface-temperature"
        if family == "vapour-pressure.legal":
            knob = "monthly-temperature"
        rooms.append(_room(knob, float(limit_T.T[0]), "K", f"{limit_T.T[0] - ZERO_CELSIUS:.1f} degC"))
    share = _share_for(shares, answer.P[2:], answer.ok[2:], target)
    if share is not None:
        sentence = say(
            "headroom",
            "share",
            species=name,
            value=f"{100 * share:.2g} mol%",
            now=f"{100 * z[light]:.2g} mol%",
        )
        rooms.append(Headroom(f"share of {name}", share, "mol/mol", sentence))
    return moved, tuple(rooms)


def _other_roof(finding: Finding, family: str) -> list[Headroom]:
    """An internal floating roof, where the rule's limit for it leaves the gap asked for."""
    other = _fact(finding, OTHER_ROOF)
    if math.isnan(other) or finding.high + criterion(family).gap(other) > other:
        return []
    return [_room("floating-roof", other, "Pa", f"{other / 1000.0:.1f} kPa")]


def _coldest_useful(context: Context) -> float:
    """A temperature below the site's own range is no advice; NaN where the range is not given. [K]"""
    return context.input("ambient_low")


def _moved(P, changed, name) -> tuple[str, ...]:
    steps = [
        (abs(changed[0] - P), say("moved", "temperature", change=f"{(changed[0] - P) / 1000:+.2f} kPa")),
        (
            abs(changed[1] - P),
            say("moved", "share", species=name, change=f"{(changed[1] - P) / 1000:+.2f} kPa"),
        ),
    ]
    return tuple(text for size, text in sorted(steps, reverse=True) if math.isfinite(size))


def _share_for(shares, P, ok, target):
    """Largest share at which the pressure stays at or below the target; None where none does."""
    good = ok & (P <= target)
    if not good.any() or good.all():
        return None
    last = int(np.flatnonzero(good)[-1])
    if last + 1 >= len(shares) or not ok[last + 1]:
        return float(shares[last])
    part = (target - P[last]) / (P[last + 1] - P[last])
    return float(shares[last] + part * (shares[last + 1] - shares[last]))


def _room(knob: str, value: float, unit: str, shown: str) -> Headroom:
    return Headroom(knob, value, unit, say("headroom", knob, value=shown))


def _suction(context: Context, stream, finding: Finding, knobs):
    """A higher lowest level, a cooler liquid or a slower draw gives the line its pressure back."""
    lanes, i, k = context.lanes, context.i, _liquid(context, finding)
    s, lock = stream.suction, finding.id == "vapour-lock.suction"
    weight = float(s.density[i, k]) * GRAVITY
    wanted = finding.limit_low + finding.asked_gap
    spread = float(method_spread(lanes, lanes.y_hot[i, k][None, :], i, k)[0])
    rooms = []
    metres = (wanted - _number(finding.low)) / (weight if lock else 1.0)
    level = context.input("level_low") + metres
    if metres > 0.0 and level <= context.input("level_high"):
        rooms.append(_room("level", level, "m", f"{level:.2f} m"))
    lowest = float(s.lowest[i, k]) if lock else float(s.npsh[i, k, 1]) * weight + float(lanes.P_hot[i, k, 1])
    target = (lowest - wanted * (1.0 if lock else weight)) / (1.0 + spread)
    if math.isfinite(target) and target > 0.0:
        answer = bubble_temperature(lanes.fluid, target, lanes.z[i, k], lanes.measured.factor[i, k])
        if answer.ok[0]:
            rooms.append(
                _room("liquid-temperature", float(answer.T[0]), "K", f"{answer.T[0] - ZERO_CELSIUS:.1f} degC")
            )
    rates, reached = _draw_rates(context, knobs, k, lock)
    rooms += _slower_draw(rates, reached, wanted)
    return _suction_moved(context, reached, weight, k, lock), tuple(rooms)


# Draw rates tried, as shares of the rate of the case: one above it for the sensitivity, the rest for the way back.
_DRAW_STEPS = np.array([1.1, 1.0, 0.9, 0.8, 0.7, 0.6, 0.5, 0.4, 0.3, 0.2, 0.1])


def _draw_knobs(context: Context):
    """The case at each of the draw rates tried, as one more batch of lanes; None where nothing is drawn."""
    rate = context.input("draw_rate")
    if context.case.line.suction is None or math.isnan(rate):
        return None
    case = context.case
    tried = [replace(case, line=replace(case.line, draw_rate=rate * share)) for share in _DRAW_STEPS]
    return flows(table(tried))


def _draw_rates(context: Context, knobs, k: int, lock: bool):
    """Draw rates (m,) [m3/s] and the low end of the finding at each (m,)."""
    rates = context.input("draw_rate") * _DRAW_STEPS
    reached = (knobs.suction.room if lock else knobs.suction.npsh)[:, k, 0]
    return rates, reached


def _slower_draw(rates, reached, wanted) -> list[Headroom]:
    """The fastest draw at which the low end keeps the gap, between the rates tried."""
    good = np.isfinite(reached) & (reached >= wanted)
    if not good.any() or good[1]:
        return []
    first = int(np.flatnonzero(good)[0])
    part = (wanted - reached[first]) / (reached[first - 1] - reached[first])
    rate = (
        float(rates[first] + part * (rates[first - 1] - rates[first]))
        if math.isfinite(part)
        else float(rates[first])
    )
    return [_room("draw-rate", rate, "m3/s", f"{3600.0 * rate:.0f} m3/h")]


def _suction_moved(context: Context, reached, weight: float, k: int, lock: bool) -> tuple[str, ...]:
    """Sensitivities of a suction finding, largest first: warmer liquid, lower level, faster draw."""
    lanes, i = context.lanes, context.i
    T = float(lanes.T_hot[i, k, 1])
    warmer = bubble_pressure(lanes.fluid, np.array([T, T + 1.0]), lanes.z[i, k], lanes.measured.factor[i, k])
    per = 1.0e-3 if lock else 1.0 / weight
    unit = "kPa" if lock else "m"
    steps = (
        ("temperature", -(warmer.P[1] - warmer.P[0]) * per),
        ("level", -weight * per),
        ("draw", (reached[0] - reached[1]) * (1.0e-3 if lock else 1.0)),
    )
    steps = sorted((step for step in steps if math.isfinite(step[1])), key=lambda step: -abs(step[1]))
    return tuple(say("moved", name, change=f"{change:+.2f} {unit}") for name, change in steps)


def _breathing(context: Context, stream, finding: Finding):
    """Out- and in-breathing follow the rate in proportion, the thermal part apart."""
    b, i = stream.breathing, context.i
    out = finding.id == "vents.outbreathing"
    name, key = ("receipt_rate", "receipt-rate") if out else ("draw_rate", "draw-rate")
    rate, k = context.input(name), _liquid(context, finding)
    thermal = float(b.out_thermal[i] if out else b.into_thermal[i, k])
    moving = _number(finding.high) - thermal
    left = _number(finding.limit_high) - _number(finding.asked_gap) - thermal
    moved = (say("moved", key, change=f"{0.1 * moving * 3600.0:+.0f} Nm3/h air"),) if moving > 0.0 else ()
    if not (moving > 0.0 and 0.0 < left < moving):
        return moved, ()
    slower = rate * left / moving
    return moved, (_room(key, slower, "m3/s", f"{3600.0 * slower:.0f} m3/h"),)


def _number(value) -> float:
    """NaN for a number that does not exist."""
    return math.nan if value is None else float(value)
