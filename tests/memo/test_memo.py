"""The memo says what findings and inputs say, in the agreed order, and nothing else."""

from __future__ import annotations

import re
from dataclasses import fields, is_dataclass, replace

import pytest

from screener.ground.errors import InputError
from screener.memo import build_field_sheet, build_memo, write_json, write_markdown
from screener.memo.document import Bullets, Figure, Table, Verbatim, Verdicts
from screener.memo.numbers import Quantity, Span
from screener.screening.finding import Fact
from screener.states.case import InputEcho
from tests.memo.hand_made_screening import (
    BEYOND,
    NEAR,
    ROOM,
    UNKNOWN,
    finding,
    made_case,
    made_screening,
    memo_arguments,
)


def memo(screening=None, **changes):
    return build_memo(screening or made_screening(), **memo_arguments(**changes))


def section(document, number):
    return next(part for part in document.sections if part.number == number)


def text_of(item) -> str:
    """All text below a part of a document."""
    if isinstance(item, str):
        return item
    if is_dataclass(item):
        return "\n".join(text_of(getattr(item, field.name)) for field in fields(item))
    return "\n".join(map(text_of, item)) if isinstance(item, tuple) else ""


def cells_of(item):
    """All quantities and spans below a part of a document."""
    if isinstance(item, (Quantity, Span)):
        yield item
    elif is_dataclass(item):
        for field in fields(item):
            yield from cells_of(getattr(item, field.name))
    elif isinstance(item, tuple):
        for part in item:
            yield from cells_of(part)


def test_sections_stand_in_the_agreed_order():
    assert [part.number for part in memo().sections] == [*map(str, range(15)), "A"]


def test_same_input_same_bytes():
    assert write_markdown(memo()) == write_markdown(memo())
    assert write_json(memo()) == write_json(memo())


def test_what_comes_in_as_argument_comes_out():
    first, second = memo(), memo(date="2031-01-02", author="B. Other", number="N-7", revision="C")
    control = dict(second.control)
    assert (control["date"], control["prepared by"]) == ("2031-01-02", "B. Other")
    assert (control["memo no."], control["revision"]) == ("N-7", "C")
    assert second.running_head == "N-7 · revision C · draft"
    assert "2031-01-02" not in write_markdown(first)


@pytest.mark.parametrize("status", ["checked", "final", "", "Draft"])
def test_only_two_statuses_exist(status):
    with pytest.raises(InputError, match="a memo is draft or for checking"):
        memo(status=status)
    assert dict(memo(status="for checking").control)["status"] == "for checking"


def test_signatures_are_left_blank():
    (table, _) = section(memo(author="A. Writer"), "13").blocks
    assert [row[1:] for row in table.rows] == [("", "", "")] * 3
    assert [row[0] for row in table.rows] == ["prepared", "checked (another person)", "approval"]


def test_the_title_line_tells_of_an_unknown():
    assert memo().title == "Screening memo: Tarn Hollow, tank 12 (1 of 5 findings unknown)"
    assert memo(made_screening(ROOM, NEAR)).title == "Screening memo: Tarn Hollow, tank 12"


def test_outcome_is_worst_first_with_a_sentence_each():
    rows = next(block for block in section(memo(), "2").blocks if isinstance(block, Verdicts)).rows
    assert [row.verdict for row in rows] == ["beyond", "unknown", "near", "room", "skipped"]
    assert [row.mark for row in rows] == ["!", "?", "~", ".", "-"]
    assert all(row.sentence.endswith(".") and row.sentence[0].isupper() for row in rows)
    assert rows[0].sentence.endswith("Worst: mixture at low level, hottest day, Jul, liquid surface.")


def test_among_equals_the_least_room_comes_first():
    wide, narrow = replace(ROOM, room_used=0.3, title="wide"), replace(ROOM, room_used=0.8, title="narrow")
    rows = next(
        b for b in section(memo(made_screening(wide, narrow)), "2").blocks if isinstance(b, Verdicts)
    ).rows
    assert [row.title for row in rows] == ["narrow", "wide"]


