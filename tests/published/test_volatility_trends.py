"""Oxygenates in gasoline: every published trend that was read, on computed bases of 50, 60 and 70 kPa.

The sources give trends, mostly in abstracts, so most tests ask for a sign, an order or a bound; where a
number is printed it is asked for with the reason of the distance beside it. The numbers themselves are in
tests/studies/ethanol_sweep.md, ethanol_sweep_bases.md and ethanol_sweep_loss.md. The curve of 98/70/EC
annex III has a file of its own; remembered values are in tests/regression/test_lab_ethanol.py.
"""

from __future__ import annotations

import numpy as np
import pytest

from screener.volatility import ethanol_allowance, ethanol_fuel_classes
from tests.studies import ethanol_sweep_loss as loss
from tests.studies import ethanol_sweep_trends as trends

pytestmark = pytest.mark.published

PSI = 6.894757  # kPa
BASES = pytest.mark.parametrize("target", trends.BASES, ids=lambda target: f"{target / 1e3:.0f} kPa")


@BASES
def test_about_one_psi_at_ten_percent(target):
    """McCormick and Yanowitz, NREL, memorandum of 26 March 2012: 10 % ethanol raises the RVP by about 1 psi.

    "About 1 psi" is taken as what rounds to 1 psi; 98/70/EC annex III, 7.8 kPa, is 1.13 psi.
    """
    rise = trends.rise(target, "ethanol", 0.10)[0]
    assert round(rise / PSI) == 1
    assert rise == pytest.approx(
        ethanol_allowance(0.10)[0] / 1e3, abs=1.0
    )  # the spread of bases, as for the annex


@BASES
def test_fifteen_percent_cannot_be_told_from_ten(target):
    """Same memorandum: E15 indistinguishable from E10 for all base pressures; E20 for part of the data.

    Indistinguishable: well inside the rise itself, an eighth of it for E15, a quarter for E20.
    """
    ten, fifteen, twenty = trends.rise(target, "ethanol", [0.10, 0.15, 0.20])
    assert abs(fifteen - ten) < ten / 8.0
    assert abs(twenty - ten) < ten / 4.0


@BASES
def test_ten_twenty_and_thirty_percent_in_a_survey(target):
    """Alleman, SAE 2013-01-9071, abstract: E10, E20 and E30 of blender pumps statistically alike.

    No band is printed. The fuels of a pump differ in their base; on one base the three differ by less
    than half of the rise they share.
    """
    ten, twenty, thirty = trends.rise(target, "ethanol", [0.10, 0.20, 0.30])
    assert np.ptp([ten, twenty, thirty]) < 0.5 * ten
    assert min(ten, twenty, thirty) > 0.0


@BASES
def test_butanol_stays_below_one_kilopascal(target, record_property):
    """Muzikova and others, Chem. Listy 107 (2013) 717, abstract: about +1 kPa at most, falling above 10 %.

    The bound and the fall are met. The small maximum itself is missed: nothing rises here, and the
    measured binary isooctane + 1-butanol is met to 2.5 % only (tests/studies/pair_corrections.md).
    """
    rise = trends.rise(target, "1-butanol", np.array([0.02, 0.05, 0.08, 0.10, 0.15, 0.20, 0.30]))
    record_property("kPa", rise.round(2).tolist())
    assert (rise <= 1.0).all()
    assert (np.diff(rise[3:]) < 0.0).all()


@BASES
def test_etbe_falls_linearly_and_ethanol_does_not(target):
    """Furey and Perry, SAE 901114, abstract: vapour pressure falls linearly with ETBE; ethanol raises it, not linearly."""
    share = np.array([0.05, 0.10, 0.15, 0.20])
    etbe, ethanol = trends.rise(target, "ETBE", share) / share, trends.rise(target, "ethanol", share) / share
    assert (etbe < 0.0).all()
    assert np.ptp(etbe) < 0.03 * abs(
        etbe.mean()
    )  # a straight line to the 0.1 kPa a test is reported to, at 10 %
    assert (ethanol > 0.0).all() and ethanol[0] > 3.0 * ethanol[-1]


