"""The long sums behind the hand calculations of this folder; it imports nothing of the program.

    python tests/hand/calculator.py

Reads the compositions of the stocks and nothing else of the project. Means: pure vapour pressures and
liquid volumes as the median of the published curves in thermo and CoolProp, activity coefficients from
thermo's modified UNIFAC (Dortmund), the vapour as a truncated virial gas (Tsonopoulos), saturated light
ends from CoolProp's reference equations. Equations and results are in the Markdown file of each case.
"""

from __future__ import annotations

import csv
import functools
import math
import statistics
import warnings
from pathlib import Path

import CoolProp.CoolProp as CP
import numpy as np
from chemicals import MW, CAS_from_any, Pc, Tc, Vc, omega
from thermo import PRMIX, VaporPressure, VolumeLiquid
from thermo.unifac import DOUFIP2016, DOUFSG, UNIFAC, UNIFAC_group_assignment_DDBST
from thermo.viscosity import ViscosityLiquid

R, G = 8.314462618, 9.80665
STOCKS = Path(__file__).resolve().parents[2] / "data" / "stocks"
ALIAS = {"isooctane": "2,2,4-trimethylpentane"}
CAS_FIX = {"trans-2-hexene": "4050-45-7"}
# Three species without a row in the library's group table, put together by hand.
GROUPS = {"cis-1,3-dimethylcyclopentane": {1: 2, 78: 3, 79: 2}, "cis-3-hexene": {1: 2, 2: 2, 6: 1},
          "trans-decalin": {78: 8, 79: 2}}
ESTIMATED = {"BOILING_CRITICAL", "LEE_KESLER_PSAT", "AMBROSE_WALTON", "SANJARI", "EDALAT", "EOS",
             "LANDOLT", "VDI_TABULAR"}
VOLUME_CURVES = {"DIPPR_PERRY_8E", "VDI_PPDS", "COOLPROP", "HEOS_FIT", "MMSNM0FIT", "RACKETTFIT",
                 "CRC_INORG_L", "HTCOSTALDFIT"}
# Densities [kg/m3] at 20 degC of species for which the library has an estimate only, up to 15 % out for some:
# common handbook values, from memory, unverified. They weigh on volume shares only.
RHO_20 = {"2-methylheptane": 698.0, "3-methylheptane": 705.8, "2,3-dimethylhexane": 712.1,
          "2,4-dimethylhexane": 700.4, "2,5-dimethylhexane": 693.5, "2,3,4-trimethylpentane": 719.1,
          "2-ethyltoluene": 880.7, "3-ethyltoluene": 864.5, "4-ethyltoluene": 861.4,
          "1,2-dimethyl-4-ethylbenzene": 874.5, "trans-2-hexene": 678.0, "cis-2-hexene": 687.0,
          "trans-3-hexene": 677.2, "cis-3-hexene": 679.6, "2-methyl-1-pentene": 679.9,
          "2-methyloctane": 713.3, "octylcyclohexane": 813.8}
LIGHT = {"n-butane": "n-Butane", "isobutane": "IsoButane", "propane": "n-Propane",
         "isopentane": "Isopentane", "n-pentane": "n-Pentane", "1-butene": "1-Butene",
         "isobutene": "IsoButene", "cis-2-butene": "cis-2-Butene", "trans-2-butene": "trans-2-Butene",
         "neopentane": "Neopentane"}


