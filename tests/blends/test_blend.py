"""Blending by volume, mass and mole; faults; heel and receipt."""

from __future__ import annotations

import dataclasses

import numpy as np
import pytest

from screener.blends import Blend, density, density_at, mix, stock, union
from screener.ground.constants import T_60F
from screener.ground.errors import CaseErrors, InputError, ShapeError, UnknownName
from screener.species import find
from screener.volatility import petroleum_expansion


def share(blend, name, kind="volume_fractions"):
    values = getattr(blend, kind)
    return float(values[blend.names.index(name)])


def test_shares_come_back_on_their_basis():
    parts = {"n-hexane": 0.5, "toluene": 0.3, "ethanol": 0.2}
    for basis, kind in (("volume", "volume_fractions"), ("mass", "w"), ("mole", "z")):
        blend = Blend.of(parts, basis=basis)
        assert [share(blend, n, kind) for n in parts] == pytest.approx([0.5, 0.3, 0.2], abs=1e-14)


def test_density_by_hand():
    """Half and half by volume: the mean of the densities; by mass: the harmonic mean."""
    hexane, toluene = find("n-hexane").rho_15, find("toluene").rho_15
    parts = {"n-hexane": 0.5, "toluene": 0.5}
    assert Blend.of(parts).density_15 == pytest.approx(0.5 * (hexane + toluene), rel=1e-14)
    assert Blend.of(parts, basis="mass").density_15 == pytest.approx(
        2.0 / (1.0 / hexane + 1.0 / toluene), rel=1e-14
    )


def test_molar_mass_and_volume():
    blend = Blend.of({"n-hexane": 0.25, "toluene": 0.75}, basis="mole")
    assert blend.MW == pytest.approx(0.25 * find("n-hexane").MW + 0.75 * find("toluene").MW, rel=1e-14)
    assert blend.v_15 == pytest.approx(blend.MW / blend.density_15, rel=1e-14)


def test_equal_species_are_merged():
    blend = Blend.of({"stock:natural gasoline": 0.5, "stock:light naphtha": 0.3, "n-pentane": 0.2})
    assert len(set(blend.names)) == len(blend.names)
    assert sum(blend.moles) == pytest.approx(1.0, abs=1e-12)
    assert [p.kind for p in blend.parts] == ["stock", "stock", "species"]


def test_synonyms_are_one_species():
    assert Blend.of({"species:2,2,4-trimethylpentane": 0.5, "species:isooctane": 0.5}).names == ("isooctane",)


def test_zero_share_leaves_nothing():
    assert "ethanol" not in Blend.of({"n-hexane": 1.0, "ethanol": 0.0}).names


def test_shares_at_60F_by_hand():
    """Each part swells from 15 degC to 60 degF by its own rule; the shares hold at 60 degF."""
    parts = {"stock:heavy naphtha": 0.9, "species:ethanol": 0.1}
    at_60F, at_15C = Blend.of(parts, at="60 degF"), Blend.of(parts)
    naphtha = Blend.of({"stock:heavy naphtha": 1.0})
    swell_naphtha = petroleum_expansion(naphtha.density_15, T_60F)[0]
    swell_ethanol = Blend.of({"ethanol": 1.0}).expansion(T_60F)[0]
    v = 0.1 / swell_ethanol / (0.1 / swell_ethanol + 0.9 / swell_naphtha)
    assert share(at_60F, "ethanol") == pytest.approx(v, rel=1e-12)
    assert share(at_15C, "ethanol") == pytest.approx(0.1, rel=1e-12)
    assert any("60 degF" in line for line in at_60F.report.assumed)


def test_oxygenates_by_volume():
    blend = Blend.of({"stock:summer gasoline base": 0.85, "ethanol": 0.10, "MTBE": 0.05})
    base = Blend.of({"summer gasoline base": 1.0}).oxygenates
    assert blend.oxygenates["ethanol"] == pytest.approx(0.10, abs=1e-12)
    assert blend.oxygenates["MTBE"] == pytest.approx(0.05 + 0.85 * base.get("MTBE", 0.0), abs=1e-12)


