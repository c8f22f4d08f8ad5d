"""Every answer of `screener quick`, in the groups in which they are printed.

Nothing is computed here: each answer is one figure of one method of the floors below, with what it is
by, or the reason why there is none.
"""

from __future__ import annotations

import math
from dataclasses import dataclass
from functools import cached_property

import numpy as np

from screener.cli.wording import say
from screener.ground.constants import ATMOSPHERE, T_100F
from screener.ground.status import Status, words
from screener.memo import numbers

LARGEST = 8  # species shown of the first vapour
LOW_RATIO = 0.1  # [-] between 0.02 and 4 of ASTM D6377; above what the sample swells from 20 to 37.8 degC
DVPE_RULES = {"DVPE_EN": "EN 13016-1", "DVPE_EPA": "EPA", "DVPE_CARB": "CARB"}
POINTS = (("T10", 0.1), ("T50", 0.5), ("T90", 0.9))
EVAPORATED = (("E70", 343.15), ("E100", 373.15), ("E150", 423.15))  # [K]


@dataclass(frozen=True)
class Answer:
    """One figure with what it is by; value [unit] is None with the reason in `why`, text holds what is no number."""

    key: str
    label: str
    value: float | None
    unit: str
    why: str = ""
    by: str = ""
    text: str = ""


@dataclass(frozen=True)
class Group:
    """Answers under one heading."""

    key: str
    title: str
    answers: tuple[Answer, ...]


class Liquid:
    """A blend at a temperature [K], with what its answers share."""

    def __init__(self, blend, T: float, system: str):
        from screener.blends import volatility_sheet
        from screener.blends.measured import measured_sheet, pressure_factor, told
        from screener.equilibrium import bubble_pressure

        self.blend, self.T, self.system = blend, T, system
        self.fluid, self.z, self.product = blend.fluid, blend.z, blend.product or None
        self.bubble = bubble_pressure(blend.fluid, T, blend.z, check="full")
        self.computed, self.sheet = volatility_sheet(blend), measured_sheet(blend)
        self.factor, self.told = pressure_factor(blend.measured)[0], told(blend.measured)
        # The standard tests take one liquid; where it splits, none of them has an answer.
        splits = self.bubble.status[0] == Status.LIQUID_SPLITS
        self.split = words(Status.LIQUID_SPLITS) if splits else ""
        unmeasured = "" if blend.vapour_pressure_known else say("quick", "unmeasured")
        self.no_pressure = self.split or unmeasured

    @property
    def barometer(self) -> str:
        """One standard atmosphere in words."""
        return numbers.quantity(ATMOSPHERE, "Pa", self.system).text

    def at(self, T: float) -> str:
        """A temperature [K] in words."""
        return numbers.quantity(T, "K", self.system).text

    def answer(self, key: str, value, unit: str, why: str = "", by: str = "", name: str = "", **fields: str):
        """An answer under `key`, or the reason why there is none; name finds its words where they differ."""
        label = say("quick", name or key, pressure=self.barometer, **fields)
        if why or not math.isfinite(value):
            return Answer(key, label, None, unit, why or say("quick", "no_answer"), by)
        return Answer(key, label, float(value), unit, by=by)

    def no_dvpe(self, value: float) -> str:
        """Why there is no DVPE; '' where there is one or only the solver knows."""
        from screener.volatility import dvpe

        if math.isfinite(value):
            return ""
        test = dvpe(self.fluid, self.z, product=self.product)
        if test.status[0] != Status.OUT_OF_RANGE:
            return words(test.status[0])
        return say("quick", "dvpe_scope" if math.isfinite(test.P_total[0]) else "dvpe_boils")

    def by_own_vapour(self, key: str) -> str:
        """What a vapour-pressure test is by, with the factor of the measured one where there is one."""
        method = say("by", key)
        if self.factor == 1.0:
            return method
        return say("by", "own_vapour", method=method, factor=f"{self.factor:.3f}")

    @cached_property
    def still(self):
        """The distillation as an ASTM D86 flask reads it; worked out when first asked for."""
        from screener.volatility import distillation_d86

        return distillation_d86(self.fluid, self.z)

    @cached_property
    def alcohol(self) -> str:
        """Why a method that knows no alcohol says nothing; '' without one."""
        from screener.species import find

        share = sum(v for name, v in self.blend.oxygenates.items() if find(name).family == "alcohol")
        return say("quick", "alcohol") if share > 1e-3 else ""


def groups(liquid: Liquid) -> tuple[Group, ...]:
    """All answers, those asked for most often first."""
    from screener.cli.quick_classes import classes

    made = (main, vapour_pressures, volatility, distillations, from_reid, classes)
    return tuple(Group(one.__name__, say("groups", one.__name__), tuple(one(liquid))) for one in made)


