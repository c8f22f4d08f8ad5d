"""What every section of a memo is filled from."""

from __future__ import annotations

from dataclasses import dataclass

from screener.ground.errors import InputError
from screener.memo.finding_text import worst_first
from screener.memo.numbers import SYSTEMS
from screener.screening.finding import READ_EVIDENCE, Finding, Screening

STATUSES = ("draft", "for checking")  # checked and approval exist on paper only


@dataclass(frozen=True)
class Limit:
    """One line of the limits register."""

    number: str  # 'L1'
    unit: str
    kind: str
    low: float | None
    high: float | None
    evidence: str
    source: str
    findings: tuple[Finding, ...]

    @property
    def read(self) -> bool:
        """Whether the limit was read in its source and can give room."""
        return self.evidence in READ_EVIDENCE


@dataclass(frozen=True)
class Frame:
    """A screening with everything a memo says about itself."""

    screening: Screening
    date: str
    author: str
    version: str
    number: str
    revision: str
    status: str
    data_digest: str
    case_text: str
    system: str

    def __post_init__(self) -> None:
        if self.status not in STATUSES:
            raise InputError(
                "status", self.status, f"a memo is {' or '.join(STATUSES)}", f"given: {self.status!r}"
            )
        if self.system not in SYSTEMS:
            raise InputError(
                "units", self.system, f"units are {' or '.join(SYSTEMS)}", f"given: {self.system!r}"
            )

    @property
    def case(self):
        """The case screened."""
        return self.screening.case

    @property
    def findings(self) -> tuple[Finding, ...]:
        """Findings, worst first."""
        return worst_first(self.screening.findings)

    @property
    def register(self) -> tuple[Limit, ...]:
        """Limits in the order in which the findings, worst first, use them."""
        lines: dict[tuple, list[Finding]] = {}
        for f in self.findings:
            if f.limit_low is not None or f.limit_high is not None:
                key = (f.unit, f.kind, f.limit_low, f.limit_high, f.evidence, f.source)
                lines.setdefault(key, []).append(f)
        return tuple(Limit(f"L{i}", *key, tuple(used)) for i, (key, used) in enumerate(lines.items(), 1))

    def limit_number(self, finding: Finding) -> str:
        """Number of a finding's limit in the register; '' without a limit."""
        return next((line.number for line in self.register if finding in line.findings), "")
