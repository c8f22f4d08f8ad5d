"""A second liquid under or beside the first: found by the tangent plane of the answer.

Group-contribution models predict that dry ethanol and C6 to C8 paraffins split
near ambient temperature. They do not: water + ethanol + isooctane and water +
ethanol + toluene have one gap only, from water to hydrocarbon, at 5, 25 and
40 degC (Wagner and Sandler, J. Chem. Eng. Data 40 (1995) 1119), water + ethanol
+ hexane at 25 degC (IUPAC-NIST Solubility Database, system 69_78). Such a
prediction is reported in words and never takes the place of the vapour-liquid
answer. A split with methanol, with more water than fuel-grade ethanol carries,
or with hydrocarbons heavier than gasoline counts.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.equilibrium.phase import DENSE, reduced_volume
from screener.equilibrium.results import LaneAnswer, bad_status
from screener.equilibrium.stability import FEW, PURE, tangent_plane, trials_from
from screener.ground.errors import InputError
from screener.ground.shapes import lanes as as_lanes
from screener.ground.status import Status

DEPTH = 1e-8  # [-] tangent-plane distance over RT that counts: a hundred times the residual of the answer
# [-] water to ethanol by moles: on the measured saturation curves with hexane, cyclohexane and toluene at 273 and
# 298 K (IUPAC-NIST Solubility Database, systems 69_76, 69_80, 69_86, 69_87) no blend with less than 0.059 splits
DRY = 0.05
LIGHT = 0.125  # [kg/mol] mean molar mass of the rest, below which it is gasoline: C8 is 0.114; own choice
NO_VAPOUR_LEFT = (
    1e7  # [Pa] above the bubble pressure of any liquid stored near ambient temperature; own choice
)
POLAR = (  # species whose pure liquid may stand beside hydrocarbon
    "water", "methanol", "ethanol", "1-propanol", "2-propanol", "1-butanol", "2-butanol", "isobutanol",
    "tert-butanol",
)  # fmt: skip
MOST_NUMBERS = 20_000  # lanes times components handled at once: some ten trials each
NOT_TESTED = "not tested for a second liquid"
TESTED = "tangent plane"
SPLITS = "tangent plane: a second liquid lowers the energy"
TWO_LIQUIDS = "two liquids found"
THREE_PHASES = "a vapour and two liquids found"
DOUBTFUL = "tangent plane: the model splits dry ethanol and hydrocarbon, held not to exist"
UNSETTLED = "tangent plane: a trial did not converge"
NONE_FOUND = "tested for a second liquid: none found"
# of 358 seeded feeds with free water none lay above the number for one liquid, of 862 with methanol 100, by 2.2 %
TWO_BY_THE_CHECK = (
    "the liquid splits: a number for one liquid is an upper bound where water settles, "
    "good to some percent otherwise"
)
NO_LIQUID = "not tested for a second liquid: no liquid at this state"
VAPOUR_FIRST = "not tested for a second liquid: a vapour forms at this pressure"


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


def share_of(fluid, z, name: str):
    """Mole fractions (n,) of a species by name, zero where the fluid has none of it."""
    return z[:, fluid.names.index(name)] if name in fluid.names else np.zeros(z.shape[0])


def dry_ethanol(fluid, z):
    """Mask (n,) of lanes z (n, c) [-] with ethanol in light hydrocarbon, next to no water, and no methanol."""
    ethanol, water = share_of(fluid, z, "ethanol"), share_of(fluid, z, "water")
    dry = (ethanol > 0.0) & (water <= DRY * ethanol) & (share_of(fluid, z, "methanol") == 0.0)
    if not dry.any():
        return dry
    rest = z * ~np.isin(fluid.names, POLAR)
    return dry & (rest @ fluid.MW <= LIGHT * rest.sum(axis=1))


def liquid_starts(fluid, T, z):
    """Starts (k, n, c) of liquid trials beside a liquid z (n, c) at T (n,) [K]: few, and enough for stored liquids.

    Every polar species pure, the rest of the feed without them, and the two
    ends of that rest, lightest and heaviest; all pure species where none is
    known by name. ln W; the whole lane NaN where a lane does without a start.
    """
    polar = np.isin(fluid.names, POLAR)
    few = np.log(np.maximum((1.0 - PURE) * z, FEW))
    pures = np.flatnonzero(polar if polar.any() else np.ones(fluid.c, dtype=bool))
    starts = [_one_of(few, np.full(z.shape[0], i), z) for i in pures]
    if polar.any() and not polar.all():
        rest = np.where(polar, (1.0 - PURE) * z, z)
        total = np.where(polar, 0.0, z).sum(axis=1, keepdims=True)
        with np.errstate(divide="ignore", invalid="ignore"):
            starts.append(np.where(total > 0.0, np.log(np.maximum(rest / total, FEW)), np.nan))
        Tc = np.where((z > 0.0) & ~polar & (fluid.Tc > T[:, None]), fluid.Tc, np.nan)
        some = np.isfinite(Tc).any(axis=1)
        for end, fill in ((np.argmin, np.inf), (np.argmax, -np.inf)):
            i = end(np.where(np.isfinite(Tc), Tc, fill), axis=1)
            starts.append(np.where(some[:, None], _one_of(few, i, z), np.nan))
    return np.stack(starts)


def _one_of(few, i, z):
    """Start (n, c) of nearly pure species i (n,), NaN where it is absent."""
    every = np.arange(z.shape[0])
    start = few.copy()
    start[every, i] = np.log(PURE)
    start[z[every, i] <= 0.0] = np.nan
    return start


@dataclass(frozen=True)
class SecondLiquid(LaneAnswer):
    """Is the liquid of each lane one liquid?

    verdict (n,) in words: `NONE_FOUND`, `TWO_BY_THE_CHECK` where it splits,
    `DOUBTFUL` where the model alone says so, `UNSETTLED` where the trials do
    not tell, `NOT_TESTED` where nobody asked, `NO_LIQUID` or `VAPOUR_FIRST`
    where the state is none of one liquid. splits and tested (n,) masks; tpd
    (n,) [-] the smallest tangent-plane distance over RT, NaN where not tested;
    w (n, c) [-] the liquid it belongs to. status is LIQUID_SPLITS where it
    splits, OUT_OF_STEPS where the trials do not tell, OUT_OF_RANGE where the
    state is none of one liquid.
    """

    T: np.ndarray
    P: np.ndarray
    z: np.ndarray
    verdict: np.ndarray
    splits: np.ndarray
    tested: np.ndarray
    tpd: np.ndarray
    w: np.ndarray
    status: np.ndarray
    iterations: np.ndarray
    residual: np.ndarray


def second_liquid_check(fluid, T, P, z, *, where=None) -> SecondLiquid:
    """Whether a liquid is one liquid: the cheap test for states that are printed.

    Parameters
    ----------
    fluid : Fluid
        Species constants and model parameters of c components.
    T : float or array, shape (n,)
        Temperature. [K]
    P : float or array, shape (n,)
        Pressure; at or above the bubble pressure. [Pa]
    z : array, shape (c,) or (n, c)
        Mole fractions of the liquid; each row sums to 1. [-]
    where : array of bool, shape (n,), optional
        Lanes to test, all without; the others are marked not tested.

    Returns
    -------
    SecondLiquid
        One verdict per lane.

    Raises
    ------
    ShapeError
        z does not match the fluid, or rows do not broadcast with T and P.

    Validity
    --------
    Finds second liquids only: whether a vapour forms first is the business of
    the bubble point. Starts are those of `liquid_starts`, not every species.

    Source
    ------
    Michelsen, Fluid Phase Equilib. 9 (1982) 1.
    """
    z, T, P, good = as_lanes(fluid.c, z, T=T, P=P)
    n, c = z.shape
    status = bad_status(good)
    status[good & fluid.lacks(z)] = Status.NO_PARAMETERS
    asked = np.ones(n, dtype=bool) if where is None else np.broadcast_to(np.asarray(where, dtype=bool), (n,))
    idle = (status == Status.OUT_OF_STEPS) & ~asked
    out = {
        "verdict": np.full(n, NOT_TESTED, dtype=object),
        "splits": np.zeros(n, dtype=bool),
        "status": status,
    }
    out |= {name: np.full(n, np.nan) for name in ("tpd", "residual")}
    out |= {
        "w": np.full((n, c), np.nan),
        "iterations": np.zeros(n, dtype=int),
        "tested": np.zeros(n, dtype=bool),
    }
    work = np.flatnonzero((status == Status.OUT_OF_STEPS) & asked)
    for some in np.array_split(work, max(1, -(-work.size * c // MOST_NUMBERS))):
        if some.size:
            _check(out, some, fluid, T[some], P[some], z[some])
    status[idle] = Status.CONVERGED
    return SecondLiquid(T=T, P=P, z=z, **out)


def _check(out, lanes, fluid, T, P, z):
    """One chunk of lanes to test."""
    state = fluid.at(T)
    ln_phi, dense = _as_liquid(state, P, z)
    out["verdict"][lanes[~dense]], out["status"][lanes[~dense]] = NO_LIQUID, Status.OUT_OF_RANGE
    some = np.flatnonzero(dense)
    if some.size == 0:
        return
    here, held, P, z = lanes[some], state.take(some), P[some], z[some]
    found = trials_from(held, P, z, ln_phi[some], liquid_starts(fluid, T[some], z), "L")
    with np.errstate(invalid="ignore"):
        below = found.tpd < -DEPTH
    gas = below & ~_as_liquid(held, P, np.where(below[:, None], found.w, z))[1]
    doubtful = below & ~gas & dry_ethanol(fluid, z)
    splits, told = below & ~gas & ~doubtful, found.converged & np.isfinite(found.tpd)
    cases = [gas, splits, doubtful, told]
    out["verdict"][here] = np.select(cases, [VAPOUR_FIRST, TWO_BY_THE_CHECK, DOUBTFUL, NONE_FOUND], UNSETTLED)
    status = [Status.OUT_OF_RANGE, Status.LIQUID_SPLITS, Status.CONVERGED, Status.CONVERGED]
    out["status"][here] = np.select(cases, [int(one) for one in status], int(Status.OUT_OF_STEPS))
    out["splits"][here], out["tested"][here] = splits, (told | below) & ~gas
    for name in ("tpd", "w", "iterations", "residual"):
        out[name][here] = getattr(found, name)


def _as_liquid(state, P, z):
    """ln phi (n, c) of z on its smallest root, and the mask (n,) of those that are a liquid there."""
    mixture = state.mix(z)
    ln_phi, Z = mixture.ln_phi_and_Z(P, "L")
    return ln_phi, reduced_volume(mixture, P, Z) < DENSE


def worth_testing(fluid, T, z):
    """Mask (n,) of the lanes a batch should test: the coldest, the hottest, and all with water or methanol.

    Parameters
    ----------
    fluid : Fluid
        For the names of the species.
    T : float or array, shape (n,)
        Temperature. [K]
    z : array, shape (c,) or (n, c)
        Mole fractions. [-]

    Returns
    -------
    array of bool, shape (n,)
        For `where` of `second_liquid_check`.

    Source
    ------
    Rule of this project.
    """
    z, T, good = as_lanes(fluid.c, z, T=T)
    mask = good & ((share_of(fluid, z, "water") > 0.0) | (share_of(fluid, z, "methanol") > 0.0))
    if good.any():
        mask |= good & ((T == T[good].min()) | (T == T[good].max()))
    return mask
