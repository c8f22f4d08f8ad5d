"""From a screening to what the Findings step shows: gaps, plot, why card. Plain data, no Textual.

Numbers are printed by the memo's own functions, so that screen and memo never
differ in a digit.
"""

from __future__ import annotations

import math
from dataclasses import dataclass

from screener.app.curve import Line, Plot
from screener.app.glyphs import Glyphs
from screener.app.pictures import Gap
from screener.app.rows import Row, Span, columns_of, labelled, one_line, paragraph
from screener.app.words import say

_PATTERN_OF = ("solid", "dashed", "dotted")


@dataclass(frozen=True)
class Judged:
    """One finding with the texts shown for it."""

    finding: object
    gap: Gap
    register: str  # number of its limit in the memo's register, '' without a limit


def frame_of(screening, system: str = "si"):
    """The memo's view of a screening: order of findings and register of limits."""
    from screener.memo.frame import Frame

    return Frame(screening, "", "", "", "", "", "draft", "", "", system)


def judged(screening, system: str = "si") -> tuple[Judged, ...]:
    """Findings in the memo's order, worst first, ready to be drawn."""
    from screener.memo.finding_text import finding_numbers

    frame = frame_of(screening, system)
    rows = []
    for finding in frame.findings:
        shown = finding_numbers(finding, system)
        number = frame.limit_number(finding)
        words = {"unknown": say("findings", "margin_unknown"), "skipped": say("findings", "margin_skipped")}
        limit = ", ".join(text for text in (shown.limit.text if number else "", number) if text)
        gap = Gap(
            verdict=finding.verdict,
            mark=finding.mark,
            title=finding.title,
            used=finding.room_used,
            low=finding.room_used_low,
            high=finding.room_used_high,
            margin=words.get(finding.verdict, shown.margin.text),
            limit=limit,
        )
        rows.append(Judged(finding, gap, number))
    return tuple(rows)


def hint(item: Judged, width: int, system: str = "si") -> str:
    """One line for the hint row; a reason that does not fit whole is left to the card."""
    from screener.memo.finding_text import finding_numbers

    finding = item.finding
    if finding.verdict in ("unknown", "skipped"):
        full = f"{finding.title}: {finding.reason}"
        return full if columns_of(full) <= width else one_line([finding.title, say("findings", "why")], width)
    shown = finding_numbers(finding, system)
    return f"{finding.title}: {shown.value.text}, limit {shown.limit.text} ({item.register})"


def card_lines(item: Judged, system: str = "si") -> list[tuple[str, str, str]]:
    """The why card as (label, text, tone); only lines that say something."""
    from screener.memo.finding_text import finding_numbers

    f = item.finding
    shown = finding_numbers(f, system)
    label = {name: say("card", name) for name in ("value", "range", "limit", "source", "margin", "moved", "room")}
    lines: list[tuple[str, str, str]] = []
    if f.value is not None:
        where = f.condition.sentence()
        lines.append((label["value"], f"{f.quantity} {shown.value.text}" + (f"; {where}" if where else ""), ""))
    else:
        lines.append((label["value"], f"{f.quantity}: {say('card', 'no_value')}", ""))
    if f.low is not None and f.high is not None:
        covers = f", {say('card', 'covers')} {', '.join(f.range_covers)}" if f.range_covers else ""
        lines.append((label["range"], shown.low_to_high.text + covers, ""))
    if item.register:
        lines.append((label["limit"], f"{shown.limit.text}, {item.register}, {evidence(f.evidence)}", ""))
    if f.source:
        lines.append((label["source"], f.source, ""))
    if f.margin is not None and f.verdict not in ("unknown", "skipped"):
        lines.append((label["margin"], _margin(f, shown, system), ""))
    lines.append((f.verdict, f.reason, {"skipped": "dim", "room": ""}.get(f.verdict, f.verdict)))
    lines += [(label["moved"] if i == 0 else "", text, "") for i, text in enumerate(f.moved_by)]
    lines += [(label["room"] if i == 0 else "", step.sentence, "") for i, step in enumerate(f.headroom)]
    lines += _beside(f, system)
    return lines


