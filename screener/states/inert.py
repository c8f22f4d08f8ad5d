"""Limiting oxygen of the vapour over every liquid, with the weakest evidence it rests on."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.fire import Flammability, limiting_oxygen
from screener.states.lanes import Lanes

COUNTS_FROM = 0.01  # share of the fuel vapour from which a species counts, as in the table's own rule [-]
READ = "quoted"  # the mark of a value read in its source; any other is from memory or an estimate


@dataclass(frozen=True)
class OxygenLanes:
    """Lowest limiting oxygen in nitrogen over the span of temperatures.

    limit (n, 5) [-], NaN where a species that counts has none; species (n, 5) that sets it; read (n, 5)
    whether the values of all species that count were read in a source.
    """

    limit: np.ndarray
    species: np.ndarray
    read: np.ndarray


def oxygen_lanes(lanes: Lanes, y) -> OxygenLanes:
    """Limiting oxygen of the vapours y (n, 5, k, c) at k temperatures; only where oxygen or a blanket is given."""
    cases = lanes.inputs.cases
    asked = np.isfinite(lanes.inputs["vapour_space_oxygen"]) | np.array([c.tank.blanket is not None for c in cases])
    shape = y.shape[:2]
    limit, species, read = np.full(shape, np.nan), np.full(shape, "", dtype=object), np.zeros(shape, dtype=bool)
    if not asked.any():
        return OxygenLanes(limit, species, read)
    burns = Flammability.of(lanes.fluid).burns
    own = limiting_oxygen(lanes.fluid, np.eye(lanes.fluid.c))
    fuel = np.where(burns, y[asked], 0.0)
    with np.errstate(all="ignore"):
        counts = (fuel / fuel.sum(axis=-1, keepdims=True) >= COUNTS_FROM).any(axis=2)
    value = np.where(counts, own.oxygen, np.inf)
    lacking = (counts & ~np.isfinite(own.oxygen)).any(axis=-1) | ~counts.any(axis=-1)
    at = np.argmin(np.where(np.isnan(value), np.inf, value), axis=-1)
    limit[asked] = np.where(lacking, np.nan, own.oxygen[at])
    species[asked] = np.where(lacking, "", np.array(lanes.names, dtype=object)[at])
    read[asked] = (~counts | (own.evidence == READ)).all(axis=-1)
    return OxygenLanes(limit, species, read)
