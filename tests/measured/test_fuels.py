"""Real fuels: computed beside measured vapour pressure, and the ethanol effect on real gasolines.

Bands are those of the data: profile 2449 leaves 17.8 % of its mass unidentified, which
moves the computed value by some 10 %; the method behind the crude's Reid vapour pressure
is not stated.
"""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from screener.blends import Blend, stock, union
from screener.equilibrium import Fluid
from screener.ground.constants import T_100F, ZERO_CELSIUS
from screener.volatility import dvpe, petroleum_expansion, reid_vapour_pressure, vapour_pressure_at_ratio

PSI = 6894.757  # Pa


# US EPA SPECIATE 5.2, profile 2449 (Fujita et al. 1997): mean of fifteen samples at 100 degF, 7.9 psi.
def test_gasoline_profile_2449(record_property):
    item = stock("average gasoline")
    assert item.unnamed == pytest.approx(0.1775, abs=1e-4)  # as the profile prints it
    blend = Blend.of({"stock:average gasoline": 1.0})
    test = dvpe(blend.fluid, blend.z).require()
    record_property("computed_DVPE_kPa", float(test.P[0]) / 1e3)
    assert test.P[0] == pytest.approx(7.9 * PSI, abs=4e3)
    # The printed figure may be a Reid pressure: that reading lies in the band as well.
    assert reid_vapour_pressure(blend.fluid, blend.z).require().P[0] == pytest.approx(7.9 * PSI, abs=4e3)


# Public crude assay LIZA20X, 4 June 2020: mass percent on crude, densities [kg/m3], molar masses [g/mol];
# whole crude 865.06 kg/m3 at 15 degC, Reid vapour pressure 5.7187 psi, method not stated.
CRUDE_DENSITY, CRUDE_RVP = 865.0575, 5.71868757684 * PSI
LIGHT = {"ethane": 0.0844850094, "propane": 0.252220198, "isobutane": 0.1614209267, "n-butane": 0.6961277465,
         "isopentane": 0.6078060241, "n-pentane": 0.7970158257, "cyclopentane": 0.1412433109}  # fmt: skip
C6_PARAFFINS, BENZENE, C7_PARAFFINS, TOLUENE = 1.558558026, 0.0601200239, 1.445232874, 0.2786055058
CUT_TO_65C, CUT_TO_100C = 2.80659397, 4.32968227
CUTS = {  # 212 to 662 degF: mass percent, density, molar mass
    "100 to 150 degC": (7.18511333, 759.8, 109.67), "150 to 200 degC": (7.31366686, 795.58, 137.29),
    "200 to 250 degC": (7.9123374, 824.5, 170.01), "250 to 300 degC": (8.9211052, 849.72, 207.97),
    "300 to 350 degC": (9.22730994, 864.96, 254.11),
}  # fmt: skip
RESIDUE = ((3.66039705, 885.31, 287.86), (47.68289767, 948.38, 526.5))  # 350 to 370 degC, and above
STEMS = ("hex", "hept", "oct", "non", "dec", "undec", "dodec", "tridec", "tetradec", "pentadec", "hexadec")
PARAFFINS = tuple(f"n-{stem}ane" for stem in (*STEMS, "heptadec", "octadec", "nonadec", "eicos"))


def crude():
    """The crude as a fluid: light ends as analysed, cuts as pairs of normal paraffins of their molar mass.

    Up to 100 degC what the analysis does not name is naphthenes. The residue is carried by
    n-eicosane with its own molar mass and volume.
    """
    mass = dict(LIGHT)
    c6_light = CUT_TO_65C - sum(LIGHT[k] for k in ("isopentane", "n-pentane", "cyclopentane"))
    mass["2-methylpentane"] = mass["3-methylpentane"] = c6_light / 2.0
    mass["n-hexane"] = C6_PARAFFINS - c6_light
    mass["benzene"], mass["toluene"] = BENZENE, TOLUENE
    for name in ("2-methylhexane", "3-methylhexane", "n-heptane"):
        mass[name] = C7_PARAFFINS / 3.0
    naphthenes = CUT_TO_100C - mass["n-hexane"] - BENZENE - C7_PARAFFINS
    mass["methylcyclopentane"] = mass["cyclohexane"] = naphthenes / 2.0
    names = tuple(dict.fromkeys((*mass, *PARAFFINS)))
    fluid = Fluid.of(names)
    moles = {name: 0.0 for name in names}
    volume = {name: 0.0 for name in names}
    MW = dict(zip(names, fluid.MW, strict=True))
    for name, m in mass.items():
        moles[name], volume[name] = m / MW[name], m / MW[name] * fluid.v_15[names.index(name)]
    for label, (m, density, M) in CUTS.items():
        part = m - (TOLUENE if label.startswith("100") else 0.0)
        heavier = next(k for k, name in enumerate(PARAFFINS) if MW[name] > M / 1000.0)
        a, b = PARAFFINS[heavier - 1], PARAFFINS[heavier]
        x = (M / 1000.0 - MW[a]) / (MW[b] - MW[a])
        for name, share in ((a, 1.0 - x), (b, x)):
            moles[name] += part / (M / 1000.0) * share
            volume[name] += part / density * share
    M_residue = sum(m for m, _, _ in RESIDUE) / sum(m / M for m, _, M in RESIDUE) / 1000.0
    n_residue = sum(m for m, _, _ in RESIDUE) / M_residue
    moles["n-eicosane"], volume["n-eicosane"] = n_residue, sum(m / density for m, density, _ in RESIDUE)
    n = np.array([moles[name] for name in names])
    V = np.array([volume[name] for name in names])
    v_15 = np.where(n > 0.0, V / np.where(n > 0.0, n, 1.0), fluid.v_15)
    MW_used = np.where(np.array(names) == "n-eicosane", M_residue, fluid.MW)
    return replace(fluid, v_15=v_15, MW=MW_used), n / n.sum()


