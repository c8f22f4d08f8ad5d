"""Colours: at most four, each repeating what a word and a mark already say.

Near, beyond and unknown were searched for contrast of at least 4.6 to 1 on
their ground and for distance under normal, protan, deutan and tritan sight.
Room is plain text, skipped is dim.
"""

from __future__ import annotations

from textual.theme import Theme

_DARK = {"near": "#EAB426", "beyond": "#ED4A71", "unknown": "#03A2E5", "ground": "#101214", "band": "#22303A", "field": "#2A2F33"}
_LIGHT = {"near": "#462B01", "beyond": "#893543", "unknown": "#085178", "ground": "#F6F4EF", "band": "#DDE6EA", "field": "#E4E0D6"}
# Without colour only reverse, bold and dim are left to tell things apart.
_PLAIN = {
    **dict.fromkeys(("near", "beyond", "unknown", "ground", "band", "field"), "ansi_default"),
    **dict.fromkeys(("ansi-background", "ansi-foreground", "border-blurred"), "ansi_default"),
    **dict.fromkeys(("input-cursor-background", "input-cursor-foreground"), "ansi_default"),
    **dict.fromkeys(("input-selection-background", "input-selection-foreground"), "ansi_default"),
    **dict.fromkeys(("block-cursor-background", "block-cursor-foreground"), "ansi_default"),
    **dict.fromkeys(("screen-selection-background", "screen-selection-foreground"), "ansi_default"),
    "input-cursor-text-style": "reverse",
    "block-cursor-text-style": "reverse",
}


def _theme(name: str, colours: dict[str, str], foreground: str, *, dark: bool, ansi: bool = False) -> Theme:
    ground = colours["ground"]
    return Theme(
        name=name,
        primary=foreground,
        secondary=foreground,
        accent=colours["unknown"],
        warning=colours["near"],
        error=colours["beyond"],
        success=foreground,
        foreground=foreground,
        background=ground,
        surface=ground,
        panel=colours["field"],
        dark=dark,
        ansi=ansi,
        variables=colours,
    )


DARK = _theme("screener-dark", _DARK, "#E6E4DF", dark=True)
LIGHT = _theme("screener-light", _LIGHT, "#1B1D1F", dark=False)
PLAIN = _theme("screener-plain", _PLAIN, "ansi_default", dark=True, ansi=True)
THEMES = (DARK, LIGHT, PLAIN)
