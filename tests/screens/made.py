"""A hand-made screening and an engine of plain functions: the screens are tested without any physics.

All numbers are invented and chosen so that each verdict occurs.
"""

from __future__ import annotations

import re
import threading
from dataclasses import replace
from types import SimpleNamespace

from screener.app.engine import Doing, Engine, Name, Worked, faults_of, paths_in
from screener.app.fields import Echo
from screener.blends.measured import MeasuredFigure, MeasuredPressure
from screener.casefile import CaseText
from screener.ground.errors import CaseErrors, InputError, UnitError
from screener.memo.document import Bullets, Document, Paragraph, Section, Table, VerdictRow, Verdicts
from screener.screening.finding import Condition, Fact, Finding, Headroom, Information, Screening

CASE = """[case]
title = "Tarn Hollow, tank 12: summer blend"
reference = "TH-12-07"
prepared_by = "duty engineer"

[blend]
basis = "volume"
parts = [
  { stock = "summer gasoline base", share = "90 %", quality = "certificate" },
  { species = "ethanol", share = "10 %" },
]

[tank]
kind = "fixed-roof"
shell_diameter = "24 m"
shell_height = "14.6 m"
liquid_level = { low = "2.0 m", normal = "9 m", high = "13.1 m" }
surface = "white paint, some years old"
design_pressure = "2.0 kPa gauge"
vents = [
  { count = 2, set = "0.4 kPa gauge", rated_out = "950 Nm3/h air" },
]

[site]
elevation = "35 m"
lowest_barometer = "97.8 kPa"
ambient = { low = "-8 degC", high = "37 degC", meaning = "design" }

[line]
receipt = { rate = "600 m3/h", temperature = "26 degC" }
draw = { rate = "450 m3/h" }

[screening]
criteria = ["us-40cfr60-kb"]
"""

# The same with a laboratory sheet of the receipt, and one of the heel that stands alone.
SHEET_CASE = CASE.replace("\n[tank]\n", """
[blend.lab]
title = "certificate TH 26-031"
density = "742 kg/m3"
dvpe = "62 kPa"
distillation = { "10 %" = "55 degC", "50 %" = "98 degC", "FBP" = "200 degC" }
e70 = "32 %"
benzene = "0.8 vol%"
h2s = "12 ppm mass"
vpcr = [{ ratio = "4", temperature = "37.8 degC", pressure = "64 kPa" }]

[tank]
""", 1).replace("\n[site]\n", """
[tank.contents]
volume = "650 m3"

[tank.contents.lab]
density = "738 kg/m3"
dvpe = "20 kPa"

[site]
""", 1)
REFUSAL = (
    "numbers of the sheet contradict each other: DVPE: sheet 20 kPa, nearest composition 34.3 kPa (9.8 "
    "reproducibilities off); T10: sheet 42.5 degC, nearest composition 63.5 degC (5.2 reproducibilities off)"
)
# Misfits from nothing to more than the three that are refused, in both directions.
FITTED = SimpleNamespace(
    figures=(
        MeasuredFigure("density_15", "density at 15 degC", 742.0, 742.02, 0.5),
        MeasuredFigure("dvpe", "DVPE", 62e3, 61.1e3, 1.9e3),
        MeasuredFigure("vpcr_4", "VPCR4 at 37.8 degC", 64e3, 65.2e3, 2.5e3),
        MeasuredFigure("distillation", "T10", 328.15, 325.05, 2.1, 0.1),
        MeasuredFigure("distillation", "T50", 371.15, 378.65, 2.6, 0.5),
        MeasuredFigure("fbp", "FBP", 473.15, 450.15, 7.0),
        MeasuredFigure("e70", "E70", 0.32, 0.335, 0.027),
        MeasuredFigure("benzene", "benzene", 0.008, 0.00801, 0.001),
        MeasuredFigure("h2s", "h2s", 12e-6, 12e-6, 3e-6),
    ),
    measured=(MeasuredPressure("DVPE", 62e3, 310.93, 61.1e3, 1.014, 1.9e3, 0.03),),
    vapour_pressure_known=True,
)


