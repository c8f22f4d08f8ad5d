"""The values of [blend.lab] to a `LabSheet`, and the sheet to the blend that reproduces it."""

from __future__ import annotations

import re

from screener.casefile.collect import Values
from screener.casefile.lab_keys import OXYGENATES, POINTS
from screener.casefile.values import Tables
from screener.ground.errors import CaseErrors, InputError

_PATH = "blend.lab"
_BY_MASS = ("water",)
_BY_VOLUME = ("e70", "e100", "e150", *OXYGENATES, "benzene", "aromatics", "olefins")
# Fields of the sheet whose key has another name.
_NAMES = {"density_15": "density", "tvp": "true_vapour_pressure", "ibp": "distillation.IBP",
          "fbp": "distillation.FBP", "viscosity_T": "viscosity_temperature"}  # fmt: skip


def read_sheet(values: Values):
    """The sheet of a case; None without one or, its faults noted, when it cannot be used."""
    if _PATH not in values.present:
        return None
    from screener.blends import LabSheet

    before = len(values.faults)
    wrong = _bases(values)
    faulty = any(fault.path.startswith(_PATH) for fault in values.faults)

    def v(name: str):
        return None if name in wrong else values.value(f"{_PATH}.{name}")

    points = ((p / 100.0, v(f'distillation."{p} %"')) for p in POINTS)
    given = {
        "density_15": v("density"),
        **{name: v(name) for name in ("dvpe", "rvp", "rvpe", "e70", "e100", "e150", "benzene", "aromatics")},
        **{name: v(name) for name in ("olefins", "flash_point", "viscosity", "water")},
        "viscosity_T": v("viscosity_temperature"),
        "ibp": v("distillation.IBP"),
        "fbp": v("distillation.FBP"),
        "distillation": tuple((f, T) for f, T in points if T is not None),
        "oxygenates": tuple((name, v(key)) for key, name in OXYGENATES.items() if v(key) is not None),
        "vpcr": _rows(values, "vpcr", "ratio", "temperature", "pressure"),
        "tvp": _rows(values, "true_vapour_pressure", "temperature", "pressure"),
    }
    kind = v("kind")
    if faulty and not any(value not in (None, ()) for value in given.values()):
        return None
    try:
        return LabSheet(**given, product="crude" if kind == "crude" else "")
    except CaseErrors as error:
        for fault in error.faults:
            path = _path(fault.path, given)
            if not (faulty and any(f.path == path for f in values.faults[:before])):
                value = fault.value if fault.value is not None else values.entered(path) or "the sheet"
                values.complain(InputError(path, value, fault.problem, fault.hint))
        return None


def fit_blend(sheet, start, tables: Tables):
    """The blend that reproduces the sheet; CaseErrors when its numbers contradict each other."""
    try:
        return tables.lab(sheet, start)
    except InputError as error:
        raise CaseErrors([InputError(_PATH, "the sheet", error.problem, error.hint)]) from error


def _bases(values: Values) -> set[str]:
    """Names of shares that count something else than their key; the faults noted."""
    wrong = set()
    for names, allowed, text in ((_BY_VOLUME, ("", "volume"), "vol%"), (_BY_MASS, ("mass",), "ppm mass")):
        for name in names:
            taken = values.taken.get(f"{_PATH}.{name}")
            if taken is not None and taken.mark not in allowed:
                wrong.add(name)
                problem = f"'{taken.entered}' does not count {'mass' if text == 'ppm mass' else 'volume'}"
                values.complain(InputError(taken.path, taken.entered, problem, f"allowed: a share in {text}"))
    return wrong


def _rows(values: Values, name: str, *columns: str):
    """Rows of a small table of the sheet that could be read whole."""
    rows = []
    for row in values.rows(f"{_PATH}.{name}"):
        cells = tuple(values.value(f"{row}.{column}") for column in columns)
        if None not in cells:
            rows.append(cells)
    return tuple(rows)


def _path(field: str, given) -> str:
    """Place in the case of a field of the sheet."""
    name, row = re.fullmatch(r"(\w+)(?:\[(\d+)\])?", field).groups()
    if name == "lab":
        return _PATH
    if name == "oxygenates":
        species = given["oxygenates"][int(row or 0)][0]
        return f"{_PATH}.{next(key for key, one in OXYGENATES.items() if one == species)}"
    return f"{_PATH}.{_NAMES.get(name, name)}" + (f"[{row}]" if row else "")
