"""A sheet whose named species are the whole liquid: nothing is left to cut, and no distillation is needed."""

from __future__ import annotations

import pytest

from screener.blends import Blend, LabSheet
from screener.ground.errors import InputError

C = 273.15
CURVE = ((0.1, 78.0 + C), (0.5, 78.3 + C), (0.9, 78.6 + C))  # of ethanol, which boils at 78.3 degC


@pytest.mark.parametrize("more", [{}, {"density_15": 793.5}, {"density_15": 793.5, "dvpe": 16e3, "distillation": CURVE}])
def test_pure_ethanol_comes_back(more):
    fitted = Blend.from_lab(LabSheet(oxygenates=(("ethanol", 1.0),), **more))
    assert fitted.volume_fractions[fitted.names.index("ethanol")] > 0.995
    assert all(abs(misfit) < 1.0 for misfit in fitted.report.misfits.values())  # within reproducibility
    assert any("make up the whole" in note for note in fitted.report.assumed)


def test_a_rest_still_needs_its_distillation():
    with pytest.raises(InputError, match="three points of the distillation"):
        Blend.from_lab(LabSheet(oxygenates=(("ethanol", 0.99),), density_15=793.0))
