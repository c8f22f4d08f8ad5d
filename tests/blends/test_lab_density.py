"""The density of a bare sheet against what hydrocarbons of its boiling points can weigh."""

from __future__ import annotations

import pytest

from screener.blends import Blend, LabSheet
from screener.blends.lab_start import start_of
from screener.blends.stocks import stock_names
from screener.ground.errors import InputError
from screener.volatility import distillation_d86

C = 273.15
GASOLINE = ((0.1, 53 + C), (0.5, 98 + C), (0.9, 160 + C))


@pytest.mark.parametrize("density", [560.0, 640.0, 880.0, 900.0])
def test_a_density_no_hydrocarbons_of_these_boiling_points_have_is_named(density):
    """n-Heptane, which boils at T50, has 688 kg/m3 and toluene 871; a tenth boils below the lightest aromatic."""
    with pytest.raises(InputError, match=rf"density of {density:g} kg/m3 contradicts the distillation"):
        start_of(LabSheet(density_15=density, dvpe=60e3, distillation=GASOLINE), None)


@pytest.mark.parametrize("density", [680.0, 745.0, 800.0])
def test_the_densities_of_naphtha_gasoline_and_reformate_are_taken(density):
    assert start_of(LabSheet(density_15=density, dvpe=60e3, distillation=GASOLINE), None).names


@pytest.mark.parametrize("name", stock_names())
def test_no_stock_contradicts_itself(name):
    blend = Blend.of({f"stock:{name}": 1.0})
    curve = distillation_d86(blend.fluid, blend.z, steps=16)
    points = tuple((f, float(curve.temperature(f)[0])) for f in (0.1, 0.3, 0.5, 0.7, 0.9))
    sheet = LabSheet(density_15=blend.density_15, distillation=points, oxygenates=tuple(blend.oxygenates.items()))
    assert start_of(sheet, None).names
