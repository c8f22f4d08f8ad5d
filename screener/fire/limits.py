"""Flammable limits: of each species at 25 degC, at another temperature, of a vapour mixture.

A species without a tabled limit gets an estimate by the method of Jones, marked as such
and carrying the error measured against the tabled species (data/fire/limit_estimates.csv).
"""

from __future__ import annotations

import re
from dataclasses import dataclass
from functools import lru_cache

import numpy as np

from screener.ground.errors import UnknownName
from screener.ground.files import read_table
from screener.species import find

T_TABLED = (
    298.15  # temperature of the tabled limits, 25 degC [K]; column heading of data/species/flammability.csv
)
# Fall of the lower limit and rise of the upper one, as shares of their value at 25 degC [1/K]:
# modified Burgess-Wheeler law, Zabetakis, US Bureau of Mines Bulletin 627 (1965). From memory,
# unverified; equal to 0.75 kcal/mol over the usual 1040 kcal/mol of LFL (in percent) times heat of burning.
PER_KELVIN = 0.000721
FORMULA = re.compile(r"([A-Z][a-z]?([\d.]+)?)+")
CH2 = 0.0140266  # [kg/mol] of one CH2; atomic weights of IUPAC
O2_IN_AIR = 0.2095  # [-] dry air; from memory, unverified (CIPM 2007 gives 0.2093)


def atoms(formula: str) -> dict[str, float]:
    """Counts of the elements of a formula such as C8H18 or C9.3H18.1O."""
    found: dict[str, float] = {}
    for element, count in re.findall(r"([A-Z][a-z]?)([\d.]*)", formula):
        found[element] = found.get(element, 0.0) + float(count or 1.0)
    return found


def oxygen_demand(formula: str) -> float:
    """Moles of oxygen that burn one mole completely [-]; zero or less: does not burn.

    Carbon goes to carbon dioxide, hydrogen to water, sulfur to sulfur dioxide.
    """
    n = atoms(formula)
    return n.get("C", 0.0) + n.get("H", 0.0) / 4.0 + n.get("S", 0.0) - n.get("O", 0.0) / 2.0


@dataclass(frozen=True)
class LimitRule:
    """Jones: limit = coefficient x stoichiometric share; tabled values lie between low and high
    times the estimate (5th and 95th percentile of `count` species)."""

    coefficient: float
    low: float
    high: float
    count: int


@lru_cache(maxsize=1)
def limit_rules() -> dict[str, LimitRule]:
    """The estimate of "LFL" and "UFL" with its stated error."""
    return {
        row["limit"]: LimitRule(
            float(row["coefficient"]), float(row["low"]), float(row["high"]), int(row["count"])
        )
        for row in read_table("fire/limit_estimates.csv")
    }


def limit_jones_1938(formula: str, limit: str) -> float:
    """Flammable limit of a species in air from its formula.

    Parameters
    ----------
    formula : str
        Chemical formula; broken counts are allowed.
    limit : str
        "LFL" or "UFL".

    Returns
    -------
    float
        Mole fraction in air near 25 degC: 0.55 or 3.5 times the stoichiometric share; NaN
        for a formula that holds neither carbon nor hydrogen. [-]

    Validity
    --------
    Hydrocarbons and their oxygenates; a petroleum cut counts as CnH2n of its molar mass. Measured error:
    data/fire/limit_estimates.toml.

    Source
    ------
    G.W. Jones, Chem. Rev. 22 (1938) 1; coefficients as carried by chemicals 1.5.2.
    """
    demand = oxygen_demand(formula)
    if not demand > 0.0 or "C" not in atoms(formula):
        return float("nan")
    return limit_rules()[limit].coefficient / (1.0 + demand / O2_IN_AIR)


