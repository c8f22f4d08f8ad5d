"""Floor 2: phase equilibrium of blends at storage conditions. SI, arrays, many states at once."""

from screener.equilibrium.flash import flash_tp
from screener.equilibrium.fluid import Fluid
from screener.equilibrium.rachford_rice import rachford_rice
from screener.equilibrium.results import Flash, PhaseSplit, Saturation, Stability
from screener.equilibrium.saturation import bubble_pressure, bubble_temperature, dew_pressure, dew_temperature
from screener.equilibrium.stability import stability

__all__ = [
    "Flash",
    "Fluid",
    "PhaseSplit",
    "Saturation",
    "Stability",
    "bubble_pressure",
    "bubble_temperature",
    "dew_pressure",
    "dew_temperature",
    "flash_tp",
    "rachford_rice",
    "stability",
]
