"""The walls between floors: by contract, and by looking at what an import loads."""

from __future__ import annotations

import json
import subprocess
import sys
from pathlib import Path

import pytest

ROOT = Path(__file__).resolve().parents[2]
HEAVY = {"textual", "matplotlib", "pandas", "pint", "scipy.optimize", "scipy.stats", "thermo", "chemicals"}


def _modules_after(code: str) -> set[str]:
    """Names in sys.modules of a fresh interpreter after running code."""
    script = f"{code}\nimport sys, json\nprint('@@' + json.dumps(sorted(sys.modules)))"
    done = subprocess.run(
        [sys.executable, "-c", script], capture_output=True, text=True, cwd=ROOT, check=True
    )
    return set(json.loads(done.stdout.rsplit("@@", 1)[1]))


def test_imports_point_downward():
    """Every folder has a floor and imports only what lies below it."""
    done = subprocess.run(
        [str(Path(sys.executable).parent / "lint-imports"), "--no-cache"],
        capture_output=True,
        text=True,
        cwd=ROOT,
    )
    assert done.returncode == 0, done.stdout + done.stderr


@pytest.mark.parametrize(
    "module",
    ["screener", "screener.species", "screener.equilibrium", "screener.volatility", "screener.fire", "screener.blends",
     "screener.tank", "screener.line", "screener.site", "screener.states", "screener.screening"],
)  # fmt: skip
def test_a_floor_loads_nothing_heavy(module):
    loaded = _modules_after(f"import {module}")
    assert not loaded & HEAVY, f"{module} loads {sorted(loaded & HEAVY)}"


def test_the_import_of_the_library_is_light():
    """`import screener` alone must not even load NumPy: the command line starts with it."""
    assert "numpy" not in _modules_after("import screener")


def test_help_needs_only_the_standard_library():
    code = (
        "import sys\nfrom screener.cli import main\ntry:\n    main(['--help'])\nexcept SystemExit:\n    pass"
    )
    loaded = {name.split(".")[0] for name in _modules_after(code)}
    outside = {n for n in loaded if n not in sys.stdlib_module_names and n not in {"screener", "__main__"}}
    # Files that a Python installation itself preloads from site-packages are not ours to forbid.
    outside -= {name.split(".")[0] for name in _modules_after("pass")}
    assert not outside, sorted(outside)
