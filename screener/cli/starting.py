"""`screener new` and `screener schema`: where a case file begins."""

from __future__ import annotations

import json

from screener.cli import streams
from screener.cli.memo import write_file
from screener.cli.wording import say
from screener.ground.files import data_folder


def new(arguments) -> int:
    """Write a commented case; an existing file is never overwritten."""
    from screener.casefile import template

    write_file(arguments.file, template(), new=True)
    streams.say(say("progress", "wrote", path=arguments.file))
    return 0


def schema(arguments) -> int:
    """Print the JSON Schema of the case file or of the result."""
    if arguments.of == "result":
        streams.result((data_folder() / "schemas" / "check-1.json").read_text(encoding="utf-8"))
        return 0
    from screener.casefile import schema as case_schema

    streams.result(json.dumps(case_schema(), indent=2, ensure_ascii=False))
    return 0