def _finding(**changes) -> Finding:
    values = {
        "id": "boiling.surface", "title": "Boiling at the liquid surface",
        "quantity": "bubble pressure of the liquid at its hottest surface",
        "value": 72000.0, "low": 66000.0, "high": 79000.0, "range_covers": ("weather", "method"),
        "limit_low": None, "limit_high": 97800.0, "kind": "stay below", "evidence": "law", "margin": 25800.0,
        "asked_gap": 9780.0, "room_used": 0.736, "room_used_low": 0.675, "room_used_high": 0.808,
        "scale": "percent", "unit": "Pa", "verdict": "room",
        "reason": "the whole range stays on the good side with the gap asked for",
        "basis": "equation-of-state bubble pressure at the daily maximum surface temperature",
        "source": "8 CCR 5585(c)", "caution": "Sun on a dark tank can pass the estimate.",
        "condition": Condition("receipt", "low", "hottest day, July", "liquid surface"),
        "facts": (Fact("temperature of that liquid", 311.0, "K"),),
        "moved_by": ("n-butane +1 mol%: +3.1 kPa", "liquid temperature +1 K: +2.2 kPa"),
        "headroom": (Headroom("surface temperature", 315.0, "K", "liquid surface below 41.9 degC"),),
        "not_counted": ("dissolved air and gas", "weathering"),
    }  # fmt: skip
    return Finding(**(values | changes))


_BLANK = dict.fromkeys(
    ("value", "low", "high", "limit_low", "limit_high", "margin", "asked_gap", "room_used", "room_used_low",
     "room_used_high")
) | {"facts": (), "moved_by": (), "headroom": (), "condition": Condition()}  # fmt: skip

ROOM = _finding()
BEYOND = _finding(
    id="npsh.pump", title="Net positive suction head", quantity="NPSH available at the pump inlet", unit="m",
    kind="stay above", value=2.4, low=1.9, high=3.6, limit_high=None, limit_low=3.2, margin=-0.8, asked_gap=1.0,
    room_used=1.07, room_used_low=0.96, room_used_high=1.12, evidence="user", verdict="beyond",
    reason="the best value is on the wrong side of the limit", source="NPSH required from the case",
    headroom=(Headroom("level", 3.1, "m", "liquid kept above 3.10 m"),), moved_by=("level +1 m: +1.00 m",),
)  # fmt: skip
NEAR = _finding(
    id="vents.outbreathing", title="Vents, breathing out", quantity="out-breathing required, as air", unit="m3/s air",
    value=0.42, low=0.38, high=0.55, limit_high=0.5, margin=0.08, asked_gap=0.05, room_used=0.84, room_used_low=0.76,
    room_used_high=1.1, evidence="user", verdict="near", source="capacity from the case",
    reason="the best value is on the good side, but its range crosses the limit", headroom=(), moved_by=(),
)  # fmt: skip
UNKNOWN = _finding(
    id="receipt.flash", title="Receipt gives off vapour on arrival", verdict="unknown", evidence="", source="",
    reason="dissolved gas in the receipt is not stated (line.receipt.dissolved_gas), so vapour given off cannot be told",
    **_BLANK,
)  # fmt: skip
SKIPPED = _finding(
    id="vents.vacuum-setting", title="Vent setting against design vacuum", unit="Pa under barometer", verdict="skipped",
    reason="an external floating roof leaves no closed vapour space", evidence="", source="", caution="", **_BLANK,
)  # fmt: skip

_TEMPERATURES = tuple(263.15 + 5 * i for i in range(15))


def screening(diameter: float = 24.0, findings=None, fitted: bool = False) -> Screening:
    """One finding of each verdict; the first one's numbers follow the shell diameter. fitted: with a sheet."""
    boiling = replace(ROOM, value=3000.0 * diameter, margin=97800.0 - 3000.0 * diameter, room_used=diameter * 3.0 / 97.8)
    receipt = tuple(9000.0 * 1.035**i * 1.12**i for i in range(15))
    facts = (
        Fact("DVPE", 59800.0, "Pa"), Fact("evaporated at 70 degC", 0.31, "vol/vol"), Fact("T50", 363.15, "K"),
        Fact("limiting oxygen in nitrogen", 0.096, "mol/mol", "estimate"),
    )  # fmt: skip
    return Screening(
        case=SimpleNamespace(
            title="Tarn Hollow, tank 12", blend=FITTED if fitted else None, site=SimpleNamespace(ambient=SimpleNamespace(low=265.15, high=310.15, meaning="design"))
        ),
        findings=tuple(findings or (boiling, BEYOND, NEAR, UNKNOWN, SKIPPED)),
        information=(Information("receipt: 90 % summer gasoline base + 10 % ethanol", facts, "never a judge"),),
        assumptions=("shares taken by volume",),
        reservations=("lanes are not tested for a second liquid",),
        curve={"T": _TEMPERATURES, "P": {"receipt": receipt, "heel": tuple(0.5 * value for value in receipt)}},
        sources=(),
    )


