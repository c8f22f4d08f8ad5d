"""The two-parameter cubic equation of state: constants, and one phase of a mixture.

With n lanes of c components, b = sum x_i b_i and the reduced attraction
alpha = a / (b R T), the equation is

    P = R T [1 / (v - b) - alpha b / ((v + d1 b)(v + d2 b))]

and the fugacity coefficient of component i

    ln phi_i = (b_i / b)(Z - 1) - ln(Z - B)
               - abar_i / (d2 - d1) ln((Z + d2 B) / (Z + d1 B)),

abar_i = d(n alpha)/dn_i. A mixing rule therefore has to supply only alpha,
abar and b, none of which depends on pressure.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.equilibrium.cubic import PENG_ROBINSON, SOAVE_REDLICH_KWONG, Z_of_phase, roots
from screener.equilibrium.rows import row_sum
from screener.ground.constants import R


@dataclass(frozen=True)
class Equation:
    """One cubic equation of state, pure-component constants included.

    d are the two constants of the attraction term, omega_a and omega_b the
    critical constants a = omega_a (R Tc)^2 / Pc and b = omega_b R Tc / Pc. [-]
    """

    name: str
    d: tuple[float, float]
    omega_a: float
    omega_b: float


# The critical constants are the exact ones (triple root at the critical point), not the rounded ones printed
# with the equations; the printed 0.45724 and 0.07780 move a fuel's bubble pressure by 2e-4 to 6e-4.
EQUATIONS = {
    # Peng and Robinson, Ind. Eng. Chem. Fundam. 15 (1976) 59
    "PR": Equation("PR", PENG_ROBINSON, 0.45723552892138218, 0.077796073903888453),
    # Robinson and Peng, GPA Research Report 28 (1978): the same equation, another m above omega 0.49
    "PR78": Equation("PR78", PENG_ROBINSON, 0.45723552892138218, 0.077796073903888453),
    # Soave, Chem. Eng. Sci. 27 (1972) 1197
    "SRK": Equation("SRK", SOAVE_REDLICH_KWONG, 0.42748023354034140, 0.086640349964957721),
}


@dataclass(frozen=True)
class Mixture:
    """A mixture at one temperature and composition per lane: all that pressure does not change.

    alpha (n,) and b (n,) [m3/mol], abar (n, c) = d(n alpha)/dn_i, b_i (c,),
    RT (n,) [J/mol]; x (n, c) and shift_i (n, c) [m3/mol] of the components
    give the volume translation where it is asked for.
    """

    d: tuple[float, float]
    RT: np.ndarray
    alpha: np.ndarray
    abar: np.ndarray
    b: np.ndarray
    b_i: np.ndarray
    x: np.ndarray
    shift_i: np.ndarray

    @property
    def shift(self):
        """Volume translation (n,). [m3/mol]"""
        return row_sum(self.x * self.shift_i)

    def Z(self, P, phase: str):
        """Compressibility factor (n,) [-] of one phase, untranslated."""
        B = self.b * P / self.RT
        return Z_of_phase(self.alpha * B, B, phase, self.d)

    def volume(self, P, phase: str):
        """Translated molar volume (n,). [m3/mol]"""
        return self.Z(P, phase) * self.RT / P - self.shift

    def ln_phi(self, P, phase: str):
        """Logarithm of the fugacity coefficients (n, c). [-]"""
        return self.ln_phi_and_Z(P, phase)[0]

    def ln_phi_and_Z(self, P, phase: str):
        """ln phi (n, c) [-] and the compressibility factor (n,) [-] it belongs to."""
        with np.errstate(all="ignore"):
            B = self.b * P / self.RT
            Z = Z_of_phase(self.alpha * B, B, phase, self.d)
            return self.ln_phi_at(Z, B), Z

    def ln_phi_at(self, Z, B):
        """ln phi (n, c) [-] at compressibility factors Z (n,) and B = b P / RT (n,). [-]"""
        d1, d2 = self.d
        attraction = np.log((Z + d2 * B) / (Z + d1 * B)) / (d1 - d2)
        # the two other terms are one product of small matrices: half the passes over (n, c)
        of_lane, of_species = np.empty((Z.size, 2)), np.empty((2, self.b_i.size))
        of_lane[:, 0], of_lane[:, 1] = (Z - 1.0) / self.b, np.log(Z - B)
        of_species[0], of_species[1] = self.b_i, -1.0
        ln_phi = of_lane @ of_species
        ln_phi += self.abar * attraction[:, None]
        return ln_phi

    def gibbs_departure(self, P, x, phase: str):
        """Residual Gibbs energy over RT (n,) [-]: sum of x_i ln phi_i."""
        return row_sum(x * self.ln_phi(P, phase))

    def helmholtz_residual(self, v):
        """Residual Helmholtz energy over RT (n,) [-] at untranslated molar volume v [m3/mol]."""
        d1, d2 = self.d
        with np.errstate(all="ignore"):
            ratio = np.log((v + d2 * self.b) / (v + d1 * self.b))
            return -np.log1p(-self.b / v) - self.alpha / (d2 - d1) * ratio


FEW_LANES = 32  # up to here the overhead of a call outweighs the work in it


def both_phases(liquid, vapour, P):
    """ln phi (n, c) and Z (n,) of a liquid, then of a vapour, at one pressure P (n,) [Pa].

    Of few lanes the roots of both are found in one call.
    """
    if P.size > FEW_LANES or not isinstance(liquid, Mixture):
        return *liquid.ln_phi_and_Z(P, "L"), *vapour.ln_phi_and_Z(P, "V")
    n = P.size
    with np.errstate(all="ignore"):
        B_L, B_V = liquid.b * P / liquid.RT, vapour.b * P / vapour.RT
        found = roots(np.concatenate([liquid.alpha * B_L, vapour.alpha * B_V]), np.concatenate([B_L, B_V]), liquid.d)
        Z_L, Z_V = found.Z_L[:n], found.Z_V[n:]
        return liquid.ln_phi_at(Z_L, B_L), Z_L, vapour.ln_phi_at(Z_V, B_V), Z_V


def covolume(equation: Equation, Tc, Pc):
    """b (c,) [m3/mol] from critical temperature [K] and pressure [Pa]."""
    return equation.omega_b * R * Tc / Pc


def attraction_at_critical(equation: Equation, Tc, Pc):
    """a (c,) [Pa m6/mol2] at the critical temperature, from Tc [K] and Pc [Pa]."""
    return equation.omega_a * (R * Tc) ** 2 / Pc
