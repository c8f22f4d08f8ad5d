"""Blends with a laboratory sheet put on by hand, so that what was measured is known exactly. Numbers are invented."""

from __future__ import annotations

from dataclasses import replace

from screener.blends.measured import MeasuredFigure, MeasuredPressure
from screener.ground.constants import T_100F
from screener.volatility import true_vapour_pressure

TEST = "true vapour pressure at 37.78 degC"


def pressure(blend, factor, R=0.10, what=TEST):
    """A true vapour pressure at 37.78 degC measured at `factor` of the computed one; R as a share of that."""
    computed = float(true_vapour_pressure(blend.fluid, T_100F, blend.z).P[0])
    return MeasuredPressure(what, factor * computed, T_100F, computed, factor, R * computed, R)


def with_pressure(blend, factor, R=0.10):
    """The blend with that one measured vapour pressure."""
    return replace(blend, measured=(pressure(blend, factor, R),))


def with_figure(blend, key, value, computed, R):
    """The blend with one more measured number."""
    return replace(blend, figures=(*blend.figures, MeasuredFigure(key, key.replace("_", " "), value, computed, R)))
