"""Docstrings of the public functions of floors 2 to 4 are contracts: held against the signatures."""

from __future__ import annotations

import importlib
import inspect
import re

import pytest

FLOORS = ("screener.equilibrium", "screener.volatility", "screener.fire", "screener.blends")


def _public():
    for floor in FLOORS:
        module = importlib.import_module(floor)
        for name in module.__all__:
            item = getattr(module, name)
            if inspect.isfunction(item):
                yield pytest.param(item, id=f"{floor}.{name}")


def _sections(doc: str) -> dict[str, str]:
    found, current = {}, "summary"
    lines = inspect.cleandoc(doc).splitlines()
    for i, line in enumerate(lines):
        if i + 1 < len(lines) and re.fullmatch(r"-{3,}", lines[i + 1].strip()):
            current = line.strip()
        elif not re.fullmatch(r"-{3,}", line.strip()):
            found[current] = found.get(current, "") + line + "\n"
    return found


@pytest.mark.parametrize("function", list(_public()))
def test_docstring_matches_signature(function):
    sections = _sections(function.__doc__ or "")
    assert sections.get("summary", "").strip(), "no summary line"
    assert "Source" in sections, "no Source section"
    described = re.findall(r"^([\w*, ]+?) :", sections.get("Parameters", ""), re.MULTILINE)
    described = {name.strip(" *") for names in described for name in names.split(",")}
    wanted = {name for name in inspect.signature(function).parameters if not name.startswith("_")}
    assert described == wanted, f"described {sorted(described)}, signature {sorted(wanted)}"


@pytest.mark.parametrize("function", list(_public()))
def test_numbers_have_units(function):
    """Every parameter described as float or array carries a [unit]."""
    text = _sections(function.__doc__ or "").get("Parameters", "")
    entries = re.split(r"^(?=[\w*, ]+? :)", text, flags=re.MULTILINE)
    for entry in entries:
        head = entry.split("\n", 1)[0]
        if re.search(r":.*\b(float|array)\b(?! of (?:str|bool))", head):
            assert re.search(r"\[[^\]]+\]", entry.split("\n", 1)[-1]), f"no unit: {head}"