def test_frozen_and_hashable():
    one, two = Blend.of({"ethanol": 0.1, "n-hexane": 0.9}), Blend.of({"ethanol": 0.1, "n-hexane": 0.9})
    assert one == two and hash(one) == hash(two)
    with pytest.raises(dataclasses.FrozenInstanceError, match="cannot assign to field 'title'"):
        one.title = "x"


def test_title_and_report():
    blend = Blend.of({"stock:diesel": 0.999, "stock:summer gasoline base": 0.001})
    assert blend.title == "99.9 % diesel + 0.1 % summer gasoline base"
    assert "diesel is an invented composition" in blend.report.assumed
    assert any(
        "8.2 % of the mass is unidentified; mass the analysis could not name" in line
        for line in blend.report.assumed
    )
    assert any("profile 4634" in line and "published" in line for line in blend.report.sources)


def test_small_misses_of_the_sum_are_scaled_and_said():
    blend = Blend.of({"n-hexane": 0.5002, "toluene": 0.5})
    assert share(blend, "n-hexane") == pytest.approx(0.5002 / 1.0002, rel=1e-12)
    assert "the shares sum to 100.02 % and were brought to 100 %" in blend.report.assumed


@pytest.mark.parametrize(
    ("parts", "message"),
    [({"n-hexane": 0.5, "toluene": 0.4}, "the shares sum to 90 %; they must sum to 100 % within 0.05 %"),
     ({"n-hexane": 1.0, "toluene": 6e-4}, "the shares sum to 100.1 %"),
     ({"n-hexane": 1.1, "toluene": -0.1}, r"parts\[1\]: toluene: -0.1 is no share; a share lies"),
     ({"n-hexane": float("nan")}, "nan is no share"),
     ({}, "a blend needs at least one part")],
)  # fmt: skip
def test_faulty_shares(parts, message):
    with pytest.raises(InputError, match=message):
        Blend.of(parts)


def test_unknown_names_carry_the_nearest_and_the_place():
    with pytest.raises(
        UnknownName, match=r"parts\[1\]: 'etanol' is not a known species or stock; nearest: .*ethanol"
    ):
        Blend.of({"n-hexane": 0.5, "etanol": 0.5})
    with pytest.raises(
        UnknownName, match="'sumer gasoline base' is not a known stock; nearest: .*summer gasoline base"
    ):
        Blend.of({"stock:sumer gasoline base": 1.0})
    with pytest.raises(UnknownName, match="'hexan' is not a known species"):
        Blend.of({"species:hexan": 1.0})


def test_every_unknown_name_is_told_at_once():
    with pytest.raises(CaseErrors, match=r"parts\[0\]: 'hexan' is(.|\n)*parts\[2\]: 'etanol' is") as caught:
        Blend.of({"hexan": 0.3, "toluene": 0.3, "etanol": 0.4})
    assert [type(fault) for fault in caught.value.faults] == [UnknownName, UnknownName]


def test_faulty_basis_and_base_temperature():
    with pytest.raises(InputError, match="'weight' is not a basis of shares; one of volume, mass, mole"):
        Blend.of({"ethanol": 1.0}, basis="weight")
    with pytest.raises(
        InputError, match="volumes at '20 degC' are not a trade volume; one of 15 degC, 60 degF"
    ):
        Blend.of({"ethanol": 1.0}, at="20 degC")


def test_gas_without_liquid_is_said():
    blend = Blend.of({"n-hexane": 0.99, "nitrogen": 0.01}, basis="mole")
    assert any("nitrogen has no liquid at 15 degC" in line for line in blend.report.assumed)


