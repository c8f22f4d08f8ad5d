"""The table of lanes: mixtures by level, own temperatures, dissolved air."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from screener.states.inputs import gather
from screener.states.lanes import HEEL, HIGH, LOW, NORMAL, RECEIPT, evaluate
from screener.states.quantities import flows
from screener.states.weather import weather
from tests.screening.sample import HEAVY, ZERO, blend, case, line, site, tank


def lanes(*cases):
    inputs = gather(cases)
    return evaluate(inputs, weather(inputs))


@pytest.fixture(scope="module")
def base():
    return lanes(case())


def test_the_receipt_fills_on_the_heel(base):
    """By hand: 24 m shell, 452.39 m3 per metre; heel 1,100 m3 covers the low level of 2 m whole."""
    z = base.z[0]
    assert z[LOW] == pytest.approx(z[HEEL], abs=1e-12)
    butane = base.names.index("n-butane")
    assert 0.0 < z[NORMAL, butane] < z[HIGH, butane] < z[RECEIPT, butane]
    assert z.sum(axis=-1) == pytest.approx(np.ones(5), abs=1e-12)


def test_the_mixture_temperature_lies_between_weighted_by_mass(base):
    T = base.T_own[0] - ZERO
    assert T[[RECEIPT, HEEL, LOW]] == pytest.approx([18.0, 20.0, 20.0])
    # 9 m: 4,071.5 m3 of which 1,100 heel; the densities differ by less than 5 %, so the share of mass is near that of volume.
    assert T[NORMAL] == pytest.approx(20.0 - 2.0 * (4071.5 - 1100.0) / 4071.5, abs=0.05)


def test_a_case_without_a_heel_has_one_liquid():
    alone = lanes(case(tank=tank(contents=None)))
    assert list(alone.present[0]) == [True, False, False, False, False]
    assert np.isnan(alone.P_hot[0, 1:]).all() and np.isfinite(alone.P_hot[0, 0]).all()
    assert alone.failed == 0


def test_a_warm_receipt_is_hotter_than_the_weather():
    warm = lanes(case(line=line(receipt=replace(line().receipt, temperature=ZERO + 58.0))))
    assert warm.T_hot[0, RECEIPT] == pytest.approx([ZERO + 58.0] * 3)
    assert warm.T_hot[0, HEEL, 1] == warm.weather.T_surface[0, 1]


def test_dissolved_air_comes_out_only_where_the_receipt_warms_up():
    def receipt(T, T_sat):
        return case(line=line(receipt=replace(
            line().receipt, temperature=ZERO + T, dissolved_gas="air-saturated", saturated_at=ZERO + T_sat)))  # fmt: skip

    table = lanes(receipt(30.0, 10.0), receipt(5.0, 25.0), case())
    assert 0.0 < table.beta_gas[0] < 5e-3
    assert table.beta_gas[1] == 0.0
    assert np.isnan(table.beta_gas[2])


def test_a_receipt_above_its_bubble_point_flashes_and_loads_the_vents():
    light = blend({"n-butane": 0.5, "isopentane": 0.2, "toluene": 0.3})
    table = lanes(case(blend=light, line=line(receipt=replace(line().receipt, temperature=ZERO + 25.0))))
    low, best, high = table.arrival.beta[0]
    assert 0.0 < low < best < high < 1.0
    # Nothing heats the liquid: it cools, and gives off less than at constant temperature.
    assert table.arrival.T_after[0] < ZERO + 25.0
    assert best < table.arrival.isothermal[0] <= high
    out = flows(table).breathing
    assert out.out[0, RECEIPT, 1] == pytest.approx(
        out.out_liquid[0, RECEIPT] + out.out_thermal[0] + out.out_flash[0, 1]
    )
    # First principles: beta times the molar feed at 22.414 l/mol, as air by the root of M T over that of air at 0 degC.
    feed = 0.10 * light.density_15 / light.expansion(ZERO + 25.0)[0] / light.MW
    M = float(table.arrival.y[0] @ table.fluid.MW)
    air = best * feed * 0.022414 * np.sqrt(M * table.arrival.T_after[0] / (0.028965 * 273.15))
    assert out.out_flash[0, 1] == pytest.approx(air, rel=1e-3)


def test_a_lane_without_numbers_stays_alone():
    broken = case(site=site(lowest_barometer=None, elevation=None), tank=tank(levels=None))
    table = lanes(case(), broken, case(blend=blend(HEAVY)))
    assert np.isfinite(table.P_hot[[0, 2]]).all()
    assert np.isnan(table.P_hot[1, LOW:]).all() and np.isfinite(table.P_hot[1, :LOW]).all()


def test_a_liquid_that_splits_is_named_and_never_has_room():
    """Methanol and n-hexane part below about 306 K (measured gap); a dry gasoline does not."""
    parted = lanes(case(blend=blend({"methanol": 0.3, "n-hexane": 0.7}), tank=tank(contents=None)), case())
    assert list(parted.second.splits[:, RECEIPT]) == [True, False]
    assert parted.second.tested[1].all()
    from screener.screening import screen_many

    one = screen_many((case(blend=blend({"methanol": 0.3, "n-hexane": 0.7}), tank=tank(contents=None)),))[0]
    found = {f.id: f.verdict for f in one.findings}
    assert "room" not in (found["boiling.surface"], found["receipt.flash"], found["vapour-lock.suction"])
    assert any("second liquid" in text for text in one.reservations)
