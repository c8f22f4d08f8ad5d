"""A measured value in place of the computed one: every finding, headroom, curve and figure moves by the right amount."""

from __future__ import annotations

import json
import math
import re
from dataclasses import replace

import numpy as np
import pytest

from screener.blends import Blend, LabSheet
from screener.blends.measured import told
from screener.equilibrium import bubble_pressure
from screener.fire import vapour_space
from screener.ground.constants import GRAVITY
from screener.memo import build_memo, write_json, write_markdown
from screener.screening import screen, screen_many
from screener.states.case import Reading
from tests.memo.hand_made_screening import memo_arguments
from tests.screening.sample import HEAVY, LIGHT, ZERO, blend, case, line, site, suction, tank, vent
from tests.screening.sheets import TEST, pressure, with_figure, with_pressure

F = 1.08
BARE = tank(contents=None)
PLAIN = blend(LIGHT)
SCALED = with_pressure(PLAIN, F)
PRESSURES = ("boiling.surface", "vapour-pressure.legal.us-40cfr60-kb", "vapour-pressure.hottest.us-40cfr60-kb",
             "receipt.flash")  # fmt: skip
RESTING = (*PRESSURES, "vapour-lock.suction", "npsh.pump", "vents.outbreathing", "vents.inbreathing",
           "vapour-space.flammable", "exposure.hatch")  # fmt: skip
EXACT = 1e-9  # rounding
SOLVED = 1e-5  # the solver's tolerance and the straight line between two steps of a search
POYNTING = 1e-3  # the liquid's compressibility between P/f and P


def of(result) -> dict:
    return {f.id: f for f in result.findings}


def facts(found) -> dict:
    return {f.label: f.value for f in found.facts}


@pytest.fixture(scope="module")
def both():
    """The same case with a plain liquid and with one whose vapour pressure was measured 8 % higher."""
    return [screen(case(blend=b, tank=BARE)) for b in (PLAIN, SCALED)]


# Numbers


def test_every_vapour_pressure_moves_by_the_factor(both):
    plain, scaled = map(of, both)
    for key in PRESSURES:
        assert scaled[key].value == pytest.approx(F * plain[key].value, rel=EXACT), key
        # 10 % of reproducibility in place of 5 % of method spread.
        assert scaled[key].high == pytest.approx(F * plain[key].high * 1.10 / 1.05, rel=EXACT), key
    P = plain["boiling.surface"].value
    assert scaled["vapour-lock.suction"].value == pytest.approx(
        plain["vapour-lock.suction"].value - (F - 1.0) * P, rel=EXACT
    )
    rho = facts(plain["npsh.pump"])["density"]
    assert plain["npsh.pump"].value - scaled["npsh.pump"].value == pytest.approx(
        (F - 1.0) * P / (rho * GRAVITY), rel=EXACT
    )
    label = "vapour pressure at the hottest surface"
    out = [facts(f["vents.outbreathing"]) for f in (plain, scaled)]
    assert out[1][label] == pytest.approx(F * out[0][label], rel=EXACT)
    B = facts(plain["boiling.surface"])["lowest barometer"]
    assert out[1]["growth factor P/(P - Pv)"] == pytest.approx(B / (B - F * P), rel=EXACT)
    assert scaled["exposure.hatch"].value == pytest.approx(F * plain["exposure.hatch"].value, rel=POYNTING)


