"""What moves the findings about fire, and the liquid temperature below which they have room."""

from __future__ import annotations

import numpy as np

from screener.ground.constants import ZERO_CELSIUS
from screener.screening.context import Context
from screener.screening.finding import Finding, Headroom
from screener.screening.wording import say
from screener.states.lanes import BEST, method_spread
from screener.states.scaled import flash_point, vapour_space

_STEPS = 41  # temperatures tried between the coldest of the site and the hottest liquid
MORE = 0.01  # of the lightest species, by moles


def fire_headroom(context: Context, finding: Finding, k: int):
    """Sensitivities, largest first, and changes that give room, for liquid k of a finding about fire."""
    if finding.id == "fire.flash-point":
        return _flash(context, finding, k)
    if finding.id == "vapour-space.flammable":
        return _space(context, finding, k)
    return (), ()


def _richer(context: Context, k: int):
    """The liquid with a hundredth more of its lightest species, and the name of that."""
    z, y = context.lanes.z[context.i, k], context.fire.space.y[context.i, k, -1]
    total = y.sum()
    if not np.isfinite(total) or total <= 0.0:
        return None, ""
    light = int(np.argmax(np.where(z > 0.0, y / total - z, -np.inf)))
    more = z.copy()
    more[light] += MORE
    return more / more.sum(), context.lanes.names[light]


def _room(context: Context, T: float, knob: str) -> tuple[Headroom, ...]:
    """A colder liquid as a way to room; colder than the site ever gets is no advice."""
    if not np.isfinite(T) or T < context.input("ambient_low"):
        return ()
    return (Headroom(knob, T, "K", say("headroom", knob, value=f"{T - ZERO_CELSIUS:.1f} degC")),)


def _flash(context: Context, finding: Finding, k: int):
    more, name = _richer(context, k)
    moved = ()
    if more is not None:
        here = context.lanes.z[context.i, k]
        # Both computed: a measured flash point moves by the difference of two computed ones.
        T = flash_point(context.lanes.fluid, np.stack([here, more]), context.lanes.measured.factor[context.i, k]).T
        if np.isfinite(T).all():
            change = f"{T[1] - T[0]:+.1f} K"
            moved = (say("moved", "flash-share", species=name, change=change),)
    T = finding.limit_high - finding.asked_gap - (finding.high - finding.value)
    return moved, _room(context, T, "surface-temperature")


def _space(context: Context, finding: Finding, k: int):
    """Sensitivities at the worst temperature; room on the lean side only, found on a ladder of temperatures."""
    lanes, i, s = context.lanes, context.i, context.fire.space
    fluid, z, P, factor = lanes.fluid, lanes.z[i, k], context.barometer, lanes.measured.factor[i, k]
    T, ratio = float(s.T[i, k]), float(s.ratio[i, k]) if s.depleted[i, k] else 0.0
    more, name = _richer(context, k)
    both = vapour_space(fluid, [T + 1.0, T], np.stack([z, z if more is None else more]), factor, P=P, ratio=ratio)
    steps = [("temperature", both.fuel[0] - finding.value, {}), ("share", both.fuel[1] - finding.value, {"species": name})]
    steps = sorted((s for s in steps if np.isfinite(s[1]) and s[1]), key=lambda s: -abs(s[1]))
    moved = tuple(say("moved", key, change=f"{100.0 * size:+.2g} mol%", **more) for key, size, more in steps)
    low, hot = context.input("ambient_low"), lanes.T_hot[i, k]
    if not low < hot[BEST]:
        return moved, ()
    tried = np.linspace(low, hot[BEST], _STEPS)
    space = vapour_space(fluid, tried + (hot[2] - hot[BEST]), z, factor, P=P)
    vapour = space.y / space.y.sum(axis=1, keepdims=True)
    used = space.lower_ratio_high * (1.0 + method_spread(lanes, vapour, i, k))
    wanted = 1.0 - finding.asked_gap / finding.limit_low
    good = np.isfinite(used) & (used <= wanted)
    if not good[0] or good.all():
        return moved, ()
    j = int(np.argmin(good))
    part = np.log(wanted / used[j - 1]) / np.log(used[j] / used[j - 1])
    return moved, _room(context, float(tried[j - 1] + part * (tried[j] - tried[j - 1])), "liquid-temperature")
