"""Which rows a step shows: made from the declared keys of the case file. Plain Python.

A key added to the case file appears here without further work; its group is
the table it stands in.
"""

from __future__ import annotations

import re
from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass, replace

from screener.app.rows import Column
from screener.app.sheet import Cell, Record, Section
from screener.app.words import say, table
from screener.casefile import keys as schema

PREFIX = {"blend": "blend", "tank": "tank", "site": "site", "line": "line"}
LAB, HEEL_LAB = "blend.lab", "tank.contents.lab"
PART_COLUMNS = ("share", "quality")
_VALUE_COLUMNS = (
    Column("", least=18),
    Column("value", least=12),
    Column("taken as", least=14),
)


@dataclass(frozen=True)
class Echo:
    """What a value was taken as."""

    text: str
    quality: str = ""
    note: str = ""
    default: bool = False


@dataclass(frozen=True)
class Known:
    """What is known about a case beside its text: echoes and faults by path."""

    echoes: dict[str, Echo]
    faults: dict[str, str]
    missing: frozenset[str] = frozenset()  # paths that findings ask for


NOTHING = Known({}, {})


def sections(step: str, text, known: Known, told: Iterable[Section] = ()) -> list[Section]:
    """All sections of an input step; those that are only told stand before the long laboratory sheet."""
    if step == "blend":
        made = [part_section("blend", text, known), *_groups("blend", text, known)]
        return [*made, *told, *_lab(LAB, text, known)]
    made = _groups(PREFIX[step], text, known)
    if step == "tank":
        return [*made, *told, *_lab(HEEL_LAB, text, known)]
    if step == "site":
        made += _groups("screening", text, known)
    return [*made, *told]


def _lab(base: str, text, known: Known) -> list[Section]:
    """Sections of a laboratory sheet; its blank rows fold, those of the reproducibilities apart from the others."""
    return [replace(section, fold=fold_of(section.records[0].key)) for section in _groups(base, text, known)]


def fold_of(path: str) -> str:
    """Name of the fold a path belongs to; '' for a row that never folds."""
    names = (f"{LAB}.reproducibility", f"{HEEL_LAB}.reproducibility", LAB, HEEL_LAB)
    return next((name for name in names if path == name or path.startswith((f"{name}.", f"{name}["))), "")


def _shared(path: str) -> str:
    """Path under which the words of a key are kept: both sheets share theirs, a reproducibility those of its number."""
    return path.replace(HEEL_LAB, LAB).replace(".reproducibility.", ".")


def label(key) -> str:
    """Name of a key in words; the wording file may give a better one."""
    return table("labels").get(_shared(key.path), key.label)


def _groups(prefix: str, text, known: Known) -> list[Section]:
    """Sections of every table below a prefix, in the order of the keys."""
    order: dict[str, list] = {}
    for key in schema.all_keys().values():
        if _place(key.path) != prefix or key.kind in (schema.TABLE, schema.LATER):
            continue
        parent = key.path if key.kind == schema.ROWS else key.parent
        if parent.endswith("parts[]") and key.kind != schema.ROWS:
            continue
        order.setdefault(parent, [])
        if key.kind != schema.ROWS and "[]" not in key.parent and key.name != "scale":
            order[parent].append(key)
    made = []
    for parent, group in order.items():
        if parent.endswith("parts[]"):
            if prefix != "blend":
                made.append(part_section(parent.removesuffix(".parts[]"), text, known))
        elif parent == "site.months[]":
            made.append(_months(text, known))
        elif parent.endswith("[]"):
            made += _row_groups(parent, text, known)
        elif parent.endswith(".reproducibility"):
            # Only of numbers that the sheet gives: a reproducibility of nothing is a row too many.
            group = [key for key in group if _given(key.path, text)]
            made += [_values(parent, group, text, known)] if group else []
        elif group:
            made.append(_values(parent, group, text, known))
    return made


def _given(path: str, text) -> bool:
    """Whether a reproducibility, or the number it belongs to, stands in the case."""
    base, _, name = path.partition(".reproducibility.")
    return any(text.has(one) for one in (path, f"{base}.{name}", f"{base}.distillation.{name.upper()}"))


def _place(path: str) -> str:
    """Prefix under which a key is shown."""
    return next((lab for lab in (LAB, HEEL_LAB) if path.startswith(lab)), path.split(".")[0])


