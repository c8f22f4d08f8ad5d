"""The built wheel alone, in another folder, screens an example; so does the base without its extras."""

from __future__ import annotations

import os
import subprocess
import sys
import zipfile
from pathlib import Path

import pytest

ROOT = Path(__file__).resolve().parents[2]
EXTRAS = ("matplotlib", "pvlib", "typst", "docx", "jinja2", "CoolProp", "teqp", "feos", "dask", "hypothesis")


@pytest.fixture(scope="module")
def unpacked(tmp_path_factory):
    """The files of a freshly built wheel, away from the checkout."""
    folder = tmp_path_factory.mktemp("wheel")
    build = [sys.executable, "-m", "build", "--wheel", "--no-isolation", "--outdir", str(folder), str(ROOT)]
    done = subprocess.run(build, capture_output=True, text=True)
    assert done.returncode == 0, done.stdout + done.stderr
    (wheel,) = folder.glob("*.whl")
    zipfile.ZipFile(wheel).extractall(folder / "site")
    return folder / "site"


def _run(code: str, site: Path, cwd: Path):
    environment = {**os.environ, "PYTHONPATH": str(site)}
    return subprocess.run(
        [sys.executable, "-c", code], capture_output=True, text=True, cwd=cwd, env=environment
    )


def test_the_wheel_carries_data_and_examples_and_nothing_else(unpacked):
    assert (unpacked / "screener" / "_data" / "criteria" / "criteria.toml").is_file()
    assert list((unpacked / "screener" / "_data" / "examples").glob("*.toml"))
    assert {p.name for p in unpacked.iterdir() if not p.name.endswith(".dist-info")} == {"screener"}


def test_the_wheel_screens_an_example_without_any_extra(unpacked, tmp_path):
    code = (
        "import sys\n"
        f"for name in {EXTRAS!r}: sys.modules[name] = None\n"
        "from screener.ground.files import data_folder\n"
        "import screener\n"
        "assert 'site' in screener.__file__, screener.__file__\n"
        "from screener.cli import main\n"
        "case = str(data_folder() / 'examples' / 'summer_e10_floating_roof.toml')\n"
        "code = main(['check', case])\n"
        "main(['memo', case, '-o', 'memo.md'])\n"
        "print('@@', code)\n"
    )
    done = _run(code, unpacked, tmp_path)
    assert done.returncode == 0, done.stderr
    assert "Boiling at the surface" in done.stdout
    assert "@@ 4" in done.stdout, done.stdout[-300:]
    assert "Not covered" in (tmp_path / "memo.md").read_text(encoding="utf-8")
