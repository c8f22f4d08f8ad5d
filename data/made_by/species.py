"""Makes the tables of data/species, data/groups and data/pairs/kij.csv, with their passports.

Run from the top folder (needs thermo and chemicals, no network):

    python data/made_by/species.py

To add a species: add a row to data/species/identity.csv (CAS number, canonical name, family,
synonyms separated by semicolons) and run this. The script stops with the reason when no
vapour-pressure curve, density, heat capacity or critical point is to be had; then the
species cannot be used as itself; a row in data/species/outside.csv (CAS number, name, family)
makes the script name the nearest one that stands for it in data/species/stand_ins.csv. Hand
choices are in `PREFER` and `GROUPS_BY_HAND` below, each with its reason.
"""

from __future__ import annotations

import csv
import re
import sys
from pathlib import Path

import numpy as np

DATA = Path(__file__).resolve().parents[1]
sys.path.insert(0, str(DATA.parent))

import species_passports

from screener.species import build, forms, library

PREFER = {  # CAS -> curve taken against the rule
    "95-93-2": "ANTOINE_POLING",  # durene: the other curve below 352 K is of the solid
    "291-64-5": "ANTOINE_POLING",  # cycloheptane: the wide correlation is no smooth curve
    # n-C14 and n-C18: of the curves for C13-C20, the set that makes ln P at 312-350 K smoothest along
    # n-C10 to n-C20 (sum of squared second differences) has these two
    "629-59-4": "DIPPR_PERRY_8E",
    "593-45-3": "DIPPR_PERRY_8E",
}
GROUPS_BY_HAND = {  # CAS -> subgroups, where the assignment table has none; checked by the atom balance
    "112-63-0": {
        1: 2,
        2: 11,
        6: 2,
        22: 1,
    },  # methyl linoleate, as methyl oleate with one CH2-CH2 turned CH=CH
    "301-00-8": {1: 2, 2: 9, 6: 3, 22: 1},  # methyl linolenate, likewise
}
FIRE_SOURCES = {"iec-60079-20-1": "IEC 60079-20-1 (2010)", "nfpa-497": "NFPA 497 (2008)"}
BAD_FLASH = {  # (CAS, source): flash points of the open tables that are wrong or contradict their own limit
    ("78-83-1", "nfpa-497"): "isobutanol -40 degC",
    ("1634-04-4", "nfpa-497"): "MTBE -80 degC",
    ("109-67-1", "nfpa-497"): "1-pentene -18 degC",
    ("74-84-0", "nfpa-497"): "ethane -29 degC: vapour pressure there is 450 times the lower limit",
    (
        "79-29-8",
        "iec-60079-20-1",
    ): "2,3-dimethylbutane -20 degC: vapour pressure there is 3.4 times the lower limit",
    (
        "96-37-7",
        "iec-60079-20-1",
    ): "methylcyclopentane -10 degC: vapour pressure there is 3.2 times the lower limit",
    (
        "142-29-0",
        "iec-60079-20-1",
    ): "cyclopentene -22 degC: vapour pressure there is 3.7 times the lower limit",
}


def text(value) -> str:
    """A number with the digits the fit carries, or the word itself."""
    if value is None:
        return ""
    return f"{value:.10g}" if isinstance(value, (float, np.floating)) else str(value)


def write(name: str, columns: list[str], rows: list[dict]) -> None:
    """Write one table."""
    with (DATA / name).open("w", encoding="utf-8", newline="") as file:
        out = csv.writer(file, lineterminator="\n")
        out.writerow(columns)
        out.writerows([[text(row[column]) for column in columns] for row in rows])
    print(f"{name}: {len(rows)} rows")


def identity() -> list[dict]:
    """Rows of the table kept by hand."""
    with (DATA / "species/identity.csv").open(encoding="utf-8", newline="") as file:
        return list(csv.DictReader(file))


