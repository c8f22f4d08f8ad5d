"""Makes ethanol_sweep_loss.md: what an E10 and its base lose side by side, beside a published weighing.

Run from the top folder:

    python -m tests.studies.ethanol_sweep_loss

Published: "Gasoline evaporation: ethanol and nonethanol blends", abstract (read on
discovery.researcher.life). E10 and its base evaporate at the same time from glass cylinders on balances
under a hood, about 70 degF, two hours, 4.5 to 5.3 mass% lost. E10 loses more in all and about 5 % less
gasoline; its vapour holds about 13 mass% ethanol; without the ethanol both vapours are alike; the DVPE of
E10 (D5191) falls by about 5 % more than that of its base. One hour, 2.4 to 2.5 mass%: the same.

Four ways to lose vapour are computed at one temperature: all at once in equilibrium with what stays; as it
forms, carried away as one gas; by diffusion through still air above the liquid, each species at its own
diffusivity; and that with the drift the vapours together cause (Stefan's film). A cylinder on a balance is
the last. The weighing is computed at one temperature, and with a share of the heat of vaporisation taken from
the liquid: none, half, all of it (no heat from the room at all).
"""

from __future__ import annotations

import re
from dataclasses import dataclass
from pathlib import Path

import numpy as np

from screener.equilibrium import bubble_pressure, caloric, flash_tp, heat_of_vaporisation
from screener.ground.constants import ATMOSPHERE, ZERO_CELSIUS
from screener.species import find
from screener.volatility import dvpe, open_evaporation
from tests.studies import ethanol_sweep_bases as real
from tests.studies.splash import SHARES, Splash

FILE = Path(__file__).with_suffix(".md")
T_ROOM = ZERO_CELSIUS + 21.1  # 70 degF
BASES = (50e3, 60e3, 70e3)  # DVPE [Pa]
PROFILES = (
    "4634",
    "6004",
    "2449",
    "4585",
    "5495",
    "4603",
)  # gasolines of tests/measured/headspace, aromatics 9 to 45 vol%
LOST = np.linspace(0.0, 0.08, 17)  # mass lost over mass charged, points of the weighing
WAYS = ("all at once", "as one gas", "diffusing", "diffusing with drift")


def diffusivity(one):
    """Relative diffusivity in air [-] after Fuller, Schettler and Giddings 1966, volumes from memory, unverified."""
    atoms = {element: int(count or 1) for element, count in re.findall(r"([CHO])(\d*)", one.formula)}
    volume = sum(atoms.get(element, 0) * v for element, v in {"C": 15.9, "H": 2.31, "O": 6.11}.items())
    volume -= 18.3 if one.family == "aromatic" else 0.0
    return np.sqrt(1.0 / (1000.0 * one.MW) + 1.0 / 28.97) / (np.cbrt(volume) + np.cbrt(19.7)) ** 2


@dataclass(frozen=True)
class Pair:
    """A base and the E10 made of it: fluid, mole fractions (c,) each, relative diffusivities (c,)."""

    fluid: object
    base: np.ndarray
    blend: np.ndarray
    D: np.ndarray

    @property
    def ethanol(self):
        return self.fluid.names.index("ethanol")

    def mass(self, z):
        """Mass of one volume of liquid z at 15 degC; the cylinders were charged alike (a supposition). [kg/m3]"""
        return (z @ self.fluid.MW) / (z @ self.fluid.v_15)


def pair_of(fluid, volume):
    """Base and E10 of volume shares (c,)."""
    blended = 0.9 * volume
    blended[fluid.names.index("ethanol")] += 0.1
    base, blend = real.moles(fluid, np.stack([volume, blended]))
    return Pair(fluid, base, blend, np.array([diffusivity(find(name)) for name in fluid.names]))


def thirteen(target):
    """The gasoline of thirteen species with its butane set to a DVPE [Pa]."""
    splash = Splash(SHARES)
    return pair_of(splash.fluid, splash.at_dvpe(target))


def published_gasoline(profile, target):
    """A base of tests/measured/headspace with its butane set to a DVPE [Pa]; None where it cannot be."""
    g = real.gasolines()
    i = g.fuels.index(profile)
    volume, met = real.at_dvpe(g.fluid, g.base[i : i + 1], target)
    return pair_of(g.fluid, volume[0]) if met[0] else None


