"""A gasoline of thirteen known species, and alcohol splashed into liquids, for the studies and their tests."""

from __future__ import annotations

import numpy as np

from screener.equilibrium import Fluid
from screener.volatility import dvpe

# own composition, volume percent at 15.6 degC; sums to 100.001
THIRTEEN = {
    "n-butane": 5.002, "isopentane": 10.450, "n-pentane": 4.750, "2-methylpentane": 8.550, "n-hexane": 4.750,
    "methylcyclopentane": 3.800, "n-heptane": 4.750, "2,2,4-trimethylpentane": 20.899,
    "2-methyl-2-butene": 5.700, "benzene": 0.760, "toluene": 11.400, "m-xylene": 11.400,
    "1,2,4-trimethylbenzene": 7.790,
}  # fmt: skip
AROMATICS = (0.760 + 11.400 + 11.400 + 7.790) / 100.001
OLEFINS = 5.700 / 100.001
SHARES = {name: percent / 100.001 for name, percent in THIRTEEN.items()}


class Splash:
    """A base liquid by volume shares of species or cuts, and one alcohol poured into it."""

    def __init__(self, shares, alcohol="ethanol"):
        """shares: volume share by name, in any order. [-]"""
        self.names = tuple(dict.fromkeys((*shares, "n-butane", alcohol)))
        self.fluid = Fluid.of(self.names)
        self.base = np.array([shares.get(name, 0.0) for name in self.names])
        self.base /= self.base.sum()
        self.butane, self.alcohol = self.names.index("n-butane"), self.names.index(alcohol)

    def moles(self, base, share):
        """Mole fractions (n, c) of the base (c,) with volume shares of alcohol (n,)."""
        share = np.atleast_1d(np.asarray(share, dtype=float))[:, None]
        volume = (1.0 - share) * base
        volume[:, self.alcohol] += share[:, 0]
        moles = volume / self.fluid.v_15
        return moles / moles.sum(axis=1, keepdims=True)

    def with_butane(self, butane):
        """The base with its butane replaced by a volume share of the whole. [-]"""
        rest = np.where(np.arange(self.base.size) == self.butane, 0.0, self.base)
        base = (1.0 - butane) * rest / rest.sum()
        base[self.butane] += butane
        return base

    def at_dvpe(self, target):
        """The base whose butane is set so that its computed DVPE is `target` [Pa]."""
        low, high = 0.0, 0.15
        for _ in range(7):  # nine points a round: the bracket shrinks eightfold
            grid = np.linspace(low, high, 9)
            Z = np.concatenate([self.moles(self.with_butane(b), 0.0) for b in grid])
            above = int(np.searchsorted(dvpe(self.fluid, Z).require().P, target))
            if not 0 < above < 9:
                raise ValueError(f"no share of butane brings this base to {target / 1e3:.1f} kPa")
            low, high = grid[above - 1], grid[above]
        return self.with_butane(0.5 * (low + high))
