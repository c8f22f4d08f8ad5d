"""The vapour ladder of section 6: fuel share of the vapour space month by month against its flammable range."""

from __future__ import annotations

from screener.memo import numbers
from screener.memo.document import Axis, Figure, Series, Table
from screener.memo.frame import Frame
from screener.memo.wording import fill, words


def ladder_figure(frame: Frame) -> Figure | None:
    """Shares at the coldest and the hottest surface of each month with the limits, and the states as a table."""
    ladder = frame.screening.curve.get("ladder")
    if not ladder:
        return None
    months = ladder["months"]
    numbered = tuple(float(row["number"]) for row in months)
    lines = tuple(
        Series(words("ladder", name), numbered, tuple(row[name] for row in months))
        for name in ("share_cold", "share_hot", "LFL", "UFL")
    )
    return Figure(
        "vapour-ladder",
        fill("ladder", "title", liquid=ladder["liquid"]),
        words("ladder", "caption"),
        Axis(words("ladder", "month"), "-", ""),
        Axis(words("ladder", "share"), "mol/mol", numbers.unit_text("mol/mol", frame.system)),
        lines,
        (),
        _table(months, frame.system),
    )


def _table(months, system: str) -> Table:
    def bare(row, name, unit):
        return numbers.quantity(row[name], unit, system, bare=True)

    rows = tuple(
        (
            row["month"],
            numbers.span(row["T_cold"], row["T_hot"], "K", system, bare=True),
            bare(row, "share_cold", "mol/mol"),
            bare(row, "share_hot", "mol/mol"),
            numbers.span(row["LFL"], row["UFL"], "mol/mol", system, bare=True),
            row["equilibrium"],
            row["not_saturated"],
        )
        for row in months
    )
    units = {"T": numbers.unit_text("K", system), "y": numbers.unit_text("mol/mol", system)}
    columns = tuple(text.format(**units) for text in words("ladder", "columns"))
    return Table(columns, rows, ("left", *("right",) * 4, "left", "left"))
