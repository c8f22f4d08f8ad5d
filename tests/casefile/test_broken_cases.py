"""Broken case files: every fault at once, each with path, value and what is allowed.

A file in cases/broken begins with the faults it must give, one a line: path, then words that
the message must hold. Faults that are not listed there fail the test too.
"""

from pathlib import Path

import pytest

from screener.casefile import read_case
from screener.ground.errors import CaseErrors

BROKEN = sorted((Path(__file__).parent / "cases" / "broken").glob("*.toml"))


def _expected(file: Path) -> list[list[str]]:
    lines = file.read_text(encoding="utf-8").splitlines()
    return [[word.strip() for word in line[2:].split(" | ")] for line in lines if line.startswith("#!")]


def test_there_are_enough_broken_cases():
    assert len(BROKEN) >= 20
    assert all(_expected(file) for file in BROKEN)


@pytest.mark.parametrize("file", BROKEN, ids=lambda file: file.stem)
def test_every_fault_is_named_with_its_place_and_what_is_allowed(file, tables):
    with pytest.raises(CaseErrors, match=".") as caught:
        read_case(file, tables=tables)
    wanted = _expected(file)
    assert sorted(fault.path for fault in caught.value.faults) == sorted(path for path, *_ in wanted)
    for path, *words in wanted:
        fault = next(fault for fault in caught.value.faults if fault.path == path)
        message = str(fault)
        assert message.startswith(f"{path}: ") and fault.hint, message
        for word in words:
            assert word in message, message


@pytest.mark.parametrize("file", BROKEN, ids=lambda file: file.stem)
def test_a_fault_keeps_the_value_that_was_given(file, tables):
    with pytest.raises(CaseErrors, match=".") as caught:
        read_case(file, tables=tables)
    for fault in caught.value.faults:
        missing = "is missing" in fault.problem or "neither a stock nor" in fault.problem
        assert missing == (fault.value is None), str(fault)


@pytest.mark.parametrize(
    ("name", "content", "words"),
    [
        ("absent.toml", None, "cannot be read: no such file"),
        ("latin.toml", '[case]\ntitle = "M\xf6we"\n'.encode("latin-1"), "not UTF-8 text"),
        ("digits.toml", b"a = " + b"9" * 5000, "not a case file"),
        ("deep.toml", b"a = " + b"[" * 20000, "not"),
        ("large.toml", b"#" * 5_000_001, "too large"),
    ],
)
def test_a_file_that_cannot_be_read_is_one_fault(tmp_path, tables, name, content, words):
    if content is not None:
        (tmp_path / name).write_bytes(content)
    with pytest.raises(CaseErrors, match=words) as caught:
        read_case(tmp_path / name, tables=tables)
    assert len(caught.value.faults) == 1


def test_a_folder_is_no_case_file(tmp_path, tables):
    with pytest.raises(CaseErrors, match="cannot be read: is a directory"):
        read_case(tmp_path, tables=tables)
