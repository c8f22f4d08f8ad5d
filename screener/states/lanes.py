"""Cases become one table of lanes.

Every case gives five liquids: the receipt alone, the heel alone, and their
mixture with the tank filled to its low, normal and high level. All arrays run
over (case, liquid) and, where a temperature is known only within a range, over
(case, liquid, edge) with edges low, best, high. One case or two thousand take
the same path; a lane that cannot be worked out holds NaN and its status.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.blends import mix, union
from screener.equilibrium import Fluid, bubble_pressure, flash_tp
from screener.ground.status import Status
from screener.species import find
from screener.states.inputs import Inputs
from screener.states.volumes import density_15, expansion
from screener.states.weather import Weather
from screener.tank import horizontal_liquid_volume, vertical_liquid_volume

LIQUIDS = (("receipt", ""), ("heel", ""), ("mixture", "low"), ("mixture", "normal"), ("mixture", "high"))
RECEIPT, HEEL, LOW, NORMAL, HIGH = range(5)
EDGES = ("low", "best", "high")
BEST = 1

AIR = ("nitrogen", "oxygen")
AIR_SHARES = np.array(
    [0.79, 0.21]
)  # dry air with its argon counted as nitrogen, by moles; common practice, no source

METHOD_SPREAD = 0.05  # least relative spread of any computed vapour pressure; rule of this project
SPREAD_COUNTED = (
    0.03  # disagreement of pure vapour-pressure curves above this is carried; rule of this project
)


@dataclass(frozen=True)
class Lanes:
    """The table of lanes of n cases over c species.

    z (n, 5, c) [-]; level (n, 5) at which each liquid is judged [m];
    present (n, 5); T_own (n, 5) temperature the liquid brings along [K];
    T_hot (n, 5, 3) hottest liquid [K]; P_hot, P_hot_low, P_hot_high (n, 5) its
    bubble pressure with range [Pa]; P_legal (n, 5, 3) the same at
    the highest monthly mean, the high end at the own temperature if that is higher [Pa]; P_receipt (n, 3)
    bubble pressure at arrival [Pa]; beta (n, 3) vapour fraction at arrival [-];
    beta_gas (n,) the same with the air the receipt is stated to hold, NaN where
    none is stated; y_receipt, y_hot vapour compositions; status_* per lane.
    """

    inputs: Inputs
    weather: Weather
    fluid: Fluid
    names: tuple[str, ...]
    z: np.ndarray
    level: np.ndarray
    present: np.ndarray
    T_own: np.ndarray
    T_hot: np.ndarray
    P_hot: np.ndarray
    y_hot: np.ndarray
    status_hot: np.ndarray
    T_legal: np.ndarray
    P_legal: np.ndarray
    status_legal: np.ndarray
    P_receipt: np.ndarray
    status_receipt: np.ndarray
    beta: np.ndarray
    beta_gas: np.ndarray
    y_receipt: np.ndarray
    status_flash: np.ndarray
    worst_residual: float
    failed: int


def _any_air(cases) -> bool:
    return any(case.line.receipt and case.line.receipt.dissolved_gas == "air-saturated" for case in cases)


def _compositions(cases):
    """names (c,), composition (2, n, c) of receipt and heel, and which cases have a heel (n,)."""
    blends = [case.blend for case in cases]
    heels = [case.tank.contents.blend if case.tank.contents else case.blend for case in cases]
    names, Z = union(blends + heels)
    extra = [name for name in AIR if name not in names] if _any_air(cases) else []
    Z = np.pad(Z, ((0, 0), (0, len(extra))))
    has_heel = np.array([case.tank.contents is not None for case in cases])
    return names + tuple(extra), Z.reshape(2, len(cases), -1), has_heel


def _filled(inputs) -> np.ndarray:
    """Liquid volume (n, 3) with the tank at its low, normal and high level. [m3]"""
    levels = np.stack([inputs["level_low"], inputs["level_normal"], inputs["level_high"]], axis=1)
    lying = np.isfinite(inputs["tank_length"])[:, None]
    D, length = inputs["shell_diameter"][:, None], inputs["tank_length"][:, None]
    upright = vertical_liquid_volume(D, inputs["shell_height"][:, None], levels)
    return np.where(lying, horizontal_liquid_volume(D, np.where(lying, length, 1.0), levels), upright)


def _mixtures(inputs, fluid, Z, has_heel):
    """z (n, 5, c), T_own (n, 5) and present (n, 5) of receipt, heel and their mixtures.

    The receipt is filled on the heel until the level stands at low, normal and
    high; where the heel alone stands above a level, the lane of that level is
    heel alone. Volumes at tank temperature become standard volumes by the
    volume correction of the trade; standard volumes add without shrinkage. The
    mixture's temperature is the mean weighted by heat capacity taken as equal
    per mass.
    """
    n = len(has_heel)
    T_r, T_h = inputs["receipt_temperature"], inputs["heel_temperature"]
    heel_volume = np.where(has_heel, inputs["heel_volume"], np.nan)[:, None]
    filled = _filled(inputs)
    received = np.maximum(filled - heel_volume, 0.0) / expansion(fluid, T_r, Z[0])[:, None]
    left = np.minimum(heel_volume, filled) / expansion(fluid, T_h, Z[1])[:, None]
    z = np.empty((n, 5, fluid.c))
    z[:, RECEIPT], z[:, HEEL] = Z
    for k in range(3):
        z[:, LOW + k] = mix(fluid.names, Z[0], received[:, k], Z[1], left[:, k])
    mass_r = received * density_15(fluid, Z[0])[:, None]
    mass_h = left * density_15(fluid, Z[1])[:, None]
    share = mass_r / (mass_r + mass_h)
    T_own = np.column_stack([T_r, T_h, share * T_r[:, None] + (1.0 - share) * T_h[:, None]])
    present = np.column_stack([np.ones(n, bool), np.repeat(has_heel[:, None], 4, axis=1)])
    return z, T_own, present


def _bubble(fluid, T, z, mask):
    """Bubble pressure (...), y (..., c), status (...) and residual (...) of the lanes in mask."""
    shape, c = T.shape, fluid.c
    P = np.full(shape, np.nan)
    y = np.full((*shape, c), np.nan)
    status = np.full(shape, Status.BAD_INPUT, dtype=int)
    residual = np.full(shape, np.nan)
    wanted = mask & np.isfinite(T)
    if wanted.any():
        answer = bubble_pressure(fluid, T[wanted], np.broadcast_to(z, (*shape, c))[wanted])
        P[wanted] = np.where(answer.ok, answer.P, np.nan)
        y[wanted] = np.where(answer.ok[:, None], answer.y, np.nan)
        status[wanted], residual[wanted] = answer.status, answer.residual
    return P, y, status, residual, wanted


def _method_spread(y, spreads):
    """Relative method spread (...) of a vapour pressure: 5 % and what its vapour species add."""
    carried = np.where(spreads > SPREAD_COUNTED, spreads, 0.0)
    return METHOD_SPREAD + np.nansum(y * carried, axis=-1)


def _hottest_liquid(weather: Weather, T_own, has_receipt):
    """Hottest liquid (n, 5, 3): the surface of the hottest day, or the liquid's own temperature if warmer.

    Where the case describes a receipt or a heel, its temperature has to be
    known; a liquid that only stands in the tank follows the weather.
    """
    own = np.where(has_receipt[:, None], T_own, np.where(np.isnan(T_own), -np.inf, T_own))
    own[:, RECEIPT] = np.where(has_receipt, T_own[:, RECEIPT], -np.inf)
    return np.maximum(weather.T_surface[:, None, :], own[:, :, None])


def _legal_temperatures(weather: Weather, T_own) -> np.ndarray:
    """Highest monthly mean, and the warmest a month's storage can be (n, 5, 2). [K]

    A liquid that comes in warmer than the monthly mean of the air may keep the
    tank above it; its own temperature bounds that, and is the high end.
    """
    mean = np.broadcast_to(weather.T_legal[:, None], T_own.shape)
    return np.stack([mean, np.where(T_own > mean, T_own, mean)], axis=-1)


def evaluate(inputs: Inputs, weather: Weather) -> Lanes:
    """Work out every liquid of every case: compositions, bubble pressures, the receipt's flash."""
    cases = inputs.cases
    names, Z, has_heel = _compositions(cases)
    fluid = Fluid.of(names)
    z, T_own, present = _mixtures(inputs, fluid, Z, has_heel)
    has_receipt = np.array([case.line.receipt is not None for case in cases])
    T_hot = _hottest_liquid(weather, T_own, has_receipt)
    known = present & np.isfinite(z).all(axis=-1)
    spreads = psat_spreads(names)

    P_hot, y, status_hot, res_hot, asked_hot = _bubble(fluid, T_hot, z[:, :, None, :], known[:, :, None])
    spread = _method_spread(y, spreads)
    P_hot = _with_edges(P_hot, spread)
    T_legal = _legal_temperatures(weather, T_own)
    P_two, y_legal, status_legal, res_legal, asked_legal = _bubble(
        fluid, T_legal, z[:, :, None, :], known[:, :, None]
    )
    spread = _method_spread(y_legal, spreads)
    P_legal = np.stack(
        [P_two[:, :, 0] * (1.0 - spread[:, :, 0]), P_two[:, :, 0], P_two[:, :, 1] * (1.0 + spread[:, :, 1])],
        axis=-1,
    )

    flash = _receipt(fluid, z[:, RECEIPT], T_own[:, RECEIPT], weather.barometer, spreads, has_receipt)
    P_receipt, status_receipt, beta, y_receipt, status_flash, res_receipt, asked_receipt = flash
    beta_gas = _with_air(fluid, z[:, RECEIPT], T_own[:, RECEIPT], inputs, weather.barometer)
    residuals = np.concatenate([res_hot[asked_hot], res_legal[asked_legal], res_receipt[asked_receipt]])
    statuses = np.concatenate(
        [status_hot[asked_hot], status_legal[asked_legal], status_receipt[asked_receipt]]
    )
    level = np.column_stack(
        [inputs[k] for k in ("level_low", "level_low", "level_low", "level_normal", "level_high")]
    )
    return Lanes(
        inputs, weather, fluid, names, z, level, present, T_own, T_hot, P_hot, y[:, :, BEST],
        status_hot, weather.T_legal, P_legal, status_legal[:, :, 0], P_receipt, status_receipt, beta, beta_gas, y_receipt,
        status_flash, float(np.nanmax(residuals, initial=0.0)), int((statuses != Status.CONVERGED).sum()),
    )  # fmt: skip


