"""Liquids with a factor on every fugacity: against the exact solution with scaled K, and that nobody goes around it."""

from __future__ import annotations

import ast
from pathlib import Path

import numpy as np
import pytest

from screener import equilibrium
from screener.blends import Blend
from screener.states import scaled
from tests.screening.sample import LIGHT, ZERO, blend

ROOT = Path(__file__).resolve().parents[2]
F = 1.08
LPG = {"n-butane": 0.6, "isopentane": 0.4}
# Whatever turns a liquid into a vapour pressure: above the floor of states these names come from `scaled` only.
UNSCALED = {
    "bubble_pressure", "bubble_temperature", "dew_pressure", "dew_temperature", "flash_tp", "flash_ph", "flash_ps",
    "caloric", "first_vapour", "envelope", "true_vapour_pressure", "dvpe", "reid_vapour_pressure",
    "vapour_pressure_at_ratio", "ratio_temperature", "volatility_sheet", "volatility_sheets", "vapour_space",
    "headspace", "flash_point", "flammable_window", "contaminated_flash_point", "contaminated_space",
    "share_at_flash_point", "hydrogen_sulfide_vapour",
}  # fmt: skip
OPEN = ("screener.equilibrium", "screener.fire", "screener.volatility", "screener.blends")


def unscaled_imports(text: str) -> list[str]:
    """Names of a source that bring in a vapour pressure without its factor."""
    found = []
    for node in ast.walk(ast.parse(text)):
        if isinstance(node, ast.ImportFrom) and (node.module or "").startswith(OPEN):
            found += [alias.name for alias in node.names if alias.name in UNSCALED]
        if isinstance(node, ast.ImportFrom) and node.module == "screener":
            found += [alias.name for alias in node.names if f"screener.{alias.name}" in OPEN]
        if isinstance(node, ast.Import):
            found += [alias.name for alias in node.names if alias.name.startswith(OPEN)]
    return found


def test_nothing_behind_a_finding_goes_around_the_factor():
    files = [p for floor in ("states", "screening", "memo") for p in (ROOT / "screener" / floor).glob("*.py")]
    assert len(files) > 40
    found = {p.name: unscaled_imports(p.read_text(encoding="utf-8")) for p in files if p.name != "scaled.py"}
    assert {name: names for name, names in found.items() if names} == {}


def test_that_test_can_fail():
    assert unscaled_imports("from screener.fire import flash_point, static_class") == ["flash_point"]
    assert unscaled_imports("from screener import fire") == ["fire"]
    assert unscaled_imports("import screener.equilibrium") == ["screener.equilibrium"]
    assert unscaled_imports("from screener.states.scaled import flash_point") == []


def exact_bubble(fluid, T, x, f):
    """Bubble pressure with K scaled by f, by substitution: the sum of x f K is one."""
    P, y = np.array([1e5]), x[None, :]
    for _ in range(400):
        ln_K = fluid.ln_phi(np.array([T]), P, x[None, :], "L") - fluid.ln_phi(np.array([T]), P, y, "V")
        y = x * f * np.exp(ln_K)
        total = y.sum()
        P, y = P * total, y / total
        if abs(total - 1.0) < 1e-12:
            return float(P[0])
    raise AssertionError("no exact solution")


def exact_flash(fluid, T, P, z, f):
    """Vapour fraction with K scaled by f, by substitution and halving."""
    x, y = z, z
    for _ in range(400):
        ln_K = (fluid.ln_phi(*_one(T, P, x), "L") - fluid.ln_phi(*_one(T, P, y), "V"))[0]
        K = f * np.exp(ln_K)
        low, high = 0.0, 1.0
        for _ in range(60):
            b = 0.5 * (low + high)
            low, high = (b, high) if (z * (K - 1.0) / (1.0 + b * (K - 1.0))).sum() > 0.0 else (low, b)
        new = z / (1.0 + b * (K - 1.0))
        moved, x = np.abs(new / new.sum() - x).max(), new / new.sum()
        y = K * x / (K * x).sum()
        if moved < 1e-11:
            return b
    raise AssertionError("no exact solution")


def _one(T, P, x):
    return np.array([T]), np.array([P]), x[None, :]


@pytest.mark.parametrize(("shares", "degC", "bar", "allowed"), [(LIGHT, 20.0, 0.3, 1e-3), (LPG, 40.0, 3.0, 1e-2)])
def test_a_scaled_pressure_beside_the_exact_one(shares, degC, bar, allowed):
    """Allowed: a fifth of the method spread at 3 bar, in proportion to the pressure below (the vapour's B P/RT)."""
    liquid = blend(shares)
    fluid, z, T = liquid.fluid, liquid.z, ZERO + degC
    exact = exact_bubble(fluid, T, z, F)
    near = float(scaled.bubble_pressure(fluid, T, z, F).P[0])
    print(f"\n{degC} degC, f {F}: exact {exact / 1e5:.4f} bar, P times f {100 * (near / exact - 1):+.3f} %")
    assert exact == pytest.approx(bar * 1e5, rel=0.5)  # the case is about as many bar as it says
    assert near == pytest.approx(exact, rel=allowed)
    assert exact_bubble(fluid, T, z, 1.0) == pytest.approx(near / F, rel=1e-8)  # the exact one is right without factor
    P = 0.9 * near
    beta = float(scaled.flash_tp(fluid, T, np.array([P]), z, F).beta[0])
    exact = exact_flash(fluid, T, P, z, F)
    print(f"flashed at {P / 1e5:.3f} bar: vapour fraction {beta:.4f}, exact {exact:.4f}")
    assert 0.02 < exact < 0.9
    # What the pressure misses by moves the fraction in the same measure: its slope is d beta / d ln P.
    steeper = abs(float(scaled.flash_tp(fluid, T, np.array([P * 0.99]), z, F).beta[0]) - beta) / 0.01
    assert beta == pytest.approx(exact, abs=allowed * steeper)


