"""Activity coefficients over reference vapour pressures: the cross-check of the PR-GE model.

Liquid: f_i = x_i gamma_i Psat_i phi_sat_i exp(v_i (P - Psat_i) / RT), with the
same excess Gibbs energy as PR-GE and v_i the liquid volume at 15 degC. Vapour
(and phi_sat): the Peng-Robinson equation with van der Waals mixing, k_ij = 0.
A gas above its critical temperature has no vapour pressure; its fugacity as a
hypothetical liquid is the zero-pressure value of the Peng-Robinson equation,
which is also what the pair terms are fitted against.

Source: Smith, Van Ness and Abbott, Introduction to Chemical Engineering
Thermodynamics, gamma/phi formulation (from memory, unverified).
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.equilibrium.cubic import Z_of_phase
from screener.equilibrium.eos import Mixture
from screener.equilibrium.mixing import VanDerWaals
from screener.ground.constants import R


@dataclass(frozen=True)
class GammaPhiAt:
    """The gamma-phi model at fixed temperatures.

    state is the PR-GE state (its activity coefficients and volumes are used),
    vapour the van der Waals rule, ln_f (n, c) the fugacity of each pure liquid
    at zero pressure [ln Pa], v_RT (n, c) its volume over RT. [1/Pa]
    """

    state: object
    vapour: object
    ln_f: np.ndarray
    v_RT: np.ndarray

    @classmethod
    def of(cls, state, vapour_pressure) -> GammaPhiAt:
        """From a PR-GE state and vapour_pressure(T) -> (n, c) [Pa], NaN without a curve."""
        fluid = state.fluid
        psat = np.atleast_2d(vapour_pressure(state.T))
        RT = R * state.T[:, None]
        with np.errstate(all="ignore"):
            v_RT = fluid.v_15 / RT
            ln_f = np.log(psat) + _pure_ln_phi(fluid.equation.d, state, psat, RT) - v_RT * psat
            hypothetical = state.mixing.reference + np.log(RT)
            ln_f = np.where(np.isfinite(ln_f), ln_f, hypothetical)
            vapour = VanDerWaals(None).at(state.T, state.alpha_i, state.b_i)
        return cls(state, vapour, ln_f, v_RT)

    @property
    def fluid(self):
        """The fluid of this state."""
        return self.state.fluid

    @property
    def T(self):
        """Temperatures (n,), or one for all lanes. [K]"""
        return self.state.T

    def take(self, lanes) -> GammaPhiAt:
        """The same for some of the lanes; one T for all lanes stays so."""
        if self.T.size == 1:
            return self
        return GammaPhiAt(self.state.take(lanes), self.vapour.take(lanes), self.ln_f[lanes], self.v_RT[lanes])

    def mix(self, x) -> GammaPhiMixture:
        """Mixtures of compositions x (c,) or (n, c)."""
        x = np.atleast_2d(np.asarray(x, dtype=float))
        s = self.state
        liquid = s.mix(x)
        with np.errstate(all="ignore"):
            alpha, abar = self.vapour.mix(x, liquid.b, s.b_i)
            ln_f = self.ln_f + s.ln_gamma(x)
        vapour = Mixture(liquid.d, liquid.RT, alpha, abar, liquid.b, s.b_i, liquid.x, liquid.shift_i)
        return GammaPhiMixture(liquid, vapour, ln_f, self.v_RT)

    def ln_phi(self, P, x, phase: str):
        """ln phi (n, c) [-] at P (n,) [Pa] and composition x (n, c)."""
        return self.mix(x).ln_phi(np.atleast_1d(np.asarray(P, dtype=float)), phase)

    def volume(self, P, x, phase: str):
        """Translated molar volume (n,) [m3/mol] at P (n,) [Pa] and composition x (n, c)."""
        return self.mix(x).volume(np.atleast_1d(np.asarray(P, dtype=float)), phase)

    def ln_gamma(self, x):
        """ln gamma (n, c) [-] at composition x (n, c)."""
        return self.state.ln_gamma(x)


@dataclass(frozen=True)
class GammaPhiMixture:
    """A mixture of the gamma-phi model: an equation of state for each phase, activity in the liquid.

    liquid gives volumes only; ln_f (n, c) is ln of gamma_i times the pure
    liquid's fugacity at zero pressure [ln Pa], v_RT (n, c) its volume over RT. [1/Pa]
    """

    liquid: Mixture
    vapour: Mixture
    ln_f: np.ndarray
    v_RT: np.ndarray

    @property
    def d(self):
        """Constants of the equation of state. [-]"""
        return self.liquid.d

    @property
    def RT(self):
        """RT (n,). [J/mol]"""
        return self.liquid.RT

    @property
    def b(self):
        """Covolume (n,). [m3/mol]"""
        return self.liquid.b

    def Z(self, P, phase: str):
        """Compressibility factor (n,) [-] of one phase, untranslated."""
        return (self.liquid if phase == "L" else self.vapour).Z(P, phase)

    def volume(self, P, phase: str):
        """Translated molar volume (n,). [m3/mol]"""
        return (self.liquid if phase == "L" else self.vapour).volume(P, phase)

    def ln_phi(self, P, phase: str):
        """Logarithm of the fugacity coefficients (n, c). [-]"""
        return self.ln_phi_and_Z(P, phase)[0]

    def ln_phi_and_Z(self, P, phase: str):
        """ln phi (n, c) [-] and the compressibility factor (n,) [-] of the equation of state."""
        if phase == "V":
            return self.vapour.ln_phi_and_Z(P, phase)
        with np.errstate(all="ignore"):
            return self.ln_f + self.v_RT * P[:, None] - np.log(P)[:, None], self.liquid.Z(P, phase)


def _pure_ln_phi(d, state, P, RT):
    """ln phi (n, c) [-] of each pure vapour at its own pressure P (n, c). [Pa]"""
    B = state.b_i * P / RT
    Z = Z_of_phase(state.alpha_i * B, B, "V", d)
    return Z - 1.0 - np.log(Z - B) - state.alpha_i / (d[1] - d[0]) * np.log((Z + d[1] * B) / (Z + d[0] * B))