def film(p, D):
    """Molar flux (n, c), relative, of partial pressures p (n, c) [Pa] through still air, drift included.

    Each species obeys N = psi y/(1 - exp(-psi/D)) with psi the sum of all, y its share at the surface.
    """
    y = p / ATMOSPHERE
    low, high = np.full(len(y), 1e-9), np.full(len(y), 50.0 * D.max())
    for _ in range(80):  # the sum falls as psi grows
        psi = 0.5 * (low + high)
        above = (y / -np.expm1(-psi[:, None] / D)).sum(axis=1) > 1.0
        low, high = np.where(above, psi, low), np.where(above, high, psi)
    return psi[:, None] * y / -np.expm1(-psi[:, None] / D)


def mobility(pair, z, way):
    """Relative rates (c,) at which vapours leave the liquid z, by way; None where all are alike."""
    if way == "diffusing":
        return pair.D
    if way == "diffusing with drift":
        point = bubble_pressure(pair.fluid, T_ROOM, z).require()
        p = point.y * point.P[:, None]
        return np.where(p[0] > 0.0, film(p, pair.D)[0] / np.where(p[0] > 0.0, p[0], 1.0), 1.0)
    return None


def at_once(pair, lost):
    """Mass shares (c,) of the vapour that holds a share `lost` of the mass, in equilibrium with the rest."""
    low, high = 0.2, 1.0  # of the bubble pressure
    P_bubble = bubble_pressure(pair.fluid, T_ROOM, pair.blend).require().P[0]
    for _ in range(40):
        middle = 0.5 * (low + high)
        found = flash_tp(pair.fluid, T_ROOM, middle * P_bubble, pair.blend)
        mass = found.beta[0] * (found.y[0] @ pair.fluid.MW) / (pair.blend @ pair.fluid.MW)
        low, high = (low, middle) if mass < lost else (middle, high)
    w = found.y[0] * pair.fluid.MW
    return w / w.sum()


def ethanol_lost(pair, way, lost=0.05):
    """Mass share of ethanol [-] in the first mass `lost` by the E10."""
    if way == "all at once":
        return float(at_once(pair, lost)[pair.ethanol])
    found = open_evaporation(
        pair.fluid, T_ROOM, pair.blend, lost, mobility=mobility(pair, pair.blend, way)
    ).require()
    return float(found.w_lost[0, pair.ethanol])


def vapours(pair, lost=0.05):
    """Mass shares (c,) of what base and E10 lose first, by diffusion with drift."""
    return [
        open_evaporation(pair.fluid, T_ROOM, z, lost, mobility=mobility(pair, z, "diffusing with drift")).require().w_lost[0]
        for z in (pair.base, pair.blend)
    ]  # fmt: skip


@dataclass(frozen=True)
class Weighing:
    """Base and E10 side by side until the base has lost a share of its mass, all [-]: E10 lost over base lost,
    gasoline lost by E10 over by the base, ethanol in what E10 lost, fall of the DVPE of E10 over that of the base."""

    total: float
    gasoline: float
    ethanol: float
    fall: float


def cooled(pair, x, share):
    """Temperatures (n,) [K] at the points LOST if a share of the heat of vaporisation comes out of the liquid."""
    heat = heat_of_vaporisation(pair.fluid, x, T=T_ROOM).require()
    liquid = caloric(pair.fluid, T_ROOM, ATMOSPHERE, x, "L").require()
    fall = heat.differential / (heat.y @ pair.fluid.MW) / (liquid.Cp / (x @ pair.fluid.MW)) / (1.0 - LOST)
    return T_ROOM - share * integral(fall)


def integral(values):
    """Running integral (n,) over the points LOST, from zero."""
    return np.concatenate([[0.0], np.cumsum(0.5 * (values[1:] + values[:-1]) * np.diff(LOST))])


