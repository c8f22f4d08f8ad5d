"""Liquids of these tests: a handful of names and a blend that only remembers its shares."""

from dataclasses import dataclass

import pytest

from screener.casefile import Tables
from screener.ground.errors import UnknownName

SPECIES = {"ethanol": "ethanol", "ethyl alcohol": "ethanol", "64-17-5": "ethanol", "n-butane": "n-butane",
           "isopentane": "isopentane", "toluene": "toluene"}  # fmt: skip
_BASES = ["summer gasoline base", "winter gasoline base", "field butane", "heavy naphtha"]
STOCKS = {name: name for name in [*_BASES, "denatured ethanol", "condensate", "jet kerosene", "diesel"]}
PACKS = ("us-40cfr60-kb", "eu-94-63")


@dataclass(frozen=True)
class Shares:
    """Stands for a blend: what it was asked to be made of."""

    shares: tuple
    basis: str
    at: str


@dataclass(frozen=True)
class Fitted:
    """Stands for a blend that was fitted to a sheet alone."""

    sheet: object


def _fitted(sheet, start):
    return Fitted(sheet) if start is None else start


def _look(table: dict, kind: str):
    def find(name: str) -> str:
        if name.lower() not in table:
            raise UnknownName("", name, kind, table)
        return table[name.lower()]

    return find


def _blend(shares, basis="volume", at="15 degC"):
    assert abs(sum(shares.values()) - 1.0) < 1e-12, "the reader hands on shares that sum to 1"
    return Shares(tuple(shares.items()), basis, at)


@pytest.fixture(scope="session")
def tables() -> Tables:
    return Tables(_look(SPECIES, "species"), _look(STOCKS, "stock"), _blend, lambda: PACKS, _fitted)
