"""Rule packs: the limit a public rule puts on one tank, or why it puts none."""

from __future__ import annotations

import math
from dataclasses import dataclass, replace

from screener.ground.errors import UnknownName
from screener.screening.context import Context
from screener.screening.finding import Fact
from screener.screening.wording import say
from screener.tank import rule_packs, rules_for, rules_of

_OWN_BASIS = "highest monthly mean"
_STAND_IN = ("storage temperature", "not read")  # the monthly mean stands in, so at best near


@dataclass(frozen=True)
class Rule:
    """One pack applied to one case.

    limit [Pa] is the true vapour pressure the roof type may not reach; skip or
    unknown says why there is none; caps keep the finding from being better than near.
    other_roof [Pa] is the limit the same pack puts on a floating roof, NaN if none.
    """

    pack: str
    limit: float = math.nan
    evidence: str = ""
    source: str = ""
    source_keys: tuple[str, ...] = ()
    skip: str = ""
    unknown: str = ""
    other_roof: float = math.nan
    caps: tuple[str, ...] = ()
    facts: tuple[Fact, ...] = ()
    only: bool = True  # the case chose no other pack


def packs_of(context: Context, stream) -> tuple[Rule, ...]:
    """Every rule pack the case chose, applied to its tank."""
    known = rule_packs()
    for i, pack in enumerate(context.case.criteria):
        if pack not in known:
            raise UnknownName(f"screening.criteria[{i}]", pack, "rule pack", known)
    volume = float(stream.breathing.volume[context.i])
    only = len(context.case.criteria) == 1
    return tuple(replace(_apply(context, pack, volume), only=only) for pack in context.case.criteria)


def _apply(context: Context, pack: str, volume: float) -> Rule:
    kind = context.case.tank.kind
    if kind == "pressure-vessel":
        return Rule(pack, skip=say("skip", "pressure-vessel"))
    if math.isnan(volume):
        return _unsized(context, pack)
    rows = rules_for(pack, kind, volume)
    limits = [row for row in rows if row.role == "limit" and row.quantity == "true vapour pressure"]
    fitting = [row for row in limits if row.at == _OWN_BASIS or row.at in _STAND_IN]
    if not fitting:
        if rows:
            return Rule(
                pack,
                unknown=say("unknown", "rule-basis", pack=pack, basis=f"{rows[0].quantity} at {rows[0].at}"),
            )
        smallest = min(row.volume_from for row in rules_of(pack))
        return Rule(
            pack,
            skip=say("skip", "rule-scope", pack=pack, why=f"{volume:.0f} m3, rule from {smallest:.0f} m3"),
        )
    row = fitting[0]
    limit = context.barometer if row.limit is None else row.limit
    caps = () if row.at == _OWN_BASIS else (say("cap", "rule-basis", basis=row.at),)
    facts = [Fact("tank volume", volume, "m3"), Fact("what the rule says", row.means)]
    facts += [Fact("the rule begins at", other.limit, "Pa") for other in rows if other.role == "scope"]
    if context.case.tank.vapour_return and row.roof == "fixed":
        caps += (say("cap", "vapour-return"),)
    return Rule(
        pack,
        limit,
        row.evidence,
        row.where,
        (row.source_key,),
        caps=caps,
        facts=tuple(facts),
        other_roof=_other_roof(pack, kind, volume),
    )


def _other_roof(pack: str, kind: str, volume: float) -> float:
    """Limit of the same pack for an internal floating roof, NaN where there is none or the roof floats already."""
    if "floating" in kind:
        return math.nan
    rows = rules_for(pack, "internal-floating-roof", volume)
    limits = [row.limit for row in rows if row.role == "limit" and row.at == _OWN_BASIS and row.limit]
    return min(limits, default=math.nan)


def _unsized(context: Context, pack: str) -> Rule:
    horizontal = context.case.tank.kind in ("horizontal", "underground")
    paths = context.missing("shell_diameter", "tank_length" if horizontal else "shell_height")
    return Rule(pack, unknown=say("unknown", "rule-volume", pack=pack, paths=", ".join(paths)))