def _margin(f, shown, system: str) -> str:
    """The margin, what the worse end of the range leaves and the gap asked for, with one count of decimals."""
    from screener.memo import numbers

    apart = numbers.difference_unit(f.unit)
    limit, sign = (f.limit_high, 1.0) if f.kind == "stay below" else (f.limit_low, -1.0)
    end = f.high if sign > 0 else f.low
    known = limit is not None and end is not None and f.kind != "keep out of"
    left = sign * (limit - end) if known else None
    places = numbers.decimals((f.value, f.margin, f.limit_high, f.limit_low), apart, system)
    parts = [shown.margin.text]
    for name, value, signed in (("worse_end", left, True), ("asked", f.asked_gap, False)):
        if value is not None:
            text = numbers.quantity(value, apart, system, places=places, sign=signed).text
            if value and float(text.split()[0]) == 0.0:  # rounding must not make a gap vanish
                text = numbers.quantity(value, apart, system, sign=signed).text
            parts.append(f"{say('card', name)} {text}")
    return "; ".join(parts)


def _beside(f, system: str) -> list[tuple[str, str, str]]:
    """What stands beside the judgement: facts, inputs assumed, method, what is left out, caution."""
    from screener.memo import numbers

    lines = []
    for i, fact in enumerate(f.facts):
        value = numbers.anything(fact.value, fact.unit, system)
        note = f" ({fact.note})" if fact.note else ""
        lines.append((say("card", "beside") if i == 0 else "", f"{fact.label} {value}{note}", ""))
    for name, text in (
        ("rests", "; ".join(f.inputs_assumed)),
        ("method", f.basis),
        ("not_counted", "; ".join(f.not_counted)),
        ("caution", f.caution),
    ):
        if text:
            lines.append((say("card", name), text, ""))
    return lines


def evidence(mark: str) -> str:
    """The evidence mark of a limit in words."""
    return say("evidence", mark) if mark else say("evidence", "none")


def card(item: Judged, width: int, marks: Glyphs, system: str = "si") -> list[Row]:
    """The why card as rows: title, then labels in one column and wrapped texts beside them."""
    lines = card_lines(item, system)
    column = max(len(label) for label, _, _ in lines) + 2
    rows: list[Row] = [(Span(text, "head"),) for row in paragraph(item.finding.title, width) for text in [row[0].text]]
    for label, text, tone in lines:
        rows += labelled(label, marks.plain(text), width, column, tone)
    return rows


def reservation_rows(screening, width: int, marks: Glyphs) -> list[Row]:
    """Reservations of the whole screening."""
    rows: list[Row] = []
    if screening.reservations:
        rows += paragraph(say("findings", "reservations"), width, "head")
        for text in screening.reservations:
            rows += paragraph(marks.plain(text), width, "", indent=2)
    return rows


def information(screening, liquid: str, system: str = "si") -> list[tuple[str, str, str]]:
    """Numbers about one liquid that nobody judges, as (label, value, note)."""
    from screener.memo import numbers

    found = []
    for item in screening.information if screening else ():
        if item.title.startswith(liquid):
            for fact in item.facts:  # the note of them all stands under the heading
                note = "" if fact.note == item.note else fact.note
                found.append((fact.label, str(numbers.anything(fact.value, fact.unit, system)), note))
    return found


def plot(screening, system: str = "si") -> Plot | None:
    """The curve picture in printed units; None when the screening holds no curve."""
    from screener.memo import numbers
    from screener.memo.results import curve_figure

    figure = curve_figure(frame_of(screening, system))
    if figure is None:
        return None
    lines = []
    for i, series in enumerate(figure.series):
        x = [numbers.converted(value, "K", system) for value in series.x]
        y = [numbers.converted(value, "Pa", system) for value in series.y]
        lines.append(Line(series.name, x, y, _PATTERN_OF[i % 3]))
    xs = [value for line in lines for value in line.x if value is not None]
    limits = tuple(
        (numbers.converted(mark.low, "Pa", system), mark.name) for mark in figure.marks if mark.axis == "y"
    )
    bands = [mark for mark in figure.marks if mark.axis == "x" and mark.high is not None]
    band = None
    if bands:
        low, high = (numbers.converted(value, "K", system) for value in (bands[0].low, bands[0].high))
        band = (low, high, bands[0].name)
    if len(xs) < 2 or max(xs) <= min(xs):
        return None
    title = say("curve", "title", pressure=numbers.unit_text("Pa", system), temperature=numbers.unit_text("K", system))
    return Plot(title, tuple(lines), (min(xs), max(xs)), (0.0, _top(lines, limits, band)), band, limits)


def _top(lines, limits, band) -> float:
    """Upper end of the pressure axis: above every limit, and the curves inside the site's range."""
    highest = [value for value, _ in limits]
    for line in lines:
        inside = [
            y for x, y in zip(line.x, line.y) if y is not None and x is not None and (band is None or x <= band[1])
        ]
        highest += inside
    top = max(highest, default=1.0) * 1.2
    step = 10.0 ** math.floor(math.log10(top)) / 2.0
    return math.ceil(top / step) * step