class Pure:
    """One species: constants and curves out of the libraries."""

    def __init__(self, name):
        self.name = name
        self.cas = CAS_FIX.get(name) or CAS_from_any(ALIAS.get(name, name))
        self.MW, self.Tc, self.Pc = MW(self.cas) / 1e3, Tc(self.cas), Pc(self.cas)
        self.omega, self.Vc = omega(self.cas), Vc(self.cas)
        self.groups = dict(GROUPS.get(name) or UNIFAC_group_assignment_DDBST(self.cas, "MODIFIED_UNIFAC"))
        self.curve = VaporPressure(CASRN=self.cas, Tc=self.Tc, Pc=self.Pc, omega=self.omega)
        self.volume = VolumeLiquid(CASRN=self.cas, MW=self.MW * 1e3, Tc=self.Tc, Pc=self.Pc, Vc=self.Vc,
                                   omega=self.omega)

    @functools.cache  # noqa: B019
    def psat(self, T):
        """Median of the published curves valid at T [Pa]; an estimate only for species that weigh nothing."""
        found = [self.curve.calculate(T, m) for m in self.curve.all_methods - ESTIMATED
                 if self.curve.test_method_validity(T, m)]
        if not found:
            method = "WAGNER_MCGARRY" if "WAGNER_MCGARRY" in self.curve.all_methods else "LEE_KESLER_PSAT"
            found = [self.curve.calculate(T, method)]
        return statistics.median(found)

    @functools.cache  # noqa: B019
    def v(self, T):
        """Saturated liquid volume [m3/mol]."""
        T = min(T, 0.95 * self.Tc)
        if self.name in RHO_20:
            return self.MW / (RHO_20[self.name] * (1 - 0.0011 * (T - 293.15)))
        found = [self.volume.calculate(T, m) for m in self.volume.all_methods & VOLUME_CURVES
                 if self.volume.test_method_validity(T, m)]
        return statistics.median(found) if found else self.volume.calculate(T, "HTCOSTALD")

    def phi_sat(self, T):
        """Fugacity coefficient of the saturated vapour [-]."""
        if self.name in LIGHT:
            state = CP.AbstractState("HEOS", LIGHT[self.name])
            state.specify_phase(CP.iphase_gas)
            state.update(CP.PT_INPUTS, CP.PropsSI("P", "T", T, "Q", 1, LIGHT[self.name]) * (1 - 1e-6), T)
            return state.fugacity_coefficient(0)
        return math.exp(virial(self, self, T) * self.psat(T) / R / T)


@functools.cache
def pure(name):
    return Pure(name)


def virial(a, b, T):
    """Second virial coefficient [m3/mol], Tsonopoulos (1974), without polar terms."""
    tc, pc, w = a.Tc, a.Pc, a.omega
    if a is not b:
        third = a.Vc ** (1 / 3) + b.Vc ** (1 / 3)
        tc = math.sqrt(a.Tc * b.Tc) * 8 * math.sqrt(a.Vc * b.Vc) / third**3
        z = (a.Pc * a.Vc / a.Tc + b.Pc * b.Vc / b.Tc) / 2 / R
        pc, w = z * R * tc / (third / 2) ** 3, (a.omega + b.omega) / 2
    t = T / tc
    f0 = 0.1445 - 0.330 / t - 0.1385 / t**2 - 0.0121 / t**3 - 0.000607 / t**8
    f1 = 0.0637 + 0.331 / t**2 - 0.423 / t**3 - 0.008 / t**8
    return R * tc / pc * (f0 + w * f1)


def stock(name, spread_from=None):
    """Mass fractions; mass without a name spread over species with `spread_from` carbon atoms and more."""
    mass, nameless = {}, 0.0
    with open(STOCKS / f"{name}.csv", encoding="utf-8") as handle:
        for row in csv.DictReader(line for line in handle if not line.startswith("#")):
            share = float(row["mass_percent"])
            species = [s for s in row["species"].split("+") if s]
            nameless += share if not species else 0.0
            for s in species:
                mass[s] = mass.get(s, 0.0) + share / len(species)
    if spread_from:
        heavy = [s for s in mass if carbons(s) >= spread_from]
        factor = 1 + nameless / sum(mass[s] for s in heavy)
        mass.update({s: mass[s] * factor for s in heavy})
    total = sum(mass.values())
    return {s: m / total for s, m in mass.items()}


def carbons(name):
    groups = pure(name).groups
    per = {1: 1, 2: 1, 3: 1, 4: 1, 5: 2, 6: 2, 7: 2, 8: 2, 9: 1, 10: 1, 11: 2, 12: 2, 13: 2, 14: 0, 16: 0,
           78: 1, 79: 1, 80: 1, 70: 2}
    return sum(per[g] * k for g, k in groups.items())


def density(mass, T):
    """Density [kg/m3] of mass fractions at T, volumes adding."""
    return 1 / sum(w * pure(s).v(T) / pure(s).MW for s, w in mass.items())


def by_volume(*parts):
    """Mass fractions of (mass fractions, volume at 15 degC) pairs."""
    out = {}
    for mass, volume in parts:
        for s, w in mass.items():
            out[s] = out.get(s, 0.0) + w * volume * density(mass, 288.15)
    total = sum(out.values())
    return {s: w / total for s, w in out.items()}


def moles(mass):
    n = {s: w / pure(s).MW for s, w in mass.items()}
    return {s: v / sum(n.values()) for s, v in n.items()}


