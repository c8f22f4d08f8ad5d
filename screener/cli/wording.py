"""Wording of the command line, kept in data/words/cli.toml."""

from __future__ import annotations

from screener.ground.wording import Words

_WORDS = Words("words/cli.toml")
say = _WORDS.say
columns = _WORDS.lines
