"""Rule packs: the limit a public rule puts on one tank, or why it puts none."""

from __future__ import annotations

from dataclasses import dataclass

from screener.screening.finding import Fact


@dataclass(frozen=True)
class Rule:
    """One pack applied to one case.

    limit [Pa] is the true vapour pressure the roof type may not reach; skip or
    unknown says why there is none.
    """

    pack: str
    limit: float = float("nan")
    evidence: str = ""
    source: str = ""
    source_keys: tuple[str, ...] = ()
    skip: str = ""
    unknown: str = ""
    facts: tuple[Fact, ...] = ()
