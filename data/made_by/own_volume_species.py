"""Makes data/volatility/own_volume_species.csv: thermal expansion of liquids outside the petroleum groups.

Run from the top folder: python data/made_by/own_volume_species.py
"""

from __future__ import annotations

from pathlib import Path

import CoolProp.CoolProp as CP
import numpy as np

FLUIDS = {
    "ethanol": (
        "Ethanol",
        223.15,
        "Schroeder, Penoncello and Schroeder, J. Phys. Chem. Ref. Data 43 (2014) 043102",
    ),
    "methanol": ("Methanol", 223.15, "de Reuck and Craven, IUPAC Tables of the Fluid State 12 (1993)"),
    "water": ("Water", 273.16, "Wagner and Pruss, J. Phys. Chem. Ref. Data 31 (2002) 387"),
}
T_BASE, T_HIGH = 288.15, 423.15


def fit(fluid: str, T_low: float):
    """Coefficients of ln(V/V15) in powers 1 to 4 of (T - 288.15), and the largest error."""
    T = np.linspace(T_low, T_HIGH, 60)
    rho = np.array([CP.PropsSI("D", "T", t, "Q", 0, fluid) for t in T])
    rho_15 = CP.PropsSI("D", "T", T_BASE, "Q", 0, fluid)
    powers = (T - T_BASE)[:, None] ** np.arange(1, 5)
    y = np.log(rho_15 / rho)
    b, *_ = np.linalg.lstsq(powers, y, rcond=None)
    return b, float(np.abs(powers @ b - y).max())


def main() -> None:
    """Write the table."""
    target = Path(__file__).parents[1] / "volatility" / "own_volume_species.csv"
    lines = [
        "# ln(V/V15) = b1 t + b2 t^2 + b3 t^3 + b4 t^4, t = T - 288.15 K; saturated liquid",
        "species,b1,b2,b3,b4,T_low,T_high,largest_error,source",
    ]
    for species, (fluid, T_low, source) in FLUIDS.items():
        b, error = fit(fluid, T_low)
        numbers = ",".join(f"{v:.8e}" for v in b)
        lines.append(f'{species},{numbers},{T_low},{T_HIGH},{error:.1e},"{source}"')
    target.write_text("\n".join(lines) + "\n", encoding="utf-8")


if __name__ == "__main__":
    main()
