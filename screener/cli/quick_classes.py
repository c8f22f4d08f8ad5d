"""Volatility classes of `screener quick`: information about a fuel, never a limit."""

from __future__ import annotations

import math

from screener.cli.quick_answers import Answer, Liquid
from screener.cli.wording import say


def classes(liquid: Liquid):
    """Volatility classes met and the ethanol allowance: information, never a limit."""
    from screener.volatility import class_standards, ethanol_allowance

    sheet = liquid.sheet
    gasoline = math.isfinite(sheet.DVPE) and liquid.product != "crude"
    why = liquid.no_pressure or ("" if gasoline else say("quick", "no_gasoline"))
    for standard in class_standards():
        yield _class(liquid, standard, why)
    ethanol = sheet.ethanol
    yield _protection(liquid, why)
    yield _ethanol_fuel(liquid)
    why = say("quick", "no_gasoline") if liquid.product == "crude" else ""
    why = why or ("" if math.isfinite(ethanol_allowance(ethanol)[0]) else say("quick", "allowance_scope"))
    yield liquid.answer("ethanol_allowance", ethanol_allowance(ethanol)[0], "Pa", why, say("by", "eu_annex"),
                        ethanol=f"{100 * ethanol:.1f}")  # fmt: skip


def _class(liquid: Liquid, standard: str, why: str) -> Answer:
    """Classes of one standard that the figures meet, or what the nearest class misses."""
    key, label = f"classes {standard}", say("quick", "class", standard=standard)
    if why:
        return Answer(key, label, None, "", why)
    found = liquid.sheet.classes(standard)
    met = [match for match in found if match.met]
    used = met or found
    mark = say("quick", "memory") if any(match.evidence == "memory" for match in used) else ""
    by = ", ".join(text for text in (used[0].edition, mark) if text)
    if met:
        return Answer(key, label, None, "", by=by, text=", ".join(match.name for match in met))
    nearest = min(found, key=lambda match: len(match.missed))
    missed = say("quick", "no_class", name=nearest.name, missed="; ".join(nearest.missed))
    return Answer(key, label, None, "", by=f"{missed}; {by}", text=say("quick", "none"))


def _protection(liquid: Liquid, why: str) -> Answer:
    """Vapour-lock protection classes whose lowest temperature for V/L 20 the liquid reaches."""
    from screener.volatility import vapour_lock_classes

    key, label = "classes vapour lock", say("quick", "protection")
    why = why or ("" if math.isfinite(liquid.sheet.T20) else say("quick", "no_answer"))
    if why:
        return Answer(key, label, None, "", why)
    reached = [name for name, _, met, _ in vapour_lock_classes(liquid.sheet.T20) if met]
    return Answer(key, label, None, "", by=say("by", "protection"), text=", ".join(reached) or say("quick", "none"))


def _ethanol_fuel(liquid: Liquid) -> Answer:
    """Classes of ethanol fuel blends that the liquid meets."""
    from screener.volatility import ethanol_fuel_classes

    key, label = "classes ASTM D5798", say("quick", "class", standard="ASTM D5798")
    if liquid.no_pressure:
        return Answer(key, label, None, "", liquid.no_pressure)
    met = [one.name for one in ethanol_fuel_classes(liquid.sheet.DVPE, liquid.sheet.ethanol) if one.met]
    return Answer(key, label, None, "", by=say("by", "d5798"), text=", ".join(met) or say("quick", "none"))
