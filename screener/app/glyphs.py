"""Three sets of marks, so that the screen reads on any terminal.

`braille` draws curves with 2 x 4 dots in a cell, `block` with half blocks,
`ascii` with nothing beyond the typewriter. `plain` turns every mark that a
sentence may hold (degree, superscript, middle dot, arrow) into ascii.
"""

from __future__ import annotations

from dataclasses import dataclass

NAMES = ("braille", "block", "ascii")


@dataclass(frozen=True)
class Glyphs:
    """Marks used by the pictures and tables; each is one column wide."""

    name: str
    fill: str  # room used
    fill_range: str  # from the low end of the range to the best value
    thin: str  # from the best value to the high end
    thin_end: str
    post: str
    post_crossed: str  # the range reaches from one side of the limit to the other
    more_right: str  # the bar goes on past the edge of the picture
    more_left: str
    unknown: str
    skipped: str
    edge: str  # dotted edge of a range
    dash: str  # dashed line of a limit
    axis: str
    axis_tick: str
    axis_corner: str
    axis_line: str
    axis_line_tick: str
    cursor: str
    rule: str
    dots: str  # how curves are drawn: braille, half or star
    room: str  # mark of the verdict 'room'

    def plain(self, text: str) -> str:
        """The text itself, or its ascii spelling in the ascii set."""
        return text.translate(_ASCII) if self.name == "ascii" else text


_ASCII = str.maketrans(
    {
        "·": ".", "°": "", "³": "3", "²": "2", "→": "->", "↑": "^", "↓": "v", "←": "<-", "⏎": "enter",
        "▏": "|", "–": "-", "—": "-", "±": "+-", "≥": ">=", "≤": "<=", "−": "-", "×": "x", "…": "...",
        "’": "'", "“": '"', "”": '"', "▸": ">", "µ": "u", "Δ": "d", "\u202f": " ", "\u00a0": " ",
    }
)  # fmt: skip

_BOX = {
    "fill": "█", "fill_range": "▓", "thin": "─", "thin_end": "┤", "post": "┃", "post_crossed": "╂",
    "more_right": "▶", "more_left": "◀", "unknown": "?", "skipped": "·", "edge": "┊", "dash": "╌", "axis": "│",
    "axis_tick": "┤", "axis_corner": "└", "axis_line": "─", "axis_line_tick": "┬", "cursor": "▸", "rule": "─",
    "room": "·",
}  # fmt: skip

_SETS = {
    "braille": Glyphs(name="braille", dots="braille", **_BOX),
    "block": Glyphs(name="block", dots="half", **_BOX),
    "ascii": Glyphs(
        name="ascii", fill="#", fill_range="%", thin="-", thin_end="|", post="|", post_crossed="+", more_right=">",
        more_left="<", unknown="?", skipped=".", edge=":", dash="-", axis="|", axis_tick="|", axis_corner="+",
        axis_line="-", axis_line_tick="+", cursor=">", rule="-", dots="star", room=".",
    ),
}  # fmt: skip


def glyphs(name: str) -> Glyphs:
    """A set by name; ValueError with the known names otherwise."""
    try:
        return _SETS[name]
    except KeyError:
        raise ValueError(f"--glyphs {name}: known are {', '.join(NAMES)}") from None
