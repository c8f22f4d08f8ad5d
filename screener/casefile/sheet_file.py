"""A laboratory sheet in a file of its own, or in a case file: the liquid it describes."""

from __future__ import annotations

from collections.abc import Mapping
from pathlib import Path

from screener.casefile.collect import collect
from screener.casefile.files import read_file
from screener.casefile.keys import order
from screener.casefile.lab import made_liquids, read_liquid
from screener.casefile.toml_text import parse_toml
from screener.casefile.values import Tables, shipped_tables
from screener.ground.errors import CaseErrors, InputError

_HINT = "a [lab] table with the keys of [blend.lab], or a case file with [blend.lab]"


def read_sheet_file(path: str | Path, start=None, *, tables: Tables | None = None):
    """The blend that reproduces a laboratory sheet.

    The file holds a table [lab] with the keys of [blend.lab], or it is a case file, of which [blend] is
    read and nothing else. start is the recipe, a Blend, where it is not in the file. Raises CaseErrors
    with every fault; paths are those of the file.
    """
    try:
        document = parse_toml(read_file(path))
        alone = "lab" in document
        if alone and set(document) != {"lab"}:
            others = ", ".join(f"[{name}]" for name in document if name != "lab")
            raise InputError("lab", str(path), f"beside [lab] stands {others}", _HINT)
        blend = {"lab": document["lab"]} if alone else document.get("blend")
        if not isinstance(blend, Mapping) or "lab" not in blend:
            raise InputError(str(path), str(path), "this file holds no laboratory sheet", _HINT)
        if start is not None and blend.get("parts"):
            raise InputError("blend.parts", str(path), "the parts are given twice, here and in the file", "once")
    except InputError as error:
        raise CaseErrors([error]) from error
    tables = tables or shipped_tables()
    values = collect({"blend": blend}, tables)
    values.faults = [fault for fault in values.faults if fault.path.startswith("blend")]
    made = made_liquids(values, [read_liquid(values, "blend", tables, start)], tables)
    if values.faults:
        faults = sorted(values.faults, key=lambda fault: order(fault.path))
        raise CaseErrors([fault.at(fault.path.removeprefix("blend.")) if alone else fault for fault in faults])
    return made[0]