@BASES
def test_etbe_smooths_the_rise_of_ethanol(target):
    """J. Energy Eng. 140(3), 2013, abstract: ethanol to 5 % raises the vapour pressure (0.9 to 5.5 %); ETBE (2.0 to 9.8 %)
    besides smooths that. Michalopoulou and others, Fuels 2(4) (2021) 501, abstract: ETBE to 20.8 % in E10 lowers it.
    """
    ethanol = np.array([0.0, 0.009, 0.02, 0.03, 0.055])
    P = np.stack(
        [trends.pressure(target, {"ethanol": ethanol, "ETBE": v}) for v in (0.0, 0.020, 0.050, 0.098)]
    )
    assert (np.diff(P, axis=1) > 0.0).all()  # ethanol raises
    assert (np.diff(P, axis=0) < 0.0).all()  # ETBE lowers
    assert (np.diff(P[:, -1] - P[:, 0]) < 0.0).all()  # and takes part of the rise itself away
    ten = trends.pressure(target, {"ethanol": np.full(4, 0.10), "ETBE": [0.0, 0.05, 0.10, 0.208]})
    assert (np.diff(ten) < 0.0).all()


@BASES
@pytest.mark.parametrize("alcohol", ["methanol", "ethanol", "2-propanol", "tert-butanol"])
def test_alcohols_go_up_and_then_down(alcohol, target):
    """Pumphrey, Brand and Scheller, Fuel 2000, abstract: with each of the four it first rises and then falls."""
    share = np.array([0.01, 0.02, 0.03, 0.05, 0.10, 0.15, 0.20, 0.30, 0.50, 0.70, 0.85, 0.95])
    rise = trends.rise(target, alcohol, share)
    top = int(rise.argmax())
    assert rise[0] > 0.0 and 0 < top < share.size - 1
    assert (np.diff(rise[: top + 1]) > 0.0).all() and (np.diff(rise[top:]) < 0.0).all()
    assert rise[-1] < 0.0


@BASES
def test_methanol_lowers_distillation_more_than_ethanol(target):
    """Amine and Barakat, Egypt. J. Petrol. 28 (2019) 371, abstract: methanol of 5 to 15 % lowers the distillation curve
    more than ethanol; more alcohol lowers it more; 5 % of each lies between 10 % of either.

    Methanol against ethanol is asked while methanol is still in the pot, to 20 % evaporated with 5 % of it, 30 % with more; more against
    less behind the plateau, 30 and 40 %, for on it the amount makes no difference.
    """
    at = [0.1, 0.2, 0.3, 0.4]
    share = np.array([0.05, 0.10, 0.15])
    methanol, ethanol = (trends.evaporated(target, {name: share}, at) for name in ("methanol", "ethanol"))
    base = trends.evaporated(target, {"ethanol": [0.0]}, at)
    assert (methanol[0, :2] < ethanol[0, :2]).all() and (methanol[1:, :3] < ethanol[1:, :3]).all()
    assert (ethanol < base).all()
    assert (np.diff(methanol[:, 2:], axis=0) < 0.0).all() and (np.diff(ethanol[:, 2:], axis=0) < 0.0).all()
    both = trends.evaporated(target, {"methanol": [0.05], "ethanol": [0.05]}, at)[0]
    assert ((both > methanol[1]) & (both < ethanol[1])).all()


@BASES
def test_classes_of_ethanol_fuel(target):
    """ASTM D5798-15 on afdc.energy.gov: 51 to 83 % ethanol in four classes from 5.5 to 15 psi.

    The least volatile class is met with ethanol alone on every base; the most volatile one, 9.5 psi at least, not
    at 83 % on any: a winter blend needs butane or less ethanol.
    """
    shares = np.linspace(0.51, 0.83, 17)
    P = trends.pressure(target, {"ethanol": shares})
    met = [
        {c.name for c in ethanol_fuel_classes(1e3 * p, v) if c.met} for p, v in zip(P, shares, strict=True)
    ]
    assert any("1" in names for names in met)
    assert "4" not in met[-1]
    bounds = {c.name: (c.low / PSI / 1e3, c.high / PSI / 1e3) for c in ethanol_fuel_classes(1e3 * P[0], 0.51)}
    printed = {"1": (5.5, 9.0), "2": (7.0, 9.5), "3": (8.5, 12.0), "4": (9.5, 15.0)}
    assert {name: pytest.approx(v, abs=1e-6) for name, v in bounds.items()} == printed  # psi, as printed


