"""Distillation curve of an open still: every bit of vapour leaves as it forms.

Steps of equal volume of `screener.volatility.still` at fixed pressure, with reflux in the neck
of the flask and loss where they are asked for. Volumes are standard liquid volumes at
15 degC. Neither hold-up nor the inertia of a real flask is computed: a measured curve differs by
some degrees, most at its ends.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.equilibrium import bubble_temperature
from screener.ground.constants import ATMOSPHERE, ZERO_CELSIUS
from screener.ground.shapes import lanes
from screener.ground.status import Status
from screener.volatility.results import Lanes
from screener.volatility.still import Still

STEPS = 50
LEFT = 0.01  # share of the volume left in the still at the end
# Common practice, no source: the reflux brings T10 of a 60 kPa gasoline from 60 to 52 degC, where that of the base
# gasoline of 42 USC 7581(4) is; three measured jet fuels ask for more, 0.2 to 0.3 (tests/measured/test_lab_jet_fuels.py).
D86_REFLUX = 0.1  # [-]
D86_LOSS = 0.01  # [-]; an ordinary loss of a gasoline distillation, common practice, no source


@dataclass(frozen=True)
class Distillation(Lanes):
    """Curve of an open still, k points a lane.

    fraction (n, k) [-] volume evaporated, liquid at 15 degC, rising; T (n, k) [K] of the
    vapour that leaves (without reflux the boiling temperature of what is left); reflux [-]
    share of the rising moles that falls back, loss [-] volume evaporated and not recovered,
    both (n,). Everything is by volume evaporated, recovered and lost, unless its name says
    recovered. A lane that failed holds NaN.
    """

    fraction: np.ndarray
    T: np.ndarray
    reflux: np.ndarray
    loss: np.ndarray

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

    def temperature_recovered(self, fraction) -> np.ndarray:
        """Temperature [K] (n,) at a volume fraction in the receiver, scalar or (n,): evaporated less loss."""
        return self.temperature(np.asarray(fraction, dtype=float) + self.loss)

    def recovered(self, T) -> np.ndarray:
        """Volume fraction in the receiver [-] (n,) at T [K], scalar or (n,): evaporated less loss."""
        return np.maximum(self.evaporated(T) - self.loss, 0.0)

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


def distillation(fluid, x, *, P=ATMOSPHERE, steps: int = STEPS, reflux=0.0, loss=0.0) -> Distillation:
    """Distillation curve of an open still (Rayleigh), with reflux and loss when asked for.

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
    reflux : float or array, shape (n,)
        Share of the rising moles that the neck condenses and sends back, 0 to 0.9. [-]
    loss : float or array, shape (n,)
        Volume evaporated that reaches no receiver, 0 to 0.2. [-]

    Returns
    -------
    Distillation
        Points of the curve; T10, T50, T90, E70, E100, E150 as properties.

    Source
    ------
    Rayleigh, Philos. Mag. 4 (1902) 521: differential distillation. The defaults, no reflux and
    no loss, are common practice, no source; measured D86 curves beside it with other values are in
    tests/measured/test_lab_jet_fuels.py.
    """
    # zero is a valid reflux and loss, but not a valid scalar of a lane
    z, P, kept, caught, good = lanes(
        fluid.c, x, P=P, kept=1.0 - np.asarray(reflux, float), caught=1.0 - np.asarray(loss, float)
    )
    good &= (kept >= 0.1) & (kept <= 1.0) & (caught >= 0.8) & (caught <= 1.0)
    reflux, n = 1.0 - kept, P.size
    status = np.where(good, Status.CONVERGED, Status.BAD_INPUT).astype(int)
    fraction, T = np.full((n, steps + 1), np.nan), np.full((n, steps + 1), np.nan)
    v = np.where(np.isfinite(fluid.v_15), fluid.v_15, 0.0)
    total = z @ v
    bad = good & ~((z * ~np.isfinite(fluid.v_15)).sum(axis=-1) == 0.0)
    status[bad] = Status.NO_PARAMETERS
    active = np.flatnonzero(good & ~bad)
    still = Still(
        fluid,
        z[active],
        P[active],
        v,
        (1.0 - LEFT) * total[active] / steps,
        bubble_temperature,
        "T",
        reflux[active],
    )
    for step in range(steps + 1):
        failed = still.boil()
        status[active[failed]] = still.status[failed]
        still.keep(~failed)
        active = active[~failed]
        if not active.size:
            break
        fraction[active, step] = 1.0 - still.n @ v / total[active]
        T[active, step] = still.found
        if step < steps:
            still.step()
    failed = status != Status.CONVERGED
    fraction[failed], T[failed] = np.nan, np.nan
    return Distillation(status=status, fraction=fraction, T=T, reflux=reflux, loss=1.0 - caught)


def distillation_d86(
    fluid, x, *, P=ATMOSPHERE, reflux=D86_REFLUX, loss=D86_LOSS, steps: int = STEPS
) -> Distillation:
    """Curve as an ASTM D86 flask reads it: the open still with a little reflux and loss.

    Parameters
    ----------
    fluid : Fluid
        Species and model of c components, with liquid volumes at 15 degC.
    x : array, shape (c,) or (n, c)
        Liquid mole fractions of the charge. [-]
    P : float or array, shape (n,)
        Pressure of the still. [Pa]
    reflux : float or array, shape (n,)
        Share of the rising moles that the neck sends back, 0 to 0.9; 0.1 unless given. [-]
    loss : float or array, shape (n,)
        Volume evaporated that reaches no receiver, 0 to 0.2; 0.01 unless given. [-]
    steps : int
        Steps of about equal volume.

    Returns
    -------
    Distillation
        T10, E70 and their like by volume evaporated; `recovered` and `temperature_recovered`
        by what is in the receiver.

    Source
    ------
    `distillation`; both defaults are common practice, no source (what speaks for them stands
    beside the numbers in this module).
    """
    return distillation(fluid, x, P=P, steps=steps, reflux=reflux, loss=loss)


def _interpolate(x, y, asked):
    """y (n,) at asked (n,) by straight lines through rows of x (n, k), rising; NaN outside."""
    k = x.shape[1]
    right = np.clip((x < asked[:, None]).sum(axis=-1), 1, k - 1)
    rows = np.arange(x.shape[0])
    x0, x1, y0, y1 = x[rows, right - 1], x[rows, right], y[rows, right - 1], y[rows, right]
    inside = (asked >= x[:, 0]) & (asked <= x[:, -1] + 1e-9)  # the end is 0.99 but for rounding
    width = np.where(x1 > x0, x1 - x0, 1.0)
    return np.where(inside, y0 + (y1 - y0) * (asked - x0) / width, np.nan)
