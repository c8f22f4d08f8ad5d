"""What a petroleum cut is made of: shares of families, and the groups that stand for it.

The rule, in three steps.

1. Shares by volume of paraffins, naphthenes, olefins and aromatics. Known ones are taken.
   What is left is divided between paraffins and naphthenes so that the family lines
   (data/cuts/family_lines.csv) give the cut's gravity at its boiling point. When the aromatics
   are not known either, there is as much of them as of naphthenes (our choice, no source),
   fading out below the boiling point of benzene, where no aromatic exists.
2. Every family is represented at the molar mass of the cut, with a broken carbon number:
   paraffins half singly branched; naphthenes as rings of six (five below six carbons) with
   one chain; olefins as straight chains with one inner double bond; aromatics along benzene,
   toluene, xylene and ethyltoluene, then with a longer chain.
3. The groups of the cut are the mean of these over its molecules. Their mass is the
   molar mass of the cut exactly, whatever the shares.

tests/studies/cuts_against_molecules.md shows what comes of it for ethanol in a gasoline.
"""

from __future__ import annotations

from functools import lru_cache

import numpy as np

from screener.ground.files import read_table
from screener.species.cut_constants import RANKINE

FAMILIES = ("paraffin", "naphthene", "olefin", "aromatic")
CARBON, HYDROGEN = 0.0120107, 0.00100794  # atomic masses [kg/mol]; IUPAC 2001, as the species table has them
CH2 = CARBON + 2.0 * HYDROGEN
AROMATICS_FROM = (
    340.0,
    360.0,
)  # [K] no aromatic boils below the first, benzene (353 K) lies between; our choice
BRANCHED = 0.5  # [-] single branches per paraffin; our choice

# subgroups of modified UNIFAC (Dortmund), data/groups/subgroups.csv
CH3, CH2_, CH, CHCH, ACH, ACCH3, ACCH2, CY_CH2, CY_CH = 1, 2, 3, 6, 9, 11, 12, 78, 79


@lru_cache(maxsize=1)
def _lines():
    rows = read_table("cuts/family_lines.csv")
    return np.array([float(row["Tb"]) for row in rows]), {
        family: np.array([float(row[family]) for row in rows]) for family in FAMILIES
    }


def family_gravity(family: str, Tb):
    """Specific gravity 60/60 degF [-] that a family has on average at boiling point Tb [K]."""
    nodes, lines = _lines()
    Tb = np.asarray(Tb, dtype=float)
    return np.cbrt(RANKINE * Tb) / np.interp(Tb, nodes, lines[family])


def aromatics_possible(Tb):
    """How far aromatics can occur at boiling point Tb [K]: 0 below 340 K to 1 from 360 K. [-]"""
    low, high = AROMATICS_FROM
    return np.clip((np.asarray(Tb, dtype=float) - low) / (high - low), 0.0, 1.0)


def family_shares(Tb, SG, aromatics=None, naphthenes=None, olefins=0.0):
    """Volume shares of (paraffin, naphthene, olefin, aromatic) in a cut, rule 1 of this module.

    Tb [K], SG [-]; shares known [-] as numbers or arrays, None where not known. The last axis
    of the answer holds the four shares, which add to 1.
    """
    Tb, SG, olefins = np.broadcast_arrays(*(np.asarray(v, dtype=float) for v in (Tb, SG, olefins)))
    P, N, O, A = (family_gravity(family, Tb) for family in FAMILIES)
    if aromatics is not None and naphthenes is not None:
        A_share, N_share = np.broadcast_to(aromatics, Tb.shape), np.broadcast_to(naphthenes, Tb.shape)
    elif aromatics is not None:
        A_share = np.broadcast_to(aromatics, Tb.shape)
        rest = 1.0 - A_share - olefins
        N_share = np.clip((SG - A_share * A - olefins * O - rest * P) / (N - P), 0.0, np.maximum(rest, 0.0))
    elif naphthenes is not None:
        N_share = np.broadcast_to(naphthenes, Tb.shape)
        rest = 1.0 - N_share - olefins
        A_share = np.clip((SG - N_share * N - olefins * O - rest * P) / (A - P), 0.0, np.maximum(rest, 0.0))
    else:
        A_share, N_share = _rings(Tb, SG, olefins, P, N, O, A)
    P_share = np.maximum(1.0 - N_share - A_share - olefins, 0.0)
    return np.stack([P_share, N_share, olefins, A_share], axis=-1)


