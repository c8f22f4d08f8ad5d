"""The declared names of the floor, and what importing it loads."""

import subprocess
import sys

import screener.equilibrium as floor

FLASHES = {"bubble_pressure", "bubble_temperature", "dew_pressure", "dew_temperature", "flash_tp", "rachford_rice",
           "stability"}  # fmt: skip
ANSWERS = {"Flash", "PhaseSplit", "Saturation", "Stability"}
CALORIC = {"caloric", "Caloric", "flash_ph", "flash_ps"}  # names settled for the caloric part of the floor


def test_declared_names():
    declared = set(floor.__all__)
    assert FLASHES | ANSWERS | {"Fluid"} <= declared
    assert declared <= FLASHES | ANSWERS | {"Fluid"} | CALORIC
    assert all(getattr(floor, name) is not None for name in declared)


def test_importing_loads_numpy_and_nothing_else():
    code = "import sys, numpy; before = set(sys.modules); import screener.equilibrium; print(*set(sys.modules) - before)"
    loaded = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True).stdout.split()
    assert "screener.equilibrium" in loaded
    foreign = {name.split(".")[0] for name in loaded} - set(sys.stdlib_module_names) - {"screener", "numpy"}
    assert not foreign