def test_curve_ladder_and_figures_move(both):
    plain, scaled = both
    curves = [np.array(r.curve["P"]["blend" if "blend" in r.curve["P"] else "receipt"]) for r in both]
    assert curves[1] == pytest.approx(F * curves[0], rel=EXACT)
    for a, b in zip(plain.curve["ladder"]["months"], scaled.curve["ladder"]["months"], strict=True):
        assert b["share_hot"] == pytest.approx(F * a["share_hot"], rel=POYNTING)
    figures = [{f.label: f for f in item.facts} for r in both for item in r.information]
    own = [f for f in figures if "true vapour pressure at 37.8 degC" in f]
    fire = [f for f in figures if "vapour space flammable from" in f]
    TVP, T20 = "true vapour pressure at 37.8 degC", "temperature for V/L 20"
    assert own[1][TVP].value == pytest.approx(F * own[0][TVP].value, rel=EXACT)
    assert own[1][T20].value < own[0][T20].value - 1.0
    assert own[1][TVP].note and not own[0][TVP].note
    for label in ("flash point by equilibrium (Liaw)", "flash point by lower limits (Le Chatelier)",
                  "vapour space flammable from", "vapour space flammable up to", "the same at the lowest level, up to"):
        # One vapour pressure in twelve: 1.5 to 2 K of a liquid of 30 kJ/mol near -20 degC.
        assert 0.8 < fire[0][label].value - fire[1][label].value < 3.0, label


def test_the_vapour_space_of_a_lean_liquid_moves():
    """Decane below its flash point: lean, so the number judged is the share itself."""
    decane = blend({"n-decane": 1.0})
    cold = site(month="Mar")
    plain, scaled = (
        of(r)["vapour-space.flammable"]
        for r in screen_many([case(blend=b, tank=BARE, site=cold) for b in (decane, with_pressure(decane, F))])
    )
    assert plain.condition == scaled.condition and plain.value < plain.limit_low
    assert scaled.value == pytest.approx(F * plain.value, rel=POYNTING)
    assert scaled.high == pytest.approx(F * plain.high * 1.10 / 1.05, rel=POYNTING)
    assert scaled.limit_low == pytest.approx(plain.limit_low, rel=1e-6)


def number(text: str) -> float:
    return float(re.search(r": ([+-][\d.]+)", text)[1])


def test_sensitivities_move(both):
    plain, scaled = map(of, both)
    for key in (*PRESSURES, "vapour-lock.suction"):
        a, b = ({m.partition(":")[0]: number(m) for m in f[key].moved_by} for f in (plain, scaled))
        changed = [name for name in a if not name.startswith(("liquid level", "draw rate"))]
        assert changed
        for name in changed:
            # Printed with two decimals of a kPa.
            assert b[name] == pytest.approx(F * a[name], abs=0.011), (key, name)


# Headroom: the changed case, worked out anew without any factor, stands where it was promised


def steps(found) -> dict:
    return {h.knob: h.value for h in found.headroom}


@pytest.mark.parametrize(
    ("shares", "key", "knob", "R"),
    [
        ({"n-butane": 0.12, "isopentane": 0.30, "n-hexane": 0.28, "toluene": 0.30}, "boiling.surface", "surface", 0.01),
        (HEAVY, "vapour-pressure.legal.us-40cfr60-kb", "monthly", 0.20),
        ({"n-butane": 0.40, "isopentane": 0.30, "toluene": 0.30}, "receipt.flash", "receipt", 0.01),
    ],
)
def test_headroom_of_a_pressure_reaches_what_it_promises(shares, key, knob, R):
    """R is the reproducibility: the high end lies above the value by that, or by the method spread of 5 %."""
    liquid = blend(shares)
    f = of(screen(case(blend=with_pressure(liquid, F, R), tank=BARE)))[key]
    ways, target = steps(f), (f.limit_high - f.asked_gap) / (1.0 + max(R, 0.05))
    T = ways[f"{knob}-temperature"]
    assert F * bubble_pressure(liquid.fluid, T, liquid.z).P[0] == pytest.approx(target, rel=SOLVED)
    if key == "boiling.surface":
        z = liquid.z.copy()
        z[liquid.names.index("n-butane")] = ways["share of n-butane"]
        P = F * bubble_pressure(liquid.fluid, facts(f)["highest of its range"], z / z.sum()).P[0]
        assert P == pytest.approx(target, rel=5e-3)  # a straight line between seventeen shares


