"""Time of the flash against thermo, CoolProp and feos, in one run: `python -m tests.bench.bench_flash`.

A year of hours (8,760 temperatures of one blend) goes through the batch; the
libraries take a sample of the same hours in a loop, and all figures are per
point. Nothing here passes or fails.
"""

from __future__ import annotations

import argparse
import os
import platform
import resource
import time

for _name in ("OMP_NUM_THREADS", "OPENBLAS_NUM_THREADS"):
    os.environ.setdefault(_name, "1")

import numpy as np

from screener.equilibrium import Fluid, bubble_pressure, flash_tp

HOURS = 8760
NAMES = ["n-butane", "isopentane", "n-pentane", "n-hexane", "isooctane", "n-heptane", "toluene", "m-xylene",
         "n-octane", "cyclohexane"]  # fmt: skip
Z = np.array([0.05, 0.13, 0.09, 0.10, 0.16, 0.08, 0.15, 0.10, 0.07, 0.07])


def hours():
    """Liquid temperatures of a temperate year with a daily swing. [K]"""
    hour = np.arange(HOURS)
    noise = np.random.default_rng(8).normal(0.0, 1.5, HOURS)
    return 288.0 - 11.0 * np.cos(2 * np.pi * hour / HOURS) - 4.0 * np.cos(2 * np.pi * hour / 24) + noise


def seconds(function, repeat=3):
    """Shortest of some runs, and the last answer."""
    best = np.inf
    for _ in range(repeat):
        start = time.perf_counter()
        answer = function()
        best = min(best, time.perf_counter() - start)
    return best, answer


def loop(function, points):
    """Seconds per point of a library called point by point."""
    start = time.perf_counter()
    for point in points:
        function(*point)
    return (time.perf_counter() - start) / len(points)


def row(what, points, per_point, peers=(), note=""):
    """One line of the table."""
    ratios = "".join(f"{name} {seconds_ * 1e6:9.0f} us ({seconds_ / per_point:6.1f} x)  " for name, seconds_ in peers)
    print(f"{what:34s} {points:6d} points {per_point * 1e6:9.1f} us/point  {ratios}{note}")


def thermo_cubic(fluid):
    """thermo's Peng-Robinson flash with the constants of a fluid of ours."""
    from thermo import (
        PRMIX,
        CEOSGas,
        CEOSLiquid,
        ChemicalConstantsPackage,
        FlashVL,
        HeatCapacityGas,
        PropertyCorrelationsPackage,
    )

    Tc, Pc, omega = fluid.Tc.tolist(), fluid.Pc.tolist(), fluid.omega.tolist()
    c = len(Tc)
    constants = ChemicalConstantsPackage(
        Tcs=Tc, Pcs=Pc, omegas=omega, MWs=[100.0] * c, CASs=[str(i) for i in range(c)]
    )
    heat = [HeatCapacityGas(poly_fit=(50.0, 1000.0, [0.0, 0.0, 0.0, 100.0])) for _ in Tc]
    correlations = PropertyCorrelationsPackage(constants, HeatCapacityGases=heat, skip_missing=True)
    parts = {"Tcs": Tc, "Pcs": Pc, "omegas": omega, "kijs": np.zeros((c, c)).tolist()}
    gas = CEOSGas(PRMIX, parts, HeatCapacityGases=heat)
    return FlashVL(constants, correlations, liquid=CEOSLiquid(PRMIX, parts, HeatCapacityGases=heat), gas=gas)


