"""From a laboratory sheet to a composition that reproduces it.

Bounded least squares over the shares of the groups of `lab_start`: misfits count in units of the
reproducibility of their method, moves away from the start in units of how well it is known, the latter with
the small weight PRIOR. All perturbed recipes of one round run as lanes of one call of the tests.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from functools import lru_cache

import numpy as np

from screener.blends.blend import Blend, Report
from screener.blends.lab_numbers import Laboratory, Number, numbers_of
from screener.blends.lab_sheet import LabSheet
from screener.blends.lab_start import Start, start_of
from screener.blends.lab_water import NAME, dissolved_only
from screener.blends.measured import MeasuredFigure, MeasuredPressure
from screener.equilibrium import Fluid
from screener.ground.constants import ZERO_CELSIUS
from screener.ground.errors import InputError
from screener.species import columns
from screener.volatility import (
    dvpe,
    dvpe_equation,
    reid_equivalent_crude,
    reid_vapour_pressure,
    true_vapour_pressure,
)
from screener.volatility.distillation import STEPS

PRIOR = 0.1  # weight of the start; at 0.1 it decides only what the sheet leaves open; our choice
GUIDE = 1.0 / 3.0  # weight of the ends of a distillation
ROUNDS = 10
COARSE = 16  # steps of the distillation while searching; the answer is computed with the full number
CLOSE = 0.05  # largest misfit in units of R at which the search stops
ENOUGH = 0.01  # mean square misfit, in R, below which slopes are not worked out again; our choice
CONTRADICTION = 3.0  # misfit in units of R from which a sheet is refused; common practice, no source
DIRECT = ("tvp", "vpcr", "dvpe", "rvp", "rvpe")  # the most direct test of a vapour pressure first
TRIES = np.array([1.0, 0.6, 0.3, 0.1])  # parts of a step that are tried side by side


@dataclass(frozen=True)
class Fitted:
    """Species with volume shares at 15 degC (c,) [-], numbers and their computed values (m,) in SI."""

    names: tuple[str, ...]
    volume: np.ndarray
    numbers: tuple[Number, ...]
    computed: np.ndarray
    measured: tuple[MeasuredPressure, ...]
    notes: tuple[str, ...]

    @property
    def misfits(self) -> np.ndarray:
        """Computed less measured in units of reproducibility (m,). [-]"""
        return (self.computed - _values(self.numbers)) / _R(self.numbers)


def fit_sheet(sheet: LabSheet, recipe=None) -> Fitted:
    """The composition that reproduces a sheet, from a recipe or from the sheet alone.

    Raises InputError when numbers of the sheet contradict each other, naming them.
    """
    start = start_of(sheet, recipe)
    sheet, free_water = dissolved_only(sheet, start)
    numbers = numbers_of(sheet)
    if free_water:
        start = start_of(sheet, recipe)
        start = replace(start, notes=(*start.notes, free_water))
        numbers = tuple(replace(one, name=NAME) if one.key == "water" else one for one in numbers)
    lab = Laboratory(start.names, Fluid.of(start.names), numbers, sheet.product, COARSE)
    share = _search(lab, start)
    volume = share @ start.groups
    keep = volume > 1e-7 * volume.sum()
    names = tuple(name for name, kept in zip(start.names, keep, strict=True) if kept)
    volume = volume[keep] / volume[keep].sum()
    final = Laboratory(names, Fluid.of(names), numbers, sheet.product, STEPS)
    computed = final.measure(volume[None, :])[0]
    fitted = Fitted(names, volume, numbers, computed, (), _notes(sheet, start, numbers, computed))
    _refuse(fitted)
    return Fitted(
        names, volume, numbers, computed, tuple(_pressures(sheet, fitted, final.fluid)), fitted.notes
    )


@lru_cache(maxsize=16)
def fitted_blend(sheet: LabSheet, start: Blend | None = None) -> Blend:
    """`Blend.from_lab`: the fitted composition as a blend, with residuals and measured pressures."""
    fitted = fit_sheet(sheet, start)
    table = columns(fitted.names)
    moles = fitted.volume * table.rho_15 / table.MW
    residuals = tuple(
        (one.name, float(one.value), float(computed), float(one.R))
        for one, computed in zip(fitted.numbers, fitted.computed, strict=True)
    )
    before = start.report if start is not None else Report()
    return Blend(
        fitted.names,
        tuple(float(n) for n in moles / moles.sum()),
        start.parts if start is not None else (),
        sheet.title or (f"{start.title}, fitted to its laboratory sheet" if start else "laboratory sheet"),
        sheet.product or (start.product if start is not None else ""),
        Report((*before.assumed, *fitted.notes), before.sources, residuals),
        fitted.measured,
        sheet.vapour_pressure_known,
        tuple(
            MeasuredFigure(
                one.key, one.name, float(one.value), float(computed), float(one.R),
                float(one.argument) if one.key == "distillation" else 0.0,
            )
            for one, computed in zip(fitted.numbers, fitted.computed, strict=True)
        ),
    )  # fmt: skip


def _values(numbers):
    return np.array([one.value for one in numbers])


def _R(numbers):
    return np.array([one.R for one in numbers])


def _search(lab: Laboratory, start: Start) -> np.ndarray:
    """Shares of the groups (k,) by Gauss-Newton rounds within bounds.

    Slopes are kept while a round with them still halves the cost: most rounds are a handful of lanes.
    """
    measured, R = _values(lab.numbers), _R(lab.numbers)
    weight = np.where([one.guide for one in lab.numbers], GUIDE, 1.0) / R
    prior = PRIOR / start.spread
    share, slope, miss = start.volume.copy(), None, None
    for _ in range(ROUNDS):
        fresh = slope is None
        if fresh:
            miss, slope = _slopes(lab, share, start, weight, measured)
        now = _cost(miss, share, start, prior)
        move = _step(slope, miss, share, start, prior)
        tried = np.maximum(share + TRIES[:, None] * move, 0.0)  # bounds hold but for rounding
        tried /= tried.sum(axis=-1, keepdims=True)
        misses = (lab.measure(tried @ start.groups) - measured) * weight
        costs = np.array([_cost(m, s, start, prior) for m, s in zip(misses, tried, strict=True)])
        best = int(np.argmin(costs))
        if costs[best] < now:
            share, miss = tried[best], misses[best]
        if np.abs(miss).max() < CLOSE or (fresh and not costs[best] < 0.97 * now):
            break
        if not costs[best] < 0.5 * now:
            if costs[best] < ENOUGH * miss.size:
                break
            slope = None
    return share


def _slopes(lab, share, start, weight, measured):
    """Misfits (m,) at the shares and their slopes (m, k), every perturbed recipe a lane."""
    h = np.maximum(0.05 * share, 0.002)
    values = lab.measure(np.vstack([share, share + np.diag(h)]) @ start.groups)
    miss = (values[0] - measured) * weight
    if not np.isfinite(miss).all():
        _no_start(lab, values[0])
    return miss, np.nan_to_num((values[1:] - values[0]).T / h * weight[:, None])


def _cost(miss, share, start, prior):
    total = (miss**2).sum() + ((prior * (share - start.volume)) ** 2).sum()
    return total if np.isfinite(total) else np.inf


def _step(slope, miss, share, start, prior):
    """Move of the shares (k,) that best mends the misfits, at zero or above and adding to 1."""
    from scipy.optimize import lsq_linear

    stiff = 1e3
    A = np.vstack([slope, np.diag(prior), stiff * np.ones((1, share.size))])
    b = -np.concatenate([miss, prior * (share - start.volume), [stiff * (share.sum() - 1.0)]])
    return lsq_linear(A, b, bounds=(-share - 1e-12, np.full(share.size, 0.3)), max_iter=200).x


def _no_start(lab, values):
    lost = ", ".join(one.name for one, v in zip(lab.numbers, values, strict=True) if not np.isfinite(v))
    raise InputError(
        "lab",
        None,
        f"no value can be computed for {lost} of the starting recipe",
        "a recipe nearer to the sheet, or the sheet without these numbers",
    )


def _refuse(fitted: Fitted) -> None:
    """Refuse a sheet whose numbers no composition reproduces together."""
    misfits = fitted.misfits
    heavy = [
        i for i, one in enumerate(fitted.numbers) if not one.guide and not abs(misfits[i]) <= CONTRADICTION
    ]
    if not heavy:
        return
    order = sorted(range(len(misfits)), key=lambda i: -abs(misfits[i]))
    told = [i for i in order if not fitted.numbers[i].guide and not abs(misfits[i]) <= 1.0][:4]
    text = "; ".join(
        f"{fitted.numbers[i].name}: sheet {_shown(fitted.numbers[i], fitted.numbers[i].value)}, "
        f"nearest composition {_shown(fitted.numbers[i], fitted.computed[i])} "
        f"({abs(misfits[i]):.1f} reproducibilities off)"
        for i in told
    )
    raise InputError(
        "lab",
        None,
        f"numbers of the sheet contradict each other or the starting recipe: {text}",
        f"each within {CONTRADICTION:g} reproducibilities",
    )


def _shown(number: Number, value: float) -> str:
    if number.key in ("distillation", "ibp", "fbp", "flash_point"):
        return f"{value - ZERO_CELSIUS:.4g} degC"
    if number.key == "density_15":
        return f"{value:.5g} kg/m3"
    if number.key in ("h2s", "water"):
        return f"{1e6 * value:.4g} ppm mass"
    pressure = number.key in ("dvpe", "rvp", "rvpe", "vpcr_4", "vpcr_low", "tvp")
    return f"{value / 1e3:.4g} kPa" if pressure else f"{100 * value:.4g} %"


def _notes(sheet, start, numbers, computed):
    notes = list(start.notes)
    for one, value in zip(numbers, computed, strict=True):
        misfit = (value - one.value) / one.R
        notes.append(
            f"laboratory sheet, {one.name}: measured {_shown(one, one.value)}, computed {_shown(one, value)}, "
            f"{misfit:+.2f} of its reproducibility"
        )
    if not sheet.vapour_pressure_known:
        notes.append("the sheet holds no vapour pressure: that of the fitted composition is not known")
    if sheet.viscosity is not None:
        notes.append("the viscosity of the sheet is kept beside the fit; no viscosity of a blend is computed")
    return tuple(notes)


def _pressures(sheet, fitted: Fitted, fluid):
    """Measured vapour pressures with the ratio of the fuel's own vapour, the most direct first.

    Of VPCR the smallest vapour space is the most direct; among equals the highest ratio, the careful side:
    the order of the rows of a sheet means nothing.
    """
    table = columns(fitted.names)
    z = fitted.volume * table.rho_15 / table.MW
    z /= z.sum()
    found = []
    for one, computed in zip(fitted.numbers, fitted.computed, strict=True):
        if one.key in ("tvp", "vpcr_4", "vpcr_low", "rvpe"):
            own, change, R = computed, one.value - computed, one.R
        elif one.key == "dvpe":
            own = dvpe(fluid, z, equation=one.argument, product=sheet.product or None).P_vapour[0]
            rule = dvpe_equation(one.argument)
            change, R = float(rule.total(one.value) - rule.total(computed)), one.R / rule.slope
        elif one.key == "rvp":
            own = reid_vapour_pressure(
                fluid, z, chamber=one.argument, product=sheet.product or None
            ).P_vapour[0]
            change, R = one.value - computed, one.R
        else:
            continue
        ratio, doubt = float(1.0 + change / own), float(R / own)
        space = one.argument[0] if one.key.startswith("vpcr") else 0.0
        gap = _gap(fluid, z, one, own)
        made = MeasuredPressure(one.name, one.value, one.T, float(computed), ratio, one.R, doubt, gap)
        found.append((DIRECT.index(one.key[:4]), space, -ratio, made))
    return [row[-1] for row in sorted(found, key=lambda row: row[:3])]


def _gap(fluid, z, one: Number, own: float) -> float:
    """Bubble point over the fuel's own vapour in a test, less 1: what gases that no number of a sheet tells decide. [-]"""
    scale = float(reid_equivalent_crude(1.0)[0]) if one.key == "rvpe" else 1.0  # RVPE is a multiple of VPCR4
    bubble = scale * float(true_vapour_pressure(fluid, one.T, z).P[0])
    return float(max(bubble / own - 1.0, 0.0)) if np.isfinite(bubble) and own > 0.0 else 0.0