def test_boiling_and_vapour_fit_together():
    """Temperature and pressure of one liquid are each other's inverse, and the space over it adds up to the pressure."""
    liquid = blend(LIGHT)
    fluid, z = liquid.fluid, liquid.z
    T = np.array([ZERO, ZERO + 30.0])
    P = scaled.bubble_pressure(fluid, T, z, F).P
    assert scaled.bubble_temperature(fluid, P, z, F).T == pytest.approx(T, abs=1e-6)  # solver tolerance
    y = scaled.headspace(fluid, T, z, F, P=101325.0)
    # v P/RT = 6e-3 at one bar: the space counts the fugacity at its own pressure, the bubble point at its lower one.
    assert y.sum(axis=1) * 101325.0 == pytest.approx(P, rel=6e-3)
    space = scaled.vapour_space(fluid, T, z, F, P=101325.0)
    assert space.fuel == pytest.approx(y.sum(axis=1), rel=1e-12)


def test_a_factor_shrinks_the_window_from_both_ends_alike():
    """At the lower end of the scaled liquid the plain one stands at 1/f of its limit; so at the flash point."""
    liquid = Blend.of({"stock:jet kerosene": 1.0})
    fluid, z = liquid.fluid, liquid.z
    window = scaled.flammable_window(fluid, z, F)
    plain = scaled.vapour_space(fluid, window.T_lower, z, 1.0)
    assert plain.lower_ratio == pytest.approx([1.0 / F], rel=1e-3)  # v P/RT between P and P/f is 5e-4
    T, T_plain = (float(scaled.flash_point(fluid, z, f).T[0]) for f in (F, 1.0))
    assert T < T_plain
    # One part in twelve more vapour: R T^2 ln f / heat, with 35 to 60 kJ/mol for what evaporates from kerosene.
    assert 0.8 < T_plain - T < 2.5


def test_a_space_takes_f_times_as_much_from_the_liquid():
    """Balance of the scaled liquid: what is missing in the space of a small charge is what evaporated."""
    liquid = blend({"n-pentane": 1.0})
    T = ZERO + 20.0
    rich, thin = (scaled.vapour_space(liquid.fluid, T, liquid.z, F, ratio=r).fuel[0] for r in (0.0, 1e6))
    v = float(liquid.fluid.v_15[0])
    assert rich == pytest.approx(F * scaled.vapour_space(liquid.fluid, T, liquid.z, 1.0).fuel[0], rel=1e-3)
    # All of it gone: n R T / V over the pressure of the space, whatever the factor.
    assert thin == pytest.approx(8.314462618 * T / (1e6 * v) / 101325.0, rel=1e-9)


DRY, WET = Blend.of({"stock:summer gasoline base": 1.0}), Blend.of({"stock:summer gasoline base": 0.998, "species:water": 0.002})
COLD_TO_WARM = np.array([253.15, 273.15, 288.15, 310.93])  # [K]


def test_settled_water_adds_its_own_vapour_pressure_and_no_more():
    """Dry fuel and pure water add up within 0.5 %: each dissolves in the other to less than a thousandth.

    Held together they come to half as much again and more. Ten times the water moves the point by 5e-6: the fuel that
    dissolves in it, a hundred-thousandth of the whole; asked is 1e-4.
    """
    own = equilibrium.bubble_pressure(equilibrium.Fluid.of(["water"]), COLD_TO_WARM, [1.0]).P
    dry = scaled.bubble_pressure(DRY.fluid, COLD_TO_WARM, DRY.z, 1.0).P
    wet = scaled.bubble_pressure(WET.fluid, COLD_TO_WARM, WET.z, 1.0)
    assert wet.P == pytest.approx(dry + own, rel=5e-3)
    together = equilibrium.bubble_pressure(WET.fluid, COLD_TO_WARM, WET.z).P
    assert (together > 1.5 * wet.P).all()
    more = Blend.of({"stock:summer gasoline base": 0.98, "species:water": 0.02})
    assert scaled.bubble_pressure(more.fluid, COLD_TO_WARM, more.z, 1.0).P == pytest.approx(wet.P, rel=1e-4)
    assert wet.y.sum(axis=1) == pytest.approx(1.0, abs=1e-9)


def test_dissolved_water_changes_no_bubble_point():
    """100 ppm of water in the warm, and any water that ethanol holds, are one liquid: the plain answer to the bit."""
    for parts in ({"stock:summer gasoline base": 0.9999, "species:water": 1e-4}, {"species:ethanol": 0.95, "species:water": 0.05}):
        one = Blend.of(parts)
        found = scaled.bubble_pressure(one.fluid, np.array([310.93]), one.z, 1.0)
        plain = equilibrium.bubble_pressure(one.fluid, np.array([310.93]), one.z)
        assert found.P == plain.P and (found.y == plain.y).all()


def test_lanes_with_settled_water_leave_the_others_alone():
    z = np.stack([WET.z, np.where(np.array(WET.names) == "water", 0.0, WET.z)])
    z /= z.sum(axis=1, keepdims=True)
    both = scaled.bubble_pressure(WET.fluid, np.array([288.15, 288.15]), z, np.ones(2)).P
    assert both[0] == scaled.bubble_pressure(WET.fluid, np.array([288.15]), z[:1], 1.0).P[0]
    assert both[1] == equilibrium.bubble_pressure(WET.fluid, np.array([288.15]), z[1:]).P[0]
