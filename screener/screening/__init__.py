"""Floor 7: criteria, verdicts, findings. No physics: every number comes from the floors below."""

from screener.screening.criteria import Criterion, criteria, criterion
from screener.screening.finding import Condition, Fact, Finding, Headroom, Information, Screening
from screener.screening.judge import Judgement, judge
from screener.screening.screen import screen, screen_many

__all__ = [
    "Condition",
    "Criterion",
    "Fact",
    "Finding",
    "Headroom",
    "Information",
    "Judgement",
    "Screening",
    "criteria",
    "criterion",
    "judge",
    "screen",
    "screen_many",
]
