"""What the floor declares is there, described with units, and light to import."""

from __future__ import annotations

import inspect
import re
import subprocess
import sys

import pytest

from screener import fire

FUNCTIONS = [name for name in fire.__all__ if inspect.isfunction(getattr(fire, name))]


def test_every_declared_name_exists():
    assert {"flash_point", "flammable_window", "headspace"} <= set(fire.__all__)
    assert all(getattr(fire, name) is not None for name in fire.__all__)


@pytest.mark.parametrize("name", FUNCTIONS)
def test_docstring_is_a_contract(name):
    function = getattr(fire, name)
    doc = inspect.cleandoc(function.__doc__)
    assert re.search(r"^Source\n-+$", doc, re.MULTILINE), "no Source section"
    body = re.search(r"^Parameters\n-+\n(.*?)(?=^\w+\n-+$|\Z)", doc, re.MULTILINE | re.DOTALL)
    entries = re.split(r"^(?=\w+ : )", body.group(1) if body else "", flags=re.MULTILINE)
    described = {entry.split(" :")[0] for entry in entries if " : " in entry}
    assert described == set(inspect.signature(function).parameters)
    for entry in entries:
        if re.search(r"^\w+ : .*\b(float|array)\b(?! of str)", entry):
            assert re.search(r"\[[^\]]+\]", entry.split("\n", 1)[1]), entry


def test_import_loads_nothing_heavy():
    heavy = ("scipy", "thermo", "chemicals", "pint", "pandas")
    code = f"import screener.fire, sys; print([m for m in {heavy!r} if m in sys.modules])"
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert done.stdout.strip() == "[]"
