"""Makes data/pairs/henry_constants.csv, pair_terms.csv and pair_terms_errors.csv.

Run from the top folder (needs thermo, no network):

    python data/made_by/pair_terms.py

1. Henry constants of six gases: in water from the guideline IAPWS G7-04; in
   organic solvents from the published PSRK equation of state, whose group
   parameters (fitted by their authors to measured gas solubilities) stand in
   the tables of thermo. For methane in aromatics and naphthenes, where PSRK
   gives 20-40 % less than Peng-Robinson with published k_ij, the latter is
   taken (the solubilities remembered from the compilations side with it).
2. In the PR-GE model ln H at low pressure is a straight line of slope 1 in the
   pair term A, so the wanted A at each point is ln(H wanted / H at A = 0).
3. A(T) = A0 + A1/T (+ A2 ln T for water) by least squares over the solvents of
   a family, each weighing the same. Species in OWN_ROW get a row of their own:
   there A departs from the family (short molecules, near their critical point).
4. Families for which PSRK has no parameters take them by analogy (ANALOGY).
"""

from __future__ import annotations

import csv
import sys
from pathlib import Path

import numpy as np

DATA = Path(__file__).resolve().parents[1]
sys.path.insert(0, str(DATA.parent))

from screener.equilibrium.cubic import SOAVE_REDLICH_KWONG
from screener.equilibrium.eos import EQUATIONS, attraction_at_critical, covolume
from screener.equilibrium.fluid import Fluid
from screener.equilibrium.unifac import Unifac
from screener.ground.constants import R
from screener.species import find, pairs

GASES = {  # species -> group name in PSRK
    "nitrogen": "N2", "oxygen": "O2", "carbon dioxide": "CO2", "methane": "CH4", "hydrogen sulfide": "H2S",
    "hydrogen": "H2",
}
TEMPERATURES = np.array([255.0, 273.15, 298.15, 323.15, 348.15, 373.15])  # [K] storage, and some room above
WATER_TEMPERATURES = np.array([279.15, 288.15, 298.15, 313.15, 333.15, 353.15, 373.15])  # [K] of the guideline
WATER = "water"
OWN_ROW = (
    "ethane", "propane", "n-butane", "n-pentane", "isobutane", "isopentane", "neopentane", "ethylene", "propylene",
    "1-butene", "isobutene", "benzene", "toluene", "methanol", "ethanol", WATER,
)
SOLVENTS = OWN_ROW + (
    "n-hexane", "n-heptane", "n-octane", "n-nonane", "n-decane", "n-dodecane", "n-tetradecane", "n-hexadecane",
    "2-methylpentane", "2,3-dimethylbutane", "2-methylhexane", "2,4-dimethylpentane", "isooctane", "2-methylheptane",
    "2,3,4-trimethylpentane", "2-methyloctane", "2-methylnonane",
    "cyclopentane", "methylcyclopentane", "cyclohexane", "methylcyclohexane", "ethylcyclohexane",
    "propylcyclohexane", "butylcyclohexane", "trans-decalin",
    "1-pentene", "2-methyl-2-butene", "trans-2-pentene", "1-hexene", "2-methyl-1-pentene", "1-heptene", "1-octene",
    "cyclohexene", "1-decene",
    "ethylbenzene", "o-xylene", "m-xylene", "p-xylene", "propylbenzene", "cumene", "1,2,4-trimethylbenzene",
    "3-ethyltoluene", "butylbenzene", "indane", "tetralin", "naphthalene", "1-methylnaphthalene",
    "1-propanol", "2-propanol", "1-butanol", "2-butanol", "isobutanol", "tert-butanol",
    "MTBE", "ETBE", "TAME", "DIPE", "diethyl ether", "acetone", "MEK",
    "ethyl acetate", "methyl laurate", "methyl palmitate", "methyl oleate",
)
# (gas, family) without PSRK parameters: the family's departure from isoparaffins is taken from another gas
ANALOGY = {
    ("oxygen", "olefin"): "nitrogen", ("hydrogen sulfide", "olefin"): "carbon dioxide",
    ("nitrogen", "ester"): "hydrogen", ("oxygen", "ester"): "hydrogen", ("methane", "ester"): "hydrogen",
    ("hydrogen sulfide", "ester"): "carbon dioxide", ("oxygen", "ketone"): "nitrogen",
}
KIJ_FAMILIES = {("methane", "aromatic"), ("methane", "naphthene")}
KIJ_SOLVENTS = {"benzene", "toluene", "m-xylene", "cyclohexane"}  # the others of these families have none of use
EVIDENCE = {  # key in data/sources.toml -> evidence mark
    "psrk": "library thermo 0.6.1", "pr-kij": "library thermo 0.6.1", "iapws-g7-04": "published",
}

