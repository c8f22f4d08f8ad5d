"""The text model of a case: get, set, rows, and the way to a file and back."""

import copy
import json
import os
import tomllib
from pathlib import Path

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from screener.casefile import CaseText, read_case, template, write_case
from screener.casefile.toml_text import toml_text
from screener.ground.errors import InputError, UnknownName

HERE = Path(__file__).parent
EXAMPLES = sorted((HERE.parents[1] / "examples").glob("*.toml"))
WHOLE = HERE / "cases" / "whole.toml"
FILES = [*EXAMPLES, WHOLE, *sorted((HERE / "cases" / "broken").glob("*.toml"))]


def _texts():
    for file in FILES:
        try:
            yield pytest.param(CaseText.parse(file.read_text(encoding="utf-8")), id=file.stem)
        except InputError:
            assert file.stem in ("not_toml", "not_toml_at_all", "key_twice")


def test_get_and_set():
    text = CaseText()
    assert text.get("tank.shell_diameter") is None and not text.has("tank")
    text.set("tank.shell_diameter", " 24 m ")
    text.set("tank.liquid_level.low", "1.2 m")
    text.set("tank.insulated", "yes")
    text.set("screening.criteria", "us-40cfr60-kb, eu-94-63")
    assert text.get("tank.shell_diameter") == "24 m"
    assert text.get("tank.liquid_level.low") == "1.2 m"
    assert text.get("tank.insulated") == "true"
    assert text.get("screening.criteria") == "us-40cfr60-kb, eu-94-63"
    assert text.get("tank.liquid_level") is None and text.has("tank.liquid_level")
    assert tomllib.loads(text.toml()) == {
        "tank": {"shell_diameter": "24 m", "liquid_level": {"low": "1.2 m"}, "insulated": True},
        "screening": {"criteria": ["us-40cfr60-kb", "eu-94-63"]},
    }


def test_a_faulty_entry_is_kept_as_entered():
    text = CaseText()
    text.set("tank.shell_diameter", "35 C")
    text.set("tank.insulated", "perhaps")
    text.insert("tank.vents", {"count": "some"})
    again = CaseText.parse(text.toml())
    assert [again.get(p) for p in ("tank.shell_diameter", "tank.insulated", "tank.vents[0].count")] == [
        "35 C",
        "perhaps",
        "some",
    ]


def test_an_empty_text_takes_the_value_away():
    text = CaseText()
    text.set("tank.kind", "fixed-roof")
    text.set("tank.kind", "  ")
    assert text.get("tank.kind") is None and not text.has("tank.kind")
    text.set("tank.surface", "")
    assert not text.has("tank.surface")


def test_rows_are_put_in_moved_and_taken_away():
    text = CaseText()
    assert text.insert("blend.parts", {"species": "ethanol", "share": "10 %"}) == "blend.parts[0]"
    assert text.insert("blend.parts", {"stock": "field butane", "share": "90 %"}, at=0) == "blend.parts[0]"
    assert text.get("blend.parts[1].species") == "ethanol" and text.rows("blend.parts") == 2
    text.set("blend.parts[2].share", "1 %")
    assert text.rows("blend.parts") == 3
    text.remove("blend.parts[0]")
    assert text.get("blend.parts[0].species") == "ethanol" and text.rows("blend.parts") == 2
    text.remove("blend.parts[7]")
    text.remove("blend.nothing.here")
    assert text.rows("blend.parts") == 2 and text.rows("tank.vents") == 0


@pytest.mark.parametrize(
    ("act", "words"),
    [
        (lambda t: t.set("tank.vents[3].set", "1 kPa"), "no row 3"),
        (lambda t: t.set("tank.shell_diametre", "24 m"), "nearest: shell_diameter"),
        (lambda t: t.set("nonsense", "24 m"), "not a known key"),
        (lambda t: t.set("tank.liquid_level", "24 m"), "several values"),
        (lambda t: t.set("tank.vents", "24 m"), "several values"),
        (lambda t: t.set("site.weather_file", "x"), "not read yet"),
        (lambda t: t.set("blend.lab", "x"), "several values"),
        (lambda t: t.set("tank..kind", "x"), "not a known key|no place"),
        (lambda t: t.set("case.title", "\udc80"), "no file can hold"),
        (lambda t: t.insert("tank", {}), "not a list of tables"),
        (lambda t: t.insert("tank.vents", {"colour": "red"}), "not a known key"),
        (lambda t: t.get("tank vents"), "no place in a case"),
    ],
)
def test_what_cannot_be_set_says_why(act, words):
    with pytest.raises(InputError, match=words):
        act(CaseText())


@pytest.mark.parametrize("path", ["tank.kind", "tank.liquid_level.low", "tank.vents[0].set"])
def test_a_value_in_the_place_of_a_table_is_not_overwritten(path):
    text = CaseText.parse('tank = "the big one"')
    with pytest.raises(InputError, match="not in a table"):
        text.set(path, "1 m")
    assert text.get("tank") == "the big one"


