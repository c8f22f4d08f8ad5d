"""Net positive suction head: what is available, and the margin asked over what the pump requires."""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache

import numpy as np

from screener.ground.constants import GRAVITY
from screener.ground.errors import UnknownName
from screener.ground.files import read_table


def npsh_available(surface_pressure, vapour_pressure, density, static_head, friction_head):
    """NPSH available at the pump inlet.

    Parameters
    ----------
    surface_pressure, vapour_pressure : float or array, shape (n,)
        Absolute; the vapour pressure is the bubble pressure of the liquid as it enters the pump. [Pa]
    density : float or array, shape (n,)
        Of the liquid. [kg/m3]
    static_head : float or array, shape (n,)
        Level above the pump, negative below it. [m]
    friction_head : float or array, shape (n,)
        Loss of the line with its fittings and entrance. [m]

    Returns
    -------
    array, shape (n,) or ()
        (P - Pv)/(rho g) + z - h_f. [m]

    Validity
    --------
    Vapour pressure is the bubble point without dissolved air; air that comes out of solution is
    not in it. No reduction of the NPSH required for hydrocarbons is to be credited beside it.

    Source
    ------
    Definition; ANSI/HI 9.6.1.
    """
    surface, vapour, rho, static, friction = (
        np.asarray(value, dtype=float)
        for value in (surface_pressure, vapour_pressure, density, static_head, friction_head)
    )
    return (surface - vapour) / (np.where(rho > 0.0, rho, np.nan) * GRAVITY) + static - friction


@dataclass(frozen=True)
class NpshMargin:
    """Margin of one pump service: the greater of ratio [-] and least [m] holds."""

    service: str
    ratio: float
    least: float
    region: str
    evidence: str


@lru_cache(maxsize=1)
def npsh_margins() -> dict[str, NpshMargin]:
    """Margins by pump service, from data/line/npsh_margin.csv."""
    rows = read_table("line/npsh_margin.csv")
    return {
        row["service"]: NpshMargin(
            row["service"], float(row["ratio"]), float(row["least"]), row["region"], row["evidence"]
        )
        for row in rows
    }


def _margin(service: str) -> NpshMargin:
    if service not in npsh_margins():
        raise UnknownName("", service, "pump service", npsh_margins())
    return npsh_margins()[service]


def asked_npsh(npsh_required, service="hydrocarbon"):
    """NPSH available to ask for over a pump's requirement.

    Parameters
    ----------
    npsh_required : float or array, shape (n,)
        As the pump maker states it, at 3 % head drop. [m]
    service : str
        'hydrocarbon' or another row of the table. [-]

    Returns
    -------
    array, shape (n,) or ()
        The greater of ratio times required and required plus the least head. [m]

    Source
    ------
    ANSI/HI 9.6.1-2012 through a published summary sheet: 1.1 or 1.0 m for hydrocarbon process pumps.
    """
    required = np.asarray(npsh_required, dtype=float)
    margin = _margin(service)
    return np.where(required >= 0.0, np.maximum(required * margin.ratio, required + margin.least), np.nan)


def allowed_npsh_required(available, service="hydrocarbon"):
    """Largest NPSH required that keeps the margin: the inverse of `asked_npsh`.

    Parameters
    ----------
    available : float or array, shape (n,)
        NPSH available. [m]
    service : str
        'hydrocarbon' or another row of the table. [-]

    Returns
    -------
    array, shape (n,) or ()
        The lesser of available over ratio and available less the least head; may be negative. [m]

    Source
    ------
    As `asked_npsh`.
    """
    available, margin = np.asarray(available, dtype=float), _margin(service)
    return np.minimum(available / margin.ratio, available - margin.least)