# ln(kH/p1) = A/Tr + B tau^0.355/Tr + C Tr^-0.41 exp(tau), and the lowest temperature [K]; IAPWS G7-04,
# as listed in github.com/MilanSkocic/iapws src/iapws.c commit 05ed1a6, with the guideline's check values
IAPWS = {
    "hydrogen": (-4.73284, 6.08954, 6.06066, 273.15),
    "nitrogen": (-9.67578, 4.72162, 11.70585, 278.12),
    "oxygen": (-9.44833, 4.43822, 11.42005, 274.15),
    "carbon dioxide": (-8.55445, 4.01195, 9.52345, 274.19),
    "hydrogen sulfide": (-4.51499, 5.23538, 4.42126, 273.15),
    "methane": (-10.44708, 4.66491, 12.12986, 275.46),
}
# Vapour pressure of water, coefficients and exponents; Wagner and Pruss, J. Phys. Chem. Ref. Data 22 (1993) 783
WATER_A = np.array([-7.85951783, 1.84408259, -11.78664970, 22.68074110, -15.96187190, 1.80122502])
WATER_B = np.array([1.0, 1.5, 3.0, 3.5, 4.0, 7.5])
WATER_TC, WATER_PC = 647.096, 22.064e6  # [K], [Pa]


def henry_in_water(gas: str, T):
    """Henry constant [Pa] of a gas in water at T (n,) [K]; NaN below the guideline's range."""
    A, B, C, low = IAPWS[gas]
    Tr = T / WATER_TC
    tau = 1.0 - Tr
    ln_p = (tau[:, None] ** WATER_B @ WATER_A) / Tr
    ln_k = A / Tr + B * tau**0.355 / Tr + C * Tr**-0.41 * np.exp(tau)
    return np.where(T >= low, WATER_PC * np.exp(ln_p + ln_k), np.nan)


def psrk_groups(name: str) -> dict[int, int]:
    """PSRK subgroups of a species, or an empty dictionary."""
    from thermo import unifac

    if name in GASES:
        return {number: 1 for number, group in unifac.PSRKSG.items() if group.group == GASES[name]}
    return {int(k): v for k, v in unifac.UNIFAC_group_assignment_DDBST(find(name).cas, "PSRK").items()}


def psrk_unifac(pair) -> Unifac | None:
    """The activity model of PSRK for two species, or None where groups or parameters are missing."""
    from thermo import unifac

    unifac.load_unifac_ip()
    groups = [psrk_groups(name) for name in pair]
    if not all(groups):
        return None
    numbers = sorted({k for g in groups for k in g})
    sub = [unifac.PSRKSG[k] for k in numbers]
    counts = [[g.get(k, 0) for k in numbers] for g in groups]
    abc = np.zeros((3, len(sub), len(sub)))
    for i, one in enumerate(sub):
        for j, other in enumerate(sub):
            if one.main_group_id != other.main_group_id:
                value = unifac.PSRKIP[one.main_group_id].get(other.main_group_id)
                if value is None:
                    return None
                abc[:, i, j] = value
    return Unifac.of(counts, [s.R for s in sub], [s.Q for s in sub], [s.main_group_id for s in sub], *abc, power=1.0)


def psrk_alpha(one, T):
    """Mathias-Copeman alpha (n,) [-] of PSRK at T [K]; Soave from omega where no constants are listed."""
    import json

    import thermo

    path = Path(thermo.__file__).parent / "Scalar Parameters" / "chemsep_PSRK_matthias_copeman.json"
    listed = json.loads(path.read_text(encoding="utf-8"))["data"].get(one.cas)
    s = 1.0 - np.sqrt(T / one.Tc)
    if listed is None:
        c1, c2, c3 = 0.480 + 1.574 * one.omega - 0.176 * one.omega**2, 0.0, 0.0
    else:
        c1, c2, c3 = (float(listed[f"MCSRKC{k}"]) for k in (1, 2, 3))
    return np.where(s > 0.0, 1.0 + c1 * s + c2 * s**2 + c3 * s**3, 1.0 + c1 * s) ** 2


