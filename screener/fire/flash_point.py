"""Flash point of a liquid mixture from the vapour above it."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.fire.limits import Flammability
from screener.fire.results import FlashPoint
from screener.fire.root import temperature_of
from screener.fire.vapour import volatilities
from screener.ground.constants import ATMOSPHERE
from screener.ground.errors import InputError
from screener.ground.shapes import lanes
from screener.ground.status import Status

METHODS = {
    "liaw": "vapour-liquid equilibrium after Liaw; lower limits where a species has no flash point",
    "le-chatelier": "vapour-liquid equilibrium with lower flammable limits after Le Chatelier",
}
SHIFTS = (0.0, -1.0, 1.0)  # the best values, then estimated limits at the low and high end of their error


def flash_point(fluid, x, *, P=ATMOSPHERE, method: str = "liaw", flammability=None) -> FlashPoint:
    """Flash point of a liquid mixture: the vapour above it just carries a flame.

    Parameters
    ----------
    fluid : Fluid
        Species and model of c components.
    x : array, shape (c,) or (n, c)
        Liquid mole fractions. [-]
    P : float or array, shape (n,)
        Barometric pressure it holds at; reported flash points hold at 101,325 Pa. [Pa]
    method : str
        "liaw": sum of p_i / p_i at the species' own flash point is one, with the lower
        limit in its place for a species without flash point; "le-chatelier": sum of
        p_i / (LFL_i(T) P) is one.
    flammability : Flammability, optional
        Limits of the species; those of the tables and the estimate when absent.

    Returns
    -------
    FlashPoint
        T (n,) [K] with its range and the share of the vapour resting on estimates. A lane
        has NO_PARAMETERS when a species of it has neither limit nor estimate, or when the
        model lacks a pair; NO_SOLUTION when nothing in it burns; OUT_OF_RANGE when the
        flash point lies outside 190 to 520 K.

    Raises
    ------
    ShapeError
        x does not match the fluid, or rows do not broadcast with P.
    InputError
        method is no known word.

    Validity
    --------
    Equilibrium: a tester that loses light ends while heating reads higher. A liquid that
    splits in two is held together and flashes too low. Vapour that does not burn (water)
    counts as air.

    Source
    ------
    Liaw and others, J. Loss Prev. Process Ind. 15 (2002) 429, in the form quoted by Vidal
    and others, Process Saf. Environ. Prot. 84 (2006) 1; Le Chatelier's rule.
    """
    z, P, good = lanes(fluid.c, x, P=P)
    limits = flammability or Flammability.of(fluid)
    condition = flash_condition(fluid, limits, method)
    status = np.where(good, int(Status.CONVERGED), int(Status.BAD_INPUT))
    status[good & (fluid.lacks(z) | condition.unknown(z))] = Status.NO_PARAMETERS
    best = temperature_of(lambda i, T: condition.measure(T, P[i], z[i]), status)
    low, high = (
        temperature_of(lambda i, T, shift=shift: condition.measure(T, P[i], z[i], shift), status, best.T)
        for shift in SHIFTS[1:]
    )
    estimated = np.full(P.size, np.nan)
    ok = np.flatnonzero(best.status == Status.CONVERGED)
    if ok.size:
        p = z[ok] * volatilities(fluid.at(best.T[ok]), P[ok], z[ok])
        estimated[ok] = estimated_share(p, limits, limits.LFL_estimated & ~condition.own)
    return FlashPoint(
        best.T, low.T, high.T, estimated, P, METHODS[method], best.status, best.iterations, best.residual
    )


@dataclass(frozen=True)
class FlashCondition:
    """The condition of a flash point: own (c,) mask of the species taken at their own flash point,
    the others at their lower limit."""

    fluid: object
    limits: Flammability
    own: np.ndarray

    def unknown(self, z):
        """Mask (n,) of the lanes z (n, c) that hold a species for which there is nothing."""
        return self.limits.unknown(np.where(self.own, 0.0, z), "LFL")

    def measure(self, T, P, z, shift: float = 0.0):
        """ln of the vapour over what carries a flame (n,) at T (n,) [K], P (n,) [Pa], liquid z (n, c);
        shift moves estimated limits as `Flammability.limit_at` has it."""
        p = z * volatilities(self.fluid.at(T), P, z)
        lower = self.limits.limit_at("LFL", T, shift)
        needed = np.where(self.own, self.limits.P_flash / ATMOSPHERE, lower) * P[:, None]
        with np.errstate(all="ignore"):
            return np.log(np.where(z > 0.0, p / needed, 0.0).sum(axis=1))


def flash_condition(fluid, limits, method: str) -> FlashCondition:
    """The condition that a method puts on the vapour; InputError for a method in no list."""
    if method not in METHODS:
        raise InputError(
            "method", method, f"'{method}' is not a flash-point method", f"one of {', '.join(METHODS)}"
        )
    own = np.isfinite(limits.P_flash) if method == "liaw" else np.zeros(fluid.c, dtype=bool)
    return FlashCondition(fluid, limits, own)


def estimated_share(p, limits, estimated) -> np.ndarray:
    """Share (n,) [-] of the flammable vapour p (n, c) whose limit is an estimate, mask (c,)."""
    fuel = np.where(limits.burns, p, 0.0)
    with np.errstate(all="ignore"):
        return np.where(estimated, fuel, 0.0).sum(axis=1) / fuel.sum(axis=1)
