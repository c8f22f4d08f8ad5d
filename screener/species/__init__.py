"""Floor 1: species records, group tables and interaction parameters, each number with a source.

The only floor that opens the property tables (data/species, data/groups, data/pairs).
A missing value is an error, never a default.
"""

from screener.species.catalogue import Columns, columns, find, names, stand_in
from screener.species.forms import alpha
from screener.species.groups import group_tables
from screener.species.pairs import interactions, pair_terms
from screener.species.pseudo import cut
from screener.species.record import Curve, Limit, Species
from screener.species.water import WaterTargets, water_targets

__all__ = [
    "Columns",
    "Curve",
    "Limit",
    "Species",
    "WaterTargets",
    "alpha",
    "columns",
    "cut",
    "find",
    "find_live",
    "group_tables",
    "interactions",
    "names",
    "pair_terms",
    "stand_in",
    "water_targets",
]


def find_live(text: str) -> Species:
    """A species outside the table, fitted now from the property libraries; see `screener.species.live`."""
    from screener.species.live import find_live

    return find_live(text)
