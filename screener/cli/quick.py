"""`screener quick`: every standard figure of a blend at a temperature, without a case."""

from __future__ import annotations

import math
import re

from screener.cli import streams
from screener.cli.quick_answers import Liquid, first_vapour, groups
from screener.cli.quick_page import page
from screener.cli.result import as_text, without_nan
from screener.cli.wording import say
from screener.ground.errors import CaseErrors, InputError

SCHEMA = "screener.quick/1"
_SUM = 0.05  # percent by which shares may miss 100
_PART = re.compile(r"\s*(?P<share>[0-9]+(?:[.,][0-9]+)?)\s*%\s*(?P<name>\S.*?)\s*")


def quick(arguments) -> int:
    """Print the answers; 0 when those of the first group all exist, else 2."""
    from screener.casefile import quantity

    blend, T = gathered(
        lambda: read_blend(arguments.blend, arguments.lab),
        lambda: quantity(arguments.at, "temperature", "--at"),
    )
    liquid = Liquid(blend, T, arguments.units)
    made = groups(liquid)
    vapour = [] if liquid.no_pressure else first_vapour(liquid)
    code = 2 if any(item.value is None for item in made[0].answers) else 0
    if arguments.json:
        streams.result(as_text(_object(liquid, made, vapour, code)))
    else:
        width = arguments.width or streams.terminal_width()
        streams.result("\n".join(page(liquid, made, vapour, width)))
    return code


def read_blend(text: str | None, lab: str | None):
    """The blend of a text, of a laboratory sheet in a file, or of the text corrected to the sheet."""
    from screener.blends import Blend
    from screener.casefile import read_sheet_file

    if not text and not lab:
        raise InputError("blend", None, say("faults", "no_parts"), say("faults", "part_hint"))
    start = Blend.of(read_parts(text), basis="volume", at="15 degC") if text else None
    return read_sheet_file(lab, start) if lab else start


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


def _object(liquid: Liquid, made, vapour, code: int) -> dict:
    from screener import __version__
    from screener.casefile.residuals import residuals

    blend = liquid.blend
    answers = [
        {"id": a.key, "group": group.key, "label": a.label, "value": a.value, "unit": a.unit, "text": a.text,
         "by": a.by, "reason": a.why}
        for group in made for a in group.answers
    ]  # fmt: skip
    return without_nan(
        {
            "schema": SCHEMA,
            "software": {"name": "screener", "version": __version__},
            "exit_code": code,
            "blend": {"title": blend.title, "basis": "volume at 15 degC", "report": vars(blend.report)},
            "temperature": {"value": liquid.T, "unit": "K"},
            "groups": [{"id": group.key, "title": group.title} for group in made],
            "answers": answers,
            "first_vapour": [{"species": name, "y": y, "x": x} for name, y, x in vapour],
            "sheet": [vars(row) for row in residuals(blend)],
        }
    )
