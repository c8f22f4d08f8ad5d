"""Bubble pressures and vapour compositions of thirty measured binary systems.

The sets are those of tests/measured/binary, each with its source in its first line; rows with use = 0
are left out. Isobaric sets are scored as the bubble pressure at the measured temperature and liquid
composition. The model is the one used for every blend. Four sets of quality A served to fit pair corrections
(data/pairs/pair_corrections.csv); no set of quality B served for anything.
"""

from functools import cache

import numpy as np
import pytest

from screener.equilibrium import Fluid, bubble_pressure
from tests.measured import binary_sets

SETS = binary_sets.NAMES


@cache
def scored(name: str):
    """(fluid, T, x, measured P, measured y or None, computed Saturation) of one set."""
    one = binary_sets.read(name)
    fluid = Fluid.of(one.species, model="auto")
    return fluid, one.T, one.x, one.P, one.y1, bubble_pressure(fluid, one.T, one.x)


def error(name: str):
    """Relative error of the pressure (n,) [-]."""
    _, _, _, P, _, found = scored(name)
    return found.P / P - 1.0


def test_there_are_thirty_sets_each_with_a_source():
    assert len(SETS) == 30
    for name in SETS:
        assert (binary_sets.FOLDER / f"{name}.csv").read_text(encoding="utf-8").startswith("# source: "), name


@pytest.mark.parametrize("name", SETS)
def test_every_lane_converges_and_no_set_is_far_off(name):
    assert scored(name)[-1].ok.all()
    # 7 %: the worst sets carry scatter of several percent themselves (quality B, no pure ends)
    assert np.abs(error(name)).mean() <= 0.07


def test_mean_error_over_all_sets():
    print("\nset                                     n   mean %   bias %  worst %    |dy|")
    means = []
    for name in SETS:
        e, y1, found = error(name), scored(name)[4], scored(name)[5]
        dy = "" if y1 is None else f"{np.abs(found.y[:, 0] - y1).mean():8.4f}"
        means.append(np.abs(e).mean())
        print(f"{name:36s} {e.size:4d} {100 * means[-1]:8.2f} {100 * e.mean():8.2f} "
              f"{100 * np.abs(e).max():8.2f}{dy}")
    print(f"{'mean of the sets':36s} {'':4s} {100 * np.mean(means):8.2f}")
    good = [m for name, m in zip(SETS, means, strict=True) if name not in binary_sets.QUALITY_B]
    print(f"{'mean of the sets of quality A':36s} {'':4s} {100 * np.mean(good):8.2f}")
    assert len(good) == 25
    # 1.25 %: the pure ends of these sets lie within about 1 % of reference vapour pressures
    assert np.mean(good) <= 0.0125
    # 1.9 %: two percent is what repeated measurements of one system differ by; a trial of this model gave 1.77 %
    assert np.mean(means) <= 0.019


@pytest.mark.parametrize("name", [name for name in SETS if name[:2] in ("oy", "wy")])
def test_vapour_composition(name):
    _, _, _, _, y1, found = scored(name)
    # 0.012: a common bound for the consistency of such data is a mean of 0.010 (from memory), and a little for the model
    assert np.abs(found.y[:, 0] - y1).mean() <= 0.012


def test_ideal_liquid_would_fail():
    """The score tells models apart: an ideal liquid misses by far more."""
    means = []
    for name in SETS:
        fluid, T, x, P, _, _ = scored(name)
        pure = np.stack([bubble_pressure(fluid, T, np.eye(2)[i]).P for i in range(2)], axis=1)
        means.append(np.abs((x * pure).sum(axis=1) / P - 1.0).mean())
    assert np.mean(means) > 0.10
