"""Parts of a blend typed on one line: what is read, and what is refused with its reason."""

from __future__ import annotations

import re

import pytest

from screener.cli.quick import read_parts
from screener.ground.errors import CaseErrors, InputError


@pytest.mark.parametrize(
    ("text", "parts"),
    [
        (
            "85% stock:summer gasoline base + 15% ethanol",
            {"stock:summer gasoline base": 0.85, "ethanol": 0.15},
        ),
        (
            "85 % stock:light naphtha+15 %species:ethanol",
            {"stock:light naphtha": 0.85, "species:ethanol": 0.15},
        ),
        ("12,5% ethanol + 87.5% 2,2,4-trimethylpentane", {"ethanol": 0.125, "2,2,4-trimethylpentane": 0.875}),
        ("100% n-butane", {"n-butane": 1.0}),
        ("n-butane", {"n-butane": 1.0}),
        ("stock:jet kerosene", {"stock:jet kerosene": 1.0}),
        ("33.3% a + 33.3% b + 33.35% c", {"a": 0.333, "b": 0.333, "c": 0.3335}),
    ],
)
def test_parts_are_read(text, parts):
    assert read_parts(text) == pytest.approx(parts, rel=1e-12)  # rounding of one division


@pytest.mark.parametrize(
    ("text", "said"),
    [
        ("", "no blend given"),
        (" + ", "no blend given"),
        ("85% a + 10% b", "the shares come to 95 %; they must come to 100 % within 0.05"),
        ("85% a + 15.06% b", "the shares come to 100.06 %"),
        ("0% a + 100% b", "blend part 1: 0 % is not a share"),
        ("120% a", "120 % is not a share"),
        ("-5% a + 105% b", "'-5% a' is not a part of a blend"),
        ("a + b", "'a' is not a part of a blend"),
        ("85% + 15% b", "'85%' is not a part of a blend"),
        ("50% a + 50% a", "a stands in the blend twice"),
        ("a 85% + 15% b", "'a 85%' is not a part of a blend"),
    ],
)
def test_what_cannot_be_read_is_refused(text, said):
    with pytest.raises(InputError, match=re.escape(said)):
        read_parts(text)


def test_every_fault_is_listed():
    with pytest.raises(CaseErrors, match="part 1(.|\n)*part 3") as caught:
        read_parts("x + 50% a + 200% b")
    assert len(caught.value.faults) == 2