def first_vapour(liquid: Liquid) -> list[tuple[str, float, float]]:
    """The first vapour as (species, y, x), largest first."""
    bubble, blend = liquid.bubble, liquid.blend
    if not bubble.ok[0]:
        return []
    order = np.argsort(-bubble.y[0], kind="stable")[:LARGEST]
    return [(blend.names[i], float(bubble.y[0, i]), float(blend.z[i])) for i in order]


def _why(result) -> str:
    return "" if result.ok[0] else words(result.status[0])


def _by(liquid: Liquid, key: str, method: str) -> str:
    """How a figure came about: measured, scaled by a measured one, or computed."""
    if key != "tvp" and liquid.blend.figure(key) is not None:
        return say("by", "measured")
    if key in ("tvp", "dvpe") and liquid.told is not None and liquid.factor != 1.0:
        return say("by", "scaled", factor=f"{liquid.factor:.3f}", what=liquid.told.what)
    return say("by", method)


def main(liquid: Liquid):
    """What is asked most often."""
    from screener.equilibrium import first_vapour, flash_tp
    from screener.fire import flash_point

    blend, sheet = liquid.blend, liquid.sheet
    flash = flash_tp(liquid.fluid, liquid.T, ATMOSPHERE / liquid.factor, liquid.z, check="full")
    measured = blend.figure("flash_point")
    P, why, by = liquid.bubble.P[0], _why(liquid.bubble) or liquid.no_pressure, _by(liquid, "tvp", "bubble")
    if liquid.split and blend.vapour_pressure_known:
        both = first_vapour(liquid.fluid, liquid.T, liquid.z)
        P, by = both.P[0], say("by", "settled")
        why = "" if both.ok[0] and both.liquids[0] == 2 else liquid.split
    yield liquid.answer("bubble_pressure", liquid.factor * P, "Pa", why, by, temperature=liquid.at(liquid.T))
    yield liquid.answer("DVPE", sheet.DVPE, "Pa", liquid.no_pressure or liquid.no_dvpe(sheet.DVPE),
                        _by(liquid, "dvpe", "d5191"), temperature=liquid.at(T_100F))  # fmt: skip
    yield liquid.answer("density_15_degC", sheet.density_15, "kg/m3", by=_by(liquid, "density_15", "volumes"))
    yield liquid.answer("vapour_fraction", flash.beta[0], "mol/mol", _why(flash) or liquid.no_pressure, say("by", "flash"),
                        temperature=liquid.at(liquid.T))  # fmt: skip
    if measured is not None:
        yield liquid.answer("flash_point", measured.value, "K", by=say("by", "measured"))
    else:
        found = flash_point(liquid.fluid, liquid.z)
        yield liquid.answer("flash_point", found.T[0], "K", _why(found) or liquid.no_pressure, say("by", "liaw"))


def vapour_pressures(liquid: Liquid):
    """The laboratory tests of vapour pressure, as computed; a measured one multiplies the fuel's own vapour in each."""
    from screener.volatility import (
        dvpe,
        dvpe_equation,
        reid_equivalent_crude,
        reid_vapour_pressure,
        vapour_pressure_crude,
        vapour_pressure_d6378,
    )

    fluid, z, product, why, computed = liquid.fluid, liquid.z, liquid.product, liquid.no_pressure, liquid.computed
    at, more = liquid.at(T_100F), liquid.factor - 1.0
    crude = vapour_pressure_crude(fluid, z, ratio=np.array([4.0, LOW_RATIO]))
    yield liquid.answer("TVP_100F", liquid.sheet.TVP, "Pa", why, _by(liquid, "tvp", "bubble"), temperature=at)
    for key, i in (("VPCR4", 0), ("VPCR_low", 1)):
        by = liquid.by_own_vapour("d6377" if crude.in_scope[i] else "d6377_outside")
        yield liquid.answer(key, liquid.factor * crude.P[i], "Pa", why, by, temperature=at, ratio=f"{LOW_RATIO:g}")
    no_cell = "" if math.isfinite(computed.X) else liquid.no_dvpe(computed.X)
    X = computed.X + (more and more * float(dvpe(fluid, z, product=product).P_vapour[0]))
    yield liquid.answer("total_pressure", X, "Pa", why or no_cell, liquid.by_own_vapour("mini"))
    for key, name in DVPE_RULES.items():
        rule = dvpe_equation(name)
        # all of them take the cell of ASTM D5191, and its scope
        yield liquid.answer(key, float(rule.dvpe(X)), "Pa", why or liquid.no_dvpe(computed.DVPE), _line(rule))
    for chamber in ("dry", "wet"):
        test = reid_vapour_pressure(fluid, z, chamber=chamber, product=product)
        wet = liquid.alcohol and say("quick", "wet_alcohol") if chamber == "wet" else ""
        yield liquid.answer(f"Reid_{chamber}", test.P[0] + more * test.P_vapour[0], "Pa over barometer",
                            why or wet or _why(test), liquid.by_own_vapour(f"reid_{chamber}"))  # fmt: skip
    triple = vapour_pressure_d6378(fluid, z, product=product)
    yield liquid.answer("D6378", triple.P[0] + more * triple.P_vapour[0], "Pa", why or _why(triple),
                        liquid.by_own_vapour("d6378"))  # fmt: skip
    is_crude = "" if liquid.product == "crude" else say("quick", "not_crude")
    yield liquid.answer("RVPE", float(reid_equivalent_crude(liquid.factor * crude.P[0])[0]), "Pa", why or is_crude,
                        say("by", "rvpe"))  # fmt: skip


