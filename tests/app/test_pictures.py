"""Gap bars: where the post stands, what each verdict looks like, and that rounding never flatters."""

from __future__ import annotations

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from screener.app.glyphs import glyphs
from screener.app.pictures import Gap, bar, cells, gap_bars, tally
from screener.app.rows import row_width, text_of

BRAILLE, ASCII = glyphs("braille"), glyphs("ascii")
POST = 31  # of a bar 40 columns wide: 0.77 of the width


def made(verdict="room", used=0.5, low=None, high=None, title="Boiling at the liquid surface", margin="+4.4 kPa"):
    marks = {"room": ".", "near": "~", "beyond": "!", "unknown": "?", "skipped": "-"}
    return Gap(verdict, marks[verdict], title, used, low, high, margin, "at most 97.8 kPa, L1")


GAPS = [
    made("beyond", 1.05, 0.95, 1.2, "Net positive suction head", "-0.80 m"),
    made("beyond", 2.4, 2.0, 3.0, "True vapour pressure, highest monthly mean", "-67.9 kPa"),
    made("unknown", None, None, None, "Vents, breathing in", "not known"),
    made("near", 0.96, 0.9, 1.02, "Vapour pressure at the hottest surface", "+3.5 kPa"),
    made("near", 0.99, 0.98, 0.999, "Vents, breathing out", "+997 Nm3/h air"),
    made("room", 0.4, 0.3, 0.5),
    made("room", -0.4, -0.5, -0.3, "Suction line above the bubble point", "+28 kPa"),
    made("skipped", None, None, None, "Floating roof", "does not apply"),
]


def drawn(gap, width=40, marks=BRAILLE):
    return text_of(bar(gap, width, marks))


@settings(max_examples=200, deadline=None)
@given(st.floats(-2, 5), st.integers(8, 120))
def test_rounding_never_carries_a_value_over_the_post(used, width):
    post = round(width * 0.77)
    filled = cells(used, post, 10 * width)
    assert filled <= post if used < 1.0 else filled >= post + 2


@settings(max_examples=100, deadline=None)
@given(st.floats(-1, 3), st.floats(0, 1), st.floats(0, 1), st.integers(14, 100))
def test_every_bar_is_as_wide_as_asked_and_keeps_its_post(used, below, above, width):
    gap = made("near" if used < 1 else "beyond", used, used - below, used + above)
    line = drawn(gap, width)
    assert len(line) == width
    assert line[round(width * 0.77)] in "┃╂"


def test_the_post_changes_only_where_the_range_crosses_it():
    assert drawn(made("near", 0.95, 0.9, 1.05))[POST] == "╂"
    assert drawn(made("beyond", 1.05, 0.95, 1.2))[POST] == "╂"
    assert drawn(made("room", 0.5, 0.4, 0.6))[POST] == "┃"
    assert drawn(made("beyond", 1.5, 1.4, 1.6))[POST] == "┃"  # the whole range is on the wrong side


def test_a_value_on_the_limit_itself_shows_beyond_it():
    assert drawn(made("beyond", 1.0))[POST + 1] == "█"


def test_length_is_the_room_used():
    assert drawn(made("room", 0.5)).count("█") == 16  # half of 31 columns
    assert drawn(made("room", 0.25)).count("█") == 8


def test_the_range_is_a_hatched_end_and_a_thin_line():
    line = drawn(made("room", 0.5, 0.4, 0.6))
    assert line[:19] == "█" * 12 + "▓" * 4 + "──┤"


def test_a_bar_that_leaves_the_picture_says_so():
    assert drawn(made("beyond", 2.4, 2.0, 3.0))[-1] == "▶"
    assert drawn(made("room", -0.4))[0] == "◀"


@pytest.mark.parametrize(("verdict", "mark"), [("unknown", "?"), ("skipped", "·")])
def test_an_empty_bar_never_looks_like_a_good_one(verdict, mark):
    line = drawn(made(verdict, None))
    assert line.count(mark) == 8
    assert set(line[:POST]) == {mark, " "}
    assert "█" not in line


def test_an_unknown_finding_with_a_number_still_shows_question_marks():
    assert "█" not in drawn(made("unknown", 0.3, 0.2, 0.4))


def test_a_finding_without_a_scale_says_so():
    assert drawn(made("near", None)).startswith("no scale")


@pytest.mark.parametrize("width", range(60, 161, 5))
def test_all_rows_share_one_post_and_no_text_is_cut(width):
    heading, blocks = gap_bars(GAPS, width, BRAILLE)
    posts = set()
    for gap, block in zip(GAPS, blocks, strict=True):
        assert all(row_width(row) <= width for row in block)
        first = text_of(block[0])
        posts |= {place for place, mark in enumerate(first) if mark in "┃╂"}
        title = " ".join(text_of(row)[10:].split("  ")[0].strip() for row in block)
        assert " ".join(title.split()) == gap.title
        letters = "".join(text_of(row) for row in block)
        for word in gap.margin.split():
            assert word in letters
    assert len(posts) == 1
    assert row_width(heading) <= width


def test_a_window_too_narrow_for_bars_keeps_the_words():
    _, blocks = gap_bars(GAPS, 39, BRAILLE)
    rows = [text_of(row) for block in blocks for row in block]
    assert max(map(len, rows)) <= 39 and not set("".join(rows)) & set("█┃╂")


def test_margins_end_in_one_column():
    _, blocks = gap_bars(GAPS, 100, BRAILLE)
    ends = {len(text_of(block[0]).rstrip()) for block in blocks}
    assert ends == {100}


def test_the_limit_stands_beside_the_bars_where_there_is_room():
    heading, blocks = gap_bars(GAPS, 150, BRAILLE)
    assert text_of(heading).endswith("limit, source")
    assert text_of(blocks[0][0]).endswith("at most 97.8 kPa, L1")
    assert "97.8" not in text_of(gap_bars(GAPS, 80, BRAILLE)[1][0][0])


def test_ascii_is_ascii():
    heading, blocks = gap_bars([*GAPS, made(title="35 °C · x³")], 100, ASCII)
    letters = text_of(heading) + "".join(text_of(row) for block in blocks for row in block)
    assert letters.isascii()


def test_the_strip_counts_unknown_before_near():
    counted = [span.text for span in tally([gap.verdict for gap in GAPS], BRAILLE)]
    assert counted == ["! 2 beyond", "? 1 unknown", "~ 2 near", "· 2 room", "- 1 skipped"]


def test_tones_only_repeat_the_verdict():
    _, blocks = gap_bars(GAPS, 100, BRAILLE)
    for gap, block in zip(GAPS, blocks, strict=True):
        tones = {span.tone for row in block for span in row} - {"", "dim", "bold"}
        assert tones <= {gap.verdict}


def test_an_unknown_set_of_marks_is_refused():
    with pytest.raises(ValueError, match="known are braille, block, ascii"):
        glyphs("fancy")
