"""Sections 9 to 13: reservations, not covered, change file, assurance note, review."""

from __future__ import annotations

from screener.memo import numbers
from screener.memo.document import Block, Bullets, Paragraph, Section, Table
from screener.memo.finding_text import step_text
from screener.memo.frame import Frame
from screener.memo.front import month_words
from screener.memo.wording import fill, words


def reservations_section(frame: Frame) -> Section:
    """9: failed states, defaults, estimates, limits not read, unknowns, and the cautions of the findings."""
    own = tuple(frame.screening.reservations)
    lines = (*own, *_about_inputs(frame), *_about_findings(frame))
    blocks: list[Block] = [] if own else [Paragraph(words("reservations", "none"))]
    if lines:
        blocks.append(Bullets(lines))
    found = cautions(frame)
    if found:
        blocks += [Paragraph(words("reservations", "cautions") + ":"), Bullets(found)]
    return Section("9", words("sections", "9"), tuple(blocks))


def cautions(frame: Frame) -> tuple[str, ...]:
    """Each caution of the findings that apply once, worst finding first."""
    return tuple(dict.fromkeys(f.caution for f in frame.findings if f.caution and f.verdict != "skipped"))


def _about_inputs(frame: Frame) -> list[str]:
    lines = []
    for echo in frame.case.inputs:
        value = str(numbers.anything(echo.value, echo.unit, frame.system))
        if echo.quality == "default":
            key = "defaults_noted" if echo.note else "defaults"
            lines.append(fill("reservations", key, path=echo.path, value=value, note=echo.note))
        elif echo.quality == "estimate":
            lines.append(fill("reservations", "estimates", path=echo.path, value=value))
    reading = frame.case.site.liquid_temperature
    if reading is not None:
        lines.append(fill("reservations", "reading", date=reading.read_on))
    return lines


def _about_findings(frame: Frame) -> list[str]:
    unknown = [
        fill("reservations", "unknown", title=f.title, reason=f.reason.rstrip("."))
        for f in frame.findings
        if f.verdict == "unknown"
    ]
    unread = [
        fill("reservations", "unread", title=f.title, evidence=line.evidence or words("control", "not_given"))
        for line in frame.register
        if not line.read
        for f in line.findings
    ]
    return unknown + unread


def not_covered_section(frame: Frame) -> Section:
    """10: a fixed list, then what the findings of this case say they leave out."""
    blocks: list[Block] = [Bullets(tuple(words("not_covered", "lines")))]
    applied = [f for f in frame.findings if f.verdict != "skipped"]
    rows = tuple(dict.fromkeys(text for f in applied for text in f.not_counted))
    if rows:
        blocks += [Paragraph(words("not_covered", "case") + ":"), Bullets(rows)]
    return Section("10", words("sections", "10"), tuple(blocks))


def change_section(frame: Frame) -> Section:
    """11: the five matters of 29 CFR 1910.119(l)(2), and what this memo gives to each."""
    weighed = [
        f"{f.title} ({f.verdict})" for f in frame.findings if f.verdict in ("beyond", "unknown", "near")
    ]
    steps = [step_text(h, frame.system) for f in frame.findings for h in f.headroom]
    named = "; ".join(weighed) or words("change", "impact_none")
    procedures = (
        fill("change", "procedures_text", headroom="; ".join(steps))
        if steps
        else words("change", "procedures_none")
    )
    rows = (
        (words("change", "basis"), words("change", "basis_text")),
        (words("change", "impact"), fill("change", "impact_text", findings=named)),
        (words("change", "procedures"), procedures),
        (words("change", "period"), fill("change", "period_text", month=month_words(frame.case))),
        (words("change", "authorization"), fill("change", "authorization_text", status=frame.status)),
    )
    table = Table(tuple(words("change", "columns")), rows)
    return Section("11", words("sections", "11"), (Paragraph(words("change", "lead")), table))


def assurance_section(frame: Frame) -> Section:
    """12: how an answer is accepted, what failed in this run, limits of the program."""
    count = len(frame.screening.reservations)
    run = fill("assurance", "failed", count=count) if count else words("assurance", "clean")
    lines = (*words("assurance", "lines"), run, words("assurance", "reference"))
    return Section("12", words("sections", "12"), (Bullets(lines),))


def review_section(frame: Frame) -> Section:
    """13: three rows for three people, all left blank."""
    rows = tuple((words("review", key), "", "", "") for key in ("prepared", "checked", "approval"))
    table = Table(tuple(words("review", "columns")), rows)
    return Section("13", words("sections", "13"), (table, Paragraph(words("review", "note"), "note")))
