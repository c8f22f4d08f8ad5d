"""From arguments to an exit code, and nothing that the user should not see."""

from __future__ import annotations

import platform
import sys
import tempfile
import traceback

from screener import __version__
from screener.cli import streams
from screener.cli.arguments import parse
from screener.cli.wording import say
from screener.ground.errors import CaseErrors, InputError

BAD_INPUT = 3
OUR_FAULT = 70  # EX_SOFTWARE of the BSD sysexits
INTERRUPTED = 130  # 128 + SIGINT
PIPE_CLOSED = 141  # 128 + SIGPIPE


def run(argv: list[str] | None) -> int:
    """Parse, run one command, and turn whatever goes wrong into an exit code."""
    streams.ready()
    try:
        code = _command(argv)
        streams.finish()
        return code
    except BrokenPipeError:
        streams.abandon()
        return PIPE_CLOSED
    except KeyboardInterrupt:
        streams.say(say("faults", "interrupted"))
        return INTERRUPTED
    except InputError as fault:
        _list_faults(fault)
        return BAD_INPUT
    except Exception as fault:  # noqa: BLE001 - the border: a traceback goes into a file, never at the user
        _report(fault, argv)
        return OUR_FAULT


def _command(argv: list[str] | None) -> int:
    arguments = parse(argv)
    return arguments.run(arguments)


def faults_of(error: InputError) -> tuple[InputError, ...]:
    """The single faults of an error, those of nested lists too."""
    if not isinstance(error, CaseErrors):
        return (error,)
    return tuple(single for fault in error.faults for single in faults_of(fault))


def _list_faults(error: InputError) -> None:
    faults = faults_of(error)
    count = say("faults", "one") if len(faults) == 1 else say("faults", "many", count=len(faults))
    streams.say("screener: " + say("faults", "lead", count=count))
    for fault in faults:
        streams.say("  " + str(fault).replace("\n", "\n  "))


def _report(fault: Exception, argv: list[str] | None) -> None:
    """Write the traceback to a file in the temporary folder and say where."""
    lines = [
        f"screener {__version__}, Python {platform.python_version()}, {platform.platform()}",
        f"arguments: {sys.argv[1:] if argv is None else argv!r}",
        "",
        *traceback.format_exception(fault),
    ]
    try:
        with tempfile.NamedTemporaryFile(
            "w",
            prefix="screener-fault-",
            suffix=".txt",
            delete=False,
            encoding="utf-8",
            errors="backslashreplace",
        ) as file:
            file.write("\n".join(line.rstrip("\n") for line in lines) + "\n")
        streams.say(say("faults", "bug", path=file.name))
    except OSError as error:
        streams.say(say("faults", "bug_unwritten", why=error.strerror or error))
