"""thermo, feos and CoolProp on the feeds of the stress study, with the same equation, constants and k_ij.

Every answer a library gives is judged as ours are, at ten thousand times the
tolerance in fugacity: a state is wrong here when it is another state. feos
rounds the critical constants of the equation as printed; it is judged with those.
"""

from __future__ import annotations

import json
import time

import numpy as np

from screener.equilibrium import bubble_pressure, flash_tp
from screener.equilibrium.second_liquid import THREE_PHASES, TWO_LIQUIDS
from screener.ground.status import Status
from tests.studies.stress_judge import EXACT, PEER, PRINTED, PlainPR, judge_phases, judge_points

# what the libraries were seen to raise, and its like
RAISED = (ArithmeticError, AttributeError, LookupError, NameError, RuntimeError, TypeError, ValueError)


def peers_part(report, cases, generator):
    """The table of the libraries beside ours."""
    report.say("## Libraries on every fifth of the Peng-Robinson feeds", "")
    ours = flash_tp(cases.fluid, cases.T, cases.P, cases.z, check="full")
    second = ours.status == Status.LIQUID_SPLITS
    point = bubble_pressure(cases.fluid, cases.T, cases.z, check="full")
    rows, points = [_ours(cases, ours, second)], [_our_points(cases, point)]
    for name, library in (("thermo", Thermo), ("feos", Feos), ("CoolProp", CoolProp)):
        held = library(cases.fluid)
        rows.append(_flashes(name, held, cases, second, generator))
        points.append(_bubbles(name, held, cases, point, generator))
    report.say(
        f"{cases.T.size} flashes, {int((~second).sum())} of one liquid at most and {int(second.sum())} with a second",
        "liquid (thermo's vapour-liquid flash, CoolProp and feos know two phases at most, so three-phase feeds are",
        "beyond them: the question is whether they say so). A library says so by an exception, we by a status.",
        "",
    )
    report.table(
        ["flash at T and P", "right", "wrong in silence", "says so", "second liquid: right", "wrong in silence",
         "says so", "ms per state", "slowest [ms]"],
        rows,
    )  # fmt: skip
    report.say(
        f"{int(point.ok.sum())} feeds have a bubble point by us, {int((~point.ok).sum())} have none, split first, lie above",
        "100 MPa or did not converge.",
        "",
    )
    report.table(
        ["bubble pressure", "right", "wrong in silence", "says so", "none by us: a right answer", "wrong in silence",
         "says so", "ms per state", "slowest [ms]"],
        points,
    )  # fmt: skip


def _ours(cases, found, second):
    """Our row, judged in the other part of the study."""
    started = time.perf_counter()
    flash_tp(cases.fluid, cases.T, cases.P, cases.z, check="full")
    spent = (time.perf_counter() - started) / cases.T.size
    solved = np.isin(found.checks, (TWO_LIQUIDS, THREE_PHASES))
    return ("ours, full check", int(found.ok[~second].sum()), 0, int((~found.ok & ~second).sum()),
            int((second & solved).sum()), 0, int((second & ~solved).sum()), f"{1e3 * spent:.2f}", "")  # fmt: skip


def _our_points(cases, found):
    started = time.perf_counter()
    bubble_pressure(cases.fluid, cases.T, cases.z, check="full")
    spent = (time.perf_counter() - started) / cases.T.size
    return "ours, full check", int(found.ok.sum()), 0, 0, 0, 0, int((~found.ok).sum()), f"{1e3 * spent:.2f}", ""


def _timed(library, question, *given):
    """Answer or None after an exception of the library, and the seconds."""
    started = time.perf_counter()
    try:
        answer = getattr(library, question)(*given)
    except (*RAISED, *library.raises):
        answer = None
    return answer, time.perf_counter() - started


