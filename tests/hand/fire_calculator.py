"""The long sums behind the fire and health figures of this folder; it imports nothing of the program.

    python tests/hand/fire_calculator.py

Partial pressures are those of `calculator.py`. Flash points and limits in air are read from the tables of
IEC 60079-20-1 and NFPA 497 in the library `chemicals`, without the rows that contradict their own lower limit;
a species in neither gets 0.55 and 3.5 times its stoichiometric share (Jones). The equations stand in the
Markdown file of each case.
"""

from __future__ import annotations

import math
import re
import warnings

import calculator as c
import numpy as np
from chemicals import LFL, UFL, T_flash, search_chemical
from thermo.unifac import DOUFIP2016, DOUFSG, UNIFAC

TABLES = ("IEC 60079-20-1 (2010)", "NFPA 497 (2008)")
# Flash points of those tables at which the vapour is several times the lower limit: not used.
BAD = {"isobutanol", "MTBE", "1-pentene", "ethane", "2,3-dimethylbutane", "methylcyclopentane", "cyclopentene"}
PER_KELVIN = 0.000721  # drift of a limit with temperature, modified Burgess-Wheeler
ATM, BAROMETER = 101325.0, 97800.0
NIOSH_BENZENE, ACGIH_TOLUENE = 0.1, 20.0  # [ppm], data sheet of the limits: NIOSH 2005; ACGIH, Ontario list


def from_tables(function, cas):
    for table in TABLES:
        value = function(CASRN=cas, method=table)
        if value is not None:
            return value
    return None


def formula_limits(cas):
    """Jones: 0.55 and 3.5 times the stoichiometric share in air."""
    n = {e: float(k or 1) for e, k in re.findall(r"([A-Z][a-z]?)(\d*)", search_chemical(cas).formula)}
    oxygen = n.get("C", 0) + n.get("H", 0) / 4 - n.get("O", 0) / 2
    share = 1 / (1 + oxygen / 0.2095)
    return 0.55 * share, 3.5 * share


def limits(name, T):
    """Lower and upper limit at T, and whether the lower and the upper are estimates."""
    cas = c.pure(name).cas
    tabled, guess = (from_tables(LFL, cas), from_tables(UFL, cas)), formula_limits(cas)
    low, high = (t if t is not None else g for t, g in zip(tabled, guess))
    drift = PER_KELVIN * (T - 298.15)
    return low * (1 - drift), high * (1 + drift), tabled[0] is None, tabled[1] is None


def partial(mass, T):
    """Partial pressures [Pa] over a liquid: the sum that `calculator.bubble` makes, species by species."""
    x = c.moles(mass)
    names, species = list(x), [c.pure(s) for s in x]
    xs = np.array(list(x.values()))
    model = UNIFAC.from_subgroups(T=T, xs=list(xs), chemgroups=[s.groups for s in species], subgroups=DOUFSG,
                                  interaction_data=DOUFIP2016, version=1)
    gamma = np.array(model.gammas())
    psat = np.array([s.psat(T) if s.Tc > T else math.nan for s in species])
    f = psat * np.array([s.phi_sat(T) if s.Tc > T and s.name != "ethane" else math.nan for s in species])
    v = np.array([s.v(T) for s in species])
    B = np.array([[c.virial(a, b, T) for b in species] for a in species])
    P, phi = 5e4, np.ones(len(xs))
    for _ in range(60):
        part = xs * gamma * f * np.exp(v * (P - psat) / c.R / T) / phi
        if "ethane" in names:
            i = names.index("ethane")
            part[i] = xs[i] * c.ethane_henry(T) / phi[i]
        before, P = P, float(part.sum())
        y = part / P
        phi = np.exp((2 * B @ y - y @ B @ y) * P / c.R / T)
        if abs(P - before) < 1e-8 * P:
            break
    return dict(zip(names, part))


