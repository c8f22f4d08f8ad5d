"""Many lanes of one composition start from a polynomial: the same answers, and none where it would mislead."""

import numpy as np
import pytest

from screener.equilibrium import Fluid, bubble_pressure, bubble_temperature, dew_pressure, dew_temperature
from screener.equilibrium.warm_start import LEAST_LANES, warm_starts
from screener.ground.status import Status

NAMES = ["n-butane", "isopentane", "n-hexane", "toluene", "ethanol"]
Z = np.array([0.08, 0.22, 0.25, 0.30, 0.15])
FOUR = (bubble_pressure, dew_pressure, bubble_temperature, dew_temperature)


@pytest.fixture(scope="module")
def blend():
    return Fluid.of(NAMES)


@pytest.mark.parametrize("function", FOUR)
def test_a_year_equals_its_hours(blend, function):
    generator = np.random.default_rng(3)
    pressure = "pressure" in function.__name__
    given = generator.uniform(255.0, 320.0, 400) if pressure else generator.uniform(4e4, 3e5, 400)
    many = function(blend, given, Z)
    assert many.ok.all() and (many.residual <= 1e-10).all()
    assert many.iterations.mean() < 4.5  # measured 1.1 to 4.2, half or less of a blind start
    some = slice(0, 400, 20)
    few = function(blend, given[some], Z)
    # both carry a residual of 1e-10 or less in ln K, which is as much in P and a tenth of that in T
    for name in ("T", "P", "x", "y", "K"):
        assert getattr(many, name)[some] == pytest.approx(getattr(few, name), rel=1e-9)


def test_rows_of_several_compositions(blend):
    """Each run of one composition has its own polynomial, the lanes between start blind."""
    T = np.tile(np.linspace(260.0, 310.0, LEAST_LANES + 50), 2)
    x = np.repeat([Z, Z[::-1]], LEAST_LANES + 50, axis=0)
    x[10] = [0.2, 0.2, 0.2, 0.2, 0.2]
    started = np.isfinite(warm_starts(blend, "T", T, x, True)).all(axis=1)
    assert not started[:11].any() and started[11:].all()
    found = bubble_pressure(blend, T, x)
    alone = bubble_pressure(blend, T[[0, 10, 11, 300, -1]], x[[0, 10, 11, 300, -1]])
    assert found.P[[0, 10, 11, 300, -1]] == pytest.approx(alone.P, rel=1e-9)


def test_no_polynomial_over_the_end_of_the_bubble_line():
    """90 % methane in hexane has no bubble point above 254 K; the lanes below keep theirs."""
    fluid = Fluid.from_constants([190.6, 507.6], [4.6e6, 3.025e6], [0.011, 0.30], [0.016, 0.086])
    T = np.linspace(220.0, 300.0, 300)
    x = np.tile([0.9, 0.1], (T.size, 1))
    assert warm_starts(fluid, "T", T, x, True) is None
    found = bubble_pressure(fluid, T, x)
    assert found.ok[T < 253.0].all() and not found.ok[T > 255.0].any()
    assert (found.status[T > 255.0] == Status.NO_SOLUTION).mean() > 0.98  # the rest: ladder and envelope disagree


def test_few_lanes_and_one_temperature_start_blind(blend):
    x = np.tile(Z, (LEAST_LANES, 1))
    assert warm_starts(blend, "T", np.full(LEAST_LANES, 300.0), x, True) is None
    assert warm_starts(blend, "T", np.linspace(280.0, 300.0, LEAST_LANES - 1), x[1:], True) is None
    assert bubble_pressure(blend, np.full(LEAST_LANES, 300.0), Z).ok.all()
