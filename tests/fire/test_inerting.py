"""Limiting oxygen, purging, weight of a vapour."""

from __future__ import annotations

import numpy as np
import pytest

from screener.equilibrium import Fluid
from screener.fire import headspace, limiting_oxygen, purge_volumes, vapour_density_ratio
from screener.fire.inerting import oxygen_table
from screener.ground.errors import InputError
from screener.ground.status import Status


def test_the_lowest_species_rules():
    fluid = Fluid.of(["propane", "n-butane", "toluene"])
    answer = limiting_oxygen(
        fluid, [[0.5, 0.5, 0.0], [0.0, 1.0, 0.0], [0.0, 0.9, 0.1], [0.0, 0.995, 0.005]]
    ).require()
    assert answer.oxygen == pytest.approx([0.107, 0.12, 0.095, 0.12], abs=1e-12)  # tabled values
    assert list(answer.rule) == ["propane", "n-butane", "toluene", "n-butane"]
    assert list(answer.evidence) == ["quoted", "quoted", "from memory, unverified", "quoted"]


def test_carbon_dioxide_without_a_value_takes_that_of_nitrogen():
    fluid = Fluid.of(["n-butane", "toluene"])
    answer = limiting_oxygen(fluid, np.eye(2), inert="carbon dioxide").require()
    assert answer.oxygen == pytest.approx([0.145, 0.095], abs=1e-12)


def test_carbon_dioxide_is_never_below_nitrogen_in_the_table():
    """NFPA 69, tentative amendment 1211: the value for carbon dioxide is never the lower one."""
    rows = {(row.name, row.inert): row.oxygen for row in oxygen_table() if "tube" in row.apparatus}
    for (name, inert), oxygen in rows.items():
        if inert == "carbon dioxide":
            assert oxygen >= rows[name, "nitrogen"]


def test_without_a_value_it_is_estimated_and_says_so():
    fluid = Fluid.of(["n-octane"])
    answer = limiting_oxygen(fluid, [1.0]).require()
    assert answer.evidence[0] == "estimate" and answer.oxygen[0] == pytest.approx(
        0.008 * 12.5, rel=1e-12
    )  # by hand


def test_what_does_not_burn_has_none():
    fluid = Fluid.of(["water", "n-butane"])
    answer = limiting_oxygen(fluid, [[1.0, 0.0], [np.nan, 0.5], [0.5, 0.5]])
    assert list(answer.status) == [Status.NO_SOLUTION, Status.BAD_INPUT, Status.CONVERGED]
    assert np.isnan(answer.oxygen[:2]).all()
    with pytest.raises(InputError, match="'argon' is not an inert gas of the table"):
        limiting_oxygen(fluid, [0.5, 0.5], inert="argon")


def test_a_gasoline_vapour_has_a_limit(gasoline):
    head = headspace(gasoline.fluid, [258.15, 293.15], gasoline.z)
    answer = limiting_oxygen(gasoline.fluid, head.y).require()
    assert ((answer.oxygen > 0.08) & (answer.oxygen < 0.12)).all()


def test_purging_by_hand():
    """21 % oxygen to 8 % with pure nitrogen: ln(21/8) = 0.9651 volumes; with 1 % in it ln(20/7) = 1.0498."""
    volumes = purge_volumes(
        [0.21, 0.21, 0.21, 0.05], [0.08, 0.08, 0.005, 0.08], incoming=[0.0, 0.01, 0.01, 0.0]
    )
    assert volumes[:2] == pytest.approx([0.96508, 1.04982], abs=5e-6)
    assert np.isnan(volumes[2]) and volumes[3] == 0.0
    assert purge_volumes(0.21, 0.08, mixing=0.5)[0] == pytest.approx(2.0 * 0.96508, abs=1e-5)
    assert np.isnan(purge_volumes(0.21, 0.08, mixing=[0.0, 1.5])).all()


def test_weight_of_vapours_by_hand():
    fluid = Fluid.of(["n-butane", "methane"])
    ratio = vapour_density_ratio(fluid, [[1.0, 0.0], [0.0, 1.0], [0.2, 0.2]])
    # 58.12, 16.04 and their mean over 28.965 g/mol.
    assert ratio == pytest.approx([2.0066, 0.5539, 1.2802], abs=2e-4)
