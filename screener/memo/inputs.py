"""Sections 3 and 4: inputs as entered and as used, and what was assumed."""

from __future__ import annotations

from screener.memo import numbers
from screener.memo.document import Bullets, Paragraph, Section, Table
from screener.memo.frame import Frame
from screener.memo.wording import words


def inputs_section(frame: Frame) -> Section:
    """3: every input and every default, with its quality."""
    blocks = [Paragraph(words("inputs", "lead"))]
    if frame.case.inputs:
        blocks.append(inputs_table(frame))
    else:
        blocks.append(Paragraph(words("inputs", "none")))
    notes = (words("inputs", "pressures"), words("inputs", "normal_air"))
    return Section("3", words("sections", "3"), (*blocks, Bullets(notes)))


def inputs_table(frame: Frame) -> Table:
    """One row an input."""
    rows = tuple(
        (
            echo.path,
            echo.entered or words("inputs", "default_entered"),
            numbers.anything(echo.value, echo.unit, frame.system),
            echo.quality,
            echo.note,
        )
        for echo in frame.case.inputs
    )
    return Table(tuple(words("inputs", "columns")), rows, ("left", "left", "right", "left", "left"))


def assumptions_section(frame: Frame) -> Section:
    """4: what was taken for granted, and which findings rest on it."""
    resting = assumed_by(frame)
    if not resting:
        block = Paragraph(words("assumptions", "none"))
        return Section("4", words("sections", "4"), (block,))
    rows = tuple((text, ", ".join(ids) or words("assumptions", "all")) for text, ids in resting.items())
    table = Table(tuple(words("assumptions", "columns")), rows)
    return Section("4", words("sections", "4"), (Paragraph(words("assumptions", "lead")), table))


def assumed_by(frame: Frame) -> dict[str, list[str]]:
    """Each assumption with the findings that name it; those of the whole screening first."""
    resting: dict[str, list[str]] = {text: [] for text in frame.screening.assumptions}
    for finding in frame.findings:
        for text in finding.inputs_assumed:
            ids = resting.setdefault(text, [])
            if finding.id not in ids:
                ids.append(finding.id)
    return resting
