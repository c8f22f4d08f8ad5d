"""Vapour pressures and heats in one curve: the arithmetic, what a curve keeps, what is passed over."""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from screener.equilibrium import Fluid, caloric
from screener.species import alpha, cold, correlate, find, forms, heats, library, names, pure

T_ALL = np.linspace(230.0, 400.0, 60)


def saturation(one, T):
    """ln P of the equation with its shipped alpha at T - STEP, T, T + STEP, (3, n)."""
    three = np.stack([T - correlate.STEP, T, T + correlate.STEP])
    P = [pure.psat_of_alpha(t, alpha(t / one.Tc, *one.alpha), one.Tc, one.Pc, one.psat(t)) for t in three]
    return np.log(np.stack(P))


@pytest.mark.parametrize("name", ["n-heptane", "toluene", "ethanol", "n-pentane"])
def test_heats_of_the_equation_by_another_route(name):
    """Compressibilities and heat capacity as used in the fits against the caloric properties of mixtures."""
    one, T = find(name), np.array([270.0, 298.15, 330.0])
    ln_P = saturation(one, T)
    dZ, departure = correlate.equation_at(T, ln_P, one.Tc, one.Pc)
    fluid, P = Fluid.of([name]), np.exp(ln_P[1])
    liquid, vapour = (caloric(fluid, T, P, [1.0], phase).require() for phase in "LV")
    # the reference heat of gas cancels; 2e-3: slopes of alpha over 2 K steps
    assert forms.cp_ideal(one.cp_ideal, T) + departure == pytest.approx(liquid.Cp, rel=2e-3)
    slope = (ln_P[2] - ln_P[0]) / (2.0 * correlate.STEP)
    assert correlate.R * T**2 * dZ * slope == pytest.approx(vapour.H - liquid.H, rel=5e-4)


def test_heats_alone_restore_a_lost_cold_end():
    """A curve of the equation itself above 340 K, and its own heats below: the cold end comes back."""
    one = find("n-heptane")
    T = T_ALL[T_ALL >= 340.0]
    at = np.linspace(245.0, 345.0, 7)
    ln_P = saturation(one, at)
    dZ, departure = correlate.equation_at(at, ln_P, one.Tc, one.Pc)
    heat = correlate.R * at**2 * dZ * (ln_P[2] - ln_P[0]) / (2.0 * correlate.STEP)
    capacity = forms.cp_ideal(one.cp_ideal, at) + departure
    tiny = np.full(len(at), 1e-4)
    known = heats.Thermal(
        heats.Heat(at, heat, tiny, "made up", ""), heats.Heat(at, capacity, tiny, "made up", ""), one.cp_ideal
    )
    c, covariance = correlate.correlate(T, one.psat(T), np.full(len(T), 1e-3), known, one.Tc, one.Pc)
    cold_T = np.array([240.0, 260.0, 290.0])
    # 0.2 %: the form is no exact solution of the equation, and slopes are taken over 2 K steps
    assert np.exp(correlate.basis(cold_T)[0] @ c) == pytest.approx(one.psat(cold_T), rel=2e-3)
    spread = np.sqrt(np.einsum("ij,jk,ik->i", *(correlate.basis(cold_T)[0], covariance, correlate.basis(cold_T)[0])))
    assert np.all(spread > 0.0) and np.all(spread < 0.01)


def test_without_heats_it_is_a_plain_fit():
    one = find("n-heptane")
    c, _ = correlate.correlate(
        T_ALL, one.psat(T_ALL), np.full(len(T_ALL), 1e-3), heats.Thermal(None, None, one.cp_ideal), one.Tc, one.Pc
    )
    # 0.05 %: five terms for six
    assert np.exp(correlate.basis(T_ALL)[0] @ c) == pytest.approx(one.psat(T_ALL), rel=5e-4)


def test_weights_fall_off_where_a_curve_is_not_measured():
    T = np.array([250.0, 300.0, 320.0, 360.0])
    P = np.array([1e2, 2e3, 8e3, 5e4])
    zero, nobody = np.zeros(4), np.full(4, np.nan)
    lone = cold.deviations(T, P, 310.0, zero, nobody)
    confirmed = cold.deviations(T, P, 310.0, zero, zero)
    assert lone[2] == pytest.approx(cold.LONE) and confirmed[2] == pytest.approx(cold.MEASURED)
    assert np.all(np.diff(lone)[:1] < 0.0) and lone[0] > 2.0 * cold.CONTINUED > lone[3]
    assert cold.deviations(T, P, 310.0, zero, np.full(4, 0.1))[3] > 0.1


def test_a_reference_equation_keeps_its_vapour_pressure():
    """Against the library's own, 250-350 K: the fit of six terms, and propylene's share for its heat capacity."""
    worst = []
    for one in map(find, names()):
        if one.curve.source != "helmholtz" or one.Tc < 400.0 or one.family == "ester":
            continue  # six terms miss the long esters by up to 0.9 % at 1 mPa
        curve = next(c for c in library.vapour_pressures(one.cas) if c.method == "HEOS_FIT")
        T = np.linspace(max(250.0, curve.low), 350.0, 21)
        worst.append((float(np.max(np.abs(one.psat(T) / curve.at(T) - 1.0))), one.name))
        assert "cold end by heats" not in one.psat_note
    print("reference equations: worst", sorted(worst)[-3:])
    assert len(worst) >= 30
    assert max(worst)[0] <= 0.002  # six terms over 200 K to 0.75 Tc
    one = find("propylene")
    curve = next(c for c in library.vapour_pressures(one.cas) if c.method == "HEOS_FIT")
    T = np.linspace(250.0, 340.0, 10)
    # 0.15 %: the fit of six terms to a light species; the shift itself is some 0.02 %
    assert one.psat(T) == pytest.approx(curve.at(T), rel=1.5e-3)