def test_headroom_of_a_suction_reaches_what_it_promises():
    light = blend({"n-butane": 0.12, "isopentane": 0.30, "n-hexane": 0.28, "toluene": 0.30})
    short = line(receipt=None, suction=suction(npsh_required=7.0, highest_point_above_tank_bottom=3.5))
    found = of(screen(case(blend=with_pressure(light, F, R=0.01), tank=BARE, line=short)))
    lock, npsh = found["vapour-lock.suction"], found["npsh.pump"]
    T = steps(lock)["liquid-temperature"]
    target = (facts(lock)["lowest pressure in the line"] - lock.limit_low - lock.asked_gap) / 1.05
    assert F * bubble_pressure(light.fluid, T, light.z).P[0] == pytest.approx(target, rel=SOLVED)
    T, weight = steps(npsh)["liquid-temperature"], facts(npsh)["density"] * GRAVITY
    head = npsh.value * weight + facts(npsh)["bubble pressure of the hottest liquid"]
    target = (head - (npsh.limit_low + npsh.asked_gap) * weight) / 1.05
    assert F * bubble_pressure(light.fluid, T, light.z).P[0] == pytest.approx(target, rel=SOLVED)


def test_headroom_of_a_vapour_space_reaches_what_it_promises():
    jet = blend({"n-nonane": 0.5, "n-decane": 0.5})
    warm = site(month="Jul", ambient=replace(site().ambient, low=ZERO - 8.0))
    scaled, plain = (of(screen(case(blend=b, tank=BARE, site=warm)))["vapour-space.flammable"]
                     for b in (with_pressure(jet, F, R=0.01), jet))  # fmt: skip
    T, T_plain = (steps(f)["liquid-temperature"] for f in (scaled, plain))
    assert 0.5 < T_plain - T < 3.0
    # Between the steps of its search it follows a straight line of the logarithm: half a percent of the share.
    space = vapour_space(jet.fluid, [T, T_plain], jet.z, P=97800.0).fuel
    assert F * space[0] == pytest.approx(space[1], rel=5e-3)
    a, b = ({m.partition(":")[0]: number(m) for m in f.moved_by} for f in (plain, scaled))
    assert b["liquid temperature +1 K"] > a["liquid temperature +1 K"] > 0.0


# Verdicts


def test_a_composition_that_misses_the_measured_pressure_gives_no_room():
    """Every finding that rests on a vapour pressure with room; then the same factor 1 with a pressure missed by 1.2
    reproducibilities. Decane with a trace of toluene: lean, and an exposure limit far above what stands in the space."""
    heavy = blend({"n-decane": 0.9999, "toluene": 0.0001})
    taken = pressure(heavy, 1.0, R=0.03)
    missed = replace(taken, computed=taken.value - 1.2 * taken.reproducibility)
    big = tank(contents=None, vents=(vent(rated_out=5.0, rated_in=5.0),))
    cases = [case(blend=replace(heavy, measured=m), tank=big, site=site(month="Mar"))
             for m in ((), (taken,), (missed,), (taken, replace(missed, what="DVPE")))]  # fmt: skip
    none, close, off, beside = map(of, screen_many(cases))
    for key in (*RESTING, "fire.flash-point"):
        assert none[key].verdict == "room", key
        assert close[key].verdict == "room", key
        assert off[key].verdict == beside[key].verdict == "near", key
        assert "1.2 reproducibilities" in off[key].reason and TEST in off[key].reason
        assert "DVPE" in beside[key].reason
    settled = ("vents.pressure-setting", "vents.vacuum-setting")
    assert all(off[key].verdict == none[key].verdict for key in settled)  # they rest on no vapour pressure


def test_a_heel_that_misses_its_measured_pressure_spoils_the_mixtures_too():
    taken = pressure(blend(HEAVY), 1.0, R=0.03)
    missed = replace(taken, computed=taken.value - 1.2 * taken.reproducibility)
    old = replace(tank().contents, blend=replace(blend(HEAVY), measured=(missed,)))
    found = of(screen_many([case(blend=blend(HEAVY), tank=tank(contents=old))])[0])
    assert found["boiling.surface"].verdict == "near" and "heel" in found["boiling.surface"].reason
    assert found["receipt.flash"].verdict == "room"  # the receipt alone


