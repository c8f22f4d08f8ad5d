"""What the vents of each case add up to. A number that is not given stays NaN."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np


@dataclass(frozen=True)
class VentSums:
    """Sums over the vents in service, arrays (n,).

    out, into: capacity at rating pressure [m3/s of normal air]; out_less, into_less:
    the same with the largest vent in service taken out; rated_over, rated_under: the
    highest rating pressure and vacuum [Pa]; set_over, set_under: the highest settings
    [Pa]; over_reached: setting plus accumulation, the pressure at which the
    rated capacity is reached, never below the setting [Pa]; under_reached likewise; given: vents are listed;
    rated_out_known, rated_in_known: every vent in service has a rating pressure.
    """

    out: np.ndarray
    into: np.ndarray
    out_less: np.ndarray
    into_less: np.ndarray
    set_over: np.ndarray
    set_under: np.ndarray
    over_reached: np.ndarray
    under_reached: np.ndarray
    given: np.ndarray
    rated_out_known: np.ndarray
    rated_in_known: np.ndarray


def _number(value) -> float:
    return np.nan if value is None else float(value)


def _sum(groups, rated: str) -> tuple[float, float]:
    """Capacity of the vents in service, and without the largest of them."""
    in_service = [(max(v.count - v.out_of_service, 0), _number(getattr(v, rated))) for v in groups]
    in_service = [(count, each) for count, each in in_service if count]
    total = sum(count * each for count, each in in_service)
    largest = max((each for _, each in in_service), default=0.0)
    return total, total - largest


def _highest(groups, name: str) -> float:
    values = [_number(getattr(v, name)) for v in groups if v.count > v.out_of_service]
    return max(values) if values and not np.isnan(values).any() else np.nan


def vent_sums(cases) -> VentSums:
    """Vent sums of every case."""
    rows = []
    for case in cases:
        groups = case.tank.vents
        working = [v for v in groups if v.count > v.out_of_service]
        out, out_less = _sum(groups, "rated_out")
        into, into_less = _sum(groups, "rated_in")
        set_over, set_under = _highest(groups, "set_above"), _highest(groups, "set_below")
        over, under = _highest(groups, "rated_out_at"), _highest(groups, "rated_in_at")
        rows.append((
            out, into, out_less, into_less, set_over, set_under,
            np.fmax(over, set_over) if not np.isnan(over) else np.nan,
            np.fmax(under, set_under) if not np.isnan(under) else np.nan,
            bool(groups),
            all(v.rated_out_at is not None for v in working),
            all(v.rated_in_at is not None for v in working),
        ))  # fmt: skip
    columns = [np.array(column) for column in zip(*rows)]
    return VentSums(*columns)
