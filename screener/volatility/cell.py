"""A liquid closed into a cell of fixed volume: vapour pressure at a vapour-liquid ratio.

One volume of liquid, measured at its filling temperature, goes into a cell of 1 + ratio
volumes. With concentrations a_i = k_i/(P v_V) of vapour per mole fraction of liquid,
k_i = P K_i, the balance of each species reads x_i = z_i/(n_L + a_i V_V) and sum x_i = 1
fixes the liquid left, n_L; k_i hardly depends on pressure, so a few rounds settle it.
"""

from __future__ import annotations

import numpy as np

from screener.equilibrium import bubble_pressure
from screener.ground.constants import ATMOSPHERE
from screener.ground.shapes import lanes
from screener.ground.status import Status
from screener.volatility.air import cell_air_pressure
from screener.volatility.liquid_volume import liquid_expansion, standard_density, standard_molar_volume
from screener.volatility.results import CellPressure, empty

T_CHILLED = 273.65  # middle of 0 to 1 degC, filling temperature of ASTM D5191 (from memory, unverified) [K]
STEPS = 60
TOLERANCE = 1e-10  # largest change of ln k: pressures are then good to about as many digits


def vapour_pressure_at_ratio(
    fluid, T, x, ratio, *, T_fill=T_CHILLED, air: bool = False, P_air_0=None, product: str | None = None
) -> CellPressure:
    """Pressure in a cell that holds a liquid and a vapour space of `ratio` times its volume.

    Parameters
    ----------
    fluid : Fluid
        Species and model of c components.
    T : float or array, shape (n,)
        Temperature of the cell. [K]
    x : array, shape (c,) or (n, c)
        Composition of the liquid charged, mole fractions. [-]
    ratio : float or array, shape (n,)
        Vapour space over liquid volume at filling; the cell holds 1 + ratio volumes. [-]
    T_fill : float or array, shape (n,)
        Temperature at which the volume charged is measured. [K]
    air : bool
        Add the pressure of the air dissolved at T_fill.
    P_air_0 : float or array, shape (n,), optional
        Partial pressure of air the charge was saturated with at T_fill; when absent, one
        atmosphere less the bubble pressure there. [Pa]
    product : str, optional
        "crude" for crude and condensate; otherwise the density chooses the volume correction.

    Returns
    -------
    CellPressure
        Pressures, phases and status of each lane. NO_SOLUTION: the liquid overfills the
        cell when it warms (small ratios charged cold), or none of it is left.

    Source
    ------
    Isochoric balance as in ASTM D5191, D6377 and D6378; liquid volumes by
    `liquid_expansion`, never from the equation of state.
    """
    z, T, ratio, T_fill, good = lanes(fluid.c, x, T=T, ratio=ratio, T_fill=T_fill)
    n = T.size
    status = np.where(good, Status.OUT_OF_STEPS, Status.BAD_INPUT).astype(int)
    cell = _Cell(fluid, T, z, ratio, T_fill, product)
    result = empty(CellPressure, n, fluid.c, status, T=T, ratio=ratio, P_air=np.zeros(n))
    active = np.flatnonzero(good)
    active = _drop(result.status, active, fluid.lacks(z[active]), Status.NO_PARAMETERS)
    active = _drop(result.status, active, ~np.isfinite(cell.volume[active]), Status.OUT_OF_RANGE)
    active = _drop(result.status, active, cell.full(active), Status.NO_SOLUTION)
    if active.size:
        cell.solve(result, active)
    if air:
        _add_air(fluid, result, z, T_fill, P_air_0)
    return result


def _drop(status, active, bad, word):
    """Give the bad lanes their status and return the others."""
    status[active[bad]] = word
    return active[~bad]


def _add_air(fluid, result, z, T_fill, P_air_0):
    ok = result.ok
    if not ok.any():
        return
    if P_air_0 is None:
        P_air_0 = np.maximum(ATMOSPHERE - bubble_pressure(fluid, T_fill, z).P, 0.0)
    P_air_0 = np.broadcast_to(np.asarray(P_air_0, dtype=float), ok.shape)
    space = 1.0 + result.ratio[ok] - result.expansion[ok]
    result.P_air[ok] = cell_air_pressure(
        standard_density(fluid, z[ok]), P_air_0[ok], T_fill[ok], result.T[ok], space, result.expansion[ok]
    )


