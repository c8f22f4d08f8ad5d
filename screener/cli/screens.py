"""`screener open`, and `screener` alone: the terminal screens."""

from __future__ import annotations

from importlib import import_module

from screener.cli import streams
from screener.cli.wording import say
from screener.ground.errors import InputError


def open_screens(arguments) -> int:
    """Hand over to the screens, on a case if one is named; without a terminal they would wait for ever."""
    if not streams.interactive():
        raise InputError("", None, say("faults", "no_terminal"), say("faults", "no_terminal_hint"))
    wanted = {"glyphs": arguments.glyphs} if arguments.glyphs else {}
    return import_module("screener.app").run(arguments.case, **wanted) or 0
