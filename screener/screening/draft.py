"""From the lanes of one case to one finding: every liquid judged, the worst one shown."""

from __future__ import annotations

import math
from dataclasses import dataclass, field, replace

from screener.screening.criteria import Criterion
from screener.screening.finding import WORST_FIRST, Condition, Fact, Finding, Headroom
from screener.screening.judge import Judgement, judge, judge_keep_out
from screener.screening.wording import say


@dataclass(frozen=True)
class Lane:
    """One liquid of one case as a criterion sees it, in the criterion's unit."""

    condition: Condition
    value: float = math.nan
    low: float = math.nan
    high: float = math.nan
    limit: float = math.nan
    upper: float = math.nan  # upper end of an interval to keep out of; limit is then its lower end
    rich_caps: tuple[str, ...] = ()  # caps that hold above such an interval only
    evidence: str = ""  # mark of this lane's own limit, '' for that of the draft
    beyond: str = ""  # what being on the wrong side means here, '' for the general words
    reference: float = 0.0
    unknown: str = ""  # why this lane cannot be told, '' if it can
    caps: tuple[str, ...] = ()  # each keeps the lane from being better than near
    facts: tuple[Fact, ...] = ()
    tag: int = 0  # index of the liquid in the table of lanes


@dataclass(frozen=True)
class Draft:
    """Everything one finding needs before its verdict is known."""

    criterion: Criterion
    lanes: tuple[Lane, ...] = ()
    id: str = ""
    title: str = ""
    skip: str = ""  # why the criterion does not apply, '' if it does
    unknown: str = ""  # why the whole finding cannot be told, '' if it can
    evidence: str = ""
    source: str = ""
    caution: str = ""
    range_covers: tuple[str, ...] = ()
    inputs_assumed: tuple[str, ...] = ()
    facts: tuple[Fact, ...] = ()
    moved_by: tuple[str, ...] = ()
    headroom: tuple[Headroom, ...] = ()
    not_counted: tuple[str, ...] = ()
    sources: tuple[str, ...] = field(default=())

    @property
    def limit_evidence(self) -> str:
        return self.evidence or self.criterion.evidence


def _judge_lane(draft: Draft, lane: Lane) -> Judgement:
    c = draft.criterion
    gap = c.gap(lane.limit if c.scale == "percent" else lane.limit - lane.reference)
    if c.kind == "keep out of":
        judged = judge_keep_out(
            lane.value, lane.low, lane.high, lane.limit, lane.upper,
            gap=gap, evidence=lane.evidence or draft.limit_evidence, caps=lane.caps, rich_caps=lane.rich_caps,
        )  # fmt: skip
    else:
        judged = judge(
            lane.value, lane.low, lane.high, lane.limit,
            kind=c.kind, reference=lane.reference, gap=gap, evidence=lane.evidence or draft.limit_evidence,
            caps=lane.caps,
        )  # fmt: skip
    if judged.verdict == "beyond" and say("unknown", "unmeasured") in lane.unknown:
        # The number of a composition nobody measured the light end of is told, but no verdict is taken from it.
        return replace(judged, verdict="unknown", reason=say("unknown", "unmeasured-beyond", why=lane.unknown))
    if judged.verdict == "beyond":
        # Beyond outranks unknown, but what makes the number doubtful is said with it.
        split = tuple(cap for cap in lane.caps if cap == say("cap", "splits"))
        return replace(judged, reason="; ".join((lane.beyond or judged.reason, *filter(None, (lane.unknown,)), *split)))
    if not (lane.unknown or judged.verdict == "unknown"):
        return judged
    return replace(
        judged, verdict="unknown", reason=lane.unknown or judged.reason or say("judge", "number-missing")
    )


def worst_lane(draft: Draft) -> tuple[Lane, Judgement] | None:
    """The lane with the worst verdict; among equals the one with most room used."""
    judged = [(lane, _judge_lane(draft, lane)) for lane in draft.lanes]
    if not judged:
        return None

    def key(pair):
        used = pair[1].room_used_high
        used = pair[1].room_used if used is None else used
        return WORST_FIRST.index(pair[1].verdict), -(used if used is not None else -math.inf)

    return min(judged, key=key)


def finish(draft: Draft) -> Finding:
    """Judge every lane of a draft and write the finding of the worst."""
    if draft.skip:
        return _finding(draft, Lane(Condition()), Judgement("skipped", draft.skip, *[None] * 5))
    worst = worst_lane(draft)
    if worst is None or draft.unknown and worst[1].verdict != "beyond":
        lane = worst[0] if worst else Lane(Condition())
        reason = draft.unknown or say("judge", "nothing")
        judged = worst[1] if worst else Judgement("unknown", reason, *[None] * 5)
        return _finding(draft, lane, replace(judged, verdict="unknown", reason=reason))
    return _finding(draft, *worst)


def _number(value) -> float | None:
    return float(value) if value is not None and math.isfinite(value) else None


def _finding(draft: Draft, lane: Lane, judged: Judgement) -> Finding:
    c = draft.criterion
    limit = _number(lane.limit)
    gap = None
    if limit is not None:
        gap = c.gap(limit if c.scale == "percent" else limit - lane.reference)
    return Finding(
        id=draft.id or c.id,
        title=draft.title or c.title,
        quantity=c.quantity,
        value=_number(lane.value),
        low=_number(lane.low),
        high=_number(lane.high),
        range_covers=draft.range_covers,
        limit_low=None if c.kind == "stay below" else limit,
        limit_high={"stay below": limit, "keep out of": _number(lane.upper)}.get(c.kind),
        kind=c.kind,
        evidence=lane.evidence or draft.limit_evidence,
        margin=judged.margin,
        asked_gap=gap,
        room_used=judged.room_used,
        room_used_low=judged.room_used_low,
        room_used_high=judged.room_used_high,
        scale=c.scale,
        unit=c.unit,
        verdict=judged.verdict,
        reason=judged.reason,
        basis=c.basis,
        source=draft.source or c.source,
        caution=draft.caution,
        condition=lane.condition,
        inputs_assumed=draft.inputs_assumed,
        facts=lane.facts + draft.facts,
        moved_by=draft.moved_by,
        headroom=draft.headroom,
        not_counted=draft.not_counted,
        sources=tuple(dict.fromkeys(c.source_keys + draft.sources)),
    )
