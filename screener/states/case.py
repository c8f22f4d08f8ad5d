"""A case in SI: what the case file says once its text has become quantities.

Built by `screener.casefile` or by hand; everything above reads it. Pressures
of vents and design are differences from the barometer [Pa], so no gauge
pressure exists below the case file. None means 'not given', never zero.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import Literal

from screener.blends import Blend

TankKind = Literal[
    "fixed-roof",
    "internal-floating-roof",
    "external-floating-roof",
    "domed-floating-roof",
    "horizontal",
    "underground",
    "pressure-vessel",
]
Quality = Literal["measured", "certificate", "estimate", "default", "given"]


@dataclass(frozen=True)
class InputEcho:
    """One input as entered and as used; the memo's input table is made of these."""

    path: str  # place in the case file, 'tank.shell_diameter'
    entered: str  # text as entered, '24 m'; '' for a default
    value: float | str | None  # value in SI, or text
    unit: str  # SI unit of value, '' for text
    quality: Quality = "given"
    note: str = ""  # for a default: what was taken and why


@dataclass(frozen=True)
class Levels:
    """Liquid levels above the tank bottom. [m]"""

    low: float
    normal: float
    high: float


@dataclass(frozen=True)
class Vent:
    """A group of like vents. Differences from the barometer in Pa; air at 0 degC and 101,325 Pa in m3/s each."""

    count: int
    out_of_service: int = 0
    set_above: float | None = None  # opens out at this overpressure [Pa]
    set_below: float | None = None  # opens in at this vacuum, positive [Pa]
    rated_out: float | None = None  # capacity out, each [m3/s of normal air]
    rated_out_at: float | None = None  # overpressure at which it is rated [Pa]
    rated_in: float | None = None  # [m3/s of normal air]
    rated_in_at: float | None = None  # vacuum at which it is rated, positive [Pa]
    arrester: bool = False


@dataclass(frozen=True)
class Blanket:
    """Inert-gas blanket held between two overpressures. [Pa above the barometer]"""

    set_low: float
    set_high: float


@dataclass(frozen=True)
class Contents:
    """What stands in the tank before the receipt."""

    blend: Blend
    volume: float | None = None  # at tank temperature [m3]
    temperature: float | None = None  # [K]


@dataclass(frozen=True)
class Tank:
    """A storage tank."""

    kind: TankKind
    shell_diameter: float | None = None  # [m]
    shell_height: float | None = None  # [m]
    length: float | None = None  # horizontal and underground tanks [m]
    levels: Levels | None = None
    surface: str | None = None  # free text about paint and age
    insulated: bool = False
    design_overpressure: float | None = None  # [Pa above the barometer]
    design_vacuum: float | None = None  # [Pa below the barometer, positive]
    blanket: Blanket | None = None
    vents: tuple[Vent, ...] = ()
    vapour_return: bool = False
    roof_leg_height: float | None = None  # [m]
    vapour_space_temperature: float | None = None  # hottest, if known [K]
    vapour_space_oxygen: float | None = None  # measured [mole fraction]
    previous_contents: str | None = None  # stock the tank held before it was emptied
    open_gauging: bool | None = None  # people gauge or sample through an open hatch; None: not stated
    sour_service: bool | None = None  # holds liquid with hydrogen sulfide; None: not stated
    contents: Contents | None = None


@dataclass(frozen=True)
class Month:
    """Long-term means of one month."""

    name: str
    mean: float  # mean air temperature [K]
    mean_high: float  # mean daily maximum [K]
    mean_low: float  # mean daily minimum [K]
    insolation: float | None = None  # mean daily total on a horizontal plane [J/m2]
    wind: float | None = None  # [m/s]


@dataclass(frozen=True)
class Ambient:
    """Air temperature range and what it means."""

    low: float  # [K]
    high: float  # [K]
    meaning: Literal["record", "design", "typical"] = "design"


@dataclass(frozen=True)
class Reading:
    """A gauge reading of the liquid temperature."""

    value: float  # [K]
    read_on: str  # ISO date


@dataclass(frozen=True)
class Site:
    """Where the tank stands."""

    latitude: float | None = None  # [deg], north positive
    elevation: float | None = None  # [m]
    lowest_barometer: float | None = None  # [Pa]
    ambient: Ambient | None = None
    months: tuple[Month, ...] = ()
    month: str | None = None  # the month the question is about; None: the whole year
    design_insolation: float | None = None  # daily total of a clear design day on a horizontal plane [J/m2]
    liquid_temperature: Reading | None = None


@dataclass(frozen=True)
class Receipt:
    """What comes in. The blend is the case's blend."""

    rate: float | None = None  # [m3/s]
    temperature: float | None = None  # [K]
    dissolved_gas: Literal["none", "in-blend", "air-saturated"] | None = None  # None: not stated
    saturated_at: float | None = None  # temperature at which air-saturated [K]


@dataclass(frozen=True)
class Suction:
    """Transfer line from tank to pump."""

    line_length: float | None = None  # [m]
    line_bore: float | None = None  # inner diameter [m]
    roughness: float | None = None  # [m]
    fittings: float | None = None  # sum of loss coefficients K [-]
    nozzle_above_tank_bottom: float | None = None  # [m]
    highest_point_above_tank_bottom: float | None = None  # [m]
    pump_above_tank_bottom: float | None = None  # [m], negative when the pump stands lower
    npsh_required: float | None = None  # [m of the liquid pumped]


@dataclass(frozen=True)
class Line:
    """Receipt, draw and suction."""

    receipt: Receipt | None = None
    draw_rate: float | None = None  # [m3/s]
    suction: Suction | None = None


@dataclass(frozen=True)
class Case:
    """Everything one screening needs."""

    title: str
    blend: Blend  # the receipt
    tank: Tank
    site: Site
    line: Line
    reference: str = ""
    prepared_by: str = ""
    criteria: tuple[str, ...] = ()  # names of criteria packs in data/criteria
    fuel_class: str = ""  # volatility class claimed, for information
    hydrogen_sulfide: float | None = None  # dissolved in the receipt, beside its parts [kg/kg]
    inputs: tuple[InputEcho, ...] = field(default_factory=tuple)  # as entered, and every default used
    source: str = ""  # path of the case file, '' if built by hand
    digest: str = ""  # sha256 of the case file text, '' if built by hand
