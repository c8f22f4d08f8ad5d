"""Findings about fire and health: what flips them, what is never called room, what a missing input does."""

from __future__ import annotations

import json
import re
from dataclasses import replace
from pathlib import Path

import pytest

from screener.blends import Blend
from screener.memo import build_memo, write_markdown
from screener.screening import screen, screen_many
from screener.screening.fire import STATIC_ORDER
from screener.states.case import Blanket, Reading
from tests.memo.hand_made_screening import memo_arguments
from tests.screening.sample import MONTHS, ZERO, blend, case, line, site, tank, verdicts

ROOT = Path(__file__).resolve().parents[2]
SPACE, OXYGEN, FLASH, HATCH, SWITCH = (
    "vapour-space.flammable", "vapour-space.oxygen", "fire.flash-point", "exposure.hatch", "switch-loading")  # fmt: skip
GASOLINES = ("summer gasoline base", "winter gasoline base", "average gasoline", "summer gasoline 1985")
BARE = tank(contents=None)
JANUARY = site(month="Jan")
DECANE = blend({"n-decane": 1.0})
BLANKET = Blanket(300.0, 800.0)


def stock(name):
    return Blend.of({f"stock:{name}": 1.0})


def e85(base="summer gasoline base"):
    return Blend.of({"species:ethanol": 0.85, f"stock:{base}": 0.15})


def of(one, full=False):
    """Findings of a case by id."""
    answer = screen(one) if full else screen_many((one,))[0]
    return {f.id: f for f in answer.findings}


# What must show


def gasoline_cases():
    at_20 = Reading(ZERO + 20.0, "2026-07-14")
    for name in GASOLINES:
        for month in ("Jan", "Jul", None):
            yield case(blend=stock(name), tank=BARE, site=site(month=month, liquid_temperature=at_20))
        yield case(blend=stock(name), tank=tank(contents=None, kind="horizontal", length=12.0, shell_diameter=3.0),
                   site=site(liquid_temperature=at_20))  # fmt: skip
        yield case(blend=stock(name), tank=tank(contents=None, vents=()), site=site(liquid_temperature=at_20))
        yield case(blend=e85(name), tank=BARE, site=site(liquid_temperature=at_20))


def test_a_gasoline_at_20_degrees_in_a_vented_tank_never_has_room():
    answers = screen_many(gasoline_cases())
    assert len(answers) == 24
    for answer in answers:
        found = {f.id: f for f in answer.findings}
        assert found[SPACE].verdict in ("near", "beyond")
        assert (found[FLASH].verdict, found[HATCH].verdict) == ("skipped", "beyond")


def test_nor_in_any_output_of_it():
    one = case(blend=stock("summer gasoline base"), tank=BARE,
               site=site(liquid_temperature=Reading(ZERO + 20.0, "2026-07-14")))  # fmt: skip
    answer = screen(one)
    found = {f.id: f for f in answer.findings}[SPACE]
    assert found.verdict == "near" and "passes through the flammable range" in found.reason
    memo = write_markdown(build_memo(answer, **memo_arguments()))
    rows = [row for row in memo.splitlines() if "Vapour space, flammable" in row]
    assert rows and not [row for row in rows if re.search(r"\. room|\broom\b(?!:)", row.replace("no room", ""))]
    data = next(f for f in answer.to_dict()["findings"] if f["id"] == SPACE)
    assert data["verdict"] == "near" and data["headroom"] == []


@pytest.mark.parametrize(
    "recipe",
    [stock("summer gasoline base"), e85(), stock("jet kerosene"), stock("diesel"), stock("condensate")],
    ids=["gasoline", "E85", "jet", "diesel", "condensate"],
)
def test_the_usual_recipes_come_out_judged(recipe):
    found = of(case(blend=recipe, tank=BARE))
    assert found[SPACE].verdict in ("beyond", "near", "room")
    # Below 23 degC a flash point decides nothing: such a liquid is always stored above it.
    always_above = recipe.title.endswith(("base", "condensate"))
    assert (found[FLASH].verdict == "skipped") == always_above
    assert always_above or found[FLASH].verdict in ("beyond", "near", "room")
    assert found[HATCH].verdict in ("beyond", "near", "room") or recipe.title.endswith("diesel")


