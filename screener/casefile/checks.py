"""Values that contradict each other. What is only unwise is left to the findings.

A check speaks only when all the values it compares could be read, so one slip
gives one fault. The allowed range in a fault is the one the other values leave.
"""

from __future__ import annotations

import math
from itertools import pairwise

from screener.casefile.collect import Values
from screener.casefile.units import show
from screener.casefile.values import MONTHS
from screener.ground.errors import InputError

# Low-pressure tanks end at 15 psi gauge, 103.4 kPa; a higher setting on one is a slip of the unit.
# From memory, unverified; used only to catch slips.
LOW_PRESSURE_END = 103_421.0
# A barometer this far above the standard one of the elevation was reduced to sea level or misread;
# the highest on record stand about 7 kPa above standard. From memory, unverified; catches slips only.
BAROMETER_EXCESS = 4_000.0
UPRIGHT = ("fixed-roof", "internal-floating-roof", "external-floating-roof", "domed-floating-roof")
FLOATING = UPRIGHT[1:]


def check(values: Values) -> None:
    """All checks; faults are added to the values."""
    for one in (
        _levels,
        _legs,
        _pressures,
        _blanket,
        _vents,
        _contents,
        _ambient,
        _months,
        _barometer,
        _suction,
        _basis_of_shares,
        _sour_once,
    ):
        one(values)
    _not_used(values)


def _rising(values: Values, kind: str, *paths: str, equal: bool = True) -> bool:
    """Whether the values at the paths rise; a fault at the first that does not."""
    given = [path for path in paths if values.value(path) is not None]
    for lower, upper in pairwise(given):
        low, high = values.value(lower), values.value(upper)
        if high < low or (high == low and not equal):
            name, text = lower.rpartition(".")[2].replace("_", " "), values.entered(lower)
            least, wrong = ("at least", "below") if equal else ("above", "not above")
            problem = f"'{values.entered(upper)}' is {wrong} the {name} of '{text}'"
            values.complain(
                InputError(upper, values.entered(upper), problem, f"allowed: {least} {show(low, kind)}")
            )
            return False
    return True


def _levels(values: Values) -> None:
    names = [f"tank.liquid_level.{name}" for name in ("low", "normal", "high")]
    if not _rising(values, "length", *names) or values.value(names[2]) is None:
        return
    top, what = _top(values)
    high = values.value(names[2])
    if top is not None and high > top:
        problem = f"'{values.entered(names[2])}' is above the {what} of {show(top, 'length')}"
        hint = f"allowed: 0 m to {show(top, 'length')}"
        values.complain(InputError(names[2], values.entered(names[2]), problem, hint))


def _top(values: Values) -> tuple[float | None, str]:
    """Height the liquid cannot exceed, and what gives it."""
    if values.value("tank.kind") in UPRIGHT:
        return values.value("tank.shell_height"), "shell height"
    return values.value("tank.shell_diameter"), "shell diameter"


def _legs(values: Values) -> None:
    if values.value("tank.kind") in FLOATING:
        legs, shell = values.value("tank.roof_leg_height"), values.value("tank.shell_height")
        if legs is not None and shell is not None and legs >= shell:
            problem = f"'{values.entered('tank.roof_leg_height')}' is not below the shell height"
            hint = f"allowed: below {show(shell, 'length')}"
            values.complain(
                InputError("tank.roof_leg_height", values.entered("tank.roof_leg_height"), problem, hint)
            )


def _pressures(values: Values) -> None:
    kind = values.value("tank.kind")
    if kind is None or kind == "pressure-vessel":
        return
    paths = ["tank.design_pressure", *(f"{row}.set" for row in values.rows("tank.vents"))]
    for path in paths:
        found = values.value(path)
        if found is not None and found > LOW_PRESSURE_END:
            problem = f"'{values.entered(path)}' is no pressure of a tank of the kind {kind}"
            most = show(LOW_PRESSURE_END, "pressure difference")
            hint = f'allowed: 0 kPa to {most}, or kind = "pressure-vessel"'
            values.complain(InputError(path, values.entered(path), problem, hint))


def _blanket(values: Values) -> None:
    _rising(values, "pressure difference", "tank.blanket.set_low", "tank.blanket.set_high", equal=False)


def _vents(values: Values) -> None:
    for row in values.rows("tank.vents"):
        count, idle = values.value(f"{row}.count"), values.value(f"{row}.out_of_service")
        if count is not None and idle is not None and idle > count:
            problem = f"{idle} of {count} vents cannot be out of service"
            values.complain(InputError(f"{row}.out_of_service", idle, problem, f"allowed: 0 to {count}"))
        _rising(values, "pressure difference", f"{row}.set", f"{row}.rated_out_at")
        _rising(values, "pressure difference", f"{row}.vacuum_set", f"{row}.rated_in_at")


