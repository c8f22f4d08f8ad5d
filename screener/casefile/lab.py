"""The values of a laboratory sheet to a `LabSheet`, and the sheet to the blend that reproduces it."""

from __future__ import annotations

import re
from collections.abc import Sequence
from dataclasses import dataclass
from functools import lru_cache

from screener.casefile.collect import Values
from screener.casefile.lab_keys import BY_MASS, BY_VOLUME, OWN_R, OXYGENATES, POINTS
from screener.casefile.parts import read_blend
from screener.casefile.values import Tables
from screener.ground.errors import CaseErrors, InputError

# Fields of the sheet whose key has another name.
_NAMES = {"density_15": "density", "tvp": "true_vapour_pressure", "ibp": "distillation.IBP",
          "fbp": "distillation.FBP", "viscosity_T": "viscosity_temperature"}  # fmt: skip
_PLAIN = ("title", "dvpe", "rvp", "rvpe", "e70", "e100", "e150", "benzene", "aromatics", "olefins",
          "flash_point", "viscosity", "h2s", "water")  # fmt: skip
_ROWS = {"vpcr": ("vpcr", "ratio", "temperature", "pressure"),
         "tvp": ("true_vapour_pressure", "temperature", "pressure")}  # fmt: skip
# A method that says nothing where its number is not given.
_METHODS = {"dvpe_equation": "dvpe", "rvp_chamber": "rvp"}


@dataclass(frozen=True)
class Stated:
    """What a case says of one liquid: parts as a blend, a sheet, or both; path is 'blend' or 'tank.contents'."""

    path: str
    start: object | None
    sheet: object | None


def read_liquid(values: Values, path: str, tables: Tables, recipe=None) -> Stated:
    """What the values say of the liquid at `path`; faults are noted. recipe takes the place of parts."""
    start = recipe if recipe is not None else read_blend(values, path, tables)
    sheet = read_sheet(values, f"{path}.lab")
    # Parts that were given and cannot be read are not passed over: the sheet alone is another question.
    heads = (f"{path}.parts", f"{path}.basis", f"{path}.at", f"{path}.scale")
    given = f"{path}.parts" in values.present or any(f.path.startswith(heads) for f in values.faults)
    if not given:
        for name in ("basis", "at"):  # how shares count says nothing where there are none
            taken = values.taken.get(f"{path}.{name}")
            if taken is not None and taken.quality == "default":
                del values.taken[taken.path]
    return Stated(path, start, None if start is None and given else sheet)


def made_liquids(values: Values, stated: Sequence[Stated], tables: Tables) -> list:
    """A blend for each; the refusals of all sheets are noted.

    A fit takes seconds, so beside other faults it is not begun: then only what a sheet alone lacks is told.
    """
    others = bool(values.faults)
    made = []
    for one in stated:
        try:
            if one.sheet is None:
                made.append(one.start)
            elif not others:
                made.append(_fit(values, one, tables))
            elif one.start is None:
                _begin(values, one)
        except InputError as error:
            values.complain(error)
    return made


def _begin(values: Values, one: Stated) -> None:
    """Only the start of a fit; InputError where the sheet alone does not allow one."""
    from screener.blends.lab_start import start_of

    try:
        start_of(one.sheet, None)
    except InputError as error:
        raise _refused(values, one, error) from error


def _fit(values: Values, one: Stated, tables: Tables):
    """The blend that reproduces the sheet; InputError when its numbers contradict each other."""
    made = _fitted(tables.lab, one.sheet, one.start)
    if isinstance(made, InputError):
        raise _refused(values, one, made)
    return made


def _refused(values: Values, one: Stated, error: InputError) -> InputError:
    """The refusal of a sheet with its place in the case."""
    density = values.entered(f"{one.path}.lab.density") if isinstance(error.value, float) else ""
    place = f"{one.path}.lab.density" if density else f"{one.path}.lab"
    return InputError(place, density or "the sheet", error.problem, error.hint)


@lru_cache(maxsize=32)
def _fitted(fit, sheet, start):
    """The blend or the refusal: a refusal takes as long as a fit and is kept as well."""
    try:
        return fit(sheet, start)
    except InputError as error:
        return error


