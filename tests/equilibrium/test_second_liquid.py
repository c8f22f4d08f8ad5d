"""Is a liquid one liquid: the cheap check, its words, and what is done about dry ethanol."""

from dataclasses import replace

import numpy as np
import pytest

from screener.equilibrium import (
    Fluid,
    bubble_pressure,
    first_vapour,
    flash_tp,
    second_liquid_check,
    water_tolerance,
    worth_testing,
)
from screener.equilibrium import fixed_point as engine
from screener.equilibrium.second_liquid import (
    DOUBTFUL,
    NO_LIQUID,
    NONE_FOUND,
    NOT_TESTED,
    TESTED,
    TWO_BY_THE_CHECK,
    UNSETTLED,
    VAPOUR_FIRST,
)
from screener.ground.errors import InputError, NotConverged, ShapeError
from screener.ground.status import Status

ATM = 101325.0


@pytest.fixture(scope="module")
def blend():
    """An invented gasoline with ethanol, methanol and water to come."""
    return Fluid.of(["n-butane", "n-hexane", "isooctane", "toluene", "ethanol", "methanol", "water"])


DRY = np.array([0.05, 0.30, 0.35, 0.30, 0.0, 0.0, 0.0])


def with_shares(ethanol=0.0, methanol=0.0, water=0.0):
    z = (1.0 - ethanol - methanol - water) * DRY
    z[4:] = ethanol, methanol, water
    return z


def slow(monkeypatch, *modules):
    """Let the named modules take one substitution and no more."""
    import importlib

    for name in modules:
        module = importlib.import_module(f"screener.equilibrium.{name}")
        monkeypatch.setattr(
            module, "solve", lambda *a, **k: engine.solve(*a, **{**k, "plain": 1, "newton": 0})
        )


def test_the_verdict_in_words(blend):
    z = [
        with_shares(),
        with_shares(water=2e-3),
        with_shares(methanol=0.3),
        with_shares(ethanol=0.2, water=0.005),
    ]
    found = second_liquid_check(blend, 280.0, 3e5, z)
    assert found.verdict.tolist() == [NONE_FOUND, TWO_BY_THE_CHECK, TWO_BY_THE_CHECK, NONE_FOUND]
    assert found.splits.tolist() == [False, True, True, False] and found.tested.all()
    assert found.w[1, 6] > 0.999 and found.w[2, 5] > 0.5  # the liquid that settles: water, methanol
    assert found.status.tolist() == [
        Status.CONVERGED,
        Status.LIQUID_SPLITS,
        Status.LIQUID_SPLITS,
        Status.CONVERGED,
    ]


def test_the_cheap_check_agrees_with_the_full_one(blend):
    """The full check tries every species and vapours too; on liquids at their bubble point it finds no more."""
    generator = np.random.default_rng(5)
    z = generator.dirichlet(np.array([1.0, 3.0, 3.0, 3.0, 1.0, 0.3, 0.3]), 80)
    T = generator.uniform(255.0, 315.0, 80)
    full = bubble_pressure(blend, T, z, check="full")
    P = np.where(np.isfinite(full.P), full.P, 1e6)
    found = second_liquid_check(blend, T, P * (1.0 + 1e-9), z)
    assert {True, False} == set(found.splits)
    assert (found.splits == (full.status == Status.LIQUID_SPLITS)).all()


def test_lanes_not_asked_for_are_marked_not_tested(blend):
    z = np.stack([with_shares(water=0.01), with_shares(water=0.01)])
    found = second_liquid_check(blend, 280.0, 3e5, z, where=[False, True])
    assert found.verdict.tolist() == [NOT_TESTED, TWO_BY_THE_CHECK] and found.tested.tolist() == [False, True]
    assert np.isnan(found.tpd[0]) and not found.splits[0]


def test_which_lanes_a_batch_should_test(blend):
    T = [290.0, 280.0, 300.0, 285.0, 310.0, np.nan]
    z = np.tile(with_shares(ethanol=0.1), (6, 1))
    z[2], z[3] = with_shares(water=1e-6), with_shares(methanol=0.01)
    assert worth_testing(blend, T, z).tolist() == [False, True, True, True, True, False]


