"""The open still: liquid that loses its vapour as it forms, many at once.

It obeys dn_i = -K_i n_i ds with K at the bubble point of what is left, at fixed pressure
or fixed temperature. Steps in s are exponential in each species (no negative amounts), take
ln K at their middle by extrapolation from the two points before, and are sized so that the
same amount leaves in each.

Reflux: a neck condenses the share f of the moles that rise; the condensate falls back and
the vapour that leaves is in equilibrium with it. The neck takes relative volatilities from
the pot, so that its condensate y/(f + (1 - f) k K) adds to 1 for one number k, and what
leaves is k K times that.
"""

from __future__ import annotations

import numpy as np

from screener.ground.status import Status

TINY = 1e-300


class Still:
    """Amounts n (m, c) [mol] left in the still, its bubble point, and what leaves through the neck.

    given (m,) is what stays: pressure with saturation bubble_temperature and sought "T", or
    temperature with bubble_pressure and "P"; found (m,) is the other. weight (c,) is what the
    drop (m,) of each step is counted in, volume or mass per mole; mobility (c,) the relative rates
    at which vapours are carried away, all alike without it. status (m,) of the last point.
    """

    def __init__(self, fluid, n, given, weight, drop, saturation, sought, reflux=None, mobility=None):
        self.fluid, self.n, self.given, self.weight, self.drop = fluid, n.copy(), given, weight, drop
        self.saturation, self.sought = saturation, sought
        self.reflux = np.zeros(given.shape) if reflux is None else reflux
        self.ln_mobility = 0.0 if mobility is None else np.log(mobility)
        self.found, self.ln_K, self.before, self.status = np.full(given.shape, np.nan), None, None, None

    def boil(self):
        """Bubble point of what is left; mask of the lanes without one."""
        point = self._bubble(self.n)
        self.before, self.status = self.ln_K, point.status
        self.found = getattr(point, self.sought)
        self.ln_K, condensate = self._neck(point)
        if (self.reflux > 0.0).any():
            # The vapour that leaves is read, and it is in equilibrium with the condensate.
            neck = self.saturation(self.fluid, self.given, condensate)
            self.found = np.where(self.reflux > 0.0, getattr(neck, self.sought), self.found)
            self.status = np.where(point.ok & (self.reflux > 0.0), neck.status, self.status)
        return self.status != Status.CONVERGED

    def keep(self, mask):
        """Drop the lanes outside the mask."""
        for name in ("n", "given", "drop", "reflux", "found", "ln_K", "before"):
            value = getattr(self, name)
            setattr(self, name, None if value is None else value[mask])

    def step(self):
        """One step of size `drop`, ln K at its middle: by extrapolation, the first by a half step."""
        if self.before is None:
            point = self._bubble(self._leave(np.exp(self.ln_K), 0.5 * self.drop))
            middle = np.where(point.ok[:, None], self._neck(point)[0], self.ln_K)
        else:
            middle = 1.5 * self.ln_K - 0.5 * self.before
        self.n = self._leave(np.exp(middle), self.drop)

    def _bubble(self, n):
        return self.saturation(self.fluid, self.given, n / n.sum(axis=-1, keepdims=True))

    def _neck(self, point):
        """ln of leaving vapour over pot liquid (m, c), and the condensate (m, c) of the neck."""
        f, K = self.reflux[:, None], np.where(point.K > 0.0, point.K, 0.0)
        if not (f > 0.0).any():
            return np.log(np.maximum(K, TINY)) + self.ln_mobility, point.x
        y, ln_k = point.x * K, np.zeros(self.given.shape)
        for _ in range(60):
            passed = (1.0 - f) * np.exp(ln_k)[:, None] * K
            part = y / (f + passed + TINY)
            # Newton on the logarithm of the sum, whose slope in ln k is minus the mean of passed/(f + passed)
            slope = (part * passed / (f + passed + TINY)).sum(axis=-1) / part.sum(axis=-1)
            step = np.log(part.sum(axis=-1)) / slope
            ln_k = np.clip(ln_k + step, -500.0, 500.0)  # only a lane without a bubble point comes near
            if not np.nanmax(np.abs(step), initial=0.0) > 1e-12:
                break
        kK = np.exp(ln_k)[:, None] * K
        condensate = y / (f + (1.0 - f) * kK + TINY)
        leaving = kK * K / (f + (1.0 - f) * kK + TINY)
        total = condensate.sum(axis=-1, keepdims=True)
        good = np.isfinite(total) & (total > 0.0)
        ln_leaving = np.log(np.maximum(leaving, TINY)) + self.ln_mobility
        return ln_leaving, np.where(good, condensate / np.where(good, total, 1.0), point.x)

    def _leave(self, K, drop):
        """Amounts after `drop` has left at fixed K: n exp(-K s).

        The amount gone is concave in s, so Newton from its starting slope never overshoots.
        """
        amount = self.n * self.weight
        total = amount.sum(axis=-1)
        s = drop / (amount * K).sum(axis=-1)
        for _ in range(40):
            part = amount * np.exp(-K * s[:, None])
            move = (total - part.sum(axis=-1) - drop) / (K * part).sum(axis=-1)
            s = s - move
            if np.max(np.abs(move) / s) < 1e-13:
                break
        return self.n * np.exp(-K * s[:, None])
