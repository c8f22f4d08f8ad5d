"""The field sheet: one page with verdicts, five numbers and cautions."""

from __future__ import annotations

from screener.memo import front
from screener.memo.back import cautions
from screener.memo.document import Block, Bullets, Document, Paragraph, Section, Table
from screener.memo.finding_text import finding_numbers
from screener.memo.frame import Frame
from screener.memo.wording import words

_NUMBERS = 5
_CONTROL = ("number", "title", "site", "revision", "date", "status")


def build_field_sheet(
    screening,
    *,
    date: str,
    author: str,
    version: str,
    number: str,
    revision: str,
    status: str = "draft",
    system: str = "si",
) -> Document:
    """One page for the office wall, from the same screening and with the same number as the memo."""
    frame = Frame(screening, date, author, version, number, revision, status, "", "", system)
    shown = {words("control", key) for key in _CONTROL}
    return Document(
        kind="field sheet",
        title=front.title(frame, "field_sheet"),
        running_head=front.running_head(frame),
        control=tuple(pair for pair in front.control(frame) if pair[0] in shown),
        sections=(_control(frame, shown), _verdicts(frame), _numbers(frame), _cautions(frame)),
    )


def _control(frame: Frame, shown: set[str]) -> Section:
    rows = tuple(pair for pair in front.control(frame) if pair[0] in shown)
    return Section("", words("sections", "0"), (Table(("", ""), rows),))


def _verdicts(frame: Frame) -> Section:
    return Section("", words("field_sheet", "outcome"), (front.verdicts(frame),))


def _numbers(frame: Frame) -> Section:
    """The values of the worst findings that have one."""
    found = [f for f in frame.findings if f.value is not None][:_NUMBERS]
    rows = []
    for finding in found:
        shown = finding_numbers(finding, frame.system)
        rows.append((f"{finding.title}: {finding.quantity}", shown.value, shown.limit))
    columns = tuple(words("field_sheet", "numbers_columns"))
    block: Block = Table(columns, tuple(rows), ("left", "right", "right"))
    return Section(
        "", words("field_sheet", "numbers"), (block if rows else Paragraph(words("field_sheet", "none")),)
    )


def _cautions(frame: Frame) -> Section:
    found = cautions(frame)
    block: Block = Bullets(found) if found else Paragraph(words("field_sheet", "no_cautions"))
    foot = Paragraph(words("field_sheet", "foot"), "caution")
    return Section("", words("field_sheet", "cautions"), (block, foot))
