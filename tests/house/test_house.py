"""Habits that are easy to lose: the top level, unfinished marks, paths of one machine, the README."""

from __future__ import annotations

import re
import subprocess
from pathlib import Path

ROOT = Path(__file__).resolve().parents[2]
TOP = {"README.md", "DEVELOPERS.md", "pyproject.toml", "screener", "tests", "data", "examples"}


def _text_files():
    for folder in ("screener", "data", "examples", "tests"):
        for path in (ROOT / folder).rglob("*"):
            if path.is_file() and path.suffix in {".py", ".toml", ".csv", ".md", ".tcss", ".json", ".txt"}:
                yield path


def test_top_level_is_exactly_as_agreed():
    listed = subprocess.run(["git", "ls-files"], capture_output=True, text=True, cwd=ROOT, check=True).stdout
    top = {line.split("/")[0] for line in listed.splitlines()}
    assert {name for name in top if not name.startswith(".")} == TOP


def test_no_unfinished_marks():
    pattern = re.compile("|".join(["TO" + "DO", "FIX" + "ME", "NotImplemented" + "Error"]))
    bad = [str(p.relative_to(ROOT)) for p in _text_files() if pattern.search(p.read_text(encoding="utf-8"))]
    assert not bad


def test_no_path_of_one_machine():
    pattern = re.compile(r"\.\./sha" + r"red|/wo" + r"rk/|/ro" + "ot/")
    bad = [str(p.relative_to(ROOT)) for p in _text_files() if pattern.search(p.read_text(encoding="utf-8"))]
    assert not bad


def test_no_broad_except_outside_the_two_borders():
    allowed = {"screener/app", "screener/cli"}
    for path in (ROOT / "screener").rglob("*.py"):
        text = path.read_text(encoding="utf-8")
        assert "except:" not in text, path
        if "except Exception" in text:
            assert "/".join(path.relative_to(ROOT).parts[:2]) in allowed, path


def test_ci_runs_the_readme_command():
    """The continuous-integration script takes its command out of the README."""
    script = (ROOT / ".ci" / "run").read_text(encoding="utf-8")
    assert "README.md" in script and "## Run the tests" in script
    assert "pytest" in (ROOT / "README.md").read_text(encoding="utf-8").split("## Run the tests")[1]
