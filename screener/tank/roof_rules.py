"""Vapour-pressure limits that public law puts on a kind of roof, as data.

Nothing is judged here. A row says: under this rule pack, for this kind of roof
and tank volume, this quantity stays below this limit.
"""

from __future__ import annotations

import math
from dataclasses import dataclass
from functools import lru_cache

from screener.ground.errors import DataError, UnknownName
from screener.ground.files import read_table

TABLE = "tank/roof_rules.csv"
EVIDENCE = ("law", "quoted", "memory")
ROLES = ("limit", "scope")

KINDS = {
    "fixed": ("fixed-roof", "horizontal", "underground"),
    "floating": ("internal-floating-roof", "external-floating-roof", "domed-floating-roof"),
}
KINDS["any"] = KINDS["fixed"] + KINDS["floating"]


@dataclass(frozen=True)
class RoofRule:
    """One row of the table.

    pack : name of the rule pack, 'us-40cfr60-kb'
    roof : 'fixed', 'floating' or 'any'
    volume_from, volume_below : tank volumes the row covers, from (included) to (excluded) [m3]
    quantity : 'true vapour pressure' or 'Reid vapour pressure'
    at : temperature basis, 'highest monthly mean', 'storage temperature', '20 degC', '37.8 degC', 'not read'
    role : 'limit' (the value is to stay below) or 'scope' (the rule begins at the value)
    limit : None where the limit is the barometer itself [Pa]
    evidence : 'law', 'quoted' or 'memory'
    source_key, where, means : key of the source, clause, and what happens at the limit
    """

    pack: str
    roof: str
    volume_from: float
    volume_below: float
    quantity: str
    at: str
    role: str
    limit: float | None
    evidence: str
    source_key: str
    where: str
    means: str

    def covers(self, kind: str, volume: float) -> bool:
        """Whether the row is about a tank of this kind and volume [m3]."""
        return kind in KINDS[self.roof] and self.volume_from <= volume < self.volume_below


@lru_cache(maxsize=1)
def roof_rules() -> tuple[RoofRule, ...]:
    """Every row of the table, in its order."""
    return tuple(_row(text, line) for line, text in enumerate(read_table(TABLE), start=2))


def _row(text: dict[str, str], line: int) -> RoofRule:
    for name, allowed in (("roof", KINDS), ("role", ROLES), ("evidence", EVIDENCE)):
        if text[name] not in allowed:
            raise DataError(TABLE, line, f"{name} is '{text[name]}', allowed: {', '.join(allowed)}")
    limit = None if text["limit"] == "barometer" else float(text["limit"])
    volume_from = float(text["volume_from"] or 0.0)
    volume_below = float(text["volume_below"] or math.inf)
    given = {**text, "limit": limit, "volume_from": volume_from, "volume_below": volume_below}
    return RoofRule(**given)


@lru_cache(maxsize=1)
def rule_packs() -> tuple[str, ...]:
    """Names of the rule packs."""
    return tuple(dict.fromkeys(rule.pack for rule in roof_rules()))


def rules_of(pack: str) -> tuple[RoofRule, ...]:
    """Rows of one rule pack.

    Raises UnknownName where no pack has the name.
    """
    if pack not in rule_packs():
        raise UnknownName("", pack, "rule pack", rule_packs())
    return tuple(rule for rule in roof_rules() if rule.pack == pack)


def rules_for(pack: str, kind: str, volume: float) -> tuple[RoofRule, ...]:
    """Rows of one rule pack that cover a tank, the lowest limit first, scope rows last.

    kind : tank kind as in the case
    volume : of the whole tank [m3]
    """
    rows = [rule for rule in rules_of(pack) if rule.covers(kind, volume)]
    return tuple(
        sorted(
            rows, key=lambda rule: (ROLES.index(rule.role), math.inf if rule.limit is None else rule.limit)
        )
    )
