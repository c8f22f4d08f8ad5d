"""Criteria: what is judged, on which scale, with which gap asked for."""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache

from screener.ground.errors import DataError
from screener.ground.files import read_toml

_FILE = "criteria/criteria.toml"


@dataclass(frozen=True)
class Criterion:
    """One row of data/criteria/criteria.toml.

    asked_gap is a share of the limit (scale percent) or of the distance from
    the reference (scale from-atmosphere), or kelvin (scale kelvin);
    asked_gap_least is a smallest gap in the criterion's own unit.
    """

    id: str
    title: str
    quantity: str
    unit: str
    kind: str
    scale: str
    limit: str
    reference: str
    asked_gap: float
    evidence: str
    source: str
    source_keys: tuple[str, ...]
    basis: str
    asked_gap_least: float = 0.0

    def gap(self, limit: float) -> float:
        """Gap asked for beside this limit, in the criterion's unit."""
        if self.scale == "kelvin":
            return max(self.asked_gap, self.asked_gap_least)
        return max(self.asked_gap * abs(limit), self.asked_gap_least)


@lru_cache(maxsize=1)
def criteria() -> dict[str, Criterion]:
    """All criteria by id.

    Raises DataError when a row lacks a field, or puts a percentage on a
    temperature (a kelvin scale has no natural zero to take a share of).
    """
    rows = {}
    for key, row in read_toml(_FILE).items():
        try:
            criterion = Criterion(id=key, **{**row, "source_keys": tuple(row["source_keys"])})
        except (TypeError, KeyError) as error:
            raise DataError(_FILE, None, f"{key}: {error}") from error
        if criterion.scale == "percent" and criterion.unit in ("K", "degC"):
            raise DataError(_FILE, None, f"{key}: a percentage on a temperature means nothing")
        rows[key] = criterion
    return rows


def criterion(key: str) -> Criterion:
    """One criterion; DataError when the id is not in the table."""
    try:
        return criteria()[key]
    except KeyError:
        raise DataError(_FILE, None, f"no criterion has the id {key}") from None
