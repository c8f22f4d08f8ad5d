"""A finding's numbers as printed: the same in memo, command line and screens."""

from __future__ import annotations

from dataclasses import dataclass, replace

from screener.memo import numbers
from screener.memo.numbers import Quantity, Span

_LIMIT_WORDS = {"stay below": "at most", "stay above": "at least", "keep out of": "outside"}
_ABSENT = {"unknown": "?", "skipped": ""}  # an empty field must never look like a good one


@dataclass(frozen=True)
class FindingNumbers:
    """The numbers of one finding with the text printed for each."""

    value: Quantity
    low_to_high: Span
    limit: Span
    margin: Quantity
    room_used: Quantity


def _blank(item, verdict: str):
    if item.text != numbers.NONE:
        return item
    return replace(item, text=_ABSENT.get(verdict, numbers.NONE))


def limit_span(low, high, kind: str, unit: str, system: str, places: int | None = None) -> Span:
    """The limit in words: at most, at least or outside."""
    texts = [numbers.number(v, unit, system, places=places) for v in (low, high) if v is not None]
    words = _LIMIT_WORDS[kind]
    text = (
        f"{words} {' to '.join(texts)} {numbers.unit_text(unit, system)}".rstrip() if texts else numbers.NONE
    )
    return Span(low, high, unit, text)


def finding_numbers(finding, system: str = "si") -> FindingNumbers:
    """All numbers of a finding with one count of decimals, so that they can be compared by eye."""
    unit, verdict = finding.unit, finding.verdict
    side_by_side = (finding.value, finding.low, finding.high, finding.limit_low, finding.limit_high)
    places = numbers.decimals(side_by_side, unit, system)
    apart = numbers.difference_unit(unit)
    items = (
        numbers.quantity(finding.value, unit, system, places=places),
        numbers.span(finding.low, finding.high, unit, system, places=places),
        limit_span(finding.limit_low, finding.limit_high, finding.kind, unit, system, places),
        numbers.quantity(finding.margin, apart, system, places=places, sign=True),
        numbers.percent(finding.room_used),
    )
    return FindingNumbers(*(_blank(item, verdict) for item in items))


def worst_first(findings) -> tuple:
    """Findings by verdict, worst first; within a verdict the one with least room left first."""
    return tuple(
        sorted(findings, key=lambda f: (f.rank, -(f.room_used if f.room_used is not None else -1e9)))
    )


def verdict_counts(findings) -> str:
    """'1 beyond, 2 unknown, ...' for the verdicts that occur, worst first."""
    ordered = worst_first(findings)
    seen = dict.fromkeys(finding.verdict for finding in ordered)
    return ", ".join(f"{sum(f.verdict == verdict for f in ordered)} {verdict}" for verdict in seen)
