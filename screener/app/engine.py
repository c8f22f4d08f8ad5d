"""The functions behind the screens, loaded when first used.

An `Engine` is a handful of plain functions, so that tests can put others in
their place. `real()` imports nothing heavy; `warm` does, and is called by a
worker once the first screen is painted.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator
from dataclasses import dataclass, replace
from datetime import date
from functools import lru_cache
from typing import NamedTuple

from screener.app.fields import Echo
from screener.casefile.lab_keys import LAB_PATHS
from screener.casefile.paths import join
from screener.ground.errors import CaseErrors, InputError


class Name(NamedTuple):
    """A stock or species that can be a part of a blend."""

    kind: str  # 'stock' or 'species'
    name: str
    also: tuple[str, ...] = ()  # synonyms, CAS number
    detail: str = ""


@dataclass(frozen=True)
class Worked:
    """One case worked out: a screening, or the faults that stopped it.

    full is False for the verdicts alone, which are there at once; what would
    give room, the figures of the liquids and the curve take longer.
    """

    screening: object | None
    faults: tuple[InputError, ...]
    echoes: dict[str, Echo]
    full: bool = True


@dataclass(frozen=True)
class Doing:
    """What takes its time now: a key of the words about results."""

    what: str


@dataclass(frozen=True)
class MemoAsked:
    """What a memo says about itself besides its screening."""

    number: str
    revision: str
    status: str
    author: str
    case_text: str


@dataclass(frozen=True)
class Engine:
    """Everything the screens ask of the floors below."""

    warm: Callable[[], None]
    work: Callable[[str, str], Iterable[Worked | Doing]]  # TOML text, name of the file -> verdicts, then all of it
    check: Callable[[str, str], Echo]  # path and text -> what it is taken as; raises InputError
    names: Callable[[], tuple[Name, ...]]
    packs: Callable[[], tuple[str, ...]]  # names of the rule packs
    memo: Callable[[object, MemoAsked], object]  # screening -> document
    markdown: Callable[[object], str]  # document -> text


def real() -> Engine:
    """The functions of the floors below."""
    return Engine(_warm, _work, _check, _names, _packs, _memo, _markdown)


def faults_of(error: InputError) -> tuple[InputError, ...]:
    """Every single fault of an error."""
    return error.faults if isinstance(error, CaseErrors) else (error,)


def _warm() -> None:
    import scipy.special  # noqa: F401  loaded here so that no key press waits for it

    from screener.casefile import units
    from screener.screening import screen  # noqa: F401

    units.registry()


def _work(text: str, source: str) -> Iterator[Worked | Doing]:
    from screener.casefile import CaseText, read_case
    from screener.screening import screen, screen_many

    if any(CaseText.parse(text).has(path) for path in LAB_PATHS):
        yield Doing("fitting")  # a second or two for a sheet that was not fitted before
    try:
        case = read_case(text)
    except InputError as error:
        yield Worked(None, faults_of(error), _echoes(text, ()))
        return
    case = replace(case, source=source)
    echoes = _echoes(text, case.inputs)
    try:
        yield Worked(screen_many((case,))[0], (), echoes, full=False)
        yield Worked(screen(case), (), echoes)
    except InputError as error:
        yield Worked(None, faults_of(error), echoes)


def _echoes(text: str, inputs) -> dict[str, Echo]:
    """What every value given is taken as, and every default used, by path."""
    from screener.casefile import CaseText
    from screener.memo import numbers

    made: dict[str, Echo] = {}
    entered = CaseText.parse(text)
    for path in paths_in(entered.table):
        try:
            made[path] = _check(path, entered.get(path) or "")
        except InputError:
            continue
    for item in inputs:
        if item.quality == "default":
            value = str(numbers.anything(item.value, item.unit))
            made[item.path] = Echo(value, item.quality, item.note, default=True)
        elif item.path in made:
            made[item.path] = replace(made[item.path], quality=item.quality, note=item.note)
    return made


def paths_in(table, path: str = "") -> list[str]:
    """Paths of all single values in nested tables."""
    found: list[str] = []
    for name, value in table.items():
        at = join(path, name)
        rows = value if isinstance(value, list) and any(isinstance(row, dict) for row in value) else None
        if rows is not None:
            for i, row in enumerate(rows):
                found += paths_in(row, f"{at}[{i}]") if isinstance(row, dict) else []
        elif isinstance(value, dict):
            found += paths_in(value, at)
        else:
            found.append(at)
    return found


@lru_cache(maxsize=4096)
def _check(path: str, text: str) -> Echo:
    from screener.casefile import check_text

    return Echo(check_text(path, text)[0].removeprefix("taken as "))


def _names() -> tuple[Name, ...]:
    from screener import species
    from screener.blends import stock_titles

    found = [Name("stock", name, (), title) for name, _, title in stock_titles()]
    for name in species.names():
        record = species.find(name)
        found.append(Name("species", record.name, (*record.synonyms, record.cas), record.formula))
    return tuple(found)


def _packs() -> tuple[str, ...]:
    from screener.tank import rule_packs

    return tuple(rule_packs())


def _memo(screening, asked: MemoAsked):
    from screener import __version__
    from screener.memo import build_memo, data_digest

    return build_memo(
        screening,
        date=date.today().isoformat(),
        author=asked.author,
        version=__version__,
        number=asked.number,
        revision=asked.revision,
        status=asked.status,
        data_digest=data_digest(),
        case_text=asked.case_text,
    )


def _markdown(document) -> str:
    from screener.memo import write_markdown

    return write_markdown(document)