def _contents(values: Values) -> None:
    """The liquid in the tank fits into the shell."""
    volume, diameter = values.value("tank.contents.volume"), values.value("tank.shell_diameter")
    length = values.value("tank.shell_height" if values.value("tank.kind") in UPRIGHT else "tank.length")
    if (
        None in (volume, diameter, length, values.value("tank.kind"))
        or values.value("tank.kind") == "pressure-vessel"
    ):
        return
    shell = math.pi / 4.0 * diameter**2 * length
    if volume > shell:
        problem = (
            f"'{values.entered('tank.contents.volume')}' does not fit into a shell of {show(shell, 'volume')}"
        )
        hint = f"allowed: above 0 m3, up to {show(shell, 'volume')}"
        values.complain(
            InputError("tank.contents.volume", values.entered("tank.contents.volume"), problem, hint)
        )


def _ambient(values: Values) -> None:
    _rising(values, "temperature", "site.ambient.low", "site.ambient.high", equal=False)


def _months(values: Values) -> None:
    """None or all twelve, each once, with low, mean and high in this order."""
    rows = values.rows("site.months")
    if rows and len(rows) != 12:
        problem = f"{len(rows)} of the twelve months given"
        values.complain(
            InputError("site.months", len(rows), problem, "allowed: none or all twelve, Jan to Dec")
        )
    seen: dict[str, str] = {}
    for row in rows:
        name = values.value(f"{row}.month")
        if name in seen:
            left = (
                ", ".join(m for m in MONTHS if m not in {values.value(f"{r}.month") for r in rows}) or "none"
            )
            problem = f"{name} is given twice, here and in {seen[name]}"
            values.complain(InputError(f"{row}.month", name, problem, f"months still missing: {left}"))
        elif name is not None:
            seen[name] = row
        _rising(values, "temperature", f"{row}.low", f"{row}.mean", f"{row}.high")


def _barometer(values: Values) -> None:
    """The lowest barometer belongs to the elevation and was not reduced to sea level."""
    barometer, elevation = values.value("site.lowest_barometer"), values.value("site.elevation")
    if barometer is None or elevation is None:
        return
    from screener.site import standard_pressure

    most = float(standard_pressure(elevation)) + BAROMETER_EXCESS
    if barometer > most:
        path = "site.lowest_barometer"
        problem = (
            f"'{values.entered(path)}' cannot be the lowest barometer at {show(elevation, 'length')}; "
            "was it reduced to sea level?"
        )
        hint = f"allowed: 45 kPa to {show(most, 'absolute pressure')}"
        values.complain(InputError(path, values.entered(path), problem, hint))


def _suction(values: Values) -> None:
    nozzle, top = "line.suction.nozzle_above_tank_bottom", "line.suction.highest_point_above_tank_bottom"
    _rising(values, "length", nozzle, top)


def _basis_of_shares(values: Values) -> None:
    """Hydrogen sulfide is counted by mass, oxygen of a gas by volume; a text that says less is no number."""
    for path, wanted, text in (
        ("blend.h2s_in_liquid", ("mass",), "20 ppm mass"),
        ("tank.vapour_space_oxygen", ("", "volume", "mole"), "4 mol%"),
    ):
        taken = values.taken.get(path)
        if taken is not None and taken.mark not in wanted:
            problem = f"'{taken.entered}' does not say that it counts {'mass' if 'mass' in wanted else 'volume'}"
            values.complain(InputError(path, taken.entered, problem, f'write it as "{text}"'))


def _sour_once(values: Values) -> None:
    """Hydrogen sulfide of the receipt stands on its sheet or beside its parts, not in both places."""
    path, other = "blend.h2s_in_liquid", "blend.lab.h2s"
    if values.value(path) is not None and values.value(other) is not None:
        problem = f"hydrogen sulfide is given twice, here and in {other}"
        values.complain(InputError(path, values.entered(path), problem, "give it in one of the two places"))


def _not_used(values: Values) -> None:
    """Inputs that this kind of tank has no use for are marked, not passed over in silence."""
    kind = values.value("tank.kind")
    if kind is None:
        return
    spare = []
    if kind not in FLOATING:
        spare.append("tank.roof_leg_height")
    spare.append(
        "tank.length" if kind in UPRIGHT else "tank.shell_height" if kind != "pressure-vessel" else ""
    )
    for path in spare:
        values.annotate(path, f"not used for a tank of the kind {kind}")
