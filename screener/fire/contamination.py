"""A little of a second liquid: flash point and vapour space against its share, and the share too much."""

from __future__ import annotations

from itertools import pairwise

import numpy as np

from screener.fire.flash_point import flash_condition, flash_point
from screener.fire.limits import Flammability
from screener.fire.results import FlashPoint, Share, VapourSpace
from screener.fire.window import vapour_space
from screener.ground.constants import ATMOSPHERE
from screener.ground.shapes import lanes
from screener.ground.status import Status

# Shares at which the flash-point condition is looked at before it is narrowed down: the first crossing
# counts, and a minimum between (alcohol in a hydrocarbon) is not stepped over. Own choice.
LADDER = np.unique(np.concatenate([[0.0], np.geomspace(1e-6, 0.1, 41), np.linspace(0.1, 1.0, 37)]))
HALVINGS = 50


def contaminated(fluid, x, other, share) -> np.ndarray:
    """Mole fractions of a liquid that holds a share of a second one.

    Parameters
    ----------
    fluid : Fluid
        Species of both liquids.
    x : array, shape (c,) or (n, c)
        Mole fractions of the first liquid. [-]
    other : array, shape (c,) or (n, c)
        Mole fractions of the second. [-]
    share : float or array, shape (n,)
        Share of the second in the volume at 15 degC, no shrinkage. [-]

    Returns
    -------
    array, shape (n, c)
        Mole fractions; NaN where the share lies outside 0 to 1 or a molar volume is not known. [-]

    Source
    ------
    Ideal mixing of standard volumes, a rule of this program.
    """
    x, other = np.atleast_2d(np.asarray(x, dtype=float)), np.atleast_2d(np.asarray(other, dtype=float))
    share = np.atleast_1d(np.asarray(share, dtype=float))
    share = np.where((share >= 0.0) & (share <= 1.0), share, np.nan)
    known = np.isfinite(fluid.v_15)
    v = np.where(known, fluid.v_15, 0.0)
    one, two = (np.where((z[:, ~known] > 0.0).any(axis=1), np.nan, z @ v) for z in (x, other))
    moles = ((1.0 - share) / one)[:, None] * x + (share / two)[:, None] * other
    return moles / moles.sum(axis=1, keepdims=True)


def contaminated_flash_point(fluid, x, other, share, *, P=ATMOSPHERE, method: str = "liaw") -> FlashPoint:
    """Flash point against the share of a second liquid.

    Parameters
    ----------
    fluid : Fluid
        Species of both liquids.
    x : array, shape (c,) or (n, c)
        Mole fractions of the first liquid. [-]
    other : array, shape (c,) or (n, c)
        Mole fractions of the second. [-]
    share : float or array, shape (n,)
        Share of the second in the volume at 15 degC. [-]
    P : float or array, shape (n,)
        Barometric pressure. [Pa]
    method : str
        As `flash_point`.

    Returns
    -------
    FlashPoint
        One lane a share.

    Validity
    --------
    As `flash_point`: equilibrium is the careful bound, a tester loses light ends while heating.

    Source
    ------
    As `flash_point`.
    """
    return flash_point(fluid, contaminated(fluid, x, other, share), P=P, method=method)


def contaminated_space(fluid, T, x, other, share, *, P=ATMOSPHERE, ratio=0.0, saturation=1.0) -> VapourSpace:
    """State of the vapour space against the share of a second liquid.

    Parameters
    ----------
    fluid : Fluid
        Species of both liquids.
    T : float or array, shape (n,)
        Temperature of liquid and space. [K]
    x : array, shape (c,) or (n, c)
        Mole fractions of the first liquid. [-]
    other : array, shape (c,) or (n, c)
        Mole fractions of the second. [-]
    share : float or array, shape (n,)
        Share of the second in the volume at 15 degC. [-]
    P : float or array, shape (n,)
        Pressure of the space. [Pa]
    ratio : float or array, shape (n,)
        Vapour space over liquid volume. [-]
    saturation : float or array, shape (n,)
        Vapour in the space over that of equilibrium. [-]

    Returns
    -------
    VapourSpace
        One lane a share.

    Validity
    --------
    As `vapour_space`.

    Source
    ------
    As `vapour_space`.
    """
    z = contaminated(fluid, x, other, share)
    return vapour_space(fluid, T, z, P=P, ratio=ratio, saturation=saturation)


def share_at_flash_point(fluid, x, other, T, *, P=ATMOSPHERE, method: str = "liaw") -> Share:
    """Smallest share of a second liquid at which the flash point falls to a given temperature.

    Parameters
    ----------
    fluid : Fluid
        Species of both liquids.
    x : array, shape (c,) or (n, c)
        Mole fractions of the first liquid. [-]
    other : array, shape (c,) or (n, c)
        Mole fractions of the second. [-]
    T : float or array, shape (n,)
        Flash point to fall to. [K]
    P : float or array, shape (n,)
        Barometric pressure. [Pa]
    method : str
        As `flash_point`.

    Returns
    -------
    Share
        share (n,) of the volume at 15 degC: zero where the first liquid already flashes at
        or below T; NO_SOLUTION where no share brings it down so far.

    Raises
    ------
    ShapeError
        A composition does not match the fluid, or lanes do not broadcast.

    Validity
    --------
    As `flash_point`; shares from one in a million.

    Source
    ------
    As `flash_point`; the first crossing on a ladder of shares, then halving.
    """
    x, T, P, good = lanes(fluid.c, x, T=T, P=P)
    other, T, P, good_other = lanes(fluid.c, other, T=T, P=P)
    n = T.size
    x, good = np.broadcast_to(x, (n, fluid.c)), good & good_other
    limits = Flammability.of(fluid)
    condition = flash_condition(fluid, limits, method)
    status = np.where(good, int(Status.CONVERGED), int(Status.BAD_INPUT))
    both = 0.5 * (x + other)
    status[good & (fluid.lacks(both) | condition.unknown(both))] = Status.NO_PARAMETERS
    share, residual = np.full(n, np.nan), np.full(n, np.nan)
    ok = np.flatnonzero(status == Status.CONVERGED)
    if ok.size:

        def excess(s):
            z = contaminated(fluid, x[ok], other[ok], s)
            return condition.measure(T[ok], P[ok], z)

        low, high, found = _bracket(excess, ok.size)
        for _ in range(HALVINGS):
            middle = 0.5 * (low + high)
            above = excess(middle) >= 0.0
            low, high = np.where(above, low, middle), np.where(above, middle, high)
        share[ok], residual[ok] = np.where(found, high, np.nan), np.where(found, excess(high), np.nan)
        status[ok[~found]] = Status.NO_SOLUTION
    return Share(share, status, residual)


def _bracket(excess, n):
    """Ends of the first step of the ladder that meets the condition, and the mask of lanes that have one."""
    low, high, found = np.zeros(n), np.zeros(n), excess(np.zeros(n)) >= 0.0
    for one, two in pairwise(LADDER):
        if found.all():
            break
        met = ~found & (excess(np.full(n, two)) >= 0.0)
        low, high = np.where(met, one, low), np.where(met, two, high)
        found |= met
    return low, high, found
