"""Section 14: each governing equation once, with its numbers and units put in."""

from __future__ import annotations

from screener.memo import numbers
from screener.memo.document import Block, Bullets, Equation, Paragraph, Section, Table
from screener.memo.finding_text import finding_numbers
from screener.memo.frame import Frame
from screener.memo.wording import fill, words


def worked_section(frame: Frame) -> Section:
    """14: equation and facts of every finding that has numbers; the reason of every one that has none."""
    blocks: list[Block] = [Paragraph(words("worked", "lead"))]
    without = []
    for finding in frame.findings:
        if finding.value is None and not finding.facts:
            without.append(fill("worked", "without", title=finding.title, reason=finding.reason.rstrip(".")))
        else:
            blocks += _worked(finding, frame.system)
    if without:
        blocks.append(Bullets(tuple(without)))
    return Section("14", words("sections", "14"), tuple(blocks))


def _worked(finding, system: str) -> list[Block]:
    blocks: list[Block] = []
    governing = next(
        (text for key, text in words("worked", "equations").items() if finding.id.startswith(key)), ""
    )
    if governing:
        blocks.append(Paragraph(fill("worked", "governing", title=finding.title, text=governing)))
    if finding.facts:
        rows = tuple((f.label, numbers.anything(f.value, f.unit, system), f.note) for f in finding.facts)
        columns = tuple(words("worked", "facts_columns"))
        blocks.append(Table(columns, rows, ("left", "right", "left"), finding.title))
    blocks.append(_margin(finding, system))
    return blocks


def _margin(finding, system: str) -> Block:
    """The subtraction behind the margin, with its numbers."""
    below = finding.kind != "stay above"
    limit = finding.limit_high if below else finding.limit_low
    if finding.value is None or limit is None or finding.margin is None or finding.kind == "keep out of":
        return Paragraph(f"{finding.title}: {words('worked', 'no_limit')}")
    shown = finding_numbers(finding, system)
    places = numbers.decimals((finding.value, finding.low, finding.high, limit), finding.unit, system)
    limit_text = numbers.quantity(limit, finding.unit, system, places=places).text
    first, second = (limit_text, shown.value.text) if below else (shown.value.text, limit_text)
    note = (
        ""
        if shown.low_to_high.text in (numbers.NONE, "?", "")
        else f"{words('worked', 'ends')}: {shown.low_to_high}"
    )
    symbols = words("worked", "margin_below" if below else "margin_above")
    return Equation(f"{finding.title}: {symbols}", f"{first} - {second}", shown.margin, note)
