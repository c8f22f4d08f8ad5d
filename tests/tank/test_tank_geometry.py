"""Volumes against the tank geometry of the library fluids, and identities."""

import numpy as np
import pytest
from fluids.geometry import TANK

from screener.tank import geometry

D, H, LENGTH = 24.0, 14.6, 9.0


def test_vertical_tank_against_fluids():
    tank = TANK(D=D, L=H, horizontal=False, sideA=None, sideB="conical", sideB_a=0.0625 * D / 2)
    levels = np.array([0.0, 1.2, 9.0, 13.1, 14.6])
    expected = [tank.V_from_h(h) for h in levels]
    # The same closed formulas: rounding only.
    assert geometry.vertical_liquid_volume(D, H, levels) == pytest.approx(expected, rel=1e-12)
    vapour = geometry.vertical_vapour_volume(D, H, levels, geometry.roof_outage(D))
    assert vapour + expected == pytest.approx(np.full(5, tank.V_total), rel=1e-12)


def test_dome_outage_against_fluids():
    radius = D / 2
    rise = D - np.sqrt(D**2 - radius**2)
    # A spherical cap of rise a on a shell: fluids calls it a torispherical head with no knuckle; here the
    # closed formula of the cap, pi a (3 r^2 + a^2)/6.
    cap = np.pi * rise * (3.0 * radius**2 + rise**2) / 6.0
    outage = geometry.roof_outage(D, "dome")
    assert outage * geometry.cross_section(D) == pytest.approx(cap, rel=1e-12)
    hemisphere = geometry.roof_outage(D, "dome", dome_radius=radius)
    assert hemisphere * geometry.cross_section(D) == pytest.approx(2.0 / 3.0 * np.pi * radius**3, rel=1e-12)
    assert geometry.roof_outage(D, "flat") == 0.0
    assert np.isnan(geometry.roof_outage(D, ["tent", "dome"], dome_radius=[12.0, 5.0])).all()


def test_horizontal_tank_against_fluids():
    tank = TANK(D=3.0, L=LENGTH, horizontal=True)
    levels = np.linspace(0.0, 3.0, 13)
    expected = np.array([tank.V_from_h(h) for h in levels])
    # fluids integrates some shapes numerically; for flat ends both are closed: rounding.
    assert geometry.horizontal_liquid_volume(3.0, LENGTH, levels) == pytest.approx(
        expected, rel=1e-10, abs=1e-10
    )
    area = [tank.SA_from_h(h) for h in levels[1:-1]]
    assert geometry.horizontal_wetted_area(3.0, LENGTH, levels[1:-1]) == pytest.approx(area, rel=1e-9)


def test_horizontal_surface_is_the_slope_of_the_volume():
    level, step = 1.1, 1e-5
    slope = (
        geometry.horizontal_liquid_volume(3.0, LENGTH, level + step)
        - geometry.horizontal_liquid_volume(3.0, LENGTH, level - step)
    ) / (2 * step)
    # Central difference: truncation about step^2.
    assert geometry.horizontal_liquid_surface(3.0, LENGTH, level) == pytest.approx(slope, rel=1e-7)


def test_levels_come_back_from_volumes():
    levels = np.linspace(0.0, 3.0, 7)
    volume = geometry.horizontal_liquid_volume(3.0, LENGTH, levels)
    # Near empty and full the volume grows as level^1.5, so rounding in the volume shows as 1e-10 of level.
    assert geometry.horizontal_level(3.0, LENGTH, volume) == pytest.approx(levels, abs=1e-9)
    tall = geometry.vertical_liquid_volume(D, H, 7.3)
    assert geometry.vertical_level(D, H, tall) == pytest.approx(7.3, rel=1e-14)


def test_what_is_no_state_of_the_tank_is_nan():
    assert np.isnan(geometry.vertical_liquid_volume(D, H, [-0.1, 15.0, np.nan])).all()
    assert np.isnan(geometry.vertical_liquid_volume([0.0, -2.0], H, 1.0)).all()
    assert np.isnan(geometry.vertical_level(D, H, [1e6, -1.0])).all()
    assert np.isnan(geometry.horizontal_level(3.0, LENGTH, [1e6, -1.0, np.nan])).all()
    assert np.isnan(geometry.horizontal_vapour_volume(3.0, LENGTH, 3.1))
    assert np.isnan(geometry.wetted_shell(D, H, 20.0))


def test_areas():
    assert geometry.wetted_shell(10.0, 8.0, 4.0) == pytest.approx(np.pi * 40.0)
    # By hand: pi D H plus a cone of slant sqrt(1 + 0.0625^2) r.
    assert geometry.shell_and_roof_area(10.0, 8.0) == pytest.approx(np.pi * 80.0 + np.pi * 25.0 * 1.001951221)
