"""Fire and health of every lane: fuel share of the vapour space against its limits, flash point, exposure.

The vapour space is judged in equilibrium over the whole span from the coldest to the
hottest liquid surface of the month asked: it passes through every temperature between. The
temperatures stand at equal steps of 1/T, so each step multiplies the share by about the same
factor; where it still steps from too lean to too rich, the first temperature between is worked out too.

The range of a share carries three things: the method spread of the vapour pressure, the
stated error of estimated limits (turned into an equal change of the share), and at both ends of
the span the range of its temperature. A rich space is also judged after the liquid has filled the
space at its level and lost light ends to it.

The lowest barometer is taken: it gives the largest share.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.fire import Exposure, Headspace, exposure
from screener.ground.status import Status
from screener.states.flash import FlashLanes, flash_lanes
from screener.states.inert import OxygenLanes, oxygen_lanes
from screener.states.lanes import BEST, Lanes, filled_volumes
from screener.states.pressures import LEAST_LEFT, psat_errors, relative_spread
from screener.states.previous import Previous, previous_contents
from screener.states.scaled import vapour_space

STEPS = 9  # temperatures from the coldest to the hottest surface
LEAN, INSIDE, RICH = -1, 0, 1
COLD, HOT = 0, STEPS - 1  # places of the ends among the temperatures


@dataclass(frozen=True)
class SpaceLanes:
    """The worst temperature of every liquid, arrays (n, 5) unless said.

    T [K]; place 0 (coldest) to STEPS - 1 (hottest); depleted, whether the liquid had lost
    light ends to the space; fuel, low, high share of flammable vapour with its range, LFL and
    UFL of that vapour [-]; estimated share of the vapour whose limit (the one it is near) is an
    estimate [-]; saturation_lower and _upper [-] degrees of saturation between which this liquid
    makes a flammable space at T; side LEAN, INSIDE or RICH; density over that of air [-]; T_low and
    T_high (n, 5) [K] of the span; ratio vapour space over liquid [-]; y (n, 5, STEPS, c) [-] vapour in
    the space at every temperature, T_all (n, 5, STEPS) [K]; status of T.
    """

    T: np.ndarray
    place: np.ndarray
    depleted: np.ndarray
    fuel: np.ndarray
    low: np.ndarray
    high: np.ndarray
    LFL: np.ndarray
    UFL: np.ndarray
    estimated: np.ndarray
    saturation_lower: np.ndarray
    saturation_upper: np.ndarray
    side: np.ndarray
    density: np.ndarray
    T_low: np.ndarray
    T_high: np.ndarray
    ratio: np.ndarray
    y: np.ndarray
    T_all: np.ndarray
    status: np.ndarray


def coldest_liquid(lanes: Lanes) -> np.ndarray:
    """Coldest liquid (n, 5, 3): the coldest surface, or the liquid's own temperature if colder. [K]"""
    has_receipt = np.array([case.line.receipt is not None for case in lanes.inputs.cases])
    own = np.where(has_receipt[:, None], lanes.T_own, np.where(np.isnan(lanes.T_own), np.inf, lanes.T_own))
    own[:, 0] = np.where(has_receipt, lanes.T_own[:, 0], np.inf)
    return np.minimum(lanes.weather.T_cold[:, None, :], own[:, :, None])


def vapour_ratio(lanes: Lanes, volume) -> np.ndarray:
    """Vapour space over liquid (n, 5) at the level of each liquid; volume (n,) [m3] of the tank. [-]

    Under a landed roof the space ends at the height of its legs.
    """
    inputs = lanes.inputs
    liquid = filled_volumes(inputs)[:, [0, 0, 0, 1, 2]]
    floating = np.array(["floating" in case.tank.kind for case in inputs.cases])
    whole = np.where(floating, volume * inputs["roof_leg_height"] / inputs["shell_height"], volume)
    with np.errstate(all="ignore"):
        ratio = (whole[:, None] - liquid) / liquid
    return np.where(np.isfinite(ratio) & (ratio > 0.0), ratio, np.nan)


def space_lanes(lanes: Lanes, volume, steps: int = STEPS) -> SpaceLanes:
    """The vapour space of every liquid at its worst temperature; volume (n,) [m3] of the tank."""
    T_cold, T_hot = coldest_liquid(lanes), lanes.T_hot
    part = np.linspace(0.0, 1.0, steps)
    with np.errstate(all="ignore"):
        T = 1.0 / ((1.0 - part) / T_cold[:, :, BEST, None] + part / T_hot[:, :, BEST, None])
    T = np.concatenate([T, T_cold[:, :, :1], T_hot[:, :, 2:]], axis=2)
    known = lanes.present & np.isfinite(lanes.z).all(axis=-1)
    errors = psat_errors(lanes.names)
    rows = _rows(lanes, T, known, errors)
    rows = _between(lanes, rows, steps, errors)
    ratio = vapour_ratio(lanes, volume)
    rows = _depleted(lanes, rows, ratio, steps, errors)
    return _worst(rows, steps, T_cold[:, :, BEST], T_hot[:, :, BEST], ratio)


