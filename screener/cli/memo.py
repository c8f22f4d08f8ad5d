"""`screener memo`: screen a case and write the memo or the field sheet."""

from __future__ import annotations

import datetime
from pathlib import Path

from screener import __version__
from screener.cli import streams
from screener.cli.check import read_all, screen_watched
from screener.cli.wording import say
from screener.ground.errors import InputError

WRITERS = {".md": "write_markdown", ".json": "write_json"}


def memo(arguments) -> int:
    """Write one file; the exit code tells whether it was written, not what it says."""
    writer = writer_for(arguments.output)
    date = memo_date(arguments.date)
    case = read_all([arguments.case])[0]
    document = build(screen_watched(case), date, arguments)
    write_file(arguments.output, writer(document))
    streams.say(say("progress", "wrote", path=arguments.output))
    return 0


def writer_for(output: str):
    """The writer that the suffix of a file name chooses."""
    from screener import memo as floor

    suffix = Path(output).suffix.lower()
    if suffix not in WRITERS:
        known = ", ".join(WRITERS)
        raise InputError(
            output, suffix, say("faults", "suffix", suffix=suffix), say("faults", "suffix_hint", known=known)
        )
    return getattr(floor, WRITERS[suffix])


def memo_date(text: str | None) -> str:
    """An ISO date, checked; today's when none is given."""
    if text is None:
        return datetime.date.today().isoformat()
    try:
        return datetime.date.fromisoformat(text).isoformat()
    except ValueError:
        problem = f"'{text}' {say('faults', 'date')}"
        raise InputError("--date", text, problem, say("faults", "date_hint")) from None


def build(screening, date: str, arguments):
    """The document asked for."""
    from screener.memo import build_field_sheet, build_memo, data_digest

    case = screening.case
    common = {
        "date": date,
        "author": case.prepared_by if arguments.author is None else arguments.author,
        "version": __version__,
        "number": arguments.number or case.reference or Path(arguments.case).stem,
        "revision": arguments.revision,
        "status": arguments.status,
        "system": arguments.units,
    }
    if arguments.field_sheet:
        return build_field_sheet(screening, **common)
    text = Path(arguments.case).read_text(encoding="utf-8-sig")
    return build_memo(screening, data_digest=data_digest(), case_text=text, **common)


def write_file(path: str, text: str, *, new: bool = False) -> None:
    """Write text with LF line ends; `new` refuses a file that exists."""
    try:
        with open(path, "x" if new else "w", encoding="utf-8", newline="\n") as file:
            file.write(text)
    except FileExistsError:
        raise InputError(path, None, say("faults", "exists"), say("faults", "exists_hint")) from None
    except OSError as error:
        raise InputError(path, None, say("faults", "cannot_write", why=error.strerror or error)) from None
