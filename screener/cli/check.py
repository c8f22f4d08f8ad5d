"""`screener check`: screen cases and print the findings, worst first."""

from __future__ import annotations

from screener.cli import streams
from screener.cli.layout import bullets, paragraph, table
from screener.cli.wording import columns, say
from screener.ground.errors import CaseErrors, InputError
from screener.memo import numbers
from screener.memo.finding_text import finding_numbers, step_text, verdict_counts, worst_first
from screener.memo.front import tank_words

_WORST_FIRST_CODES = (1, 2, 4, 0)
_ALIGN = ("left", "left", "right", "right", "right", "right", "left", "right")


def check(arguments) -> int:
    """Screen every case named; the exit code is that of the worst."""
    screenings = [screen_watched(*place) for place in _places(read_all(arguments.cases))]
    code = min((s.exit_code for s in screenings), key=_WORST_FIRST_CODES.index)
    if arguments.json:
        from screener.cli.result import as_text, check_object

        streams.result(as_text(check_object(screenings, code)))
        return code
    width = arguments.width or streams.terminal_width()
    pages = ["\n".join(page(screening, arguments.units, width)) for screening in screenings]
    streams.result(("\n\n" + "=" * width + "\n\n").join(pages))
    return code


def read_all(paths) -> list:
    """All cases; the faults of all of them together, each placed in its file."""
    from screener.casefile import read_case
    from screener.cli.entry import faults_of

    cases, faults = [], []
    for path in paths:
        try:
            cases.append(read_case(path))
        except InputError as error:
            faults += [placed(fault, path) for fault in faults_of(error)]
    if faults:
        raise CaseErrors(faults)
    return cases


def placed(fault: InputError, file: str) -> InputError:
    """A fault with the name of its file before its path."""
    if fault.path.startswith(str(file)):
        return fault
    return fault.at(f"{file}: {fault.path}" if fault.path else str(file))


def _places(cases):
    return [(case, i, len(cases)) for i, case in enumerate(cases, 1)]


def screen_watched(case, i: int = 1, n: int = 1):
    """Screen one case; whoever watches stderr sees which."""
    from screener import screen

    streams.progress(say("progress", "case", i=i, n=n, name=case.source or case.title))
    try:
        return screen(case)
    finally:
        streams.progress("")


def page(screening, system: str, width: int) -> list[str]:
    """Everything printed for one case."""
    findings = worst_first(screening.findings)
    lines = [*_head(screening, width), ""]
    lines += [
        *findings_table(findings, system, width),
        "",
        say("check", "counts", counts=verdict_counts(findings)),
        "",
    ]
    lines += [say("check", "why"), *_why(findings, system, width)]
    for block in (_information(screening, system, width), _notes(screening, system, width)):
        lines += ["", *block] if block else []
    notes = say("check", "pressures_us" if system == "us" else "pressures")
    return [*lines, "", *paragraph(notes, width), *paragraph(say("check", "foot"), width)]


def _head(screening, width: int) -> list[str]:
    case = screening.case
    pairs = [("receipt", case.blend.title)]
    if case.tank.contents:
        pairs.append(("heel", case.tank.contents.blend.title))
    pairs += [("tank", tank_words(case)), ("month", case.site.month), ("file", case.source)]
    labels = [(say("check", key), text) for key, text in pairs if text]
    size = max(len(label) for label, _ in labels)
    lines = paragraph(case.title, width)
    for label, text in labels:
        lines += paragraph(text, width, f"{label:<{size}}  ")
    return lines


def findings_table(findings, system: str, width: int) -> list[str]:
    """Verdict, numbers and limit of every finding, the unit in a column of its own."""
    rows = []
    for finding in findings:
        shown = finding_numbers(finding, system, bare=True)
        unit = numbers.unit_text(finding.unit, system) if finding.verdict != "skipped" else ""
        cells = (shown.value, shown.low_to_high, shown.limit, shown.margin, unit, shown.room_used)
        rows.append((f"{finding.mark} {finding.verdict}", finding.title, *map(str, cells)))
    return table(columns("check", "columns"), rows, width, _ALIGN)


def _why(findings, system: str, width: int) -> list[str]:
    lines = []
    for finding in findings:
        texts = [finding.reason]
        condition = finding.condition.sentence()
        if condition:
            texts.append(say("check", "worst_case", condition=condition))
        steps = " or ".join(step_text(step, system) for step in finding.headroom)
        if steps:
            texts.append(say("check", "room_by", steps=steps))
        text = f"{finding.title}: {'; '.join(text.rstrip('.') for text in texts if text)}."
        lines += paragraph(text, width, f"{finding.mark} ")
    return lines


def _information(screening, system: str, width: int) -> list[str]:
    lines: list[str] = []
    for item in screening.information:
        facts = "; ".join(
            f"{fact.label} {numbers.anything(fact.value, fact.unit, system)}"
            f"{f' ({fact.note})' if fact.note and fact.note != item.note else ''}"
            for fact in item.facts
        )
        note = f" ({item.note})" if item.note else ""
        lines += paragraph(f"{item.title}: {facts}{note}", width, "  * ")
    return [say("check", "information"), *lines] if lines else []


def _notes(screening, system: str, width: int) -> list[str]:
    """Defaults, assumptions, reservations and cautions, each once."""
    findings = worst_first(screening.findings)
    defaults = [
        f"{echo.path} = {numbers.anything(echo.value, echo.unit, system)}{f' ({echo.note})' if echo.note else ''}"
        for echo in screening.case.inputs
        if echo.quality == "default"
    ]
    known = {f"{echo.path}: {echo.note}" for echo in screening.case.inputs if echo.quality == "default"}
    assumed = [*screening.assumptions, *(text for f in findings for text in f.inputs_assumed)]
    assumed = [text for text in assumed if text not in known]
    groups = {
        "defaults": defaults,
        "assumptions": assumed,
        "reservations": screening.reservations,
        "cautions": [f"{f.title}: {f.caution}" for f in findings if f.caution and f.verdict != "skipped"],
    }
    lines: list[str] = []
    for key, items in groups.items():
        if items:
            lines += ([""] if lines else []) + [say("check", key), *bullets(dict.fromkeys(items), width)]
    return lines
