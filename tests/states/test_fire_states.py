"""The span of temperatures, the worst of it, and what the liquid does to the vapour space."""

from __future__ import annotations

from dataclasses import fields, replace

import numpy as np
import pytest

from screener.blends import Blend
from screener.fire import flash_point, hydrogen_sulfide_vapour, vapour_space
from screener.screening.judge import judge_keep_out
from screener.states.breathing import tank_volume
from screener.states.case import Blanket, Levels, Reading
from screener.states.fire import (
    COLD,
    HOT,
    INSIDE,
    LEAN,
    RICH,
    STEPS,
    coldest_liquid,
    fire_states,
    space_lanes,
)
from screener.states.flash import flash_lanes
from screener.states.inputs import gather
from screener.states.ladder import vapour_ladder
from screener.states.lanes import BEST, HEEL, HIGH, RECEIPT
from screener.states.quantities import table
from screener.states.weather import weather
from tests.screening.sample import ZERO, blend, case, line, site, tank

ETHANOL = blend({"ethanol": 1.0})
BARE = tank(contents=None)


def space(*cases, steps=STEPS):
    lanes = table(cases)
    return space_lanes(lanes, tank_volume(lanes.inputs), steps), lanes


def test_the_coldest_surface_by_hand():
    """Air -8 to 4 degC without sun, white paint 0.17, H/D 14.6/24. 2006: bulk -2.0 + (6 x 0.17 - 1)/1.8 = -1.989,
    surface mean -2 + 0.56 x 0.011 = -1.994, swing 0.72 x 12 = 8.64, minimum -4.154 degC. 2020: q = 3.2383, swing
    (1 - 0.8/q) x 12 = 9.036, minimum -2 - 2.259 = -4.259 degC, the colder. The air minimum is the low end."""
    w = weather(gather((case(site=site(month="Jan")), case(), case(site=site(month=None)))))
    # Digits of the hand calculation.
    assert w.T_cold[0] - ZERO == pytest.approx([-8.0, -4.259, -1.994], abs=2e-3)
    assert (w.air_coldest - ZERO) == pytest.approx([-8.0, 12.0, -8.0])  # July 17 degC, 5 K below its mean minimum
    assert list(w.month_cold) == [1, 7, 1]


def test_a_reading_beats_the_coldest_estimate_but_does_not_hide_it():
    read = site(liquid_temperature=Reading(ZERO + 24.0, "2026-07-14"))
    w = weather(gather((case(site=read), case())))
    assert w.T_cold[0, 1:] - ZERO == pytest.approx([24.0, 25.0])
    assert w.T_cold[0, 0] == w.T_cold[1, 0] < ZERO + 23.0


def test_a_liquid_that_comes_in_colder_than_the_surface_is_the_coldest():
    cold = line(receipt=replace(line().receipt, temperature=ZERO - 12.0))
    lanes = table((case(line=cold), case()))
    T = coldest_liquid(lanes)[:, :, BEST] - ZERO
    assert T[0, RECEIPT] == pytest.approx(-12.0)
    assert T[1, RECEIPT] > 10.0 and T[0, HEEL] > 10.0
    assert -12.0 < T[0, HIGH] < T[0, HEEL]


def test_the_temperatures_stand_at_equal_steps_of_the_inverse():
    s, _ = space(case())
    steps = np.diff(1.0 / s.T_all[0, RECEIPT])
    assert steps == pytest.approx(np.full(STEPS - 1, steps[0]), rel=1e-9)  # rounding
    assert s.T_all[0, RECEIPT, [COLD, HOT]] == pytest.approx([s.T_low[0, RECEIPT], s.T_high[0, RECEIPT]], rel=1e-12)


def _judged(lanes, s, i, k):
    """Verdicts of all temperatures of one liquid, worked out one by one and judged without the table's choice."""
    found = []
    for j, T in enumerate(s.T_all[i, k]):
        one = vapour_space(lanes.fluid, T, lanes.z[i, k], P=lanes.weather.barometer[i])
        found.append(judge_keep_out(*[one.fuel[0]] * 3, one.LFL[0], one.UFL[0], gap=0.5 * one.LFL[0], evidence="law"))
    return [f.verdict for f in found]


