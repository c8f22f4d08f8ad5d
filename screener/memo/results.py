"""Sections 5 to 8: method, results with margins, limits register, what moves it."""

from __future__ import annotations

from screener.memo import numbers
from screener.memo.document import Axis, Block, Bullets, Figure, Mark, Paragraph, Section, Series, Table
from screener.memo.finding_text import finding_numbers, limit_span
from screener.memo.frame import Frame
from screener.memo.ladder import ladder_figure
from screener.memo.wording import fill, words

_FIGURE_ROWS = 13  # points printed where nothing is drawn


def results_section(frame: Frame) -> Section:
    """6: value, range, limit and margin of each finding; when and where it is worst; the figure as data."""
    blocks: list[Block] = [
        _results_table(frame),
        Paragraph(words("results", "margin"), "note"),
        _details(frame),
    ]
    blocks += [figure for figure in (curve_figure(frame), ladder_figure(frame)) if figure]
    blocks += [information_table(item, frame.system) for item in frame.screening.information if item.facts]
    return Section("6", words("sections", "6"), tuple(blocks))


def _results_table(frame: Frame) -> Table:
    rows = []
    for f in frame.findings:
        shown = finding_numbers(f, frame.system)
        rows.append(
            (
                f"{f.mark} {f.verdict}",
                f.title,
                shown.value,
                shown.low_to_high,
                shown.limit,
                shown.margin,
                shown.room_used,
                frame.limit_number(f),
            )
        )
    align = ("left", "left", "right", "right", "right", "right", "right", "left")
    return Table(tuple(words("results", "columns")), tuple(rows), align)


def _details(frame: Frame) -> Table:
    rows = tuple(
        (f.title, f.quantity, f.condition.sentence() or words("results", "no_condition"), f.reason)
        for f in frame.findings
    )
    return Table(tuple(words("results", "detail_columns")), rows)


def information_table(item, system: str) -> Table:
    """Context that nobody judges."""
    rows = tuple(
        (fact.label, numbers.anything(fact.value, fact.unit, system), fact.note) for fact in item.facts
    )
    columns = tuple(words("results", "information_columns"))
    title = f"{item.title} ({words('results', 'information').lower()})"
    return Table(columns, rows, ("left", "right", "left"), title, item.note)


def curve_figure(frame: Frame) -> Figure | None:
    """Bubble pressure against temperature, as data; None when the screening holds no curve."""
    curve = frame.screening.curve
    T = tuple(map(_known, curve.get("T", ())))
    lines = tuple(Series(name, T, tuple(map(_known, P))) for name, P in curve.get("P", {}).items())
    if not T or not lines:
        return None
    return Figure(
        "bubble-pressure",
        words("results", "figure_title"),
        words("results", "figure_caption"),
        Axis(words("results", "temperature"), "K", numbers.unit_text("K", frame.system)),
        Axis(words("results", "pressure"), "Pa", numbers.unit_text("Pa", frame.system)),
        lines,
        _marks(frame),
        _curve_table(lines, frame.system),
    )


def _known(value) -> float | None:
    return numbers.quantity(value, "").value


def _marks(frame: Frame) -> tuple[Mark, ...]:
    """Pressure limits with their register number, and the ambient range as a band."""
    limits = tuple(
        Mark(line.number, "y", value)
        for line in frame.register
        for value in (line.low, line.high)
        if line.unit == "Pa" and value is not None
    )
    ambient = frame.case.site.ambient
    band = (Mark(f"ambient, {ambient.meaning}", "x", ambient.low, ambient.high),) if ambient else ()
    return limits + band


