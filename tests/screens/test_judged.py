"""The why card and the plot, made from a screening by the memo's own functions."""

from __future__ import annotations

import pytest

from screener.app import judged as view
from screener.app.glyphs import glyphs
from screener.app.rows import row_width, text_of
from tests.screens.made import screening

BRAILLE = glyphs("braille")


@pytest.fixture
def items():
    return {item.finding.id: item for item in view.judged(screening())}


def lines(item):
    found: dict[str, list[str]] = {}
    label = ""
    for name, text, _ in view.card_lines(item):
        label = name or label
        found.setdefault(label, []).append(text)
    return found


def test_worst_first_and_unknown_before_near(items):
    assert [item.finding.verdict for item in items.values()] == ["beyond", "unknown", "near", "room", "skipped"]


def test_margins_stand_in_their_own_unit(items):
    margins = {key: item.gap.margin for key, item in items.items()}
    assert margins == {
        "npsh.pump": "-0.80 m",
        "receipt.flash": "not known",
        "vents.outbreathing": "+288 Nm3/h air",
        "boiling.surface": "+25.8 kPa",
        "vents.vacuum-setting": "does not apply",
    }


def test_limits_carry_their_number_in_the_register(items):
    assert items["npsh.pump"].gap.limit == "at least 3.20 m, L1"
    assert items["receipt.flash"].gap.limit == ""


def test_the_card_tells_everything(items):
    card = lines(items["boiling.surface"])
    where = "receipt at low level, hottest day, July, liquid surface"
    assert card["value"] == [f"bubble pressure of the liquid at its hottest surface 72.0 kPa; {where}"]
    assert card["range"] == ["66.0 to 79.0 kPa, covers weather, method"]
    assert card["limit"] == ["at most 97.8 kPa, L3, read in law"]
    assert card["source"] == ["8 CCR 5585(c)"]
    assert card["margin"] == ["+25.8 kPa; at the worse end of the range +18.8 kPa; gap asked for 9.8 kPa"]
    assert card["room"] == ["the whole range stays on the good side with the gap asked for"]
    assert card["moved most by"] == ["n-butane +1 mol%: +3.1 kPa", "liquid temperature +1 K: +2.2 kPa"]
    assert card["for room"] == ["liquid surface below 41.9 degC"]
    assert card["not counted"] == ["dissolved air and gas; weathering"]
    assert card["caution"] == ["Sun on a dark tank can pass the estimate."]
    assert card["beside it"] == ["temperature of that liquid 37.9 degC"]


def test_the_margin_of_a_minimum_has_its_worse_end_below(items):
    assert lines(items["npsh.pump"])["margin"] == ["-0.80 m; at the worse end of the range -1.30 m; gap asked for 1.00 m"]


def test_an_unknown_card_says_why_and_gives_no_margin(items):
    card = lines(items["receipt.flash"])
    assert "margin" not in card and "limit" not in card
    assert card["value"][0].endswith("no number")
    assert "dissolved gas in the receipt is not stated" in card["unknown"][0]


@pytest.mark.parametrize("width", [30, 58, 78, 118])
def test_no_text_of_the_card_is_cut(items, width):
    for item in items.values():
        rows = view.card(item, width, BRAILLE)
        assert all(row_width(row) <= width for row in rows)
        letters = "".join("".join(text_of(row) for row in rows).split())
        for _, text, _ in view.card_lines(item):
            for word in text.split():
                assert word in letters or len(word) > width // 3


def test_every_tone_used_is_one_the_widgets_know(items):
    from screener.app.lines import TONES

    used = {tone for item in items.values() for _, _, text in view.card_lines(item) for tone in text.split()}
    used |= {tone for item in items.values() for row in view.card(item, 80, BRAILLE) for s in row for tone in s.tone.split()}
    assert {"beyond", "near", "unknown", "dim"} <= used <= set(TONES)


def test_the_hint_keeps_to_one_line(items):
    assert view.hint(items["npsh.pump"], 78) == "Net positive suction head: 2.40 m, limit at least 3.20 m (L1)"
    assert view.hint(items["receipt.flash"], 200).startswith("Receipt gives off vapour on arrival: dissolved gas")
    assert view.hint(items["receipt.flash"], 78) == "Receipt gives off vapour on arrival · enter: why"


def test_the_plot_is_in_printed_units():
    plot = view.plot(screening())
    assert plot.x_range == pytest.approx((-10.0, 60.0))
    assert plot.limits == ((pytest.approx(97.8), "L3"),)
    assert plot.band == (pytest.approx(-8.0), pytest.approx(37.0), "ambient, design")
    assert [line.label for line in plot.lines] == ["receipt", "heel"]
    assert [line.pattern for line in plot.lines] == ["solid", "dashed"]
    assert plot.y_range[0] == 0.0 and plot.y_range[1] >= 97.8 * 1.2, "room above the highest limit"


def test_a_limit_from_memory_says_that_it_never_gives_room():
    assert view.evidence("memory") == "from memory, unverified: never gives room"
    assert view.evidence("") == "no source"


def test_every_evidence_mark_has_words():
    from typing import get_args

    from screener.screening.finding import Evidence

    assert all(view.evidence(mark) for mark in get_args(Evidence))
