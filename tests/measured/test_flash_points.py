"""Flash points and flammable windows against measurement. Agreement is loose and printed; nothing is tuned.

Sources: closed-cup flash points and lower limits of IEC 60079-20-1 and NFPA 497
(data/species/flammability.csv); others beside each table.
"""

from __future__ import annotations

import runpy
from dataclasses import replace
from pathlib import Path

import numpy as np
import pytest

from screener.blends import Blend, union
from screener.equilibrium import Fluid
from screener.fire import (
    Flammability,
    contaminated_flash_point,
    flammable_window,
    flash_point,
    flash_point_by_distillation,
)
from screener.ground.constants import ATMOSPHERE
from screener.species import find, names

# Species whose flash point from the lower limit misses the tabled one by more than 8 K, and the likely cause.
BEYOND_8_K = {
    "n-pentane": "tabled -40 degC, where the vapour is 2.7 times the limit; -49 degC elsewhere",
    "ethylcyclohexane": "tabled flash point too high: 24 degC, n-octane that boils nearby has 13",
    "ethylcyclopentane": "tabled flash point too high: 5 degC, methylcyclohexane that boils there has -4",
    "1-decene": "tabled lower limit too low: 0.55 %, n-decane has 0.70",
}


def celsius(T):
    return np.asarray(T) - 273.15


def test_pure_flash_points_from_limits(record_property):
    both = [name for name in names() if find(name).flash_point and find(name).LFL]
    fluid = Fluid.of(both)
    computed = flash_point(fluid, np.eye(fluid.c), method="le-chatelier").require().T
    miss = computed - np.array([find(name).flash_point for name in both])
    table = sorted(zip(miss, both, strict=True))
    record_property("computed_minus_tabled_K", [f"{name} {m:.1f}" for m, name in table])
    record_property("median_K", float(np.median(np.abs(miss))))
    assert len(both) >= 25
    assert np.median(np.abs(miss)) <= 3.5
    assert {name for m, name in table if abs(m) > 8.0} == set(BEYOND_8_K)


def test_rows_judged_bad_are_not_used():
    """Named in data/species/flammability.toml: the vapour there is several times the lower limit, or none
    at all."""
    for name in ("1-pentene", "ethane", "2,3-dimethylbutane", "methylcyclopentane", "cyclopentene"):
        assert find(name).flash_point is None
    assert celsius(find("isobutanol").flash_point) == pytest.approx(28.0, abs=0.01)
    assert celsius(find("MTBE").flash_point) == pytest.approx(-27.0, abs=0.01)


# Ethanol in water: percent of ethanol and flash point in degC, table at engineeringtoolbox.com ("Ethanol
# freeze protected water solutions"), which heads it percent by weight; encyclopedias print the same figures
# from 10 % on as percent by volume. Given in degF, rounded to 1 degF; method not stated.
ETHANOL_WATER = [(5, 62), (10, 49), (20, 36), (30, 29), (40, 26), (50, 24), (60, 22), (70, 21), (80, 20),
                 (90, 17), (96, 17)]  # fmt: skip
DENSITY = {"ethanol": 789.3, "water": 998.2}  # [kg/m3] at 20 degC; handbook values, from memory, unverified


@pytest.mark.parametrize(("basis", "worst"), [("volume", 4.0), ("mass", 8.0)])
def test_ethanol_in_water(basis, worst, record_property):
    fluid = Fluid.of(["ethanol", "water"])
    share, measured = np.array(ETHANOL_WATER, dtype=float).T
    weight = np.stack([share, 100.0 - share], axis=1)
    if basis == "volume":
        weight = weight * [DENSITY["ethanol"], DENSITY["water"]]
    moles = weight / fluid.MW
    flash = celsius(flash_point(fluid, moles / moles.sum(axis=1, keepdims=True)).require().T)
    miss = flash - measured
    record_property("computed_minus_measured_K", [round(float(m), 1) for m in miss])
    record_property("rms_K", float(np.sqrt(np.mean(miss**2))))
    # Volume is the reading that fits. The tester reads 17 degC for nearly pure ethanol, IEC has 12 for pure:
    # that difference is in the band. By weight the watery end misses by up to 7 K, which says that the
    # heading of the table is wrong rather than the model.
    assert np.abs(miss).max() <= worst
    assert np.abs(miss).max() > 4.0 or basis == "volume"


def test_propanol_in_decane(record_property):
    """Tag open cup: 1-propanol 28 degC, least 27 degC at 0.71 mole fraction of it (koreascience.or.kr,
    JAKO200511722717227, 2005). The flash point of 1-propanol is the one of that cup; that of n-decane was not
    read and stays the closed-cup one, which pulls the curve down a little."""
    fluid = Fluid.of(["1-propanol", "n-decane"])
    limits = Flammability.of(fluid)
    own = replace(limits, P_flash=np.array([find("1-propanol").psat(273.15 + 28.0), limits.P_flash[1]]))
    x = np.linspace(0.0, 1.0, 101)
    flash = celsius(flash_point(fluid, np.stack([x, 1.0 - x], axis=1), flammability=own).require().T)
    record_property("least_degC", float(flash.min()))
    record_property("at_mole_fraction", float(x[flash.argmin()]))
    # Readings to 1 degC, repeatability not stated: 2 K.
    assert flash[71] == pytest.approx(27.0, abs=2.0)
    assert flash.min() == pytest.approx(27.0, abs=2.0) and flash.min() < flash[-1]


