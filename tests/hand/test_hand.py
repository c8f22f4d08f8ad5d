"""The program against the hand calculations of this folder: value, limit, worst liquid, verdict."""

from __future__ import annotations

import functools
import tomllib
from pathlib import Path

import pytest

from screener import screen
from screener.casefile import read_case

HERE = Path(__file__).resolve().parent
EXAMPLES = HERE.parents[1] / "examples"
HAND = tomllib.loads((HERE / "hand_values.toml").read_text(encoding="utf-8"))
NOTES = {"summer_e10_floating_roof": "summer_e10.md", "winter_gasoline_fixed_roof": "winter_gasoline.md",
         "warm_condensate_receipt": "warm_condensate.md", "winter_e85_fixed_roof": "winter_e85.md",
         "summer_gasoline_small_tank": "summer_gasoline.md", "jet_kerosene_after_gasoline": "jet_kerosene.md",
         "spring_e5_by_certificate": "spring_e5.md"}
ROWS = [(case, finding) for case, findings in HAND.items() for finding in findings]
# Two routes with the same composition: other vapour-pressure curves, an activity model with a virial gas
# against an equation of state. The figure is the one asked for; the means differ by 1.4 % at most.
VALUE = 0.02
# Limits are entered in the case or read in a rule: only digits written short in the hand values.
LIMIT = 1e-5
# Limits that are worked out themselves: flash points in kelvin agree within 0.5 K, the limits of a vapour
# depend on its composition, which the two routes see 1 % apart.
COMPUTED = {"fire.flash-point": 0.5 / 320.0, "vapour-space.flammable": 0.01, "switch-loading": 0.01}


@functools.cache
def findings(case):
    return {f.id: f for f in screen(read_case(EXAMPLES / f"{case}.toml")).findings}


def test_every_example_and_every_finding_has_a_hand_calculation():
    assert set(HAND) == {path.stem for path in EXAMPLES.glob("*.toml")}
    for case, by_hand in HAND.items():
        assert set(by_hand) == set(findings(case)), case


@pytest.mark.parametrize(("case", "finding"), ROWS)
def test_value_and_limit_agree(case, finding):
    hand, found = HAND[case][finding], findings(case)[finding]
    limit = found.limit_high if found.limit_low is None else found.limit_low
    of_limit = COMPUTED.get(finding, LIMIT)
    rows = [("value", found.value, VALUE), ("limit", limit, of_limit)]
    if found.kind == "keep out of":
        rows.append(("limit_high", found.limit_high, of_limit))
    for name, got, rel in rows:
        if name not in hand:
            assert got is None, (name, got)
        else:
            assert got is not None, name
            assert got == pytest.approx(hand[name], rel=rel, abs=0), name


@pytest.mark.parametrize(("case", "finding"), ROWS)
def test_verdict_is_the_one_argued(case, finding):
    hand, found = HAND[case][finding], findings(case)[finding]
    assert found.verdict == hand["verdict"], (hand["sentence"], found.reason)
    if "liquid" in hand:
        assert found.condition.liquid == hand["liquid"]


def test_all_five_verdicts_occur():
    said = {row["verdict"] for by_hand in HAND.values() for row in by_hand.values()}
    assert said == {"beyond", "unknown", "near", "room", "skipped"}


@pytest.mark.parametrize("case", HAND)
def test_each_finding_is_worked_in_the_notes_of_its_case(case):
    text = (HERE / NOTES[case]).read_text(encoding="utf-8")
    for finding, hand in HAND[case].items():
        assert finding.split(".us-")[0] in text, finding
        assert hand["sentence"].endswith("."), finding