def test_a_measured_pressure_alone_can_turn_a_verdict():
    heavy = blend(HEAVY)
    found = [of(r)["vapour-pressure.legal.us-40cfr60-kb"] for r in screen_many(
        [case(blend=b, tank=BARE) for b in (heavy, with_pressure(heavy, 1.25), with_pressure(heavy, 0.6, R=0.45))])]  # fmt: skip
    assert [f.value / found[0].value for f in found] == pytest.approx([1.0, 1.25, 0.6], rel=EXACT)
    assert found[1].verdict == "beyond" and found[2].verdict == "room"


def test_no_number_from_a_measured_pressure_is_unknown_and_says_so():
    bad = replace(pressure(PLAIN, 1.0), ratio=math.nan, doubt=math.nan)
    found = of(screen_many([case(blend=replace(PLAIN, measured=(bad,)), tank=BARE)])[0])
    for key in PRESSURES:
        assert found[key].verdict == "unknown" and "no factor follows" in found[key].reason, key
    for key in ("vapour-lock.suction", "vents.outbreathing", "vapour-space.flammable"):
        assert found[key].verdict == "unknown", key


def test_a_low_measured_pressure_takes_nothing_off_an_exposure_limit():
    """Its high end is that of the computed vapour: the sheet did not measure the benzene in it."""
    plain, low = (of(r)["exposure.hatch"] for r in screen_many(
        [case(blend=b, tank=BARE) for b in (PLAIN, with_pressure(PLAIN, 0.9, R=0.01))]))  # fmt: skip
    assert low.value == pytest.approx(0.9 * plain.value, rel=POYNTING)
    assert low.high == pytest.approx(plain.high, rel=POYNTING)


# Flash points and classes

KEROSENE = blend({"n-nonane": 0.2, "n-decane": 0.4, "n-undecane": 0.4})


def kerosene(found=None, R=4.0, *, computed=None, **more):
    liquid = KEROSENE if found is None else with_figure(KEROSENE, "flash_point", found, computed or found, R)
    read = site(liquid_temperature=Reading(ZERO + 20.0, "2026-07-14"))
    return case(blend=liquid, tank=BARE, **{"site": read, **more})


def test_a_measured_flash_point_is_judged_with_its_range():
    key = "fire.flash-point"
    plain = of(screen(kerosene()))[key]
    own = facts(plain)["flash point, low end of its range"]
    high, low, wide = (of(r)[key] for r in screen_many(
        [kerosene(plain.limit_high + d, R) for d, R in ((8.0, 4.0), (-8.0, 4.0), (8.0, 9.0))]))  # fmt: skip
    assert [f.limit_high for f in (high, low)] == pytest.approx([plain.limit_high + 8.0, plain.limit_high - 8.0])
    assert facts(high)["flash point, low end of its range"] == pytest.approx(plain.limit_high + 3.0)
    assert facts(wide)["flash point, low end of its range"] == pytest.approx(plain.limit_high - 1.0)
    # Both ends of the range lie as far off the hottest liquid as the flash point's own range.
    assert wide.high - high.high == pytest.approx(4.0) and own < plain.limit_high - 4.9
    assert facts(high)["flash point of the receipt, measured"] == pytest.approx(plain.limit_high + 8.0)
    assert high.margin == pytest.approx(plain.margin + 8.0)


def test_a_flash_point_the_composition_misses_gives_no_room():
    key = "fire.flash-point"
    good, off = (of(r)[key] for r in screen_many(
        [kerosene(ZERO + 75.0, computed=ZERO + 75.0 + d, site=site(month="Jan")) for d in (3.0, 5.0)]))  # fmt: skip
    assert good.verdict == "room"
    assert off.verdict == "near" and "1.2 reproducibilities" in off.reason


