"""Vapour pressure of crude oil and condensate: ASTM D6377 and its Reid equivalent."""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache

import numpy as np

from screener.ground.constants import T_100F
from screener.ground.errors import UnknownName
from screener.ground.files import read_table
from screener.volatility.cell import vapour_pressure_at_ratio
from screener.volatility.results import CellPressure, Lanes

T_METERING = 293.15  # the piston cell draws its sample at 20 degC or warmer [K]; ASTM D6377, read on the publisher's page
SCOPE = 25e3, 180e3  # [Pa] at 37.8 degC; ASTM D6377-20 scope, read on the publisher's page
RATIOS = 0.02, 4.0  # [-] the same


@dataclass(frozen=True)
class CrudePressure(Lanes):
    """VPCR of one liquid a lane: the vapour pressure of crude at a ratio and a temperature.

    P (n,) [Pa] total pressure in the cell, no air taken off and none put in; ratio (n,) [-],
    T and T_fill (n,) [K]; in_scope (n,) whether ratio and pressure lie where the method claims
    precision, at 37.8 degC; cell the phases behind it.
    """

    P: np.ndarray
    ratio: np.ndarray
    T: np.ndarray
    T_fill: np.ndarray
    in_scope: np.ndarray
    cell: CellPressure


def vapour_pressure_crude(fluid, x, *, ratio=4.0, T=T_100F, T_fill=T_METERING) -> CrudePressure:
    """VPCR_ratio(T) of ASTM D6377: a live sample from a floating-piston cylinder, expanded.

    No air saturation, no chilling: gases in the composition are part of the sample. The charge
    is measured at T_fill; a ratio that the warmed charge overfills has no answer (0.02 with a
    sample metered at 0 degC).

    Parameters
    ----------
    fluid : Fluid
        Species and model of c components.
    x : array, shape (c,) or (n, c)
        Liquid mole fractions. [-]
    ratio : float or array, shape (n,)
        Vapour-liquid ratio, 0.02 to 4 in the method. [-]
    T : float or array, shape (n,)
        Temperature of the cell. [K]
    T_fill : float or array, shape (n,)
        Temperature at which the sample is metered. [K]

    Returns
    -------
    CrudePressure
        P (n,) [Pa]. NO_SOLUTION: the cell is overfilled.

    Source
    ------
    ASTM D6377-20 scope and section 5 (read on the publisher's page) as a computation; volumes
    of crude oil after API MPMS 11.1.
    """
    cell = vapour_pressure_at_ratio(fluid, T, x, ratio, T_fill=T_fill, product="crude")
    T_fill = np.broadcast_to(np.asarray(T_fill, dtype=float), cell.P.shape)
    with np.errstate(invalid="ignore"):
        scope = (cell.ratio >= RATIOS[0]) & (cell.ratio <= RATIOS[1]) & (np.abs(cell.T - T_100F) < 0.1)
        scope &= (cell.P >= SCOPE[0]) & (cell.P <= SCOPE[1])
    return CrudePressure(cell.status, cell.P, cell.ratio, cell.T, np.array(T_fill), scope, cell)


@dataclass(frozen=True)
class RvpeFactor:
    """RVPE = factor x VPCR4(37.8 degC); evidence as in the data table."""

    sample: str
    factor: float
    evidence: str
    source: str


@lru_cache(maxsize=1)
def rvpe_factors() -> dict[str, RvpeFactor]:
    """Factors by how the sample was taken; data/volatility/rvpe_factors.csv."""
    return {
        r["sample"]: RvpeFactor(r["sample"], float(r["factor"]), r["evidence"], r["source"])
        for r in read_table("volatility/rvpe_factors.csv")
    }


def reid_equivalent_crude(vpcr_4, *, sample: str = "floating piston") -> np.ndarray:
    """Reid vapour pressure equivalent (RVPE) of a crude from its VPCR4 at 37.8 degC.

    A label, not a physical pressure, and its factors are remembered: nothing may be judged
    to have room by it. The standard itself calls the equation not universally applicable.

    Parameters
    ----------
    vpcr_4 : float or array, shape (n,)
        Vapour pressure at a ratio of 4 and 37.8 degC. [Pa]
    sample : str
        "floating piston" (pressurised) or "open container".

    Returns
    -------
    array, shape (n,)
        RVPE. [Pa]

    Raises
    ------
    UnknownName
        No factor for that way of sampling.

    Source
    ------
    ASTM D6377 appendix X1, from memory, unverified; data/volatility/rvpe_factors.csv.
    """
    if sample not in rvpe_factors():
        raise UnknownName("sample", sample, "way of sampling", rvpe_factors())
    return rvpe_factors()[sample].factor * np.atleast_1d(np.asarray(vpcr_4, dtype=float))
