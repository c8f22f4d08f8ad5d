"""Changing one thing flips one named verdict; nothing missing ever becomes a good one."""

from __future__ import annotations

from dataclasses import replace

import pytest

from screener.screening import screen, screen_many
from tests.screening.sample import (
    HEAVY,
    LIGHT,
    MONTHS,
    ZERO,
    blend,
    case,
    line,
    site,
    suction,
    tank,
    vent,
    verdicts,
)

LEGAL = "vapour-pressure.legal.us-40cfr60-kb"
LIGHTER = {"n-butane": 0.20, "isopentane": 0.25, "n-hexane": 0.25, "toluene": 0.15, "isooctane": 0.15}


@pytest.fixture(scope="module")
def flips():
    """All variants in one batch: name -> verdicts."""
    variants = {
        "base": case(),
        "floating": case(tank=tank(kind="internal-floating-roof")),
        "light july": case(blend=blend(LIGHTER)),
        "light january": case(blend=blend(LIGHTER), site=site(month="Jan")),
        "no ethanol": case(blend=blend(LIGHT), line=line(suction=suction(npsh_required=4.05))),
        "small vents": case(tank=tank(vents=(vent(rated_out=0.16),))),
        "higher level": case(
            tank=tank(levels=replace(tank().levels, low=5.0)), line=line(suction=suction(npsh_required=10.5))
        ),
        "same level": case(line=line(suction=suction(npsh_required=10.5))),
    }
    answers = screen_many(variants.values())
    return dict(zip(variants, map(verdicts, answers)))


def test_the_roof_flips_the_legal_finding(flips):
    assert flips["base"][LEGAL] == "beyond"
    assert flips["floating"][LEGAL] == "room"


def test_the_month_flips_boiling(flips):
    assert flips["light july"]["boiling.surface"] == "beyond"
    assert flips["light january"]["boiling.surface"] in ("near", "room")


def test_vent_size_flips_outbreathing(flips):
    assert flips["base"]["vents.outbreathing"] in ("near", "room")
    assert flips["small vents"]["vents.outbreathing"] == "beyond"


def test_the_lowest_level_flips_npsh(flips):
    assert flips["same level"]["npsh.pump"] == "beyond"
    assert flips["higher level"]["npsh.pump"] in ("near", "room")


def test_ethanol_flips_the_legal_finding_under_a_floating_roof():
    """A tenth of ethanol lifts a blend that just stays below 76.6 kPa to a value above it."""
    warm = tuple(
        replace(m, mean=m.mean + 9.0, mean_high=m.mean_high + 9.0, mean_low=m.mean_low + 9.0) for m in MONTHS
    )
    base = {"n-butane": 0.08, "isopentane": 0.24, "n-hexane": 0.24, "toluene": 0.15, "isooctane": 0.29}
    with_ethanol = {name: 0.9 * share for name, share in base.items()} | {"ethanol": 0.1}
    roof = tank(kind="internal-floating-roof", contents=None)
    answers = screen_many(
        case(blend=blend(b), tank=roof, site=site(months=warm)) for b in (base, with_ethanol)
    )
    first, second = (next(f for f in a.findings if f.id == LEGAL) for a in answers)
    assert first.verdict in ("near", "room") and second.verdict == "beyond", (first.value, second.value)


MISSING = [
    ("tank.surface", {"tank": tank(surface=None)}, "boiling.surface"),
    ("site.latitude", {"site": site(latitude=None)}, "boiling.surface"),
    ("site.months", {"site": site(months=())}, LEGAL),
    ("line.receipt.temperature", {"line": line(receipt=replace(line().receipt, temperature=None))}, "receipt.flash"),
    ("line.receipt.dissolved_gas", {"line": line(receipt=replace(line().receipt, dissolved_gas=None))}, "receipt.flash"),
    ("tank.contents.temperature", {"tank": tank(contents=replace(tank().contents, temperature=None))}, "boiling.surface"),
    ("tank.contents.volume", {"tank": tank(contents=replace(tank().contents, volume=None))}, "vapour-lock.suction"),
    ("line.draw.rate", {"line": line(draw_rate=None)}, "vapour-lock.suction"),
    ("line.suction.npsh_required", {"line": line(suction=suction(npsh_required=None))}, "npsh.pump"),
    ("line.suction.line_bore", {"line": line(suction=suction(line_bore=None))}, "npsh.pump"),
    ("rated_out_at", {"tank": tank(vents=(vent(rated_out_at=None),))}, "vents.outbreathing"),
    ("rated_in_at", {"tank": tank(vents=(vent(rated_in_at=None),))}, "vents.inbreathing"),
    ("tank.vents", {"tank": tank(vents=())}, "vents.outbreathing"),
    ("tank.design_pressure", {"tank": tank(design_overpressure=None)}, "vents.pressure-setting"),
    ("tank.design_vacuum", {"tank": tank(design_vacuum=None)}, "vents.vacuum-setting"),
    ("screening.criteria", {"criteria": ()}, "vapour-pressure.legal"),
]  # fmt: skip


