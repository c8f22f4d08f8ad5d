"""Shares of a blend: sums, bases, names listed twice; then the blend itself."""

from __future__ import annotations

from dataclasses import replace

from screener.casefile.collect import Values
from screener.casefile.keys import all_keys
from screener.casefile.values import Tables, Taken
from screener.ground.errors import InputError

# How far shares may miss 100 % before it is a fault; the rounding of a blend sheet.
# Common practice, no source.
SUM_TOLERANCE = 5e-4


def read_blend(values: Values, path: str, tables: Tables):
    """The blend of `blend` or `tank.contents`; None with the faults noted where there is none."""
    before = len(values.faults)
    basis = values.value(f"{path}.basis")
    rows = values.rows(f"{path}.parts")
    found = [_part(values, row, basis) for row in rows]
    faulty = any(f.path.startswith(f"{path}.parts") or f.path in _HEADS[path] for f in values.faults)
    _forget_temperature(values, path, basis)
    if faulty or len(values.faults) > before or not rows:
        return None
    shares = _merged(values, rows, found)
    total = sum(share for _, share in found)
    if shares is None or not _sum_holds(values, path, total):
        return None
    shares = {name: share / total for name, share in shares.items()}
    try:
        return tables.blend(shares, basis=basis, at=values.value(f"{path}.at") or "15 degC")
    except InputError as error:
        values.complain(
            error.at(f"{path}.{error.path}" if error.path.startswith("parts") else f"{path}.parts")
        )
        return None


_HEADS = {path: (path, f"{path}.basis", f"{path}.at", f"{path}.scale") for path in ("blend", "tank.contents")}


def _part(values: Values, row: str, basis: str | None) -> tuple[str, float]:
    """Name for the blend and share of one row; faults noted."""
    named = [kind for kind in ("stock", "species") if f"{row}.{kind}" in values.taken]
    tried = [kind for kind in ("stock", "species") if any(f.path == f"{row}.{kind}" for f in values.faults)]
    hint = 'for example { species = "ethanol", share = "10 %" }, or stock = "..." for a blendstock'
    if not named and not tried:
        values.complain(InputError(row, None, "this part names neither a stock nor a species", hint))
    if len(named) + len(tried) > 1:
        both = " and ".join(str(values.value(f"{row}.{kind}")) for kind in named)
        values.complain(InputError(row, both, "this part names a stock and a species", "one of the two"))
    share = values.taken.get(f"{row}.share")
    if share is not None and share.mark and basis and share.mark != basis:
        problem = f"'{share.entered}' is a share by {share.mark}, but the shares are by {basis}"
        values.complain(InputError(share.path, share.entered, problem, f"allowed: % or {_SIGN[basis]}"))
    _mark_quality(values, row)
    name = f"{named[0]}:{values.value(f'{row}.{named[0]}')}" if named else ""
    return name, share.value if share is not None else 0.0


_SIGN = {"volume": "vol%", "mole": "mol%", "mass": "mass%"}


def _mark_quality(values: Values, row: str) -> None:
    quality = values.value(f"{row}.quality")
    if quality:
        for name in ("stock", "species", "share"):
            taken = values.taken.get(f"{row}.{name}")
            if taken is not None:
                values.taken[taken.path] = replace(taken, quality=quality)


def _forget_temperature(values: Values, path: str, basis: str | None) -> None:
    """The temperature of volumes means nothing for shares by mass or mole."""
    at = values.taken.get(f"{path}.at")
    if at is None or basis in (None, "volume"):
        return
    if at.quality == "default":
        del values.taken[at.path]
    else:
        values.taken[at.path] = replace(at, note=f"not used: the shares are by {basis}")


def _merged(values: Values, rows: list[str], found: list[tuple[str, float]]) -> dict[str, float] | None:
    """Shares by name; a name listed twice is a fault."""
    first: dict[str, str] = {}
    for row, (name, _) in zip(rows, found, strict=True):
        if name in first:
            shown = name.partition(":")[2]
            problem = f"{shown} is listed twice, here and in {first[name]}"
            values.complain(InputError(row, shown, problem, "add the two shares"))
        first.setdefault(name, row)
    return dict(found) if len(first) == len(rows) else None


def _sum_holds(values: Values, path: str, total: float) -> bool:
    """Whether the shares come to 100 %, or are scaled because the user says so."""
    shown = f"{100.0 * total:.6g} %"
    off = abs(total - 1.0)
    if off > SUM_TOLERANCE:
        if values.value(f"{path}.scale") is not True or total <= 0.0:
            allowed = "allowed: 99.95 % to 100.05 %; correct them, or set scale = true to bring them to 100 %"
            values.complain(InputError(f"{path}.parts", shown, f"the shares sum to {shown}", allowed))
            return False
        note = f"the shares sum to {shown}; each was divided by that sum, as scale = true asks"
        values.taken[f"{path}.scale"] = replace(values.taken[f"{path}.scale"], note=note)
    elif off > 1e-9:
        note = f"the shares sum to {shown}, within 0.05 % of 100 %; each was divided by that sum"
        _note_rounding(values, path, note)
    return True


def _note_rounding(values: Values, path: str, note: str) -> None:
    given = values.taken.get(f"{path}.scale")
    if given is None:
        key = all_keys()[f"{path}.scale"]
        given = Taken(key, key.path, "", True, quality="default")
    values.taken[given.path] = replace(given, note=note)