def _curve_table(lines: tuple[Series, ...], system: str) -> Table:
    T = lines[0].x
    step = max(1, -(-len(T) // _FIGURE_ROWS))
    rows = tuple(
        (
            numbers.quantity(T[i], "K", system, bare=True),
            *(numbers.quantity(line.y[i], "Pa", system, bare=True) for line in lines),
        )
        for i in range(0, len(T), step)
    )
    pressure = numbers.unit_text("Pa", system)
    heads = (f"{words('results', 'temperature')}, {numbers.unit_text('K', system)}",)
    columns = heads + tuple(f"{line.name}, {pressure}" for line in lines)
    return Table(columns, rows, ("right",) * len(columns))


def register_section(frame: Frame) -> Section:
    """7: each limit once, with where it was read."""
    if not frame.register:
        return Section("7", words("sections", "7"), (Paragraph(words("register", "none")),))
    rows = tuple(
        (
            line.number,
            limit_span(line.low, line.high, line.kind, line.unit, frame.system),
            line.kind,
            line.source,
            line.evidence,
            ", ".join(f.id for f in line.findings),
        )
        for line in frame.register
    )
    blocks: list[Block] = [
        Table(tuple(words("register", "columns")), rows),
        Paragraph(words("register", "note"), "note"),
    ]
    if any(line.evidence == "user" for line in frame.register) and frame.case.prepared_by:
        blocks.append(Paragraph(fill("register", "entered", who=frame.case.prepared_by), "note"))
    return Section("7", words("sections", "7"), tuple(blocks))


def moves_section(frame: Frame) -> Section:
    """8: sensitivities and back-off values of each finding."""
    moved = tuple((f.title, text) for f in frame.findings for text in f.moved_by[:5])
    steps = tuple(
        (f.title, h.knob.replace("-", " "), numbers.anything(h.value, h.unit, frame.system), h.sentence)
        for f in frame.findings
        for h in f.headroom
    )
    blocks: list[Block] = []
    if moved:
        blocks += [Paragraph(words("moves", "moved")), Table(tuple(words("moves", "moved_columns")), moved)]
    else:
        blocks.append(Paragraph(words("moves", "no_moved")))
    if steps:
        table = Table(tuple(words("moves", "headroom_columns")), steps, ("left", "left", "right", "left"))
        blocks += [Paragraph(words("moves", "headroom")), table]
    else:
        blocks.append(Paragraph(words("moves", "no_headroom")))
    return Section("8", words("sections", "8"), tuple(blocks))


def method_section(frame: Frame) -> Section:
    """5: model, liquids, basis of each finding, what the range covers, what the composition rests on."""
    blocks: list[Block] = [Paragraph(text) for text in _model_lines(frame)]
    blocks.append(Paragraph(words("method", "liquids")))
    rows = tuple((f.title, f.basis, ", ".join(f.range_covers)) for f in frame.findings)
    blocks.append(Table(tuple(words("method", "basis_columns")), rows))
    for name, blend in liquids(frame):
        lines = report_lines(blend)
        if lines:
            blocks += [Paragraph(fill("method", "report", title=f"{name}, {blend.title}")), Bullets(lines)]
    return Section("5", words("sections", "5"), tuple(blocks))


def liquids(frame: Frame):
    """Receipt and heel with their names."""
    contents = frame.case.tank.contents
    found = [(words("method", "receipt"), frame.case.blend)]
    return found + ([(words("method", "heel"), contents.blend)] if contents else [])


def report_lines(blend) -> tuple[str, ...]:
    """What was assumed about a composition, what it rests on, and how it fits what was measured."""
    report = blend.report
    origins = tuple(fill("method", "origin", source=source) for source in report.sources)
    fits = tuple(
        fill(
            "method",
            "residual",
            name=name,
            value=f"{value:.5g}",
            computed=f"{computed:.5g}",
            allowed=f"{allowed:.3g}",
        )
        for name, value, computed, allowed in report.residuals
        if not any(line.startswith(f"laboratory sheet, {name}:") for line in report.assumed)
    )
    return report.assumed + origins + fits


def _model_lines(frame: Frame) -> list[str]:
    fluid = frame.case.blend.fluid
    known = words("method", "models")
    lines = [fill("method", "model", model=known.get(fluid.model, fluid.model))]
    gaps = "; ".join(str(gap) for gap in fluid.gaps)
    return lines + [fill("method", "gaps", gaps=gaps) if gaps else words("method", "no_gaps")]
