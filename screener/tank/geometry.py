"""Volumes and surfaces of vertical and horizontal cylindrical tanks.

Vertical tanks have a flat bottom. Horizontal tanks have flat ends. A level
below the bottom or above the shell is not a state of the tank: NaN.
"""

from __future__ import annotations

import numpy as np

DEFAULT_CONE_SLOPE = 0.0625  # rise over radius [-]; French arrete of 3 October 2010, annex III [law, read]
ROOF_SHAPES = ("flat", "cone", "dome")


def _inside(level, most):
    level = np.asarray(level, dtype=float)
    return np.where((level >= 0.0) & (level <= most), level, np.nan)


def _size(value):
    """A dimension; zero or less is no tank."""
    value = np.asarray(value, dtype=float)
    return np.where(value > 0.0, value, np.nan)


def cross_section(shell_diameter):
    """Area of a circle: the liquid surface of a vertical tank. shell_diameter [m], returns [m2]."""
    return np.pi / 4.0 * _size(shell_diameter) ** 2


def vertical_volume(shell_diameter, shell_height):
    """Volume of a vertical shell to its top angle, without the roof.

    Parameters
    ----------
    shell_diameter, shell_height : float or array, shape (n,)
        Inside dimensions. [m]

    Returns
    -------
    array, shape (n,) or ()
        Volume. [m3]

    Source
    ------
    Geometry.
    """
    return cross_section(shell_diameter) * _size(shell_height)


def vertical_liquid_volume(shell_diameter, shell_height, liquid_level):
    """Liquid in a vertical tank.

    Parameters
    ----------
    shell_diameter, shell_height, liquid_level : float or array, shape (n,)
        The level is counted from the bottom. [m]

    Returns
    -------
    array, shape (n,) or ()
        Volume; NaN where the level lies outside the shell. [m3]

    Source
    ------
    Geometry.
    """
    return cross_section(shell_diameter) * _inside(liquid_level, _size(shell_height))


def vertical_level(shell_diameter, shell_height, liquid_volume):
    """Level of a given volume in a vertical tank.

    Parameters
    ----------
    shell_diameter, shell_height : float or array, shape (n,)
        Inside dimensions. [m]
    liquid_volume : float or array, shape (n,)
        At tank temperature. [m3]

    Returns
    -------
    array, shape (n,) or ()
        Level; NaN where the volume does not fit. [m]

    Source
    ------
    Geometry.
    """
    height = _size(shell_height)
    return _inside(np.asarray(liquid_volume, dtype=float) / cross_section(shell_diameter), height)


def roof_outage(shell_diameter, shape="cone", cone_slope=DEFAULT_CONE_SLOPE, dome_radius=None):
    """Height of a cylinder that holds as much vapour as the roof does.

    Parameters
    ----------
    shell_diameter : float or array, shape (n,)
        Inside diameter. [m]
    shape : str or array of str, shape (n,)
        'flat', 'cone' or 'dome'. [-]
    cone_slope : float or array, shape (n,)
        Rise of a cone over its radius. [-]
    dome_radius : float or array, shape (n,), optional
        Radius of the sphere of a dome; None or NaN takes the diameter of the shell. [m]

    Returns
    -------
    array, shape (n,) or ()
        Outage: a third of the rise of a cone; H (1/2 + (H/R)^2/6) of a dome of rise H on a shell of
        radius R. NaN for a shape not named above. [m]

    Validity
    --------
    A dome radius of at least half the diameter.

    Source
    ------
    Cone slope of 0.0625 where unknown: French arrete of 3 October 2010, annex III [law, read]. The
    two volumes are geometry; a dome radius equal to the diameter is from memory, unverified.
    """
    diameter = _size(shell_diameter)
    radius = diameter / 2.0
    sphere = np.full_like(diameter, np.nan) if dome_radius is None else np.asarray(dome_radius, dtype=float)
    sphere = np.where(np.isfinite(sphere), sphere, diameter)
    sphere = np.where(sphere >= radius, sphere, np.nan)
    rise = sphere - np.sqrt(sphere**2 - radius**2)
    cone = np.asarray(cone_slope, dtype=float) * radius / 3.0
    dome = rise * (0.5 + (rise / radius) ** 2 / 6.0)
    shape = np.asarray(shape, dtype=str)
    return np.select(
        [shape == "flat", shape == "cone", shape == "dome"], [np.zeros_like(cone), cone, dome], np.nan
    )


