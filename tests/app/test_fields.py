"""Rows of the input steps, made from the declared keys."""

from __future__ import annotations

import pytest

from screener.app import fields
from screener.app.fields import Echo, Known
from screener.app.glyphs import glyphs
from screener.app.rows import row_width, text_of
from screener.app.sheet import sheet_blocks
from screener.app.start import examples
from screener.casefile import CaseText, all_keys
from screener.casefile import keys as schema
from screener.casefile.lab_keys import LAB_PATHS, OWN_R

STEPS = ("blend", "tank", "site", "line")
EMPTY = CaseText.parse("[blend]\n[tank]\n[site]\n[line]\n")


def example(name="winter_gasoline"):
    path = next(path for path in examples() if name in path.name)
    return CaseText.parse(path.read_text(encoding="utf-8"))


def records(step, text, known=fields.NOTHING):
    return [record for section in fields.sections(step, text, known) for record in section.records]


def paths(text):
    return {cell.path for step in STEPS for record in records(step, text) for cell in record.cells if cell.path}


def test_every_value_of_an_example_can_be_edited():
    from screener.app.engine import paths_in

    for path in examples():
        text = CaseText.parse(path.read_text(encoding="utf-8"))
        given = {p for p in paths_in(text.table) if not p.startswith("case.") and not p.endswith(".scale")}
        assert given <= paths(text), path.name


def test_every_declared_key_has_its_row_in_some_kind_of_tank():
    """A key added to the case file cannot be forgotten here."""
    shown = set()
    for kind in schema.key_at("tank.kind").choices:
        text = example()
        text.set("tank.kind", kind)
        for base in ("blend.parts", "tank.contents.parts"):
            text.insert(base, {"species": "ethanol", "share": "1 %"})
            text.insert(base, {"stock": "diesel", "share": "1 %"})
        text.insert("tank.vents", {"count": "1"})
        for base in LAB_PATHS:
            text.insert(f"{base}.vpcr", {"ratio": "4"})
            text.insert(f"{base}.true_vapour_pressure", {"pressure": "38 kPa"})
            for name in OWN_R:  # a reproducibility is asked for only where it or its number is given
                text.set(f"{base}.reproducibility.{name}", "1 K")
        shown |= {schema.pattern(path) for path in paths(text)}
    wanted = {
        key.path
        for key in all_keys().values()
        if key.kind not in (schema.TABLE, schema.ROWS, schema.LATER)
        and not key.path.startswith("case.")
        and key.name != "scale"
    }
    assert wanted <= shown, sorted(wanted - shown)


def test_rows_that_say_nothing_about_this_tank_are_left_out():
    text = example()
    assert "tank.roof_leg_height" not in paths(text)
    text.set("tank.kind", "internal-floating-roof")
    assert "tank.roof_leg_height" in paths(text)


def test_a_value_that_was_given_is_shown_even_where_it_does_not_apply():
    text = example()
    text.set("tank.roof_leg_height", "1.8 m")
    assert "tank.roof_leg_height" in paths(text)


def cell_texts(record):
    return [cell.text for cell in record.cells]


def row_of(path, text, known=fields.NOTHING, step="tank"):
    return next(record for record in records(step, text, known) if record.key == path)


def test_blank_needed_default_and_faulty_look_different():
    text = EMPTY.copy()
    path = "tank.shell_diameter"
    assert cell_texts(row_of(path, text))[1] == "blank"
    assert cell_texts(row_of(path, text, Known({}, {}, frozenset({path}))))[1] == "needed"
    assert cell_texts(row_of("tank.insulated", text, Known({"tank.insulated": Echo("no", "default", default=True)}, {})))[1:] == [
        "default",
        "no (default)",
    ]
    text.set(path, "24")
    faulty = row_of(path, text, Known({}, {path: "'24' has no unit"}))
    assert faulty.note == "'24' has no unit" and faulty.cells[1].tone == "bad"


