"""Keys of a laboratory sheet, [blend.lab] and [tank.contents.lab]: the numbers of a certificate."""

from __future__ import annotations

from functools import partial

from screener.casefile.keys import CHOICE, NUMBER, ROWS, TABLE, TEXT, Key
from screener.casefile.paths import join

CERTIFICATE = "certificate of analysis"
LAB_PATHS = ("blend.lab", "tank.contents.lab")  # where a sheet may stand: of the receipt, of the heel
POINTS = (5, 10, 20, 30, 40, 50, 60, 70, 80, 90, 95)  # volume percent evaporated that a certificate lists
# Oxygenates a certificate lists, by the species that stands for the key.
OXYGENATES = {
    "ethanol": "ethanol", "methanol": "methanol", "isobutanol": "isobutanol", "tert_butanol": "tert-butanol",
    "mtbe": "MTBE", "etbe": "ETBE", "tame": "TAME",
}  # fmt: skip
BY_MASS = ("h2s", "water")
BY_VOLUME = ("e70", "e100", "e150", *OXYGENATES, "benzene", "aromatics", "olefins")
# Number of a reproducibility by its key here, where a laboratory states its own.
OWN_R = {
    "density": "density_15", "dvpe": "dvpe", "rvp": "rvp", "rvpe": "rvpe", "vpcr": "vpcr",
    "true_vapour_pressure": "tvp", "distillation": "distillation", "ibp": "ibp", "fbp": "fbp",
    "e70": "e70", "e100": "e100", "e150": "e150", **OXYGENATES,
    **{name: name for name in ("benzene", "aromatics", "olefins", "flash_point", *BY_MASS)},
}  # fmt: skip
_R_KINDS = {
    "density": ("density", "0.5 kg/m3", "20 kg/m3", "kg/m3"),
    **dict.fromkeys(("dvpe", "rvp", "rvpe", "vpcr", "true_vapour_pressure"),
                    ("pressure difference", "1.5 kPa", "50 kPa", "Pa")),
    **dict.fromkeys(("distillation", "ibp", "fbp", "flash_point"),
                    ("temperature difference", "3 K", "50 K", "K")),
}  # fmt: skip
_R_SHARE = ("share", "0.5 %", "20 %", "-")


def _key(base: str, name: str, kind: str, meaning: str, example: str, low: str, high: str, **more) -> Key:
    return Key(f"{base}.{name}", kind, meaning, example, low=low, high=high,
               **{"where": CERTIFICATE, "quality": "certificate", **more})  # fmt: skip


def _share(base: str, name: str, meaning: str, example: str, high: str = "100 %") -> Key:
    return _key(base, name, "share", meaning, example, "0 %", high, unit="-")


def _boiling(base: str, name: str, meaning: str, example: str) -> Key:
    place = join("distillation", name)
    return _key(base, place, "temperature", meaning, example, "-70 degC", "800 degC", unit="K")


def _own_R(base: str, name: str) -> Key:
    kind, example, high, unit = _R_KINDS.get(name, _R_SHARE)
    meaning = f"Reproducibility of {name.replace('_', ' ')} where the laboratory states its own"
    low = "0 K" if unit == "K" else "0 %" if unit == "-" else f"0 {example.split()[1]}"
    return _key(base, f"reproducibility.{name}", kind, meaning, example, low, high, unit=unit, low_open=True)


def lab_keys(base: str) -> tuple[Key, ...]:
    """Keys of the sheet at a path: the same for the receipt and for the heel."""
    return (*_head(base), *_pressures(base), *_contents(base), *_rest(base))


def _head(base: str) -> tuple[Key, ...]:
    return (
        Key(base, TABLE, "Laboratory sheet; the parts are corrected to it, or it stands alone", section=True),
        Key(f"{base}.title", TEXT, "Name to print for the liquid of this sheet", "certificate 26-114"),
        Key(f"{base}.kind", CHOICE, "Commodity group of the liquid", "refined", choices=("refined", "crude"),
            default="refined", note="taken as a refined product; crude is for crude oil and condensate",
            where=CERTIFICATE),
        _key(base, "density", "density",
             "Density at 15 degC, or at 60 degF where the text says so: 742 kg/m3 at 60 degF",
             "742 kg/m3", "450 kg/m3", "1100 kg/m3", unit="kg/m3 at 15 degC"),
    )  # fmt: skip