def test_crude_with_light_ends(record_property):
    fluid, z = crude()
    density = (z @ fluid.MW) / (z @ fluid.v_15)
    # The paraffins that carry the cuts have molar masses within 7 g/mol of the cuts'.
    assert density == pytest.approx(CRUDE_DENSITY, rel=0.02)
    cell = vapour_pressure_at_ratio(
        fluid, T_100F, z, 4.0, T_fill=ZERO_CELSIUS + 20.0, product="crude"
    ).require()
    record_property("computed_VPCR4_kPa", float(cell.P[0]) / 1e3)
    assert cell.P[0] == pytest.approx(CRUDE_RVP, abs=4e3)


@pytest.mark.parametrize("name", ["summer gasoline base", "summer gasoline 1985", "average gasoline"])
def test_ten_percent_ethanol_on_real_gasolines(name):
    """E10 raises the DVPE of hydrocarbon gasolines of 55 to 70 kPa by 7 to 9 kPa (published: about 1 psi).

    McCormick and Yanowitz, NREL for RFA, 2012: about 1 psi at 10 %. Butane sets the base.
    """
    base = Blend.of({f"stock:{name}": 1.0})
    names, _ = union([base], extra=("n-butane", "ethanol"))
    fluid = Fluid.of(names)
    volume = np.append(base.volume_fractions, 0.0)  # no stock here holds ethanol

    def pressure(butane, ethanol):
        """DVPE [Pa] after the butane is changed by shares of the volume, then ethanol splashed in."""
        v = np.tile(volume, (len(butane), 1))
        v[:, names.index("n-butane")] += butane
        v = (1.0 - ethanol) * v / v.sum(axis=1, keepdims=True)
        v[:, names.index("ethanol")] += ethanol
        moles = v / fluid.v_15
        return dvpe(fluid, moles / moles.sum(axis=1, keepdims=True)).require().P

    grid = np.linspace(-0.02, 0.10, 25)
    targets = np.array([55e3, 62.5e3, 70e3])
    butane = np.interp(targets, pressure(grid, 0.0), grid)
    before, after = pressure(butane, 0.0), pressure(butane, 0.1)
    assert before == pytest.approx(targets, abs=100.0)  # straight lines between steps of 0.5 % butane
    assert ((after - before >= 7e3) & (after - before <= 9e3)).all(), after - before


# Edwards, AFRL-RQ-WP-TR-2020-0017 (2020) and AIAA 2017-0146, read off figures: density of jet fuels [g/cm3].
JET_DENSITY = {
    "POSF 10264": ([-40.0, -20.0, 0.0, 20.0, 40.0], [0.822975, 0.8086, 0.794225, 0.77985, 0.765283]),
    "POSF 11498": (
        [4.93, 14.99, 25.26, 35.12, 44.97, 54.82, 64.88, 74.95, 85.01],
        [0.766266, 0.759217, 0.751887, 0.744839, 0.737790, 0.729903, 0.722294, 0.715245, 0.707357],
    ),
}


def volume_error(fuel):
    """Computed over measured density less one, each 15 degC value taken from the data. [-]"""
    t, rho = (np.array(column) for column in JET_DENSITY[fuel])
    rho_15 = np.interp(15.0, t, rho) * 1000.0
    return rho_15 / petroleum_expansion(rho_15, t + ZERO_CELSIUS) / (1000.0 * rho) - 1.0


def test_volume_correction_on_a_petroleum_jet_fuel():
    # Read off a figure to about 0.2 %; -40 to 40 degC.
    assert np.abs(volume_error("POSF 10264")).max() < 5e-3


def test_volume_correction_outside_its_stocks():
    """A synthetic isoparaffinic fuel of 759 kg/m3 is gasoline by its density and expands less than one.

    The error is known and bounded: the correction is for petroleum stocks. 0.9 % at 55 degC.
    """
    error = volume_error("POSF 11498")
    assert (np.diff(error) < 0.0).all()
    assert -0.012 < error[5] < -0.006
