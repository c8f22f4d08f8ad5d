"""The table of roof rules: whole, marked, and without gaps between its volumes."""

import pytest

from screener.ground.errors import UnknownName
from screener.tank.roof_rules import KINDS, roof_rules, rule_packs, rules_for, rules_of


def test_packs():
    assert {"us-40cfr60-kb", "us-40cfr60-kc", "eu-94-63", "fr-2010-10-03", "us-8ccr-5585"} <= set(
        rule_packs()
    )
    with pytest.raises(UnknownName, match="us-40cfr60-kb"):
        rules_of("us-40cfr60-kx")


def test_evidence_is_never_better_than_what_was_read():
    marks = {rule.pack: set() for rule in roof_rules()}
    for rule in roof_rules():
        marks[rule.pack].add(rule.evidence)
        assert ("memory" in rule.where) == (rule.evidence == "memory"), rule
    assert marks["us-40cfr60-kc"] == {"quoted"}
    assert marks["us-40cfr60-k"] == {"law", "memory"}
    assert marks["us-40cfr63-bbbbbb"] == {"memory"}


def test_every_row_says_what_happens_and_where_it_stands():
    for rule in roof_rules():
        assert rule.where and rule.means and rule.source_key
        assert rule.volume_from < rule.volume_below
        assert rule.limit is None or 1000.0 < rule.limit < 101325.0


def test_a_pressure_vessel_is_under_no_rule():
    assert all("pressure-vessel" not in kinds for kinds in KINDS.values())
    for pack in rule_packs():
        assert rules_for(pack, "pressure-vessel", 1000.0) == ()


def test_neighbouring_volumes_do_not_overlap():
    for pack in rule_packs():
        for kind in KINDS["any"]:
            for volume in (80.0, 100.0, 151.0, 151.41, 151.42, 1600.0):
                rows = [r for r in rules_for(pack, kind, volume) if r.role == "limit" and r.roof != "any"]
                assert len(rows) <= 1, (pack, kind, volume)


def test_limits_come_lowest_first_and_scope_last():
    rows = rules_for("us-40cfr63-hhhhhhh", "fixed-roof", 1000.0)
    assert [round(r.limit) for r in rows] == [5171, 76532]
    assert rules_for("us-40cfr60-kb", "fixed-roof", 1000.0)[-1].role == "scope"
