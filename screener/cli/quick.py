"""`screener quick`: one-line answers for a blend at a temperature."""

from __future__ import annotations

import math
import re
from dataclasses import dataclass

import numpy as np

from screener.cli import streams
from screener.cli.layout import bullets, paragraph, table
from screener.cli.result import as_text, without_nan
from screener.cli.wording import columns, say
from screener.ground.constants import ATMOSPHERE, T_100F
from screener.ground.errors import CaseErrors, InputError
from screener.ground.status import Status, words
from screener.memo import numbers

SCHEMA = "screener.quick/1"
LARGEST = 8  # species shown of the first vapour
_SUM = 0.05  # percent by which shares may miss 100
_PART = re.compile(r"\s*(?P<share>[0-9]+(?:[.,][0-9]+)?)\s*%\s*(?P<name>\S.*?)\s*")


@dataclass(frozen=True)
class Answer:
    """One number with what it is; value is None with the reason in `why`."""

    key: str
    label: str
    value: float | None
    unit: str
    why: str = ""


def quick(arguments) -> int:
    """Print the answers; 0 when all exist, 2 when one does not."""
    from screener.blends import Blend
    from screener.casefile import quantity

    blend, T = gathered(
        lambda: Blend.of(read_parts(arguments.blend), basis="volume", at="15 degC"),
        lambda: quantity(arguments.at, "temperature", "--at"),
    )
    answers, vapour = answer(blend, T, arguments.units)
    code = 2 if any(item.value is None for item in answers) else 0
    if arguments.json:
        streams.result(as_text(_object(blend, T, answers, vapour, code)))
    else:
        width = arguments.width or streams.terminal_width()
        streams.result("\n".join(_page(blend, T, answers, vapour, arguments.units, width)))
    return code


def gathered(*readers) -> list:
    """What each reader gives; the faults of all of them together."""
    values, faults = [], []
    for read in readers:
        try:
            values.append(read())
        except InputError as fault:
            faults.append(fault)
    if faults:
        raise CaseErrors(faults)
    return values


def read_parts(text: str) -> dict[str, float]:
    """Shares [-] by part of a text such as '85% stock:NAME + 15% ethanol'; every fault at once."""
    pieces = [piece for piece in re.split(r"\s\+\s|\+(?=\s*[0-9.,]+\s*%)", text) if piece.strip()]
    if not pieces:
        raise InputError("blend", text, say("faults", "no_parts"), say("faults", "part_hint"))
    shares: dict[str, float] = {}
    faults: list[InputError] = []
    for i, piece in enumerate(pieces):
        try:
            name, share = _part(piece, f"blend part {i + 1}", alone=len(pieces) == 1)
            if name in shares:
                raise InputError(
                    f"blend part {i + 1}",
                    piece,
                    say("faults", "twice", name=name),
                    say("faults", "twice_hint"),
                )
            shares[name] = share
        except InputError as fault:
            faults.append(fault)
    total = math.fsum(shares.values())
    if not faults and abs(total - 100.0) > _SUM * (1.0 + 1e-9):
        faults.append(
            InputError("blend", text, say("faults", "sum", total=f"{total:g}"), say("faults", "sum_hint"))
        )
    if faults:
        raise CaseErrors(faults)
    return {name: share / 100.0 for name, share in shares.items()}


def _part(text: str, path: str, *, alone: bool) -> tuple[str, float]:
    """Name and percent of one part; a part that stands alone may leave its 100 % out."""
    found = _PART.fullmatch(text)
    if not found:
        if alone and "%" not in text:
            return text.strip(), 100.0
        raise InputError(path, text, say("faults", "part", text=text.strip()), say("faults", "part_hint"))
    share = float(found["share"].replace(",", "."))
    if not 0.0 < share <= 100.0:
        raise InputError(path, text, say("faults", "share", share=f"{share:g}"), say("faults", "share_hint"))
    return found["name"], share


