"""A species outside the table, built now from the property libraries by the same choices and fits."""

from __future__ import annotations

import numpy as np

from screener.ground.errors import InputError, UnknownName
from screener.species import build, forms, library
from screener.species.catalogue import names
from screener.species.groups import subgroup_table
from screener.species.record import Curve, Species
from screener.species.vapour_pressure import NoData


def find_live(text: str) -> Species:
    """Species for a name or CAS number that the identifier tables of the library know.

    Needs the packages thermo and chemicals; takes about a second. Family is `other`, flash
    point and limits stay empty, `live` is true.

    Raises
    ------
    UnknownName
        The library knows nothing of this name.
    InputError
        No usable vapour-pressure curve, critical point, density or heat capacity: the
        species is refused. Alpha is never taken from the acentric factor.
    """
    try:
        cas = library.cas_of(text)
    except LookupError as error:
        raise UnknownName("", text, "species", [name.lower() for name in names()]) from error
    try:
        return _build(text, cas)
    except (NoData, LookupError) as error:
        raise InputError(
            "", text, f"'{text}' ({cas}) cannot be used: {error}",
            "a species needs a vapour-pressure curve, a density, a heat capacity and a critical point",
        ) from error  # fmt: skip


def _build(text, cas) -> Species:
    name, formula, _, inchi_key, MW = library.identity(cas)
    Tc, Pc, _, _ = library.critical(cas)
    Tb = library.boiling_point(cas)
    if Tb is None:
        raise NoData("no normal boiling point")
    cp, _, _, _ = build.fit_cp(cas, MW)
    curve = build.choose_curve(cas, MW, Tc, Pc, Tb, cp)
    alpha, _, _ = build.fit_alpha(curve, Tc, Pc)
    T, rho, _, _, note = build.choose_density(cas, MW, Tc, Pc)
    shift, _, _, density = build.fit_density(T, rho, MW, Tc, Pc, alpha, curve)
    rho_15, rho_note = build.density_at_15(cas, MW, Tc, Pc, Tb, density)
    omega = -np.log10(forms.psat(curve.coefficients, 0.7 * Tc) / Pc) - 1.0
    return Species(
        name=name,
        synonyms=(text,) if text != name else (),
        cas=cas,
        formula=formula,
        family="other",
        MW=MW, Tc=Tc, Pc=Pc, omega=float(omega), Tb=Tb,
        alpha=alpha,
        translation=shift,
        cp_ideal=cp,
        groups=_groups(inchi_key),
        rho_15=rho_15,
        rho_note="; ".join(filter(None, (note, rho_note))),
        curve=Curve(
            tuple(map(float, curve.coefficients)), curve.T_low, curve.T_high, curve.source,
            curve.source_low, curve.source_high, curve.fit_error,
        ),
        psat_spread=curve.spread,
        psat_extension=curve.extension,
        psat_note=curve.note,
        live=True,
    )  # fmt: skip


def _groups(inchi_key) -> dict[int, int]:
    """Subgroups, or none when the tables of data/groups lack one of them: then the species is like a gas."""
    counts = library.group_counts(inchi_key)
    return counts if set(counts) <= set(subgroup_table()) else {}
