"""Sections 0 to 2: control block, question and use, outcome."""

from __future__ import annotations

from pathlib import PurePath

from screener.memo import numbers
from screener.memo.document import Cell, Paragraph, Section, Table, VerdictRow, Verdicts
from screener.memo.finding_text import verdict_counts
from screener.memo.frame import Frame
from screener.memo.wording import fill, words


def title(frame: Frame, kind: str) -> str:
    """Title line; one that has unknown findings says so."""
    text = fill("titles", kind, title=frame.case.title)
    count, total = _unknown(frame), len(frame.findings)
    return fill("titles", "with_unknown", title=text, count=count, total=total) if count else text


def running_head(frame: Frame) -> str:
    """Number, revision and status, for every page of a writer that has pages."""
    return fill("titles", "running_head", number=frame.number, revision=frame.revision, status=frame.status)


def case_file_name(frame: Frame) -> str:
    """Name of the case file without its folder: the folder is nobody's business."""
    return PurePath(frame.case.source).name or words("control", "by_hand")


def control(frame: Frame) -> tuple[tuple[str, Cell], ...]:
    """The control block as pairs. Checking and approval are left to paper."""
    case, absent = frame.case, words("control", "not_given")
    values = {
        "number": frame.number,
        "title": case.title,
        "reference": case.reference or absent,
        "site": tank_words(case),
        "revision": frame.revision,
        "date": frame.date,
        "status": frame.status,
        "case_file": case_file_name(frame),
        "case_digest": case.digest or absent,
        "version": frame.version,
        "data_digest": frame.data_digest or absent,
        "prepared": frame.author or absent,
        "checked": words("control", "on_paper"),
        "approval": words("control", "on_paper"),
    }
    return tuple((words("control", key), value) for key, value in values.items())


def tank_words(case) -> str:
    """Kind of tank in plain words."""
    return f"{case.tank.kind.replace('-', ' ')} tank".replace("pressure vessel tank", "pressure vessel")


def month_words(case) -> str:
    """The month the question is about."""
    return case.site.month or words("question", "month_any")


def control_section(frame: Frame) -> Section:
    """0: the control block."""
    rows = tuple((name, value) for name, value in control(frame))
    return Section("0", words("sections", "0"), (Table(("", ""), rows),))


def question_section(frame: Frame) -> Section:
    """1: the decision it serves, operation and season, and how long it holds."""
    case = frame.case
    asked = fill(
        "question",
        "question",
        blend=case.blend.title,
        tank=_with_article(tank_words(case)),
        month=month_words(case),
    )
    return Section(
        "1",
        words("sections", "1"),
        (
            Paragraph(asked),
            Paragraph(fill("question", "operation", operation=_operation(case, frame.system))),
            Paragraph(words("question", "use")),
            Paragraph(words("question", "valid")),
        ),
    )


def outcome_section(frame: Frame) -> Section:
    """2: verdict rows, worst first, unknown ones not hidden below the rest."""
    worst = frame.screening.worst
    mark = next((f.mark for f in frame.findings if f.verdict == worst), "?")
    lead = fill("outcome", "worst", mark=mark, verdict=worst, counts=verdict_counts(frame.findings) or worst)
    blocks = [Paragraph(lead)]
    if _unknown(frame):
        text = fill("outcome", "unknown", count=_unknown(frame), total=len(frame.findings))
        blocks.append(Paragraph(text, "caution"))
    blocks.append(verdicts(frame))
    blocks.append(Paragraph(words("outcome", "verdicts"), "note"))
    return Section("2", words("sections", "2"), tuple(blocks))


def verdicts(frame: Frame) -> Verdicts:
    """One row a finding, worst first, with its reason and where it is worst."""
    return Verdicts(tuple(VerdictRow(f.mark, f.verdict, f.id, f.title, sentence(f)) for f in frame.findings))


def sentence(finding) -> str:
    """Why the verdict, and the condition that is worst."""
    reason = finding.reason[:1].upper() + finding.reason[1:].rstrip(".")
    condition = finding.condition.sentence()
    where = " " + fill("outcome", "worst_case", condition=condition) if condition else ""
    return f"{reason}.{where}" if reason else where.strip()


def _unknown(frame: Frame) -> int:
    return sum(f.verdict == "unknown" for f in frame.findings)


def _with_article(text: str) -> str:
    return f"{'an' if text[0] in 'aeiou' else 'a'} {text}"


def _operation(case, system: str) -> str:
    receipt, parts = case.line.receipt, []
    if receipt and receipt.rate is not None:
        rate = numbers.quantity(receipt.rate, "m3/s", system).text
        if receipt.temperature is None:
            parts.append(fill("question", "receipt_rate", rate=rate))
        else:
            temperature = numbers.quantity(receipt.temperature, "K", system).text
            parts.append(fill("question", "receipt", rate=rate, temperature=temperature))
    if case.line.draw_rate is not None:
        parts.append(
            fill("question", "draw", rate=numbers.quantity(case.line.draw_rate, "m3/s", system).text)
        )
    return ", ".join(parts) or words("question", "no_operation")
