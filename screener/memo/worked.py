"""Section 14: each governing equation once, with its numbers and units put in. In SI, whatever the memo shows."""

from __future__ import annotations

import re

from screener.memo import numbers
from screener.memo.document import Block, Bullets, Equation, Paragraph, Section, Table
from screener.memo.finding_text import finding_numbers
from screener.memo.frame import Frame
from screener.memo.wording import fill, words
from screener.screening.finding import MEASURED

_SYSTEM = "si"  # one system, so that a calculator needs no conversion factors
_FIELD = re.compile(r"\{([^{}]+)\}")


def worked_section(frame: Frame) -> Section:
    """14: equation and facts of every finding that has numbers; the reason of every one that has none."""
    blocks: list[Block] = [Paragraph(words("worked", "lead"))]
    without = []
    for finding in frame.findings:
        if finding.value is None and not finding.facts:
            without.append(fill("worked", "without", title=finding.title, reason=finding.reason.rstrip(".")))
        else:
            blocks += _worked(finding, frame.case.inputs)
    if without:
        blocks.append(Bullets(tuple(without)))
    return Section("14", words("sections", "14"), tuple(blocks))


def _worked(finding, inputs) -> list[Block]:
    blocks: list[Block] = []
    governing = _by_criterion("equations", finding)
    if governing:
        blocks.append(Paragraph(fill("worked", "governing", title=finding.title, text=governing)))
    if any(fact.label.endswith(MEASURED) for fact in finding.facts):
        blocks.append(Paragraph(f"{finding.title}: {words('worked', 'measured')}"))
    if finding.facts:
        rows = tuple((f.label, numbers.anything(f.value, f.unit, _SYSTEM), f.note) for f in finding.facts)
        columns = tuple(words("worked", "facts_columns"))
        blocks.append(Table(columns, rows, ("left", "right", "left"), finding.title))
    blocks += _value(finding, inputs)
    blocks.append(_margin(finding))
    return blocks


def _by_criterion(table: str, finding) -> str:
    """Wording of the criterion behind a finding; a rule pack adds its name to the id."""
    rows = words("worked", table)
    return next(
        (text for key, text in rows.items() if finding.id == key or finding.id.startswith(f"{key}.")), ""
    )


def _value(finding, inputs) -> list[Block]:
    """The governing equation with facts and inputs put in; nothing when one of them is not there."""
    pattern = _by_criterion("numbers", finding)
    if not pattern or finding.value is None:
        return []
    known = {f.label: numbers.anything(f.value, f.unit, _SYSTEM) for f in finding.facts}
    known |= {f"@{echo.path}": numbers.anything(echo.value, echo.unit, _SYSTEM) for echo in inputs}
    if any(label not in known for label in _FIELD.findall(pattern)):
        return []
    text = _FIELD.sub(lambda found: str(known[found[1]]), pattern)
    return [Equation(f"{finding.title}: {finding.quantity}", text, finding_numbers(finding, _SYSTEM).value)]


def _margin(finding) -> Block:
    """The subtraction behind the margin, with its numbers."""
    below = finding.kind != "stay above"
    limit = finding.limit_high if below else finding.limit_low
    if finding.value is None or limit is None or finding.margin is None or finding.verdict == "unknown":
        return Paragraph(f"{finding.title}: {words('worked', 'no_limit')}")
    if finding.kind == "keep out of":
        limit, below, symbols = _nearest_end(finding)
    else:
        symbols = "margin_below" if below else "margin_above"
    shown = finding_numbers(finding, _SYSTEM)
    places = numbers.decimals((finding.value, finding.low, finding.high, limit), finding.unit, _SYSTEM)
    limit_text = numbers.quantity(limit, finding.unit, _SYSTEM, places=places).text
    first, second = (limit_text, shown.value.text) if below else (shown.value.text, limit_text)
    note = f"{words('worked', 'ends')}: {shown.low_to_high}" if shown.low_to_high.low is not None else ""
    return Equation(f"{finding.title}: {words('worked', symbols)}", f"{first} - {second}", shown.margin, note)


def _nearest_end(finding) -> tuple[float, bool, str]:
    """End of an interval to keep out of that the margin counts from, and which way it counts."""
    low, high, value = finding.limit_low, finding.limit_high, finding.value
    lower = value < low or (value <= high and value - low < high - value)
    return (low, True, "margin_out_low") if lower else (high, False, "margin_out_high")