@pytest.mark.parametrize(("named", "changes", "finding"), MISSING, ids=[f"{m[0]}-{m[2]}" for m in MISSING])
def test_a_missing_input_is_unknown_and_named(named, changes, finding):
    found = {f.id: f for f in screen(case(**changes)).findings}[finding]
    assert found.verdict == "unknown"
    assert named in found.reason


def test_ambient_alone_leaves_the_legal_finding_unknown():
    result = verdicts(screen(case(site=site(months=(), month=None))))
    assert result[LEGAL] == "unknown"
    assert result["boiling.surface"] in ("room", "near")


def test_a_typical_ambient_range_never_gives_room_to_a_hottest_day_finding():
    typical = verdicts(screen(case(site=site(ambient=replace(site().ambient, meaning="typical")))))
    design = verdicts(screen(case()))
    for finding in ("boiling.surface", "vapour-lock.suction", "npsh.pump", "vents.outbreathing"):
        assert (design[finding], typical[finding]) == ("room", "near"), finding


def test_a_hot_vapour_space_is_unknown():
    hot = case(tank=tank(vapour_space_temperature=ZERO + 52.0))
    found = {f.id: f for f in screen(hot).findings}
    assert found["vents.outbreathing"].verdict == found["vents.inbreathing"].verdict == "unknown"
    assert "48.9 degC" in found["vents.outbreathing"].reason


def test_vapour_pressure_over_half_the_barometer_caps_outbreathing():
    big = tank(vents=(vent(rated_out=5.0, rated_in=5.0),), contents=None)
    quiet, lively = (
        {f.id: f for f in screen(case(blend=blend(b), tank=big)).findings}["vents.outbreathing"]
        for b in (HEAVY, LIGHTER)
    )
    assert quiet.verdict == "room"
    assert lively.verdict in ("near", "unknown")
    lively_january = screen(case(blend=blend(LIGHTER), tank=big, site=site(month="Mar")))
    march = {f.id: f for f in lively_january.findings}["vents.outbreathing"]
    assert march.verdict == "near" and "P/(P - Pv)" in march.reason


def test_external_roof_and_pressure_vessel_are_skipped_not_good():
    outside = verdicts(screen(case(tank=tank(kind="external-floating-roof"))))
    assert outside["vents.outbreathing"] == outside["vents.inbreathing"] == "skipped"
    vessel = verdicts(screen(case(tank=tank(kind="pressure-vessel"))))
    assert vessel["boiling.surface"] == "skipped"
    assert "room" not in {
        v for key, v in vessel.items() if key.startswith(("boiling", "vapour-pressure", "receipt"))
    }


def test_every_finding_carries_the_method_spread():
    """Plus and minus 5 % of vapour pressure at least, until something better is measured."""
    for finding in screen(case()).findings:
        if finding.id.startswith(("boiling", "vapour-pressure", "receipt")):
            assert finding.low <= 0.95 * finding.value * (1 + 1e-12)
            assert finding.high >= 1.05 * finding.value * (1 - 1e-12)
            assert "method" in finding.range_covers


def test_headroom_does_what_it_says():
    """The share of butane that is said to restore room does so when it is put into the case."""
    shares = {"n-butane": 0.15, "isopentane": 0.14, "n-hexane": 0.24, "toluene": 0.23, "isooctane": 0.24}
    roof = tank(kind="external-floating-roof", contents=None)
    before = {f.id: f for f in screen(case(blend=blend(shares), tank=roof)).findings}["boiling.surface"]
    assert before.verdict == "near"
    cut = next(h for h in before.headroom if h.knob == "share of n-butane")
    z = dict(zip(blend(shares).names, blend(shares).z))
    scale = (1.0 - cut.value * (1.0 - 1e-6)) / (1.0 - z["n-butane"])
    less = {f"species:{k}": v * scale for k, v in z.items()} | {"species:n-butane": cut.value * (1.0 - 1e-6)}
    total = sum(less.values())
    from screener.blends import Blend

    after = Blend.of({k: v / total for k, v in less.items()}, basis="mole")
    again = {f.id: f for f in screen(case(blend=after, tank=roof)).findings}["boiling.surface"]
    assert again.verdict == "room"
    assert again.margin > before.margin


def test_a_sheet_without_vapour_pressure_gives_no_verdict_on_one():
    """The composition fitted to such a sheet has numbers everywhere; no verdict is taken from them."""
    fitted = replace(blend(LIGHT), vapour_pressure_known=False)
    found = {f.id: f for f in screen(case(blend=fitted, tank=tank(open_gauging=True, contents=None))).findings}
    resting = (
        "boiling",
        "vapour-pressure",
        "receipt",
        "vapour-lock",
        "npsh",
        "vents.outbreathing",
        "vapour-space.flam",
    )
    for finding in found.values():
        if finding.id.startswith(resting):
            assert finding.verdict == "unknown", finding.id
    assert "laboratory sheet" in found["boiling.surface"].reason
    mixed = replace(tank().contents, blend=replace(blend(HEAVY), vapour_pressure_known=False))
    assert verdicts(screen(case(tank=tank(contents=mixed))))["boiling.surface"] == "unknown"