def test_the_temperature_chosen_is_the_worst_of_all():
    rng = np.random.default_rng(20260720)
    species = ("isopentane", "n-heptane", "n-nonane", "toluene", "ethanol", "n-decane")
    many = [blend(dict(zip(species, rng.dirichlet(np.full(len(species), 0.4))))) for _ in range(12)]
    many.append(blend({"n-nonane": 0.1, "n-decane": 0.9}))
    s, lanes = space(*(case(blend=b, tank=BARE) for b in many))
    sides = set()
    for i in range(len(many)):
        every = _judged(lanes, s, i, RECEIPT)
        side = int(s.side[i, RECEIPT])
        sides.add(side)
        assert ("beyond" in every) == (side == INSIDE)
        if side == LEAN:
            assert s.place[i, RECEIPT] == HOT
        if side == RICH:
            assert s.place[i, RECEIPT] == COLD
    assert sides == {LEAN, INSIDE, RICH}, "all three have to occur"


def test_a_span_that_steps_over_the_range_is_still_inside():
    """Ethanol between -4 and 58 degC, looked at from its two ends only: too lean at one, too rich at the other."""
    hot = line(receipt=replace(line().receipt, temperature=ZERO + 58.0))
    cold = site(month="Jan")
    few, lanes = space(case(blend=ETHANOL, tank=BARE, line=hot, site=cold), steps=2)
    ends = vapour_space(lanes.fluid, [few.T_low[0, 0], few.T_high[0, 0]], lanes.z[0, 0], P=97800.0)
    assert ends.fuel[0] < ends.LFL[0] and ends.fuel[1] > ends.UFL[1]
    assert few.side[0, RECEIPT] == INSIDE
    assert few.LFL[0, RECEIPT] <= few.fuel[0, RECEIPT] <= few.UFL[0, RECEIPT]


def test_the_range_holds_the_ends_of_temperature_and_method():
    s, lanes = space(case(blend=blend({"n-decane": 1.0}), tank=BARE))
    high = vapour_space(lanes.fluid, lanes.T_hot[0, RECEIPT, 2], lanes.z[0, RECEIPT], P=97800.0)
    # n-decane has a tabled limit: what is left is the temperature, the drift of the limit and 5 % of method.
    wanted = 1.05 * high.lower_ratio[0] * s.LFL[0, RECEIPT]
    assert s.high[0, RECEIPT] == pytest.approx(wanted, rel=0.005)
    assert s.low[0, RECEIPT] == pytest.approx(0.95 * s.fuel[0, RECEIPT], rel=0.005)


def test_a_rich_space_loses_light_ends_to_a_nearly_empty_tank():
    light, winter = blend({"isopentane": 0.4, "n-heptane": 0.6}), site(month="Jan")
    empty = tank(contents=None, levels=Levels(0.05, 9.0, 13.1))
    s, lanes = space(case(blend=light, tank=empty, site=winter))
    ratio = (14.6 - 0.05) / 0.05
    T, z = s.T_low[0, RECEIPT], lanes.z[0, RECEIPT]
    lost, kept = (vapour_space(lanes.fluid, T, z, P=97800.0, ratio=r) for r in (ratio, 0.0))
    assert s.ratio[0, RECEIPT] == pytest.approx(ratio, rel=1e-12)
    assert s.depleted[0, RECEIPT] and s.side[0, RECEIPT] == RICH
    assert s.fuel[0, RECEIPT] == pytest.approx(lost.fuel[0], rel=1e-9)  # the same function: rounding
    assert lost.fuel[0] < kept.fuel[0]


def test_under_a_landed_roof_the_space_ends_at_its_legs():
    roof = tank(kind="internal-floating-roof", roof_leg_height=2.5)
    s, _ = space(case(tank=roof))
    assert s.ratio[0, RECEIPT] == pytest.approx((2.5 - 2.0) / 2.0, rel=1e-12)
    assert np.isnan(s.ratio[0, HIGH])


def test_lane_by_lane_equals_the_batch():
    cases = (case(), case(site=site(month="Jan")), case(blend=ETHANOL), case(site=site(ambient=None)))
    many, _ = space(*cases)
    for i, one in enumerate(cases):
        alone, _ = space(one)
        for field in fields(many):
            if field.name == "y":
                continue
            a, b = getattr(alone, field.name)[0], getattr(many, field.name)[i]
            # Sums over more species and another order of lanes: rounding.
            assert np.asarray(a, float) == pytest.approx(np.asarray(b, float), rel=1e-8, nan_ok=True), field.name


