"""Blendstocks: compositions on file, each with where it comes from.

A stock is a pair of files in data/stocks: NAME.csv with the rows of an analysis (or of
an invented composition) and NAME.toml, its passport. A row names the species that stands
for it; `+` between species splits the row evenly by mass, and a species named twice takes two of
the parts. A row without species is left out and the rest scaled up; the passport's `unidentified`
sentence says which rule holds.
"""

from __future__ import annotations

import re
from dataclasses import dataclass
from functools import lru_cache

from screener.ground.constants import PSI, ZERO_CELSIUS
from screener.ground.errors import DataError, UnknownName
from screener.ground.files import data_folder, read_table, read_toml
from screener.species import find
from screener.species.cut_families import CH2


@dataclass(frozen=True)
class StockRow:
    """One row of a stock's table. percent is of mass; species () for mass not identified."""

    entry: str
    cas: str
    percent: float
    species: tuple[str, ...]
    stand_in: str


@dataclass(frozen=True)
class Published:
    """A measured number printed with the composition: number ("density_15", "dvpe", "rvp", "T10", "T50",
    "T90", "flash_point", "tvp"), value in SI, unit and printed as the source has them, source with edition.
    at [K] is the temperature of a vapour pressure, None otherwise.
    """

    number: str
    value: float
    unit: str
    printed: float
    source: str
    at: float | None = None


# unit of a published number: SI unit, factor and offset
_UNITS = {
    "kg/m3": ("kg/m3", 1.0, 0.0),
    "kPa": ("Pa", 1e3, 0.0),
    "psi": ("Pa", PSI, 0.0),
    "degC": ("K", 1.0, ZERO_CELSIUS),
}
PUBLISHED_NUMBERS = {"density_15": "kg/m3", "dvpe": "Pa", "rvp": "Pa", "tvp": "Pa", "T10": "K", "T50": "K", "T90": "K",
                     "flash_point": "K"}  # fmt: skip


@dataclass(frozen=True)
class Stock:
    """A blendstock.

    obtained is 'published' or 'invented'; product the commodity group for volume
    correction, '' when the density chooses; claims the class or cut it is meant to be.
    masses (name, share of mass) add to 1 over the species. published are measured numbers of the same
    liquid: nothing here is fitted to them.
    """

    name: str
    title: str
    also: tuple[str, ...]
    obtained: str
    product: str
    claims: str
    source: str
    unidentified: str
    note: str
    rows: tuple[StockRow, ...]
    masses: tuple[tuple[str, float], ...]
    published: tuple[Published, ...] = ()

    @property
    def unnamed(self) -> float:
        """Share of the mass that the analysis could not name. [-]"""
        total = sum(row.percent for row in self.rows)
        return sum(row.percent for row in self.rows if not row.species) / total

    @property
    def stand_ins(self) -> tuple[StockRow, ...]:
        """Rows for which another species stands in."""
        return tuple(row for row in self.rows if row.stand_in)


@lru_cache(maxsize=1)
def stocks() -> tuple[Stock, ...]:
    """All blendstocks on file, in the order of their names.

    Returns
    -------
    tuple of Stock
        Compositions with their passports.

    Source
    ------
    data/stocks, one passport per stock.
    """
    return tuple(_read(stem) for stem in _passports())


@lru_cache(maxsize=1)
def _passports() -> dict[str, dict]:
    """Passports by the stem of their file. The rows of a stock are read when it is asked for: cuts take time."""
    folder = data_folder() / "stocks"
    stems = sorted(path.stem for path in folder.glob("*.csv"))
    return {stem: read_toml(f"stocks/{stem}.toml") for stem in stems}


def stock_titles() -> tuple[tuple[str, tuple[str, ...], str], ...]:
    """Name, other names and title of every stock, without its rows.

    Returns
    -------
    tuple of (name, other names, title)
        In alphabetical order of their files.

    Source
    ------
    data/stocks, one passport per stock.
    """
    return tuple((p["name"], tuple(p.get("also", ())), p["title"]) for p in _passports().values())


def stock_names() -> tuple[str, ...]:
    """Names of the stocks on file.

    Returns
    -------
    tuple of str
        In alphabetical order.

    Source
    ------
    data/stocks, one passport per stock.
    """
    return tuple(name for name, _, _ in stock_titles())


