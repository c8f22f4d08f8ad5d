"""A screening takes no decision: the words that would take one are in no output and in no wording file."""

from __future__ import annotations

import re
import tomllib
from pathlib import Path

import pytest

ROOT = Path(__file__).resolve().parents[2]
# 'may be stored' and its kin decide; so do these words. Whole words, either case; OK in capitals only
# counts as the word, 'ok' as a word as well.
DECIDING = re.compile(
    r"\b(safe|safely|approved|approves|permitted|compliant|ok|okay|may be stored)\b", re.IGNORECASE
)
# Sentences that use one of the words in order to refuse the decision. Each must occur, or it goes.
CAUTIONS: tuple[str, ...] = ()
OUTPUTS = (".md", ".txt", ".json", ".html")


def wording_files():
    return sorted((ROOT / "data" / "words").glob("*.toml"))


def golden_files():
    return sorted(path for path in (ROOT / "tests" / "golden").rglob("*") if path.suffix in OUTPUTS)


def other_printed_tables():
    """Tables whose sentences reach the screen as well."""
    yield from sorted((ROOT / "data" / "criteria").glob("*.toml"))
    yield from sorted((ROOT / "data" / "schemas").glob("*.json"))


def deciding(text: str) -> list[str]:
    for sentence in CAUTIONS:
        text = text.replace(sentence, "")
    return [text[max(0, m.start() - 30) : m.end() + 30] for m in DECIDING.finditer(text)]


@pytest.mark.parametrize(
    "path", [*wording_files(), *golden_files(), *other_printed_tables()], ids=lambda p: p.name
)
def test_no_file_of_words_takes_a_decision(path):
    assert deciding(path.read_text(encoding="utf-8")) == []


@pytest.mark.parametrize("word", ["safe", "Approved", "permitted", "compliant", "OK", "may be stored"])
def test_the_test_can_fail(word):
    assert deciding(f"the tank is {word} now")
    assert not deciding("unsafe safety approval look book")


def test_there_is_something_to_read():
    names = {path.name for path in wording_files()}
    assert {"memo.toml", "cli.toml", "findings.toml"} <= names
    assert golden_files()


def test_each_caution_sentence_is_in_use():
    everything = "".join(path.read_text(encoding="utf-8") for path in (*wording_files(), *golden_files()))
    assert [sentence for sentence in CAUTIONS if sentence not in everything] == []


def test_every_wording_file_can_be_read():
    for path in wording_files():
        assert tomllib.loads(path.read_text(encoding="utf-8"))
