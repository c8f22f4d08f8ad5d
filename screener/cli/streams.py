"""The only module that writes: results to stdout, diagnostics to stderr."""

from __future__ import annotations

import os
import sys


def ready() -> None:
    """A terminal that lacks a character shows its escape instead of stopping the program."""
    for stream in (sys.stdout, sys.stderr):
        if hasattr(stream, "reconfigure"):
            stream.reconfigure(errors="backslashreplace")


def result(text: str) -> None:
    """Text of a result, with its line end."""
    sys.stdout.write(text if text.endswith("\n") else text + "\n")


def say(text: str) -> None:
    """A message to the person at the terminal."""
    sys.stderr.write(text + "\n")


def finish() -> None:
    """Hand over what is still buffered; a closed pipe shows here."""
    sys.stdout.flush()


def abandon() -> None:
    """The reader has gone: throw the rest away quietly, also what Python flushes at exit."""
    nowhere = os.open(os.devnull, os.O_WRONLY)
    os.dup2(nowhere, sys.stdout.fileno())


def watched() -> bool:
    """Whether somebody watches stderr."""
    return sys.stderr.isatty()


def interactive() -> bool:
    """Whether a person sits at both ends: keys come in, the screens are drawn on stderr."""
    return sys.stdin is not None and sys.stdin.isatty() and sys.stderr.isatty()


def progress(text: str) -> None:
    """One line that the next one overwrites; nothing unless somebody watches."""
    if watched():
        sys.stderr.write(f"\r\x1b[K{text}")
        sys.stderr.flush()


def terminal_width(default: int = 100) -> int:
    """Columns of the terminal, or the default where there is none."""
    if not sys.stdout.isatty():
        return default
    try:
        return max(20, os.get_terminal_size(sys.stdout.fileno()).columns)
    except OSError:
        return default