def test_sensitivity_of_a_measured_flash_point_is_a_difference_of_computed_ones():
    key = "fire.flash-point"
    plain, far = (of(screen(kerosene(found)))[key] for found in (None, ZERO + 70.0))
    assert plain.moved_by == far.moved_by and plain.moved_by


def test_classes_follow_the_measured_flash_point():
    def classes(one):
        rows = {f.label: f.value for item in screen(one).information for f in item.facts}
        return {k: v for k, v in rows.items() if "class" in k}, rows

    (cool, _), (warm, rows) = classes(kerosene(ZERO + 30.0)), classes(kerosene(ZERO + 75.0))
    assert cool != warm
    assert {k for k in cool if cool[k] != warm[k]} >= {"vapour class for static electricity"} - {
        k for k in cool if cool[k] == "unknown"
    }
    assert rows["flash point, measured"] == ZERO + 75.0
    assert rows["flash point by equilibrium (Liaw)"] < ZERO + 60.0  # the computed one stays beside it


def contamination(one):
    """Flash points printed against the share of a second liquid, by the title of the table."""
    return {i.title: [f.value for f in i.facts] for i in screen(one).information if "%" in (i.facts[0].label if i.facts else "")}


def test_contamination_starts_at_the_measured_flash_point():
    heel = tank(contents=replace(tank().contents, blend=PLAIN))

    def with_heel(found=None):
        return replace(kerosene(found), tank=heel)

    plain = contamination(with_heel())
    title = next(t for t, v in plain.items() if v[0] > ZERO + 20.0)
    own = plain[title]
    low, high = (contamination(with_heel(own[0] + d))[title] for d in (-4.0, 4.0))
    assert (low[0], high[0]) == pytest.approx((own[0] - 4.0, own[0] + 4.0))
    assert low[1:] == pytest.approx([v - 4.0 for v in own[1:]], abs=1e-6)
    assert high[1:] == pytest.approx(own[1:], abs=1e-6)
    light = replace(kerosene(), tank=replace(heel, contents=replace(heel.contents, blend=SCALED)))
    shifted = contamination(light)[title]
    assert shifted[0] == pytest.approx(own[0], abs=1e-6)
    assert all(b < a - 0.02 for a, b in zip(own[2:], shifted[2:]))


def test_the_space_over_a_contaminated_liquid_carries_the_factor():
    """Kerosene at 30 degC with a little of a light liquid: at which share it first burns, from three tables."""
    read = site(liquid_temperature=Reading(ZERO + 30.0, "2026-07-14"))
    first = []
    for f in (0.6, 1.0, 1.45):
        heel = tank(contents=replace(tank().contents, blend=with_pressure(PLAIN, f, 0.3)))
        rows = [i.facts for i in screen(replace(kerosene(site=read), tank=heel)).information
                if i.facts and "%" in i.facts[0].label and i.facts[0].value > ZERO + 20.0]  # fmt: skip
        first.append([fact.note.endswith("flammable") for fact in rows[0]].index(True))
    assert first[0] > first[1] > first[2]


# What is printed


def test_the_difference_is_printed_with_every_finding_that_uses_it(both):
    plain, scaled = map(of, both)
    computed = pressure(PLAIN, 1.0).computed
    for key in RESTING:
        found = facts(scaled[key])
        assert found[f"{TEST} of the receipt, measured"] == pytest.approx(F * computed), key
        assert found[f"{TEST} of the receipt, computed"] == pytest.approx(computed), key
        assert found["factor on computed vapour pressures"] == pytest.approx(F), key
        assert "factor on computed vapour pressures" not in facts(plain[key]), key
    notes = {f.label: f.note for f in scaled["boiling.surface"].facts}
    assert "slope of the equation" in notes["factor on computed vapour pressures"]
    line_ = [row for row in both[1].assumptions if "slope of the equation" in row]
    assert len(line_) == 1 and "1.0800" in line_[0] and f"{F * computed / 1e3:.4g} kPa" in line_[0]
    assert not [row for row in both[0].assumptions if "slope of the equation" in row]
    assert line_[0] in json.dumps(both[1].to_dict(), ensure_ascii=False)