def one(row: dict) -> dict[str, dict]:
    """All table rows of one species."""
    cas, name = row["cas"], row["name"]
    _, formula, smiles, inchi_key, MW = library.identity(cas)
    Tc, Pc, words, Tc_spread = library.critical(cas)
    Tb = library.boiling_point(cas)
    cp, cp_method, cp_source, cp_miss = build.fit_cp(cas, MW)
    curve = build.choose_curve(cas, MW, Tc, Pc, Tb, cp, PREFER.get(cas))
    alpha, mean, worst = build.fit_alpha(curve, Tc, Pc)
    T, rho, method, source, note = build.choose_density(cas, MW, Tc, Pc)
    shift, shift_mean, shift_worst, density = build.fit_density(T, rho, MW, Tc, Pc, alpha, curve)
    rho_15, rho_note = build.density_at_15(cas, MW, Tc, Pc, Tb, density)
    groups = GROUPS_BY_HAND.get(cas) or library.group_counts(inchi_key)
    head = {"cas": cas, "name": name}
    omega = -np.log10(forms.psat(curve.coefficients, 0.7 * Tc) / Pc) - 1.0
    return {
        "constants": head | {
            "formula": formula, "smiles": smiles, "MW": MW, "Tc": Tc, "Pc": Pc, "omega": round(float(omega), 6),
            "Tb": Tb, "Tc_source": words[0], "Pc_source": words[1], "Tc_spread": round(Tc_spread, 5),
        },
        "alpha": head | dict(zip("LMNCD", alpha)) | {"mean_error": round(mean, 6), "worst_error": round(worst, 6)},
        "vapour_pressure": head | {f"c{i}": repr(float(c)) for i, c in enumerate(curve.coefficients)} | {
            "T_low": round(curve.T_low, 3), "T_high": round(curve.T_high, 3), "method": curve.method,
            "source": curve.source, "source_low": round(curve.source_low, 2),
            "source_high": round(curve.source_high, 2), "fit_error": round(curve.fit_error, 6),
            "spread": None if curve.spread is None else round(curve.spread, 5),
            "extension": round(curve.extension, 5), "heats": curve.heats, "note": curve.note,
        },
        "translation": head | {
            "c0": shift[0], "c1": shift[1], "mean_error": round(shift_mean, 6),
            "worst_error": round(shift_worst, 6), "T_low": round(T[0], 2), "T_high": round(T[-1], 2),
        },
        "liquid_density": head | {f"d{i}": float(d) for i, d in enumerate(density)} | {
            "T_low": round(T[0], 2), "T_high": round(T[-1], 2), "rho_15": round(rho_15, 3),
            "method": method, "source": source, "note": "; ".join(filter(None, (note, rho_note))),
        },
        "cp_ideal": head | {f"a{i}": float(a) for i, a in enumerate(cp)} | {
            "method": cp_method, "source": cp_source, "fit_error": round(cp_miss, 6),
        },
        "groups": head | {
            "groups": " ".join(f"{k}:{n}" for k, n in sorted(groups.items())),
            "origin": "by hand" if cas in GROUPS_BY_HAND else "library",
        },
    }  # fmt: skip


def fire(cas: str, name: str) -> dict | None:
    """Flash point and flammable limits: IEC 60079-20-1 first, NFPA 497 second, nothing else."""
    import chemicals

    row = {"cas": cas, "name": name}
    for column, get, listed in (
        ("flash_point", chemicals.T_flash, chemicals.T_flash_methods),
        (
            "LFL",
            lambda c, method: chemicals.LFL(CASRN=c, method=method),
            lambda c: chemicals.LFL_methods(CASRN=c),
        ),
        (
            "UFL",
            lambda c, method: chemicals.UFL(CASRN=c, method=method),
            lambda c: chemicals.UFL_methods(CASRN=c),
        ),
    ):
        row[column], row[f"{column}_source"] = None, ""
        for key, method in FIRE_SOURCES.items():
            if method in listed(cas) and (column != "flash_point" or (cas, key) not in BAD_FLASH):
                row[column], row[f"{column}_source"] = float(get(cas, method=method)), key
                break
    return row if any(row[c] is not None for c in ("flash_point", "LFL", "UFL")) else None


