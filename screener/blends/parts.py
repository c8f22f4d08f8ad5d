"""One part of a blend: a share of a species or of a stock."""

from __future__ import annotations

import math
from collections.abc import Mapping
from dataclasses import dataclass, replace
from functools import lru_cache

from screener.blends.stocks import Stock, stock, stock_titles
from screener.ground.constants import T_15C, T_60F
from screener.ground.errors import InputError, UnknownName
from screener.species import columns, find
from screener.species import names as species_names

BASES = ("volume", "mass", "mole")
_AT = {"15 degC": T_15C, "60 degF": T_60F}
KINDS = ("species", "stock")
SUM_TOLERANCE = 5e-4  # shares that miss 100 % by more than 0.05 % are a fault


@dataclass(frozen=True)
class Part:
    """A part as given: kind 'species' or 'stock', its name, share [-] on the basis."""

    kind: str
    name: str
    share: float
    basis: str = "volume"
    at: str = "15 degC"

    def scaled(self, factor: float) -> Part:
        """The same part in a blend of which its old blend is the share `factor`, by standard volume.

        The share stays on the part's own basis inside its old blend; the factor is of volume.
        """
        return replace(self, share=self.share * factor)


@dataclass(frozen=True)
class Component:
    """A part with its composition: names and mole fractions of one mole of it."""

    part: Part
    names: tuple[str, ...]
    moles: tuple[float, ...]
    product: str
    source: str
    assumed: tuple[str, ...]

    @property
    def share(self) -> float:
        """Share on the basis of the part. [-]"""
        return self.part.share

    @property
    def name(self) -> str:
        """Name of the species or stock."""
        return self.part.name


def read_basis(basis: str, at: str) -> tuple[str, float]:
    """The basis, checked, and the temperature of its volumes. [K]"""
    if basis not in BASES:
        raise InputError("basis", basis, f"'{basis}' is not a basis of shares", f"one of {', '.join(BASES)}")
    if at not in _AT:
        raise InputError("at", at, f"volumes at '{at}' are not a trade volume", f"one of {', '.join(_AT)}")
    return basis, _AT[at]


def checked_shares(parts) -> dict[str, float]:
    """Shares by key as numbers; a fault for what is no share and for a sum that is not 100 %."""
    if not isinstance(parts, Mapping) or not parts:
        raise InputError(
            "parts", parts, "a blend needs at least one part", "a share for each species or stock"
        )
    shares = {}
    for i, (key, value) in enumerate(parts.items()):
        share = float(value)
        if not (math.isfinite(share) and 0.0 <= share):
            raise InputError(
                f"parts[{i}]", value, f"{key}: {value} is no share", "a share lies between 0 and 1"
            )
        shares[key] = share
    total = sum(shares.values())
    if abs(total - 1.0) > SUM_TOLERANCE:
        raise InputError(
            "parts", total, f"the shares sum to {100 * total:.4g} %", "they must sum to 100 % within 0.05 %"
        )
    return shares


def component(key: str, share: float, basis: str, at: str, path: str) -> Component:
    """Look a part up and lay out its composition; faults carry the path of the part."""
    try:
        kind, item = _find(key)
    except InputError as error:
        raise error.at(path) from error
    part = Part(kind, item.name, share, basis, at)
    if kind == "species":
        # Above its critical temperature a gas has no liquid; its standard volume is a convention.
        effective = f"{item.name} has no liquid at 15 degC; its liquid volume there is an effective one"
        assumed = (effective,) if item.Tc <= T_15C else ()
        return Component(part, (item.name,), (1.0,), "", "", assumed)
    names = tuple(name for name, _ in item.masses)
    MW = columns(names).MW
    moles = [mass / m for (_, mass), m in zip(item.masses, MW, strict=True)]
    total = sum(moles)
    return Component(
        part, names, tuple(n / total for n in moles), item.product, _source(item), _assumed(item)
    )


def _find(key: str):
    kind, colon, rest = key.partition(":")
    if colon and kind.strip() in KINDS:
        name = rest.strip()
        return (kind.strip(), find(name) if kind.strip() == "species" else stock(name))
    found = []
    for kind, look in (("species", find), ("stock", stock)):
        try:
            found.append((kind, look(key)))
        except UnknownName:
            continue
    if len(found) == 1:
        return found[0]
    if found:
        raise InputError("", key, f"'{key}' is a species and a stock", f"species:{key} or stock:{key}")
    raise UnknownName("", key, "species or stock", _known())


@lru_cache(maxsize=1)
def _known() -> tuple[str, ...]:
    return tuple(species_names()) + tuple(name for own, also, _ in stock_titles() for name in (own, *also))


def _source(item: Stock) -> str:
    return f"{item.name}: {item.source} ({item.obtained})"


def _assumed(item: Stock) -> tuple[str, ...]:
    lines = []
    if item.obtained == "invented":
        lines.append(f"{item.name} is an invented composition")
    if item.unnamed > 0.0:
        lines.append(
            f"{item.name}: {100 * item.unnamed:.1f} % of the mass is unidentified; {item.unidentified}"
        )
    elif item.unidentified:
        lines.append(f"{item.name}: {item.unidentified}")
    if item.stand_ins:
        share = sum(row.percent for row in item.stand_ins) / sum(row.percent for row in item.rows)
        lines.append(f"{item.name}: near relatives stand in for {100 * share:.1f} % of the mass")
    return tuple(lines)


def assumptions(read, basis: str, at: str, total: float) -> tuple[tuple[str, ...], tuple[str, ...]]:
    """Sentences on what was assumed for components, and their sources."""
    assumed = []
    if basis == "volume":
        assumed.append(f"shares by volume at {at}; standard volumes add without shrinkage")
    if abs(total - 1.0) > 1e-12:
        assumed.append(f"the shares sum to {100 * total:.6g} % and were brought to 100 %")
    for part in read:
        assumed.extend(part.assumed)
    sources = tuple(dict.fromkeys(part.source for part in read if part.source))
    return tuple(dict.fromkeys(assumed)), sources
