"""Measured vapour above retail gasolines at 25 degC: K ratios of paraffins and, blind, of MTBE.

What is fitted on what, the rule that selects fuels and the whole table: tests/studies/headspace.
Data: US EPA SPECIATE 5.2, pairs of liquid and headspace profiles (tests/measured/headspace).
"""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from tests.studies.headspace import beside_neighbours, groups, headspace, held_out, spread

PARAFFINS = np.log(1.15)  # asked of the K ratios of paraffins
ETHER = np.log(1.12)  # asked of MTBE on fuels that paraffins select
HOUSTON = {"4562", "4565", "4567"}  # the series of September 2000


@pytest.fixture(scope="module")
def h():
    return headspace()


def of(h, name):
    """ln of measured over computed K ratio of a species, fuel by fuel."""
    ln = h.deviations(h.K, h.light())[:, h.names.index(name)]
    return dict(zip(h.fuels, ln.tolist(), strict=True))


def test_selection_sees_paraffins_and_heavy_aromatics_only(h):
    """Wipe out the vapour of everything else: carry-over, level and selection stay as they are."""
    seen = h.paraffin | ((h.family == "aromatic") & (h.carbon >= 9))
    blind = replace(h, vapour=np.where(seen, h.vapour, np.nan), K=np.full_like(h.K, np.nan))
    assert np.array_equal(blind.carry_over()[0], h.carry_over()[0])
    assert np.array_equal(blind.selected(), h.selected())
    assert 8 <= h.selected().sum() < len(h.fuels)  # neither everything nor next to nothing


def test_paraffins_of_the_selected_fuels(h, record_property):
    """Every selected fuel within 15 % (root mean square), and the median of every paraffin within 15 %."""
    keep, ln = h.selected(), h.deviations(h.K, h.light())
    rms = spread(ln, h.light())[keep]
    record_property("rms_percent", (100.0 * rms).round(1).tolist())
    assert (rms <= PARAFFINS).all(), rms
    chosen = ln[keep][:, h.light()]
    several = np.isfinite(chosen).sum(axis=0) >= 3
    medians = np.nanmedian(chosen[:, several], axis=0)
    assert several.sum() >= 15
    assert (np.abs(medians) <= PARAFFINS).all(), medians
    # single ratios carry the chromatography of two phases and shared peaks: nine in ten are asked
    assert np.mean(np.abs(chosen[np.isfinite(chosen)]) <= PARAFFINS) >= 0.9


def test_paraffins_that_did_not_select_their_fuel(record_property):
    """Every other paraffin selects and sets the level, the rest is tested, both turns: no choice made on the tested."""
    computed, raoult = held_out()
    rms = np.sqrt([np.mean(computed**2), np.mean(raoult**2)])
    record_property("rms_percent_computed_and_raoult", (100.0 * rms).round(1).tolist())
    assert computed.size > 150
    assert rms[0] <= PARAFFINS
    # the excess term may not spoil what Raoult has; 5 % is the standard error of an rms of 180 values
    assert rms[0] <= 1.05 * rms[1]


def test_mtbe_on_the_selected_fuels(h, record_property):
    """Within 12 % on every selected fuel but one, whose whole series of analyses is out (next test)."""
    found = {fuel: v for (fuel, v), keep in zip(of(h, "MTBE").items(), h.selected(), strict=True) if keep and np.isfinite(v)}  # fmt: skip
    record_property("percent", {fuel: round(float(100.0 * np.expm1(v)), 1) for fuel, v in found.items()})
    assert len(found) >= 4
    assert {fuel for fuel, v in found.items() if abs(v) > ETHER} == {"4567"}
    assert abs(np.median(list(found.values()))) <= ETHER


def test_one_series_misses_mtbe_and_no_other(record_property):
    """Beside the C6 paraffins that boil around it: one series 25 % low and more, all others within 20 %.

    The same species by the same model in all of them: the difference is in the analyses. 20 % holds
    two chromatographic shares of five species in fuels that no rule has selected.
    """
    found = beside_neighbours()
    record_property("percent", {fuel: round(float(100.0 * np.expm1(v)), 1) for fuel, v in found.items()})
    others = np.array([v for fuel, v in found.items() if fuel not in HOUSTON])
    assert HOUSTON < set(found) and others.size >= 8
    assert max(found[fuel] for fuel in HOUSTON) < np.log(0.75)
    assert (np.abs(np.expm1(others)) <= 0.20).all()
    assert abs(np.median(others)) <= ETHER


def test_ethanol_needs_an_activity_model(h):
    """Shown to about 25 % in these data; Raoult's law misses it by a factor of several, the computed K does not."""
    alcohol = groups()["ethanol"]
    computed = h.deviations(h.K, h.light())[:, alcohol]
    raoult = h.deviations(h.K_ideal, h.light())[:, alcohol]
    assert np.isfinite(computed).sum() >= 5
    assert abs(np.nanmedian(computed)) <= np.log(1.25)
    assert np.nanmedian(raoult) > np.log(4.0)


def test_table_of_the_other_families(h, record_property):
    """Counts, medians and root mean squares are a report; the medians of the light families stay within 15 %.

    Heavier than toluene the vapour is no more than the carry-over taken off it: reported, not judged.
    """
    ln = h.deviations(h.K, h.light())[h.selected()]
    for name, mask in groups().items():
        v = ln[:, mask][np.isfinite(ln[:, mask])]
        if v.size:
            record_property(
                name, [int(v.size), round(float(np.median(v)), 3), round(float(np.sqrt(np.mean(v**2))), 3)]
            )
        if name in ("benzene", "toluene", "naphthenes", "olefins"):
            assert v.size >= 9
            assert abs(np.median(v)) <= PARAFFINS, name