_SIGNS = np.array([-1.0, 0.0, 1.0])


def _with_edges(P, spread):
    """Widen low and high of P (..., 3) by the relative spread (..., 3)."""
    return P * (1.0 + spread * _SIGNS)


def _receipt(fluid, z, T, barometer, spreads, has_receipt):
    """Bubble pressure at arrival (n, 3) and the flash at tank pressure: beta (n, 3), y (n, c).

    The range of beta comes from flashing at a tank pressure moved by the method
    spread of the vapour pressure, which does to the flash what an error of the
    vapour pressure would.
    """
    n = len(T)
    P, y, status, residual, asked = _bubble(fluid, T, z, has_receipt)
    spread = _method_spread(y, spreads)
    P = P[:, None] * (1.0 + spread[:, None] * _SIGNS)
    beta, y_flash = np.full((n, 3), np.nan), np.full((n, fluid.c), np.nan)
    status_flash = np.full((n, 3), Status.BAD_INPUT, dtype=int)
    go = np.isfinite(T) & np.isfinite(barometer) & has_receipt
    if go.any():
        tank = barometer[go][:, None] / (1.0 + spread[go][:, None] * _SIGNS)
        tank = np.where(np.isfinite(tank), tank, barometer[go][:, None])
        answer = flash_tp(fluid, np.repeat(T[go], 3), tank.ravel(), np.repeat(z[go], 3, axis=0))
        ok = answer.ok.reshape(-1, 3)
        beta[go] = np.where(ok, np.clip(answer.beta.reshape(-1, 3), 0.0, 1.0), np.nan)
        y_flash[go] = np.where(ok[:, 1, None], answer.y.reshape(-1, 3, fluid.c)[:, 1], np.nan)
        status_flash[go] = answer.status.reshape(-1, 3)
    return P, status, beta, y_flash, status_flash, residual, asked


