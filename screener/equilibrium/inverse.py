"""Flashes that solve for T or P: one engine for enthalpy, entropy, volume and vapour fraction.

At given pressure (temperature) the bubble and the dew point divide the lanes.
Where the target lies between them the vapour fraction is the unknown: every
target is a smooth and nearly straight function of it, for a pure component,
whose T does not move, as for a wide-boiling blend. Outside, the feed is one
phase, and T or P follows from that phase alone. What was found is then given to
the flash at T and P. Where the two agree the flash's answer stands; where the
boiling range is too narrow for T and P to tell the vapour fraction the pair
stands; every other lane is sought by flashes between the ends of the range.
"""

from __future__ import annotations

from dataclasses import fields, replace

import numpy as np

from screener.equilibrium.ends import bubble_points, dew_points
from screener.equilibrium.flash import flash_tp
from screener.equilibrium.flash_search import PROMISED, FlashSearch, miss_of, rows_of
from screener.equilibrium.pairs import PairSearch
from screener.equilibrium.results import Flash, bad_status
from screener.equilibrium.second_liquid import NOT_TESTED, full_check, known_check
from screener.equilibrium.solved import SolvedFlash, totals_of
from screener.ground.shapes import lanes as as_lanes
from screener.ground.status import Status

MOST_NUMBERS = 40_000  # lanes times components handled at once: keeps the working arrays in cache
ALIKE = 1e-4  # [-] vapour fractions this close are one state, told more sharply by the pair; own choice


