"""A case built by hand, away from any edge, for tests that change one thing at a time. Numbers are invented."""

from __future__ import annotations

from dataclasses import replace

from screener.blends import Blend
from screener.states.case import (
    Ambient,
    Case,
    Contents,
    Levels,
    Line,
    Month,
    Receipt,
    Site,
    Suction,
    Tank,
    Vent,
)

ZERO = 273.15
MEANS = (3.0, 4.0, 8.0, 12.0, 16.0, 20.0, 23.0, 22.0, 18.0, 13.0, 8.0, 4.0)
NAMES = ("Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec")
MONTHS = tuple(Month(n, ZERO + m, ZERO + m + 6.0, ZERO + m - 6.0, 2.0e7) for n, m in zip(NAMES, MEANS))

LIGHT = {"n-butane": 0.02, "isopentane": 0.10, "n-hexane": 0.24, "toluene": 0.32, "isooctane": 0.32}
HEAVY = {"n-heptane": 0.30, "toluene": 0.35, "isooctane": 0.35}


def blend(shares: dict) -> Blend:
    """A blend of pure species by volume."""
    return Blend.of({f"species:{name}": share for name, share in shares.items()})


def vent(**changes) -> Vent:
    """A pressure-vacuum vent with its rating."""
    each = {"set_above": 1200.0, "set_below": 200.0, "rated_out": 0.5, "rated_out_at": 1600.0, "rated_in": 0.5,
            "rated_in_at": 400.0}  # fmt: skip
    return Vent(count=2, **{**each, **changes})


def tank(**changes) -> Tank:
    """A fixed-roof tank with a heel."""
    base = Tank(
        "fixed-roof", 24.0, 14.6, levels=Levels(2.0, 9.0, 13.1), surface="white paint, new",
        design_overpressure=2000.0, design_vacuum=600.0, vents=(vent(),),
        contents=Contents(blend(HEAVY), 1100.0, ZERO + 20.0), open_gauging=True,
    )  # fmt: skip
    return replace(base, **changes)


def site(**changes) -> Site:
    """A mild site."""
    return replace(Site(44.0, 35.0, 97800.0, Ambient(ZERO - 8.0, ZERO + 33.0), MONTHS, "Jul"), **changes)


def suction(**changes) -> Suction:
    """A short flooded suction."""
    return replace(Suction(120.0, 0.304, 4.6e-5, 5.0, 0.5, None, 0.3, 2.0), **changes)


def line(**changes) -> Line:
    """A receipt and a draw."""
    return replace(Line(Receipt(0.10, ZERO + 18.0, "none"), 0.08, suction()), **changes)


def case(**changes) -> Case:
    """The whole case; by keyword any part of it is replaced."""
    base = Case("hand-made", blend(LIGHT), tank(), site(), line(), criteria=("us-40cfr60-kb",))
    return replace(base, **changes)


def verdicts(screening) -> dict[str, str]:
    """Verdict by finding id."""
    return {finding.id: finding.verdict for finding in screening.findings}