def _rings(Tb, SG, olefins, P, N, O, A):
    """Aromatics and naphthenes when neither is known: alike as long as paraffins are left."""
    rest, ratio = 1.0 - olefins, aromatics_possible(Tb)
    needed = SG - olefins * O
    N_share = np.maximum((needed - rest * P) / (N + ratio * A - (1.0 + ratio) * P), 0.0)
    A_share = ratio * N_share
    full = N_share + A_share > rest  # no paraffin left: the gravity decides between the two rings
    between = np.clip((needed / rest - N) / (A - N), 0.0, 1.0) * (ratio > 0.0)
    return np.where(full, rest * between, A_share), np.where(full, rest * (1.0 - between), N_share)


def groups_of(Tb, MW, shares) -> dict[int, float]:
    """Mean subgroup counts {subgroup: count} of a cut; rules 2 and 3 of this module.

    Tb [K], MW [kg/mol], shares by volume of the four families [-].
    """
    weight = np.array([s * family_gravity(family, Tb) for family, s in zip(FAMILIES, shares, strict=True)])
    weight = weight / weight.sum()  # at one molar mass, shares of mass are shares of molecules
    total: dict[int, float] = {}
    for x, build in zip(weight, (_paraffin, _naphthene, _olefin, _aromatic), strict=True):
        if x > 0.0:
            for group, count in build(MW).items():
                total[group] = total.get(group, 0.0) + x * count
    return {group: float(count) for group, count in total.items() if count > 0.0}


def mole_shares(Tb, shares) -> tuple[float, ...]:
    """Shares of the molecules of the four families from shares by volume. [-]"""
    weight = np.array([s * family_gravity(family, Tb) for family, s in zip(FAMILIES, shares, strict=True)])
    return tuple(float(x) for x in weight / weight.sum())


def _paraffin(MW):
    n = (MW - 2.0 * HYDROGEN) / CH2
    b = BRANCHED * np.clip(n - 3.0, 0.0, 1.0)
    return {CH3: 2.0 + b, CH: b, CH2_: n - 2.0 - 2.0 * b}


def _naphthene(MW):
    n = MW / CH2
    chain = np.clip(n - 6.0, 0.0, 1.0)  # 0 for a bare ring, 1 from seven carbons on
    return {
        CY_CH2: np.minimum(n, 6.0) - chain,
        CY_CH: chain,
        CH3: chain,
        CH2_: np.maximum(n - 7.0, 0.0),
    }


def _olefin(MW):
    n = MW / CH2
    return {CHCH: 1.0, CH3: 2.0, CH2_: n - 4.0}


def _aromatic(MW):
    n = (MW + 6.0 * HYDROGEN) / CH2
    nodes = np.array([6.0, 7.0, 8.0, 9.0])
    counts = {ACH: [6.0, 5.0, 4.0, 4.0], ACCH3: [0.0, 1.0, 2.0, 1.0], ACCH2: [0.0, 0.0, 0.0, 1.0],
              CH3: [0.0, 0.0, 0.0, 1.0]}  # fmt: skip
    found = {group: float(np.interp(n, nodes, values)) for group, values in counts.items()}
    # carbons that the nodes do not carry: longer chains above nine, thinner rings below six
    found[CH2_] = float(max(n - 9.0, 0.0))
    if n < 6.0:
        found[ACH] = float(MW / (CARBON + HYDROGEN))
    return found
