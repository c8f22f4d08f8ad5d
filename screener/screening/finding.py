"""A finding: one number, its range, its limit and what follows.

The shape is settled: memo, command line, screens and golden files write and
read exactly these fields.
"""

from __future__ import annotations

import math
from dataclasses import asdict, dataclass, field
from typing import Literal

Verdict = Literal["room", "near", "beyond", "unknown", "skipped"]
Kind = Literal["stay below", "stay above", "keep out of"]
Scale = Literal["percent", "kelvin", "from-atmosphere"]
Evidence = Literal[
    "law", "standard", "handbook", "quoted", "physics", "user", "common practice", "memory", ""
]

WORST_FIRST: tuple[Verdict, ...] = ("beyond", "unknown", "near", "room", "skipped")
MEASURED = ", measured"  # end of the label of a fact that a laboratory sheet holds
MARKS: dict[Verdict, str] = {"room": ".", "near": "~", "beyond": "!", "unknown": "?", "skipped": "-"}
# A limit with one of these marks was read in its source and can give `room`.
# 'user' is a limit the user entered with the case (a site rule, a data sheet).
READ_EVIDENCE = frozenset({"law", "standard", "handbook", "quoted", "physics", "user"})


@dataclass(frozen=True)
class Condition:
    """Which liquid, level, day and place is worst."""

    liquid: str = ""  # 'receipt', 'heel', 'mixture'
    level: str = ""  # 'low', 'normal', 'high'
    when: str = ""  # 'hottest day, July'
    where: str = ""  # 'liquid surface'

    def sentence(self) -> str:
        """The parts that are known, joined by commas."""
        liquid = f"{self.liquid} at {self.level} level" if self.level else self.liquid
        return ", ".join(part for part in (liquid, self.when, self.where) if part)


@dataclass(frozen=True)
class Fact:
    """A number printed beside a finding; never judged."""

    label: str
    value: float | str | None
    unit: str = ""
    note: str = ""


@dataclass(frozen=True)
class Headroom:
    """A change that would restore room, found by the same calculation."""

    knob: str  # 'surface temperature'
    value: float | None  # knob value at which the finding just has room
    unit: str
    sentence: str  # plain words, ready to print


@dataclass(frozen=True)
class Finding:
    """One criterion judged for one case.

    Values, limits and margin are in `unit`, SI for pressures (Pa absolute),
    temperatures (K) and flows (m3/s of normal air); output converts. A number
    that does not exist is None and `reason` says why.
    """

    id: str  # 'boiling.surface'
    title: str
    quantity: str  # 'bubble pressure at the liquid surface'
    value: float | None
    low: float | None
    high: float | None
    range_covers: tuple[str, ...]  # of 'weather', 'inputs', 'method'
    limit_low: float | None
    limit_high: float | None
    kind: Kind
    evidence: Evidence
    margin: float | None  # distance to the nearest limit, positive on the good side
    asked_gap: float | None  # gap asked for, in unit
    room_used: float | None  # (value - reference)/(limit - reference) [-]
    room_used_low: float | None
    room_used_high: float | None
    scale: Scale
    unit: str
    verdict: Verdict
    reason: str  # why this verdict, one sentence
    basis: str  # method by name
    source: str  # where the limit was read
    caution: str
    condition: Condition
    inputs_assumed: tuple[str, ...] = ()
    facts: tuple[Fact, ...] = ()
    moved_by: tuple[str, ...] = ()  # what moves it most, largest first
    headroom: tuple[Headroom, ...] = ()
    not_counted: tuple[str, ...] = ()
    sources: tuple[str, ...] = field(default=())  # keys of data/sources.toml this finding rests on

    @property
    def mark(self) -> str:
        """One character that stands for the verdict without colour."""
        return MARKS[self.verdict]

    @property
    def rank(self) -> int:
        """Place in the worst-first order; 0 is worst."""
        return WORST_FIRST.index(self.verdict)

    def to_dict(self) -> dict:
        """Plain data for JSON: no NaN, no tuples of numbers lost."""
        return _plain(asdict(self))


def _plain(value):
    if isinstance(value, dict):
        return {key: _plain(item) for key, item in value.items()}
    if isinstance(value, (list, tuple)):
        return [_plain(item) for item in value]
    if hasattr(value, "item") and not isinstance(value, str):
        value = value.item()
    if isinstance(value, float) and not math.isfinite(value):
        return None
    return value


@dataclass(frozen=True)
class Information:
    """Context printed with the result and judged by nobody (fuel class, T at V/L 20)."""

    title: str
    facts: tuple[Fact, ...]
    note: str = ""


@dataclass(frozen=True)
class Screening:
    """Findings of one case, worst first."""

    case: object  # the Case screened
    findings: tuple[Finding, ...]
    information: tuple[Information, ...]
    assumptions: tuple[str, ...]
    reservations: tuple[str, ...]  # failed lanes, extrapolation, fallbacks to zero
    curve: dict  # T [K], bubble pressure [Pa] of receipt, heel, mixture; for the pictures
    sources: tuple[str, ...]

    @property
    def worst(self) -> Verdict:
        """Worst verdict among all findings; 'skipped' when nothing applied."""
        return min((f.verdict for f in self.findings), key=WORST_FIRST.index, default="unknown")

    @property
    def exit_code(self) -> int:
        """0 room, 4 near, 1 beyond, 2 unknown or nothing judged."""
        verdicts = [f.verdict for f in self.findings]
        if "beyond" in verdicts:
            return 1
        if "unknown" in verdicts or not set(verdicts) & {"room", "near"}:
            return 2
        return 4 if "near" in verdicts else 0

    def to_dict(self) -> dict:
        """Plain data for JSON."""
        return {
            "worst": self.worst,
            "findings": [finding.to_dict() for finding in self.findings],
            "information": [_plain(asdict(item)) for item in self.information],
            "assumptions": list(self.assumptions),
            "reservations": list(self.reservations),
            "curve": _plain(self.curve),
            "sources": list(self.sources),
        }
