"""How a step stands, as plain data."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True)
class StepState:
    """A mark for the strip and words for the rail."""

    number: int
    name: str
    mark: str
    words: str
    tone: str = ""
