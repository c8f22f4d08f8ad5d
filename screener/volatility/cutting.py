"""A distillation curve and a density become species: known ones and cuts.

The cutting rule.

1. The true boiling point curve is drawn through its points and on to 0 and 100 % with the
   slope of its ends, and read as 2000 slices of equal standard volume.
2. Species whose share is known (light ends, benzene, an oxygenate) take their volume out of
   the slices that boil nearest to them, the most volatile species first.
3. The rest is cut at fixed boiling points (`EDGES`, or the caller's). Each cut boils at the mean of
   its slices. A cut of less than 0.05 % of the volume joins its neighbour.
4. Gravities. Without any analysis all cuts share one Watson factor. With the aromatics known,
   they lie evenly over the volume that boils above benzene, olefins evenly over what boils
   below 430 K (C9), the naphthenes are the share of the rest that meets the density, and each cut has
   the gravity of its families (`screener.species.cut_families`). Either way one common factor
   makes the density of the whole exact.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.ground.errors import InputError, ShapeError
from screener.species import columns, cut, find
from screener.species.cut_constants import RANKINE, density_15, specific_gravity
from screener.species.cut_families import aromatics_possible, family_gravity
from screener.volatility.interconversion import curve_at

SLICES = 2000
# Boundaries of the cuts [K]; our choice. Halving the steps moves bubble pressures of a gasoline by less than 1 %
# (tests/studies/cuts_against_molecules.md).
EDGES = tuple(
    np.concatenate(
        [np.arange(270.0, 400.0, 10.0), np.arange(400.0, 500.0, 20.0), np.arange(500.0, 1000.0, 40.0)]
    )
)
SMALLEST = 5e-4  # [-] of the volume
OLEFINS_BELOW = 430.0  # [K] olefins of cracked gasoline lie below; common practice, no source
COLDEST, HOTTEST = 255.0, 1090.0  # [K] slices outside are moved in: a cut needs constants


@dataclass(frozen=True)
class Cuts:
    """Known species and cuts of one liquid.

    names (c,) for a fluid or a blend, volume (c,) shares of the standard volume [-], z (c,)
    mole fractions [-], rho_15 [kg/m3] of the whole, and the factor [-] by which the densities of the
    cuts had to be scaled to meet it: far from 1, density and analysis contradict each other.
    """

    names: tuple[str, ...]
    volume: np.ndarray
    z: np.ndarray
    rho_15: float
    gravity_factor: float


def pseudo_components(fraction, T, rho_15, *, known=None, aromatics=None, olefins=0.0, edges=None) -> Cuts:
    """Species and cuts that stand for a liquid known by its distillation and density.

    Parameters
    ----------
    fraction : array, shape (k,)
        Volume fractions distilled, rising. [-]
    T : array, shape (k,)
        True boiling points there. [K]
    rho_15 : float
        Density at 15 degC. [kg/m3]
    known : mapping of str to float, optional
        Volume shares of species whose amount is known; they are part of the curve. [-]
    aromatics : float, optional
        Volume share of aromatics in the whole, known species included. [-]
    olefins : float
        Volume share of olefins in the whole, known species included; counts with aromatics only. [-]
    edges : array, optional
        Boiling points at which to cut, rising; see the head of this module when absent. [K]

    Returns
    -------
    Cuts
        Names of species, usable wherever species are, with their shares.

    Raises
    ------
    ShapeError
        Fractions and temperatures do not match or do not rise.
    InputError
        Shares outside 0 to 1, or a density that the known species alone contradict.

    Source
    ------
    The rule at the head of this module; common practice, no source.
    """
    f, T = np.asarray(fraction, dtype=float), np.asarray(T, dtype=float)
    if f.shape != T.shape or not (np.isfinite(T).all() and (np.diff(T) >= 0.0).all()):
        raise ShapeError("T", f"shape {T.shape}", f"rising, one for each of the {f.size} fractions")
    species, share = _known(known or {})
    middle = (np.arange(SLICES) + 0.5) / SLICES
    slices = np.clip(curve_at(f, T, middle)[0], COLDEST, HOTTEST)
    left = _take_out(slices, species, share)
    Tb, v = _cut(slices, left, np.asarray(EDGES if edges is None else edges, dtype=float))
    known_mass = float(sum(s * one.rho_15 for s, one in zip(share, species, strict=True)))
    mass = rho_15 - known_mass  # kg of cuts in a cubic metre of the whole
    if not mass > 0.3 * rho_15 * v.sum():
        raise InputError("rho_15", rho_15, f"{rho_15:.5g} kg/m3 leaves too little mass to the unnamed part",
                         "a density that agrees with the known species")  # fmt: skip
    families, SG = _gravities(Tb, v, species, share, aromatics, olefins, mass)
    factor = mass / float(v @ density_15(SG))
    cuts = [
        cut(
            Tb[i],
            float(density_15(SG[i])) * factor,
            **{k: float(values[i]) for k, values in families.items()},
        )
        for i in range(Tb.size)
    ]
    return _together(species, share, cuts, v, factor)


def _known(known):
    """Species and volume shares, the most volatile first."""
    pairs = sorted(((find(name), float(s)) for name, s in known.items()), key=lambda pair: pair[0].Tb)
    total = sum(s for _, s in pairs)
    if any(not 0.0 <= s <= 1.0 for _, s in pairs) or total >= 1.0:
        raise InputError(
            "known", total, "shares of known species do not lie between 0 and 1", "less than 1 in sum"
        )
    return tuple(one for one, s in pairs if s > 0.0), np.array([s for _, s in pairs if s > 0.0])


def _take_out(slices, species, share):
    """Volume left in each slice [-] after the known species took theirs, nearest slices first."""
    left = np.full(SLICES, 1.0 / SLICES)
    for one, amount in zip(species, share, strict=True):
        order = np.argsort(np.abs(slices - one.Tb), kind="stable")
        taken = np.minimum(np.cumsum(left[order]), amount)
        left[order] -= np.diff(taken, prepend=0.0)
    return np.maximum(left, 0.0)


def _cut(slices, left, edges):
    """Mean boiling point [K] and volume [-] of each cut."""
    place = np.searchsorted(edges, slices)
    volume = np.bincount(place, left, edges.size + 1)
    heat = np.bincount(place, left * slices, edges.size + 1)
    used = np.flatnonzero(volume > 1e-9)
    volume, heat = list(volume[used]), list(heat[used])
    k = 0
    while k < len(volume):
        if volume[k] < SMALLEST and len(volume) > 1:
            into = k + 1 if k + 1 < len(volume) else k - 1
            volume[into] += volume[k]
            heat[into] += heat[k]
            del volume[k], heat[k]
        else:
            k += 1
    volume = np.array(volume)
    return np.array(heat) / volume, volume


def _gravities(Tb, v, species, share, aromatics, olefins, mass):
    """Shares of families that are known, as keywords of `cut`, and the gravity of each cut [-]."""
    if aromatics is None:
        shape = np.cbrt(RANKINE * Tb)
        return {}, shape * float(specific_gravity(mass / v.sum())) * v.sum() / (v @ shape)
    if not (0.0 <= aromatics and 0.0 <= olefins and aromatics + olefins <= 1.0):
        raise InputError(
            "aromatics", aromatics, "aromatics and olefins do not lie between 0 and 1", "their sum at most 1"
        )
    named = {
        family: float(sum(s for s, one in zip(share, species, strict=True) if one.family == family))
        for family in ("aromatic", "olefin")
    }
    A = _spread(v, aromatics_possible(Tb), aromatics - named["aromatic"])
    O = np.minimum(_spread(v, np.where(Tb < OLEFINS_BELOW, 1.0, 0.0), olefins - named["olefin"]), 1.0 - A)
    rest = 1.0 - A - O
    gravity = {
        family: family_gravity(family, Tb) for family in ("paraffin", "naphthene", "olefin", "aromatic")
    }
    light = A * gravity["aromatic"] + O * gravity["olefin"] + rest * gravity["paraffin"]
    heavier = rest * (gravity["naphthene"] - gravity["paraffin"])
    wanted = float(specific_gravity(mass / v.sum()))
    part = np.clip((wanted - v @ light / v.sum()) / (v @ heavier / v.sum()), 0.0, 1.0)
    return {"aromatics": A, "naphthenes": part * rest, "olefins": O}, light + part * heavier


def _spread(v, weight, amount):
    """Share in each cut [-] of an amount spread evenly over the weighted volume, at most all of it."""
    return np.minimum(weight * max(amount, 0.0) / max(float(v @ weight), 1e-12), 1.0)


def _together(species, share, cuts, v, factor):
    everything = (*species, *cuts)
    volume = np.concatenate([share, v])
    names = tuple(one.name for one in everything)
    table = columns(everything)
    mass = volume * table.rho_15
    moles = mass / table.MW
    return Cuts(names, volume / volume.sum(), moles / moles.sum(), float(mass.sum() / volume.sum()), factor)
