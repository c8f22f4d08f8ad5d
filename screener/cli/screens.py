"""`screener open`, and `screener` alone: the terminal screens."""

from __future__ import annotations

from importlib import import_module


def open_screens(arguments) -> int:
    """Hand over to the screens, on a case if one is named."""
    return import_module("screener.app").run(arguments.case) or 0
