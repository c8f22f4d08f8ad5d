"""Screener: may this blend go into that tank, this month, through that line?

The public face is small: `screen` turns a case into findings. The libraries
behind it live in the floors (`screener.equilibrium`, `screener.blends`,
`screener.volatility`, `screener.casefile`).
"""

from __future__ import annotations

__version__ = "0.1.0"
__all__ = ["__version__", "screen"]


def __getattr__(name: str):
    if name == "screen":
        from screener.screening import screen

        return screen
    raise AttributeError(f"module 'screener' has no attribute {name!r}")