def test_an_unknown_has_question_marks_and_a_skipped_one_is_empty():
    """An empty field must never look like a good one."""
    table = next(block for block in section(memo(), "6").blocks if isinstance(block, Table))
    rows = {row[0]: [str(cell) for cell in row[2:7]] for row in table.rows}
    assert rows["? unknown"] == ["?"] * 5
    assert rows["- skipped"] == [""] * 5
    assert rows["~ near"] == [
        "1800 Nm3/h air",
        "1800 to 1872 Nm3/h air",
        "at most 1890 Nm3/h air",
        "+90 Nm3/h air",
        "95 %",
    ]


def test_every_input_and_every_default_is_listed():
    document = memo()
    table = next(block for block in section(document, "3").blocks if isinstance(block, Table))
    assert len(table.rows) == len(made_case().inputs)
    roughness = next(row for row in table.rows if row[0] == "line.suction.roughness")
    assert [str(cell) for cell in roughness[1:]] == ["not given", "0.0460 mm", "default", "drawn steel pipe"]
    assert "Default in use: line.suction.roughness" in text_of(section(document, "9"))
    assert "Estimate in use: line.receipt.temperature" in text_of(section(document, "9"))


def test_limits_are_numbered_once_each():
    twin = replace(ROOM, id="vapour-pressure.hottest", title="Twin")
    document = memo(made_screening(ROOM, twin, NEAR))
    table = section(document, "7").blocks[0]
    assert [row[0] for row in table.rows] == ["L1", "L2"]
    assert table.rows[1][-1] == "boiling.surface, vapour-pressure.hottest"


def test_a_limit_that_was_not_read_is_a_reservation():
    remembered = replace(NEAR, evidence="memory")
    assert "was not read in its source (memory)" in text_of(section(memo(made_screening(remembered)), "9"))
    assert "was not read" not in text_of(section(memo(made_screening(NEAR)), "9"))


def test_the_five_matters_of_the_change_file():
    table = section(memo(), "11").blocks[1]
    assert len(table.rows) == 5
    assert "Suction line above the bubble point (beyond)" in table.rows[1][1]
    assert "draw slower than 360 m3/h" in table.rows[2][1]
    assert "Boiling" not in table.rows[1][1]


def test_every_quantity_stands_in_the_result_or_in_an_input():
    """Numbers as cells carry their SI value; each must be one of the screening's or of the case's."""
    screening = made_screening()
    known = set(_numbers(screening.to_dict()))
    known |= {echo.value for echo in screening.case.inputs if isinstance(echo.value, float)}
    blends = (screening.case.blend, screening.case.tank.contents.blend)
    known |= {share for blend in blends for share in blend.moles} | {0.0}
    cells = list(cells_of(memo(screening)))
    values = [
        v
        for c in cells
        for v in ((c.value,) if isinstance(c, Quantity) else (c.low, c.high))
        if v is not None
    ]
    assert len(values) > 45
    assert [v for v in values if v not in known] == []


def _numbers(value):
    if isinstance(value, float):
        yield value
    elif isinstance(value, dict):
        for item in value.values():
            yield from _numbers(item)
    elif isinstance(value, list):
        for item in value:
            yield from _numbers(item)


def test_numbers_in_sentences_come_from_the_screening_too():
    """Outside the fixed wording, every number in running text is one that a finding or an input holds."""
    plain = write_markdown(memo(made_screening(ROOM)))
    changed = write_markdown(memo(made_screening(replace(ROOM, value=55500.0, margin=42300.0))))
    assert "66.1 kPa" in plain
    assert "66.1 kPa" not in changed
    assert "55.5 kPa" in changed


def test_worked_numbers_put_the_margin_in():
    text = write_markdown(memo())
    assert "margin = limit - value\n    = 97.8 kPa - 66.1 kPa\n    = +31.7 kPa" in text
    assert "margin = value - limit\n    = 64.3 kPa - 66.1 kPa\n    = -1.8 kPa" in text


