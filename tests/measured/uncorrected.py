"""The model without its pair corrections, and with others in their place."""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from screener.equilibrium.excess import Excess
from screener.equilibrium.zero_pressure import ZeroPressure
from screener.species import find, pair_terms
from screener.species.pairs import correction


def with_terms(fluid, A0, A1, A2=None):
    """The fluid with these pair terms (c, c) [-], [K], [-] and no others."""
    excess = Excess.of(fluid.mixing.excess.unifac, A0, A1, np.zeros_like(A0) if A2 is None else A2)
    return replace(fluid, mixing=ZeroPressure(excess))


def corrected(fluid, value=lambda one, other: (0.0, 0.0)):
    """The fluid with the pair terms of dissolved gases and, else, A0 [-], A1 [K] = value(one, other)."""
    found = [find(name) for name in fluid.names]
    A0, A1, A2, _ = pair_terms(fluid.names)
    for i, one in enumerate(found):
        for j, other in enumerate(found):
            if i != j and one.groups and other.groups:
                shipped, wanted = correction(one, other), value(one, other)
                A0[i, j] += wanted[0] - shipped[0]
                A1[i, j] += wanted[1] - shipped[1]
    return with_terms(fluid, A0, A1, A2)
