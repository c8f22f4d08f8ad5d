"""Every exit code, and what stands on which stream."""

from __future__ import annotations

import json
import os
import re
import subprocess
import sys
from dataclasses import replace
from pathlib import Path

import pytest

from screener.cli import main
from screener.ground.errors import CaseErrors, DataError, InputError, UnknownName
from tests.memo.hand_made_screening import BEYOND, NEAR, ROOM, SKIPPED, UNKNOWN, made_case, made_screening

ROOT = Path(__file__).resolve().parents[2]


@pytest.fixture
def screened(monkeypatch):
    """Replace reading and screening: file names are keys into the findings wanted."""

    def use(by_name):
        monkeypatch.setattr(
            "screener.casefile.read_case", lambda path: made_case(title=str(path), source=str(path))
        )
        monkeypatch.setattr(
            "screener.screening.screen", lambda case: made_screening(*by_name[case.title], case=case)
        )

    return use


@pytest.mark.parametrize(
    ("findings", "code"),
    [
        ((ROOM,), 0),
        ((ROOM, SKIPPED), 0),
        ((ROOM, NEAR), 4),
        ((ROOM, NEAR, UNKNOWN), 2),
        ((SKIPPED,), 2),
        ((ROOM, NEAR, UNKNOWN, BEYOND), 1),
        ((BEYOND, SKIPPED), 1),
    ],
)
def test_check_returns_the_code_of_its_findings(screened, capsys, findings, code):
    screened({"a.toml": findings})
    assert main(["check", "a.toml"]) == code
    captured = capsys.readouterr()
    assert findings[0].title.split()[0] in captured.out
    assert captured.err == ""


@pytest.mark.parametrize(
    ("cases", "code"),
    [
        (((ROOM,), (NEAR,)), 4),
        (((NEAR,), (SKIPPED,)), 2),
        (((UNKNOWN,), (ROOM,), (BEYOND,)), 1),
        (((ROOM,), (ROOM,)), 0),
    ],
)
def test_several_cases_return_the_worst_code(screened, capsys, cases, code):
    names = [f"{i}.toml" for i in range(len(cases))]
    screened(dict(zip(names, cases)))
    assert main(["check", "--json", *names]) == code
    body = json.loads(capsys.readouterr().out)
    assert body["exit_code"] == code
    assert [case["file"] for case in body["cases"]] == names


def test_every_fault_of_every_file_is_listed(monkeypatch, capsys):
    def read(path):
        if path == "good.toml":
            return made_case()
        raise CaseErrors(
            [
                InputError("tank.shell_diameter", "0 m", "0 m is not a diameter", "above 0 m"),
                UnknownName("blend.parts[1].species", "ethenol", "species", ["ethanol"]),
            ]
        )

    monkeypatch.setattr("screener.casefile.read_case", read)
    assert main(["check", "bad.toml", "good.toml", "worse.toml"]) == 3
    captured = capsys.readouterr()
    assert captured.out == ""
    assert captured.err.splitlines()[0] == "screener: 4 faults in the input:"
    for file in ("bad.toml", "worse.toml"):
        assert f"  {file}: tank.shell_diameter: 0 m is not a diameter; above 0 m" in captured.err
        assert (
            f"  {file}: blend.parts[1].species: 'ethenol' is not a known species; nearest: ethanol"
            in captured.err
        )
    assert "Traceback" not in captured.err


@pytest.mark.parametrize(
    ("argv", "said"),
    [
        (["chek"], "invalid choice: 'chek'"),
        (["check"], "CASE.toml"),
        (["check", "--units", "metric", "a.toml"], "invalid choice: 'metric'"),
        (["check", "--width", "7", "a.toml"], "'7' is not a width"),
        (["check", "--width", "wide", "a.toml"], "'wide' is not a width"),
        (["quick", "100% ethanol"], "--at"),
        (["memo", "a.toml"], "--output"),
        (["memo", "a.toml", "-o", "memo.pdf"], "no writer for '.pdf' is available; available: .md, .json"),
        (["memo", "a.toml", "-o", "memo"], "available: .md, .json"),
        (["memo", "a.toml", "-o", "m.md", "--status", "checked"], "invalid choice: 'checked'"),
        (["memo", "a.toml", "-o", "m.md", "--date", "12/05/26"], "--date: '12/05/26' is not a date"),
        (["--vers"], "unrecognized arguments"),
    ],
)
def test_a_bad_argument_is_bad_input(capsys, argv, said):
    """argparse would return 2, which here means that something is unknown."""
    assert main(argv) == 3
    captured = capsys.readouterr()
    assert said in captured.err
    assert captured.out == ""