def ethane_henry(T):
    """Henry constant [Pa] of ethane in n-heptane: Peng-Robinson of the library, interaction zero."""
    a, b = pure("ethane"), pure("n-heptane")
    eos = PRMIX(T=T, P=1e4, Tcs=[a.Tc, b.Tc], Pcs=[a.Pc, b.Pc], omegas=[a.omega, b.omega], zs=[1e-3, 0.999])
    return eos.phis_l[0] * 1e4


def bubble(mass, T, rows=0, title=""):
    """Bubble pressure [Pa]; prints the `rows` largest shares of it."""
    return _parts(mass, T, rows, title)[0]


def _parts(mass, T, rows=0, title=""):
    """Bubble pressure [Pa] and its parts."""
    x = moles(mass)
    names, species = list(x), [pure(s) for s in x]
    xs = np.array(list(x.values()))
    model = UNIFAC.from_subgroups(T=T, xs=list(xs), chemgroups=[s.groups for s in species],
                                  subgroups=DOUFSG, interaction_data=DOUFIP2016, version=1)
    gamma = np.array(model.gammas())
    psat = np.array([s.psat(T) if s.Tc > T else math.nan for s in species])
    f = psat * np.array([s.phi_sat(T) if s.Tc > T and s.name != "ethane" else math.nan for s in species])
    v = np.array([s.v(T) for s in species])
    B = np.array([[virial(a, b, T) for b in species] for a in species])
    P, phi = 5e4, np.ones(len(xs))
    for _ in range(60):
        part = xs * gamma * f * np.exp(v * (P - psat) / R / T) / phi
        if "ethane" in names:
            i = names.index("ethane")
            part[i] = xs[i] * ethane_henry(T) / phi[i]
        before, P = P, float(part.sum())
        y = part / P
        phi = np.exp((2 * B @ y - y @ B @ y) * P / R / T)
        if abs(P - before) < 1e-8 * P:
            break
    if rows:
        print(f"\n{title} at {T - 273.15:.2f} degC: {P / 1e3:.3f} kPa")
        print("| species | x | gamma | P sat, kPa | phi sat | Poynting | phi V | part, kPa |")
        order = np.argsort(-part)[:rows]
        for i in order:
            sat = species[i].phi_sat(T) if names[i] != "ethane" else math.nan
            print(f"| {names[i]} | {xs[i]:.5f} | {gamma[i]:.4f} | {psat[i] / 1e3:.2f} | {sat:.4f} | "
                  f"{math.exp(v[i] * (P - psat[i]) / R / T):.4f} | {phi[i]:.4f} | {part[i] / 1e3:.3f} |")
        print(f"| the other {len(xs) - rows} | {1 - xs[order].sum():.5f} | | | | | | "
              f"{(P - part[order].sum()) / 1e3:.3f} |")
    return P, part


def bubble_parts(mass, T):
    """Partial pressures [Pa] of the bubble point by species."""
    return dict(zip(moles(mass), _parts(mass, T)[1], strict=True))


def clear_sky(latitude, day, elevation):
    """Insolation of a clear day [J/m2], FAO Irrigation and Drainage Paper 56, equations 21 to 25 and 37."""
    lat = math.radians(latitude)
    near = 1 + 0.033 * math.cos(2 * math.pi * day / 365)
    tilt = 0.409 * math.sin(2 * math.pi * day / 365 - 1.39)
    dusk = math.acos(-math.tan(lat) * math.tan(tilt))
    Ra = 24 * 60 / math.pi * 0.0820 * near * (dusk * math.sin(lat) * math.sin(tilt)
                                             + math.cos(lat) * math.cos(tilt) * math.sin(dusk))
    return (0.75 + 2e-5 * elevation) * Ra * 1e6, Ra