def test_mixed_with_is_the_blend_of_the_parts():
    base, ethanol = Blend.of({"stock:winter gasoline base": 1.0}), Blend.of({"ethanol": 1.0})
    mixed = base.mixed_with(ethanol, volume=900.0, other_volume=100.0)
    direct = Blend.of({"stock:winter gasoline base": 0.9, "ethanol": 0.1})
    assert mixed.names == direct.names
    assert mixed.z == pytest.approx(direct.z, abs=1e-14)
    assert mixed.density_15 == pytest.approx(0.9 * base.density_15 + 0.1 * ethanol.density_15, rel=1e-12)


def test_mixed_with_refuses_volumes_that_are_none():
    a, b = Blend.of({"n-hexane": 1.0}), Blend.of({"ethanol": 1.0})
    with pytest.raises(InputError, match="other_volume: -1.0 is not a volume; zero or more"):
        a.mixed_with(b, volume=1.0, other_volume=-1.0)
    with pytest.raises(InputError, match="both volumes are zero"):
        a.mixed_with(b, volume=0.0, other_volume=0.0)


def test_union_keeps_every_composition():
    blends = [
        Blend.of({"n-hexane": 0.5, "ethanol": 0.5}),
        Blend.of({"toluene": 1.0}),
        Blend.of({"ethanol": 1.0}),
    ]
    names, Z = union(blends, extra=("nitrogen", "ethanol"))
    assert names == ("n-hexane", "ethanol", "toluene", "nitrogen")
    assert Z.sum(axis=1) == pytest.approx(np.ones(3), abs=1e-14)
    assert Z[0, :2] == pytest.approx(blends[0].z) and Z[1, 2] == 1.0 and Z[2, 1] == 1.0


def test_mix_lane_by_lane_equals_mixed_with():
    heel, receipt = (
        Blend.of({"stock:heavy naphtha": 1.0}),
        Blend.of({"stock:winter gasoline base": 0.9, "ethanol": 0.1}),
    )
    names, Z = union([heel, receipt])
    V_1, V_2 = np.array([100.0, 2000.0, 0.0]), np.array([900.0, 500.0, 10.0])
    mixed = mix(names, Z[0], V_1, Z[1], V_2)
    for i in range(3):
        single = heel.mixed_with(receipt, volume=V_1[i], other_volume=V_2[i])
        _, row = union([Blend(names, tuple(np.zeros(len(names)))), single])
        assert mixed[i] == pytest.approx(row[1], abs=1e-14)


def test_mix_faults():
    names, Z = union([Blend.of({"n-hexane": 1.0}), Blend.of({"ethanol": 1.0})])
    assert np.isnan(mix(names, Z[0], [-1.0, 0.0], Z[1], [2.0, 0.0])).all()
    with pytest.raises(ShapeError, match=r"z_1: got shape \(1, 1\), expected \(n, 2\)"):
        mix(names, [1.0], 1.0, Z[1], 1.0)


def test_density_of_a_blend_and_of_a_number():
    gasoline = Blend.of({"stock:summer gasoline base": 1.0})
    T = np.array([273.15, 300.0])
    # 0.12 % MTBE in the analysis is petroleum like the rest: the two ways are one.
    assert density(gasoline, T) == pytest.approx(
        density_at(gasoline.density_15, T, gasoline.volume_group), rel=1e-12
    )
    condensate = Blend.of({"stock:condensate": 1.0})
    assert condensate.volume_group == "crude"
    groups = np.array(["crude", ""])
    both = density_at([condensate.density_15, gasoline.density_15], 300.0, groups)
    assert both == pytest.approx([density(condensate, 300.0)[0], density(gasoline, 300.0)[0]], rel=1e-12)


def test_density_of_light_liquids_by_number():
    butane = Blend.of({"n-butane": 1.0})
    assert density_at(butane.density_15, 300.0) == pytest.approx(density(butane, 300.0), rel=1e-9)


def test_crude_group_needs_more_than_half():
    assert Blend.of({"stock:condensate": 0.6, "stock:diesel": 0.4}).volume_group == "crude"
    assert Blend.of({"stock:condensate": 0.4, "stock:diesel": 0.6}).volume_group == ""
    assert stock("condensate").product == "crude"