def test_worked_numbers_put_facts_and_inputs_in():
    """NPSH: (97 500 - 63 800)/(706 x 9.80665) + 1.50 - 0.30 - 2.40 = 3.67 m by hand."""
    facts = (
        Fact("surface pressure", 97500.0, "Pa"),
        Fact("bubble pressure of the hottest liquid", 63800.0, "Pa"),
        Fact("density", 706.0, "kg/m3"),
        Fact("liquid level", 1.5, "m"),
        Fact("friction head", 2.4, "m"),
    )
    npsh = finding(id="npsh.pump", unit="m", kind="stay above", value=3.667, facts=facts)
    pump = InputEcho("line.suction.pump_above_tank_bottom", "0.3 m", 0.3, "m")
    with_pump = write_markdown(memo(made_screening(npsh, case=made_case(inputs=(pump,)))))
    line = "(97.5 kPa - 63.8 kPa)/(706.0 kg/m3 x 9.80665 m/s2) + 1.50 m - 0.300 m - 2.40 m"
    assert f"    = {line}\n    = 3.67 m\n" in with_pump
    assert "9.80665" not in write_markdown(memo(made_screening(npsh, case=made_case(inputs=()))))


def test_every_criterion_has_its_governing_equation():
    from screener.memo.wording import words
    from screener.screening.criteria import criteria

    assert set(criteria()) <= set(words("worked", "equations"))


def test_the_curve_is_a_figure_with_a_table_for_readers_without_pictures():
    figure = next(block for block in section(memo(), "6").blocks if isinstance(block, Figure))
    assert [line.name for line in figure.series] == ["receipt", "heel"]
    assert figure.series[1].y == (26000.0, None, 54000.0)
    assert {mark.name for mark in figure.marks} == {"L1", "L3", "ambient, design"}
    assert [str(cell) for cell in figure.table.rows[1]] == ["20.0", "43.0", "none"]
    assert not [b for b in section(memo(made_screening(curve={})), "6").blocks if isinstance(b, Figure)]


def test_the_case_file_is_kept_letter_for_letter():
    source = '[case]\ntitle = "x ``` y"\n\n[blend]  # two  spaces\n'
    document = build_memo(made_screening(), **memo_arguments(), case_text=source)
    kept = next(block for block in section(document, "A").blocks if isinstance(block, Verbatim))
    assert kept.text == source.rstrip("\n")
    assert f"````\n{source}````" in write_markdown(document)


def test_a_bare_case_still_gives_a_memo():
    bare = made_case(inputs=(), source="", digest="", prepared_by="", reference="")
    document = memo(
        made_screening(
            UNKNOWN, case=bare, curve={}, information=(), assumptions=(), reservations=(), sources=()
        )
    )
    text = write_markdown(document)
    assert "(1 of 1 findings unknown)" in text
    assert "no file: the case was built in memory" in text
    assert "no limit was available" in text.lower()


def test_us_units_throughout():
    text = write_markdown(memo(system="us"))
    assert "9.59 psi" in text
    assert "psi gauge" in text
    # Section 14 is in SI, so that a calculator needs no conversion factors.
    shown = [part for part in memo(system="us").sections if part.number != "14"]
    cells = [cell.text for cell in cells_of(tuple(shown))]
    assert any("psi" in cell for cell in cells)
    assert not [cell for cell in cells if re.search(r"kPa|degC|Nm3|\d m\b", cell)]
    with pytest.raises(InputError, match="units are si or us"):
        memo(system="metric")


def test_field_sheet_is_the_short_form():
    sheet = build_field_sheet(made_screening(), **memo_arguments())
    assert [part.title for part in sheet.sections] == [
        "Control block",
        "Verdicts",
        "Five numbers",
        "Cautions",
    ]
    assert len(sheet.sections[1].blocks[0].rows) == 5
    assert sheet.title.endswith("(1 of 5 findings unknown)")
    many = made_screening(*(finding(id=f"boiling.{i}", room_used=i / 10) for i in range(9)))
    assert len(build_field_sheet(many, **memo_arguments()).sections[2].blocks[0].rows) == 5
    cautions = next(b for b in sheet.sections[3].blocks if isinstance(b, Bullets))
    assert cautions.items == (BEYOND.caution, ROOM.caution)
    assert len(write_markdown(sheet).splitlines()) < 60  # one page