def surfaces(a, top, bottom, insolation, slender, floating):
    """Temperatures [degC] by both editions: surface mean, surface peak, vapour-space peak."""
    I = insolation / 11356.53  # Btu/(ft2 day)
    TAA, dTA = (top + bottom) / 2 * 1.8 + 32, (top - bottom) * 1.8
    old = {"TB": TAA + 6 * a - 1, "dTV": 0.72 * dTA + 0.028 * a * I}
    old["TLA"] = 0.44 * TAA + 0.56 * old["TB"] + 0.0079 * a * I
    old["TV"] = old["TLA"]
    new = {"TB": TAA + 0.003 * a * I}
    if floating:
        new["TLA"] = 0.3 * TAA + 0.7 * new["TB"] + 0.004 * a * I
        new["dTV"] = 0.7 * dTA + 0.02 * a * I
        new["TV"] = math.nan
    else:
        q, h = 2.2 * slender + 1.9, slender
        sun = (0.021 + 0.013 * h) * a * I
        new["dTV"] = (1 - 0.8 / q) * dTA + 2 * sun / q
        new["TLA"] = (0.5 - 0.4 / q) * TAA + (0.5 + 0.4 / q) * new["TB"] + sun / (2 * q)
        new["TV"] = ((2.2 * h + 1.1) * TAA + 0.8 * new["TB"] + sun) / q
    for e in (old, new):
        e["TLX"], e["TVX"] = e["TLA"] + e["dTV"] / 4, e["TV"] + e["dTV"] / 2
    celsius = {"TB", "TLA", "TLX", "TV", "TVX"}
    return [{k: (v - 32) / 1.8 if k in celsius else v / 1.8 for k, v in e.items()} for e in (old, new)]


def suction(rho, Ps, Pb, nu, rate, length, bore, K, level, nozzle, pump, rough=0.046e-3):
    """Heads of the suction line: what goes in and what comes out, printed."""
    u = rate / 3600 / (math.pi / 4 * bore**2)
    Re, f = u * bore / nu, 0.015
    for _ in range(40):
        f = (-2 * math.log10(rough / bore / 3.7 + 2.51 / Re / math.sqrt(f))) ** -2
    vh = u * u / 2 / G
    hf = (f * length / bore + K + 0.57) * vh
    npsh = (Ps - Pb) / rho / G + level - pump - hf
    lock = Ps + rho * G * (level - pump - hf - vh) - Pb
    mouth = Ps + rho * G * (level - nozzle - 1.57 * vh) - Pb
    print(f"rho {rho:.1f} u {u:.4f} nu {nu:.3g} Re {Re:.4g} f {f:.5f} "
          f"velocity head {vh:.4f} friction {hf:.3f}")
    print(f"NPSH {npsh:.3f} m; pressure less bubble pressure: pump {lock:.0f} Pa, nozzle {mouth:.0f} Pa")


def viscosity(name, T):
    """Kinematic viscosity [m2/s] of a species."""
    s = pure(name)
    mu = ViscosityLiquid(CASRN=s.cas, MW=s.MW * 1e3, Tc=s.Tc, Pc=s.Pc, Vc=s.Vc, omega=s.omega)
    return mu.T_dependent_property(T) * s.v(T) / s.MW


def weather(name, day, high, low, paints, slender, floating):
    """Design day and surfaces, printed; the hottest surface and the high end of its range [degC]."""
    top = high + 37.0 - 28.8
    bottom = top - (high - low)
    insolation, Ra = clear_sky(44.0, day, 35.0)
    print(f"\n=== {name}: air {bottom:.1f} to {top:.1f} degC, Ra {Ra:.4f}, I {insolation / 1e6:.4f} MJ/m2, "
          f"{insolation / 11356.53:.1f} Btu/ft2")
    ends = []
    for a in paints:
        old, new = surfaces(a, top, bottom, insolation, slender, floating)
        for label, e in (("2006", old), ("2020", new)):
            print(f"a {a} {label} " + " ".join(f"{k} {v:.3f}" for k, v in e.items()))
        high_edition = max(old["TLX"], new["TLX"])
        ends.append((high_edition, high_edition + abs(old["TLX"] - new["TLX"])))
    return ends


def air(mass):
    """Air that comes out of a fuel saturated at 15 degC when it arrives at 26 degC, printed.

    Ostwald coefficient by ASTM D2779 (formula from memory, unverified), 0.098 for air at 0 degC.
    """
    def ostwald(T):
        L = 0.300 * math.exp(0.639 * (700 - T) / T * math.log(3.333 * 0.098))
        return 7.70 * L * (0.980 - density(mass, 288.15) / 1e3)

    cold, warm = bubble(mass, 288.15), bubble(mass, 299.15)
    M = 1 / sum(w / pure(s).MW for s, w in mass.items())
    liquid = density(mass, 288.15) / M
    held = ostwald(288.15) * (97800 - cold) / R / 288.15
    full = held * R * 299.15 / ostwald(299.15)
    out = held * (1 - (97800 - warm) / full) / liquid
    share = out * 97800 / (97800 - warm)
    print(f"air: bubble at 15 degC {cold:.0f} Pa, L {ostwald(288.15):.4f} and {ostwald(299.15):.4f}, held "
          f"{held:.3f} of {liquid:.0f} mol/m3, air alone at 26 degC {full:.0f} Pa, "
          f"with the fuel {full + warm:.0f} Pa; vapour at most {100 * share:.3f} mol%")


