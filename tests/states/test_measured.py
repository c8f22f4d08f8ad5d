"""Measured values in the table of lanes: the factor of every liquid, mixtures, flash points, density, sulfide."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from screener.blends import Blend
from screener.blends.measured import MeasuredPressure, measured_sheet, pressure_factor, told
from screener.fire import flash_point
from screener.ground.constants import GRAVITY
from screener.states.breathing import tank_volume
from screener.states.fire import STEPS, space_lanes
from screener.states.flash import FLASH_SPREAD, flash_lanes
from screener.states.inputs import gather
from screener.states.ladder import vapour_ladder
from screener.states.lanes import HEEL, HIGH, LOW, NORMAL, RECEIPT, evaluate
from screener.states.measured import mixed, own
from screener.states.previous import previous_contents
from screener.states.quantities import bubble_curve, flows, table
from screener.states.weather import weather
from screener.volatility import ratio_temperature
from tests.screening.sample import HEAVY, LIGHT, ZERO, blend, case, line, site, tank
from tests.screening.sheets import pressure, with_figure, with_pressure

F = 1.08
BARE = tank(contents=None)
PLAIN, SCALED = blend(LIGHT), with_pressure(blend(LIGHT), F)
# Rounding: the same state, times the same number.
EXACT = 1e-12
SOLVED = 1e-6  # the solver's own tolerance, where another pressure is asked of the same state


@pytest.fixture(scope="module")
def both():
    """The same liquid without a sheet and with one, alone in the tank, as two cases of one table."""
    return table([case(blend=b, tank=BARE) for b in (PLAIN, SCALED)])


# Every pressure of the table


def test_every_bubble_pressure_carries_the_factor(both):
    assert both.measured.factor[:, RECEIPT].tolist() == [1.0, F]
    for name, values in (("hot", both.P_hot), ("legal", both.P_legal[:, :, :2]), ("came", both.arrival.P[:, None])):
        plain, scaled = values[0, RECEIPT], values[1, RECEIPT]
        assert scaled[1] == pytest.approx(F * plain[1], rel=EXACT), name
        # The reproducibility of 10 % stands in place of the spread of 5 %.
        assert scaled[0] == pytest.approx(F * plain[0] * 0.90 / 0.95, rel=EXACT), name
    curves = [bubble_curve(both, i, [ZERO, ZERO + 20.0, ZERO + 40.0])["P"]["receipt"] for i in (0, 1)]
    assert np.array(curves[1]) == pytest.approx(F * np.array(curves[0]), rel=EXACT)


def test_suction_and_breathing_follow(both):
    stream = flows(both)
    s, b, P = stream.suction, stream.breathing, both.P_hot[0, RECEIPT, 1]
    assert s.room[1, RECEIPT, 1] == pytest.approx(s.room[0, RECEIPT, 1] - (F - 1.0) * P, rel=1e-9)
    lost = (F - 1.0) * P / (s.density[0, RECEIPT] * GRAVITY)
    assert s.npsh[0, RECEIPT, 1] - s.npsh[1, RECEIPT, 1] == pytest.approx(lost, rel=1e-9)
    # At the temperature it may still reach, the scaled pressure is the lowest in the line.
    T = both.T_hot[0, RECEIPT, 1] + s.room_K[1, RECEIPT]
    at = bubble_curve(both, 1, [T])["P"]["receipt"][0]
    assert at == pytest.approx(s.lowest[1, RECEIPT], rel=SOLVED)
    assert s.room_K[1, RECEIPT] < s.room_K[0, RECEIPT]
    B = both.weather.barometer[0]
    assert b.growth[1, RECEIPT] == pytest.approx(B / (B - F * P), rel=1e-12)


def test_a_receipt_flashes_as_the_plain_one_at_a_lower_barometer():
    """A liquid with f times the pressure under B is the plain one under B/f, whatever the flash."""
    light = blend({"n-butane": 0.5, "isopentane": 0.2, "toluene": 0.3})
    warm = replace(line().receipt, temperature=ZERO + 25.0, dissolved_gas="air-saturated", saturated_at=ZERO + 15.0)

    def one(b, barometer):
        return case(blend=b, tank=BARE, site=site(lowest_barometer=barometer), line=line(receipt=warm))

    # The reproducibility stays below the spread, so that the ends are those of the plain liquid.
    lanes = table([one(with_pressure(light, F, R=0.01), 97800.0), one(light, 97800.0 / F), one(light, 97800.0)])
    scaled, plain = ([a[i] for a in (lanes.arrival.beta, lanes.arrival.isothermal, lanes.arrival.T_after,
                                     lanes.arrival.y, lanes.beta_gas)] for i in (0, 1))  # fmt: skip
    for one_value, other in zip(scaled, plain):
        assert one_value == pytest.approx(other, rel=SOLVED)
    assert lanes.arrival.beta[0, 1] > 1.02 * lanes.arrival.beta[2, 1]
    assert lanes.beta_gas[0] > 1.02 * lanes.beta_gas[2]


def test_air_comes_out_of_no_liquid_that_stays_as_cold_as_it_was_saturated():
    kept = replace(line().receipt, temperature=ZERO + 15.0, dissolved_gas="air-saturated", saturated_at=ZERO + 15.0)
    lanes = table([case(blend=with_pressure(PLAIN, f), line=line(receipt=kept)) for f in (0.9, 1.0, 1.1)])
    assert lanes.beta_gas == pytest.approx([0.0, 0.0, 0.0], abs=1e-6)  # of the air that dissolves, about 1e-3


def test_the_vapour_space_carries_the_factor(both):
    s = space_lanes(both, tank_volume(both.inputs))
    assert s.T_all[0, RECEIPT] == pytest.approx(s.T_all[1, RECEIPT], rel=1e-2)  # but for one step inserted between
    same = s.T_all[0, RECEIPT] == s.T_all[1, RECEIPT]
    assert same.sum() > STEPS - 3
    y = s.y[:, RECEIPT][:, same].sum(axis=-1)
    # 1e-3: the liquid's compressibility between P/f and P.
    assert y[1] == pytest.approx(F * y[0], rel=1e-3)
    rows = [vapour_ladder(both, i, RECEIPT) for i in (0, 1)]
    for plain, scaled in zip(*rows, strict=True):
        assert scaled["share_cold"] == pytest.approx(F * plain["share_cold"], rel=1e-3)


def test_a_rich_space_is_depleted_of_what_the_factor_adds():
    """A small charge under a large space: worked out with the factor, checked against the plain liquid under B/f with
    the space f times as large."""
    from screener.fire import vapour_space
    from screener.states.case import Levels

    small = replace(BARE, levels=Levels(0.3, 9.0, 13.1))
    light = blend({"n-butane": 0.10, "isopentane": 0.30, "toluene": 0.60})
    lanes = table([case(blend=with_pressure(light, F, R=0.01), tank=small, site=site(month="Jan"))])
    s = space_lanes(lanes, tank_volume(lanes.inputs))
    assert s.depleted[0, RECEIPT]
    B, r = lanes.weather.barometer[0], s.ratio[0, RECEIPT]
    plain = vapour_space(light.fluid, s.T[0, RECEIPT], light.z, P=B / F, ratio=F * r)
    assert s.fuel[0, RECEIPT] == pytest.approx(plain.fuel[0], rel=SOLVED)
    assert abs(vapour_space(light.fluid, s.T[0, RECEIPT], light.z, P=B, ratio=r).fuel[0] / plain.fuel[0] - 1.0) > 5e-3


def test_previous_contents_are_classed_by_what_was_measured():
    old = replace(tank(), previous_contents="summer gasoline base")
    sheet = with_figure(with_figure(PLAIN, "flash_point", ZERO - 20.0, ZERO - 25.0, 4.0), "dvpe", 51e3, 49e3, 2e3)
    reid = with_figure(PLAIN, "rvp", 52e3, 49e3, 5e3)
    plain, measured, by_reid, scaled = previous_contents(
        table([case(blend=b, tank=old) for b in (PLAIN, sheet, reid, SCALED)])
    )
    assert (measured.T_flash_receipt, measured.P_reid_receipt) == (ZERO - 20.0, 51e3)
    assert by_reid.P_reid_receipt == 52e3
    assert scaled.T_flash_receipt < plain.T_flash_receipt - 0.8
    assert scaled.P_reid_receipt > plain.P_reid_receipt
    assert measured.fuel == pytest.approx(plain.fuel)  # the vapour left is that of the stock


# Which measured pressure, and what it is worth


def test_the_most_direct_test_that_tells_a_factor_is_taken():
    true, other = pressure(PLAIN, 1.05), pressure(PLAIN, 0.97, what="DVPE")
    assert pressure_factor(()) == (1.0, 0.0)
    assert pressure_factor((true, other)) == (1.05, 0.10)
    blind = replace(true, ratio=4.0, doubt=1.4)
    assert told((blind, other)) is other and pressure_factor((blind, other)) == (0.97, 0.10)
    # Nothing that tells a factor: the computed one, within the reproducibility of the test.
    assert pressure_factor((blind,)) == (1.0, 1.4)
    assert pressure_factor((replace(blind, ratio=-0.5),)) == (1.0, 1.4)
    assert np.isnan(pressure_factor((replace(blind, ratio=np.nan),))).all()


def test_a_blind_test_keeps_its_measured_value_in_the_range():
    """DVPE of a jet fuel: 1.2 kPa computed, 2.0 measured, 1.7 kPa reproducibility."""
    seen = MeasuredPressure("DVPE", 2.0e3, 310.93, 1.2e3, 1.67, 1.7e3, 1.42)
    lanes = table([case(blend=replace(PLAIN, measured=(seen,)), tank=BARE), case(tank=BARE)])
    (low, P, high), plain = lanes.P_hot[0, RECEIPT], lanes.P_hot[1, RECEIPT, 1]
    assert P == plain and lanes.measured.factor[0, RECEIPT] == 1.0
    assert high / lanes.P_hot[1, RECEIPT, 2] == pytest.approx(2.42 / 1.05, rel=1e-12)
    assert 0.0 < low < 0.06 * plain  # no pressure below zero
    assert high > 1.67 * P


def test_a_factor_that_is_no_number_makes_no_pressure():
    seen = MeasuredPressure("DVPE", 60e3, 310.93, np.nan, np.nan, 2e3, np.nan)
    lanes = table([case(blend=replace(PLAIN, measured=(seen,))), case()])
    assert np.isnan(lanes.P_hot[0, [RECEIPT, NORMAL, HIGH]]).all()
    assert np.isfinite(lanes.P_hot[0, HEEL]).all() and np.isfinite(lanes.P_hot[1]).all()


# Mixtures


def test_the_factor_of_a_mixture_by_hand():
    """Two pure liquids that mix nearly ideally: the share of the pressure is that of the partial pressure."""
    names = ("n-pentane", "n-heptane")
    liquid = Blend.of({f"species:{n}": 0.5 for n in names}, basis="mole")
    Z, n = np.eye(2), np.array([1.0, 1.0, 0.0, 3.0])
    ones = [own([with_pressure(blend({name: 1.0}), f)] * 4) for name, f in zip(names, (1.10, 0.96))]
    none = own([blend({"n-heptane": 1.0})] * 4)
    assert none.factor.tolist() == [1.0] * 4
    spread = (np.repeat(z[None, :], 4, axis=0) for z in Z)
    Z = [next(spread), next(spread)]
    factor, doubt, wide = mixed(liquid.fluid, Z[0], n, Z[1], np.array([1.0, 0.0, 1.0, 1.0]), *ones)
    # Vapour pressures at 37.78 degC: pentane 107.3 kPa, heptane 11.2 kPa (Antoine, DIPPR): pentane's share is 90.5 %.
    w = 107.3 / (107.3 + 11.2)
    assert factor == pytest.approx([1.10 * w + 0.96 * (1 - w), 1.10, 0.96, 1.10 * 0.9664 + 0.96 * 0.0336], abs=2e-3)
    assert doubt == pytest.approx([0.10] * 4) and wide == pytest.approx([0.0] * 4)
    factor, doubt, wide = mixed(liquid.fluid, Z[0], n, Z[1], np.array([1.0, 0.0, 1.0, 1.0]), ones[0], none)
    assert factor == pytest.approx([1.10 * w + 1 - w, 1.10, 1.0, 1.10 * 0.9664 + 0.0336], abs=2e-3)
    # The heptane that was not measured may be off by as much as the pentane that was.
    assert wide == pytest.approx([0.10 * (1 - w), 0.0, 0.10, 0.10 * 0.0336], abs=2e-3)
    assert factor + wide == pytest.approx([1.10] * 4, rel=1e-12)
    assert mixed(liquid.fluid, Z[0], n, Z[1], n, none, none)[0].tolist() == [1.0] * 4


def test_mixtures_of_a_case_lie_between_their_parts():
    heel = tank(contents=replace(tank().contents, blend=with_pressure(blend(HEAVY), 0.95)))
    m = table([case(blend=SCALED, tank=heel), case(blend=SCALED), case(tank=heel), case()]).measured
    assert m.factor[0, :3] == pytest.approx([F, 0.95, 0.95], abs=1e-12)  # at the low level the heel is all there is
    assert 0.95 < m.factor[0, NORMAL] < m.factor[0, HIGH] < F
    assert m.factor[1, LOW] == 1.0 and 1.0 < m.factor[1, NORMAL] < m.factor[1, HIGH] < F
    assert m.factor[1] + m.widening[1] == pytest.approx([F, 1.0, F, F, F], abs=1e-12)
    assert (m.widening[0] == 0.0).all()
    assert (m.factor[2, [HEEL, LOW]] == 0.95).all() and m.factor[2, RECEIPT] == 1.0
    assert (m.factor[3] == 1.0).all() and (m.widening[3] == 0.0).all() and (m.density[3] == 1.0).all()


def test_the_part_that_is_not_measured_widens_the_range_of_the_mixture():
    lanes = table([case(blend=SCALED), case()])
    k, m = HIGH, lanes.measured
    low, P, high = lanes.P_hot[0, k]
    spread = max(0.05, m.doubt[0, k]) + m.widening[0, k]
    assert low / P == pytest.approx(lanes.P_hot[1, k, 0] / lanes.P_hot[1, k, 1] / 0.95 * (1.0 - spread), rel=1e-9)
    assert m.widening[0, k] > 1e-4 and high > P


# Flash points


def jet_case(found=None, computed=None, R=4.0, **more):
    jet = Blend.of({"stock:jet kerosene": 1.0})
    if found is not None:
        jet = with_figure(jet, "flash_point", found, computed, R)
    return case(blend=jet, **more)


def test_a_measured_flash_point_is_that_of_its_liquid():
    computed = float(flash_lanes(table([jet_case(tank=BARE)])).T[0, RECEIPT])
    cases = [jet_case(computed + d, computed, R, tank=BARE) for d, R in ((3.0, 4.0), (-3.0, 4.0), (3.0, 7.0))]
    f = flash_lanes(table(cases))
    assert f.T[:, RECEIPT] == pytest.approx(computed + np.array([3.0, -3.0, 3.0]), rel=1e-12)
    # Half the range is FLASH_SPREAD or the reproducibility, whichever is greater.
    below, above = f.T - f.T_low + FLASH_SPREAD, f.T_high - f.T + FLASH_SPREAD
    assert below[:, RECEIPT] == pytest.approx([5.0, 5.0, 7.0]) and above[:, RECEIPT] == pytest.approx([5.0, 5.0, 7.0])
    assert (f.estimated[:, RECEIPT] == 0.0).all()


def test_a_mixture_follows_a_lower_flash_point_only():
    gas_oil = tank(contents=replace(tank().contents, blend=Blend.of({"stock:diesel": 1.0})))
    plain = flash_lanes(table([jet_case(tank=gas_oil)]))
    at = plain.T[0, RECEIPT]
    f = flash_lanes(table([jet_case(at + d, at, tank=gas_oil) for d in (-6.0, 6.0)]))
    for k in (NORMAL, HIGH):
        assert f.T[0, k] == pytest.approx(plain.T[0, k] - 6.0, abs=1e-6)
        assert f.T_low[0, k] == pytest.approx(plain.T_low[0, k] - 6.0, abs=1e-6)
        assert f.T_high[0, k] == pytest.approx(plain.T_high[0, k], abs=1e-6)
        assert f.T[1, k] == pytest.approx(plain.T[0, k], abs=1e-6)
    wide = flash_lanes(table([jet_case(at, at, 9.0, tank=gas_oil)]))
    assert wide.T_low[0, 2:] == pytest.approx(plain.T_low[0, 2:] - [0.0, 4.0, 4.0], abs=1e-6)
    assert f.T[:, [HEEL, LOW]] == pytest.approx(np.full((2, 2), plain.T[0, HEEL]), abs=1e-6)  # no receipt in them


def test_a_measured_vapour_pressure_moves_the_computed_flash_point():
    """One vapour pressure in twelve more: the same condition is met under a barometer of 1/f."""
    jet = with_pressure(Blend.of({"stock:jet kerosene": 1.0}), F)
    f = flash_lanes(table([case(blend=jet, tank=BARE)]))
    assert f.T[0, RECEIPT] == pytest.approx(float(flash_point(jet.fluid, jet.z, P=101325.0 / F).T[0]), abs=1e-6)


# Density and sulfide


def test_a_measured_density_is_the_one_used():
    rho = PLAIN.density_15
    sheet = with_figure(PLAIN, "density_15", 1.01 * rho, rho, 0.5)
    warm = line(receipt=replace(line().receipt, temperature=ZERO + 60.0))  # boils, so that vapour flows
    light = blend({"n-butane": 0.5, "isopentane": 0.2, "toluene": 0.3})
    heavy = with_figure(light, "density_15", 1.01 * light.density_15, light.density_15, 0.5)
    lanes = table([case(blend=sheet), case(), case(blend=heavy, line=warm), case(blend=light, line=warm)])
    stream = flows(lanes)
    s = stream.suction.density
    assert s[0, RECEIPT] == pytest.approx(1.01 * s[1, RECEIPT], rel=1e-12)
    assert s[0, HEEL] == s[1, HEEL] and s[0, LOW] == s[1, LOW]
    assert 1.0 < s[0, NORMAL] / s[1, NORMAL] < s[0, HIGH] / s[1, HIGH] < 1.01
    # By hand: 9 m of 452.39 m3, 1,100 of it heel; shares by mass of nearly equal densities.
    assert s[0, NORMAL] / s[1, NORMAL] - 1.0 == pytest.approx(0.01 * (4071.5 - 1100.0) / 4071.5, rel=0.05)
    flash = stream.breathing.out_flash[:, 1]
    assert flash[2] == pytest.approx(1.01 * flash[3], rel=1e-12) and flash[3] > 0.0


def test_measured_sulfide_is_the_whole_of_it_and_a_stated_one_goes_before_it():
    sour = Blend.of({"species:hydrogen sulfide": 1e-4, "species:n-hexane": 0.9999}, basis="mass")
    sheet = with_figure(sour, "h2s", 2e-4, 1e-4, 1e-4)
    none = with_figure(sour, "h2s", 0.0, 1e-4, 1e-4)
    heel = tank(contents=replace(tank().contents, blend=sheet))
    cases = [case(blend=sheet, tank=BARE), case(blend=sheet, tank=BARE, hydrogen_sulfide=3e-4),
             case(blend=none, tank=BARE), case(blend=sour, tank=BARE), case(tank=heel)]  # fmt: skip
    lanes = table(cases)
    mass = lanes.z * lanes.fluid.MW
    share = (mass / mass.sum(axis=-1, keepdims=True))[:, :, lanes.names.index("hydrogen sulfide")]
    assert share[:4, RECEIPT] == pytest.approx([2e-4, 3e-4, 0.0, 1e-4], rel=1e-9, abs=1e-15)
    assert share[4, HEEL] == pytest.approx(2e-4, rel=1e-9) and share[4, RECEIPT] == 0.0
    assert lanes.inputs["hydrogen_sulfide"][:2] == pytest.approx([2e-4, 3e-4])


# The fuel's own figures


def test_figures_of_the_fuel_are_measured_or_scaled():
    from screener.blends import volatility_sheet

    plain = volatility_sheet(PLAIN)
    assert measured_sheet(PLAIN) is plain
    sheet = measured_sheet(SCALED)
    assert sheet.TVP == pytest.approx(F * plain.TVP, rel=EXACT)
    # The air of the cell does not grow: less than the factor on the whole, and the offset of the equation apart.
    assert plain.DVPE * 1.05 < sheet.DVPE < (plain.DVPE + 3.78e3) * F - 3.78e3 + 1.0
    T20 = ratio_temperature(PLAIN.fluid, PLAIN.z, ratio=20.0, P=101325.0 / F, air=True)
    assert sheet.T20 == pytest.approx(float(T20.T[0]), rel=1e-9) and sheet.T20 < plain.T20 - 1.0
    assert sheet.E70 == plain.E70
    measured = measured_sheet(with_figure(with_figure(SCALED, "dvpe", 51e3, 49e3, 2e3), "e70", 0.31, 0.3, 0.02))
    assert (measured.DVPE, measured.E70) == (51e3, 0.31)
    assert measured.vapour_lock_index == pytest.approx(10 * 51.0 + 7 * 31.0)


def test_lane_by_lane_equals_the_batch():
    heel = tank(contents=replace(tank().contents, blend=with_pressure(blend(HEAVY), 0.95)))
    cases = [case(blend=SCALED, tank=heel), case(), case(blend=with_pressure(PLAIN, 0.93)), case(tank=heel)]
    together = table(cases)
    for i, one in enumerate(cases):
        inputs = gather((one,))
        alone = evaluate(inputs, weather(inputs))
        for name in ("factor", "doubt", "widening", "density"):
            # Rounding, and which lanes iterate together.
            assert getattr(alone.measured, name)[0] == pytest.approx(getattr(together.measured, name)[i], rel=1e-9)
        assert alone.P_hot[0] == pytest.approx(together.P_hot[i], rel=1e-9)


def test_the_second_liquid_is_looked_for_where_the_model_itself_is_liquid(monkeypatch):
    """At its own bubble pressure: below it, as with a measured one of 0.7 of it, the model's liquid would boil."""
    from screener.states import lanes as floor

    asked, real = [], floor.second_liquids
    monkeypatch.setattr(floor, "second_liquids", lambda *given: asked.append(given[4]) or real(*given))
    table([case(blend=b, tank=BARE) for b in (PLAIN, with_pressure(PLAIN, 0.7))])
    assert asked[0][1, RECEIPT] == pytest.approx(asked[0][0, RECEIPT], rel=EXACT)
