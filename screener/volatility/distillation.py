"""Distillation curve of an open still: every bit of vapour leaves as it forms.

At fixed pressure the still obeys dn_i = -K_i n_i ds with K at the bubble point of what
is left. Steps in s are exponential in each species (no negative amounts), take ln K at their
middle by extrapolation from the two points before, and are sized so that the same volume
leaves in each. Volumes are standard liquid volumes at 15 degC. There is no reflux, no
hold-up and no loss: a measured D86 curve differs by some degrees, most at its ends.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.equilibrium import bubble_temperature
from screener.ground.constants import ATMOSPHERE, ZERO_CELSIUS
from screener.ground.shapes import lanes
from screener.ground.status import Status
from screener.volatility.results import Lanes

STEPS = 50
LEFT = 0.01  # share of the volume left in the still at the end


@dataclass(frozen=True)
class Distillation(Lanes):
    """Curve of an open still, k points a lane.

    fraction (n, k) [-] volume evaporated, liquid at 15 degC, rising; T (n, k) [K]
    boiling temperature of what is left. A lane that failed holds NaN.
    """

    fraction: np.ndarray
    T: np.ndarray

    def temperature(self, fraction) -> np.ndarray:
        """Temperature [K] (n,) at a volume fraction evaporated, scalar or (n,); NaN beyond the curve."""
        asked = np.broadcast_to(np.asarray(fraction, dtype=float), self.status.shape)
        return _interpolate(self.fraction, self.T, asked)

    def evaporated(self, T) -> np.ndarray:
        """Volume fraction evaporated [-] (n,) at T [K], scalar or (n,).

        Zero below the first boiling point. Above the last one it is the end of the curve,
        0.99: at least that much is gone.
        """
        asked = np.broadcast_to(np.asarray(T, dtype=float), self.status.shape)
        value = _interpolate(self.T, self.fraction, np.minimum(asked, self.T[:, -1]))
        return np.where(asked < self.T[:, 0], 0.0, value)

    @property
    def T10(self) -> np.ndarray:
        """Temperature at 10 % evaporated (n,). [K]"""
        return self.temperature(0.10)

    @property
    def T50(self) -> np.ndarray:
        """Temperature at 50 % evaporated (n,). [K]"""
        return self.temperature(0.50)

    @property
    def T90(self) -> np.ndarray:
        """Temperature at 90 % evaporated (n,). [K]"""
        return self.temperature(0.90)

    @property
    def E70(self) -> np.ndarray:
        """Volume fraction evaporated at 70 degC (n,). [-]"""
        return self.evaporated(ZERO_CELSIUS + 70.0)

    @property
    def E100(self) -> np.ndarray:
        """Volume fraction evaporated at 100 degC (n,). [-]"""
        return self.evaporated(ZERO_CELSIUS + 100.0)

    @property
    def E150(self) -> np.ndarray:
        """Volume fraction evaporated at 150 degC (n,). [-]"""
        return self.evaporated(ZERO_CELSIUS + 150.0)


def distillation(fluid, x, *, P=ATMOSPHERE, steps: int = STEPS) -> Distillation:
    """Distillation curve of an open still (Rayleigh).

    Parameters
    ----------
    fluid : Fluid
        Species and model of c components, with liquid volumes at 15 degC.
    x : array, shape (c,) or (n, c)
        Liquid mole fractions of the charge. [-]
    P : float or array, shape (n,)
        Pressure of the still. [Pa]
    steps : int
        Steps of about equal volume; the error falls with the square of their number.

    Returns
    -------
    Distillation
        Points of the curve; T10, T50, T90, E70, E100, E150 as properties.

    Source
    ------
    Rayleigh, Philos. Mag. 4 (1902) 521: differential distillation. Agreement with a
    measured D86 curve: first points some K low, common practice, no source.
    """
    z, P, good = lanes(fluid.c, x, P=P)
    n = P.size
    status = np.where(good, Status.CONVERGED, Status.BAD_INPUT).astype(int)
    fraction, T = np.full((n, steps + 1), np.nan), np.full((n, steps + 1), np.nan)
    v = np.where(np.isfinite(fluid.v_15), fluid.v_15, 0.0)
    total = z @ v
    bad = good & ~((z * ~np.isfinite(fluid.v_15)).sum(axis=-1) == 0.0)
    status[bad] = Status.NO_PARAMETERS
    active = np.flatnonzero(good & ~bad)
    still = _Still(fluid, z[active], P[active], v, (1.0 - LEFT) * total[active] / steps)
    for step in range(steps + 1):
        failed = still.boil()
        status[active[failed]] = still.status[failed]
        still.keep(~failed)
        active = active[~failed]
        if not active.size:
            break
        fraction[active, step] = 1.0 - still.n @ v / total[active]
        T[active, step] = still.T
        if step < steps:
            still.step()
    failed = status != Status.CONVERGED
    fraction[failed], T[failed] = np.nan, np.nan
    return Distillation(status=status, fraction=fraction, T=T)


class _Still:
    """Amounts n (m, c) left in the still, and its bubble point."""

    def __init__(self, fluid, n, P, v, drop):
        self.fluid, self.n, self.P, self.v, self.drop = fluid, n.copy(), P, v, drop
        self.T, self.ln_K, self.before, self.status = np.full(P.shape, np.nan), None, None, None

    def boil(self):
        """Bubble point of what is left; mask of the lanes without one."""
        point = self._bubble(self.n)
        self.before, self.ln_K = self.ln_K, self._log(point.K)
        self.T, self.status = point.T, point.status
        return ~point.ok

    def _bubble(self, n):
        return bubble_temperature(self.fluid, self.P, n / n.sum(axis=-1, keepdims=True))

    @staticmethod
    def _log(K):
        return np.log(np.where(K > 0.0, K, 1e-300))

    def keep(self, mask):
        """Drop the lanes outside the mask."""
        self.n, self.P, self.drop = self.n[mask], self.P[mask], self.drop[mask]
        self.T, self.ln_K = self.T[mask], self.ln_K[mask]
        self.before = None if self.before is None else self.before[mask]

    def step(self):
        """One step of volume `drop`, ln K at its middle: by extrapolation, the first by a half step."""
        if self.before is None:
            point = self._bubble(self._leave(np.exp(self.ln_K), 0.5 * self.drop))
            middle = np.where(point.ok[:, None], self._log(point.K), self.ln_K)
        else:
            middle = 1.5 * self.ln_K - 0.5 * self.before
        self.n = self._leave(np.exp(middle), self.drop)

    def _leave(self, K, drop):
        """Amounts after the volume `drop` has left at fixed K: n exp(-K s).

        The volume gone is concave in s, so Newton from its starting slope never overshoots.
        """
        volume = self.n * self.v
        total = volume.sum(axis=-1)
        s = drop / (volume * K).sum(axis=-1)
        for _ in range(40):
            part = volume * np.exp(-K * s[:, None])
            move = (total - part.sum(axis=-1) - drop) / (K * part).sum(axis=-1)
            s = s - move
            if np.max(np.abs(move) / s) < 1e-13:
                break
        return self.n * np.exp(-K * s[:, None])


def _interpolate(x, y, asked):
    """y (n,) at asked (n,) by straight lines through rows of x (n, k), rising; NaN outside."""
    k = x.shape[1]
    right = np.clip((x < asked[:, None]).sum(axis=-1), 1, k - 1)
    rows = np.arange(x.shape[0])
    x0, x1, y0, y1 = x[rows, right - 1], x[rows, right], y[rows, right - 1], y[rows, right]
    inside = (asked >= x[:, 0]) & (asked <= x[:, -1])
    width = np.where(x1 > x0, x1 - x0, 1.0)
    return np.where(inside, y0 + (y1 - y0) * (asked - x0) / width, np.nan)
