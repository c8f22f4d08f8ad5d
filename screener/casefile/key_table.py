"""The rows of `screener.casefile.keys`: meaning, example, range and place of every key."""

from __future__ import annotations

from screener.casefile.keys import (
    CHOICE,
    COUNT,
    DATE,
    FLAG,
    GAS,
    LATER,
    MONTH,
    NUMBER,
    PACKS,
    ROWS,
    SPECIES,
    STOCK,
    TABLE,
    TEXT,
    Key,
)
from screener.casefile.lab_keys import lab_keys

OVER, UNDER = "Pa over barometer", "Pa under barometer"
ROOFS = ("fixed-roof", "internal-floating-roof", "external-floating-roof", "domed-floating-roof")
TANK_KINDS = (*ROOFS, "horizontal", "underground", "pressure-vessel")
BASES = ("volume", "mass", "mole")
DATA_SHEET, DRAWING, CERTIFICATE = "tank data sheet", "tank drawing", "certificate of the vent"


def _parts(path: str, whose: str, unless: str = "") -> tuple[Key, ...]:
    """Keys of a list of parts, of the receipt or of the heel."""
    return (
        Key(f"{path}.basis", CHOICE, f"What the shares of {whose} count", "volume", choices=BASES,
            default="volume", note="shares taken by volume", where="blend sheet or certificate of analysis"),
        Key(f"{path}.at", CHOICE, "Temperature at which shares of volume hold", "15 degC",
            choices=("15 degC", "60 degF"), default="15 degC", note="volumes counted at 15 degC"),
        Key(f"{path}.scale", FLAG, "Bring shares that miss 100 % to 100 %", "false"),
        Key(f"{path}.parts[]", ROWS, f"What {whose} is made of", required=True, unless=unless,
            example='[ { stock = "summer gasoline base", share = "100 %" } ]'),
        Key(f"{path}.parts[].stock", STOCK, "Blendstock of the tables; `screener blendstocks` lists them",
            "summer gasoline base", where="blend sheet"),
        Key(f"{path}.parts[].species", SPECIES, "Pure species; `screener species` lists them", "ethanol",
            where="certificate of analysis"),
        Key(f"{path}.parts[].share", "share", "Share of this part", "90 %", unit="-", required=True,
            low="0 %", high="100 %", where="blend sheet or certificate of analysis"),
        Key(f"{path}.parts[].quality", CHOICE, "How well the share is known", "certificate",
            choices=("certificate", "estimate")),
    )  # fmt: skip


_CASE = (
    Key("case", TABLE, "What the case is called", section=True),
    Key("case.title", TEXT, "What is asked, in one line", "tank 12: summer gasoline", default="untitled case",
        note="no title given"),
    Key("case.reference", TEXT, "Number under which the site files it", "TH-12-07"),
    Key("case.prepared_by", TEXT, "Who prepared it", "duty engineer"),
    Key("case.fuel_class", TEXT, "Volatility class the fuel claims, for information only", "EN 228 class A",
        where="certificate of analysis"),
)  # fmt: skip

_BLEND = (
    Key("blend", TABLE, "The liquid that is received", required=True, section=True),
    *_parts("blend", "the receipt", unless="lab"),
    Key("blend.h2s_in_liquid", "share", "Hydrogen sulfide dissolved in the receipt, by mass, beside its parts",
        "20 ppm mass", unit="-", low="0 ppm", high="5 %", usual="0 to 100 ppm mass in crude and condensate",
        where="certificate of analysis"),
    *lab_keys("blend.lab"),
)  # fmt: skip

