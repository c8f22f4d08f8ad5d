"""End columns of the paint table against French law.

Read: arrete of 3 October 2010, NOR DEVP1025848A, annex III, good and poor condition.
"""

import pytest

from screener.tank.paint import paint_table

PRINTED = {
    "aluminium specular": (0.39, 0.49),
    "aluminium diffuse": (0.60, 0.68),
    "aluminium mill finish": (0.10, 0.15),
    "beige or cream": (0.35, 0.49),
    "black": (0.97, 0.97),
    "brown": (0.58, 0.67),
    "grey light": (0.54, 0.63),
    "grey medium": (0.68, 0.74),
    "green dark": (0.89, 0.91),
    "red primer": (0.89, 0.91),
    "tan": (0.43, 0.55),
    "white": (0.17, 0.34),
}


@pytest.mark.parametrize("row", PRINTED)
def test_good_and_poor(row):
    entry = paint_table()[row]
    assert (entry.new, entry.aged) == PRINTED[row]
    assert entry.ends_evidence == "law"


def test_only_rows_read_in_the_law_are_marked_law():
    assert {name for name, row in paint_table().items() if row.ends_evidence == "law"} == set(PRINTED)
