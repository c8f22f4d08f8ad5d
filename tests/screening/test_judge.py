"""The rules of judging, one by one and for any input."""

from __future__ import annotations

import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from screener.screening.finding import READ_EVIDENCE
from screener.screening.judge import judge, judge_keep_out

BELOW = {"kind": "stay below", "reference": 0.0, "gap": 5.0, "evidence": "law"}
ABOVE = {"kind": "stay above", "reference": 200.0, "gap": 5.0, "evidence": "law"}


@pytest.mark.parametrize(
    ("value", "low", "high", "verdict"),
    [
        (80.0, 75.0, 90.0, "room"),
        (80.0, 75.0, 95.0, "room"),  # exactly the gap asked for
        (80.0, 75.0, 95.1, "near"),  # less than the gap
        (80.0, 75.0, 100.0, "near"),  # the range touches the limit
        (80.0, 75.0, 120.0, "near"),  # the range crosses
        (100.0, 95.0, 105.0, "beyond"),  # on the limit itself
        (101.0, 60.0, 110.0, "beyond"),  # a wide range on the good side does not help
        (math.nan, 1.0, 2.0, "unknown"),
        (80.0, 75.0, math.nan, "unknown"),
        (101.0, 75.0, math.nan, "beyond"),  # beyond needs no range
    ],
)
def test_stay_below(value, low, high, verdict):
    assert judge(value, low, high, 100.0, **BELOW).verdict == verdict


@pytest.mark.parametrize(
    ("value", "low", "high", "verdict"),
    [(120.0, 105.0, 130.0, "room"), (120.0, 104.0, 130.0, "near"), (120.0, 99.0, 130.0, "near"),
     (100.0, 90.0, 110.0, "beyond"), (90.0, 80.0, 130.0, "beyond")],
)  # fmt: skip
def test_stay_above(value, low, high, verdict):
    assert judge(value, low, high, 100.0, **ABOVE).verdict == verdict


def test_room_used_runs_from_the_reference_to_the_limit():
    judged = judge(75.0, 50.0, 90.0, 100.0, **BELOW)
    assert (judged.room_used, judged.room_used_low, judged.room_used_high) == (0.75, 0.5, 0.9)
    above = judge(150.0, 120.0, 180.0, 100.0, **ABOVE)
    assert (above.room_used, above.room_used_low, above.room_used_high) == (0.5, 0.2, 0.8)
    assert judged.margin == 25.0 and above.margin == 50.0


def test_a_cap_alone_keeps_a_verdict_from_room():
    judged = judge(10.0, 9.0, 11.0, 100.0, **BELOW, caps=("grows on filling",))
    assert (judged.verdict, judged.reason) == ("near", "grows on filling")


@pytest.mark.parametrize("evidence", ["memory", "common practice", ""])
def test_a_limit_nobody_read_never_gives_room(evidence):
    given_ = {**BELOW, "evidence": evidence}
    assert judge(1.0, 1.0, 1.0, 100.0, **given_).verdict == "near"
    assert judge(101.0, 1.0, 200.0, 100.0, **given_).verdict == "beyond"


numbers = st.floats(-1e6, 1e6) | st.sampled_from([math.nan, math.inf, -math.inf])
evidences = st.sampled_from([*sorted(READ_EVIDENCE), "memory", "common practice", ""])


@settings(max_examples=400, deadline=None)
@given(numbers, numbers, numbers, numbers, st.sampled_from(["stay below", "stay above"]), evidences)
def test_room_means_what_it_says(value, low, high, limit, kind, evidence):
    """Whatever goes in: room only with numbers all on the good side, the gap kept, and a limit that was read."""
    judged = judge(value, low, high, limit, kind=kind, reference=0.0, gap=3.0, evidence=evidence)
    if judged.verdict == "room":
        assert all(map(math.isfinite, (value, low, high, limit))) and evidence in READ_EVIDENCE
        worse = limit - high if kind == "stay below" else low - limit
        assert worse >= 3.0
    if math.isnan(value) or math.isnan(limit):
        assert judged.verdict == "unknown"


@pytest.mark.parametrize(
    ("value", "low", "high", "verdict"),
    [
        (0.4, 0.3, 0.5, "room"),  # lean, with the gap
        (0.9, 0.8, 0.95, "near"),  # lean, gap too small
        (0.9, 0.8, 1.2, "near"),  # lean, the range reaches in
        (1.0, 0.9, 1.1, "beyond"),  # on the lower limit
        (4.0, 3.0, 5.0, "beyond"),
        (8.0, 7.0, 9.0, "beyond"),  # on the upper limit
        (9.0, 7.0, 11.0, "near"),  # rich, the range reaches in
        (40.0, 35.0, 45.0, "near"),  # rich and far away: still no room
        (math.nan, 1.0, 2.0, "unknown"),
        (0.4, math.nan, 0.5, "unknown"),
    ],
)
def test_keep_out(value, low, high, verdict):
    judged = judge_keep_out(value, low, high, 1.0, 8.0, gap=0.2, evidence="standard")
    assert judged.verdict == verdict
    if verdict in ("room", "near"):
        assert judged.margin > 0.0 and judged.room_used < 1.0


@settings(max_examples=400, deadline=None)
@given(numbers, numbers, numbers, numbers, numbers, evidences)
def test_keep_out_gives_room_on_the_lean_side_only(value, low, high, lower, upper, evidence):
    judged = judge_keep_out(value, low, high, lower, upper, gap=0.5, evidence=evidence)
    if judged.verdict == "room":
        assert max(value, low, high) <= lower - 0.5 and evidence in READ_EVIDENCE
