"""Judge of flashes and saturation points: equal fugacity, balance and tangent plane, by other means than theirs.

Peng-Robinson is written out plainly with roots by companion matrix; the tangent
plane is sought by plain substitution from every pure species, ideal vapour and
liquid and random compositions, on the root of lower Gibbs energy.
"""

from __future__ import annotations

import numpy as np

R = 8.31446261815324  # [J/mol/K] CODATA 2018, exact product
EXACT = 0.45723552892138218, 0.077796073903888453  # critical constants of the equation, triple root
PRINTED = 0.45724, 0.07780  # as printed by Peng and Robinson, Ind. Eng. Chem. Fundam. 15 (1976) 59
OWN = {"unequal": 1e-8, "unbalanced": 1e-11, "below": 1e-7}  # accepted of ours: ten times what the answers promise
PEER = {"unequal": 1e-4, "unbalanced": 1e-6, "below": 1e-6}  # accepted of the libraries, which promise nothing
NOTHING = 1e-100  # share below which a species has left a phase: the answers bound |ln K| at 300
ONE = 1e-4  # |ln K| and difference of volume of two phases that are one
LIQUID = 3.0  # v/b below which a phase is a liquid: three quarters of the critical one
PLAIN = 300  # substitutions of each trial
RANDOM = 4  # random starts per feed
CHUNK = 3000  # trial lanes at once


class PlainPR:
    """Peng-Robinson 1976 of n lanes at T (n,) [K], P (n,) [Pa]."""

    def __init__(self, fluid, T, P, constants=EXACT):
        Tc, Pc, w = fluid.Tc, fluid.Pc, fluid.omega
        m = 0.37464 + 1.54226 * w - 0.26992 * w**2
        a = constants[0] * (R * Tc) ** 2 / Pc * (1.0 + m * (1.0 - np.sqrt(T[:, None] / Tc))) ** 2
        self.root_a = np.sqrt(a * P[:, None]) / (R * T[:, None])
        self.b = constants[1] * R * Tc / Pc * (P / (R * T))[:, None]
        self.kij = fluid.mixing.kij if fluid.mixing.kij is not None else np.zeros((Tc.size, Tc.size))

    def take(self, lanes):
        """Some of the lanes."""
        some = object.__new__(PlainPR)
        some.root_a, some.b, some.kij = self.root_a[lanes], self.b[lanes], self.kij
        return some

    def both(self, x):
        """ln phi (2, n, c) on the smallest and the largest root, and v/b (2, n)."""
        B = (x * self.b).sum(axis=1)
        s = x * self.root_a
        cross = self.root_a * (s.sum(axis=1, keepdims=True) - s @ self.kij)
        A = (x * cross).sum(axis=1)
        Z = plain_roots(A, B)
        t = np.sqrt(2.0)
        ln_phi = np.empty((2, *x.shape))
        for k in range(2):
            log = np.log((Z[k] + (1 + t) * B) / (Z[k] + (1 - t) * B)) / (2.0 * t * B)
            ln_phi[k] = self.b / B[:, None] * (Z[k] - 1.0)[:, None] - np.log(Z[k] - B)[:, None]
            ln_phi[k] -= log[:, None] * (2.0 * cross - A[:, None] * self.b / B[:, None])
        return ln_phi, Z / B


class ModelPhases:
    """The same questions put to a model of the project: the judge of models that are not written out here."""

    def __init__(self, fluid, T, P):
        self.state, self.P = fluid.at(T), P

    def take(self, lanes):
        """Some of the lanes."""
        some = object.__new__(ModelPhases)
        some.state, some.P = self.state.take(lanes), self.P[lanes]
        return some

    def both(self, x):
        """As `PlainPR.both`."""
        mixture = self.state.mix(x)
        (ln_L, Z_L), (ln_V, Z_V) = (mixture.ln_phi_and_Z(self.P, kind) for kind in "LV")
        return np.array([ln_L, ln_V]), np.array([Z_L, Z_V]) * mixture.RT / (mixture.b * self.P)


