"""Floor 5, the line: suction pressure, friction, NPSH. Arrays in, arrays out, SI, no verdicts."""

from screener.line.friction import DEFAULT_ROUGHNESS, friction_factor
from screener.line.npsh import NpshMargin, allowed_npsh_required, asked_npsh, npsh_available, npsh_margins
from screener.line.suction import PLACES, REASON_WORDS, Reason, SuctionProfile, suction_profile
from screener.line.viscosity import kinematic_viscosity_band

__all__ = [
    "DEFAULT_ROUGHNESS",
    "PLACES",
    "REASON_WORDS",
    "NpshMargin",
    "Reason",
    "SuctionProfile",
    "allowed_npsh_required",
    "asked_npsh",
    "friction_factor",
    "kinematic_viscosity_band",
    "npsh_available",
    "npsh_margins",
    "suction_profile",
]