def _flashes(name, library, cases, second, generator):
    n, c = cases.z.shape
    shares, phases, spent = np.zeros((3, n)), np.full((3, n, c), np.nan), np.zeros(n)
    raised = np.zeros(n, dtype=bool)
    for i in range(n):
        there = np.flatnonzero(cases.z[i] > 0.0)
        answer, spent[i] = _timed(library, "flash", cases.T[i], cases.P[i], cases.z[i][there], there)
        if answer is None or not all(np.isfinite(x).all() for _, x in answer):
            raised[i] = True
            continue
        for k, (share, x) in enumerate(answer):
            shares[k, i], phases[k, i] = share, 0.0
            phases[k, i, there] = x
    good = np.flatnonzero(~raised)
    eos = PlainPR(cases.fluid, cases.T[good], cases.P[good], library.constants)
    fault = np.full(n, "raised", dtype=object)
    fault[good] = judge_phases(eos, cases.z[good], shares[:, good], phases[:, good], generator, PEER)[0]
    right, wrong = fault == "", ~raised & (fault != "")
    cells = [int((mask & ~second).sum()) for mask in (right, wrong, raised)]
    more = [int((mask & second).sum()) for mask in (right, wrong, raised)]
    return (name, *cells, *more, f"{1e3 * spent.mean():.1f}", f"{1e3 * spent.max():.0f}")


def _bubbles(name, library, cases, ours, generator):
    n, c = cases.z.shape
    P, y, spent = np.full(n, np.nan), np.zeros((n, c)), np.zeros(n)
    for i in range(n):
        there = np.flatnonzero(cases.z[i] > 0.0)
        answer, spent[i] = _timed(library, "bubble", cases.T[i], cases.z[i][there], there)
        if answer is not None and 0.0 < answer[0] < np.inf and np.isfinite(answer[1]).all():
            P[i], y[i, there] = answer
    raised = ~np.isfinite(P)
    good = np.flatnonzero(~raised)
    eos = PlainPR(cases.fluid, cases.T[good], P[good], library.constants)
    fault = np.full(n, "raised", dtype=object)
    fault[good] = judge_points(eos, cases.z[good], y[good], True, generator, PEER)[0]
    right, wrong = fault == "", ~raised & (fault != "")
    cells = [int((mask & side).sum()) for side in (ours.ok, ~ours.ok) for mask in (right, wrong, raised)]
    return (name, *cells, f"{1e3 * spent.mean():.1f}", f"{1e3 * spent.max():.0f}")


class Thermo:
    """thermo's vapour-liquid flash; one object per set of species, kept."""

    constants = EXACT

    def __init__(self, fluid):
        from chemicals import exceptions
        from fluids import numerics

        self.fluid, self.kept = fluid, {}
        self.raises = (
            exceptions.TrivialSolutionError, exceptions.PhaseCountReducedError, exceptions.PhaseExistenceImpossible,
            numerics.OscillationError, numerics.UnconvergedError, numerics.NoSolutionError, numerics.NotBoundedError,
        )  # fmt: skip

    def _flasher(self, there):
        from thermo import (
            PRMIX,
            CEOSGas,
            CEOSLiquid,
            ChemicalConstantsPackage,
            FlashVL,
            HeatCapacityGas,
            PropertyCorrelationsPackage,
        )

        key = tuple(there)
        if key not in self.kept:
            Tc, Pc, omega = (a[there].tolist() for a in (self.fluid.Tc, self.fluid.Pc, self.fluid.omega))
            constants = ChemicalConstantsPackage(
                Tcs=Tc, Pcs=Pc, omegas=omega, MWs=[100.0] * len(Tc), CASs=[str(i) for i in there]
            )
            heat = [HeatCapacityGas(poly_fit=(50.0, 1500.0, [0.0, 0.0, 0.0, 100.0])) for _ in Tc]
            more = PropertyCorrelationsPackage(constants, HeatCapacityGases=heat, skip_missing=True)
            kij = self.fluid.mixing.kij[np.ix_(there, there)].tolist()
            parts = {"Tcs": Tc, "Pcs": Pc, "omegas": omega, "kijs": kij}
            liquid, gas = (one(PRMIX, parts, HeatCapacityGases=heat) for one in (CEOSLiquid, CEOSGas))
            self.kept = {key: FlashVL(constants, more, liquid=liquid, gas=gas)}
        return self.kept[key]

    def flash(self, T, P, z, there):
        """Phases as (share, composition)."""
        found = self._flasher(there).flash(T=T, P=P, zs=z.tolist())
        return [(share, np.array(phase.zs)) for share, phase in zip(found.betas, found.phases)]

    def bubble(self, T, z, there):
        """Pressure and composition of the bubble."""
        found = self._flasher(there).flash(T=T, VF=0, zs=z.tolist())
        return found.P, np.array(found.gas.zs)


