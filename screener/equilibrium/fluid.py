"""The fluid: species constants and a model, behind one protocol.

Whatever the model, a flash sees only fugacity coefficients by phase. All
routines are batched: n lanes first, c components last, SI throughout, and a
lane whose input is no number answers NaN without disturbing the others.

`fluid.at(T)` holds everything that depends on temperature alone, so that an
iteration at fixed temperature pays for it once; its `.mix(x)` holds what does
not depend on pressure either.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.equilibrium.alpha import Soave, m_of_omega
from screener.equilibrium.at_temperature import AtTemperature, as_lanes, as_rows, distinct
from screener.equilibrium.eos import EQUATIONS, Equation, attraction_at_critical, covolume
from screener.equilibrium.mixing import VanDerWaals, interaction_matrix
from screener.ground.constants import R
from screener.ground.errors import InputError, ShapeError

MODELS = ("auto", "PR-GE", "PR", "SRK", "gamma-phi")


@dataclass(frozen=True)
class Fluid:
    """Constants, model and model parameters of c components.

    names (c,), MW (c,) [kg/mol], Tc (c,) [K], Pc (c,) [Pa], omega (c,) [-],
    v_15 (c,) liquid volume at 15 degC [m3/mol], NaN where not known; cp_ideal
    (c, 5) polynomials of the ideal-gas heat capacity in T, None without. The
    volume translation is shift_0 + shift_1 (T - 298.15 K), each (c,).
    gaps names the parameters that fell back to zero; missing holds the pairs
    of names whose parameter is needed and unknown.
    """

    names: tuple[str, ...]
    model: str
    MW: np.ndarray
    Tc: np.ndarray
    Pc: np.ndarray
    omega: np.ndarray
    equation: Equation
    alpha: object
    mixing: object
    shift_0: np.ndarray
    shift_1: np.ndarray
    v_15: np.ndarray
    gaps: tuple[str, ...] = ()
    missing: tuple[tuple[str, str], ...] = ()
    vapour_pressure: object = None
    cp_ideal: np.ndarray | None = None

    @classmethod
    def of(cls, names, model: str = "auto") -> Fluid:
        """A fluid of tabulated species and of pseudo-components.

        Parameters
        ----------
        names : sequence of str or Species
            Species names, synonyms, CAS numbers or names of cuts; records as they are.
        model : str
            "auto" (= "PR-GE"), "PR-GE", "PR", "SRK" or "gamma-phi". "PR" takes
            the same alpha with k_ij, but Soave's for gases without groups;
            "SRK" takes alpha from omega and no k_ij.

        Returns
        -------
        Fluid
            Constants and parameters from the tables; `gaps` and `missing` say
            what the tables do not hold.

        Raises
        ------
        UnknownName
            A name in no table.
        InputError
            A model in no list.

        Source
        ------
        PR-GE: Peng and Robinson 1976 with Michelsen, Fluid Phase Equilib. 60
        (1990) 213 and Gmehling, Li and Schiller, Ind. Eng. Chem. Res. 32
        (1993) 178.
        """
        from screener.equilibrium.tabulated import fluid_of

        if model not in MODELS:
            raise InputError("model", model, f"'{model}' is not a model", f"one of {', '.join(MODELS)}")
        return fluid_of(cls, tuple(names), "PR-GE" if model == "auto" else model)

    @classmethod
    def from_constants(
        cls, Tc, Pc, omega, MW, kij=None, eos="PR", alpha="soave", omega_a=None, omega_b=None
    ) -> Fluid:
        """The textbook equation of state from given constants.

        Parameters
        ----------
        Tc : array, shape (c,)
            Critical temperature. [K]
        Pc : array, shape (c,)
            Critical pressure. [Pa]
        omega : array, shape (c,)
            Acentric factor. [-]
        MW : array, shape (c,)
            Molar mass. [kg/mol]
        kij : array, shape (c, c), optional
            Symmetric interaction parameters; zero when absent. [-]
        eos : str
            "PR" (1976), "PR78" (1978 form of m above omega 0.49) or "SRK".
        alpha : str
            "soave": alpha from omega.
        omega_a : float, optional
            Replaces the exact critical constant of a, for printed examples. [-]
        omega_b : float, optional
            Replaces the exact critical constant of b. [-]

        Returns
        -------
        Fluid
            Without volume translation; names are "1", "2", ...

        Raises
        ------
        ShapeError
            The constants do not have one common length.
        InputError
            eos or alpha is no known word, or kij is not symmetric.

        Source
        ------
        Peng and Robinson 1976; Robinson and Peng 1978; Soave 1972.
        """
        if eos not in EQUATIONS:
            raise InputError("eos", eos, f"'{eos}' is not an equation of state", f"one of {', '.join(EQUATIONS)}")
        if alpha != "soave":
            raise InputError("alpha", alpha, f"'{alpha}' is not an alpha function", "soave")
        Tc, Pc, omega, MW = (np.atleast_1d(np.asarray(a, dtype=float)) for a in (Tc, Pc, omega, MW))
        if not Tc.shape == Pc.shape == omega.shape == MW.shape or Tc.ndim != 1:
            raise ShapeError("constants", [a.shape for a in (Tc, Pc, omega, MW)], "one common length (c,)")
        base = EQUATIONS[eos]
        equation = Equation(base.name, base.d, omega_a or base.omega_a, omega_b or base.omega_b)
        zero, unknown = np.zeros_like(Tc), np.full_like(Tc, np.nan)
        return cls(
            names=tuple(str(i + 1) for i in range(Tc.size)), model=eos, MW=MW, Tc=Tc, Pc=Pc, omega=omega,
            equation=equation, alpha=Soave(Tc, m_of_omega(omega, eos)),
            mixing=VanDerWaals(interaction_matrix(kij, Tc.size)), shift_0=zero, shift_1=zero, v_15=unknown,
        )

    @property
    def c(self) -> int:
        """Number of components."""
        return len(self.names)

    @property
    def b_i(self):
        """Covolume (c,) of each component. [m3/mol]"""
        return covolume(self.equation, self.Tc, self.Pc)

    def at(self, T):
        """Everything that depends on temperature alone, for T scalar or (n,). [K]"""
        T, lanes = distinct(T)
        b_i = self.b_i
        with np.errstate(all="ignore"):
            RT = R * T
            a_c = attraction_at_critical(self.equation, self.Tc, self.Pc)
            alpha_i = self.alpha(T) * (a_c / b_i) / RT[:, None]
            mixing = self.mixing.at(T, alpha_i, b_i)
            shift_i = self.shift_0 + self.shift_1 * (T[:, None] - 298.15)
        state = AtTemperature(self, T, alpha_i, b_i, mixing, shift_i)
        if lanes is not None:
            state = state.take(lanes)
        if self.vapour_pressure is not None and self.model == "gamma-phi":
            from screener.equilibrium.gamma_phi import GammaPhiAt

            return GammaPhiAt.of(state, self.vapour_pressure)
        return state

    def ln_phi(self, T, P, x, phase: str):
        """Logarithm of the fugacity coefficients of one phase.

        Parameters
        ----------
        T : float or array, shape (n,)
            Temperature. [K]
        P : float or array, shape (n,)
            Pressure. [Pa]
        x : array, shape (c,) or (n, c)
            Mole fractions of the phase. [-]
        phase : str
            "L" takes the smallest root, "V" the largest.

        Returns
        -------
        array, shape (n, c)
            ln phi. [-]

        Source
        ------
        The module of the mixing rule in use.
        """
        return self.at(T).ln_phi(as_lanes(P), as_rows(x), phase)

    def Z(self, T, P, x, phase: str):
        """Compressibility factor (n,) [-] of the equation of state, untranslated; arguments as `ln_phi`."""
        return self.at(T).mix(as_rows(x)).Z(as_lanes(P), phase)

    def volume(self, T, P, x, phase: str):
        """Translated molar volume (n,) [m3/mol]; arguments as `ln_phi`."""
        return self.at(T).volume(as_lanes(P), as_rows(x), phase)

    def ln_gamma(self, T, x):
        """Logarithm of the activity coefficients (n, c) [-] of the excess Gibbs energy model in use.

        NaN for a model without one.
        """
        return self.at(T).ln_gamma(as_rows(x))

    def molar_mass(self, x):
        """Mean molar mass (n,). [kg/mol]"""
        return as_rows(x) @ self.MW

    def wilson_K(self, T, P):
        """First estimate of y/x (n, c) [-] at T (n,) [K] and P (n,) [Pa].

        Source: Wilson 1968, from memory, unverified; a start of iterations only.
        """
        T, P = as_lanes(T), as_lanes(P)
        return self.Pc / P[:, None] * np.exp(5.373 * (1.0 + self.omega) * (1.0 - self.Tc / T[:, None]))

    def psat(self, T):
        """Reference vapour pressures (n, c) [Pa] of the species; NaN where there is no curve."""
        T = as_lanes(T)
        if self.vapour_pressure is None:
            return np.full((T.size, self.c), np.nan)
        return self.vapour_pressure(T)

    def lacks(self, x):
        """Mask (n,) of the lanes in which both species of a `missing` pair are present."""
        x = as_rows(x)
        lacking = np.zeros(x.shape[0], dtype=bool)
        for one, other in self.missing:
            lacking |= (x[:, self.names.index(one)] > 0.0) & (x[:, self.names.index(other)] > 0.0)
        return lacking
