"""A second liquid by the percent, and the share that is too much."""

from __future__ import annotations

import numpy as np
import pytest

from screener.blends import Blend
from screener.equilibrium import Fluid
from screener.fire import (
    SpaceState,
    contaminated,
    contaminated_flash_point,
    contaminated_space,
    flash_point,
    share_at_flash_point,
)
from screener.ground.errors import InputError
from screener.ground.status import Status


def test_shares_are_volumes_at_15_degC(diesel_and_gasoline):
    fluid, diesel, gasoline = diesel_and_gasoline
    blend = Blend.of({"stock:diesel": 0.97, "stock:summer gasoline base": 0.03})
    mixed = contaminated(fluid, diesel, gasoline, 0.03)[0]
    expected = dict(zip(blend.names, blend.moles, strict=True))
    # Volumes of the trade against those of the species: the same table, rounding only.
    assert dict(zip(fluid.names, mixed, strict=True)) == pytest.approx(expected, rel=1e-9)


def test_ends(diesel_and_gasoline):
    fluid, diesel, gasoline = diesel_and_gasoline
    flash = contaminated_flash_point(fluid, diesel, gasoline, [0.0, 1.0]).require().T
    alone = flash_point(fluid, np.stack([diesel, gasoline])).require().T
    assert flash == pytest.approx(alone, abs=1e-6)  # the solver's tolerance
    bad = contaminated_flash_point(fluid, diesel, gasoline, [-0.1, 1.1, np.nan])
    assert list(bad.status) == [Status.BAD_INPUT] * 3


def test_the_first_half_percent_counts_most(diesel_and_gasoline):
    fluid, diesel, gasoline = diesel_and_gasoline
    T = contaminated_flash_point(fluid, diesel, gasoline, [0.0, 0.005, 0.01, 0.05, 0.1]).require().T
    assert (np.diff(T) < 0.0).all()
    assert (T[0] - T[1]) / 0.5 > 2.0 * (T[3] - T[4]) / 5.0


@pytest.mark.parametrize("method", ["liaw", "le-chatelier"])
def test_the_inverse_closes(diesel_and_gasoline, method):
    fluid, diesel, gasoline = diesel_and_gasoline
    wanted = np.array([340.0, 328.15, 310.0, 260.0])
    share = share_at_flash_point(fluid, diesel, gasoline, wanted, method=method).require().share
    back = contaminated_flash_point(fluid, diesel, gasoline, share, method=method).require().T
    assert back == pytest.approx(wanted, abs=1e-5)  # halved to round-off; the solver's 2e-7 K
    assert (np.diff(share) > 0.0).all()


def test_the_smallest_share_is_found_where_the_curve_has_a_minimum():
    """Ethanol into n-octane and n-octane into ethanol go down, stay and come up again."""
    fluid = Fluid.of(["ethanol", "n-octane"])
    share = share_at_flash_point(fluid, [1.0, 0.0], [0.0, 1.0], [278.15, 275.0], method="liaw")
    assert list(share.status) == [Status.CONVERGED, Status.NO_SOLUTION]
    before = contaminated_flash_point(
        fluid, [1.0, 0.0], [0.0, 1.0], np.linspace(0.0, 0.99, 12) * share.share[0]
    )
    assert (before.require().T > 278.15).all()


def test_inverse_beyond_the_ends(diesel_and_gasoline):
    fluid, diesel, gasoline = diesel_and_gasoline
    share = share_at_flash_point(fluid, diesel, gasoline, [400.0, 200.0, np.nan])
    assert list(share.status) == [Status.CONVERGED, Status.NO_SOLUTION, Status.BAD_INPUT]
    assert share.share[0] == 0.0 and np.isnan(share.share[1:]).all()
    with pytest.raises(InputError, match="'raoult' is not a flash-point method"):
        share_at_flash_point(fluid, diesel, gasoline, 320.0, method="raoult")


def test_the_space_over_fouled_diesel(diesel_and_gasoline):
    """At 30 degC: lean over the diesel, flammable with two percent of gasoline, rich with forty."""
    fluid, diesel, gasoline = diesel_and_gasoline
    space = contaminated_space(fluid, 303.15, diesel, gasoline, [0.0, 0.02, 0.6]).require()
    assert list(space.state) == [SpaceState.TOO_LEAN, SpaceState.FLAMMABLE, SpaceState.TOO_RICH]


def test_ethanol_in_gasoline_and_condensate_in_diesel_are_judged():
    from screener.blends import union

    names, Z = union([Blend.of({"stock:diesel": 1.0}), Blend.of({"stock:condensate": 1.0})])
    flash = contaminated_flash_point(Fluid.of(names), Z[0], Z[1], [0.001, 0.01, 0.1]).require()
    assert (np.diff(flash.T) < 0.0).all()
    names, Z = union([Blend.of({"stock:summer gasoline base": 1.0}), Blend.of({"species:ethanol": 1.0})])
    space = contaminated_space(Fluid.of(names), 273.15, Z[0], Z[1], [0.0, 0.1, 0.85, 1.0]).require()
    assert list(space.state) == [2, 2, 1, 0]  # E85 at 0 degC lies in the range, ethanol alone below it
