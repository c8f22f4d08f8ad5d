"""The walk, driven by keys."""

from __future__ import annotations

from itertools import pairwise

import pytest

from screener.app.engine import Worked, paths_in
from screener.app.walk import WalkScreen
from screener.casefile import CaseText
from screener.casefile.keys import key_at
from screener.ground.errors import InputError
from tests.screens.driving import (
    grid,
    hint,
    keys_shown,
    opened,
    pressed,
    settled,
    tally_words,
    typed,
    walk,
    written_case,
)
from tests.screens.made import CASE, Playing


class Reading(Playing):
    """An engine that also refuses names nobody knows, as the reader of cases does."""

    def work(self, text: str, source: str):
        unknown = [path for path in paths_in(CaseText.parse(text).table) if key_at(path) is None]
        if unknown:
            yield Worked(None, tuple(InputError(path, None, f"'{path}' is not a known key") for path in unknown), {})
        else:
            yield from super().work(text, source)


async def test_the_walk_goes_by_number_and_in_order(case_file):
    async with opened(case_file) as pilot:
        for key, step in zip("123456", ("blend", "tank", "site", "line", "findings", "memo"), strict=True):
            await pressed(pilot, key)
            assert walk(pilot).current == step
        await pressed(pilot, "n")
        assert walk(pilot).current == "blend", "after the last step the first"
        await pressed(pilot, "N")
        assert walk(pilot).current == "memo"
        await pressed(pilot, "f6")
        assert walk(pilot).current == "blend"


async def test_every_step_says_how_it_stands(case_file):
    async with opened(case_file, size=(140, 40)) as pilot:
        lines = grid(pilot.app).splitlines()
        after = {line[:20].strip(): below[:20].strip() for line, below in pairwise(lines)}
        assert after["▸ 1 Blend"] == "done"
        assert after["4 Line"] == "needs 1 value"
        assert after["5 Findings"] == "1 beyond"
        assert after["6 Memo"] == "draft"


async def test_five_keys_fix_a_row(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "2", "down", "enter")
        strip = walk(pilot).query_one("#tank").strip
        assert strip.editing and strip.input.value == "24 m"
        await typed(pilot, "30 m")
        assert hint(pilot) == "taken as 30 m", "the echo follows what is typed"
        await pressed(pilot, "enter")
        assert walk(pilot).desk.text.get("tank.shell_diameter") == "30 m"
        assert not strip.editing
        assert walk(pilot).query_one("#tank").sheet.key == "tank.shell_height", "enter moves down"


async def test_another_unit_is_taken_and_echoed(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "2", "down", "enter")
        await typed(pilot, "80 ft")
        await pressed(pilot, "enter")
        assert "80 ft: taken as 24.38 m" in hint(pilot)
        assert "24.38 m" in grid(pilot.app)


async def test_a_bad_value_stays_with_its_reason(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "2", "down", "enter")
        await typed(pilot, "24")
        await pressed(pilot, "enter")
        strip = walk(pilot).query_one("#tank").strip
        assert strip.editing and strip.input.value == "24"
        assert "'24' has no unit" in hint(pilot) and "such as '24 m'" in hint(pilot)
        assert walk(pilot).desk.text.get("tank.shell_diameter") == "24 m", "the case is untouched"
        await pressed(pilot, "escape")
        assert not strip.editing and not walk(pilot).desk.session.dirty


async def test_digits_and_letters_go_into_the_strip_while_it_is_open(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "2", "down", "enter")
        await typed(pilot, "12nrv")
        assert walk(pilot).current == "tank"
        assert walk(pilot).query_one("#tank").strip.input.value == "12nrv"


async def test_choices_are_gone_through_with_up_and_down(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "2", "enter", "down")
        assert walk(pilot).query_one("#tank").strip.input.value == "internal-floating-roof"
        await pressed(pilot, "up", "up")
        assert walk(pilot).query_one("#tank").strip.input.value == "pressure-vessel"
        assert "fixed-roof" in hint(pilot)