_SHELL = (
    Key("tank", TABLE, "The tank", required=True, section=True),
    Key("tank.kind", CHOICE, "Kind of tank or roof", "fixed-roof", choices=TANK_KINDS, required=True,
        where=DATA_SHEET),
    Key("tank.shell_diameter", "length", "Inside diameter of the shell", "24 m", unit="m", low="0.5 m",
        high="130 m", usual="5 m to 60 m", where=DRAWING),
    Key("tank.shell_height", "length", "Height of the shell, bottom to top angle", "14.6 m", unit="m",
        low="0.5 m", high="60 m", usual="5 m to 20 m", where=DRAWING),
    Key("tank.length", "length", "Length of the cylinder of a horizontal tank", "12 m", unit="m", low="0.5 m",
        high="150 m", usual="3 m to 30 m", where=DRAWING),
    Key("tank.liquid_level", TABLE, "Liquid levels above the tank bottom",
        '{ low = "1.2 m", normal = "9 m", high = "13.1 m" }'),
    Key("tank.liquid_level.low", "length", "Lowest level in use", "1.2 m", unit="m", low="0 m", high="60 m",
        required=True, where="tank gauging, low level alarm"),
    Key("tank.liquid_level.normal", "length", "Level most of the time", "9 m", unit="m", low="0 m",
        high="60 m", required=True, where="tank gauging"),
    Key("tank.liquid_level.high", "length", "Highest level in use", "13.1 m", unit="m", low="0 m",
        high="60 m", required=True, where="tank gauging, high level alarm"),
    Key("tank.surface", TEXT, "Paint and its age, in your own words; the solar absorptance taken is printed",
        "white paint, some years old", where="a look at the tank"),
    Key("tank.insulated", FLAG, "Shell and roof are insulated", "false", default=False,
        note="taken as not insulated: the sun then counts in full"),
    Key("tank.design_pressure", "pressure difference",
        "Design pressure of the vapour space, gauge by definition", "2.0 kPa gauge", unit=OVER, low="0 kPa",
        high="5 MPa", usual="0.2 kPa to 6 kPa", where=DATA_SHEET),
    Key("tank.design_vacuum", "pressure difference", "Design vacuum, a positive number", "0.5 kPa",
        unit=UNDER, low="0 kPa", high="101.3 kPa", usual="0.2 kPa to 0.6 kPa", where=DATA_SHEET),
    Key("tank.blanket", TABLE, "Inert-gas blanket; leave out if there is none",
        '{ set_low = "0.3 kPa gauge", set_high = "0.8 kPa gauge" }'),
    Key("tank.blanket.set_low", "pressure difference", "Pressure at which gas is let in", "0.3 kPa gauge",
        unit=OVER, low="0 kPa", high="100 kPa", required=True, where="blanketing regulator"),
    Key("tank.blanket.set_high", "pressure difference", "Pressure at which gas is let out", "0.8 kPa gauge",
        unit=OVER, low="0 kPa", high="100 kPa", required=True, where="blanketing regulator"),
)  # fmt: skip

_VENTS = (
    Key("tank.vents[]", ROWS, "Groups of like vents", '[ { count = 2, set = "1.5 kPa gauge" } ]'),
    Key("tank.vents[].count", COUNT, "Vents of this group on the tank", "2", low="1", high="50",
        required=True, where="a look at the roof"),
    Key("tank.vents[].out_of_service", COUNT, "How many of them are blinded or removed", "0", low="0",
        high="50", default=0, note="taken as all in service", where="maintenance log"),
    Key("tank.vents[].set", "pressure difference", "Pressure at which it opens outwards, gauge by definition",
        "1.5 kPa gauge", unit=OVER, low="0 kPa", high="5 MPa", where="name plate"),
    Key("tank.vents[].vacuum_set", "pressure difference",
        "Vacuum at which it opens inwards, a positive number", "0.2 kPa", unit=UNDER, low="0 kPa",
        high="101.3 kPa", where="name plate"),
    Key("tank.vents[].rated_out", "air flow", "Capacity outwards of one vent", "2400 Nm3/h air",
        unit="m3/s air", low="0 Nm3/h", low_open=True, high="1000000 Nm3/h", where=CERTIFICATE),
    Key("tank.vents[].rated_out_at", "pressure difference", "Pressure at which that capacity was rated",
        "1.8 kPa gauge", unit=OVER, low="0 kPa", low_open=True, high="6 MPa", where=CERTIFICATE),
    Key("tank.vents[].rated_in", "air flow", "Capacity inwards of one vent", "2600 Nm3/h air",
        unit="m3/s air", low="0 Nm3/h", low_open=True, high="1000000 Nm3/h", where=CERTIFICATE),
    Key("tank.vents[].rated_in_at", "pressure difference",
        "Vacuum at which that capacity was rated, positive", "0.4 kPa", unit=UNDER, low="0 kPa",
        low_open=True, high="101.3 kPa", where=CERTIFICATE),
    Key("tank.vents[].arrester", FLAG, "A flame arrester sits before or behind the vent", "false",
        default=False, note="taken as without flame arrester", where="a look at the roof"),
)  # fmt: skip