def vertical_vapour_volume(shell_diameter, shell_height, liquid_level, outage=0.0):
    """Vapour space of a vertical tank with a fixed roof.

    Parameters
    ----------
    shell_diameter, shell_height, liquid_level : float or array, shape (n,)
        Inside dimensions and level. [m]
    outage : float or array, shape (n,)
        Roof outage by `roof_outage`. [m]

    Returns
    -------
    array, shape (n,) or ()
        V_V = (pi/4) D^2 (H_S - H_L + H_RO). [m3]

    Source
    ------
    French arrete of 3 October 2010, annex III [law, read].
    """
    height = _size(shell_height)
    return cross_section(shell_diameter) * (
        height - _inside(liquid_level, height) + np.asarray(outage, dtype=float)
    )


def wetted_shell(shell_diameter, shell_height, liquid_level):
    """Wetted shell of a vertical tank, bottom not counted. All arguments [m], returns [m2]."""
    return np.pi * _size(shell_diameter) * _inside(liquid_level, _size(shell_height))


def shell_and_roof_area(shell_diameter, shell_height, cone_slope=DEFAULT_CONE_SLOPE):
    """Outer surface of a vertical tank with a cone roof. Lengths [m], slope [-], returns [m2]."""
    diameter = _size(shell_diameter)
    roof = np.pi / 4.0 * diameter**2 * np.sqrt(1.0 + np.asarray(cone_slope, dtype=float) ** 2)
    return np.pi * diameter * _size(shell_height) + roof


def _half_angle(diameter, level):
    """Half the angle the wetted arc of a lying circle spans. [rad]"""
    return np.arccos(np.clip(1.0 - 2.0 * level / diameter, -1.0, 1.0))


def horizontal_volume(shell_diameter, length):
    """Volume of a lying cylinder with flat ends. Arguments [m], returns [m3]."""
    return cross_section(shell_diameter) * _size(length)


def horizontal_liquid_volume(shell_diameter, length, liquid_level):
    """Liquid in a lying cylinder with flat ends.

    Parameters
    ----------
    shell_diameter, length, liquid_level : float or array, shape (n,)
        The level is counted from the lowest line. [m]

    Returns
    -------
    array, shape (n,) or ()
        L D^2/4 (a - sin a cos a) with a the half angle of the wetted arc; NaN outside the shell. [m3]

    Source
    ------
    Geometry of a circular segment.
    """
    diameter = _size(shell_diameter)
    a = _half_angle(diameter, _inside(liquid_level, diameter))
    return _size(length) * diameter**2 / 4.0 * (a - np.sin(a) * np.cos(a))


def horizontal_vapour_volume(shell_diameter, length, liquid_level):
    """Vapour space of a lying cylinder with flat ends. Arguments [m], returns [m3]."""
    return horizontal_volume(shell_diameter, length) - horizontal_liquid_volume(
        shell_diameter, length, liquid_level
    )


def horizontal_liquid_surface(shell_diameter, length, liquid_level):
    """Free liquid surface of a lying cylinder. Arguments [m], returns [m2]."""
    diameter = _size(shell_diameter)
    level = _inside(liquid_level, diameter)
    return _size(length) * 2.0 * np.sqrt(np.maximum(level * (diameter - level), 0.0))


def horizontal_wetted_area(shell_diameter, length, liquid_level):
    """Wetted shell and both wetted ends of a lying cylinder. Arguments [m], returns [m2]."""
    diameter = _size(shell_diameter)
    a = _half_angle(diameter, _inside(liquid_level, diameter))
    ends = diameter**2 / 2.0 * (a - np.sin(a) * np.cos(a))
    return _size(length) * diameter * a + ends


def horizontal_level(shell_diameter, length, liquid_volume):
    """Level of a given volume in a lying cylinder with flat ends.

    Parameters
    ----------
    shell_diameter, length : float or array, shape (n,)
        Inside dimensions. [m]
    liquid_volume : float or array, shape (n,)
        At tank temperature. [m3]

    Returns
    -------
    array, shape (n,) or ()
        Level by bisection, to 1e-13 of the diameter; NaN where the volume does not fit. [m]

    Source
    ------
    Inverse of `horizontal_liquid_volume`.
    """
    diameter, length, volume = np.broadcast_arrays(
        _size(shell_diameter), _size(length), np.asarray(liquid_volume, dtype=float)
    )
    full = horizontal_volume(diameter, length)
    fits = (volume >= 0.0) & (volume <= full)
    low, high = np.zeros_like(full), diameter.astype(float).copy()
    for _ in range(44):  # 2^-44 of the diameter
        middle = 0.5 * (low + high)
        below = horizontal_liquid_volume(diameter, length, middle) < volume
        low, high = np.where(below, middle, low), np.where(below, high, middle)
    return np.where(fits, 0.5 * (low + high), np.nan)
