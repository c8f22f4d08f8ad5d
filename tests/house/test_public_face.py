"""The declared front door is the real one."""

from __future__ import annotations

import importlib

import pytest


@pytest.mark.parametrize(
    "name", ["screener", "screener.equilibrium", "screener.species", "screener.volatility", "screener.fire", "screener.blends",
             "screener.casefile", "screener.screening", "screener.memo"]
)  # fmt: skip
def test_every_declared_name_exists(name):
    module = importlib.import_module(name)
    assert module.__all__, f"{name} declares nothing"
    for item in module.__all__:
        assert getattr(module, item) is not None


def test_the_names_outside_checks_call():
    from screener import screen
    from screener.blends import Blend
    from screener.casefile import read_case, write_case
    from screener.equilibrium import (
        Fluid,
        bubble_pressure,
        bubble_temperature,
        dew_pressure,
        dew_temperature,
        flash_tp,
        rachford_rice,
        stability,
    )
    from screener.volatility import (
        distillation,
        dvpe,
        ratio_temperature,
        reid_vapour_pressure,
        true_vapour_pressure,
        vapour_pressure_at_ratio,
    )

    names = (screen, Blend, read_case, write_case, Fluid, bubble_pressure, bubble_temperature, dew_pressure,
             dew_temperature, flash_tp, rachford_rice, stability, distillation, dvpe, ratio_temperature,
             reid_vapour_pressure, true_vapour_pressure, vapour_pressure_at_ratio)  # fmt: skip
    assert all(callable(name) for name in names)