def _with_air(fluid, z, T, inputs, barometer):
    """Vapour fraction (n,) at arrival of a receipt that was saturated with air at its stated temperature.

    Air and vapour shared the barometer where it was saturated; the air that
    dissolved follows from the fugacity coefficients at infinite dilution. A
    lane whose receipt is not stated to be saturated holds NaN.
    """
    T_sat = np.array([
        case.line.receipt.saturated_at or np.nan
        if case.line.receipt and case.line.receipt.dissolved_gas == "air-saturated" else np.nan
        for case in inputs.cases
    ])  # fmt: skip
    beta = np.full(len(T_sat), np.nan)
    go = np.isfinite(T_sat) & np.isfinite(T) & np.isfinite(barometer)
    if not go.any():
        return beta
    z, T, T_sat, P = z[go], T[go], T_sat[go], barometer[go]
    bubble = bubble_pressure(fluid, T_sat, z)
    air = np.clip(P - bubble.P, 0.0, None) / P
    gas = [fluid.names.index(name) for name in AIR]
    y = np.where(np.isfinite(bubble.y), bubble.y, 0.0) * (1.0 - air)[:, None]
    y[:, gas] += air[:, None] * AIR_SHARES
    y /= y.sum(axis=1, keepdims=True)
    ln_K = fluid.ln_phi(T_sat, P, z, "L") - fluid.ln_phi(T_sat, P, y, "V")
    full = z.copy()
    full[:, gas] += y[:, gas] / np.exp(ln_K[:, gas])
    full /= full.sum(axis=1, keepdims=True)
    answer = flash_tp(fluid, T, P, np.where(np.isfinite(full), full, np.nan))
    beta[go] = np.where(answer.ok & bubble.ok, np.clip(answer.beta, 0.0, 1.0), np.nan)
    return beta


def method_spread(lanes: Lanes, y) -> np.ndarray:
    """Relative method spread (n,) of vapour pressures whose vapour is y (n, c). [-]"""
    return _method_spread(np.asarray(y), psat_spreads(lanes.names))


def psat_spreads(names) -> np.ndarray:
    """Error bar of each species' vapour-pressure curve: disagreement or extension, 0 where none is known. [-]"""
    return np.array([find(name).psat_error or 0.0 for name in names])
