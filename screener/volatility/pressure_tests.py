"""Standard vapour-pressure tests at 37.8 degC (100 degF)."""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache

import numpy as np

from screener.equilibrium import bubble_pressure
from screener.ground.constants import ATMOSPHERE, T_100F
from screener.ground.errors import UnknownName
from screener.ground.files import read_table
from screener.ground.shapes import lanes
from screener.ground.status import Status
from screener.species import find
from screener.volatility.air import cell_air_pressure, ostwald_air
from screener.volatility.cell import T_CHILLED, vapour_pressure_at_ratio
from screener.volatility.liquid_volume import standard_density
from screener.volatility.results import TestPressure

SCOPE = (7e3, 130e3)  # total pressures ASTM D5191 covers [Pa]; its scope, read on the publisher's page
CHAMBERS = {"dry": "ASTM D4953 (dry Reid), gauge", "wet": "ASTM D323 (wet Reid), gauge"}
ALCOHOL_WET = 1e-3  # volume fraction of alcohol from which a wet chamber has no reading here; our choice [-]
RATIO = 4.0  # vapour-liquid ratio of the Reid, D5191 and EN 13016-1 tests; ASTM D323, D5191 scopes


@dataclass(frozen=True)
class DvpeEquation:
    """DVPE = slope X - offset. slope [-], offset [Pa]; evidence as in the data table."""

    name: str
    slope: float
    offset: float
    method: str
    evidence: str
    source: str

    def dvpe(self, X):
        """DVPE [Pa] of a total pressure X [Pa]."""
        return self.slope * np.asarray(X, dtype=float) - self.offset

    def total(self, dvpe):
        """Total pressure X [Pa] of a DVPE [Pa]."""
        return (np.asarray(dvpe, dtype=float) + self.offset) / self.slope


@lru_cache(maxsize=1)
def dvpe_equations() -> dict[str, DvpeEquation]:
    """The correlations by name."""
    rows = read_table("volatility/dvpe_equations.csv")
    return {
        row["equation"]: DvpeEquation(
            row["equation"],
            float(row["slope"]),
            1000.0 * float(row["offset_kPa"]),
            row["method"],
            row["evidence"],
            row["source"],
        )
        for row in rows
    }


def dvpe_equation(name: str) -> DvpeEquation:
    """One correlation by name.

    Parameters
    ----------
    name : str
        "ASTM D5191", "EN 13016-1", "EPA" or "CARB".

    Returns
    -------
    DvpeEquation
        Slope, offset and evidence.

    Raises
    ------
    UnknownName
        No correlation has that name.

    Source
    ------
    data/volatility/dvpe_equations.csv, a source and an evidence mark per row.
    """
    table = dvpe_equations()
    if name not in table:
        raise UnknownName("equation", name, "vapour-pressure equation", table)
    return table[name]


def true_vapour_pressure(fluid, T, x):
    """True vapour pressure: bubble pressure of the air-free liquid.

    Parameters
    ----------
    fluid : Fluid
        Species and model of c components.
    T : float or array, shape (n,)
        Temperature. [K]
    x : array, shape (c,) or (n, c)
        Liquid mole fractions. [-]

    Returns
    -------
    Saturation
        P (n,) [Pa] and the composition of the first bubble.

    Source
    ------
    Limit of the vapour pressure at vanishing vapour-liquid ratio; method of `bubble_pressure`.
    """
    return bubble_pressure(fluid, T, x)


def dvpe(fluid, x, *, equation: str = "ASTM D5191", product: str | None = None) -> TestPressure:
    """Dry vapour pressure equivalent as a mini-method measures it.

    The sample is saturated with air at 0 to 1 degC under one atmosphere, one volume of it
    is charged cold into an evacuated cell of five and warmed to 37.8 degC. The total
    pressure X is the vapour pressure at ratio 4 plus the air that came out; the
    correlation turns X into the DVPE.

    Parameters
    ----------
    fluid : Fluid
        Species and model of c components; gases dissolved in x are counted as fuel.
    x : array, shape (c,) or (n, c)
        Liquid mole fractions. [-]
    equation : str
        Name of the correlation, see `dvpe_equation`.
    product : str, optional
        "crude" for crude and condensate; otherwise the density chooses the volume correction.

    Returns
    -------
    TestPressure
        P is the DVPE, P_total is X. OUT_OF_RANGE where the fuel boils at 0 degC, so that
        no air can be dissolved in it, and where X lies outside 7 to 130 kPa: then P_total
        and P_vapour still hold, but there is no DVPE.

    Source
    ------
    ASTM D5191 scope and procedure as a computation; correlation and its evidence in
    data/volatility/dvpe_equations.csv; air after ASTM D2779 (from memory, unverified).
    """
    rule = dvpe_equation(equation)
    z, T, good = lanes(fluid.c, x, T=T_100F)
    air = ATMOSPHERE - bubble_pressure(fluid, T_CHILLED, z).P
    cell = vapour_pressure_at_ratio(
        fluid, T, z, RATIO, air=True, P_air_0=np.maximum(air, 0.0), product=product
    )
    status = np.where(good & (air < 0.0), Status.OUT_OF_RANGE, cell.status)
    status = np.where(cell.ok & ~np.isfinite(air), Status.NO_SOLUTION, status)
    ok = status == Status.CONVERGED
    X = np.where(ok, cell.P_total, np.nan)
    outside = ok & ((X < SCOPE[0]) | (X > SCOPE[1]))
    status = np.where(outside, Status.OUT_OF_RANGE, status)
    return TestPressure(
        status=status,
        P=np.where(outside, np.nan, rule.dvpe(X)),
        P_total=X,
        P_vapour=cell.P,
        P_air=np.where(ok, cell.P_air, np.nan),
        method=f"{rule.method}, {rule.slope:g} X - {rule.offset / 1000.0:g} kPa",
    )


