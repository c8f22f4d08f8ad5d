"""The first bubble in a liquid, the first drop in a vapour: fixed-point problems for saturation points.

At given T the unknown is u_i = ln(K_i P), at low pressure nearly the constant
ln(gamma_i Psat_i); pressure and the new phase follow from it alone:

    bubble:  P = sum x_i exp(u_i),       y_i = x_i exp(u_i) / P
    dew:     1/P = sum y_i exp(-u_i),    x_i = y_i P exp(-u_i).

At given P it is u_i = ln K_i + h_i / T with h_i from Wilson's K, again nearly
constant; 1/T is the root of a convex function of u. Either way the step is
u -> ln phi_L - ln phi_V + (the same shift), and the difference of the two
sides is |ln f_V - ln f_L|.
"""

from __future__ import annotations

import numpy as np

from screener.equilibrium.eos import both_phases
from screener.equilibrium.phase import DENSE, reduced_volume
from screener.equilibrium.rows import row_max, row_sum

LOWEST_P, HIGHEST_P = 1e-9, 1e8  # [Pa] beyond these no answer is given: no use of stored liquids comes near
LOWEST_T, HIGHEST_T = 50.0, 1500.0  # [K] likewise
COLDEST_BLEND = 150.0  # [K] the same of models with group contributions: their terms in 1/T run away below; own choice
NO_LIQUID = 8.0  # v/b above which a root is no liquid: twice the critical volume; own choice
NO_VAPOUR = 1.6  # v/b below which a root is no vapour: the density of liquids at 0.85 Tc; own choice
NUDGE = 0.4  # step of u where the root asked for does not exist
TRIES = 8  # pressures tried for a liquid root of the feed, each ten times the last


def lowest_T(fluid) -> float:
    """Lowest temperature [K] given as an answer."""
    return COLDEST_BLEND if fluid.model in ("PR-GE", "gamma-phi") else LOWEST_T


class Incipient:
    """What the two problems share. `nudged` is switched off to look at a point known to be one."""

    nudged = True
    seen = None  # u of the last image, and what it found on the way

    def image(self, u):
        """ln phi_L - ln phi_V + the shift between ln K and u."""
        found, other = self.close(u)
        P, shift, feed, new = self.phases(found, other)
        image, volume_L, volume_V = step_and_volumes(feed, new, P, self.bubble, u, shift, self.nudged)
        self.seen = u, (found, other, volume_L, volume_V)
        return image

    def look(self, u):
        """Unknown (n,), composition of the new phase (n, c) and v/b (n,) of liquid and vapour at u."""
        if self.seen is None or self.seen[0].shape != u.shape or not np.array_equal(self.seen[0], u):
            with np.errstate(all="ignore"):
                self.image(u)
        return self.seen[1]


class AtTemperature(Incipient):
    """Unknown pressure."""

    def __init__(self, state, feed, bubble: bool):
        self.state, self.feed, self.bubble = state, feed, bubble
        self.present = feed > 0.0
        self.mixture = None

    def take(self, lanes) -> AtTemperature:
        """Some of the lanes."""
        return AtTemperature(self.state.take(lanes), self.feed[lanes], self.bubble)

    def close(self, u):
        """Pressure (n,) [Pa] and composition of the new phase (n, c)."""
        sign = 1.0 if self.bubble else -1.0
        part, ln_sum = weighted(self.feed, sign * u)
        return np.exp(np.minimum(np.maximum(sign * ln_sum, -300.0), 300.0)), part

    def phases(self, P, other):
        """Pressure, shift, and the mixtures of feed and new phase."""
        if self.mixture is None:
            self.mixture = self.state.mix(self.feed)
        return P, np.log(P)[:, None], self.mixture, self.state.mix(other)


class AtPressure(Incipient):
    """Unknown temperature. h (c,) [K] slopes of ln K in 1/T; tau (n,) [1/K] the last 1/T."""

    def __init__(self, fluid, P, feed, bubble: bool, tau=None):
        self.fluid, self.P, self.feed, self.bubble = fluid, P, feed, bubble
        self.present = feed > 0.0
        self.h = 5.373 * (1.0 + fluid.omega) * fluid.Tc
        self.tau = np.full(P.shape, 1.0 / 300.0) if tau is None else tau

    def take(self, lanes) -> AtPressure:
        """Some of the lanes."""
        return AtPressure(self.fluid, self.P[lanes], self.feed[lanes], self.bubble, self.tau[lanes])

    def close(self, u):
        """Temperature (n,) [K] and composition of the new phase (n, c)."""
        sign = 1.0 if self.bubble else -1.0
        tau = self.tau
        for _ in range(60):
            part, ln_sum = weighted(self.feed, sign * (u - self.h * tau[:, None]))
            slope = -sign * (part @ self.h)
            new = np.minimum(np.maximum(tau - ln_sum / slope, 1.0 / HIGHEST_T), 1.0 / lowest_T(self.fluid))
            small = np.abs(new - tau) <= 1e-13 * tau
            tau = np.where(np.isfinite(new), new, tau)
            if small.all():
                break
        self.tau = tau
        return 1.0 / tau, weighted(self.feed, sign * (u - self.h * tau[:, None]))[0]

    def phases(self, T, other):
        """Pressure, shift, and the mixtures of feed and new phase."""
        state = self.fluid.at(T)
        return self.P, self.h / T[:, None], state.mix(self.feed), state.mix(other)


