"""JSON Schema of the case file, made from the key table."""

from __future__ import annotations

from screener.casefile import keys as k
from screener.casefile.keys import Key, all_keys, children
from screener.casefile.quantities import KINDS

DIALECT = "https://json-schema.org/draft/2020-12/schema"
_GAUGE = "A pressure difference from the barometer; gauge by definition, never absolute."


def schema() -> dict:
    """JSON Schema (draft 2020-12) of a case file once its TOML is read.

    A schema can say which keys there are and what kind each is; ranges of quantities with units
    stand in `x-allowed` and in the description, and `read_case` holds them.
    """
    made = _object("")
    about = "Case file of Screener. Quantities are texts with their unit, such as '24 m'. TOML, UTF-8."
    return {"$schema": DIALECT, "title": "Screener case file", "description": about, **made}


def _object(parent: str) -> dict:
    properties = {name: _entry(key) for name, key in children(parent).items()}
    required = [name for name, key in children(parent).items() if key.required and not key.unless]
    either = [[name, key.unless] for name, key in children(parent).items() if key.unless]
    made = {"type": "object", "properties": properties, "additionalProperties": False}
    made |= {"required": required} if required else {}
    for names in either:
        made["anyOf"] = [{"required": [name]} for name in names]
    return made


def _entry(key: Key) -> dict:
    about = {"description": _description(key)}
    if key.kind == k.TABLE:
        return {**about, **_object(key.path)}
    if key.kind == k.ROWS:
        least = {"minItems": 1} if key.required else {}
        return {**about, "type": "array", "items": _object(key.path), **least}
    if key.kind == k.LATER:
        return {**about, "not": {}}
    made = {**about, **_scalar(key)}
    if key.example and key.kind not in (k.FLAG, k.COUNT, k.PACKS):
        made["examples"] = [key.example]
    if key.default is not None:
        made["default"] = key.default
    if key.allowed:
        made["x-allowed"] = key.allowed
    if key.kind in KINDS:
        made |= {"x-kind": key.kind, "x-si-unit": key.unit}
    return made


def _scalar(key: Key) -> dict:
    if key.choices:
        return {"type": "string", "enum": list(key.choices)}
    if key.kind == k.FLAG:
        return {"type": "boolean"}
    if key.kind == k.COUNT:
        return {"type": "integer", "minimum": int(key.low), "maximum": int(key.high)}
    if key.kind == k.NUMBER:
        return {"type": ["number", "string"], "minimum": float(key.low), "maximum": float(key.high)}
    if key.kind == k.PACKS:
        return {"type": "array", "items": {"type": "string"}}
    if key.kind == k.DATE:
        return {"type": "string", "format": "date"}
    return {"type": "string", "minLength": 1} if key.kind != k.TEXT else {"type": "string"}


def _description(key: Key) -> str:
    parts = [f"{key.meaning}."]
    if key.kind == k.LATER:
        parts.append(f"Known and refused for now: {key.problem}.")
    if key.kind == "pressure difference" and key.unit != "Pa":
        parts.append(_GAUGE)
    if key.kind in KINDS:
        parts.append(f"{key.kind.capitalize()} as text ({KINDS[key.kind].accepted}), {key.allowed}.")
    if key.usual:
        parts.append(f"Usual: {key.usual}.")
    if key.where:
        parts.append(f"Found: {key.where}.")
    if key.default is not None:
        parts.append(f"If left out: {key.note}.")
    return " ".join(parts)


def help_text(path: str) -> dict[str, str]:
    """What help beside a field says: meaning, unit, allowed and usual range, where to find it, example."""
    key = all_keys().get(k.pattern(path)) or k.key_at(path)
    if key is None:
        return {}
    unit = KINDS[key.kind].accepted if key.kind in KINDS else ""
    made = {
        "meaning": key.meaning,
        "unit": unit,
        "allowed": key.allowed,
        "usual": key.usual,
        "where": key.where,
        "example": key.example,
        "if left out": key.note,
    }
    return {name: text for name, text in made.items() if text}
