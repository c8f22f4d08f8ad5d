"""A second liquid under or beside the first: found by the tangent plane of the answer.

Group-contribution models predict that dry ethanol and C6 to C8 paraffins split
near ambient temperature; that is held not to happen (common practice, no
source). Such a prediction is reported in words and never takes the place of
the vapour-liquid answer. A split with methanol, or with more water than
fuel-grade ethanol carries, counts.
"""

from __future__ import annotations

import numpy as np

from screener.equilibrium.phase import DENSE, reduced_volume
from screener.equilibrium.stability import tangent_plane
from screener.ground.errors import InputError

DEPTH = 1e-8  # [-] tangent-plane distance over RT that counts: a hundred times the residual of the answer
DRY = 0.04  # [-] water to ethanol by moles: 1.2 vol% in ethanol, about fuel grade; from memory, unverified
NO_VAPOUR_LEFT = 1e7  # [Pa] above the bubble pressure of any liquid stored near ambient temperature; own choice
NOT_TESTED = "not tested for a second liquid"
TESTED = "tangent plane"
SPLITS = "tangent plane: a second liquid lowers the energy"
TWO_LIQUIDS = "two liquids found"
DOUBTFUL = "tangent plane: the model splits dry ethanol and hydrocarbon, held not to exist"
UNSETTLED = "tangent plane: a trial did not converge"


def known_check(check: str) -> bool:
    """True for "full", False for "vapour-liquid"; anything else is a fault of the caller."""
    if check not in ("vapour-liquid", "full"):
        raise InputError("check", check, f"'{check}' is not a check", "vapour-liquid or full")
    return check == "full"


def full_check(fluid, state, P, z, phase, ln_phi, K):
    """Tangent plane of an answer against every start.

    Parameters
    ----------
    fluid : Fluid
        For the names of the species.
    state : AtTemperature
        The fluid at the temperatures of the lanes.
    P : array, shape (n,)
        Pressure. [Pa]
    z : array, shape (n, c)
        Feed. [-]
    phase : array, shape (n, c)
        One phase of the answer. [-]
    ln_phi : array, shape (n, c)
        Of that phase. [-]
    K : array, shape (n, c)
        Wilson's K-values. [-]

    Returns
    -------
    tuple
        What the trials found (`Found`), the mask (n,) of lanes in which a
        second liquid is real, and the words (n,) for each lane.

    Source
    ------
    Michelsen, Fluid Phase Equilib. 9 (1982) 1.
    """
    found = tangent_plane(state, P, phase, z, ln_phi, K, pures=True)
    below = found.tpd < -DEPTH
    doubtful = below & dry_ethanol(fluid, z)
    text = np.where(found.converged, TESTED, UNSETTLED)
    text = np.where(below, SPLITS, text)
    return found, below & ~doubtful, np.where(doubtful, DOUBTFUL, text)


def splits_anyway(fluid, T, z):
    """Mask (n,) of liquids that are two at T (n,) [K] under a pressure that leaves no vapour.

    Asked where one liquid has no bubble point, to say why; z (n, c) [-].
    """
    P = np.full(T.shape, NO_VAPOUR_LEFT)
    state = fluid.at(T)
    found, splits, _ = full_check(fluid, state, P, z, z, state.ln_phi(P, z, "L"), fluid.wilson_K(T, P))
    for x in (z, np.where(splits[:, None], found.w, z)):
        mixture = state.mix(x)
        splits = splits & (reduced_volume(mixture, P, mixture.Z(P, "L")) < DENSE)
    return splits


def dry_ethanol(fluid, z):
    """Mask (n,) of lanes z (n, c) [-] that hold ethanol, next to no water for it, and no methanol."""

    def share(name):
        return z[:, fluid.names.index(name)] if name in fluid.names else np.zeros(z.shape[0])

    ethanol = share("ethanol")
    return (ethanol > 0.0) & (share("water") <= DRY * ethanol) & (share("methanol") == 0.0)
