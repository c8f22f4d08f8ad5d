"""Ethanol in gasolines of 50, 60 and 70 kPa: calculated bands and remembered values; a slice of the study.

They guard and do not prove. The trends that were read are in tests/published/test_volatility_trends.py and
test_volatility_annex_iii.py; the whole table is tests/studies/ethanol_sweep.md.
"""

from __future__ import annotations

import numpy as np
import pytest

from screener.species import find
from screener.volatility import (
    distillation,
    dvpe,
    ratio_20_temperature_d4814,
    ratio_temperature,
    true_vapour_pressure,
    vapour_pressure_at_ratio,
)
from tests.studies import ethanol_sweep_bases as real
from tests.studies.ethanol_sweep import BASES, HSIEH, sweep
from tests.studies.splash import SHARES, Splash

SHARE = np.array([0.0, 0.01, 0.03, 0.05, 0.07, 0.10, 0.15, 0.20, 0.30, 0.50, 0.70, 0.85, 0.95, 1.0])


@pytest.fixture(scope="module")
def curves():
    """DVPE [kPa] at SHARE, by base [kPa]."""
    return {target / 1e3: sweep(target, SHARE) / 1e3 for target in BASES}


def at(curve, share):
    return float(curve[int(np.argmin(np.abs(SHARE - share)))])


def test_bases_are_what_they_say(curves):
    for target, curve in curves.items():
        assert curve[0] == pytest.approx(target, abs=0.01)


def test_rise_and_plateau(curves):
    """Fast to 5 %, flat to 20 %, then down; 7 to 9 kPa at 10 % (band of calculations)."""
    for target, curve in curves.items():
        rise = curve - curve[0]
        assert (np.diff(rise[:5]) > 0.0).all()
        assert at(rise, 0.05) > 0.9 * rise.max()
        # 7 to 9 kPa on bases of 55 to 70 kPa is the band of calculations on 35 real gasolines
        assert 7.0 < at(rise, 0.10) < 9.0, target
        assert (np.diff(rise[SHARE >= 0.20]) < 0.0).all()


def test_e10_e15_e20_cannot_be_told_apart(curves):
    """Within 2 kPa of each other: calculated band of the acceptance list; the published word is 'indistinguishable'."""
    for curve in curves.values():
        assert np.ptp([at(curve, s) for s in (0.10, 0.15, 0.20)]) < 2.0


def test_e85_lies_far_below(curves):
    """16 to 30 kPa below bases of 50 to 70 kPa; the more volatile the base, the more (calculated band)."""
    falls = [curve[0] - at(curve, 0.85) for curve in curves.values()]
    assert all(16.0 < fall < 30.0 for fall in falls), falls
    assert (np.diff(falls) > 0.0).all()


def test_more_volatile_bases_rise_less(curves):
    rises = [at(curve, 0.10) - curve[0] for curve in curves.values()]
    assert (np.diff(rises) < 0.0).all()


def test_pure_ethanol_does_not_know_its_base(curves):
    last = [curve[-1] for curve in curves.values()]
    assert np.ptp(last) < 1e-6
    # its vapour pressure at 37.8 degC, 15.8 kPa, with dissolved air through the correlation: near itself
    assert last[0] == pytest.approx(find("ethanol").psat(310.93) / 1e3, abs=1.5)


def test_hsieh_2002(record_property):
    """Remembered table (Atmos. Environ. 36, 2002), base 53.7 kPa: E5 +5.6, E10 +5.9, E20 +4.6, E30 +3.1 kPa.

    The order of the four is met. Their size is not: the computed rises are 2 to 4 kPa larger, as those of
    annex III (+7.8 at 10 %) are; a Reid test that takes up water or loses light ends would read low.
    """
    rise = sweep(53.7e3, np.array(list(HSIEH))) / 1e3 - 53.7
    remembered = np.array(list(HSIEH.values()))
    record_property("computed_less_remembered_kPa", (rise - remembered).round(2).tolist())
    assert (np.argsort(rise) == np.argsort(remembered)).all()
    assert ((rise - remembered > 0.0) & (rise - remembered < 4.5)).all()


@pytest.mark.parametrize(
    ("oxygenate", "shares", "low", "high"),
    [("ETBE", [0.05, 0.10, 0.20], -8.0, -1.0), ("MTBE", [0.10], -1.5, 1.2), ("methanol", [0.05, 0.10], 15.0, 27.0),
     ("1-butanol", [0.10, 0.20], -5.0, 1.0)],
)  # fmt: skip
def test_other_oxygenates(oxygenate, shares, low, high):
    """Bands around earlier calculations and remembered blending values; ETBE also falls linearly (SAE 901114)."""
    P = sweep(60e3, np.array([0.0, *shares]), oxygenate) / 1e3
    change = P[1:] - P[0]
    assert ((change > low) & (change < high)).all(), change
    if oxygenate == "ETBE":
        per_percent = change / np.array(shares)
        assert np.ptp(per_percent) < 0.1 * abs(per_percent.mean())