async def test_an_edit_is_worked_out_by_itself(case_file):
    async with opened(case_file) as pilot:
        before = walk(pilot).desk.session.screening.findings[0].value
        await pressed(pilot, "2", "down", "enter")
        await typed(pilot, "30 m")
        await pressed(pilot, "enter")
        assert walk(pilot).desk.session.screening.findings[0].value == pytest.approx(before * 30 / 24)
        assert not walk(pilot).desk.session.stale


async def test_results_are_marked_stale_until_worked_out_again(case_file):
    async with opened(case_file) as pilot:
        pilot.playing.gate.clear()
        await pilot.press("2", "down", "enter")
        await typed(pilot, "30 m")
        await pilot.press("enter")
        await pilot.pause(0.2)
        assert walk(pilot).desk.session.stale
        assert tally_words(pilot) == "working it out; Esc stops"
        await pilot.press("escape")
        await pilot.pause()
        assert tally_words(pilot) == "of earlier inputs; r works it out again"
        assert "Stopped" in hint(pilot)
        pilot.playing.gate.set()
        await pilot.pause(0.2)
        assert walk(pilot).desk.session.stale, "the result of a stopped run is dropped"
        await pilot.press("r")
        await settled(pilot)
        assert tally_words(pilot) == "" and not walk(pilot).desk.session.stale


async def test_verdicts_are_there_before_what_gives_room(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "5", "v")
        pilot.playing.more.clear()
        await pilot.press("r")
        await pilot.pause(0.2)
        assert tally_words(pilot) == "looking for what gives room"
        assert not walk(pilot).desk.session.stale and not walk(pilot).desk.session.complete
        assert walk(pilot).query_one("#findings").items["boiling.surface"].finding.headroom == ()
        assert "ambient, design" in grid(pilot.app), "the curve of before stays meanwhile"
        await pilot.press("1")
        await pilot.pause()
        assert "59.8 kPa" in grid(pilot.app), "and so do the figures of the blend"
        pilot.playing.more.set()
        await settled(pilot)
        assert walk(pilot).query_one("#findings").items["boiling.surface"].finding.headroom


async def test_edits_while_working_lead_to_one_more_run(case_file):
    async with opened(case_file) as pilot:
        runs = pilot.playing.runs
        pilot.playing.gate.clear()
        await pilot.press("r")
        await pilot.pause()
        await pilot.press("2", "down", "enter")
        await typed(pilot, "30 m")
        await pilot.press("enter", "enter")
        await typed(pilot, "12 m")
        await pilot.press("enter")
        await pilot.pause(0.1)
        pilot.playing.gate.set()
        await settled(pilot)
        assert pilot.playing.runs == runs + 2, "the run in hand and one for all edits since"
        assert walk(pilot).desk.session.result.revision == walk(pilot).desk.session.revision


async def test_undo_and_redo(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "2", "down", "enter")
        await typed(pilot, "30 m")
        await pressed(pilot, "enter", "ctrl+z")
        assert walk(pilot).desk.text.get("tank.shell_diameter") == "24 m"
        assert "24 m" in grid(pilot.app) and "30 m" not in grid(pilot.app)
        assert hint(pilot) == "taken back: tank.shell_diameter"
        await pressed(pilot, "ctrl+y")
        assert walk(pilot).desk.text.get("tank.shell_diameter") == "30 m"


async def test_a_part_is_found_added_and_given_its_share(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "a")
        await typed(pilot, "butan")
        assert "n-butane (species, C4H10, butane, 106-97-8)" in grid(pilot.app)
        await pressed(pilot, "down", "enter")
        assert walk(pilot).desk.text.get("blend.parts[2].species") == "n-butane"
        runs = pilot.playing.runs
        await pilot.pause(0.2)
        assert pilot.playing.runs == runs, "not worked out while its share is typed"
        await typed(pilot, "5 %")
        await pressed(pilot, "enter")
        assert walk(pilot).desk.text.get("blend.parts[2].share") == "5 %"
        assert "sum 105 %, must be 100 %" in grid(pilot.app)
        await pressed(pilot, "up", "s")
        assert walk(pilot).desk.text.get("blend.scale") == "true"
        assert "scaled to 100 % as you asked" in grid(pilot.app)