def read_sheet(values: Values, base: str):
    """The sheet at a path; None without one or, its faults noted, when it cannot be used."""
    if base not in values.present:
        return None
    from screener.blends import LabSheet

    _forget_methods(values, base)
    wrong = _bases(values, base)
    faulty = {fault.path for fault in values.faults if fault.path.startswith(base)}
    given = _given(values, base, wrong)
    if faulty and not any(value not in (None, "", ()) for name, value in given.items() if name != "title"):
        return None
    own = _own_R(values, base)
    kind = values.value(f"{base}.kind")
    try:
        sheet = LabSheet(
            **given,
            product="crude" if kind == "crude" else "",
            reproducibility=own,
            dvpe_equation=values.value(f"{base}.dvpe_equation") or "ASTM D5191",
            rvp_chamber=values.value(f"{base}.rvp_chamber") or "dry",
        )
        return None if faulty or wrong else sheet  # a sheet with holes is another sheet
    except CaseErrors as error:
        for fault in error.faults:
            path = _crossed(values, base, fault) or _path(values, base, fault.path, given)
            if not _told(path, faulty):
                value = values.entered(path) or (fault.value if fault.value is not None else "the sheet")
                values.complain(InputError(path, value, fault.problem, fault.hint))
        return None


def _given(values: Values, base: str, wrong: set[str]) -> dict:
    """Fields of the sheet by name, None or () where the sheet is silent."""

    def v(name: str):
        return None if name in wrong else values.value(f"{base}.{name}")

    points = ((p / 100.0, v(f'distillation."{p} %"')) for p in POINTS)
    return {
        **{name: v(name) for name in _PLAIN},
        "title": v("title") or "",
        **{field: v(_NAMES[field]) for field in ("density_15", "viscosity_T", "ibp", "fbp")},
        "distillation": tuple((f, T) for f, T in points if T is not None),
        "oxygenates": tuple((name, v(key)) for key, name in OXYGENATES.items() if v(key) is not None),
        **{field: tuple(row for _, row in _rows(values, base, field)) for field in _ROWS},
    }


def _own_R(values: Values, base: str) -> tuple[tuple[str, float], ...]:
    """Reproducibilities the laboratory states, of the numbers the sheet gives."""
    made = []
    for key, name in OWN_R.items():
        path = f"{base}.reproducibility.{key}"
        numbers = [f"{base}.{key}", f"{base}.distillation.{key.upper()}"]
        if values.value(path) is None:
            continue
        if any(number in values.taken or number in values.present for number in numbers):
            made.append((name, values.value(path)))
        else:
            values.annotate(path, "not used: the sheet does not give this number")
    return tuple(made)


def _told(path: str, faulty: set[str]) -> bool:
    """Whether a fault only follows from one that was noted when the values were read."""
    return path in faulty or (path.endswith(".viscosity") and f"{path}_temperature" in faulty)


def _forget_methods(values: Values, base: str) -> None:
    """The default of a method is no input where its number is not given."""
    for method, number in _METHODS.items():
        taken = values.taken.get(f"{base}.{method}")
        if taken is not None and taken.quality == "default" and f"{base}.{number}" not in values.taken:
            del values.taken[taken.path]


def _bases(values: Values, base: str) -> set[str]:
    """Names of shares that count something else than their key; the faults noted."""
    wrong = set()
    for names, allowed, text in ((BY_VOLUME, ("", "volume"), "vol%"), (BY_MASS, ("mass",), "ppm mass")):
        for name in (*names, *(f"reproducibility.{name}" for name in names)):
            taken = values.taken.get(f"{base}.{name}")
            if taken is not None and taken.mark not in allowed:
                wrong.add(name)
                problem = f"'{taken.entered}' does not count {'mass' if text == 'ppm mass' else 'volume'}"
                values.complain(InputError(taken.path, taken.entered, problem, f"allowed: a share in {text}"))
    return wrong


def _rows(values: Values, base: str, field: str) -> list[tuple[str, tuple]]:
    """Rows of a small table of the sheet that could be read whole, each with its path."""
    name, *columns = _ROWS[field]
    rows = []
    for row in values.rows(f"{base}.{name}"):
        cells = tuple(values.value(f"{row}.{column}") for column in columns)
        if None not in cells:
            rows.append((row, cells))
    return rows


def _crossed(values: Values, base: str, fault: InputError) -> str:
    """Place of the point of a distillation that is not above the one before it; '' for other faults."""
    found = re.match(r"T(\d+) |the (final) boiling", fault.problem) if fault.path == "distillation" else None
    if found is None:
        return ""
    path = f"{base}.distillation." + ("FBP" if found[2] else f'"{found[1]} %"')
    return path if path in values.taken else ""


def _path(values: Values, base: str, field: str, given) -> str:
    """Place in the case of a field of the sheet."""
    name, row = re.fullmatch(r"(\w+)(?:\[(\d+)\])?", field).groups()
    if name == "lab":
        return base
    if name in _ROWS and row is not None:
        return _rows(values, base, name)[int(row)][0]
    if name == "oxygenates":
        species = given["oxygenates"][int(row or 0)][0]
        return f"{base}.{next(key for key, one in OXYGENATES.items() if one == species)}"
    return f"{base}.{_NAMES.get(name, name)}" + (f"[{row}]" if row else "")
