"""Whatever stands in a case file, the answer is a case or a list of faults, never anything else."""

import tomllib
from pathlib import Path

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from screener.casefile import CaseText, all_keys, check_text, kinds, quantity, read_case
from screener.casefile.keys import LATER, ROWS, TABLE, key_at
from screener.casefile.spellings import fold
from screener.casefile.toml_text import toml_text
from screener.ground.errors import CaseErrors, InputError, UnitError

WHOLE = tomllib.loads((Path(__file__).parent / "cases" / "whole.toml").read_text(encoding="utf-8"))
PLACES = [path.replace("[]", "[0]") for path, key in all_keys().items() if key.kind not in (TABLE, ROWS)]
TABLES = [path.replace("[]", "[0]") for path, key in all_keys().items() if key.kind in (TABLE, ROWS)]

_TEXT = st.text(st.characters(exclude_categories=("Cs",)), max_size=16)
_ALMOST = st.from_regex(
    r"[+-]?[0-9]{1,4}[.,]?[0-9]{0,3} ?(m|kPa|degC|degF|%|vol%|Nm3/h|psig|K|C|t|bar|m3/h)?"
)
_SCALARS = st.one_of(
    _TEXT,
    _ALMOST,
    st.booleans(),
    st.integers(),
    st.floats(),
    st.dates(),
    st.datetimes(),
    st.times(),
    st.sampled_from(
        ["", " ", "fixed-roof", "ethanol", "2026-07-14", "Jul", "none", "air-saturated at 15 C", "1e400 m"]
    ),
)
_VALUES = st.one_of(_SCALARS, st.lists(_SCALARS, max_size=3), st.dictionaries(_TEXT, _SCALARS, max_size=3))
_MANY = settings(
    max_examples=300,
    deadline=None,
    derandomize=True,
    suppress_health_check=[HealthCheck.function_scoped_fixture],
)


def _put(place: str, value: object) -> CaseText:
    """The whole case with one value replaced, whatever it is."""
    text = CaseText(WHOLE)
    *before, name = place.split(".")
    holder = text._table
    for step in before:
        holder = holder[step.removesuffix("[0]")]
        holder = holder[0] if step.endswith("[0]") else holder
    holder[name.removesuffix("[0]").strip('"')] = value
    return text


@_MANY
@given(place=st.sampled_from(PLACES + TABLES), value=_VALUES)
def test_any_value_anywhere_gives_a_case_or_faults(place, value, tables):
    text = _put(place, value)
    try:
        case = read_case(text, tables=tables)
    except CaseErrors as error:
        assert error.faults
        assert all(isinstance(fault, InputError) and fault.path and str(fault) for fault in error.faults)
    else:
        assert case.inputs


@pytest.mark.parametrize("place", ["tank.shell_diameter", "tank.vents[0].count", "blend.parts[0].share"])
def test_a_whole_number_too_long_to_print_is_a_fault(place, tables):
    # hexadecimal passes the limit that Python puts on reading long numbers in tens
    text = _put(place, "NUMBER").toml().replace('"NUMBER"', "0x" + "F" * 5000)
    with pytest.raises(CaseErrors, match="too long for TOML") as caught:
        read_case(text, tables=tables)
    assert [fault.path for fault in caught.value.faults] == [place]


@_MANY
@given(text=st.text(st.characters(exclude_categories=("Cs",)), max_size=200))
def test_any_text_gives_faults(text, tables):
    with pytest.raises(CaseErrors, match="."):
        read_case(text + "\n", tables=tables)


@_MANY
@given(
    table=st.dictionaries(
        st.sampled_from(["case", "blend", "tank", "site", "line", "screening", "x"]), _VALUES
    )
)
def test_any_table_of_sections_gives_faults(table, tables):
    with pytest.raises(CaseErrors, match="."):
        read_case(toml_text(table), tables=tables)


@_MANY
@given(text=st.one_of(_TEXT, _ALMOST), kind=st.sampled_from(kinds()))
def test_any_text_is_a_quantity_or_a_unit_error(text, kind):
    try:
        value = quantity(text, kind)
    except UnitError as error:
        assert str(error)
    else:
        number = value[0] if kind == "pressure" else value
        assert isinstance(number, float) and number - number == 0.0  # finite


@_MANY
@given(text=st.one_of(_TEXT, _ALMOST), path=st.sampled_from(PLACES))
def test_any_text_in_a_field_is_taken_or_refused(text, path, tables):
    try:
        echo, value = check_text(path, text, tables=tables)
    except InputError as error:
        assert error.path == path and str(error)
    else:
        assert echo.startswith("taken as ") or (echo == "" and value is None)
        assert key_at(path).kind != LATER


@_MANY
@given(_TEXT)
def test_folding_twice_changes_nothing_more(text):
    assert fold(fold(text)) == fold(text)
