"""The page of `screener quick`: groups of answers in one table, the fit of a sheet, the first vapour."""

from __future__ import annotations

from screener.casefile.residuals import residuals
from screener.cli.layout import bullets, paragraph, table
from screener.cli.wording import columns, say
from screener.memo import numbers

_SHEET_NOTE = "laboratory sheet, "  # how the notes of a fit begin, which the table of residuals says better


def page(liquid, groups, vapour, width: int) -> list[str]:
    """The lines printed."""
    blend = liquid.blend
    kind = "title_sheet" if blend.figures else "title"
    lines = [*paragraph(say("quick", kind, blend=blend.title, temperature=liquid.at(liquid.T)), width), ""]
    lines += _answers(groups, liquid.system, width)
    if blend.figures:
        lines += ["", *_sheet(blend, liquid.system, width)]
    if vapour:
        head = say("quick", "vapour", temperature=liquid.at(liquid.T), count=len(vapour))
        shares = [(name, f"{100 * y:.2f} %", f"{100 * x:.2f} %") for name, y, x in vapour]
        lines += ["", *paragraph(head, width)]
        lines += table(columns("quick", "vapour_columns"), shares, width, ("left", "right", "right"))
    notes = (say("quick", "still_note"), *(one for one in blend.report.assumed if not one.startswith(_SHEET_NOTE)), *blend.report.sources)
    lines += ["", say("quick", "notes"), *bullets(notes, width)]
    return [*lines, "", *paragraph(say("quick", "foot"), width)]


def _answers(groups, system: str, width: int) -> list[str]:
    """All groups in columns of the same width, a heading above each."""
    rows: list[tuple[str, str, str]] = []
    for group in groups:
        rows += [("", "", "")] * bool(rows) + [(group.title, "", "")]
        before = ""
        for item in group.answers:
            value, by = _printed(item, system)
            rows.append((item.label, value, say("quick", "as_above") if by and by == before else by))
            before = by
    return table(columns("quick", "columns"), rows, width, ("left", "right", "left"))


def _printed(item, system: str) -> tuple[str, str]:
    """Value and what it is by; for an unknown one the reason."""
    if item.text:
        return item.text, item.by
    if item.value is None:
        return say("quick", "unknown"), item.why
    return numbers.quantity(item.value, item.unit, system).text, item.by


def _sheet(blend, system: str, width: int) -> list[str]:
    """Every number of the sheet beside the computed one."""
    rows = []
    for row in residuals(blend):
        apart = numbers.difference_unit(row.unit)
        places = numbers.decimals((row.measured, row.computed), row.unit, system)
        pair = (row.measured, row.computed)
        texts = [numbers.quantity(value, row.unit, system, places=places).text for value in pair]
        gap = numbers.quantity(row.computed - row.measured, apart, system, places=places, sign=True).text
        rows.append((row.what, *texts, gap, f"{row.misfit:+.2f}"))
    lines = paragraph(say("quick", "sheet"), width)
    return lines + table(columns("quick", "sheet_columns"), rows, width, ("left", *("right",) * 4))