def lower(eos, x):
    """ln phi (n, c) on the root of lower Gibbs energy, and v/b (n,)."""
    ln_phi, ratio = eos.both(x)
    liquid = (x * (ln_phi[0] - ln_phi[1])).sum(axis=1) <= 0.0
    return np.where(liquid[:, None], ln_phi[0], ln_phi[1]), np.where(liquid, ratio[0], ratio[1])


def plain_roots(A, B):
    """Smallest and largest real root above B (2, n): eigenvalues, and Newton from B upwards for the smallest.

    At B the cubic is -2 B^2 and rises, bent downwards up to Z = (1 - B)/3: Newton from there never oversteps.
    """
    c2, c1, c0 = B - 1.0, A - 3.0 * B * B - 2.0 * B, -(A * B - B * B - B**3)
    matrix = np.zeros((A.size, 3, 3))
    matrix[:, 1, 0] = matrix[:, 2, 1] = 1.0
    matrix[:, 0, 2], matrix[:, 1, 2], matrix[:, 2, 2] = -c0, -c1, -c2
    Z = np.linalg.eigvals(matrix)
    real = (np.abs(Z.imag) <= 1e-7 * np.abs(Z)) & (Z.real > B[:, None])
    low = np.where(real, Z.real, np.inf).min(axis=1)
    high = _newton(np.where(real, Z.real, -np.inf).max(axis=1), c2, c1, c0, 3)
    rising = _newton(B, c2, c1, c0, 60)
    settled = np.abs(rising - _newton(rising, c2, c1, c0, 1)) < 1e-12 * rising
    there = (rising > B) & (rising < (1.0 - B) / 3.0) & settled
    return np.array([np.where(there, rising, _newton(low, c2, c1, c0, 3)), high])


def _newton(Z, c2, c1, c0, times):
    longest = 0.01 if times < 10 else 1.0
    for _ in range(times):
        slope = (3.0 * Z + 2.0 * c2) * Z + c1
        step = (((Z + c2) * Z + c1) * Z + c0) / np.where(slope == 0.0, np.inf, slope)
        Z = np.where(np.abs(step) < longest * Z, Z - step, Z)
    return Z


def ln_f(ln_phi, x):
    """ln of fugacity over pressure (n, c); zero where a species is absent."""
    return np.where(x > 0.0, np.log(np.where(x > 0.0, x, 1.0)) + ln_phi, 0.0)


def unequal(one, x, other, w):
    """Largest difference (n,) of ln f of two phases, over species of which both hold more than nothing."""
    return np.where(np.minimum(x, w) > NOTHING, np.abs(one - other), 0.0).max(axis=1)


