"""The shipped examples through the whole program: golden outputs, schema, memo against result."""

from __future__ import annotations

import json
from pathlib import Path

import pytest

from screener.casefile import read_case
from screener.cli import main
from screener.cli.result import case_object
from screener.memo import build_memo
from screener.memo.numbers import Quantity
from screener.screening import screen
from tests.cli.small_schema import faults
from tests.cli.test_result import SCHEMA
from tests.golden.made import COMMANDS, FOLDER, differences, output
from tests.memo.hand_made_screening import memo_arguments
from tests.memo.test_memo import cells_of

ROOT = Path(__file__).resolve().parents[2]
EXAMPLES = sorted(path.name for path in (ROOT / "examples").glob("*.toml"))


@pytest.fixture(autouse=True)
def at_the_top(monkeypatch):
    """Golden outputs print relative paths."""
    monkeypatch.chdir(ROOT)


@pytest.mark.parametrize("name", sorted(COMMANDS))
def test_output_is_the_golden_one(name, tmp_path):
    kept = (FOLDER / name).read_text(encoding="utf-8")
    assert differences(kept, output(name, tmp_path)) == []


@pytest.mark.parametrize(
    ("kept", "made"),
    [
        ("value 66.1 kPa", "value 66.3 kPa"),
        ("~ near", ". room"),
        ("margin +1.8", "margin -1.8"),
        ('"value": 66123.4', '"value": 66130.4'),
        ("a\nb", "a"),
        ("at most 97.8", "at least 97.8"),
    ],
)
def test_the_comparison_can_fail(kept, made):
    assert differences(kept, made)


def test_the_comparison_forgives_the_last_digit():
    assert differences("value 66.1 kPa  12", "value 66.2 kPa  12") == []
    assert differences('"value": 66123.4', '"value": 66123.5') == []


@pytest.mark.parametrize("name", EXAMPLES)
def test_result_fits_schema_and_holds_every_number_of_the_memo(name):
    screening = screen(read_case(f"examples/{name}"))
    body = json.loads(json.dumps(case_object(screening), allow_nan=False))
    assert faults(body, SCHEMA["$defs"]["case"], SCHEMA) == []
    known = set(_numbers(body)) | {0.0}
    cells = list(cells_of(build_memo(screening, **memo_arguments())))
    values = [
        v
        for c in cells
        for v in ((c.value,) if isinstance(c, Quantity) else (c.low, c.high))
        if v is not None
    ]
    assert len(values) > 200
    assert sorted({v for v in values if v not in known}) == []


def _numbers(value):
    if isinstance(value, dict):
        value = list(value.values())
    if isinstance(value, list):
        for item in value:
            yield from _numbers(item)
    elif isinstance(value, (int, float)):
        yield float(value)


def test_a_new_case_can_be_checked_at_once(tmp_path, capsys):
    file = tmp_path / "new.toml"
    assert main(["new", str(file)]) == 0
    kept = file.read_bytes()
    assert main(["check", str(file)]) in (0, 1, 2, 4)
    capsys.readouterr()
    assert main(["new", str(file)]) == 3
    assert "the file exists and is never overwritten" in capsys.readouterr().err
    assert file.read_bytes() == kept


def test_a_memo_that_cannot_be_written_is_bad_input(tmp_path, capsys):
    assert main(["memo", f"examples/{EXAMPLES[0]}", "-o", str(tmp_path / "no" / "memo.md")]) == 3
    assert "cannot be written" in capsys.readouterr().err
