"""The curve picture: scale, band, limits and labels, in all three sets of marks."""

from __future__ import annotations

import math

import pytest

from screener.app.curve import Line, Plot, draw, nice_step, ticks
from screener.app.glyphs import NAMES, glyphs
from screener.app.rows import row_width, text_of

XS = [-10 + i for i in range(71)]
STEEP = [60 * math.exp((x - 38) / 30) for x in XS]


def plot(**changes):
    fields = {
        "title": "bubble pressure, kPa, against temperature, degC",
        "lines": (Line("receipt", XS, STEEP), Line("heel", XS, [0.6 * y for y in STEEP], "dashed")),
        "x_range": (-10.0, 60.0),
        "y_range": (0.0, 120.0),
        "band": (-4.0, 38.0, "ambient, design"),
        "limits": ((97.5, "L1"), (76.0, "L2")),
    }
    return Plot(**(fields | changes))


def shown(picture, width=80, height=16, name="braille"):
    return [text_of(row) for row in draw(picture, width, height, glyphs(name))]


@pytest.mark.parametrize("name", NAMES)
@pytest.mark.parametrize(("width", "height"), [(40, 8), (80, 12), (140, 30)])
def test_the_picture_has_the_size_asked_for(name, width, height):
    rows = draw(plot(), width, height, glyphs(name))
    assert len(rows) == height
    assert max(row_width(row) for row in rows) <= width


def test_a_straight_line_lies_where_the_axes_say():
    line = Line("", [0.0, 10.0], [0.0, 10.0])
    picture = plot(title="x", lines=(line,), x_range=(0.0, 10.0), y_range=(0.0, 10.0), band=None, limits=())
    rows = shown(picture, 44, 23, "ascii")
    body = [row[4:] for row in rows[1:-2]]  # 20 rows of 40 columns
    assert body[0].rstrip().endswith("*") and body[0].rstrip(" *") == ""
    for i, row in enumerate(body):
        middle = (row.index("*") + row.rindex("*")) / 2
        assert middle == pytest.approx(39 * (1 - i / 19), abs=1.6)  # half a cell high, and the cells it joins


def test_the_band_stays_whole_behind_the_curves():
    rows = draw(plot(), 80, 16, glyphs("braille"))
    for row in rows[1:-2]:
        cells = [span.tone for span in row for _ in span.text]
        banded = [place for place, tone in enumerate(cells) if "band" in tone]
        assert banded == list(range(banded[0], banded[-1] + 1))
        assert len(banded) == 46  # 42 of 70 degrees of 76 columns, both ends counted


def test_the_edges_of_the_band_are_dotted_for_screens_without_colour():
    assert all(row.count("┊") >= 1 for row in shown(plot())[1:-2])


def test_limits_are_dashed_and_carry_their_number():
    rows = shown(plot())
    assert sum("╌ L1 ╌" in row for row in rows) == 1
    assert sum("╌ L2 ╌" in row for row in rows) == 1


def test_a_curve_along_a_limit_does_not_hide_its_number():
    flat = Line("", XS, [97.5 if x < 10 else 10.0 for x in XS])
    row = next(row for row in shown(plot(lines=(flat,))) if " L1 " in row)
    assert row.index(" L1 ") > 20, "the curve takes the left end of the dashed line"


def test_labels_stand_beside_their_lines():
    text = "\n".join(shown(plot()))
    assert "receipt" in text and "heel" in text and "ambient, design" in text


def test_lines_differ_without_colour():
    one = plot(lines=(Line("", XS, STEEP),), band=None, limits=())
    two = plot(lines=(Line("", XS, STEEP, "dashed"),), band=None, limits=())
    dots = [sum(mark > "\u2800" for row in shown(p) for mark in row) for p in (one, two)]
    assert dots[1] < 0.8 * dots[0]  # of 11 dots of a dashed line 5 are left out


def test_a_gap_in_the_data_is_a_gap_in_the_line():
    y = [None if 0 <= x <= 20 else value for x, value in zip(XS, STEEP, strict=True)]
    flat = Line("", XS[:10] + XS[31:], [10.0] * 50)
    assert shown(plot(lines=(Line("", XS, y),)))  # None is no fault
    assert shown(plot(lines=(flat,)))


def test_ascii_is_ascii():
    assert "".join(shown(plot(title="°C"), name="ascii")).isascii()


def test_too_little_room_is_told():
    assert shown(plot(), 18, 5) == ["too little room for the curve"]


@pytest.mark.parametrize(("span", "most", "step"), [(100, 5, 20), (70, 8, 10), (1, 4, 0.5), (0.3, 3, 0.1), (150, 4, 50)])
def test_steps_are_round(span, most, step):
    assert nice_step(span, most) == pytest.approx(step)


def test_ticks_lie_inside_the_axis():
    assert ticks(-10.0, 60.0, 8) == pytest.approx([-10, 0, 10, 20, 30, 40, 50, 60])
    assert ticks(-7.0, 23.0, 4) == pytest.approx([0, 10, 20])