def heading(parent: str) -> str:
    """Heading of a group."""
    words = table("groups")
    found = words.get(parent) or words.get(parent.replace(HEEL_LAB, LAB))
    return found or parent.rpartition(".")[2].replace("_", " ")


def _values(parent: str, group: Iterable, text, known: Known, at: str = "", title: str = "") -> Section:
    """Label, value, echo and quality, one key a line."""
    kind = text.get("tank.kind")
    records = []
    for key in group:
        path = f"{at}.{key.name}" if at else key.path
        if _applies(key, kind) or text.get(path) is not None:
            records.append(value_record(path, key, text, known))
    name = title or heading(parent)
    # A sheet refused as a whole is told above all rows, where it stays in sight.
    fault = "" if parent in (LAB, HEEL_LAB) else known.faults.get(at or parent, "")
    columns = (Column(name, least=18), *_VALUE_COLUMNS[1:])
    return Section(columns, tuple(records), fault, "bad") if fault else Section(columns, tuple(records))


def value_record(path: str, key, text, known: Known) -> Record:
    """One key as a line."""
    value = text.get(path) or ""
    echo = known.echoes.get(path)
    fault = known.faults.get(path, "")
    taken, tone = "", ""
    if echo and not fault:
        taken = "" if same_text(value, echo.text) else echo.text
        if echo.quality not in ("given", ""):
            taken = f"{taken} ({echo.quality})" if taken else echo.quality
    shown = value
    if not value:
        shown, tone = (say("sheet", "needed"), "unknown") if path in known.missing else (say("sheet", "blank"), "dim")
        if fault:
            shown, tone = say("sheet", "needed"), "bad"
        elif echo and echo.default:
            shown, tone = say("sheet", "default"), "dim"
    elif fault:
        tone = "bad"
    name = label(key)
    cells = (Cell(name), Cell(shown, path, tone), Cell(taken, tone="dim"))
    # The rows of a row somebody added never fold: its blank values are those to fill in next.
    folds = not (value or fault or path in known.missing or (echo and echo.default) or "[" in path)
    return Record(path, cells, note=fault, name=name, folds=folds)


def unshown(made: Sequence[Section], text, faults: Mapping[str, str]) -> list[Section]:
    """What is given under a name nobody knows and so has no row: it can be taken away here, with its fault below."""
    paths = {cell.path for section in made for record in section.records for cell in record.cells}
    left = [path for path in faults if path not in paths and not schema.key_at(path) and text.has(path)]
    if not left:
        return []
    values = [text.get(path) or say("sheet", "table") for path in left]
    records = tuple(
        Record(f"unknown:{i}", (Cell(path), Cell(values[i], path, "bad")), note=faults[path], name=path)
        for i, path in enumerate(left)
    )
    return [Section((Column(say("sheet", "unknown_name"), least=18), _VALUE_COLUMNS[1]), records)]


def same_text(entered: str, taken: str) -> bool:
    """Whether an echo only repeats what was entered: '2.0 m' and '2 m'."""

    def bare(text: str) -> str:
        return re.sub(r"(\d)[.,]0+(?!\d)", r"\1", text.replace(" ", "").replace("^", "").lower())

    return bare(entered) == bare(taken)


def _applies(key, kind: object) -> bool:
    """Whether a key says something about this kind of tank."""
    if kind is None or key.path not in _ONLY_FOR:
        return True
    return bool(re.search(_ONLY_FOR[key.path], str(kind)))


_ONLY_FOR = {
    "tank.length": "horizontal|underground|pressure-vessel",
    "tank.shell_height": "roof",
    "tank.roof_leg_height": "floating",
    "tank.surface": "roof|horizontal|pressure-vessel",
}


def _row_groups(parent: str, text, known: Known) -> list[Section]:
    """A list of tables such as the vents: one section for each, and at the end a line that adds one."""
    base = parent.removesuffix("[]")
    count = text.rows(base)
    group = list(schema.children(parent).values())
    made = []
    for i in range(count):
        title = f"{heading(parent)} {i + 1}"
        made.append(_values(parent, group, text, known, at=f"{base}[{i}]", title=title))
    words = say("sheet", "add_line" if base.startswith((LAB, HEEL_LAB)) else "add_row")
    fault = known.faults.get(base, "")
    key, blank = f"{base}[+]", (Cell(""),) * (len(_VALUE_COLUMNS) - 1 if made else 0)
    cells = (Cell(words, key, "dim"), *blank)
    adder = Record(key, cells, note=fault, name=words, folds=not (count or fault), adds=True)
    if made:
        return [*made[:-1], replace(made[-1], records=(*made[-1].records, adder))]
    return [Section((Column(heading(parent), least=18),), (adder,))]


