"""ASTM D6378: vapour pressure by three expansions of one charge, without chilling or air saturation."""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache

import numpy as np

from screener.equilibrium import bubble_pressure
from screener.ground.constants import ATMOSPHERE, T_100F
from screener.ground.errors import ShapeError, UnknownName
from screener.ground.files import read_table
from screener.ground.status import Status
from screener.volatility.cell import vapour_pressure_at_ratio
from screener.volatility.results import Lanes

RATIOS = (
    1.0,
    2.0,
    4.0,
)  # vapour-liquid ratios of the three readings; our choice, the method allows 1 to 4 (its scope)
T_CHARGE = 293.15  # the sample is drawn as it is, at room temperature [K]; common practice, no source


@dataclass(frozen=True)
class TripleExpansion(Lanes):
    """Three readings of one charge and what the method makes of them.

    readings (n, 3) [Pa] total pressures; P (n,) [Pa] the vapour pressure that the method reports at the last
    ratio, P_air (n,) [Pa] the air it takes off; DVPE (n,) [Pa] is P less the bias of the
    container. P_vapour (n,) [Pa] is the vapour pressure that truly stood in the cell, NaN when
    the readings were given: the method's algebra takes the fuel for pure, and charges what its
    vapour pressure falls between the expansions to the air.
    """

    readings: np.ndarray
    P: np.ndarray
    P_air: np.ndarray
    DVPE: np.ndarray
    P_vapour: np.ndarray
    container: str


@lru_cache(maxsize=1)
def d6378_biases() -> dict[str, float]:
    """Bias [Pa] by sample container; data/volatility/d6378_bias.csv."""
    return {r["container"]: 1000.0 * float(r["bias_kPa"]) for r in read_table("volatility/d6378_bias.csv")}


def _bias(container: str) -> float:
    if container not in d6378_biases():
        raise UnknownName("container", container, "sample container", d6378_biases())
    return d6378_biases()[container]


def triple_expansion(volumes, readings, *, T=None, T_asked=None, container: str = "1 L") -> TripleExpansion:
    """Vapour pressure from three total pressures at one temperature: the algebra of the method.

    Air obeys p = C/(V + k), k absorbing what is dissolved, and the fuel's vapour pressure is
    taken as one number; three readings leave nothing open. The answer does not change when a
    constant is added to all volumes.

    Parameters
    ----------
    volumes : array, shape (3,) or (n, 3)
        Vapour volumes, or cell volumes, of the three readings, rising; any unit. [-]
    readings : array, shape (3,) or (n, 3)
        Total pressures. [Pa]
    T : float or array, shape (n,), optional
        Temperature of the readings; with T_asked the air is carried to another temperature. [K]
    T_asked : float or array, shape (n,), optional
        Temperature of the last total pressure, when the cell was heated after the expansions. [K]
    container : str
        "1 L" or "250 mL", for the bias to the DVPE.

    Returns
    -------
    TripleExpansion
        P (n,) at the last volume. NO_SOLUTION: the readings do not fall as air would.

    Raises
    ------
    ShapeError
        Not three volumes and three readings.
    UnknownName
        No bias for that container.

    Source
    ------
    ASTM D6378 section 13 (definitions and the temperature step, read on a summary page); the formula for the
    partial pressure of air derived here from its definition. Bias: data/volatility/d6378_bias.csv.
    """
    bias = _bias(container)
    V, TP = np.broadcast_arrays(
        np.atleast_2d(np.asarray(volumes, dtype=float)), np.atleast_2d(np.asarray(readings, dtype=float))
    )
    if V.shape[-1] != 3:
        raise ShapeError("readings", f"shape {V.shape}", "(n, 3)")
    with np.errstate(divide="ignore", invalid="ignore"):
        last = (V[:, 2] - V[:, 1]) / (TP[:, 1] - TP[:, 2])
        both = (V[:, 2] - V[:, 0]) / (TP[:, 0] - TP[:, 2])
        P_air = (V[:, 1] - V[:, 0]) / (last - both)
    rising = (np.diff(V, axis=1) > 0.0).all(axis=1) & np.isfinite(TP).all(axis=1) & (TP > 0.0).all(axis=1)
    flat = rising & (np.ptp(TP, axis=1) < 1e-9 * np.abs(TP[:, 2]))  # no air at all
    P_air = np.where(flat, 0.0, P_air)
    solved = rising & np.isfinite(P_air) & (P_air >= 0.0) & (P_air < TP[:, 2])
    status = np.where(solved, Status.CONVERGED, np.where(rising, Status.NO_SOLUTION, Status.BAD_INPUT))
    if T is not None and T_asked is not None:
        P_air = P_air * np.asarray(T_asked, float) / np.asarray(T, float)
    P_air = np.where(solved, P_air, np.nan)
    P = TP[:, 2] - P_air
    return TripleExpansion(status, np.array(TP), P, P_air, P - bias, np.full(P.shape, np.nan), container)


def vapour_pressure_d6378(
    fluid, x, *, T=T_100F, ratios=RATIOS, T_fill=T_CHARGE, P_air_0=None, container="1 L", product=None
) -> TripleExpansion:
    """The triple expansion test of a composition: three cells, then the method's own algebra.

    Parameters
    ----------
    fluid : Fluid
        Species and model of c components.
    x : array, shape (c,) or (n, c)
        Liquid mole fractions. [-]
    T : float or array, shape (n,)
        Temperature of the cell. [K]
    ratios : tuple of float
        Vapour-liquid ratios of the three expansions, rising. [-]
    T_fill : float or array, shape (n,)
        Temperature at which the charge is measured and holds its air. [K]
    P_air_0 : float or array, shape (n,), optional
        Partial pressure of air the sample was in equilibrium with at T_fill; when absent, one atmosphere
        less the bubble pressure. Zero: no air. [Pa]
    container : str
        "1 L" or "250 mL", for the bias to the DVPE.
    product : str, optional
        "crude" for crude and condensate; otherwise the density chooses the volume correction.

    Returns
    -------
    TripleExpansion
        P as the method would report it, P_vapour as it stood in the cell. The two part for a
        wide-boiling fuel: by 1 to 3 kPa with the air of an ordinary sample, and without any air,
        where the readings lie almost on a line, altogether.

    Source
    ------
    ASTM D6378 scope and section 13 as a computation; cell as `vapour_pressure_at_ratio`.
    """
    if P_air_0 is None:
        P_air_0 = np.maximum(ATMOSPHERE - bubble_pressure(fluid, T_fill, x).P, 0.0)
    cells = [
        vapour_pressure_at_ratio(
            fluid, T, x, ratio, T_fill=T_fill, air=True, P_air_0=P_air_0, product=product
        )
        for ratio in ratios
    ]
    readings = np.stack([cell.P_total for cell in cells], axis=-1)
    # A piston cell knows its volumes: what the swollen liquid leaves of each.
    volumes = np.stack([1.0 + cell.ratio - cell.expansion for cell in cells], axis=-1)
    ok = np.all([cell.ok for cell in cells], axis=0)
    found = triple_expansion(np.where(ok[:, None], volumes, np.nan), readings, container=container)
    failed = np.max([cell.status for cell in cells], axis=0)
    status = np.where(ok, found.status, failed)
    return TripleExpansion(status, readings, found.P, found.P_air, found.DVPE, cells[-1].P, container)
