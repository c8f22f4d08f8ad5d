"""The declared names of the floor, and what importing it loads."""

import subprocess
import sys

import screener.equilibrium as floor

FLASHES = {"bubble_pressure", "bubble_temperature", "dew_pressure", "dew_temperature", "flash_tp", "rachford_rice",
           "stability"}  # fmt: skip
SECOND_LIQUID = {"first_vapour", "second_liquid_check", "water_tolerance", "worth_testing"}
CALORIC = {"caloric", "departure", "flash_ph", "flash_ps", "flash_tv", "heat_of_vaporisation", "state_at_beta"}
ANSWERS = {"Caloric", "FirstVapour", "Flash", "HeatOfVaporisation", "PhaseSplit", "Saturation", "SecondLiquid",
           "SolvedFlash", "Stability", "WaterTolerance"}  # fmt: skip


def test_declared_names():
    assert set(floor.__all__) == FLASHES | SECOND_LIQUID | CALORIC | ANSWERS | {"Fluid"}
    assert floor.__all__ == sorted(floor.__all__)
    assert all(getattr(floor, name) is not None for name in floor.__all__)


def test_importing_loads_numpy_and_nothing_else():
    code = "import sys, numpy; before = set(sys.modules); import screener.equilibrium; print(*set(sys.modules) - before)"
    loaded = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True).stdout.split()
    assert "screener.equilibrium" in loaded
    foreign = {name.split(".")[0] for name in loaded} - set(sys.stdlib_module_names) - {"screener", "numpy"}
    assert not foreign
