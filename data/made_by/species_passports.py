"""Passports of the species tables, and the atoms of the groups. Written by species.py, beside this file."""

from __future__ import annotations

ATOMS = {  # subgroup of modified UNIFAC (Dortmund) -> atoms C, H, O, read off the group's formula
    1: (1, 3, 0), 2: (1, 2, 0), 3: (1, 1, 0), 4: (1, 0, 0),
    5: (2, 3, 0), 6: (2, 2, 0), 7: (2, 2, 0), 8: (2, 1, 0), 70: (2, 0, 0),
    9: (1, 1, 0), 10: (1, 0, 0), 11: (2, 3, 0), 12: (2, 2, 0), 13: (2, 1, 0),
    14: (0, 1, 1), 81: (0, 1, 1), 82: (0, 1, 1), 15: (1, 4, 1), 16: (0, 2, 1),
    18: (2, 3, 1), 19: (2, 2, 1), 21: (2, 3, 2), 22: (2, 2, 2), 77: (1, 0, 2),
    24: (1, 3, 1), 25: (1, 2, 1), 26: (1, 1, 1), 83: (2, 4, 1),
    78: (1, 2, 0), 79: (1, 1, 0), 80: (1, 0, 0),
}  # fmt: skip


def write_all(data, rows) -> None:
    """Write the passports."""
