"""Floor 10: the command line. Standard library only until a command runs."""

from __future__ import annotations

__all__ = ["main"]


def main(argv: list[str] | None = None) -> int:
    """Run the command line and give its exit code; argv without the program name, None for the real one."""
    from screener.cli.entry import run

    return run(argv)