def step(feed, other, P, bubble: bool, u, shift):
    """The image of u, as `step_and_volumes` gives it."""
    return step_and_volumes(feed, other, P, bubble, u, shift)[0]


def step_and_volumes(feed, other, P, bubble: bool, u, shift, nudged=True):
    """The image of u, and v/b (n,) of liquid and vapour; where a phase is not of its kind, a nudge to where it is.

    A larger u means a higher pressure, or a lower temperature: either way the
    liquid comes back.
    """
    liquid, vapour = (feed, other) if bubble else (other, feed)
    ln_phi_L, Z_L, ln_phi_V, Z_V = both_phases(liquid, vapour, P)
    image = ln_phi_L - ln_phi_V + shift
    volume_L, volume_V = reduced_volume(liquid, P, Z_L), reduced_volume(vapour, P, Z_V)
    with np.errstate(invalid="ignore"):
        thin, thick = volume_L > NO_LIQUID, volume_V < NO_VAPOUR
    wrong = thin | thick
    if nudged and wrong.any():
        nudge = np.where(thin & ~thick, NUDGE, -NUDGE)
        image = np.where(wrong[:, None], u + nudge[:, None], image)
    return image, volume_L, volume_V


def weighted(share, exponent):
    """share exp(exponent) scaled to sum 1 (n, c), and ln of its sum (n,); share zero counts for nothing."""
    present = share > 0.0
    top = row_max(np.where(present, exponent, -np.inf))
    part = np.where(present, exponent - top[:, None], 0.0)
    np.exp(part, out=part)
    part *= share
    total = row_sum(part)
    part /= total[:, None]
    return part, top + np.log(total)


def start(fluid, name: str, value, feed, bubble: bool, warm=None):
    """The fixed-point problem of a chunk and its blind start.

    Parameters
    ----------
    fluid : Fluid
        The fluid.
    name : str
        "T" or "P": what `value` is.
    value : array, shape (n,)
        Temperature [K] or pressure [Pa].
    feed : array, shape (n, c)
        Liquid (bubble) or vapour (dew). [-]
    bubble : bool
        Which of the two.
    warm : array, shape (n, c), optional
        u where it is known, NaN in the other lanes. [-]

    Returns
    -------
    tuple
        Problem and u (n, c).

    Source
    ------
    Wilson's K; at given T the bubble starts from the fugacities of the liquid
    itself, which holds for dissolved gases and non-ideal liquids as well.
    """
    problem = AtPressure(fluid, value, feed, bubble) if name == "P" else AtTemperature(fluid.at(value), feed, bubble)
    if warm is None:
        u = _blind(fluid, problem, name, value, bubble)
    else:
        cold = np.isnan(warm[:, 0])
        u = np.where(cold[:, None], _blind(fluid, problem, name, value, bubble), warm) if cold.any() else warm
    return problem, np.where(problem.present, u, 0.0)


def _blind(fluid, problem, name, value, bubble):
    """u (n, c) from nothing but the question."""
    if name == "P":
        return np.log(fluid.Pc / value[:, None]) + problem.h / fluid.Tc
    u = np.log(fluid.wilson_K(value, 1.0))
    if bubble:
        P, _ = problem.close(np.where(problem.present, u, 0.0))
        u = _liquid_fugacity(problem, np.minimum(np.maximum(P, 1.0), 1e7), u)
    return u


def _liquid_fugacity(problem, P, u):
    """ln(phi_L P) of the feed at the first pressure, counted from P upwards, where it is a liquid."""
    problem.mixture = mixture = problem.state.mix(problem.feed)
    u = u.copy()
    left = np.ones(P.shape, dtype=bool)
    for _ in range(TRIES):
        ln_phi, Z = mixture.ln_phi_and_Z(P, "L")
        with np.errstate(invalid="ignore"):
            liquid = left & (reduced_volume(mixture, P, Z) < 2.0 * DENSE)
        u = np.where(liquid[:, None], ln_phi + np.log(P)[:, None], u)
        left &= ~liquid
        if not left.any():
            break
        P = np.where(left, 10.0 * P, P)
    return u
