"""Every liquid of a finding is judged; the worst is shown, and an unknown lane is never outvoted by a good one."""

from __future__ import annotations

import math

import pytest

from screener.screening.criteria import criterion
from screener.screening.draft import Draft, Lane, finish
from screener.screening.finding import Condition


def lane(name, value, high=None, limit=100.0, unknown="", caps=()):
    return Lane(
        Condition(name), value, value, value if high is None else high, limit, unknown=unknown, caps=caps
    )


def shown(*lanes, **fields):
    return finish(Draft(criterion("boiling.surface"), lanes=lanes, **fields))


def test_the_worst_liquid_is_named():
    finding = shown(lane("receipt", 50.0), lane("heel", 95.0), lane("mixture", 60.0))
    assert (finding.verdict, finding.condition.liquid, finding.value) == ("near", "heel", 95.0)


def test_among_equals_the_one_with_most_room_used():
    finding = shown(lane("receipt", 50.0), lane("heel", 60.0))
    assert (finding.verdict, finding.condition.liquid) == ("room", "heel")


@pytest.mark.parametrize(
    ("other", "verdict", "liquid"),
    [(50.0, "unknown", "heel"), (95.0, "unknown", "heel"), (120.0, "beyond", "receipt")],
)
def test_unknown_outranks_room_and_near_but_not_beyond(other, verdict, liquid):
    finding = shown(lane("receipt", other), lane("heel", math.nan, unknown="heel: did not converge"))
    assert (finding.verdict, finding.condition.liquid) == (verdict, liquid)


def test_a_lane_that_cannot_be_told_is_unknown_even_with_a_good_number():
    finding = shown(lane("receipt", 10.0, unknown="dissolved gas not stated"))
    assert (finding.verdict, finding.reason) == ("unknown", "dissolved gas not stated")


def test_a_lane_beyond_stays_beyond_though_something_is_missing():
    assert shown(lane("receipt", 120.0, unknown="dissolved gas not stated")).verdict == "beyond"
    assert shown(lane("receipt", 120.0), unknown="no barometer").verdict == "beyond"


def test_a_finding_without_lanes_is_unknown_and_a_skipped_one_says_why():
    assert shown().verdict == "unknown"
    skipped = shown(skip="an external floating roof leaves no closed vapour space")
    assert (skipped.verdict, skipped.value) == ("skipped", None)
    assert skipped.reason


def test_numbers_that_do_not_exist_are_none():
    finding = shown(lane("receipt", math.nan, unknown="not given: site.latitude"))
    assert finding.value is finding.low is finding.margin is finding.room_used is None
    assert "NaN" not in repr(finding.to_dict())
