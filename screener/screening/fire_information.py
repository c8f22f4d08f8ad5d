"""Context about fire, judged by nobody: flash point, window, hazard classes, contamination, the vapour ladder."""

from __future__ import annotations

import math
from functools import lru_cache

import numpy as np

from screener.blends import union
from screener.equilibrium import Fluid
from screener.fire import (
    SpaceState,
    contaminated,
    hazard_class,
    hazard_systems,
    limiting_oxygen,
    vapour_density_ratio,
)
from screener.ground.constants import ZERO_CELSIUS
from screener.screening.context import Context
from screener.screening.finding import Fact, Information
from screener.screening.health import hatch_information
from screener.screening.measured import with_doubt
from screener.screening.wording import say
from screener.species import find
from screener.states.fire import INSIDE, LEAN, RICH
from screener.states.flash import FLASH_SPREAD
from screener.states.ladder import vapour_ladder
from screener.states.lanes import BEST, HEEL, LIQUIDS, RECEIPT
from screener.states.measured import flash_known, mixed, own
from screener.states.previous import classed
from screener.states.scaled import flammable_window, flash_point, headspace, vapour_space
from screener.volatility import distillation_d86

SHARES = (0.001, 0.005, 0.01, 0.02, 0.05)  # of a second liquid by volume
CONTAMINATION_SHOWN = 1.0  # change of the flash point from which a table of contamination is printed [K]
D86_STEPS = 10  # the first fifth of the curve moves by 0.2 K at most against 50 steps
INERT = ("nitrogen", "carbon dioxide")


def fire_information(context: Context) -> tuple[Information, ...]:
    """Fire figures and classes of receipt and heel, and what a little of one does to the other."""
    case = context.case
    rows = [_liquid(context, context.liquid_name(RECEIPT), case.blend, RECEIPT)]
    if case.tank.contents is not None:
        heel = case.tank.contents.blend
        rows.append(_liquid(context, "heel", heel, HEEL))
        rows.append(_contamination(context, "heel", heel, "receipt", case.blend))
        rows.append(_contamination(context, "receipt", case.blend, "heel", heel))
    return tuple(row for row in rows if row.facts) + hatch_information(context)


@lru_cache(maxsize=64)
def _boiling_points(blend) -> tuple[float, float, float, float]:
    """Initial, 10 % and 20 % recovered of a computed D86 curve, and the boiling point of a pure liquid. [K]

    A distillation is a test of its own, whose points a fit reproduces: no factor of a vapour pressure is on it.
    """
    curve = distillation_d86(blend.fluid, blend.z, steps=D86_STEPS)
    pure = find(blend.names[0]).Tb if len(blend.names) == 1 else math.nan
    points = curve.T[0, 0], curve.temperature_recovered(0.10)[0], curve.temperature_recovered(0.20)[0]
    return (*map(float, points), pure)


def _liquid(context: Context, name: str, blend, k: int) -> Information:
    fluid, z = blend.fluid, blend.z
    P = context.barometer if math.isfinite(context.barometer) else 101325.0
    factor = float(context.lanes.measured.factor[context.i, k])
    flash, limits = flash_point(fluid, z, factor), flash_point(fluid, z, factor, method="le-chatelier")
    window = flammable_window(fluid, z, factor, P=P)
    found = blend.figure("flash_point")
    facts = [
        *([Fact("flash point, measured", found.value, "K", say("note", "measured-flash"))] if found else []),
        Fact("flash point by equilibrium (Liaw)", float(flash.T[0]), "K"),
        Fact("flash point by lower limits (Le Chatelier)", float(limits.T[0]), "K"),
        Fact("vapour space flammable from", float(window.T_lower[0]), "K", say("note", "window")),
        Fact("vapour space flammable up to", float(window.T_upper[0]), "K"),
    ]
    ratio = float(context.fire.space.ratio[context.i, k])
    if math.isfinite(ratio):
        filled = flammable_window(fluid, z, factor, P=P, ratio=ratio)
        facts.append(Fact("the same at the lowest level, up to", float(filled.T_upper[0]), "K",
                          say("note", "depleted")))  # fmt: skip
    T_hot = float(context.lanes.T_hot[context.i, k, BEST])
    if math.isfinite(T_hot):
        y = headspace(fluid, T_hot, z, factor, P=P)
        facts.append(Fact("density of the undiluted vapour over that of air", float(vapour_density_ratio(fluid, y)[0]), "-"))
        facts += _oxygen_facts(fluid, y)
    facts += _class_facts(context, blend, found, float(flash.T[0]) if flash_known(blend) else math.nan)
    note = with_doubt("fire-information", blend)
    return Information(f"{name}: {say('fire', 'information')}", _known(facts), note)


def _oxygen_facts(fluid, y) -> list[Fact]:
    facts = []
    for gas in INERT:
        found = limiting_oxygen(fluid, y, inert=gas)
        facts.append(Fact(f"limiting oxygen in {gas}", float(found.oxygen[0]), "mol/mol",
                          f"{found.rule[0]}, {found.evidence[0]}"))  # fmt: skip
    return facts


