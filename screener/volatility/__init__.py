"""Floor 3: standard volatility tests as functions of (fluid, T, composition)."""

from screener.volatility.air import ostwald_air
from screener.volatility.cell import vapour_pressure_at_ratio
from screener.volatility.classes import (
    class_standards,
    ethanol_allowance,
    vapour_lock_classes,
    volatility_classes,
)
from screener.volatility.distillation import Distillation, distillation
from screener.volatility.indices import driveability_index, ratio_20_temperature_d4814, vapour_lock_index
from screener.volatility.liquid_volume import (
    liquid_expansion,
    liquid_molar_volume,
    standard_density,
    standard_molar_volume,
)
from screener.volatility.pressure_tests import (
    dvpe,
    dvpe_equation,
    reid_vapour_pressure,
    true_vapour_pressure,
)
from screener.volatility.ratio_temperature import ratio_temperature
from screener.volatility.results import CellPressure, RatioTemperature, TestPressure
from screener.volatility.volume_correction import petroleum_expansion

__all__ = [
    "CellPressure",
    "Distillation",
    "RatioTemperature",
    "TestPressure",
    "class_standards",
    "distillation",
    "driveability_index",
    "dvpe",
    "dvpe_equation",
    "ethanol_allowance",
    "liquid_expansion",
    "liquid_molar_volume",
    "ostwald_air",
    "petroleum_expansion",
    "ratio_20_temperature_d4814",
    "ratio_temperature",
    "reid_vapour_pressure",
    "standard_density",
    "standard_molar_volume",
    "true_vapour_pressure",
    "vapour_lock_classes",
    "vapour_lock_index",
    "vapour_pressure_at_ratio",
    "volatility_classes",
]
