"""One species: constants, fitted forms and their evidence."""

from __future__ import annotations

from dataclasses import dataclass, field

import numpy as np

from screener.species import forms


@dataclass(frozen=True)
class Curve:
    """A vapour-pressure curve of our own fit and what it rests on.

    T_low and T_high [K] bound the fit; the source curve covers source_low to source_high [K]
    and beyond that the fit continues it (see data/species/vapour_pressure.toml).
    fit_error [-] is the largest relative miss against the source.
    """

    coefficients: tuple[float, ...]
    T_low: float
    T_high: float
    source: str
    source_low: float
    source_high: float
    fit_error: float


@dataclass(frozen=True)
class Limit:
    """An exposure limit and how it is known.

    kind "TWA", "STEL", "ceiling", "peak" or "IDLH"; value [mole fraction in air].
    """

    kind: str
    value: float
    agency: str
    date: str
    evidence: str


@dataclass(frozen=True)
class Species:
    """Constants of one species, SI.

    MW [kg/mol], Tc [K], Pc [Pa], omega [-], Tb [K]; alpha are the five constants
    L, M, N, C, D of `screener.species.alpha` [-]; translation c0 [m3/mol], c1 [m3/(mol K)] in
    v = v_PR - (c0 + c1 (T - 298.15 K)); cp_ideal a0..a4 of a polynomial in T [J/(mol K)],
    200-500 K; groups {subgroup number: count} of modified UNIFAC (Dortmund), empty for a
    gas without groups; rho_15 saturated liquid density at 15 degC [kg/m3], for a gas
    without liquid there an effective one named in rho_note.

    psat_spread [-] is the largest relative disagreement of independent vapour-pressure
    curves within 250-350 K, None with a single curve; psat_extension [-] the largest
    band (two standard deviations) within 250-350 K of a curve that is continued or set by heats, 0
    where neither was needed. flash_point [K], LFL and UFL [mole fraction in air], each with its source.

    families holds what a pseudo-component is made of, (family, share of its molecules) [-]; empty
    for a real species, which is all of its own family. A pseudo-component's groups are means.
    """

    name: str
    synonyms: tuple[str, ...]
    cas: str
    formula: str
    family: str
    MW: float
    Tc: float
    Pc: float
    omega: float
    Tb: float
    alpha: tuple[float, float, float, float, float]
    translation: tuple[float, float]
    cp_ideal: tuple[float, ...]
    groups: dict[int, float] = field(hash=False)
    rho_15: float
    rho_note: str
    curve: Curve
    psat_spread: float | None
    psat_extension: float
    psat_note: str
    flash_point: float | None = None
    flash_point_source: str = ""
    LFL: float | None = None
    LFL_source: str = ""
    UFL: float | None = None
    UFL_source: str = ""
    exposure: tuple[Limit, ...] = ()
    live: bool = field(default=False)
    families: tuple[tuple[str, float], ...] = ()

    def psat(self, T):
        """Vapour pressure [Pa] of the chosen curve at T [K], scalar or (n,); NaN outside its range."""
        T = np.asarray(T, dtype=float)
        inside = (T >= self.curve.T_low) & (T <= self.curve.T_high)
        P = np.where(
            inside, forms.psat(self.curve.coefficients, np.where(inside, T, self.curve.T_low)), np.nan
        )
        return float(P) if P.ndim == 0 else P

    @property
    def family_shares(self) -> tuple[tuple[str, float], ...]:
        """Families of the molecules and their shares [-]; one for a real species."""
        return self.families or ((self.family, 1.0),)

    @property
    def psat_error(self) -> float:
        """Relative error bar of the vapour pressure in 250-350 K [-]: the worse of spread and extension."""
        return max(self.psat_spread or 0.0, self.psat_extension)