def stock(name: str) -> Stock:
    """One blendstock by name or other name, upper and lower case alike.

    Parameters
    ----------
    name : str
        Name as in `stock_names()`, hyphens and spaces alike.

    Returns
    -------
    Stock
        Composition with its passport.

    Raises
    ------
    UnknownName
        No stock has that name; the nearest names are listed.

    Source
    ------
    data/stocks, one passport per stock.
    """
    table = _by_name()
    key = _plain(name)
    if key not in table:
        raise UnknownName("", name, "stock", table)
    return _read(table[key])


def _plain(name: str) -> str:
    return " ".join(name.lower().replace("-", " ").replace("_", " ").split())


@lru_cache(maxsize=1)
def _by_name() -> dict[str, str]:
    """Stem of the file by name and other name."""
    table: dict[str, str] = {}
    for stem, (own, also, _) in zip(_passports(), stock_titles(), strict=True):
        for name in (own, *also):
            if _plain(name) in table:
                raise DataError("stocks", None, f"two stocks answer to '{name}'")
            table[_plain(name)] = stem
    return table


@lru_cache(maxsize=256)
def _read(stem: str) -> Stock:
    file = f"stocks/{stem}.csv"
    passport = _passports()[stem]
    rows = tuple(_row(file, r) for r in read_table(file))
    mass = _masses(file, rows, int(passport.get("unidentified_from_carbon", 0)))
    return Stock(
        name=passport["name"],
        title=passport["title"],
        also=tuple(passport.get("also", ())),
        obtained=passport["obtained"],
        product=passport.get("product", ""),
        claims=passport["claims"],
        source=passport["source"],
        unidentified=passport["unidentified"],
        note=passport.get("note", ""),
        rows=rows,
        masses=mass,
        published=tuple(_published(file, item) for item in passport.get("published", ())),
    )


def _published(file: str, item: dict) -> Published:
    number, unit, printed = item["number"], item["unit"], float(item["value"])
    if number not in PUBLISHED_NUMBERS or unit not in _UNITS or _UNITS[unit][0] != PUBLISHED_NUMBERS[number]:
        raise DataError(file, None, f"published {number} in {unit}")
    if (number == "tvp") != ("at" in item):
        raise DataError(
            file, None, f"published {number}: 'at' belongs to a vapour pressure and to nothing else"
        )
    _, factor, offset = _UNITS[unit]
    at = float(item["at"]) + ZERO_CELSIUS if "at" in item else None
    return Published(number, printed * factor + offset, unit, printed, item["source"], at)


def _masses(file: str, rows: tuple[StockRow, ...], from_carbon: int) -> tuple[tuple[str, float], ...]:
    """Shares of mass by species, the unnamed mass spread over the named one."""
    mass: dict[str, float] = {}
    for row in rows:
        for name in row.species:
            mass[name] = mass.get(name, 0.0) + row.percent / len(row.species)
    unnamed = sum(row.percent for row in rows if not row.species)
    heavy = {name: value for name, value in mass.items() if carbon_atoms(name) >= from_carbon}
    if not sum(heavy.values()) > 0.0:
        raise DataError(file, None, f"no row has a species of {from_carbon} carbon atoms or more")
    scale = 1.0 + unnamed / sum(heavy.values())
    total = sum(mass.values()) + unnamed
    return tuple((name, value * (scale if name in heavy else 1.0) / total) for name, value in mass.items())


def carbon_atoms(name: str) -> int:
    """Carbon atoms in a molecule of a species; of a cut, as many CH2 as its molar mass holds."""
    one = find(name)
    if one.family == "cut":
        return round(one.MW / CH2)
    found = re.match(r"C(\d*)(?![a-z])", one.formula)
    return 0 if found is None else int(found.group(1) or 1)


def _row(file: str, row: dict[str, str]) -> StockRow:
    percent = float(row["mass_percent"])
    if not percent >= 0.0:
        raise DataError(file, None, f"{row['entry']}: mass_percent is {row['mass_percent']}")
    try:
        species = tuple(find(name).name for name in row["species"].split("+") if name.strip())
    except UnknownName as error:
        raise DataError(file, None, f"{row['entry']}: {error}") from error
    return StockRow(row["entry"], row["cas"], percent, species, row["stand_in"])