def test_every_status_of_the_check_in_one_batch(blend, monkeypatch):
    lacking = replace(blend, missing=(("n-butane", "methanol"),))
    z = np.stack([
        with_shares(), with_shares(water=0.01), with_shares(methanol=0.1), DRY * 2.0, with_shares(), with_shares()
    ])  # fmt: skip
    T, P = np.array([280.0, 280.0, 280.0, 280.0, 600.0, 280.0]), np.array([3e5] * 5 + [1.0])
    found = second_liquid_check(lacking, T, P, z)
    assert found.status.tolist() == [
        Status.CONVERGED, Status.LIQUID_SPLITS, Status.NO_PARAMETERS, Status.BAD_INPUT, Status.OUT_OF_RANGE,
        Status.CONVERGED,
    ]  # fmt: skip
    assert found.verdict[4] == NO_LIQUID and (found.verdict[[2, 3]] == NOT_TESTED).all()
    with pytest.raises(NotConverged, match="of the lanes have no answer"):
        found.require()
    slow(monkeypatch, "stability")
    unsettled = second_liquid_check(blend, 280.0, 3e5, with_shares(ethanol=0.2))
    assert unsettled.status[0] == Status.OUT_OF_STEPS and unsettled.verdict[0] == UNSETTLED


def test_a_state_in_which_a_vapour_forms_is_not_called_two_liquids():
    """Far below the bubble pressure a trial of the lightest species, near its critical point, ends as vapour."""
    fluid = Fluid.of(["ethane", "n-decane", "water"])
    found = second_liquid_check(fluid, 300.0, 3e4, [0.3, 0.69999, 1e-5])
    assert found.verdict[0] == VAPOUR_FIRST and found.status[0] == Status.OUT_OF_RANGE and not found.splits[0]


# ---- dry ethanol


SPLITS_ALONE = [("n-hexane", 250.0), ("n-heptane", 285.0), ("n-octane", 300.0), ("isooctane", 300.0)]


@pytest.mark.parametrize(("paraffin", "T"), SPLITS_ALONE)
def test_dry_ethanol_blends_never_split_in_silence(paraffin, T):
    """The model splits them, measurement does not: the answer of one liquid stands everywhere, the doubt in words."""
    fluid = Fluid.of([paraffin, "ethanol"])
    share = np.linspace(0.05, 0.95, 19)
    x = np.stack([1.0 - share, share], axis=1)
    full, plain = bubble_pressure(fluid, T, x, check="full"), bubble_pressure(fluid, T, x)
    assert full.ok.all() and full.P.tolist() == plain.P.tolist()
    doubt = full.checks == DOUBTFUL
    assert doubt.any() and ((full.tpd < -1e-8) == doubt).all()
    first = first_vapour(fluid, T, x)
    assert first.ok.all() and (first.liquids == 1).all() and first.P == pytest.approx(full.P, rel=1e-12)
    check = second_liquid_check(fluid, T, 1.1 * full.P, x)
    assert ((check.verdict == DOUBTFUL) == doubt).all() and not check.splits.any() and check.ok.all()
    for how in ("vapour-liquid", "full"):
        liquid = flash_tp(fluid, T, 3.0 * full.P, x, check=how)
        assert liquid.ok.all() and (liquid.phases == 1).all() and np.isnan(liquid.beta_W).all()
        assert (liquid.checks[doubt] == DOUBTFUL).all() if how == "full" else True
        # below its bubble point a liquid the model cannot hold may have no pair to find; it is not called two liquids
        pair = flash_tp(fluid, T, 0.999 * full.P, x, check=how)
        assert (pair.phases[pair.ok] == 2).all() and np.isnan(pair.beta_W).all()
        assert set(pair.status[~pair.ok]) <= {Status.OUT_OF_STEPS} and pair.ok.sum() >= 16


def test_heavy_hydrocarbon_water_and_methanol_take_the_doubt_away():
    """What is known of dry ethanol is known of gasoline: a split with diesel, water or methanol counts."""
    diesel = Fluid.of(["n-hexadecane", "n-dodecane", "ethanol"])
    gasoline = Fluid.of(["isooctane", "ethanol", "water", "methanol"])
    assert second_liquid_check(diesel, 280.0, ATM, [0.5, 0.2, 0.3]).splits[0]
    z = [[0.5, 0.5, 0.0, 0.0], [0.49, 0.49, 0.02, 0.0], [0.45, 0.45, 0.1, 0.0], [0.5, 0.3, 0.0, 0.2]]
    found = second_liquid_check(gasoline, 280.0, ATM, z)
    assert found.verdict.tolist() == [DOUBTFUL, DOUBTFUL, TWO_BY_THE_CHECK, TWO_BY_THE_CHECK]


# ---- water a blend holds


