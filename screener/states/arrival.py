"""The receipt as it enters the tank: does it boil, how much vapour, and what dissolved air adds."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.ground.status import Status
from screener.states.pressures import bubble, edges, relative_spread
from screener.states.scaled import bubble_pressure, flash_from_liquid, flash_tp

AIR = ("nitrogen", "oxygen")
AIR_SHARES = np.array(
    [0.79, 0.21]
)  # dry air with its argon counted as nitrogen, by moles; common practice, no source
BEST = 1


@dataclass(frozen=True)
class Arrival:
    """The receipt as it enters the tank.

    P (n, 3) bubble pressure at arrival with its range [Pa]; beta (n, 3) vapour fraction at tank
    pressure, isenthalpic with the isothermal high end [-]; isothermal (n,) upper bound of the best
    value [-]; T_after (n,) [K]; y (n, c) vapour of the isenthalpic flash, NaN without vapour;
    status (n,) of the bubble point, status_flash (n, 3).
    """

    P: np.ndarray
    status: np.ndarray
    beta: np.ndarray
    isothermal: np.ndarray
    T_after: np.ndarray
    y: np.ndarray
    status_flash: np.ndarray


def arrival(fluid, z, T, barometer, errors, has_receipt, measured):
    """The receipt on arrival: bubble pressure (n, 3) and its flash at tank pressure.

    measured is that of all liquids of the cases; the receipt is the first of them.

    Nothing heats the liquid as it enters, so the flash is isenthalpic: beta low
    and best, y and the temperature it cools to. The isothermal flash gives more
    vapour; it is the upper bound and the high end. The range comes from a tank
    pressure moved by the method spread of the vapour pressure, which does to
    the flash what an error of the vapour pressure would.
    """
    n = len(T)
    factor = measured.factor[:, 0]
    at_bubble, y, status, residual, asked = bubble(fluid, T, z, has_receipt, factor)
    spread = measured.wider(relative_spread(y, errors), 0)
    P = at_bubble[:, None] * edges(spread[:, None])
    go = np.isfinite(T) & np.isfinite(barometer) & has_receipt
    tank = barometer[:, None] / edges(np.where(np.isfinite(spread), spread, 0.0)[:, None])
    isothermal, y_flash = np.full((n, 3), np.nan), np.full((n, fluid.c), np.nan)
    status_flash = np.full((n, 3), Status.BAD_INPUT, dtype=int)
    if go.any():
        three = np.repeat(np.flatnonzero(go), 3)
        answer = flash_tp(fluid, T[three], tank[go].ravel(), z[three], factor[three])
        ok = answer.ok.reshape(-1, 3)
        isothermal[go] = np.where(ok, np.clip(answer.beta.reshape(-1, 3), 0.0, 1.0), np.nan)
        status_flash[go] = answer.status.reshape(-1, 3)
    # The flash holds settled water in the one liquid, where it boils too soon; the bubble point does not.
    isothermal = np.where(np.isfinite(isothermal) & (at_bubble[:, None] <= tank), 0.0, isothermal)
    beta, T_after = isothermal.copy(), np.where(isothermal[:, BEST] == 0.0, T, np.nan)
    boils = np.flatnonzero(isothermal[:, BEST] > 0.0)
    if boils.size:
        answer, fed = flash_from_liquid(
            fluid, T[boils], tank[boils, BEST], z[boils], factor[boils], tank[boils, :2]
        )
        ok = (answer.ok & np.repeat(fed, 2)).reshape(-1, 2)
        beta[boils, :2] = np.where(ok, np.clip(answer.beta.reshape(-1, 2), 0.0, 1.0), np.nan)
        T_after[boils] = np.where(ok[:, BEST], answer.T.reshape(-1, 2)[:, BEST], np.nan)
        y_flash[boils] = np.where(ok[:, BEST, None], answer.y.reshape(-1, 2, fluid.c)[:, BEST], np.nan)
        status_flash[boils, :2] = answer.status.reshape(-1, 2)
    return Arrival(P, status, beta, isothermal[:, BEST], T_after, y_flash, status_flash), residual, asked


def vapour_with_air(fluid, z, T, inputs, barometer, factor):
    """Vapour fraction (n,) at arrival of a receipt that was saturated with air at its stated temperature.

    Air and vapour shared the barometer where it was saturated; the air that
    dissolved follows from the fugacity coefficients at infinite dilution. A
    lane whose receipt is not stated to be saturated holds NaN. The factor (n,) [-] of a measured
    vapour pressure lies on the air as well, in what dissolves and in what comes out: left out of one of
    them, a liquid kept at its temperature would give off air it never took up.
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
    z, T, T_sat, P, factor = z[go], T[go], T_sat[go], barometer[go], factor[go]
    bubble = bubble_pressure(fluid, T_sat, z, factor)
    air = np.clip(P - bubble.P, 0.0, None) / P
    gas = [fluid.names.index(name) for name in AIR]
    y = np.where(np.isfinite(bubble.y), bubble.y, 0.0) * (1.0 - air)[:, None]
    y[:, gas] += air[:, None] * AIR_SHARES
    y /= y.sum(axis=1, keepdims=True)
    ln_K = fluid.ln_phi(T_sat, P / factor, z, "L") - fluid.ln_phi(T_sat, P / factor, y, "V")
    full = z.copy()
    full[:, gas] += y[:, gas] / np.exp(ln_K[:, gas])
    full /= full.sum(axis=1, keepdims=True)
    answer = flash_tp(fluid, T, P, np.where(np.isfinite(full), full, np.nan), factor)
    beta[go] = np.where(answer.ok & bubble.ok, np.clip(answer.beta, 0.0, 1.0), np.nan)
    return beta
