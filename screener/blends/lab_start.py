"""Where the fit to a laboratory sheet starts: species, their groups, shares and how far these may move.

The rule. Species of a starting recipe are tied together by family and boiling range and move as
one; light ends, benzene, oxygenates, gases and water move alone. Without a recipe the cuts of the
distillation curve take its place. Where a family has nobody in a boiling range of the sheet, a species of
`FILLERS` stands ready with a share of zero.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.blends.lab_sheet import LabSheet
from screener.ground.errors import InputError
from screener.species import find
from screener.species.cut_constants import density_15
from screener.species.cut_families import aromatics_possible, family_gravity
from screener.species.pseudo import is_cut
from screener.volatility import curve_at, pseudo_components, tbp_from_d86_daubert_1994
from screener.volatility.interconversion import GAP_POINTS

LIGHT = 315.0  # [K] what boils below moves alone: it makes the vapour pressure; our choice
# Boundaries of the boiling ranges [K]; our choice, about one carbon number each.
RANGES = (345.0, 376.0, 402.0, 428.0, 452.0, 475.0, 500.0, 535.0, 575.0, 630.0, 700.0)
FILLERS = (
    "n-butane", "isopentane", "n-pentane", "2-methylpentane", "n-heptane", "n-octane", "n-nonane", "n-decane",
    "n-undecane", "n-dodecane", "n-tetradecane", "n-hexadecane", "n-eicosane", "cyclohexane", "benzene",
    "toluene", "m-xylene", "1,2,4-trimethylbenzene", "1,2-dimethyl-4-ethylbenzene", "1-methylnaphthalene",
    "heptylbenzene", "decylbenzene", "2-methyl-2-butene", "1-hexene", "1-octene",
)  # fmt: skip
# Behind the heaviest paraffin on file; usual densities of petroleum at these boiling points, common practice, no source.
HEAVY_FILLERS = (
    "cut 370.00 degC 870.00 kg/m3", "cut 420.00 degC 890.00 kg/m3", "cut 480.00 degC 915.00 kg/m3",
    "cut 550.00 degC 940.00 kg/m3",
)  # fmt: skip
CRUDE_FILLERS = ("propane", "isobutane")
# Cuts of given boiling point and families that must be this much off to meet the density contradict it [-]; our choice.
GRAVITY_SLACK = 0.04
BEYOND = 30.0  # [K] past the last measured temperature for which fillers stand ready; our choice
# A share may well be off by half of itself and 1 % of the volume [-]; our choice
LOOSE, LOOSE_AT_ZERO = 0.5, 0.01

LEAST_CUT = 0.001  # [-] of the volume; a smaller rest is within what a sheet says of its species; our choice
NAMED_NOTE = "composition of the sheet alone: the species it names make up the whole"


@dataclass(frozen=True)
class Start:
    """Species names (c,), shares of species in each group (k, c), volume and spread of the groups (k,). [-]"""

    names: tuple[str, ...]
    groups: np.ndarray
    volume: np.ndarray
    spread: np.ndarray
    notes: tuple[str, ...]


def start_of(sheet: LabSheet, recipe) -> Start:
    """Start from a recipe (a Blend) or, when None, from the sheet alone."""
    if recipe is None:
        names, volume, notes = _from_curve(sheet)
    else:
        names, volume = recipe.names, recipe.volume_fractions
        notes = ("the starting recipe was moved until it reproduces the laboratory sheet",)
    groups: dict[object, list[tuple[str, float]]] = {}
    for name, v in zip(names, volume, strict=True):
        groups.setdefault(_group(name), []).append((name, float(v)))
    for name, v in _asked(sheet):
        groups.setdefault(_group(name), [(name, v)])
    T_most = _hottest(sheet, names)
    if any(n is not None for n in (sheet.density_15, sheet.dvpe)) or sheet.distillation:
        ready = [*FILLERS, *(CRUDE_FILLERS if sheet.product == "crude" else ())]
        if recipe is not None:
            ready += [find(name).name for name in HEAVY_FILLERS]
        for name in ready:
            if find(name).Tb <= T_most and not _zero(sheet, name):
                groups.setdefault(_group(name), [(name, 0.0)])
    return _laid_out(groups, notes)


def _laid_out(groups, notes) -> Start:
    names = tuple(name for rows in groups.values() for name, _ in rows)
    place = {name: i for i, name in enumerate(names)}
    G, volume = np.zeros((len(groups), len(names))), np.zeros(len(groups))
    for k, rows in enumerate(groups.values()):
        volume[k] = sum(v for _, v in rows)
        for name, v in rows:
            G[k, place[name]] = v / volume[k] if volume[k] > 0.0 else 1.0 / len(rows)
    return Start(names, G, volume / volume.sum(), LOOSE * volume + LOOSE_AT_ZERO, tuple(notes))


def _group(name):
    """What moves together: family and boiling range; a name of its own moves alone."""
    one = find(name)
    if one.family == "cut":
        return name
    hydrocarbon = one.family in ("paraffin", "isoparaffin", "naphthene", "olefin", "aromatic")
    if not hydrocarbon or one.Tb < LIGHT or name == "benzene":
        return name
    family = one.family if one.family in ("olefin", "aromatic") else "saturated"
    return family, int(np.searchsorted(RANGES, one.Tb))


def _zero(sheet, name) -> bool:
    """Whether the sheet says that there is none of a family."""
    asked = {"olefin": sheet.olefins, "aromatic": sheet.aromatics}.get(find(name).family)
    return asked == 0.0 or (name == "benzene" and sheet.benzene == 0.0)


def _asked(sheet):
    """Species the sheet names, with their volume shares."""
    rows = [(find(name).name, share) for name, share in sheet.oxygenates]
    if sheet.benzene is not None:
        rows.append(("benzene", sheet.benzene))
    for name, mass in (("hydrogen sulfide", sheet.h2s), ("water", sheet.water)):
        if mass:
            rows.append((name, mass * (sheet.density_15 or 750.0) / find(name).rho_15))
    return rows


def _hottest(sheet, names):
    """Highest boiling point [K] up to which fillers are of use."""
    curve = sheet.curve
    return curve[-1][1] + BEYOND if curve else max(find(name).Tb for name in names)


def _from_curve(sheet):
    """Cuts and known species of a bare sheet, with what was assumed."""
    known = {name: share for name, share in _asked(sheet) if share > 0.0}
    if sum(known.values()) >= 1.0 - LEAST_CUT:
        return tuple(known), np.array(list(known.values())), (NAMED_NOTE,)
    if sheet.density_15 is None or len(sheet.distillation) < 3:
        raise InputError(
            "lab",
            None,
            "a sheet without a starting recipe needs a density and three points of the distillation",
            "add them, or give the parts the liquid was made from",
        )
    f, T = np.array(sheet.curve).T
    D86 = curve_at(f, T, np.array(GAP_POINTS))[0]
    D86 = np.maximum.accumulate(np.clip(D86, 240.0, 1050.0) + 1e-3 * np.arange(len(GAP_POINTS)))
    TBP = tbp_from_d86_daubert_1994(D86)[0]
    cuts = pseudo_components(
        np.array(GAP_POINTS),
        np.maximum.accumulate(TBP),
        sheet.density_15,
        known=known,
        aromatics=sheet.aromatics,
        olefins=sheet.olefins or 0.0,
    )
    factor = _beyond_hydrocarbons(cuts) if sheet.aromatics is None else cuts.gravity_factor
    if abs(factor - 1.0) > GRAVITY_SLACK:
        what = "the distillation" if sheet.aromatics is None else "distillation and families"
        raise InputError(
            "lab",
            sheet.density_15,
            f"the density of {sheet.density_15:.5g} kg/m3 contradicts {what} of the sheet: with "
            f"{'that' if sheet.aromatics is None else 'those'}, the cuts would weigh {100.0 / factor:.4g} % "
            "of what it asks of them",
            f"within {100 * GRAVITY_SLACK:g} %",
        )
    note = (
        "composition of the sheet alone: cuts of the distillation curve (Daubert 1994 to true "
        "boiling points) and species that stand ready for light ends and families"
    )
    return cuts.names, cuts.volume, (note,)


def _beyond_hydrocarbons(cuts) -> float:
    """Density of the cuts over the nearest that paraffins, naphthenes and aromatics of their boiling points have
    together, 1 where these can make it. [-]

    Without families all cuts share one Watson factor, which meets any density, one that no liquid has too.
    """
    rows = [(find(name), v) for name, v in zip(cuts.names, cuts.volume, strict=True) if is_cut(name)]
    Tb, rho, v = np.array([(one.Tb, one.rho_15, v) for one, v in rows]).T
    ring = np.where(aromatics_possible(Tb) > 0.0, family_gravity("aromatic", Tb), 0.0)
    heavy = v @ density_15(np.maximum(ring, family_gravity("naphthene", Tb)))
    return float(v @ rho / np.clip(v @ rho, v @ density_15(family_gravity("paraffin", Tb)), heavy))
