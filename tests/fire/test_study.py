"""The committed study table is what the methods give now, and its sentences hold."""

from __future__ import annotations

import runpy
from pathlib import Path

import numpy as np
import pytest

STUDY = Path(__file__).resolve().parents[1] / "studies" / "gasoline_in_diesel.py"


@pytest.fixture(scope="module")
def rows():
    made = runpy.run_path(str(STUDY), run_name="not_main")
    return [[*row[:3], *row[3].split(" to "), *row[4:]] for row in made["table"]()]


def test_the_committed_table_is_current(rows):
    lines = STUDY.with_suffix(".md").read_text(encoding="utf-8").splitlines()
    body = [line.strip("| ").split(" | ") for line in lines if line.startswith("| ") and line[2].isdigit()]
    committed = [[*cells[:3], *cells[3].split(" to "), *cells[4:]] for cells in body]
    # The table is printed to a tenth of a degree.
    assert np.array(committed, dtype=float) == pytest.approx(np.array(rows, dtype=float), abs=0.11)


def test_what_the_study_says(rows):
    share, liaw, le_chatelier, _, _, fitted, true, d86 = np.array(rows, dtype=float).T
    large = share > 1.0
    assert (le_chatelier < liaw)[share > 0.0].all() and (liaw[large] < fitted[large]).all()
    assert true[0] - true[1] > 40.0  # a tenth of a percent
    assert (d86 > liaw + 10.0).all()
    five = share == 5.0
    assert (
        liaw[0] - liaw[five] > 50.0
    )  # Mowrer and others 1989 measured 50 K: equilibrium is the careful bound