def thermo_unifac(names):
    """thermo's activity-coefficient flash with modified UNIFAC (Dortmund) and its own vapour pressures."""
    from thermo import (
        PRMIX,
        UNIFAC,
        CEOSGas,
        ChemicalConstantsPackage,
        FlashVL,
        GibbsExcessLiquid,
    )
    from thermo.unifac import DOUFIP2016, DOUFSG

    constants, correlations = ChemicalConstantsPackage.from_IDs([{"isooctane": "2,2,4-trimethylpentane"}.get(n, n) for n in names])
    c = len(names)
    excess = UNIFAC.from_subgroups(
        T=300.0, xs=[1.0 / c] * c, chemgroups=constants.UNIFAC_Dortmund_groups, version=1,
        subgroups=DOUFSG, interaction_data=DOUFIP2016,
    )  # fmt: skip
    liquid = GibbsExcessLiquid(
        VaporPressures=correlations.VaporPressures, HeatCapacityGases=correlations.HeatCapacityGases,
        VolumeLiquids=correlations.VolumeLiquids, GibbsExcessModel=excess, equilibrium_basis="Psat",
        caloric_basis="Psat", T=300.0, P=1e5, zs=[1.0 / c] * c,
    )  # fmt: skip
    gas = CEOSGas(
        PRMIX, {"Tcs": constants.Tcs, "Pcs": constants.Pcs, "omegas": constants.omegas},
        HeatCapacityGases=correlations.HeatCapacityGases,
    )  # fmt: skip
    return FlashVL(constants, correlations, liquid=liquid, gas=gas)


def feos_bubble(fluid):
    """feos's Peng-Robinson bubble pressure with the constants of a fluid of ours; a function of T and z."""
    import feos
    import si_units as si

    records = [
        feos.PureRecord(feos.Identifier(name=str(i)), 100.0, tc=tc, pc=pc, acentric_factor=w)
        for i, (tc, pc, w) in enumerate(zip(fluid.Tc, fluid.Pc, fluid.omega))
    ]
    eos = feos.EquationOfState.peng_robinson(feos.Parameters.from_records(records, []))
    return lambda T, z: feos.PhaseEquilibrium.bubble_point(eos, T * si.KELVIN, z)


def coolprop_bubble():
    """CoolProp's Peng-Robinson bubble pressure of the first eight species it knows, its own constants."""
    import CoolProp
    from CoolProp.CoolProp import AbstractState

    known = ["n-Butane", "Isopentane", "n-Pentane", "n-Hexane", "n-Heptane", "Toluene", "n-Octane", "CycloHexane"]
    state = AbstractState("PR", "&".join(known))
    state.set_mole_fractions([0.1, 0.15, 0.1, 0.15, 0.15, 0.15, 0.1, 0.1])
    return lambda T: state.update(CoolProp.QT_INPUTS, 0.0, T)


def wide(count):
    """A Peng-Robinson fluid of many invented pseudo-components from butane to C30. """
    t = np.linspace(0.0, 1.0, count)
    return Fluid.from_constants(425.0 + 400.0 * t, 3.8e6 * (0.9e6 / 3.8e6) ** t, 0.2 + 0.9 * t, np.full(count, 0.1))