@dataclass(frozen=True)
class Flammability:
    """Flammable limits of the c species of a fluid.

    LFL and UFL (c,) mole fraction in air at 25 degC [-], infinite for a species that does
    not burn, NaN where there is neither value nor estimate; LFL_estimated and
    UFL_estimated (c,) masks; flash_point (c,) [K] and P_flash (c,) [Pa] vapour pressure
    there, NaN without; oxygen (c,) [-] moles of oxygen to burn one; burns (c,) mask.
    """

    names: tuple[str, ...]
    LFL: np.ndarray
    UFL: np.ndarray
    LFL_estimated: np.ndarray
    UFL_estimated: np.ndarray
    flash_point: np.ndarray
    P_flash: np.ndarray
    oxygen: np.ndarray
    burns: np.ndarray

    @classmethod
    def of(cls, fluid) -> Flammability:
        """Limits of the species of a fluid, tabled or estimated."""
        found = getattr(fluid.vapour_pressure, "species", None) or [_record(name) for name in fluid.names]
        rows = [_row(one) for one in found]
        LFL, UFL, low, high, flash, P_flash, oxygen = (np.array(column) for column in zip(*rows, strict=True))
        return cls(fluid.names, LFL, UFL, low, high, flash, P_flash, oxygen, ~np.isinf(LFL))

    def limit_at(self, limit: str, T, shift: float = 0.0) -> np.ndarray:
        """Limits (n, c) [-] at T (n,) [K]; shift -1 or +1 takes estimates at the low or high end of their
        error."""
        T = np.atleast_1d(np.asarray(T, dtype=float))
        value, estimated = getattr(self, limit), getattr(self, f"{limit}_estimated")
        rule, sign = limit_rules()[limit], -1.0 if limit == "LFL" else 1.0
        if shift:
            value = value * np.where(estimated, rule.low if shift < 0.0 else rule.high, 1.0)
        return value * (1.0 + sign * PER_KELVIN * (T - T_TABLED))[:, None]

    def resting_on_estimates(self, limit: str) -> tuple[str, ...]:
        """Names of the species whose "LFL" or "UFL" is an estimate."""
        return tuple(
            n for n, guess in zip(self.names, getattr(self, f"{limit}_estimated"), strict=True) if guess
        )

    def without_data(self) -> tuple[str, ...]:
        """Names of the species for which there is neither limit nor estimate."""
        lacking = np.isnan(self.LFL) | np.isnan(self.UFL)
        return tuple(n for n, lacks in zip(self.names, lacking, strict=True) if lacks)

    def unknown(self, x, *limits: str) -> np.ndarray:
        """Mask (n,) of the lanes that hold a species without value and estimate of one of the limits."""
        lacking = np.zeros(len(self.names), dtype=bool)
        for limit in limits:
            lacking |= np.isnan(getattr(self, limit))
        return (np.atleast_2d(x)[:, lacking] > 0.0).any(axis=1)


def _record(name):
    try:
        return find(name)
    except UnknownName:
        return None


def _row(one):
    nan = float("nan")
    if one is None:
        return nan, nan, False, False, nan, nan, nan
    formula = one.formula
    if not FORMULA.fullmatch(formula):
        # A petroleum cut has none: CnH2n of its molar mass. Between H/C 1.6 and 2.2 that moves an estimate
        # by 4 %.
        formula = f"C{one.MW / CH2:.6f}H{2.0 * one.MW / CH2:.6f}"
    demand = oxygen_demand(formula)
    if demand <= 0.0:
        return np.inf, np.inf, False, False, nan, nan, 0.0
    LFL, UFL = one.LFL, one.UFL
    flash = one.flash_point or nan
    return (
        LFL if LFL is not None else limit_jones_1938(formula, "LFL"),
        UFL if UFL is not None else limit_jones_1938(formula, "UFL"),
        LFL is None, UFL is None, flash, one.psat(flash), demand,
    )  # fmt: skip


def mixture_limit(y, limits) -> np.ndarray:
    """Flammable limit of a vapour mixture.

    Parameters
    ----------
    y : array, shape (n, c)
        Amounts of the flammable vapours, any common scale. [-]
    limits : array, shape (n, c) or (c,)
        Limits of each of them in air, infinite for what does not burn. [-]

    Returns
    -------
    array, shape (n,)
        Limit of their sum in air; NaN without any flammable vapour. [-]

    Validity
    --------
    Good for lower limits of paraffins and their kin. For upper limits it is the usual
    rule but weaker, and it fails for hydrogen, hydrogen sulfide and ethers (common
    practice, no source). Inert vapour is taken as air.

    Source
    ------
    Le Chatelier's rule, as quoted in encyclopedias of flammable limits.
    """
    y = np.atleast_2d(np.asarray(y, dtype=float))
    limits = np.broadcast_to(limits, y.shape)
    fuel = np.where(np.isinf(limits), 0.0, y).sum(axis=1)
    need = np.where(y > 0.0, y / limits, 0.0).sum(axis=1)
    with np.errstate(all="ignore"):
        return np.where(need > 0.0, fuel / need, np.nan)
