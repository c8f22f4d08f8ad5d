"""Appendix A: the case in full, species and sources, so that the run can be repeated."""

from __future__ import annotations

from functools import lru_cache

from screener.ground.files import data_folder, read_toml
from screener.memo import numbers
from screener.memo.document import Block, Bullets, Paragraph, Section, Table, Verbatim
from screener.memo.frame import Frame
from screener.memo.results import liquids
from screener.memo.text import plain_lines
from screener.memo.wording import fill, words
from screener.species import find


def appendix_section(frame: Frame) -> Section:
    """A: case file, mole shares, sources touched, run."""
    blocks: list[Block] = []
    if frame.case_text:
        blocks += [
            Paragraph(words("appendix", "case_as_entered") + ":"),
            Verbatim(plain_lines(frame.case_text)),
        ]
    else:
        blocks.append(Paragraph(words("appendix", "case_listed")))
    blocks += [composition_table(frame), _sources(frame), *_run(frame)]
    return Section("A", words("sections", "A"), tuple(blocks))


def composition_table(frame: Frame) -> Table:
    """Mole shares of receipt and heel over all species of either, largest in the receipt first."""
    shares = _shares(frame)
    names = dict.fromkeys(name for column in shares for name in column)
    ordered = sorted(names, key=lambda name: (-shares[0].get(name, 0.0), name))
    rows = tuple(
        (
            name,
            find(name).cas,
            find(name).curve.source,
            *(numbers.quantity(column.get(name, 0.0), "-", places=5) for column in shares),
        )
        for name in ordered
    )
    columns = tuple(words("appendix", "composition_columns")[: 3 + len(shares)])
    align = ("left", "left", "left", "right", "right")[: len(columns)]
    return Table(columns, rows, align, words("appendix", "composition"))


def _shares(frame: Frame) -> list[dict[str, float]]:
    """Mole shares above zero of receipt and heel."""
    columns = [dict(zip(blend.names, map(float, blend.z))) for _, blend in liquids(frame)]
    return [{name: share for name, share in column.items() if share > 0.0} for column in columns]


@lru_cache(maxsize=1)
def _source_list() -> dict[str, dict]:
    """All entries of the source lists below the data folder."""
    folder = data_folder()
    entries: dict[str, dict] = {}
    for path in sorted(folder.rglob("sources.toml")):
        entries |= read_toml(path.relative_to(folder).as_posix())
    return entries


def source_title(key: str) -> str:
    """Bibliographic line of a key in the source lists; the key itself when no list has it."""
    entry = _source_list().get(key)
    if entry is None:
        return key
    parts = (entry.get("authors"), entry.get("title"), entry.get("edition"), entry.get("year"))
    return ". ".join(str(part).rstrip(".") for part in parts if part)


def _sources(frame: Frame) -> Block:
    species = (find(name).curve.source for column in _shares(frame) for name in column)
    findings = (key for f in frame.findings for key in f.sources)
    keys = dict.fromkeys((*frame.screening.sources, *findings, *species))
    rows = tuple(_source_row(key) for key in sorted(keys))
    return Table(tuple(words("appendix", "source_columns")), rows, (), words("appendix", "sources"))


def _source_row(key: str) -> tuple[str, str]:
    """Key and title; a source that a blend names in words has no key."""
    title = source_title(key)
    return ("", key) if title == key and " " in key else (key, title)


def _run(frame: Frame) -> list[Block]:
    absent = words("control", "not_given")
    values = {
        "version": frame.version,
        "case_digest": frame.case.digest or absent,
        "data_digest": frame.data_digest or absent,
        "system": frame.system,
    }
    lines = tuple(line.format(**values) for line in words("appendix", "run_lines"))
    return [Paragraph(fill("appendix", "run") + ":"), Bullets(lines)]