@dataclass
class _Rows:
    """Vapour spaces (n, 5, m) before the worst is chosen: columns of steps, the two edges, the depleted one."""

    T: np.ndarray
    fuel: np.ndarray
    LFL: np.ndarray
    UFL: np.ndarray
    lower: np.ndarray
    upper: np.ndarray
    low: np.ndarray
    high: np.ndarray
    estimated_lower: np.ndarray
    estimated_upper: np.ndarray
    saturation_lower: np.ndarray
    saturation_upper: np.ndarray
    density: np.ndarray
    status: np.ndarray
    y: np.ndarray


_SCALARS = tuple(name for name in _Rows.__dataclass_fields__ if name != "y")


def _rows(lanes, T, known, errors, ratio=None) -> _Rows:
    """Vapour space at T (n, 5, m); NaN in lanes that are not known."""
    P = np.broadcast_to(lanes.weather.barometer[:, None, None], T.shape)
    factor = lanes.measured.factor[:, :, None]
    go = known[:, :, None] & np.isfinite(T) & np.isfinite(P)
    out = {name: np.full(T.shape, np.nan) for name in _SCALARS}
    out["T"], out["status"] = T, np.full(T.shape, int(Status.BAD_INPUT))
    y = np.full((*T.shape, lanes.fluid.c), np.nan)
    if go.any():
        z = np.broadcast_to(lanes.z[:, :, None, :], y.shape)[go]
        more = {} if ratio is None else {"ratio": np.broadcast_to(ratio, T.shape)[go]}
        space = vapour_space(lanes.fluid, T[go], z, np.broadcast_to(factor, T.shape)[go], P=P[go], **more)
        y[go] = space.y
        vapour = space.y / space.y.sum(axis=1, keepdims=True)
        s = _wider(lanes, go, relative_spread(vapour, errors))
        down = np.maximum(1.0 - s, LEAST_LEFT)
        found = {
            "fuel": space.fuel, "LFL": space.LFL, "UFL": space.UFL, "status": space.status,
            "lower": space.lower_ratio_low * down, "upper": space.upper_ratio_high * (1.0 + s),
            "low": space.upper_ratio_low * down, "high": space.lower_ratio_high * (1.0 + s),
            "estimated_lower": space.estimated_lower, "estimated_upper": space.estimated_upper,
            "saturation_lower": space.saturation_lower, "saturation_upper": space.saturation_upper,
            "density": space.density_ratio,
        }  # fmt: skip
        for name, values in found.items():
            out[name][go] = values
    return _Rows(y=y, **out)


def _wider(lanes, go, spread):
    """The method spread of the lanes in go (n, 5, m), with what was measured of their liquids."""
    whole = np.zeros(go.shape)
    whole[go] = spread
    return lanes.measured.wider(whole)[go]


def _side(rows: _Rows) -> np.ndarray:
    """LEAN, INSIDE or RICH of every lane; LEAN where there is no number, which the status tells."""
    return np.where(rows.fuel > rows.UFL, RICH, np.where(rows.fuel >= rows.LFL, INSIDE, LEAN))


def _put(rows: _Rows, at, new: _Rows, taken) -> None:
    """Write the lanes `taken` of new into the places `at` of rows, both index tuples."""
    for name in (*_SCALARS, "y"):
        getattr(rows, name)[at] = getattr(new, name)[taken]


def _between(lanes, rows, steps, errors) -> _Rows:
    """Where a step leads from too lean to too rich, the temperature at which the share is inside, in its place."""
    side, ok = _side(rows)[:, :, :steps], rows.status[:, :, :steps] == Status.CONVERGED
    over = (side[:, :, :-1] == LEAN) & (side[:, :, 1:] == RICH) & ok[:, :, :-1] & ok[:, :, 1:]
    if not over.any():
        return rows
    i, k, j = np.nonzero(over)
    with np.errstate(all="ignore"):
        u, g = 1.0 / rows.T, np.log(rows.fuel / np.sqrt(rows.LFL * rows.UFL))
        middle = u[i, k, j] - g[i, k, j] * (u[i, k, j + 1] - u[i, k, j]) / (g[i, k, j + 1] - g[i, k, j])
    T = np.full((*side.shape[:2], 1), np.nan)
    T[i, k, 0] = 1.0 / middle
    new = _rows(lanes, T, np.isfinite(T[:, :, 0]), errors)
    # The warmer of the two gives way, the hottest end excepted: its temperature is a result of its own.
    place = np.where(j + 1 < steps - 1, j + 1, np.where(j > 0, j, j + 1))
    _put(rows, (i, k, place), new, (i, k, np.zeros_like(i)))
    return rows


