"""`screener species`, `blendstocks` and `criteria`: what is in the tables, with sources."""

from __future__ import annotations

from dataclasses import asdict

from screener import __version__
from screener.cli import streams
from screener.cli.layout import blocks, bullets, paragraph, table
from screener.cli.result import as_text, without_nan
from screener.cli.wording import columns, say
from screener.memo import numbers

_WIDE = 130  # columns from which seven columns of prose are easier to read than blocks


def species(arguments) -> int:
    """All species in one table, or everything known about one."""
    from screener.species import find, names

    chosen = [find(arguments.name)] if arguments.name else [find(name) for name in names()]
    if arguments.json:
        return _json("species", [asdict(item) for item in chosen])
    width, system = _width(arguments), arguments.units
    if arguments.name:
        lines = _pairs(_species_pairs(chosen[0], system), width)
    else:
        rows = [_species_row(item, system) for item in chosen]
        lines = table(
            columns("tables", "species_columns"),
            rows,
            width,
            ("left", "left", "left", "right", "right", "right"),
        )
    lines += ["", say("tables", "sources"), *bullets(_species_sources(chosen), width)]
    streams.result("\n".join(lines))
    return 0


def _species_row(item, system: str):
    spread = say("tables", "one_curve") if item.psat_spread is None else f"{100 * item.psat_spread:.2f} %"
    return (
        item.name,
        item.formula,
        item.cas,
        numbers.quantity(item.MW, "kg/mol", system).text,
        numbers.quantity(item.Tb, "K", system).text,
        spread,
    )


def _species_pairs(item, system: str):
    """Label and text of everything a record holds that a person can use."""
    curve = item.curve
    inside = numbers.span(curve.T_low, curve.T_high, "K", system).text
    yield from (
        ("name", item.name),
        ("also", ", ".join(item.synonyms)),
        ("CAS number", item.cas),
        ("formula", item.formula),
        ("family", item.family),
    )
    for label, value, unit in (
        ("molar mass", item.MW, "kg/mol"),
        ("critical temperature", item.Tc, "K"),
        ("critical pressure", item.Pc, "Pa"),
        ("acentric factor", item.omega, "-"),
        ("normal boiling point", item.Tb, "K"),
        ("liquid density at 15 degC", item.rho_15, "kg/m3"),
    ):
        yield label, numbers.quantity(value, unit, system).text
    yield "note on density", item.rho_note
    yield (
        "vapour-pressure curve",
        f"{curve.source}; fitted {inside}, largest miss {100 * curve.fit_error:.2f} %",
    )
    yield "note on vapour pressure", item.psat_note
    bar = f"{100 * item.psat_error:.2f} % within {numbers.span(250.0, 350.0, 'K', system)}"
    yield "error bar of vapour pressure", bar if item.psat_error > 0.0 else say("tables", "one_curve")
    yield "groups", ", ".join(f"{count} x {number}" for number, count in item.groups.items())
    yield from _hazards(item, system)


def _hazards(item, system: str):
    if item.flash_point is not None:
        flash = numbers.quantity(item.flash_point, "K", system).text
        yield "flash point", f"{flash} ({item.flash_point_source})"
    for label, value, source in (
        ("lower flammable limit", item.LFL, item.LFL_source),
        ("upper flammable limit", item.UFL, item.UFL_source),
    ):
        if value is not None:
            yield label, f"{100 * value:.2f} % by volume in air ({source})"
    for limit in item.exposure:
        text = f"{1e6 * limit.value:g} ppm {limit.kind}, {limit.agency} {limit.date} ({limit.evidence})"
        yield "exposure limit", text


def blendstocks(arguments) -> int:
    """All stocks in one table, or everything known about one."""
    from screener.blends import Blend, stock, stock_names, volatility_sheets

    names = [arguments.name] if arguments.name else stock_names()
    streams.progress(say("progress", "stocks", n=len(names)))
    chosen = [stock(name) for name in names]
    sheets = volatility_sheets([Blend.of({f"stock:{item.name}": 1.0}) for item in chosen])
    streams.progress("")
    if arguments.json:
        return _json(
            "blendstocks", [{**asdict(item), "computed": asdict(s)} for item, s in zip(chosen, sheets)]
        )
    width, system = _width(arguments), arguments.units
    if arguments.name:
        lines = _pairs(_stock_pairs(chosen[0], sheets[0], system), width)
        rows = [
            (r.entry, r.cas, f"{r.percent:.3g} %", ", ".join(r.species), r.stand_in) for r in chosen[0].rows
        ]
        lines += [
            "",
            *table(
                columns("tables", "stock_row_columns"), rows, width, ("left", "left", "right", "left", "left")
            ),
        ]
    else:
        rows = [_stock_row(item, sheet, system) for item, sheet in zip(chosen, sheets)]
        lines = table(
            columns("tables", "stock_columns"), rows, width, ("left", "left", "left", *("right",) * 5)
        )
        notes = [f"{item.name}: {item.source}" for item in chosen]
        lines += ["", say("tables", "sources"), *bullets(notes, width)]
    streams.result("\n".join([*lines, "", *paragraph(say("tables", "computed"), width)]))
    return 0