def test_measured_stretches_stay():
    """Above 6 kPa, where the published curve is valid and another confirms it: moved by no more than 1.5 %.

    Two in three by less than 0.2 %, the weight of the curve. The worst are species whose published curves differ.
    """
    moved = []
    for one in map(find, names()):
        if "cold end by heats" not in one.psat_note or one.psat_spread is None or one.psat_spread > 0.03:
            continue
        T = np.linspace(max(250.0, one.curve.source_low), 350.0, 41)
        P = one.psat(T)
        offered = library.vapour_pressures(one.cas)
        gap = [
            np.abs(P / c.at(T) - 1.0)[P > 6e3] for c in offered if abs(c.low - one.curve.source_low) < 0.01
        ]
        gap = [float(np.nanmax(g)) for g in gap if np.isfinite(g).any()]
        if gap:
            moved.append((min(gap), one.name))
    values = np.array([m[0] for m in moved])
    print(f"{len(values)} measured stretches: median {100 * np.median(values):.2f} %, worst {sorted(moved)[-5:]}")
    assert len(values) >= 60
    assert np.percentile(values, 66.0) <= 0.002 and values.max() <= 0.015


def test_tables_that_cannot_be_a_liquid_are_passed_over():
    one = find("ethylbenzene")  # its first spline is negative below 320 K
    known = heats.thermal(one.cas, one.MW, one.Tc, one.cp_ideal)
    assert np.all(known.capacity.value > 150.0) and known.capacity.method != "ZABRANSKY_SPLINE_SAT"
    one = find("biphenyl")  # melts at 342 K: its heats at 25 degC are no liquid's
    known = heats.thermal(one.cas, one.MW, one.Tc, one.cp_ideal)
    assert known.heat is None and known.capacity is None


def test_constants_that_deny_each_other_are_both_left_out(monkeypatch):
    one = find("3,3-diethylpentane")
    known = heats.thermal(one.cas, one.MW, one.Tc, one.cp_ideal)
    assert known.capacity.method == "CRCSTD" and known.words == "CRC_HVAP_298 CRCSTD"
    # a one-value table is continued with the ideal-gas heat capacity, and far less certain there
    assert list(known.capacity.T) == [298.15, 250.0, 330.0]
    assert np.all(known.capacity.deviation[1:] >= 2.0 * known.capacity.deviation[0])
    monkeypatch.setattr(heats, "SLIP", -1.0)
    one = find("cumene")  # has two constants
    monkeypatch.setattr(heats, "RECOMMENDED", ())
    monkeypatch.setattr(heats, "CAPACITIES", {k: heats.CAPACITIES[k] for k in heats.CONSTANTS})
    assert heats.thermal(one.cas, one.MW, one.Tc, one.cp_ideal).capacity is None


def test_a_correlation_that_does_not_end_is_none():
    one = find("n-heptane")
    known = heats.thermal(one.cas, one.MW, one.Tc, one.cp_ideal)
    beyond = replace(known, heat=replace(known.heat, T=np.array([600.0])))  # no liquid there
    assert correlate.correlate(T_ALL, one.psat(T_ALL), np.full(len(T_ALL), 1e-3), beyond, one.Tc, one.Pc) is None


def test_a_hydrocarbon_without_a_table_has_an_estimate():
    """Of corresponding states, and far less certain; an alcohol or ether has none."""
    one = find("2-methylundecane")
    known = heats.thermal(one.cas, one.MW, one.Tc, one.cp_ideal, one.omega)
    assert known.words == heats.ESTIMATE and not known.both
    assert heats.thermal(one.cas, one.MW, one.Tc, one.cp_ideal).capacity is None
    one = find("n-heptane")  # 224.7 J/(mol K) at 25 degC: from memory, unverified; 3 % as the estimate states
    found = heats.estimated(one.Tc, one.omega, one.cp_ideal)
    assert np.interp(298.15, found.T, found.value) == pytest.approx(224.7, rel=0.03)
    assert np.all(found.deviation >= 4.0 * heats.CAPACITIES["CRCSTD"][1])


def test_liquids_take_up_heat_like_liquids():
    """Heats of vaporisation fall with temperature and heat capacities of liquids exceed their vapours', 255-350 K."""
    for one in map(find, names()):
        if one.Tc < 400.0:
            continue
        T = np.linspace(max(255.0, one.curve.T_low + 3.0), min(350.0, 0.85 * one.Tc), 12)
        fluid, P = Fluid.of([one.name]), one.psat(T)
        liquid, vapour = (caloric(fluid, T, P, [1.0], phase).require() for phase in "LV")
        assert np.all(np.diff(vapour.H - liquid.H) < 0.0), one.name
        share = liquid.Cp / forms.cp_ideal(one.cp_ideal, T)
        assert share.min() > 1.05 and share.max() < 2.6, (one.name, share)