class Playing:
    """An engine for tests: counts its runs, can be held up and can be made to fail."""

    def __init__(self):
        self.runs = 0
        self.gate = threading.Event()
        self.gate.set()
        self.more = threading.Event()  # holds up what follows the verdicts
        self.more.set()
        self.fit = threading.Event()  # holds up the fit of a laboratory sheet
        self.fit.set()
        self.bug: Exception | None = None
        self.findings = None

    def engine(self) -> Engine:
        """The functions the screens call."""
        return Engine(lambda: None, self.work, self.check, self.names, lambda: ("us-40cfr60-kb",), self.memo, self.markdown)

    def work(self, text: str, source: str):
        """The verdicts alone, then all of it; faults at once."""
        self.runs += 1
        self.gate.wait(5)
        if self.bug:
            raise self.bug
        entered = CaseText.parse(text)
        faults, echoes = [], {"tank.insulated": Echo("no", "default", "taken as not insulated", default=True)}
        for path in paths_in(entered.table):
            try:
                echoes[path] = self.check(path, entered.get(path) or "")
            except InputError as error:
                faults.append(error)
        if not entered.rows("blend.parts"):
            faults.append(InputError("blend.parts", None, "this is missing: what the receipt is made of"))
        if entered.has("blend.lab"):
            yield Doing("fitting")
            self.fit.wait(5)
        for base in ("blend.lab", "tank.contents.lab"):
            if entered.get(f"{base}.dvpe") == "20 kPa":
                faults.append(InputError(base, "the sheet", REFUSAL, "each within 3 reproducibilities"))
        if faults:
            yield Worked(None, faults_of(CaseErrors(faults)), echoes)
            return
        diameter = float((entered.get("tank.shell_diameter") or "24 m").split()[0])
        whole = screening(diameter, self.findings, fitted=entered.has("blend.lab"))
        bare = tuple(replace(finding, moved_by=(), headroom=()) for finding in whole.findings)
        yield Worked(replace(whole, findings=bare, information=(), curve={}), (), echoes, full=False)
        self.more.wait(5)
        yield Worked(whole, (), echoes)

    @staticmethod
    def check(path: str, text: str) -> Echo:
        """Lengths need a metre; everything else is taken as it stands."""
        if path == "tank.shell_diameter":
            found = re.fullmatch(r"(-?[0-9.]+) ?(m|ft)", text)
            if not found:
                raise UnitError(path, text, f"'{text}' has no unit", "a length such as '24 m'")
            return Echo(f"{float(found[1]) * (0.3048 if found[2] == 'ft' else 1):.4g} m")
        return Echo(text)

    @staticmethod
    def names() -> tuple[Name, ...]:
        return (
            Name("stock", "summer gasoline base", (), "Summer gasoline base"),
            Name("stock", "field butane", (), "Field-grade butane"),
            Name("species", "ethanol", ("ethyl alcohol", "64-17-5"), "C2H6O"),
            Name("species", "n-butane", ("butane", "106-97-8"), "C4H10"),
            Name("species", "1-butanol", ("n-butanol", "71-36-3"), "C4H10O"),
        )

    @staticmethod
    def memo(screening, asked) -> Document:
        rows = tuple(VerdictRow(f.mark, f.verdict, f.id, f.title, f.reason) for f in screening.findings)
        table = Table(("limit", "value"), (("L1", "97.8 kPa"), ("L2", "3.20 m")), ("left", "right"), "Limits")
        sections = (
            Section("2", "Outcome", (Paragraph("Worst verdict: beyond."), Verdicts(rows))),
            Section("7", "Limits register", (table, Bullets(("read in law", "entered with the case")))),
        )
        control = (("memo no.", asked.number), ("revision", asked.revision), ("status", asked.status))
        return Document("memo", "Screening memo: tank 12", f"{asked.number} · {asked.status}", control, sections)

    @staticmethod
    def markdown(document) -> str:
        return f"# {document.title}\n\n{document.running_head}\n"
