"""Temperature at which a fuel stands at a given vapour-liquid ratio under one atmosphere."""

from __future__ import annotations

import numpy as np

from screener.equilibrium import bubble_pressure, bubble_temperature
from screener.ground.constants import ATMOSPHERE
from screener.ground.shapes import lanes
from screener.ground.status import Status
from screener.volatility.cell import T_CHILLED, vapour_pressure_at_ratio
from screener.volatility.results import RatioTemperature, empty

STEPS = 30
TOLERANCE = 1e-9  # ln of pressure reached over pressure asked: 1e-9 is some 1e-8 K


def ratio_temperature(
    fluid, x, *, ratio=20.0, P=ATMOSPHERE, T_fill=T_CHILLED, air: bool = False, product: str | None = None
) -> RatioTemperature:
    """Temperature for a vapour-liquid ratio, T(V/L = ratio).

    Definition (ASTM D5188): one volume of liquid measured at T_fill (0 to 1 degC) in an
    evacuated cell of 1 + ratio volumes; the temperature at which the pressure in it is one
    atmosphere. For a pure liquid that is its boiling point whatever the ratio.

    Parameters
    ----------
    fluid : Fluid
        Species and model of c components.
    x : array, shape (c,) or (n, c)
        Liquid mole fractions. [-]
    ratio : float or array, shape (n,)
        Cell volume over charge, less one. [-]
    P : float or array, shape (n,)
        Pressure asked for. [Pa]
    T_fill : float or array, shape (n,)
        Temperature at which the charge is measured. [K]
    air : bool
        The charge is saturated with air under one atmosphere at T_fill, as in the method.
    product : str, optional
        "crude" for crude and condensate; otherwise the density chooses the volume correction.

    Returns
    -------
    RatioTemperature
        T (n,) [K] and status. NO_SOLUTION: the ratio overfills the cell (below about 0.1
        with a charge at 0 degC), or no liquid is left before the pressure is reached.

    Source
    ------
    ASTM D5188 sections 1, 4, 5 (scope and definition read on the publisher's pages).
    """
    z, P, ratio, T_fill, good = lanes(fluid.c, x, P=P, ratio=ratio, T_fill=T_fill)
    n = P.size
    result = empty(
        RatioTemperature, n, fluid.c, np.where(good, Status.OUT_OF_STEPS, Status.BAD_INPUT), ratio=ratio, P=P
    )
    P_air_0 = np.zeros(n)
    if air:
        P_air_0 = np.maximum(ATMOSPHERE - bubble_pressure(fluid, T_fill, z).P, 0.0)
    boiling = bubble_temperature(fluid, P, z)
    result.status[good & ~boiling.ok] = boiling.status[good & ~boiling.ok]

    def misfit(i, T):
        cell = vapour_pressure_at_ratio(
            fluid, T, z[i], ratio[i], T_fill=T_fill[i], air=air, P_air_0=P_air_0[i], product=product
        )
        return np.log(cell.P_total / P[i]), cell.status

    _secant(misfit, result, np.flatnonzero(good & boiling.ok), boiling.T)
    return result


def _secant(misfit, result, active, T_start):
    """Secant in 1/T from the boiling point upwards, where ln P is nearly straight."""
    T_0 = T_start[active]
    f_0, status = misfit(active, T_0)
    T_1 = T_0 * (1.0 - np.clip(f_0, -0.3, 0.3) / 10.0)  # ln P falls by about 10 per unit of ln T
    for step in range(1, STEPS + 1):
        done = np.abs(f_0) < TOLERANCE
        failed = ~np.isfinite(f_0)
        i = active[done]
        result.T[i], result.status[i] = T_0[done], Status.CONVERGED
        result.residual[i], result.iterations[i] = f_0[done], step
        # OUT_OF_STEPS of the cell keeps its name; whatever else failed has no temperature.
        lost = np.where(status == Status.OUT_OF_STEPS, Status.OUT_OF_STEPS, Status.NO_SOLUTION)
        result.status[active[failed]] = lost[failed]
        keep = ~(done | failed)
        if not keep.any():
            return
        active, T_0, f_0, T_1 = active[keep], T_0[keep], f_0[keep], T_1[keep]
        f_1, status = misfit(active, T_1)
        slope = (f_1 - f_0) / (1.0 / T_1 - 1.0 / T_0)
        slope = np.where(np.isfinite(slope) & (slope < -100.0), slope, -4000.0)
        T_2 = 1.0 / (1.0 / T_1 - np.clip(f_1 / slope, -4e-4, 4e-4))
        T_0, f_0, T_1 = T_1, f_1, T_2
    result.iterations[active] = STEPS