# The vapour space


def test_only_the_lean_side_can_have_room():
    found = of(case(blend=DECANE, tank=BARE, site=JANUARY))
    assert (found[SPACE].verdict, found[FLASH].verdict) == ("room", "room")
    assert found[SPACE].value < found[SPACE].limit_low
    rich = of(case(blend=stock("winter gasoline base"), tank=BARE))[SPACE]
    assert rich.verdict == "near" and rich.value > rich.limit_high
    assert "drawn down" in rich.reason and "hatch" in rich.reason and "fills the tank" in rich.reason


def test_the_words_name_the_ways_this_tank_takes_in_air():
    def words(**changes):
        return of(case(blend=stock("winter gasoline base"), **changes))[SPACE].reason

    assert "vacuum vent" in words(tank=BARE) and "open vents" in words(tank=tank(contents=None, vents=()))
    assert "drawn down" not in words(tank=BARE, line=line(draw_rate=None, suction=None))
    assert "blanket gas fails" in words(tank=tank(contents=None, blanket=BLANKET))
    legs = tank(contents=None, kind="internal-floating-roof", roof_leg_height=2.5)
    assert "stands on its legs" in words(tank=legs)


def test_the_month_flips_the_vapour_space():
    """E85 on a summer base: flammable in January, too rich on every night of July."""
    january, july = (of(case(blend=e85(), tank=BARE, site=site(month=m)))[SPACE] for m in ("Jan", "Jul"))
    assert (january.verdict, july.verdict) == ("beyond", "near")
    assert "coldest day, January" in january.condition.when
    assert "flammable at -4.3 degC" in january.reason


def test_more_than_a_tenth_on_estimated_limits_is_at_best_near():
    found = of(case(blend=stock("diesel"), tank=BARE, site=JANUARY))
    for finding in (found[SPACE], found[FLASH]):
        assert finding.verdict == "near" and "estimates" in finding.reason


def test_a_floating_roof_is_judged_when_it_lands():
    def roof(legs):
        return of(case(tank=tank(kind="internal-floating-roof", roof_leg_height=legs)))[SPACE]

    assert roof(1.8).verdict == "skipped" and "floats" in roof(1.8).reason
    landed = roof(2.5)
    assert landed.verdict in ("near", "beyond")
    unknown = roof(None)
    assert unknown.verdict == "unknown" and "tank.roof_leg_height" in unknown.reason


def test_a_typical_range_gives_no_room():
    typical = replace(JANUARY, ambient=replace(JANUARY.ambient, meaning="typical"))
    found = of(case(blend=DECANE, tank=BARE, site=typical))
    assert found[SPACE].verdict == "near" and "typical days" in found[SPACE].reason


# Oxygen


def inerted(oxygen, shares, blanket=BLANKET):
    box = tank(contents=None, blanket=blanket, vapour_space_oxygen=oxygen)
    return of(case(blend=blend(shares), tank=box, site=JANUARY))


def test_measured_oxygen_under_a_blanket_can_have_room_where_the_limits_were_read():
    light = {"propane": 0.01, "n-butane": 0.99}
    found = inerted(0.04, light)
    assert (found[OXYGEN].verdict, found[OXYGEN].evidence) == ("room", "quoted")
    assert found[SPACE].verdict == "skipped" and "oxygen measured" in found[SPACE].reason
    assert inerted(0.10, light)[OXYGEN].verdict == "near"  # 10.7 % less the gap of 2 %
    air = inerted(0.12, light)
    assert air[OXYGEN].verdict == "beyond" and air[SPACE].verdict == "near"  # judged as air again