def _stock_row(item, sheet, system: str):
    return (
        item.name,
        item.obtained,
        item.claims,
        *(text for _, text in _figures(sheet, system)),
    )


def _figures(sheet, system: str):
    """Label and text of the computed figures a stock is known by."""
    for label, value, unit in (
        ("density at 15 degC", sheet.density_15, "kg/m3"),
        ("DVPE", sheet.DVPE, "Pa"),
        ("T50", sheet.T50, "K"),
    ):
        yield label, numbers.quantity(value, unit, system).text
    for label, value in (("E70", sheet.E70), ("E100", sheet.E100)):
        yield label, numbers.percent(value).text


def _stock_pairs(item, sheet, system: str):
    yield from (
        ("name", item.name),
        ("title", item.title),
        ("also", ", ".join(item.also)),
        ("obtained", item.obtained),
        ("meant to be", item.claims),
        ("source", item.source),
        ("unidentified share", item.unidentified),
        ("mass the analysis could not name", f"{100 * item.unnamed:.2f} %"),
        ("rows with a stand-in species", str(len(item.stand_ins))),
        ("note", item.note),
    )
    yield from ((f"{label}, computed", text) for label, text in _figures(sheet, system))
    yield from ((f"{label}, computed", text) for label, text in _further_figures(item, sheet, system))
    yield from _published_pairs(item, system)


def _further_figures(item, sheet, system: str):
    """Label and text of computed figures that the table of all stocks has no room for."""
    from screener.blends import Blend
    from screener.fire import flash_point

    blend = Blend.of({f"stock:{item.name}": 1.0})
    flash = float(flash_point(blend.fluid, blend.z).T[0])
    for label, value, unit in (
        ("true vapour pressure at 37.8 degC", sheet.TVP, "Pa"),
        ("T10", sheet.T10, "K"),
        ("T90", sheet.T90, "K"),
        ("flash point", flash, "K"),
    ):
        yield label, numbers.quantity(value, unit, system).text


def _published_pairs(item, system: str):
    """Label and text of every published number with the computed one beside it."""
    from screener.blends import published_beside_computed
    from screener.blends.stocks import PUBLISHED_NUMBERS

    for one in published_beside_computed(item):
        unit = PUBLISHED_NUMBERS[one.published.number]
        value, computed = (
            numbers.quantity(v, unit, system).text for v in (one.published.value, one.computed)
        )
        text = f"{value}; computed {computed}, {one.in_R:+.1f} R ({one.published.source})"
        yield f"{one.name}, published", text


def criteria(arguments) -> int:
    """What is judged, against which limit, with evidence and source."""
    from screener.screening.criteria import criteria as rows

    chosen = list(rows().values())
    if arguments.json:
        return _json("criteria", [asdict(item) for item in chosen])
    width = _width(arguments)
    cells = [
        (c.id, c.title, c.kind, c.limit, _gap(c, arguments.units), c.evidence or "by rule pack", c.source)
        for c in chosen
    ]
    head = columns("tables", "criteria_columns")
    streams.result("\n".join(table(head, cells, width) if width >= _WIDE else blocks(head, cells, width)))
    return 0


def _gap(item, system: str) -> str:
    share = f"{item.asked_gap:g} K" if item.scale == "kelvin" else f"{100 * item.asked_gap:g} %"
    if not item.asked_gap_least:
        return share
    least = numbers.quantity(item.asked_gap_least, numbers.difference_unit(item.unit), system).text
    return f"{share}, at least {least}" if item.asked_gap else least


def _json(what: str, rows) -> int:
    body = {
        "schema": f"screener.{what}/1",
        "software": {"name": "screener", "version": __version__},
        what: rows,
    }
    streams.result(as_text(without_nan(body)))
    return 0


def _width(arguments) -> int:
    return arguments.width or streams.terminal_width()


def _pairs(pairs, width: int) -> list[str]:
    shown = [(label, text) for label, text in pairs if text]
    size = max(len(label) for label, _ in shown)
    return [line for label, text in shown for line in paragraph(text, width, f"{label:<{size}}  ")]


def _species_sources(chosen) -> list[str]:
    """Bibliographic line of every source the records shown rest on."""
    from screener.memo.appendix import source_title

    keys = {
        key
        for item in chosen
        for key in (item.curve.source, item.flash_point_source, item.LFL_source, item.UFL_source)
    }
    return [f"{key}: {source_title(key)}" for key in sorted(keys) if key]