def part_section(base: str, text, known: Known) -> Section:
    """Parts of a blend: name, share, quality; the last line adds a part."""
    records = []
    for i in range(text.rows(f"{base}.parts")):
        at = f"{base}.parts[{i}]"
        kind = "species" if text.has(f"{at}.species") else "stock"
        name, share, quality = (text.get(f"{at}.{key}") for key in (kind, *PART_COLUMNS))
        faults = _faults(known, at, kind, *PART_COLUMNS)
        tone = "bad" if faults else ""
        cells = (
            Cell(name or say("sheet", "needed"), f"{at}.{kind}", tone),
            Cell(share or say("sheet", "needed"), f"{at}.share", tone),
            Cell(kind, tone="dim"),
            Cell(quality or say("sheet", "blank"), f"{at}.quality", "" if quality else "dim"),
        )
        records.append(Record(at, cells, note=faults, name=name or ""))
    words = say("sheet", "add_part")
    fault = known.faults.get(f"{base}.parts", "") or known.faults.get(base, "")
    records.append(Record(f"{base}.parts[+]", (Cell(words, f"{base}.parts[+]", "dim"), *(Cell(""),) * 3), note=fault, name=words))
    columns = (
        Column(heading(f"{base}.parts[]"), least=12),
        Column("share", "right", least=6),
        Column("kind", least=7),
        Column("quality", least=11),
    )
    return Section(columns, tuple(records))


def told(title: str, note: str, lines) -> Section:
    """Lines that are only told: label, value and note; the cursor stops at them, so that all come into sight."""
    first = tuple(table("told_first").values())
    others = [not name.startswith(first) for name, _, _ in lines]
    records = tuple(
        Record(f"told:{i}", (Cell(name), Cell(value), Cell(remark, tone="dim")), folds=others[i] and not all(others))
        for i, (name, value, remark) in enumerate(lines)
    )
    columns = (Column(title, least=18), Column("", least=12), Column("", least=14))
    return Section(columns, records, note, fold="told", rest="lines")


def _faults(known: Known, at: str, *names: str) -> str:
    """Faults of a row and of its cells in one text."""
    paths = (at, *(f"{at}.{name}" for name in names))
    return "; ".join(known.faults[path] for path in paths if path in known.faults)


def _months(text, known: Known) -> Section:
    """The twelve months as a table of their own shape."""
    group = [key for key in schema.children("site.months[]").values() if key.kind != schema.MONTH]
    records = []
    for i in range(text.rows("site.months")):
        at = f"site.months[{i}]"
        month = text.get(f"{at}.month")
        cells = [Cell(month or say("sheet", "needed"), f"{at}.month")]
        for key in group:
            value = text.get(f"{at}.{key.name}")
            cells.append(Cell(value or say("sheet", "blank"), f"{at}.{key.name}", "" if value else "dim"))
        faults = _faults(known, at, "month", *(key.name for key in group))
        records.append(Record(at, tuple(cells), note=faults, name=month or ""))
    blank = (Cell(""),) * len(group)
    words = say("sheet", "add_month") if len(records) < 12 else ""
    if words:
        records.append(Record("site.months[+]", (Cell(words, "site.months[+]", "dim"), *blank), name=words))
    columns = (Column(heading("site.months[]"), least=5), *(Column(label(key), least=6) for key in group))
    return Section(columns, tuple(records))


def share_total(base: str, text) -> float | None:
    """Sum of the shares in percent; None when one of them is no plain percentage."""
    total, count = 0.0, text.rows(f"{base}.parts")
    for i in range(count):
        share = text.get(f"{base}.parts[{i}].share") or ""
        found = re.fullmatch(r"\s*([0-9]+(?:[.,][0-9]+)?)\s*(?:vol|mol|mass|wt)?\s*%\s*", share)
        if not found:
            return None
        total += float(found[1].replace(",", "."))
    return total if count else None
