"""Vapour of every species in the space above a liquid."""

from __future__ import annotations

import numpy as np

from screener.fire.results import Headspace
from screener.fire.vapour import over_liquid
from screener.ground.constants import ATMOSPHERE
from screener.ground.shapes import lanes
from screener.ground.status import Status


def headspace(fluid, T, x, *, P=ATMOSPHERE, ratio=0.0, saturation=1.0) -> Headspace:
    """Vapour in the space above a liquid, species by species.

    Parameters
    ----------
    fluid : Fluid
        Species and model of c components.
    T : float or array, shape (n,)
        Temperature of liquid and space. [K]
    x : array, shape (c,) or (n, c)
        Mole fractions of the liquid before it fills the space. [-]
    P : float or array, shape (n,)
        Pressure of the space, air and vapour together. [Pa]
    ratio : float or array, shape (n,)
        Vapour space over liquid volume, the latter at 15 degC; 0: a space too small to
        deplete the liquid. [-]
    saturation : float or array, shape (n,)
        Vapour in the space over that of equilibrium: below 1 in a space not yet saturated
        or diluted with air, above 0. [-]

    Returns
    -------
    Headspace
        Partial pressures, mole fractions, ppm and mg/m3. Where the liquid boils at P the
        vapour fills the space alone.

    Raises
    ------
    ShapeError
        x does not match the fluid, or rows do not broadcast.

    Validity
    --------
    Uniform space; the pressure stays P, as in a vented tank.

    Source
    ------
    Equilibrium of the fluid's model; balance of a charge of liquid with the space.
    """
    more = 1.0 + np.asarray(ratio, dtype=float)  # zero is a valid ratio, which `lanes` would call a bad state
    z, T, P, s, more, good = lanes(fluid.c, x, T=T, P=P, saturation=saturation, ratio=more)
    good &= (more >= 1.0) & (s <= 1.0)
    n = T.size
    status = np.where(good, int(Status.CONVERGED), int(Status.BAD_INPUT))
    status[good & fluid.lacks(z)] = Status.NO_PARAMETERS
    p, liquid = np.full((n, fluid.c), np.nan), np.full(n, np.nan)
    ok = np.flatnonzero(status == Status.CONVERGED)
    if ok.size:
        vapour = over_liquid(fluid, T[ok], P[ok], z[ok], more[ok] - 1.0)
        p[ok], liquid[ok] = s[ok][:, None] * np.where(z[ok] > 0.0, vapour.p, 0.0), vapour.n_L
    total = p.sum(axis=1)
    lost = (status == Status.CONVERGED) & ~np.isfinite(total)
    status[lost] = Status.OUT_OF_RANGE
    p[lost], liquid[lost] = np.nan, np.nan
    with np.errstate(invalid="ignore"):
        boils = total > P
        y = p / np.maximum(total, P)[:, None]
    residual = np.where(status == Status.CONVERGED, 0.0, np.nan)
    return Headspace(T, P, fluid.names, fluid.MW, p, y, liquid, boils, status, residual)