def test_a_remembered_limiting_oxygen_never_gives_room():
    found = inerted(0.01, {"n-hexane": 0.5, "toluene": 0.5})
    assert (found[OXYGEN].verdict, found[OXYGEN].evidence) == ("near", "memory")


def test_a_blanket_without_measured_oxygen_counts_for_nothing():
    found = inerted(None, {"ethanol": 1.0})
    assert found[OXYGEN].verdict == "unknown" and "tank.vapour_space_oxygen" in found[OXYGEN].reason
    assert found[SPACE].verdict == of(case(blend=blend({"ethanol": 1.0}), tank=BARE, site=JANUARY))[SPACE].verdict


def test_little_oxygen_without_a_blanket_is_vapour_and_no_protection():
    found = inerted(0.04, {"isopentane": 1.0}, blanket=None)
    assert found[OXYGEN].verdict == "skipped" and "air comes back" in found[OXYGEN].reason
    assert found[SPACE].verdict == "near"


# Flash point


def test_the_temperature_flips_the_flash_point():
    """n-decane, 46 degC: a white tank in January, one in July, and a black one."""
    cold = of(case(blend=DECANE, tank=BARE, site=JANUARY))[FLASH]
    warm = of(case(blend=DECANE, tank=BARE))[FLASH]
    black = of(case(blend=DECANE, tank=tank(contents=None, surface="black")))[FLASH]
    assert [f.verdict for f in (cold, warm, black)] == ["room", "near", "beyond"]
    # Tabled; 0.6 K is 3 % of vapour pressure, the most the model's pressure is from its own curve.
    assert cold.limit_high == pytest.approx(ZERO + 46.0, abs=0.6)
    assert "treat the vapour space as flammable or too rich" in black.reason
    assert warm.asked_gap == pytest.approx(30.0 / 1.8, abs=0.05)  # 30 degF, written as 16.7 K


def test_the_room_promised_is_there():
    """The surface temperature that is said to give room gives it when the gauge reads it."""
    warm = of(case(blend=DECANE, tank=BARE), full=True)
    for key in (FLASH, SPACE):
        (step,) = warm[key].headroom
        reading = site(liquid_temperature=Reading(step.value - 1.5, "2026-04-02"), month="Jan")
        assert of(case(blend=DECANE, tank=BARE, site=reading))[key].verdict == "room", key
        above = site(liquid_temperature=Reading(step.value + 8.0, "2026-04-02"), month="Jan")
        assert of(case(blend=DECANE, tank=BARE, site=above))[key].verdict == "near", key


# Breathing at the hatch


def test_the_worst_limit_read_is_shown_and_never_outvoted():
    found = of(case(blend=stock("summer gasoline base"), tank=BARE), full=True)[HATCH]
    facts = {fact.label: fact for fact in found.facts}
    assert found.verdict == "beyond" and found.evidence == "quoted"
    assert facts["substance and limit"].value == "benzene, TWA, NIOSH REL, 2005"
    assert found.value == pytest.approx(facts["in the vapour space"].value / facts["that limit"].value)
    assert found.value == pytest.approx(facts["volumes of air and vapour that bring it to the limit"].value)
    # 1 ppm = 1 mg/m3 x 24.45 / 78.11 at 25 degC and 101.325 kPa; here 97.8 kPa and the hottest liquid, 306.1 K.
    by_hand = facts["benzene, by volume"].value * 78.11 / 24.465 * 97.8 / 101.325 * 298.15 / 306.1
    assert facts["benzene, by mass"].value == pytest.approx(by_hand, rel=2e-3)  # digits of molar mass and temperature


