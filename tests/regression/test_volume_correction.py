"""Petroleum volume correction: remembered constants guarded, agreement with what they must satisfy."""

from __future__ import annotations

import math

import numpy as np
import pytest

from screener.ground.constants import T_15C
from screener.ground.errors import UnknownName
from screener.ground.files import read_table
from screener.volatility.volume_correction import density_60F, petroleum_expansion, products

# Constants of the older 15 degC tables per degC, as remembered and as open code of several
# authors quotes them (the standard was not read): each is 1.8 times its 60 degF partner.
PER_DEGC = {
    "crude": (613.9723, 0.0, 0.0),
    "gasoline": (346.4228, 0.4388, 0.0),
    "transition": (2680.3206, 0.0, -0.00336312),
    "jet": (594.5418, 0.0, 0.0),
    "fuel-oil": (186.9696, 0.4862, 0.0),
}


def test_products():
    assert products() == ("crude", "gasoline", "transition", "jet", "fuel-oil")


@pytest.mark.parametrize("product", PER_DEGC)
def test_constants_are_one_set_in_two_units(product):
    row = next(r for r in read_table("volatility/volume_correction.csv") if r["product"] == product)
    for key, per_degc in zip(("K0", "K1", "K2"), PER_DEGC[product], strict=True):
        # Printed to 4 decimals (K0, K1) or 8 (K2): half a unit of the last place each side.
        assert 1.8 * float(row[key]) == pytest.approx(per_degc, abs=1e-4 if key != "K2" else 1e-8)


@pytest.mark.parametrize(
    ("lighter", "heavier"), [("gasoline", "transition"), ("transition", "jet"), ("jet", "fuel-oil")]
)
def test_groups_meet(lighter, heavier):
    """Where two refined groups meet they must give one coefficient: a slip would open a step."""
    rows = {r["product"]: r for r in read_table("volatility/volume_correction.csv")}
    edge = float(rows[lighter]["rho60_high"])
    assert edge == float(rows[heavier]["rho60_low"])
    alpha = [
        sum(float(rows[p][k]) / edge**n for k, n in (("K0", 2), ("K1", 1), ("K2", 0)))
        for p in (lighter, heavier)
    ]
    # The edges are printed to 4 decimals; a last digit of K0 or K1 is worth up to 1.3e-7 of alpha.
    assert alpha[0] == pytest.approx(alpha[1], abs=1.5e-7)


def older_15C(rho_15, t, K0, K1, K2):
    alpha = K0 / rho_15**2 + K1 / rho_15 + K2
    dT = t - 15.0
    return math.exp(-alpha * dT * (1.0 + 0.8 * alpha * dT))


@pytest.mark.parametrize(
    ("product", "rho_15"),
    [("gasoline", 740.0), ("transition", 778.0), ("jet", 800.0), ("fuel-oil", 845.0), ("crude", 860.0)],
)
@pytest.mark.parametrize("t", [-20.0, 15.0, 38.0, 60.0])
def test_agrees_with_the_older_15C_form(product, rho_15, t):
    ours = 1.0 / petroleum_expansion(rho_15, t + 273.15, product)[0]
    # The older tables put the same constants at 15 degC instead of 60 degF: alpha is then that
    # of a liquid 0.05 % denser, and in the steep transition band that is worth most.
    K0, K1, _ = PER_DEGC[product]
    slope = 2.0 * K0 / rho_15**3 + K1 / rho_15**2
    allowed = slope * 5e-4 * rho_15 * 1.4 * abs(t - 15.0) + 1e-9
    assert ours == pytest.approx(older_15C(rho_15, t, *PER_DEGC[product]), abs=allowed)


def test_regression_values():
    """Values of this code, kept: factors to 15 degC of gasoline, jet fuel, diesel and crude at 35 degC."""
    rho = np.array([740.0, 800.0, 845.0, 860.0])
    vcf = np.array(
        [
            1.0 / petroleum_expansion(r, 308.15, p)[0]
            for r, p in zip(rho, (None, None, None, "crude"), strict=True)
        ]
    )
    assert vcf == pytest.approx(REGRESSION, abs=5e-6)


REGRESSION = (0.975317, 0.981318, 0.983180, 0.983314)


def test_base_temperature_is_one():
    assert petroleum_expansion([700.0, 780.0, 820.0, 900.0], T_15C) == pytest.approx(np.ones(4), abs=1e-15)


def test_density_at_60F_lies_just_below():
    rho60 = density_60F([700.0, 800.0, 900.0])
    # 0.556 K at 1.3e-3, 0.93e-3 and 0.77e-3 per K (K0/rho^2 + K1/rho)
    assert 1.0 - rho60 / [700.0, 800.0, 900.0] == pytest.approx([7.4e-4, 5.2e-4, 4.3e-4], rel=0.05)


def test_outside_the_method_is_no_number():
    assert np.isnan(petroleum_expansion([560.0, 1200.0, 740.0, 740.0], [300.0, 300.0, 200.0, 430.0])).all()


def test_unknown_group():
    with pytest.raises(UnknownName, match="'kerosine' is not a known commodity group"):
        petroleum_expansion(800.0, 300.0, "kerosine")