@pytest.mark.parametrize(
    "fault", [DataError("species/a.csv", 3, "no unit"), ZeroDivisionError("division by zero")]
)
def test_a_fault_of_ours_is_one_line_and_a_file(monkeypatch, capsys, tmp_path, fault):
    def read(path):
        raise fault

    monkeypatch.setattr("screener.casefile.read_case", read)
    monkeypatch.setattr("tempfile.tempdir", str(tmp_path))
    assert main(["check", "a.toml"]) == 70
    captured = capsys.readouterr()
    assert captured.out == ""
    assert captured.err.startswith("screener: this is a fault of the program, not of the input")
    assert captured.err.count("\n") == 1
    (report,) = tmp_path.iterdir()
    assert str(report) in captured.err
    text = report.read_text()
    assert "Traceback" in text
    assert str(fault) in text
    assert "['check', 'a.toml']" in text


def test_a_report_that_cannot_be_written_is_still_one_line(monkeypatch, capsys, tmp_path):
    def read(path):
        raise RuntimeError("broken")

    monkeypatch.setattr("screener.casefile.read_case", read)
    monkeypatch.setattr("tempfile.tempdir", str(tmp_path / "gone"))
    assert main(["check", "a.toml"]) == 70
    assert capsys.readouterr().err.count("\n") == 1


def test_an_interrupt_is_quiet(monkeypatch, capsys):
    def read(path):
        raise KeyboardInterrupt

    monkeypatch.setattr("screener.casefile.read_case", read)
    assert main(["check", "a.toml"]) == 130
    captured = capsys.readouterr()
    assert captured.err == "screener: interrupted\n"


def test_a_closed_pipe_is_quiet():
    """The reader leaves before the first byte: no traceback, not even from the flush at exit."""
    read, write = os.pipe()
    os.close(read)
    done = subprocess.run(
        [sys.executable, "-m", "screener", "criteria"],
        check=False,
        stdout=write,
        stderr=subprocess.PIPE,
        text=True,
        cwd=ROOT,
    )
    os.close(write)
    assert done.returncode == 141
    assert done.stderr == ""


def test_help_and_version_are_results(capsys):
    for argv, said in (
        (["--help"], "exit codes:"),
        (["--version"], "screener "),
        (["check", "--help"], "CASE.toml"),
    ):
        with pytest.raises(SystemExit, match="0"):
            main(argv)
        captured = capsys.readouterr()
        assert said in captured.out
        assert captured.err == ""


def test_without_a_command_the_screens_open(monkeypatch):
    opened = []
    monkeypatch.setattr("screener.cli.streams.interactive", lambda: True)
    monkeypatch.setitem(sys.modules, "screener.app", type(sys)("screener.app"))
    monkeypatch.setattr(sys.modules["screener.app"], "run", lambda path: opened.append(path), raising=False)
    assert main([]) == 0
    assert main(["open"]) == 0
    assert main(["open", "a.toml"]) == 0
    assert opened == [None, None, "a.toml"]


def test_without_a_terminal_no_screens(capsys, monkeypatch):
    monkeypatch.setattr("screener.cli.streams.interactive", lambda: False)
    assert main(["open", "examples/a.toml"]) == 3
    assert "the screens need a terminal; screener check" in capsys.readouterr().err


def test_help_loads_only_the_standard_library():
    code = "import sys; from screener.cli import main\ntry: main(['--help'])\nexcept SystemExit: pass\nprint('@@', *sys.modules)"
    before = _loaded("import sys\nprint('@@', *sys.modules)")
    outside = {
        name.split(".")[0]
        for name in _loaded(code) - before
        if name.split(".")[0] not in sys.stdlib_module_names and not name.startswith("screener")
    }
    assert outside == set()


def _loaded(code: str) -> set[str]:
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, cwd=ROOT, check=True)
    return set(done.stdout.rsplit("@@", 1)[1].split())


def test_only_one_module_touches_the_streams():
    pattern = re.compile(r"\bprint\(|sys\.(stdout|stderr)|argparse\.\w*print")
    for folder in ("cli", "memo"):
        for path in (ROOT / "screener" / folder).glob("*.py"):
            if path.name != "streams.py":
                assert not pattern.search(path.read_text(encoding="utf-8")), path


def test_hostile_text_does_not_reach_the_terminal(screened, capsys):
    evil = replace(ROOM, title="Boiling \x1b[2J\u202egnp", reason="line one\nline two")
    screened({"a.toml": (evil,)})
    main(["check", "a.toml", "--width", "200"])
    out = capsys.readouterr().out
    assert "\x1b" not in out
    assert "\u202e" not in out
    assert "line one line two" in out