def depleted(mass, T, ratio):
    """Mass fractions of the liquid left when it fills a space of `ratio` times its volume at 15 degC.

    x_i = z_i / (n + k_i V/RT), k_i = p_i/x_i, V the space per mole charged; n so that the x_i sum to one.
    """
    z, left = c.moles(mass), mass
    M = sum(z[s] * c.pure(s).MW for s in z)
    V = ratio * M / c.density(mass, 288.15) / (c.R * T)  # [1/Pa] space per mole charged over RT
    for _ in range(12):
        x = c.moles(left)
        k = {s: p / x[s] for s, p in partial(left, T).items()}
        low, high = 0.0, 1.0
        for _ in range(60):
            n = 0.5 * (low + high)
            low, high = (n, high) if sum(z[s] / (n + k[s] * V) for s in z) > 1 else (low, n)
        x = {s: z[s] / (n + k[s] * V) for s in z}
        total = sum(x[s] * c.pure(s).MW for s in x)
        left = {s: x[s] * c.pure(s).MW / total for s in x}
    print(f"ratio {ratio:.4g}: {n:.5f} of a mole left of one charged")
    return left


def space(mass, T, rows=0, title=""):
    """Fuel share of the space, lower and upper limit of the vapour; prints the `rows` species that weigh most."""
    y = {s: p / BAROMETER for s, p in partial(mass, T).items()}
    low = {s: limits(s, T)[0] for s in y}
    high = {s: limits(s, T)[1] for s in y}
    fuel = sum(y.values())
    LFL_mix, UFL_mix = fuel / sum(y[s] / low[s] for s in y), fuel / sum(y[s] / high[s] for s in y)
    guessed = [sum(y[s] for s in y if limits(s, T)[k]) / fuel for k in (2, 3)]
    if rows:
        print(f"\n{title} at {T - 273.15:.2f} degC: fuel {100 * fuel:.3f} %, LFL {100 * LFL_mix:.4f} %, "
              f"UFL {100 * UFL_mix:.3f} %, on estimates {100 * guessed[0]:.1f} and {100 * guessed[1]:.1f} %")
        print("| species | share, % | LFL, % | UFL, % | share/LFL |")
        order = sorted(y, key=lambda s: -y[s] / low[s])[:rows]
        for s in order:
            print(f"| {s} | {100 * y[s]:.4f} | {100 * low[s]:.4f} | {100 * high[s]:.3f} | {y[s] / low[s]:.4f} |")
        rest = fuel - sum(y[s] for s in order)
        print(f"| the other {len(y) - rows} | {100 * rest:.4f} | | | "
              f"{sum(y[s] / low[s] for s in y) - sum(y[s] / low[s] for s in order):.4f} |")
    return fuel, LFL_mix, UFL_mix, y


def flash(mass, rows=0, title=""):
    """Flash point [K] after Liaw at 101,325 Pa; prints the species that weigh most."""
    def shares(T):
        p, out = partial(mass, T), {}
        for s, part in p.items():
            own = from_tables(T_flash, c.pure(s).cas) if s not in BAD else None
            need = c.pure(s).psat(own) if own else limits(s, T)[0] * ATM
            out[s] = part / need
        return out

    low, high = 200.0, 400.0
    for _ in range(40):
        middle = 0.5 * (low + high)
        low, high = (low, middle) if sum(shares(middle).values()) > 1 else (middle, high)
    if rows:
        found = shares(high)
        print(f"\n{title}: flash point {high - 273.15:.2f} degC = {high:.2f} K")
        for s in sorted(found, key=lambda s: -found[s])[:rows]:
            own = from_tables(T_flash, c.pure(s).cas) if s not in BAD else None
            print(f"| {s} | {f'{own - 273.15:.0f} degC' if own else 'none, LFL'} | {found[s]:.4f} |")
    return high


def cold_surface(a, high, low, slender, drop):
    """Coldest surface [degC] by both editions on a day without sun: air `low` less `drop`, the swing of the month."""
    bottom = low - drop
    top = bottom + high - low
    ends = [e["TLA"] - e["dTV"] / 4 for e in c.surfaces(a, top, bottom, 0.0, slender, False)]
    means = [e["TLA"] for e in c.surfaces(a, top, bottom, 0.0, slender, False)]
    print(f"cold day: air {bottom:.1f} to {top:.1f} degC; minimum 2006 {ends[0]:.3f}, 2020 {ends[1]:.3f}, "
          f"mean {means[0]:.3f} and {means[1]:.3f} degC")
    return min(ends)


def hot_surface(month, day, high, low, paint, slender):
    ends = c.weather(month, day, high, low, paint, slender, False)
    return ends[0][0] + 273.15