class Feos:
    """feos's flash and bubble point."""

    constants, raises = PRINTED, ()

    def __init__(self, fluid):
        self.fluid, self.kept = fluid, {}

    def _equation(self, there):
        import feos

        key = tuple(there)
        if key not in self.kept:
            f = self.fluid
            names = [feos.Identifier(name=str(i)) for i in there]
            records = [
                feos.PureRecord(name, 1e3 * f.MW[i], tc=f.Tc[i], pc=f.Pc[i], acentric_factor=f.omega[i])
                for name, i in zip(names, there)
            ]
            pairs = [
                feos.BinaryRecord(names[a], names[b], k_ij=float(f.mixing.kij[there[a], there[b]]))
                for a in range(len(there)) for b in range(a) if f.mixing.kij[there[a], there[b]] != 0.0
            ]  # fmt: skip
            self.kept = {key: feos.EquationOfState.peng_robinson(feos.Parameters.from_records(records, pairs))}
        return self.kept[key]

    def flash(self, T, P, z, there):
        """Phases as (share, composition); no split found is one phase."""
        import feos
        import si_units as si

        try:
            found = feos.PhaseEquilibrium.tp_flash(
                self._equation(there), T * si.KELVIN, P * si.PASCAL, z * si.MOL
            )
        except RuntimeError as error:
            if "split" in str(error).lower():
                return [(1.0, z)]
            raise
        y, x = np.array(found.vapor.molefracs), np.array(found.liquid.molefracs)
        k = np.abs(y - x).argmax()
        beta = (z[k] - x[k]) / (y[k] - x[k])
        return [(1.0 - beta, x), (beta, y)]

    def bubble(self, T, z, there):
        """Pressure and composition of the bubble."""
        import feos
        import si_units as si

        found = feos.PhaseEquilibrium.bubble_point(self._equation(there), T * si.KELVIN, z)
        return found.vapor.pressure() / si.PASCAL, np.array(found.vapor.molefracs)


class CoolProp:
    """CoolProp's Peng-Robinson with our species added to its list."""

    constants, raises = EXACT, ()

    def __init__(self, fluid):
        from CoolProp import CoolProp as library

        self.library, self.fluid, self.kept = library, fluid, {}
        species = [
            {"CAS": f"{i}-00-0", "name": f"OURS{i}", "aliases": [], "Tc": fluid.Tc[i], "Tc_units": "K",
             "pc": fluid.Pc[i], "pc_units": "Pa", "acentric": fluid.omega[i], "molemass": fluid.MW[i],
             "molemass_units": "kg/mol", "rhomolarc": fluid.Pc[i] / (0.3 * 8.314 * fluid.Tc[i]),
             "rhomolarc_units": "mol/m^3"}
            for i in range(fluid.c)
        ]  # fmt: skip
        library.add_fluids_as_JSON("PR", json.dumps(species))

    def _state(self, z, there):
        key = tuple(there)
        if key not in self.kept:
            state = self.library.AbstractState("PR", "&".join(f"OURS{i}" for i in there))
            for a in range(len(there)):
                for b in range(a):
                    state.set_binary_interaction_double(a, b, "kij", float(self.fluid.mixing.kij[there[a], there[b]]))
            self.kept = {key: state}
        self.kept[key].set_mole_fractions(z.tolist())
        return self.kept[key]

    def flash(self, T, P, z, there):
        """Phases as (share, composition)."""
        state = self._state(z, there)
        state.update(self.library.PT_INPUTS, P, T)
        if state.phase() != self.library.iphase_twophase:
            return [(1.0, z)]
        beta = state.Q()
        return [
            (1.0 - beta, np.array(state.mole_fractions_liquid())), (beta, np.array(state.mole_fractions_vapor()))
        ]  # fmt: skip

    def bubble(self, T, z, there):
        """Pressure and composition of the bubble."""
        state = self._state(z, there)
        state.update(self.library.QT_INPUTS, 0.0, T)
        return state.p(), np.array(state.mole_fractions_vapor())
