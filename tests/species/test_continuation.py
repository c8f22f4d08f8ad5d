"""How well a narrow curve is continued downward, measured on species whose curve below is known.

A narrow Antoine or Wagner curve of a hydrocarbon is cut off at its own lower end, continued by the
two Wagner forms, and held against the reference equation or wide correlation that reaches further.
The same with the heats of the liquid, on every species that has a reference equation: the heats are those of
tables that do not come from it. This is what the extension of data/species/vapour_pressure.csv rests on.
"""

from __future__ import annotations

import numpy as np
import pytest

from screener.species import find, library, names
from screener.species.vapour_pressure import WINDOW, continuations
from tests.studies.caloric_correlation import trials as blind_trials

HYDROCARBONS = ("paraffin", "isoparaffin", "naphthene", "olefin", "aromatic")


@pytest.fixture(scope="module")
def trials():
    """{kelvin below the curve: rows of (three-term, four-term, mean) relative misses}."""
    found = {20: [], 40: [], 60: []}
    for name in names():
        one = find(name)
        if (
            one.family not in HYDROCARBONS
            or one.Tc < 400.0
            or one.curve.source not in ("helmholtz", "poling-2001")
        ):
            continue
        offered = {c.method: c for c in library.vapour_pressures(one.cas)}
        wide = offered.get("HEOS_FIT") or offered.get("WAGNER_POLING")
        for method in ("ANTOINE_POLING", "LANDOLT", "WAGNER_MCGARRY"):
            narrow = offered.get(method)
            if wide is None or narrow is None or narrow.high - narrow.low < 90.0:
                continue
            T = np.linspace(narrow.low, narrow.low + WINDOW, 60)
            T = T[T <= narrow.high]
            P = narrow.at(T)
            level = P[0] / wide.at(T[:1])[0]
            if not abs(level - 1.0) < 0.01:
                continue  # the two disagree where both are valid: nothing to learn about the continuation
            for below, rows in found.items():
                at = T[:1] - below
                truth = wide.at(at)[0] * level
                if np.isfinite(truth) and at[0] >= 230.0:
                    three, four = (line[0] / truth - 1.0 for line in continuations(T, P, one.Tc, one.Pc, at))
                    rows.append((three, four, np.sqrt((1 + three) * (1 + four)) - 1))
    return {below: 100.0 * np.array(rows) for below, rows in found.items()}


@pytest.mark.parametrize("below, rms, worst", [(20, 0.6, 1.2), (40, 1.2, 2.5), (60, 2.2, 6.0)])
def test_mean_of_two_forms(trials, below, rms, worst):
    """Root mean square and worst miss in per cent; about twice what was found when this was written."""
    misses = trials[below][:, 2]
    print(f"{below} K below: {len(misses)} trials, bias {misses.mean():+.2f} %, rms {np.sqrt(np.mean(misses**2)):.2f} %, "
          f"worst {np.abs(misses).max():.2f} %")  # fmt: skip
    assert len(misses) >= 15
    assert np.sqrt(np.mean(misses**2)) <= rms and np.abs(misses).max() <= worst


def test_band_covers_most_of_the_misses(trials):
    """Half the distance of the two forms holds three misses in four: a band, not a bound."""
    rows = np.concatenate(list(trials.values()))
    inside = np.abs(rows[:, 2]) <= 0.5 * np.abs(rows[:, 0] - rows[:, 1])
    assert inside.mean() >= 0.75


@pytest.fixture(scope="module")
def blind():
    """{(cut, kinds): misses (n, 2) at 255 and 280 K, bands (n, 2)} in per cent."""
    found = {}
    for cut, kinds in ((300.0, ""), (300.0, "hc"), (330.0, ""), (330.0, "he"), (330.0, "hc")):
        rows = blind_trials(cut, kinds)
        found[cut, kinds] = 100.0 * np.array([t.miss for t in rows]), 100.0 * np.array([t.band for t in rows])
    return found


@pytest.mark.parametrize(
    "cut, kinds, mean, worst", [(300.0, "hc", 1.1, 3.0), (330.0, "he", 1.4, 5.5), (330.0, "hc", 1.4, 5.0)]
)
def test_heats_tell_the_cold_end(blind, cut, kinds, mean, worst):
    """Mean and worst miss at 255 K; about a fifth more than was found when this was written."""
    miss, _ = blind[cut, kinds]
    plain = np.nanmean(np.abs(blind[cut, ""][0][:, 0]))
    off = np.abs(miss[np.isfinite(miss[:, 0]), 0])
    print(f"cut at {cut:.0f} K, {kinds}: {len(off)} trials, mean {off.mean():.2f} % worst {off.max():.2f} % at 255 K, "
          f"plainly continued {plain:.2f} %")  # fmt: skip
    assert len(off) >= 50
    assert off.mean() <= mean and off.max() <= worst
    assert off.mean() <= 0.65 * plain


@pytest.mark.parametrize("cut, kinds", [(300.0, ""), (300.0, "hc"), (330.0, ""), (330.0, "he"), (330.0, "hc")])
def test_shipped_band_covers_the_blind_misses(blind, cut, kinds):
    """Two standard deviations: nine in ten at 255 K; a few trials share a species, so 88 in 100 is asked."""
    miss, band = blind[cut, kinds]
    known = np.isfinite(miss[:, 0])
    inside = np.mean(np.abs(miss[known, 0]) <= band[known, 0])
    print(f"cut at {cut:.0f} K, {kinds or 'continued'}: {100 * inside:.0f} of 100 within, band {band[:, 0].mean():.1f} %")
    assert inside >= 0.88
