"""A screening made by hand: every verdict once, every number chosen so that it can be checked by eye."""

from __future__ import annotations

from dataclasses import dataclass, field
from types import SimpleNamespace

from screener.blends import Report
from screener.screening.finding import Condition, Fact, Finding, Headroom, Information, Screening
from screener.states.case import (
    Ambient,
    Case,
    Contents,
    InputEcho,
    Levels,
    Line,
    Reading,
    Receipt,
    Site,
    Suction,
    Tank,
    Vent,
)


@dataclass(frozen=True)
class MadeBlend:
    """Stands in for a blend where only names, shares and report are read."""

    title: str
    names: tuple[str, ...]
    moles: tuple[float, ...]
    report: Report = field(default_factory=Report)
    MW: float = 0.08
    parts: tuple = ()
    density_15: float = 742.0
    fluid: SimpleNamespace = field(default_factory=lambda: SimpleNamespace(model="PR-GE", gaps=()))

    @property
    def z(self) -> tuple[float, ...]:
        """Mole fractions."""
        return self.moles


RECEIPT = MadeBlend(
    "90 % made-up base + 10 % ethanol", ("toluene", "isopentane", "ethanol"), (0.55, 0.25, 0.20)
)
HEEL = MadeBlend(
    "made-up base",
    ("toluene", "isopentane"),
    (0.7, 0.3),
    Report(("shares by volume at 15 degC",), ("made up",), (("density", 742.0, 741.6, 0.5),)),
)


def finding(**changes) -> Finding:
    """A finding with room; change what a test is about."""
    values = {
        "id": "boiling.surface",
        "title": "Boiling at the liquid surface",
        "quantity": "bubble pressure of the liquid at its hottest surface",
        "value": 66100.0,
        "low": 59000.0,
        "high": 73200.0,
        "range_covers": ("weather", "method"),
        "limit_low": None,
        "limit_high": 97800.0,
        "kind": "stay below",
        "evidence": "law",
        "margin": 31700.0,
        "asked_gap": 9780.0,
        "room_used": 66100.0 / 97800.0,
        "room_used_low": 59000.0 / 97800.0,
        "room_used_high": 73200.0 / 97800.0,
        "scale": "percent",
        "unit": "Pa",
        "verdict": "room",
        "reason": "the whole range stays on the good side with the gap asked for",
        "basis": "equation-of-state bubble pressure at the daily maximum surface temperature",
        "source": "8 CCR 5585(c)",
        "caution": "Sun on a dark tank can pass the estimate.",
        "condition": Condition("mixture", "low", "hottest day, Jul", "liquid surface"),
        "facts": (
            Fact("surface temperature", 308.15, "K", "daily maximum"),
            Fact("barometer", 97800.0, "Pa"),
        ),
        "moved_by": ("isopentane +1 % by moles: +0.9 kPa", "surface +1 K: +2.3 kPa"),
        "headroom": (Headroom("surface temperature", 318.15, "K", "liquid surface below 45.0 degC"),),
        "not_counted": ("weathering",),
        "sources": ("ccr8-5585",),
    }
    return Finding(**{**values, **changes})


BLANK = {
    "value": None, "low": None, "high": None, "limit_low": None, "limit_high": None, "margin": None, "asked_gap": None,
    "room_used": None, "room_used_low": None, "room_used_high": None, "facts": (), "moved_by": (), "headroom": (),
    "condition": Condition(),
}  # fmt: skip