def henry_psrk(gas: str, solvent: str, T):
    """Henry constant [Pa] of a gas in a solvent at zero pressure by PSRK, T (n,) [K]; None without parameters."""
    model = psrk_unifac((gas, solvent))
    if model is None:
        return None
    found = [find(name) for name in (gas, solvent)]
    Tc, Pc = (np.array([getattr(one, name) for one in found]) for name in ("Tc", "Pc"))
    equation, (d1, d2) = EQUATIONS["SRK"], SOAVE_REDLICH_KWONG
    b = covolume(equation, Tc, Pc)
    alpha_i = np.stack([psrk_alpha(one, T) for one in found], axis=1)
    alpha_i = alpha_i * attraction_at_critical(equation, Tc, Pc) / (b * R * T[:, None])
    ln_gamma = model.at(T).ln_gamma(np.array([[0.0, 1.0]]))[:, 0]
    slope = np.log(1.1 / 2.1)  # PSRK: q1 at u = 1.1
    alpha = alpha_i[:, 1]
    abar = alpha_i[:, 0] + (ln_gamma + np.log(b[1] / b[0]) + b[0] / b[1] - 1.0) / slope
    half = 0.5 * (alpha - d1 - d2)
    with np.errstate(invalid="ignore"):  # no zero-pressure liquid close to the critical point
        u = half - np.sqrt(half**2 - d1 * d2 - alpha)
        return np.exp(-b[0] / b[1] - np.log((u - 1.0) * b[1] / (R * T)) - abar * np.log((u + d2) / (u + d1)))


def henry_kij(gas: str, solvent: str, T):
    """Henry constant [Pa] by Peng-Robinson with a library k_ij at T (n,) [K]; None without a k_ij of use.

    Polar solvents and hydrogen are left out: one k_ij fitted at high pressure says little there.
    """
    plain = Fluid.of([gas, solvent], model="PR")
    if plain.gaps or gas == "hydrogen" or find(solvent).family in ("alcohol", "ether", "water"):
        return None
    return np.exp(plain.at(T).mix(np.array([0.0, 1.0])).ln_phi(np.ones(T.shape), "L")[:, 0])


def henry_model(gas: str, solvent: str, T):
    """Henry constant [Pa] of the PR-GE model with the pair terms now in the table, at low pressure."""
    mixture = Fluid.of([gas, solvent]).at(T).mix(np.array([0.0, 1.0]))
    P = np.full(T.shape, 1.0)
    return np.exp(mixture.ln_phi(P, "L")[:, 0]) * P


def targets():
    """Rows (gas, solvent, partner, T, H, source key) of the Henry constants behind the fit."""
    rows = []
    for gas in GASES:
        for name in SOLVENTS:
            solvent = find(name)
            partner = name if name in OWN_ROW else solvent.family
            T, source = TEMPERATURES[TEMPERATURES < 0.85 * solvent.Tc], "psrk"
            if name == WATER:
                T, source = WATER_TEMPERATURES, "iapws-g7-04"
                H = henry_in_water(gas, T)
            elif (gas, solvent.family) in KIJ_FAMILIES:
                H, source = (henry_kij(gas, name, T) if name in KIJ_SOLVENTS else None), "pr-kij"
            else:
                H = henry_psrk(gas, name, T)
            if H is not None:
                points = zip(T, H, strict=True)
                rows += [(gas, name, partner, t, h, source) for t, h in points if np.isfinite(h)]
    return rows


def write(name: str, header, rows, remark: str) -> None:
    """A table of data/pairs."""
    with (DATA / "pairs" / name).open("w", encoding="utf-8", newline="") as file:
        file.write(f"# {remark}\n")
        writer = csv.writer(file, lineterminator="\n")
        writer.writerow(header)
        writer.writerows(rows)


