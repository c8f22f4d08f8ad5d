"""Fluids and liquids that several tests of the fire floor share."""

from __future__ import annotations

import numpy as np
import pytest

from screener.blends import Blend, union
from screener.equilibrium import Fluid


@pytest.fixture(scope="session")
def gasoline():
    """Summer gasoline without oxygenate."""
    return Blend.of({"stock:summer gasoline base": 1.0})


@pytest.fixture(scope="session")
def e85():
    """85 % ethanol in a summer gasoline."""
    return Blend.of({"species:ethanol": 0.85, "stock:summer gasoline base": 0.15})


@pytest.fixture(scope="session")
def diesel_and_gasoline():
    """Fluid of diesel and summer gasoline, and the two compositions."""
    names, Z = union([Blend.of({"stock:diesel": 1.0}), Blend.of({"stock:summer gasoline base": 1.0})])
    return Fluid.of(names), Z[0], Z[1]


@pytest.fixture(scope="session")
def octane_ethanol():
    """Fluid and eleven compositions, octane first."""
    x = np.array([0.0, 0.05, 0.1, 0.2, 0.3, 0.5, 0.6, 0.7, 0.8, 0.9, 1.0])
    return Fluid.of(["n-octane", "ethanol"]), np.stack([x, 1.0 - x], axis=1)