def test_gasoline_in_diesel_is_bounded(record_property):
    """Diesel of 75 degC with 5 % gasoline: 25 degC, Mowrer and others, DOT HS 807 484 (1989), as quoted at
    depts.washington.edu/vehfire. Equilibrium keeps the light ends that the tester loses, so it lies below."""
    blends = [Blend.of({"stock:diesel": 1.0}), Blend.of({"stock:summer gasoline base": 1.0})]
    species, Z = union(blends)
    flash = celsius(contaminated_flash_point(Fluid.of(species), Z[0], Z[1], [0.0, 0.05]).require().T)
    record_property("computed_degC", [round(float(T), 1) for T in flash])
    assert flash[0] == pytest.approx(75.0, abs=8.0)  # another diesel: an invented stock
    assert flash[1] < 25.0 and flash[0] - flash[1] > 50.0


OILS = Path(__file__).resolve().parents[1] / "studies" / "oil_flash_points.py"


def test_oils_with_a_known_light_end(record_property):
    """Grade A of the laboratory of Environment and Climate Change Canada, ASTM D7094 closed cup: topped
    crudes from their merged distillation curve and density. Grades B and C are in
    tests/studies/oil_flash_points.md."""
    study = runpy.run_path(str(OILS), run_name="not_main")
    rows = study["oils"]("A")
    miss = {
        f"{row['oil_id']} {row['sample']}": study["computed"](row)[0] - float(row["flash_C"]) for row in rows
    }
    record_property("computed_minus_measured_K", {name: round(float(m), 1) for name, m in miss.items()})
    assert len(miss) == 5
    # Reproducibility of the tester 4 to 8 K, and 5 K for what the curve leaves open.
    assert max(abs(m) for m in miss.values()) <= 10.0


# POSF number, T10 and flash point in degC: AFRL-RQ-WP-TR-2020-0017 (Edwards 2020), table 8.
JETS_D86 = [
    (7629, 164.0, 42.0),
    (5729, 162.0, 46.0),
    (7635, 179.0, 44.0),
    (11498, 178.0, 50.0),
    (12924, 164.0, 44.0),
]


def test_distillation_estimate_on_jet_fuels(record_property):
    T_10, measured = np.array(JETS_D86)[:, 1:].T
    miss = celsius(flash_point_by_distillation(T_10 + 273.15).require().T) - measured
    record_property(
        "computed_minus_measured_K",
        {row[0]: round(float(m), 1) for row, m in zip(JETS_D86, miss, strict=True)},
    )
    # 7635 has its initial point 32 K below its 10 % point, the others 5 to 17: the estimate does not see
    # that.
    narrow = np.array([row[0] != 7635 for row in JETS_D86])
    assert np.abs(miss[narrow]).max() < 8.0
    assert miss[~narrow][0] > 8.0  # and errs on the dangerous side


GASOLINES = ("summer gasoline base", "winter gasoline base", "average gasoline", "summer gasoline 1985")


def test_gasoline_is_too_rich_above_minus_7(record_property):
    """MIL-HDBK-1022A 2.3.1.1: gasoline too rich above -7 degC, may be flammable at or below it; SP Report
    2008:15: upper end of a winter petrol about -20 degC."""
    for name in GASOLINES:
        blend = Blend.of({f"stock:{name}": 1.0})
        upper = celsius(flammable_window(blend.fluid, blend.z).require().T_upper[0])
        record_property(name, round(float(upper), 1))
        assert upper < -7.0
        if name.startswith("winter"):
            assert upper == pytest.approx(-20.0, abs=8.0)  # 98 kPa here, a Swedish winter petrol 65 to 95 kPa


def test_e85_in_summer_and_winter(record_property):
    """SP Report 2008:15, spark tests in a closed bomb: summer E85 flammable from -18 to +2..+5 degC, winter
    E85 up to -8..-9 degC. The lower end computed is colder: a spark needs more than the limit."""
    for name, low, high in (("summer gasoline base", 2.0, 5.0), ("winter gasoline base", -9.0, -8.0)):
        blend = Blend.of({"species:ethanol": 0.85, f"stock:{name}": 0.15})
        window = flammable_window(blend.fluid, blend.z).require()
        ends = celsius([window.T_lower[0], window.T_upper[0]])
        record_property(name, [round(float(T), 1) for T in ends])
        # The gasolines of the tests are not these stocks: 4 K of upper end for 10 kPa of vapour pressure.
        assert low - 4.0 < ends[1] < high + 4.0
        if name.startswith("summer"):
            assert ends[0] < -18.0


def test_altitude_moves_a_kerosene_as_it_moved_jet_a(record_property):
    """Nestor 1967: 0.645 and 1.09 K per 1,000 ft, another jet A in a tank one eighth full (ratio 7)."""
    blend = Blend.of({"stock:jet kerosene": 1.0})
    kft = np.arange(0.0, 45.0, 10.0)
    # Standard atmosphere of ICAO up to 11 km, from memory; 12.2 km is 0.1 % off by it.
    P = ATMOSPHERE * (1.0 - 2.25577e-5 * kft * 304.8) ** 5.25588
    window = flammable_window(blend.fluid, blend.z, P=P, ratio=7.0).require()
    slopes = [-np.polyfit(kft, T, 1)[0] for T in (window.T_lower, window.T_upper)]
    record_property("K_per_kft", [round(float(s), 3) for s in slopes])
    assert slopes == pytest.approx(
        [0.645, 1.09], rel=0.2
    )  # rig against equilibrium, one fuel against another
