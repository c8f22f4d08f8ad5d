"""What would restore room of the receipt, applied to the case."""

from __future__ import annotations

from dataclasses import replace

import pytest

from screener.blends import Blend
from screener.screening import screen
from screener.states.case import Receipt
from tests.screening.sample import LIGHT, ZERO, blend, case, line, tank

WARM = ZERO + 63.0  # the receipt's range ends between the limit and the gap asked for
BARE = tank(contents=None)


def arriving(gas: str, T: float = WARM, of: Blend | None = None):
    made = case(blend=of or blend(LIGHT), tank=BARE, line=line(receipt=Receipt(0.10, T, gas, ZERO + 15.0)))
    return next(f for f in screen(made).findings if f.id == "receipt.flash")


@pytest.fixture(scope="module")
def dry():
    return arriving("none")


def test_a_colder_receipt_or_less_of_its_lightest_gives_room_again(dry):
    assert dry.verdict == "near"
    colder, less = dry.headroom
    assert arriving("none", colder.value - 0.01).verdict == "room"
    moles = dict(zip(blend(LIGHT).names, blend(LIGHT).moles))
    name = less.knob.removeprefix("share of ")
    moles[name] = 0.999 * less.value / (1.0 - 0.999 * less.value) * (1.0 - moles[name])
    total = sum(moles.values())
    after = replace(blend(LIGHT), moles=tuple(n / total for n in moles.values()))
    assert arriving("none", of=after).verdict == "room"


def test_no_knob_is_said_to_give_room_while_dissolved_air_comes_out(dry):
    """A cap stands above the numbers: the same receipt, as cold as was asked of it without air, is still near."""
    airy = arriving("air-saturated")
    assert airy.verdict == "near" and airy.headroom == ()
    assert arriving("air-saturated", dry.headroom[0].value - 0.01).verdict == "near"
