"""The memo on the screen: every word of the document, at any width."""

from __future__ import annotations

import pytest

from screener.app.glyphs import glyphs
from screener.app.preview import document_rows
from screener.app.rows import row_width, text_of
from screener.memo.document import (
    Block,
    Bullets,
    Document,
    Equation,
    Paragraph,
    Section,
    Table,
    Verbatim,
    VerdictRow,
    Verdicts,
)
from screener.memo.numbers import Quantity

WIDE = Table(
    ("verdict", "finding", "value", "low to high", "limit", "margin", "room used", "limit no."),
    (("! beyond", "Net positive suction head", "2.40 m", "1.90 to 3.60 m", "at least 3.20 m", "-0.80 m", "107 %", "L1"),),
    ("left", "left", "right", "right", "right", "right", "right", "left"),
)
BLOCKS: tuple[Block, ...] = (
    Paragraph("Worst verdict: beyond.", "note"),
    Bullets(("read in law", "entered with the case")),
    Verdicts((VerdictRow("!", "beyond", "npsh.pump", "Net positive suction head", "the best value is on the wrong side"),)),
    Table(("limit", "value"), (("L1", Quantity(97800.0, "Pa", "97.8 kPa")),), ("left", "right"), "Limits", "one table"),
    WIDE,
    Equation("P_suction = P_atm - dP", "97.8 - 31.2", Quantity(66600.0, "Pa", "66.6 kPa"), "at the pump"),
    Verbatim('[case]\n  title = "x"'),
)
DOCUMENT = Document("memo", "Screening memo: tank 12", "TH-12", (("memo no.", "TH-12"),), (Section("2", "Outcome", BLOCKS),))


def texts(width, document=DOCUMENT, name="braille"):
    rows = document_rows(document, width, glyphs(name))
    assert all(row_width(row) <= width for row in rows)
    return [text_of(row) for row in rows]


@pytest.mark.parametrize("width", [40, 60, 78, 100, 140])
def test_every_word_is_there(width):
    letters = "".join("".join(texts(width)).split())
    for word in ("TH-12", "Outcome", "beyond.", "law", "suction", "wrong", "97.8", "3.60", "107", "L1", "P_suction",
                 "66.6", "pump", "[case]"):  # fmt: skip
        assert word in letters, word


def test_a_table_with_room_stands_side_by_side():
    row = next(line for line in texts(140) if "107 %" in line)
    assert "-0.80 m" in row and "at least 3.20 m" in row


def test_a_table_without_room_is_printed_record_by_record():
    lines = texts(60)
    assert "finding      Net positive suction head" in lines
    assert "room used    107 %" in lines


def test_numbers_are_set_right():
    lines = texts(78)
    head = next(line for line in lines if line.startswith("limit "))
    row = next(line for line in lines if line.startswith("L1"))
    assert head.endswith("   value") and row.endswith("97.8 kPa") and len(head) == len(row)


def test_the_control_block_is_printed_once():
    twice = Document("memo", "t", "h", (("memo no.", "TH-12"),), (Section("0", "Control block", (Paragraph("TH-12"),)),))
    assert sum("TH-12" in line for line in texts(60, twice)) == 1


def test_lines_of_the_case_keep_their_indent():
    assert '  title = "x"' in texts(60)


def test_every_kind_of_block_can_be_shown():
    from typing import get_args

    from screener.app.preview import _PAINTERS

    assert set(_PAINTERS) == {kind.__name__ for kind in get_args(Block)}