def test_copies_are_independent():
    text = CaseText({"tank": {"kind": "fixed-roof"}})
    for other in (text.copy(), copy.deepcopy(text)):
        other.set("tank.kind", "horizontal")
        assert text.get("tank.kind") == "fixed-roof" and other != text
    text.table["tank"]["kind"] = "underground"
    assert text.get("tank.kind") == "fixed-roof"


@pytest.mark.parametrize("text", list(_texts()))
def test_what_is_written_is_what_was_read(text):
    again = CaseText.parse(text.toml())
    assert _plain(again.table) == _plain(tomllib.loads(text.toml())) == _plain(text.table)
    assert again.toml() == text.toml()


def _plain(table: dict) -> str:
    """A text to compare by: one not-a-number differs from another, its text does not."""
    return json.dumps(table, sort_keys=True, default=str)


@pytest.mark.parametrize("file", [*EXAMPLES, WHOLE], ids=lambda file: file.stem)
def test_read_write_read_gives_the_same_case(file, tables, tmp_path):
    case = read_case(file, tables=tables)
    text = CaseText.parse(file.read_text(encoding="utf-8"))
    for i, source in enumerate((text, case)):
        written = write_case(source, tmp_path / f"{i}.toml")
        again = read_case(written, tables=tables)
        assert _facts(again) == _facts(case)
    assert _facts(read_case(text, tables=tables)) == _facts(case)


def _facts(case):
    from dataclasses import replace

    return replace(case, source="", digest="")


def test_a_case_built_by_hand_has_no_text(tables):
    from screener.states.case import Case, Line, Site, Tank

    case = Case("by hand", None, Tank("fixed-roof"), Site(), Line())
    with pytest.raises(InputError, match="was not read from a case file"):
        write_case(case, "never.toml")
    assert not Path("never.toml").exists()


def test_a_template_survives_the_model():
    assert CaseText.parse(CaseText.parse(template()).toml()).table == tomllib.loads(template())


def test_the_layout_is_the_one_people_write():
    text = CaseText.parse(template()).toml()
    assert '[tank]\nkind = "fixed-roof"\n' in text
    assert 'liquid_level = { low = "1.2 m", normal = "9 m", high = "13.1 m" }\n' in text
    part = '{ stock = "summer gasoline base", share = "90 %", quality = "certificate" }'
    assert f"\nparts = [\n  {part},\n" in text
    assert "\n[tank.contents]\n" in text and text.startswith("[case]\n")


def test_writing_is_whole_or_not_at_all(tmp_path, monkeypatch):
    file = tmp_path / "case.toml"
    file.write_text("old", encoding="utf-8")
    os.chmod(file, 0o640)
    text = CaseText({"tank": {"kind": "fixed-roof"}})

    def broken(*_):
        raise OSError(28, "No space left on device")

    with monkeypatch.context() as patch:
        patch.setattr(os, "replace", broken)
        with pytest.raises(InputError, match="cannot be written: no space left on device"):
            write_case(text, file)
    assert file.read_text(encoding="utf-8") == "old" and os.listdir(tmp_path) == ["case.toml"]
    assert write_case(text, file) == file
    assert file.stat().st_mode & 0o777 == 0o640 and os.listdir(tmp_path) == ["case.toml"]
    assert CaseText.parse(file.read_text(encoding="utf-8")) == text


def test_writing_through_a_link_keeps_the_link(tmp_path):
    file, link = tmp_path / "case.toml", tmp_path / "link.toml"
    file.write_text("old", encoding="utf-8")
    link.symlink_to(file)
    write_case(CaseText({"tank": {"kind": "fixed-roof"}}), link)
    assert link.is_symlink() and "fixed-roof" in file.read_text(encoding="utf-8")


def test_a_folder_that_is_not_there_is_a_fault(tmp_path):
    with pytest.raises(InputError, match="cannot be written: no such file"):
        write_case(CaseText({"tank": {}}), tmp_path / "nowhere" / "case.toml")


def test_an_unknown_key_names_its_nearest():
    with pytest.raises(UnknownName, match="nearest: vacuum_set") as caught:
        CaseText().set("tank.vents[0].vacum_set", "1 kPa")
    assert caught.value.path == "tank.vents[0].vacum_set"


def test_what_toml_cannot_hold_is_refused():
    with pytest.raises(InputError, match="NoneType cannot stand in a case file"):
        toml_text({"tank": {"kind": None}})


_NAME = st.text(st.characters(exclude_categories=("Cs",)), max_size=8)
_SCALAR = st.one_of(
    st.booleans(),
    st.integers(-(2**63), 2**63 - 1),
    st.floats(allow_nan=False),
    st.text(st.characters(exclude_categories=("Cs",)), max_size=20),
    st.dates(),
    st.times(),
    st.datetimes(),
)
_VALUE = st.recursive(
    _SCALAR,
    lambda inner: st.one_of(st.lists(inner, max_size=4), st.dictionaries(_NAME, inner, max_size=4)),
    max_leaves=12,
)


@settings(max_examples=200, deadline=None, derandomize=True)
@given(st.dictionaries(st.one_of(_NAME, st.sampled_from(["tank", "site", "blend"])), _VALUE, max_size=5))
def test_any_table_is_written_so_that_it_reads_the_same(table):
    assert tomllib.loads(toml_text(table)) == table