def summer():
    base, spirit = stock("summer-gasoline-base", 7), stock("denatured-ethanol")
    e10 = by_volume((base, 0.9), (spirit, 0.1))
    ends = weather("summer", 196, 28.8, 17.1, (0.17, 0.25, 0.34), 14.6 / 24, True)
    hot = ends[1][0] + 273.15
    print("density 15 degC: base, ethanol, E10", *(f"{density(m, 288.15):.2f}" for m in (base, spirit, e10)))
    area = math.pi / 4 * 24**2
    heel = 1100 * density(base, 297.15) / density(base, 288.15)
    legal = {"receipt": e10, "heel": base}
    for level in (9.0, 13.1):
        v = (area * level - 1100) * density(e10, 299.15) / density(e10, 288.15)
        legal[f"mixture {level} m"] = by_volume((base, heel), (e10, v))
        print(f"level {level}: heel {heel:.1f}, receipt {v:.1f} m3 at 15 degC")
    for name, m in legal.items():
        print(f"{name}: 22.9 degC {bubble(m, 296.05) / 1e3:.3f}, hottest {bubble(m, hot) / 1e3:.3f} kPa, "
              f"ethanol {moles(m).get('ethanol', 0):.4f}")
    P = bubble(e10, hot, 16, "E10")
    bubble(legal["mixture 9.0 m"], 296.05, 16, "mixture at 9 m")
    bubble(e10, 299.15, 16, "E10")
    air(e10)
    print(f"high end: {ends[2][1]:.2f} degC {1.05 * bubble(e10, ends[2][1] + 273.15):.0f} Pa")
    suction(density(e10, hot), 97800, P, viscosity("n-heptane", hot), 450, 180, 0.304, 6.5, 2.0, 0.6, 0.4)
    suction(density(e10, ends[2][1] + 273.15), 97800, 1.05 * bubble(e10, ends[2][1] + 273.15),
            viscosity("n-heptane", hot), 450, 180, 0.304, 6.5, 2.0, 0.6, 0.4)


def winter():
    base, butane, naphtha = (stock("winter-gasoline-base", 7), stock("field-butane"), stock("heavy-naphtha"))
    blend = by_volume((base, 0.97), (butane, 0.03))
    ends = weather("winter", 15, 6.4, -0.2, (0.54, 0.58, 0.63), 12.8 / 18, False)
    hot = ends[0][0] + 273.15
    print("density 15 degC: base, butane, blend, naphtha",
          *(f"{density(m, 288.15):.2f}" for m in (base, butane, blend, naphtha)))
    P = bubble(blend, hot, 14, "winter blend")
    bubble(blend, 296.05, 14, "winter blend")
    bubble(blend, 285.15, 14, "winter blend")
    print(f"heel at the hottest surface: {bubble(naphtha, hot):.0f} Pa")
    heel = 620 * density(naphtha, 282.15) / density(naphtha, 288.15)
    for level in (7.0, 11.6):
        v = (math.pi / 4 * 18**2 * level - 620) * density(blend, 285.15) / density(blend, 288.15)
        mix = by_volume((naphtha, heel), (blend, v))
        print(f"mixture {level} m, hottest: {bubble(mix, hot):.0f} Pa")
    for a, end in zip((0.54, 0.58), ends, strict=False):
        top = 1.05 * bubble(blend, end[1] + 273.15)
        print(f"high end, paint {a}: {end[1]:.2f} degC {top:.0f} Pa")
    suction(density(blend, hot), 97550, P, viscosity("n-hexane", hot), 380, 95, 0.255, 5.0, 1.5, 0.5, 0.3)
    suction(density(blend, hot), 97550, top, viscosity("n-hexane", hot), 380, 95, 0.255, 5.0, 1.5, 0.5, 0.3)