class _Cell:
    """The charge of one mole per lane and the cell around it."""

    def __init__(self, fluid, T, z, ratio, T_fill, product):
        self.fluid, self.T, self.z, self.product = fluid, T, z, product
        self.charge = standard_molar_volume(fluid, z) * liquid_expansion(fluid, T_fill, z, product=product)
        self.volume = (1.0 + ratio) * self.charge  # [m3]

    def liquid(self, i, x):
        """Molar volume of liquid x at the cell temperature of lanes i. [m3/mol]"""
        return standard_molar_volume(self.fluid, x) * liquid_expansion(
            self.fluid, self.T[i], x, product=self.product
        )

    def full(self, i):
        """Mask of the lanes i in which the warmed charge leaves no vapour space."""
        return ~(self.liquid(i, self.z[i]) < self.volume[i])

    def solve(self, result, active):
        """Iterate k = P K to rest; fill `result` in place."""
        state = self.fluid.at(self.T[active])
        z, x = self.z[active], self.z[active].copy()
        ln_k, P, v_V = _first_k(self.fluid, state, self.T[active], z)
        n_L, v_before = np.ones(active.size), np.full(active.size, np.nan)
        for step in range(1, STEPS + 1):
            a = np.exp(ln_k) / (P * v_V)[:, None]
            v_L = self.liquid(active, x)
            n_L, exists = _liquid_left(z, a, v_L, self.volume[active], n_L)
            V_V = self.volume[active] - n_L * v_L
            x = z / (n_L[:, None] + a * V_V[:, None])
            x /= x.sum(axis=-1, keepdims=True)
            f = x * np.exp(ln_k)
            P = f.sum(axis=-1)
            y = f / P[:, None]
            new = np.log(P)[:, None] + state.ln_phi(P, x, "L") - state.ln_phi(P, y, "V")
            v_V = state.volume(P, y, "V")
            change = np.max(np.where(z > 0.0, np.abs(new - ln_k), 0.0), axis=-1)
            ln_k = new
            # The liquid's volume lags one round behind its composition: in an ideal fluid it alone moves.
            done = (change < TOLERANCE) & (np.abs(v_L / v_before - 1.0) < TOLERANCE)
            v_before = v_L
            lost = ~np.isfinite(change) | (~exists & (step > 4))
            self._store(result, active, done & ~lost, step, P, x, y, n_L, v_L, change)
            result.status[active[lost]] = Status.NO_SOLUTION
            keep = ~(done | lost)
            if not keep.any():
                return
            active, z, x, ln_k = active[keep], z[keep], x[keep], ln_k[keep]
            P, v_V, n_L, v_before, state = P[keep], v_V[keep], n_L[keep], v_before[keep], state.take(keep)
        result.iterations[active] = STEPS

    def _store(self, result, active, done, step, P, x, y, n_L, v_L, change):
        i = active[done]
        result.status[i] = Status.CONVERGED
        result.P[i], result.x[i], result.y[i] = P[done], x[done], y[done]
        result.beta[i] = 1.0 - n_L[done]
        result.expansion[i] = n_L[done] * v_L[done] / self.charge[i]
        result.iterations[i], result.residual[i] = step, change[done]


def _first_k(fluid, state, T, z):
    """ln k, pressure and vapour molar volume near the bubble point: three rounds from Wilson's estimate."""
    K = fluid.wilson_K(T, np.full(T.shape, 1e5))
    ln_k = np.log(K) + np.log(1e5)
    for _ in range(3):
        f = z * np.exp(ln_k)
        # A pressure above the vapour's own range has no vapour root; the rounds bring it down.
        P = np.minimum(f.sum(axis=-1), 3e6)
        y = f / f.sum(axis=-1, keepdims=True)
        ln_k = np.log(P)[:, None] + state.ln_phi(P, z, "L") - state.ln_phi(P, y, "V")
    f = z * np.exp(ln_k)
    P = f.sum(axis=-1)
    return ln_k, P, state.volume(P, f / P[:, None], "V")


def _liquid_left(z, a, v_L, volume, n_L):
    """Moles of liquid left of one mole charged, and whether any liquid can exist.

    Newton on f(n_L) = sum z_i/(n_L + a_i V_V) - 1, V_V = volume - n_L v_L, which falls and
    is convex while the vapour is thinner than the liquid: steps from the left never overshoot.
    """
    exists = (z / a).sum(axis=-1) > volume
    n_L = np.where(exists, n_L, 1e-3)
    slope = 1.0 - a * v_L[:, None]
    for _ in range(60):
        d = n_L[:, None] + a * (volume - n_L * v_L)[:, None]
        f = (z / d).sum(axis=-1) - 1.0
        df = -(z * slope / d**2).sum(axis=-1)
        new = np.clip(n_L - f / df, 1e-12, 1.0)
        step = np.abs(new - n_L)
        n_L = np.where(exists, new, n_L)
        if np.nanmax(np.where(exists, step, 0.0), initial=0.0) < 1e-14:
            break
    return n_L, exists
