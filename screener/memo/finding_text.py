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


def limit_span(
    low, high, kind: str, unit: str, system: str, places: int | None = None, *, bare=False
) -> Span:
    """The limit in words: at most, at least or outside."""
    texts = [numbers.number(v, unit, system, places=places) for v in (low, high) if v is not None]
    label = "" if bare else numbers.unit_text(unit, system)
    text = f"{_LIMIT_WORDS[kind]} {' to '.join(texts)} {label}".rstrip() if texts else numbers.NONE
    return Span(low, high, unit, text)


def finding_numbers(finding, system: str = "si", *, bare: bool = False) -> FindingNumbers:
    """All numbers of a finding with one count of decimals, so that they can be compared by eye.

    bare leaves out the unit of the finding, for tables that have a column for
    it; a margin in another unit (K of temperatures in degC) keeps its own.
    """
    unit, verdict = finding.unit, finding.verdict
    side_by_side = (finding.value, finding.low, finding.high, finding.limit_low, finding.limit_high)
    places = numbers.decimals(side_by_side, unit, system)
    apart = numbers.difference_unit(unit)
    # What cannot be told has no margin to show, even where value and limit exist.
    margin, used = (None, None) if verdict == "unknown" else (finding.margin, finding.room_used)
    items = (
        numbers.quantity(finding.value, unit, system, places=places, bare=bare),
        numbers.span(finding.low, finding.high, unit, system, places=places, bare=bare),
        limit_span(finding.limit_low, finding.limit_high, finding.kind, unit, system, places, bare=bare),
        numbers.quantity(margin, apart, system, places=places, sign=True, bare=bare and unit != "K"),
        numbers.percent(used),
    )
    return FindingNumbers(*(_blank(item, verdict) for item in items))


def step_text(step, system: str = "si") -> str:
    """A change that would restore room, in words; beside it the value where the words hold another unit."""
    if system == "si" or step.value is None:
        return step.sentence
    return f"{step.sentence} ({numbers.anything(step.value, step.unit, system)})"


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