def report(name, liquid, T_cold, T_hot, substance="benzene", limit=NIOSH_BENZENE):
    print(f"\n##### {name}")
    for T in (T_cold, T_hot):
        space(liquid, T, 10, name)
    flash(liquid, 8, name)
    y = partial(liquid, T_hot)[substance] / BAROMETER
    print(f"{substance}: {1e6 * y:.1f} ppm, {1e6 * y / limit:.1f} times {limit} ppm")
    for T in (288.15, 296.05, T_hot):
        print(f"bubble pressure at {T - 273.15:.2f} degC {c.bubble(liquid, T):.1f} Pa")


DROP = 8.0 - 0.2  # from the mean minimum of January, the coldest, to the design low of the site [K]


def main():
    base, ethanol = c.stock("summer-gasoline-base", 7), {"ethanol": 1.0}
    winter, butane, naphtha = c.stock("winter-gasoline-base", 7), c.stock("field-butane"), c.stock("heavy-naphtha")
    e10 = c.by_volume((base, 0.9), (c.stock("denatured-ethanol"), 0.1))
    e85 = c.by_volume((ethanol, 0.83), (base, 0.17))
    jet = c.stock("jet-kerosene")
    rich = c.by_volume((winter, 0.97), (butane, 0.03))

    cold = cold_surface(0.17, 6.4, -0.2, 9.6 / 9, DROP) + 273.15
    hot = hot_surface("January", 15, 6.4, -0.2, (0.17, 0.25), 9.6 / 9)
    report("E85, January", e85, cold, hot)
    space(depleted(e85, cold, (9.6 - 0.9) / 0.9), cold, 0)
    print(f"receipt at 6 degC {c.bubble(e85, 279.15):.1f} Pa")

    cold = cold_surface(0.17, 28.8, 17.1, 5 / 4, DROP) + 273.15
    hot = hot_surface("July", 196, 28.8, 17.1, (0.17, 0.25), 5 / 4)
    report("summer gasoline, July", base, cold, hot)
    space(depleted(base, cold, (5 - 0.4) / 0.4), cold, 10, "the same after it filled the space at 0.4 m")
    print(f"receipt at 20 degC {c.bubble(base, 293.15):.1f} Pa; Y and C: volatile, cold")

    cold = cold_surface(0.17, 16.7, 6.5, 11 / 14, DROP) + 273.15
    hot = hot_surface("April", 105, 16.7, 6.5, (0.17, 0.25), 11 / 14)
    report("jet kerosene, April", jet, cold, hot, "toluene", ACGIH_TOLUENE)
    space(base, hot, 10, "summer gasoline left in the jet tank")
    print(f"receipt at 12 degC {c.bubble(jet, 285.15):.1f} Pa; n-hexane {c.pure('n-hexane').psat(hot):.0f} Pa")

    hot = 273.15 + 38.97  # summer E10 file
    for name, liquid in (("E10", e10), ("summer base", base)):
        flash(liquid, 6, name)
        print(f"{name}: benzene at {hot - 273.15:.2f} degC "
              f"{1e6 * partial(liquid, hot)['benzene'] / BAROMETER:.1f} ppm")

    cold = cold_surface(0.54, -0.2 + 6.6, -0.2, 12.8 / 18, DROP) + 273.15
    hot = 273.15 + 16.89  # winter gasoline file
    for name, liquid in (("winter blend", rich), ("heavy naphtha heel", naphtha)):
        report(name, liquid, cold, hot) if name == "winter blend" else space(liquid, hot, 10, name)
    flash(naphtha, 6, "heavy naphtha")

    liquid = c.stock("condensate")
    cold = cold_surface(0.68, 21.4, 10.8, 11 / 15, DROP) + 273.15
    space(liquid, cold, 10, "condensate")
    space(depleted(liquid, cold, (11 - 1.0) / 1.0), cold, 10, "the same after it filled the space at 1.0 m")
    flash(liquid, 8, "condensate")
    y = partial(liquid, 319.15)["benzene"] / BAROMETER
    print(f"condensate: benzene at 46 degC {1e6 * y:.1f} ppm")


if __name__ == "__main__":
    warnings.simplefilter("ignore")
    main()
