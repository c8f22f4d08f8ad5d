"""Changes that touch more than one value."""

from __future__ import annotations

import pytest

from screener.app import edits
from screener.casefile import CaseText


@pytest.fixture
def text():
    return CaseText.parse('[blend]\nparts = [ { stock = "diesel", share = "100 %", quality = "estimate" } ]\n[tank]\n')


def test_a_part_is_added_without_a_share(text):
    assert edits.add_part(text, "blend", "species", "ethanol") == "blend.parts[1]"
    assert text.get("blend.parts[1].species") == "ethanol"
    assert text.get("blend.parts[1].share") is None


def test_renaming_a_part_keeps_share_and_quality(text):
    edits.rename_part(text, "blend.parts[0]", "species", "ethanol")
    assert text.get("blend.parts[0].stock") is None
    assert (text.get("blend.parts[0].species"), text.get("blend.parts[0].share")) == ("ethanol", "100 %")
    assert text.get("blend.parts[0].quality") == "estimate"


def test_the_first_part_of_the_heel_makes_its_table(text):
    edits.add_part(text, "tank.contents", "stock", "diesel")
    assert text.rows("tank.contents.parts") == 1
    edits.remove_row(text, "tank.contents.parts[0]")
    assert not text.has("tank.contents"), "an emptied tank holds no empty table"


def test_vents_and_months_start_with_what_makes_them_whole(text):
    edits.add_row(text, "tank.vents")
    assert text.get("tank.vents[0].count") == "1"
    edits.add_row(text, "site.months")
    edits.add_row(text, "site.months")
    assert [text.get(f"site.months[{i}].month") for i in range(2)] == ["Jan", "Feb"]


def test_a_removed_month_is_the_next_one_added(text):
    for _ in range(3):
        edits.add_row(text, "site.months")
    edits.remove_row(text, "site.months[1]")
    edits.add_row(text, "site.months")
    assert text.get("site.months[2].month") == "Feb"


def test_scaling_is_a_wish_recorded_in_the_case(text):
    edits.scale(text, "blend", True)
    assert text.get("blend.scale") == "true"
    edits.scale(text, "blend", False)
    assert not text.has("blend.scale")


def test_a_required_section_stays_when_it_is_emptied(text):
    edits.enter(text, "tank.kind", "fixed-roof")
    edits.enter(text, "tank.kind", "")
    assert text.has("tank")
