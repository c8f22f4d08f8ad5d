"""Case files: text with units in, a `Case` in SI out, and back.

The only floor that knows units. Importing it loads neither pint nor NumPy;
both come in when the first quantity or the first case is read.
"""

from screener.casefile.units import kinds, quantity, show, shown

__all__ = ["kinds", "quantity", "show", "shown"]
