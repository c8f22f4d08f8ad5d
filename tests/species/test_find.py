"""Finding a species by what people type."""

from __future__ import annotations

import subprocess
import sys

import numpy as np
import pytest

from screener.ground.errors import UnknownName
from screener.species import columns, find, names, stand_in

TYPED = {
    "isooctane": "540-84-1", "2,2,4-trimethylpentane": "540-84-1", "iC5": "78-78-4", "i-C5": "78-78-4",
    "n-C4": "106-97-8", "nC4": "106-97-8", "nC7": "142-82-5", "butane": "106-97-8", "iC4": "75-28-5",
    "TBA": "75-65-0", "m-xylene": "108-38-3", "m xylene": "108-38-3", "nitrogen": "7727-37-9", "N2": "7727-37-9",
    "H2S": "7783-06-4", "IPA": "67-63-0", "isopropanol": "67-63-0", "EtOH": "64-17-5", "Ethanol": "64-17-5",
    "MTBE": "1634-04-4", "methyl tert-butyl ether": "1634-04-4", "64-17-5": "64-17-5", "  TOLUENE ": "108-88-3",
    "mesitylene": "108-67-8", "CO2": "124-38-9", "n-hexane": "110-54-3", "hexane": "110-54-3",
    "hydrogen sulphide": "7783-06-4", "cetane": "544-76-3", "tetralin": "119-64-2", "water": "7732-18-5",
}  # fmt: skip


@pytest.mark.parametrize("typed", TYPED)
def test_what_people_type(typed):
    assert find(typed).cas == TYPED[typed]


def test_every_name_and_synonym_finds_its_species():
    for name in names():
        one = find(name)
        assert one.name == name
        assert all(find(other) is one for other in (*one.synonyms, one.cas, name.upper()))


@pytest.mark.parametrize(
    "typed, nearest", [("ethanl", "ethanol"), ("tolune", "toluene"), ("n-butan", "n-butane")]
)
def test_a_slip_names_the_nearest(typed, nearest):
    with pytest.raises(
        UnknownName, match=f"'{typed}' is not a known species; nearest: .*{nearest}"
    ) as caught:
        find(typed)
    assert nearest in caught.value.nearest


@pytest.mark.parametrize(
    "typed", ["", "   ", "\n", "naphtha", "xylene", "C5", "propanol", "12345", "µ-🛢", "a" * 5000]
)
def test_odd_and_ambiguous_input_is_refused(typed):
    with pytest.raises(UnknownName, match="is not a known species"):
        find(typed)


def test_at_least_150_species_of_every_kind():
    families = {find(name).family for name in names()}
    assert len(names()) >= 150
    assert families == {"gas", "water", "paraffin", "isoparaffin", "naphthene", "olefin", "aromatic", "alcohol",
                        "ether", "ketone", "ester"}  # fmt: skip


def test_columns_keep_the_order_and_repeat():
    table = columns(["toluene", "n-butane", "toluene", "N2"])
    assert table.names == ("toluene", "n-butane", "toluene", "nitrogen")
    assert table.MW.shape == (4,) and table.groups.shape == (4, len(table.subgroups))
    assert table.MW[0] == find("toluene").MW == table.MW[2]
    assert not table.groups[3].any()
    assert tuple(np.array([table.L, table.M, table.N, table.C, table.D])[:, 1]) == find("n-butane").alpha


def test_stand_in_is_said():
    one, words = stand_in("625-27-4")  # 2-methyl-2-pentene: no vapour-pressure curve to be had
    assert one.formula == "C6H12" and "same formula and family" in words
    assert stand_in("50-00-0") is None


def test_import_is_light():
    """Finding a species loads NumPy and the standard library, nothing else."""
    code = (
        "import sys, screener.species as s; s.find('iC5'); s.columns(['n-butane', 'ethanol']);"
        "print(sorted({m.split('.')[0] for m in sys.modules} & {'scipy', 'thermo', 'chemicals', 'pandas', 'fluids'}))"
    )
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert done.stdout.strip() == "[]"