def test_a_remembered_exposure_limit_can_be_passed_but_gives_no_room():
    """p-Xylene in tetradecane: 100 ppm to 2020, which was read, and 20 ppm from 2021, remembered."""
    def xylene(share):
        return of(case(blend=blend({"p-xylene": share, "n-tetradecane": 1.0 - share}), tank=BARE, site=JANUARY))[HATCH]

    few, some, much = xylene(1e-5), xylene(3e-3), xylene(1e-2)
    assert (few.verdict, few.evidence) == ("near", "memory") and few.high < 0.02
    assert (some.verdict, some.evidence) == ("beyond", "memory") and "2021" in some.reason
    assert (much.verdict, much.evidence) == ("beyond", "quoted") and "to 2020" in much.reason


def test_room_at_the_hatch_needs_limits_that_were_read():
    trace = blend({"n-heptane": 1e-4, "n-tetradecane": 1.0 - 1e-4})
    found = of(case(blend=trace, tank=BARE, site=JANUARY))[HATCH]
    assert (found.verdict, found.evidence) == ("room", "quoted")


def test_hydrogen_sulfide_is_judged_when_stated_and_asked_for_in_sour_service():
    heavy = blend({"n-tetradecane": 1.0})
    silent = screen_many((case(blend=heavy, tank=BARE),))[0]
    assert {f.id: f for f in silent.findings}[HATCH].verdict == "skipped"
    assert any("blend.h2s_in_liquid" in text for text in silent.reservations)
    sour = of(case(blend=heavy, tank=tank(contents=None, sour_service=True)))[HATCH]
    assert sour.verdict == "unknown" and "blend.h2s_in_liquid" in sour.reason
    stated = of(replace(case(blend=heavy, tank=BARE), hydrogen_sulfide=20e-6))[HATCH]
    assert stated.verdict == "beyond" and "hydrogen sulfide" in stated.reason
    clean = of(replace(case(blend=heavy, tank=tank(contents=None, sour_service=False))))[HATCH]
    assert clean.verdict == "skipped"


def test_no_hydrogen_sulfide_stated_is_not_none_where_the_tank_is_sour():
    sour = tank(contents=None, sour_service=True)
    trace = blend({"n-heptane": 1e-4, "n-tetradecane": 1.0 - 1e-4})
    assert of(case(blend=trace, tank=sour, site=JANUARY))[HATCH].verdict == "unknown"
    zero = replace(case(blend=trace, tank=sour, site=JANUARY), hydrogen_sulfide=0.0)
    assert of(zero)[HATCH].verdict == "room"


def test_cuts_hide_substances_so_nothing_good_follows():
    from screener.species import cut

    heavy = cut(500.0, 800.0).name
    trace = Blend.of({f"species:{heavy}": 1.0 - 1e-4, "species:n-heptane": 1e-4})
    assert of(case(blend=trace, tank=BARE, site=JANUARY))[HATCH].verdict == "unknown"
    loaded = Blend.of({f"species:{heavy}": 0.9, "species:benzene": 0.1})
    assert of(case(blend=loaded, tank=BARE, site=JANUARY))[HATCH].verdict == "beyond"


def test_the_hatch_is_judged_only_where_somebody_opens_it():
    closed, unsaid = (of(case(tank=tank(open_gauging=said)))[HATCH] for said in (False, None))
    assert closed.verdict == unsaid.verdict == "skipped"
    assert "tank.open_gauging" in unsaid.reason
    shown = [i for i in screen(case(tank=tank(open_gauging=False))).information if "undiluted" in i.title]
    assert [i.title.partition(":")[0] for i in shown] == ["receipt", "heel"]
    assert {"n-hexane, by volume", "toluene, by mass"} <= {fact.label for fact in shown[0].facts}
    assert not [i for i in screen(case()).information if "undiluted" in i.title]


def test_a_contaminated_distillate_is_judged_though_its_mixture_flashes_cold():
    """Gasoline filled on a heel of diesel: the heel is a liquid whose flash point matters."""
    heel = replace(tank().contents, blend=stock("diesel"))
    assert of(case(blend=stock("summer gasoline base"), tank=tank(contents=heel)))[FLASH].verdict == "beyond"