def _depleted(lanes, rows, ratio, steps, errors) -> _Rows:
    """One more column: the coldest temperature after the liquid filled the space of its level, where that is rich."""
    wanted = (_side(rows)[:, :, COLD] == RICH) & np.isfinite(ratio)
    T = np.where(wanted, rows.T[:, :, COLD], np.nan)[:, :, None]
    new = _rows(lanes, T, wanted, errors, np.where(wanted, ratio, 0.0)[:, :, None])
    with np.errstate(all="ignore"):
        # What the cold edge of the temperature does to the space without loss, it does to this one.
        edge = rows.low[:, :, steps] / rows.low[:, :, COLD]
    new.low *= edge[:, :, None]
    joined = {name: np.concatenate([getattr(rows, name), getattr(new, name)], axis=2) for name in (*_SCALARS, "y")}
    return _Rows(**joined)


def _worst(rows: _Rows, steps: int, T_low, T_high, ratio) -> SpaceLanes:
    """The worst column of every liquid: deepest inside, else one without an answer, else nearest to the range."""
    side, ok = _side(rows), rows.status == Status.CONVERGED
    extra = steps + 2  # the depleted column
    low, high = rows.low.copy(), rows.high.copy()
    low[:, :, COLD], high[:, :, steps - 1] = rows.low[:, :, steps], rows.high[:, :, steps + 1]
    lower = rows.lower.copy()
    lower[:, :, COLD] = rows.lower[:, :, steps]
    with np.errstate(all="ignore"):
        depth = np.minimum(np.log(rows.fuel / rows.LFL), np.log(rows.UFL / rows.fuel))
        gap = np.where(side == RICH, -np.log(low), np.log(high))  # above zero: the range crosses the limit
        score = np.where(side == INSIDE, 1e6 + depth, np.where(np.isnan(gap), 1e3, gap))
        score = np.where(ok, score, 1e5)
        shown_low = np.where(side == RICH, rows.UFL * low, rows.LFL * lower)
        upper = np.where(np.arange(rows.T.shape[2]) == steps - 1, rows.upper[:, :, [steps + 1]], rows.upper)
        shown_high = np.where(side == LEAN, rows.LFL * high, np.minimum(rows.UFL * upper, 1.0))
    columns = np.arange(rows.T.shape[2])
    score[:, :, [steps, steps + 1]] = -np.inf
    score[:, :, extra] = np.where(ok[:, :, extra], score[:, :, extra], -np.inf)
    at = np.argmax(score, axis=2)[:, :, None]

    def pick(values):
        return np.take_along_axis(values, at, axis=2)[:, :, 0]

    estimated = np.where(side == RICH, rows.estimated_upper, rows.estimated_lower)
    estimated = np.where(side == INSIDE, np.fmax(rows.estimated_lower, rows.estimated_upper), estimated)
    place = np.where(columns == extra, COLD, columns)
    return SpaceLanes(
        pick(rows.T), place[at[:, :, 0]], at[:, :, 0] == extra, pick(rows.fuel), pick(shown_low), pick(shown_high),
        pick(rows.LFL), pick(rows.UFL), pick(estimated), pick(rows.saturation_lower), pick(rows.saturation_upper),
        pick(side), pick(rows.density), T_low, T_high, ratio, rows.y[:, :, :steps], rows.T[:, :, :steps],
        pick(rows.status),
    )  # fmt: skip


def hottest_headspace(lanes: Lanes, space: SpaceLanes) -> Headspace:
    """Vapour over every liquid (n*5 lanes, liquid fastest) at the hottest temperature of the span."""
    y, T = space.y[:, :, HOT].reshape(-1, lanes.fluid.c), space.T_all[:, :, HOT].ravel()
    P = np.repeat(lanes.weather.barometer, space.T.shape[1])
    ok = np.isfinite(y).all(axis=1)
    status = np.where(ok, int(Status.CONVERGED), int(Status.BAD_INPUT))
    none = np.full(T.shape, np.nan)
    return Headspace(
        T, P, lanes.names, lanes.fluid.MW, y * P[:, None], y, none, np.zeros(T.shape, dtype=bool), status, none
    )


@dataclass(frozen=True)
class FireStates:
    """All that the findings about fire and health read: vapour space, flash point, exposures (one a limit, lanes
    n*5), limiting oxygen, previous contents (one a case)."""

    space: SpaceLanes
    flash: FlashLanes
    exposures: tuple[Exposure, ...]
    oxygen: OxygenLanes
    previous: tuple[Previous | None, ...]


def fire_states(lanes: Lanes, volume) -> FireStates:
    """Fire and health of every lane; volume (n,) of the tank [m3]."""
    space = space_lanes(lanes, volume)
    exposures = exposure(hottest_headspace(lanes, space))
    return FireStates(space, flash_lanes(lanes), exposures, oxygen_lanes(lanes, space.y), previous_contents(lanes))
