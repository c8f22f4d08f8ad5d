"""Floor 2: phase equilibrium of blends at storage conditions. SI, arrays, many states at once."""

from screener.equilibrium.caloric import Caloric, caloric, departure
from screener.equilibrium.first_vapour import FirstVapour, first_vapour
from screener.equilibrium.flash import flash_tp
from screener.equilibrium.fluid import Fluid
from screener.equilibrium.heat_flash import flash_ph, flash_ps
from screener.equilibrium.rachford_rice import rachford_rice
from screener.equilibrium.results import Flash, PhaseSplit, Saturation, Stability
from screener.equilibrium.saturation import bubble_pressure, bubble_temperature, dew_pressure, dew_temperature
from screener.equilibrium.second_liquid import SecondLiquid, second_liquid_check, worth_testing
from screener.equilibrium.solved import SolvedFlash
from screener.equilibrium.stability import stability
from screener.equilibrium.vaporisation import HeatOfVaporisation, heat_of_vaporisation
from screener.equilibrium.volume_flash import flash_tv, state_at_beta
from screener.equilibrium.water_tolerance import WaterTolerance, water_tolerance

__all__ = [
    "Caloric",
    "FirstVapour",
    "Flash",
    "Fluid",
    "HeatOfVaporisation",
    "PhaseSplit",
    "Saturation",
    "SecondLiquid",
    "SolvedFlash",
    "Stability",
    "WaterTolerance",
    "bubble_pressure",
    "bubble_temperature",
    "caloric",
    "departure",
    "dew_pressure",
    "dew_temperature",
    "first_vapour",
    "flash_ph",
    "flash_ps",
    "flash_tp",
    "flash_tv",
    "heat_of_vaporisation",
    "rachford_rice",
    "second_liquid_check",
    "stability",
    "state_at_beta",
    "water_tolerance",
    "worth_testing",
]
