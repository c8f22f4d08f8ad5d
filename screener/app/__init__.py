"""Floor 11: the terminal screens. Importing this folder loads nothing."""

from __future__ import annotations

__all__ = ["run"]


def run(path: str | None = None, glyphs: str = "braille") -> int:
    """Open the screens, on a case if one is named; the exit code.

    glyphs is braille, block or ascii (ValueError otherwise).
    """
    from screener.app.engine import real
    from screener.app.glyphs import glyphs as marks
    from screener.app.screens_app import ScreenerApp

    app = ScreenerApp(real(), marks(glyphs), path)
    result = app.run()
    return int(result or app.return_code or 0)