def solve_many(fluid, target, given, z, check: str) -> SolvedFlash:
    """Any number of states, valid or not, in chunks.

    Parameters
    ----------
    fluid : Fluid
        The fluid.
    target : Target
        What is asked for; its value a scalar or (n,).
    given : float or array, shape (n,)
        Temperature [K] or pressure [Pa], as the target says.
    z : array, shape (c,) or (n, c)
        Feed. [-]
    check : str
        As in `flash_tp`.

    Returns
    -------
    SolvedFlash
        One row per lane.

    Raises
    ------
    ShapeError
        z does not match the fluid, or rows do not broadcast.
    InputError
        check is no known word.

    Source
    ------
    As `solve_lanes`.
    """
    known_check(check)
    usable = np.where(np.isfinite(target.value), 1.0, np.nan)  # a negative value is fine, no number is not
    z, at, usable, good = as_lanes(fluid.c, z, **{target.given: given}, target=usable)
    n = at.size
    value = np.array(np.broadcast_to(target.value, (n,)))
    if target.what == "ratio":
        good &= ~(value < 0.0)
    status = bad_status(good)
    status[good & fluid.lacks(z)] = Status.NO_PARAMETERS
    if target.what in ("H", "S") and fluid.cp_ideal is None:
        status[good] = Status.NO_PARAMETERS
    lanes = np.flatnonzero(status == Status.OUT_OF_STEPS)
    target = replace(target, value=value)
    rows = _no_rows(at, z, status, target.given)
    for some in np.array_split(lanes, max(1, -(-lanes.size * fluid.c // MOST_NUMBERS))):
        if some.size:
            part = solve_lanes(fluid, target.take(some), at[some], z[some], check)
            for name in rows:
                rows[name][some] = getattr(part, name)
    return SolvedFlash(**rows)


def _no_rows(given, z, status, name: str):
    """Rows without an answer."""
    rows = {}
    for field in fields(SolvedFlash):
        rows[field.name] = np.full(z.shape if field.name in ("x", "y", "K", "x_W") else given.shape, np.nan)
    rows |= {"z": z, name: given, "status": status, "checks": np.full(given.shape, NOT_TESTED, dtype=object)}
    return rows | {"phases": np.zeros(given.size, dtype=int), "iterations": np.zeros(given.size, dtype=int)}


def solve_lanes(fluid, target, given, z, check: str) -> SolvedFlash:
    """The state of each lane that meets its target.

    Parameters
    ----------
    fluid : Fluid
        The fluid.
    target : Target
        What is asked for.
    given : array, shape (n,)
        Temperature [K] or pressure [Pa], as the target says.
    z : array, shape (n, c)
        Feed. [-]
    check : str
        As in `flash_tp`.

    Returns
    -------
    SolvedFlash
        One row per lane; where the target is not met NaN and a status.

    Source
    ------
    Own arrangement, after the state-function flashes of Michelsen, Fluid Phase
    Equilib. 33 (1987) 13.
    """
    bubble = bubble_points(fluid, target, given, z)
    dew = dew_points(fluid, target, given, z, np.flatnonzero(~(bubble.excess >= 0.0) | target.of_pairs))
    with np.errstate(invalid="ignore"):
        inside = (bubble.excess < 0.0) & (dew.excess > 0.0)
        two = np.flatnonzero(inside | target.of_pairs & ((bubble.excess == 0.0) | (dew.excess == 0.0)))
    unknown = _single(fluid, target, given, z, bubble, dew)
    pairs = PairSearch(fluid, target.take(two), given[two], z[two])
    pairs.run(bubble.take(two), dew.take(two))
    unknown[two] = pairs.best["P" if target.given == "T" else "T"]
    T, P = (given, unknown) if target.given == "T" else (unknown, given)
    rows = rows_of(flash_tp(fluid, T, P, z, check=check))
    rows["iterations"] += bubble.iterations + dew.iterations
    rows["iterations"][two] += pairs.iterations
    miss = miss_of(fluid, target, rows)
    stands = _stands(target.of_pairs[two], rows["beta"][two], miss[two], pairs)
    _put_pairs(fluid, rows, two[stands], pairs, np.flatnonzero(stands), check)
    miss[two[stands]] = pairs.miss[stands]
    bare = target.at_edge
    bare[two[stands]] = False
    miss[bare] = np.inf  # no saturation point, no state at the edge, whatever one phase the flash finds
    again = np.flatnonzero(~(miss <= PROMISED) & ~bare)
    if again.size:
        search = FlashSearch(fluid, target.take(again), given[again], z[again], check)
        sought, miss[again] = search.run(bubble.take(again), dew.take(again))
        sought["iterations"] += rows["iterations"][again]
        for name, value in sought.items():
            rows[name][again] = value
    answer = _answer(fluid, target, rows, miss)
    _say_why(answer.status, np.flatnonzero(bare), target, bubble, dew)
    return answer


def _stands(of_pairs, beta, miss, pairs):
    """Mask of the pairs that are a better answer than the flash at their T and P.

    They agree with it, or T and P are too close to tell, and they meet the target more sharply.
    """
    with np.errstate(invalid="ignore"):
        alike = np.abs(beta - pairs.best["beta"]) < ALIKE
        sharper = of_pairs | ~(miss <= PROMISED)
        return (pairs.miss <= PROMISED) & (alike | pairs.narrow) & sharper


def _say_why(status, bare, target, bubble, dew):
    """The status of a state at the edge that does not exist: that of its saturation point."""
    dry = target.value[bare] == 1.0 if target.what == "beta" else np.zeros(bare.size, dtype=bool)
    found = np.where(dry, dew.status[bare], bubble.status[bare])
    status[bare] = np.where(found == Status.CONVERGED, int(Status.OUT_OF_RANGE), found)


def _single(fluid, target, given, z, bubble, dew):
    """T or P (n,) of the lanes that are one phase by their bubble or dew point, NaN for the others."""
    unknown = np.full(given.shape, np.nan)
    with np.errstate(invalid="ignore"):
        liquid = bubble.excess >= 0.0
        vapour = (dew.excess <= 0.0) & ~liquid
    for mask, end in ((liquid, bubble), (vapour, dew)):
        some = np.flatnonzero(mask & ~target.of_pairs)
        if some.size:
            unknown[some] = target.take(some).single(
                fluid, given[some], z[some], end is bubble, end.edge[some]
            )
    return unknown


def _put_pairs(fluid, rows, lanes, pairs, some, check: str):
    """Write pairs found by fraction over the flash's rows."""
    if lanes.size == 0:
        return
    best = {name: value[some] for name, value in pairs.best.items()}
    for name in ("T", "P", "beta", "x", "y", "residual", "balance"):
        rows[name][lanes] = best[name]
    rows["K"][lanes] = np.where(best["x"] > 0.0, np.exp(best["ln_K"]), np.nan)
    rows["phases"][lanes], rows["status"][lanes] = 2, Status.CONVERGED
    rows["beta_W"][lanes] = rows["x_W"][lanes] = rows["tpd"][lanes] = np.nan
    rows["checks"][lanes] = NOT_TESTED
    if check == "full":
        T, P, x = best["T"], best["P"], best["x"]
        state = fluid.at(T)
        found, splits, text = full_check(
            fluid, state, P, rows["z"][lanes], x, state.ln_phi(P, x, "L"), fluid.wilson_K(T, P)
        )
        rows["tpd"][lanes], rows["checks"][lanes] = found.tpd, text
        rows["status"][lanes[splits]] = Status.LIQUID_SPLITS
        rows["status"][lanes[~np.isfinite(found.tpd)]] = Status.OUT_OF_STEPS


def _answer(fluid, target, rows, miss) -> SolvedFlash:
    """The rows with their totals; NaN where the target is not met."""
    lost = ~(miss <= PROMISED)
    status = rows["status"]
    status[lost & ((status == Status.CONVERGED) | (status == Status.BAD_INPUT))] = Status.OUT_OF_STEPS
    status[lost & (status == Status.LIQUID_SPLITS)] = Status.OUT_OF_STEPS
    for name, value in rows.items():
        if value.dtype.kind == "f" and name not in ("z", target.given):
            value[lost] = np.nan
    rows["phases"][lost] = 0
    rows["checks"][lost] = NOT_TESTED
    H, S, v, v_L, v_V = totals_of(fluid, Flash(**rows))
    return SolvedFlash(**rows, H=H, S=S, v=v, v_L=v_L, v_V=v_V, miss=miss)
