"""Each tied caution is printed by its input and by nothing else."""

from __future__ import annotations

from dataclasses import replace

import pytest

from screener.screening import screen_many
from screener.screening.cautions import TIED
from screener.screening.wording import say
from tests.screening.sample import ZERO, blend, case, line, site, tank, vent

WIDE = blend({"n-butane": 0.05, "n-heptane": 0.35, "n-hexadecane": 0.2, "n-eicosane": 0.4})
COLD_RECEIPT = line(receipt=replace(line().receipt, temperature=ZERO - 2.0))
LEAN = blend({"n-decane": 1.0})

# caution, finding that carries it, case with it, case without it
RULES = [
    ("iron-sulphide", "vapour-space.flammable", case(tank=tank(sour_service=True)), case()),
    ("iron-sulphide", "vents.inbreathing", replace(case(), hydrogen_sulfide=1e-5), replace(case(), hydrogen_sulfide=0.0)),
    ("frozen-vents", "vents.outbreathing", case(site=site(month="Jan")), case(site=site(month="Jul"))),
    ("arrester", "vents.inbreathing", case(tank=tank(vents=(vent(arrester=True),))), case()),
    ("idle-vents", "vents.outbreathing", case(tank=tank(vents=(vent(out_of_service=1),))), case()),
    ("rain", "vents.vacuum-setting", case(), case(tank=tank(insulated=True))),
    ("cold-receipt", "vents.inbreathing", case(line=COLD_RECEIPT), case(line=line(receipt=None))),
    ("shared-header", "exposure.hatch", case(tank=tank(vapour_return=True)), case()),
    ("static", "vapour-space.flammable", case(), case(blend=LEAN, tank=tank(contents=None), site=site(month="Jan"))),
    ("boil-over", "boiling.surface", case(blend=WIDE), case()),
]


def opening(key: str) -> str:
    """The words of a caution up to the first field."""
    return say("tied", key, T="@", K="@", count="@").partition("@")[0] or say("tied", key, count="1")[2:30]


@pytest.mark.parametrize(("key", "finding", "with_it", "without"), RULES, ids=[f"{r[0]}-{r[1]}" for r in RULES])
def test_a_caution_follows_its_input(key, finding, with_it, without):
    there, not_there = (
        {f.id: f for f in answer.findings}[finding].caution for answer in screen_many((with_it, without))
    )
    assert opening(key) in there
    assert opening(key) not in not_there


def test_every_rule_is_tested_and_every_finding_exists():
    assert {rule[0] for rule in RULES} == {one.key for one in TIED}
    ids = {f.id for f in screen_many((case(),))[0].findings}
    assert {finding for one in TIED for finding in one.findings} <= ids


def test_a_finding_that_does_not_apply_carries_none():
    vessel = screen_many((case(tank=tank(kind="pressure-vessel", sour_service=True, vapour_return=True)),))[0]
    for finding in vessel.findings:
        if finding.verdict == "skipped":
            assert "scale formed in sour service" not in finding.caution and "shared header" not in finding.caution
