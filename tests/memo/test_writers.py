"""Markdown and JSON: structure kept, markup in user text inert."""

from __future__ import annotations

import json
import random
from pathlib import Path

import pytest
from markdown_it import MarkdownIt

from screener.memo import build_memo, write_json, write_markdown
from screener.memo.document import Bullets, Document, Paragraph, Section, Table
from screener.memo.markdown import escaped
from tests.memo.hand_made_screening import made_case, made_screening, memo_arguments

HOSTILE = [
    "**bold** and _slanted_ and ~~struck~~",
    "[a link](http://example.org) ![image](x.png)",
    "<script>alert(1)</script> &amp; &lt;",
    "pipe | in | a cell",
    "`code` and ``more``",
    "# not a heading",
    "- not a list",
    "+ not a list",
    "* not a list",
    "1. not a list",
    "23) not a list",
    "> not a quote",
    "====",
    "---",
    "```",
    "snake_case_name and _under_",
    "$x^2$ is no formula",
    "back\\slash \\* \\",
    "tab\tand\nnew line  and   spaces",
    "https://example.org and www.example.org and a@example.org",
    "[x] no task, [^1] no footnote",
    "a&b; &copy; &#35;",
    "90 % | <b> ~ ! ?",
]


def rendered(text: str) -> list:
    return MarkdownIt("gfm-like").parse(text)


def shown(tokens) -> str:
    """Text a reader sees, markup gone."""
    return "".join(
        child.content if child.type in ("text", "code_inline") else "\n" if child.type == "softbreak" else ""
        for token in tokens
        if token.type == "inline"
        for child in token.children
    )


def kinds(tokens) -> set[str]:
    return {t.type for t in tokens} | {c.type for t in tokens if t.children for c in t.children}


def document(*blocks, title="plain") -> Document:
    return Document("memo", title, "head", (), (Section("", "part", blocks),))


@pytest.mark.parametrize("text", HOSTILE)
def test_markup_in_a_paragraph_stays_plain(text):
    tokens = rendered(write_markdown(document(Paragraph(text))))[-3:]
    assert [t.type for t in tokens] == ["paragraph_open", "inline", "paragraph_close"]
    assert shown(tokens) == " ".join(text.split())
    assert kinds(tokens) <= {"paragraph_open", "paragraph_close", "inline", "text", "text_special"}


@pytest.mark.parametrize("text", HOSTILE)
def test_markup_in_a_cell_stays_in_its_cell(text):
    table = Table(("a", "b"), ((text, "next"),))
    tokens = rendered(write_markdown(document(table)))
    cells = [tokens[i + 1] for i, t in enumerate(tokens) if t.type == "td_open"]
    assert len(cells) == 2
    assert shown([cells[0]]) == " ".join(text.split())
    assert shown([cells[1]]) == "next"


@pytest.mark.parametrize("text", HOSTILE)
def test_markup_in_a_list_and_in_a_title_stays_plain(text):
    tokens = rendered(write_markdown(document(Bullets((text,)), title=text)))
    assert shown([tokens[1]]) == " ".join(text.split())
    assert sum(t.type == "bullet_list_open" for t in tokens) == 1
    assert shown([t for t in tokens if t.type == "inline"][-1:]) == " ".join(text.split())


def test_random_punctuation_survives():
    """Any mixture of marks comes back as typed; seeded."""
    draw = random.Random(20260720)
    for _ in range(400):
        text = " ".join("".join(draw.choices("ab1 .!?*_[]()<>&|`~#+-=:;\\$@/\"'{}^%", k=14)).split())
        if text:
            tokens = rendered(write_markdown(document(Paragraph(text))))[-3:]
            assert shown(tokens) == text
            assert tokens[0].type == "paragraph_open"


def test_ordinary_text_is_hardly_touched():
    for text in (
        "tank.shell_diameter",
        "-1.8 kPa",
        "8 CCR 5585(c): a rule",
        "T(V/L = 20)",
        "90 % base + 10 % ethanol",
    ):
        assert escaped(text) == text


def test_hostile_case_gives_the_same_structure():
    evil = " | ".join(HOSTILE)
    plain = rendered(write_markdown(build_memo(made_screening(), **memo_arguments())))
    case = made_case(title=evil, reference=evil, prepared_by=evil)
    hostile = rendered(
        write_markdown(build_memo(made_screening(case=case), **memo_arguments(author=evil, number=evil)))
    )
    assert [t.type for t in hostile] == [t.type for t in plain]


def test_every_table_has_its_columns():
    tokens = rendered(write_markdown(build_memo(made_screening(), **memo_arguments())))
    heads = cells = 0
    for token in tokens:
        if token.type == "table_open":
            heads = 0
        heads += token.type == "th_open"
        cells += token.type == "td_open"
        if token.type == "tr_close" and cells:
            assert cells == heads
            cells = 0
    assert sum(t.type == "table_open" for t in tokens) >= 14


def test_json_keeps_values_beside_texts():
    body = json.loads(write_json(build_memo(made_screening(), **memo_arguments())), parse_constant=_refuse)
    assert body["schema"] == "screener.memo/1"
    assert [part["number"] for part in body["sections"]] == [*map(str, range(15)), "A"]
    results = next(b for b in body["sections"][6]["blocks"] if b["block"] == "table")
    assert results["rows"][3][2] == {"value": 66100.0, "unit": "Pa", "text": "66.1 kPa"}
    assert results["rows"][0][4] == {"low": 66100.0, "high": None, "unit": "Pa", "text": "at least 66.1 kPa"}


def _refuse(name):
    raise AssertionError(f"{name} in JSON")


def test_golden_markdown(golden):
    arguments = memo_arguments(data_digest="0" * 64, case_text='[case]\ntitle = "Tarn Hollow, tank 12"\n')
    golden("memo_hand_made.md", write_markdown(build_memo(made_screening(), **arguments)))


@pytest.fixture
def golden():
    """Compare with a file in tests/golden, letter for letter."""
    folder = Path(__file__).resolve().parent.parent / "golden"

    def compare(name: str, text: str) -> None:
        assert text == (folder / name).read_text(encoding="utf-8"), f"tests/golden/{name} says otherwise"

    return compare
