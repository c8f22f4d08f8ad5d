"""Floor 3: fire and health as functions of (fluid, T, x): flash point, flammable space, exposure."""

from screener.fire.contamination import (
    contaminated,
    contaminated_flash_point,
    contaminated_space,
    share_at_flash_point,
)
from screener.fire.cross_checks import (
    blending_index,
    flash_point_at_standard_pressure,
    flash_point_by_distillation,
    flash_point_by_index,
    flash_point_of_index,
)
from screener.fire.exposure import (
    Exposure,
    ExposureLimit,
    exposure,
    exposure_limits,
    hydrogen_sulfide_vapour,
)
from screener.fire.flash_point import flash_point
from screener.fire.hazard_classes import (
    HazardClass,
    above_flash_point,
    handled_as_warmer,
    hazard_class,
    hazard_systems,
    static_class,
)
from screener.fire.headspace import headspace
from screener.fire.inerting import LimitingOxygen, limiting_oxygen, purge_volumes, vapour_density_ratio
from screener.fire.limits import Flammability, limit_jones_1938, mixture_limit
from screener.fire.published_windows import jet_a_window
from screener.fire.results import Estimate, FlashPoint, Headspace, Share, SpaceState, VapourSpace, Window
from screener.fire.window import flammable_window, vapour_space

__all__ = [
    "Estimate",
    "Exposure",
    "ExposureLimit",
    "Flammability",
    "FlashPoint",
    "HazardClass",
    "Headspace",
    "LimitingOxygen",
    "Share",
    "SpaceState",
    "VapourSpace",
    "Window",
    "above_flash_point",
    "blending_index",
    "contaminated",
    "contaminated_flash_point",
    "contaminated_space",
    "exposure",
    "exposure_limits",
    "flammable_window",
    "flash_point",
    "flash_point_at_standard_pressure",
    "flash_point_by_distillation",
    "flash_point_by_index",
    "flash_point_of_index",
    "handled_as_warmer",
    "hazard_class",
    "hazard_systems",
    "headspace",
    "hydrogen_sulfide_vapour",
    "jet_a_window",
    "limit_jones_1938",
    "limiting_oxygen",
    "mixture_limit",
    "purge_volumes",
    "share_at_flash_point",
    "static_class",
    "vapour_density_ratio",
    "vapour_space",
]