def test_water_tolerance_lies_on_the_edge(blend):
    T = np.array([270.0, 280.0, 300.0])
    found = water_tolerance(blend, T, with_shares(ethanol=0.2))
    assert (
        found.ok.all()
        and (found.checks == TESTED).all()
        and (np.diff(found.water) > 0.0).all()
        and (found.residual < 1e-9).all()
    )
    for factor, splits in ((0.99, False), (1.01, True)):  # within 1 %: the distance is shallow at the edge
        x = with_shares(ethanol=0.2) * (1.0 - factor * found.water)[:, None]
        x[:, 6] = factor * found.water
        assert (second_liquid_check(blend, T, ATM, x).splits == splits).all()
    assert found.x[:, 6] == pytest.approx(found.water, rel=1e-12)
    ln_f = np.log(found.x[:, [1, 4, 6]]) + blend.ln_phi(T, ATM, found.x, "L")[:, [1, 4, 6]]
    other = np.log(found.x_W[:, [1, 4, 6]]) + blend.ln_phi(T, ATM, found.x_W, "L")[:, [1, 4, 6]]
    assert ln_f == pytest.approx(
        other, abs=1e-7
    )  # both are distances of 1e-9, over the slope of a shallow trial


def test_a_tolerance_below_what_measured_blends_hold_is_marked_doubtful(blend):
    """No measured blend splits with less than 0.059 water per ethanol (273 K and warmer); colder, the model says less."""
    found = water_tolerance(blend, 250.0, with_shares(ethanol=0.2))
    assert found.ok[0] and found.water[0] < 0.05 * found.x[0, 4] and found.checks[0] == DOUBTFUL


def test_water_tolerance_leaves_the_water_of_the_blend_out_of_account(blend):
    dry, wet = with_shares(ethanol=0.2), with_shares(ethanol=0.2 * 0.97, water=0.03)
    wet[:4] = dry[:4] * 0.97
    one, two = water_tolerance(blend, 280.0, dry), water_tolerance(blend, 280.0, wet)
    assert two.water == pytest.approx(one.water, rel=1e-7)  # one crossing found from one ladder
    volume = (
        one.water[0]
        * blend.v_15[6]
        / (one.water[0] * blend.v_15[6] + (1.0 - one.water[0]) * (dry @ blend.v_15))
    )
    assert one.water_volume[0] == pytest.approx(volume, rel=1e-12)


def test_more_ethanol_and_warmth_hold_more_water(blend):
    share = np.array([0.0, 0.1, 0.2, 0.4])
    z = np.stack([with_shares(ethanol=s) for s in share])
    cold, warm = water_tolerance(blend, 265.0, z), water_tolerance(blend, 300.0, z)
    assert cold.ok.all() and warm.ok.all()
    assert (
        (np.diff(cold.water) > 0.0).all()
        and (np.diff(warm.water) > 0.0).all()
        and (warm.water > cold.water).all()
    )


def test_every_status_of_the_tolerance_in_one_batch(blend, monkeypatch):
    lacking = replace(blend, missing=(("n-butane", "water"),))
    z = np.stack([with_shares(ethanol=0.2), np.eye(7)[4], with_shares(methanol=0.3), np.eye(7)[6]])
    found = water_tolerance(blend, 280.0, z)
    assert found.status.tolist() == [
        Status.CONVERGED,
        Status.NO_SOLUTION,
        Status.LIQUID_SPLITS,
        Status.BAD_INPUT,
    ]
    assert np.isnan(found.water[1:]).all()
    assert water_tolerance(lacking, 280.0, z[:1]).status[0] == Status.NO_PARAMETERS
    slow(monkeypatch, "stability")
    assert water_tolerance(blend, 280.0, z[:1]).status[0] == Status.OUT_OF_STEPS


def test_a_blend_the_model_alone_splits_has_no_tolerance_and_says_why():
    found = water_tolerance(Fluid.of(["isooctane", "ethanol", "water"]), 280.0, [0.5, 0.5, 0.0])
    assert (
        found.status[0] == Status.LIQUID_SPLITS and found.checks[0] == DOUBTFUL and np.isnan(found.water[0])
    )


def test_arguments_that_cannot_be_meant(blend):
    with pytest.raises(InputError, match="the fluid holds no water"):
        water_tolerance(Fluid.of(["isooctane", "ethanol"]), 280.0, [0.5, 0.5])
    with pytest.raises(ShapeError, match="composition: got shape"):
        second_liquid_check(blend, 280.0, ATM, DRY[:-1])
    with pytest.raises(ShapeError, match="composition: got shape"):
        first_vapour(blend, 280.0, DRY[:-1])
