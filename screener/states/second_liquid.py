"""Is the liquid of each lane one liquid? Tested where it matters, said where it is not."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.equilibrium import second_liquid_check, worth_testing

ALL_BELOW = 50  # cases up to which every liquid is tested; a larger batch tests what `worth_testing` names


@dataclass(frozen=True)
class SecondLiquids:
    """splits (n, 5): a second liquid forms at the hottest or the coldest state; tested (n, 5): both states
    were tested and told; the rest is not known to be one liquid."""

    splits: np.ndarray
    tested: np.ndarray


def second_liquids(fluid, z, present, T_hot, P_hot, T_cold, barometer) -> SecondLiquids:
    """Test every liquid z (n, 5, c) at its hottest T_hot (n, 5) [K] and at T_cold (n,) [K].

    The hottest is tested at the barometer or its bubble pressure P_hot (n, 5)
    [Pa], the higher: a liquid that is about to boil is still all liquid there.
    """
    n, k = T_hot.shape
    T = np.stack([T_hot, np.broadcast_to(T_cold[:, None], (n, k))], axis=-1)
    pressure = np.broadcast_to(barometer[:, None], (n, k))
    P = np.stack([np.fmax(pressure, 1.0001 * P_hot), pressure], axis=-1)
    known = present[:, :, None] & np.isfinite(T) & np.isfinite(P) & np.isfinite(z).all(axis=-1)[:, :, None]
    splits, tested = np.zeros((n, k, 2), dtype=bool), np.zeros((n, k, 2), dtype=bool)
    if known.any():
        lanes = np.broadcast_to(z[:, :, None, :], (n, k, 2, fluid.c))[known]
        where = np.ones(len(lanes), dtype=bool) if n <= ALL_BELOW else worth_testing(fluid, T[known], lanes)
        answer = second_liquid_check(fluid, T[known], P[known], lanes, where=where)
        splits[known] = answer.splits
        tested[known] = answer.tested & (answer.ok | answer.splits)
    return SecondLiquids(splits.any(axis=-1), tested.all(axis=-1))
