"""Passports of the species tables, and the atoms of the groups. Written by species.py, beside this file."""

from __future__ import annotations

ATOMS = {  # subgroup of modified UNIFAC (Dortmund) -> atoms C, H, O, read off the group's formula
    1: (1, 3, 0), 2: (1, 2, 0), 3: (1, 1, 0), 4: (1, 0, 0),
    5: (2, 3, 0), 6: (2, 2, 0), 7: (2, 2, 0), 8: (2, 1, 0), 70: (2, 0, 0),
    9: (1, 1, 0), 10: (1, 0, 0), 11: (2, 3, 0), 12: (2, 2, 0), 13: (2, 1, 0),
    14: (0, 1, 1), 81: (0, 1, 1), 82: (0, 1, 1), 15: (1, 4, 1), 16: (0, 2, 1),
    18: (2, 3, 1), 19: (2, 2, 1), 21: (2, 3, 2), 22: (2, 2, 2), 77: (1, 0, 2),
    24: (1, 3, 1), 25: (1, 2, 1), 26: (1, 1, 1), 83: (2, 4, 1),
    78: (1, 2, 0), 79: (1, 1, 0), 80: (1, 0, 0),
}  # fmt: skip

MADE = "data/made_by/species.py"
HEAD = {"cas": ("CAS registry number", "-"), "name": ("canonical name (data/species/identity.csv)", "-")}
METHOD = ("method name in the property library", "-")
SOURCE = ("key in data/sources.toml", "-")
NOTE = ("what is to be known about the row; empty if nothing", "-")


def _coefficients(letter, count, meaning, unit, bound):
    return {f"{letter}{i}": (f"coefficient {i}: {meaning}", unit, -bound, bound) for i in range(count)}


def _summary(values):
    return f"mean {100 * sum(values) / len(values):.3f} %, worst {100 * max(values):.3f} %"


def _names(rows, table, test):
    return ", ".join(r[table]["name"] for r in rows if test(r[table])) or "none"


