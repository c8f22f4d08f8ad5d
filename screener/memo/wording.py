"""The memo's fixed wording, kept in data/words/memo.toml."""

from __future__ import annotations

from screener.ground.wording import Words

_WORDS = Words("words/memo.toml")
words = _WORDS.at
fill = _WORDS.say