@BASES
@pytest.mark.parametrize("share", [0.80, 0.83])
def test_test_fuel_of_high_ethanol(share, target):
    """40 CFR 1065.725 (79 FR 23811, as amended): 80 to 83 % ethanol, 41.5 to 45.1 kPa, butane added as needed.

    Butane in the amounts of a gasoline, to 10 % of the base, reaches the range wherever it is needed.
    """
    P = trends.pressure(target, {"ethanol": [share]})[0]
    if P < 41.5:
        assert 0.0 < trends.butane_for(target, {"ethanol": share}, 41.5) < 0.10
        assert 0.0 < trends.butane_for(target, {"ethanol": share}, 45.1) < 0.10
    assert P < 45.1 or target == 70e3  # above it only where the base itself is a winter gasoline


@pytest.fixture(scope="module")
def pairs():
    """E10 and its base: thirteen species and a published analysis, 50 and 60 kPa."""
    return [loss.thirteen(target) for target in (50e3, 60e3)] + [
        loss.published_gasoline("6004", target) for target in (50e3, 60e3)
    ]


def test_ethanol_in_the_first_five_percent_lost(pairs, record_property):
    """ "Gasoline evaporation: ethanol and nonethanol blends", abstract: about 13 mass% in two hours at about 70 degF.

    The cylinders on balances lose by diffusion through still air. Computed that way, bases of 50 to 60 kPa lie
    around the published number, whose base is not stated; two points are what 10 kPa of it make. Vapour in
    equilibrium that is carried away whole holds less on every base: the difference is the way it leaves.
    """
    found = {way: [100.0 * loss.ethanol_lost(pair, way) for pair in pairs] for way in loss.WAYS}
    record_property("mass_percent", {way: [round(float(v), 1) for v in values] for way, values in found.items()})
    drift = found["diffusing with drift"]
    assert all(abs(v - 13.0) <= 2.5 for v in drift)
    assert min(drift) < 13.0 < max(drift)
    for way in ("as one gas", "all at once"):
        assert all(v < d for v, d in zip(found[way], drift, strict=True))
        assert max(found[way]) < 11.5
    assert all(d < plain for d, plain in zip(drift, found["diffusing"], strict=True))


def test_weighing_beside_the_base(pairs, record_property):
    """Same abstract: E10 loses more in all, about 5 % less gasoline, and its DVPE falls by about 5 % more than the base's.

    At one temperature the loss of gasoline is 1 to 3 % less; with all the heat of vaporisation taken from the
    liquid 4 to 6 %: the cylinders, which took heat from the room, lie between.
    """
    for pair in pairs:
        warm, cold = loss.weighing(pair), loss.weighing(pair, cooling=1.0)
        record_property("total_gasoline_cooled_fall", [round(float(v), 3) for v in (warm.total, warm.gasoline, cold.gasoline, warm.fall)])  # fmt: skip
        assert warm.total > 1.05
        assert cold.gasoline < 0.97 and 0.98 < warm.gasoline < 1.0
        assert warm.fall == pytest.approx(1.05, abs=0.02)  # printed as "approximate 5 %"


def test_half_the_loss_shows_the_same(pairs):
    """Same abstract: a similar result after one hour, 2.4 to 2.5 mass%."""
    for pair in pairs:
        half, whole = loss.weighing(pair, 0.025), loss.weighing(pair, 0.05)
        assert half.gasoline == pytest.approx(whole.gasoline, abs=0.01)


def test_without_ethanol_both_vapours_are_alike(pairs):
    """Same abstract: by chromatography the ethanol-free emissions of E10 and base are similar.

    Similar: no species apart by more than 2 % of the vapour, a gas chromatograph's own repeatability for a main peak.
    """
    for pair in pairs:
        base, blend = loss.vapours(pair)
        hydrocarbons = np.arange(base.size) != pair.ethanol
        blend = blend[hydrocarbons] / blend[hydrocarbons].sum()
        assert np.abs(blend - base[hydrocarbons]).max() < 0.02