def condensate():
    liquid = stock("condensate")
    ends = weather("condensate", 135, 21.4, 10.8, (0.64, 0.68), 11 / 15, False)
    T = 319.15
    print(f"density 15 degC {density(liquid, 288.15):.2f}; ethane in n-heptane "
          f"{ethane_henry(T) / 1e6:.3f} MPa at 46, {ethane_henry(296.05) / 1e6:.3f} MPa at 22.9 degC")
    P = bubble(liquid, T, 16, "condensate")
    bubble(liquid, 296.05, 16, "condensate")
    top = 1.05 * bubble(liquid, ends[1][1] + 273.15)
    print(f"high end: {ends[1][1]:.2f} degC {top:.0f} Pa; "
          f"n-hexane at 46 degC {pure('n-hexane').psat(T):.0f} Pa")
    suction(density(liquid, T), 97600, P, viscosity("n-octane", T), 200, 60, 0.203, 4.5, 1.0, 0.5, 0.2)
    suction(density(liquid, T), 97600, top, viscosity("n-octane", T), 200, 60, 0.203, 4.5, 1.0, 0.5, 0.2)


def ostwald(T, rho_15):
    """Ostwald coefficient of air [-] by ASTM D2779 (formula from memory, unverified), 0.098 at 0 degC."""
    L = 0.300 * math.exp(0.639 * (700 - T) / T * math.log(3.333 * 0.098))
    return 7.70 * L * (0.980 - rho_15 / 1e3)


def cell(mass, T, ratio=4.0, filled=273.65):
    """Fuel's own pressure [Pa] in a cell of 1 + ratio volumes, one of them filled cold with the liquid.

    Partial pressures over the liquid that is left: those of the bubble point, by activity of the whole
    liquid; the little that evaporates hardly moves the activities.
    """
    x = moles(mass)
    species = [pure(s) for s in x]
    z = np.array(list(x.values()))
    v = np.array([s.v(T) for s in species])
    per_x = np.array([bubble_parts(mass, T)[s] for s in x]) / z
    volume = (1 + ratio) * sum(n * s.v(filled) for n, s in zip(z, species))
    left = 1.0
    for _ in range(200):
        space = volume - left * float(z @ v)
        inside = per_x * space / R / T  # moles in the space for each unit of x
        new = left * float((z / (left + inside)).sum())
        if abs(new - left) < 1e-12:
            break
        left = new
    return float((per_x * z / (left + inside)).sum())


def spring():
    """Certificate of the receipt: DVPE 89.2 kPa by EN 13016-1, 724.9 kg/m3; its recipe only shapes the slope."""
    winter, summer = stock("winter-gasoline-base", 7), stock("summer-gasoline-base", 7)
    recipe = by_volume((winter, 0.58), (summer, 0.37), ({"ethanol": 1.0}, 0.05))
    T_test, rho_15 = 310.93, 724.9
    X = (89.2e3 + 3.78e3) / 0.965
    test, true, cold = cell(recipe, T_test), bubble(recipe, T_test), bubble(recipe, 273.65)
    swell = density(recipe, 273.65) / density(recipe, T_test)
    factor = 1.0
    for _ in range(3):
        # 1 L charged at 0.5 degC under one atmosphere brings its air into a space of about 4 L at 37.8 degC
        held = ostwald(273.65, rho_15) * (101325.0 - factor * cold) / R / 273.65
        P_air = held * R * T_test / (5 - swell + ostwald(T_test, rho_15) * swell)
        factor = (X - P_air) / test
    print(f"\n=== spring: X {X:.0f}, air {P_air:.0f}, own vapour {X - P_air:.0f} Pa; recipe in the cell {test:.0f}, "
          f"true {true:.0f} Pa, at 0.5 degC {cold:.0f} Pa; factor {factor:.4f}, true {factor * true:.0f} Pa; "
          f"density of the recipe {density(recipe, 288.15):.2f}")
    ends = weather("spring", 74, 12.6, 3.2, (0.17, 0.25, 0.34), 12.8 / 20, True)
    asked = {"hottest": ends[1][0], "July": 22.9, "arrival": 11.0, "high": ends[2][1]}
    for name, T in ((name, degC + 273.15) for name, degC in asked.items()):
        P = factor * bubble(recipe, T)
        rho = rho_15 * density(recipe, T) / density(recipe, 288.15)
        print(f"{name}: {T - 273.15:.2f} degC {P:.0f} Pa, {rho:.1f} kg/m3")
        if name == "hottest":
            suction(rho, 97800, P, viscosity("n-hexane", T), 380, 95, 0.255, 5.0, 2.0, 0.5, 0.3)
        if name == "high":
            suction(rho, 97800, 1.05 * P, viscosity("n-hexane", T), 380, 95, 0.255, 5.0, 2.0, 0.5, 0.3)


if __name__ == "__main__":
    warnings.simplefilter("ignore")
    summer()
    winter()
    condensate()
    spring()
