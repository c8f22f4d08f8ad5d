"""A case file to a `Case` in SI, with every fault at once."""

from __future__ import annotations

import hashlib
from pathlib import Path
from typing import TYPE_CHECKING

from screener.casefile.case_text import CaseText
from screener.casefile.checks import check
from screener.casefile.collect import collect
from screener.casefile.files import read_file, write_file
from screener.casefile.keys import order
from screener.casefile.lab import made_liquids, read_liquid
from screener.casefile.toml_text import parse_toml
from screener.casefile.values import Tables, shipped_tables
from screener.ground.errors import CaseErrors, InputError

if TYPE_CHECKING:
    from screener.states.case import Case


def read_case(source: str | Path | CaseText, *, tables: Tables | None = None) -> Case:
    """The case of a file, of a text, or of a text model.

    A string with a line break is the text of a case file, any other string its path.
    tables says where names of liquids are looked up; the shipped ones by default.
    Raises CaseErrors with every fault of the case, each with path, value and what is allowed.
    """
    try:
        text, place = _text(source)
        document = parse_toml(text)
    except InputError as error:
        raise CaseErrors([error]) from error
    tables = tables or shipped_tables()
    values = collect(document, tables)
    paths = ["blend", *(["tank.contents"] if "tank.contents" in values.present else [])]
    stated = [read_liquid(values, path, tables) for path in paths]
    check(values)
    liquids = made_liquids(values, stated, tables)
    if values.faults:
        raise CaseErrors(sorted(values.faults, key=lambda fault: order(fault.path)))
    blend, heel = (*liquids, None)[:2]
    from screener.casefile.build import build

    return build(values, blend, heel, source=place, digest=hashlib.sha256(text.encode("utf-8")).hexdigest())


def write_case(case: CaseText | Case, path: str | Path) -> Path:
    """Write a case file in one step: the old file stays whole if anything fails.

    Takes the text model, or a case that was read from a file, whose texts as entered are
    written again. Raises InputError where it cannot be written.
    """
    text = case if isinstance(case, CaseText) else CaseText.of(case)
    write_file(path, text.toml())
    return Path(path)


def _text(source: str | Path | CaseText) -> tuple[str, str]:
    """Text of the case file, and its path if it has one."""
    if isinstance(source, CaseText):
        return source.toml(), ""
    if isinstance(source, str) and ("\n" in source or "\r" in source):
        return source, ""
    return read_file(source), str(source)