def passports(rows, bad_flash) -> dict[str, dict]:
    """All passports by file name below data/, from the rows of all species."""
    curves = [r["vapour_pressure"] for r in rows]
    alphas = [r["alpha"] for r in rows]
    shifts = [r["translation"] for r in rows if r["constants"]["Tc"] > 340.0]
    return {
        "species/identity": {
            "title": "Names of the species", "source_keys": [], "how": "common practice, no source",
            "where": "trade names as people type them; none names two species (tested)", "made_by": "by hand",
            "columns": {
                "cas": HEAD["cas"], "name": ("canonical name", "-"),
                "family": ("gas, water, paraffin, isoparaffin, naphthene, olefin, aromatic, alcohol, ether, ketone, ester", "-"),
                "synonyms": ("other names, separated by semicolons", "-"),
            },
        },
        "species/outside": {
            "title": "Substances of fuel analyses that are not species of their own", "source_keys": [],
            "how": "by hand", "made_by": "by hand",
            "where": "isomer mixtures, and substances for which no vapour-pressure curve, density or critical point is to be had",
            "columns": {"cas": HEAD["cas"], "name": ("name", "-"), "family": ("family", "-")},
        },
        "species/stand_ins": {
            "title": "Species that stands for a substance outside the table", "source_keys": ["thermo"],
            "how": "fitted here", "where": "same formula and family within 20 K of the boiling point, else same family, at most two carbon atoms apart, within 12 K",
            "columns": HEAD | {
                "stands_in": ("CAS number of the species that stands for it", "-"),
                "stands_in_name": ("its name", "-"), "reason": ("how near it is", "-"),
            },
        },
        "species/constants": {
            "title": "Molar mass, critical point, acentric factor, normal boiling point",
            "source_keys": ["thermo", "helmholtz", "crc-handbook"], "how": "library thermo 0.6.1, chemicals 1.5.2",
            "where": "Tc and Pc: reference equation if there is one, else the median of the published values in chemicals, those more than 10 % off a first median left out (IUPAC reviews, CRC, PSRK appendix, Passut and Danner, WebBook, DIPPR, Yaws); single tables hold slips: methylcyclopentane's Tc is 21 K off in one. omega: from the chosen vapour-pressure curve at 0.7 Tc",
            "note": "published Tc more than 1 % apart: " + _names(rows, "constants", lambda c: c["Tc_spread"] > 0.01),
            "columns": HEAD | {
                "formula": ("molecular formula", "-"), "smiles": ("structure as SMILES", "-"),
                "MW": ("molar mass", "kg/mol", 0.002, 0.35), "Tc": ("critical temperature", "K", 30.0, 850.0),
                "Pc": ("critical pressure", "Pa", 8e5, 2.3e7), "omega": ("acentric factor", "-", -0.25, 1.3),
                "Tb": ("normal boiling point", "K", 20.0, 700.0),
                "Tc_source": ("how Tc is known", "-"), "Pc_source": ("how Pc is known", "-"),
                "Tc_spread": ("largest less smallest published Tc kept, over the median; 0 for a reference equation", "-", 0.0, 0.2),
            },
        },
        "species/alpha": {
            "title": "Alpha function of the Peng-Robinson equation, five constants",
            "source_keys": ["twu-1991", "peng-robinson-1976"], "how": "fitted here",
            "where": "Tr^(N(M-1)) exp(L(1 - Tr^(N M))) exp(s^3 (C + D s)), s = max(1 - Tr, 0), with omega_a 0.457235528921382, omega_b 0.0777960739038885; fitted to the curve of vapour_pressure.csv over 230-400 K below 0.9 Tc (species with Tc below 340 K: their saturation range to 0.98 Tc), a fifth of the weight outside. alpha falls from 195 to 1050 K and is at least 0.1 at 500 K (second virial coefficients at 300 K ask for 0.48 of nitrogen, 0.16 of hydrogen). Three constants (C = D = 0) for species with Tc below 340 K and where they hold the vapour pressure within 0.15 %; three Twu constants miss the C3 and C4 alcohols by up to 4 %",
            "note": f"mean miss of a species over 250-350 K: {_summary([a['mean_error'] for a in alphas])}; worst single point {100 * max(a['worst_error'] for a in alphas):.3f} %",
            "columns": HEAD | {
                **{k: (f"constant {k}", "-", -1e4, 1e4) for k in "LMNCD"},
                "mean_error": ("mean relative miss of the vapour pressure over 250-350 K below 0.9 Tc (light species: over the fitted range)", "-", 0.0, 0.003),
                "worst_error": ("worst relative miss over the same", "-", 0.0, 0.01),
            },
        },
        "species/vapour_pressure": {
            "title": "Vapour-pressure curves: the chosen one as our own fit, and how far others disagree",
            "source_keys": sorted({c["source"] for c in curves} | {"ruzicka-majer-1994", "crc-handbook", "gharagheizi-2013", "zabransky-1996"}), "how": "fitted here",
            "where": "ln(P/Pa) = c0 + c1/t + c2 ln t + c3 t + c4 t^2 + c5 t^4, t = T/300 K. Which curve: screener/species/vapour_pressure.py, six rules. Two curves that coincide within 0.05 % count as one data set. A reference equation keeps its vapour pressure (propylene gives 0.02 % to its heat capacity). Of other species the curve is correlated with the heat of vaporisation and the liquid heat capacity of the libraries, the method that of Ruzicka and Majer 1994: it stays where it was measured and other curves agree, and the heats set it below (screener/species/cold.py, heats.py). One standard deviation: curve 0.2 % above 6 kPa (0.6 % where no other confirms it) and 1.6 % more per decade below, half the distance of other curves, 2 % at 60 K below the source (4 times that at 120 K); heat of vaporisation 0.5 % (CRC) or 1 % (Gharagheizi); heat capacity 1 %, of hydrocarbons without a table estimated by corresponding states (Rowlinson and Bondi) with 4 %. Blind test on species whose curve is known: 75 curves cut at 300 K miss by 1.70 % at 255 K as plainly continued, 0.90 % with both heats (worst 2.4), 1.00 % with the estimate (worst 2.5); cut at 330 K 5.22, 1.19 (worst 4.3) and 1.15 % (worst 4.8) (tests/species/test_continuation.py, tests/studies/caloric_correlation.md). Without heats a curve is continued by the geometric mean of two Wagner forms through the critical point",
            "note": "curves more than 3 % apart within 250-350 K: " + _names(rows, "vapour_pressure", lambda c: (c["spread"] or 0.0) > 0.03)
            + ". Only one curve there: " + _names(rows, "vapour_pressure", lambda c: c["spread"] is None)
            + ". No curve reaches below 300 K: " + _names(rows, "vapour_pressure", lambda c: "no curve reaches below 300 K" in c["note"])
            + ". Published curves whose slope at 25 degC the heats deny by more than 2 %, not counted in the spread, are named in the rows",
            "columns": HEAD | _coefficients("c", 6, "of ln P", "-", 1e5) | {
                "T_low": ("lowest temperature of the fit", "K", 10.0, 300.0),
                "T_high": ("highest temperature of the fit", "K", 30.0, 700.0),
                "method": METHOD, "source": SOURCE,
                "source_low": ("lowest temperature at which the source is valid", "K", 10.0, 500.0),
                "source_high": ("highest temperature at which the source is valid", "K", 20.0, 800.0),
                "fit_error": ("largest relative miss of the fit against the source, correlated or continued", "-", 0.0, 0.03),
                "spread": ("largest relative disagreement of other curves within 250-350 K; empty with a single curve", "-", 0.0, 1.0),
                "extension": ("two standard deviations of what the correlation with heats leaves open within 250-350 K, or of the plain continuation; 0 where the source is a reference equation, or covers the range and no heats are known", "-", 0.0, 4.0),
                "heats": ("tables of heat of vaporisation and liquid heat capacity that took part, ROWLINSON_BONDI an estimate; empty if none", "-"),
                "note": NOTE,
            },
        },
        "species/translation": {
            "title": "Volume translation of the Peng-Robinson equation", "source_keys": ["peng-robinson-1976"],
            "how": "fitted here",
            "where": "v = v_PR - (c0 + c1 (T - 298.15 K)), fitted to the saturated liquid density of liquid_density.csv over 250-350 K below 0.9 Tc; linear in T, constant for species with Tc below 340 K",
            "note": f"mean density miss of a species with Tc above 340 K: {_summary([s['mean_error'] for s in shifts])}; worst single point {100 * max(s['worst_error'] for s in shifts):.2f} %",
            "columns": HEAD | {
                "c0": ("shift at 298.15 K", "m3/mol", -1.5e-4, 1.5e-4), "c1": ("its slope", "m3/(mol K)", -5e-7, 5e-7),
                "mean_error": ("mean relative density miss over the fit", "-", 0.0, 0.03),
                "worst_error": ("worst relative density miss over the fit", "-", 0.0, 0.06),
                "T_low": ("lowest temperature of the fit", "K", 10.0, 320.0),
                "T_high": ("highest temperature of the fit", "K", 25.0, 351.0),
            },
        },
        "species/liquid_density": {
            "title": "Saturated liquid density", "source_keys": sorted({r["liquid_density"]["source"] for r in rows}),
            "how": "fitted here",
            "where": "rho = d0 + d1 t + d2 t^2 + d3 t^3, t = T/300 K, over T_low to T_high. Which source: screener/species/build.py, choose_density",
            "columns": HEAD | _coefficients("d", 4, "of the density", "kg/m3", 2e5) | {
                "T_low": ("lowest temperature of the fit", "K", 10.0, 320.0),
                "T_high": ("highest temperature of the fit", "K", 25.0, 351.0),
                "rho_15": ("density at 15 degC; for a gas an effective one (note)", "kg/m3", 60.0, 1200.0),
                "method": METHOD, "source": SOURCE, "note": NOTE,
            },
        },
        "species/cp_ideal": {
            "title": "Ideal-gas heat capacity", "source_keys": sorted({r["cp_ideal"]["source"] for r in rows}),
            "how": "fitted here", "where": "a0 + a1 T + a2 T^2 + a3 T^3 + a4 T^4 over 200-500 K, quadratic where the source starts above 260 K; JOBACK rows are a group estimate",
            "columns": HEAD | {
                f"a{i}": (f"coefficient of T^{i}", f"J/(mol K^{i + 1})", -bound, bound) for i, bound in enumerate((1000.0, 15.0, 0.1, 2e-4, 1e-7))
            } | {"method": METHOD, "source": SOURCE, "fit_error": ("largest relative miss of the fit", "-", 0.0, 0.05)},
        },
        "species/groups": {
            "title": "Subgroups of modified UNIFAC (Dortmund)", "source_keys": ["ddbst-groups"],
            "how": "library thermo 0.6.1", "where": "assignment by InChI key, a stereoisomer without an entry as its skeleton; atoms balance with the formula (tested)",
            "columns": HEAD | {
                "groups": ("subgroup:count pairs", "-"), "origin": ("library, or by hand", "-"),
            },
        },
        "species/flammability": {
            "title": "Flash points and flammable limits in air", "source_keys": ["iec-60079-20-1", "nfpa-497"],
            "how": "library chemicals 1.5.2", "where": "IEC 60079-20-1 first, NFPA 497 second, the source named per value; nothing else is used",
            "note": "flash points not used: " + "; ".join(bad_flash.values())
            + ". Also wrong in the same open tables and not read at all: the collection 'Serat DIPPR (2017)' (methanol -31, ethanol -13.1, 1-propanol 3.4, 2-propanol -9.8, 1-butanol 22.4, isobutanol 10.4 degC)",
            "columns": HEAD | {
                "flash_point": ("closed-cup flash point", "K", 200.0, 400.0), "flash_point_source": SOURCE,
                "LFL": ("lower flammable limit, mole fraction in air near 25 degC", "-", 0.004, 0.07), "LFL_source": SOURCE,
                "UFL": ("upper flammable limit, mole fraction in air near 25 degC", "-", 0.02, 0.8), "UFL_source": SOURCE,
            },
        },
        "species/exposure": {
            "title": "Occupational exposure limits",
            "source_keys": ["osha-z", "niosh-npg", "niosh-idlh", "ontario-limits", "gasoline-sds-2023", "hygiene-county-table"],
            "how": "published (quoted), library, or from memory, unverified: column evidence", "made_by": "by hand",
            "where": "per row. Traps met: one agency page lists NIOSH's n-hexane REL as 500 ppm, NIOSH's own says 50; a publisher's page mixes old and new hydrogen sulfide values",
            "columns": HEAD | {
                "kind": ("TWA (8 h), STEL (15 min), ceiling, peak, IDLH", "-"), "ppm": ("limit by volume in air", "ppm", 0.001, 5000.0),
                "agency": ("who set it", "-"), "date": ("edition or date of the copy that was read", "-"),
                "evidence": ("quoted, library, or from memory, unverified", "-"), "source": ("key in data/sources.toml; empty if from memory", "-"),
            },
        },
        "groups/subgroups": {
            "title": "Modified UNIFAC (Dortmund): subgroup volumes and areas", "source_keys": ["dortmund-unifac", "thermo"],
            "how": "library thermo 0.6.1", "where": "table DOUFSG; atoms C, H, O read off the group's formula",
            "columns": {
                "subgroup": ("subgroup number", "-", 1, 250), "formula": ("group", "-"), "main": ("main group number", "-", 1, 100),
                "main_name": ("main group", "-"), "R": ("relative van der Waals volume", "-", 0.0, 5.0),
                "Q": ("relative van der Waals area", "-", 0.0, 5.0), "C": ("carbon atoms", "-", 0, 4),
                "H": ("hydrogen atoms", "-", 0, 8), "O": ("oxygen atoms", "-", 0, 3),
            },
        },
        "groups/interactions": {
            "title": "Modified UNIFAC (Dortmund): main-group interactions", "source_keys": ["dortmund-unifac", "thermo"],
            "how": "library thermo 0.6.1", "where": "table DOUFIP2016: psi_ij = exp(-(a + b T + c T^2)/T); pairs that are missing have no published value",
            "columns": {
                "main_i": ("main group i", "-", 1, 100), "main_j": ("main group j", "-", 1, 100),
                "a": ("a_ij", "K", -5000.0, 8000.0), "b": ("b_ij", "-", -50.0, 50.0), "c": ("c_ij", "1/K", -0.1, 0.1),
            },
        },
        "pairs/kij": {
            "title": "Interaction parameters of the plain Peng-Robinson equation", "source_keys": ["dechema-vi", "thermo"],
            "how": "library thermo 0.6.1", "where": "the Peng-Robinson table of the library; a value more than 0.25 from the median of its first species' others is kept and not used",
            "columns": {
                "eos": ("equation of state", "-"), "cas_i": HEAD["cas"], "cas_j": HEAD["cas"], "name_i": HEAD["name"],
                "name_j": HEAD["name"], "kij": ("interaction parameter", "-", -0.6, 0.3), "used": ("1 if used", "-", 0, 1), "reason": ("why not used", "-"),
            },
        },
    }  # fmt: skip


def _quoted(text: str) -> str:
    return '"' + str(text).replace("\\", "\\\\").replace('"', '\\"') + '"'


def _toml(passport: dict) -> str:
    lines = [f"title = {_quoted(passport['title'])}"]
    words = "; ".join(passport["source_keys"]) or "this project"
    lines.append(f"source = {_quoted(words)}")
    lines.append("source_keys = [" + ", ".join(map(_quoted, passport["source_keys"])) + "]")
    lines += [f"{key} = {_quoted(passport[key])}" for key in ("where", "how", "note") if key in passport]
    lines.append(f"made_by = {_quoted(passport.get('made_by', MADE))}")
    lines.append('licence = "facts"')
    for column, (meaning, unit, *bounds) in passport["columns"].items():
        lines += ["", f"[columns.{column}]", f"meaning = {_quoted(meaning)}", f"unit = {_quoted(unit)}"]
        if bounds:
            lines.append(f"range = [{bounds[0]!r}, {bounds[1]!r}]")
    return "\n".join(lines) + "\n"


def write_all(data, rows, bad_flash) -> None:
    """Write the passports below the data folder."""
    for name, passport in passports(rows, bad_flash).items():
        (data / f"{name}.toml").write_text(_toml(passport), encoding="utf-8")
