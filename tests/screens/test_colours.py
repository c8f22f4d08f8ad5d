"""Colour repeats what words and marks say: at most four, and none needed."""

from __future__ import annotations

import pytest
from textual.color import Color

from screener.app.theme import DARK, LIGHT
from tests.screens.driving import grid, opened, pressed


def contrast(one: str, other: str) -> float:
    """Contrast ratio of two colours, WCAG 2.2 definition of relative luminance."""

    def luminance(colour: str) -> float:
        parts = (part / 255 for part in Color.parse(colour).rgb)
        r, g, b = (part / 12.92 if part <= 0.04045 else ((part + 0.055) / 1.055) ** 2.4 for part in parts)
        return 0.2126 * r + 0.7152 * g + 0.0722 * b

    high, low = sorted((luminance(one), luminance(other)), reverse=True)
    return (high + 0.05) / (low + 0.05)


@pytest.mark.parametrize("theme", [DARK, LIGHT], ids=["dark", "light"])
@pytest.mark.parametrize("name", ["near", "beyond", "unknown"])
@pytest.mark.parametrize("ground", ["ground", "band", "field"])
def test_verdict_colours_stand_out_from_their_ground(theme, name, ground):
    wanted = 4.5  # WCAG 2.2 SC 1.4.3, normal text
    assert contrast(theme.variables[name], theme.variables[ground]) >= (wanted if ground == "ground" else 3.0)


@pytest.mark.parametrize("size", [(80, 24), (140, 40)])
async def test_without_colour_the_same_words_are_there(case_file, size, monkeypatch):
    async with opened(case_file, size=size) as pilot:
        await pressed(pilot, "5")
        coloured = grid(pilot.app)
    monkeypatch.setenv("NO_COLOR", "1")
    async with opened(case_file, size=size) as pilot:
        await pressed(pilot, "5")
        assert grid(pilot.app) == coloured
        assert pilot.app.theme == "screener-plain"


def grey(colour) -> bool:
    """Whether a colour is white, black or between: its channels lie within a tenth of each other."""
    if colour.is_default or colour.triplet is None:
        return False
    return max(colour.triplet) - min(colour.triplet) <= 25


def colours_of(app) -> set[str]:
    """Foreground colours of everything on the screen; greys are no colours."""
    found = set()
    for line in app.screen._compositor.render_strips():
        for segment in line:
            if segment.style and segment.style.color and segment.text.strip() and not grey(segment.style.color):
                found.add(segment.style.color.name)
    return found


async def test_at_most_four_colours(case_file):
    async with opened(case_file, size=(140, 40)) as pilot:
        seen = set()
        for step in "123456":
            await pressed(pilot, step)
            seen |= colours_of(pilot.app)
        assert {DARK.variables[name].lower() for name in ("near", "beyond", "unknown")} <= seen
        assert len(seen) <= 4, seen


async def test_without_colour_no_colour_is_sent(case_file, monkeypatch):
    monkeypatch.setenv("NO_COLOR", "1")
    async with opened(case_file) as pilot:
        await pressed(pilot, "5")
        for name in colours_of(pilot.app):
            assert name == "default"


def test_the_command_line_offers_the_marks_that_exist(monkeypatch):
    import screener.app
    from screener.app.glyphs import NAMES
    from screener.cli import main, streams
    from screener.cli.arguments import GLYPHS

    assert GLYPHS == NAMES
    opened_with = []
    monkeypatch.setattr(streams, "interactive", lambda: True)
    monkeypatch.setattr(screener.app, "run", lambda path, glyphs="braille": opened_with.append((path, glyphs)))
    assert main(["open", "a.toml", "--glyphs", "ascii"]) == 0
    assert main([]) == 0
    assert opened_with == [("a.toml", "ascii"), (None, "braille")]
