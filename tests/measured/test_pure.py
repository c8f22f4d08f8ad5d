"""Pure species against measurement: vapour pressure and liquid density, of the curve and of the equation.

measured_psat_*.csv hold vapour pressures measured at the DOI per row, as registered in the
NIST ThermoML archive; *_sat.csv hold saturation tables computed from the reference equation
named in each file's head (REFERENCES.md). Run with -s to see the table.
"""

from __future__ import annotations

import csv
from pathlib import Path

import numpy as np
import pytest

from screener.species import alpha, find, forms, pure

FOLDER = Path(__file__).parent / "pure"
MEASURED = sorted(path.stem.removeprefix("measured_psat_") for path in FOLDER.glob("measured_psat_*.csv"))
TABLES = sorted(path.stem.removesuffix("_sat") for path in FOLDER.glob("*_sat.csv"))


def read(name):
    """Columns of one file as arrays."""
    with (FOLDER / f"{name}.csv").open(encoding="utf-8") as file:
        rows = list(csv.DictReader(line for line in file if not line.startswith("#")))
    return {key: np.array([float(row[key]) for row in rows]) for key in rows[0] if key != "doi"}


def equation(one, T):
    """Vapour pressure [Pa] and saturated liquid density [kg/m3] of the equation of state at T [K]."""
    a = alpha(T / one.Tc, *one.alpha)
    P = pure.psat_of_alpha(T, a, one.Tc, one.Pc, one.psat(T))
    c0, c1 = one.translation
    return P, one.MW / (pure.liquid_volume(T, P, a, one.Tc, one.Pc) - c0 - c1 * (T - 298.15))


@pytest.mark.parametrize("name", MEASURED)
def test_vapour_pressure_against_measurement(name):
    data, one = read(f"measured_psat_{name}"), find(name)
    inside = data["T_K"] < 0.9 * one.Tc
    T, measured = data["T_K"][inside], data["Psat_Pa"][inside]
    P, _ = equation(one, T)
    curve, state = 100.0 * (one.psat(T) / measured - 1.0), 100.0 * (P / measured - 1.0)
    print(
        f"{name:12s} n {len(T):3d}  curve mean {np.mean(np.abs(curve)):.2f} % worst {np.max(np.abs(curve)):.2f} %"
        f"  equation mean {np.mean(np.abs(state)):.2f} % worst {np.max(np.abs(state)):.2f} %"
    )
    # 1 %: measurements scatter by 0.2 to 0.5 %, isooctane's (two laboratories) by 3 % at its coldest
    assert np.mean(np.abs(curve)) <= 1.0
    assert np.mean(np.abs(state)) <= 1.0
    # 3.5 %: no single point worse than that coldest one
    assert np.max(np.abs(state)) <= 3.5


@pytest.mark.parametrize("name", TABLES)
def test_liquid_density_against_reference_equation(name):
    data, one = read(f"{name}_sat"), find(name)
    inside = (data["T_K"] >= 250.0) & (data["T_K"] <= 350.0) & (data["T_K"] <= 0.9 * one.Tc)
    T = data["T_K"][inside]
    P, rho = equation(one, T)
    miss = 100.0 * (rho / data["rhoL_kg_m3"][inside] - 1.0)
    low = 100.0 * (P / data["Psat_Pa"][inside] - 1.0)
    print(f"{name:12s} density mean {np.mean(np.abs(miss)):.2f} % worst {np.max(np.abs(miss)):.2f} %"
          f"  vapour pressure mean {np.mean(np.abs(low)):.3f} % worst {np.max(np.abs(low)):.3f} %")  # fmt: skip
    # 1 % mean is the promise of the translation; its two terms cannot bend with the liquid near 0.8 Tc
    assert np.mean(np.abs(miss)) <= 1.0
    # 0.5 %: curve and table come from reference equations; n-heptane's are two different ones (0.2 % apart)
    assert np.mean(np.abs(low)) <= 0.5


def test_density_at_15_degrees():
    # trade volumes stand on this temperature: the standard density must hold closer than the equation
    for name in TABLES:
        data, one = read(f"{name}_sat"), find(name)
        reference = np.interp(288.15, data["T_K"], data["rhoL_kg_m3"])
        # 0.1 %: interpolation in 5 K steps costs less than 0.01 %, the fit of the density 0.02 %
        assert abs(one.rho_15 / reference - 1.0) < 1e-3, name


def test_curve_is_the_equation():
    """The equation gives back its curve: 0.3 % mean, 1 % worst below 0.9 Tc between 250 and 350 K."""
    for name in TABLES:
        one = find(name)
        T = np.linspace(max(250.0, one.curve.T_low), min(350.0, 0.9 * one.Tc), 41)
        a = alpha(T / one.Tc, *one.alpha)
        wanted = forms.psat(one.curve.coefficients, T)
        miss = np.abs(pure.psat_of_alpha(T, a, one.Tc, one.Pc, wanted) / wanted - 1.0)
        assert np.mean(miss) <= 0.003 and np.max(miss) <= 0.01, name  # the promise of the fits