BEYOND = finding(
    id="vapour-lock.suction", title="Suction line above the bubble point", quantity="lowest pressure in the line",
    kind="stay above", limit_low=66100.0, limit_high=None, value=64300.0, low=64300.0, high=64300.0,
    margin=-1800.0, room_used=1.06, room_used_low=1.06, room_used_high=1.06, evidence="physics", verdict="beyond",
    reason="the best value is on the wrong side of the limit", source="vapour forms at the bubble pressure",
    caution="Start-up lowers the pressure further.", sources=(), moved_by=(), facts=(Fact("draw", 0.125, "m3/s"),),
    headroom=(Headroom("draw rate", 0.1, "m3/s", "draw slower than 360 m3/h"),),
)  # fmt: skip
NEAR = finding(
    id="vents.inbreathing", title="Vents, breathing in", quantity="in-breathing required, as air", unit="m3/s air",
    value=0.5, low=0.5, high=0.52, limit_high=0.525, margin=0.025, room_used=0.952, verdict="near", evidence="user",
    reason="the range stays on the good side, but with less than the gap asked for", facts=(), headroom=(),
    moved_by=(), source="capacity from the case", sources=(), not_counted=("condensing vapour",), caution="",
    inputs_assumed=("thermal in-breathing of an uninsulated tank",),
)  # fmt: skip
UNKNOWN = finding(
    id="vapour-pressure.legal", title="True vapour pressure, highest monthly mean", verdict="unknown", evidence="",
    reason="no rule pack chosen under screening.criteria", source="", sources=(), caution="", **BLANK
)  # fmt: skip
SKIPPED = finding(
    id="vents.pressure-setting", title="Vent setting against design pressure", unit="Pa over barometer",
    verdict="skipped", reason="no vents are listed", source="", evidence="", sources=(), caution="", **BLANK
)  # fmt: skip
ROOM = finding()


def made_case(**changes) -> Case:
    """A case in which every kind of input occurs."""
    values = {
        "title": "Tarn Hollow, tank 12",
        "reference": "TH-12-07",
        "prepared_by": "duty engineer",
        "blend": RECEIPT,
        "tank": Tank(
            kind="internal-floating-roof",
            shell_diameter=24.0,
            levels=Levels(2.0, 9.0, 13.1),
            vents=(Vent(count=2, set_above=400.0),),
            contents=Contents(HEEL, 1100.0, 297.15),
        ),
        "site": Site(
            lowest_barometer=97800.0,
            ambient=Ambient(265.15, 310.15),
            month="Jul",
            liquid_temperature=Reading(301.15, "2026-07-14"),
        ),
        "line": Line(Receipt(rate=600 / 3600, temperature=299.15), 0.125, Suction(line_length=180.0)),
        "inputs": (
            InputEcho("tank.shell_diameter", "24 m", 24.0, "m"),
            InputEcho("blend.parts[0].share", "90 %", 0.9, "-", "certificate"),
            InputEcho("tank.vents[0].set", "0.4 kPa gauge", 400.0, "Pa over barometer"),
            InputEcho("line.receipt.temperature", "26 degC", 299.15, "K", "estimate"),
            InputEcho("line.suction.roughness", "", 4.6e-5, "m", "default", "drawn steel pipe"),
        ),
        "source": "cases/tank_12.toml",
        "digest": "ab" * 32,
    }
    return Case(**{**values, **changes})


def made_screening(*findings: Finding, **changes) -> Screening:
    """A screening of the made case with the findings given, or with one of each verdict."""
    values = {
        "case": made_case(),
        "findings": findings or (BEYOND, UNKNOWN, NEAR, ROOM, SKIPPED),
        "information": (Information("Fuel class", (Fact("T(V/L = 20)", 329.15, "K"), Fact("DVPE", 59800.0, "Pa")), "never a judge"),),
        "assumptions": ("no volume change of mixing",),
        "reservations": ("1 of 40 states did not converge",),
        "curve": {
            "T": [283.15, 293.15, 303.15],
            "P": {"receipt": [30000.0, 43000.0, 60500.0], "heel": [26000.0, None, 54000.0]},
        },
        "sources": ("peng-robinson-1976",),
    }  # fmt: skip
    return Screening(**{**values, **changes})


def memo_arguments(**changes) -> dict:
    """Arguments of build_memo that a clock or a person would give."""
    values = {
        "date": "2026-07-20",
        "author": "A. Writer",
        "version": "0.1.0",
        "number": "TH-12-07",
        "revision": "A",
    }
    return {**values, **changes}