def wanted_terms(rows):
    """The pair term A (len(rows),) [-] that gives each Henry constant, with no term in the model yet."""
    wanted = np.empty(len(rows))
    lanes: dict[tuple[str, str], list[int]] = {}
    for k, row in enumerate(rows):
        lanes.setdefault((row[0], row[1]), []).append(k)
    for (gas, solvent), some in lanes.items():
        T, H = (np.array([rows[k][column] for k in some]) for column in (3, 4))
        wanted[some] = np.log(H / henry_model(gas, solvent, T))
    return wanted


def fit(rows, wanted):
    """A0, A1, A2 by least squares, every solvent weighing the same, and the misses of ln H."""
    T = np.array([row[3] for row in rows])
    solvents = [row[1] for row in rows]
    weight = np.sqrt([1.0 / solvents.count(one) for one in solvents])
    columns = [np.ones_like(T), 1.0 / T] + ([np.log(T)] if rows[0][5] == "iapws-g7-04" else [])
    basis = np.stack(columns, axis=1)
    A, *_ = np.linalg.lstsq(basis * weight[:, None], wanted * weight, rcond=None)
    return (*A, 0.0)[:3], basis @ A - wanted


def other_source(gas: str, solvents, source: str):
    """Mean of ln(H of the source not used / H of the model) at 298.15 K, and over how many solvents."""
    T = np.array([298.15])
    other = henry_psrk if source == "pr-kij" else henry_kij
    found = [(solvent, other(gas, solvent, T)) for solvent in solvents if find(solvent).Tc > 350.0]
    ratios = [float(np.log(H[0] / henry_model(gas, solvent, T)[0])) for solvent, H in found if H is not None]
    return (f"{np.mean(ratios):.3f}" if ratios else ""), len(ratios)


def by_analogy(terms):
    """Rows for the families PSRK does not cover."""
    A = {(row[0], row[1]): np.array(row[2:5], dtype=float) for row in terms}
    rows = []
    for (gas, family), like in ANALOGY.items():
        value = A[gas, "isoparaffin"] + A[like, family] - A[like, "isoparaffin"]
        rows.append((gas, family, *(f"{a:.6g}" for a in value), "255", "373.15", "common practice, no source", "",
                     f"isoparaffins, and the departure of the family from them as for {like}"))
    return rows


def main() -> None:
    """Write the three tables."""
    header = ["gas", "solvent", "A0", "A1", "A2", "T_low", "T_high", "evidence", "source", "note"]
    remark = "G^E/RT += x_i x_j (A0 + A1/T + A2 ln T), T in K; solvent: a species, or else a family of species"
    rows = targets()
    write("henry_constants.csv", ["gas", "solvent", "T", "H", "source"],
          [(g, s, f"{t:g}", f"{h:.6g}", source) for g, s, _, t, h, source in rows],
          "Henry constants at low pressure; H in Pa, T in K, species by name")
    write("pair_terms.csv", header, [], remark)
    wanted = wanted_terms(rows)
    terms, misses = [], []
    for gas, partner in dict.fromkeys((row[0], row[2]) for row in rows):
        lanes = [k for k, row in enumerate(rows) if (row[0], row[2]) == (gas, partner)]
        some = [rows[k] for k in lanes]
        A, miss = fit(some, wanted[lanes])
        T, source = [row[3] for row in some], some[0][5]
        terms.append((gas, partner, *(f"{a:.6g}" for a in A), f"{min(T):g}", f"{max(T):g}", EVIDENCE[source],
                      source, ""))
        misses.append((gas, partner, sorted({row[1] for row in some}), source, np.abs(np.expm1(miss))))
    write("pair_terms.csv", header, terms + by_analogy(terms), remark)
    pairs._terms.cache_clear()
    write("pair_terms_errors.csv",
          ["gas", "solvent", "species", "points", "mean_error", "largest_error", "ln_other_source", "other_species"],
          [(gas, partner, len(solvents), miss.size, f"{miss.mean():.4f}", f"{miss.max():.4f}",
            *other_source(gas, solvents, source)) for gas, partner, solvents, source, miss in misses],
          "Henry constants of the PR-GE model against henry_constants.csv, per gas and solvent class")


if __name__ == "__main__":
    main()
