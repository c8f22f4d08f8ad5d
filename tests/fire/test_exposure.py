"""Concentrations that someone could breathe, and the limits they stand against."""

from __future__ import annotations

import numpy as np
import pytest

from screener.blends import Blend
from screener.equilibrium import Fluid
from screener.fire import exposure, exposure_limits, headspace, hydrogen_sulfide_vapour
from screener.ground.constants import ATMOSPHERE, R
from screener.ground.status import Status
from screener.species import find


def by(answers, of, kind, agency):
    """The one answer of this limit."""
    found = [
        a for a in answers if (a.limit.of, a.limit.kind) == (of, kind) and a.limit.agency.startswith(agency)
    ]
    assert len(found) == 1
    return found[0]


def test_concentration_by_hand():
    """Benzene at 25 degC: Psat over the pressure; mass by the ideal gas."""
    fluid = Fluid.of(["benzene"])
    head = headspace(fluid, 298.15, [1.0], P=95e3).require()
    psat = find("benzene").psat(298.15)
    # Model against curve, and the squeeze of the air on the liquid: 0.7 %.
    assert head.ppm[0, 0] == pytest.approx(psat / 95e3 * 1e6, rel=7e-3)
    assert head.mg_m3[0, 0] == pytest.approx(head.p[0, 0] * 0.0781118 / (R * 298.15) * 1e6, rel=1e-5)


def test_benzene_over_gasoline_is_hundreds_of_times_the_limit(gasoline):
    head = headspace(gasoline.fluid, 293.15, gasoline.z)
    answer = by(exposure(head), "benzene", "TWA", "OSHA")
    assert answer.limit.ppm == 1.0 and answer.limit.date == "2023" and answer.limit.evidence == "quoted"
    assert 500.0 < answer.ratio[0] < 5000.0 and answer.dilution[0] == answer.ratio[0]
    thin = headspace(gasoline.fluid, 293.15, gasoline.z, saturation=1.0 / answer.dilution[0])
    assert by(exposure(thin), "benzene", "TWA", "OSHA").ratio[0] == pytest.approx(
        1.0, abs=1e-9
    )  # exact by definition


def test_isomers_count_together():
    fluid = Fluid.of(
        ["o-xylene", "m-xylene", "p-xylene", "2-methylpentane", "2,2-dimethylbutane", "n-hexane"]
    )
    x = np.full(6, 1.0 / 6.0)
    head = headspace(fluid, 298.15, x)
    answers = exposure(head)
    xylenes = by(answers, "xylenes", "TWA", "OSHA")
    assert xylenes.ppm[0] == pytest.approx(head.ppm[0, :3].sum(), rel=1e-12)
    hexanes = by(answers, "hexanes other than n-hexane", "TWA", "NIOSH")
    assert hexanes.ppm[0] == pytest.approx(head.ppm[0, 3:5].sum(), rel=1e-12)
    assert by(answers, "n-hexane", "TWA", "NIOSH").limit.ppm == 50.0  # not the 500 of a page that errs
    assert by(answers, "n-hexane", "TWA", "NIOSH").ppm[0] == head.ppm[0, 5]


def test_pentanes_count_together_for_one_agency_only():
    fluid = Fluid.of(["n-pentane", "isopentane"])
    head = headspace(fluid, 270.0, [0.5, 0.5])
    answers = exposure(head)
    assert by(answers, "pentanes", "TWA", "ACGIH").ppm[0] == pytest.approx(head.ppm[0].sum(), rel=1e-12)
    assert by(answers, "n-pentane", "TWA", "OSHA").ppm[0] == head.ppm[0, 0]


def test_limits_carry_date_and_evidence():
    limits = exposure_limits(["benzene", "hydrogen sulfide", "toluene", "n-hexane", "no such thing"])
    assert all(limit.agency and limit.date and limit.evidence for limit in limits)
    assert {limit.of for limit in limits} == {"benzene", "hydrogen sulfide", "toluene", "n-hexane"}
    benzene = next(limit for limit in limits if limit.of == "benzene" and limit.value == 1e-6)
    # 78.11 g/mol over 24.465 L/mol, the agencies' convention.
    assert benzene.mg_m3 == pytest.approx(78.11 / 24.465, rel=1e-3)


def test_hydrogen_sulfide_from_the_liquid():
    blend = Blend.of({"stock:condensate": 1.0})
    share = np.array([1e-6, 10e-6, 100e-6])
    head = hydrogen_sulfide_vapour(blend.fluid, 303.15, blend.z, share).require()
    ppm = head.ppm[:, head.names.index("hydrogen sulfide")]
    assert ppm == pytest.approx(
        ppm[0] * np.array([1.0, 10.0, 100.0]), rel=2e-3
    )  # Henry's law at these shares
    # By hand, Henry's law: x = share M / M_H2S, p about x times some 20 bar at 30 degC; a factor of two.
    x = 10e-6 * blend.MW / 0.03408
    assert ppm[1] == pytest.approx(x * 20e5 / ATMOSPHERE * 1e6, rel=0.5)
    stripped = hydrogen_sulfide_vapour(blend.fluid, 303.15, blend.z, 10e-6, ratio=20.0).require()
    assert stripped.ppm[0, head.names.index("hydrogen sulfide")] < 0.5 * ppm[1]


def test_hydrogen_sulfide_of_a_fluid_that_has_it_is_replaced():
    fluid = Fluid.of(["n-heptane", "hydrogen sulfide"])
    given = hydrogen_sulfide_vapour(fluid, 298.15, [[0.99, 0.01], [1.0, 0.0]], 50e-6).require()
    assert given.ppm[0] == pytest.approx(given.ppm[1], rel=1e-12)
    bad = hydrogen_sulfide_vapour(fluid, 298.15, [1.0, 0.0], [50e-6, -1e-6, 1.0, np.nan])
    assert list(bad.status) == [Status.CONVERGED, *[Status.BAD_INPUT] * 3]


def test_lanes_without_an_answer_hold_nan(gasoline):
    head = headspace(gasoline.fluid, [293.15, np.nan], gasoline.z)
    for answer in exposure(head):
        assert np.isfinite(answer.ratio[0]) and np.isnan(answer.ratio[1]) and np.isnan(answer.dilution[1])
