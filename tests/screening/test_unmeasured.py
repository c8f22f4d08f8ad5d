"""A sheet without vapour pressure: its fitted composition has numbers everywhere, and none of them is told as known."""

from __future__ import annotations

import math
from dataclasses import replace

import pytest

from screener.screening import screen
from screener.states.previous import classed
from tests.screening.sample import LIGHT, blend, case, tank
from tests.screening.sheets import with_figure

OIL = {"n-undecane": 0.5, "n-dodecane": 0.5}
BARE = tank(contents=None, previous_contents="summer gasoline base")


def silent(parts):
    """A blend whose sheet held no vapour pressure."""
    return replace(blend(parts), vapour_pressure_known=False)


def of(result) -> dict:
    return {f.id: f for f in result.findings}


@pytest.fixture(scope="module")
def heavy():
    return screen(case(blend=silent(OIL), tank=BARE)), screen(case(blend=blend(OIL), tank=BARE))


def test_a_flash_point_of_an_unmeasured_light_end_is_unknown_however_high(heavy):
    found, known = (of(one)["fire.flash-point"] for one in heavy)
    assert known.verdict in ("room", "near")  # what the number alone would say
    assert found.verdict == "unknown" and found.limit_high is None
    assert "neither a flash point nor a vapour pressure" in found.reason


def test_an_unmeasured_liquid_is_not_said_to_flash_below_23_degC():
    plain, doubtful = (of(screen(case(blend=b, tank=BARE)))["fire.flash-point"] for b in (blend(LIGHT), silent(LIGHT)))
    assert plain.verdict == "skipped" and "below 23 degC" in plain.reason
    assert doubtful.verdict == "unknown"


def test_a_measured_flash_point_stands_without_a_vapour_pressure():
    fitted = with_figure(silent(OIL), "flash_point", 390.0, 389.0, 3.0)
    assert of(screen(case(blend=fitted, tank=BARE)))["fire.flash-point"].verdict in ("room", "near")


def test_switch_loading_is_not_skipped_by_a_vapour_class_nobody_measured(heavy):
    found, known = (of(one)["switch-loading"] for one in heavy)
    assert known.verdict != "unknown"
    assert found.verdict == "unknown" and "laboratory sheet" in found.reason
    T, P, name = classed(silent(LIGHT))
    assert math.isnan(T) and math.isnan(P) and name == "unknown"


def test_figures_of_an_unmeasured_light_end_say_so(heavy):
    doubtful, known = heavy
    for row in doubtful.information:
        assert "holds no vapour pressure" in row.note, row.title
    assert not any("holds no vapour pressure" in row.note for row in known.information)
    classes = [f.value for row in doubtful.information for f in row.facts if f.label.endswith(" class")]
    assert classes and set(classes) == {"unknown"}
    assert "ladder" in known.curve and "ladder" not in doubtful.curve


def test_what_would_be_beyond_on_an_unmeasured_vapour_pressure_is_unknown_and_says_so():
    found, known = (of(screen(case(blend=b, tank=BARE))) for b in (silent(LIGHT), blend(LIGHT)))
    beyond = [f.id for f in known.values() if f.verdict == "beyond" and f.id.startswith("vapour-pressure")]
    assert beyond
    for key in beyond:
        assert found[key].verdict == "unknown" and found[key].value is not None
        assert "wrong side" in found[key].reason and "holds no vapour pressure" in found[key].reason


def test_poison_in_an_unmeasured_vapour_is_still_told():
    """A toxic vapour rests on the share of one species, not on the light end: beyond stays, with what is doubtful."""
    found, known = (
        of(screen(case(blend=b, tank=tank(contents=None, open_gauging=True))))["exposure.hatch"]
        for b in (silent(LIGHT), blend(LIGHT))
    )
    assert found.verdict == known.verdict == "beyond"
    assert "light end" in found.reason and "light end" not in known.reason


def test_settled_water_is_near_at_best_and_takes_no_receipt_beyond():
    """Settled water adds its own vapour pressure and no more: held together with the fuel it counts for far more."""
    wet = {name: 0.95 * share for name, share in LIGHT.items()} | {"water": 0.05}
    found, dry = (of(screen(case(blend=blend(parts), tank=BARE))) for parts in (wet, LIGHT))
    for key in ("boiling.surface", "receipt.flash"):
        assert dry[key].verdict == "room" and found[key].verdict == "near", key
        assert "splits into two" in found[key].reason, key
        assert dry[key].value < found[key].value < 1.2 * dry[key].value, key
    given_off = next(f for f in found["receipt.flash"].facts if f.label.startswith("vapour fraction by moles, isothermal"))
    assert given_off.value == 0.0