# Switch loading


def after(previous, receipt, **where):
    return of(case(blend=receipt, tank=tank(contents=None, previous_contents=previous), site=site(**where)))[SWITCH]


def test_what_the_tank_held_flips_switch_loading():
    diesel = stock("diesel")
    assert after("summer gasoline base", diesel).verdict == "beyond"
    assert after("heavy naphtha", diesel).verdict == "beyond"  # intermediate vapour pressure
    for previous, receipt, word in (("jet kerosene", diesel, "same vapour class"), (None, diesel, "tank.previous"),
                                    ("diesel", stock("average gasoline"), "higher vapour class")):  # fmt: skip
        found = after(previous, receipt)
        assert found.verdict == "skipped" and word in found.reason
    assert "bond and ground" in after("summer gasoline base", diesel).caution


def test_lean_vapour_of_other_contents_is_never_room():
    arctic = tuple(replace(m, mean=ZERO - 40.0, mean_high=ZERO - 36.0, mean_low=ZERO - 44.0) for m in MONTHS)
    cold = {"months": arctic, "ambient": replace(site().ambient, low=ZERO - 55.0, high=ZERO - 30.0), "month": "Jan"}
    found = after("heavy naphtha", stock("diesel"), **cold)
    assert found.verdict == "near" and found.value < 0.5 * found.limit_high
    assert "freed of gas" in found.reason


def test_the_classes_stand_in_the_order_of_their_table():
    from screener.ground.files import read_table

    assert tuple(row["class"] for row in read_table("fire/static_classes.csv")) == STATIC_ORDER


# Missing inputs, batch, other tanks

MISSING = [
    ("site.ambient.low", {"site": site(ambient=None)}, SPACE),
    ("site.ambient.high", {"site": site(ambient=None)}, FLASH),
    ("site.lowest_barometer", {"site": site(lowest_barometer=None, elevation=None)}, SPACE),
    ("site.lowest_barometer", {"site": site(lowest_barometer=None, elevation=None)}, HATCH),
    ("tank.surface", {"tank": tank(surface=None)}, SPACE),
    ("tank.surface", {"tank": tank(surface=None)}, FLASH),
    ("tank.contents.volume", {"tank": tank(contents=replace(tank().contents, volume=None))}, HATCH),
    ("line.receipt.temperature", {"line": line(receipt=replace(line().receipt, temperature=None))}, SPACE),
    ("site.liquid_temperature", {"tank": tank(kind="underground", length=10.0)}, SPACE),
]


@pytest.mark.parametrize(("named", "changes", "finding"), MISSING, ids=[f"{m[0]}-{m[2]}" for m in MISSING])
def test_a_missing_input_is_unknown_and_named(named, changes, finding):
    """The receipt is lean and heavy, so that nothing is beyond on its own."""
    heavy = blend({"n-tetradecane": 1.0 - 1e-5, "n-heptane": 1e-5})
    box = changes.get("tank", tank())
    box = replace(box, contents=replace(box.contents, blend=heavy))
    found = of(case(**{**changes, "blend": heavy, "tank": box}))[finding]
    assert found.verdict == "unknown"
    assert named in found.reason


def test_facts_and_headroom_change_no_verdict():
    for one in (case(), case(blend=e85(), tank=BARE, site=JANUARY), case(blend=DECANE, tank=BARE)):
        assert verdicts(screen(one)) == verdicts(screen_many((one,))[0])


def test_a_pressure_vessel_is_skipped_not_good():
    found = of(case(tank=tank(kind="pressure-vessel")))
    assert {found[key].verdict for key in (SPACE, OXYGEN, FLASH, HATCH)} == {"skipped"}