def test_a_case_without_a_barometer_or_weather_holds_no_number():
    s, _ = space(
        case(site=site(lowest_barometer=None, elevation=None)), case(site=site(ambient=None)), case(site=site(months=()))
    )
    assert np.isnan(s.fuel[:2]).all()
    assert np.isfinite(s.fuel[2, RECEIPT])


def test_equal_liquids_have_one_flash_point():
    lanes = table((case(), case(blend=ETHANOL)))
    f = flash_lanes(lanes)
    for i, k in ((0, RECEIPT), (0, HEEL), (1, RECEIPT), (1, HIGH)):
        alone = flash_point(lanes.fluid, lanes.z[i, k])
        assert f.T[i, k] == pytest.approx(alone.T[0], abs=1e-6)  # the tolerance of the solver
    assert f.T[0, HEEL] == f.T[1, HEEL]


def test_hydrogen_sulfide_is_dissolved_in_the_receipt_only():
    sour = replace(case(), hydrogen_sulfide=50e-6)
    lanes = table((sour, case()))
    at = lanes.names.index("hydrogen sulfide")
    mass = lanes.z[0] * lanes.fluid.MW
    assert mass[RECEIPT, at] / mass[RECEIPT].sum() == pytest.approx(50e-6, rel=1e-9)
    assert lanes.z[0, HEEL, at] == 0.0 and lanes.z[1, :, at].max() == 0.0
    assert 0.0 < lanes.z[0, HIGH, at] < lanes.z[0, RECEIPT, at]
    s = fire_states(lanes, tank_volume(lanes.inputs)).space
    T = s.T_high[0, RECEIPT]
    plain = table((case(),))
    direct = hydrogen_sulfide_vapour(plain.fluid, T, plain.z[0, RECEIPT], 50e-6, P=97800.0)
    # One model with one more species in its list; sums in another order.
    assert s.y[0, RECEIPT, HOT, at] == pytest.approx(direct.y[0, direct.names.index("hydrogen sulfide")], rel=1e-6)


def test_limiting_oxygen_is_the_lowest_of_what_counts():
    inert = {"blanket": Blanket(300.0, 800.0), "contents": None, "vapour_space_oxygen": 0.04}
    gases = replace(case(blend=blend({"propane": 0.02, "n-butane": 0.98})), tank=tank(**inert))
    liquid = replace(case(blend=blend({"n-butane": 0.02, "n-hexane": 0.98})), tank=tank(**inert))
    lanes = table((gases, liquid, case()))
    o = fire_states(lanes, tank_volume(lanes.inputs)).oxygen
    assert o.limit[0, RECEIPT] == pytest.approx(0.107) and o.species[0, RECEIPT] == "propane"
    assert o.read[0, RECEIPT] and not o.read[1, RECEIPT]  # n-hexane is from memory
    assert np.isnan(o.limit[2]).all()


def test_the_ladder_takes_every_month_and_no_reading():
    read = site(liquid_temperature=Reading(ZERO + 50.0, "2026-07-14"))
    lanes = table((case(site=read), case(site=site(months=())), case()))
    rows = vapour_ladder(lanes, 0, RECEIPT)
    assert [row["number"] for row in rows] == list(range(1, 13))
    july = rows[6]
    assert july["T_hot"] == pytest.approx(lanes.weather.T_surface[2, BEST], rel=1e-12)
    assert july["T_cold"] == pytest.approx(lanes.weather.T_cold[2, BEST], rel=1e-12)
    one = vapour_space(lanes.fluid, july["T_hot"], lanes.z[0, RECEIPT], P=97800.0)
    assert july["share_hot"] == pytest.approx(one.fuel[0], rel=1e-9)
    assert vapour_ladder(lanes, 1, RECEIPT) == []


def test_previous_contents_are_classed_beside_the_receipt():
    diesel = Blend.of({"stock:diesel": 1.0})
    before = tank(contents=None, previous_contents="summer gasoline base")
    lanes = table((case(blend=diesel, tank=before), case(), case(tank=before, line=line(receipt=None))))
    old = fire_states(lanes, tank_volume(lanes.inputs)).previous
    assert old[1] is None and old[2] is None
    assert (old[0].static, old[0].static_receipt) == ("high vapour pressure", "low vapour pressure")
    assert old[0].fuel[0] < old[0].fuel[1] < old[0].fuel[2]
    assert old[0].fuel[1] > old[0].LFL
