"""Values by path to the `Case` the floors below work with."""

from __future__ import annotations

from screener.casefile.collect import Values
from screener.casefile.keys import order
from screener.casefile.values import Taken
from screener.states.case import (
    Ambient,
    Blanket,
    Case,
    Contents,
    InputEcho,
    Levels,
    Line,
    Month,
    Reading,
    Receipt,
    Site,
    Suction,
    Tank,
    Vent,
)


def build(values: Values, blend, heel, *, source: str, digest: str) -> Case:
    """The case; only called when there is no fault."""
    v = values.value
    return Case(
        title=v("case.title"),
        blend=blend,
        tank=_tank(values, heel),
        site=_site(values),
        line=_line(values),
        reference=v("case.reference") or "",
        prepared_by=v("case.prepared_by") or "",
        criteria=v("screening.criteria") or (),
        fuel_class=v("case.fuel_class") or "",
        hydrogen_sulfide=v("blend.h2s_in_liquid"),
        inputs=tuple(_echo(values.taken[path]) for path in sorted(values.taken, key=order)),
        source=source,
        digest=digest,
    )


def _echo(taken: Taken) -> InputEcho:
    value = taken.value
    if isinstance(value, bool):
        value = "yes" if value else "no"
    elif isinstance(value, tuple):
        value = ", ".join(value)
    number = isinstance(value, (int, float))
    note = taken.note
    if taken.extra is not None:
        note = f"saturated at {taken.extra:.2f} K"
    unit = (taken.key.unit or "-") if number else ""
    return InputEcho(taken.path, taken.entered, value, unit, taken.quality, note)


def _tank(values: Values, heel) -> Tank:
    v = values.value
    return Tank(
        kind=v("tank.kind"),
        shell_diameter=v("tank.shell_diameter"),
        shell_height=v("tank.shell_height"),
        length=v("tank.length"),
        levels=_whole(values, Levels, "tank.liquid_level", "low", "normal", "high"),
        surface=v("tank.surface"),
        insulated=v("tank.insulated"),
        design_overpressure=v("tank.design_pressure"),
        design_vacuum=v("tank.design_vacuum"),
        blanket=_whole(values, Blanket, "tank.blanket", "set_low", "set_high"),
        vents=tuple(_vent(values, row) for row in values.rows("tank.vents")),
        vapour_return=v("tank.vapour_return"),
        roof_leg_height=v("tank.roof_leg_height"),
        vapour_space_temperature=v("tank.vapour_space_temperature"),
        vapour_space_oxygen=v("tank.vapour_space_oxygen"),
        previous_contents=v("tank.previous_contents"),
        open_gauging=v("tank.open_gauging"),
        sour_service=v("tank.sour_service"),
        contents=Contents(heel, v("tank.contents.volume"), v("tank.contents.temperature")) if heel else None,
    )


def _whole(values: Values, kind, path: str, *names: str):
    """A small table all of whose keys are required, None where it is not given."""
    if path not in values.present:
        return None
    return kind(*(values.value(f"{path}.{name}") for name in names))


def _vent(values: Values, row: str) -> Vent:
    def v(name: str):
        return values.value(f"{row}.{name}")

    return Vent(
        count=v("count"),
        out_of_service=v("out_of_service"),
        set_above=v("set"),
        set_below=v("vacuum_set"),
        rated_out=v("rated_out"),
        rated_out_at=v("rated_out_at"),
        rated_in=v("rated_in"),
        rated_in_at=v("rated_in_at"),
        arrester=v("arrester"),
    )


def _site(values: Values) -> Site:
    v = values.value
    return Site(
        latitude=v("site.latitude"),
        elevation=v("site.elevation"),
        lowest_barometer=v("site.lowest_barometer"),
        ambient=_whole(values, Ambient, "site.ambient", "low", "high", "meaning"),
        months=tuple(
            Month(*(v(f"{row}.{name}") for name in ("month", "mean", "high", "low", "insolation", "wind")))
            for row in values.rows("site.months")
        ),
        month=v("site.month"),
        design_insolation=v("site.design_insolation"),
        liquid_temperature=_whole(values, Reading, "site.liquid_temperature", "value", "read_on"),
    )


def _line(values: Values) -> Line:
    v = values.value
    gas = values.taken.get("line.receipt.dissolved_gas")
    receipt = Receipt(
        rate=v("line.receipt.rate"),
        temperature=v("line.receipt.temperature"),
        dissolved_gas=gas.value if gas else None,
        saturated_at=gas.extra if gas else None,
    )
    names = (
        "line_length",
        "line_bore",
        "roughness",
        "fittings",
        "nozzle_above_tank_bottom",
        "highest_point_above_tank_bottom",
        "pump_above_tank_bottom",
        "npsh_required",
    )
    return Line(
        receipt=receipt if "line.receipt" in values.present else None,
        draw_rate=v("line.draw.rate"),
        suction=_whole(values, Suction, "line.suction", *names),
    )
