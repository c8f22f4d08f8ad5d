"""What the fitted numbers promise: alpha, translation, heat capacity, boiling point."""

from __future__ import annotations

import csv
from pathlib import Path

import numpy as np
import pytest

from screener.ground.constants import ATMOSPHERE, R
from screener.species import alpha, find, forms, names, pure

DATA = Path(__file__).resolve().parents[2] / "data" / "species"
ALL = [find(name) for name in names()]


def table(name):
    with (DATA / f"{name}.csv").open(encoding="utf-8", newline="") as file:
        return list(csv.DictReader(file))


def misses(one):
    """Relative misses of the equation against its curve, 250-350 K below 0.9 Tc, recomputed."""
    low, high = (250.0, min(350.0, 0.9 * one.Tc)) if one.Tc > 340.0 else (one.curve.T_low, 0.97 * one.Tc)
    T = np.linspace(max(low, one.curve.T_low), high, 21)
    P = one.psat(T)
    return pure.psat_of_alpha(T, alpha(T / one.Tc, *one.alpha), one.Tc, one.Pc, P) / P - 1.0


def test_equation_reproduces_the_curve():
    """Mean at most 0.3 % (alcohols 0.5 %) and 1 % at worst for every species: the promise of the fits."""
    worst = []
    for one in ALL:
        miss = np.abs(misses(one))
        assert np.mean(miss) <= (0.005 if one.family == "alcohol" else 0.003), one.name
        assert np.max(miss) <= 0.01, one.name
        worst.append((float(np.mean(miss)), float(np.max(miss)), one.name))
    mean, top = np.mean([w[0] for w in worst]), max(w[1] for w in worst)
    print(f"{len(ALL)} species: mean {100 * mean:.4f} %, worst mean {100 * max(worst)[0]:.3f} % ({max(worst)[2]}), "
          f"worst point {100 * top:.3f} %")  # fmt: skip
    assert mean <= 5e-4  # the fits do ten times better than promised on average; a loss of that is a fault


def test_saturation_by_an_independent_route():
    """Equal fugacities with roots of the cubic in Z from numpy.roots, at pressures the solver found."""
    for name in ("n-butane", "toluene", "ethanol", "water", "nitrogen"):
        one = find(name)
        for T in np.linspace(0.6 * one.Tc, min(0.85 * one.Tc, one.curve.T_high), 3):
            a = float(alpha(T / one.Tc, *one.alpha))
            P = float(
                pure.psat_of_alpha(np.array([T]), np.array([a]), one.Tc, one.Pc, np.array([one.psat(T)]))[0]
            )
            A = pure.OMEGA_A * a * (P / one.Pc) / (T / one.Tc) ** 2
            B = pure.OMEGA_B * (P / one.Pc) / (T / one.Tc)
            roots = np.roots([1.0, B - 1.0, A - 3.0 * B**2 - 2.0 * B, B**3 + B**2 - A * B])
            Z = np.sort(roots[np.abs(roots.imag) < 1e-10].real)
            ln_phi = (
                Z
                - 1.0
                - np.log(Z - B)
                - A
                / (2.0 * np.sqrt(2.0) * B)
                * np.log((Z + (1.0 + np.sqrt(2.0)) * B) / (Z + (1.0 - np.sqrt(2.0)) * B))
            )
            assert abs(ln_phi[0] - ln_phi[-1]) < 1e-8  # numpy.roots is good to about 1e-10 in the small root


def test_alpha_is_positive_and_falls():
    """From 200 to 1000 K: reduced temperatures of 0.25 for the heaviest and 30 for hydrogen."""
    for one in ALL:
        value = alpha(np.linspace(200.0, 1000.0, 200) / one.Tc, *one.alpha)
        assert np.all(value > 0.0) and np.all(np.diff(value) < 0.0), one.name


def test_supercritical_gases_keep_their_attraction():
    """The second virial coefficient of the equation, b - a/RT, against measured ones at 300 K.

    B in cm3/mol: N2 -4.5, O2 -16, CH4 -43, H2 +15 (J.H. Dymond, E.B. Smith, The Virial
    Coefficients of Pure Gases and Mixtures, Oxford 1980: from memory, unverified, so the gates are wide).
    """
    for name, B in {"nitrogen": -4.5, "oxygen": -16.0, "methane": -43.0, "hydrogen": 15.0}.items():
        one = find(name)
        b = pure.covolume(one.Tc, one.Pc)
        a = pure.OMEGA_A * (R * one.Tc) ** 2 / one.Pc * alpha(300.0 / one.Tc, *one.alpha)
        # 12 cm3/mol: a cubic equation is off by some cm3/mol anyway; at 1 bar it is 0.05 % in fugacity
        assert 1e6 * (b - a / (R * 300.0)) == pytest.approx(B, abs=12.0), name


