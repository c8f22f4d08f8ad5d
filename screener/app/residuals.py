"""How a fitted liquid meets its laboratory sheet, as rows of an input step. Plain data, no Textual."""

from __future__ import annotations

from screener.app.fields import LAB
from screener.app.glyphs import Glyphs
from screener.app.rows import Column
from screener.app.sheet import Cell, Record, Section
from screener.app.words import say, table

REFUSED = 3.0  # reproducibilities from which a sheet is refused; the ends of the bar
HALF = 6  # cells of the bar on either side


def misfit_bar(misfit: float, marks: Glyphs) -> str:
    """A misfit in reproducibilities as a bar from a post in the middle: left too low, right too high."""
    cells = min(HALF, round(abs(misfit) * HALF / REFUSED))
    if abs(misfit) > REFUSED:
        bar = marks.fill * (HALF - 1) + (marks.more_right if misfit > 0.0 else marks.more_left)
    else:
        bar = marks.fill * cells
    left, right = (bar[::-1], "") if misfit < 0.0 else ("", bar)
    return left.rjust(HALF, marks.skipped) + marks.post + right.ljust(HALF, marks.skipped)


def _signed(value: float, places: int) -> str:
    """A difference with its sign; one that rounds to nothing has none."""
    text = f"{value:+.{places}f}"
    return text[1:] if float(text) == 0.0 else text


def residual_section(blend, base: str, note: str, marks: Glyphs, system: str = "si") -> Section | None:
    """Every number of the sheet at `base` beside the computed one; None for a liquid without a sheet.

    The measured values are those of the case, so they can be edited where they are compared.
    """
    from screener.casefile.residuals import residuals
    from screener.memo import numbers

    records = []
    for i, row in enumerate(residuals(blend)):
        places = numbers.decimals((row.measured, row.computed), row.unit, system)
        sheet = numbers.quantity(row.measured, row.unit, system, places=places).text
        computed = numbers.quantity(row.computed, row.unit, system, places=places, bare=True).text
        apart_unit = numbers.difference_unit(row.unit)
        gap = numbers.converted(row.computed - row.measured, apart_unit, system)
        tone = "near" if abs(row.misfit) > 1.0 else ""
        what = table("labels").get(f"{LAB}.{row.what}", row.what.replace("_", " "))
        cells = (
            Cell(what), Cell(sheet, f"{base}.{row.place}"), Cell(computed, tone="dim"),
            Cell(_signed(gap, places), tone=tone), Cell(_signed(row.misfit, 1), tone=tone),
            Cell(misfit_bar(row.misfit, marks), tone=tone),
        )  # fmt: skip
        records.append(Record(f"fit:{i}", cells, name=what))
    if not records:
        return None
    right = {"align": "right", "least": 6}
    columns = (
        Column(say("residuals", "heading"), least=14),
        Column(say("residuals", "sheet"), **right),
        Column(say("residuals", "computed"), **right),
        Column(say("residuals", "apart"), **right, spare=2),
        Column(say("residuals", "in_r"), "right", least=4),
        Column(say("residuals", "bar"), least=2 * HALF + 1, spare=1),
    )
    return Section(columns, tuple(records), note)


def residual_note(blend, stale: bool) -> str:
    """What stands under the heading: what the columns mean, and by what vapour pressures are multiplied."""
    from screener.blends.measured import pressure_factor, told

    words = [say("residuals", "stale" if stale else "note")]
    one = told(blend.measured)
    if one is not None:
        words.append(say("residuals", "factor", factor=f"{pressure_factor(blend.measured)[0]:.3f}", what=one.what))
    elif not blend.vapour_pressure_known:
        words.append(say("residuals", "unmeasured"))
    return " ".join(words)
