"""Case files against the tables that come with the program, and through the command line."""

import math
from pathlib import Path

import pytest

from screener.casefile import CaseText, check_text, read_case, template
from screener.cli import main
from screener.ground.errors import CaseErrors, InputError

HERE = Path(__file__).parent
EXAMPLES = sorted((HERE.parents[1] / "examples").glob("*.toml"))
BROKEN = sorted((HERE / "cases" / "broken").glob("*.toml"))


@pytest.mark.parametrize("source", [*EXAMPLES, template()], ids=[*(f.stem for f in EXAMPLES), "template"])
def test_what_ships_reads(source):
    case = read_case(source)
    # mole fractions are divided by their sum, so only rounding is left
    assert math.isclose(sum(case.blend.z), 1.0, rel_tol=1e-12)
    assert case.inputs and case.criteria


def test_names_are_known_by_synonym_and_number():
    text = CaseText.parse(template())
    text.set("blend.parts[1].species", "64-17-5")
    by_number = read_case(text)
    assert by_number.blend.names == read_case(template()).blend.names
    assert check_text("blend.parts[1].species", "ethyl alcohol")[0] == "taken as ethanol"


def test_a_name_in_no_table_has_its_nearest():
    with pytest.raises(InputError, match="nearest: .*toluene"):
        check_text("blend.parts[0].species", "tolune")
    with pytest.raises(CaseErrors, match="nearest: .*us-40cfr60-kb"):
        read_case(template().replace("us-40cfr60-kb", "us-40cfr60-kbb"))


@pytest.mark.parametrize("file", BROKEN, ids=lambda file: file.stem)
def test_the_command_line_lists_every_fault_and_gives_code_3(file, capsys):
    paths = [line[2:].split(" | ")[0].strip() for line in file.read_text().splitlines() if line[:2] == "#!"]
    assert main(["check", str(file)]) == 3
    out, err = capsys.readouterr()
    assert out == "" and "Traceback" not in err
    assert all(f"{file}: {path}: " in err for path in paths), err