def stand_ins(rows: list[dict]) -> list[dict]:
    """Nearest species for those kept outside the table (data/species/outside.csv).

    Same formula and family within 20 K of the boiling point; else same family, at most two
    carbon atoms apart, within 12 K. Paraffins and isoparaffins count as one family here.
    """

    def family(word):
        return word.replace("isoparaffin", "paraffin")

    def carbons(one, other):
        if one == other:
            return 0
        count = [int(re.match(r"C(\d*)", f)[1] or 1) for f in (one, other)]
        return 0.5 + abs(count[0] - count[1])  # another formula comes after the same one

    inside = [(r["constants"], family(i["family"])) for r, i in zip(rows, identity())]
    found = []
    with (DATA / "species/outside.csv").open(encoding="utf-8", newline="") as file:
        for out in csv.DictReader(file):
            formula, Tb = library.identity(out["cas"])[1], library.boiling_point(out["cas"])
            near = [
                (carbons(c["formula"], formula), abs(c["Tb"] - Tb), c)
                for c, kind in inside
                if kind == family(out["family"])
                and carbons(c["formula"], formula) <= 2
                and abs(c["Tb"] - Tb) <= (20.0 if c["formula"] == formula else 12.0)
            ]
            if not near:
                raise SystemExit(f"{out['name']}: nothing near enough to stand for it")
            other, apart, best = min(near, key=lambda n: n[:2])
            words = (
                "same formula and family" if other == 0 else f"same family, {best['formula']} for {formula}"
            )
            found.append({
                "cas": out["cas"], "name": out["name"], "stands_in": best["cas"], "stands_in_name": best["name"],
                "reason": f"{words}, boils {apart:.1f} K apart",
            })  # fmt: skip
    return found


def group_tables(used: set[int]) -> None:
    """Subgroups and interactions of modified UNIFAC (Dortmund) for the elements C, H, O."""
    from thermo import unifac

    unifac.load_unifac_ip()
    atoms = species_passports.ATOMS
    missing = used - set(atoms)
    if missing:
        raise SystemExit(f"subgroups without atoms: {sorted(missing)}")
    rows = [
        {
            "subgroup": k, "formula": unifac.DOUFSG[k].group, "main": unifac.DOUFSG[k].main_group_id,
            "main_name": unifac.DOUFSG[k].main_group, "R": unifac.DOUFSG[k].R, "Q": unifac.DOUFSG[k].Q,
            "C": c, "H": h, "O": o,
        }
        for k, (c, h, o) in sorted(atoms.items())
    ]  # fmt: skip
    write("groups/subgroups.csv", list(rows[0]), rows)
    mains = sorted({row["main"] for row in rows})
    table = [
        {"main_i": i, "main_j": j, "a": abc[0], "b": abc[1], "c": abc[2]}
        for i in mains
        for j in mains
        if i != j and (abc := unifac.DOUFIP2016[i].get(j)) is not None
    ]
    write("groups/interactions.csv", list(table[0]), table)


def kij(names: dict[str, str]) -> None:
    """Interaction parameters of plain Peng-Robinson; values out of family kept but not used."""
    from thermo.interaction_parameters import IPDB

    found = next(table for key, table in IPDB.tables.items() if key.endswith(" PR"))
    rows = []
    for key, value in found.items():
        i, j = sorted(key.split(), key=lambda cas: list(names).index(cas) if cas in names else -1)
        if i in names and j in names:
            rows.append(
                {"cas_i": i, "cas_j": j, "name_i": names[i], "name_j": names[j], "kij": float(value["kij"])}
            )
    for row in rows:
        family = [r["kij"] for r in rows if r["cas_i"] == row["cas_i"] and r is not row]
        far = abs(row["kij"] - np.median(family)) > 0.25 if family else abs(row["kij"]) > 0.2
        row |= {
            "eos": "PR",
            "used": 0 if far else 1,
            "reason": "out of family: more than 0.25 off" if far else "",
        }
    rows.sort(key=lambda r: (list(names).index(r["cas_i"]), list(names).index(r["cas_j"])))
    write("pairs/kij.csv", ["eos", "cas_i", "cas_j", "name_i", "name_j", "kij", "used", "reason"], rows)


def main() -> None:
    """Remake everything."""
    rows, faults = [], []
    for row in identity():
        try:
            rows.append(one(row))
        except LookupError as error:
            faults.append(f"{row['name']}: {error}")
    if faults:
        raise SystemExit("not to be had:\n" + "\n".join(faults))
    for table in rows[0]:
        write(
            f"species/{table}.csv",
            list(rows[0][table]),
            [row[table] for row in rows if row[table].get("groups") != ""],
        )
    flames = [f for f in (fire(row["cas"], row["name"]) for row in identity()) if f]
    write("species/flammability.csv", list(flames[0]), flames)
    others = stand_ins(rows)
    write("species/stand_ins.csv", list(others[0]), others)
    group_tables({int(p.split(":")[0]) for row in rows for p in row["groups"]["groups"].split()})
    kij({row["cas"]: row["name"] for row in identity()})
    species_passports.write_all(DATA, rows, BAD_FLASH)


if __name__ == "__main__":
    main()
