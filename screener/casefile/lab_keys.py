"""Keys of a laboratory sheet, [blend.lab]: the numbers of a certificate."""

from __future__ import annotations

from screener.casefile.keys import CHOICE, NUMBER, ROWS, TABLE, Key
from screener.casefile.paths import join

CERTIFICATE = "certificate of analysis"
POINTS = (5, 10, 20, 30, 40, 50, 60, 70, 80, 90, 95)  # volume percent evaporated that a certificate lists
# Oxygenates a certificate lists, by the species that stands for the key.
OXYGENATES = {
    "ethanol": "ethanol", "methanol": "methanol", "isobutanol": "isobutanol", "tert_butanol": "tert-butanol",
    "mtbe": "MTBE", "etbe": "ETBE", "tame": "TAME",
}  # fmt: skip
_PATH = "blend.lab"


def _key(name: str, kind: str, meaning: str, example: str, low: str, high: str, **more) -> Key:
    return Key(f"{_PATH}.{name}", kind, meaning, example, low=low, high=high,
               **{"where": CERTIFICATE, "quality": "certificate", **more})  # fmt: skip


def _share(name: str, meaning: str, example: str, high: str = "100 %") -> Key:
    return _key(name, "share", meaning, example, "0 %", high, unit="-")


def _boiling(name: str, meaning: str, example: str) -> Key:
    return _key(join("distillation", name), "temperature", meaning, example, "-70 degC", "800 degC", unit="K")


LAB_KEYS = (
    Key(_PATH, TABLE, "Laboratory sheet; the parts are corrected to it, or it stands alone", section=True),
    Key(f"{_PATH}.kind", CHOICE, "Commodity group of the liquid", "refined", choices=("refined", "crude"),
        default="refined", note="taken as a refined product; crude is for crude oil and condensate",
        where=CERTIFICATE),
    _key("density", "density", "Density at 15 degC, or at 60 degF where the text says so: 742 kg/m3 at 60 degF",
         "742 kg/m3", "450 kg/m3", "1100 kg/m3", unit="kg/m3 at 15 degC"),
    _key("dvpe", "absolute pressure", "Dry vapour pressure equivalent at 37.8 degC", "62 kPa", "0 kPa",
         "400 kPa", unit="Pa", usual="7 to 105 kPa"),
    _key("rvp", "pressure difference", "Reid vapour pressure at 37.8 degC, dry chamber, as reported",
         "60 kPa", "0 kPa", "400 kPa", unit="Pa over barometer", usual="7 to 105 kPa"),
    _key("rvpe", "absolute pressure", "Reid vapour pressure equivalent of a crude", "50 kPa", "0 kPa", "400 kPa",
         unit="Pa"),
    Key(f"{_PATH}.vpcr[]", ROWS, "Vapour pressures of crude at a ratio of vapour to liquid",
        '[ { ratio = "4", temperature = "37.8 degC", pressure = "60 kPa" } ]'),
    _key("vpcr[].ratio", NUMBER, "Vapour-liquid ratio", "4", "0.02", "100", unit="-", required=True),
    _key("vpcr[].temperature", "temperature", "Temperature of the cell", "37.8 degC", "-40 degC", "120 degC",
         unit="K", required=True),
    _key("vpcr[].pressure", "absolute pressure", "Pressure read", "60 kPa", "0 kPa", "2000 kPa", unit="Pa",
         required=True),
    Key(f"{_PATH}.true_vapour_pressure[]", ROWS, "True vapour pressures measured",
        '[ { temperature = "20 degC", pressure = "38 kPa" } ]'),
    _key("true_vapour_pressure[].temperature", "temperature", "Temperature of the liquid", "20 degC",
         "-40 degC", "120 degC", unit="K", required=True),
    _key("true_vapour_pressure[].pressure", "absolute pressure", "Bubble pressure read", "38 kPa", "0 kPa",
         "2000 kPa", unit="Pa", required=True),
    Key(f"{_PATH}.distillation", TABLE, "Distillation after ASTM D86, by volume evaporated",
        '{ "10 %" = "55 degC", "50 %" = "98 degC", "90 %" = "165 degC", "FBP" = "200 degC" }'),
    _boiling("IBP", "Initial boiling point", "36 degC"),
    *(_boiling(f"{p} %", f"Temperature at {p} % evaporated", f"{40 + 1.4 * p:.0f} degC") for p in POINTS),
    _boiling("FBP", "Final boiling point", "200 degC"),
    *(_share(f"e{T}", f"Volume evaporated at {T} degC", e) for T, e in ((70, "32 %"), (100, "54 %"), (150, "85 %"))),
    *(_share(name, f"{name.replace('_', '-')} by volume", "9.8 vol%") for name in OXYGENATES),
    _share("benzene", "Benzene by volume", "0.8 vol%"),
    _share("aromatics", "Aromatics by volume, benzene among them", "28 vol%"),
    _share("olefins", "Olefins by volume", "10 vol%"),
    _key("flash_point", "temperature", "Flash point, closed cup", "42 degC", "-60 degC", "300 degC", unit="K"),
    _key("viscosity", "kinematic viscosity", "Kinematic viscosity; kept, not fitted", "2.5 mm2/s", "0 mm2/s",
         "100000 mm2/s", unit="m2/s"),
    _key("viscosity_temperature", "temperature", "Temperature of the viscosity", "40 degC", "-60 degC",
         "150 degC", unit="K"),
    _share("water", "Water dissolved, by mass", "80 ppm mass", "5 %"),
)  # fmt: skip
