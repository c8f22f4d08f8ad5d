"""One phase of a mixture as the flash sees it: which root, and how dense.

A phase is told liquid-like or vapour-like by v/b against its critical value
in the same equation of state. Stored liquids lie at v/b of 1.1 to 1.6, vapours
near atmospheric pressure at some 200.
"""

from __future__ import annotations

import numpy as np

from screener.equilibrium.cubic import CRITICAL_VOLUME_RATIO, PENG_ROBINSON

DENSE = 1.75  # v/b below which a phase is a liquid beyond doubt: saturated liquids up to 0.88 Tc; own choice
DILUTE = 20.0  # v/b above which it is a vapour beyond doubt: five times the critical volume; own choice


def reduced_volume(mixture, P, Z):
    """v/b (n,) [-] of a phase at pressure P (n,) [Pa] with compressibility factor Z (n,) [-]."""
    return Z * mixture.RT / (P * mixture.b)


def critical_ratio(mixture) -> float:
    """v/b at the critical point of the equation of state. [-]"""
    return CRITICAL_VOLUME_RATIO.get(mixture.d, CRITICAL_VOLUME_RATIO[PENG_ROBINSON])


class Feed:
    """A feed as one phase: its two roots, and which of them has the lower Gibbs energy.

    ln_phi_L, ln_phi_V and ln_phi (n, c) [-], the last on the lower root; two
    (n,) mask, both roots exist; ratio (n,) [-] v/b; liquid (n,) mask; sure
    (n,) mask, False where one root of middling density leaves the kind open.
    """

    def __init__(self, state, P, z):
        mixture = state.mix(z)
        self.ln_phi_L, Z_L = mixture.ln_phi_and_Z(P, "L")
        self.ln_phi_V, Z_V = mixture.ln_phi_and_Z(P, "V")
        with np.errstate(all="ignore"):
            lower = np.einsum("nc,nc->n", z, self.ln_phi_L - self.ln_phi_V) <= 0.0
            self.two = np.abs(Z_V - Z_L) > 1e-9 * Z_V
            ratio_L, ratio_V = reduced_volume(mixture, P, Z_L), reduced_volume(mixture, P, Z_V)
        self.liquid = np.where(self.two, lower, ratio_L < critical_ratio(mixture))
        self.ratio = np.where(self.liquid, ratio_L, ratio_V)
        self.sure = self.two | (self.ratio < DENSE) | (self.ratio > DILUTE)
        self.ln_phi = np.where(self.liquid[:, None], self.ln_phi_L, self.ln_phi_V)

    @property
    def ln_K(self):
        """First ln K: the feed as a liquid against the feed as a vapour; zero where it has one root."""
        return self.ln_phi_L - self.ln_phi_V
