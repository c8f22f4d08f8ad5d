"""The same code path screens one case and two thousand, and lane i equals the single run."""

from __future__ import annotations

import time
from dataclasses import replace

import numpy as np
import pytest

from screener.blends import Blend
from screener.screening import screen_many
from tests.screening.sample import case, tank
from tests.screening.sheets import with_figure, with_pressure

SPECIES = ("n-butane", "isopentane", "n-pentane", "n-hexane", "cyclohexane", "n-heptane", "isooctane", "toluene",
           "m-xylene", "ethanol")  # fmt: skip
COUNT = 2000
CHECKED = 25


@pytest.fixture(scope="module")
def batch():
    rng = np.random.default_rng(20260711)
    shares = rng.dirichlet(np.ones(len(SPECIES)), COUNT)
    cases = [case(blend=Blend.of(dict(zip((f"species:{n}" for n in SPECIES), row)))) for row in shares]
    start = time.perf_counter()
    answers = screen_many(cases)
    return cases, answers, time.perf_counter() - start


def test_lane_i_equals_the_single_run(batch, record_property):
    cases, answers, spent = batch
    start = time.perf_counter()
    for i in np.linspace(0, COUNT - 1, CHECKED).astype(int):
        alone = screen_many((cases[i],))[0]
        for one, many in zip(alone.findings, answers[i].findings, strict=True):
            assert (one.id, one.verdict, one.reason) == (many.id, many.verdict, many.reason)
            for field in ("value", "low", "high", "limit_low", "limit_high", "margin", "room_used"):
                a, b = getattr(one, field), getattr(many, field)
                assert (a is None) == (b is None)
                if a is not None:
                    # 1e-9: the two runs differ only in the order of sums and in which lanes iterate together.
                    assert a == pytest.approx(b, rel=1e-9, abs=1e-9)
    each = (time.perf_counter() - start) / CHECKED
    print(f"\n{COUNT} cases together: {spent / COUNT * 1e3:.2f} ms each; alone: {each * 1e3:.1f} ms; "
          f"ratio {each / (spent / COUNT):.0f}")  # fmt: skip


def test_a_broken_case_spoils_no_other(batch):
    from tests.screening.sample import site

    good = case()
    broken = case(site=site(lowest_barometer=None, elevation=None, latitude=None), criteria=())
    colder = case(site=replace(site(), month="Jan"))
    alone = [screen_many((c,))[0] for c in (good, broken, colder)]
    together = screen_many((good, broken, colder))
    for one, many in zip(alone, together):
        assert [(f.id, f.verdict) for f in one.findings] == [(f.id, f.verdict) for f in many.findings]


def test_lane_i_equals_the_single_run_where_sheets_were_measured():
    """Cases with and without a factor, a flash point or a density of their own, in heel and receipt, in one batch."""
    rng = np.random.default_rng(20261201)
    liquids = [Blend.of(dict(zip((f"species:{n}" for n in SPECIES), row))) for row in rng.dirichlet(np.ones(10), 12)]
    factors = rng.uniform(0.9, 1.1, 12)
    measured = [with_pressure(b, f) if i % 3 else b for i, (b, f) in enumerate(zip(liquids, factors))]
    measured[1] = with_figure(measured[1], "flash_point", 260.0, 262.0, 4.0)
    measured[2] = with_figure(measured[2], "density_15", 751.0, 750.0, 0.5)
    # 600 m3 leave some of the receipt at the low level: no two liquids are equal, and the worst is one.
    heels = [replace(tank(), contents=replace(tank().contents, blend=b, volume=600.0)) for b in measured[::-1]]
    cases = [case(blend=b, tank=heel) for b, heel in zip(measured, heels)]
    together, plain = screen_many(cases), screen_many([case(blend=b) for b in liquids])
    for i, one in enumerate(cases):
        alone = screen_many((one,))[0]
        for a, b in zip(alone.findings, together[i].findings, strict=True):
            assert (a.id, a.verdict, a.reason, a.condition) == (b.id, b.verdict, b.reason, b.condition)
            for field in ("value", "low", "high", "limit_low", "limit_high", "room_used"):
                # 1e-9: as above.
                here, there = getattr(a, field), getattr(b, field)
                assert here == (there if there is None else pytest.approx(there, rel=1e-9, abs=1e-9))
            assert [f.value for f in a.facts] == [
                pytest.approx(f.value, rel=1e-9, abs=1e-9) if isinstance(f.value, float) else f.value for f in b.facts
            ]
        assert alone.assumptions == together[i].assumptions
    assert sum(a.findings != b.findings for a, b in zip(together, plain)) == 12
