"""Floor 3: standard volatility tests as functions of (fluid, T, composition)."""

from screener.volatility.air import ostwald_air
from screener.volatility.boiling_points import AverageBoilingPoints, average_boiling_points
from screener.volatility.cell import vapour_pressure_at_ratio
from screener.volatility.classes import (
    class_standards,
    ethanol_allowance,
    vapour_lock_classes,
    volatility_classes,
)
from screener.volatility.compression import petroleum_compressibility, shut_in_pressure_rise
from screener.volatility.crude_pressure import CrudePressure, reid_equivalent_crude, vapour_pressure_crude
from screener.volatility.cutting import Cuts, pseudo_components
from screener.volatility.distillation import Distillation, distillation, distillation_d86
from screener.volatility.evaporation import Evaporation, open_evaporation
from screener.volatility.fuel_limits import common_limits, ethanol_fuel_classes, season_limits
from screener.volatility.indices import driveability_index, ratio_20_temperature_d4814, vapour_lock_index
from screener.volatility.interconversion import (
    curve_at,
    d86_from_d2887_daubert_1994,
    d86_from_tbp_daubert_1994,
    d86_from_tbp_riazi_daubert_1986,
    d2887_from_d86_daubert_1994,
    d2887_from_tbp_daubert_1994,
    tbp_from_d86_daubert_1994,
    tbp_from_d86_riazi_daubert_1986,
    tbp_from_d2887_daubert_1994,
)
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
from screener.volatility.reid_correlations import d86_slope, true_from_reid_crude, true_from_reid_refined
from screener.volatility.results import CellPressure, RatioTemperature, TestPressure
from screener.volatility.triple_expansion import TripleExpansion, triple_expansion, vapour_pressure_d6378
from screener.volatility.volume_correction import petroleum_expansion

__all__ = [
    "AverageBoilingPoints",
    "CellPressure",
    "CrudePressure",
    "Cuts",
    "Distillation",
    "Evaporation",
    "RatioTemperature",
    "TestPressure",
    "TripleExpansion",
    "average_boiling_points",
    "class_standards",
    "common_limits",
    "curve_at",
    "d86_from_d2887_daubert_1994",
    "d86_from_tbp_daubert_1994",
    "d86_from_tbp_riazi_daubert_1986",
    "d86_slope",
    "d2887_from_d86_daubert_1994",
    "d2887_from_tbp_daubert_1994",
    "distillation",
    "distillation_d86",
    "driveability_index",
    "dvpe",
    "dvpe_equation",
    "ethanol_allowance",
    "ethanol_fuel_classes",
    "liquid_expansion",
    "liquid_molar_volume",
    "open_evaporation",
    "ostwald_air",
    "petroleum_compressibility",
    "petroleum_expansion",
    "pseudo_components",
    "ratio_20_temperature_d4814",
    "ratio_temperature",
    "reid_equivalent_crude",
    "reid_vapour_pressure",
    "season_limits",
    "shut_in_pressure_rise",
    "standard_density",
    "standard_molar_volume",
    "tbp_from_d86_daubert_1994",
    "tbp_from_d86_riazi_daubert_1986",
    "tbp_from_d2887_daubert_1994",
    "triple_expansion",
    "true_from_reid_crude",
    "true_from_reid_refined",
    "true_vapour_pressure",
    "vapour_lock_classes",
    "vapour_lock_index",
    "vapour_pressure_at_ratio",
    "vapour_pressure_crude",
    "vapour_pressure_d6378",
    "volatility_classes",
]
