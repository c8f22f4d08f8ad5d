"""From numbers to a verdict. No physics here, and no way around the rules.

room     the whole low-high range lies on the good side with the gap asked for
near     the value lies on the good side, but the range crosses the limit, the
         gap is smaller than asked, or the limit was not read in its source
beyond   the value lies on the wrong side or on the limit itself
unknown  a number is missing: then no good verdict can follow
"""

from __future__ import annotations

import math
from dataclasses import dataclass

from screener.screening.finding import READ_EVIDENCE, Verdict
from screener.screening.wording import say


@dataclass(frozen=True)
class Judgement:
    """Verdict with the numbers it rests on, in the unit of the values given."""

    verdict: Verdict
    reason: str
    margin: float | None  # positive on the good side
    margin_at_edge: float | None  # margin of the worse end of the range
    room_used: float | None
    room_used_low: float | None
    room_used_high: float | None


def _number(value) -> float | None:
    if value is None or not math.isfinite(value):
        return None
    return float(value)


def judge(value, low, high, limit, *, kind, reference, gap, evidence, caps=()) -> Judgement:
    """Judge one value with its range against one limit.

    kind is 'stay below' or 'stay above'; reference is the point where no room
    is used; caps are sentences, each of which alone keeps the verdict from
    being better than near.
    """
    value, low, high, limit = (_number(v) for v in (value, low, high, limit))
    if value is None or limit is None:
        return Judgement("unknown", "", None, None, None, None, None)
    sign = 1.0 if kind == "stay below" else -1.0
    worse = None if low is None or high is None else (high if sign > 0 else low)
    margin = sign * (limit - value)
    at_edge = None if worse is None else sign * (limit - worse)
    span = limit - reference

    def used(v):
        return (v - reference) / span if v is not None and span else None

    ends = (
        sorted((used(low), used(high))) if used(low) is not None and used(high) is not None else [None, None]
    )
    verdict, reason = _verdict(margin, at_edge, gap, evidence, tuple(caps))
    return Judgement(verdict, reason, margin, at_edge, used(value), *ends)


def _verdict(margin, at_edge, gap, evidence, caps) -> tuple[Verdict, str]:
    if margin <= 0.0:
        return "beyond", say("judge", "beyond")
    if at_edge is None:
        return "unknown", say("judge", "edge-missing")
    if at_edge <= 0.0:
        return "near", say("judge", "crosses")
    if at_edge < gap:
        return "near", say("judge", "thin")
    if evidence not in READ_EVIDENCE:
        return "near", say("judge", "unread")
    if caps:
        return "near", caps[0]
    return "room", say("judge", "room")


def judge_keep_out(
    value, low, high, limit_low, limit_high, *, gap, evidence, caps=(), rich_caps=()
) -> Judgement:
    """Judge a value that has to stay out of an interval, by staying below it or above it.

    rich_caps hold on the upper side only: they are the ways through the
    interval that a value above it can still take, so that side is at best
    near. Room used is value/limit below the interval and limit/value above it.
    """
    value, low, high, limit_low, limit_high = (_number(v) for v in (value, low, high, limit_low, limit_high))
    if value is None or limit_low is None or limit_high is None or not 0.0 < limit_low < limit_high:
        return Judgement("unknown", "", None, None, None, None, None)
    inside = limit_low <= value <= limit_high
    below = value < limit_low
    edges = [e for e in (low, high) if e is not None]

    def margin_of(v):
        """Distance out of the interval, on the side the best value lies on."""
        return limit_low - v if below else v - limit_high

    def used(v):
        return v / limit_low if below or inside or not v else limit_high / v

    if inside:
        margin = -min(value - limit_low, limit_high - value)
        return Judgement("beyond", say("judge", "inside"), margin, margin, used(value), *_ends(used, edges))
    at_edge = min(margin_of(e) for e in edges) if len(edges) == 2 else None
    caps = tuple(caps) if below else tuple(rich_caps) + tuple(caps)
    verdict, reason = _verdict(margin_of(value), at_edge, gap, evidence, caps)
    if verdict == "room" and not below:
        # Nothing that is too rich to burn counts as room: it passes through the interval on its way out.
        verdict, reason = "near", say("judge", "rich")
    return Judgement(verdict, reason, margin_of(value), at_edge, used(value), *_ends(used, edges))


def _ends(used, edges) -> list[float | None]:
    return sorted(used(e) for e in edges) if len(edges) == 2 else [None, None]
