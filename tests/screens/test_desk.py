"""What the screens know of a case, as plain Python."""

from __future__ import annotations

import pytest

from screener.app.desk import Desk, fault_sentence, paths_named
from screener.app.engine import Worked
from screener.app.session import Session
from screener.casefile import CaseText
from screener.ground.errors import InputError
from tests.screens.made import CASE, Playing, screening


@pytest.fixture
def desk(tmp_path):
    return Desk(Session(CaseText.parse(CASE), folder=tmp_path), Playing().engine())


def worked(desk):
    for done in desk.engine.work(desk.text.toml(), ""):
        desk.attach(desk.session.revision, done)
    return desk


def states(desk):
    return {state.name: (state.mark, state.words) for state in desk.states()}


def test_before_the_first_result_nothing_is_claimed(desk):
    assert states(desk)["Tank"] == ("", "not worked out yet")
    assert states(desk)["Findings"] == ("", "not worked out yet")


def test_steps_say_done_needed_and_worst(desk):
    assert states(worked(desk)) == {
        "Blend": ("+", "done"),
        "Tank": ("+", "done"),
        "Site": ("+", "done"),
        "Line": ("?", "needs 1 value"),
        "Findings": ("!", "1 beyond"),
        "Memo": ("", "draft"),
    }


def test_a_step_with_a_fault_says_so(desk):
    desk.session.edit("tank.shell_diameter", "24")
    worked(desk)
    assert states(desk)["Tank"] == ("!", "1 value to correct")
    assert states(desk)["Blend"] == ("", "not worked out yet"), "a faulty case leaves the others untold"
    assert states(desk)["Findings"] == ("?", "inputs to correct first")


def test_a_blank_step_is_not_called_done(desk):
    desk.session.change("", lambda text: text.remove("line"))
    desk.attach(desk.session.revision, Worked(screening(findings=[screening().findings[0]]), (), {}))
    assert states(desk)["Line"] == ("-", "blank")


def test_a_written_memo_is_told(desk):
    desk.memo_written = "memo.md"
    assert states(desk)["Memo"] == ("+", "written")


def test_taking_a_bad_value_changes_nothing(desk):
    checked = desk.take("tank.shell_diameter", "24")
    assert checked.problem.startswith("'24' has no unit")
    assert not desk.session.dirty


def test_an_empty_text_takes_the_value_away(desk):
    assert desk.take("tank.shell_diameter", "  ").problem == ""
    assert desk.text.get("tank.shell_diameter") is None


def test_a_missing_value_says_only_that(desk):
    assert fault_sentence(InputError("a", None, "this is missing: kind of tank", "one of ...")) == "this is missing: kind of tank"
    assert fault_sentence(InputError("a", "24", "'24' has no unit", "such as 24 m")) == "'24' has no unit; such as 24 m"


def test_paths_in_reasons_are_found():
    reason = "not given: tank.shell_diameter, line.suction.npsh_required (tank.vents, rated_out_at), blend.h2s_in_liquid; e.g. this one"
    named = ["tank.shell_diameter", "line.suction.npsh_required", "tank.vents", "blend.h2s_in_liquid"]
    assert paths_named(reason) == named


@pytest.mark.parametrize(
    ("path", "step"),
    [("blend.parts[0].share", "blend"), ("tank.vents[1].set", "tank"), ("screening.criteria", "site"),
     ("case.title", "memo"), ("line 3, column 7", "findings")],
)  # fmt: skip
def test_every_path_has_a_step(desk, path, step):
    assert desk.step_of(path) == step


def test_names_are_ranked_exact_beginning_anywhere(desk):
    assert [name.name for name in desk.matches("butan")] == ["field butane", "n-butane", "1-butanol"]
    assert [name.name for name in desk.matches("71-36-3")] == ["1-butanol"]
    assert desk.matches("nothing like it") == []


def test_help_holds_meaning_example_range_and_place(desk):
    lines = dict(desk.help_of("site.lowest_barometer"))
    assert {"meaning", "example", "allowed", "usual", "where", "in file"} <= set(lines)
    assert lines["in file"] == "site.lowest_barometer"


def test_choices(desk):
    assert desk.choices("site.month")[0] == "Jan"
    assert desk.choices("tank.insulated") == ("true", "false")
    assert desk.choices("screening.criteria") == ("us-40cfr60-kb",)
    assert "fixed-roof" in desk.choices("tank.kind")
    assert desk.choices("tank.shell_diameter") == ()


def told_of(desk):
    """What is told of the receipt: behind its parts, before the laboratory sheet."""
    *_, told, sheet = desk.sections("blend")
    assert sheet.fold == "blend.lab"
    return told


def test_what_a_liquid_amounts_to_stands_below_its_parts(desk):
    worked(desk)
    told = told_of(desk)
    assert told.columns[0].heading == "What it amounts to"
    assert [tuple(cell.text for cell in record.cells) for record in told.records] == [
        ("DVPE", "59.8 kPa", ""),
        ("T50", "90.0 degC", ""),
        ("2 more lines", "enter opens", ""),
    ]
    desk.session.opened.add("told")
    assert [record.cells[0].text for record in told_of(desk).records] == [
        "DVPE", "evaporated at 70 degC", "T50", "limiting oxygen in nitrogen", "all shown",
    ]  # fmt: skip
    assert "earlier" not in told.note
    desk.session.edit("blend.parts[0].share", "80 %")
    assert "of earlier inputs" in told_of(desk).note