def test_memo_and_its_json_carry_the_difference(both):
    memo = build_memo(both[1], **memo_arguments())
    for text in (write_markdown(memo), write_json(memo)):
        assert "factor on computed vapour pressures" in text
        assert "slope of the equation" in text
        assert f"{TEST} of the receipt, measured" in text
        # Section 14 says so beside the governing equation of each such finding, and of no other.
        assert text.count("every K_i is the computed one times the factor below") == len(RESTING)
    assert "times the factor below" not in write_markdown(build_memo(both[0], **memo_arguments()))


def test_other_measured_pressures_stand_beside():
    two = replace(PLAIN, measured=(pressure(PLAIN, F), pressure(PLAIN, 0.97, what="DVPE")))
    result = screen_many([case(blend=two)])[0]
    beside = [row for row in result.assumptions if "less direct" in row]
    assert len(beside) == 1 and "DVPE" in beside[0] and "0.9700" in beside[0]
    found = facts(of(result)["boiling.surface"])
    assert found["factor on computed vapour pressures"] == pytest.approx(F)


def test_a_blind_test_is_said_to_be_one():
    blind = replace(pressure(PLAIN, 1.4), doubt=1.4)
    rows = screen_many([case(blend=replace(PLAIN, measured=(blind,)), tank=BARE)])[0].assumptions
    assert [row for row in rows if "more than half of the fuel's own vapour pressure" in row]


def test_stated_sulfide_and_measured_density_are_told():
    sheet = with_figure(with_figure(PLAIN, "h2s", 5e-6, 5e-6, 1e-6), "density_15", 742.0, 741.5, 0.5)
    stated, found = screen_many([case(blend=sheet, tank=BARE, hydrogen_sulfide=2e-6), case(blend=sheet, tank=BARE)])
    assert [r for r in stated.assumptions if "2 ppm" in r and "5 ppm" in r and "as stated" in r]
    for result in (stated, found):
        assert [r for r in result.assumptions if "742.0 kg/m3" in r and "741.5 kg/m3" in r]
        assert not [r for r in result.reservations if "hydrogen sulfide dissolved" in r]
    label = "hydrogen sulfide, by volume"
    there = [facts(of(screen(r.case))["exposure.hatch"])[label] for r in (stated, found)]
    assert there[1] / there[0] == pytest.approx(2.5, rel=1e-3)  # dissolved in proportion


# A sheet as it comes

SHEET = LabSheet(
    density_15=742.0, dvpe=62e3, tvp=((ZERO + 50.0, 108e3),),
    distillation=((0.1, ZERO + 52.0), (0.5, ZERO + 98.0), (0.9, ZERO + 165.0)),
    oxygenates=(("ethanol", 0.098),), benzene=0.008,
)  # fmt: skip


def test_a_sheet_as_it_comes_screens_with_its_measured_pressure():
    fuel = Blend.from_lab(SHEET, Blend.of({"stock:summer gasoline base": 0.9, "species:ethanol": 0.1}))
    one, two = fuel.measured
    assert (one.what, two.what) == ("true vapour pressure at 50 degC", "DVPE") and one is told(fuel.measured)
    found = of(screen_many([case(blend=fuel, tank=BARE)])[0])["boiling.surface"]
    T = facts(found)["temperature of that liquid"]
    computed = float(bubble_pressure(fuel.fluid, T, fuel.z).P[0])
    assert found.value == pytest.approx(one.ratio * computed, rel=SOLVED)
    # At the temperature of the test it is the measured value itself.
    assert one.ratio * float(bubble_pressure(fuel.fluid, one.T, fuel.z).P[0]) == pytest.approx(108e3, rel=SOLVED)
    assert fuel.figure("density_15").value == 742.0
    assert fuel.figure("distillation", 0.5).value == ZERO + 98.0
    assert hash(fuel) == hash(replace(fuel)) and fuel == replace(fuel)
