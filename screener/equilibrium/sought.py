"""What a flash may be asked to meet: enthalpy, entropy, total volume, a ratio of volumes, a vapour fraction.

Each rises from the liquid to the vapour, along rising T at given P and along
falling P at given T; the excess over the target is the function whose root is
sought. A target knows the range of the unknown in which it can be told.
"""

from __future__ import annotations

from dataclasses import dataclass, replace

import numpy as np

from screener.equilibrium import ideal_gas
from screener.equilibrium.bracket import root_between
from screener.equilibrium.caloric import phase_values
from screener.equilibrium.incipient import HIGHEST_P, HIGHEST_T, LOWEST_P, LOWEST_T
from screener.equilibrium.solved import totals
from screener.ground.constants import R

MISS = 1e-9  # [-] to which a target is met: ten times below the promise, ten times above the flash's residual


@dataclass(frozen=True)
class Target:
    """Values asked for, lane by lane: what is "H", "S", "v", "ratio" or "beta"; given is "T" or "P"."""

    what: str
    given: str
    value: np.ndarray

    def take(self, lanes) -> Target:
        """Some of the lanes."""
        return replace(self, value=self.value[lanes])

    @property
    def at_edge(self):
        """Mask (n,) of the targets that are a bubble or dew point themselves."""
        ends = (0.0, 1.0) if self.what == "beta" else (0.0,)
        return self.of_pairs & np.isin(self.value, ends)

    def small(self, edge):
        """|excess| (n,) taken as zero; edge (n,) is the excess of the liquid at its bubble point."""
        return MISS * np.clip(np.abs(edge), 1e-6, 0.1) if self.what == "ratio" else np.full(edge.shape, MISS)

    @property
    def of_pairs(self):
        """Mask (n,): True where two phases are asked for, their fraction told by the pair."""
        return np.full(self.value.shape, self.what in ("ratio", "beta"))

    @property
    def limits(self) -> tuple[float, float]:
        """Range of the unknown: T [K] or ln P [ln Pa]."""
        if self.given == "T":
            return float(np.log(LOWEST_P)), float(np.log(HIGHEST_P))
        if self.what in ("H", "S"):
            return ideal_gas.T_LOW, ideal_gas.T_HIGH
        return LOWEST_T, HIGHEST_T

    def excess(self, fluid, T, P, beta, beta_W, x, y, x_W):
        """Excess of the phases over the target (n,) [-] and its size (n,) [-]: a miss is their quotient.

        H over RT, S over R, volumes over the one asked for; a ratio r as
        (V_V - r V_L) P / RT, which is nearly straight in the vapour fraction.
        """
        if self.what == "beta":
            return beta - self.value, np.ones_like(beta)
        H, S, v, _, v_V = totals(fluid, T, P, beta, beta_W, x, y, x_W)
        if self.what == "H":
            return (H - self.value) / (R * T), np.ones_like(beta)
        if self.what == "S":
            return (S - self.value) / R, np.ones_like(beta)
        if self.what == "v":
            return v / self.value - 1.0, np.ones_like(beta)
        above = np.where(beta > 0.0, beta * v_V, 0.0)
        below = self.value * (v - above)
        unit = P / (R * T)
        return (above - below) * unit, np.maximum(above, below) * unit

    def single(self, fluid, given, z, liquid: bool, edge):
        """T [K] or P [Pa] (n,) of a feed that is one phase, between `edge` and the end of the range."""
        if self.what == "v":
            return self._pressure_of_volume(fluid, given, z)
        if self.what not in ("H", "S"):
            return edge  # a ratio or a fraction of one phase: only at its edge
        kind = "L" if liquid else "V"
        end = np.full(edge.shape, self.limits[0 if liquid else 1])

        def excess(lanes, T):
            values = phase_values(fluid, T, given[lanes], z[lanes], kind)
            return (values.H if self.what == "H" else values.S) - self.value[lanes]

        every = np.arange(edge.size)
        small = MISS * R * (edge if self.what == "H" else np.ones_like(edge))
        found = root_between(excess, edge, excess(every, edge), end, excess(every, end), small)
        return np.where(found.converged, found.t, np.nan)

    def _pressure_of_volume(self, fluid, T, z):
        """P (n,) [Pa] of one phase of translated volume `value`: the equation of state itself."""
        mixture = fluid.at(T).mix(z)
        v, b, (d1, d2) = self.value + mixture.shift, mixture.b, mixture.d
        with np.errstate(all="ignore"):
            P = mixture.RT * (1.0 / (v - b) - mixture.alpha * b / ((v + d1 * b) * (v + d2 * b)))
        return np.where((v > b) & (P > 0.0) & (P < HIGHEST_P), P, np.nan)
