"""Free text about paint: what it names, what it leaves open."""

import pytest

from screener.tank.paint import CONDITIONS, absorptance, paint_table

CASES = [
    # text, row, condition, low, best, high
    ("white paint, some years old", "white", "average", 0.17, 0.25, 0.34),
    ("white, new", "white", "new", 0.17, 0.17, 0.25),
    ("White", "white", "", 0.17, 0.25, 0.34),
    ("old white paint", "white", "aged", 0.25, 0.34, 0.34),
    ("white paint, 8 years old", "white", "average", 0.17, 0.25, 0.34),
    ("dirty, rusty white", "white", "aged", 0.25, 0.34, 0.34),
    ("light gray, weathered", "grey light", "average", 0.54, 0.58, 0.63),
    ("grey", "grey light / grey medium", "", 0.54, 0.645, 0.74),
    ("dark grey", "grey medium / black", "", 0.68, 0.84, 0.97),
    ("aluminum, specular, poor", "aluminium specular", "aged", 0.44, 0.49, 0.49),
    ("unpainted aluminium roof", "aluminium mill finish", "", 0.10, 0.12, 0.15),
    ("aluminium paint", "aluminium specular / aluminium diffuse", "", 0.39, 0.54, 0.68),
    ("off-white", "beige or cream", "", 0.35, 0.42, 0.49),
    ("red primer", "red primer", "", 0.89, 0.90, 0.91),
    ("white roof, dark green shell", "white / green dark", "", 0.17, 0.575, 0.91),
    ("black", "black", "", 0.97, 0.97, 0.97),
]


@pytest.mark.parametrize("text, row, condition, low, best, high", CASES)
def test_text(text, row, condition, low, best, high):
    got = absorptance(text)
    assert (got.row, got.condition) == (row, condition)
    assert (got.low, got.best, got.high) == pytest.approx((low, best, high), abs=1e-12)
    assert got.known
    # What the text leaves open is said in the note.
    assert bool(got.note) == (not condition or "/" in row)


@pytest.mark.parametrize(
    "text", ["", None, "blue", "striped", "light green", "painted some years ago", "standard finish"]
)
def test_a_text_without_a_colour_spans_the_table_and_says_so(text):
    got = absorptance(text)
    assert not got.known and (got.low, got.high) == (0.10, 0.97) and "whole table" in got.note
    assert got.evidence == "common practice"


@pytest.mark.parametrize(
    "text, value",
    [
        ("absorptance 0.3", 0.3),
        ("solar absorptance: 0.62", 0.62),
        ("reflectance 70 %", 0.3),
        ("reflectivity = 0.8", 0.2),
    ],
)
def test_a_stated_number_is_taken_as_given(text, value):
    got = absorptance(text)
    assert (got.low, got.best, got.high) == pytest.approx((value,) * 3, abs=1e-12)
    assert got.evidence == "user"


def test_a_number_that_cannot_be_is_not_taken():
    assert absorptance("absorptance 3, white").row == "white"


def test_evidence_follows_the_column():
    assert absorptance("white, new").evidence == "law"
    assert absorptance("white").evidence == "memory"
    assert absorptance("white, aged").evidence == "law"
    assert absorptance("rust colour, aged").evidence == "memory"


def test_every_row_is_found_by_its_own_name():
    for name in paint_table():
        if name == "beige or cream":
            assert absorptance("beige").row == absorptance("cream").row == name
        else:
            assert absorptance(name).row == name
        for condition in CONDITIONS:
            got = absorptance(f"{name.split(' or ')[0]}, {condition}")
            assert got.low <= got.best <= got.high
            assert got.best == getattr(paint_table()[name], condition)