@pytest.mark.parametrize(
    ("entered", "taken", "same"),
    [("2.0 m", "2 m", True), ("2100 m^3", "2100 m3", True), ("9 m", "9 m", True), ("304 mm", "0.304 m", False),
     ("11.1 psi", "76.53 kPa abs", False), ("20 m", "2 m", False)],
)  # fmt: skip
def test_an_echo_is_shown_only_where_it_says_more(entered, taken, same):
    assert fields.same_text(entered, taken) is same


def test_the_sum_of_shares():
    text = example()
    assert fields.share_total("blend", text) == pytest.approx(100.0)
    before = float(text.get("blend.parts[0].share").split()[0])
    text.set("blend.parts[0].share", "50 vol%")
    assert fields.share_total("blend", text) == pytest.approx(150.0 - before)
    text.set("blend.parts[0].share", "0.9")
    assert fields.share_total("blend", text) is None, "no unit, no sum"
    text.set("blend.parts[0].share", "9000 ppm")
    assert fields.share_total("blend", text) is None
    assert fields.share_total("tank.contents", EMPTY) is None


def test_faults_of_a_part_stand_below_the_part():
    text = example()
    known = Known({}, {"blend.parts[1].share": "-2 % is negative"})
    record = row_of("blend.parts[1]", text, known, "blend")
    assert record.note == "-2 % is negative"


def test_lists_end_with_a_row_that_adds_one():
    keys = [record.key for record in records("tank", example())]
    assert "tank.vents[+]" in keys and "tank.contents.parts[+]" in keys
    assert "site.months[+]" not in [record.key for record in records("site", example())], "twelve are all there are"


@pytest.mark.parametrize("step", STEPS)
@pytest.mark.parametrize("width", [38, 60, 79, 139])
@pytest.mark.parametrize("name", ["summer_e10", "winter_gasoline", "condensate"])
def test_no_text_of_a_sheet_is_cut(step, width, name):
    text = example(name)
    sections = fields.sections(step, text, fields.NOTHING)
    blocks = sheet_blocks(sections, width, glyphs("braille"), ("", -1))
    assert all(row_width(row) <= width for block in blocks for row in block.rows)
    by_key = {block.key: "".join("".join(text_of(row) for row in block.rows).split()) for block in blocks}
    for section in sections:
        for record in section.records:
            for cell in record.cells:
                for word in cell.text.split():
                    assert word in by_key[record.key] or len(word) > 6, (record.key, word)


def test_a_reproducibility_is_asked_for_only_where_its_number_is_given():
    text = CaseText.parse('[blend]\n[blend.lab]\ndvpe = "62 kPa"\ndistillation = { "FBP" = "200 degC" }\n[tank]\n')
    asked = {path for path in paths(text) if ".reproducibility." in path}
    assert asked == {f"blend.lab.reproducibility.{name}" for name in ("dvpe", "distillation", "fbp")}


def test_both_sheets_share_their_words():
    for path in ("blend.lab.dvpe", "blend.lab.mtbe", "blend.lab.reproducibility.dvpe"):
        heel = path.replace("blend.lab", "tank.contents.lab")
        assert fields.label(all_keys()[path]) == fields.label(all_keys()[heel])
    assert fields.heading("tank.contents.lab.distillation") == fields.heading("blend.lab.distillation")
    assert fields.heading("tank.contents.lab") != fields.heading("blend.lab")


def test_a_fault_of_a_table_stands_under_its_heading():
    text = CaseText.parse('[blend]\n[blend.lab]\ndistillation = { "10 %" = "55 degC", "50 %" = "50 degC" }\n[tank]\n')
    known = Known({}, {"blend.lab.distillation": "T50 is not above T10", "blend.lab": "refused"})
    noted = {section.note: section.note_tone for section in fields.sections("blend", text, known) if section.note}
    assert noted == {"T50 is not above T10": "bad"}, "a sheet refused as a whole is told above all rows instead"
