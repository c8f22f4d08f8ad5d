"""Ethanol in gasoline against Directive 98/70/EC annex III (text read on gesetze.legal).

The annex lets petrol exceed 60 kPa by a stated amount at each bioethanol content. A base
gasoline is brought to a computed DVPE of 60.0 kPa by its butane, by the very model that
is tested; the computed rise on blending must follow the annex within 1.0 kPa at every
whole percent. The annex is an allowance drawn from blend data, not a measurement of
these gasolines: 1.0 kPa is about the spread of bases between 50 and 70 kPa at one
ethanol content. The same test must reject an ideal liquid and a cubic equation without
interaction parameters.
"""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from screener.blends import Blend
from screener.equilibrium import Fluid
from screener.volatility import dvpe

pytestmark = pytest.mark.published

ANNEX_III = np.array([0.0, 3.7, 6.0, 7.2, 7.8, 8.0, 8.0, 7.9, 7.9, 7.8, 7.8])  # kPa at 0 to 10 vol% ethanol
ALLOWED = 1.0  # kPa, see above
TARGET = 60.0e3  # Pa, the annex's summer maximum without ethanol

# A gasoline of thirteen species, volume percent at 15.6 degC; own composition.
THIRTEEN = {
    "n-butane": 5.002, "isopentane": 10.450, "n-pentane": 4.750, "2-methylpentane": 8.550, "n-hexane": 4.750,
    "methylcyclopentane": 3.800, "n-heptane": 4.750, "2,2,4-trimethylpentane": 20.899,
    "2-methyl-2-butene": 5.700, "benzene": 0.760, "toluene": 11.400, "m-xylene": 11.400,
    "1,2,4-trimethylbenzene": 7.790,
}  # fmt: skip


class Curve:
    """DVPE against ethanol content for a base whose butane is set by the same model."""

    def __init__(self, base: Blend, model: str):
        self.names = tuple(dict.fromkeys((*base.names, "n-butane", "ethanol")))
        self.fluid = FLUIDS[model](self.names)
        volume = dict(zip(base.names, base.volume_fractions, strict=True))
        self.rest = np.array([volume.get(n, 0.0) if n != "n-butane" else 0.0 for n in self.names])
        self.rest /= self.rest.sum()
        self.butane = self._set_butane()

    def dvpe(self, butane, ethanol):
        """DVPE [Pa] of bases with volume shares of butane, after volume shares of ethanol are splashed in."""
        butane, ethanol = np.broadcast_arrays(np.atleast_1d(butane), np.atleast_1d(ethanol))
        v = (1.0 - butane)[:, None] * self.rest
        v[:, self.names.index("n-butane")] += butane
        v = (1.0 - ethanol)[:, None] * v
        v[:, self.names.index("ethanol")] += ethanol
        moles = v / self.fluid.v_15
        return dvpe(self.fluid, moles / moles.sum(axis=1, keepdims=True)).require().P

    def _set_butane(self):
        low, high = 0.0, 0.12
        assert self.dvpe(low, 0.0)[0] < TARGET < self.dvpe(high, 0.0)[0]
        for _ in range(8):  # nine points a round: the bracket shrinks eightfold, 1e-8 of it is left
            grid = np.linspace(low, high, 9)
            above = np.searchsorted(self.dvpe(grid, 0.0), TARGET)
            low, high = grid[above - 1], grid[above]
        return 0.5 * (low + high)

    def rises(self):
        """Rise of DVPE [kPa] at 0 to 10 vol% ethanol."""
        P = self.dvpe(self.butane, np.arange(11) / 100.0)
        assert P[0] == pytest.approx(TARGET, abs=1.0)  # the base is 60.0 kPa to a thousandth
        return (P - P[0]) / 1000.0


def ideal(names):
    """The same equation of state and vapour pressures with no excess Gibbs energy at all."""

    class NoExcess:
        def at(self, T):
            return self

        def take(self, lanes):
            return self

        def ln_gamma(self, x):
            return np.zeros_like(x)

    fluid = Fluid.of(names)
    return replace(fluid, mixing=replace(fluid.mixing, excess=NoExcess()))


def without_kij(names):
    """Peng-Robinson with van der Waals mixing and every kij zero."""
    fluid = Fluid.of(names, model="PR")
    return replace(fluid, mixing=replace(fluid.mixing, kij=None))


FLUIDS = {"auto": Fluid.of, "ideal": ideal, "without kij": without_kij}


def base_gasoline(name):
    """A gasoline by name."""
    if name == "thirteen species":
        return Blend.of({k: v / 100.001 for k, v in THIRTEEN.items()})
    return Blend.of({f"stock:{name}": 1.0})


@pytest.mark.parametrize(
    "name", ["thirteen species", "summer gasoline base", "average gasoline", "summer gasoline 1985"]
)
def test_rise_follows_the_annex(name):
    rises = Curve(base_gasoline(name), "auto").rises()
    assert np.abs(rises - ANNEX_III).max() <= ALLOWED, np.round(rises, 2)


@pytest.mark.parametrize("model", ["ideal", "without kij"])
def test_the_annex_rejects_the_wrong_models(model):
    """An ideal liquid and kij = 0 fail the test above, and even have the sign wrong at 10 %."""
    rises = Curve(base_gasoline("thirteen species"), model).rises()
    assert np.abs(rises - ANNEX_III).max() > 5.0 * ALLOWED
    assert rises[10] < -1.0
