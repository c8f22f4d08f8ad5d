"""Find a species by what people call it, and lay several out as columns."""

from __future__ import annotations

import re
from dataclasses import dataclass
from functools import lru_cache

import numpy as np

from screener.ground.errors import DataError, UnknownName
from screener.species import tables
from screener.species.pseudo import is_cut, read
from screener.species.record import Species


def _key(text: str) -> str:
    """A name without case, blanks and hyphens between letters: 'n-C7', 'nC7' and 'N C7' are one.

    Hyphens and commas next to digits stay, because 1,1-dimethyl and 11-dimethyl differ.
    """
    text = re.sub(r"\s+", " ", text.strip().lower())
    return re.sub(r"(?<=[a-z])[- ](?=[a-z])", "", text)


@lru_cache(maxsize=1)
def _names() -> dict[str, str]:
    """Every spelling in the table -> CAS number."""
    found: dict[str, str] = {}
    for cas, row in tables.by_cas("identity").items():
        for spelling in (row["name"], cas, *filter(None, row["synonyms"].split(";"))):
            if found.setdefault(_key(spelling), cas) != cas:
                raise DataError("species/identity.csv", None, f"'{spelling}' names two species")
    return found


def names() -> tuple[str, ...]:
    """Canonical names of all species, in the order of the table."""
    return tuple(row["name"] for row in tables.by_cas("identity").values())


def find(text: str | Species) -> Species:
    """The species with this name, synonym or CAS number; case does not matter.

    The name of a cut describes it wholly and gives the pseudo-component (`screener.species.cut`);
    a species is given back as it is.

    Raises
    ------
    UnknownName
        Nothing in the table is called so; carries the nearest names.
    """
    if isinstance(text, Species):
        return text
    cas = _names().get(_key(str(text)))
    if cas is None and is_cut(str(text)):
        return read(str(text))
    if cas is None:
        spellings = [name.lower() for name in names()]
        spellings += [
            s.lower() for row in tables.by_cas("identity").values() for s in row["synonyms"].split(";") if s
        ]
        raise UnknownName("", str(text), "species", spellings)
    return tables.species(cas)


def stand_in(cas: str) -> tuple[Species, str] | None:
    """The species that stands for one outside the table, and the words that say why; None if none does.

    Isomer mixtures and species without a usable vapour-pressure curve occur in fuel
    analyses; the table names for each a species of the same family and nearly the same
    boiling point (data/species/stand_ins.csv).
    """
    row = tables.by_cas("stand_ins").get(cas.strip())
    return (tables.species(row["stands_in"]), row["reason"]) if row else None


@dataclass(frozen=True)
class Columns:
    """Constants of c species side by side, SI; units as in `Species`.

    MW, Tc, Pc, omega, Tb, L, M, N, C, D, c0, c1, rho_15 (c,); cp_ideal (c, 5);
    groups (c, G) counts of the subgroups (G,) of modified UNIFAC (Dortmund).
    """

    names: tuple[str, ...]
    MW: np.ndarray
    Tc: np.ndarray
    Pc: np.ndarray
    omega: np.ndarray
    Tb: np.ndarray
    L: np.ndarray
    M: np.ndarray
    N: np.ndarray
    C: np.ndarray
    D: np.ndarray
    c0: np.ndarray
    c1: np.ndarray
    rho_15: np.ndarray
    cp_ideal: np.ndarray
    groups: np.ndarray
    subgroups: np.ndarray


def columns(wanted) -> Columns:
    """Columns of the species called `wanted` (names, synonyms, CAS numbers or Species), in that order."""
    found = [one if isinstance(one, Species) else find(one) for one in wanted]
    subgroups = np.array(sorted({k for one in found for k in one.groups}), dtype=int)
    counts = np.array([[one.groups.get(int(k), 0) for k in subgroups] for one in found], dtype=float)

    def column(get):
        return np.array([get(one) for one in found], dtype=float)

    alpha = column(lambda one: one.alpha).reshape(len(found), 5)
    shift = column(lambda one: one.translation).reshape(len(found), 2)
    return Columns(
        names=tuple(one.name for one in found),
        **{
            name: column(lambda one, name=name: getattr(one, name))
            for name in ("MW", "Tc", "Pc", "omega", "Tb")
        },
        **{name: alpha[:, i] for i, name in enumerate("LMNCD")},
        c0=shift[:, 0],
        c1=shift[:, 1],
        rho_15=column(lambda one: one.rho_15),
        cp_ideal=column(lambda one: one.cp_ideal).reshape(len(found), 5),
        groups=counts.reshape(len(found), len(subgroups)),
        subgroups=subgroups,
    )
