"""How much water a hydrocarbon dissolves, and how much of it water dissolves, by family.

Activity coefficients at infinite dilution, from measured mutual solubilities
(data/pairs/water_terms.csv):

    ln gamma of water in it    = g0 + g1 (1/T - 1/298.15 K) + gn (n - 6)
    ln gamma of it in water    = h0 + hn (n - 6)                at 298.15 K

with n the molar mass over that of CH2. `wet` is the coefficient that holds
where alcohols share the water, `HALF` the share of alcohols at which the two
weigh the same.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache

import numpy as np

from screener.ground.files import read_table
from screener.species.catalogue import find

HALF = 0.05  # [-] mole fraction of alcohols; chosen with column wet, data/made_by/water_terms.py
T_REFERENCE = 298.15  # [K] to which the table refers
M_CH2 = 0.014027  # [kg/mol] from the standard atomic weights of C and H
N_REFERENCE = 6.0  # carbon number to which the table refers
ALCOHOL = "alcohol"


@dataclass(frozen=True)
class WaterTargets:
    """What the water term of a mixture is made from.

    Masks water, alcohol and hydrocarbon (c,); g0 [-], g1 [K], in_water [-] and
    wet [-] (c,), zero where a species is no hydrocarbon of a listed family;
    half [-].
    """

    water: np.ndarray
    alcohol: np.ndarray
    hydrocarbon: np.ndarray
    g0: np.ndarray
    g1: np.ndarray
    in_water: np.ndarray
    wet: np.ndarray
    half: float

    def water_in(self, T):
        """ln gamma of a trace of water in each hydrocarbon (k, c) [-] at T (k,). [K]"""
        return self.g0 + self.g1 * (1.0 / np.asarray(T)[:, None] - 1.0 / T_REFERENCE)


@lru_cache(maxsize=1)
def _families() -> dict[str, dict[str, float]]:
    numbers = ("g0", "g1", "gn", "h0", "hn", "wet")
    return {row["family"]: {k: float(row[k]) for k in numbers} for row in read_table("pairs/water_terms.csv")}


def water_targets(names) -> WaterTargets:
    """Measured water solubilities behind the species of a mixture.

    Parameters
    ----------
    names : sequence of str or Species
        Species of the mixture.

    Returns
    -------
    WaterTargets
        A species takes part if all its families are listed; a pseudo-component
        stands between its families by their shares.
    """
    found = [one if not isinstance(one, str) else find(one) for one in names]
    table, c = _families(), len(found)
    value = {key: np.zeros(c) for key in ("g0", "g1", "in_water", "wet")}
    hydrocarbon = np.zeros(c, dtype=bool)
    for i, one in enumerate(found):
        hydrocarbon[i] = all(family in table for family, share in one.family_shares if share > 0.0)
        if not hydrocarbon[i]:
            continue
        longer = one.MW / M_CH2 - N_REFERENCE
        for family, share in one.family_shares:
            if share > 0.0:
                row = table[family]
                value["g0"][i] += share * (row["g0"] + row["gn"] * longer)
                value["g1"][i] += share * row["g1"]
                value["in_water"][i] += share * (row["h0"] + row["hn"] * longer)
                value["wet"][i] += share * row["wet"]
    water = np.array([one.family == "water" for one in found])
    alcohol = np.array([one.family == ALCOHOL for one in found])
    return WaterTargets(water, alcohol, hydrocarbon, **value, half=HALF)
