"""Case files: text with units in, a `Case` in SI out, and back.

The only floor that knows units. Importing it loads neither pint nor NumPy;
both come in when the first quantity or the first case is read. Rows count
from 0 in every path: `tank.vents[0].set`.
"""

from screener.casefile.case_text import CaseText
from screener.casefile.json_schema import help_text, schema
from screener.casefile.keys import Key, all_keys, key_at
from screener.casefile.live import check_text
from screener.casefile.read import read_case, write_case
from screener.casefile.sheet_file import read_sheet_file
from screener.casefile.starting import template
from screener.casefile.units import kinds, quantity, show, shown
from screener.casefile.values import Tables

__all__ = [
    "CaseText",
    "Key",
    "Tables",
    "all_keys",
    "check_text",
    "help_text",
    "key_at",
    "kinds",
    "quantity",
    "read_case",
    "read_sheet_file",
    "schema",
    "show",
    "shown",
    "template",
    "write_case",
]