def test_the_result_is_plain_data_with_the_ladder_in_it():
    body = screen(case(blend=e85(), tank=BARE, site=JANUARY)).to_dict()
    text = json.dumps(body, allow_nan=False)
    assert "NaN" not in text
    months = body["curve"]["ladder"]["months"]
    assert [row["month"] for row in months][:2] == ["Jan", "Feb"] and len(months) == 12
    assert months[0]["equilibrium"] == "flammable when cold, too rich when warm"
    assert {row["not_saturated"] for row in months} == {"passes through the flammable range"}


@pytest.mark.parametrize(
    ("recipe", "month", "words"),
    [(e85(), "Jan", "margin = value - upper limit"), (DECANE, "Jan", "margin = lower limit - value"),
     (stock("winter gasoline base"), "Jul", "margin = value - upper limit")],
    ids=["inside", "lean", "rich"],
)  # fmt: skip
def test_the_memo_subtracts_the_nearest_end_and_prints_the_ladder(recipe, month, words):
    answer = screen(case(blend=recipe, tank=BARE, site=site(month=month)))
    found = {f.id: f for f in answer.findings}[SPACE]
    memo = write_markdown(build_memo(answer, **memo_arguments()))
    assert f"Vapour space, flammable: {words}" in memo
    ends = {"margin = value - upper limit": found.value - found.limit_high,
            "margin = lower limit - value": found.limit_low - found.value}  # fmt: skip
    assert found.margin == pytest.approx(ends[words])
    ladder = memo.partition("Vapour space through the year: receipt")[2].partition("Fuel share")[0]
    assert len(re.findall(r"^\| [A-Z][a-z]{2} ", ladder, re.MULTILINE)) == 12
    assert "passes through the flammable range" in ladder or "too lean at any degree of saturation" in ladder


def test_classes_and_contamination_are_information():
    screening = screen(case(blend=stock("diesel")))  # on a heel of gasoline-like species
    facts = {fact.label: fact for item in screening.information for fact in item.facts}
    classes = {label: facts[label] for label in facts if label.endswith(" class")}
    assert {"GHS class", "EU CLP class", "29 CFR 1910.106 (2012 on) class", "NFPA 30 (2003 on) class"} <= set(classes)
    assert all("boiling point used" in fact.note for fact in classes.values())
    table = next(i for i in screening.information if i.title.startswith("flash point of the receipt with a little"))
    flash = [fact.value for fact in table.facts]
    assert len(flash) == 6 and flash == sorted(flash, reverse=True)
    assert flash[0] - flash[-1] > 30.0
    assert all("vapour space at" in fact.note for fact in table.facts)


# No output calls a rich space good

GOOD = re.compile(r"\b(safe|safely|harmless|no danger|not dangerous|cannot burn|non-flammable)\b", re.IGNORECASE)


def rich_and_good(text: str) -> list[str]:
    """Sentences and table rows that speak of a rich space and of something good at once."""
    sentences = re.split(r"(?<=[.;!?])\s|\n", text)
    return [s for s in sentences if re.search(r"\b(too )?rich\b", s, re.IGNORECASE) and GOOD.search(s)]


def test_too_rich_is_never_called_safe():
    files = [*(ROOT / "data").rglob("*.toml"), *(ROOT / "tests" / "golden").iterdir(), *(ROOT / "examples").iterdir()]
    texts = [(str(f), f.read_text(encoding="utf-8")) for f in files if f.is_file() and f.suffix in (".toml", ".md", ".txt", ".json")]
    for name in GASOLINES:
        answer = screen(case(blend=stock(name), tank=BARE))
        texts.append((name, write_markdown(build_memo(answer, **memo_arguments()))))
        texts.append((name, json.dumps(answer.to_dict())))
    assert sum("too rich" in text for _, text in texts) > 8
    assert [(name, rich_and_good(text)) for name, text in texts if rich_and_good(text)] == []


def test_that_search_can_fail():
    assert rich_and_good("The space is too rich and therefore safe.")
    assert not rich_and_good("The space is too rich. A safe place is elsewhere.")
