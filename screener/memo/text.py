"""User text made harmless before it is printed anywhere."""

from __future__ import annotations

import unicodedata

# Control, format (bidirectional marks, zero-width), surrogate and private-use characters: none has
# a place in a title, and some rewrite a terminal or reorder a line.
_DROPPED = frozenset({"Cc", "Cf", "Cs", "Co"})


def plain(text: object) -> str:
    """Text on one line: control and invisible characters dropped, runs of space made one."""
    spaced = " ".join(str(text).split())
    return "".join(char for char in spaced if unicodedata.category(char) not in _DROPPED)


def columns_of(text: str) -> int:
    """Columns a text takes in a fixed-width font."""
    if text.isascii():
        return len(text)
    wide = sum(unicodedata.east_asian_width(char) in "WF" for char in text)
    return len(text) + wide - sum(unicodedata.combining(char) > 0 for char in text)


def plain_lines(text: str) -> str:
    """Text of several lines, each kept with its spaces, without control and invisible characters."""
    lines = (line.expandtabs(4) for line in text.splitlines())
    return "\n".join(
        "".join(char for char in line if unicodedata.category(char) not in _DROPPED).rstrip()
        for line in lines
    )
