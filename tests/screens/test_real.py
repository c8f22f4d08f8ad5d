"""The screens over the real functions: one example from the first paint to a written memo."""

from __future__ import annotations

import shutil
import subprocess
import sys
from pathlib import Path

import pytest

from screener.app.engine import real
from screener.app.judged import information
from screener.app.start import examples
from screener.app.words import table
from tests.screens.driving import grid, hint, opened, pressed, typed, walk

ROOT = Path(__file__).resolve().parents[2]
# Loading the tables and the libraries takes seconds on a busy machine.
PATIENCE = 60.0


class RealEngine:
    """The engine itself, where a test would put another."""

    def engine(self):
        return real()


SHIPPED = next(path for path in examples() if "winter_gasoline" in path.name)


@pytest.fixture
def example(tmp_path):
    return Path(shutil.copy(SHIPPED, tmp_path / "tank5.toml"))


async def test_an_example_is_screened_edited_and_written(example):
    from tests.screens import driving

    async with opened(example, RealEngine()) as pilot:
        await driving.settled(pilot, PATIENCE)
        screening = walk(pilot).desk.session.screening
        assert screening.findings
        verdict = {f.id: f.verdict for f in screening.findings}["vents.outbreathing"]
        assert verdict in ("near", "room")
        await pressed(pilot, "3", "down", "down", "enter")
        await typed(pilot, "11.1 psi")
        assert hint(pilot) == "taken as 76.53 kPa abs"
        await pressed(pilot, "escape", "2")
        sheet = walk(pilot).query_one("#tank").sheet
        sheet.go_to("tank.vents[0].rated_out")
        await pressed(pilot, "enter")
        await typed(pilot, "400 Nm3/h air")
        await pressed(pilot, "enter")
        after = {f.id: f.verdict for f in walk(pilot).desk.session.screening.findings}
        assert after["vents.outbreathing"] == "beyond", "smaller vents flip the verdict"
        await pressed(pilot, "5")
        assert "Vents, breathing out" in grid(pilot.app)
        await pressed(pilot, "6", "w")
        memo = (example.parent / "tank5.md").read_text(encoding="utf-8")
        assert "Vents, breathing out" in memo and "400 Nm3/h air" in memo


def test_the_real_engine_reads_names_and_packs():
    engine = real()
    names = engine.names()
    assert {"stock", "species"} == {name.kind for name in names}
    assert any(name.name == "ethanol" and "64-17-5" in name.also for name in names)
    assert engine.packs()


def test_every_default_and_value_of_an_example_is_echoed():
    path = SHIPPED
    verdicts, worked = real().work(path.read_text(encoding="utf-8"), str(path))
    assert not worked.faults and worked.full and not verdicts.full
    judged = [{f.id: f.verdict for f in done.screening.findings} for done in (verdicts, worked)]
    assert judged[0] == judged[1], "the verdicts shown first are those of the whole"
    assert worked.echoes["tank.shell_diameter"].text == "18 m"
    assert worked.echoes["tank.insulated"].default
    assert worked.screening.case.source == str(path)


def test_the_lines_that_stand_before_the_fold_are_those_the_program_tells():
    """Their beginnings are words of another floor; only the measured flash point asks for a sheet that has one."""
    text = SHIPPED.read_text(encoding="utf-8").replace("\n[tank]\n", '\n[blend.lab]\nflash_point = "-40 degC"\n[tank]\n', 1)
    *_, worked = real().work(text, "")
    assert not worked.faults, worked.faults
    told = [name for name, _, _ in information(worked.screening, "receipt")]
    for first in table("told_first").values():
        assert sum(name.startswith(first) for name in told) == 1, first


def test_a_broken_case_gives_faults_and_still_echoes_the_rest():
    text = SHIPPED.read_text(encoding="utf-8").replace('"18 m"', '"18"')
    (worked,) = real().work(text, "")
    assert worked.screening is None
    assert [fault.path for fault in worked.faults] == ["tank.shell_diameter"]
    assert "tank.shell_height" in worked.echoes and "tank.shell_diameter" not in worked.echoes


PAINT = """
import asyncio, sys
from screener.app.engine import real
from screener.app.glyphs import glyphs
from screener.app.screens_app import ScreenerApp
from screener.app.walk import WalkScreen

HEAVY = ("numpy", "scipy", "pint", "thermo", "pandas", "matplotlib")

def painted(self):
    from screener.app.chrome import TitleLine
    lines = self._compositor.render_strips()
    print("painted", any("Tarn Hollow" in "".join(s.text for s in line) for line in lines))
    print("loaded", sorted(name for name in HEAVY if name in sys.modules))
    self.app.exit(0)

WalkScreen.painted = painted
app = ScreenerApp(real(), glyphs("braille"), sys.argv[1])
app.run(headless=True, size=(80, 24))
"""


def test_the_first_screen_is_painted_before_anything_heavy_is_imported(example):
    done = subprocess.run(
        [sys.executable, "-c", PAINT, str(example)], capture_output=True, text=True, cwd=ROOT, check=True, timeout=60
    )
    assert "painted True" in done.stdout, done.stdout + done.stderr
    assert "loaded []" in done.stdout, done.stdout


def test_importing_the_folder_of_the_screens_loads_no_textual():
    code = "import screener.app, sys; print('textual' in sys.modules)"
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, cwd=ROOT, check=True)
    assert done.stdout.strip() == "False"
