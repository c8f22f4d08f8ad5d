"""The vapour space above a liquid: lean, flammable or rich, and between which temperatures."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.fire.flash_point import SHIFTS, estimated_share
from screener.fire.headspace import headspace
from screener.fire.limits import Flammability, mixture_limit
from screener.fire.results import SpaceState, VapourSpace, Window
from screener.fire.root import temperature_of
from screener.fire.vapour import over_liquid
from screener.ground.constants import ATMOSPHERE, MW_AIR
from screener.ground.shapes import lanes
from screener.ground.status import Status


def flammable_window(fluid, x, *, P=ATMOSPHERE, ratio=0.0, saturation=1.0, flammability=None) -> Window:
    """Temperatures between which the vapour space above a liquid is flammable.

    Parameters
    ----------
    fluid : Fluid
        Species and model of c components.
    x : array, shape (c,) or (n, c)
        Mole fractions of the liquid before it fills the space. [-]
    P : float or array, shape (n,)
        Pressure of the space, air and vapour together. [Pa]
    ratio : float or array, shape (n,)
        Vapour space over liquid volume, the latter at 15 degC; 0: a space too small to
        deplete the liquid. [-]
    saturation : float or array, shape (n,)
        Vapour in the space over that of equilibrium, for a space not yet saturated. [-]
    flammability : Flammability, optional
        Limits of the species; those of the tables and the estimate when absent.

    Returns
    -------
    Window
        T_lower and T_upper (n,) [K], their ranges and what rests on estimates. Too lean
        below, too rich above; a rich space passes through the range when it takes in air.

    Raises
    ------
    ShapeError
        x does not match the fluid, or rows do not broadcast.

    Validity
    --------
    Uniform vapour at the temperature of the liquid, 50 to 110 kPa (common practice, no
    source: the limits themselves hardly move there). Spark tests find the lower end some
    kelvin warmer than the limits say.

    Source
    ------
    Le Chatelier's rule on equilibrium vapour; limits moved with temperature by the
    modified Burgess-Wheeler law.
    """
    z, P, s, ratio, good = _lanes(fluid, x, P, ratio, saturation)
    limits = flammability or Flammability.of(fluid)
    space = _Space(fluid, limits, z, P, s, ratio)
    roots, shares = {}, {}
    for limit in ("LFL", "UFL"):
        status = np.where(good, int(Status.CONVERGED), int(Status.BAD_INPUT))
        status[good & (fluid.lacks(z) | limits.unknown(z, limit))] = Status.NO_PARAMETERS
        roots[limit], shares[limit] = space.temperatures(limit, status)
    lower, upper = roots["LFL"], roots["UFL"]
    best = lower[0], upper[0]
    return Window(
        *(root.T for root in lower), *(root.T for root in upper), shares["LFL"], shares["UFL"],
        best[0].status, best[1].status,
        np.where(best[0].status != Status.CONVERGED, best[0].status, best[1].status),
        best[0].iterations + best[1].iterations,
        np.maximum(np.abs(best[0].residual), np.abs(best[1].residual)),
    )  # fmt: skip


@dataclass(frozen=True)
class _Space:
    """n lanes: liquid z (n, c), pressure P (n,) [Pa], ratio (n,) and saturation s (n,) [-] of the space."""

    fluid: object
    limits: Flammability
    z: np.ndarray
    P: np.ndarray
    s: np.ndarray
    ratio: np.ndarray

    def vapour(self, i, T, ratio):
        """Partial pressures (lanes, c) [Pa] of some lanes."""
        return self.s[i][:, None] * over_liquid(self.fluid, T, self.P[i], self.z[i], ratio[i]).p

    def measure(self, limit, ratio, shift):
        """ln of the vapour over the limit, as `temperature_of` asks for it."""

        def of(i, T):
            need = self.limits.limit_at(limit, T, shift) * self.P[i][:, None]
            with np.errstate(all="ignore"):
                return np.log(np.where(self.z[i] > 0.0, self.vapour(i, T, ratio) / need, 0.0).sum(axis=1))

        return of

    def temperatures(self, limit, status):
        """Roots at the best, low and high value of estimated limits, and the share (n,) resting on them.

        The best one starts from a space that does not deplete the liquid, the others from it.
        """
        start, still = None, np.zeros_like(self.ratio)
        if (self.ratio > 0.0).any():
            start = temperature_of(self.measure(limit, still, 0.0), status).T
        best = temperature_of(self.measure(limit, self.ratio, 0.0), status, start)
        ends = [
            temperature_of(self.measure(limit, self.ratio, shift), status, best.T) for shift in SHIFTS[1:]
        ]
        share = np.full(status.size, np.nan)
        ok = np.flatnonzero(best.status == Status.CONVERGED)
        if ok.size:
            p = self.vapour(ok, best.T[ok], self.ratio)
            share[ok] = estimated_share(p, self.limits, getattr(self.limits, f"{limit}_estimated"))
        return (best, *ends), share


def vapour_space(fluid, T, x, *, P=ATMOSPHERE, ratio=0.0, saturation=1.0, flammability=None) -> VapourSpace:
    """State of the vapour space above a liquid at one temperature.

    Parameters
    ----------
    fluid : Fluid
        Species and model of c components.
    T : float or array, shape (n,)
        Temperature of liquid and space. [K]
    x : array, shape (c,) or (n, c)
        Mole fractions of the liquid before it fills the space. [-]
    P : float or array, shape (n,)
        Pressure of the space. [Pa]
    ratio : float or array, shape (n,)
        Vapour space over liquid volume, as in `flammable_window`. [-]
    saturation : float or array, shape (n,)
        Vapour in the space over that of equilibrium. [-]
    flammability : Flammability, optional
        Limits of the species; those of the tables and the estimate when absent.

    Returns
    -------
    VapourSpace
        State with the distance to both limits and the degrees of saturation at which the
        same liquid gives a flammable space. UNKNOWN where the lane has no answer.

    Raises
    ------
    ShapeError
        x does not match the fluid, or rows do not broadcast.

    Validity
    --------
    As `flammable_window`.

    Source
    ------
    As `flammable_window`; vapour density of ideal gases.
    """
    limits = flammability or Flammability.of(fluid)
    head = headspace(fluid, T, x, P=P, ratio=ratio, saturation=saturation)
    z = np.broadcast_to(np.atleast_2d(np.asarray(x, dtype=float)), head.y.shape)
    status = head.status.copy()
    status[head.ok & limits.unknown(z, "LFL", "UFL")] = Status.NO_PARAMETERS
    ok = status == Status.CONVERGED
    y = np.where(ok[:, None], head.y, np.nan)
    T = np.where(ok, head.T, 300.0)
    lower, upper = (
        [_ratio(y, limits.limit_at(name, T, shift)) for shift in SHIFTS] for name in ("LFL", "UFL")
    )
    for part in (lower, upper):
        part[1], part[2] = part[2], part[1]  # a higher limit makes a lower ratio
    s = np.broadcast_to(np.asarray(saturation, dtype=float), T.shape)
    with np.errstate(all="ignore"):
        density = 1.0 + y @ (head.MW / MW_AIR - 1.0)
        return VapourSpace(
            y, np.where(limits.burns, y, 0.0).sum(axis=1) + 0.0 * y[:, 0],
            *lower, *upper,
            mixture_limit(y, limits.limit_at("LFL", T)), mixture_limit(y, limits.limit_at("UFL", T)),
            _state(ok, lower[0], upper[0]), _state(ok, lower[1], upper[1]), _state(ok, lower[2], upper[2]),
            s / lower[0], s / upper[0],
            estimated_share(y, limits, limits.LFL_estimated),
            estimated_share(y, limits, limits.UFL_estimated),
            density, head.boils & ok, status, head.residual,
        )  # fmt: skip


def _lanes(fluid, x, P, ratio, saturation):
    """Broadcast; a ratio of zero is valid, which `lanes` would call a bad state."""
    z, P, s, more, good = lanes(
        fluid.c, x, P=P, saturation=saturation, ratio=1.0 + np.asarray(ratio, dtype=float)
    )
    return z, P, s, more - 1.0, good & (more >= 1.0) & (s <= 1.0)


def _ratio(y, limit):
    with np.errstate(all="ignore"):
        return np.where(y > 0.0, y / limit, 0.0).sum(axis=1) + 0.0 * y[:, 0]


def _state(ok, lower, upper):
    """`SpaceState` (n,) from the ratios to the two limits."""
    state = np.where(
        lower < 1.0, SpaceState.TOO_LEAN, np.where(upper > 1.0, SpaceState.TOO_RICH, SpaceState.FLAMMABLE)
    )
    return np.where(ok, state, SpaceState.UNKNOWN).astype(int)
