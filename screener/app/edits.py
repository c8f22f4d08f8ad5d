"""Changes of a case that touch more than one value. Plain Python on a `CaseText`."""

from __future__ import annotations

from screener.casefile import keys as schema

MONTHS = ("Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec")


def enter(text, path: str, value: str) -> None:
    """Set a value; an empty one is taken away together with tables it leaves empty."""
    value = str(value).strip()
    if value:
        text.set(path, value)
        return
    text.remove(path)
    prune(text, path)


def prune(text, path: str) -> None:
    """Take away the optional tables above a path that hold nothing any more."""
    parent = path.rpartition(".")[0]
    while parent and text.has(parent):
        key = schema.key_at(parent)
        if key is None or key.required or parent.endswith("]") or not _empty(text.table, parent):
            return
        text.remove(parent)
        parent = parent.rpartition(".")[0]


def _empty(table: dict, path: str) -> bool:
    """Whether a table without rows in its path holds nothing."""
    for name in path.split("."):
        if not isinstance(table, dict) or "[" in name:
            return False
        table = table.get(name, {})
    return table == {}


def add_part(text, base: str, kind: str, name: str) -> str:
    """Add a part without a share yet; its path."""
    return text.insert(f"{base}.parts", {kind: name})


def rename_part(text, at: str, kind: str, name: str) -> None:
    """Make a part another stock or species; share and quality stay."""
    for other in ("stock", "species"):
        if other != kind:
            text.remove(f"{at}.{other}")
    text.set(f"{at}.{kind}", name)


def add_row(text, base: str) -> str:
    """Add a row to a list of tables such as the vents or the months; its path."""
    if base == "site.months":
        known = {text.get(f"site.months[{i}].month") for i in range(text.rows(base))}
        name = next((month for month in MONTHS if month not in known), "")
        return text.insert(base, {"month": name} if name else None)
    if base == "tank.vents":
        return text.insert(base, {"count": "1"})
    return text.insert(base)


def remove_row(text, at: str) -> None:
    """Take a row away, and its list with the last one."""
    base = at.rpartition("[")[0]
    text.remove(at)
    if not text.rows(base):
        text.remove(base)
        prune(text, base)


def scale(text, base: str, on: bool) -> None:
    """Ask for the shares to be brought to 100 %, or take that wish back; the case records it."""
    enter(text, f"{base}.scale", "true" if on else "")
