"""Sentences of findings; the words themselves lie in data/words/findings.toml."""

from __future__ import annotations

from screener.ground.wording import Words

_WORDS = Words("words/findings.toml")
say = _WORDS.say


def lines(group: str, key: str) -> tuple[str, ...]:
    """A list of phrases; empty when the group has none for this key."""
    return tuple(_WORDS.table(group).get(key, ()))