_ROOF_AND_HEEL = (
    Key("tank.vapour_return", FLAG, "Vapour is led back to the ship or truck", "false", default=False,
        note="taken as no vapour return"),
    Key("tank.roof_leg_height", "length", "Height at which the floating roof lands", "1.8 m", unit="m",
        low="0.1 m", high="5 m", usual="1 m to 2.5 m", where=DRAWING),
    Key("tank.vapour_space_temperature", "temperature", "Hottest vapour space, if it was measured", "44 degC",
        unit="K", low="-60 degC", high="150 degC", where="roof thermometer"),
    Key("tank.vapour_space_oxygen", "share", "Oxygen measured in the vapour space; a blanket counts only with it",
        "4 mol%", unit="-", low="0 %", high="21 %", quality="measured", where="oxygen meter at the hatch or roof"),
    Key("tank.previous_contents", STOCK, "Blendstock the tank held before, if it was not freed of gas since",
        "summer gasoline base", where="tank log"),
    Key("tank.open_gauging", FLAG, "People gauge or sample through an open hatch of this tank", "true",
        where="site procedures"),
    Key("tank.sour_service", FLAG, "The tank holds liquid with hydrogen sulfide, now or before", "false",
        where="tank log"),
    Key("tank.contents", TABLE, "What is in the tank now; leave out if it is empty", section=True),
    *_parts("tank.contents", "the liquid in the tank", unless="lab"),
    Key("tank.contents.volume", "volume", "Volume in the tank now, at its own temperature", "2100 m3",
        unit="m3", low="0 m3", low_open=True, high="300000 m3", where="tank gauging"),
    Key("tank.contents.temperature", "temperature", "Temperature of the liquid in the tank now", "24 degC",
        unit="K", low="-60 degC", high="120 degC", where="tank gauging"),
    *lab_keys("tank.contents.lab"),
)  # fmt: skip

_SITE = (
    Key("site", TABLE, "Where the tank stands", section=True),
    Key("site.latitude", "angle", "Latitude, north positive", "41 deg", unit="deg", low="-90 deg",
        high="90 deg"),
    Key("site.elevation", "length", "Elevation above sea level", "35 m", unit="m", low="-430 m",
        high="5000 m"),
    Key("site.lowest_barometer", "absolute pressure",
        "Lowest barometer on record at the site, not reduced to sea level", "97.5 kPa", unit="Pa",
        low="45 kPa", high="108 kPa", usual="95 kPa to 99 kPa near sea level",
        where="nearest weather station"),
    Key("site.ambient", TABLE, "Range of the air temperature",
        '{ low = "-4 degC", high = "38 degC", meaning = "design" }'),
    Key("site.ambient.low", "temperature", "Lowest air temperature", "-4 degC", unit="K", low="-90 degC",
        high="50 degC", required=True, where="site design basis"),
    Key("site.ambient.high", "temperature", "Highest air temperature", "38 degC", unit="K", low="-60 degC",
        high="60 degC", required=True, where="site design basis"),
    Key("site.ambient.meaning", CHOICE, "What the range is", "design",
        choices=("record", "design", "typical"), default="design", note="range taken as design temperatures"),
    Key("site.month", MONTH, "Month the question is about; without it the whole year", "Jul"),
    Key("site.months[]", ROWS, "Long-term means of the twelve months",
        '[ { month = "Jul", mean = "24 degC", high = "31 degC", low = "18 degC" } ]'),
    Key("site.months[].month", MONTH, "Month", "Jul", required=True),
    Key("site.months[].mean", "temperature", "Mean air temperature", "24 degC", unit="K", low="-70 degC",
        high="50 degC", required=True, where="climate table of the weather service"),
    Key("site.months[].high", "temperature", "Mean daily highest temperature", "31 degC", unit="K",
        low="-70 degC", high="55 degC", required=True, where="climate table of the weather service"),
    Key("site.months[].low", "temperature", "Mean daily lowest temperature", "18 degC", unit="K",
        low="-80 degC", high="45 degC", required=True, where="climate table of the weather service"),
    Key("site.months[].insolation", "insolation", "Mean daily sun on a horizontal plane", "6.9 kWh/m2/day",
        unit="J/m2/day", low="0 MJ/m2/day", high="45 MJ/m2/day", usual="1 to 8 kWh/m2/day"),
    Key("site.months[].wind", "speed", "Mean wind", "3 m/s", unit="m/s", low="0 m/s", high="40 m/s"),
    Key("site.design_insolation", "insolation", "Sun of a clear design day on a horizontal plane",
        "8.2 kWh/m2/day", unit="J/m2/day", low="0 MJ/m2/day", high="45 MJ/m2/day",
        usual="6 to 9 kWh/m2/day in summer"),
    Key("site.liquid_temperature", TABLE, "A gauge reading of the liquid; it goes before the estimate",
        '{ value = "28 degC", read_on = "2026-07-14" }'),
    Key("site.liquid_temperature.value", "temperature", "Temperature read", "28 degC", unit="K",
        low="-60 degC", high="120 degC", required=True, quality="measured", where="tank gauging"),
    Key("site.liquid_temperature.read_on", DATE, "Day of the reading", "2026-07-14", required=True,
        quality="measured"),
    Key("site.weather_file", LATER, "File with a year of weather",
        problem="weather files are not read yet; give the twelve months in site.months"),
)  # fmt: skip

