"""Limits of public law, as read in the rules named.

Each row: pack, kind, tank volume [m3], the lowest limit expected [Pa] and where it was read.
psia figures are converted with 6,894.757 Pa; the table holds whole pascals.
"""

import pytest

from screener.tank.roof_rules import rules_for

PSI = 6894.757

READ = [
    # 40 CFR 60.112b(a), 60.110b, edition of 1 July 2009
    ("us-40cfr60-kb", "fixed-roof", 5000.0, 5200.0),
    ("us-40cfr60-kb", "fixed-roof", 100.0, 27600.0),
    ("us-40cfr60-kb", "internal-floating-roof", 5000.0, 76600.0),
    ("us-40cfr60-kb", "external-floating-roof", 80.0, 76600.0),
    # 40 CFR 60.112a through Wis. NR 440.28; Wis. NR 420.03(2)
    ("us-40cfr60-ka", "fixed-roof", 200.0, 10300.0),
    ("us-wi-nr420", "fixed-roof", 200.0, 10500.0),
    ("us-wi-nr420", "internal-floating-roof", 200.0, 77000.0),
    # 40 CFR 63 subpart HHHHHHH, table 3
    ("us-40cfr63-hhhhhhh", "fixed-roof", 100.0, 4.0 * PSI),
    ("us-40cfr63-hhhhhhh", "fixed-roof", 1000.0, 0.75 * PSI),
    ("us-40cfr63-hhhhhhh", "fixed-roof", 10.0, 11.1 * PSI),
    ("us-40cfr63-hhhhhhh", "internal-floating-roof", 1000.0, 11.1 * PSI),
    # Directive 94/63/EC, petrol
    ("eu-94-63", "fixed-roof", 1000.0, 27600.0),
    # arrete of 3 October 2010, article 48
    ("fr-2010-10-03", "fixed-roof", 2000.0, 1500.0),
    ("fr-2010-10-03", "internal-floating-roof", 2000.0, 50000.0),
    # California Health and Safety Code 41953; Michigan R336.1604; Pima County, Arizona
    ("us-ca-hsc-41953", "external-floating-roof", 50.0, 11.0 * PSI),
    ("us-mi-r336-1604", "fixed-roof", 1000.0, 1.5 * PSI),
    ("us-mi-r336-1604", "internal-floating-roof", 1000.0, 11.0 * PSI),
    ("us-az-pima", "internal-floating-roof", 1000.0, 12.0 * PSI),
]


@pytest.mark.parametrize("pack, kind, volume, limit", READ)
def test_lowest_limit(pack, kind, volume, limit):
    first = rules_for(pack, kind, volume)[0]
    assert first.role == "limit" and first.evidence == "law"
    # Whole pascals in the table: half a pascal.
    assert first.limit == pytest.approx(limit, abs=0.5)


def test_boiling_in_an_atmospheric_tank():
    # 8 CCR 5585(c): not at or above the boiling point; the limit is the barometer.
    for kind in ("fixed-roof", "internal-floating-roof", "underground"):
        (rule,) = rules_for("us-8ccr-5585", kind, 10.0)
        assert rule.limit is None and rule.evidence == "law"
    assert rules_for("us-8ccr-5585", "pressure-vessel", 10.0) == ()


def test_scope_of_kb():
    # 40 CFR 60.110b: 3.5 kPa from 151 m3, 15.0 kPa from 75 to 151 m3, nothing below 75 m3.
    scope = {
        volume: [r.limit for r in rules_for("us-40cfr60-kb", "fixed-roof", volume) if r.role == "scope"]
        for volume in (74.0, 100.0, 151.0)
    }
    assert scope == {74.0: [], 100.0: [15000.0], 151.0: [3500.0]}