def tangent_plane(eos, x, d, generator, wide=True):
    """Smallest distance over RT (n,) from d = ln x + ln phi of a phase x, the composition it belongs to, its v/b."""
    best, where, ratio = np.full(x.shape[0], np.inf), np.array(x), np.zeros(x.shape[0])
    lane, start = _starts(x, d, generator, wide)
    for some in np.array_split(np.arange(lane.size), max(1, lane.size // CHUNK)):
        tpd, w, v = _descend(eos.take(lane[some]), start[some], d[lane[some]], x[lane[some]] > 0.0)
        for k in np.argsort(-tpd, kind="stable"):  # the smallest last
            i = lane[some[k]]
            if tpd[k] < best[i]:
                best[i], where[i], ratio[i] = tpd[k], w[k], v[k]
    return best, where, ratio


def _starts(x, d, generator, wide):
    """Lanes (m,) and ln W (m, c) of the trials."""
    lanes, starts = [], []
    for i, row in enumerate(x):
        there = np.flatnonzero(row > 0.0)
        trials = [d[i], 2.0 * np.log(np.where(row > 0.0, row, 1.0)) - d[i], np.zeros(row.size)]
        pure = there if wide else [there[np.argmax(d[i][there])], there[np.argmin(d[i][there])]]
        trials += [np.where(np.arange(row.size) == k, 0.0, np.log(1e-4 / there.size)) for k in pure]
        if wide:
            trials += [np.log(generator.dirichlet(np.full(row.size, 0.3)) + 1e-300) for _ in range(RANDOM)]
        lanes += [i] * len(trials)
        starts += trials
    return np.array(lanes), np.array(starts)


def _descend(eos, ln_W, d, present):
    """Plain substitution: the distance (m,), the composition and v/b where it ends."""
    active = np.arange(ln_W.shape[0])
    for _ in range(PLAIN):
        w = _share(ln_W[active], present[active])
        new = d[active] - lower(eos.take(active), w)[0]
        change = np.where(present[active], np.abs(new - ln_W[active]), 0.0).max(axis=1)
        ln_W[active] = new
        active = active[change > 1e-9]
        if active.size == 0:
            break
    w = _share(ln_W, present)
    ln_phi, ratio = lower(eos, w)
    ln_w = np.log(np.where(w > 0.0, w, 1.0))
    return np.where(present, w * (ln_w + ln_phi - d), 0.0).sum(axis=1), w, ratio


def _share(ln_W, present):
    top = np.where(present, ln_W, -np.inf).max(axis=1, keepdims=True)
    W = np.where(present, np.exp(np.where(present, ln_W, top) - top), 0.0)
    return W / W.sum(axis=1, keepdims=True)


def judge_phases(eos, z, shares, phases, generator, accept):
    """Faults (n,) of states given as phases: '' or the first judgement they fail.

    shares (k, n) and phases (k, n, c), NaN where a lane has fewer.
    """
    n = z.shape[0]
    there = np.isfinite(phases).all(axis=2) & (shares > 0.0)
    first = there.argmax(axis=0)
    every = np.arange(n)
    x = np.where(there.any(axis=0)[:, None], phases[first, every], z)
    whole = np.where(there[:, :, None], shares[:, :, None] * np.nan_to_num(phases), 0.0).sum(axis=0)
    fault = np.full(n, "", dtype=object)
    fault[~(np.abs(whole - z).max(axis=1) < accept["unbalanced"])] = "balance"
    phi_x, _ = eos.both(x)
    best = np.full(n, np.inf)
    d = ln_f(lower(eos, x)[0], x)
    for root in range(2):  # a phase has the root that fits the others best, one phase alone the lower one
        mine = ln_f(phi_x[root], x)
        gap = np.zeros(n)
        for k in range(shares.shape[0]):
            row = there[k] & (first != k)
            if row.any():
                w = np.where(row[:, None], phases[k], x)
                phi_w, _ = eos.both(w)
                apart = np.min([unequal(mine, x, ln_f(phi_w[r], w), w) for r in range(2)], axis=0)
                gap = np.where(row, np.maximum(gap, apart), gap)
        better = (gap < best) & (there.sum(axis=0) > 1)
        best = np.where(better, gap, best)
        d = np.where(better[:, None], mine, d)
    fault[(there.sum(axis=0) > 1) & ~(best < accept["unequal"])] = "fugacity"
    tpd, _, ratio = tangent_plane(eos, x, d, generator)
    fault[(fault == "") & (tpd < -accept["below"])] = "tangent plane"
    return fault, tpd, ratio


def judge_points(eos, feed, other, bubble: bool, generator, accept):
    """Faults (n,) of saturation points, the distance found and v/b of the phase it belongs to."""
    n = feed.shape[0]
    fault = np.full(n, "", dtype=object)
    phi_z, v_z = eos.both(feed)
    phi_w, v_w = eos.both(other)
    old, new = (0, 1) if bubble else (1, 0)
    d = ln_f(phi_z[old], feed)
    apart = unequal(d, feed, ln_f(phi_w[new], other), other)
    tpd, _, ratio = tangent_plane(eos, feed, d, generator)
    fault[tpd < -accept["below"]] = "tangent plane"
    fault[(v_w[new] > v_z[old]) != bubble] = "kind"
    both = (feed > 0.0) & (other > 0.0)
    ratio_x = np.abs(np.log(np.where(both, other, 1.0) / np.where(both, feed, 1.0))).max(axis=1)
    fault[(ratio_x < ONE) & (np.abs(v_w[new] / v_z[old] - 1.0) < ONE)] = "one phase"
    fault[~(apart < accept["unequal"])] = "fugacity"
    fault[~(np.abs(other.sum(axis=1) - 1.0) < accept["unbalanced"])] = "balance"
    return fault, tpd, ratio