@pytest.mark.parametrize(("sought", "found"), [("64-17-5", "ethanol"), ("ethyl alc", "ethanol"), ("FIELD", "field butane")])
async def test_parts_are_found_by_number_synonym_and_case(case_file, sought, found):
    async with opened(case_file) as pilot:
        await pressed(pilot, "a")
        await typed(pilot, sought)
        matches = walk(pilot).query_one("#blend .matches")
        assert matches.key.endswith(f":{found}")


async def test_a_name_nobody_has_is_told_and_stays(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "a")
        await typed(pilot, "xyzzy")
        await pressed(pilot, "enter")
        assert "no stock or species has a name like that" in grid(pilot.app)
        assert walk(pilot).query_one("#blend").strip.input.value == "xyzzy"
        await pressed(pilot, "escape")
        assert walk(pilot).desk.text.rows("blend.parts") == 2


async def test_a_part_is_renamed_in_place(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "down", "enter")
        await typed(pilot, "106-97")
        await pressed(pilot, "enter")
        assert walk(pilot).desk.text.get("blend.parts[1].species") == "n-butane"
        assert walk(pilot).desk.text.get("blend.parts[1].share") == "10 %"


async def test_a_stock_outside_the_parts_is_looked_for_by_name_too(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "2")
        walk(pilot).go_to("tank.previous_contents")
        await pressed(pilot, "enter")
        await typed(pilot, "butan")
        assert "n-butane" not in grid(pilot.app), "only stocks can have been in a tank"
        await pressed(pilot, "enter")
        assert walk(pilot).desk.text.get("tank.previous_contents") == "field butane"


async def test_rows_are_removed_and_values_cleared(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "down", "d")
        assert walk(pilot).desk.text.rows("blend.parts") == 1
        await pressed(pilot, "2", "down", "delete")
        assert walk(pilot).desk.text.get("tank.shell_diameter") is None
        await pressed(pilot, "ctrl+z", "ctrl+z")
        assert not walk(pilot).desk.session.dirty


async def test_cells_beside_each_other_are_reached_with_left_and_right(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "right", "enter")
        strip = walk(pilot).query_one("#blend").strip
        assert strip.purpose == "blend.parts[0].share" and strip.input.value == "90 %"
        await pressed(pilot, "escape", "right", "enter")
        assert strip.purpose == "blend.parts[0].quality"


async def test_the_heel_is_described_where_the_tank_is(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "2")
        walk(pilot).go_to("tank.contents.parts[+]")
        await pressed(pilot, "enter")
        await typed(pilot, "summer")
        await pressed(pilot, "enter")
        await typed(pilot, "100 %")
        await pressed(pilot, "enter")
        assert walk(pilot).desk.text.get("tank.contents.parts[0].stock") == "summer gasoline base"
        assert "in the tank: sum 100 %" in grid(pilot.app)


async def test_faults_are_listed_and_enter_goes_to_the_input(tmp_path):
    path = written_case(tmp_path, "[blend]\n[tank]\nshell_diameter = \"24\"\n")
    async with opened(path) as pilot:
        await pressed(pilot, "5")
        text = grid(pilot.app)
        assert "Inputs to correct: 2" in text and "'24' has no unit" in text
        assert "inputs to correct: 2" in tally_words(pilot)
        assert "Go to it" in keys_shown(pilot) and "Why" not in keys_shown(pilot)
        await pressed(pilot, "enter")
        assert walk(pilot).current == "tank"
        assert walk(pilot).query_one("#tank").sheet.cell.path == "tank.shell_diameter"


async def test_an_unknown_finding_leads_to_the_input_it_asks_for(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "5", "down")
        assert "Go to input" in keys_shown(pilot)
        await pressed(pilot, "g")
        assert walk(pilot).query_one("#line").sheet.cell.path == "line.receipt.dissolved_gas"
        assert "needed" in grid(pilot.app)


async def test_the_why_card_follows_the_chosen_row(case_file):
    async with opened(case_file, size=(140, 40)) as pilot:
        await pressed(pilot, "5")
        assert "NPSH available at the pump inlet 2.40 m" in grid(pilot.app)
        await pressed(pilot, "down", "down")
        assert "out-breathing required, as air 1512 Nm3/h" in grid(pilot.app)