def weighing(pair, lost=0.05, cooling=0.0):
    """The published comparison, by diffusion with drift; `cooling` is the share of the heat taken from the liquid."""
    when, gone, left = [], [], []
    for z in (pair.base, pair.blend):
        found = open_evaporation(pair.fluid, T_ROOM, z, LOST[1:], mobility=mobility(pair, z, "diffusing with drift")).require()  # fmt: skip
        x = np.vstack([z, found.x])
        point = bubble_pressure(pair.fluid, cooled(pair, x, cooling), x).require()
        rate = film(point.y * point.P[:, None], pair.D) @ pair.fluid.MW / pair.mass(z)
        when.append(integral(1.0 / rate))
        gone.append(np.concatenate([[0.0], found.w_lost[:, pair.ethanol]]))
        left.append(x)
    hour = np.interp(lost, LOST, when[0])
    blend_lost = np.interp(hour, when[1], LOST)
    ethanol = float(np.interp(blend_lost, LOST, gone[1]))
    total = blend_lost / lost * pair.mass(pair.blend) / pair.mass(pair.base)
    falls = []
    for x, share in zip(left, (lost, blend_lost), strict=True):
        P = dvpe(pair.fluid, x).require().P
        falls.append(P[0] - np.interp(share, LOST, P))
    return Weighing(float(total), float(total * (1.0 - ethanol)), ethanol, float(falls[1] / falls[0]))


NOTES = """
Published: 13 mass% of ethanol, 5 % less gasoline, 5 % more fall of the DVPE. The first table explains the
share: vapour that leaves as one gas holds too little ethanol on all these bases, and taking it all at once adds half
a point to one point. Through still air ethanol diffuses {faster:.0f} % faster than isopentane, and with that
{low:.1f} to {high:.1f} % are computed on bases of 50 to 60 kPa. The abstract does not state the DVPE of its bases; a more
volatile base has less, for its butane leaves first, one without aromatics more. The second table follows
without anything fitted: E10 loses more in all and less gasoline, its DVPE falls by 3 to 6 % more (not on the base of 9 vol% aromatics). At one temperature
it is 1 to 3 % less gasoline; the heat of vaporisation of ethanol, taken from the liquid in part, makes the rest.
"""


def main():
    """Write the tables."""
    made = [("thirteen species", target, thirteen(target)) for target in BASES]
    made += [
        (profile, target, published_gasoline(profile, target)) for target in BASES for profile in PROFILES
    ]
    made = [one for one in made if one[2] is not None]
    lines = ["# What E10 loses first", "", "Made by `python -m tests.studies.ethanol_sweep_loss`.", "", *__doc__.splitlines()[6:], "",
             "Ethanol in the first 5 mass% lost, percent.", "", "| base | DVPE, kPa | " + " | ".join(WAYS) + " |", "|---|---|---|---|---|---|"]  # fmt: skip
    drift = []
    for name, target, pair in made:
        values = [100.0 * ethanol_lost(pair, way) for way in WAYS]
        if target <= 60e3:
            drift.append(values[-1])
        lines.append(f"| {name} | {target / 1e3:.0f} | " + " | ".join(f"{v:.1f}" for v in values) + " |")
    lines += ["", "Side by side until the base has lost 5 mass%, by diffusion with drift.", "",
              "| base | DVPE, kPa | E10 lost over base lost | gasoline lost by E10 over by the base | half cooled | all cooled | ethanol in it, % | fall of the DVPE over that of the base |",
              "|---|---|---|---|---|---|---|---|"]  # fmt: skip
    for name, target, pair in made:
        w, half, full = (weighing(pair, cooling=share) for share in (0.0, 0.5, 1.0))
        lines.append(f"| {name} | {target / 1e3:.0f} | {w.total:.3f} | {w.gasoline:.3f} | {half.gasoline:.3f} | {full.gasoline:.3f} | {100 * w.ethanol:.1f} | {w.fall:.2f} |")  # fmt: skip
    faster = 100.0 * (diffusivity(find("ethanol")) / diffusivity(find("isopentane")) - 1.0)
    lines += NOTES.format(faster=faster, low=min(drift), high=max(drift)).splitlines()
    FILE.write_text("\n".join(lines) + "\n", encoding="utf-8")


if __name__ == "__main__":
    main()