def _line(rule) -> str:
    """A straight line of the total pressure X, marked where its coefficients are remembered."""
    text = f"{rule.slope:g} X - {rule.offset / 1e3:g} kPa"
    return f"{text}, {say('quick', 'memory')}" if rule.evidence == "memory" else text


def volatility(liquid: Liquid):
    """Vapour-liquid ratio and the indices made of other figures."""
    sheet, why = liquid.sheet, liquid.no_pressure
    line = liquid.alcohol or ("" if math.isfinite(sheet.T20_line) else say("quick", "line_scope"))
    yield liquid.answer("T_ratio_20", sheet.T20, "K", why, say("by", "d5188"))
    yield liquid.answer("T_ratio_20_line", sheet.T20_line, "K", why or line, say("by", "d4814_line"))
    yield liquid.answer("vapour_lock_index", sheet.vapour_lock_index, "", why, say("by", "vli"))
    yield liquid.answer("driveability_index", sheet.driveability_index, "", liquid.split, say("by", "di"))


def distillations(liquid: Liquid):
    """The distillation as an ASTM D86 flask reads it, and of the open still without reflux and loss."""
    from screener.volatility.distillation import D86_LOSS, D86_REFLUX

    curve, why = liquid.still, liquid.split or _why(liquid.still)
    flask = say("by", "d86", reflux=f"{100 * D86_REFLUX:g}", loss=f"{100 * D86_LOSS:g}")
    points = [("IBP", "ibp", 0.0, curve.T[:, 0])]
    points += [(name, "distillation", at, curve.temperature(at)) for name, at in POINTS]
    points += [("FBP", "fbp", 0.0, curve.T[:, -1])]
    shares = [(name, name.lower(), 0.0, curve.evaporated(T)) for name, T in EVAPORATED]
    for name, key, at, value in (*points, *shares):
        own = liquid.blend.figure(key, at)
        by, shown = (flask, value[0]) if own is None else (say("by", "measured"), own.value)
        unit = "vol/vol" if name.startswith("E") else "K"
        yield liquid.answer(f"D86_{name}", shown, unit, "" if own is not None else why, by)
    for name in ("T10", "T50", "T90", "E70", "E100", "E150"):
        unit = "vol/vol" if name.startswith("E") else "K"
        yield liquid.answer(name, getattr(liquid.computed, name), unit, why, say("by", "still"))


def from_reid(liquid: Liquid):
    """True from Reid vapour pressure by the two published correlations: a cross-check."""
    from screener.volatility import reid_vapour_pressure, true_from_reid_crude, true_from_reid_refined

    curve, is_crude = liquid.still, liquid.product == "crude"
    test = reid_vapour_pressure(liquid.fluid, liquid.z, product=liquid.product)
    reid = test.P[0] + (liquid.factor - 1.0) * test.P_vapour[0]
    slope = (curve.temperature(0.15) - curve.temperature(0.05))[0] / 0.10
    for i, T in enumerate(dict.fromkeys((liquid.T, T_100F))):
        both = {"refined": true_from_reid_refined(T, reid, slope=slope), "crude": true_from_reid_crude(T, reid)}
        for stock, found in both.items():
            other = say("quick", "not_crude" if stock == "crude" else "not_refined")
            why = liquid.no_pressure or liquid.alcohol or other * ((stock == "crude") != is_crude)
            why = why or ("" if math.isfinite(found[0]) else say("quick", "reid_scope"))
            name = f"true_from_reid_{stock}"
            key = f"{name}_100F" if i else name
            yield liquid.answer(key, found[0], "Pa", why, say("by", "ap42"), name, temperature=liquid.at(T))