def _pressures(base: str) -> tuple[Key, ...]:
    key = partial(_key, base)
    return (
        key("dvpe", "absolute pressure", "Dry vapour pressure equivalent at 37.8 degC", "62 kPa", "0 kPa",
            "400 kPa", unit="Pa", usual="7 to 105 kPa"),
        Key(f"{base}.dvpe_equation", CHOICE, "Equation by which the laboratory made the DVPE of its total pressure",
            "EN 13016-1", choices=("ASTM D5191", "EN 13016-1", "EPA", "CARB"), default="ASTM D5191",
            note="DVPE taken as by the equation of ASTM D5191", where=CERTIFICATE),
        key("rvp", "pressure difference", "Reid vapour pressure at 37.8 degC, as reported",
            "60 kPa", "0 kPa", "400 kPa", unit="Pa over barometer", usual="7 to 105 kPa"),
        Key(f"{base}.rvp_chamber", CHOICE, "Chamber of the Reid test: dry is ASTM D4953, wet is ASTM D323",
            "wet", choices=("dry", "wet"), default="dry", note="Reid vapour pressure taken as by the dry chamber",
            where=CERTIFICATE),
        key("rvpe", "absolute pressure", "Reid vapour pressure equivalent of a crude", "50 kPa", "0 kPa",
            "400 kPa", unit="Pa"),
        Key(f"{base}.vpcr[]", ROWS, "Vapour pressures of crude at a ratio of vapour to liquid",
            '[ { ratio = "4", temperature = "37.8 degC", pressure = "60 kPa" } ]'),
        key("vpcr[].ratio", NUMBER, "Vapour-liquid ratio", "4", "0.02", "100", unit="-", required=True),
        key("vpcr[].temperature", "temperature", "Temperature of the cell", "37.8 degC", "-40 degC", "120 degC",
            unit="K", required=True),
        key("vpcr[].pressure", "absolute pressure", "Pressure read", "60 kPa", "0 kPa", "2000 kPa", unit="Pa",
            required=True),
        Key(f"{base}.true_vapour_pressure[]", ROWS, "True vapour pressures measured",
            '[ { temperature = "20 degC", pressure = "38 kPa" } ]'),
        key("true_vapour_pressure[].temperature", "temperature", "Temperature of the liquid", "20 degC",
            "-40 degC", "120 degC", unit="K", required=True),
        key("true_vapour_pressure[].pressure", "absolute pressure", "Bubble pressure read", "38 kPa", "0 kPa",
            "2000 kPa", unit="Pa", required=True),
    )  # fmt: skip


def _contents(base: str) -> tuple[Key, ...]:
    share, boiling = partial(_share, base), partial(_boiling, base)
    evaporated = ((70, "32 %"), (100, "54 %"), (150, "85 %"))
    return (
        Key(f"{base}.distillation", TABLE, "Distillation after ASTM D86, by volume evaporated",
            '{ "10 %" = "55 degC", "50 %" = "98 degC", "90 %" = "165 degC", "FBP" = "200 degC" }'),
        boiling("IBP", "Initial boiling point", "36 degC"),
        *(boiling(f"{p} %", f"Temperature at {p} % evaporated", f"{40 + 1.4 * p:.0f} degC") for p in POINTS),
        boiling("FBP", "Final boiling point", "200 degC"),
        *(share(f"e{T}", f"Volume evaporated at {T} degC", example) for T, example in evaporated),
        *(share(name, f"{name.replace('_', '-')} by volume", "9.8 vol%") for name in OXYGENATES),
        share("benzene", "Benzene by volume", "0.8 vol%"),
        share("aromatics", "Aromatics by volume, benzene among them", "28 vol%"),
        share("olefins", "Olefins by volume", "10 vol%"),
    )  # fmt: skip


def _rest(base: str) -> tuple[Key, ...]:
    key = partial(_key, base)
    return (
        key("flash_point", "temperature", "Flash point, closed cup", "42 degC", "-60 degC", "300 degC", unit="K"),
        key("viscosity", "kinematic viscosity", "Kinematic viscosity; kept, not fitted", "2.5 mm2/s", "0 mm2/s",
            "100000 mm2/s", unit="m2/s"),
        key("viscosity_temperature", "temperature", "Temperature of the viscosity", "40 degC", "-60 degC",
            "150 degC", unit="K"),
        _share(base, "h2s", "Hydrogen sulfide dissolved, by mass", "20 ppm mass", "5 %"),
        _share(base, "water", "Water dissolved, by mass", "80 ppm mass", "5 %"),
        Key(f"{base}.reproducibility", TABLE,
            "Reproducibilities that the laboratory states; those of the methods hold where it is silent",
            '{ dvpe = "1.5 kPa" }'),
        *(_own_R(base, name) for name in OWN_R),
    )  # fmt: skip