def test_alpha_is_one_and_smooth_at_the_critical_point():
    for one in ALL:
        assert alpha(1.0, *one.alpha) == pytest.approx(1.0, abs=1e-14)
        h = 1e-4
        left, right = (alpha(np.array([1.0 - 2 * h, 1.0 - h, 1.0]) , *one.alpha),
                       alpha(np.array([1.0, 1.0 + h, 1.0 + 2 * h]), *one.alpha))  # fmt: skip
        curvature = (left[0] - 2 * left[1] + left[2]) / h**2, (right[0] - 2 * right[1] + right[2]) / h**2
        # 0.05: a step h inside, the third derivative (up to a few hundred) shows as h times itself
        assert curvature[0] == pytest.approx(curvature[1], abs=0.05), one.name


def test_translation_gives_the_density():
    """Mean at most 1 % over 250-350 K below 0.9 Tc for every species that is a liquid there."""
    found = []
    for row in table("liquid_density"):
        one = find(row["cas"])
        if one.Tc <= 340.0:
            continue
        T = np.linspace(float(row["T_low"]), float(row["T_high"]), 21)
        rho = forms.density_basis(T) @ np.array([float(row[f"d{i}"]) for i in range(4)])
        a = alpha(T / one.Tc, *one.alpha)
        c0, c1 = one.translation
        P = np.where(T >= one.curve.T_low, forms.psat(one.curve.coefficients, T), 1e-3)
        v = pure.liquid_volume(T, P, a, one.Tc, one.Pc) - c0 - c1 * (T - 298.15)
        miss = np.abs(one.MW / v / rho - 1.0)
        found.append((float(np.mean(miss)), one.name))
        assert np.mean(miss) <= 0.01 and np.max(miss) <= 0.03, one.name  # propane bends most: 1.7 % at 333 K
    print(
        f"{len(found)} species: density mean {100 * np.mean([f[0] for f in found]):.3f} %, worst {max(found)}"
    )


def test_boiling_point_is_one_atmosphere():
    """The curve at the library's boiling point, which took no part in most choices."""
    miss = {one.name: abs(one.psat(one.Tb) / ATMOSPHERE - 1.0) for one in ALL if one.name != "carbon dioxide"}
    # CO2 sublimes at 1 atm. 4 %: one degree of the boiling point, the uncertainty of minor isomers'
    off = {name for name, value in miss.items() if value > 0.04}
    assert np.median(list(miss.values())) < 0.005
    assert off == {
        # boiling points of the library that disagree with all curves; the two 3-methyl-2-pentenes are
        # exchanged in it
        "cis-3-methyl-2-pentene", "trans-3-methyl-2-pentene", "heptylbenzene", "pentylbenzene", "nonylbenzene",
        "2,2-dimethyloctane", "2,6-dimethyloctane", "2,4-dimethyloctane", "4,4-dimethylheptane",
        "1-tert-butyl-4-methylbenzene",
    }  # fmt: skip
    assert max(miss.values()) < 0.11


def test_curve_is_nan_outside_its_range():
    one = find("n-butane")
    values = one.psat(np.array([one.curve.T_low - 1.0, 300.0, one.curve.T_high + 1.0, np.nan]))
    assert np.isnan(values[[0, 2, 3]]).all() and np.isfinite(values[1])
    assert isinstance(one.psat(300.0), float)


def test_curves_rise_with_temperature():
    for one in ALL:
        T = np.linspace(one.curve.T_low, one.curve.T_high, 300)
        assert np.all(np.diff(one.psat(T)) > 0.0), one.name


def test_heat_of_vaporisation_is_plausible():
    """Clausius-Clapeyron at 298.15 K gives Trouton-like heats: 60 to 130 J/(mol K) times the boiling point.

    80 to 95 is usual of hydrocarbons at their boiling point (Trouton), more at 298 K for heavy ones and
    for alcohols; the wide gates only catch a wrong curve.
    """
    for one in ALL:
        if one.Tc > 400.0:
            slope = np.log(one.psat(300.0) / one.psat(296.0)) / (1.0 / 296.0 - 1.0 / 300.0)
            assert 60.0 < slope * R / one.Tb < 200.0, (one.name, slope * R / one.Tb)


def test_density_at_15_degrees():
    # values printed in handbooks for 15 degC: benzene 884.2 (20 degC 879.0 + 1.07/K), water 999.1 kg/m3;
    # ethanol 793.5 and methanol 795.9 at 15 degC : from memory, so 0.2 %
    for name, rho in {"benzene": 884.2, "water": 999.1, "ethanol": 793.5, "methanol": 796.0}.items():
        assert find(name).rho_15 == pytest.approx(rho, rel=2e-3), name
    assert "effective" in find("nitrogen").rho_note and "effective" not in find("propane").rho_note


def test_heat_capacity_of_the_ideal_gas():
    # five hundredths per cent: the library's own statistical values for methane and n-butane at 298.15 K
    # are 35.7 and 98.5 J/(mol K) in every handbook; 1 % covers conformer treatment
    for name, cp in {"methane": 35.7, "n-butane": 98.5, "nitrogen": 29.12, "water": 33.59}.items():
        assert forms.cp_ideal(find(name).cp_ideal, 298.15) == pytest.approx(cp, rel=0.01), name
    for one in ALL:
        value = forms.cp_ideal(one.cp_ideal, np.linspace(200.0, 500.0, 31))
        assert np.all(value > 20.0) and np.all(np.diff(value) > -0.05), one.name