def answer(blend, T: float, system: str = "si") -> tuple[list[Answer], list[tuple[str, float, float]]]:
    """Everything printed: the answers, and the first vapour as (species, y, x), largest first."""
    from screener.blends import volatility_sheet
    from screener.equilibrium import bubble_pressure, flash_tp

    at, test = (numbers.quantity(value, "K", system).text for value in (T, T_100F))
    bubble = bubble_pressure(blend.fluid, T, blend.z, check="full")
    flash = flash_tp(blend.fluid, T, ATMOSPHERE, blend.z, check="full")
    sheet = volatility_sheet(blend)
    # The standard tests take one liquid; where it splits, none of them has an answer.
    split = words(Status.LIQUID_SPLITS) if bubble.status[0] == Status.LIQUID_SPLITS else ""
    return [
        _answer("bubble_pressure", bubble.P[0], "Pa", _why(bubble), temperature=at),
        _answer("DVPE", sheet.DVPE, "Pa", split, temperature=test),
        _answer("density_15_degC", blend.density_15, "kg/m3"),
        _answer("T10", sheet.T10, "K", split),
        _answer("T50", sheet.T50, "K", split),
        _answer("E70", sheet.E70, "-", split),
        _answer("E100", sheet.E100, "-", split),
        _answer("T_ratio_20", sheet.T20, "K", split),
        _answer("vapour_fraction", flash.beta[0], "-", _why(flash), temperature=at),
    ], _vapour(blend, bubble)


def _why(result) -> str:
    return "" if result.ok[0] else words(result.status[0])


def _answer(key: str, value: float, unit: str, why: str = "", **fields: str) -> Answer:
    label = say("quick", key, **fields)
    if why or not math.isfinite(value):
        return Answer(key, label, None, unit, why or say("quick", "no_answer"))
    return Answer(key, label, float(value), unit)


def _vapour(blend, bubble) -> list[tuple[str, float, float]]:
    if not bubble.ok[0]:
        return []
    order = np.argsort(-bubble.y[0], kind="stable")[:LARGEST]
    return [(blend.names[i], float(bubble.y[0, i]), float(blend.z[i])) for i in order]


def _printed(item: Answer, system: str) -> str:
    if item.value is None:
        return say("quick", "unknown", why=item.why)
    if item.unit == "-":
        return f"{100.0 * item.value:.1f} %"
    return numbers.quantity(item.value, item.unit, system).text


def _page(blend, T, answers, vapour, system: str, width: int) -> list[str]:
    at = numbers.quantity(T, "K", system).text
    lines = [*paragraph(say("quick", "title", blend=blend.title, temperature=at), width), ""]
    rows = [(item.label, _printed(item, system)) for item in answers]
    lines += table(columns("quick", "columns"), rows, width, ("left", "right"))
    if vapour:
        head = say("quick", "vapour", temperature=at, count=len(vapour))
        shares = [(name, f"{100 * y:.2f} %", f"{100 * x:.2f} %") for name, y, x in vapour]
        lines += ["", *paragraph(head, width)]
        lines += table(columns("quick", "vapour_columns"), shares, width, ("left", "right", "right"))
    notes = (*blend.report.assumed, *blend.report.sources)
    if notes:
        lines += ["", say("quick", "notes"), *bullets(notes, width)]
    return [*lines, "", *paragraph(say("quick", "foot"), width)]


def _object(blend, T, answers, vapour, code: int) -> dict:
    from screener import __version__

    return without_nan(
        {
            "schema": SCHEMA,
            "software": {"name": "screener", "version": __version__},
            "exit_code": code,
            "blend": {"title": blend.title, "basis": "volume at 15 degC", "report": vars(blend.report)},
            "temperature": {"value": T, "unit": "K"},
            "answers": [
                {"id": a.key, "label": a.label, "value": a.value, "unit": a.unit, "reason": a.why}
                for a in answers
            ],
            "first_vapour": [{"species": name, "y": y, "x": x} for name, y, x in vapour],
        }
    )
