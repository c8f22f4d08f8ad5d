"""Fluids of tabulated species: the tables of `screener.species` turned into models."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.equilibrium.alpha import ByComponent, Soave, Twu, m_of_omega
from screener.equilibrium.cubic import Z_of_phase
from screener.equilibrium.eos import EQUATIONS, attraction_at_critical, covolume
from screener.equilibrium.excess import Excess
from screener.equilibrium.mixing import VanDerWaals, interaction_matrix
from screener.equilibrium.unifac import Unifac
from screener.equilibrium.water_term import WaterTerm
from screener.equilibrium.zero_pressure import ZeroPressure
from screener.ground.constants import ATMOSPHERE, T_15C, R


def fluid_of(kind, names, model: str):
    """A fluid of species by name or as records; see `Fluid.of`."""
    from screener import species

    found = tuple(species.find(name) for name in names)
    canonical = tuple(one.name for one in found)
    table = species.columns(found)
    parts = _van_der_waals if model in ("PR", "SRK") else _peng_robinson_excess
    equation, alpha, mixing, shift, gaps, missing = parts(found, model, table)
    return kind(
        names=canonical, model=model, MW=table.MW, Tc=table.Tc, Pc=table.Pc, omega=table.omega, equation=equation,
        alpha=alpha, mixing=mixing, shift_0=shift[0], shift_1=shift[1], v_15=table.MW / table.rho_15, gaps=gaps,
        missing=missing, vapour_pressure=Curves(found), cp_ideal=table.cp_ideal,
    )


@dataclass(frozen=True)
class Curves:
    """The reference vapour-pressure curves of several species."""

    species: tuple

    def __call__(self, T):
        """Vapour pressures (n, c) [Pa] at T (n,) [K]; NaN outside a curve's range."""
        return np.stack([np.atleast_1d(one.psat(T)) for one in self.species], axis=-1)


def _alpha(table) -> Twu:
    return Twu(table.Tc, table.L, table.M, table.N, table.C, table.D)


def _peng_robinson_excess(found, model: str, table):
    """Parts of the PR-GE fluid: equation, alpha, mixing rule, translation, gaps, missing pairs."""
    from screener import species

    R_k, Q_k, main, a, b, c = species.group_tables(table.subgroups)
    unifac = Unifac.of(table.groups, R_k, Q_k, main, a, b, c)
    A0, A1, A2, lacking = species.pair_terms(found)
    missing = tuple(tuple(pair) for pair in lacking) + _pairs_without_groups(table.names, table.groups, a)
    gaps = tuple(f"no parameter for {one} + {other}; taken as zero" for one, other in missing)
    water = WaterTerm.of(unifac, species.water_targets(found))
    mixing = ZeroPressure(Excess.of(unifac, A0, A1, A2, water))
    return EQUATIONS["PR"], _alpha(table), mixing, (table.c0, table.c1), gaps, missing


def _pairs_without_groups(names, counts, a):
    """Pairs of species that bring together two groups whose interaction is in no table."""
    unknown = np.isnan(a) | np.isnan(a.T)
    has = counts > 0
    touch = (has @ unknown.astype(float) @ has.T) > 0.0
    c = len(names)
    return tuple((names[i], names[j]) for i in range(c) for j in range(i, c) if touch[i, j])


def _van_der_waals(found, model: str, table):
    """Parts of the plain cubic equations: equation, alpha, mixing rule, translation, gaps, nothing missing."""
    from screener import species

    equation = EQUATIONS[model]
    if model == "SRK":
        alpha = Soave(table.Tc, m_of_omega(table.omega, "SRK"))
        shift = _shift_at_15(equation, alpha, table)
        gaps = ("no table of k_ij for SRK; every pair taken as zero",) if len(found) > 1 else ()
        return equation, alpha, VanDerWaals(None), (shift, np.zeros_like(shift)), gaps, ()
    kij, fallback = species.interactions(found, model)
    gaps = tuple(f"k_ij of {one} + {other} in no table; taken as zero" for one, other in fallback)
    mixing = VanDerWaals(interaction_matrix(kij, len(found)))
    # library k_ij of gases far above their critical point were fitted with Soave's alpha and go wrong with another
    gas = table.groups.sum(axis=1) == 0.0
    alpha = ByComponent(gas, Soave(table.Tc, m_of_omega(table.omega, "PR")), _alpha(table)) if gas.any() else _alpha(table)
    return equation, alpha, mixing, (table.c0, table.c1), gaps, ()


def _shift_at_15(equation, alpha, table):
    """Constant translation (c,) [m3/mol] that gives each species its liquid volume at 15 degC and 1 atm.

    Zero where the species is no liquid there.
    """
    b = covolume(equation, table.Tc, table.Pc)
    RT = R * T_15C
    attraction = alpha(np.array([T_15C]))[0] * attraction_at_critical(equation, table.Tc, table.Pc) / (b * RT)
    B = b * ATMOSPHERE / RT
    Z = Z_of_phase(attraction * B, B, "L", equation.d)
    shift = Z * RT / ATMOSPHERE - table.MW / table.rho_15
    return np.where((Z < 4.0 * B) & np.isfinite(shift), shift, 0.0)