_LINE = (
    Key("line", TABLE, "Receipt, draw and suction", section=True),
    Key("line.receipt", TABLE, "How the blend comes in", '{ rate = "600 m3/h", temperature = "32 degC" }'),
    Key("line.receipt.rate", "flow", "Highest receipt rate", "600 m3/h", unit="m3/s", low="0 m3/h",
        low_open=True, high="20000 m3/h", where="receipt procedure"),
    Key("line.receipt.temperature", "temperature", "Temperature of what comes in", "32 degC", unit="K",
        low="-60 degC", high="120 degC", where="ship or pipeline certificate"),
    Key("line.receipt.dissolved_gas", GAS, "Gas dissolved in what comes in", "air-saturated at 15 degC"),
    Key("line.draw", TABLE, "How the tank is drawn down", '{ rate = "450 m3/h" }'),
    Key("line.draw.rate", "flow", "Highest draw-down rate", "450 m3/h", unit="m3/s", low="0 m3/h",
        low_open=True, high="20000 m3/h", where="pump data sheet"),
    Key("line.suction", TABLE, "Line from the tank to its pump",
        '{ line_length = "180 m", line_bore = "304 mm", npsh_required = "3.5 m" }'),
    Key("line.suction.line_length", "length", "Length of straight line, tank to pump", "180 m", unit="m",
        low="0 m", low_open=True, high="20 km", where="line isometric"),
    Key("line.suction.line_bore", "length", "Inside diameter of the line", "304 mm", unit="m", low="10 mm",
        high="1.5 m", where="line list; not the nominal size"),
    Key("line.suction.roughness", "length", "Roughness of the wall", "0.046 mm", unit="m", low="0 mm",
        high="5 mm", usual="0.03 mm to 0.3 mm for steel"),
    Key("line.suction.fittings", NUMBER, "Sum of the loss coefficients of fittings, valves and strainer",
        "6.5", unit="-", low="0", high="500", usual="2 to 20", where="line isometric"),
    Key("line.suction.nozzle_above_tank_bottom", "length", "Height of the suction nozzle", "0.6 m", unit="m",
        low="0 m", high="60 m", where=DRAWING),
    Key("line.suction.highest_point_above_tank_bottom", "length",
        "Highest point of the line above the tank bottom", "2.1 m", unit="m", low="-30 m", high="60 m",
        where="line isometric"),
    Key("line.suction.pump_above_tank_bottom", "length", "Pump centre above the tank bottom, negative below",
        "0.4 m", unit="m", low="-30 m", high="30 m", where="plot plan"),
    Key("line.suction.npsh_required", "length",
        "NPSH the pump requires at its highest rate, in metres of the liquid", "3.5 m", unit="m", low="0 m",
        low_open=True, high="30 m", where="pump curve"),
)  # fmt: skip

_SCREENING = (
    Key("screening", TABLE, "What to judge against", section=True),
    Key("screening.criteria", PACKS, "Rule packs; `screener criteria` lists them", '["us-40cfr60-kb"]'),
)  # fmt: skip

KEYS: tuple[Key, ...] = (
    *_CASE, *_BLEND, *_SHELL, *_VENTS, *_ROOF_AND_HEEL, *_SITE, *_LINE, *_SCREENING,
)  # fmt: skip