async def test_enter_opens_the_card_and_escape_leaves_it(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "5", "enter")
        assert pilot.app.focused.id == "why"
        await pressed(pilot, "escape")
        assert pilot.app.focused.id == "bars"


async def test_the_views_follow_each_other(case_file):
    async with opened(case_file) as pilot:
        await pressed(pilot, "5")
        assert "bubble pressure, kPa, against temperature, degC" not in grid(pilot.app)
        await pressed(pilot, "v")
        assert "bubble pressure, kPa, against temperature, degC" in grid(pilot.app)
        await pressed(pilot, "v", "v")
        assert walk(pilot).query_one("#findings").look == "bars"


async def test_a_bug_in_a_worker_is_told_in_plain_words(case_file, tmp_path):
    playing = Playing()
    async with opened(case_file, playing) as pilot:
        playing.bug = ZeroDivisionError("division by zero")
        await pressed(pilot, "r")
        assert "fault of the program, not of your case (ZeroDivisionError: division by zero)" in tally_words(pilot)
        assert "Traceback" in (tmp_path / "home" / ".screener" / "bug.txt").read_text(encoding="utf-8")
        playing.bug = None
        await pressed(pilot, "r")
        assert tally_words(pilot) == ""
        assert isinstance(pilot.app.screen, WalkScreen)


async def test_the_frame_is_clickable(case_file):
    async with opened(case_file) as pilot:
        await pilot.click("StepBar", offset=(28, 0))
        await settled(pilot)
        assert walk(pilot).current == "site"
        await pilot.click("#site Sheet", offset=(3, 3))
        assert walk(pilot).query_one("#site").sheet.key == "site.elevation"
        await pilot.click("KeyRow", offset=(3, 0))
        await settled(pilot)
        assert walk(pilot).query_one("#site").strip.editing


async def test_a_name_nobody_knows_has_a_row_and_can_be_taken_away(tmp_path):
    text = CASE.replace("[line]\n", '[line]\nlenght = "95 m"\n').replace('share = "90 %",', 'share = "90 %", shade = "red",')
    async with opened(written_case(tmp_path, text), Reading()) as pilot:
        await pressed(pilot, "5", "down", "enter")
        assert walk(pilot).current == "line"
        line = walk(pilot).query_one("#line")
        assert line.sheet.cell.path == "line.lenght" and "Names that are not known" in grid(pilot.app)
        assert hint(pilot) == "nothing reads a value of this name; Del takes it away"
        await pressed(pilot, "enter")
        assert not line.strip.editing, "there is nothing to put there"
        await pressed(pilot, "f1", "escape", "delete")
        assert not walk(pilot).desk.text.has("line.lenght") and "Names that" not in grid(pilot.app)
        await pressed(pilot, "5", "enter")
        assert walk(pilot).query_one("#blend").sheet.cell.path == "blend.parts[0].shade"
        assert "Remove" not in keys_shown(pilot), "the part itself is another row"
        await pressed(pilot, "delete")
        assert walk(pilot).desk.text.rows("blend.parts") == 2 and not walk(pilot).desk.text.has("blend.parts[0].shade")
        assert "1 beyond" in grid(pilot.app)


async def test_the_strip_names_a_column_only_where_there_are_several(tmp_path):
    async with opened(written_case(tmp_path)) as pilot:
        walk(pilot).go_to("tank.vents[0].set")
        assert walk(pilot).query_one("#tank").label == "opens out at"
        walk(pilot).go_to("blend.parts[0].share")
        assert walk(pilot).query_one("#blend").label == "summer gasoline base, share"


async def test_a_key_typed_ahead_goes_to_the_new_step(case_file):
    async with opened(case_file) as pilot:
        walk(pilot).action_go(2)
        assert pilot.app.focused is walk(pilot).query_one("#tank").sheet
        await pressed(pilot, "5")
        walk(pilot).action_go(6)
        assert pilot.app.focused is walk(pilot).query_one("#memo .sheet")
