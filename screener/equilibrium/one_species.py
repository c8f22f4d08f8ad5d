"""Saturation of a single species: between the states of one root, where both roots have equal Gibbs energy.

f = ln phi_L - ln phi_V falls with pressure (at slope Z_L - Z_V in ln P) and
rises with temperature. Where only one root exists, its density says on which
side of the answer the state lies: a liquid is under too high a pressure or too
cold. Every lane therefore has a bracket from the start, up to within rounding
of the critical point.
"""

from __future__ import annotations

import numpy as np

from screener.equilibrium.incipient import HIGHEST_P, HIGHEST_T, LOWEST_P, lowest_T
from screener.equilibrium.phase import critical_ratio, reduced_volume

MOST_PASSES = 200  # a bisection from one end of the range to rounding takes 60
TWO = 1e-10  # relative distance of two roots that are two


def saturation(fluid, name: str, value, feed):
    """Pressure at given temperature, or temperature at given pressure, of lanes that hold one species.

    Parameters
    ----------
    fluid : Fluid
        The fluid; any cubic equation of state.
    name : str
        "T" or "P": what `value` is.
    value : array, shape (n,)
        Temperature [K] or pressure [Pa].
    feed : array, shape (n, c)
        One share is 1, the others are zero. [-]

    Returns
    -------
    tuple
        The other of P [Pa] and T [K] (n,), and the mask (n,) of lanes that have one: False above the critical
        point and outside the range of the method.

    Source
    ------
    Equal Gibbs energies; bisection with Newton steps in ln P and secant steps in ln T.
    """
    known_T = name == "T"
    low, high = np.log((LOWEST_P, HIGHEST_P) if known_T else (lowest_T(fluid), HIGHEST_T))
    a, b = np.full(value.shape, low), np.full(value.shape, high)
    at = 0.5 * (a + b)
    last, f_last = np.full(value.shape, np.nan), np.full(value.shape, np.nan)
    two_at_all = np.zeros(value.shape, dtype=bool)
    state = fluid.at(value) if known_T else None
    mixture = state.mix(feed) if known_T else None
    for _ in range(MOST_PASSES):
        if not known_T:
            state = fluid.at(np.exp(at))
            mixture = state.mix(feed)
        P = np.exp(at) if known_T else value
        f, slope, two, liquid = _difference(mixture, P, feed)
        two_at_all |= two
        # rising in ln P means f falls; rising in ln T means f rises
        too_high = np.where(two, f < 0.0, liquid) if known_T else np.where(two, f > 0.0, ~liquid)
        b, a = np.where(too_high, at, b), np.where(too_high, a, at)
        with np.errstate(all="ignore"):
            rate = slope if known_T else (f - f_last) / (at - last)
            step = np.where(two, at - f / rate, np.nan)
        inside = (step > a) & (step < b)
        new = np.where(inside, step, 0.5 * (a + b))
        done = (np.abs(new - at) <= 4e-16 * np.abs(at)) | (two & (f == 0.0))
        last, f_last = np.where(two, at, np.nan), np.where(two, f, np.nan)
        at = np.where(done, at, new)
        if done.all():
            break
    return np.exp(at), two & two_at_all & (at > low + 1e-6) & (at < high - 1e-6)


def _difference(mixture, P, feed):
    """f (n,), its slope in ln P (n,), where two roots exist (n,), and whether one root is a liquid (n,)."""
    ln_L, Z_L = mixture.ln_phi_and_Z(P, "L")
    ln_V, Z_V = mixture.ln_phi_and_Z(P, "V")
    with np.errstate(invalid="ignore"):
        f = np.where(feed > 0.0, ln_L - ln_V, 0.0).sum(axis=1)
        liquid = reduced_volume(mixture, P, Z_L) < critical_ratio(mixture)
        return f, Z_L - Z_V, np.abs(Z_V - Z_L) > TWO * Z_V, liquid