def reid_vapour_pressure(fluid, x, *, chamber: str = "dry", product: str | None = None) -> TestPressure:
    """Gauge pressure of the Reid apparatus at 37.8 degC: dry after ASTM D4953, wet after ASTM D323.

    What is computed: one volume of sample, saturated with air at 0 to 1 degC under one
    atmosphere, is joined to an air chamber of four volumes that was at 37.8 degC and one
    atmosphere. At 37.8 degC the pressure is the vapour pressure at ratio 4 plus all the air,
    chamber's and sample's, divided between vapour space and liquid. Reported is that total
    less one atmosphere.

    Wet: the walls of the chamber hold liquid water, so its air was saturated with water vapour
    before, and the gas is saturated with it after. The vapour pressure of water at 37.8 degC (6.6 kPa)
    therefore takes the place of that much air at the start and is added at the end; the two
    nearly cancel, since only the air is squeezed and partly dissolved. Water that dissolves in
    the fuel is left out. An alcohol goes over into the water of the walls and lowers the
    reading by an amount that depends on how wet they are: such a fuel has no wet reading here.

    Parameters
    ----------
    fluid : Fluid
        Species and model of c components.
    x : array, shape (c,) or (n, c)
        Liquid mole fractions. [-]
    chamber : str
        "dry" (ASTM D4953) or "wet" (ASTM D323).
    product : str, optional
        "crude" for crude and condensate; otherwise the density chooses the volume correction.

    Returns
    -------
    TestPressure
        P is the gauge pressure, P_total the absolute one; P_air includes the water vapour of the wet
        chamber. Wet with more than 0.1 vol% alcohol: OUT_OF_RANGE.

    Raises
    ------
    UnknownName
        chamber is neither.

    Source
    ------
    ASTM D4953 section 3 and ASTM D323 (ratio, temperature, wetness: summaries read; chilling
    to 0 to 1 degC from memory, unverified); air after ASTM D2779 (from memory, unverified).
    """
    if chamber not in CHAMBERS:
        raise UnknownName("chamber", chamber, "Reid chamber", CHAMBERS)
    z, T, good = lanes(fluid.c, x, T=T_100F)
    air = ATMOSPHERE - bubble_pressure(fluid, T_CHILLED, z).P
    cell = vapour_pressure_at_ratio(fluid, T, z, RATIO, product=product)
    status = np.where(good & (air < 0.0), Status.OUT_OF_RANGE, cell.status)
    status = np.where(cell.ok & ~np.isfinite(air), Status.NO_SOLUTION, status)
    water = 0.0
    if chamber == "wet":
        water = find("water").psat(T_100F)
        status = np.where(good & (_alcohol(fluid, z) > ALCOHOL_WET), Status.OUT_OF_RANGE, status)
    ok = status == Status.CONVERGED
    rho_15 = standard_density(fluid, z)
    space = 1.0 + RATIO - cell.expansion
    brought = cell_air_pressure(rho_15, np.maximum(air, 0.0), T_CHILLED, T, space, cell.expansion)
    # The chamber's own air, at 37.8 degC from the start, is squeezed by the liquid and dissolves in it.
    chamber_air = (ATMOSPHERE - water) * RATIO / (space + ostwald_air(rho_15, T) * cell.expansion)
    P_air = brought + chamber_air + water
    total = np.where(ok, cell.P + P_air, np.nan)
    return TestPressure(
        status=status,
        P=total - ATMOSPHERE,
        P_total=total,
        P_vapour=cell.P,
        P_air=np.where(ok, P_air, np.nan),
        method=CHAMBERS[chamber],
    )


def _alcohol(fluid, z) -> np.ndarray:
    """Volume fraction of alcohols at 15 degC. [-]"""
    known = getattr(fluid.vapour_pressure, "species", ())  # a fluid of bare constants has no families
    alcohol = np.array([one.family == "alcohol" for one in known] or [False] * fluid.c)
    volume = np.where(z > 0.0, z * fluid.v_15, 0.0)
    return volume[:, alcohol].sum(axis=-1) / volume.sum(axis=-1)
