"""The cold end of a vapour-pressure curve, set by heats: what its points weigh, and what stays uncertain.

Where a curve is measured and others agree it stays; where it is not, the heats decide. How much a
curve is to be trusted at a pressure is read off the distance of independent published curves from the
reference equations (tests/studies/caloric_correlation.md prints the table): 68 in 100 lie within 0.2 %
from 6 to 120 kPa, 0.6 % at 3 kPa, 1 % at 1 kPa, 2.3 % at 0.2 kPa, 4 % at 20 Pa and 7 % at 2 Pa.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.species import correlate

LEAST = 6e3  # [Pa] below it published curves drift apart: the usual lower end of ebulliometry
MEASURED = 0.002  # [-] one standard deviation of a curve above LEAST
LONE = 0.006  # [-] the same of a curve that no other confirms: nine in ten
PER_DECADE = 0.016  # [-] added per decade of pressure below LEAST
# [-] of a plain continuation 60 K below its source, growing with the square of the distance: what
# tests/species/test_continuation.py finds
CONTINUED = 0.02
# points of one curve share their errors: those of the measured, low and continued stretch count as
INDEPENDENT = 6.0, 3.0, 2.0  # our choice
WINDOW = 80.0, 120.0  # [K] at least so much of the source is correlated, and takes part; our choice
FULL = 1e5, 3e5  # [Pa] and all of it is, up to these pressures; our choice
SURE = 2.0  # standard deviations in the band that is shipped: nine in ten blind trials lie within
REFERENCE = 5e-4  # [-] what a reference equation may give to its heat capacity; our choice
AIM = 0.04  # [-] heat capacity of a reference equation that the cubic may miss before that


@dataclass(frozen=True)
class Cold:
    """P [Pa] of a curve with its cold end correlated, and the band (n,) [-] around it."""

    P: np.ndarray
    band: np.ndarray


def continued_band(T, first, half):
    """Two standard deviations [-] of a plain continuation at T [K] below first [K].

    half (n,) [-] is half the distance of the two continuations.
    """
    gap = np.maximum(first - np.asarray(T), 0.0) / 60.0
    return SURE * np.maximum(half, CONTINUED * gap**2)


def deviations(T, P, first, half, disagreement):
    """One standard deviation [-] of each point T [K], P [Pa] as it counts in the correlation.

    first [K] is where the source begins, half (n,) [-] half the distance of the two continuations,
    disagreement (n,) [-] half the distance of another published curve, NaN where there is none.
    """
    own = np.where(np.isfinite(disagreement), MEASURED, LONE)
    low = PER_DECADE * np.maximum(np.log10(LEAST / P), 0.0)
    parts = own, low, np.nan_to_num(disagreement), continued_band(T, first, half)
    deviation = np.sqrt(sum(part**2 for part in parts))
    stretch = np.where(first > T, 2, np.where(P < LEAST, 1, 0))
    for k, count in enumerate(INDEPENDENT):
        at = stretch == k
        deviation[at] *= np.sqrt(max(at.sum() / count, 1.0))
    return deviation


def correlated(T, P, first, half, disagreement, thermal, Tc, Pc):
    """`Cold` of a curve T [K], P [Pa] with heats, or None where the correlation does not end.

    As in `deviations`; thermal is a `heats.Thermal`, Tc [K], Pc [Pa].
    """
    reach = np.interp(np.log(FULL), np.log(P), T)
    full, top = np.minimum(np.maximum(first + np.array(WINDOW), reach), T[-1] - np.array([1.0, 0.0]))
    use = top + 1e-9 >= T
    deviation = deviations(T[use], P[use], first, half[use], disagreement[use])
    found = correlate.correlate(T[use], P[use], deviation, thermal, Tc, Pc)
    if found is None:
        return None
    c, covariance = found
    terms = correlate.basis(T)[0]
    # the correlated curve, far above the cold the source, and no step between
    fade = np.clip((top - T) / (top - full), 0.0, 1.0)
    new = np.exp(fade * (terms @ c) + (1.0 - fade) * np.log(P))
    spread = np.sqrt(np.maximum(np.einsum("ij,jk,ik->i", terms, covariance, terms), 0.0))
    return Cold(new, SURE * fade * spread)


def reference_with_capacity(T, P, thermal, Tc, Pc):
    """P [Pa] of a reference equation, moved by what its own heat capacity asks of a cubic equation.

    The cubic's compressibilities cost a light species some per cent of heat capacity. Only where that is
    more than AIM, and by a few hundredths of a per cent; P itself otherwise.
    """
    use = 0.85 * Tc >= T
    flat = np.full(use.sum(), REFERENCE * np.sqrt(use.sum() / INDEPENDENT[0]))
    plain = correlate.correlate(T[use], P[use], flat, thermal.__class__(None, None, thermal.cp_ideal), Tc, Pc)
    if plain is None or correlate.capacity_miss(plain[0], thermal, Tc, Pc) <= AIM:
        return P
    found = correlate.correlate(T[use], P[use], flat, thermal, Tc, Pc)
    if found is None:
        return P
    end = T[use][-1]
    shift = correlate.basis(np.minimum(T, end))[0] @ (found[0] - plain[0])
    return P * np.exp(shift * np.clip((Tc - T) / (Tc - end), 0.0, 1.0))