def main():
    """Print the table."""
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("--sample", type=int, default=100, help="hours given to each library")
    sample = parser.parse_args().sample
    T = hours()
    some = T[:: HOURS // sample][:sample]
    print(f"{platform.machine()}, Python {platform.python_version()}, NumPy {np.__version__}, one thread")
    print(f"libraries: loop over {sample} of the {HOURS} hours, per point\n")

    table = Fluid.of(NAMES, model="PR")
    cubic = Fluid.from_constants(table.Tc, table.Pc, table.omega, table.MW)
    theirs, z = thermo_cubic(cubic), Z.tolist()
    peers = [("thermo", loop(lambda t: theirs.flash(T=t, VF=0, zs=z), [(t,) for t in some]))]
    feos = feos_bubble(cubic)
    peers.append(("feos", loop(lambda t: feos(t, Z), [(t,) for t in some])))
    coolprop = coolprop_bubble()
    peers.append(("CoolProp", loop(coolprop, [(t,) for t in some[: max(5, sample // 10)]])))
    spent, bubble = seconds(lambda: bubble_pressure(cubic, T, Z))
    row("PR bubble pressure, 10 species", HOURS, spent / HOURS, peers, f"all converged: {bubble.ok.all()}")

    P = 0.8 * bubble.P
    picked = [(t, 0.8 * p) for t, p in zip(some, bubble_pressure(cubic, some, Z).P)]
    peers = [("thermo", loop(lambda t, p: theirs.flash(T=t, P=p, zs=z), picked))]
    spent, found = seconds(lambda: flash_tp(cubic, T, P, Z))
    row("PR TP flash, two phases", HOURS, spent / HOURS, peers, f"beta {found.beta.min():.2f}..{found.beta.max():.2f}")
    picked = [(t, p / 0.8 * 1.5) for t, p in picked]
    peers = [("thermo", loop(lambda t, p: theirs.flash(T=t, P=p, zs=z), picked[: sample // 4]))]
    spent, found = seconds(lambda: flash_tp(cubic, T, 1.5 * bubble.P, Z))
    row("PR TP flash, one phase", HOURS, spent / HOURS, peers, f"phases {set(found.phases.tolist())}")
    spent, found = seconds(lambda: flash_tp(cubic, T, P, Z, check="full"), repeat=1)
    row("PR TP flash, full check", HOURS, spent / HOURS, (), f"worst tangent plane {found.tpd.min():.1e}")

    names, share = [*NAMES, "ethanol"], np.append(0.8 * Z, 0.2)
    blend = Fluid.of(names)
    theirs = thermo_unifac(names)
    peers = [("thermo, UNIFAC", loop(lambda t: theirs.flash(T=t, VF=0, zs=share.tolist()), [(t,) for t in some]))]
    spent, bubble = seconds(lambda: bubble_pressure(blend, T, share))
    row("PR-GE bubble pressure, 11 species", HOURS, spent / HOURS, peers, f"all converged: {bubble.ok.all()}")
    P = 0.8 * bubble.P
    picked = [(t, 0.8 * p) for t, p in zip(some, bubble_pressure(blend, some, share).P)]
    peers = [("thermo, UNIFAC", loop(lambda t, p: theirs.flash(T=t, P=p, zs=share.tolist()), picked))]
    spent, found = seconds(lambda: flash_tp(blend, T, P, share))
    row("PR-GE TP flash, two phases", HOURS, spent / HOURS, peers, f"beta {found.beta.min():.2f}..{found.beta.max():.2f}")
    spent, found = seconds(lambda: flash_tp(blend, T[:1000], P[:1000], share, check="full"), repeat=1)
    row("PR-GE TP flash, full check", 1000, spent / 1000, (), f"worst tangent plane {found.tpd.min():.1e}")

    for count in (15, 40):
        many = wide(count)
        z = np.full(count, 1.0 / count)
        theirs = thermo_cubic(many)
        picked = [(t,) for t in some[: max(5, sample // 5)]]
        peers = [("thermo", loop(lambda t, f=theirs, z=z: f.flash(T=t, VF=0, zs=z.tolist()), picked))]
        spent, found = seconds(lambda f=many, z=z: bubble_pressure(f, T, z))
        row(f"PR bubble pressure, {count} species", HOURS, spent / HOURS, peers, f"all converged: {found.ok.all()}")

    theirs, z = thermo_cubic(cubic), Z.tolist()
    peers = [("thermo", seconds(lambda: theirs.flash(T=300.0, VF=0, zs=z), repeat=50)[0])]
    row("PR bubble pressure, one call", 1, seconds(lambda: bubble_pressure(cubic, 300.0, Z), repeat=50)[0], peers)
    row("PR-GE bubble pressure, one call", 1, seconds(lambda: bubble_pressure(blend, 300.0, share), repeat=50)[0])
    print(f"\npeak memory of this process, libraries included: {resource.getrusage(resource.RUSAGE_SELF).ru_maxrss / 1024:.0f} MB")


if __name__ == "__main__":
    main()
