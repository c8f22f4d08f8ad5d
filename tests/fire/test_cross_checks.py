"""The named shortcuts and where they end."""

from __future__ import annotations

import numpy as np
import pytest

from screener.fire import (
    blending_index,
    flash_point_at_standard_pressure,
    flash_point_by_distillation,
    flash_point_by_index,
    flash_point_of_index,
)
from screener.ground.status import Status


def c(t):
    return np.asarray(t, dtype=float) + 273.15


def test_index_and_back():
    T = c([-40.0, 0.0, 20.0, 60.0, 100.0])
    assert flash_point_of_index(blending_index(T)) == pytest.approx(T, abs=1e-9)
    assert np.isnan(blending_index(c(-240.0)))


def test_a_blend_by_index():
    same = flash_point_by_index(c([60.0, 60.0]), [0.3, 0.7]).require()
    assert same.T[0] == pytest.approx(c(60.0), abs=1e-9)
    mix = flash_point_by_index(c([40.0, 80.0]), [[0.5, 0.5], [0.0, 1.0]]).require().T
    assert c(40.0) < mix[0] < c(60.0)  # the lighter one dominates
    assert mix[1] == pytest.approx(c(80.0), abs=1e-9)


def test_the_index_refuses_a_gasoline():
    blend = flash_point_by_index(c([62.0, -40.0]), [0.999, 0.001])
    assert blend.status[0] == Status.OUT_OF_RANGE and np.isnan(blend.T[0])
    beyond = flash_point_by_index(c([62.0, -40.0]), [0.999, 0.001], beyond=True).require()
    assert beyond.T[0] < c(25.0)  # 43 K for a tenth of a percent: absurd, which is why it is refused
    # A product of share zero does not count.
    assert flash_point_by_index(c([62.0, -40.0]), [1.0, 0.0]).ok[0]


def test_bad_lanes_of_the_index():
    blend = flash_point_by_index(c([60.0, 80.0]), [[0.5, 0.6], [-0.1, 1.1], [np.nan, 1.0], [0.5, 0.5]])
    assert list(blend.status) == [*[Status.BAD_INPUT] * 3, Status.CONVERGED]


def test_distillation_range():
    by = flash_point_by_distillation([np.nan, c(50.0), c(180.0), c(400.0)])
    assert list(by.status) == [Status.BAD_INPUT, Status.OUT_OF_RANGE, Status.CONVERGED, Status.OUT_OF_RANGE]
    T = flash_point_by_distillation(np.linspace(c(100.0), c(300.0), 50)).require().T
    assert (np.diff(T) > 0.0).all()


def test_barometer_range():
    at = flash_point_at_standard_pressure(c([60.0, 60.0, np.nan]), [60e3, 90e3, 100e3])
    assert list(at.status) == [Status.OUT_OF_RANGE, Status.CONVERGED, Status.BAD_INPUT]
    assert at.T[1] == pytest.approx(c(60.0 + 0.25 * 11.3), abs=1e-9)


def test_each_names_its_method_and_limits():
    for one in (flash_point_by_distillation(450.0), flash_point_at_standard_pressure(330.0, 1e5),
                flash_point_by_index(c([60.0]), [1.0])):  # fmt: skip
        assert one.method and one.limits and one.residual[0] == 0.0