def test_invariants():
    """TVP above VP4 above VP10, DVPE below the total, and T(V/L=20) rising as the DVPE falls."""
    splash = Splash(SHARES)
    Z = np.concatenate([splash.moles(splash.at_dvpe(target), [0.0, 0.10]) for target in BASES])
    true = true_vapour_pressure(splash.fluid, 310.93, Z).require().P
    four = vapour_pressure_at_ratio(splash.fluid, 310.93, Z, 4.0).require().P
    ten = vapour_pressure_at_ratio(splash.fluid, 310.93, Z, 10.0).require().P
    assert (true > four).all() and (four > ten).all()
    test = dvpe(splash.fluid, Z).require()
    assert (test.P < test.P_total).all()
    T20 = ratio_temperature(splash.fluid, Z, air=True).require().T.reshape(3, 2)
    assert (np.diff(T20, axis=0) < 0.0).all()
    assert (T20[:, 1] < T20[:, 0] - 4.0).all()  # ethanol lowers it by 5 to 8 K (calculated elsewhere)


def test_straight_line_against_the_flash():
    """T(V/L=20) of hydrocarbon gasolines: the line lies 0 to 5 K above the flash, a band found in calculation."""
    splash = Splash(SHARES)
    Z = np.concatenate([splash.moles(splash.at_dvpe(target), 0.0) for target in BASES])
    curve = distillation(splash.fluid, Z).require()
    line = ratio_20_temperature_d4814(dvpe(splash.fluid, Z).P, curve.T10, curve.T50)
    flash = ratio_temperature(splash.fluid, Z, air=True).require().T
    assert ((line - flash > 0.0) & (line - flash < 5.0)).all(), line - flash


def test_boiling_hard_at_the_ratio_20_temperature():
    """Why no tank is judged by it: at T(V/L=20) the bubble pressure is 112 to 117 kPa, above the atmosphere."""
    splash = Splash(SHARES)
    Z = np.concatenate([splash.moles(splash.at_dvpe(target), 0.0) for target in BASES])
    T20 = ratio_temperature(splash.fluid, Z).require().T
    P = true_vapour_pressure(splash.fluid, T20, Z).require().P / 1e3
    assert ((P > 110.0) & (P < 120.0)).all(), P


def test_ten_percent_ethanol_on_every_real_base(record_property):
    """+7 to +9 kPa on every hydrocarbon base of 55 to 70 kPa of 43 published analyses (band of calculations; about 1 psi read).

    As they are, and with their butane set to both ends and the middle of the band. One base, a test fuel
    of 9 vol% aromatics that lies below the band until butane is added, is 0.06 kPa above at 55 kPa:
    ethanol deviates most among paraffins. Whole table and reasons: tests/studies/ethanol_sweep_bases.md.
    """
    g = real.gasolines()
    alone = real.as_they_are(g)
    assert alone.size >= 8
    assert ((alone >= 7e3) & (alone <= 9e3)).all(), alone
    rise = real.rises(g.fluid, g.base)
    known = np.isfinite(rise)
    assert known.any(axis=1).all() and known.sum() > 110  # every fuel takes part, most at all three pressures
    record_property(
        "kPa", [float(np.nanmin(rise)) / 1e3, float(np.nanmean(rise)) / 1e3, float(np.nanmax(rise)) / 1e3]
    )
    outside = {(g.fuels[i], real.TARGETS[j]) for i, j in np.argwhere(known & ((rise < 7e3) | (rise > 9e3)))}
    assert outside <= {("5495", 55e3)}, outside


def test_ethers_left_in_lower_the_rise():
    """Ethers take up the hydroxyl group: finished ether gasolines rise less than the base they were made from.

    Published as a direction only (J. Energy Eng. 140(3), 2013, abstract). The term of ethanol with ethers,
    fitted to MTBE + ethanol, takes no more than 0.1 kPa off: the effect is the model's own.
    """
    g = real.gasolines()
    rich, kept = real.with_ethers()
    full, bare, base = (real.rises(*one) for one in ((g.fluid, kept), (real.without_ether_term(g.fluid), kept), (g.fluid, g.base[rich])))  # fmt: skip
    known = np.isfinite(full)
    assert rich.sum() >= 10 and known.sum() >= 30
    assert (full[known] < base[known]).all() and (full[known] > 5e3).all()
    per_percent = (base - full)[known] / (
        100.0 * np.broadcast_to(g.family(kept, "ether")[:, None], full.shape)[known]
    )
    assert ((per_percent > 100.0) & (per_percent < 220.0)).all(), per_percent  # 0.16 kPa a vol% on average
    assert ((bare - full)[known] > 0.0).all() and ((bare - full)[known] < 100.0).all()
