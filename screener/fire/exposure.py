"""What a headspace means to someone who breathes it: concentrations against dated limits."""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache

import numpy as np

from screener.equilibrium import Fluid
from screener.fire.headspace import headspace
from screener.fire.results import Headspace
from screener.ground.constants import ATMOSPHERE, R
from screener.ground.errors import UnknownName
from screener.ground.files import read_table
from screener.ground.shapes import lanes
from screener.species import find

GAS = "hydrogen sulfide"
# [K] at which a limit in ppm and one in mg/m3 are the same amount, with 1 atm: 24.465 L/mol, the convention
# of the agencies (from memory, unverified).
T_LIMITS = 298.15


@dataclass(frozen=True)
class ExposureLimit:
    """One limit: of (a species, or a group counted together), members, kind, value [mole fraction
    in air], mg_m3 [mg/m3] at 25 degC and one atmosphere, agency, date and evidence mark."""

    of: str
    members: tuple[str, ...]
    kind: str
    value: float
    mg_m3: float
    agency: str
    date: str
    evidence: str

    @property
    def ppm(self) -> float:
        """The limit by volume. [ppm]"""
        return round(self.value * 1e6, 9)  # as the agency printed it, rid of the digits of the conversion


@dataclass(frozen=True)
class Exposure:
    """One limit against the lanes of a headspace: ppm (n,) [ppm] and mg_m3 (n,) [mg/m3] in the space,
    ratio (n,) [-] over the limit, dilution (n,) [-] volumes of clean air and vapour together
    that one volume must become to come down to it (1 where it is below already)."""

    limit: ExposureLimit
    ppm: np.ndarray
    mg_m3: np.ndarray
    ratio: np.ndarray
    dilution: np.ndarray


@lru_cache(maxsize=1)
def _groups() -> dict[str, tuple[tuple[str, ...], str]]:
    """Group -> its members and the agency it holds for ("" for any)."""
    found: dict[str, tuple[tuple[str, ...], str]] = {}
    for row in read_table("fire/exposure_groups.csv"):
        members, _ = found.get(row["group"], ((), ""))
        found[row["group"]] = (*members, row["name"]), row["agency"]
    return found


def _group_of(name: str, agency: str):
    for group, (members, only) in _groups().items():
        if name in members and (only in agency):
            return group, members
    return name, (name,)


def exposure_limits(names) -> tuple[ExposureLimit, ...]:
    """Limits of the species named, those of a group once.

    Parameters
    ----------
    names : sequence of str
        Species; a name in no table has no limits.

    Returns
    -------
    tuple of ExposureLimit
        In the order of the names. The isomers of xylene, the hexanes other than n-hexane
        and, for the agency that says so, the pentanes are counted together.

    Source
    ------
    data/species/exposure.csv, each with agency, date and evidence.
    """
    found: dict[tuple, ExposureLimit] = {}
    for name in names:
        try:
            one = find(name)
        except UnknownName:
            continue
        for limit in one.exposure:
            of, members = _group_of(one.name, limit.agency)
            key = of, limit.kind, limit.value, limit.agency.split(" (")[0], limit.date
            mg_m3 = limit.value * one.MW * ATMOSPHERE / (R * T_LIMITS) * 1e6
            found.setdefault(
                key,
                ExposureLimit(
                    of, members, limit.kind, limit.value, mg_m3, limit.agency, limit.date, limit.evidence
                ),
            )
    return tuple(found.values())


def exposure(space: Headspace) -> tuple[Exposure, ...]:
    """A headspace against every limit of its species.

    Parameters
    ----------
    space : Headspace
        Concentrations of c species in n lanes; a diluted space through its `saturation`.

    Returns
    -------
    tuple of Exposure
        One for each limit; NaN in lanes without an answer.

    Validity
    --------
    What is in the space, not what someone breathes beside it.

    Source
    ------
    As `exposure_limits`.
    """
    ppm, mg_m3 = space.ppm, space.mg_m3
    answers = []
    for limit in exposure_limits(space.names):
        at = [i for i, name in enumerate(space.names) if name in limit.members]
        here = ppm[:, at].sum(axis=1)
        ratio = here / limit.ppm
        answers.append(Exposure(limit, here, mg_m3[:, at].sum(axis=1), ratio, np.maximum(ratio, 1.0)))
    return tuple(answers)


def hydrogen_sulfide_vapour(fluid, T, x, share, *, P=ATMOSPHERE, ratio=0.0, saturation=1.0) -> Headspace:
    """Headspace of a liquid that holds dissolved hydrogen sulfide.

    Parameters
    ----------
    fluid : Fluid
        Species and model of the liquid, with or without hydrogen sulfide.
    T : float or array, shape (n,)
        Temperature. [K]
    x : array, shape (c,) or (n, c)
        Mole fractions of the liquid; any hydrogen sulfide in it is replaced. [-]
    share : float or array, shape (n,)
        Hydrogen sulfide in the liquid, mass over mass: parts per million times 1e-6. [-]
    P : float or array, shape (n,)
        Pressure of the space. [Pa]
    ratio : float or array, shape (n,)
        Vapour space over liquid volume: a large space strips the liquid. [-]
    saturation : float or array, shape (n,)
        Vapour in the space over that of equilibrium. [-]

    Returns
    -------
    Headspace
        Of all species; `names` ends with or contains hydrogen sulfide.

    Raises
    ------
    ShapeError
        x does not match the fluid, or rows do not broadcast.

    Validity
    --------
    Hydrogen sulfide free and dissolved, none bound or made in the liquid.

    Source
    ------
    Equilibrium of the fluid's model with the pair terms of the gas; see data/pairs/pair_terms.csv.
    """
    if GAS not in fluid.names:
        x = np.asarray(x, dtype=float)
        x = np.concatenate([x, np.zeros((*x.shape[:-1], 1))], axis=-1)
        fluid = Fluid.of((*fluid.names, GAS), fluid.model)
    x, T, one_more, _ = lanes(fluid.c, x, T=T, share=1.0 + np.asarray(share, dtype=float))
    share = np.where((one_more >= 1.0) & (one_more < 2.0), one_more - 1.0, np.nan)
    at = fluid.names.index(GAS)
    rest = np.where(np.arange(fluid.c) == at, 0.0, x)
    rest = rest / rest.sum(axis=1, keepdims=True)
    gas = share / fluid.MW[at]
    z = rest * ((1.0 - share) / (rest @ fluid.MW))[:, None]
    z[:, at] = gas
    return headspace(fluid, T, z / z.sum(axis=1, keepdims=True), P=P, ratio=ratio, saturation=saturation)
