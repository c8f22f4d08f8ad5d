"""Random feeds for the stress study: 2 to 15 species, light gases and heavy ends together, traces, near-critical.

One fluid of all species of a pool serves every feed, most shares being zero.
The Peng-Robinson pool takes the project's constants and round interaction
parameters assumed for the test; the other is the blends' own model.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.equilibrium import Fluid

SEED = 1982
POOL = (
    "nitrogen", "methane", "carbon dioxide", "hydrogen sulfide", "ethane", "propane", "isobutane", "n-butane",
    "isopentane", "n-pentane", "n-hexane", "benzene", "cyclohexane", "n-heptane", "isooctane", "toluene", "n-octane",
    "m-xylene", "n-decane", "naphthalene", "n-dodecane", "n-hexadecane", "n-eicosane", "water", "methanol",
)  # fmt: skip
BLEND_POOL = (
    "nitrogen", "oxygen", "carbon dioxide", "methane", "propane", "isobutane", "n-butane", "isopentane", "n-pentane",
    "n-hexane", "cyclohexane", "isooctane", "toluene", "n-octane", "m-xylene", "1-hexene", "MTBE", "n-decane",
    "n-dodecane", "n-hexadecane", "ethanol", "water", "methanol",
)  # fmt: skip
T_RANGE, P_RANGE = (230.0, 400.0), (20e3, 3000e3)  # [K], [Pa]
FAMILIES = {  # shares of the mixtures
    "any": 0.25, "gas and heavy ends": 0.17, "traces": 0.16, "one species but for": 0.14, "near-critical": 0.13,
    "water or methanol": 0.15,
}  # fmt: skip
SMALLEST = 1e-12  # [-] smallest share


@dataclass(frozen=True)
class Pool:
    """A fluid of many species and which of them are what.

    gases and lights, how many of the first; wet, how many of the last; heavy,
    the index from which on the dry ones are heavy ends.
    """

    fluid: Fluid
    gases: int
    lights: int
    heavy: int
    wet: int

    @property
    def dry(self) -> int:
        """How many species there are before the wet ones."""
        return self.fluid.c - self.wet


@dataclass(frozen=True)
class Cases:
    """n feeds: fluid, z (n, c) [-], T (n,) [K], P (n,) [Pa], and the family (n,) each belongs to."""

    fluid: Fluid
    z: np.ndarray
    T: np.ndarray
    P: np.ndarray
    family: np.ndarray

    def take(self, lanes) -> Cases:
        """Some of the feeds."""
        return Cases(self.fluid, self.z[lanes], self.T[lanes], self.P[lanes], self.family[lanes])


def cubic_pool() -> Pool:
    """Peng-Robinson with the pool's constants and assumed k_ij."""
    table = Fluid.of(POOL, model="PR")
    fluid = Fluid.from_constants(table.Tc, table.Pc, table.omega, table.MW, assumed_kij())
    return Pool(fluid, gases=5, lights=8, heavy=18, wet=2)


def blend_pool() -> Pool:
    """The model of the blends, from the tables."""
    return Pool(Fluid.of(BLEND_POOL), gases=4, lights=7, heavy=17, wet=3)


def assumed_kij():
    """Round k_ij (c, c), assumed: water 0.5 (0.2 with CO2 and H2S), methanol 0.1, N2 0.1, CO2 0.12, H2S 0.06."""
    k = np.zeros((len(POOL), len(POOL)))
    for name, value in (("hydrogen sulfide", 0.06), ("carbon dioxide", 0.12), ("nitrogen", 0.1), ("methanol", 0.1),
                        ("water", 0.5)):  # fmt: skip
        i = POOL.index(name)
        k[i, :] = k[:, i] = value
    pairs = {("nitrogen", "methane"): 0.03, ("nitrogen", "carbon dioxide"): 0.0, ("water", "carbon dioxide"): 0.2,
             ("water", "hydrogen sulfide"): 0.2, ("water", "methanol"): -0.1}  # fmt: skip
    for (one, other), value in pairs.items():
        i, j = POOL.index(one), POOL.index(other)
        k[i, j] = k[j, i] = value
    np.fill_diagonal(k, 0.0)
    return k


def stress_cases(n: int = 2000, pool: Pool | None = None, seed: int = SEED) -> Cases:
    """n feeds, the families in proportion, seeded; T and P at random within the ranges, but near-critical feeds."""
    generator = np.random.default_rng(seed)
    pool = cubic_pool() if pool is None else pool
    counts = np.round(np.array(list(FAMILIES.values())) * n).astype(int)
    family = np.repeat(list(FAMILIES), counts)
    family = np.concatenate([family[:n], np.full(max(0, n - family.size), "any")])
    T = generator.uniform(*T_RANGE, n)
    P = np.exp(generator.uniform(*np.log(P_RANGE), n))
    z = np.array([_feed(generator, name, pool) for name in family])
    near = family == "near-critical"
    Tc, Pc = z[near] @ pool.fluid.Tc, z[near] @ pool.fluid.Pc
    # within 8 % of the pseudo-critical temperature and up to 1.5 times that pressure, so above 3,000 kPa too
    T[near] = np.clip(Tc * generator.uniform(0.92, 1.08, Tc.size), *T_RANGE)
    P[near] = Pc * generator.uniform(0.5, 1.5, Tc.size)
    return Cases(pool.fluid, z, T, P, family)


def _feed(generator, family: str, pool: Pool):
    """One composition (c,)."""
    count = int(generator.integers(2, 16))
    if family == "gas and heavy ends":
        few = 1 + count // 4
        gases = generator.choice(pool.gases, min(few, pool.gases), replace=False)
        heavy = np.arange(pool.heavy, pool.dry)
        heavy = generator.choice(heavy, min(few, heavy.size), replace=False)
        between = np.arange(pool.gases, pool.heavy)
        rest = generator.choice(between, max(0, min(count - gases.size - heavy.size, between.size)), replace=False)
        chosen = np.concatenate([gases, heavy, rest])
    elif family == "near-critical":
        chosen = generator.choice(pool.lights, min(count, pool.lights), replace=False)
    elif family == "water or methanol":
        wet = np.arange(pool.dry, pool.fluid.c)
        wet = generator.choice(wet, int(generator.integers(1, pool.wet + 1)), replace=False)
        chosen = np.concatenate([wet, generator.choice(pool.dry, max(1, count - wet.size), replace=False)])
    else:
        chosen = generator.choice(pool.dry, count, replace=False)
    share = generator.dirichlet(np.full(chosen.size, generator.choice([0.3, 1.0, 3.0])))
    if family == "traces":
        share *= 10.0 ** -np.where(generator.random(chosen.size) < 0.5, generator.uniform(0.0, 12.0, chosen.size), 0.0)
    if family == "one species but for":
        share *= 10.0 ** -generator.uniform(2.0, 12.0)
        share[0] = 1.0
    z = np.zeros(pool.fluid.c)
    z[chosen] = np.maximum(share / share.sum(), SMALLEST)
    return z / z.sum()