def _class_facts(context: Context, blend, found, T_flash: float) -> list[Fact]:
    """Hazard classes with the boiling point each text uses, and the class for static electricity."""
    initial, at_10, at_20, pure = _boiling_points(blend)
    doubt = FLASH_SPREAD
    if found:
        T_flash, doubt = found.value, max(doubt, found.reproducibility)
    facts = [
        Fact("initial boiling point, computed D86", initial, "K"),
        Fact("10 % point, computed D86", at_10, "K"),
        Fact("20 % point, computed D86", at_20, "K"),
    ]
    for system in hazard_systems():
        found = hazard_class(system, T_flash, initial=initial, at_10=at_10, at_20=at_20, constant=pure,
                             flash_doubt=doubt)  # fmt: skip
        means = f"{found.boiling_rule.point} point" if math.isnan(pure) else say("note", "pure-boiling-point")
        note = say("note", "boiling-used", means=means, T=f"{found.boiling[0] - ZERO_CELSIUS:.1f} degC",
                   evidence=found.evidence)  # fmt: skip
        facts.append(Fact(f"{system} class", str(found.name[0]), "", note))
    facts.append(Fact("vapour class for static electricity", classed(blend)[2]))
    return facts


def _contamination(context: Context, name: str, blend, other_name: str, other) -> Information:
    """Flash point and vapour space of one liquid against the share of the other."""
    names, Z = union([blend, other])
    fluid = Fluid.of(names)
    share = np.array((0.0, *SHARES))
    z, factor = contaminated(fluid, Z[0], Z[1], share), _contaminated_factor(fluid, Z, share, blend, other)
    flash = _contaminated_flash(flash_point(fluid, z, factor).T, blend.figure("flash_point"))
    T = float(context.lanes.weather.T_surface[context.i, BEST])
    state = [""] * share.size
    if math.isfinite(T) and math.isfinite(context.barometer):
        space = vapour_space(fluid, T, z, factor, P=context.barometer)
        state = [
            say("note", "space-at", state=SpaceState(int(s)).label, T=f"{T - ZERO_CELSIUS:.1f} degC")
            for s in space.state
        ]
    if np.nanmax(np.abs(flash - flash[0]), initial=0.0) < CONTAMINATION_SHOWN and len(set(state)) == 1:
        return Information(say("fire", "contamination", name=name, other=other_name), ())
    facts = [
        Fact(say("fire", "contaminated", other=other_name, share=f"{100.0 * s:g}"), float(T_f), "K", note)
        for s, T_f, note in zip(share, flash, state)
    ]
    title = say("fire", "contamination", name=name, other=other_name)
    return Information(title, _known(facts), with_doubt("contamination", blend, other))


def _contaminated_factor(fluid, Z, share, blend, other) -> np.ndarray:
    """Factor (n,) of what was measured of both liquids, at the shares of the second by volume."""
    v = [np.where(fluid.v_15 > 0.0, fluid.v_15, 0.0) @ z for z in Z]
    one, two = own([blend] * share.size), own([other] * share.size)
    both = (np.broadcast_to(z, (share.size, z.size)) for z in Z)
    return mixed(fluid, next(both), (1.0 - share) / v[0], next(both), share / v[1], one, two)[0]


def _contaminated_flash(T, found) -> np.ndarray:
    """Flash points (n,) against the share, none first: as measured there, and on as computed or lower by what the
    measured one is lower."""
    if found is None:
        return T
    return np.concatenate([[found.value], T[1:] + min(found.value - T[0], 0.0)])


def _known(facts) -> tuple[Fact, ...]:
    return tuple(f for f in facts if not isinstance(f.value, float) or math.isfinite(f.value))


def ladder(context: Context, findings) -> dict:
    """The vapour space month by month as plain data, for the liquid that is worst now; {} without months
    or where the sheet of that liquid holds no vapour pressure."""
    finding = next((f for f in findings if f.id == "vapour-space.flammable"), None)
    k = RECEIPT
    if finding is None or finding.verdict == "skipped":
        return {}
    if finding.condition.liquid:
        wanted = finding.condition
        k = next(
            (k for k in context.liquids() if context.liquid_name(k) == wanted.liquid
             and LIQUIDS[k][1] in ("", wanted.level)), RECEIPT,
        )  # fmt: skip
    if context.unmeasured(k):
        return {}
    rows = vapour_ladder(context.lanes, context.i, k)
    if not rows:
        return {}
    level = LIQUIDS[k][1]
    liquid = context.liquid_name(k) + (f" at {level} level" if level else "")
    months = [
        {name: row[name] for name in ("month", "number", "T_cold", "T_hot", "share_cold", "share_hot", "LFL", "UFL")}
        | {"equilibrium": _month_word(row), "not_saturated": say("ladder", "passes" if row["reaches"] else "lean")}
        for row in rows
    ]
    return {"liquid": liquid, "months": months}


def _month_word(row) -> str:
    """What the space is in equilibrium, over the month."""
    ends = row["lowest"], row["highest"]
    if ends == (LEAN, RICH):
        return say("ladder", "all")
    words = {LEAN: "lean", INSIDE: "inside", RICH: "rich"}
    states = [say("state", words[side]) for side in dict.fromkeys(ends)]
    return say("ladder", "two", one=states[0], two=states[1]) if len(states) == 2 else states[0]
