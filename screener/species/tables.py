"""The species tables as records. Opens the CSV files of data/species, once each and only when asked."""

from __future__ import annotations

from functools import cache, lru_cache

from screener.ground.errors import DataError
from screener.ground.files import read_table
from screener.species.record import Curve, Limit, Species

FOLDER = "species/"


@cache
def by_cas(table: str) -> dict[str, dict[str, str]]:
    """Rows of one species table keyed by CAS number."""
    return {row["cas"]: row for row in read_table(f"{FOLDER}{table}.csv")}


@lru_cache(maxsize=1)
def exposure_limits() -> dict[str, tuple[Limit, ...]]:
    """Exposure limits of every species that has one, keyed by CAS number."""
    found: dict[str, list[Limit]] = {}
    for row in read_table(f"{FOLDER}exposure.csv"):
        limit = Limit(row["kind"], float(row["ppm"]) * 1e-6, row["agency"], row["date"], row["evidence"])
        found.setdefault(row["cas"], []).append(limit)
    return {cas: tuple(limits) for cas, limits in found.items()}


def numbers(table: str, cas: str, *columns: str) -> tuple[float, ...]:
    """Named columns of one row as numbers; DataError when the row or a number is missing."""
    try:
        row = by_cas(table)[cas]
        return tuple(float(row[column]) for column in columns)
    except (KeyError, ValueError) as error:
        raise DataError(f"{FOLDER}{table}.csv", None, f"{cas}: {error}") from error


def groups(text: str) -> dict[int, int]:
    """Subgroup counts from their text form "1:2 2:4"."""
    return {int(k): int(n) for k, n in (pair.split(":") for pair in text.split())}


def _number(text: str) -> float | None:
    return float(text) if text else None


@cache
def species(cas: str) -> Species:
    """The record of one species."""
    identity, constants = by_cas("identity")[cas], by_cas("constants")[cas]
    curve, density = by_cas("vapour_pressure")[cas], by_cas("liquid_density")[cas]
    fire = by_cas("flammability").get(cas, {})
    MW, Tc, Pc, omega, Tb = numbers("constants", cas, "MW", "Tc", "Pc", "omega", "Tb")
    low, high, source_low, source_high, miss = numbers(
        "vapour_pressure", cas, "T_low", "T_high", "source_low", "source_high", "fit_error"
    )
    return Species(
        name=identity["name"],
        synonyms=tuple(filter(None, identity["synonyms"].split(";"))),
        cas=cas,
        formula=constants["formula"],
        family=identity["family"],
        MW=MW, Tc=Tc, Pc=Pc, omega=omega, Tb=Tb,
        alpha=numbers("alpha", cas, "L", "M", "N", "C", "D"),
        translation=numbers("translation", cas, "c0", "c1"),
        cp_ideal=numbers("cp_ideal", cas, "a0", "a1", "a2", "a3", "a4"),
        groups=groups(by_cas("groups")[cas]["groups"]) if cas in by_cas("groups") else {},
        rho_15=float(density["rho_15"]),
        rho_note=density["note"],
        curve=Curve(
            numbers("vapour_pressure", cas, "c0", "c1", "c2", "c3", "c4", "c5"),
            low, high, curve["source"], source_low, source_high, miss,
        ),
        psat_spread=_number(curve["spread"]),
        psat_extension=float(curve["extension"]),
        psat_note=curve["note"],
        flash_point=_number(fire.get("flash_point", "")),
        flash_point_source=fire.get("flash_point_source", ""),
        LFL=_number(fire.get("LFL", "")),
        LFL_source=fire.get("LFL_source", ""),
        UFL=_number(fire.get("UFL", "")),
        UFL_source=fire.get("UFL_source", ""),
        exposure=exposure_limits().get(cas, ()),
    )  # fmt: skip
